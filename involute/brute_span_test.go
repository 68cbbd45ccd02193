package involute

import (
	"math"
	"testing"
)

// farthest returns how far the drawn flank reaches in a direction given by its
// polar angle, the flank turned about the axis by turn, and the radius there.
func farthest(flank Curve, direction, turn float64) (reach, radius float64) {
	n := Polar(1, direction-turn)
	t0, t1 := flank.Domain()
	u, reach := highest(func(u float64) float64 {
		p, _ := flank.At(u)
		return p.Dot(n)
	}, t0, t1, 30)
	p, _ := flank.At(u)
	return reach, p.Norm()
}

type spanned struct {
	spec Spec
	thin float64
	k    int
}

func spannedGears() []spanned {
	return []spanned{
		{Spec{Teeth: 20, Module: 1, Rack: isoA()}, 0, 3},
		{Spec{Teeth: 24, Module: 3, Shift: 0.4, Rack: isoA()}, 0, 4},
		{Spec{Teeth: 17, Module: 2, Rack: isoA()}, 0.1, 2},
		{Spec{Teeth: 24, Module: 3, Rack: isoA(), Relief: ReliefSpec{Amount: 0.02, Start: 75.5}}, 0.1, 3},
		{Spec{Teeth: 24, Module: 3, Rack: isoA(), Mill: MillSpec{Diameter: 2}, TipRound: 0.4}, 0.1, 3},
		{Spec{Teeth: 24, Module: 3, Rack: isoA(), Thinning: FlanksOnly, TipChamfer: 0.3}, 0.1, 3},
		{Spec{Teeth: 100, Module: 0.5, Shift: 0.8, Rack: isoA()}, 0, 13},
		{Spec{Teeth: 40, Module: 25.4 / 16, Rack: Rack{14.5 * Degree, 1, 1.157, 0.209}}, 0.03, 4},
		{Spec{Teeth: 30, Module: 4, Helix: 25 * Degree, Rack: isoA()}, 0, 5},
		{Spec{Teeth: 24, Module: 3, Helix: -25 * Degree, Shift: 0.4, Rack: isoA()}, 0.05, 5},
		{Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: isoAt(17.5)}, 0, 3},
	}
}

// Two parallel lines laid against the outer flanks of the k drawn teeth, at
// several inclinations: the span, wherever both touch between the ends of the flanks.
func TestSpanByParallelLines(t *testing.T) {
	for _, c := range spannedGears() {
		if c.spec.Helix != 0 {
			continue
		}
		tooth := rolled{"", c.spec, c.thin}.tooth(t)
		o := tooth.Outline()
		flanks := o.pieces(ToothFlank)
		last := float64(c.k-1) * o.Pitch()
		touched := 0
		for _, tilt := range []float64{-0.03, -0.01, 0, 0.01, 0.03} {
			direction := math.Pi/2 + last/2 + tilt
			high, rHigh := farthest(flanks[1], direction, last)
			low, rLow := farthest(flanks[0], direction+math.Pi, 0)
			inside := func(r float64) bool {
				return 2*r > tooth.FormDiameter()+1e-4 && 2*r < tooth.InvoluteEndDiameter()-1e-4
			}
			if !inside(rHigh) || !inside(rLow) {
				continue
			}
			touched++
			near(t, "span", tooth.Span(c.k), high+low, 1e-9)
			if tilt == 0 {
				near(t, "contact", tooth.SpanContactDiameter(tooth.Span(c.k)), 2*rHigh, 1e-5)
			}
		}
		if touched == 0 {
			t.Errorf("z %d: the lines touch no flank", c.spec.Teeth)
		}
	}
}

// Two parallel faces rocked about a helical gear of face width b until the
// caliper reads least: the span, if b is wider than W sin β_b; on a narrower
// face the caliper tips farther and reads less (trap 9).
func TestSpanByRockedFaces(t *testing.T) {
	for _, c := range spannedGears() {
		if c.spec.Helix == 0 {
			continue
		}
		tooth := rolled{"", c.spec, c.thin}.tooth(t)
		o := tooth.Outline()
		flanks := o.pieces(ToothFlank)
		last := float64(c.k-1) * o.Pitch()
		lead, _ := tooth.Lead()
		twist := math.Copysign(2*math.Pi/lead, c.spec.Helix)
		reading := func(b, tilt float64) float64 {
			s, co := math.Sincos(tilt)
			direction := math.Pi/2 + last/2
			total := 0.0
			for i, f := range []Curve{flanks[1], flanks[0]} {
				side := 1 - 2*float64(i)
				_, far := highest(func(zeta float64) float64 {
					r, _ := farthest(f, direction+float64(i)*math.Pi, last*float64(1-i)+twist*zeta)
					return co*r + side*s*zeta
				}, -b/2, b/2, 8)
				total += far
			}
			return total
		}
		need := tooth.SpanFaceWidth(tooth.Span(c.k))
		// A caliper rests where rocking either way opens it: at the least readings between others.
		rests := func(b float64) (at []float64) {
			const n = 80
			tilt := func(i int) float64 { return 1.2 * (2*float64(i)/n - 1) }
			for i := 1; i < n; i++ {
				if here := reading(b, tilt(i)); here < reading(b, tilt(i-1)) && here < reading(b, tilt(i+1)) {
					_, least := golden(func(u float64) float64 { return reading(b, u) }, tilt(i-1), tilt(i+1))
					at = append(at, least)
				}
			}
			return at
		}
		if at := rests(need * 1.1); len(at) != 1 || !(math.Abs(at[0]-tooth.Span(c.k)) <= 1e-9) {
			t.Errorf("z %d β %v: the caliper rests at %.9f, span %.9f", c.spec.Teeth, c.spec.Helix/Degree, at, tooth.Span(c.k))
		}
		for _, least := range rests(need * 0.9) {
			if math.Abs(least-tooth.Span(c.k)) < 1e-3*c.spec.Module {
				t.Errorf("z %d: a face of %.3f is too narrow, yet the caliper rests at %.6f", c.spec.Teeth, need*0.9, least)
			}
		}
	}
}
