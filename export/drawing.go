package export

import (
	"fmt"

	"flankwright/involute"
)

// A Drawing is one page, free of any file format. Lengths are mm on the
// paper, y points up and the origin is the lower left corner of the page.
// Elements cover one another in their order.
type Drawing struct {
	Title         string  // the document's title, not printed on the page
	Width, Height float64 // of the page, mm
	elements      []element
}

// An element is one thing on a page: a shape or a line of text.
type element interface {
	check() error
}

// A tone is how dark ink lies on the paper. The zero tone leaves no ink.
type tone int

// The tones a page is made of: all of them survive a black and white printer.
const (
	noInk tone = iota // nothing is drawn
	black
	gray  // for words of second rank
	tint  // the faint gray of metal and of a column to look at
	paper // white, to cover what lies below
)

// A linePattern is how a line is broken.
type linePattern int

// The line patterns of ISO 128-2:2020: continuous, dashed, and long-dashed dotted for axes and pitch circles.
const (
	solid linePattern = iota
	dashed
	dashDot
)

// A shapeStyle is how a shape is inked.
type shapeStyle struct {
	Width float64 // of the line, mm; 0 for none
	Dash  linePattern
	Line  tone
	Fill  tone
}

// A polyline is a chain of straight lines and arcs, open or closed. The bulge
// of the last vertex counts only where the chain is closed.
type polyline struct {
	Vertices []Vertex
	Closed   bool
}

// A shape is a polyline with its style.
type shape struct {
	Outline polyline
	Style   shapeStyle
}

// An alignment says which point of a line of text its position is.
type alignment int

// The three alignments: text starts at, is centered on, or ends at its position.
const (
	alignLeft alignment = iota
	alignCenter
	alignRight
)

// A textLine is one line of words.
type textLine struct {
	At    involute.Vec // on the base line
	Words string
	Size  float64 // of the type (its em), mm
	Bold  bool
	Align alignment
	Turn  float64 // counter-clockwise, radians
	Tone  tone
}

// straight returns the open chain of straight lines through the points.
func straight(points ...involute.Vec) polyline {
	line := polyline{Vertices: make([]Vertex, len(points))}
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
	for i, e := range d.elements {
		if err := e.check(); err != nil {
			return fmt.Errorf("element %d of the page: %w", i, err)
		}
	}
	return nil
}

func (s shape) check() error {
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

func (t textLine) check() error {
	if !positive(t.Size) {
		return fmt.Errorf("text %q of size %g mm: must be above 0", t.Words, t.Size)
	}
	if !finite(t.At.X, t.At.Y, t.Turn) {
		return fmt.Errorf("text %q at (%g, %g): must be finite", t.Words, t.At.X, t.At.Y)
	}
	return nil
}
