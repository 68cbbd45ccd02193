package involute

import "math"

// A Mesh is two gears on parallel axes. With a ring gear (z < 0) the center
// distance is negative in every formula.
type Mesh struct{ First, Second *Gear }

// baseMatch bounds how far two gears' bases may differ and still be one
// system: pitches given in inch and in mm for the same cutter agree to 1e-9.
const baseMatch = 1e-9

// NewMesh pairs two gears of one normal module, pressure angle and helix:
// hands opposite for two external gears, alike where one is a ring.
func NewMesh(first, second *Gear) (Mesh, error) {
	m := Mesh{first, second}
	near := func(a, b float64) bool { return math.Abs(a-b) <= baseMatch*max(math.Abs(a), math.Abs(b)) }
	b1, b2 := first.spec.Helix, second.spec.Helix
	if first.z*second.z > 0 {
		b2 = -b2
	}
	switch {
	case !near(first.spec.Module, second.spec.Module):
		return m, impossible(MatesDiffer, first.spec.Module, second.spec.Module)
	case !near(first.PressureAngle(), second.PressureAngle()):
		return m, impossible(MatesDiffer, first.PressureAngle(), second.PressureAngle())
	case !near(b1, b2):
		return m, impossible(MatesDiffer, first.spec.Helix, second.spec.Helix)
	case first.spec.Teeth+second.spec.Teeth == 0:
		return m, impossible(BadTeeth, first.z, 0)
	}
	return m, nil
}

// sumBase returns d_b1 + d_b2.
func (m Mesh) sumBase() float64 { return m.First.db + m.Second.db }

// LeastCenter returns (d_b1 + d_b2)/2: at this center distance the base
// circles touch and the working pressure angle is 0; it must be farther.
func (m Mesh) LeastCenter() float64 { return m.sumBase() / 2 }

// ReferenceCenter returns a_d = (d_1 + d_2)/2, mm (ISO 21771:2007, clause 5).
func (m Mesh) ReferenceCenter() float64 { return (m.First.d + m.Second.d) / 2 }

// Ratio returns u = z_2/z_1.
func (m Mesh) Ratio() float64 { return m.Second.z / m.First.z }

// WorkingPressureAngle returns α_wt at center distance a: cos α_wt =
// (d_b1 + d_b2)/(2 a), radians (ISO 21771:2007, clause 5).
func (m Mesh) WorkingPressureAngle(a float64) (float64, error) {
	c := m.sumBase() / (2 * a)
	if !(c > 0 && c < 1) {
		return 0, impossible(CenterTooSmall, math.Abs(a), math.Abs(m.LeastCenter()))
	}
	return math.Atan(tanOfCos(m.sumBase(), 2*a)), nil
}

// PitchDiameters returns d_w = d_b/cos α_wt of both gears at center distance a, mm (ISO 21771:2007, clause 5).
func (m Mesh) PitchDiameters(a float64) (dw1, dw2 float64) {
	k := 2 * a / (m.First.z + m.Second.z)
	return m.First.z * k, m.Second.z * k
}

// TightInv returns inv α_wt of the mesh without backlash for normal tooth
// thicknesses s1 and s2: inv α_t + ((s_n1 + s_n2)/cos β − p_t)/(d_1 + d_2).
// It may be negative: such teeth do not touch at any center distance.
func (m Mesh) TightInv(s1, s2 float64) float64 {
	g := m.First
	return g.invT + ((s1+s2)/math.Cos(g.spec.Helix)-g.TransversePitch())/(m.First.d+m.Second.d)
}

// TightCenter returns the center distance without backlash for normal tooth
// thicknesses s1 and s2, mm. With nominal teeth the condition is
// inv α_wt = inv α_t + 2 tan α_n (x_1 + x_2)/(z_1 + z_2) (ISO 21771:2007, clause 5).
func (m Mesh) TightCenter(s1, s2 float64) (float64, error) {
	inv := m.TightInv(s1, s2)
	alpha, ok := InverseInv(inv)
	if !ok {
		return 0, impossible(CenterNeverTight, inv, 0)
	}
	return m.sumBase() / 2 / math.Cos(alpha), nil
}

// ShiftSum returns the sum of the profile shifts x_1 + x_2 with which nominal
// teeth have no backlash at center distance a:
// (inv α_wt − inv α_t)(z_1 + z_2)/(2 tan α_n) (ISO 21771:2007, clause 5).
func (m Mesh) ShiftSum(a float64) (float64, error) {
	alpha, err := m.WorkingPressureAngle(a)
	if err != nil {
		return 0, err
	}
	g := m.First
	return (Inv(alpha) - g.invT) * (g.z + m.Second.z) / (2 * math.Tan(g.PressureAngle())), nil
}

// A Play is the backlash of a mesh at one center distance and pair of
// thicknesses, in its several words (ISO 21771:2007, clause 5). Negative where the
// teeth would have to overlap.
type Play struct {
	Circumferential float64 // j_wt, transverse, on the working pitch circles, mm
	Base            float64 // j_bt = j_wt cos α_wt, along the line of action, mm
	Normal          float64 // j_bn = j_bt cos β_b, mm
	AngleFirst      float64 // j_θ1 = 2 j_bt/|d_b1|: the first gear turns so far, the second held, radians
	AngleSecond     float64 // the same for the second, radians
	CenterPlay      float64 // j_r: how far the center distance may change until tight, mm
	CanTighten      bool    // false where no center distance is tight, and CenterPlay is up to the least center
}

// Backlash returns the play at center distance a of teeth with normal
// thicknesses s1 and s2: j_bt = (d_b1 + d_b2)(inv α_wt − inv α_wt,tight).
func (m Mesh) Backlash(a, s1, s2 float64) (Play, error) {
	alpha, err := m.WorkingPressureAngle(a)
	if err != nil {
		return Play{}, err
	}
	jbt := m.sumBase() * (Inv(alpha) - m.TightInv(s1, s2))
	p := Play{
		Circumferential: jbt / math.Cos(alpha),
		Base:            jbt,
		Normal:          jbt * math.Cos(m.First.betaB),
		AngleFirst:      2 * jbt / math.Abs(m.First.db),
		AngleSecond:     2 * jbt / math.Abs(m.Second.db),
	}
	tight, err := m.TightCenter(s1, s2)
	p.CanTighten = err == nil
	if !p.CanTighten {
		tight = m.LeastCenter()
	}
	p.CenterPlay = a - tight
	return p, nil
}

// ThinningForBacklash returns by how much the two teeth together must be
// thinner than the pair s1, s2 (normal, mm) so that the circumferential backlash at
// center distance a is jwt: (j_wt − j_wt(s1, s2)) cos α_wt cos β/cos α_t.
func (m Mesh) ThinningForBacklash(a, s1, s2, jwt float64) (float64, error) {
	p, err := m.Backlash(a, s1, s2)
	if err != nil {
		return 0, err
	}
	alpha, _ := m.WorkingPressureAngle(a)
	return (jwt - p.Circumferential) * m.ThinningPerBacklash(alpha), nil
}

// ThinningPerBacklash returns cos α_wt cos β/cos α_t: how much normal thinning
// on the reference cylinder makes a unit of circumferential backlash.
func (m Mesh) ThinningPerBacklash(alphaWt float64) float64 {
	g := m.First
	return math.Cos(alphaWt) * math.Cos(g.spec.Helix) / math.Cos(g.alphaT)
}

// TipClearances returns c = a − d_a/2 − d_f/2 of the first gear's tip to the
// second's root and the reverse, for the roots that the teeth have, mm
// (ISO 21771:2007, clause 5).
func (m Mesh) TipClearances(a float64, t1, t2 Tooth) (first, second float64) {
	return a - t1.da/2 - t2.RootDiameter()/2, a - t2.da/2 - t1.RootDiameter()/2
}

// TipForClearance returns the tip diameter of a gear that leaves the
// clearance c (mm) to a mate's root diameter at center distance a: 2a − d_f − 2c.
func TipForClearance(a, mateRoot, c float64) float64 { return 2*a - mateRoot - 2*c }

// OverlapRatio returns ε_β = b sin |β|/(π m_n) for the common face width b, mm (ISO 21771:2007, clause 5).
func (m Mesh) OverlapRatio(b float64) float64 {
	return b * math.Sin(math.Abs(m.First.spec.Helix)) / m.First.NormalPitch()
}
