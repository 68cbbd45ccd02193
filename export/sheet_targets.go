package export

import (
	"fmt"
	"slices"
)

// Columns of the table of targets, from 0.
const (
	measureColumn = iota
	lowColumn
	aimColumn
	highColumn
)

// targetTable sets what to measure with its limits; the figures are the largest on the sheet.
func (s Sheet) targetTable(b *board, page box, top float64, dense density) float64 {
	first, second := "mm", "inch"
	if s.InchFirst {
		first, second = second, first
	}
	y := b.heading(page.X0, page.X1, top, "Targets", "large figures "+first+", small figures "+second)
	shown := s.shownTargets(dense.targets)
	const headRow = 4.6
	t := table{Left: page.X0, Top: y, Columns: columns(page.width(), 72, 34, 40, 34), Rows: []float64{headRow}}
	for _, target := range shown {
		if target.Unusable != "" {
			t.Rows = append(t.Rows, dense.unusableRow)
			continue
		}
		t.Rows = append(t.Rows, dense.targetRow)
	}
	if len(shown) > 0 {
		aim := t.cell(0, aimColumn)
		aim.Y0 = t.bottom()
		b.fill(aim.outline(), tint)
	}
	for column, name := range []string{"Measure", "Low limit", "Aim", "High limit"} {
		c := t.cell(0, column)
		if column == measureColumn {
			b.say(c.X0, c.Y0+1.4, name, labelLetters(), alignLeft)
			continue
		}
		b.say((c.X0+c.X1)/2, c.Y0+1.4, name, labelLetters(), alignCenter)
	}
	for i, target := range shown {
		s.targetRow(b, t, i+1, target)
	}
	t.ruleBelow(b, 0, thinRule)
	for i := range shown {
		t.ruleBelow(b, i+1, hairRule)
	}
	y = t.bottom()
	if left := len(s.Targets) - len(shown); left > 0 {
		y -= 3.6
		b.say(page.X0, y+0.8, fmt.Sprintf("… %d more measures are not shown for want of room", left), labelLetters(), alignLeft)
	}
	return y
}

// shownTargets returns at most n targets in their order; where some must go, the unusable go first, from the last.
func (s Sheet) shownTargets(n int) []Target {
	shown := slices.Clone(s.Targets)
	for i := len(shown) - 1; i >= 0 && len(shown) > n; i-- {
		if shown[i].Unusable != "" {
			shown = slices.Delete(shown, i, i+1)
		}
	}
	return shown[:min(n, len(shown))]
}

// targetRow sets one measure.
func (s Sheet) targetRow(b *board, t table, row int, target Target) {
	s.targetName(b, t.cell(row, measureColumn), target)
	if target.Unusable != "" {
		c := t.cell(row, lowColumn)
		c.X1 = t.right()
		b.fill(c.outline(), paper)
		notUsable(b, c, target.Unusable)
		return
	}
	scale := min(1, t.Rows[row]/12)
	for column, f := range []Figure{lowColumn: target.Low, aimColumn: target.Aim, highColumn: target.High} {
		if column == measureColumn {
			continue
		}
		l := lettering{Size: 15 * pt * scale, Tone: black}
		if column == aimColumn {
			l = lettering{Size: 18 * pt * scale, Bold: true, Tone: black}
		}
		s.figure(b, t.cell(row, column), f, l, scale)
	}
}

// figure sets a length in the middle of a cell: the reader's unit large, the other below it.
func (s Sheet) figure(b *board, c box, f Figure, large lettering, scale float64) {
	first, second, unit := f.MM, f.Inch, " in"
	if s.InchFirst {
		first, second, unit = f.Inch, f.MM, " mm"
	}
	if second != "" {
		second += unit
	}
	x, h := (c.X0+c.X1)/2, c.height()
	b.sayIn(x, c.Y0+0.46*h, c.width()-2, first, large, alignCenter)
	small := lettering{Size: 8.5 * pt * scale, Tone: gray}
	b.sayIn(x, c.Y0+0.13*h, c.width()-2, second, small, alignCenter)
}

// targetName sets what is measured and with what, in up to two lines.
func (s Sheet) targetName(b *board, c box, target Target) {
	w, h := c.width()-3, c.height()
	name := lettering{Size: 10 * pt * min(1, h/8.5), Bold: true, Tone: black}
	top := c.Y1 - 0.6 - 0.04*h
	b.sayIn(c.X0, top-0.8*name.Size, w, target.Measure, name, alignLeft)
	top -= 1.05 * name.Size
	room := (top - c.Y0 - 0.6) / 1.28 // for letters
	small := lettering{Size: min(7.4*pt, room), Tone: black}
	if with := b.wrapped(target.With, small, w); len(with) <= 1 || 2*small.Size <= room {
		b.lines(c.X0, top, b.paragraph(target.With, small, w, 2), small)
		return
	}
	b.sayIn(c.X0, top-small.Size, w, target.With, small, alignLeft)
}

// notUsable sets the reason why a measure must not be used.
func notUsable(b *board, c box, reason string) {
	const pad, most = 2.0, 3
	bold := lettering{Size: 9 * pt, Bold: true, Tone: black}
	word := "Do not use"
	middle := (c.Y0 + c.Y1) / 2
	b.say(c.X0+pad, middle-0.36*bold.Size, word, bold, alignLeft)
	x := c.X0 + pad + b.width(word, bold) + 4
	l := lettering{Size: 8 * pt, Tone: black}
	n := min(most, int((c.height()-0.6)/(1.28*l.Size)))
	lines := b.wrapped(reason, l, c.X1-x-1)
	if len(lines) > n {
		l.Size *= 0.8
		n = min(most, int((c.height()-0.6)/(1.28*l.Size)))
		lines = b.paragraph(reason, l, c.X1-x-1, max(1, n))
	}
	b.lines(x, middle+0.64*l.Size*float64(len(lines)), lines, l)
}

// readingTable sets the blanks for readings round the gear, and for who measured with what.
func (s Sheet) readingTable(b *board, page box, top float64, dense density) float64 {
	y := b.heading(page.X0, page.X1, top, "Readings", "at four places round the gear, a quarter turn apart")
	const headRow = 4.6
	t := table{Left: page.X0, Top: y, Columns: columns(page.width(), 72, 21.6, 21.6, 21.6, 21.6, 21.6),
		Rows: append([]float64{headRow}, rows(len(s.Readings), dense.readingRow)...)}
	for column, name := range []string{"Measure", "0°", "90°", "180°", "270°", "Mean"} {
		c := t.cell(0, column)
		if column == 0 {
			b.say(c.X0, c.Y0+1.4, name, labelLetters(), alignLeft)
			continue
		}
		b.say((c.X0+c.X1)/2, c.Y0+1.4, name, labelLetters(), alignCenter)
		upright(b, c.X0, t.bottom(), c.Y0, hairRule)
	}
	t.ruleBelow(b, 0, thinRule)
	for i, r := range s.Readings {
		c := t.cell(i+1, 0)
		h := c.height()
		name := lettering{Size: 8.5 * pt, Bold: true, Tone: black}
		b.sayIn(c.X0, c.Y0+0.58*h, c.width()-3, r.Measure, name, alignLeft)
		b.sayIn(c.X0, c.Y0+0.17*h, c.width()-3, r.Limits, lettering{Size: 7.5 * pt, Tone: black}, alignLeft)
		t.ruleBelow(b, i+1, hairRule)
	}
	return s.signatures(b, page, t.bottom(), dense)
}

// signatures sets the blanks for instrument, temperature, initials and date.
func (s Sheet) signatures(b *board, page box, top float64, dense density) float64 {
	t := table{Left: page.X0, Top: top, Columns: columns(page.width(), 72, 36, 36, 36), Rows: rows(1, dense.readingRow)}
	for i, name := range []string{"Instrument no.", "Temperature", "Initials", "Date"} {
		c := t.cell(0, i)
		if i > 0 {
			upright(b, c.X0, c.Y0, c.Y1, hairRule)
			c.X0 += 2
		}
		b.say(c.X0, c.Y1-labelDrop, name, labelLetters(), alignLeft)
	}
	t.ruleBelow(b, 0, thinRule)
	return t.bottom()
}
