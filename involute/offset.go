package involute

import "math"

// cornerBand is how far round the tip and the root circle a point may belong to
// that circle instead of flank or fillet, as a share of the module.
const cornerBand = 0.01

// ProfileOffset returns how far a point lies from the tooth's exact transverse
// profile, mm: the outline of Outline repeated round the gear, with a tooth on
// the +x axis. It is meant for points near the profile: square to an involute it
// is exactly r_b times the angle from it, square to the fillet it is right to
// first order. External gears; +Inf for a ring, which has no outline yet.
func (t Tooth) ProfileOffset(p Vec) float64 {
	if t.z < 0 {
		return math.Inf(1)
	}
	r := p.Norm()
	off := math.Abs(math.Remainder(p.Angle(), 2*math.Pi/t.z)) // from the nearest tooth's center
	band := cornerBand * t.spec.Module
	least := math.Inf(1)
	if r >= t.form/2 && r <= t.daFa/2+band {
		least = t.db / 2 * math.Abs(off-t.HalfAngleAt(2*r))
	}
	if r > t.daFa/2-band {
		least = min(least, math.Abs(r-t.da/2), t.chamferOffset(Polar(r, off)))
	}
	if r < t.form/2 {
		least = min(least, t.filletOffset(r, math.Pi/t.z-off))
	}
	if r < t.RootDiameter()/2+band {
		least = min(least, math.Abs(r-t.RootDiameter()/2))
	}
	return least
}

// chamferOffset returns the distance of a point from the chamfer's line, +Inf without one.
func (t Tooth) chamferOffset(p Vec) float64 {
	if t.spec.TipChamfer <= 0 {
		return math.Inf(1)
	}
	from, to := t.chamferEnd()
	along := to.Sub(from)
	return math.Abs(along.Cross(p.Sub(from))) / along.Norm()
}

// filletOffset returns the distance of the point at radius r and angle space
// from the space's center line from the fillet: the angle between the two along
// the circle, taken square to the fillet.
func (t Tooth) filletOffset(r, space float64) float64 {
	f := t.rackTip(0, 1)
	psi, err := FindRoot(func(psi float64) float64 { return f.radius(psi) - r }, 0, t.tau)
	if err != nil { // r is at an end of the fillet, but for rounding
		if psi = 0; r > f.radius(0) {
			psi = t.tau
		}
	}
	q, d1, _ := f.derivatives(psi)
	along := Vec{q.Y, -q.X}.Scale(1 / q.Norm()) // the circle's direction there
	return r * math.Abs(f.spaceAngle(psi)-space) * math.Abs(along.Cross(d1)) / d1.Norm()
}
