package export

import (
	"math"

	"flankwright/involute"
)

// A placed piece is a line or an arc with the polar angle of its middle, its ends,
// and how far from its start it reaches at most, mm.
type placed struct {
	involute.Curve
	angle    float64
	from, to involute.Vec
	reach    float64
}

// newPlaced places a line or an arc.
func newPlaced(c involute.Curve) placed {
	middle, _ := c.At(0.5)
	from, _ := c.At(0)
	to, _ := c.At(1)
	p := placed{c, middle.Angle(), from, to, to.Sub(from).Norm()}
	if arc, ok := c.(involute.Arc); ok && math.Abs(arc.Sweep) > math.Pi {
		p.reach = 2 * arc.Radius
	}
	return p
}

// distance returns the distance of a point from the piece.
func (p placed) distance(c involute.Vec) float64 {
	ends := min(c.Sub(p.from).Norm(), c.Sub(p.to).Norm())
	switch curve := p.Curve.(type) {
	case involute.Line:
		d := p.to.Sub(p.from)
		t := c.Sub(p.from).Dot(d) / d.Dot(d)
		if t > 0 && t < 1 {
			return min(ends, math.Abs(d.Cross(c.Sub(p.from)))/d.Norm())
		}
	case involute.Arc:
		from := c.Sub(curve.Center)
		turn := math.Remainder(from.Angle()-curve.Start-curve.Sweep/2, 2*math.Pi)
		if math.Abs(turn) <= math.Abs(curve.Sweep)/2 {
			return min(ends, math.Abs(from.Norm()-curve.Radius))
		}
	}
	return ends
}

// nearestPiece returns which of the pieces is nearest to a point, and its distance;
// +Inf where there are none.
func nearestPiece(pieces []placed, q involute.Vec) (index int, least float64) {
	least = math.Inf(1)
	for i, p := range pieces {
		if q.Sub(p.from).Norm()-p.reach >= least {
			continue
		}
		if d := p.distance(q); d < least {
			index, least = i, d
		}
	}
	return index, least
}

// distance returns how far a point is from the nearest of the pieces, or, on a
// helical gear, from the nearest of the surfaces that they sweep along the helix.
func (s Section) distance(pieces []placed, c involute.Vec) float64 {
	nearest, least := nearestPiece(pieces, c)
	if s.twist == 0 || len(pieces) == 0 {
		return least
	}
	// A surface swept along the helix comes nearer than the piece itself by the
	// cosine of the helix angle at most; at the outermost radius that is least.
	share := 1 / math.Hypot(1, s.twist*s.most)
	least = s.sweptDistance(pieces[nearest].Curve, c)
	for i, p := range pieces {
		if i != nearest && share*(c.Sub(p.from).Norm()-p.reach) < least && share*p.distance(c) < least {
			least = min(least, s.sweptDistance(p.Curve, c))
		}
	}
	return least
}

// sweptSteps samples a piece for the point nearest to a ball; golden section
// then closes in on it. A piece turns by under 90°, over which the distance has
// one minimum, or two at its ends.
const sweptSteps = 12

// sweptDistance returns the distance of the point c of the plane z = 0 from the
// surface that a piece sweeps when it moves along the helix.
func (s Section) sweptDistance(p involute.Curve, c involute.Vec) float64 {
	at := func(t float64) float64 {
		q, _ := p.At(t)
		return involute.HelixDistance(c.Norm(), q.Norm(), q.Angle()-c.Angle(), s.twist)
	}
	best, bestT := math.Inf(1), 0.0
	for i := range sweptSteps + 1 {
		t := float64(i) / sweptSteps
		if d := at(t); d < best {
			best, bestT = d, t
		}
	}
	lo, hi := max(0, bestT-1.0/sweptSteps), min(1, bestT+1.0/sweptSteps)
	_, farthest := findMaximum(func(t float64) float64 { return -at(t) }, lo, hi)
	return min(best, -farthest)
}
