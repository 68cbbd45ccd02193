package involute

import "math"

// A Contact is how two gears touch at one center distance. Lengths ρ run along
// the transverse line of action from each gear's base tangent point; contact
// goes from A (second gear's tip, first gear's root) to E (first gear's tip).
type Contact struct {
	WorkingAngle       float64 // α_wt, radians
	Pitch1, Pitch2     float64 // d_w, mm
	RhoA1, RhoA2       float64 // mm
	RhoE1, RhoE2       float64 // mm
	TransverseRatio    float64 // ε_α on the involutes that are there; 0 where none meet
	RatioByTips        float64 // ε_α as the tip circles alone would give it
	UnrelievedRatio    float64 // ε_α on the flanks without their tip relief: what is left under no load
	Start1, Start2     float64 // start of active profile diameters, mm
	End1, End2         float64 // end of active profile diameters, mm
	SlidingA1          Sliding // specific sliding of the first gear at A
	SlidingA2          Sliding
	SlidingE1          Sliding
	SlidingE2          Sliding
	PastForm1          float64 // how far the second's tip would start before the first's involute, along the line, mm; ≤ 0 is none
	PastForm2          float64
	limitedA, limitedE bool
}

// A Sliding is a specific sliding ζ; Unbounded where the contact is on the base circle.
type Sliding struct {
	Value     float64
	Unbounded bool
}

// LimitedByRoots reports whether a form diameter, not a tip, ends the contact.
func (c Contact) LimitedByRoots() bool { return c.limitedA || c.limitedE }

// slideSlack: nearer than this share of the path to the base point, sliding counts as unbounded.
const slideSlack = 1e-9

// sliding returns ζ = 1 − other/(ratio own) with ratio = z_other/z_own for a
// point at distances own and other along the line of action.
func sliding(own, other, ratio float64) Sliding {
	if math.Abs(own) <= slideSlack*math.Abs(other) {
		return Sliding{Unbounded: true}
	}
	return Sliding{Value: 1 - other/(ratio*own)}
}

// rollLength returns ρ = √(d² − d_b²)/2 with the sign of z.
func (g *Gear) rollLength(d float64) float64 { return g.db / 2 * tanOfCos(g.db, d) }

func (g *Gear) diameterAt(rho float64) float64 {
	return math.Copysign(2*math.Hypot(g.db/2, rho), g.z)
}

// Contact returns how teeth t1 and t2 touch at center distance a. The active
// profiles end where the tips (less their chamfers and roundings) or the form
// diameters end them; flanks with tip relief count as if without, as under the load
// that brings them to touch (ISO 21771:2007, clause 5; specific sliding by the ratio
// of the rolling speeds).
func (m Mesh) Contact(a float64, t1, t2 Tooth) (Contact, error) {
	alpha, err := m.WorkingPressureAngle(a)
	if err != nil {
		return Contact{}, err
	}
	c := Contact{WorkingAngle: alpha}
	c.Pitch1, c.Pitch2 = m.PitchDiameters(a)
	line := a * math.Sin(alpha)
	tip1, tip2 := t1.rollLength(t1.daFa), t2.rollLength(t2.daFa)
	form1, form2 := m.First.rollLength(t1.innerEnd()), m.Second.rollLength(t2.innerEnd())
	pitch := m.First.TransverseBasePitch()

	c.RatioByTips = (t1.rollLength(t1.da) + t2.rollLength(t2.da) - line) / pitch
	c.PastForm1, c.PastForm2 = form1-(line-tip2), tip1-(line-form2)
	c.limitedA, c.limitedE = c.PastForm1 > 0, c.PastForm2 > 0
	c.RhoA1, c.RhoE1 = max(line-tip2, form1), min(tip1, line-form2)
	c.RhoA2, c.RhoE2 = line-c.RhoA1, line-c.RhoE1
	c.TransverseRatio = max(0, (c.RhoE1-c.RhoA1)/pitch)
	plain1, plain2 := t1.rollLength(t1.InvoluteEndDiameter()), t2.rollLength(t2.InvoluteEndDiameter())
	c.UnrelievedRatio = max(0, (min(c.RhoE1, plain1)-max(c.RhoA1, line-plain2))/pitch)

	c.Start1, c.End1 = m.First.diameterAt(c.RhoA1), m.First.diameterAt(c.RhoE1)
	c.Start2, c.End2 = m.Second.diameterAt(c.RhoE2), m.Second.diameterAt(c.RhoA2)
	u := m.Ratio()
	c.SlidingA1, c.SlidingA2 = sliding(c.RhoA1, c.RhoA2, u), sliding(c.RhoA2, c.RhoA1, 1/u)
	c.SlidingE1, c.SlidingE2 = sliding(c.RhoE1, c.RhoE2, u), sliding(c.RhoE2, c.RhoE1, 1/u)
	return c, nil
}

// innerEnd returns where the flank ends at the root: the form diameter, or the
// root diameter of a ring, whose root no rack generates.
func (t Tooth) innerEnd() float64 {
	if t.z < 0 {
		return t.RootDiameter()
	}
	return t.form
}

// filletSteps samples the passage of a tip corner through a fillet. The gap's
// ends are exact; between them the least of 400 samples is within (step)²/8 of
// its second derivative, a few 1e-6 of the module at most.
const filletSteps = 400

// FilletClearance returns the least gap between the corner of the mate's tip
// (with its chamfer or rounding) and this tooth's fillet, generated or milled,
// while the mate passes at center distance a with its flank in contact, mm,
// measured across (along the circle); negative where the tip cuts into the fillet,
// +Inf where it does not come down to the fillet at all. This tooth is t1 where
// first is true, else t2. External pairs only.
func (m Mesh) FilletClearance(a float64, t1, t2 Tooth, first bool) (float64, error) {
	own, mate := t1, t2
	if !first {
		own, mate = t2, t1
	}
	if own.z < 0 || mate.z < 0 {
		return 0, impossible(NotExternal, min(own.z, mate.z), 0)
	}
	play, err := m.Backlash(a, t1.sn, t2.sn)
	if err != nil {
		return 0, err
	}
	least := math.Inf(1)
	for _, corner := range mate.corner() {
		// Half the play as an angle of the mate brings its flank into contact.
		beside := -corner.Angle() + play.Base/mate.db
		least = min(least, own.passing(a, corner.Norm(), beside, mate.z/own.z))
	}
	return least, nil
}

// cornerSteps divides a chamfer or rounding of the mate's tip into points: the
// least gap is known to a thousandth of the rounding's radius.
const cornerSteps = 16

// corner returns the points of the corner between the first flank and the tip:
// one, or those of its chamfer or rounding.
func (t Tooth) corner() []Vec {
	half := t.firstHalf()
	last := half[len(half)-1]
	if last.Role != Chamfer && last.Role != TipRounding {
		return []Vec{t.flankEnd()}
	}
	var ps []Vec
	for i := range cornerSteps + 1 { // both have the domain 0 to 1
		p, _ := last.At(float64(i) / cornerSteps)
		ps = append(ps, p)
	}
	return ps
}

// passing returns the least gap to the fillet of a point of the mate that passes
// at center distance a, at the radius tip from the mate's axis and the angle
// beside from the line of centers when the space lies on that; +Inf where it
// stays above the fillet.
func (t Tooth) passing(a, tip, beside, ratio float64) float64 {
	// The point is below the fillet's upper end while it stands within reach of the line of centers.
	top := t.form / 2
	c := (a*a + tip*tip - top*top) / (2 * a * tip)
	if c >= 1 {
		return math.Inf(1)
	}
	reach := math.Acos(c)
	least := math.Inf(1)
	for i := range filletSteps + 1 {
		stands := reach * (2*float64(i)/filletSteps - 1)
		turn := (beside - stands) * ratio
		p := Vec{a, 0}.Add(Polar(tip, math.Pi+stands)).Rotate(-turn)
		least = min(least, t.filletGap(p))
	}
	return least
}

// filletGap returns how far the point p (the space's center line is +x; p is
// no farther out than the fillet) lies from the fillet of its own side, along
// the circle through p; below the root circle, how far below, negative.
func (t Tooth) filletGap(p Vec) float64 {
	r := p.Norm()
	if r <= t.root/2 {
		return r - t.root/2
	}
	return r * (t.spaceAngleAt(r) - math.Abs(p.Angle()))
}
