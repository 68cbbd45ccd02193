package main

import (
	"errors"
	"fmt"
	"math"

	"flankwright/involute"
)

// impossibleGear words why a gear cannot be, with its numbers and the way out.
// It stands at the first of the keys that are likely to blame and are given.
func (j *job) impossibleGear(g *gear, err error) error {
	var imp *involute.Impossible
	if !errors.As(err, &imp) {
		return err
	}
	at := g.settings.at
	for _, key := range keysOf(imp.Reason) {
		if v, ok := g.settings.vals[key]; ok {
			at = v.at
			break
		}
	}
	return faultAt(at, "%s: %s", called(g), j.gearReason(g, imp))
}

// faultAt is fault, or wrong where there is no place.
func faultAt(at place, format string, args ...any) error {
	if at.file == "" {
		return wrong(format, args...)
	}
	return fault(at, format, args...)
}

// impossibleThinning words why a tooth cannot be as thin as its thin or its
// mesh's backlash asks, and how thin it can be.
func (j *job) impossibleThinning(g *gear, err error) error {
	var imp *involute.Impossible
	if !errors.As(err, &imp) {
		return err
	}
	asked, what := g.g.NominalThickness()-g.thickness.Limits.Min, "thin"
	at := g.settings.at
	if v, ok := j.backlashOf(g); ok {
		at, what = v.at, "backlash"
	}
	for _, key := range fixingKeys() {
		if v, ok := g.settings.vals[key]; ok {
			at, what = v.at, key
		}
	}
	return faultAt(at, "%s makes %s up to %s thinner than nominal, a tooth thickness of %s, and such a tooth %s; at most %s can be taken",
		what, called(g), j.length(asked), j.length(g.thickness.Limits.Min), noTooth(imp), j.lengthDown(mostThinning(g)))
}

// noTooth says what is wrong with a tooth that cannot be.
func noTooth(err error) string {
	var imp *involute.Impossible
	if !errors.As(err, &imp) {
		return "cannot be"
	}
	why, ok := map[involute.Reason]string{
		involute.Pointed: "comes to a point below its tip", involute.NoInvolute: "has no involute left", involute.CutOff: "is cut off at its root",
		involute.RootNotPositive: "has no root left", involute.ChamferTooLarge: "has no tip left for its chamfer",
		involute.RoundTooLarge: "has no tip left for its rounding", involute.ReliefOff: "has no flank left below its relief",
		involute.SpaceClosed: "leaves no space", involute.TooThick: "needs a cutter narrower than its own rounding",
		involute.MillTooLarge: "leaves no way in for the end mill of its root",
	}[imp.Reason]
	if !ok {
		return "has no thickness left"
	}
	return why
}

// mostThinning returns how much thinner than nominal a tooth can be, mm, to a thousandth of itself.
func mostThinning(g *gear) float64 {
	possible, not := 0.0, g.g.NominalThickness()-g.thickness.Limits.Min
	for range 20 {
		mid := (possible + not) / 2
		if _, err := g.g.Tooth(g.g.NominalThickness() - mid); err == nil {
			possible = mid
		} else {
			not = mid
		}
	}
	return possible
}

// called names a gear in a sentence.
func called(g *gear) string {
	if g.name == "gear" {
		return "the gear"
	}
	return "gear " + g.name
}

// keysOf names the keys that a reason is most likely about, the likeliest first.
func keysOf(r involute.Reason) []string {
	switch r {
	case involute.BadModule:
		return pitchKeys()
	case involute.RackTipTooRound:
		return []string{"tip_radius", "dedendum", "rack"}
	case involute.RackPointed, involute.RackTooShallow:
		return []string{"dedendum", "addendum", "rack", "pressure_angle"}
	case involute.TipBelowBase, involute.TipBelowRoot, involute.Pointed:
		return []string{"tip_diameter", "addendum", "shift", "teeth"}
	case involute.ChamferTooLarge:
		return []string{"tip_chamfer"}
	case involute.RoundTooLarge:
		return []string{"tip_round"}
	case involute.ReliefOff, involute.ReliefTooLarge:
		return []string{"relief"}
	case involute.MillTooLarge, involute.MillHelical, involute.MillTooDeep:
		return []string{"root"}
	case involute.TooThick:
		return []string{"thin", "thinning"}
	case involute.RootNotPositive, involute.NoInvolute, involute.CutOff:
		return []string{"dedendum", "shift", "teeth"}
	case involute.ThicknessNotPositive, involute.SpaceClosed:
		return []string{"shift", "teeth"}
	case involute.NotFinite:
		return []string{"addendum", "dedendum", "shift", "tip_diameter", "tip_chamfer"}
	}
	return []string{"teeth"}
}

// apart words two lengths with as many digits as it takes to tell them apart.
func (r request) apart(a, b float64) (string, string) {
	for more := range 7 {
		n := r.display.Decimals() + more
		x, y := r.display.Format(a, n), r.display.Format(b, n)
		if x != y || more == 6 {
			return x + " " + r.display.String(), y + " " + r.display.String()
		}
	}
	return r.length(a), r.length(b)
}

// remedy says what would lower a tip that is too high, or raise one that is too low.
func (g *gear) remedy(tooHigh bool, limit string) string {
	switch {
	case g.settings.has("tip_diameter") && tooHigh:
		return "It must be under " + limit
	case g.settings.has("tip_diameter"):
		return "It must be above " + limit
	case g.settings.has("addendum") && tooHigh:
		return "Lower addendum, or give tip_diameter under " + limit
	case g.settings.has("addendum"):
		return "Raise addendum"
	case tooHigh:
		return "Lower shift, or give tip_diameter under " + limit
	}
	return "Raise shift or teeth"
}

func (j *job) gearReason(g *gear, e *involute.Impossible) string {
	v, l := j.apart(e.Value, e.Limit)
	switch e.Reason {
	case involute.RackPointed:
		return fmt.Sprintf("a rack dedendum of %.4g × module makes the rack pointed; at this pressure angle it must be under %.4f × module", e.Value, e.Limit)
	case involute.RackTipTooRound:
		return fmt.Sprintf("a rack tip radius of %.4g × module does not fit; it must be from 0 to %.4f × module", e.Value, math.Max(e.Limit, 0))
	case involute.RackTooShallow:
		return "the rack has no depth; addendum and dedendum together must be above 0, and so must dedendum"
	case involute.TipBelowBase:
		return fmt.Sprintf("the outside (tip) diameter %s is not above the base circle, %s; there is no involute. %s", v, l, g.remedy(false, l))
	case involute.TipBelowRoot:
		return fmt.Sprintf("the outside (tip) diameter %s is not above the root diameter, %s. %s", v, l, g.remedy(false, l))
	case involute.RootNotPositive:
		return fmt.Sprintf("the root diameter comes out at %s; take more teeth, a larger shift or less dedendum", v)
	case involute.Pointed:
		return fmt.Sprintf("pointed teeth: the flanks meet at a diameter of %s, below the outside (tip) diameter %s. %s", l, v, g.remedy(true, l))
	case involute.ThicknessNotPositive:
		return fmt.Sprintf("the tooth thickness comes out at %s; raise shift", v)
	case involute.SpaceClosed:
		return fmt.Sprintf("the tooth thickness %s leaves no space in the pitch of %s; lower shift", v, l)
	case involute.NoInvolute:
		return fmt.Sprintf("undercut up to a diameter of %s, the tip ends at %s: no involute is left. Raise shift or teeth", v, l)
	case involute.CutOff:
		return "undercut cuts the teeth off at their roots; raise shift or teeth"
	case involute.ChamferTooLarge:
		if e.Limit <= 0 && e.Value > 0 {
			return "a 45° tip chamfer does not fit: the flanks of so few teeth lean as much themselves at the tip. Leave tip_chamfer out"
		}
		return fmt.Sprintf("a tip chamfer of %s is too large; it must be from 0 to under %s", v, l)
	case involute.RoundTooLarge:
		return fmt.Sprintf("a tip rounding of %s is too large; it must be under %s", v, l)
	case involute.ReliefOff:
		return fmt.Sprintf("the relief starts at a diameter of %s, off the flank, which ends at %s; start it between form and outside diameter", v, l)
	case involute.ReliefTooLarge:
		return fmt.Sprintf("a tip relief of %s is too much for where it starts; at most %s, or start it lower", v, l)
	case involute.TooThick:
		return fmt.Sprintf("teeth %s thick need a cutter narrower than its own rounding; at this depth at most %s", v, l)
	case involute.MillTooLarge:
		if e.Limit <= 0 {
			return fmt.Sprintf("an end mill of %s does not get into the tooth space, nor does any other", v)
		}
		return fmt.Sprintf("an end mill of %s does not get into the tooth space. The largest that passes is %s%s", v, j.lengthDown(e.Limit), j.usualMill(e.Limit))
	case involute.MillHelical:
		return "the root of a helical gear winds about the axis and cannot be cut by an end mill along the axis; take root = \"generated\""
	case involute.MillTooDeep:
		return fmt.Sprintf("the mate's tip needs a root diameter of %s, which is not between 0 and %s", v, l)
	case involute.BadHelix:
		return fmt.Sprintf("a helix angle of %s is past the limit of %s", degrees(e.Value), degrees(e.Limit))
	case involute.BadPressureAngle:
		return fmt.Sprintf("a pressure angle of %s is past the limit of %s", degrees(e.Value), degrees(e.Limit))
	}
	return "a number is out of any sense; the module must be from 0.01 to 500 mm, coefficients of the order of 1"
}
