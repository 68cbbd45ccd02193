package involute

import "math"

// A PinWay is one way to measure over pins or balls with one pin size. All
// give the pin's center circle d_K, and so the thickness.
type PinWay int

// The ways. For a ring the two-pin reading is taken between the pins.
const (
	TwoPins      PinWay = iota // spur: two pins in the spaces nearest to opposite; helical: two balls in one transverse plane
	ThreePins                  // spur, odd z: two pins in neighboring spaces, one opposite, flat anvils
	PinToAxis                  // one pin or ball, to the gear's axis
	PinToFarSide               // one pin or ball, to the far side of a bore or an arbor
	OpposedPins                // helical, odd z: straight pins exactly opposite, half an axial pitch apart
	FreePins                   // helical, odd z: straight pins between flat parallel anvils, free to slide: the least reading
)

// A PinSeat is where a pin or ball rests in a tooth space.
type PinSeat struct {
	Pin             float64 // D, mm
	CenterDiameter  float64 // d_K, mm, with the sign of z
	ContactDiameter float64 // where it touches the flanks, mm, with the sign of z
}

// baseSpan returns d_b cos β_b, the length that turns a pin's diameter into an angle.
func (g *Gear) baseSpan() float64 { return g.db * math.Cos(g.betaB) }

// Seat returns where a pin or ball of diameter pin (mm) rests on both flanks:
//
//	inv α_Kt = s_t/d + inv α_t − π/z + D/(d_b cos β_b),  d_K = d_b/cos α_Kt
//
// (ISO/TR 10064-2:1996, measurement over balls). It touches at tan α = tan α_Kt − D cos β_b/d_b. The
// error is PinFallsThrough where the pin does not touch the involutes at all.
func (t Tooth) Seat(pin float64) (PinSeat, error) {
	s := PinSeat{Pin: pin}
	alpha, ok := InverseInv(t.halfBaseAngle() - math.Pi/t.z + pin/t.baseSpan())
	if !ok || pin <= 0 {
		return s, impossible(PinFallsThrough, pin, t.leastPin())
	}
	tanK := math.Tan(alpha)
	contact := tanK - pin*math.Cos(t.betaB)/t.db
	if contact < 0 {
		return s, impossible(PinFallsThrough, pin, t.leastPin())
	}
	s.CenterDiameter = t.db * math.Hypot(1, tanK)
	s.ContactDiameter = t.db * math.Hypot(1, contact)
	return s, nil
}

// leastPin returns the pin that touches on the base circle, mm.
func (t Tooth) leastPin() float64 {
	pin, err := t.PinTouchingAt(t.db)
	if err != nil {
		return 0
	}
	return pin
}

// PinTouchingAt returns the pin or ball that touches the flanks on the
// cylinder of diameter dc (between base and tip), mm. With a = α_Kt and c the
// pressure angle at dc, D = d_b (tan a − tan c)/cos β_b, and a solves
//
//	inv a − (tan a − tan c)/cos² β_b = s_t/d + inv α_t − π/z,
//
// whose left side falls as a grows (external gears).
func (t Tooth) PinTouchingAt(dc float64) (float64, error) {
	tanC, cb := tanOfCos(t.db, dc), math.Cos(t.betaB)
	want := t.halfBaseAngle() - math.Pi/t.z
	f := func(u float64) float64 { // u = tan a
		return Inv(math.Atan(u)) - (u-tanC)/(cb*cb) - want
	}
	high := tanC + 1
	for f(high) > 0 && high < 1e6 {
		high *= 2
	}
	u, err := FindRoot(f, tanC, high)
	if err != nil {
		return 0, impossible(PinFallsThrough, 0, 0)
	}
	return t.db * (u - tanC) / cb, nil
}

// ThicknessFromCenter returns the normal thickness of the tooth in which a pin
// of diameter pin has its center on the circle dK, mm: Seat turned round.
func (g *Gear) ThicknessFromCenter(dK, pin float64) (float64, error) {
	if math.Abs(dK) < math.Abs(g.db) {
		return 0, impossible(ReadingTooSmall, math.Abs(dK), math.Abs(g.db))
	}
	half := invOfCos(g.db, dK) + math.Pi/g.z - pin/g.baseSpan() - g.invT
	return half * g.d * math.Cos(g.spec.Helix), nil
}

// A PinReading is a measurement over pins and what it needs.
type PinReading struct {
	Value       float64 // M, mm; negative for a ring (between pins)
	AxialOffset float64 // how far the two pins stand apart along the axis, mm
}

// Reading returns the measurement of one way for pins of diameter pin on the
// center circle dK. The diameter of the bore or arbor counts for PinToFarSide only.
//
//	TwoPins       d_K + D (even z), d_K cos(90°/z) + D (odd)
//	ThreePins     d_K (1 + cos(180°/z))/2 + D
//	PinToAxis     (d_K + D)/2
//	PinToFarSide  (d_K + D + bore)/2
//	OpposedPins   d_K + D
//	FreePins      the least distance of the two skew pins; see freePins
//
// (ISO/TR 10064-2:1996 and DIN 3960:1987, measurement over balls and rollers; three pins and one pin by geometry.)
func (g *Gear) Reading(way PinWay, dK, pin, bore float64) (PinReading, error) {
	if way == FreePins {
		return g.freePins(dK, pin)
	}
	r := PinReading{Value: g.readingFactor(way)*dK + pin}
	switch way {
	case PinToAxis:
		r.Value = (dK + pin) / 2
	case PinToFarSide:
		r.Value = (dK + pin + bore) / 2
	case OpposedPins:
		px, _ := g.AxialPitch()
		r.AxialOffset = px / 2
	}
	return r, nil
}

// readingFactor returns dM/dd_K of the ways that are linear in d_K.
func (g *Gear) readingFactor(way PinWay) float64 {
	switch {
	case way == TwoPins && g.spec.Teeth%2 != 0:
		return math.Cos(math.Pi / 2 / g.z)
	case way == ThreePins:
		return (1 + math.Cos(math.Pi/g.z)) / 2
	case way == PinToAxis || way == PinToFarSide:
		return 0.5
	}
	return 1
}

// CenterFromReading returns d_K for a reading: Reading turned round.
func (g *Gear) CenterFromReading(way PinWay, reading, pin, bore float64) (float64, error) {
	switch way {
	case PinToAxis:
		return 2*reading - pin, nil
	case PinToFarSide:
		return 2*reading - pin - bore, nil
	case FreePins:
		off := func(dK float64) float64 {
			r, err := g.freePins(dK, pin)
			if err != nil {
				return math.NaN()
			}
			return r.Value - reading
		}
		// The pins' axes are never farther apart than d_K. How much nearer they
		// come grows with the helix, and past some d_K there is no least: step up to it.
		low := max(reading-pin, 0)
		high := low
		for step := low / 1024; off(high) < 0; step *= 2 {
			high += step
		}
		dK, err := FindRoot(off, low, high)
		if err != nil {
			return 0, impossible(NoFreeReading, reading, 0)
		}
		return dK, nil
	}
	return (reading - pin) / g.readingFactor(way), nil
}

// freePins returns the least reading over two straight pins that lie in the
// spaces nearest to opposite and slide freely between flat parallel anvils.
//
// The pins' axes are tangent to the helix on the cylinder d_K = 2r, with helix
// angle β_K. Slid apart by ζ along the axis, they stand δ = −π/z + ζ tan β_K/r
// from exactly opposite, and the anvils, along their common perpendicular, at
//
//	M − D = (2 r cos β_K cos(δ/2) + ζ sin β_K sin(δ/2)) / √(cos² β_K + sin² β_K sin²(δ/2))
//
// which is least where ζ (cos² β_K + sin² β_K sin²(δ/2)) equals that numerator
// times sin β_K sin(δ/2). Derived from the geometry; no standard gives it.
func (g *Gear) freePins(dK, pin float64) (PinReading, error) {
	r := dK / 2
	s, c := math.Sincos(g.HelixAt(dK))
	parts := func(zeta float64) (num, den2, sd float64) {
		delta := -math.Pi/g.z + zeta*s/c/r
		sd, cd := math.Sincos(delta / 2)
		return 2*r*c*cd + zeta*s*sd, c*c + s*s*sd*sd, sd
	}
	slope := func(zeta float64) float64 {
		num, den2, sd := parts(zeta)
		return zeta*den2 - num*s*sd
	}
	low := -math.Pi / g.z * r * c / s
	for range 8 {
		if slope(low) < 0 {
			break
		}
		low *= 2
	}
	zeta, err := FindRoot(slope, low, 0)
	if err != nil || !g.Helical() {
		return PinReading{}, impossible(NoFreeReading, g.HelixAt(dK), 0)
	}
	num, den2, _ := parts(zeta)
	return PinReading{num/math.Sqrt(den2) + pin, -zeta}, nil
}

// FaceForPins returns the face width that a way needs so that both flanks of
// both spaces are touched: the pins' offset and the distance D sin β_b between
// the two contacts of one pin along the axis, mm.
func (g *Gear) FaceForPins(r PinReading, pin float64) float64 {
	return r.AxialOffset + pin*math.Sin(g.betaB)
}

// PinSensitivity returns dM/ds_n and dM/dD of a way at a seat:
// dd_K/ds_n = cos α_t/(cos β sin α_Kt), dd_K/dD = 1/(sin α_Kt cos β_b).
func (g *Gear) PinSensitivity(way PinWay, seat PinSeat) (byThickness, byPin float64) {
	sinK := tanOfCos(g.db, seat.CenterDiameter) * g.db / seat.CenterDiameter
	dK := seat.CenterDiameter
	factor := g.readingFactor(way)
	if way == FreePins {
		h := 1e-4 * g.spec.Module // central difference: error h² × third derivative, far below 1e-6 relative
		up, err1 := g.freePins(dK+h, 0)
		down, err2 := g.freePins(dK-h, 0)
		if err1 == nil && err2 == nil {
			factor = (up.Value - down.Value) / (2 * h)
		}
	}
	own := 1.0 // the pin's own diameter in the reading
	if way == PinToAxis || way == PinToFarSide {
		own = 0.5
	}
	byThickness = factor * math.Cos(g.alphaT) / math.Cos(g.spec.Helix) / sinK
	byPin = factor/(sinK*math.Cos(g.betaB)) + own
	return byThickness, byPin
}

// PinRootClearance returns the least distance from the pin or ball to the root
// and the fillets of its space, mm; negative where it touches them before the
// flanks. The root of a helical gear is a surface that winds about the axis;
// the nearest of its points is sought along the axis too.
func (t Tooth) PinRootClearance(seat PinSeat) float64 {
	rK := seat.CenterDiameter / 2
	if t.spec.Mill.Diameter > 0 {
		least := rK - t.root/2
		for _, p := range t.mill.curves(t, 0) {
			least = min(least, math.Abs(offset(p.Curve, Polar(rK, 0))))
		}
		return least - seat.Pin/2
	}
	f := t.rackTip(0, 1)
	twist := math.Tan(math.Abs(t.spec.Helix)) * 2 / t.d
	least := rK - t.RootDiameter()/2
	for i := range rootSteps + 1 {
		psi := t.tau * float64(i) / rootSteps
		least = min(least, HelixDistance(rK, f.radius(psi), f.spaceAngle(psi), twist))
	}
	return least - seat.Pin/2
}

// rootSteps samples the fillet: with 200 points the least distance is known to
// about (fillet length/400)²/(2 D), under a micrometer up to module 10.
const rootSteps = 200

// HelixDistance returns the least distance between a point at radius c in one
// plane and the helix through the point of that plane at radius r and angle
// theta from it, turning by q radians per mm of face. Along the helix the angle is
// theta + ζ q and
//
//	distance² = (c − r)² + 4 c r sin²((theta + ζ q)/2) + ζ²
//
// (the cosine rule, written so that near points keep their digits), least where
// ζ + c r q sin(theta + ζ q) = 0. A q of 0 is a straight line along the axis.
func HelixDistance(c, r, theta, q float64) float64 {
	theta = math.Remainder(theta, 2*math.Pi)
	zeta := 0.0
	if q != 0 && theta != 0 {
		zeta = nearestAlong(c*r*q, theta, q)
	}
	chord := 2 * math.Sqrt(c*r) * math.Sin((theta+zeta*q)/2)
	return math.Hypot(math.Hypot(c-r, chord), zeta)
}

// nearestAlong solves ζ + k sin(theta + ζ q) = 0 by Newton's method, which four
// or five steps do for the small angles within a tooth space, and by bracketing
// where they do not.
func nearestAlong(k, theta, q float64) float64 {
	zeta := -k * theta / (1 + k*q)
	for range 6 {
		s, c := math.Sincos(theta + zeta*q)
		step := (zeta + k*s) / (1 + k*q*c)
		zeta -= step
		if math.Abs(step) <= 4*ulp(zeta) {
			return zeta
		}
	}
	slope := func(z float64) float64 { return z + k*math.Sin(theta+z*q) }
	if z, err := FindRoot(slope, -theta/q, 0); err == nil {
		return z
	}
	return 0
}
