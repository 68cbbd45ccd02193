package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

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
		if sweep := math.Abs(p.sweep()); sweep > math.Pi/2 {
			t.Errorf("piece %d turns by %.1f°", i, sweep*180/math.Pi)
		}
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

// Source of the counts: the least number of arcs in interpolating biarcs and of
// chords on the curve, minimized over their joints by a separate program for
// these flanks (rack straight to depth 1.0 m).
func TestFlankTakesNoMoreArcsThanOptimalBiarcs(t *testing.T) {
	tolerances := []float64{0.001, 0.0025, 0.01, 0.025}
	for _, tt := range []struct {
		m, z         float64
		arcs, chords [4]int
	}{
		{2, 24, [4]int{4, 4, 2, 2}, [4]int{15, 9, 5, 3}},
		{1, 17, [4]int{4, 4, 2, 2}, [4]int{11, 7, 4, 3}},
		{5, 40, [4]int{4, 4, 2, 2}, [4]int{19, 12, 6, 4}},
	} {
		c := flankOf(tt.m, tt.z)
		for i, tol := range tolerances {
			ch, err := fitArcs(c, tol)
			if err != nil {
				t.Fatal(err)
			}
			checkChain(t, c, ch)
			if len(ch.Pieces) > tt.arcs[i] || ch.MaxDeviation > tol {
				t.Errorf("m %g z %g ±%g: %d arcs off by %.6f, biarcs take %d", tt.m, tt.z, tol, len(ch.Pieces), ch.MaxDeviation, tt.arcs[i])
			}
			// Three arcs reach 1.727 times as far as a biarc: enough for each of these flanks.
			if tol == 0.0025 && len(ch.Pieces) != 3 {
				t.Errorf("m %g z %g ±%g: %d arcs, want 3", tt.m, tt.z, tol, len(ch.Pieces))
			}
			w, err := newWalk(c)
			if err != nil {
				t.Fatal(err)
			}
			if n := int(math.Ceil(w.chords / math.Sqrt(tol))); n != tt.chords[i] {
				t.Errorf("m %g z %g ±%g: %d chords, want %d", tt.m, tt.z, tol, n, tt.chords[i])
			}
		}
	}
}

// The normal deviation of a point at radius r and polar angle θ from an involute
// is r_b(θ − θ₀ − inv α_r), cos α_r = r_b/r, since neighboring involutes of a
// base circle are parallel curves r_b Δθ apart (a property of involutes, in any
// text on gear geometry). Points of the arcs are taken, not of the curve.
func TestMeasuredDeviationAgreesWithInvoluteInClosedForm(t *testing.T) {
	for _, m := range []float64{0.1, 1, 2, 50} {
		for _, z := range []float64{20, 24, 90} {
			for _, share := range []float64{0.0001, 0.001, 0.01} {
				c := flankOf(m, z)
				c.BaseAngle = 0.7
				ch, err := fitArcs(c, share*m)
				if err != nil {
					t.Fatal(err)
				}
				worst := 0.0
				for _, p := range ch.Pieces {
					for i := range 2001 {
						q := pieceAt(p, float64(i)/2000)
						alpha := math.Acos(c.BaseRadius / q.Norm())
						d := c.BaseRadius * (q.Angle() - c.BaseAngle - (math.Tan(alpha) - alpha))
						worst = max(worst, math.Abs(d))
					}
				}
				// Peaks are at most 1/4000 of a piece from a point, where a parabola loses 1e-6 of its height.
				if math.Abs(worst-ch.MaxDeviation) > 1e-5*worst {
					t.Errorf("m %g z %g ±%g: measured %.12f, closed form %.12f", m, z, share*m, ch.MaxDeviation, worst)
				}
			}
		}
	}
}

// To leading order a biarc over length h deviates by |dκ/ds| h³/6.868³ and a
// triarc by |dκ/ds| h³/11.86³ (worked out by hand from a cubic against
// quadratics that join with their slopes). For an involute
// ∫|dκ/ds|^(1/3) ds = r_b^(1/3)·(roll angle Δt), so a chain that reaches R in all
// leaves r_b (Δt/R)³. The triarc's middle arc is held to the curve's own
// curvature, which costs it 2 to 3 % where the curvature does not rise evenly.
func TestDeviationFollowsTheCubeLaw(t *testing.T) {
	c := involute.Flank{BaseRadius: 100, T0: 0.3, T1: 0.5}
	w, err := newWalk(c)
	if err != nil {
		t.Fatal(err)
	}
	for _, tt := range []struct {
		arcs  int
		reach float64 // of all strips together
	}{{2, 6.868}, {3, 11.86}, {4, 2 * 6.868}, {5, 11.86 + 6.868}, {9, 3 * 11.86}} {
		strips, _ := w.spread(0, 1, tt.arcs, 1e-6)
		var pieces []piece
		for _, s := range strips {
			pieces = append(pieces, s.pieces...)
		}
		got, want := w.deviation(pieces, 0, 1), 100*math.Pow(0.2/tt.reach, 3)
		if len(pieces) != tt.arcs || math.Abs(got-want) > 0.04*want {
			t.Errorf("%d of %d arcs: %.4g mm, want %.4g", len(pieces), tt.arcs, got, want)
		}
	}
}

// Facts of the ellipse from any handbook of mathematics: curvature between b/a²
// and a/b², with its extremes on the axes; area πab; perimeter of the ellipse
// with half axes 2 and 1 is 9.688448220547676 (8 E(3/4)).
func TestEllipse(t *testing.T) {
	for _, tol := range []float64{0.05, 0.001, 1e-5} {
		c := ellipse{a: 2, b: 1, t1: 2 * math.Pi}
		ch, err := fitArcs(c, tol)
		if err != nil {
			t.Fatal(err)
		}
		checkChain(t, c, ch)
		length := 0.0
		var path Path
		for _, p := range ch.Pieces {
			length += p.length()
			path.Vertices = append(path.Vertices, Vertex{p.From, p.Bulge})
			// A biarc on a spiral keeps between the curvatures at its ends.
			if k := p.curvature(); k < 0.25*(1-1e-9) || k > 2*(1+1e-9) {
				t.Errorf("±%g: an arc of curvature %.9f, the ellipse's lie in [0.25, 2]", tol, k)
			}
		}
		// Parallel curves at distance d of a convex curve differ in length by 2πd and in area by d times the length.
		if d := math.Abs(length - 9.688448220547676); d > 2*math.Pi*ch.MaxDeviation {
			t.Errorf("±%g: length off by %g", tol, d)
		}
		if d := math.Abs(path.area() - 2*math.Pi); d > 9.7*ch.MaxDeviation {
			t.Errorf("±%g: area off by %g", tol, d)
		}
	}
	w, err := newWalk(ellipse{a: 2, b: 1, t0: -1, t1: 5})
	if err != nil {
		t.Fatal(err)
	}
	cuts := w.extremes()
	if len(cuts) != 4 {
		t.Fatalf("extremes of curvature at %v: want four", cuts)
	}
	for i, u := range cuts {
		if got, want := w.parameter(u), float64(i)*math.Pi/2; math.Abs(got-want) > 1e-5 {
			t.Errorf("extreme %d at %.7f, want %.7f", i, got, want)
		}
	}
}

func TestLinesAndArcsPassAsTheyAre(t *testing.T) {
	l := involute.Line{From: involute.Vec{X: 1, Y: 2}, To: involute.Vec{X: 4, Y: 6}}
	ch, err := fitArcs(involute.Piece{Curve: l}, 0.001)
	if err != nil || len(ch.Pieces) != 1 || ch.Pieces[0] != (piece{l.From, l.To, 0}) || ch.MaxDeviation != 0 {
		t.Errorf("line: %+v, %v", ch, err)
	}
	for _, tt := range []struct {
		degrees float64
		parts   int
	}{{10, 1}, {-85, 1}, {86, 2}, {170, 2}, {-180, 3}, {360, 5}} {
		a := involute.Arc{Center: involute.Vec{X: 3, Y: -1}, Radius: 5, Start: 0.4, Sweep: tt.degrees * math.Pi / 180}
		ch, err := fitArcs(a, 0.001)
		if err != nil || len(ch.Pieces) != tt.parts {
			t.Errorf("arc of %g°: %d parts, %v; want %d", tt.degrees, len(ch.Pieces), err, tt.parts)
			continue
		}
		checkChain(t, a, ch)
		for _, p := range ch.Pieces {
			if k := p.curvature() * math.Copysign(1, tt.degrees); math.Abs(k-0.2) > 1e-14 {
				t.Errorf("arc of %g°: a part of curvature %.16f, want 0.2", tt.degrees, k)
			}
		}
	}
}

// The radius of an involute of a huge base circle is over 10 000 times a short
// stretch of it, which is then a line.
func TestNearlyStraightBecomesLines(t *testing.T) {
	c := involute.Flank{BaseRadius: 1e6, T0: 0.4, T1: 0.4000001}
	ch, err := fitArcs(c, 0.001)
	if err != nil {
		t.Fatal(err)
	}
	checkChain(t, c, ch)
	for _, p := range ch.Pieces {
		if p.Bulge != 0 {
			t.Errorf("bulge %g, want a line", p.Bulge)
		}
	}
}

func TestFitArcsRefuses(t *testing.T) {
	good := flankOf(2, 24)
	for name, tt := range map[string]struct {
		c   involute.Curve
		tol float64
		say string
	}{
		"no tolerance": {good, 0, "above 0"},
		"not a number": {good, math.NaN(), "above 0"},
		"infinite":     {good, math.Inf(1), "above 0"},
		"too fine":     {good, 1e-12, "at least"},
		"no length":    {involute.Line{}, 0.001, "above 0"},
		"two turns":    {involute.Arc{Radius: 1, Sweep: 13}, 0.001, "at most one"},
		"no sweep":     {involute.Arc{Radius: 1}, 0.001, "other than 0"},
		"empty domain": {involute.Flank{BaseRadius: 10, T0: 1, T1: 1}, 0.001, "rising"},
		"not finite":   {involute.Flank{BaseRadius: math.Inf(1), T0: 0, T1: 1}, 0.001, "finite"},
		"a point":      {ellipse{t1: 1}, 0.001, "not a finite number"},
	} {
		if ch, err := fitArcs(tt.c, tt.tol); err == nil || !strings.Contains(err.Error(), tt.say) {
			t.Errorf("%s: %v, %v; want an error with %q", name, ch, err, tt.say)
		}
	}
}

func BenchmarkFitFlank(b *testing.B) {
	c := flankOf(2, 24)
	for b.Loop() {
		if _, err := fitArcs(c, 0.0025); err != nil {
			b.Fatal(err)
		}
	}
}
