package main

import (
	"math"
	"strings"

	"flankwright/export"
	"flankwright/involute"
)

// A drawnGear is a contour with what was found on reading it back.
type drawnGear struct {
	File          string     `json:"file"`
	Segments      int        `json:"segments"`
	Arcs          int        `json:"arcs"`
	Lines         int        `json:"lines"`
	ArcsPerFlank  int        `json:"pieces_per_flank"`
	ArcsPerFillet int        `json:"pieces_per_fillet"`
	MaxDeviation  float64    `json:"max_deviation_mm"`
	Deviation     span       `json:"deviation_mm"` // to the inside (≤ 0) and to the outside
	Tolerance     float64    `json:"tolerance_mm"`
	Side          string     `json:"tolerance_side"`
	Stock         float64    `json:"stock_mm"`
	TangentBreak  float64    `json:"max_tangent_break_deg"`
	ShortestArc   float64    `json:"shortest_arc_mm"`
	Radius        span       `json:"radius_mm"`
	Hollow        *float64   `json:"least_hollow_radius_mm"` // null where nothing is hollow, 0 at a hollow corner
	LinesNeeded   int        `json:"lines_for_the_same_tolerance"`
	Thickness     float64    `json:"tooth_thickness_mm"`
	Section       string     `json:"section"`
	AsWritten     *asWritten `json:"as_written"`

	name    string
	kind    string
	gear    *gear
	tooth   involute.Tooth
	corners int
	read    export.Section // the contour as read back
}

// draw makes the contour files of gears: drawn at the middle of the thickness
// limits, encoded, read back and measured.
func (j *job) draw(gears []*gear, o contourOptions) ([]drawnGear, []export.File, error) {
	var drawn []drawnGear
	var files []export.File
	for _, g := range gears {
		d, data, err := j.drawOne(g, o)
		if err != nil {
			return nil, nil, err
		}
		drawn = append(drawn, d)
		files = append(files, export.File{Name: g.name + o.format.Ending(), Data: data})
	}
	return drawn, files, nil
}

func (j *job) drawOne(g *gear, o contourOptions) (drawnGear, []byte, error) {
	spec := j.contourSpec(g, o)
	outline, report, err := export.NewContour(spec)
	if err != nil {
		return drawnGear{}, nil, j.cannotDraw(g, o, err)
	}
	data, err := o.format.Encode(outline)
	if err != nil {
		return drawnGear{}, nil, cannot("%s: %v", called(g), err)
	}
	d := newDrawnGear(g, report, o)
	back, err := decode(data, o.format)
	if err != nil {
		return d, nil, cannot("%s: the file written %v; it is not delivered", called(g), err)
	}
	if faults := openingFaults(spec, back); len(faults) > 0 {
		return d, nil, cannot("%s: the file written is wrong, %s; it is not delivered", called(g), faults[0])
	}
	path, err := back.Cut()
	if err != nil {
		return d, nil, cannot("%s: the file written holds no contour: %v; it is not delivered", called(g), err)
	}
	j.warnDrawn(&d, o)
	return d, data, j.deliverable(&d, path, o)
}

// warnDrawn says what of the contour may surprise at the machine.
func (j *job) warnDrawn(d *drawnGear, o contourOptions) {
	if o.fit.MinArc > 0 && d.ShortestArc < o.fit.MinArc && d.Arcs > 0 {
		j.addWarning("short-arcs", d.name, "arcs of %s are left, shorter than the %s asked for: the outline's own lands and roundings are that short, or the tolerance needs them",
			j.length(d.ShortestArc), j.length(o.fit.MinArc))
	}
	mill := d.gear.g.Spec().Mill.Diameter
	switch {
	case o.stock > 0 && d.Hollow != nil && *d.Hollow == 0:
		j.addWarning("stock-corners", d.name, "with %s left on, the tooth spaces close toward the root: the contour turns sharp there, and no cutter follows it into the corner", j.length(o.stock))
	case o.stock > 0 && mill > 0 && d.Hollow != nil && *d.Hollow < mill/2:
		j.addWarning("stock-corners", d.name, "with %s left on, the roots are hollow by a radius of %s: the end mill of %s does not follow the rough contour, one of %s would",
			j.length(o.stock), j.length(*d.Hollow), j.length(mill), j.length(2**d.Hollow))
	}
}

// cannotDraw words why a contour cannot be drawn.
func (j *job) cannotDraw(g *gear, o contourOptions, err error) error {
	return wrong("%s cannot be drawn within %s: %v", called(g), j.fine(o.fit.Tolerance), err)
}

// fine words a small length with two digits more than usual.
func (r request) fine(mm float64) string {
	return r.display.Format(mm, r.display.Decimals()+2) + " " + r.display.String()
}

// newDrawnGear says what the fit promises.
func newDrawnGear(g *gear, report export.FitReport, o contourOptions) drawnGear {
	tooth := g.middle()
	d := drawnGear{
		Segments: report.Segments, Arcs: report.Arcs, Lines: report.Lines,
		ArcsPerFlank: report.ArcsPerFlank, ArcsPerFillet: report.ArcsPerFillet,
		MaxDeviation: report.MaxDeviation, Deviation: span{report.MaxInside, report.MaxOutside},
		Tolerance: o.fit.Tolerance, Side: o.fit.Side.String(), Stock: o.stock, TangentBreak: report.MaxTangentBreakDeg,
		ShortestArc: report.ShortestArc, Radius: span{report.MinRadius, report.MaxRadius}, LinesNeeded: report.LinesNeeded,
		Thickness: tooth.Thickness(), Section: "full", name: g.name, kind: "pins", gear: g, tooth: tooth, corners: report.Corners,
	}
	d.hollow(report.MinHollow)
	if g.g.Helical() {
		d.Section, d.kind = "transverse", "balls"
	}
	return d
}

// hollow notes the smallest hollow radius, where anything is hollow.
func (d *drawnGear) hollow(radius float64) {
	d.Hollow = nil
	if !math.IsInf(radius, 1) {
		d.Hollow = &radius
	}
}

// contourSpec says what to draw of a gear. The bore is drawn at the middle of its
// limits, a keyway at its nominal size.
func (j *job) contourSpec(g *gear, o contourOptions) export.ContourSpec {
	title, _, _ := j.top.word("title")
	s := export.ContourSpec{Tooth: g.middle(), Fit: o.fit, Stock: o.stock, Unit: j.display, Title: strings.TrimPrefix(title+", "+g.name, ", ")}
	s.Bolts, s.Hub = g.bolts.layout(), g.hub
	if g.bore != nil {
		s.Bore = g.bore.limits.Middle()
	}
	if g.keyway != nil {
		s.KeyWidth, s.KeyDepth = g.keyway.width, g.keyway.drawn
	}
	if pin, ok := j.checkPin(g); ok && o.pins {
		s.Pin = pin
	}
	return s
}
