package involute

import (
	"errors"
	"math"
	"testing"
)

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s = %.10f, want %.10f", what, got, want)
	}
}

func reading(t *testing.T, tooth Tooth, way PinWay, pin float64) PinReading {
	t.Helper()
	seat, err := tooth.Seat(pin)
	if err != nil {
		t.Fatal(err)
	}
	r, err := tooth.Reading(way, seat.CenterDiameter, pin, 0)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func isoAt(alphaDeg float64) Rack {
	r := isoA()
	r.PressureAngle = alphaDeg * Degree
	r.TipRadius = min(r.TipRadius, r.LargestTipRadius())
	return r
}

// Over two wires, 1 diametral pitch, 1.728 in wires, external spur gears
// (over-wire tables of Machinery's Handbook; recalled). For odd teeth the
// wires lie in the nearest opposite spaces.
func TestOverWireTables(t *testing.T) {
	for _, c := range []struct {
		z         int
		p145, p20 float64
	}{
		{6, 8.2846, 8.3032}, {8, 10.3160, 10.3271}, {10, 12.3399, 12.3445}, {12, 14.3590, 14.3578},
		{13, 0, 15.2639}, {14, 16.3746, 16.3683}, {15, 0, 17.2871}, {18, 20.3989, 20.3840},
		{20, 22.4087, 22.3900}, {22, 24.4172, 24.3952}, {24, 26.4247, 26.3997}, {26, 28.4314, 28.4036},
		{28, 30.4374, 30.4071}, {30, 32.4429, 32.4102},
	} {
		for deg, printed := range map[float64]float64{14.5: c.p145, 20: c.p20} {
			if printed == 0 {
				continue
			}
			// Few teeth at 14.5° are cut off by a 1.25 dedendum; the table is for the involute alone.
			rack := Rack{deg * Degree, 1, 1.0, 0}
			g, err := NewGear(Spec{Teeth: c.z, Module: 1, Rack: rack})
			if err != nil {
				t.Fatal(err)
			}
			tooth := Tooth{Gear: g, sn: g.NominalThickness()}
			near(t, "over wires", reading(t, tooth, TwoPins, 1.728).Value, printed, 0.51e-4)
		}
	}
}

// Span over 1 diametral pitch, 20° (Machinery's Handbook; recalled).
func TestSpanTables(t *testing.T) {
	for _, c := range []struct {
		z, k    int
		printed float64
	}{
		{12, 2, 4.5963}, {13, 2, 4.6103}, {14, 2, 4.6243}, {15, 2, 4.6383}, {16, 2, 4.6523},
		{17, 2, 4.6663}, {18, 2, 4.6803}, {19, 3, 7.6464}, {20, 3, 7.6604},
	} {
		tooth := mustTooth(t, Spec{Teeth: c.z, Module: 1, Rack: isoA()})
		near(t, "span", tooth.Span(c.k), c.printed, 0.51e-4)
	}
}

// A metric gear handbook's span examples (recalled): number of teeth by formula and W.
func TestSpanExamples(t *testing.T) {
	spur := mustTooth(t, Spec{Teeth: 24, Module: 3, Shift: 0.4, Rack: isoA()})
	near(t, "teeth", spur.IdealSpanTeeth(), 3.78787, 0.5e-5)
	near(t, "W4", spur.Span(4), 32.8266, 0.51e-4)
	hel := mustTooth(t, Spec{Teeth: 24, Module: 3, Helix: 25 * Degree, Shift: 0.4, Rack: isoA()})
	near(t, "teeth", hel.IdealSpanTeeth(), 4.63009, 0.5e-5)
	near(t, "W5", hel.Span(5), 42.0085, 0.51e-4)
}

// Chordal thickness: the same handbook's section (read), and Machinery's
// Handbook's table for 1 diametral pitch (recalled).
func TestChords(t *testing.T) {
	a := mustTooth(t, Spec{Teeth: 12, Module: 10, Shift: 0.3, Rack: isoA()})
	c := a.Chord(a.ReferenceDiameter() + 26)
	near(t, "chord", c.Thickness, 17.8256, 0.51e-4)
	near(t, "height", c.Height, 13.6657, 0.51e-4)
	h := mustTooth(t, Spec{Teeth: 16, Module: 5, Helix: 25 * Degree, Shift: 0.2, Rack: isoA()})
	c = h.Chord(h.ReferenceDiameter() + 12)
	near(t, "chord", c.Thickness, 8.5728, 0.51e-4)
	near(t, "height", c.Height, 6.1712, 0.51e-4)
	for _, r := range []struct {
		z    int
		s, h float64
	}{{8, 1.5607, 1.0769}, {10, 1.5643, 1.0616}, {14, 1.5675, 1.0440}, {15, 1.5679, 1.0411}, {20, 1.5692, 1.0308}, {30, 1.5701, 1.0206}} {
		tooth := mustTooth(t, Spec{Teeth: r.z, Module: 1, Rack: isoA()})
		c := tooth.Chord(tooth.TipDiameter())
		near(t, "chord", c.Thickness, r.s, 0.51e-4)
		near(t, "height", c.Height, r.h, 0.51e-4)
	}
	// Trap: an undersize blank. m 2.5, z 18, blank 49.900.
	tooth := mustTooth(t, Spec{Teeth: 18, Module: 2.5, Rack: isoA()})
	near(t, "height", tooth.Chord(49.9).Height, 2.53562, 0.51e-5)
	near(t, "chord", tooth.Chord(50).Thickness, 3.92201, 0.51e-5)
}

// Trap values of odd and helical gears over pins and balls, computed elsewhere.
func TestPinTraps(t *testing.T) {
	odd := mustTooth(t, Spec{Teeth: 17, Module: 2, Rack: isoA()})
	near(t, "two pins", reading(t, odd, TwoPins, 3.5).Value, 38.756841, 0.51e-6)
	near(t, "three pins", reading(t, odd, ThreePins, 3.5).Value, 38.60644, 0.51e-5)
	hel := mustTooth(t, Spec{Teeth: 17, Module: 2, Helix: 25 * Degree, Rack: isoA()})
	near(t, "two balls", reading(t, hel, TwoPins, 3.5).Value, 42.294947, 0.51e-6)
	opp := reading(t, hel, OpposedPins, 3.5)
	near(t, "opposed", opp.Value, 42.461148, 0.51e-6)
	near(t, "offset", opp.AxialOffset, 7.4336, 0.51e-4)
	free := reading(t, hel, FreePins, 3.5)
	near(t, "free", free.Value, 42.244636, 0.51e-6)
	near(t, "offset", free.AxialOffset, 2.249, 0.51e-3)

	h2 := mustTooth(t, Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: isoAt(17.5)})
	near(t, "balls", reading(t, h2, TwoPins, 3.25).Value, 29.818831124, 1e-9)
	near(t, "opposed", reading(t, h2, OpposedPins, 3.25).Value, 30.013970603, 1e-9)
	near(t, "free", reading(t, h2, FreePins, 3.25).Value, 29.590016982, 1e-9)

	small := mustTooth(t, Spec{Teeth: 17, Module: 1, Rack: isoA()})
	var imp *Impossible
	if _, err := small.Seat(1.2); !errors.As(err, &imp) || imp.Reason != PinFallsThrough || !(imp.Limit > 1.2) {
		t.Errorf("m 1 z 17 pin 1.2 must not rest on the involutes: %v", err)
	}
	under := mustTooth(t, Spec{Teeth: 8, Module: 2, Rack: isoA()})
	near(t, "M", reading(t, under, TwoPins, 2.8).Value, 18.283103715, 1e-9)
	seat, _ := under.Seat(2.8)
	near(t, "contact", seat.ContactDiameter, 15.0619, 0.51e-4)
	minus := mustTooth(t, Spec{Teeth: 40, Module: 2, Shift: -0.4, Rack: isoA()})
	near(t, "M", reading(t, minus, TwoPins, 2.4).Value, 77.910809676, 1e-9)
	seat, _ = minus.Seat(2.4)
	if c := minus.PinRootClearance(seat); c >= 0 {
		t.Errorf("the 2.4 pin must touch the root, clearance %g", c)
	}
	seat, _ = minus.Seat(5.5)
	if seat.ContactDiameter <= minus.TipFormDiameter() {
		t.Errorf("the 5.5 pin must touch above the tip: %g", seat.ContactDiameter)
	}
	near(t, "contact 3.5", func() float64 {
		s, _ := mustTooth(t, Spec{Teeth: 20, Module: 2, Rack: isoA()}).Seat(3.5)
		return s.ContactDiameter
	}(), 40.0834, 0.51e-4)
}

// Thickness against M is not linear (trap 14): m 2, z 20, pin 3.5.
func TestPinNotLinear(t *testing.T) {
	g, _ := NewGear(Spec{Teeth: 20, Module: 2, Rack: isoA()})
	nominal, _ := g.Nominal()
	m0 := reading(t, nominal, TwoPins, 3.5).Value
	near(t, "M", m0, 44.929290, 0.51e-6)
	for thin, fall := range map[float64]float64{0.05: 0.11244, 0.2: 0.45909, 0.5: 1.20579} {
		tooth, err := g.Tooth(g.NominalThickness() - thin)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "fall", m0-reading(t, tooth, TwoPins, 3.5).Value, fall, 0.51e-5)
	}
}

// A published profile-shifted pair: m 3, z 12/24, x 0.6/0.36 (widely reprinted
// metric gear handbook; recalled), with traps 3, 11, 12 and 22 about it.
func TestShiftedPair(t *testing.T) {
	g1, _ := NewGear(Spec{Teeth: 12, Module: 3, Shift: 0.6, Rack: isoA()})
	g2, _ := NewGear(Spec{Teeth: 24, Module: 3, Shift: 0.36, Rack: isoA()})
	m, err := NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	s1, s2 := g1.NominalThickness(), g2.NominalThickness()
	a, err := m.TightCenter(s1, s2)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "a", a, 56.4998697, 0.51e-7)
	alpha, _ := m.WorkingPressureAngle(a)
	near(t, "α_w", alpha/Degree, 26.0885634, 0.51e-7)
	p, _ := m.Backlash(a, s1-0.05, s2-0.05)
	near(t, "j_wt", p.Circumferential, 0.104629, 0.51e-6)
	near(t, "j_bn", p.Normal, 0.093969, 0.51e-6)
	near(t, "j_r", p.CenterPlay, 0.107268, 0.51e-6)
	p, _ = m.Backlash(56.88, s1, s2)
	near(t, "j at 56.88", p.Circumferential, 0.3799, 0.51e-4)
	t1, _ := g1.Nominal()
	t2, _ := g2.Nominal()
	c1, _ := m.TipClearances(a, t1, t2)
	near(t, "clearance", c1, 0.36987, 0.51e-5)
	c, _ := m.Contact(a, t1, t2)
	near(t, "ε_α full tips", c.TransverseRatio, 1.3478, 0.51e-4)
	near(t, "tip shortened", TipForClearance(a, t2.RootDiameter(), 0.75), 44.839739, 0.51e-6)
	g1s, _ := NewGear(Spec{Teeth: 12, Module: 3, Shift: 0.6, Rack: isoA(), TipDiameter: TipForClearance(a, t2.RootDiameter(), 0.75)})
	g2s, _ := NewGear(Spec{Teeth: 24, Module: 3, Shift: 0.36, Rack: isoA(), TipDiameter: TipForClearance(a, t1.RootDiameter(), 0.75)})
	ms, _ := NewMesh(g1s, g2s)
	t1, _ = g1s.Nominal()
	t2, _ = g2s.Nominal()
	c, _ = ms.Contact(a, t1, t2)
	near(t, "ε_α", c.TransverseRatio, 1.202102, 0.51e-6)
	near(t, "ζ_A1", c.SlidingA1.Value, -1.552832, 0.51e-6)
	near(t, "ζ_A2", c.SlidingA2.Value, 0.608278, 0.51e-6)
	near(t, "ζ_E1", c.SlidingE1.Value, 0.655786, 0.51e-6)
	near(t, "ζ_E2", c.SlidingE2.Value, -1.905168, 0.51e-6)
	if _, err := m.WorkingPressureAngle(50.74); err == nil {
		t.Error("center 50.74 is under the base circles")
	}
}

// Contact ratio with undercut (trap 7 and a 60-digit value computed elsewhere).
func TestActiveContactRatio(t *testing.T) {
	for _, c := range []struct {
		m            float64
		z1, z2       int
		tips, active float64
		tol          float64
	}{{2, 10, 40, 1.541508, 1.092709, 0.51e-6}, {1, 10, 30, 1.5115, 1.0927, 0.51e-4}} {
		t1 := mustTooth(t, Spec{Teeth: c.z1, Module: c.m, Rack: isoA()})
		t2 := mustTooth(t, Spec{Teeth: c.z2, Module: c.m, Rack: isoA()})
		m, _ := NewMesh(t1.Gear, t2.Gear)
		got, err := m.Contact(m.ReferenceCenter(), t1, t2)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "by tips", got.RatioByTips, c.tips, c.tol)
		near(t, "active", got.TransverseRatio, c.active, c.tol)
		for _, first := range []bool{true, false} {
			gap, err := m.FilletClearance(m.ReferenceCenter(), t1, t2, first)
			if err != nil || gap < -1e-6*c.m {
				t.Errorf("m %v %d/%d: tip into fillet by %g (%v)", c.m, c.z1, c.z2, -gap, err)
			}
			t.Logf("gap %v", gap)
		}
	}
}

// Backlash relations: eight rows computed two ways elsewhere (ISO 21771 relations).
func TestBacklashRows(t *testing.T) {
	for _, c := range []struct {
		m, alpha       float64
		z1, z2         int
		x1, x2, beta   float64
		t1, t2, a      float64
		jwt, jbt, jbn  float64
		arc1, arc2, jr float64
	}{
		{3, 20, 20, 40, 0, 0, 0, 0.05, 0.05, 90, 0.100000, 0.093969, 0.093969, 11.4592, 5.7296, 0.138179},
		{3, 20, 20, 40, 0, 0, 0, 0, 0, 90.1, 0.073179, 0.068690, 0.068690, 8.3764, 4.1882, 0.100000},
		{3, 20, 20, 40, 0, 0, 0, 0.05, 0.05, 90.03, 0.121906, 0.114516, 0.114516, 13.9648, 6.9824, 0.168179},
		{2, 20, 18, 45, 0.2, -0.1, 15, 0.04, 0.06, 65.45, 0.126853, 0.118292, 0.114740, 23.3202, 9.3281, 0.165184},
		{1.5875, 20, 18, 45, 0, 0, 0, 0.0254, 0.0254, 50.0063, 0.050836, 0.047771, 0.047771, 12.2319, 4.8927, 0.070209},
		{4, 14.5, 16, 30, 0, 0, 0, 0.05, 0.08, 92.05, 0.156051, 0.150999, 0.150999, 16.7554, 8.9362, 0.306787},
		{2.54, 20, 24, 60, 0, 0, 30, 0.03, 0.05, 123.25, 0.148478, 0.136806, 0.120765, 14.4949, 5.7980, 0.176725},
	} {
		g1, err1 := NewGear(Spec{Teeth: c.z1, Module: c.m, Helix: c.beta * Degree, Shift: c.x1, Rack: isoAt(c.alpha)})
		g2, err2 := NewGear(Spec{Teeth: c.z2, Module: c.m, Helix: -c.beta * Degree, Shift: c.x2, Rack: isoAt(c.alpha)})
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		m, err := NewMesh(g1, g2)
		if err != nil {
			t.Fatal(err)
		}
		p, err := m.Backlash(c.a, g1.NominalThickness()-c.t1, g2.NominalThickness()-c.t2)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "j_wt", p.Circumferential, c.jwt, 0.51e-6)
		near(t, "j_bt", p.Base, c.jbt, 0.51e-6)
		near(t, "j_bn", p.Normal, c.jbn, 0.51e-6)
		near(t, "j_θ1", p.AngleFirst/Degree*60, c.arc1, 0.51e-4)
		near(t, "j_θ2", p.AngleSecond/Degree*60, c.arc2, 0.51e-4)
		near(t, "j_r", p.CenterPlay, c.jr, 0.51e-6)
	}
}

// Ring gears go through the same formulas with z < 0 (values computed elsewhere two ways).
func TestRingBySignRule(t *testing.T) {
	for _, c := range []struct {
		z       int
		x, want float64
	}{{40, 0, 74.73861507}, {41, 0, 76.68494768}, {40, -0.25, 75.87945188}} {
		tooth := mustTooth(t, Spec{Teeth: -c.z, Module: 2, Shift: c.x, Rack: isoA()})
		near(t, "between pins", -reading(t, tooth, TwoPins, 3.5).Value, c.want, 0.51e-8)
	}
	g1, _ := NewGear(Spec{Teeth: 16, Module: 3, Rack: isoA()})
	g2, err := NewGear(Spec{Teeth: -24, Module: 3, Shift: -0.5, Rack: isoA()})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "s_n", g2.NominalThickness(), 3.62048, 0.51e-5)
	m, _ := NewMesh(g1, g2)
	a, err := m.TightCenter(g1.NominalThickness(), g2.NominalThickness())
	if err != nil {
		t.Fatal(err)
	}
	near(t, "|a|", -a, 13.1682677, 0.51e-7)
	ring, _ := NewGear(Spec{Teeth: -40, Module: 2, Rack: isoA()})
	near(t, "ring tip", -ring.TipDiameter(), 76, 1e-12)
	near(t, "ring root", -ring.RootDiameterAt(ring.NominalThickness()), 85, 1e-12)
}
