package export

import (
	"fmt"
	"slices"
	"strings"

	"flankwright/involute"
)

// upright draws a plumb line.
func upright(b *board, x, y0, y1, width float64) {
	b.stroke(straight(involute.Vec{X: x, Y: y0}, involute.Vec{X: x, Y: y1}), width)
}

// notes sets how to measure beside the limits, and the warnings below.
func (s Sheet) notes(b *board, page box, top float64, dense density) float64 {
	const gutter = 8.0
	half := columns(page.width()-gutter, 1.15, 1)
	split := page.X0 + half[0]
	left := s.method(b, page.X0, split, top, dense)
	right := s.limits(b, split+gutter, page.X1, top, dense)
	y := min(left, right)
	if len(worded(s.Warnings)) > 0 {
		y = s.warnings(b, page, y-dense.gap*0.6, dense)
	}
	return y
}

// worded leaves out lines that say nothing.
func worded(lines []string) []string {
	return slices.DeleteFunc(slices.Clone(lines), func(s string) bool { return strings.TrimSpace(s) == "" })
}

func noteLetters(dense density) lettering {
	l := bodyLetters()
	l.Size *= dense.small
	return l
}

// method sets the numbered lines on how to measure.
func (s Sheet) method(b *board, x0, x1, top float64, dense density) float64 {
	y := b.heading(x0, x1, top, "How to measure", "")
	const indent = 5.0
	l := noteLetters(dense)
	left := 12 // lines
	for i, line := range worded(s.Method) {
		words := b.paragraph(line, l, x1-x0-indent, 3)
		if left -= len(words); left < 0 {
			break
		}
		b.say(x0, y-l.Size, fmt.Sprintf("%d", i+1), lettering{Size: l.Size, Bold: true, Tone: black}, alignLeft)
		y = b.lines(x0+indent, y, words, l) - 0.25*l.Size
	}
	return y
}

// limits sets labelled values, one a line.
func (s Sheet) limits(b *board, x0, x1, top float64, dense density) float64 {
	y := b.heading(x0, x1, top, "Limits these targets serve", "")
	l := noteLetters(dense)
	values := l
	shown := s.Limits[:min(len(s.Limits), 8)]
	for _, f := range shown { // one size for all
		_, fit := b.fitted(f.joined(), l, 0.63*(x1-x0))
		values.Size = min(values.Size, fit.Size)
	}
	for _, f := range shown {
		y -= l.Size
		b.sayIn(x0, y, 0.37*(x1-x0)-2, f.Label, l, alignLeft)
		b.sayIn(x1, y, 0.63*(x1-x0), f.joined(), values, alignRight)
		y -= 0.42 * l.Size
		b.rule(x0, x1, y, hairRule)
		y -= 0.12 * l.Size
	}
	return y
}

// joined is a field's value with the other unit in brackets.
func (f Field) joined() string {
	if f.Other == "" {
		return f.Value
	}
	return f.Value + " (" + f.Other + ")"
}

// warnings sets the program's warnings for this gear beside a heavy bar.
func (s Sheet) warnings(b *board, page box, top float64, dense density) float64 {
	const bar, indent = 1.2, 4.0
	l := noteLetters(dense)
	width := page.width() - indent
	warnings := worded(s.Warnings)
	name := "Warnings"
	if len(warnings) == 1 {
		name = "Warning"
	}
	head := headingLetters()
	y := top - 0.4
	b.say(page.X0+indent, y-head.Size, name, head, alignLeft)
	y -= 1.5 * head.Size
	left := dense.lines
	for i, text := range warnings {
		words := b.paragraph(text, l, width, max(1, min(left, dense.lines/2)))
		if len(words) > left {
			more := fmt.Sprintf("… %d more warnings; the program prints them all.", len(warnings)-i)
			y = b.lines(page.X0+indent, y, []string{more}, l)
			break
		}
		left -= len(words)
		y = b.lines(page.X0+indent, y, words, l) - 0.15*l.Size
	}
	b.fill(box{X0: page.X0, X1: page.X0 + bar, Y0: y, Y1: top}.outline(), black)
	return y
}

// foot sets the cautions, the bars to check the print by and the last line.
func (s Sheet) foot(b *board, page box, top float64, dense density) float64 {
	l := labelLetters()
	l.Size *= dense.small
	y := top - 0.5*dense.gap
	left := dense.lines
	for _, caution := range s.Cautions {
		words := b.paragraph(caution, l, page.width(), max(1, min(left, dense.lines/2)))
		if left -= len(words); left < 0 {
			break
		}
		y = b.lines(page.X0, y, words, l)
	}
	y -= 1.5
	b.rule(page.X0, page.X1, y, hairRule)
	return s.checkBars(b, page, y-1.2)
}

// Lengths of the bars a print is checked by, mm.
const (
	metricBar = 50.0
	inchBar   = 2 * 25.4
)

// checkBars sets a metric and an inch bar of true length, and the foot line at the right.
func (s Sheet) checkBars(b *board, page box, top float64) float64 {
	const gap, height = 5.0, 6.4
	y := top - 2
	x := page.X0
	bar(b, x, y, metricBar, 5, "50 mm")
	x += metricBar + gap
	bar(b, x, y, inchBar, 8, "2 in")
	x += inchBar + gap
	room := page.X1 - x
	b.sayIn(page.X1, y-0.6, room, "Print at 100 %, then measure these bars.", labelLetters(), alignRight)
	b.sayIn(page.X1, top-height+0.6, room, s.Foot, labelLetters(), alignRight)
	return top - height
}

// bar draws a measuring bar with end marks, n divisions and its length below.
func bar(b *board, x, y, length float64, n int, name string) {
	b.rule(x, x+length, y, 0.3)
	for i := 0; i <= n; i++ {
		tick, width := 1.0, hairRule
		if i == 0 || i == n {
			tick, width = 2.0, thinRule
		}
		at := x + length*float64(i)/float64(n)
		upright(b, at, y-tick, y+tick/2, width)
	}
	b.say(x+length/2, y-3.6, name, labelLetters(), alignCenter)
}
