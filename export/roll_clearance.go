package export

import (
	"math"

	"flankwright/involute"
)

// clearance returns the distance of two pieces in mm, or best if that is less.
// It is exact for pieces that face each other without overlapping: along a normal
// of both, along a normal of one to an end of the other, or from end to end.
func clearance(a, b rollPiece, best float64) float64 {
	if a.spot.Sub(b.spot).Norm()-a.size-b.size >= best {
		return best
	}
	best = min(best, commonNormal(a, b))
	for _, p := range [...]involute.Vec{a.from, a.to} {
		best = min(best, above(b, p), p.Sub(b.from).Norm(), p.Sub(b.to).Norm())
	}
	return min(best, above(a, b.from), above(a, b.to))
}

// commonNormal returns the distance of two pieces along a normal of both, +Inf
// where they have none: with the centers of arcs at c₁ − c₂ = D n it is D − (R₁ + R₂).
func commonNormal(a, b rollPiece) float64 {
	switch {
	case a.radius == 0:
		return lineNormal(b, a)
	case b.radius == 0:
		return lineNormal(a, b)
	case a.radius < 0 && b.radius < 0:
		return math.Inf(1)
	}
	sum := a.radius + b.radius
	between := a.center.Sub(b.center)
	d := between.Norm()
	if d == 0 {
		return math.Inf(1)
	}
	n := between.Scale(math.Copysign(1/d, sum))
	if !a.faces(n.Scale(-1)) || !b.faces(n) {
		return math.Inf(1)
	}
	return math.Copysign(d, sum) - sum
}

// lineNormal returns the distance of a bulging arc from a line along the line's
// normal, +Inf where the arc has no such normal or its foot is off the line.
func lineNormal(arc, line rollPiece) float64 {
	if arc.radius <= 0 || !arc.faces(line.middle.Scale(-1)) {
		return math.Inf(1)
	}
	p := arc.center.Sub(line.middle.Scale(arc.radius))
	if !line.holds(p) {
		return math.Inf(1)
	}
	return line.middle.Dot(p.Sub(line.from))
}

// above returns how far a point stands above the piece on its open side, along
// the piece's normal through the point, +Inf where that misses the piece.
func above(piece rollPiece, p involute.Vec) float64 {
	height := 0.0
	if piece.radius == 0 {
		height = piece.middle.Dot(p.Sub(piece.from))
	} else {
		height = math.Copysign(p.Sub(piece.center).Norm(), piece.radius) - piece.radius
	}
	if height < 0 || p == piece.center || !piece.on(p) {
		return math.Inf(1)
	}
	return height
}
