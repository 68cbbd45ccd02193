package involute

import (
	"math"
	"strconv"
	"strings"
	"testing"
)

// Published examples, recalled unless said otherwise. They were recomputed
// elsewhere; where the book's last digit comes from its own rounding, the
// recomputed value stands here and the comment gives the reason.

// prints fails where got does not round to the printed digits.
func prints(t *testing.T, what string, got float64, printed string) {
	t.Helper()
	want, err := strconv.ParseFloat(printed, 64)
	if err != nil {
		t.Fatal(err)
	}
	_, decimals, _ := strings.Cut(printed, ".")
	if !(math.Abs(got-want) <= 0.5001*math.Pow10(-len(decimals))) {
		t.Errorf("%s = %.9f, printed %s", what, got, printed)
	}
}

// tight returns the mesh of two gears at the center distance without backlash.
func tight(t *testing.T, a, b Tooth) (m Mesh, center, alpha float64) {
	t.Helper()
	m = mustMesh(t, a, b)
	center, err := m.TightCenter(a.Thickness(), b.Thickness())
	if err != nil {
		t.Fatal(err)
	}
	alpha, err = m.WorkingPressureAngle(center)
	if err != nil {
		t.Fatal(err)
	}
	return m, center, alpha
}

// A metric gear handbook's profile shifted spur pair (widely reprinted):
// m 3, z 12/24, x 0.6/0.36, tips shortened to keep the clearance.
func TestExampleShiftedSpurPair(t *testing.T) {
	a, b := mustTooth(t, external(12, 3, 0.6)), mustTooth(t, external(24, 3, 0.36))
	m, center, alpha := tight(t, a, b)
	prints(t, "inv α_w", Inv(alpha), "0.034316")
	prints(t, "α_w", alpha/Degree, "26.0886")
	prints(t, "y", (center-m.ReferenceCenter())/3, "0.83329")
	prints(t, "a", center, "56.4999")
	prints(t, "d_b1", a.BaseDiameter(), "33.8289")
	prints(t, "d_b2", b.BaseDiameter(), "67.6579")
	dw1, dw2 := m.PitchDiameters(center)
	prints(t, "d_w1", dw1, "37.667")
	prints(t, "d_w2", dw2, "75.333")
	prints(t, "d_f1", a.RootDiameter(), "32.100")
	prints(t, "d_f2", b.RootDiameter(), "66.660")
	da1, da2 := TipForClearance(center, b.RootDiameter(), 0.75), TipForClearance(center, a.RootDiameter(), 0.75)
	prints(t, "d_a1", da1, "44.840")
	prints(t, "d_a2", da2, "79.400")
	prints(t, "h_a1", (da1-a.ReferenceDiameter())/2, "4.420")
	prints(t, "h_a2", (da2-b.ReferenceDiameter())/2, "3.700")
	prints(t, "h", (da1-a.RootDiameter())/2, "6.370")
	// Backwards: the sum of the shifts for a printed center distance.
	back, err := m.WorkingPressureAngle(56.4999)
	if err != nil {
		t.Fatal(err)
	}
	prints(t, "x_1 + x_2", 36*(Inv(back)-Inv(20*Degree))/2/math.Tan(20*Degree), "0.9600")
}

// The same handbook's helical pair, normal system: m_n 3, β 30°, z 12/60, x 0.09809/0.
func TestExampleHelicalPair(t *testing.T) {
	s1, s2 := external(12, 3, 0.09809), external(60, 3, 0)
	s1.Helix, s2.Helix = 30*Degree, -30*Degree
	a, b := mustTooth(t, s1), mustTooth(t, s2)
	m, center, alpha := tight(t, a, b)
	prints(t, "α_t", a.TransversePressureAngle()/Degree, "22.79588")
	prints(t, "inv α_wt", Inv(alpha), "0.023405")
	prints(t, "α_wt", alpha/Degree, "23.1126")
	prints(t, "y", (center-m.ReferenceCenter())/3, "0.09744768") // printed 0.09744, truncated
	prints(t, "a", center, "125.000")
	prints(t, "d_1", a.ReferenceDiameter(), "41.569")
	prints(t, "d_2", b.ReferenceDiameter(), "207.846")
	prints(t, "d_b1", a.BaseDiameter(), "38.322")
	prints(t, "d_b2", b.BaseDiameter(), "191.611")
	dw1, dw2 := m.PitchDiameters(center)
	prints(t, "d_w1", dw1, "41.667")
	prints(t, "d_w2", dw2, "208.333")
	prints(t, "d_f1", a.RootDiameter(), "34.657759") // printed 34.657, from rounded heights
	prints(t, "d_f2", b.RootDiameter(), "200.346")
	da1, da2 := TipForClearance(center, b.RootDiameter(), 0.75), TipForClearance(center, a.RootDiameter(), 0.75)
	prints(t, "h_a1", (da1-a.ReferenceDiameter())/2, "3.292")
	prints(t, "h_a2", (da2-b.ReferenceDiameter())/2, "2.998")
	prints(t, "h", (da1-a.RootDiameter())/2, "6.748")
	prints(t, "d_a1", da1, "48.153905") // printed 48.153, from rounded heights
	prints(t, "d_a2", da2, "213.842")
}

// The same handbook's internal pair: m 3, z 16/24, the ring's x +0.5 outward,
// −0.5 by ISO 21771.
func TestExampleInternalPair(t *testing.T) {
	a, b := mustTooth(t, external(16, 3, 0)), mustTooth(t, external(-24, 3, -0.5))
	m, center, alpha := tight(t, a, b)
	prints(t, "inv α_w", Inv(alpha), "0.060401")
	prints(t, "α_w", alpha/Degree, "31.0936207")                  // printed 31.0937, from the rounded inv
	prints(t, "y", (m.ReferenceCenter()-center)/3, "0.389422569") // printed 0.389426, from the rounded angle
	prints(t, "a", -center, "13.1683")
	prints(t, "d_b1", a.BaseDiameter(), "45.105")
	prints(t, "d_b2", -b.BaseDiameter(), "67.658")
	dw1, dw2 := m.PitchDiameters(center)
	prints(t, "d_w1", dw1, "52.673")
	prints(t, "d_w2", -dw2, "79.010")
}

// Center distance cut wrong (Shigley, example 13-1): P 2, 16/40, a quarter
// inch too long.
func TestExampleCenterCutWrong(t *testing.T) {
	const in = 25.4
	a, b := mustTooth(t, external(16, in/2, 0)), mustTooth(t, external(40, in/2, 0))
	m := mustMesh(t, a, b)
	prints(t, "circular pitch", a.TransversePitch()/in, "1.571")
	prints(t, "pitch diameter", a.ReferenceDiameter()/in, "8.000")
	prints(t, "center", m.ReferenceCenter()/in, "14.000")
	prints(t, "base radius", a.BaseDiameter()/2/in, "3.76")
	prints(t, "base radius", b.BaseDiameter()/2/in, "9.40")
	dw1, dw2 := m.PitchDiameters(14.25 * in)
	prints(t, "new pitch diameter", dw1/in, "8.143")
	prints(t, "new pitch diameter", dw2/in, "20.357")
	alpha, err := m.WorkingPressureAngle(14.25 * in)
	if err != nil {
		t.Fatal(err)
	}
	prints(t, "new pressure angle", alpha/Degree, "22.60051") // printed 22.56, from the rounded base radius
}

// Helical pitches (Shigley, example 13-2): transverse P 6, 18 teeth, α_n 20°, β 25°.
func TestExampleHelicalPitches(t *testing.T) {
	const in = 25.4
	s := external(18, in/6*math.Cos(25*Degree), 0)
	s.Helix = 25 * Degree
	g := mustTooth(t, s)
	prints(t, "pitch diameter", g.ReferenceDiameter()/in, "3.000")
	prints(t, "transverse pitch", g.TransversePitch()/in, "0.5236")
	prints(t, "normal pitch", g.NormalPitch()/in, "0.4745")
	axial, ok := g.AxialPitch()
	if !ok {
		t.Fatal("a helical gear has an axial pitch")
	}
	prints(t, "axial pitch", axial/in, "1.123")
	prints(t, "normal P", in/g.Module(), "6.620")
	prints(t, "α_t", g.TransversePressureAngle()/Degree, "21.88")
}

// Smallest tooth numbers without interference and largest mates, full depth,
// 20° (Shigley, section 13-7; tables in Norton): the mate's tip starts contact
// no lower than the base circle.
func TestExampleSmallestTeeth(t *testing.T) {
	clear := func(z, mate int) bool {
		rack := Rack{20 * Degree, 1, 1.25, 0}
		g1, err1 := NewGear(Spec{Teeth: z, Module: 1, Rack: rack})
		g2, err2 := NewGear(Spec{Teeth: mate, Module: 1, Rack: rack})
		if err1 != nil || err2 != nil {
			t.Fatal(err1, err2)
		}
		m, err := NewMesh(g1, g2)
		if err != nil {
			t.Fatal(err)
		}
		a := m.ReferenceCenter()
		alpha, err := m.WorkingPressureAngle(a)
		if err != nil {
			t.Fatal(err)
		}
		return g2.BaseDiameter()/2*g2.RollAngle(g2.TipDiameter()) <= a*math.Sin(alpha)
	}
	for _, c := range []struct{ z, mate int }{{13, 16}, {14, 26}, {15, 45}, {16, 101}, {17, 1309}} {
		if !clear(c.z, c.mate) || clear(c.z, c.mate+1) {
			t.Errorf("%d teeth: the largest mate is %d; %v there, %v one more", c.z, c.mate, clear(c.z, c.mate), clear(c.z, c.mate+1))
		}
	}
	for _, c := range []struct{ least, ratio int }{{13, 1}, {16, 4}, {18, 10000}} {
		if !clear(c.least, c.least*c.ratio) || clear(c.least-1, (c.least-1)*c.ratio) {
			t.Errorf("ratio %d: %d teeth are the fewest", c.ratio, c.least)
		}
	}
}

// Mesh parameters (Norton, example 12-1): P 6, 19/37, then 2 percent longer.
func TestExampleMeshParameters(t *testing.T) {
	const in = 25.4
	a, b := mustTooth(t, external(19, in/6, 0)), mustTooth(t, external(37, in/6, 0))
	m := mustMesh(t, a, b)
	center := m.ReferenceCenter()
	prints(t, "ratio", m.Ratio(), "1.947")
	prints(t, "circular pitch", a.TransversePitch()/in, "0.524")
	prints(t, "base pitch", a.TransverseBasePitch()/in, "0.492")
	prints(t, "pitch diameter", a.ReferenceDiameter()/in, "3.167")
	prints(t, "pitch diameter", b.ReferenceDiameter()/in, "6.167")
	prints(t, "center", center/in, "4.667")
	prints(t, "outside diameter", a.TipDiameter()/in, "3.500")
	prints(t, "outside diameter", b.TipDiameter()/in, "6.500")
	c, err := m.Contact(center, a, b)
	if err != nil {
		t.Fatal(err)
	}
	prints(t, "contact ratio", c.TransverseRatio, "1.62")
	dw1, dw2 := m.PitchDiameters(1.02 * center)
	prints(t, "new pitch diameter", dw1/in, "3.230")
	prints(t, "new pitch diameter", dw2/in, "6.290")
	alpha, err := m.WorkingPressureAngle(1.02 * center)
	if err != nil {
		t.Fatal(err)
	}
	prints(t, "new pressure angle", alpha/Degree, "22.89")
}

// Over pins and balls, computed elsewhere once by the formula and once by the
// distance from the pin's center to the flank.
func TestExampleOverPinsTwoWays(t *testing.T) {
	prints(t, "M", reading(t, mustTooth(t, external(20, 3, 0.3)), TwoPins, 5.5).Value, "69.57287226")
	s := external(20, 3, 0.4)
	s.Helix = 15 * Degree
	prints(t, "M", reading(t, mustTooth(t, s), TwoPins, 5.5).Value, "72.18125438")
}

// The published shifted pair backwards: center distance 56.4999 gives a sum of
// shifts of 0.9600 (widely reprinted metric gear handbook; recalled).
func TestShiftSum(t *testing.T) {
	g1, _ := NewGear(Spec{Teeth: 12, Module: 3, Shift: 0.6, Rack: isoA()})
	g2, _ := NewGear(Spec{Teeth: 24, Module: 3, Shift: 0.36, Rack: isoA()})
	m, err := NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	sum, err := m.ShiftSum(56.4999)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "x1 + x2", sum, 0.9600, 0.51e-4)
	if _, err := m.ShiftSum(50); err == nil {
		t.Error("a center under the base circles has a sum of shifts")
	}
}
