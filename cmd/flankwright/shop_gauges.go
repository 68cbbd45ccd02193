package main

import (
	"fmt"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// Sizes that a shop file need not say, mm (common practice).
const (
	usualAnvil   = 6.5 // of a micrometer
	usualSpindle = 8   // that carries the discs
)

// readMicrometer reads a [[micrometer]].
func (r *shopReader) readMicrometer(s settings) error {
	g, kind := inspect.Gauge{}, "micrometer"
	anvil, _, err := s.word("anvil", "flat", "disc")
	if err != nil {
		return err
	}
	if anvil == "disc" {
		kind = "disc micrometer"
		if g.Face, err = readDisc(s); err != nil {
			return err
		}
	} else if g.Face, err = readAnvil(s); err != nil {
		return err
	}
	if err := r.readRange(s, &g, kind); err != nil {
		return err
	}
	low := max(g.Range.Min, g.Range.Max-25) // one with several anvils is as good as with its longest
	limit, src, ok := refdata.MicrometerLimit(low)
	if anvil == "disc" {
		limit, src, ok = refdata.DiscMicrometerLimit(low)
	}
	if err := r.uncertainty(s, &g.Uncertainty, &g.By, limit, src, ok); err != nil {
		return err
	}
	r.shop.stock.Gauges = append(r.shop.stock.Gauges, g)
	return nil
}

func readAnvil(s settings) (inspect.Face, error) {
	for _, key := range []string{"rim", "spindle"} {
		if v, ok := s.vals[key]; ok {
			return inspect.Face{}, bad(key, v, "is for discs; write anvil = \"disc\" with it")
		}
	}
	d, ok, err := s.positive("anvil_diameter")
	if !ok {
		d = usualAnvil
	}
	return inspect.Face{Kind: inspect.FlatAnvil, Diameter: d}, err
}

func readDisc(s settings) (inspect.Face, error) {
	f := inspect.Face{Kind: inspect.DiscAnvil, Spindle: usualSpindle}
	for _, p := range []struct {
		key  string
		must bool
		to   *float64
	}{{"anvil_diameter", true, &f.Diameter}, {"rim", true, &f.Thickness}, {"spindle", false, &f.Spindle}} {
		mm, ok, err := s.positive(p.key)
		switch {
		case err != nil:
			return f, err
		case ok:
			*p.to = mm
		case p.must:
			return f, fault(s.at, "%s is missing; discs need anvil_diameter and rim, their thickness at the edge", p.key)
		}
	}
	if f.Diameter <= f.Spindle {
		return f, bad("anvil_diameter", s.vals["anvil_diameter"], "the discs must be larger than the spindle behind them (%g mm unless spindle says otherwise)", f.Spindle)
	}
	return f, nil
}

// readCaliper reads a [[caliper]].
func (r *shopReader) readCaliper(s settings) error {
	g := inspect.Gauge{Caliper: true, Face: inspect.Face{Kind: inspect.Jaws}}
	if err := r.readRange(s, &g, "caliper"); err != nil {
		return err
	}
	graduation, _, err := s.positive("graduation")
	if err != nil {
		return err
	}
	if graduation > coarsest {
		return bad("graduation", s.vals["graduation"], "must be %s at most", r.length(coarsest))
	}
	if g.Face.Thickness, _, err = s.positive("jaw"); err != nil {
		return err
	}
	limit, src, ok := refdata.CaliperLimit(g.Range.Max, graduation)
	if err := r.uncertainty(s, &g.Uncertainty, &g.By, limit, src, ok); err != nil {
		return err
	}
	r.shop.stock.Gauges = append(r.shop.stock.Gauges, g)
	return nil
}

// readRange reads the measuring range and the name, which is made of it where none is given.
func (r *shopReader) readRange(s settings, g *inspect.Gauge, kind string) error {
	l, single, ok, err := s.limits("range")
	switch {
	case err != nil:
		return err
	case !ok:
		return fault(s.at, "range is missing; write range = \"25..50\"")
	case single || l.Width() <= 0:
		return bad("range", s.vals["range"], "needs its two ends, such as \"25..50\"")
	case l.Min < 0 || l.Max > longestRange:
		return bad("range", s.vals["range"], "must lie between 0 and %s", r.length(longestRange))
	}
	g.Range = l
	text, _ := asText(s.vals["range"])
	unit := inspect.UnitOf(text, r.shop.units)
	if g.Name, ok, err = s.word("name"); err == nil && !ok {
		g.Name = fmt.Sprintf("%s-%s %s %s", short(l.Min, unit), short(l.Max, unit), unit, kind)
	}
	return err
}

// uncertainty reads an instrument's ±, or takes the error limit of the tables.
func (r *shopReader) uncertainty(s settings, to *float64, by *string, limit float64, src refdata.Source, listed bool) error {
	u, ok, err := s.positive("uncertainty")
	switch {
	case err != nil:
		return err
	case ok && u > coarsest:
		return bad("uncertainty", s.vals["uncertainty"], "is the ± of a reading; %s is no measurement", r.length(u))
	case ok:
		*to, *by = u, "the shop file"
	case !listed:
		return fault(s.at, "uncertainty is missing; no error limit is listed for this range (see: flankwright tables instruments)")
	default:
		*to, *by = limit, "error limit, "+src.Standard
	}
	return nil
}

// readToothCaliper reads a [[tooth_caliper]].
func (r *shopReader) readToothCaliper(s settings) error {
	c := inspect.ToothCaliper{}
	key, l, err := pitchRange(s)
	if err != nil {
		return err
	}
	c.Modules = l
	if key == "dp" {
		c.Modules = inspect.Limits{Min: 25.4 / l.Max, Max: 25.4 / l.Min}
	}
	if c.Modules.Min < smallestModule || c.Modules.Max > largestModule {
		return bad(key, s.vals[key], "gives modules outside %g to %g mm", smallestModule, float64(largestModule))
	}
	var ok bool
	if c.Name, ok, err = s.word("name"); err != nil {
		return err
	} else if !ok {
		c.Name = "gear tooth caliper"
	}
	limit, src := refdata.ToothCaliperLimit()
	if err := r.uncertainty(s, &c.Uncertainty, &c.By, limit, src, true); err != nil {
		return err
	}
	r.shop.stock.ToothCalipers = append(r.shop.stock.ToothCalipers, c)
	return nil
}

// pitchRange reads module or dp as a range of plain numbers, exactly one of them.
func pitchRange(s settings) (key string, l inspect.Limits, err error) {
	key, err = pitchKey(s)
	if err != nil {
		return key, l, err
	}
	text, isText := asText(s.vals[key])
	if !isText || !strings.Contains(text, "..") {
		return key, l, bad(key, s.vals[key], "needs a range in quotes, such as \"1..12\"")
	}
	l, err = inspect.ParseLimits(strings.TrimSuffix(strings.TrimSpace(text), "mm"), inspect.Millimeter)
	if err == nil && strings.ContainsAny(text, "in\"″") {
		err = fmt.Errorf("%q: a range of pitches is written with plain numbers", text)
	}
	if err != nil {
		return key, l, bad(key, s.vals[key], "%v", err)
	}
	if l.Min <= 0 {
		return key, l, bad(key, s.vals[key], "must begin above 0")
	}
	return key, l, nil
}

// pitchKey returns which of module and dp is given, exactly one.
func pitchKey(s settings) (string, error) {
	switch {
	case s.has("module") && s.has("dp"):
		return "", bad("dp", s.vals["dp"], "and module both give the tooth size; keep one")
	case s.has("module"):
		return "module", nil
	case s.has("dp"):
		return "dp", nil
	}
	return "", fault(s.at, "module is missing; give module or dp")
}
