package involute

import (
	"fmt"
	"math"
	"testing"
)

// A grown gear is a gear of a larger module: every length grows alike.
func grownTooth(t *testing.T, tooth Tooth, k float64) Tooth {
	t.Helper()
	s := tooth.Gear.Spec()
	s.Module *= k
	s.TipDiameter *= k
	s.TipChamfer *= k
	g, err := NewGear(s)
	if err != nil {
		t.Fatal(err)
	}
	out, err := g.Tooth(tooth.Thickness() * k)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// Two gears drawn at the sizes that they have grown to, at the center distance
// that the housing has grown to, one turned both ways until it touches, all
// through a pitch: gears that grow alike have the backlash of the formula
// everywhere, others lie within its bounds and come near them.
func TestGrownPairTurned(t *testing.T) {
	growths := []Growth{{1, 1, 1.001}, {1.0005, 1.0005, 1}, {1.002, 1.002, 1.002}, {1, 1.001, 1}, {1.002, 1, 1.0005}, {0.999, 1.0003, 1.0001}}
	deep := Rack{PressureAngle: 14.5 * Degree, Addendum: 1.3, Dedendum: 1.55, TipRadius: 0.2}
	pairs := append(meshedPairs(), meshed{"three pairs at once", Spec{Teeth: 60, Module: 2, Rack: deep}, Spec{Teeth: 80, Module: 2, Rack: deep}, 0.06, 0.06, 0.02})
	mostMore := 0
	for _, c := range pairs {
		m, t1, t2, a := c.make(t)
		contact, err := m.Contact(a, t1, t2)
		if err != nil {
			t.Fatal(err)
		}
		more := MorePitches(contact.TransverseRatio)
		mostMore = max(mostMore, more)
		for _, g := range growths {
			least, most, err := m.CircumferentialBacklash(a, t1.Thickness(), t2.Thickness(), g, more)
			if err != nil {
				t.Fatal(err)
			}
			alpha, err := m.GrownPressureAngle(a, g)
			if err != nil {
				t.Fatal(err)
			}
			d := drawnPair{a * g.Housing, grownTooth(t, t1, g.First).Outline(), grownTooth(t, t2, g.Second).Outline()}
			radius := m.Second.BaseDiameter() * g.Second / 2 / math.Cos(alpha)
			low, high := math.Inf(1), math.Inf(-1)
			for i := range 10 {
				turn1, turn2 := float64(i)/10*d.o1.Pitch(), -float64(i)/10*d.o2.Pitch()
				j := radius * (d.play(turn1, turn2, ToothFlank, RootFillet) + d.play(-turn1, -turn2, ToothFlank, RootFillet))
				low, high = min(low, j), max(high, j)
			}
			name := fmt.Sprintf("%s, grown %v", c.name, g)
			differ := m.First.TransverseBasePitch() * math.Abs(g.First-g.Second) / math.Cos(alpha)
			const slack = 1e-10
			if low < least-slack || low > least+differ+slack {
				t.Errorf("%s: at least %.9f drawn, %.9f said, pitches differ by %.9f", name, low, least, differ)
			}
			if high > most+slack || high < most-float64(more)*differ-slack {
				t.Errorf("%s: at most %.9f drawn, %.9f said, pitches differ by %.9f", name, high, most, differ)
			}
		}
	}
	if mostMore < 2 {
		t.Error("no pair of the test has its pitches' difference counted twice")
	}
}

// Without growth it is the backlash of ISO 21771, for ring gears too; and a
// published rule of thumb: an aluminum housing 40 K warmer opens steel gears at 100
// mm by 0.0492 mm, a backlash of 2 x 0.0492 x tan 20 = 0.0358 (first order).
func TestGrowthAgainstKnown(t *testing.T) {
	spec := func(z int, shift float64) Spec { return Spec{Teeth: z, Module: 2, Shift: shift, Rack: isoA()} }
	for _, z := range []int{30, 41, -60, -97} {
		g1, err1 := NewGear(spec(20, 0.1))
		g2, err2 := NewGear(spec(z, -0.05))
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		m, err := NewMesh(g1, g2)
		if err != nil {
			t.Fatal(err)
		}
		a := m.ReferenceCenter() + 0.2
		for _, thin := range []float64{0, 0.05} {
			s1, s2 := g1.NominalThickness()-thin, g2.NominalThickness()-2*thin
			p, err := m.Backlash(a, s1, s2)
			if err != nil {
				t.Fatal(err)
			}
			least, most, err := m.CircumferentialBacklash(a, s1, s2, NoGrowth(), 3)
			if err != nil || math.Abs(least-p.Circumferential) > 1e-12 || math.Abs(most-p.Circumferential) > 1e-12 {
				t.Errorf("z %d: %v to %v, without growth %v (%v)", z, least, most, p.Circumferential, err)
			}
		}
	}
	g1, _ := NewGear(spec(40, 0))
	g2, _ := NewGear(spec(60, 0))
	m, err := NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	const warmer = 40
	least, _, err := m.CircumferentialBacklash(100, g1.NominalThickness(), g2.NominalThickness(), Growth{1 + 11.5e-6*warmer, 1 + 11.5e-6*warmer, 1 + 23.8e-6*warmer}, 1)
	if err != nil || math.Abs(least-0.0358) > 0.0001 {
		t.Errorf("aluminum housing: %v (%v)", least, err)
	}
	if _, _, err := m.CircumferentialBacklash(93.9, 3, 3, NoGrowth(), 1); err == nil {
		t.Error("base circles that overlap have a backlash")
	}
	if _, _, err := m.CircumferentialBacklash(94, 3, 3, Growth{1.01, 1.01, 1}, 1); err == nil {
		t.Error("base circles grown into each other have a backlash")
	}
}
