package involute

import "math"

// A MillSpec is a root cut by an end mill whose axis is parallel to the gear's,
// on external spur gears. The zero value is none: the root is generated.
type MillSpec struct {
	Diameter     float64 // mm
	RootDiameter float64 // how deep the root goes, mm; 0 for the rack's d − 2 m_n (h_fP* − x)
}

// A milledRoot is the root that an end mill leaves in a tooth space: an arc of
// the mill's radius on each side, tangent to the flank and to the root circle;
// or one arc tangent to both flanks where the mill is too wide to reach the root
// circle. Below the base circle, where there is no involute, the flank goes on
// as a radial line.
type milledRoot struct {
	rho    float64 // the mill's radius, mm
	center float64 // distance of the arc's center from the gear's axis, mm
	gamma  float64 // polar angle of that center from the space's center line; 0 for one arc
	foot   float64 // distance from the axis at which the arc touches the flank, mm
}

// checkMill refuses an end mill that cannot cut this gear at all.
func (g *Gear) checkMill() error {
	m := g.spec.Mill
	switch {
	case m == (MillSpec{}):
		return nil
	case m.Diameter <= 0:
		return impossible(NotFinite, m.Diameter, 0)
	case g.z < 0:
		return impossible(NotExternal, g.z, 0)
	case g.Helical():
		return impossible(MillHelical, math.Abs(g.spec.Helix), 0)
	case m.RootDiameter < 0:
		return impossible(MillTooDeep, m.RootDiameter, 0)
	case m.RootDiameter >= g.da:
		return impossible(MillTooDeep, m.RootDiameter, g.da)
	}
	return nil
}

// millRoot lays the end mill into the space of the tooth.
//
// The mill's center at distance r_c from the axis, ρ from the involute, stands
// off the space's center line by
//
//	γ = π/z − ψ_b + inv α_c − ρ/r_b,  cos α_c = r_b/r_c
//
// (the pin that rests on both flanks, ISO/TR 10064-2:1996, has γ = 0) and touches
// at the roll length √(r_c² − r_b²) − ρ. Where that is not real or negative the mill
// touches the radial line at √(r_c² − ρ²), and γ = π/z − ψ_b − asin(ρ/r_c). It goes
// down until it touches the root circle, r_c = r_f + ρ, or both flanks. Plane
// geometry; no standard gives it.
func (t *Tooth) millRoot() error {
	m, ok := t.seatMill(t.spec.Mill.Diameter / 2)
	if !ok {
		return impossible(MillTooLarge, t.spec.Mill.Diameter, t.LargestMill())
	}
	t.mill = m
	t.root = 2 * (m.center - m.rho)
	t.form = max(2*m.foot, t.db)
	return nil
}

// seatMill returns where a mill of radius rho stops; false where that is at the
// ends of the flanks or not at all.
func (t Tooth) seatMill(rho float64) (m milledRoot, ok bool) {
	low := t.RootDiameterAt(t.sn)/2 + rho
	m = milledRoot{rho: rho, center: low, gamma: t.millAngle(low, rho)}
	if m.gamma < 0 {
		high := t.da/2 + rho
		c, err := FindRoot(func(c float64) float64 { return t.millAngle(c, rho) }, low, high)
		if err != nil {
			return m, false
		}
		m.center, m.gamma = c, 0
	}
	m.foot = t.millFoot(m.center, rho)
	return m, 2*m.foot < t.InvoluteEndDiameter()
}

// millAngle returns γ for a mill of radius rho centered c from the axis.
func (t Tooth) millAngle(c, rho float64) float64 {
	rb := t.db / 2
	base := math.Pi/t.z - t.halfBaseAngle() // half the space at the base circle
	if c*c-rho*rho >= rb*rb {
		return base + invOfCos(t.db, 2*c) - rho/rb
	}
	return base - math.Asin(rho/c)
}

// millFoot returns how far from the axis a mill of radius rho centered c from it touches the flank.
func (t Tooth) millFoot(c, rho float64) float64 {
	rb := t.db / 2
	if c*c-rho*rho >= rb*rb {
		return math.Hypot(rb, math.Sqrt(c*c-rb*rb)-rho)
	}
	return math.Sqrt(c*c - rho*rho)
}

// LargestMill returns the largest end mill that gets into the tooth space and
// touches the flanks below their end, mm; 0 where none does, as on helical gears
// and rings. On a handful of teeth whose flanks turn away from the space toward the
// tip none is too large, and the answer is a thousand times d_a. Whether the mate's
// tips then pass is for the mesh to say.
func (t Tooth) LargestMill() float64 {
	if t.z < 0 || t.Helical() {
		return 0
	}
	fits := func(diameter float64) bool { _, ok := t.seatMill(diameter / 2); return ok }
	high := t.da
	for range 10 {
		if fits(high) {
			high *= 2
		}
	}
	return LargestFitting(fits, 0, high)
}

// curves returns the root from the space's center line to the flank, in a frame
// whose space is centered on the polar angle space.
func (m milledRoot) curves(t Tooth, space float64) []Piece {
	var ps []Piece
	rf := m.center - m.rho
	if m.gamma > noLand {
		ps = append(ps, Piece{Arc{Radius: rf, Start: space - m.gamma, Sweep: 2 * m.gamma}, RootLand})
	}
	c := Polar(m.center, space+m.gamma)
	foot := Polar(m.foot, space+t.spaceAngleAt(m.foot))
	start := space + m.gamma + math.Pi
	sweep := math.Remainder(foot.Sub(c).Angle()-start, 2*math.Pi)
	ps = append(ps, Piece{Arc{Center: c, Radius: m.rho, Start: start, Sweep: sweep}, RootFillet})
	if 2*m.foot < t.db {
		end := Polar(t.db/2, space+t.spaceAngleAt(t.db/2))
		ps = append(ps, Piece{Line{foot, end}, RootFillet})
	}
	return ps
}

// spaceAngleAt returns half the angle of the tooth space at distance r from the
// axis, between root and flank, radians; 0 below the root.
func (t Tooth) spaceAngleAt(r float64) float64 {
	base := math.Pi/t.z - t.halfBaseAngle()
	m := t.mill
	switch {
	case t.spec.Mill.Diameter == 0:
		return t.generatedSpaceAngle(r)
	case r >= m.foot && 2*r >= t.db:
		return base + invOfCos(t.db, 2*r)
	case r >= m.foot:
		return base
	case r <= m.center-m.rho:
		return 0
	}
	// The cosine rule in the triangle axis, arc center, point.
	cos := (r*r + m.center*m.center - m.rho*m.rho) / (2 * r * m.center)
	return m.gamma + math.Acos(min(1, cos))
}

// generatedSpaceAngle is spaceAngleAt of a generated root.
func (t Tooth) generatedSpaceAngle(r float64) float64 {
	f := t.rackTip(0, 1)
	if 2*r >= t.form {
		return math.Pi/t.z - t.HalfAngleAt(2*r)
	}
	if r <= f.radius(0) {
		return 0
	}
	psi, err := FindRoot(func(psi float64) float64 { return f.radius(psi) - r }, 0, t.tau)
	if err != nil {
		psi = t.tau // the end itself, but for rounding
	}
	return f.spaceAngle(psi)
}

// A MillSeat is where the end mill that cuts a root stops.
type MillSeat struct {
	Radius float64 // ρ, of the mill, mm
	Center float64 // r_c, from the gear's axis, mm
	Single bool    // it rests on both flanks, and leaves one arc
	Radial bool    // it touches the radial lines below the base circle
}

// MillSeat returns where the end mill stops, false for a generated root.
func (t Tooth) MillSeat() (MillSeat, bool) {
	m := t.mill
	return MillSeat{m.rho, m.center, m.gamma == 0, 2*m.foot < t.db}, m.rho > 0
}
