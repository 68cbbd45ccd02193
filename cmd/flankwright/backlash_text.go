package main

import (
	"fmt"
	"strings"

	"flankwright/inspect"
)

// text prints first how thin the teeth must be and what to measure, then where
// the backlash goes.
func (b *backlash) text(p *page, digits int) []byte {
	u := b.job.display
	if title, _, _ := b.job.top.word("title"); title != "" {
		p.head(title)
	}
	if n := len(b.Warnings); n > 0 {
		p.line("%s below", plural(n, "warning"))
	}
	for _, m := range b.Meshes {
		m.problemText(p, b.job)
	}
	if b.targets != nil {
		p.blank()
		p.grid(b.limitsGrid(u, digits))
		b.job.moreDigits(p, b.list, digits)
		b.measureText(p, digits)
	}
	for _, m := range b.Meshes {
		m.budgetText(p, b.job, digits)
	}
	b.notCounted(p)
	for _, m := range b.Meshes {
		if len(m.Customary) > 0 {
			m.customaryText(p, b.job, digits)
		}
	}
	p.explanations(b.Explain)
	p.warnings(b.Warnings)
	return []byte(p.b.String())
}

// problemText says that a backlash cannot be had, what costs most and what would help.
func (b *meshBacklash) problemText(p *page, j *job) {
	if b.Possible {
		return
	}
	p.blank()
	p.wrapped("NO: "+b.Problem+".", "  ")
	if b.Left != nil && b.CostsMost != "" && b.problem != nil && b.problem.Kind == inspect.NoRoom {
		p.wrapped(fmt.Sprintf("Left for the teeth: %s at worst, %s statistically. Most goes to: %s.", j.length(b.Left.Worst), j.length(b.Left.Statistical), b.CostsMost), "  ")
	}
	if len(b.Remedies) > 0 {
		p.line("Any one of these would do; by how much it is gone beyond is left for the teeth:")
		for _, r := range b.Remedies {
			p.wrapped("  - "+r.Text, "    ")
		}
	}
}

// limitsGrid is the table of the gears' thickness limits.
func (b *backlash) limitsGrid(u inspect.Unit, digits int) grid {
	g := grid{}
	var low, high, thinLow, thinHigh, left, by []string
	for _, x := range b.list {
		g.heads = append(g.heads, x.name)
		s := u.FormatLimits(x.thickness.Limits, digits)
		t := u.FormatLimits(x.planned().Thickness(x.thickness.Limits), digits) // what is left to nominal
		low, high, thinLow, thinHigh = append(low, s.Low), append(high, s.High), append(thinLow, t.Low), append(thinHigh, t.High)
		width := u.FormatLimits(inspect.Limits{Max: x.thickness.Limits.Width()}, s.Decimals) // rounded down, as the limits are inward
		left, by = append(left, width.High), append(by, thicknessWords(x))
	}
	unit := u.String()
	g.row("Tooth thickness, normal, least", unit, low...)
	g.row("  most", unit, high...)
	g.row("Thinner than nominal, least", unit, thinLow...)
	g.row("  most", unit, thinHigh...)
	g.row("Left for the machinist, thickness tolerance", unit, left...)
	g.row("  decided by", "", by...)
	return g
}

// measureText prints the targets of each gear that follow: the first usable pin
// and span, and the chords.
func (b *backlash) measureText(p *page, digits int) {
	for i, t := range b.targets.gears {
		short := t
		short.OverPins, short.Span = nil, nil
		if pin := t.firstPin(); pin != nil {
			one := *pin
			one.Also, one.Why = nil, ""
			short.OverPins = []pinTarget{one}
		}
		if s := t.firstSpan(); s != nil {
			one := *s
			one.Why, one.Missing = "", ""
			short.Span = []spanTarget{one}
		}
		p.blank()
		p.head("What to measure on " + b.list[i].name)
		var more []string
		g := b.targets.measureGrid(short, b.job.display, digits, &more)
		g.rows = g.rows[:len(g.rows)-1] // the thickness stands above
		p.grid(g)
		for _, m := range more {
			p.line("  %s", m)
		}
		if short.OverPins == nil || short.Span == nil {
			p.line("  What cannot be used is left out; flankwright targets says why.")
		}
		p.line("  Chordal height %s, constant chord height %s; more by: flankwright targets", b.job.display.Format(t.Chordal.Height, digits), b.job.display.Format(t.ConstantChord.Height, digits))
	}
}

// budgetText prints the budget of a mesh.
func (b *meshBacklash) budgetText(p *page, j *job, digits int) {
	u := j.display
	f := func(mm float64) string { return u.Format(mm, digits+1) } // small amounts: one digit more
	unit := u.String()
	p.blank()
	p.head(fmt.Sprintf("Budget of %s and %s: backlash, circumferential, at the working pitch circle", b.Gears[0], b.Gears[1]))
	g := grid{heads: []string{"takes", "likely", "adds", "likely"}}
	for _, r := range b.Budget {
		g.row(r.text, unit, f(r.Worst), f(r.Statistical), f(r.WorstAdds), f(r.StatisticalAdds))
	}
	sum := func(l span) (string, string) { return f(b.Middle - l.Min), f(l.Max - b.Middle) }
	takes, adds := sum(b.Circumferential)
	takesRSS, addsRSS := sum(b.Statistical)
	g.row("In all", unit, takes, takesRSS, adds, addsRSS)
	g.row("In the middle, at 20 °C and dry", unit, f(b.Middle), f(b.Middle), f(b.Middle), f(b.Middle))
	g.row("Backlash, least and most", unit, f(b.Circumferential.Min), f(b.Statistical.Min), f(b.Circumferential.Max), f(b.Statistical.Max))
	p.grid(g)
	p.wrapped("Likely (statistically): shares of what nearly all pairs have, by the means of deviations and the root of the sum of squares of their spreads; what every pair meets, as heat, in full.", "  ")
	switch {
	case b.alone:
		p.line("Planned alone, since the backlash of another mesh cannot be had.")
	case b.problem != nil:
		p.line("Shown with teeth that give the least asked for, and have no tolerance.")
	}
	b.accuracyText(p)
	if b.Asked != nil {
		p.line("Asked for: %s, held %s.", j.wishText(b.mesh), b.Method)
	}
	if b.Left != nil && b.Possible {
		text := fmt.Sprintf("It leaves the thicknesses of both gears together %s at worst, %s statistically.", j.length(b.Left.Worst), j.length(b.Left.Statistical))
		if b.CostsMost != "" {
			text += " Most of the rest goes to: " + b.CostsMost + "."
		}
		p.wrapped(text, "  ")
	}
	p.blank()
	p.grid(b.heatGrid(unit, f))
	b.randomText(p, j)
}

// accuracyText says by which standard the deviations are.
func (b *meshBacklash) accuracyText(p *page) {
	var words []string
	for _, g := range []*gear{b.mesh.first, b.mesh.second} {
		if g.flanks != nil {
			words = append(words, g.name+" "+g.flanks.Accuracy.String())
		}
	}
	if len(words) > 0 {
		p.line("Accuracy: %s.", strings.Join(words, ", "))
	}
}

// heatGrid is the backlash at each temperature.
func (b *meshBacklash) heatGrid(unit string, f func(float64) string) grid {
	g := grid{heads: []string{"least", "likely", "middle", "likely", "most"}}
	for _, h := range b.At {
		g.row(fmt.Sprintf("Backlash at %s °C", celsius(h.Temperature)), unit, f(h.Worst.Min), f(h.Statistical.Min), f(h.Middle), f(h.Statistical.Max), f(h.Worst.Max))
	}
	return g
}

// randomText says what came out of pairs drawn at random.
func (b *meshBacklash) randomText(p *page, j *job) {
	r := b.Random
	if r == nil {
		return
	}
	text := fmt.Sprintf("Of %d pairs drawn at random (seed %d) %s bind somewhere", r.Pairs, r.Seed, percent(r.Bind, r.Pairs))
	if b.mesh.plan.Climate != nil {
		text += ", hot or cold"
	}
	if b.mesh.plan.Deviations != [2]inspect.Deviations{} {
		text += ", when turned until all their deviations have met"
	}
	if r.Short != nil {
		text += fmt.Sprintf("; %s fall below %s somewhere", percent(*r.Short, r.Pairs), j.length(b.Asked.Min))
	}
	if r.Over != nil {
		text += fmt.Sprintf("; %s exceed %s somewhere", percent(*r.Over, r.Pairs), j.length(*b.Asked.Max))
	}
	p.wrapped(text+fmt.Sprintf(". Nearly all (99.7 %%) stay between %s and %s.", j.length(r.Nearly.Min), j.length(r.Nearly.Max)), "  ")
}

// percent words a share of random pairs.
func percent(share float64, pairs int) string {
	if share == 0 {
		return "none"
	}
	if share == 1 {
		return "all"
	}
	text := fmt.Sprintf("%.2f %%", 100*share)
	if strings.Trim(text, "0. %") == "" {
		return fmt.Sprintf("%.0f of them", share*float64(pairs))
	}
	return text
}

// notCounted says what no budget here counts, and what this one lacks.
func (b *backlash) notCounted(p *page) {
	var lack []string
	for _, g := range b.list {
		switch {
		case g.flanks == nil && g.runout == nil:
			lack = append(lack, "runout and tooth deviations of "+g.name+" (give accuracy, or runout as measured)")
		case g.flanks == nil:
			lack = append(lack, "pitch, profile and helix of "+g.name+" (give accuracy)")
		case !g.flanks.HasHelix:
			lack = append(lack, "the helix of "+g.name+" (give face_width)")
		}
	}
	for _, m := range b.Meshes {
		if m.mesh.temperature == nil {
			give := "temperature, housing and material"
			if m.mesh.housing != nil {
				give = "temperature"
			}
			lack = append(lack, "heat (give "+give+")")
			break
		}
	}
	swell := false
	for _, g := range b.list {
		swell = swell || g.swell.Max > 0
	}
	p.blank()
	text := "Not counted: shafts out of parallel, play of bearings, bending under load, gears warmer than the housing, burrs and dirt"
	if swell {
		text += ", swelling of the housing"
	}
	text += "."
	if len(lack) > 0 {
		text += " Not given, and so not counted: " + strings.Join(lack, "; ") + "."
	}
	p.wrapped(text, "  ")
}
