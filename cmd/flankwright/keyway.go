package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// A keyway is a keyway in a gear's bore, all in mm. Across is what is measured:
// from the wall of the bore to the bottom of the keyway.
type keyway struct {
	width, depth float64 // depth beyond the bore's wall, nominal
	tolerance    float64 // how much deeper it may be; it may not be less deep
	across       inspect.Limits
	drawn        float64         // depth as drawn: the least across, in a bore in the middle of its limits
	deepest      float64         // of the bottom, from the axis
	table        *refdata.Keyway // nil where the size is the job's
	inch         bool            // the table is the inch one
}

// reach returns how far the keyway's corners lie from the axis at most, mm.
func (k keyway) reach() float64 { return math.Hypot(k.deepest, k.width/2) }

// Words that name the standards of keyways in a job.
const (
	autoMetric = "auto DIN 6885-1"
	autoInch   = "auto ASME B17.1"
)

func (j *job) readKeyway(g *gear) error {
	v, ok := g.settings.vals["keyway"]
	if !ok {
		return nil
	}
	if g.bore == nil {
		return bad("keyway", v, "needs a bore to be cut into")
	}
	inch, auto, err := j.autoKeyway(v)
	if err != nil {
		return err
	}
	if auto {
		return j.tableKeyway(g, v, inch)
	}
	w, d, err := g.settings.keywaySize(v)
	if err != nil {
		return err
	}
	b := g.bore.limits
	if w >= b.Min {
		return bad("keyway", v, "is %s wide, and the bore only %s", j.length(w), j.length(b.Min))
	}
	g.keyway = &keyway{width: w, depth: d, across: inspect.Limits{Min: b.Min + d, Max: b.Max + d}, drawn: d, deepest: b.Max/2 + d}
	return nil
}

// autoKeyway reports whether a keyway is left to a standard, and whether to the
// inch one: the one that is named, else the one of the job's units.
func (j *job) autoKeyway(v value) (inch, auto bool, err error) {
	text, _ := asText(v)
	words := strings.Fields(text)
	if len(words) == 0 || !strings.EqualFold(words[0], "auto") {
		return false, false, nil
	}
	switch said := strings.Join(words, " "); {
	case len(words) == 1:
		return j.jobUnit == inspect.Inch, true, nil
	case strings.EqualFold(said, autoMetric):
		return false, true, nil
	case strings.EqualFold(said, autoInch):
		return true, true, nil
	}
	return false, true, bad("keyway", v, "%q names no standard that is known; write %q (by the job's units), %q or %q", text, "auto", autoMetric, autoInch)
}

// tableKeyway takes a keyway from a standard. Its sizes are for the nominal
// bore, and across the bore is toleranced as the standard says, whatever limits
// the bore has.
func (j *job) tableKeyway(g *gear, v value, inch bool) error {
	var k refdata.Keyway
	var err error
	if inch {
		k, err = refdata.InchKeyway(g.bore.nominal / inspect.Inch.MM())
	} else {
		k, err = refdata.MetricKeyway(g.bore.nominal)
	}
	if err != nil {
		return bad("keyway", v, "%v", err)
	}
	b := g.bore.limits
	across := inspect.Limits{Min: k.AcrossBore, Max: k.AcrossBore + k.DepthTolerance}
	if k.Width >= b.Min || across.Min <= b.Max {
		return bad("keyway", v, "of %s for a bore of %s does not fit its limits, %s to %s; give width and depth instead",
			k.Source.Standard, j.length(g.bore.nominal), j.length(b.Min), j.length(b.Max))
	}
	g.keyway = &keyway{width: k.Width, depth: k.HubDepth, tolerance: k.DepthTolerance, across: across,
		drawn: across.Min - b.Middle(), deepest: across.Max - b.Min/2, table: &k, inch: inch}
	return nil
}

// keySize words the key that a keyway of a standard is for, in the standard's unit: "8 × 7 mm".
func (k keyway) keySize() string {
	u := inspect.Millimeter
	if k.inch {
		u = inspect.Inch
	}
	return fmt.Sprintf("%s × %s %s", trim("%.5f", k.table.Width/u.MM()), trim("%.5f", k.table.Height/u.MM()), u)
}

// keywaySize reads a keyway's width and depth from a table or from "4x1.8mm".
func (s settings) keywaySize(v value) (w, d float64, err error) {
	if text, isText := asText(v); isText {
		width, depth, ok := strings.Cut(strings.NewReplacer("×", "x", "X", "x").Replace(text), "x")
		unit := inspect.UnitOf(depth, s.bare(v)) // a unit at the end covers both
		w, err1 := inspect.ParseLength(width, unit)
		d, err2 := inspect.ParseLength(depth, unit)
		if !ok || err1 != nil || err2 != nil || w <= 0 || d <= 0 {
			return 0, 0, bad("keyway", v, "%q is not a keyway; write auto, or width x depth, such as 4x1.8mm", text)
		}
		return w, d, nil
	}
	t, isTable := v.content.(*table)
	if !isTable {
		return 0, 0, bad("keyway", v, "needs \"auto\" or { width = …, depth = … }")
	}
	sub, err := s.inline("keyway", t)
	if err != nil {
		return 0, 0, err
	}
	w, hasW, err := sub.positive("width")
	if err != nil {
		return 0, 0, err
	}
	d, hasD, err := sub.positive("depth")
	if err == nil && !(hasW && hasD) {
		err = bad("keyway", v, "needs both width and depth (depth beyond the bore's wall)")
	}
	return w, d, err
}
