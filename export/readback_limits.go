package export

import (
	"math"

	"flankwright/involute"
)

// Radii returns the least and greatest distance of the contour from the axis,
// mm: exact along every line and arc, not at points of it only.
func (s Section) Radii() (least, greatest float64) { return s.least, s.most }

// Area returns the area that the contour encloses, mm². The exact profile's is
// involute.Outline.Area.
func (s Section) Area() float64 { return s.path.area() }

// reachFrom returns the least and greatest distance of a line or an arc from a
// point: at its ends, or where its normal passes through the point.
func reachFrom(point involute.Vec, c involute.Curve) (near, far float64) {
	a, _ := c.At(0)
	b, _ := c.At(1)
	a, b = a.Sub(point), b.Sub(point)
	near, far = min(a.Norm(), b.Norm()), max(a.Norm(), b.Norm())
	switch c := c.(type) {
	case involute.Line:
		d := b.Sub(a)
		if a.Dot(d) < 0 && b.Dot(d) > 0 {
			near = math.Abs(a.Cross(b)) / d.Norm()
		}
	case involute.Arc:
		center := c.Center.Sub(point)
		on := func(angle float64) bool {
			return math.Abs(math.Remainder(angle-c.Start-c.Sweep/2, 2*math.Pi)) <= math.Abs(c.Sweep)/2
		}
		if on(center.Angle()) {
			far = max(far, center.Norm()+c.Radius)
		}
		if on(center.Angle() + math.Pi) {
			near = min(near, math.Abs(center.Norm()-c.Radius))
		}
	}
	return near, far
}

// Joints says how the pieces of a contour meet.
type Joints struct {
	// Gap is the greatest distance between the end of a piece and the start of
	// the next, mm. A path shares its vertices, so it is the rounding of the
	// numbers of its arcs.
	Gap float64
	// TangentBreakDeg is the sharpest turn at a joint that is no corner, degrees.
	TangentBreakDeg float64
	// Corners is how many joints turn by more than 1°. A vertex out of place or
	// a lost bulge may make new ones: compare with what the fit reported.
	Corners int
}

// Joints measures the joints between all pieces of the contour.
func (s Section) Joints() Joints {
	var out Joints
	for i, c := range s.curves {
		next := s.curves[(i+1)%len(s.curves)]
		to, _ := c.At(1)
		from, _ := next.At(0)
		out.Gap = max(out.Gap, to.Sub(from).Norm())
		_, end := directions(c)
		start, _ := directions(next)
		if angle := math.Abs(turn(end, start)); angle > cornerAngle {
			out.Corners++
		} else {
			out.TangentBreakDeg = max(out.TangentBreakDeg, angle/involute.Degree)
		}
	}
	return out
}
