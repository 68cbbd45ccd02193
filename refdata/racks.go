package refdata

import (
	"fmt"
	"math"
	"strings"
)

// A Rack is a basic rack tooth profile (ISO 53). Its lengths are in modules
// (in 1/P for the inch profiles, which is the same thing).
type Rack struct {
	Name             string
	PressureAngleDeg float64
	Addendum         float64 // h*aP
	Dedendum         float64 // h*fP, without DedendumExtraInch
	// TipRadius is ρ*fP, the radius at the tip of the rack that makes the root
	// fillet. Where HasTipRadius is false the source gives none, and this is the
	// largest that the geometry allows at the rack's own angle and dedendum:
	// the lesser of c*P/(1 − sin α) and (π/4 − h*fP tan α)/tan(45° − α/2).
	TipRadius    float64
	HasTipRadius bool
	// DedendumExtraInch is to be added to Dedendum/P, in inches (fine pitch:
	// 0.002 in; else 0). From P 187 up it leaves too little room between the
	// flanks for the TipRadius of "20 full depth fine".
	DedendumExtraInch float64
	Source            Source
	Remark            string // what the profile is for
}

// Racks returns the named racks, ISO 53 first.
func Racks() []Rack {
	rs := records("racks")
	racks := make([]Rack, len(rs))
	for i, r := range rs {
		racks[i] = Rack{
			Name:              r.text("name"),
			PressureAngleDeg:  r.number("alpha_P_deg"),
			Addendum:          r.number("haP"),
			Dedendum:          r.number("hfP"),
			HasTipRadius:      r.has("rhofP"),
			DedendumExtraInch: r.number("hfP_add_in"),
			Source:            r.source(),
			Remark:            r.text("remark"),
		}
		radius := "rho_max"
		if racks[i].HasTipRadius {
			radius = "rhofP"
		}
		racks[i].TipRadius = r.number(radius)
	}
	return racks
}

// RackByName returns the rack of that name: RackFor with no pressure angle
// asked for.
func RackByName(name string) (Rack, error) { return RackFor(name, 0) }

// RackFor returns the rack of that name at a normal pressure angle in degrees,
// 0 for none asked for:
//
//   - a name that carries its angle ("25 full depth coarse") means that rack; an
//     angle asked for beside it must be the same;
//   - such a name without the angle ("full depth coarse") means the rack of that
//     name at the angle asked for, at 20° when none is; no other angle is
//     made up from it, since inch proportions differ from angle to angle;
//   - a name that carries no angle ("ISO 53 A") means its proportions, at the
//     angle asked for. The rack keeps its own tip radius, which may be too large
//     between flanks at a steeper angle, and the Remark says what was done.
//
// The error of an unknown name says which is nearest and how to list all.
func RackFor(name string, pressureAngleDeg float64) (Rack, error) {
	if !(pressureAngleDeg >= 0 && pressureAngleDeg < 90) {
		return Rack{}, fmt.Errorf("pressure angle %.8g° for rack %q: must be above 0° and below 90°", pressureAngleDeg, name)
	}
	racks := Racks()
	names := make([]string, 0, len(racks))
	for _, r := range racks {
		if plain(r.Name) == plain(name) {
			return r.at(pressureAngleDeg)
		}
		names = append(names, r.Name)
	}
	wanted := pressureAngleDeg
	if wanted == 0 {
		wanted = 20 // the usual angle: ISO 53
	}
	var others []string
	for _, r := range racks {
		bare, ok := r.bareName()
		if !ok || plain(bare) != plain(name) {
			continue
		}
		if sameAngle(r.PressureAngleDeg, wanted) {
			return r, nil
		}
		others = append(others, fmt.Sprintf("%q", r.Name))
	}
	if len(others) > 0 {
		return Rack{}, fmt.Errorf("no rack %q at a pressure angle of %.8g°; there is %s; for other proportions give addendum, dedendum and tip radius",
			name, wanted, strings.Join(others, " and "))
	}
	return Rack{}, unknown("rack", name, names, "racks")
}

// at returns the rack at the angle asked for (0: its own), or an error if its
// name carries another.
func (r Rack) at(pressureAngleDeg float64) (Rack, error) {
	if pressureAngleDeg == 0 || sameAngle(pressureAngleDeg, r.PressureAngleDeg) {
		return r, nil
	}
	if _, carries := r.bareName(); carries {
		return Rack{}, fmt.Errorf("rack %q is for a pressure angle of %g°, but %.8g° is asked for; leave one of the two out",
			r.Name, r.PressureAngleDeg, pressureAngleDeg)
	}
	r.Remark = fmt.Sprintf("proportions of a rack for %g°, used at %.8g°; %s", r.PressureAngleDeg, pressureAngleDeg, r.Remark)
	r.PressureAngleDeg = pressureAngleDeg
	return r, nil
}

// bareName returns the name without the pressure angle it begins with, and
// whether it begins with it.
func (r Rack) bareName() (string, bool) {
	return strings.CutPrefix(r.Name, fmt.Sprintf("%g ", r.PressureAngleDeg))
}

// sameAngleDeg is how far two angles in degrees may differ and still be the
// one that was written: an angle that went to radians and back is off by
// about 1e-14, while 20° and 20°0'01" differ by 3e-4.
const sameAngleDeg = 1e-9

func sameAngle(a, b float64) bool { return math.Abs(a-b) <= sameAngleDeg }
