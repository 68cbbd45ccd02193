package export

import "flankwright/involute"

// newBiarc returns the biarc from p with direction u to q with direction v (unit
// vectors) whose first arc has tangent length d: the corners of the arcs'
// tangents, p + d u and q − e v, are d + e apart, which gives
//
//	e = (c²/2 − d c·u) / (c·v + d (1 − u·v)),  c = q − p,
//
// and the joint divides the line between them in d : e. d may run from 0 to
// c²/(2 c·u), where e vanishes. Both u and v must lean forward along c. (Biarcs:
// Meek and Walton, J. Comput. Appl. Math. 59, 1995.)
func newBiarc(p, u, q, v involute.Vec, d float64) [2]piece {
	c := q.Sub(p)
	e := (c.Dot(c)/2 - d*c.Dot(u)) / (c.Dot(v) + d*(1-u.Dot(v)))
	first, last := p.Add(u.Scale(d)), q.Sub(v.Scale(e))
	joint := first.Scale(e / (d + e)).Add(last.Scale(d / (d + e)))
	return [2]piece{arcLeaving(p, u, joint), arcArriving(joint, q, v)}
}

// biarcOfShare returns the biarc whose first tangent takes a share of the longest it may be.
func biarcOfShare(p, u, q, v involute.Vec, share float64) ([2]piece, bool) {
	c := q.Sub(p)
	if !(c.Dot(u) > 0 && c.Dot(v) > 0 && share > 0 && share < 1) {
		return [2]piece{}, false
	}
	return newBiarc(p, u, q, v, share*c.Dot(c)/(2*c.Dot(u))), true
}
