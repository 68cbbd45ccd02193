package main

import (
	"fmt"

	"flankwright/export"
)

// contours is the result of the command, as JSON writes it.
type contours struct {
	Gears    ordered       `json:"gears"`
	Meshes   []rolledMesh  `json:"meshes"`
	Warnings []warning     `json:"warnings"`
	Explain  []explanation `json:"explain,omitempty"`
	job      *job
	gears    []drawnGear
}

// text prints the contours: file, pieces, deviation, measured against target.
func (r *contours) text(p *page, digits int) []byte {
	u := r.job.display
	fine := func(mm float64) string { return u.Format(mm, digits+2) }
	g := grid{}
	each := func(label, unit string, cell func(d drawnGear) string) {
		var cells []string
		for _, d := range r.gears {
			cells = append(cells, cell(d))
		}
		g.row(label, unit, cells...)
	}
	last := ""
	for _, d := range r.gears {
		g.heads = append(g.heads, d.name)
		if file := d.File; file != last {
			p.line("%s", file)
			last = file
		}
	}
	p.blank()
	number := func(label string, pick func(d drawnGear) int) {
		each(label, "", func(d drawnGear) string { return fmt.Sprint(pick(d)) })
	}
	length := func(label string, pick func(d drawnGear) float64) {
		each(label, u.String(), func(d drawnGear) string { return fine(pick(d)) })
	}
	number("Pieces", func(d drawnGear) int { return d.Segments })
	number("  arcs", func(d drawnGear) int { return d.Arcs })
	number("  lines", func(d drawnGear) int { return d.Lines })
	number("  on one flank", func(d drawnGear) int { return d.ArcsPerFlank })
	each("  straight lines would need", "", func(d drawnGear) string {
		if d.LinesNeeded == 0 {
			return "-" // the tolerance is too coarse for any
		}
		return fmt.Sprint(d.LinesNeeded)
	})
	length("Greatest deviation from the exact curve", func(d drawnGear) float64 { return d.MaxDeviation })
	each("  allowed", u.String(), func(d drawnGear) string { return fine(d.Tolerance) })
	if r.oneSided() {
		each("  to the side", "", func(d drawnGear) string { return d.Side })
	}
	each("Largest tangent break", "deg", func(d drawnGear) string { return fmt.Sprintf("%.4f", d.TangentBreak) })
	if r.arcs() {
		length("Shortest arc", func(d drawnGear) float64 { return d.ShortestArc })
		length("Smallest radius", func(d drawnGear) float64 { return d.Radius.Min })
		length("Largest radius", func(d drawnGear) float64 { return d.Radius.Max })
	}
	if r.rough() {
		length("Stock left on", func(d drawnGear) float64 { return d.Stock })
	}
	length("Tooth thickness drawn, normal", func(d drawnGear) float64 { return d.Thickness })
	r.measured(&g, each, u.String(), fine)
	p.grid(g)
	for _, m := range r.Meshes {
		p.blank()
		p.grid(m.grid(u.String(), fine))
	}
	for _, d := range r.gears {
		if d.Section == "transverse" {
			p.blank()
			p.wrapped(fmt.Sprintf("%s is helical: the contour is its transverse section, square to the axis. It is good for a look, for templates and for laying out; cut straight through it makes a spur gear, not this one.", d.name), "  ")
		}
	}
	p.explanations(r.Explain)
	p.warnings(r.Warnings)
	return []byte(p.b.String())
}

// oneSided reports whether a tolerance was to one side.
func (r *contours) oneSided() bool {
	for _, d := range r.gears {
		if d.Side != export.Both.String() {
			return true
		}
	}
	return false
}

// arcs reports whether there are arcs at all.
func (r *contours) arcs() bool {
	for _, d := range r.gears {
		if d.Arcs > 0 {
			return true
		}
	}
	return false
}

// rough reports whether stock was left on.
func (r *contours) rough() bool {
	for _, d := range r.gears {
		if d.Stock > 0 {
			return true
		}
	}
	return false
}

// grid shows what the two contours of a mesh do when they roll together.
func (m rolledMesh) grid(unit string, fine func(float64) string) grid {
	g := grid{heads: []string{"as drawn", "exact teeth"}}
	g.section(m.Gears[0] + " and " + m.Gears[1] + ", rolled through one pitch at center distance " + fine(m.Center))
	w, t := m.AsWritten, m.Target
	g.row("Backlash, circumferential, least", unit, fine(w.Backlash.Min), fine(t.Backlash))
	g.row("  most", unit, fine(w.Backlash.Max), fine(t.Backlash))
	g.row("Transmission error by the arcs, peak to peak", unit, fine(w.Transmission), fine(0))
	g.row("Least clearance between flanks, teeth centered", unit, fine(w.Flank), "")
	g.row("Tip clearance of "+m.Gears[0], unit, fine(w.Tip.First), fine(t.Tip.First))
	g.row("  of "+m.Gears[1], unit, fine(w.Tip.Second), fine(t.Tip.Second))
	g.row("The teeth overlap", "", yesNo(w.Interferes), yesNo(t.Backlash < 0))
	return g
}

// measured adds what was measured on the files: the shape, over pins, and over a span.
func (r *contours) measured(g *grid, each func(label, unit string, cell func(drawnGear) string), unit string, fine func(float64) string) {
	square := r.job.display.MM() * r.job.display.MM()
	g.section("Measured on the file")
	each("Greatest deviation from the exact shape", unit, func(d drawnGear) string { return fine(d.AsWritten.Shape) })
	number := func(label string, pick func(w *asWritten) *float64) {
		each(label, unit, func(d drawnGear) string {
			if v := pick(d.AsWritten); v != nil {
				return fine(*v)
			}
			return "-"
		})
	}
	if r.any(func(w *asWritten) bool { return w.Pin != nil }) {
		number("Over two "+kinds(r.gears)+" of diameter", func(w *asWritten) *float64 { return w.Pin })
		number("  target", func(w *asWritten) *float64 { return w.Target })
		number("  as written", func(w *asWritten) *float64 { return w.OverPins })
		number("  difference", func(w *asWritten) *float64 { return w.Difference })
		each("  within the limits", "", func(d drawnGear) string {
			if d.AsWritten.Within == nil {
				return "no limits"
			}
			return yesNo(*d.AsWritten.Within)
		})
	}
	if r.any(func(w *asWritten) bool { return w.SpanTeeth != nil }) {
		each("Span over teeth", "", func(d drawnGear) string {
			if d.AsWritten.SpanTeeth == nil {
				return "-"
			}
			return fmt.Sprint(*d.AsWritten.SpanTeeth)
		})
		number("  target", func(w *asWritten) *float64 { return w.SpanTarget })
		number("  as written", func(w *asWritten) *float64 { return w.Span })
		number("  difference", func(w *asWritten) *float64 { return w.SpanDifference })
	}
	always := func(label, unit string, show func(w *asWritten) string) {
		each(label, unit, func(d drawnGear) string { return show(d.AsWritten) })
	}
	always("Least radius", unit, func(w *asWritten) string { return fine(w.LeastRadius) })
	always("Greatest radius", unit, func(w *asWritten) string { return fine(w.GreatestRadius) })
	always("Greatest gap between pieces", unit, func(w *asWritten) string { return fine(w.Gap) })
	always("Tooth to tooth", unit, func(w *asWritten) string { return fine(w.Unevenness) })
	always("Area", unit+"²", func(w *asWritten) string { return fmt.Sprintf("%.4f", w.Area/square) })
	always("  of the exact shape", unit+"²", func(w *asWritten) string { return fmt.Sprintf("%.4f", w.AreaExact/square) })
}

// any reports whether something was measured on one of the files.
func (r *contours) any(has func(w *asWritten) bool) bool {
	for _, d := range r.gears {
		if has(d.AsWritten) {
			return true
		}
	}
	return false
}

func kinds(gears []drawnGear) string {
	for _, d := range gears {
		if d.kind != gears[0].kind {
			return "pins or balls"
		}
	}
	return gears[0].kind
}

// explainContours explains the target that a contour is measured against.
func explainContours(drawn []drawnGear) []explanation {
	var all []explanation
	for _, d := range drawn {
		if d.AsWritten == nil || d.AsWritten.OverPins == nil {
			continue
		}
		e := &explainer{about: d.name}
		explainPins(e, d.tooth, pinTarget{Pin: *d.AsWritten.Pin, Kind: d.kind})
		e.result("difference of the contour as written", "Δ = M_w - M", mm("Δ", *d.AsWritten.Difference), "measured on the arcs of the file",
			mm("M_w", *d.AsWritten.OverPins), mm("M", *d.AsWritten.Target))
		all = append(all, e.list...)
	}
	return all
}
