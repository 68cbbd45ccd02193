package main

import (
	"fmt"
	"slices"

	"flankwright/export"
	"flankwright/inspect"
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
	t := &contourTable{gears: r.gears, unit: r.job.display, digits: digits + 2}
	last := ""
	for _, d := range r.gears {
		t.heads = append(t.heads, d.name)
		if d.File != last {
			p.line("%s", d.File)
			last = d.File
		}
	}
	p.blank()
	r.pieces(t)
	r.measured(t)
	p.grid(t.grid)
	for _, m := range r.Meshes {
		p.blank()
		p.grid(m.grid(t))
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

// A contourTable is a table with a column for each gear.
type contourTable struct {
	grid
	gears  []drawnGear
	unit   inspect.Unit
	digits int
}

func (t *contourTable) fine(mm float64) string { return t.unit.Format(mm, t.digits) }

// each adds a row.
func (t *contourTable) each(label, unit string, cell func(d drawnGear) string) {
	var cells []string
	for _, d := range t.gears {
		cells = append(cells, cell(d))
	}
	t.row(label, unit, cells...)
}

func (t *contourTable) count(label string, pick func(d drawnGear) int) {
	t.each(label, "", func(d drawnGear) string { return fmt.Sprint(pick(d)) })
}

func (t *contourTable) length(label string, pick func(d drawnGear) float64) {
	t.each(label, t.unit.String(), func(d drawnGear) string { return t.fine(pick(d)) })
}

// maybe adds a row of lengths that not every gear has.
func (t *contourTable) maybe(label string, pick func(w *asWritten) *float64) {
	t.each(label, t.unit.String(), func(d drawnGear) string {
		if v := pick(d.AsWritten); v != nil {
			return t.fine(*v)
		}
		return "-"
	})
}

// any reports whether it holds of one of the gears.
func (t *contourTable) any(holds func(d drawnGear) bool) bool {
	return slices.ContainsFunc(t.gears, holds)
}

// pieces adds what the contours are made of.
func (r *contours) pieces(t *contourTable) {
	t.count("Pieces", func(d drawnGear) int { return d.Segments })
	t.count("  arcs", func(d drawnGear) int { return d.Arcs })
	t.count("  lines", func(d drawnGear) int { return d.Lines })
	t.count("  on one flank", func(d drawnGear) int { return d.ArcsPerFlank })
	t.each("  straight lines would need", "", func(d drawnGear) string {
		if d.LinesNeeded == 0 {
			return "-" // the tolerance is too coarse for any
		}
		return fmt.Sprint(d.LinesNeeded)
	})
	t.length("Greatest deviation of the fit from the exact shape", func(d drawnGear) float64 { return d.MaxDeviation })
	t.length("  allowed", func(d drawnGear) float64 { return d.Tolerance })
	if t.any(func(d drawnGear) bool { return d.Side != export.Both.String() }) {
		t.each("  to the side", "", func(d drawnGear) string { return d.Side })
	}
	t.each("Largest tangent break", "deg", func(d drawnGear) string { return fmt.Sprintf("%.4f", d.TangentBreak) })
	if t.any(func(d drawnGear) bool { return d.Arcs > 0 }) {
		t.length("Shortest arc", func(d drawnGear) float64 { return d.ShortestArc })
		t.length("Smallest radius", func(d drawnGear) float64 { return d.Radius.Min })
		t.length("Largest radius", func(d drawnGear) float64 { return d.Radius.Max })
		t.each("Smallest hollow radius, to be followed by a cutter", t.unit.String(), func(d drawnGear) string {
			if d.Hollow == nil {
				return "-"
			}
			return t.fine(*d.Hollow)
		})
	}
	if t.any(func(d drawnGear) bool { return d.Stock > 0 }) {
		t.length("Stock left on", func(d drawnGear) float64 { return d.Stock })
	}
	t.length("Tooth thickness drawn, normal", func(d drawnGear) float64 { return d.Thickness })
}

// measured adds what was measured on the files: the shape, over pins, and over a span.
func (r *contours) measured(t *contourTable) {
	t.section("Measured on the file")
	t.length("Greatest deviation found, at points of every piece", func(d drawnGear) float64 { return d.AsWritten.Shape })
	if t.any(func(d drawnGear) bool { return d.AsWritten.Pin != nil }) {
		t.maybe("Over two "+kinds(r.gears)+" of diameter", func(w *asWritten) *float64 { return w.Pin })
		t.maybe("  target", func(w *asWritten) *float64 { return w.Target })
		t.maybe("  as written", func(w *asWritten) *float64 { return w.OverPins })
		t.maybe("  difference", func(w *asWritten) *float64 { return w.Difference })
		t.each("  within the limits", "", func(d drawnGear) string {
			if d.AsWritten.Within == nil {
				return "no limits"
			}
			return yesNo(*d.AsWritten.Within)
		})
	}
	if t.any(func(d drawnGear) bool { return d.AsWritten.SpanTeeth != nil }) {
		t.each("Span over teeth", "", func(d drawnGear) string {
			if d.AsWritten.SpanTeeth == nil {
				return "-"
			}
			return fmt.Sprint(*d.AsWritten.SpanTeeth)
		})
		t.maybe("  target", func(w *asWritten) *float64 { return w.SpanTarget })
		t.maybe("  as written", func(w *asWritten) *float64 { return w.Span })
		t.maybe("  difference", func(w *asWritten) *float64 { return w.SpanDifference })
	}
	t.length("Root radius", func(d drawnGear) float64 { return d.AsWritten.LeastRadius })
	t.length("Tip radius", func(d drawnGear) float64 { return d.AsWritten.GreatestRadius })
	t.length("Greatest gap between pieces", func(d drawnGear) float64 { return d.AsWritten.Gap })
	t.length("Teeth differ by up to", func(d drawnGear) float64 { return d.AsWritten.Unevenness })
	square := t.unit.MM() * t.unit.MM()
	area := func(label string, pick func(w *asWritten) float64) {
		t.each(label, t.unit.String()+"²", func(d drawnGear) string { return fmt.Sprintf("%.4f", pick(d.AsWritten)/square) })
	}
	area("Area", func(w *asWritten) float64 { return w.Area })
	if !t.any(func(d drawnGear) bool { return d.Stock > 0 }) {
		area("  of the exact shape", func(w *asWritten) float64 { return w.AreaExact })
	}
}

// grid shows what the two contours of a mesh do when they roll together.
func (m rolledMesh) grid(t *contourTable) grid {
	g := grid{heads: []string{"as drawn", "exact teeth"}}
	unit, fine := t.unit.String(), t.fine
	g.section(m.Gears[0] + " and " + m.Gears[1] + ", rolled through one pitch at center distance " + fine(m.Center))
	w, aim := m.AsWritten, m.Target
	g.row("Backlash, circumferential, least", unit, fine(w.Backlash.Min), fine(aim.Backlash))
	g.row("  most", unit, fine(w.Backlash.Max), fine(aim.Backlash))
	g.row("Transmission error by the arcs, along the line of action", unit, fine(w.Transmission), fine(0))
	g.row("Least clearance between flanks, teeth centered", unit, fine(w.Flank), "")
	g.row("Tip clearance of "+m.Gears[0], unit, fine(w.Tip.First), fine(aim.Tip.First))
	g.row("  of "+m.Gears[1], unit, fine(w.Tip.Second), fine(aim.Tip.Second))
	g.row("The teeth overlap", "", yesNo(w.Interferes), yesNo(aim.Backlash < -barelyNegative))
	return g
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
