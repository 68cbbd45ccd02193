package main

import (
	"errors"
	"fmt"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
)

// length words a length in the display unit, with its unit: "1.2500 in".
func (r request) length(mm float64) string {
	return r.display.Format(mm, r.display.Decimals()) + " " + r.display.String()
}

// missing says that a gear lacks a key.
func (j *job) missing(g *gear, key, hint string) error {
	if g.settings.at.line == 0 {
		return wrong("%s: %s is missing; %s", g.name, key, hint)
	}
	return fault(g.settings.at, "gear.%s: %s is missing; %s", g.name, key, hint)
}

// noGear says that a name is not one of the job's gears.
func noGear(name string, names []string) string {
	if near, ok := nearest(name, names); ok {
		return fmt.Sprintf("no gear %q; did you mean %q?", name, near)
	}
	return fmt.Sprintf("no gear %q; the job has %s", name, quoted(names))
}

func degrees(rad float64) string {
	return strings.TrimSuffix(strings.TrimRight(fmt.Sprintf("%.4f", rad/involute.Degree), "0"), ".") + "°"
}

// impossibleGear words why a gear cannot be, with its numbers and the way out.
func (j *job) impossibleGear(g *gear, err error) error {
	var imp *involute.Impossible
	if !errors.As(err, &imp) {
		return err
	}
	at := g.settings.at
	text := fmt.Sprintf("%s: %s", called(g), j.gearReason(imp))
	if v, ok := g.settings.vals[keyOf(imp.Reason)]; ok {
		at = v.at
	} else if v, ok := j.backlashOf(g); ok && keyOf(imp.Reason) == "thin" {
		at = v.at
	}
	if at.file == "" {
		return wrong("%s", text)
	}
	return fault(at, "%s", text)
}

// called names a gear in a sentence.
func called(g *gear) string {
	if g.name == "gear" {
		return "the gear"
	}
	return "gear " + g.name
}

// backlashOf returns the backlash that decided a gear's thickness.
func (j *job) backlashOf(g *gear) (value, bool) {
	for _, m := range j.meshes {
		if (m.first == g || m.second == g) && g.thickness.By == inspect.ByBacklash {
			v, ok := j.request.meshes[m.index].vals["backlash"]
			return v, ok
		}
	}
	return value{}, false
}

// keyOf names the key that a reason is most likely about, for its place in the file.
func keyOf(r involute.Reason) string {
	switch r {
	case involute.BadModule:
		return "module"
	case involute.RackTipTooRound:
		return "tip_radius"
	case involute.RackPointed, involute.RackTooShallow:
		return "dedendum"
	case involute.TipBelowBase, involute.TipBelowRoot:
		return "tip_diameter"
	case involute.ChamferTooLarge:
		return "tip_chamfer"
	case involute.ThicknessNotPositive, involute.SpaceClosed:
		return "thin"
	case involute.Pointed:
		return "shift"
	case involute.NotFinite:
		return "addendum"
	}
	return "teeth"
}

func (j *job) gearReason(e *involute.Impossible) string {
	v, l := j.length(e.Value), j.length(e.Limit)
	switch e.Reason {
	case involute.RackPointed:
		return fmt.Sprintf("a rack dedendum of %.4g × module makes the rack pointed; at this pressure angle it must be under %.4f × module", e.Value, e.Limit)
	case involute.RackTipTooRound:
		return fmt.Sprintf("a rack tip radius of %.4g × module does not fit; it must be from 0 to %.4f × module", e.Value, e.Limit)
	case involute.RackTooShallow:
		return "the rack has no depth; dedendum must be above 0"
	case involute.TipBelowBase:
		return fmt.Sprintf("the outside (tip) diameter %s is not above the base circle, %s; there is no involute. Raise shift, teeth or the tip diameter", v, l)
	case involute.TipBelowRoot:
		return fmt.Sprintf("the outside (tip) diameter %s is not above the root diameter, %s", v, l)
	case involute.RootNotPositive:
		return fmt.Sprintf("the root diameter comes out at %s; take more teeth or a larger shift", v)
	case involute.Pointed:
		return fmt.Sprintf("pointed teeth: the flanks meet at a diameter of %s, below the outside (tip) diameter %s. Lower shift, or give tip_diameter under %s", l, v, l)
	case involute.ThicknessNotPositive:
		return fmt.Sprintf("the tooth thickness comes out at %s; the thinning is more than the whole tooth", v)
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
	case involute.BadHelix:
		return fmt.Sprintf("a helix angle of %s is past the limit of %s", degrees(e.Value), degrees(e.Limit))
	case involute.BadPressureAngle:
		return fmt.Sprintf("a pressure angle of %s is past the limit of %s", degrees(e.Value), degrees(e.Limit))
	}
	return "a number is out of any sense; the module must be from 0.01 to 500 mm, coefficients of the order of 1"
}

// impossibleMesh words why two gears cannot run together.
func (j *job) impossibleMesh(m *mesh, err error) error {
	var imp *involute.Impossible
	if !errors.As(err, &imp) {
		return err
	}
	text := "they do not run together"
	switch imp.Reason {
	case involute.MatesDiffer:
		text = j.differ(m.first.g, m.second.g)
	case involute.CenterTooSmall:
		text = fmt.Sprintf("a center distance of %s is too small: the base circles alone need %s", j.length(imp.Value), j.length(imp.Limit))
	case involute.CenterNeverTight:
		text = "teeth this thin touch at no center distance; give center"
	}
	text = fmt.Sprintf("%s and %s: %s", m.first.name, m.second.name, text)
	if m.at.file == "" {
		return wrong("%s", text)
	}
	return fault(m.at, "%s", text)
}

func (j *job) differ(a, b *involute.Gear) string {
	switch {
	case a.Module() != b.Module():
		return fmt.Sprintf("the normal modules differ, %.6g and %.6g mm", a.Module(), b.Module())
	case a.PressureAngle() != b.PressureAngle():
		return fmt.Sprintf("the pressure angles differ, %s and %s", degrees(a.PressureAngle()), degrees(b.PressureAngle()))
	}
	return fmt.Sprintf("the helices do not fit, %s and %s: the angles must be alike and the hands opposite", helixWords(a), helixWords(b))
}

func helixWords(g *involute.Gear) string {
	b := g.Spec().Helix
	switch {
	case b > 0:
		return degrees(b) + " right hand"
	case b < 0:
		return degrees(-b) + " left hand"
	}
	return "straight (spur)"
}

// planError words a backlash that no tooth thickness gives.
func (j *job) planError(err error) error {
	var p *inspect.PlanProblem
	if !errors.As(err, &p) {
		var imp *involute.Impossible
		if errors.As(err, &imp) {
			return wrong("the backlash asked for: %s", j.length(imp.Value))
		}
		return err
	}
	return bad("backlash", j.request.meshes[p.Mesh].vals["backlash"], "%s", j.planReason(p))
}

// planReason says why a backlash cannot be had, and what could.
func (j *job) planReason(p *inspect.PlanProblem) string {
	m := j.meshes[p.Mesh]
	want := m.plan.Backlash
	text := fmt.Sprintf("%s and %s: %s to %s of backlash ", m.first.name, m.second.name, j.length(want.Min), j.length(want.Max))
	switch p.Kind {
	case inspect.TooThick:
		text += fmt.Sprintf("needs teeth thicker than nominal: as they are they already have %s at the tightest center. Ask for %s or more, ", j.length(p.Play), j.length(p.Play))
		if p.Tight > 0 {
			text += fmt.Sprintf("bring the center toward %s, ", j.length(p.Tight))
		}
		return text + "or raise shift"
	case inspect.Conflict:
		name := j.gears[p.Gear].name
		return text + fmt.Sprintf("cannot be had together with what the other meshes of %s and its mate ask for. Change one of the backlashes or thin_share, or give %s a thin of its own", name, name)
	}
	text += "leaves nothing for the teeth: "
	if m.first.thin != nil || m.second.thin != nil {
		text += "the center distance's tolerance and the gear that is already fixed take it all. "
	} else {
		text += "the center distance's tolerance takes it all. "
	}
	return text + fmt.Sprintf("Allow more than %s, or tighten the tolerance", j.length(p.Most))
}

// faultText words why a measure cannot be used.
func (r request) faultText(f inspect.Fault) string {
	v, l := r.length(f.Value), r.length(f.Limit)
	switch f.Code {
	case inspect.NoContact:
		return fmt.Sprintf("pin %s falls through without touching the involutes; the least that touches is %s", v, l)
	case inspect.BelowForm:
		return fmt.Sprintf("touches at %s, below the form diameter %s where the involute begins", v, l)
	case inspect.AboveTip:
		return fmt.Sprintf("touches at %s, above the end of the flank at %s", v, l)
	case inspect.UnderTips:
		return fmt.Sprintf("stands below the tips: reads %s, the anvils meet the teeth at %s", v, l)
	case inspect.TouchesRoot:
		return fmt.Sprintf("rests on the root, %s before the flanks", v)
	case inspect.FaceTooNarrow:
		return fmt.Sprintf("needs a face width over %s, the face is %s", l, v)
	case inspect.WrongWay:
		return "not for this number of teeth or helix"
	}
	return "no reading exists"
}

// why joins the reasons against a measure.
func (r request) why(faults []inspect.Fault) string {
	texts := make([]string, len(faults))
	for i, f := range faults {
		texts[i] = r.faultText(f)
	}
	return strings.Join(texts, "; ")
}
