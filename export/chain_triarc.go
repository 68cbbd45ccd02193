package export

import (
	"math"

	"flankwright/involute"
)

// newTriarc returns the three arcs from p with direction u to q with direction v
// of which the middle one lies on the circle through m with direction d and
// curvature k (unit vectors, 1/mm). A first arc of tangent length a ends on the
// circle, tangent to it, if the corner p + a u of its tangents is as far from the
// circle along a tangent: its power equals a². With w = m→p and n the normal at m,
//
//	a = (2 w·n − k w²) / (2 (k w·u − n·u)),
//
// and the same for the last arc, walked backward. ok is false where there is none.
func newTriarc(p, u, q, v, m, d involute.Vec, k float64) (pieces [3]piece, ok bool) {
	n := d.Left()
	tangent := func(end, dir involute.Vec) float64 {
		w := end.Sub(m)
		return (2*w.Dot(n) - k*w.Dot(w)) / (2 * (k*w.Dot(dir) - n.Dot(dir)))
	}
	back := involute.Vec{X: -v.X, Y: -v.Y}
	a, b := tangent(p, u), tangent(q, back)
	in, out := m.Sub(p), q.Sub(m)
	if !(a > 0 && b > 0 && in.Dot(u) > 0 && in.Dot(d) > 0 && out.Dot(v) > 0 && out.Dot(d) > 0 &&
		2*a*in.Dot(u) < in.Dot(in) && 2*b*out.Dot(v) < out.Dot(out)) {
		return pieces, false
	}
	first := newBiarc(p, u, m, d, a)[0]
	last := newBiarc(q, back, m, d.Scale(-1), b)[0]
	_, dir := first.directions()
	pieces[0] = first
	pieces[1] = pieceLeaving(first.To, dir, last.To)
	pieces[2] = piece{last.To, q, -last.Bulge}
	return pieces, true
}

// bestTriarc returns three arcs between the places a and b that deviate about
// alike. On a curve whose curvature rises evenly the best middle arc touches the
// curve's own curvature where it crosses it, at an angle; so the crossing is
// moved until the outer arcs deviate alike and the angle until the middle one
// does too. The angle comes to 0.044 of the difference between the angles of the
// chord with v and with u (it goes with the 1668 in reach).
func (w *walk) bestTriarc(a, b, tolerance float64) strip {
	const rounds, widest = 12, 0.2
	samples := w.samples(a, b)
	p, u := w.pointAndDirection(a)
	q, v := w.pointAndDirection(b)
	c := q.Sub(p)
	best := strip{pieces: []piece{{From: p, To: q}}, cost: hopeless * tolerance}
	skew := widest * (turn(c, v) - turn(u, c))
	if c.Dot(u) <= 0 || c.Dot(v) <= 0 {
		return best
	}
	best.cost = math.Inf(1)
	low, high := 0.0, 1.0
	for range rounds {
		cross := (low + high) / 2
		m, d := w.pointAndDirection(a + cross*(b-a))
		k := w.curve.Curvature(w.parameter(a + cross*(b-a)))
		flat, steep := 0.0, 1.0
		var off [3]float64
		for range rounds {
			angle := (flat + steep) / 2
			pieces, ok := newTriarc(p, u, q, v, m, d.Rotate(angle*skew), k)
			if !ok {
				steep = angle
				continue
			}
			off = [3]float64{}
			if cost := chargedDeviation(pieces[:], samples, off[:], tolerance); cost < best.cost {
				best = strip{append([]piece(nil), pieces[:]...), cost}
			}
			// The steeper the crossing, the more the middle arc deviates and the less the others.
			if off[1] > max(off[0], off[2]) {
				steep = angle
			} else {
				flat = angle
			}
		}
		if off[0] > off[2] {
			high = cross
		} else {
			low = cross
		}
	}
	if math.IsInf(best.cost, 1) {
		return strip{pieces: []piece{{From: p, To: q}}, cost: hopeless * tolerance}
	}
	return best
}
