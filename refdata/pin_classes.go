package refdata

import (
	"fmt"
	"strconv"
	"strings"
)

// GaugePinTolerance returns the FULL tolerance of a gauge pin of class XX, X, Y,
// Z or ZZ (ASME B89.1.5), mm: a plus pin is made +tolerance/−0, a minus pin
// +0/−tolerance. mm is the pin's nominal diameter; an error names the class or
// the sizes that there are.
func GaugePinTolerance(class string, mm float64) (tolerance float64, src Source, err error) {
	var of []record
	var names []string
	for _, r := range records("pin_classes") {
		name := r.text("class")
		if len(names) == 0 || names[len(names)-1] != name {
			names = append(names, name)
		}
		if plain(name) == plain(class) {
			of = append(of, r)
		}
	}
	if len(of) == 0 {
		return 0, src, unknown("class of gauge pins", class, names, "pin_classes")
	}
	r, ok := sizeRow(of, mm/mmPerInch, "over_in", "upto_in")
	if !ok {
		return 0, src, fmt.Errorf("class %s is for pins over %s up to %s in, not %s in (%s mm)", of[0].text("class"),
			of[0].text("over_in"), of[len(of)-1].text("upto_in"), short(mm/mmPerInch), short(mm))
	}
	return r.scaled("tolerance_uin", -6) * mmPerInch, r.source(), nil
}

// TestPinLimit returns the limit deviation, plus and minus, of a test pin of
// class 0, 1 or 2 (DIN 2269), mm. mm is the pin's nominal diameter.
func TestPinLimit(class string, mm float64) (limit float64, src Source, err error) {
	var names []string
	for _, r := range records("pin_din2269") {
		names = append(names, r.text("class"))
		if r.text("class") != plain(class) {
			continue
		}
		if mm < r.number("from_mm")-sizeSlack || mm > r.number("to_mm")+sizeSlack {
			return 0, src, fmt.Errorf("DIN 2269 is for pins from %s to %s mm, not %s mm", r.text("from_mm"), r.text("to_mm"), short(mm))
		}
		return r.scaled("limit_um", -3), r.source(), nil
	}
	return 0, src, fmt.Errorf("DIN 2269 has the classes %s, not %q", strings.Join(names, ", "), class)
}

// short writes a size with the six figures that anybody measures to.
func short(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }
