package main

import "fmt"

// contours is the result of the command, as JSON writes it.
type contours struct {
	Gears    ordered       `json:"gears"`
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
	for _, d := range r.gears {
		g.heads = append(g.heads, d.name)
		p.line("%s", d.File)
	}
	p.blank()
	each("Pieces", "", func(d drawnGear) string { return fmt.Sprint(d.Segments) })
	each("  arcs", "", func(d drawnGear) string { return fmt.Sprint(d.Arcs) })
	each("  lines", "", func(d drawnGear) string { return fmt.Sprint(d.Lines) })
	each("  straight lines would need", "", func(d drawnGear) string { return fmt.Sprint(d.LinesNeeded) })
	each("Greatest deviation from the exact curve", u.String(), func(d drawnGear) string { return fine(d.MaxDeviation) })
	each("  allowed", u.String(), func(d drawnGear) string { return fine(d.Tolerance) })
	each("Largest tangent break", "deg", func(d drawnGear) string { return fmt.Sprintf("%.4f", d.TangentBreak) })
	each("Shortest arc", u.String(), func(d drawnGear) string { return fine(d.ShortestArc) })
	each("Smallest radius", u.String(), func(d drawnGear) string { return fine(d.Radius.Min) })
	each("Tooth thickness drawn, normal", u.String(), func(d drawnGear) string { return fine(d.Thickness) })
	r.measured(&g, each, u.String(), fine)
	p.grid(g)
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

// measured adds what was measured on the files: the shape, and over pins.
func (r *contours) measured(g *grid, each func(label, unit string, cell func(drawnGear) string), unit string, fine func(float64) string) {
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
		if d.AsWritten.OverPins == nil {
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
