package export

import (
	"bytes"
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// A ContourSpec is a gear's section to be drawn.
type ContourSpec struct {
	Tooth     involute.Tooth
	Tolerance float64 // how far the arcs may leave the exact curves, mm
	Bore      float64 // diameter, mm, 0 for none
	KeyWidth  float64 // mm, 0 for no keyway
	KeyDepth  float64 // beyond the bore's wall, mm
	Unit      inspect.Unit
	Title     string
}

// NewContour draws a gear: its closed contour as arcs, the bore (with its
// keyway in line with a tooth, where the rim is thickest), and tip, reference,
// base, form and root circles for reference. The first tooth points along +x.
func NewContour(s ContourSpec) (Outline, FitReport, error) {
	o := Outline{Unit: s.Unit, Title: s.Title}
	var pieces []involute.Curve
	for _, p := range s.Tooth.Outline().Pieces {
		pieces = append(pieces, p)
	}
	path, report, err := ClosedPath(pieces, s.Tooth.Teeth(), s.Tolerance)
	if err != nil {
		return o, report, err
	}
	o.Contours = append(o.Contours, Contour{LayerCut, path})
	if s.Bore > 0 && s.KeyWidth > 0 {
		o.Contours = append(o.Contours, Contour{LayerBore, BorePath(s)})
	} else if s.Bore > 0 {
		o.Circles = append(o.Circles, Circle{Layer: LayerBore, Radius: s.Bore / 2})
	}
	for _, d := range referenceDiameters(s.Tooth) {
		o.Circles = append(o.Circles, Circle{Layer: LayerReference, Radius: d / 2})
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
	r := s.Bore / 2
	if s.KeyWidth <= 0 {
		return Path{Vertices: []Vertex{{involute.Vec{X: r}, 1}, {involute.Vec{X: -r}, 1}}}
	}
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
	}}.SplitArcs()
}

// A Format is a kind of outline file.
type Format int

// The formats.
const (
	FormatDXF Format = iota // R2000
	FormatDXFR12
	FormatSVG
)

// Ending returns the file name's ending, with its dot.
func (f Format) Ending() string {
	if f == FormatSVG {
		return ".svg"
	}
	return ".dxf"
}

// Encode writes an outline as a file's bytes.
func (f Format) Encode(o Outline) ([]byte, error) {
	var b bytes.Buffer
	var err error
	switch f {
	case FormatDXF:
		err = WriteDXF(&b, o, R2000)
	case FormatDXFR12:
		err = WriteDXF(&b, o, R12)
	case FormatSVG:
		err = WriteSVG(&b, o)
	}
	return b.Bytes(), err
}

// Decode reads an outline back from a file's bytes.
func (f Format) Decode(data []byte) (Outline, error) {
	if f == FormatSVG {
		return ReadSVG(bytes.NewReader(data))
	}
	return ReadDXF(bytes.NewReader(data))
}

// Cut returns the one closed contour on the cut layer.
func (o Outline) Cut() (Path, error) {
	var found []Path
	for _, c := range o.Contours {
		if c.Layer == LayerCut {
			found = append(found, c.Path)
		}
	}
	if len(found) != 1 {
		return Path{}, fmt.Errorf("%d closed contours on layer %s, not 1", len(found), LayerCut)
	}
	return found[0], nil
}
