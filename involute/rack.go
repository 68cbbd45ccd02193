package involute

import "math"

// A Rack is a basic rack tooth profile (ISO 53:1998) in its normal section,
// lengths as coefficients of the normal module. The tool that generates the
// gear is its counterpart: its tip cuts the gear's root.
type Rack struct {
	PressureAngle float64 // α_P, radians
	Addendum      float64 // h_aP*
	Dedendum      float64 // h_fP*
	TipRadius     float64 // ρ_fP*, of the tool's tip, which rounds the gear's root
}

// Clearance returns the bottom clearance coefficient c_P* = h_fP* − h_aP* (ISO 53:1998).
func (r Rack) Clearance() float64 { return r.Dedendum - r.Addendum }

// sharpHalfTip returns half the width of the tool's tip before it is rounded: π/4 − h_fP* tan α_P.
func (r Rack) sharpHalfTip() float64 {
	return math.Pi/4 - r.Dedendum*math.Tan(r.PressureAngle)
}

// LargestTipRadius returns the full-radius fillet, the largest ρ_fP* that fits
// between the tool's flanks: (π/4 − h_fP* tan α_P)/tan((90° − α_P)/2). It is
// negative where the flanks cross above the tip.
func (r Rack) LargestTipRadius() float64 {
	return r.sharpHalfTip() / math.Tan((math.Pi/2-r.PressureAngle)/2)
}

// halfLand returns e, half the straight part of the tool's tip:
// π/4 − (h_fP* − ρ*) tan α_P − ρ*/cos α_P, 0 for a full-radius tip.
func (r Rack) halfLand() float64 {
	e := r.sharpHalfTip() - r.TipRadius*math.Tan((math.Pi/2-r.PressureAngle)/2)
	return max(e, 0)
}

// tipDepth returns the height of the tool's tip that its radius takes off the
// straight flank, measured from the datum line: h_fP* − ρ*(1 − sin α_P). The
// tool is straight down to it.
func (r Rack) tipDepth() float64 {
	return r.Dedendum - r.TipRadius*(1-math.Sin(r.PressureAngle))
}

// radiusSlack lets a tip radius that was itself computed as the largest pass:
// a few roundings of numbers of order 1.
const radiusSlack = 8 * 0x1p-52

// validate refuses proportions that no tool can have.
func (r Rack) validate() error {
	switch {
	case !finite(r.PressureAngle, r.Addendum, r.Dedendum, r.TipRadius):
		return impossible(NotFinite, r.Dedendum, 0)
	case r.PressureAngle < 5*Degree:
		return impossible(BadPressureAngle, r.PressureAngle, 5*Degree)
	case r.PressureAngle > 45*Degree:
		return impossible(BadPressureAngle, r.PressureAngle, 45*Degree)
	case r.Dedendum <= 0 || r.Addendum+r.Dedendum <= 0:
		return impossible(RackTooShallow, r.Dedendum, 0)
	case r.sharpHalfTip() < 0:
		return impossible(RackPointed, r.Dedendum, math.Pi/4/math.Tan(r.PressureAngle))
	case r.TipRadius < 0 || r.TipRadius > r.LargestTipRadius()+radiusSlack:
		return impossible(RackTipTooRound, r.TipRadius, r.LargestTipRadius())
	}
	return nil
}
