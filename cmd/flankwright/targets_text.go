package main

import (
	"fmt"
	"strings"

	"flankwright/inspect"
)

// text prints the targets: for each gear what to measure with, low, aim and
// high, whether it can be used, and how many warnings stand below.
func (t *targets) text(p *page, digits int) []byte {
	u := t.job.display
	if title, _, _ := t.job.top.word("title"); title != "" {
		p.head(title)
	}
	var notes []string
	for i, g := range t.gears {
		p.blank()
		gear := t.list[i]
		head := fmt.Sprintf("%s, %d teeth", gear.name, gear.g.Teeth())
		if n := t.warningsBelow(gear); n > 0 {
			head += fmt.Sprintf("  (%s below)", plural(n, "warning"))
		}
		p.head(head)
		var more []string
		p.grid(t.measureGrid(g, u, digits, &more))
		notes = append(notes, t.reasons(gear.name, g)...)
		for _, m := range more {
			p.line("  %s", m)
		}
		t.below(p, gear, g, u, digits)
	}
	if len(notes) > 0 {
		p.blank()
		p.head("Not usable, or with a need")
		for _, n := range notes {
			p.wrapped(n, "  ")
		}
	}
	p.explanations(t.Explain)
	p.warnings(t.Warnings)
	return []byte(p.b.String())
}

func plural(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}

// mark says whether a measure can be used.
func mark(usable bool, why string) string {
	switch {
	case !usable:
		return "no *"
	case why != "":
		return "yes *"
	}
	return "yes"
}

// measureGrid is the table of one gear.
func (t *targets) measureGrid(g gearTargets, u inspect.Unit, digits int, more *[]string) grid {
	out := grid{heads: []string{"low", "aim", "high", "usable"}}
	unit := u.String()
	add := func(label string, l *span, aim *float64, usable bool, why string) {
		if l == nil {
			out.row(label, unit, "-", "-", "-", mark(usable, why))
			return
		}
		text := u.FormatLimits(inspect.Limits{Min: l.Min, Max: l.Max}, digits)
		if text.More {
			*more = append(*more, fmt.Sprintf("%s: the limits are closer than the last digit; they are printed with %d decimals.", strings.TrimSpace(label), text.Decimals))
		}
		out.row(label, unit, text.Low, u.Format(*aim, text.Decimals), text.High, mark(usable, why))
	}
	for _, p := range g.OverPins {
		add(fmt.Sprintf("Over two %s %s", p.kindText(), pinText(p.Pin, u)), p.Measurement, p.Aim, p.Usable, p.Why)
		for _, a := range p.Also {
			label := "  " + wayText(a.text, p.Kind)
			if a.Pin != nil {
				label += ", " + pinText(*a.Pin, u)
			}
			add(label, a.Measurement, a.Aim, a.Usable, a.Why)
		}
	}
	for _, s := range g.Span {
		add(fmt.Sprintf("Span over %s", teethText(s.Teeth)), s.Length, s.Aim, s.Usable, s.Why+s.Missing)
	}
	add("Chordal thickness", &g.Chordal.Thickness, &g.Chordal.Aim, g.Chordal.Usable, g.Chordal.Why)
	add("Constant chord", &g.ConstantChord.Thickness, &g.ConstantChord.Aim, g.ConstantChord.Usable, g.ConstantChord.Why)
	mid := inspect.Limits{Min: g.Thickness.Min, Max: g.Thickness.Max}.Middle()
	add("Tooth thickness, normal", &g.Thickness, &mid, true, "")
	return out
}

func teethText(k int) string {
	if k == 1 {
		return "1 tooth"
	}
	return fmt.Sprintf("%d teeth", k)
}

func wayText(text, kind string) string {
	if strings.Contains(text, "%s") {
		return fmt.Sprintf(text, strings.TrimSuffix(kind, "s"))
	}
	return text
}

// pinText words a pin's diameter to the micrometer or 0.00001 in, without needless zeros.
func pinText(d float64, u inspect.Unit) string {
	s := u.Format(d, u.Decimals()+1)
	s = strings.TrimRight(s, "0")
	if strings.HasSuffix(s, ".") {
		s += "0"
	}
	return "Ø" + s
}

// below prints what stands under a gear's table: heights, contacts, sensitivities.
func (t *targets) below(p *page, gear *gear, g gearTargets, u inspect.Unit, digits int) {
	f := func(mm float64) string { return u.Format(mm, digits) }
	fine := func(mm float64) string { return u.Format(mm, digits+1) }
	step := 0.01 // a usual correction: 0.01 mm, or 0.001 in
	if u == inspect.Inch {
		step = 0.0254
	}
	p.line("  Chordal height %s, constant chord height %s, below an outside diameter of %s %s", f(g.Chordal.Height), f(g.ConstantChord.Height), f(g.Chordal.Tip), u)
	if g.IdealPin != nil {
		p.line("  Ideal pin Ø%s %s", u.Format(*g.IdealPin, u.Decimals()), u)
	}
	for _, m := range g.OverPins {
		if m.ByThickness == nil || m.Contact == nil {
			continue
		}
		p.line("  %s (%s): touches at %s to %s", pinText(m.Pin, u), m.From, f(m.Contact.Min), f(m.Contact.Max))
		way, by := "deeper reads", m.ByDepth
		if by == nil {
			way, by = "off each flank reads", m.ByFlank
		}
		p.line("    %s %s %s less; a tooth %s thinner reads %s less; a pin %s larger reads %s more",
			f(step), way, fine(step**by), f(step), fine(step**m.ByThickness), f(step), fine(step**m.ByPin))
		if note := t.job.measuredNote(m); note != "" {
			p.item(note)
		}
	}
	if g.Take != nil {
		t.takeText(p, g)
	}
}

// reasons returns the reasons against measures, named so that they are found.
func (t *targets) reasons(name string, g gearTargets) []string {
	var notes []string
	add := func(what, why string) {
		if why != "" {
			notes = append(notes, fmt.Sprintf("* %s, %s: %s", name, what, why))
		}
	}
	u := t.job.display
	for _, p := range g.OverPins {
		add("over "+p.Kind+" "+pinText(p.Pin, u), p.Why)
		for _, a := range p.Also {
			if a.Why != p.Why {
				add(wayText(a.text, p.Kind)+" "+pinText(p.Pin, u), a.Why)
			}
		}
	}
	for _, s := range g.Span {
		add("span over "+teethText(s.Teeth), s.Why)
		add("span over "+teethText(s.Teeth), s.Missing)
	}
	add("chordal thickness", g.Chordal.Why)
	add("constant chord", g.ConstantChord.Why)
	return notes
}
