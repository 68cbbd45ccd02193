package involute

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// A pair of possible gears: no backlash at the tight center, more with a wider
// one, the thinning asked for gives it, and every number is one.
func TestPropertyMesh(t *testing.T) {
	off := &worst{}
	tried, meshed := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		t1 := drawTooth(t)
		tried++
		s2 := t1.Spec()
		s2.Teeth = rapid.IntRange(4, 1000).Draw(t, "z2")
		s2.Shift = rapid.Float64Range(-0.5, 0.8).Draw(t, "x2")
		s2.Helix = -s2.Helix
		g2, err := NewGear(s2)
		if err != nil {
			return
		}
		t2, err := g2.Tooth(g2.NominalThickness() - 0.03*s2.Module)
		if err != nil {
			return
		}
		m, err := NewMesh(t1.Gear, t2.Gear)
		if err != nil {
			t.Fatal(err)
		}
		a, err := m.TightCenter(t1.sn, t2.sn)
		if err != nil {
			var imp *Impossible
			if !errors.As(err, &imp) || imp.Reason != CenterNeverTight {
				t.Fatal(err)
			}
			return
		}
		meshed++
		last := math.Inf(-1)
		for _, wider := range []float64{0, 0.001, 0.01, 0.1, 0.3} {
			p, err := m.Backlash(a+wider*s2.Module, t1.sn, t2.sn)
			if err != nil {
				if wider == 0 && a-m.LeastCenter() < 1e-12*a {
					return // tight with a working pressure angle of nothing
				}
				t.Fatal(err)
			}
			allFinite(t, "play", p)
			if wider == 0 {
				off.see(p.Circumferential)
				if !(math.Abs(p.Circumferential) <= 1e-9) {
					t.Fatalf("backlash %g at the tight center %g", p.Circumferential, a)
				}
			}
			if !(p.Circumferential > last) {
				t.Fatalf("backlash %g after %g though the center is wider", p.Circumferential, last)
			}
			last = p.Circumferential
			want := 0.05 * s2.Module
			thin, err := m.ThinningForBacklash(a+wider*s2.Module, t1.sn, t2.sn, want)
			if err != nil {
				t.Fatal(err)
			}
			p, _ = m.Backlash(a+wider*s2.Module, t1.sn-thin/3, t2.sn-thin*2/3)
			if !(math.Abs(p.Circumferential-want) <= 1e-9) {
				t.Fatalf("thinning %g for a backlash of %g gives %g", thin, want, p.Circumferential)
			}
			c, err := m.Contact(a+wider*s2.Module, t1, t2)
			if err != nil {
				t.Fatal(err)
			}
			allFinite(t, "contact", c)
			// Tips that do not reach each other make a ratio below 0; there is none less than 0.
			if c.TransverseRatio > max(0, c.RatioByTips)+1e-12 || c.TransverseRatio < 0 {
				t.Fatalf("contact ratio %g, by tips %g", c.TransverseRatio, c.RatioByTips)
			}
			for _, first := range []bool{true, false} {
				gap, err := m.FilletClearance(a+wider*s2.Module, t1, t2, first)
				if err != nil || math.IsNaN(gap) || math.IsInf(gap, -1) {
					t.Fatalf("fillet clearance %g, %v", gap, err)
				}
			}
		}
	})
	off.within(t, "backlash at the tight center, mm", 1e-9)
	if meshed < tried/3 {
		t.Errorf("only %d of %d pairs mesh", meshed, tried)
	}
	t.Logf("%d of %d pairs mesh", meshed, tried)
}
