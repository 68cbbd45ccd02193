package main

import (
	"errors"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// readEndMill reads an [[end_mill]]: nominal and, if it is known, measured diameter.
func (r *shopReader) readEndMill(s settings) error {
	m := endMill{}
	var ok bool
	var err error
	if m.nominal, ok, err = s.positive("size"); err != nil {
		return err
	}
	if !ok {
		return fault(s.at, "size is missing; give size = 2, and measured where it is known")
	}
	if m.nominal > largestMill {
		return bad("size", s.vals["size"], "%s is no end mill; at most %s", r.length(m.nominal), r.length(largestMill))
	}
	m.diameter = m.nominal
	if d, ok, err := s.positive("measured"); err != nil {
		return err
	} else if ok {
		if d < mostGround*m.nominal || d > m.nominal+mostMeasured {
			return bad("measured", s.vals["measured"], "%s is not an end mill of %s, new or reground", r.length(d), r.length(m.nominal))
		}
		m.diameter, m.measured = d, true
	}
	if m.count, _, err = shopCount(s); err != nil {
		return err
	}
	if m.place, _, err = s.word("place"); err != nil {
		return err
	}
	r.shop.endMills = append(r.shop.endMills, m)
	return nil
}

const (
	largestMill = 160 // mm, shell end mills included
	mostGround  = 0.8 // the share of its size below which an end mill is another one
)

// shopPitch reads module or dp, one plain number; dp is 0 where a module is given.
func shopPitch(s settings) (module, dp float64, err error) {
	key, err := pitchKey(s)
	if err != nil {
		return 0, 0, err
	}
	x, _, err := s.number(key)
	if err != nil {
		return 0, 0, err
	}
	module = x
	if key == "dp" && x > 0 {
		module, dp = 25.4/x, x
	}
	if module < smallestModule || module > largestModule {
		return 0, 0, bad(key, s.vals[key], "gives a module of %.4g mm; it must be from %g to %g mm", module, smallestModule, float64(largestModule))
	}
	return module, dp, nil
}

// shopAngle reads a pressure angle in degrees, 20 unless it is said.
func shopAngle(s settings) (float64, error) {
	deg, ok, err := s.angle("pressure_angle")
	switch {
	case err != nil || !ok:
		return 20, err
	case deg < 5 || deg > 45:
		return 0, bad("pressure_angle", s.vals["pressure_angle"], "must be from 5° to 45°, not %v°", deg)
	}
	return deg, nil
}

// readFormCutter reads a [[form_cutter]]: disc cutters by their numbers, or by the
// tooth numbers that one is ground for.
func (r *shopReader) readFormCutter(s settings) error {
	c := formCutter{}
	var err error
	if c.module, c.dp, err = shopPitch(s); err != nil {
		return err
	}
	if c.pressureAngle, err = shopAngle(s); err != nil {
		return err
	}
	if c.numbers, err = cutterNumbers(s); err != nil {
		return err
	}
	if c.teeth, err = cutterTeeth(s); err != nil {
		return err
	}
	switch {
	case len(c.numbers) == 0 && c.teeth[1] == 0:
		return fault(s.at, "numbers is missing; give numbers = [3, 4, 5], or teeth = \"35..54\"")
	case len(c.numbers) > 0 && c.teeth[1] > 0:
		return bad("teeth", s.vals["teeth"], "and numbers both say which teeth it cuts; keep one")
	}
	if c.place, _, err = s.word("place"); err != nil {
		return err
	}
	r.shop.formCutters = append(r.shop.formCutters, c)
	return nil
}

// cutterNumbers reads the numbers of a set of form cutters: 1 (for 135 teeth and
// more) to 8 (for 12 and 13), with halves between.
func cutterNumbers(s settings) ([]float64, error) {
	v, ok := s.vals["numbers"]
	if !ok {
		return nil, nil
	}
	list, isList := v.content.([]value)
	if !isList {
		list = []value{v}
	}
	if len(list) == 0 {
		return nil, bad("numbers", v, "needs the numbers of the cutters: [3, 4, 5]")
	}
	var out []float64
	for _, item := range list {
		x, _, err := settings{vals: map[string]value{"numbers": item}}.number("numbers")
		if err != nil {
			return nil, err
		}
		if x < 1 || x > 8 || 2*x != math.Trunc(2*x) {
			return nil, bad("numbers", item, "cutters are numbered 1 to 8, with halves between, not %v", x)
		}
		out = append(out, x)
	}
	return out, nil
}

// cutterTeeth reads the range of tooth numbers that one form cutter is for.
func cutterTeeth(s settings) (teeth [2]int, err error) {
	v, ok := s.vals["teeth"]
	if !ok {
		return teeth, nil
	}
	text, isText := asText(v)
	l := inspect.Limits{}
	if isText && strings.ContainsAny(text, "mn\"″/") { // a length's unit, or a fraction
		err = errors.New("no numbers of teeth")
	} else if isText {
		l, err = inspect.ParseLimits(text, inspect.Millimeter)
	} else if l.Min, _, err = s.number("teeth"); err == nil {
		l.Max = l.Min
	}
	if err != nil || l.Min != math.Trunc(l.Min) || l.Max != math.Trunc(l.Max) || l.Min < 1 || l.Max > maxTeeth {
		return teeth, bad("teeth", v, "needs a range of whole numbers from 1 to %d, such as \"35..54\"", maxTeeth)
	}
	return [2]int{int(l.Min), int(l.Max)}, nil
}

// readHob reads a [[hob]].
func (r *shopReader) readHob(s settings) error {
	h := hob{}
	var err error
	if h.module, h.dp, err = shopPitch(s); err != nil {
		return err
	}
	if h.pressureAngle, err = shopAngle(s); err != nil {
		return err
	}
	name, ok, err := s.word("rack")
	if err != nil {
		return err
	}
	if ok {
		angle := 0.0
		if s.has("pressure_angle") {
			angle = h.pressureAngle
		}
		rack, err := refdata.RackFor(name, angle)
		if err != nil {
			return bad("rack", s.vals["rack"], "%v", err)
		}
		h.rack, h.pressureAngle = rack.Name, rack.PressureAngleDeg
	}
	if h.place, _, err = s.word("place"); err != nil {
		return err
	}
	r.shop.hobs = append(r.shop.hobs, h)
	return nil
}
