package involute

import "math"

// A ReliefSpec is a tip relief: metal taken off the flank toward the tip, so
// that teeth bent by the load do not strike as they come into mesh. The zero
// value is none.
type ReliefSpec struct {
	Amount    float64 // C_αa, taken off along the normal in the transverse section at the tip diameter, mm
	Start     float64 // diameter at which it begins, mm
	Parabolic bool    // growing with the square of the way from there; else linearly
}

// A Relief is the relieved piece of a flank. Where the involute at roll angle t
// lies r_b t along the tangent of the base circle, the relieved flank lies
//
//	L(t) = r_b t − C(t),  C(t) = C_a ((t − t_s)/(t_e − t_s))^n,  n = 1 or 2,
//
// with the amount C_a at t_e (ISO 21771:2007, flank modifications: profile
// modifications are measured along the line of action, over the length of roll).
// Its parameter is the signed roll angle, as a Flank's.
type Relief struct {
	BaseRadius, BaseAngle float64
	Amount                float64 // C_a, mm
	Start, End            float64 // t_s and t_e, > 0
	Parabolic             bool
	T0, T1                float64
}

// Domain returns T0 and T1.
func (r Relief) Domain() (t0, t1 float64) { return r.T0, r.T1 }

// taken returns C and its first and second derivatives at the unsigned roll angle s.
func (r Relief) taken(s float64) (c, c1, c2 float64) {
	k := r.Amount / (r.End - r.Start)
	w := s - r.Start
	if !r.Parabolic {
		return k * w, k, 0
	}
	q := k / (r.End - r.Start)
	return q * w * w, 2 * q * w, 2 * q
}

// inFrame returns the curve's derivative by its parts a along e and b along e',
// the directions from the axis to the tangent point and square to it, and the
// derivatives of a and b.
func (r Relief) inFrame(t float64) (a, b, a1, b1 float64) {
	sign := math.Copysign(1, t)
	c, c1, c2 := r.taken(math.Abs(t))
	return sign * (r.BaseRadius*math.Abs(t) - c), c1, r.BaseRadius - c1, sign * c2
}

// At returns the point r_b e − ±L e' and its derivative ±L e + C' e'.
func (r Relief) At(t float64) (p, dp Vec) {
	a, b, _, _ := r.inFrame(t)
	e := Polar(1, r.BaseAngle+t)
	return e.Scale(r.BaseRadius).Sub(e.Left().Scale(a)), e.Scale(a).Add(e.Left().Scale(b))
}

// Curvature returns (a² + b² + a b' − b a')/(a² + b²)^(3/2) of the derivative's
// parts a and b in the turning frame.
func (r Relief) Curvature(t float64) float64 {
	a, b, a1, b1 := r.inFrame(t)
	n := math.Hypot(a, b)
	return (n*n + a*b1 - b*a1) / (n * n * n)
}

func (Relief) curve() {}

// rollOf returns the roll angle t at which L(t) is the length given, at or past the start.
func (r Relief) rollOf(length float64) float64 {
	k := r.Amount / (r.End - r.Start)
	past := length - r.BaseRadius*r.Start
	if !r.Parabolic {
		return r.Start + past/(r.BaseRadius-k)
	}
	q := k / (r.End - r.Start)
	root := math.Sqrt(r.BaseRadius*r.BaseRadius - 4*q*past)
	return r.Start + 2*past/(r.BaseRadius+root)
}

// relieved reports whether the gear has a tip relief.
func (g *Gear) relieved() bool { return g.spec.Relief.Amount > 0 }

// startRelief checks the relief and lays its curve on the first flank of a tooth
// with base angle 0.
func (g *Gear) startRelief() error {
	s := g.spec.Relief
	if s == (ReliefSpec{}) {
		return nil
	}
	switch {
	case s.Amount <= 0 || g.z < 0:
		return impossible(ReliefTooLarge, s.Amount, 0)
	case s.Start <= g.db:
		return impossible(ReliefOff, s.Start, g.db)
	case s.Start >= g.da:
		return impossible(ReliefOff, s.Start, g.da)
	}
	from, to := g.rollLength(s.Start), g.rollLength(g.da)
	if most := mostRelief * (to - from); s.Amount > most {
		return impossible(ReliefTooLarge, s.Amount, most)
	}
	rb := g.db / 2
	g.relief = Relief{BaseRadius: rb, Amount: s.Amount, Start: from / rb, End: (to + s.Amount) / rb, Parabolic: s.Parabolic}
	g.relief.T0, g.relief.T1 = g.relief.Start, g.relief.End
	return nil
}

// mostRelief bounds the amount as a share of the length of roll over which it is
// taken off. Reliefs are hundredths of a millimeter over millimeters; at a tenth a
// linear one would break the flank by atan(0.1/t_s), some 15°.
const mostRelief = 0.1

// reliefAt returns the roll angle at which the real flank passes the diameter d,
// and what the relief has taken off there, mm.
func (g *Gear) reliefAt(d float64) (t, taken float64) {
	if !g.relieved() || d <= g.spec.Relief.Start {
		return g.RollAngle(d), 0
	}
	t = g.relief.rollOf(g.rollLength(d))
	taken, _, _ = g.relief.taken(t)
	return t, taken
}

// InvoluteEndDiameter returns where the pure involute ends toward the tip: at
// the start of the relief, or at the tip form diameter, mm. Pins and spans must
// touch below it.
func (g *Gear) InvoluteEndDiameter() float64 {
	if g.relieved() {
		return min(g.spec.Relief.Start, g.daFa)
	}
	return g.daFa
}

// realHalfAngleAt returns half the tooth's angle at diameter dy on the flank as
// it is cut: HalfAngleAt less C/r_b where the tip is relieved, radians.
func (t Tooth) realHalfAngleAt(dy float64) float64 {
	_, taken := t.reliefAt(dy)
	return t.HalfAngleAt(dy) - 2*taken/t.db
}
