package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// Source of the counts: the least number of arcs in tangent-continuous chains with
// both ends on the flank, minimized over joints and directions by a separate
// program for these flanks (rack straight to depth 1.0 m).
var fewestArcs = []struct {
	m, z float64
	arcs [4]int
}{
	{2, 24, [4]int{3, 2, 2, 1}},
	{1, 17, [4]int{3, 2, 2, 1}},
	{5, 40, [4]int{3, 2, 2, 1}},
}

var fewestTolerances = [4]float64{0.001, 0.0025, 0.01, 0.025} // ± mm

func TestFlankTakesFewestArcs(t *testing.T) {
	for _, tt := range fewestArcs {
		r := runOf(t, true, flankOf(tt.m, tt.z))
		for i, tol := range fewestTolerances {
			ch, err := r.fit(both(tol), 0)
			if err != nil {
				t.Fatal(err)
			}
			if len(ch.Pieces) > tt.arcs[i] || ch.deviation() > tol {
				t.Errorf("m %g z %g ±%g: %d arcs off by %.6f, want %d", tt.m, tt.z, tol, len(ch.Pieces), ch.deviation(), tt.arcs[i])
			}
		}
	}
}

// The flank of a whole gear may take no more, though it shares its direction with the fillet.
func TestFlankOfAGearTakesFewestArcs(t *testing.T) {
	for _, tt := range fewestArcs {
		pitch := pitchOf(t, involute.Spec{Teeth: int(tt.z), Module: tt.m, Rack: involute.Rack{TipRadius: 0.38}})
		for i, tol := range fewestTolerances {
			_, r, err := closedPath(pitch, int(tt.z), FitOptions{Tolerance: tol})
			if err != nil {
				t.Fatal(err)
			}
			if r.ArcsPerFlank > tt.arcs[i] || r.MaxDeviation > tol || r.MaxTangentBreakDeg > 0.01 {
				t.Errorf("m %g z %g ±%g: %+v, want %d arcs a flank", tt.m, tt.z, tol, r, tt.arcs[i])
			}
		}
	}
}

// N arcs on an involute deviate by r_b (Δt/N)³/(72√3), to leading order in the roll
// angle Δt: a cubic against quadratics that join with their slopes, worked out by hand.
func TestDeviationFollowsTheCubeLaw(t *testing.T) {
	r := runOf(t, true, involute.Flank{BaseRadius: 100, T0: 0.3, T1: 0.5})
	for _, n := range []int{2, 3, 4, 5, 9, 16, 31, 100} {
		e := 100 * math.Pow(0.2/float64(n), 3) / (72 * math.Sqrt(3))
		if ch, ok := newFitting(r, []int{n}, both(1.01*e), 0).search(); !ok || len(ch.Pieces) != n {
			t.Errorf("%d arcs do not keep 1.01 of the least deviation (%v)", n, ok)
		}
		if _, ok := newFitting(r, []int{n}, both(0.98*e), 0).search(); ok {
			t.Errorf("%d arcs keep 0.98 of the least deviation", n)
		}
	}
}

// work integrates |dκ/ds|^(1/3) ds of a curve over 20 000 steps.
func work(c involute.Curve) float64 {
	const n = 20000
	t0, t1 := c.Domain()
	sum := 0.0
	at := func(i int) float64 { return t0 + (t1-t0)*float64(i)/n }
	for i := 1; i <= n; i++ {
		if change := math.Abs(c.Curvature(at(i)) - c.Curvature(at(i-1))); finite(change) {
			_, dp := c.At((at(i) + at(i-1)) / 2)
			ds := dp.Norm() * (t1 - t0) / n
			sum += math.Cbrt(change * ds * ds)
		}
	}
	return sum
}

// drawGear draws a gear that can be made, and its tolerance.
func drawGear(t *rapid.T) (pitch []involute.Curve, z int, tol float64) {
	m := drawModule(t)
	rack := involute.Rack{
		PressureAngle: rapid.Float64Range(14.5, 27).Draw(t, "alpha") * math.Pi / 180, Addendum: 1, Dedendum: 1.25,
	}
	share := rapid.OneOf(rapid.Just(1.0), rapid.Float64Range(0, 1)).Draw(t, "rho/largest")
	rack.TipRadius = share * rack.LargestTipRadius()
	z = rapid.IntRange(5, 150).Draw(t, "z")
	g, err := involute.NewGear(involute.Spec{Teeth: z, Module: m, Shift: rapid.Float64Range(-0.3, 0.7).Draw(t, "x"), Rack: rack})
	if err != nil {
		t.Skip(err)
	}
	tooth, err := g.Tooth(g.NominalThickness() - m*rapid.Float64Range(0, 0.2).Draw(t, "thinned"))
	if err != nil {
		t.Skip(err)
	}
	for _, p := range tooth.Outline().Pieces {
		pitch = append(pitch, p)
	}
	return pitch, z, drawTolerance(t, m)
}

// drawSide draws the side of the tolerance.
func drawSide(t *rapid.T) Side {
	return rapid.SampledFrom([]Side{Both, Outside, Inside}).Draw(t, "side")
}

// A chain follows (72√3)^(−1/3) ∫|dκ/ds|^(1/3) ds / ε^(1/3), rounded up; one arc more
// is left for tangent ends and for the curve that the joint between fillet and flank favors less.
// (Where a band to one side is a hundredth of the module and wider, its pinned ends may cost a second one.)
func TestGearsKeepTheBoundOnArcs(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		pitch, z, tol := drawGear(t)
		o := FitOptions{Tolerance: tol, Side: drawSide(t), MaxSweep: math.Pi}
		if o.Side != Both {
			o.Tolerance = tol / 3
			tol = o.Tolerance
		}
		_, r, err := closedPath(pitch, z, o)
		if err != nil {
			t.Fatal(err)
		}
		if o.Side != Both {
			tol /= 2
		}
		for _, c := range pitch {
			bound := int(math.Ceil(math.Pow(72*math.Sqrt(3)*tol, -1.0/3)*work(c))) + 1
			switch role(c) {
			case involute.ToothFlank:
				if r.ArcsPerFlank > bound {
					t.Errorf("%d arcs a flank, bound %d: %+v", r.ArcsPerFlank, bound, r)
				}
			case involute.RootFillet:
				if r.ArcsPerFillet > bound {
					t.Errorf("%d arcs a fillet, bound %d: %+v", r.ArcsPerFillet, bound, r)
				}
			}
		}
	})
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
				ch, err := runOf(t, false, c).fit(both(share*m), 0)
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
				if math.Abs(worst-ch.deviation()) > 1e-5*worst {
					t.Errorf("m %g z %g ±%g: measured %.12f, closed form %.12f", m, z, share*m, ch.deviation(), worst)
				}
			}
		}
	}
}

// Facts of the ellipse from any handbook of mathematics: area πab; perimeter of the ellipse
// with half axes 2 and 1 is 9.688448220547676 (8 E(3/4)).
func TestEllipse(t *testing.T) {
	for _, tol := range []float64{0.05, 0.001, 1e-5} {
		c := ellipse{a: 2, b: 1, t1: 2 * math.Pi}
		ch, err := runOf(t, false, c).fit(both(tol), 0)
		if err != nil {
			t.Fatal(err)
		}
		checkChain(t, c, ch)
		length := 0.0
		var path Path
		for _, p := range ch.Pieces {
			length += p.length()
			path.Vertices = append(path.Vertices, Vertex{p.From, p.Bulge})
		}
		// Parallel curves at distance d of a convex curve differ in length by 2πd and in area by d times the length.
		if d := math.Abs(length - 9.688448220547676); d > 2*math.Pi*ch.deviation() {
			t.Errorf("±%g: length off by %g", tol, d)
		}
		if d := math.Abs(path.area() - 2*math.Pi); d > 9.7*ch.deviation() {
			t.Errorf("±%g: area off by %g", tol, d)
		}
	}
}

func TestLinesAndArcsPassAsTheyAre(t *testing.T) {
	l := involute.Line{From: involute.Vec{X: 1, Y: 2}, To: involute.Vec{X: 4, Y: 6}}
	ch, err := exactChain(l)
	if err != nil || len(ch.Pieces) != 1 || ch.Pieces[0] != (piece{l.From, l.To, 0}) || ch.deviation() != 0 {
		t.Errorf("line: %+v, %v", ch, err)
	}
	for _, tt := range []struct {
		degrees float64
		parts   int
	}{{10, 1}, {-90, 1}, {91, 2}, {170, 2}, {-181, 3}, {360, 4}} {
		a := involute.Arc{Center: involute.Vec{X: 3, Y: -1}, Radius: 5, Start: 0.4, Sweep: tt.degrees * math.Pi / 180}
		ch, err := exactChain(a)
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
	ch, err := runOf(t, false, c).fit(both(0.001), 0)
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
