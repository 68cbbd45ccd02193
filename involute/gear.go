package involute

import "math"

// A Spec is what a drawing says of a gear, without its tooth thickness.
type Spec struct {
	Teeth       int     // z; negative for an internal gear
	Module      float64 // m_n, normal, mm
	Helix       float64 // β at the reference cylinder, radians; right hand positive
	Shift       float64 // x, profile shift coefficient (× m_n); positive thickens the tooth
	Rack        Rack
	TipDiameter float64 // d_a, mm, with the sign of z; 0 for d + 2 m_n (h_aP* + x)
	Topped      bool    // the cutter cuts the tip too: d_a holds at nominal thickness and follows the cutter's depth
	TipChamfer  float64 // radial height of a 45° chamfer of the tip corner, mm; external gears only
	TipRound    float64 // radius of a rounding of the tip corner, mm; external gears only
	Relief      ReliefSpec
	Thinning    Thinning
	Mill        MillSpec
}

// A Thinning is how a tooth is made thinner than nominal.
type Thinning int

// The ways. A milled root takes its depth from MillSpec, so its flanks alone move.
const (
	Infeed     Thinning = iota // the cutter goes deeper, and the root with it
	FlanksOnly                 // the flanks move, each with its fillet, and the root circle stays
)

// A Gear is a possible Spec with the dimensions that do not depend on the
// tooth thickness. It does not change.
type Gear struct {
	spec     Spec
	z        float64
	alphaT   float64
	betaB    float64 // ≥ 0
	invT     float64
	d, db    float64
	da, daFa float64
	relief   Relief // on a first flank that leaves the base circle at polar angle 0
}

// NewGear works a Spec out, or says by an *Impossible why it cannot be.
func NewGear(s Spec) (*Gear, error) {
	alpha, beta := s.Rack.PressureAngle, math.Abs(s.Helix)
	switch {
	case !finite(s.Module, s.Helix, s.Shift, s.TipDiameter, s.TipChamfer, s.TipRound,
		s.Relief.Amount, s.Relief.Start, s.Mill.Diameter, s.Mill.RootDiameter):
		return nil, impossible(NotFinite, s.Module, 0)
	case s.Teeth == 0:
		return nil, impossible(BadTeeth, 0, 1)
	case s.Module <= 0:
		return nil, impossible(BadModule, s.Module, 0)
	case beta > 80*Degree:
		return nil, impossible(BadHelix, beta, 80*Degree)
	}
	if err := s.Rack.validate(); err != nil {
		return nil, err
	}
	g := &Gear{spec: s, z: float64(s.Teeth)}
	g.alphaT = math.Atan(math.Tan(alpha) / math.Cos(beta))
	g.betaB = math.Asin(math.Sin(beta) * math.Cos(alpha))
	g.invT = Inv(g.alphaT)
	g.d = g.z * s.Module / math.Cos(beta)
	g.db = g.d * math.Cos(g.alphaT)
	g.da = g.drawnTip()
	g.daFa = g.da
	if err := g.checkMill(); err != nil {
		return g, err
	}
	if err := g.check(); err != nil {
		return g, err
	}
	return g, g.endFlank()
}

func (g *Gear) check() error {
	external := g.z > 0
	root := g.RootDiameterAt(g.NominalThickness())
	switch {
	case !finite(g.d, g.db, g.da, root):
		return impossible(NotFinite, g.spec.Module, 0)
	case external && root <= 0:
		return impossible(RootNotPositive, root, 0)
	case g.da <= root:
		return impossible(TipBelowRoot, math.Abs(g.da), math.Abs(root))
	case math.Abs(g.da) <= math.Abs(g.db):
		return impossible(TipBelowBase, math.Abs(g.da), math.Abs(g.db))
	}
	return nil
}

// drawnTip returns the tip diameter that the drawing says, or the rack's.
func (g *Gear) drawnTip() float64 {
	if d := g.spec.TipDiameter; d != 0 {
		return d
	}
	return g.d + 2*g.spec.Module*(g.spec.Rack.Addendum+g.spec.Shift)
}

// Spec returns what the gear was made from.
func (g *Gear) Spec() Spec { return g.spec }

// Teeth returns z, negative for an internal gear.
func (g *Gear) Teeth() int { return g.spec.Teeth }

// Module returns the normal module m_n, mm.
func (g *Gear) Module() float64 { return g.spec.Module }

// Helical reports whether β differs from 0.
func (g *Gear) Helical() bool { return g.spec.Helix != 0 }

// TransverseModule returns m_t = m_n / cos β, mm (ISO 21771:2007, clause 4).
func (g *Gear) TransverseModule() float64 { return g.spec.Module / math.Cos(g.spec.Helix) }

// PressureAngle returns the normal pressure angle α_n, radians.
func (g *Gear) PressureAngle() float64 { return g.spec.Rack.PressureAngle }

// TransversePressureAngle returns α_t, tan α_t = tan α_n / cos β, radians (ISO 21771:2007, clause 4).
func (g *Gear) TransversePressureAngle() float64 { return g.alphaT }

// BaseHelix returns β_b ≥ 0, sin β_b = sin β cos α_n, radians (ISO 21771:2007, clause 4).
func (g *Gear) BaseHelix() float64 { return g.betaB }

// HelixAt returns the helix angle ≥ 0 on the cylinder of diameter d: tan β_y = tan β · d_y/d, radians
// (ISO 21771:2007, clause 4).
func (g *Gear) HelixAt(d float64) float64 {
	return math.Atan(math.Tan(math.Abs(g.spec.Helix)) * d / g.d)
}

// ReferenceDiameter returns d = z m_n / cos β, mm (ISO 21771:2007, clause 4).
func (g *Gear) ReferenceDiameter() float64 { return g.d }

// BaseDiameter returns d_b = d cos α_t, mm (ISO 21771:2007, clause 4).
func (g *Gear) BaseDiameter() float64 { return g.db }

// TipDiameter returns d_a = d + 2 m_n (h_aP* + x), or the one given, mm (ISO 21771:2007, clause 4).
func (g *Gear) TipDiameter() float64 { return g.da }

// TipFormDiameter returns d_Fa, where the flank ends at the tip: at the chamfer
// or the rounding, or at d_a, mm. A relieved flank counts up to its end.
func (g *Gear) TipFormDiameter() float64 { return g.daFa }

// TransversePitch returns p_t = π m_t, mm (ISO 21771:2007, clause 4).
func (g *Gear) TransversePitch() float64 { return math.Pi * g.TransverseModule() }

// NormalPitch returns p_n = π m_n, mm (ISO 21771:2007, clause 4).
func (g *Gear) NormalPitch() float64 { return math.Pi * g.spec.Module }

// TransverseBasePitch returns p_bt = p_t cos α_t, mm (ISO 21771:2007, clause 4).
func (g *Gear) TransverseBasePitch() float64 { return g.TransversePitch() * math.Cos(g.alphaT) }

// NormalBasePitch returns p_bn = p_n cos α_n, mm (ISO 21771:2007, clause 4).
func (g *Gear) NormalBasePitch() float64 { return g.NormalPitch() * math.Cos(g.PressureAngle()) }

// AxialPitch returns p_x = π m_n / sin |β|, mm, false for a spur gear (ISO 21771:2007, clause 4).
func (g *Gear) AxialPitch() (px float64, ok bool) {
	if !g.Helical() {
		return 0, false
	}
	return g.NormalPitch() / math.Sin(math.Abs(g.spec.Helix)), true
}

// Lead returns p_z = |z| p_x, mm, false for a spur gear (ISO 21771:2007, clause 4).
func (g *Gear) Lead() (pz float64, ok bool) {
	px, ok := g.AxialPitch()
	return px * math.Abs(g.z), ok
}

// NominalThickness returns s_n = m_n (π/2 + 2 x tan α_n) at the reference cylinder, mm (ISO 21771:2007, clause 4).
func (g *Gear) NominalThickness() float64 {
	return g.spec.Module * (math.Pi/2 + 2*g.spec.Shift*math.Tan(g.PressureAngle()))
}

// GeneratingShift returns x_E, the shift of the rack that cuts a tooth of
// normal thickness sn by being fed deeper: (s_n/m_n − π/2)/(2 tan α_n)
// (ISO 21771:2007, clause 4). Where the flanks alone are moved it is x itself.
func (g *Gear) GeneratingShift(sn float64) float64 {
	if !g.FedDeeper() {
		return g.spec.Shift
	}
	return (sn/g.spec.Module - math.Pi/2) / g.ThinningPerDepth()
}

// FedDeeper reports whether a thinner tooth is one cut deeper, and not one whose
// flanks alone were moved.
func (g *Gear) FedDeeper() bool { return g.spec.Thinning == Infeed && g.spec.Mill.Diameter == 0 }

// ThinningPerDepth returns 2 tan α_n: how much normal thickness at the reference
// cylinder a tooth loses for each unit of length that the rack goes deeper
// (ISO 21771:2007, clause 4: the shift x m_n turned round).
func (g *Gear) ThinningPerDepth() float64 { return 2 * math.Tan(g.PressureAngle()) }

// RootDiameterAt returns d_f = d − 2 m_n (h_fP* − x_E) that the rack leaves
// with a tooth of normal thickness sn, mm (ISO 21771:2007, clause 4), or the
// depth asked of the end mill. A mill too wide to get there leaves a shallower
// root: see Tooth.RootDiameter.
func (g *Gear) RootDiameterAt(sn float64) float64 {
	if d := g.spec.Mill.RootDiameter; d > 0 {
		return d
	}
	return g.d - 2*g.spec.Module*(g.spec.Rack.Dedendum-g.GeneratingShift(sn))
}

// VirtualTeeth returns z_v = z / cos³ β, by which form cutters and chordal
// dimensions of a helical gear are chosen. It is one of three virtual tooth
// numbers and not the one of ISO 6336.
func (g *Gear) VirtualTeeth() float64 {
	return g.z / math.Pow(math.Cos(g.spec.Helix), 3)
}
