package involute

import "math"

// A Curve is a smooth plane arc in mm; the metal is on its left (outlines run
// counter-clockwise round an external gear, clockwise inside a ring).
//
// The set of curves is closed: Line, Arc, Flank, Relief and Fillet. Everything that
// needs a tooth's shape (drawing, arc fitting, pin contact, the self-check)
// walks these and nothing else.
type Curve interface {
	// Domain returns the parameter's range, t0 < t1.
	Domain() (t0, t1 float64)
	// At returns the point and the derivative by t.
	At(t float64) (p, dp Vec)
	// Curvature returns the signed curvature in 1/mm: positive where the curve bends to the left.
	Curvature(t float64) float64
	curve() // sealed
}

// A Line is the straight piece from From to To, with t from 0 to 1.
type Line struct{ From, To Vec }

// Domain returns 0 and 1.
func (l Line) Domain() (t0, t1 float64) { return 0, 1 }

// At returns the point a share t of the way along, and the whole length as derivative.
func (l Line) At(t float64) (p, dp Vec) {
	d := l.To.Sub(l.From)
	return l.From.Add(d.Scale(t)), d
}

// Curvature returns 0.
func (l Line) Curvature(float64) float64 { return 0 }

func (Line) curve() {}

// An Arc is a piece of a circle about Center. It starts at polar angle Start
// and turns by Sweep (radians; positive counter-clockwise), with t from 0 to 1.
type Arc struct {
	Center       Vec
	Radius       float64 // mm, > 0
	Start, Sweep float64 // radians
}

// Domain returns 0 and 1.
func (a Arc) Domain() (t0, t1 float64) { return 0, 1 }

// At returns the point a share t of the sweep along, and its derivative.
func (a Arc) At(t float64) (p, dp Vec) {
	e := Polar(a.Radius, a.Start+t*a.Sweep)
	return a.Center.Add(e), e.Left().Scale(a.Sweep)
}

// Curvature returns ±1/Radius, positive for a counter-clockwise arc.
func (a Arc) Curvature(float64) float64 { return math.Copysign(1/a.Radius, a.Sweep) }

func (Arc) curve() {}

// Mirrored returns a curve reflected in the x axis and run the other way, so
// that the metal stays on its left.
func Mirrored(c Curve) Curve {
	flip := func(v Vec) Vec { return Vec{v.X, -v.Y} }
	switch c := c.(type) {
	case Line:
		return Line{flip(c.To), flip(c.From)}
	case Arc:
		return Arc{flip(c.Center), c.Radius, -c.Start - c.Sweep, c.Sweep}
	case Flank:
		c.BaseAngle, c.T0, c.T1 = -c.BaseAngle, -c.T1, -c.T0
		return c
	case Relief:
		c.BaseAngle, c.T0, c.T1 = -c.BaseAngle, -c.T1, -c.T0
		return c
	case Fillet:
		c.Space, c.Side, c.T0, c.T1 = -c.Space, -c.Side, -c.T1, -c.T0
		return c
	}
	return c
}
