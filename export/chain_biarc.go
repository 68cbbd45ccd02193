package export

import (
	"math"

	"flankwright/involute"
)

// A strip is a few arcs that take up point and direction of the curve at both
// ends of a stretch of it: a biarc or a triarc.
type strip struct {
	pieces []piece
	cost   float64 // what joints are judged by: see chargedDeviation
}

const (
	// stripSamples is the number of steps at which a strip is compared with the
	// curve while joints are sought. The peak between two samples is at most
	// about 1 % higher than they say; the finished chain is measured exactly.
	stripSamples = 32

	// hopeless is the cost, in tolerances, of a stretch whose ends do not face each other.
	hopeless = 100
)

// samples returns points of the curve at even steps from place a to b.
func (w *walk) samples(a, b float64) []involute.Vec {
	out := make([]involute.Vec, stripSamples+1)
	for i := range out {
		out[i] = w.point(a + (b-a)*float64(i)/stripSamples)
	}
	return out
}

// newBiarc returns the biarc from p with direction u to q with direction v (unit
// vectors) whose first arc has tangent length d: the corners of the arcs'
// tangents, p + d u and q − e v, are d + e apart, which gives
//
//	e = (c²/2 − d c·u) / (c·v + d (1 − u·v)),  c = q − p,
//
// and the joint divides the line between them in d : e. d may run from 0 to
// c²/(2 c·u), where e vanishes. Both u and v must lean forward along c.
func newBiarc(p, u, q, v involute.Vec, d float64) [2]piece {
	c := q.Sub(p)
	e := (c.Dot(c)/2 - d*c.Dot(u)) / (c.Dot(v) + d*(1-u.Dot(v)))
	first, last := p.Add(u.Scale(d)), q.Sub(v.Scale(e))
	joint := first.Scale(e / (d + e)).Add(last.Scale(d / (d + e)))
	return [2]piece{pieceLeaving(p, u, joint), pieceArriving(joint, q, v)}
}

// bestBiarc returns the biarc between the places a and b whose two arcs deviate alike.
func (w *walk) bestBiarc(a, b, tolerance float64) strip {
	samples := w.samples(a, b)
	p, u := w.pointAndDirection(a)
	q, v := w.pointAndDirection(b)
	c := q.Sub(p)
	if c.Dot(u) <= 0 || c.Dot(v) <= 0 {
		return strip{[]piece{{From: p, To: q}}, hopeless * tolerance}
	}
	longest := c.Dot(c) / (2 * c.Dot(u))
	best, bestCost := [2]piece{}, math.Inf(1)
	low, high := 0.0, 1.0 // the share of longest that the first tangent takes
	for range 16 {
		share := (low + high) / 2
		pieces := newBiarc(p, u, q, v, share*longest)
		var off [2]float64
		if cost := chargedDeviation(pieces[:], samples, off[:], tolerance); cost < bestCost {
			best, bestCost = pieces, cost
		}
		// The longer the first arc, the more it deviates and the less the second does.
		if off[0] > off[1] {
			high = share
		} else {
			low = share
		}
	}
	return strip{best[:], bestCost}
}

// chargedDeviation returns the greatest deviation of the samples from the pieces
// and, in off, that from each. A piece that turns too far is charged as if it
// deviated by more than the tolerance, in proportion to the cube of its sweep
// as deviations are, so that joints move to where both hold.
func chargedDeviation(pieces []piece, samples []involute.Vec, off []float64, tolerance float64) (cost float64) {
	next := 0 // the first sample not yet past a joint
	for i, p := range pieces {
		g := newGauge(p)
		_, dir := p.directions()
		for next < len(samples) && (i == len(pieces)-1 || samples[next].Sub(p.To).Dot(dir) < 0) {
			off[i] = max(off[i], math.Abs(g.offset(samples[next])))
			next++
		}
		cost = max(cost, off[i])
		if s := math.Abs(p.sweep()) / maxSweep; s > 1 {
			cost = max(cost, 1.01*tolerance*s*s*s)
		}
	}
	return cost
}
