package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
)

// A remedyText is one change that alone would make a backlash possible.
type remedyText struct {
	What  string   `json:"what"`
	Value *float64 `json:"value_mm,omitempty"`
	Share *float64 `json:"share,omitempty"` // of what it is
	Shift *float64 `json:"shift,omitempty"` // to add
	Text  string   `json:"text"`
}

// remedies lists what would make a mesh's backlash possible. Values are worded rounded
// to the side on which they work.
func (j *job) remedies(b *meshBacklash) []remedyText {
	if b.problem == nil {
		return j.fixedRemedies(b)
	}
	out := []remedyText{}
	if b.problem.Kind == inspect.Conflict {
		return out
	}
	m := b.mesh
	for _, r := range m.plan.Remedies(m.pair(), b.problem) {
		if text, ok := j.remedyText(m, r, b.problem); ok {
			out = append(out, text)
		}
	}
	return out
}

// remedyText words a remedy.
func (j *job) remedyText(m *mesh, r inspect.Remedy, p *inspect.PlanProblem) (remedyText, bool) {
	length := func(what, format string, args ...any) (remedyText, bool) {
		return remedyText{What: what, Value: &r.Value, Text: fmt.Sprintf(format, args...)}, true
	}
	share := func(what, format string, args ...any) (remedyText, bool) {
		return remedyText{What: what, Share: &r.Value, Text: fmt.Sprintf(format, args...)}, true
	}
	switch r.Kind {
	case inspect.WidenBacklash:
		return length("greatest backlash", "allow more than %s of backlash; a gear's tolerance is what goes beyond", j.lengthUp(r.Value))
	case inspect.WidenStatistically:
		return length("greatest backlash, held statistically", "allow more than %s and hold it statistically, budget = \"statistical\"", j.lengthUp(r.Value))
	case inspect.AskForMore:
		text := fmt.Sprintf("ask for %s or more", j.lengthUp(p.Nominal.Min))
		if most := p.Nominal.Max + 2*j.lastDigit(); most > m.plan.Backlash.Max {
			text += ", and allow " + j.lengthUp(most)
		}
		return length("least backlash", "%s: nominal teeth already have that", text)
	case inspect.CloserCenter:
		if r.Value < j.lastDigit() {
			return remedyText{}, false
		}
		return length("center tolerance", "hold the center distance closer than ±%s", j.lengthDown(r.Value))
	case inspect.CloserRunout:
		if text := j.runoutsText(m, r.Value); r.Value < smallestShare || text == "" {
			return remedyText{}, false
		}
		return share("runout", "bring the runout under %s (%.0f %% of what it is)", j.runoutsText(m, r.Value), math.Floor(100*r.Value))
	case inspect.FinerTeeth:
		text := finerText(m, r.Value)
		t, _ := share("accuracy", "%s", text)
		return t, text != ""
	case inspect.SteadierWarmth:
		if r.Value < smallestShare {
			return remedyText{}, false
		}
		return share("climate", "%s", climateWay(m.plan.Climate, r.Value))
	case inspect.MoveCenter:
		return length("center distance", "%s", j.moveText(m, r.Value))
	case inspect.RaiseShift:
		who := "the sum of the shifts"
		for _, g := range []*gear{m.first, m.second} {
			if g.ownThin() != nil {
				who = "the shift of " + m.mate(g).name
			}
		}
		last := 1e-4
		return remedyText{What: "shift", Shift: &r.Value, Text: fmt.Sprintf("raise %s by %.4f", who, math.Ceil(r.Value/last-1e-6)*last)}, true
	case inspect.TakeNominal:
		text := j.nominalText(m, r)
		return remedyText{What: "thin", Text: text}, text != ""
	}
	return remedyText{What: "statistically", Text: "hold the backlash statistically, budget = \"statistical\", for all but a few pairs in a thousand"}, true
}

// climateWay words a share of the heat and the swelling.
func climateWay(c *inspect.Climate, share float64) string {
	const ref = inspect.ReferenceTemperature
	var words []string
	if !c.Steady() {
		words = append(words, fmt.Sprintf("the temperature within %s to %s °C", celsius(math.Ceil(10*(ref+share*(c.Temperature.Min-ref)))/10), celsius(math.Floor(10*(ref+share*(c.Temperature.Max-ref)))/10)))
	}
	if most := max(c.Swell[0].Max, c.Swell[1].Max); most > 0 {
		words = append(words, fmt.Sprintf("swelling under %.0f %% of what it is", math.Floor(100*share)))
	}
	return "keep " + strings.Join(words, " and ")
}

// mostFiner is by how many classes finer is still advice for a shop.
const mostFiner = 3

// smallestShare is the share of a deviation below which asking for that little is no advice.
const smallestShare = 0.05

// nominalText words nominal teeth as the thickest: the thin of each gear that is free,
// and the backlash that they then have; blank where it is too little to hold.
func (j *job) nominalText(m *mesh, r inspect.Remedy) string {
	var words []string
	for i, g := range []*gear{m.first, m.second} {
		switch {
		case g.ownThin() != nil:
		case r.Thin[i].Max < j.lastDigit():
			return ""
		default:
			words = append(words, fmt.Sprintf("thin = \"0..%s\" in %s", strings.ReplaceAll(j.lengthDown(r.Thin[i].Max), " ", ""), g.name))
		}
	}
	b, err := m.plan.Budget(m.first.planned().Thickness(r.Thin[0]), m.second.planned().Thickness(r.Thin[1]))
	if err != nil {
		return ""
	}
	got := b.By(m.plan.Method)
	return fmt.Sprintf("take nominal teeth as the thickest, %s, which makes %s to %s of backlash", strings.Join(words, " and "), j.lengthDown(got.Min), j.lengthUp(got.Max))
}

// fixedRemedies says what to change where both thicknesses are given and the backlash
// is not what is asked for: the center, the greatest backlash allowed, or both.
func (j *job) fixedRemedies(b *meshBacklash) []remedyText {
	m, want, got := b.mesh, b.mesh.plan.Backlash, b.budget.By(b.mesh.plan.Method)
	if want == nil {
		return []remedyText{}
	}
	if got.Min >= want.Min {
		return []remedyText{{What: "greatest backlash", Value: &got.Max, Text: "allow " + j.lengthUp(got.Max) + " of backlash"}}
	}
	by, ok := m.plan.CenterFor(b.thick[0], b.thick[1], want.Min)
	if !ok {
		return []remedyText{}
	}
	text := j.moveText(m, by)
	moved, err := m.plan.Moved(by).Budget(b.thick[0], b.thick[1])
	if err != nil {
		return []remedyText{}
	}
	if most := moved.By(m.plan.Method).Max; !m.plan.LeastOnly && most > want.Max {
		text += ", and allow " + j.lengthUp(most+j.lastDigit()) + " of backlash"
	}
	return []remedyText{{What: "center distance", Value: &by, Text: text}}
}

// lastDigit is one of the last digit that lengths are shown with, mm.
func (r request) lastDigit() float64 {
	return r.display.MM() * math.Pow10(-r.display.Decimals())
}

// moveText words a move of the center distance, rounded up.
func (j *job) moveText(m *mesh, by float64) string {
	size := j.lengthUp(math.Abs(by))
	last := j.lastDigit()
	steps := math.Ceil(math.Abs(by)/last-1e-6) * last
	to := j.length(m.plan.Center.Middle() + math.Copysign(steps, by))
	if by < 0 {
		return "close the center distance by " + size + ", to " + to
	}
	return "open the center distance by " + size + ", to " + to
}

// runoutsText words the runouts at a share of what they are, blank where that is no advice.
func (j *job) runoutsText(m *mesh, share float64) string {
	var words []string
	for i, g := range []*gear{m.first, m.second} {
		d := m.plan.Deviations[i]
		switch {
		case d.Runout == 0:
		case d.Runout*share < j.lastDigit() || (m.plan.Method == inspect.Statistical && !d.Measured):
			return "" // nothing to measure, or what a class allows: a finer one is the way
		default:
			words = append(words, j.lengthDown(d.Runout*share)+" for "+g.name)
		}
	}
	return strings.Join(words, " and ")
}

// finerText words by how many classes finer the gears must be: a class is a
// factor of √2 (ISO 1328-1:2013, clause 5).
func finerText(m *mesh, share float64) string {
	n := int(math.Floor(2*math.Log2(1/share))) + 1
	by := math.Pow(2, -float64(n)/2)
	if n > mostFiner || (m.first.flanks == nil && m.second.flanks == nil) || !m.plan.WithFinerTeeth(by).Possible(m.pair()) {
		return ""
	}
	text := "make the teeth finer by 1 class"
	if n > 1 {
		text = fmt.Sprintf("make the teeth finer by %d classes", n)
	}
	for _, g := range []*gear{m.first, m.second} {
		if f := g.flanks; f != nil {
			finer := f.Accuracy
			if finer.Class -= n; finer.Class < 1 {
				return ""
			}
			text += fmt.Sprintf("; %s: %s", g.name, finer)
		}
	}
	return text
}
