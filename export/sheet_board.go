package export

import (
	"strings"

	"flankwright/involute"
)

// A board is a page while it is being set: it knows the lettering and takes elements.
type board struct {
	typeface
	elements []element
}

// How far below the top of a cell its label's and its value's base lines are, mm.
const (
	labelDrop = 3.0
	valueDrop = 6.9
)

// The letterings of a sheet.
func titleLetters() lettering   { return lettering{Size: 17 * pt, Bold: true, Tone: black} }
func headingLetters() lettering { return lettering{Size: 8.5 * pt, Bold: true, Tone: black} }
func labelLetters() lettering   { return lettering{Size: 6.8 * pt, Tone: gray} }
func bodyLetters() lettering    { return lettering{Size: 8.5 * pt, Tone: black} }
func valueLetters() lettering   { return lettering{Size: 9.5 * pt, Tone: black} }

func (b *board) add(e ...element) { b.elements = append(b.elements, e...) }

// say sets one line of words on a base line.
func (b *board) say(x, y float64, s string, l lettering, a alignment) {
	if s == "" {
		return
	}
	b.add(textLine{At: involute.Vec{X: x, Y: y}, Words: s, Size: l.Size, Bold: l.Bold, Tone: l.Tone, Align: a})
}

// sayIn sets one line of words that keeps to a width: smaller, then cut.
func (b *board) sayIn(x, y, width float64, s string, l lettering, a alignment) {
	s, l = b.fitted(s, l, width)
	b.say(x, y, s, l, a)
}

// rule draws a level line.
func (b *board) rule(x0, x1, y, width float64) {
	b.stroke(straight(involute.Vec{X: x0, Y: y}, involute.Vec{X: x1, Y: y}), width)
}

// stroke draws a solid black line.
func (b *board) stroke(line polyline, width float64) {
	b.add(shape{Outline: line, Style: shapeStyle{Width: width, Line: black}})
}

// fill covers a closed line with a tone.
func (b *board) fill(line polyline, with tone) {
	b.add(shape{Outline: line, Style: shapeStyle{Fill: with}})
}

// heading sets a section's name under a heavy rule and returns where its content starts.
func (b *board) heading(x0, x1, top float64, name, aside string) float64 {
	b.rule(x0, x1, top, heavyRule)
	const gap, most = 4.0, 0.75 // the most of the width a name takes beside an aside
	base, width := top-4.6, x1-x0
	if aside != "" {
		width *= most
	}
	name, l := b.fitted(name, headingLetters(), width)
	b.say(x0, base, name, l, alignLeft)
	b.sayIn(x1, base, x1-x0-b.width(name, l)-gap, aside, labelLetters(), alignRight)
	return top - 6.4
}

// labelled sets a small label over a value in a cell, and what the value is in the other unit beside it.
func (b *board) labelled(c box, f Field) {
	const gap = 2.0
	w := c.width() - gap
	b.sayIn(c.X0, c.Y1-labelDrop, w, f.Label, labelLetters(), alignLeft)
	value, small := valueLetters(), labelLetters()
	whole := b.width(f.Value, value)
	if f.Other != "" {
		whole += gap + b.width(f.Other, small)
	}
	base := c.Y1 - valueDrop
	if whole > w/smallest {
		b.twoLines(c.X0, c.Y1-labelDrop-1, w, strings.TrimSpace(f.Value+" "+f.Other), value)
		return
	}
	shrink := min(1, 0.999*w/whole)
	value.Size *= shrink
	small.Size *= shrink
	b.say(c.X0, base, b.printable(f.Value), value, alignLeft)
	b.say(c.X0+b.width(f.Value, value)+gap*shrink, base, b.printable(f.Other), small, alignLeft)
}

// twoLines sets words too long for one line in two small ones.
func (b *board) twoLines(x, top, width float64, s string, l lettering) {
	l.Size *= 0.68
	b.lines(x, top, b.paragraph(s, l, width, 2), l)
}

// lines sets lines of words one below another and returns the height below the last.
func (b *board) lines(x, top float64, words []string, l lettering) float64 {
	step := 1.28 * l.Size
	for i, s := range words {
		b.say(x, top-float64(i)*step-l.Size, s, l, alignLeft)
	}
	return top - float64(len(words))*step
}
