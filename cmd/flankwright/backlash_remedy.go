package main

import (
	"fmt"
	"math"

	"flankwright/inspect"
)

// A remedyText is one change that alone would make a backlash possible.
type remedyText struct {
	What  string   `json:"what"`
	Value *float64 `json:"value,omitempty"` // mm, or a share
	Text  string   `json:"text"`
}

// remedies lists what would make a mesh's backlash possible.
func (j *job) remedies(m *mesh) []remedyText {
	out := []remedyText{}
	add := func(what string, value float64, format string, args ...any) {
		out = append(out, remedyText{what, &value, fmt.Sprintf(format, args...)})
	}
	p := j.problem
	if p == nil || j.meshes[p.Mesh] != m {
		j.openCenter(m, add)
		return out
	}
	if p.Kind == inspect.Conflict {
		return out
	}
	for _, r := range m.plan.Remedies(m.pair(), p) {
		switch r.Kind {
		case inspect.WidenBacklash:
			add("greatest backlash", r.Value, "allow more than %s of backlash; a gear's tolerance is what goes beyond", j.length(r.Value))
		case inspect.AskForMore:
			add("least backlash", r.Value, "ask for %s or more: nominal teeth already have that", j.length(r.Value))
		case inspect.CloserCenter:
			add("center tolerance", r.Value, "hold the center distance closer than ±%s", j.length(r.Value))
		case inspect.CloserRunout:
			add("runout", r.Value, "bring the runout of both gears under %s", j.runoutsText(m, r.Value))
		case inspect.FinerTeeth:
			if text := finerText(m, r.Value); text != "" {
				add("accuracy", r.Value, "%s", text)
			}
		case inspect.SteadierWarmth:
			add("climate", r.Value, "keep heat and swelling to less than %.0f %% of it, or take materials that grow alike", 100*r.Value)
		case inspect.MoveCenter:
			add("center distance", r.Value, "%s, to %s", j.moveText(r.Value), j.length(m.plan.Center.Middle()+r.Value))
		case inspect.Statistically:
			out = append(out, remedyText{"statistically", nil, "hold the backlash statistically, budget = \"statistical\": a few pairs will then lie outside, and pairs drawn at random show how many"})
		case inspect.WidenStatistically:
			add("greatest backlash, held statistically", r.Value, "allow more than %s and hold it statistically, budget = \"statistical\"", j.length(r.Value))
		}
	}
	return out
}

// openCenter says how far to move the center where the thicknesses are given and
// the backlash falls short, or the other way round.
func (j *job) openCenter(m *mesh, add func(what string, value float64, format string, args ...any)) {
	want := m.plan.Backlash
	b, err := m.budget()
	if err != nil || want == nil {
		return
	}
	if got := b.By(m.plan.Method); got.Min >= want.Min && !m.leastOnly {
		add("greatest backlash", got.Max, "allow %s of backlash", j.length(got.Max))
		return
	}
	if by, ok := m.plan.CenterFor(m.first.thickness.Limits, m.second.thickness.Limits, want.Min); ok {
		add("center distance", by, "%s, to %s; then the least is what is asked for", j.moveText(by), j.length(m.plan.Center.Middle()+by))
	}
}

func (j *job) moveText(by float64) string {
	if by < 0 {
		return "close the center distance by " + j.length(-by)
	}
	return "open the center distance by " + j.length(by)
}

// runoutsText words both runouts at a share of what they are.
func (j *job) runoutsText(m *mesh, share float64) string {
	d := m.plan.Deviations
	text := fmt.Sprintf("%s and %s", j.length(d[0].Runout*share), j.length(d[1].Runout*share))
	return text + fmt.Sprintf(" (%.0f %% of what they are)", 100*share)
}

// finerText words by how many classes finer the gears must be: a class is a
// factor of √2 (ISO 1328-1:2013, clause 5).
func finerText(m *mesh, share float64) string {
	if m.first.flanks == nil && m.second.flanks == nil {
		return ""
	}
	n := int(math.Floor(2*math.Log2(1/share))) + 1
	text := fmt.Sprintf("make the teeth finer by %s", plural2(n, "class", "classes"))
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

func plural2(n int, one, many string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, many)
}
