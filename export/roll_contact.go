package export

import (
	"math"

	"flankwright/involute"
)

// A contact is where a side of the second gear's tooth meets the first gear's
// when it is turned about the origin, its axis.
type contact struct {
	turn  float64 // counter-clockwise, radians; negative where the sides overlap
	lever float64 // of the normal about the axis, mm
}

// A search looks for the first contact of the pieces that it is given.
//
// Along the circle of radius ρ about the second axis, a point of the second gear
// at polar angle θ₂ that leads (its metal lies behind it) meets a point of the
// first at θ₁ that faces it after a turn of θ₁ − θ₂. The first contact is the
// least of this over ρ, and negative where the sides overlap. For two pieces it
// is where they are tangent, or at an end of one of them: all in closed form.
type search struct {
	best  contact
	limit float64 // turns beyond belong to other teeth, radians
}

// leads returns n·left(p), the lever of the normal n at p about the origin: above
// 0 the point leads when it turns counter-clockwise.
func leads(p, n involute.Vec) float64 { return n.Dot(p.Left()) }

// offer takes a contact if it is the first so far.
func (s *search) offer(turn, lever float64) {
	turn = math.Remainder(turn, 2*math.Pi)
	if math.Abs(turn) <= s.limit && turn < s.best.turn && lever > 0 {
		s.best = contact{turn, lever}
	}
}

// meet looks at the piece a of the first gear and b of the second.
func (s *search) meet(a, b rollPiece) {
	if a.lowest > b.outermost || b.lowest > a.outermost {
		return
	}
	switch {
	case a.radius == 0 && b.radius == 0:
	case b.radius == 0:
		s.arcOnLine(a, b)
	case a.radius == 0:
		s.lineOnArc(a, b)
	default:
		s.arcs(a, b)
	}
	s.endOfSecond(a, b, b.from, b.fromNormal)
	s.endOfSecond(a, b, b.to, b.toNormal)
	s.endOfFirst(a, b, a.from, a.fromNormal)
	s.endOfFirst(a, b, a.to, a.toNormal)
}

// arcs finds where two arcs are tangent: the common normal n out of the second
// runs from center to center, c₁ − c₂ = (R₁ + R₂) n with hollow radii negative,
// and the triangle of the centers and the axis gives the turn.
func (s *search) arcs(a, b rollPiece) {
	sum := a.radius + b.radius
	d1, d2 := a.center.Norm(), b.center.Norm()
	cos := (d1*d1 + d2*d2 - sum*sum) / (2 * d1 * d2)
	if (a.radius < 0 && b.radius < 0) || !(math.Abs(cos) <= 1) {
		return
	}
	between, psi := turn(b.center, a.center), math.Acos(cos)
	for _, by := range [...]float64{between + psi, between - psi} {
		center := b.center.Rotate(by)
		n := a.center.Sub(center).Scale(1 / sum)
		if a.faces(n.Scale(-1)) && b.faces(n.Rotate(-by)) {
			s.offer(by, leads(center, n))
		}
	}
}

// arcOnLine finds where a bulging arc of the first gear lies on a line of the second.
func (s *search) arcOnLine(a, b rollPiece) {
	d := a.center.Norm()
	cos := (b.middle.Dot(b.from) + a.radius) / d
	if a.radius < 0 || !(math.Abs(cos) <= 1) {
		return
	}
	between, psi := turn(b.middle, a.center), math.Acos(cos)
	for _, by := range [...]float64{between + psi, between - psi} {
		n := b.middle.Rotate(by)
		p := a.center.Sub(n.Scale(a.radius))
		if a.faces(n.Scale(-1)) && b.holds(p.Rotate(-by)) {
			s.offer(by, leads(p, n))
		}
	}
}

// lineOnArc finds where a bulging arc of the second gear lies on a line of the first.
func (s *search) lineOnArc(a, b rollPiece) {
	n := a.middle.Scale(-1)
	d := b.center.Norm()
	cos := (n.Dot(a.from) - b.radius) / d
	if b.radius < 0 || !(math.Abs(cos) <= 1) {
		return
	}
	between, psi := turn(b.center, n), math.Acos(cos)
	for _, by := range [...]float64{between + psi, between - psi} {
		p := b.center.Rotate(by).Add(n.Scale(b.radius))
		if a.holds(p) && b.faces(n.Rotate(-by)) {
			s.offer(by, leads(p, n))
		}
	}
}

// endOfSecond finds where an end of the second gear's piece meets the first's.
func (s *search) endOfSecond(a, b rollPiece, end, normal involute.Vec) {
	r := end.Norm()
	if leads(end, normal) <= 0 || r < a.lowest || r > a.outermost {
		return
	}
	points, n := a.crossings(r)
	for _, p := range points[:n] {
		s.offer(turn(end, p), -leads(p, a.normalAt(p)))
	}
}

// endOfFirst finds where the second gear's piece meets an end of the first's.
func (s *search) endOfFirst(a, b rollPiece, end, normal involute.Vec) {
	r := end.Norm()
	if leads(end, normal) >= 0 || r < b.lowest || r > b.outermost {
		return
	}
	points, n := b.crossings(r)
	for _, p := range points[:n] {
		s.offer(turn(p, end), leads(p, b.normalAt(p)))
	}
}
