package involute

import (
	"math"
	"testing"
)

func isoA() Rack { return Rack{20 * Degree, 1, 1.25, 0.38} }

func mustTooth(t testing.TB, s Spec) Tooth {
	t.Helper()
	g, err := NewGear(s)
	if err != nil {
		t.Fatalf("%+v: %v", s, err)
	}
	tooth, err := g.Nominal()
	if err != nil {
		t.Fatalf("%+v: %v", s, err)
	}
	return tooth
}

func TestOutlineInvariants(t *testing.T) {
	for _, s := range outlineSpecs() {
		tooth := mustTooth(t, s)
		o := tooth.Outline()
		var prev Vec
		for i, p := range o.Pieces {
			t0, t1 := p.Domain()
			a, _ := p.At(t0)
			b, _ := p.At(t1)
			if i > 0 && a.Sub(prev).Norm() > 1e-10*s.Module {
				t.Errorf("%+v: gap of %g before piece %d", s, a.Sub(prev).Norm(), i)
			}
			prev = b
			for k := range 9 {
				u := t0 + (t1-t0)*(float64(k)+0.5)/9
				checkDerivatives(t, p.Curve, u, (t1-t0)*1e-4)
			}
		}
		first, _ := o.Pieces[0].At(func() float64 { a, _ := o.Pieces[0].Domain(); return a }())
		if d := prev.Sub(first.Rotate(o.Pitch())).Norm(); d > 1e-10*s.Module {
			t.Errorf("%+v: the pitch does not close, gap %g", s, d)
		}
	}
}

func checkDerivatives(t *testing.T, c Curve, u, h float64) {
	t.Helper()
	p0, d0 := c.At(u - h)
	p, dp := c.At(u)
	p1, d1 := c.At(u + h)
	num := p1.Sub(p0).Scale(1 / (2 * h))
	if num.Sub(dp).Norm() > 1e-4*dp.Norm() {
		t.Errorf("%T at %g: derivative %v, differences give %v", c, u, dp, num)
	}
	second := d1.Sub(d0).Scale(1 / (2 * h))
	k := dp.Cross(second) / math.Pow(dp.Norm(), 3)
	if math.Abs(k-c.Curvature(u)) > 1e-4*max(math.Abs(k), 1/p.Norm()) {
		t.Errorf("%T at %g: curvature %g, differences give %g", c, u, c.Curvature(u), k)
	}
}

func outlineSpecs() []Spec {
	return []Spec{
		{Teeth: 24, Module: 2, Rack: isoA()},
		{Teeth: 17, Module: 3, Rack: isoA()},
		{Teeth: 8, Module: 2, Rack: isoA()},
		{Teeth: 10, Module: 2, Rack: isoA()},
		{Teeth: 40, Module: 2, Shift: -0.4, Rack: isoA()},
		{Teeth: 18, Module: 25.4 / 16, Shift: 0.25, Rack: isoA()},
		{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: Rack{17.5 * Degree, 1, 1.25, 0.3}},
		{Teeth: 30, Module: 4, Helix: -25 * Degree, Rack: isoA(), TipChamfer: 0.3},
		{Teeth: 20, Module: 2, Rack: Rack{20 * Degree, 1, 1.25, 0}},
		{Teeth: 9, Module: 2, Rack: Rack{20 * Degree, 1, 1.25, 0}},
		{Teeth: 30, Module: 2, Shift: 1, Rack: Rack{20 * Degree, 0.5, 1, 0}}, // no fillet at all
		{Teeth: 100, Module: 0.5, Shift: 0.8, Rack: isoA()},
		{Teeth: 24, Module: 2, Rack: isoA(), TipRound: 0.3},
		{Teeth: 12, Module: 2, Shift: 0.3, Rack: isoA(), TipRound: 0.2, Thinning: FlanksOnly},
		{Teeth: 24, Module: 2, Rack: isoA(), Relief: ReliefSpec{Amount: 0.02, Start: 50}},
		{Teeth: 24, Module: 2, Rack: isoA(), Relief: ReliefSpec{Amount: 0.02, Start: 50, Parabolic: true}, TipChamfer: 0.2},
		{Teeth: 24, Module: 2, Rack: isoA(), Relief: ReliefSpec{Amount: 0.03, Start: 49, Parabolic: true}, TipRound: 0.2},
		{Teeth: 45, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.5}},
		{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.2}, TipRound: 0.2},
		{Teeth: 12, Module: 2, Shift: 0.4, Rack: isoA(), Mill: MillSpec{Diameter: 1}},
		{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 3}},
		{Teeth: 30, Module: 1, Rack: Rack{20 * Degree, 1, 1.4, (math.Pi/4 - 1.4*math.Tan(20*Degree)) / math.Tan(35*Degree)}},
	}
}

// Form diameters of undercut teeth, computed elsewhere with 60 digits.
func TestUndercutFormDiameters(t *testing.T) {
	for _, c := range []struct {
		m    float64
		z    int
		want float64
		tol  float64
	}{
		{2, 8, 15.2271, 5e-5}, {3, 17, 47.924349242, 5e-10},
		{1, 10, 9.4512, 5e-5}, {1, 8, 7.6136, 5e-5}, {1, 14, 13.1650, 5e-5},
	} {
		tooth := mustTooth(t, Spec{Teeth: c.z, Module: c.m, Rack: isoA()})
		if !tooth.Undercut() || math.Abs(tooth.FormDiameter()-c.want) > c.tol {
			t.Errorf("m %v z %d: form diameter %.9f undercut %v, want %v", c.m, c.z, tooth.FormDiameter(), tooth.Undercut(), c.want)
		}
	}
}

// The outline lies on its own profile, and a point moved off it square by 0.01 of
// the module is that far off.
func TestProfileOffset(t *testing.T) {
	for _, s := range outlineSpecs() {
		tooth := mustTooth(t, s)
		o, exact := tooth.Outline(), tooth.Profile()
		for turn := range 3 {
			for _, p := range o.Pieces {
				t0, t1 := p.Domain()
				for k := range 21 {
					u := t0 + (t1-t0)*(float64(k)+0.5)/21
					q, dq := p.At(u)
					q = q.Rotate(float64(turn) * o.Pitch())
					if d := exact.Offset(q); math.Abs(d) > 1e-9*s.Module {
						t.Errorf("%+v: piece %v at %g is %g off its own profile", s, p.Role, u, d)
					}
					if p.Role != ToothFlank {
						continue
					}
					n := dq.Left().Scale(0.001 * s.Module / dq.Norm()).Rotate(float64(turn) * o.Pitch())
					near(t, "offset outside", exact.Offset(q.Sub(n)), 0.001*s.Module, 1e-9*s.Module)
					near(t, "offset inside", exact.Offset(q.Add(n)), -0.001*s.Module, 1e-9*s.Module)
				}
			}
		}
	}
}
