package export

import (
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// plates are outlines of plates, with pieces of every kind on few square centimeters.
func plates() map[string]Outline {
	wheel := Outline{Title: "wheel", Circles: []Circle{{LayerBore, involute.Vec{}, 6}, {LayerReference, involute.Vec{}, 44}}}
	var p Path
	for k := range 40 { // bumps and hollows in turn, as many pieces as a real gear
		turn := 2 * math.Pi * float64(k) / 40
		for i, b := range []float64{0.02, 0.3, 0.02, -0.35} {
			r := 40 + 5*float64((i+1)/2%2)
			p.Vertices = append(p.Vertices, Vertex{involute.Polar(r, turn+2*math.Pi/160*float64(i)), b})
		}
	}
	wheel.Contours = []Contour{{LayerCut, p}}
	return map[string]Outline{
		"cam_mm": cam(inspect.Millimeter), "cam_in": cam(inspect.Inch), "wheel": wheel,
		"disk": {Contours: []Contour{{LayerCut, vertices(30, 20, 1, 10, 20, 1)}}},
	}
}

// fitted returns a gear's drawing and how far its arcs leave the exact shape.
func fitted(t *testing.T, s ContourSpec) (Outline, FitReport) {
	t.Helper()
	o, report, err := NewContour(s)
	if err != nil {
		t.Fatal(err)
	}
	return o, report
}

// outsideOutlines are the outlines that outside readers are given: the plates,
// and gears small and large, undercut, with plain and keyed bores, in both units.
func outsideOutlines(t *testing.T) map[string]Outline {
	t.Helper()
	all := plates()
	for name, s := range map[string]ContourSpec{
		"keyed":    {Tooth: tooth(t, involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.05), Fit: FitOptions{Tolerance: 0.0025}, Bore: 14, KeyWidth: 5, KeyDepth: 2.3},
		"bored":    {Tooth: tooth(t, involute.Spec{Teeth: 17, Module: 3, Shift: 0.3, Rack: isoA()}, 0.05), Fit: FitOptions{Tolerance: 0.005}, Bore: 20},
		"undercut": {Tooth: tooth(t, involute.Spec{Teeth: 8, Module: 2, Rack: isoA()}, 0.04), Fit: FitOptions{Tolerance: 0.001}, Bore: 5},
		"many":     {Tooth: tooth(t, involute.Spec{Teeth: 200, Module: 0.5, Rack: isoA()}, 0.02), Fit: FitOptions{Tolerance: 0.001}, Bore: 25},
		"tiny":     {Tooth: tooth(t, involute.Spec{Teeth: 20, Module: 0.1, Rack: isoA()}, 0.003), Fit: FitOptions{Tolerance: 0.0002}, Bore: 0.6},
		"inch": {Tooth: tooth(t, involute.Spec{Teeth: 18, Module: 25.4 / 8, TipChamfer: 0.2, Rack: fullRadius()}, 0.1), Fit: FitOptions{Tolerance: 0.0025},
			Bore: 25.4, KeyWidth: 6.35, KeyDepth: 3.2, Unit: inspect.Inch},
		"rough": {Tooth: tooth(t, involute.Spec{Teeth: 20, Module: 2, Rack: isoA()}, 0), Fit: FitOptions{Tolerance: 0.0025}, Stock: 0.4},
		"lines": {Tooth: tooth(t, involute.Spec{Teeth: 15, Module: 2, Shift: 0.2, Rack: isoA()}, 0), Fit: FitOptions{Tolerance: 0.01, Lines: true}},
		"milled": {Tooth: tooth(t, involute.Spec{Teeth: 16, Module: 2, Shift: 0.3, Rack: isoA(), TipRound: 0.2, Mill: involute.MillSpec{Diameter: 1.2}}, 0.04),
			Fit: FitOptions{Tolerance: 0.0025, Side: Outside}, Bore: 12, KeyWidth: 4, KeyDepth: 1.8, Pin: 3.5},
		"relieved": {Tooth: tooth(t, involute.Spec{Teeth: 40, Module: 2, Rack: isoA(), Relief: involute.ReliefSpec{Amount: 0.02, Start: 82}}, 0.04),
			Fit: FitOptions{Tolerance: 0.0025, Side: Inside}, Bore: 25, Bolts: BoltCircle{Diameter: 50, Holes: 5, Hole: 6, Start: 0.1}, Hub: 40},
	} {
		s.Title = name
		all[name], _ = fitted(t, s)
	}
	pair, _, err := NewMeshContour(MeshSpec{Center: 35,
		First:  ContourSpec{Tooth: tooth(t, involute.Spec{Teeth: 14, Module: 2, Rack: isoA()}, 0.05), Fit: FitOptions{Tolerance: 0.0025}, Bore: 8, KeyWidth: 3, KeyDepth: 1.4},
		Second: ContourSpec{Tooth: tooth(t, involute.Spec{Teeth: 21, Module: 2, Rack: isoA()}, 0.05), Fit: FitOptions{Tolerance: 0.0025}, Bore: 10, Pin: 3.5}})
	if err != nil {
		t.Fatal(err)
	}
	all["pair"] = pair

	// A plate with holes of any shape, on both layers that are cut, some of them clockwise.
	slots := Outline{Contours: []Contour{{LayerCut, vertices(-50, -40, 0, 50, -40, 0, 50, 40, 0.3, -50, 40, 0)}}}
	for k := range 6 {
		x := -40 + 14*float64(k)
		slots.Contours = append(slots.Contours,
			Contour{[]Layer{LayerBore, LayerCut}[k%2], vertices(x, -20, -1, x, 10, 0, x+6, 10, -1, x+6, -20, 0)},
			Contour{LayerBore, circlePath(involute.Vec{X: x, Y: 30}, 7)})
	}
	all["slots"] = slots

	// Circles alone, none of them alike.
	var holes Outline
	for k := range 60 {
		layer := []Layer{LayerCut, LayerBore, LayerReference}[k%3]
		holes.Circles = append(holes.Circles, Circle{layer, involute.Polar(5+float64(k), float64(k)), 1 + float64(k)/7})
	}
	all["holes"] = holes
	return all
}

// A dxfFile is an outline written as DXF, and what the file holds, in its unit.
type dxfFile struct {
	name, path string
	version    Format
	outline    Outline
}

// dxfFiles writes each outline in both versions, each to a file of its own.
func dxfFiles(t *testing.T) []dxfFile {
	t.Helper()
	dir := t.TempDir()
	var files []dxfFile
	for name, o := range outsideOutlines(t) {
		f, err := o.fileForm()
		if err != nil {
			t.Fatal(err)
		}
		for _, v := range []Format{FormatDXF, FormatDXFR12} {
			file := dxfFile{name + "_" + v.String(), filepath.Join(dir, name+"_"+v.String()+".dxf"), v, f}
			if err := os.WriteFile(file.path, dxfBytes(t, o, v), 0o644); err != nil {
				t.Fatal(err)
			}
			files = append(files, file)
		}
	}
	return files
}

// paths returns where the files are.
func paths(files []dxfFile) []string {
	var out []string
	for _, f := range files {
		out = append(out, f.path)
	}
	return out
}

// Numbers in a file lie within half of the twelfth decimal.
const written = 0.6e-12

// near reports whether all pairs of numbers lie within slack.
func near(slack float64, pairs ...float64) bool {
	for i := 0; i+1 < len(pairs); i += 2 {
		if !(math.Abs(pairs[i]-pairs[i+1]) <= slack) {
			return false
		}
	}
	return true
}

// strays returns how far a point lies off a line or an arc of up to 180°.
func strays(c involute.Curve, p involute.Vec) float64 {
	from, _ := c.At(0)
	to, _ := c.At(1)
	ends := min(p.Sub(from).Norm(), p.Sub(to).Norm())
	switch c := c.(type) {
	case involute.Line:
		d := to.Sub(from)
		if t := p.Sub(from).Dot(d) / d.Dot(d); t >= 0 && t <= 1 {
			return math.Abs(d.Cross(p.Sub(from))) / d.Norm()
		}
	case involute.Arc:
		ray := p.Sub(c.Center)
		if t := math.Remainder(ray.Angle()-c.Start, 2*math.Pi) / c.Sweep; t >= 0 && t <= 1 {
			return math.Abs(ray.Norm() - c.Radius)
		}
	}
	return ends
}
