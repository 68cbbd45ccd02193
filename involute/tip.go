package involute

import "math"

// endFlank works out what ends the flank toward the tip: the relief, and the
// diameter at which chamfer or rounding begin.
func (g *Gear) endFlank() error {
	s := g.spec
	if err := g.startRelief(); err != nil {
		return err
	}
	switch {
	case s.TipChamfer < 0 || (s.TipChamfer > 0 && g.z < 0):
		return impossible(ChamferTooLarge, s.TipChamfer, 0)
	case s.TipRound < 0 || (s.TipRound > 0 && (g.z < 0 || s.TipChamfer > 0)):
		return impossible(RoundTooLarge, s.TipRound, 0)
	case s.TipChamfer > 0:
		g.daFa = g.da - 2*s.TipChamfer
		if g.daFa <= g.db {
			return impossible(ChamferTooLarge, s.TipChamfer, (g.da-g.db)/2)
		}
	case s.TipRound > 0:
		if g.da-2*s.TipRound <= g.db {
			return impossible(RoundTooLarge, s.TipRound, (g.da-g.db)/2)
		}
		g.daFa = g.roundStart(s.TipRound)
	}
	return nil
}

// roundStart returns the diameter at which a rounding of radius rho touches the
// flank. Its center lies on the circle r_a − ρ and ρ inside the flank: on the
// involute at the roll length √((r_a − ρ)² − r_b²) + ρ; on a relieved flank,
// whose normal leans, that is where to look from.
func (g *Gear) roundStart(rho float64) float64 {
	rb, rc := g.db/2, g.da/2-rho
	plain := 2 * math.Hypot(rb, math.Sqrt(rc*rc-rb*rb)+rho)
	if !g.relieved() || plain <= g.spec.Relief.Start {
		return plain
	}
	f := g.relief
	off := func(t float64) float64 {
		p, dp := f.At(t)
		return p.Add(dp.Left().Scale(rho/dp.Norm())).Norm() - rc
	}
	t, err := FindRoot(off, f.Start, f.End)
	if err != nil { // it touches just at the start, where the flank breaks
		return g.spec.Relief.Start
	}
	p, _ := f.At(t)
	return 2 * p.Norm()
}

// endTip checks that the tooth of this thickness keeps a tip.
func (t Tooth) endTip() error {
	s := t.spec
	switch {
	case t.da*t.RealHalfAngleAt(t.da) <= 0:
		return impossible(Pointed, math.Abs(t.da), math.Abs(t.PointedDiameter()))
	case s.TipChamfer > 0 && !t.chamferFits():
		return impossible(ChamferTooLarge, s.TipChamfer, largestShare(s.TipChamfer, func(h float64) bool {
			return t.withEnd(t.da - 2*h).chamferFits()
		}))
	case s.TipRound > 0 && !t.roundFits(s.TipRound):
		return impossible(RoundTooLarge, s.TipRound, largestShare(s.TipRound, t.roundFits))
	}
	return nil
}

// withEnd returns the tooth with its flank ending at the diameter dFa.
func (t Tooth) withEnd(dFa float64) Tooth {
	g := *t.Gear
	g.daFa = dFa
	t.Gear = &g
	return t
}

// largestShare returns the largest part of a size that fits, to a thousandth of
// it, 0 where none does.
func largestShare(size float64, fits func(float64) bool) float64 {
	for share := 0.999; share > 0; share -= 0.001 {
		if fits(share * size) {
			return share * size
		}
	}
	return 0
}

// flankEnd returns where the first flank (that below a tooth pointing along +x)
// ends at its tip form diameter.
func (t Tooth) flankEnd() Vec { return Polar(t.daFa/2, -t.RealHalfAngleAt(t.daFa)) }

// chamferEnd returns where the 45° chamfer that starts at flankEnd meets the tip circle.
func (t Tooth) chamferEnd() Vec {
	from := t.flankEnd()
	dir := Vec{1, 1}.Scale(math.Sqrt2 / 2)
	// |from + k dir| = r_a, the nearer solution.
	ra := t.da / 2
	b := from.Dot(dir)
	k := -b + math.Sqrt(b*b+ra*ra-from.Dot(from))
	return from.Add(dir.Scale(k))
}

// chamferFits reports whether the chamfer leaves a land and takes metal off: on
// gears of few teeth the flank itself leans by 45° near the tip, and a chamfer
// would lie outside it.
func (t Tooth) chamferFits() bool {
	to := t.chamferEnd()
	return to.Y < 0 && -to.Angle() < t.RealHalfAngleAt(t.da)
}

// rounding returns the arc that rounds the first flank's corner, from the flank
// to the tip circle, tangent to both.
func (t Tooth) rounding(rho float64) Arc {
	from := t.flankEnd()
	center := from.Add(t.inwardAt(t.daFa).Scale(rho))
	start := from.Sub(center).Angle()
	return Arc{Center: center, Radius: rho, Start: start, Sweep: center.Angle() - start}
}

// inwardAt returns the unit normal of the first flank at diameter d, into the metal.
func (t Tooth) inwardAt(d float64) Vec {
	roll, _ := t.reliefAt(d)
	if !t.relieved() || roll <= t.relief.Start {
		return Polar(1, roll-t.halfBaseAngle()).Left()
	}
	f := t.relief
	f.BaseAngle = -t.halfBaseAngle()
	_, dp := f.At(roll)
	return dp.Left().Scale(1 / dp.Norm())
}

// roundFits reports whether a rounding leaves a land. It may be another radius than the gear's own.
func (t Tooth) roundFits(rho float64) bool {
	if t.da-2*rho <= t.db {
		return false
	}
	return t.withEnd(t.roundStart(rho)).rounding(rho).Center.Angle() < 0
}

// landAngle returns half the angle of the tip land that is left.
func (t Tooth) landAngle() float64 {
	switch {
	case t.spec.TipChamfer > 0:
		return -t.chamferEnd().Angle()
	case t.spec.TipRound > 0:
		return -t.rounding(t.spec.TipRound).Center.Angle()
	}
	return t.RealHalfAngleAt(t.da)
}

// TipLand returns the arc length of the tip that is left between chamfers or
// roundings, or between the flanks where there are none, normal, mm.
func (t Tooth) TipLand() float64 {
	return t.da * t.landAngle() * math.Cos(t.HelixAt(t.da))
}

// TipDiameterAt returns the tip diameter of the tooth of normal thickness sn:
// d + 2 m_n (h_aP* + x_E) where the cutter tops it, mm.
func (g *Gear) TipDiameterAt(sn float64) float64 {
	if !g.spec.Topped {
		return g.da
	}
	return g.d + 2*g.spec.Module*(g.spec.Rack.Addendum+g.GeneratingShift(sn))
}

// toppedAt returns the gear with the tip that the cutter leaves at thickness sn.
func (g *Gear) toppedAt(sn float64) (*Gear, error) {
	if !g.spec.Topped || g.TipDiameterAt(sn) == g.da {
		return g, nil
	}
	own := *g
	own.da = g.TipDiameterAt(sn)
	own.daFa = own.da
	if math.Abs(own.da) <= math.Abs(own.db) {
		return g, impossible(TipBelowBase, math.Abs(own.da), math.Abs(own.db))
	}
	return &own, own.endFlank()
}
