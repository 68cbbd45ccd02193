package involute

import "math"

// rackTip returns the generating rack's tip for this tooth as a Fillet curve
// of one whole side, from the bottom to the end of the tool's tip.
//
// Where the flanks alone were moved, by half the thinning each, it is as if the
// tool's tooth were that much wider at the same depth: e grows and the rest stays.
func (t Tooth) rackTip(space, side float64) Fillet {
	m, rack := t.spec.Module, t.spec.Rack
	f := Fillet{
		R:       t.d / 2,
		H:       (rack.Dedendum - rack.TipRadius - t.GeneratingShift(t.sn)) * m,
		Rho:     rack.TipRadius * m,
		E:       rack.halfLand()*m + t.toolWidening()/2,
		CosBeta: math.Cos(t.spec.Helix),
		Space:   space,
		Side:    side,
	}
	end := math.Pi/2 - t.PressureAngle()
	if side > 0 {
		f.T1 = end
	} else {
		f.T0 = -end
	}
	return f
}

// toolWidening returns by how much the tool's tooth is wider than the rack's, in
// the normal section, mm.
func (t Tooth) toolWidening() float64 {
	if t.FedDeeper() {
		return 0
	}
	return t.NominalThickness() - t.sn
}

// radius returns the distance of the fillet's point ψ from the gear's center:
// √(A² + Y²). It grows with ψ.
func (f Fillet) radius(psi float64) float64 {
	a, y, _ := f.motion(psi)
	return math.Hypot(a[0], y[0])
}

// spaceAngle returns the polar angle between the space's center line and the
// fillet's point ψ, positive into the tooth.
func (f Fillet) spaceAngle(psi float64) float64 {
	a, y, phi := f.motion(psi)
	return math.Atan2(a[0], y[0]) - phi[0]
}

// noWidth is the share of the module by which a tool's tip land may be short of
// nothing: a thickness found from a reading differs from the nominal one by roundings.
const noWidth = 1e-12

// generate finds where the fillet ends and the involute begins.
//
// The tool's straight flank ends at a depth h below the pitch line, and cuts
// its last point a lever r sin α_t − h/sin α_t along the line of action from
// the base circle. Where the lever is positive, fillet and involute meet
// there, tangentially. Where it is negative the tool has cut past the base
// circle and back through the involute: the two curves cross higher up
// (ISO 21771:2007, undercut and form diameter).
func (t *Tooth) generate() error {
	f := t.rackTip(0, 1)
	if f.E < -noWidth*t.spec.Module {
		return impossible(TooThick, t.sn, t.sn+2*f.E)
	}
	rb, end := t.db/2, f.T1
	h := f.H + f.Rho*math.Sin(t.PressureAngle())
	lever := f.R*math.Sin(t.alphaT) - h/math.Sin(t.alphaT)
	t.tau, t.form = end, 2*math.Hypot(rb, lever)
	if lever < 0 {
		t.cut = true
		if err := t.crossing(f, end); err != nil {
			return err
		}
	}
	if w := t.neck(f); w <= 0 {
		return impossible(CutOff, w, 0)
	}
	if t.form >= t.daFa {
		return impossible(NoInvolute, t.form, t.daFa)
	}
	return nil
}

// crossing finds the point where an undercutting fillet leaves the involute:
// between the base circle, where the fillet lies inside the tooth, and the end
// of the tool's tip, where it has come back out into the space.
func (t *Tooth) crossing(f Fillet, end float64) error {
	rb := t.db / 2
	low := 0.0
	if f.radius(0) < rb {
		var err error
		low, err = FindRoot(func(psi float64) float64 { return f.radius(psi) - rb }, 0, end)
		if err != nil {
			return impossible(NoInvolute, 2*f.radius(end), t.daFa)
		}
	}
	atBase := math.Pi/t.z - t.halfBaseAngle() // half the space at the base circle
	psi, err := FindRoot(func(psi float64) float64 {
		return f.spaceAngle(psi) - atBase - invOfCos(t.db, 2*f.radius(psi))
	}, low, end)
	if err != nil {
		// The undercut is smaller than rounding: the curves meet on the base circle.
		psi = low
	}
	t.tau, t.form = psi, max(2*f.radius(psi), t.db)
	return nil
}

// neckSteps samples the fillet for the narrowest place of the tooth. The
// width is smooth in ψ, so the least of 64 samples is within a few thousandths
// of the depth of the undercut; it only decides whether a tooth holds at all.
const neckSteps = 64

// neck returns the least width of the tooth along its fillet, mm.
func (t Tooth) neck(f Fillet) float64 {
	least := math.Inf(1)
	for i := range neckSteps + 1 {
		psi := t.tau * float64(i) / neckSteps
		least = min(least, 2*f.radius(psi)*(math.Pi/t.z-f.spaceAngle(psi)))
	}
	return least
}

// A FilletEnd is the point where fillet and flank meet, in the letters of Fillet.
type FilletEnd struct {
	Psi        float64 // ψ, radians
	H, Rho, E  float64 // h, ρ, e of the tool's tip, mm
	A, Y       float64 // the point, mm
	SpaceAngle float64 // from the space's center line, radians
	Residual   float64 // what is left of the equation of an undercut tooth: the two curves' difference in angle, radians
}

// FilletEnd returns where the generated fillet ends; all zero for a milled root.
func (t Tooth) FilletEnd() FilletEnd {
	if t.spec.Mill.Diameter > 0 {
		return FilletEnd{}
	}
	f := t.rackTip(0, 1)
	a, y, _ := f.motion(t.tau)
	angle := f.spaceAngle(t.tau)
	return FilletEnd{t.tau, f.H, f.Rho, f.E, a[0], y[0], angle, angle - (math.Pi/t.z - t.HalfAngleAt(t.form))}
}
