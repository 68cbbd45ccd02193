package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A Drawing is one page, free of any file format. Lengths are mm on the
// paper, y points up and the origin is the lower left corner of the page.
// Elements cover one another in their order.
type Drawing struct {
	Title         string  // the document's title, not printed on the page
	Width, Height float64 // of the page, mm
	Elements      []Element
}

// An Element is one thing on a page: a Shape or a Text.
type Element interface {
	check() error
}

// A Tone is how dark ink lies on the paper. The zero Tone leaves no ink.
type Tone int

// The tones a page is made of: all of them survive a black and white printer.
const (
	Clear Tone = iota // nothing is drawn
	Black
	Gray  // for words of second rank
	Tint  // the faint gray of metal and of a column to look at
	Paper // white, to cover what lies below
)

// A Dash is the pattern of a line.
type Dash int

// The line patterns of ISO 128-2:2020: continuous, dashed, and long-dashed dotted for axes and pitch circles.
const (
	Solid Dash = iota
	Dashed
	DashDot
)

// A Style is how a Shape is inked.
type Style struct {
	Width float64 // of the line, mm; 0 for none
	Dash  Dash
	Line  Tone
	Fill  Tone
}

// A Polyline is a chain of straight lines and arcs, open or closed. The bulge
// of the last vertex counts only where the chain is closed.
type Polyline struct {
	Vertices []Vertex
	Closed   bool
}

// A Shape is a polyline with its style.
type Shape struct {
	Outline Polyline
	Style   Style
}

// An Align says which point of a line of text its position is.
type Align int

// The three alignments: text starts at, is centered on, or ends at its position.
const (
	AlignLeft Align = iota
	AlignCenter
	AlignRight
)

// A Text is one line of words.
type Text struct {
	At    involute.Vec // on the base line
	Words string
	Size  float64 // of the type (its em), mm
	Bold  bool
	Align Align
	Turn  float64 // counter-clockwise, radians
	Tone  Tone
}

// circleLine returns the circle round c (mm) of diameter d (mm), as two half circles.
func circleLine(c involute.Vec, d float64) Polyline {
	return Polyline{Closed: true, Vertices: []Vertex{
		{P: c.Add(involute.Vec{X: d / 2}), Bulge: 1},
		{P: c.Sub(involute.Vec{X: d / 2}), Bulge: 1},
	}}
}

// straight returns the open chain of straight lines through the points.
func straight(points ...involute.Vec) Polyline {
	line := Polyline{Vertices: make([]Vertex, len(points))}
	for i, p := range points {
		line.Vertices[i].P = p
	}
	return line
}

// check refuses a page that cannot be drawn: no size, or a number that is none.
func (d Drawing) check() error {
	if !positive(d.Width) || !positive(d.Height) {
		return fmt.Errorf("page of %g × %g mm: both sides must be above 0", d.Width, d.Height)
	}
	for i, e := range d.Elements {
		if err := e.check(); err != nil {
			return fmt.Errorf("element %d of the page: %w", i, err)
		}
	}
	return nil
}

func (s Shape) check() error {
	if len(s.Outline.Vertices) < 2 {
		return fmt.Errorf("line of %d points: at least 2 are needed", len(s.Outline.Vertices))
	}
	if !finite(s.Style.Width) || s.Style.Width < 0 {
		return fmt.Errorf("line width %g mm: must be 0 or more", s.Style.Width)
	}
	for _, v := range s.Outline.Vertices {
		if !finite(v.P.X, v.P.Y, v.Bulge) {
			return fmt.Errorf("point (%g, %g) with bulge %g: must be finite", v.P.X, v.P.Y, v.Bulge)
		}
	}
	return nil
}

func (t Text) check() error {
	if !positive(t.Size) {
		return fmt.Errorf("text %q of size %g mm: must be above 0", t.Words, t.Size)
	}
	if !finite(t.At.X, t.At.Y, t.Turn) {
		return fmt.Errorf("text %q at (%g, %g): must be finite", t.Words, t.At.X, t.At.Y)
	}
	return nil
}

// positive tells whether x is a finite number above 0.
func positive(x float64) bool { return x > 0 && finite(x) }

// finite tells whether all numbers are neither NaN nor infinite.
func finite(xs ...float64) bool {
	for _, x := range xs {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
