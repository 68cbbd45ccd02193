package export

import (
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// A ContourSpec is a gear's section to be drawn.
type ContourSpec struct {
	Tooth    involute.Tooth
	Fit      FitOptions
	Stock    float64 // left on all round for roughing, mm, 0 for none
	Bore     float64 // diameter, mm, 0 for none
	KeyWidth float64 // mm, 0 for no keyway
	KeyDepth float64 // beyond the bore's wall, mm
	Pin      float64 // diameter of the measuring pins drawn where they rest, mm, 0 for none
	Bolts    BoltCircle
	Hub      float64 // the hub's outside diameter, mm, 0 for none
	Unit     inspect.Unit
	Title    string
}

// NewContour draws a gear: its closed contour as arcs, the bore (with its
// keyway in line with a tooth, where the rim is thickest), bolt circle and hub, and
// tip, reference, base, form and root circles for reference, with measuring pins
// where asked for (see pinCircles). The first tooth points along +x.
func NewContour(s ContourSpec) (Outline, FitReport, error) {
	o := Outline{Unit: s.Unit, Title: s.Title}
	var pitch []involute.Curve
	for _, p := range s.Tooth.Outline().Pieces {
		pitch = append(pitch, p)
	}
	fit := s.Fit
	if s.Stock > 0 && fit.Lines {
		fit.Tolerance /= 2 // the other half is for the arcs about the corners
	}
	path, report, err := closedPath(pitch, s.Tooth.Teeth(), fit)
	if err != nil {
		return o, report, err
	}
	if err := path.Simple(); err != nil {
		return o, report, fmt.Errorf("the teeth are thinner somewhere than the tolerance, and the contour would cross itself: %w", err)
	}
	if s.Stock > 0 {
		if path, err = path.offsetOutward(s.Stock); err != nil {
			return o, report, err
		}
		if fit.Lines {
			path = path.chords(fit.Tolerance)
			report.MaxDeviation += fit.Tolerance
		}
		report.recount(path)
	}
	o.Contours = append(o.Contours, Contour{LayerCut, path})
	o.openings(s)
	for _, d := range referenceDiameters(s.Tooth) {
		o.Circles = append(o.Circles, Circle{Layer: LayerReference, Radius: d / 2})
	}
	if s.Pin > 0 {
		pins, err := pinCircles(s.Tooth, s.Pin, false)
		if err != nil {
			return o, report, err
		}
		o.Circles = append(o.Circles, pins...)
	}
	return o, report, nil
}

// sameCircle is how near two reference circles are drawn as one, mm.
const sameCircle = 1e-6

// referenceDiameters returns the circles worth drawing, largest first, each once.
func referenceDiameters(t involute.Tooth) []float64 {
	var out []float64
	for _, d := range []float64{t.TipDiameter(), t.ReferenceDiameter(), t.FormDiameter(), t.BaseDiameter(), t.RootDiameter()} {
		known := d <= 0
		for _, o := range out {
			known = known || math.Abs(o-d) < sameCircle
		}
		if !known {
			out = append(out, d)
		}
	}
	return out
}

// BorePath returns the bore with its keyway as one closed path: the keyway
// points along +x, its floor at bore/2 + depth. Without a keyway it is the
// circle in two halves.
func BorePath(s ContourSpec) Path {
	if s.KeyWidth <= 0 {
		return circlePath(involute.Vec{}, s.Bore)
	}
	r := s.Bore / 2
	half := s.KeyWidth / 2
	wall := math.Sqrt(r*r - half*half)
	floor := r + s.KeyDepth
	sweep := 2*math.Pi - 2*math.Asin(half/r)
	b := math.Tan(sweep / 4)
	return Path{Vertices: []Vertex{
		{involute.Vec{X: wall, Y: -half}, 0},
		{involute.Vec{X: floor, Y: -half}, 0},
		{involute.Vec{X: floor, Y: half}, 0},
		{involute.Vec{X: wall, Y: half}, b},
	}}.splitArcs()
}
