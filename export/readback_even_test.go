package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// evenGears are contours of several kinds: with and without a root land to start
// in, undercut, chamfered.
func evenGears(t testing.TB) []Path {
	t.Helper()
	var out []Path
	for _, spec := range []involute.Spec{
		{Teeth: 17, Module: 2, Rack: isoA(), Shift: 0.2},
		{Teeth: 24, Module: 2, Rack: isoA()},
		{Teeth: 9, Module: 3, Rack: isoA()},
		{Teeth: 30, Module: 1, Rack: fullRadius()},
		{Teeth: 45, Module: 1, Rack: isoA(), TipChamfer: 0.1},
	} {
		o, _, err := NewContour(ContourSpec{Tooth: tooth(t, spec, 0.02), Fit: FitOptions{Tolerance: 0.0025}})
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, o.Contours[0].Path)
	}
	return out
}

// Whole contours are even to rounding, wherever they start.
func TestEvenTeeth(t *testing.T) {
	for i, p := range evenGears(t) {
		for _, start := range []int{0, 1, 7} {
			moved := Path{Vertices: append(append([]Vertex(nil), p.Vertices[start:]...), p.Vertices[:start]...)}
			s, err := NewSection(moved, 0)
			if err != nil {
				t.Fatal(err)
			}
			if u := s.Unevenness(); u.Shape > 1e-11 || u.Joints > 1e-11 {
				t.Errorf("gear %d started at %d: %+v", i, start, u)
			}
		}
	}
}

// Any vertex moved by 0.01 mm in any direction shows: in full among the joints,
// and in the shape by what it moves square to the contour. There the two pieces
// that meet in it move with it; the least they show is what both still cover, so
// half the move is asked for where the joint is a corner.
func TestUnevennessSeesAnyVertex(t *testing.T) {
	gears := evenGears(t)
	const move = 0.01
	rapid.Check(t, func(t *rapid.T) {
		p := gears[rapid.IntRange(0, len(gears)-1).Draw(t, "gear")]
		vs := append([]Vertex(nil), p.Vertices...)
		i := rapid.IntRange(0, len(vs)-1).Draw(t, "vertex")
		whole, err := NewSection(p, 0)
		if err != nil {
			t.Fatal(err)
		}
		way := involute.Polar(1, rapid.Float64Range(-math.Pi, math.Pi).Draw(t, "way"))
		vs[i].P = vs[i].P.Add(way.Scale(move))
		s, err := NewSection(Path{Vertices: vs}, 0)
		if err != nil {
			t.Fatal(err)
		}
		u := s.Unevenness()
		if u.Joints < 0.99*move {
			t.Errorf("vertex %d moved by %g mm: joints show %.6f only", i, move, u.Joints)
		}
		_, before := directions(whole.curves[(i+len(vs)-1)%len(vs)])
		after, _ := directions(whole.curves[i])
		across := math.Min(math.Abs(way.Cross(before)), math.Abs(way.Cross(after)))
		if u.Shape < 0.49*across*move || u.Shape > 1.01*move {
			t.Errorf("vertex %d moved by %g mm, %.6f square to the contour: the shape shows %.6f", i, move, across*move, u.Shape)
		}
	})
}

// Any bulge lost shows as the rise of its arc, chord·bulge/2, and joints that
// were tangent turn by half the arc's sweep.
func TestUnevennessSeesAnyLostBulge(t *testing.T) {
	for g, p := range evenGears(t) {
		whole, err := NewSection(p, 0)
		if err != nil {
			t.Fatal(err)
		}
		sound := whole.Joints()
		// Every 11th, so that all pieces of a tooth come up on one tooth or another.
		for i := 0; i < len(p.Vertices); i += 11 {
			if p.Vertices[i].Bulge == 0 {
				continue
			}
			vs := append([]Vertex(nil), p.Vertices...)
			vs[i].Bulge = 0
			s, err := NewSection(Path{Vertices: vs}, 0)
			if err != nil {
				t.Fatal(err)
			}
			from, to, b := p.ends(i)
			rise := math.Abs(b) * to.Sub(from).Norm() / 2
			if u := s.Unevenness(); math.Abs(u.Shape-rise) > 0.1*rise {
				t.Errorf("gear %d, bulge %d lost: the shape shows %.3g, the arc rose by %.3g", g, i, u.Shape, rise)
			}
			_, end := directions(whole.curves[i])
			next, _ := directions(whole.curves[(i+1)%len(vs)])
			if math.Abs(turn(end, next)) > cornerAngle {
				continue // a tip land between two corners
			}
			j, turned := s.Joints(), 2*math.Atan(math.Abs(b))/involute.Degree
			if turned > 1 && j.Corners <= sound.Corners || turned < 0.99 && math.Abs(j.TangentBreakDeg-turned) > 0.01+sound.TangentBreakDeg {
				t.Errorf("gear %d, bulge %d lost: %+v, the joints turned by %.4f°", g, i, j, turned)
			}
		}
	}
}
