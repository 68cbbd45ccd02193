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
			return g.nominal().chamferTooLarge()
		}
	case s.TipRound > 0:
		if g.da-2*s.TipRound <= g.db {
			return g.nominal().roundTooLarge()
		}
		g.daFa = g.roundStart(s.TipRound)
	}
	return nil
}

// nominal returns the tooth of nominal thickness, unchecked and without its root.
func (g *Gear) nominal() Tooth { return Tooth{Gear: g, sn: g.NominalThickness()} }

// roundStart returns the diameter at which a rounding of radius rho touches the
// flank. Its center lies on the circle r_a − ρ and ρ inside the flank: on the
// involute at the roll length √((r_a − ρ)² − r_b²) + ρ. On a tooth with tip relief
// the circle may meet the relieved flank instead; the one that holds it farther
// inside the tooth is met first.
func (g *Gear) roundStart(rho float64) float64 {
	rb, rc := g.db/2, g.da/2-rho
	side := math.Sqrt(rc*rc - rb*rb)
	plain := 2 * math.Hypot(rb, side+rho)
	if !g.relieved() {
		return plain
	}
	f := g.relief
	center := func(t float64) Vec {
		p, dp := f.At(t)
		return p.Add(dp.Left().Scale(rho / dp.Norm()))
	}
	t, err := FindRoot(func(t float64) float64 { return center(t).Norm() - rc }, f.Start, f.End)
	if inside := (side+rho)/rb - math.Atan(side/rb); err != nil || center(t).Angle() < inside {
		return plain
	}
	p, _ := f.At(t)
	return 2 * p.Norm()
}

// endTip checks that the tooth of this thickness keeps a tip.
func (t Tooth) endTip() error {
	s := t.spec
	switch {
	case t.da*t.HalfAngleAt(t.da) <= 0:
		return impossible(Pointed, math.Abs(t.da), math.Abs(t.PointedDiameter()))
	case t.realHalfAngleAt(t.da) <= 0 && t.relieved(): // half the land is what there is to take off
		return impossible(ReliefTooLarge, s.Relief.Amount, t.HalfAngleAt(t.da)*t.db/2)
	case s.TipChamfer > 0 && !t.chamferFits():
		return t.chamferTooLarge()
	case s.TipRound > 0 && !t.roundFits(s.TipRound):
		return t.roundTooLarge()
	}
	return nil
}

// chamferTooLarge refuses the tooth's chamfer and says the largest that fits.
func (t Tooth) chamferTooLarge() error {
	asked := t.spec.TipChamfer
	return impossible(ChamferTooLarge, asked, t.largestTip(asked, func(h float64) bool {
		return t.withEnd(t.da - 2*h).chamferFits()
	}))
}

// roundTooLarge refuses the tooth's rounding and says the largest that fits.
func (t Tooth) roundTooLarge() error {
	return impossible(RoundTooLarge, t.spec.TipRound, t.largestTip(t.spec.TipRound, t.roundFits))
}

// withEnd returns the tooth with its flank ending at the diameter dFa.
func (t Tooth) withEnd(dFa float64) Tooth {
	g := *t.Gear
	g.daFa = dFa
	t.Gear = &g
	return t
}

// largestTip returns the largest chamfer or rounding below the one asked that
// fits, 0 where none does. It seeks by steps of a thousandth from above, for small
// ones may not fit either (see chamferFits), and no farther up than where the base
// circle ends every flank.
func (t Tooth) largestTip(asked float64, fits func(float64) bool) float64 {
	const steps = 1000
	size := min(asked, (t.da-t.db)/2)
	for i := steps - 1; i > 0; i-- {
		if low := size * float64(i) / steps; fits(low) {
			return LargestFitting(fits, low, size*float64(i+1)/steps)
		}
	}
	return 0
}

// flankEnd returns where the first flank (that below a tooth pointing along +x)
// ends at its tip form diameter.
func (t Tooth) flankEnd() Vec { return Polar(t.daFa/2, -t.realHalfAngleAt(t.daFa)) }

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
	return to.Y < 0 && -to.Angle() < t.realHalfAngleAt(t.da)
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
	return t.realHalfAngleAt(t.da)
}

// TipLand returns the arc length of the tip that is left between chamfers or
// roundings, or between the flanks where there are none, normal, mm.
func (t Tooth) TipLand() float64 {
	return t.da * t.landAngle() * math.Cos(t.HelixAt(t.da))
}

// TipDiameterAt returns the tip diameter of the tooth of normal thickness sn, mm:
// where the cutter tops it, as much smaller than at nominal thickness as the root
// diameter is, d_a + 2 m_n (x_E − x), which without a d_a of the drawing's own is
// d + 2 m_n (h_aP* + x_E).
func (g *Gear) TipDiameterAt(sn float64) float64 {
	if !g.spec.Topped {
		return g.da
	}
	return g.drawnTip() + 2*g.spec.Module*(g.GeneratingShift(sn)-g.spec.Shift)
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
