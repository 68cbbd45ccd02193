package main

import (
	"fmt"
	"math"

	"flankwright/export"
	"flankwright/inspect"
	"flankwright/involute"
)

// asWritten is what a file measures, and what it should. Over pins and span are
// null where they cannot be taken on the flanks, limits where there are none.
type asWritten struct {
	Pin            *float64 `json:"pin_diameter_mm"`
	OverPins       *float64 `json:"over_pins_mm"`
	Target         *float64 `json:"target_mm"`
	Difference     *float64 `json:"difference_mm"`
	Limits         *span    `json:"limits_mm"`
	Within         *bool    `json:"within_limits"`
	SpanTeeth      *int     `json:"span_teeth"`
	Span           *float64 `json:"span_mm"`
	SpanTarget     *float64 `json:"span_target_mm"`
	SpanDifference *float64 `json:"span_difference_mm"`
	Teeth          int      `json:"teeth_counted"`
	Shape          float64  `json:"shape_deviation_mm"`
	ShapeRange     span     `json:"shape_mm"` // inside (≤ 0) and outside of the exact shape, less the stock
	Unevenness     float64  `json:"tooth_to_tooth_mm"`
	Joints         float64  `json:"joints_tooth_to_tooth_mm"`
	LeastRadius    float64  `json:"least_radius_mm"`
	GreatestRadius float64  `json:"greatest_radius_mm"`
	Gap            float64  `json:"closure_gap_mm"`
	TangentBreak   float64  `json:"tangent_break_deg"`
	Corners        int      `json:"corners"`
	Area           float64  `json:"area_mm2"`
	AreaExact      float64  `json:"area_exact_mm2"`
}

// Limits of what a file may be off by.
const (
	// closeEnough is what the search for a pin's seat on a contour may be off by, mm.
	closeEnough = 1e-6
	// shapeRounding is what the decimals of a file and the search for the nearest point may add, mm.
	shapeRounding = 5e-9
	// mostBreak is the sharpest turn at a joint that is no corner, degrees.
	mostBreak = 0.01
	// mostGap is the greatest gap between two pieces, mm: the finest distance at which importers join ends.
	mostGap = 1e-6
	// mostUneven is by how much the teeth of one contour may differ, mm: they are the
	// first one turned, and a file's decimals are far finer.
	mostUneven = 1e-6
	// mostDrift is the share of the tolerance over pins that a drawing may use up
	// before it is said: a quarter leaves the machine most of it.
	mostDrift = 0.25
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

// decode reads a file's bytes as anybody would.
func decode(data []byte, format export.Format) (export.Outline, error) {
	if format != export.FormatSVG {
		if problems := export.CheckDXF(data); len(problems) > 0 {
			return export.Outline{}, fmt.Errorf("is no sound DXF: %s", problems[0])
		}
	}
	back, err := format.Decode(data)
	if err != nil {
		return back, fmt.Errorf("cannot be read: %w", err)
	}
	return back, nil
}

// deliverable measures a contour just drawn and refuses it if it is not what the fit promised.
func (j *job) deliverable(d *drawnGear, path export.Path, o contourOptions) error {
	faults, err := j.measure(d, path, o)
	if err != nil {
		return cannot("%s: the contour written %v; it is not delivered", called(d.gear), err)
	}
	if len(faults) > 0 {
		return cannot("%s: the contour written %s; it is not delivered", called(d.gear), faults[0])
	}
	return nil
}

// measure measures a contour that was read back, and returns what is wrong with it.
// An error says that it is no such gear at all.
func (j *job) measure(d *drawnGear, path export.Path, o contourOptions) (faults []string, err error) {
	lead, _ := d.gear.g.Lead()
	if d.read, err = export.NewSection(path, lead); err != nil {
		return nil, fmt.Errorf("is no gear: %w", err)
	}
	if d.read.Teeth() != d.gear.g.Teeth() {
		return nil, fmt.Errorf("has %d teeth, not %d", d.read.Teeth(), d.gear.g.Teeth())
	}
	w := &asWritten{Teeth: d.read.Teeth()}
	d.AsWritten = w
	least, most := d.read.Deviation(d.tooth)
	w.ShapeRange = span{least - d.Stock, most - d.Stock}
	w.Shape = max(w.ShapeRange.Max, -w.ShapeRange.Min)
	uneven, joints := d.read.Unevenness(), d.read.Joints()
	w.Unevenness, w.Joints = uneven.Shape, uneven.Joints
	w.Gap, w.TangentBreak, w.Corners = joints.Gap, joints.TangentBreakDeg, joints.Corners
	w.LeastRadius, w.GreatestRadius = d.read.Radii()
	w.Area, w.AreaExact = d.read.Area(), d.tooth.Outline().Area()
	faults = j.judgeShape(d, path, o)
	if d.Stock > 0 {
		return faults, nil // there are no flanks to measure yet
	}
	faults = append(faults, j.measurePins(d, o)...)
	return append(faults, j.measureSpan(d)...), nil
}

// judgeShape says what of a contour's shape is not as it should be.
func (j *job) judgeShape(d *drawnGear, path export.Path, o contourOptions) (faults []string) {
	w := d.AsWritten
	low, high := o.fit.Band()
	low, high = max(low, -d.MaxDeviation)-shapeRounding, min(high, d.MaxDeviation)+shapeRounding
	add := func(format string, args ...any) { faults = append(faults, fmt.Sprintf(format, args...)) }
	switch {
	case w.ShapeRange.Max > high:
		add("is up to %s outside of the exact shape, not %s, farthest %s", j.fine(w.ShapeRange.Max), j.fine(max(high, 0)), j.whereWorst(d))
	case w.ShapeRange.Min < low:
		add("is up to %s inside of the exact shape, not %s, farthest %s", j.fine(-w.ShapeRange.Min), j.fine(max(-low, 0)), j.whereWorst(d))
	}
	if err := path.Simple(); err != nil {
		add("crosses itself: %v", err)
	}
	if w.Gap > mostGap {
		add("has a gap of %s between two pieces", j.fine(w.Gap))
	}
	switch {
	case d.Stock == 0 && w.Unevenness > mostUneven:
		add("has teeth that differ by %s", j.fine(w.Unevenness))
	case d.Stock == 0 && w.Joints > mostUneven:
		add("has teeth whose pieces join in different places")
	}
	if d.Stock == 0 && !o.fit.Lines {
		if w.Corners != d.corners {
			add("has %d corners, not %d", w.Corners, d.corners)
		}
		if w.TangentBreak > mostBreak {
			add("breaks by %.4f° between two pieces", w.TangentBreak)
		}
	}
	return faults
}

// openingFaults holds bore, keyway, holes and hub of a file that was read back
// against what they should be. It is for a gear alone: in a mesh they stand turned.
func openingFaults(spec export.ContourSpec, back export.Outline) []string {
	if _, err := spec.CheckOpenings(back); err != nil {
		return []string{err.Error()}
	}
	return nil
}

// whereWorst words where a contour is farthest off, about its own axis with a tooth along x.
func (j *job) whereWorst(d *drawnGear) string {
	p := d.read.Farthest(d.tooth, d.Stock)
	return fmt.Sprintf("at x %s, y %s", j.length(p.X), j.length(p.Y))
}

// measurePins pushes a pin into the spaces, and says where it reads otherwise than
// the formula by more than the fit can do.
func (j *job) measurePins(d *drawnGear, o contourOptions) []string {
	pin, ok := j.checkPin(d.gear)
	if !ok {
		return nil
	}
	m := inspect.OverPins{Pin: pin}
	usable := len(m.Faults(d.tooth, inspect.Part{})) == 0
	target, err := m.Of(d.tooth)
	if err != nil {
		return nil
	}
	least, most, err := d.read.OverPins(pin)
	if err != nil {
		if usable {
			return []string{fmt.Sprintf("cannot be measured over pins: %v", err)}
		}
		return nil // a pin that rests on the root first measures no flanks
	}
	over := farther(least, most, target)
	diff := over - target
	w := d.AsWritten
	w.Pin, w.OverPins, w.Target, w.Difference = &pin, &over, &target, &diff
	j.judgeDrift(d.gear, m, w, o)
	seat, err := d.tooth.Seat(pin)
	if err != nil {
		return nil
	}
	// Each flank off by ε moves a pin's center by ε/sin α_K.
	_, byPin := d.gear.g.PinSensitivity(involute.TwoPins, seat)
	if usable && math.Abs(diff) > 2*d.MaxDeviation*byPin+closeEnough {
		return []string{fmt.Sprintf("measures %s over pins, not %s", j.fine(over), j.fine(target))}
	}
	return nil
}

// measureSpan closes two faces on the contour, and says where they read otherwise than the formula.
func (j *job) measureSpan(d *drawnGear) []string {
	ks := inspect.SpanChoices(d.gear.g, d.gear.thickness.Limits, inspect.Part{})
	if len(ks) == 0 {
		return nil
	}
	m := inspect.Span{Teeth: ks[0]}
	target, err := m.Of(d.tooth)
	if err != nil || len(m.Faults(d.tooth, inspect.Part{})) > 0 {
		return nil
	}
	least, most, err := d.read.Span(m.Teeth, d.tooth.FormDiameter()/2, d.tooth.InvoluteEndDiameter()/2)
	if err != nil {
		return nil // the faces rest on a corner of the drawing; the shape is judged already
	}
	w := d.AsWritten
	got := farther(least, most, target)
	diff := got - target
	w.SpanTeeth, w.Span, w.SpanTarget, w.SpanDifference = &m.Teeth, &got, &target, &diff
	// Each flank is off by the deviation at most, and the faces touch its highest places.
	if math.Abs(diff) > 2*d.MaxDeviation+closeEnough {
		return []string{fmt.Sprintf("measures %s over %d teeth, not %s", j.fine(got), m.Teeth, j.fine(target))}
	}
	return nil
}

// farther returns the one of two readings that is farther from the target.
func farther(a, b, target float64) float64 {
	if math.Abs(b-target) > math.Abs(a-target) {
		return b
	}
	return a
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
		j.addWarning("coarse-contour", g.name, "the drawing alone puts the reading over pins off by %s, where the limits are %s apart; draw it finer with --tolerance %.4gmm",
			j.length(drift), j.length(limits.Width()), o.fit.Tolerance/4)
	}
}
