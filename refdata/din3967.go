package refdata

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
)

// ThicknessAllowance returns how much thinner than nominal the thickest
// allowed tooth is, |A_sne| in mm in the normal section on the reference
// cylinder: DIN 3967:1978-08, table 1, by reference diameter in mm (above 0 up to
// 1600; the sign of an internal gear's does not count) and series, a (thinnest)
// to h (nominal).
func ThicknessAllowance(d float64, series string) (thin float64, source Source, err error) {
	um, source, err := allowanceMicrometers(d, series)
	return um / 1000, source, err
}

// ThicknessTolerance returns T_sn, how much thinner than the thickest the
// thinnest allowed tooth is, in mm in the normal section on the reference
// cylinder: DIN 3967:1978-08, table 2, by reference diameter in mm as in
// ThicknessAllowance and series, 21 (finest) to 30.
func ThicknessTolerance(d float64, series int) (mm float64, source Source, err error) {
	um, source, err := thicknessToleranceMicrometers(d, series)
	return um / 1000, source, err
}

// ThicknessCallOut reads the call-out of a drawing, such as "DIN 3967 cd25" or
// "cd 25", and returns how much thinner than nominal the thickest and the
// thinnest allowed tooth are in mm: |A_sne| and |A_sne| + T_sn.
func ThicknessCallOut(d float64, text string) (least, most float64, source Source, err error) {
	w, _ := cut(words(text), "din", "3967")
	var tolerance int
	if len(w) == 2 {
		tolerance, err = strconv.Atoi(w[1])
	}
	if len(w) != 2 || err != nil {
		return 0, 0, Source{}, fmt.Errorf("tooth thickness %q is not understood: want an allowance series and a tolerance series of DIN 3967, such as \"cd25\"", text)
	}
	allowance, _, err := allowanceMicrometers(d, w[0])
	if err != nil {
		return 0, 0, Source{}, err
	}
	width, source, err := thicknessToleranceMicrometers(d, tolerance)
	if err != nil {
		return 0, 0, Source{}, err
	}
	source.Table = "tables 1 and 2, tooth thickness allowances and tolerances"
	return allowance / 1000, (allowance + width) / 1000, source, nil
}

// AllowanceSeries returns the series of tooth thickness allowances, thinnest teeth first.
func AllowanceSeries() []string { return thicknessSeries("A_sne") }

// ToleranceSeries returns the series of tooth thickness tolerances, finest first.
func ToleranceSeries() []int {
	names := thicknessSeries("T_sn")
	series := make([]int, len(names))
	for i, name := range names {
		series[i], _ = strconv.Atoi(name) // whole numbers, held by a test
	}
	return series
}

func allowanceMicrometers(d float64, series string) (um float64, source Source, err error) {
	all := AllowanceSeries()
	name := plain(series)
	if !slices.Contains(all, name) {
		return 0, Source{}, fmt.Errorf("DIN 3967 has no tooth thickness allowance series %q; there are %s", series, strings.Join(all, ", "))
	}
	return thicknessMicrometers("A_sne", "table 1, upper tooth thickness allowances", name, d)
}

func thicknessToleranceMicrometers(d float64, series int) (um float64, source Source, err error) {
	all := ToleranceSeries()
	if !slices.Contains(all, series) {
		return 0, Source{}, fmt.Errorf("DIN 3967 has no tooth thickness tolerance series %d; there are %d to %d", series, all[0], all[len(all)-1])
	}
	return thicknessMicrometers("T_sn", "table 2, tooth thickness tolerances", strconv.Itoa(series), d)
}

// thicknessMicrometers returns the size of the value of a series at a
// reference diameter. The series must be there.
func thicknessMicrometers(table, title, series string, d float64) (um float64, source Source, err error) {
	rs := slices.DeleteFunc(records("allowance_din3967"), func(r record) bool {
		return r.text("table") != table || r.text("series") != series
	})
	r, ok := sizeRow(rs, math.Abs(d), "over_mm", "to_mm")
	if !ok {
		return 0, Source{}, fmt.Errorf("no tooth thickness series for a reference diameter of %.8g mm: DIN 3967 covers diameters above 0 up to %g mm; give the thinning itself instead",
			d, rs[len(rs)-1].number("to_mm"))
	}
	source = r.source()
	source.Standard, source.Edition, source.Table = "DIN 3967", "1978-08", title // the file holds DIN 3964, too
	return math.Abs(r.number("value_um")), source, nil
}

// thicknessSeries returns the names of one table's series in the table's order.
func thicknessSeries(table string) []string {
	var series []string
	for _, r := range records("allowance_din3967") {
		if name := r.text("series"); r.text("table") == table && !slices.Contains(series, name) {
			series = append(series, name)
		}
	}
	return series
}
