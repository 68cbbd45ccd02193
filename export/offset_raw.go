package export

import (
	"math"

	"flankwright/involute"
)

const (
	// smoothError is how far in mm a joint may leave the exact offset when the
	// ends of two pieces that are meant to be tangent are brought together.
	smoothError = 1e-9

	// leastRaw is the length in mm below which a moved piece, or an arc about a
	// corner, has vanished: a shorter one has no certain direction.
	leastRaw = 1e-9
)

// rawOffset moves every span to its right by distance (mm) and puts arcs about the
// convex corners, in order, untrimmed. A span goes on into the next one where
// that starts exactly on its end; other ends lie inside the offset region. All of
// the region's boundary lies on the spans returned, and none of them leaves it.
//
// An arc keeps its center: curvature k becomes k/(1 + k·distance). A concave one of
// radius up to distance vanishes or turns over. What it becomes lies nearer to the
// other points of the arc than distance, so it is left out.
func rawOffset(spans []span, distance float64) []span {
	n := len(spans)
	joints := make([]joint, n) // joint i is at the start of span i
	for i, s := range spans {
		joints[i] = moveJoint(spans[(i+n-1)%n], s, distance)
	}
	var raw []span
	for i, s := range spans {
		raw = append(raw, joints[i].corner...)
		from, to := joints[i].start, joints[(i+1)%n].end
		chord := to.Sub(from)
		grown := 1 + s.k*distance
		if grown > 0 && chord.Norm() >= leastRaw && chord.Dot(s.to.Sub(s.from)) > 0 {
			raw = append(raw, spanBetween(from, to, s.k/grown))
		}
	}
	return raw
}

// A joint is what becomes of the place where one piece ends and the next starts.
type joint struct {
	end, start involute.Vec // of the moved piece before and the moved piece after it
	corner     []span       // arcs from the one to the other, at a convex corner
}

// cornerSweep is the most one arc about a corner turns: 85°, so that no rounding
// lifts it over the quarter turn at which old controls divide circles.
const cornerSweep = 85 * involute.Degree

// moveJoint returns the joint between two spans, moved to the right by distance.
//
// Where they are tangent, or so nearly that it makes no difference, the moved ones
// share one point, on the bisector of the normals. With a turn δ that is off the exact
// offset by up to distance·δ²/8; the ends shift by distance·δ/2, and short spans
// must not lose their direction by that.
func moveJoint(before, after span, distance float64) joint {
	p := after.from
	delta := turn(before.end, after.start)
	shift := distance * math.Abs(delta)
	shorter := min(before.to.Sub(before.from).Norm(), after.to.Sub(after.from).Norm())
	if shift <= leastRaw || shift*math.Abs(delta)/8 <= smoothError && shift <= shorter/10 {
		normal := before.end.Add(after.start).Left()
		q := p.Sub(normal.Scale(distance / normal.Norm()))
		return joint{end: q, start: q}
	}
	j := joint{
		end:   p.Sub(before.end.Left().Scale(distance)),
		start: p.Sub(after.start.Left().Scale(distance)),
	}
	if math.Abs(delta) > math.Pi-1e-6 { // a cusp: an arc does no harm where none is needed
		delta = math.Abs(delta)
	}
	if delta < 0 {
		return j
	}
	parts := int(math.Ceil(delta / cornerSweep))
	from := j.end
	for i := 1; i <= parts; i++ {
		to := j.start
		if i < parts {
			to = p.Add(j.end.Sub(p).Rotate(delta * float64(i) / float64(parts)))
		}
		j.corner = append(j.corner, spanBetween(from, to, 1/distance))
		from = to
	}
	return j
}
