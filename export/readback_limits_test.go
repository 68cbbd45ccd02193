package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// A contour's radii are those of tip and root, and its area the exact profile's
// within what the fit allows: the deviation all along its length.
func TestRadiiAndArea(t *testing.T) {
	for _, spec := range []involute.Spec{
		{Teeth: 24, Module: 2, Rack: isoA()},
		{Teeth: 8, Module: 3, Rack: isoA()},
		{Teeth: 30, Module: 1, Rack: fullRadius()},
		{Teeth: 45, Module: 1, Rack: isoA(), TipChamfer: 0.1},
		{Teeth: 17, Module: 1.5, Helix: 30 * involute.Degree, Rack: isoA(), Shift: 0.3},
	} {
		tt := tooth(t, spec, 0.03)
		for _, tolerance := range []float64{1e-5, 0.01} {
			s, report := drawn(t, tt, tolerance)
			least, greatest := s.Radii()
			if slack := report.MaxDeviation + 1e-9; math.Abs(least-tt.RootDiameter()/2) > slack || math.Abs(greatest-tt.TipDiameter()/2) > 1e-9 {
				t.Errorf("z %d: radii %.7f to %.7f, want %.7f to %.7f", spec.Teeth, least, greatest, tt.RootDiameter()/2, tt.TipDiameter()/2)
			}
			exact := tt.Outline().Area()
			if slack := report.MaxDeviation * s.path.length(); math.Abs(s.Area()-exact) > slack {
				t.Errorf("z %d: area %.6f, want %.6f ± %.6f", spec.Teeth, s.Area(), exact, slack)
			}
			if tolerance == 1e-5 && math.Abs(s.Area()-exact) > 1e-6*exact {
				t.Errorf("z %d: a fine contour's area %.9f is not the exact %.9f", spec.Teeth, s.Area(), exact)
			}
		}
	}
}

// The reach of a line or an arc from any point, against points all along it.
func TestReachAgainstPoints(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		number := func(name string) float64 { return rapid.Float64Range(-3, 3).Draw(t, name) }
		p := Path{Vertices: []Vertex{
			{P: involute.Vec{X: number("x"), Y: number("y")}, Bulge: number("bulge") / 3},
			{P: involute.Vec{X: number("to x") + 7, Y: number("to y")}},
		}}
		from, c := involute.Vec{X: 2 * number("from x"), Y: 2 * number("from y")}, p.Curve(0)
		near, far := reachFrom(from, c)
		const n = 2000
		low, high := math.Inf(1), 0.0
		for i := range n + 1 {
			q, _ := c.At(float64(i) / n)
			low, high = math.Min(low, q.Sub(from).Norm()), math.Max(high, q.Sub(from).Norm())
		}
		// Points lie 0.01 mm apart at most: half of that beside the nearest and
		// farthest. A circle's own points are off by roundings of its radius.
		slack := 1e-12
		if arc, ok := c.(involute.Arc); ok {
			slack += 1e-15 * arc.Radius
		}
		if near > low+slack || near < low-5e-3 || far < high-slack || far > high+5e-3 {
			t.Errorf("%v from %v: %.9f to %.9f, points say %.9f to %.9f", c, from, near, far, low, high)
		}
	})
}

// A joint that is tangent in the fit is tangent in the file's numbers too, and
// corners are where the outline has them.
func TestJointsOfAFile(t *testing.T) {
	tt := tooth(t, involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0)
	o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.0025}})
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range []Format{FormatDXF, FormatDXFR12, FormatSVG} {
		back := readBack(t, o, f)
		path, err := back.Cut()
		if err != nil {
			t.Fatal(err)
		}
		s, err := NewSection(path, 0)
		if err != nil {
			t.Fatal(err)
		}
		j := s.Joints()
		if j.Gap > 1e-9 || j.Corners != report.Corners || j.TangentBreakDeg > 1e-4 || math.Abs(j.TangentBreakDeg-report.MaxTangentBreakDeg) > 1e-4 {
			t.Errorf("%v: %+v, the fit had %d corners and %.2g° elsewhere", f, j, report.Corners, report.MaxTangentBreakDeg)
		}
		if u := s.Unevenness(); u.Shape > 1e-7 || u.Joints > 1e-7 {
			t.Errorf("%v: teeth of the file differ by %+v", f, u)
		}
	}
}
