package export

import (
	"fmt"

	"flankwright/involute"
)

// crossingSlack is how near to the shared point of two neighbors a meeting is
// that point itself, mm; nothing nearer could be told from it in a file.
const crossingSlack = 2 * minPiece

// A CrossingError says where a path meets itself.
type CrossingError struct {
	First, Second int          // the pieces, from 1
	At            involute.Vec // mm
}

// Error says which pieces meet, and where.
func (e *CrossingError) Error() string {
	return fmt.Sprintf("pieces %d and %d meet at (%.6f, %.6f)", e.First, e.Second, e.At.X, e.At.Y)
}

// Simple reports where the path crosses or touches itself, nil where it does
// nowhere. Neighbors may meet at the point they share, and run on smoothly there.
func (p Path) Simple() error {
	spans := p.splitArcs().spans()
	tree := newBoxTree(spans)
	for i, s := range spans {
		var err error
		tree.near(s.box(), 0, func(j int) {
			o := spans[j]
			if j <= i || err != nil {
				return
			}
			neighbors := j == i+1 || i == 0 && j == len(spans)-1
			if q, ok := s.touches(o, neighbors); ok {
				err = &CrossingError{i + 1, j + 1, q}
			}
		})
		if err != nil {
			return err
		}
	}
	return nil
}

// touches returns a point where two spans meet, of neighbors one other than that which they share.
func (s span) touches(o span, neighbors bool) (involute.Vec, bool) {
	for _, place := range s.meet(o, 0) {
		if !(place >= 0 && place <= s.place(s.to)) {
			continue
		}
		q, _ := s.at(place)
		on := o.place(q)
		there, _ := o.at(on)
		if !(on >= 0 && on <= o.place(o.to)) || there.Sub(q).Norm() > minPiece {
			continue
		}
		end := min(q.Sub(s.from).Norm(), q.Sub(s.to).Norm(), q.Sub(o.from).Norm(), q.Sub(o.to).Norm())
		if !neighbors || end >= crossingSlack {
			return q, true
		}
	}
	return involute.Vec{}, false
}
