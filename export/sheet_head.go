package export

import "flankwright/involute"

// head sets the title, the blanks that say which part it is, and the gear's numbers.
func (s Sheet) head(b *board, page box) float64 {
	y := s.titleBlock(b, page)
	y = s.identity(b, page, y)
	return s.data(b, page, y)
}

// titleBlock sets the job's title at the left, in up to three lines, and the gear's name at the right.
func (s Sheet) titleBlock(b *board, page box) float64 {
	const gearWidth, gap = 52.0, 6.0
	small := labelLetters()
	small.Size = 8 * pt
	base := page.Y1 - small.Size
	b.say(page.X0, base, "Gear inspection sheet", small, alignLeft)
	top := page.Y1 - 4.4
	l := titleLetters()
	width := page.width()
	y := top - 1.28*l.Size
	if s.Gear != "" {
		width -= gearWidth + gap
		b.say(page.X1, base, "Gear", small, alignRight)
		words, letters := b.settled(s.Gear, l, gearWidth, 2)
		for i, line := range words {
			b.say(page.X1, top-(1+1.28*float64(i))*letters.Size, line, letters, alignRight)
		}
		y = min(y, top-1.28*float64(len(words))*letters.Size)
	}
	words, letters := b.settled(s.Title, l, width, 3)
	y = min(y, b.lines(page.X0, top, words, letters)) - 1.2
	b.rule(page.X0, page.X1, y, heavyRule)
	return y
}

// cellHeight is the height of a cell with a label above its value, mm.
const cellHeight = 9.0

// identity sets the row of values that name the part, blank where there is none.
func (s Sheet) identity(b *board, page box, top float64) float64 {
	t := table{Left: page.X0, Top: top, Columns: columns(page.width(), 1.3, 1.1, 1.3, 0.9, 0.9), Rows: rows(1, cellHeight+0.8)}
	for i, f := range []Field{
		{Label: "Part", Value: s.Part}, {Label: "Drawing no.", Value: s.DrawingNumber}, {Label: "Material", Value: s.Material},
		{Label: "Author", Value: s.Author}, {Label: "Date", Value: s.Date},
	} {
		c := t.cell(0, i)
		if i > 0 {
			b.stroke(straight(involute.Vec{X: c.X0, Y: c.Y0}, involute.Vec{X: c.X0, Y: c.Y1}), hairRule)
			c.X0 += 2
		}
		b.labelled(c, f)
	}
	t.ruleBelow(b, 0, thinRule)
	return t.bottom()
}

// dataColumns is how many of the gear's numbers stand side by side.
const dataColumns = 5

// data sets the gear's numbers in a grid.
func (s Sheet) data(b *board, page box, top float64) float64 {
	if len(s.Data) == 0 {
		return top
	}
	n := (len(s.Data) + dataColumns - 1) / dataColumns
	t := table{Left: page.X0, Top: top - 0.4, Columns: columns(page.width(), 1, 1, 1, 1, 1), Rows: rows(n, cellHeight)}
	for i, f := range s.Data {
		b.labelled(t.cell(i/dataColumns, i%dataColumns), f)
	}
	return t.bottom()
}
