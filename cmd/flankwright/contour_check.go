package main

import (
	"math"

	"flankwright/export"
	"flankwright/inspect"
	"flankwright/involute"
)

// checkPin returns a pin to measure a contour with: the first choice that rests on the flanks.
func (j *job) checkPin(g *gear) (float64, bool) {
	for _, p := range j.choosePins(g) {
		if _, err := g.middle().Seat(p.Diameter); err == nil {
			return p.Diameter, true
		}
	}
	return 0, false
}

// measureBack reads a file's bytes as anybody would, holds the contour against
// the exact profile, measures it over pins, and refuses a file that is not as it
// should be. reached is how far the arcs may be from the exact curves, as
// certified when they were fitted.
func (j *job) measureBack(g *gear, tooth involute.Tooth, data []byte, o contourOptions, reached float64) (*asWritten, error) {
	section, err := j.readBack(g, data, o)
	if err != nil {
		return nil, err
	}
	w := &asWritten{Teeth: section.Teeth(), Shape: section.Deviation(tooth)}
	if w.Shape > firstOrder*reached+closeEnough {
		return nil, cannot("%s: the contour written is %.4g mm off the exact shape, not %.4g; it is not delivered", called(g), w.Shape, reached)
	}
	pin, ok := j.checkPin(g)
	if !ok {
		return w, nil
	}
	m := inspect.OverPins{Pin: pin}
	usable := len(m.Faults(tooth, inspect.Part{})) == 0
	target, err := m.Of(tooth)
	if err != nil {
		return w, nil
	}
	least, most, err := section.OverPins(pin)
	switch {
	case err != nil && usable:
		return nil, cannot("%s: the contour written cannot be measured: %v; it is not delivered", called(g), err)
	case err != nil:
		return w, nil // a pin that rests on the root first measures no flanks
	}
	over := least
	if math.Abs(most-target) > math.Abs(least-target) {
		over = most
	}
	w.measured(pin, over, target)
	seat, err := tooth.Seat(pin)
	if err != nil {
		return w, nil
	}
	// Each flank off by ε moves a pin's center by ε/sin α_K.
	_, byPin := g.g.PinSensitivity(involute.TwoPins, seat)
	if usable && math.Abs(over-target) > 2*reached*byPin+closeEnough {
		return nil, cannot("%s: the contour written measures %s over pins, not %s; it is not delivered", called(g), j.length(over), j.length(target))
	}
	j.judgeDrift(g, m, w, o)
	return w, nil
}

// readBack decodes a file and takes its contour apart.
func (j *job) readBack(g *gear, data []byte, o contourOptions) (export.Section, error) {
	var none export.Section
	if o.format != export.FormatSVG {
		if problems := export.CheckDXF(data); len(problems) > 0 {
			return none, cannot("%s: the DXF written is not sound: %s", called(g), problems[0])
		}
	}
	back, err := o.format.Decode(data)
	if err != nil {
		return none, cannot("%s: the file written cannot be read back: %v", called(g), err)
	}
	if err := j.measureOpenings(g, back); err != nil {
		return none, err
	}
	path, err := back.Cut()
	if err != nil {
		return none, cannot("%s: the file written holds no contour: %v", called(g), err)
	}
	lead, _ := g.g.Lead()
	section, err := export.NewSection(path, lead)
	if err != nil || section.Teeth() != g.g.Teeth() {
		return none, cannot("%s: the contour written has %d teeth, not %d (%v)", called(g), section.Teeth(), g.g.Teeth(), err)
	}
	return section, nil
}

// judgeDrift says whether the contour is within the limits, and warns where the
// drawing alone takes much of them.
func (j *job) judgeDrift(g *gear, m inspect.OverPins, w *asWritten, o contourOptions) {
	limits := inspect.NewTarget(g.g, m, g.thickness.Limits, inspect.Part{}).Value
	if g.thickness.By == inspect.ByNothing || limits.Width() <= 0 {
		return
	}
	l := toSpan(limits)
	within := *w.OverPins >= l.Min && *w.OverPins <= l.Max
	w.Limits, w.Within = &l, &within
	if drift := math.Abs(*w.Difference); drift > mostDrift*limits.Width() {
		j.addWarning("coarse-contour", g.name, "the arcs alone take %s of the %s between the limits over pins; draw it finer with --tolerance %.4gmm",
			j.length(drift), j.length(limits.Width()), o.tolerance/4)
	}
}

// firstOrder lets the deviation from a fillet, which is right to first order
// only, come out a few percent large.
const firstOrder = 1.05

// mostDrift is the share of the tolerance over pins that a drawing may use up
// before it is said: a quarter leaves the machine most of it.
const mostDrift = 0.25

// closeEnough is what the search for a pin's seat on a contour may be off by, mm.
const closeEnough = 1e-6
