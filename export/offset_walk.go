package export

import (
	"errors"
	"math"

	"flankwright/involute"
)

const (
	// meetSlack is how far beyond its ends a moved piece still meets another, in mm.
	meetSlack = 1e-8

	// grazing is the sine of the angle below which a crossing has no certain side.
	grazing = 1e-6

	// leastTurn is the sine of the least angle at which the walk turns off.
	leastTurn = 1e-9
)

// An offsetWalk goes once round the outside of a raw offset. All of it lies within
// the offset region, so the outermost line round it is that region's boundary.
// On that line the region is to the left, and whatever crosses it from left to
// right is the line's continuation. So the walk turns off at the first crossing to
// the right, and needs to look only at what is near.
type offsetWalk struct {
	tree   boxTree
	legs   []leg
	turned involute.Vec // where it turned off last
	beyond float64      // mm: so far from there a touch is another one
}

// A crossing is where a walk along one span may turn off.
type crossing struct {
	place  float64 // on the span walked
	at     involute.Vec
	span   int     // to turn into
	onSpan float64 // the place there
	right  float64 // how far the walk turns to the right, radians
}

var errOffsetLost = errors.New("the outline of the moved contour can't be followed: does the contour cross itself?")

// followOutside returns the outermost closed line of a raw offset.
func followOutside(raw []span, distance float64) (Path, error) {
	w := offsetWalk{tree: newBoxTree(raw), turned: involute.Vec{X: math.Inf(1)}, beyond: distance / 1000}
	if err := w.round(); err != nil {
		return Path{}, err
	}
	w.startEarly()
	return w.path()
}

// round walks from the point farthest to the right, which is outermost, until it is there again.
func (w *offsetWalk) round() error {
	raw := w.tree.spans
	first, begin := w.farthest()
	from, _ := raw[first].at(begin)
	w.legs = []leg{{first, from}}
	at, place := first, begin
	for range 2*len(raw) + 8 {
		c, ok := w.turnOff(at, place)
		if ok {
			at, place, w.turned = c.span, c.onSpan, c.at
		} else {
			next := (at + 1) % len(raw)
			if raw[next].from != raw[at].to {
				return errOffsetLost
			}
			at, place, c.at = next, 0, raw[next].from
		}
		if at == first && place <= begin+meetSlack {
			w.legs[0].from = c.at
			return nil
		}
		w.legs = append(w.legs, leg{at, c.at})
	}
	return errOffsetLost
}

// farthest returns a span that reaches as far in x as any, and the place where it does.
func (w *offsetWalk) farthest() (index int, place float64) {
	best := math.Inf(-1)
	for i, s := range w.tree.spans {
		length := s.place(s.to)
		places := [...]float64{0, length, 0}
		if s.k > 0 { // where it runs along +y
			places[2] = min(length, max(0, 2*math.Tan(turn(s.start, involute.Vec{Y: 1})/2)/s.k))
		}
		for _, sigma := range places {
			if q, _ := s.at(sigma); q.X > best {
				best, index, place = q.X, i, sigma
			}
		}
	}
	return index, place
}

// turnOff returns the first crossing on a span, after a place on it, at which the
// walk must turn to the right; of several in one place the sharpest turn.
func (w *offsetWalk) turnOff(i int, after float64) (best crossing, ok bool) {
	s := w.tree.spans[i]
	length := s.place(s.to)
	w.tree.near(s.box(), minPiece, func(j int) {
		if j == i {
			return
		}
		o := w.tree.spans[j]
		end := o.place(o.to)
		for _, place := range s.meet(o, minPiece) {
			if !(place >= after-meetSlack && place <= length+meetSlack) {
				continue
			}
			q, dir := s.at(place)
			c := crossing{place: place, at: q, span: j, onSpan: o.place(q)}
			if !(c.onSpan >= -meetSlack && c.onSpan <= end+meetSlack) {
				continue
			}
			there, other := o.at(c.onSpan)
			if there.Sub(q).Norm() > 2*minPiece || !w.turnsRight(i, &c, dir, other) {
				continue
			}
			if !ok || c.place < best.place-meetSlack || c.place < best.place+meetSlack && c.right > best.right {
				best, ok = c, true
			}
		}
	})
	return best, ok
}

// turnsRight tells whether span i, walked in direction dir, is left to the right by
// the other one at a crossing, and notes how sharply.
func (w *offsetWalk) turnsRight(i int, c *crossing, dir, other involute.Vec) bool {
	sin, cos := dir.Cross(other), dir.Dot(other)
	c.right = math.Atan2(-sin, cos)
	if cos < 0 && math.Abs(sin) < grazing {
		// Two pieces that run against each other and touch close the space between them.
		c.right = math.Pi
		return c.at.Sub(w.turned).Norm() > w.beyond
	}
	if sin > -leastTurn {
		return false
	}
	n := len(w.tree.spans)
	joined := func(a, b int) bool { // and meeting at that joint, without a corner
		s, o := w.tree.spans[a], w.tree.spans[b]
		return (a+1)%n == b && s.to == o.from && c.at.Sub(s.to).Norm() < minPiece
	}
	return cos < 0 || !joined(i, c.span) && !joined(c.span, i)
}
