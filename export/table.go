package export

import "flankwright/involute"

// A box is an upright rectangle on the page, mm.
type box struct{ X0, Y0, X1, Y1 float64 }

func (b box) width() float64  { return b.X1 - b.X0 }
func (b box) height() float64 { return b.Y1 - b.Y0 }

// outline returns the edge of the box.
func (b box) outline() polyline {
	line := straight(involute.Vec{X: b.X0, Y: b.Y0}, involute.Vec{X: b.X1, Y: b.Y0},
		involute.Vec{X: b.X1, Y: b.Y1}, involute.Vec{X: b.X0, Y: b.Y1})
	line.Closed = true
	return line
}

// The weights of ruled lines, mm.
const (
	heavyRule = 0.6  // above and below a section
	thinRule  = 0.25 // below a table's heading
	hairRule  = 0.12 // between rows
)

// A table is a block of ruled cells that hangs from its upper left corner.
type table struct {
	Left, Top     float64
	Columns, Rows []float64 // widths, heights
}

// columns splits a width by shares.
func columns(width float64, shares ...float64) []float64 {
	sum := 0.0
	for _, s := range shares {
		sum += s
	}
	widths := make([]float64, len(shares))
	for i, s := range shares {
		widths[i] = width * s / sum
	}
	return widths
}

// rows returns n equal heights.
func rows(n int, height float64) []float64 {
	heights := make([]float64, n)
	for i := range heights {
		heights[i] = height
	}
	return heights
}

// cell returns the box of a row and a column, both from 0.
func (t table) cell(row, column int) box {
	b := box{X0: t.Left, Y1: t.Top}
	for _, w := range t.Columns[:column] {
		b.X0 += w
	}
	for _, h := range t.Rows[:row] {
		b.Y1 -= h
	}
	b.X1, b.Y0 = b.X0+t.Columns[column], b.Y1-t.Rows[row]
	return b
}

// bottom returns the height of the table's lower edge.
func (t table) bottom() float64 { return t.cell(len(t.Rows)-1, 0).Y0 }

// right returns the table's right edge.
func (t table) right() float64 { return t.cell(0, len(t.Columns)-1).X1 }

// ruleBelow draws a line below a row.
func (t table) ruleBelow(b *board, row int, width float64) {
	b.rule(t.Left, t.right(), t.cell(row, 0).Y0, width)
}
