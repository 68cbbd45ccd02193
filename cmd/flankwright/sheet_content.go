package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/export"
	"flankwright/inspect"
	"flankwright/involute"
)

func footText(name string, page, of int) string {
	return fmt.Sprintf("flankwright · %s · page %d of %d", name, page, of)
}

// sheetTolerance is how near the drawn teeth follow the exact curves, × module: under a hair's line at any scale.
const sheetTolerance = 0.002

// sheet gathers what the inspection sheet of one gear says.
func (j *job) sheet(g *gear, t gearTargets, date string) (export.Sheet, error) {
	tooth := g.middle()
	spec := j.contourSpec(g, contourOptions{fit: export.FitOptions{Tolerance: sheetTolerance * g.g.Module()}})
	outline, _, err := export.NewContour(spec)
	if err != nil {
		return export.Sheet{}, cannot("sheet of %s: %v", g.name, err)
	}
	shape := export.GearShape{Teeth: g.g.Teeth(), Reference: g.g.ReferenceDiameter(), Root: tooth.RootDiameter(), Tip: g.g.TipDiameter()}
	if shape.Outline, err = outline.Cut(); err != nil {
		return export.Sheet{}, cannot("sheet of %s: %v", g.name, err)
	}
	if g.bore != nil {
		shape.Bore = []export.Path{export.BorePath(spec)}
	}
	shape.Bore, shape.Hub = append(shape.Bore, g.bolts.layout().Paths()...), g.hub
	word := func(key string) string { w, _, _ := j.top.word(key); return w }
	s := export.Sheet{
		Title: orDefault(word("title"), g.plainTitle()), Gear: g.name,
		Part: word("part"), DrawingNumber: word("drawing"), Author: word("author"), Date: date, Material: g.material.word(),
		Data: j.sheetData(g), InchFirst: j.display == inspect.Inch,
		Targets: j.sheetTargets(g, t), Limits: j.sheetLimits(g),
		Shape: shape, Pins: j.pinView(g, t, tooth), Span: j.spanView(g, t, tooth),
		Readings: j.sheetReadings(t), Method: sheetMethod(g, t), Cautions: sheetCautions(),
	}
	if len(t.OverPins) > 0 {
		if a := t.OverPins[0].firstAlso(); a != nil && a.bore > 0 {
			s.Cautions = append([]string{"One pin to the bore's far side: half of what the bore measures more or less than stated goes on or off the reading."}, s.Cautions...)
		}
	}
	for _, w := range j.about([]*gear{g}) {
		s.Warnings = append(s.Warnings, capital(w.Text)+".")
	}
	return s, nil
}

// figures words one target in both units; limits are rounded inward in each.
func figures(l span, aim float64) (low, mid, high export.Figure) {
	lim := inspect.Limits{Min: l.Min, Max: l.Max}
	m, i := inspect.Millimeter.FormatLimits(lim, 3), inspect.Inch.FormatLimits(lim, 4)
	return export.Figure{MM: m.Low, Inch: i.Low},
		export.Figure{MM: inspect.Millimeter.Format(aim, m.Decimals), Inch: inspect.Inch.Format(aim, i.Decimals)},
		export.Figure{MM: m.High, Inch: i.High}
}

// pinBoth words a pin's diameter in both units.
func (j *job) pinBoth(d float64) string {
	more := 1 // of a diameter as measured
	for _, u := range []inspect.Unit{inspect.Millimeter, inspect.Inch} {
		if scale := u.MM() * math.Pow10(-u.Decimals()); math.Abs(d/scale-math.Round(d/scale)) < 1e-6 {
			more = 0
		}
	}
	mm, in := "Ø "+inspect.Millimeter.Format(d, 3+more)+" mm", "Ø "+inspect.Inch.Format(d, 4+more)+" in"
	if j.display == inspect.Inch {
		return in + " (" + strings.TrimPrefix(mm, "Ø ") + ")"
	}
	return mm + " (" + strings.TrimPrefix(in, "Ø ") + ")"
}

// sheetPins is how many pin sizes a sheet lists; more would crowd out span and chord.
const sheetPins = 2

// sheetTargets picks the rows that a sheet has room for: each pin, one other way
// with the first pin, the span and the chord.
func (j *job) sheetTargets(g *gear, t gearTargets) []export.Target {
	var rows []export.Target
	add := func(measure, with string, l *span, aim *float64, usable bool, why string) {
		row := export.Target{Measure: measure, With: with}
		if !usable || l == nil {
			row.Unusable = orDefault(why, "no reading exists")
		} else {
			row.Low, row.Aim, row.High = figures(*l, *aim)
			if why != "" {
				row.With += ", " + why
			}
		}
		rows = append(rows, row)
	}
	where := "opposite spaces"
	if g.g.Teeth()%2 != 0 {
		where = "nearest to opposite"
	}
	for _, p := range t.OverPins[:min(sheetPins, len(t.OverPins))] {
		add("Over two "+p.wires(), "2 "+p.Kind+" "+j.pinBoth(p.Pin)+", "+where, p.Measurement, p.Aim, p.Usable, p.Why)
	}
	if len(t.OverPins) > 0 {
		p := t.OverPins[0]
		if a := p.firstAlso(); a != nil {
			d := p.Pin
			if a.Pin != nil { // the one that is taken, where the two measure otherwise
				d = *a.Pin
			}
			with, why := alsoWith(a.Way, p.Kind)+j.pinBoth(d), a.Why
			if a.bore > 0 { // the correction stands among the cautions
				size, _, _ := strings.Cut(j.pinBoth(d), " (")
				with, why = alsoWith(a.Way, p.Kind)+size+", bore "+j.length(a.bore), ""
			}
			add(capital(wayText(a.text, p.Kind)), with, a.Measurement, a.Aim, a.Usable, why)
		}
	}
	if len(t.Span) > 0 {
		s := t.Span[0]
		if one := t.firstSpan(); one != nil {
			s = *one
		}
		with := "over " + teethText(s.Teeth)
		if g.g.Helical() {
			with += ", across the helix"
		}
		add("Span", with, s.Length, s.Aim, s.Usable, s.Why)
	}
	h, o := j.both(t.Chordal.Height)
	tip, _ := j.both(t.Chordal.Tip)
	add("Chordal thickness", fmt.Sprintf("height %s (%s) below Ø %s", h, o, tip), &t.Chordal.Thickness, &t.Chordal.Aim, t.Chordal.Usable, t.Chordal.Why)
	return rows
}

// firstAlso returns the first other way that can be used and is not just half of the two-pin reading.
func (p pinTarget) firstAlso() *alsoWay {
	for i, a := range p.Also {
		if a.Usable && a.Way != "one pin to the axis" {
			return &p.Also[i]
		}
	}
	return nil
}

// alsoWith says how many pins a way takes.
func alsoWith(way, kind string) string {
	switch {
	case strings.HasPrefix(way, "three"):
		return "3 pins "
	case strings.HasPrefix(way, "one"):
		return "1 " + strings.TrimSuffix(kind, "s") + " "
	}
	return "2 straight pins "
}

// wires names pins as inch readers do too.
func (p pinTarget) wires() string {
	if p.Kind == "pins" {
		return "pins (wires)"
	}
	return p.kindText()
}

// kindText names what is measured over. On a helical gear with an even number of
// teeth straight pins in opposite spaces read what balls do.
func (p pinTarget) kindText() string {
	if p.Kind == "balls" && p.even {
		return "balls or pins"
	}
	return p.Kind
}

func capital(s string) string {
	if s == "" {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}

// firstPin returns the first usable pin target, or the first with numbers.
func (t gearTargets) firstPin() *pinTarget {
	for i := range t.OverPins {
		if t.OverPins[i].Usable {
			return &t.OverPins[i]
		}
	}
	return nil
}

// firstSpan returns the first usable span for which the shop lacks nothing, or the first usable one.
func (t gearTargets) firstSpan() *spanTarget {
	var first *spanTarget
	for i := range t.Span {
		s := &t.Span[i]
		switch {
		case !s.Usable:
		case s.Missing == "":
			return s
		case first == nil:
			first = s
		}
	}
	return first
}

// pinView draws the two pins where they rest. Spaces lie half a pitch beside the tooth on +x.
func (j *job) pinView(g *gear, t gearTargets, tooth involute.Tooth) *export.PinView {
	p := t.firstPin()
	if p == nil {
		return nil
	}
	seat, err := tooth.Seat(p.Pin)
	if err != nil {
		return nil
	}
	z := g.g.Teeth()
	pitch := 2 * math.Pi / float64(z)
	r := seat.CenterDiameter / 2
	view := &export.PinView{
		Title:    "Over two " + p.wires(),
		Centers:  []involute.Vec{involute.Polar(r, pitch/2), involute.Polar(r, pitch/2+float64(z/2)*pitch)},
		Diameter: p.Pin, Dimension: "M " + j.length(*p.Aim), Label: "2 " + p.Kind + " " + j.pinBoth(p.Pin),
	}
	if g.g.Helical() {
		view.Note = "Transverse section."
	}
	return view
}

// spanView draws the measuring faces. They touch on a tangent of the base circle.
func (j *job) spanView(g *gear, t gearTargets, tooth involute.Tooth) *export.SpanView {
	s := t.firstSpan()
	if s == nil {
		return nil
	}
	half := tooth.Span(s.Teeth) / math.Cos(g.g.BaseHelix()) / 2
	middle := 0.0 // on the first tooth for an odd number of teeth, in a space for an even one
	if s.Teeth%2 == 0 {
		middle = math.Pi / float64(g.g.Teeth())
	}
	e := involute.Polar(g.g.BaseDiameter()/2, middle)
	along := involute.Polar(1, middle).Left()
	view := &export.SpanView{
		Title: "Span over " + teethText(s.Teeth),
		From:  e.Add(along.Scale(half)), To: e.Sub(along.Scale(half)),
		Teeth: s.Teeth, Reach: 1.2 * g.g.Module(), Dimension: "W " + j.length(*s.Aim),
	}
	if g.g.Helical() {
		view.Note = "Transverse section; the span is taken across the helix, square to the flanks."
	}
	return view
}

func (j *job) sheetReadings(t gearTargets) []export.Reading {
	var out []export.Reading
	add := func(measure string, l *span) {
		p := j.display.FormatLimits(inspect.Limits{Min: l.Min, Max: l.Max}, j.display.Decimals())
		out = append(out, export.Reading{Measure: measure, Limits: p.Low + " … " + p.High + " " + j.display.String()})
	}
	if p := t.firstPin(); p != nil {
		add("Over two "+p.Kind+" Ø "+j.length(p.Pin), p.Measurement)
	}
	if s := t.firstSpan(); s != nil {
		add("Span over "+teethText(s.Teeth), s.Length)
	}
	return out
}

// sheetMethod says how to measure, in four lines.
func sheetMethod(g *gear, t gearTargets) []string {
	place := "Set the two pins in opposite spaces."
	if g.g.Teeth()%2 != 0 {
		place = "Odd teeth: set the two pins in the spaces nearest to opposite."
	}
	if g.g.Helical() {
		place = "Set the two balls in the spaces nearest to opposite, in one plane square to the axis."
	}
	if t.firstPin() == nil {
		place = "Two pins of this sheet cannot be used on this gear."
	} else {
		place += " Rock the gear gently and take the largest reading."
	}
	return []string{
		"Deburr, clean gear, pins and anvils; let gear and instrument come to 20 °C. Stop the machine first.",
		place,
		"Span: touch the flanks, not tips or roots; rock and take the smallest reading.",
		"Measure at four places round the gear, a quarter turn apart; write down all four.",
	}
}

// sheetCautions stand on every sheet.
func sheetCautions() []string {
	return []string{
		"The targets hold for the pin or ball diameter stated; another diameter needs other targets. Tooth thickness is normal, at the pitch (reference) circle. Backlash is geometric, before runout, pitch error and temperature, unless it says with deviations.",
		"Measure with the spindle stopped and locked. Guard running gears. Where a failure could hurt people, local codes, the machine's guarding rules and a licensed engineer decide.",
	}
}
