package export

import (
	"math"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// runOf returns the run over curves that follow one another, with free or
// tangent ends.
func runOf(t rapid.TB, free bool, cs ...involute.Curve) *run {
	t.Helper()
	var walks []*walk
	for _, c := range cs {
		w, err := newWalk(c)
		if err != nil {
			t.Fatal(err)
		}
		walks = append(walks, w)
	}
	start, stop := runEnd{free: free}, runEnd{free: free}
	start.point, start.dir = walks[0].pointAndDirection(0)
	stop.point, stop.dir = walks[len(walks)-1].pointAndDirection(1)
	return newRun(walks, start, stop)
}

// both returns the band ±tol.
func both(tol float64) band { return band{-tol, tol} }

// An ellipse with half axes a along x and b along y, once round from +x. The
// embedded Curve is nil; it lends the seal of the interface.
type ellipse struct {
	involute.Curve
	a, b, t0, t1 float64
}

func (e ellipse) Domain() (t0, t1 float64) { return e.t0, e.t1 }

func (e ellipse) At(t float64) (p, dp involute.Vec) {
	s, c := math.Sincos(t)
	return involute.Vec{X: e.a * c, Y: e.b * s}, involute.Vec{X: -e.a * s, Y: e.b * c}
}

func (e ellipse) Curvature(t float64) float64 {
	_, d := e.At(t)
	return e.a * e.b / math.Pow(d.Norm(), 3)
}

// A trochoid is the way of a point that a rack carries at height h below its
// pitch line, seen from the gear of pitch radius r: (r − h, −rφ) turned by φ.
// Its curvature at φ = 0 is (r + h)/h², as tight as one likes.
type trochoid struct {
	involute.Curve
	r, h, t0, t1 float64
}

func (c trochoid) Domain() (t0, t1 float64) { return c.t0, c.t1 }

func (c trochoid) At(t float64) (p, dp involute.Vec) {
	return involute.Vec{X: c.r - c.h, Y: -c.r * t}.Rotate(t), involute.Vec{X: c.r * t, Y: -c.h}.Rotate(t)
}

func (c trochoid) Curvature(t float64) float64 {
	d1, d2 := involute.Vec{X: c.r * t, Y: -c.h}, involute.Vec{X: c.r + c.h, Y: c.r * t}
	return d1.Cross(d2) / math.Pow(d1.Norm(), 3)
}

// flankOf returns the first flank of a gear cut by a 20° rack, from where a
// rack straight to depth 1.0 m ends (the base circle where that is undercut) to
// the tip at addendum 1.0 m.
func flankOf(m, z float64) involute.Flank {
	alpha := 20 * math.Pi / 180
	rb := m * z / 2 * math.Cos(alpha)
	ra := m * (z + 2) / 2
	return involute.Flank{
		BaseRadius: rb,
		T0:         max(0, math.Tan(alpha)-m/(math.Sin(alpha)*rb)),
		T1:         math.Sqrt(ra*ra/(rb*rb) - 1),
	}
}

// pieceAt returns the point a share s of the way along a piece, by center and
// radius: a route of its own beside gauge and piece.halves.
func pieceAt(p piece, s float64) involute.Vec {
	point, _ := Path{Vertices: []Vertex{{p.From, p.Bulge}, {p.To, 0}}}.Curve(0).At(s)
	return point
}

// checkChain fails unless the chain joins, is tangent within 0.01° at its
// joints and at both ends to the curve, and no arc turns over 90°.
func checkChain(t rapid.TB, c involute.Curve, ch chain) {
	t.Helper()
	t0, t1 := c.Domain()
	first, _ := c.At(t0)
	last, _ := c.At(t1)
	if ch.Pieces[0].From != first || ch.Pieces[len(ch.Pieces)-1].To != last {
		t.Errorf("chain runs from %v to %v, the curve from %v to %v", ch.Pieces[0].From, ch.Pieces[len(ch.Pieces)-1].To, first, last)
	}
	// A secant of length δ lies off the tangent by κδ/2, so the directions at the
	// ends come from two secants, by extrapolation, and need no derivative.
	h := 1e-4 * (t1 - t0)
	ahead := func(t, h float64) involute.Vec {
		p, _ := c.At(t)
		q, _ := c.At(t + h)
		d := q.Sub(p)
		return d.Scale(1 / d.Norm())
	}
	dir := ahead(t0, h).Scale(2).Sub(ahead(t0, 2*h))
	for i, p := range ch.Pieces {
		if i > 0 && p.From != ch.Pieces[i-1].To {
			t.Errorf("piece %d starts at %v, the one before ends at %v", i, p.From, ch.Pieces[i-1].To)
		}
		start, end := p.directions()
		if a := math.Abs(turn(dir, start)) * 180 / math.Pi; a > 0.01 {
			t.Errorf("break of %.4f° before piece %d of %d", a, i, len(ch.Pieces))
		}
		dir = end
	}
	back := ahead(t1, -h).Scale(2).Sub(ahead(t1, -2*h)).Scale(-1)
	if a := math.Abs(turn(dir, back)) * 180 / math.Pi; a > 0.01 {
		t.Errorf("break of %.4f° at the end", a)
	}
}
