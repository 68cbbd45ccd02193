package main

import (
	"fmt"
	"math"
	"path"
	"strconv"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// A shopReader turns the tables of a shop file into a shop.
type shopReader struct{ shop *shop }

func (r *shopReader) readTop(top settings) error {
	var err error
	if r.shop.title, _, err = top.word("title"); err != nil {
		return err
	}
	word, ok, err := top.word("units", "mm", "in")
	if err != nil {
		return err
	}
	if !ok {
		return fault(top.at, "units is missing; write units = \"mm\" or units = \"in\" at the top")
	}
	if word == "in" {
		r.shop.units = inspect.Inch
	}
	return nil
}

// Bounds of a shop file's numbers, that keep slips of the finger out.
const (
	largestPin   = 305.0 // mm: 12 in, to which classes go
	mostAlike    = 1000  // of one size
	mostSizes    = 5000  // of a set
	mostPins     = 20000 // sizes in all
	mostMeasured = 0.1   // mm: a pin farther from its size is one of another size
	leastShare   = 0.95  // and a small one if it is off by a twentieth
	longestRange = 3000  // mm
	coarsest     = 1.0   // mm, of an instrument's ±
)

// readPins reads a [[pin]] or [[ball]]: one size, or a set in even steps.
func (r *shopReader) readPins(s settings, ball bool) error {
	place, _, err := s.word("place")
	if err != nil {
		return err
	}
	count, counted, err := shopCount(s)
	if err != nil {
		return err
	}
	pin := inspect.Pin{Ball: ball, Count: count}
	if s.has("from") || s.has("to") || s.has("step") {
		return r.readSet(s, pin, place)
	}
	size, ok, err := s.positive("size")
	if err != nil {
		return err
	}
	if !ok {
		return fault(s.at, "size is missing; give size = 3.5, or from, to and step for a whole set")
	}
	if size > largestPin {
		return bad("size", s.vals["size"], "%s is no pin or ball; at most %s", r.length(size), r.length(largestPin))
	}
	text, _ := asText(s.vals["size"])
	unit := inspect.UnitOf(text, r.shop.units)
	pin.Label = short(size, unit) + " " + unit.String()
	pin.Nominal, pin.Diameter, pin.From = size, size, fromShop(place, fmt.Sprintf("line %d of %s", s.at.line, path.Base(r.shop.file)))
	measured, err := r.measured(s, size)
	if err != nil {
		return err
	}
	if len(measured) == 0 {
		if err := classed(s, &pin); err != nil {
			return err
		}
		return r.add(s, pin)
	}
	if err := classed(s, &inspect.Pin{Nominal: size}); err != nil {
		return err
	}
	pin.Measured, pin.Known = true, true
	if len(measured) > 1 {
		if counted && count != len(measured) {
			return bad("count", s.vals["count"], "says %d, measured has %d diameters; they must be as many", count, len(measured))
		}
		pin.Count = 1
	}
	for _, d := range measured {
		pin.Diameter = d
		if err := r.add(s, pin); err != nil {
			return err
		}
	}
	return nil
}

// add puts pins into the stock.
func (r *shopReader) add(s settings, pin inspect.Pin) error {
	if len(r.shop.stock.Pins) == mostPins {
		return fault(s.at, "more than %d sizes of pins and balls; that is no shop", mostPins)
	}
	r.shop.stock.Pins = append(r.shop.stock.Pins, pin)
	return nil
}

// measured reads one measured diameter, or a list with one for each.
func (r *shopReader) measured(s settings, size float64) ([]float64, error) {
	v, ok := s.vals["measured"]
	if !ok {
		return nil, nil
	}
	list, isList := v.content.([]value)
	if !isList {
		list = []value{v}
	} else if len(list) == 0 || len(list) > mostAlike {
		return nil, bad("measured", v, "needs a diameter, or a list with one for each: [3.5003, 3.4999]")
	}
	var out []float64
	for _, item := range list {
		mm, err := s.asLength(item)
		if err != nil {
			return nil, bad("measured", item, "%v", err)
		}
		if off := math.Abs(mm - size); off > mostMeasured || off > (1-leastShare)*size {
			return nil, bad("measured", item, "%s is not a pin of %s; write a [[pin]] of its own for another size", r.fine(mm), r.fine(size))
		}
		out = append(out, mm)
	}
	return out, nil
}

// readSet reads a set of pins in even steps, one of each size unless count says more.
func (r *shopReader) readSet(s settings, pin inspect.Pin, place string) error {
	ends := [3]float64{}
	for i, key := range []string{"from", "to", "step"} {
		mm, ok, err := s.positive(key)
		if err != nil {
			return err
		}
		if !ok {
			return fault(s.at, "%s is missing; a set has from, to and step", key)
		}
		ends[i] = mm
	}
	for _, key := range []string{"size", "measured"} {
		if v, ok := s.vals[key]; ok {
			return bad(key, v, "is of one size, from, to and step are of a set; write a table of its own")
		}
	}
	from, to, step := ends[0], ends[1], ends[2]
	steps := (to - from) / step
	switch {
	case to <= from:
		return bad("to", s.vals["to"], "must be above from, %s", r.length(from))
	case to > largestPin:
		return bad("to", s.vals["to"], "%s is no pin or ball; at most %s", r.length(to), r.length(largestPin))
	case steps+1 > mostSizes:
		return bad("step", s.vals["step"], "is too fine: a set has %d sizes at most", mostSizes)
	case math.Abs(steps-math.Round(steps)) > evenStep:
		return bad("step", s.vals["step"], "does not divide the way from %s to %s evenly", r.fine(from), r.fine(to))
	}
	unit := r.shop.units.MM()
	for i := range int(math.Round(steps)) + 1 {
		pin.Nominal = math.Round((from+float64(i)*step)/unit*sizeDigits) / sizeDigits * unit
		pin.Diameter, pin.Label = pin.Nominal, r.plainly(pin.Nominal)
		pin.From = fromShop(place, fmt.Sprintf("set in steps of %s", r.plainly(step)))
		if err := classed(s, &pin); err != nil {
			return err
		}
		if err := r.add(s, pin); err != nil {
			return err
		}
	}
	return nil
}

const (
	// evenStep is how far a set may be from a whole number of steps: rounding, and
	// what is left of a step written to six digits.
	evenStep = 1e-3
	// sizeDigits rounds a set's sizes to what is engraved on them, so that a sum of
	// steps is the float64 nearest to its decimals.
	sizeDigits = 1e7
)

// shopCount reads how many there are; one unless it is said.
func shopCount(s settings) (n int, ok bool, err error) {
	n, ok, err = s.count("count")
	switch {
	case err != nil || !ok:
		return 1, false, err
	case n > mostAlike:
		return 0, true, bad("count", s.vals["count"], "%d of one size are more than a shop has; at most %d", n, mostAlike)
	}
	return n, true, nil
}

// classed reads a pin's class and gives the pin what it allows.
func classed(s settings, pin *inspect.Pin) error {
	text, ok, err := s.word("class")
	if err != nil || !ok {
		return err
	}
	name, sign := splitPinClass(text)
	var limit float64
	if name != "" && isDigit(name[0]) {
		limit, _, err = refdata.TestPinLimit(name, pin.Nominal)
		pin.Off, pin.Class = inspect.Limits{Min: -limit, Max: limit}, "DIN 2269 class "+name
		if err == nil && sign != "" {
			return bad("class", s.vals["class"], "DIN 2269 is plus and minus; leave %s out", sign)
		}
	} else {
		limit, _, err = refdata.GaugePinTolerance(name, pin.Nominal)
		pin.Class = "class " + strings.ToUpper(name) + " " + sign
		switch {
		case err == nil && sign == "":
			return bad("class", s.vals["class"], "%q: say which pins they are, \"%s plus\" or \"%s minus\"", text, strings.ToUpper(name), strings.ToUpper(name))
		case sign == "plus":
			pin.Off = inspect.Limits{Min: 0, Max: limit}
		default:
			pin.Off = inspect.Limits{Min: -limit, Max: 0}
		}
	}
	if err != nil {
		return bad("class", s.vals["class"], "%v; write \"ZZ minus\", \"X plus\" or \"DIN 2269 class 1\"", err)
	}
	pin.Known = true
	return nil
}

// splitPinClass splits "class ZZ minus", "zz-", "Z plus" or "DIN 2269 class 1" into
// its name and "plus", "minus" or nothing.
func splitPinClass(text string) (name, sign string) {
	t := strings.NewReplacer("−", "-", "-", " minus ", "+", " plus ").Replace(strings.ToLower(text))
	var rest []string
	for _, word := range strings.Fields(t) {
		switch word {
		case "plus", "minus":
			sign = word
		case "class", "din", "2269", "pins":
		default:
			rest = append(rest, word)
		}
	}
	return strings.Join(rest, " "), sign
}

// fromShop names an entry of the shop file for people: by its place, else by what it is.
func fromShop(place, what string) string {
	if place != "" {
		what = place
	}
	return "shop, " + what
}

func (r *shopReader) length(mm float64) string {
	return r.shop.units.Format(mm, r.shop.units.Decimals()) + " " + r.shop.units.String()
}

func (r *shopReader) fine(mm float64) string {
	return r.shop.units.Format(mm, r.shop.units.Decimals()+1) + " " + r.shop.units.String()
}

// plainly words a length in the file's unit without needless zeros.
func (r *shopReader) plainly(mm float64) string {
	return short(mm, r.shop.units) + " " + r.shop.units.String()
}

// short words a length with up to six decimals and no zeros at its end.
func short(mm float64, u inspect.Unit) string {
	return strconv.FormatFloat(math.Round(mm/u.MM()*1e6)/1e6, 'f', -1, 64)
}
