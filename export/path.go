// Package export turns gears into drawings: curves to chains of arcs, outline
// files (DXF, SVG) that are read back and measured, and the inspection sheet.
package export

import "flankwright/involute"

// A Vertex is a corner of a Path and the bulge of the piece that leaves it:
// tan(sweep/4) of an arc, positive counter-clockwise, 0 for a straight line.
type Vertex struct {
	P     involute.Vec // mm
	Bulge float64
}

// A Path is a closed chain of straight lines and arcs: the piece that leaves
// the last vertex ends on the first, which is not repeated.
type Path struct{ Vertices []Vertex }

// circlePath returns the circle round c (mm) of diameter d (mm), in two halves.
func circlePath(c involute.Vec, d float64) Path {
	r := involute.Vec{X: d / 2}
	return Path{Vertices: []Vertex{{P: c.Add(r), Bulge: 1}, {P: c.Sub(r), Bulge: 1}}}
}

// line returns the path as a line to be drawn.
func (p Path) line() polyline { return polyline{Vertices: p.Vertices, Closed: true} }
