package involute

import (
	"errors"
	"math"
	"testing"
)

// Traps of gear computation, each with its number in the project's list and the value that
// a program in the trap does not give. The values were computed elsewhere in
// double precision; α 20°, ISO 53 A unless said. Held by other tests of this
// package: 1, 2, 14 (TestPinTraps, TestPinNotLinear), 3, 11, 12, 22
// (TestShiftedPair), 7 (TestActiveContactRatio), 19 (TestChords), 21 (TestInvTraps).
// 26 to 30 belong to other fields.

func external(z int, m, x float64) Spec {
	return Spec{Teeth: z, Module: m, Shift: x, Rack: isoA()}
}

func mustMesh(t *testing.T, a, b Tooth) Mesh {
	t.Helper()
	m, err := NewMesh(a.Gear, b.Gear)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func refusedFor(t *testing.T, what string, err error, want Reason) *Impossible {
	t.Helper()
	var imp *Impossible
	if !errors.As(err, &imp) || imp.Reason != want {
		t.Fatalf("%s: %v, want reason %d", what, err, want)
	}
	return imp
}

// Trap 4: the sign of a ring's shift. Taken over from the convention where
// outward is positive, the same pair has no solution.
func TestTrap04RingShiftSign(t *testing.T) {
	pinion := mustTooth(t, external(16, 3, 0))
	ring := mustTooth(t, external(-24, 3, -0.5))
	near(t, "s_n", ring.Thickness(), 3.62048, 0.51e-5)
	m := mustMesh(t, pinion, ring)
	a, err := m.TightCenter(pinion.Thickness(), ring.Thickness())
	if err != nil {
		t.Fatal(err)
	}
	alpha, err := m.WorkingPressureAngle(a)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "α_w", alpha/Degree, 31.0936, 0.51e-4)
	near(t, "|a|", -a, 13.1683, 0.51e-4)
	over := external(-24, 3, 0.5)
	over.TipDiameter = -69 // its own would lie inside the base circle
	wrong, err := NewGear(over)
	if err != nil {
		t.Fatal(err)
	}
	_, err = Mesh{pinion.Gear, wrong}.TightCenter(pinion.Thickness(), wrong.NominalThickness())
	imp := refusedFor(t, "sign taken over", err, CenterNeverTight)
	near(t, "inv α_w", imp.Value, -0.030592, 0.51e-6)
}

// Trap 5: a ring is a gear turned inside out: tip inside, root outside, and a
// smaller |a| gives more backlash.
func TestTrap05RingInsideOut(t *testing.T) {
	ring := mustTooth(t, external(-40, 2, 0))
	near(t, "tip", -ring.TipDiameter(), 76, 1e-12)
	near(t, "root", -ring.RootDiameter(), 85, 1e-12)
	pinion := mustTooth(t, external(18, 2, 0))
	m := mustMesh(t, pinion, ring)
	c1, c2 := m.TipClearances(m.ReferenceCenter(), pinion, ring)
	near(t, "clearance", c1, 0.5, 1e-12)
	near(t, "clearance", c2, 0.5, 1e-12)
	at := func(a float64) float64 {
		p, err := m.Backlash(a, pinion.Thickness(), ring.Thickness())
		if err != nil {
			t.Fatal(err)
		}
		return p.Circumferential
	}
	tight := m.ReferenceCenter()
	near(t, "at the reference center", at(tight), 0, 1e-12)
	if !(at(tight+0.1) > 0 && at(tight-0.1) < 0) {
		t.Errorf("ring: nearer by 0.1 %g, farther %g", at(tight+0.1), at(tight-0.1))
	}
}

// Trap 6: the usual form diameter squares a lever that is negative on an undercut tooth.
func TestTrap06FormDiameterOfUndercut(t *testing.T) {
	for _, c := range []struct {
		z             int
		formula, real float64
	}{{10, 9.7053, 9.4512}, {8, 8.1359, 7.6136}, {14, 13.1983, 13.1650}} {
		tooth := mustTooth(t, external(c.z, 1, 0))
		s := math.Sin(20 * Degree)
		h := 1.25 - 0.38*(1-s) // where the tool's straight flank ends, 1.0 but for the rounding of 0.38
		near(t, "formula", 2*math.Hypot(tooth.BaseDiameter()/2, float64(c.z)/2*s-h/s), c.formula, 0.51e-4)
		near(t, "real", tooth.FormDiameter(), c.real, 0.51e-4)
		if !tooth.Undercut() {
			t.Errorf("z %d is undercut", c.z)
		}
	}
}

// Trap 8: a span has a formula for every k; the contact diameters tell which k to use.
func TestTrap08SpanTeeth(t *testing.T) {
	tooth := mustTooth(t, external(20, 1, 0))
	near(t, "form", tooth.FormDiameter(), 18.820, 0.51e-3)
	near(t, "tip", tooth.TipFormDiameter(), 22, 1e-12)
	for i, c := range []struct{ w, at float64 }{
		{1.7562, 18.876}, {4.7083, 19.375}, {7.6604, 20.295}, {10.6126, 21.583}, {13.5647, 23.178},
	} {
		w := tooth.Span(i + 1)
		near(t, "W", w, c.w, 0.51e-4)
		near(t, "contact", tooth.SpanContactDiameter(w), c.at, 0.51e-3)
	}
	near(t, "ideal teeth", math.Round(tooth.IdealSpanTeeth()), 3, 0)
}

// Trap 9: a helical span needs face width, and touches by W cos β_b.
// (TestSpanByRockedFaces shows why.)
func TestTrap09HelicalSpanFace(t *testing.T) {
	s := external(30, 4, 0)
	s.Helix = 25 * Degree
	tooth := mustTooth(t, s)
	w := tooth.Span(5)
	near(t, "W", w, 55.3614, 0.51e-4)
	near(t, "β_b", tooth.BaseHelix()/Degree, 23.3990, 0.51e-4)
	near(t, "face", tooth.SpanFaceWidth(w), 21.986, 0.51e-3)
	near(t, "contact", tooth.SpanContactDiameter(w), math.Hypot(tooth.BaseDiameter(), 55.3614*math.Cos(23.3990*Degree)), 1e-4)
}

// Trap 10: thinning by feeding the cutter deeper lowers the root by t/tan α.
func TestTrap10ThinningLowersRoot(t *testing.T) {
	g, err := NewGear(external(30, 2, 0))
	if err != nil {
		t.Fatal(err)
	}
	s := g.NominalThickness()
	near(t, "root", g.RootDiameterAt(s)-g.RootDiameterAt(s-0.1), 0.2747, 0.51e-4)
}

// Trap 13: j = 2 Δa tan α is first order, and by the working angle.
func TestTrap13BacklashNotLinear(t *testing.T) {
	t1, t2 := mustTooth(t, external(20, 3, 0)), mustTooth(t, external(40, 3, 0))
	m := mustMesh(t, t1, t2)
	p, err := m.Backlash(90.1, t1.Thickness(), t2.Thickness())
	if err != nil {
		t.Fatal(err)
	}
	near(t, "j_wt", p.Circumferential, 0.073179, 0.51e-6)
	near(t, "rule", 0.2*math.Tan(20*Degree), 0.072794, 0.51e-6)
}

// Trap 15: a rounded pin is another pin.
func TestTrap15RoundedPin(t *testing.T) {
	tooth := mustTooth(t, external(20, 25.4/6, 0))
	near(t, "M 7.3152", reading(t, tooth, TwoPins, 7.3152).Value, 94.78441, 0.51e-5)
	near(t, "M 7.30", reading(t, tooth, TwoPins, 7.30).Value, 94.73259, 0.51e-5)
	seat, err := tooth.Seat(7.3152)
	if err != nil {
		t.Fatal(err)
	}
	_, byPin := tooth.PinSensitivity(TwoPins, seat)
	near(t, "dM/dD", byPin, 3.407, 0.51e-3)
}

// Trap 16: normal or transverse pitch.
func TestTrap16NormalOrTransverse(t *testing.T) {
	normal := external(24, 2.54, 0)
	normal.Helix = 30 * Degree
	transverse := normal
	transverse.Module = 2.54 * math.Cos(30*Degree)
	near(t, "d normal, in", mustTooth(t, normal).ReferenceDiameter()/25.4, 2.7713, 0.51e-4)
	near(t, "d transverse, in", mustTooth(t, transverse).ReferenceDiameter()/25.4, 2.4, 1e-12)
	near(t, "α_t", mustTooth(t, normal).TransversePressureAngle()/Degree, 22.7959, 0.51e-4)
}

// Trap 17: 16 P is not module 1.6.
func TestTrap17SixteenPitch(t *testing.T) {
	p16, m16 := mustTooth(t, external(40, 25.4/16, 0)), mustTooth(t, external(40, 1.6, 0))
	near(t, "d", p16.ReferenceDiameter(), 63.5, 1e-12)
	near(t, "d", m16.ReferenceDiameter(), 64, 1e-12)
	near(t, "p_b", p16.NormalBasePitch(), 4.6865, 0.51e-4)
	near(t, "p_b", m16.NormalBasePitch(), 4.7234, 0.51e-4)
}

// Trap 18: two spans give the base pitch, whatever the thickness, and two
// systems can share it to half a micrometer.
func TestTrap18TwoSpans(t *testing.T) {
	for _, c := range []struct{ m, alpha, want float64 }{{25.4 / 14, 25, 5.16572}, {1.75, 20, 5.16623}} {
		g, err := NewGear(Spec{Teeth: 30, Module: c.m, Rack: isoAt(c.alpha)})
		if err != nil {
			t.Fatal(err)
		}
		for _, thin := range []float64{0, 0.1} {
			tooth, err := g.Tooth(g.NominalThickness() - thin)
			if err != nil {
				t.Fatal(err)
			}
			near(t, "W_4 − W_3", tooth.Span(4)-tooth.Span(3), c.want, 0.51e-5)
		}
	}
}

// Trap 20: pins that do not fit. (TestPushedBallRestsInSeat pushes more of them.)
func TestTrap20PinsThatDoNotFit(t *testing.T) {
	s := external(-24, 2, 0)
	s.TipDiameter = -46 // its own would lie inside the base circle
	ring := mustTooth(t, s)
	if _, err := ring.Seat(3.6243); err != nil {
		t.Errorf("3.6243 fits the formula: %v", err)
	}
	_, err := ring.Seat(3.65)
	refusedFor(t, "pin 3.65 in the ring", err, PinFallsThrough)
	tooth := mustTooth(t, external(20, 2, 0))
	m := reading(t, tooth, TwoPins, 2.8).Value
	near(t, "M 2.8", m, 42.3338, 0.51e-4)
	if m >= tooth.TipDiameter() {
		t.Error("the anvils must meet the teeth first")
	}
	seat, err := tooth.Seat(3.5)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "d_K", seat.CenterDiameter, 41.4293, 0.51e-4)
	near(t, "contact", seat.ContactDiameter, 40.0834, 0.51e-4)
}

// Trap 23: three virtual tooth numbers.
func TestTrap23VirtualTeeth(t *testing.T) {
	s := external(16, 1, 0)
	s.Helix = 25 * Degree
	tooth := mustTooth(t, s)
	near(t, "z/cos³ β", tooth.VirtualTeeth(), 21.4928, 0.51e-4)
	cb := math.Cos(tooth.BaseHelix())
	near(t, "z/(cos² β_b cos β)", 16/(cb*cb*math.Cos(s.Helix)), 20.9597, 0.51e-4)
	// The span's number: W of the helical gear is that of a spur gear of so
	// many teeth, W = m cos α (π (k − 1/2) + z_v inv α).
	spur := tooth.Span(3)/(math.Cos(20*Degree)) - 2.5*math.Pi
	near(t, "z inv α_t/inv α_n", spur/Inv(20*Degree), 21.1638, 0.51e-4)
}

// Trap 24: cutter number and undercut limit of a helical gear.
func TestTrap24HelicalUndercut(t *testing.T) {
	s := Spec{Teeth: 24, Module: 1, Helix: 30 * Degree, Rack: Rack{20 * Degree, 1, 1, 0}}
	near(t, "virtual", mustTooth(t, s).VirtualTeeth(), 36.95, 0.51e-2)
	for _, c := range []struct {
		beta, least float64
		passes      int
	}{{30, 11.538, 12}, {0, 17.097, 18}} {
		for z := c.passes - 1; z <= c.passes; z++ {
			s.Teeth, s.Helix = z, c.beta*Degree
			tooth := mustTooth(t, s)
			if tooth.Undercut() != (z < c.passes) {
				t.Errorf("β %v z %d: undercut %v", c.beta, z, tooth.Undercut())
			}
			near(t, "least z", float64(z)/(1-tooth.UndercutLimit()), c.least, 0.51e-3)
		}
	}
}

// Trap 25: pointed teeth; beyond, every formula still has a tip diameter.
func TestTrap25PointedTeeth(t *testing.T) {
	for _, c := range []struct{ x, want float64 }{{0.5, 0.1989}, {0.6, 0.1023}, {0.65, 0.0517}} {
		tooth := mustTooth(t, external(10, 1, c.x))
		near(t, "s_a", tooth.TipThickness(), c.want, 0.51e-4)
		thin, err := tooth.Gear.Tooth(tooth.Thickness() - 0.02)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "thinned", tooth.TipThickness()-thin.TipThickness(), 0.02*tooth.TipDiameter()/10, 1e-12)
	}
	g, err := NewGear(external(10, 1, 0.7))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "s_a", Tooth{Gear: g, sn: g.NominalThickness()}.TipThickness(), -0.0004, 0.51e-4)
	_, err = g.Nominal()
	refusedFor(t, "x 0.7", err, Pointed)
}
