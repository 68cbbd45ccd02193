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
	return faultAt(m.at, "%s", text)
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
		if errors.As(err, &imp) && imp.Reason == involute.CenterTooSmall {
			return wrong("a center distance of %s, less its tolerance and the runouts, leaves no working pressure angle: the base circles alone need %s", j.length(imp.Value), j.length(imp.Limit))
		}
		return err
	}
	text := j.planReason(p)
	if advice := j.planAdvice(p); advice != "" {
		text += ". " + advice
	}
	if j.meshes[p.Mesh].burdened() {
		text += "; the command backlash shows where it goes"
	}
	return bad("backlash", j.request.meshes[p.Mesh].vals["backlash"], "%s", text)
}

// planReason says why a backlash cannot be had.
func (j *job) planReason(p *inspect.PlanProblem) string {
	m := j.meshes[p.Mesh]
	text := fmt.Sprintf("%s and %s: %s of backlash ", m.first.name, m.second.name, j.wishText(m))
	switch p.Kind {
	case inspect.TooThick:
		return text + fmt.Sprintf("needs teeth thicker than nominal: as they are they already have %s, at the least", j.lengthUp(p.Nominal.Min))
	case inspect.Conflict:
		name := j.gears[p.Gear].name
		return text + fmt.Sprintf("cannot be had together with what the other meshes of %s and its mate ask for. Change one of the backlashes or thin_share, or give %s a thin of its own", name, name)
	}
	takers := "the center distance's tolerance"
	verb := "takes"
	if m.burdened() {
		takers, verb = "center distance, deviations and climate", "take"
	}
	if m.first.ownThin() != nil || m.second.ownThin() != nil {
		takers, verb = takers+" and the gear that is already fixed", "take"
	}
	return text + fmt.Sprintf("leaves nothing for the teeth: %s %s it all", takers, verb)
}

// planAdvice says in a line what would make it possible.
func (j *job) planAdvice(p *inspect.PlanProblem) string {
	m := j.meshes[p.Mesh]
	switch p.Kind {
	case inspect.NoRoom:
		return fmt.Sprintf("Allow more than %s, or tighten the tolerance", j.lengthUp(p.Most))
	case inspect.Conflict:
		return ""
	}
	var ways []string
	for _, r := range m.plan.Remedies(m.pair(), p) {
		if text, ok := j.remedyText(m, r, p); ok {
			ways = append(ways, text.Text)
		}
	}
	text := strings.Join(ways, "; or ")
	return strings.ToUpper(text[:1]) + text[1:]
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
	case inspect.OnRelief:
		return fmt.Sprintf("touches at %s, on the relieved flank, which starts at %s", v, l)
	case inspect.TipMoves:
		return "the cutter tops the teeth: measured from the tip they read the same however deep it cuts"
	case inspect.UnderTips:
		return fmt.Sprintf("stands below the tips: reaches %s, the teeth %s; take a larger pin", v, l)
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
