package export

import (
	"fmt"
	"math"

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
	var err error
	for i, s := range spans {
		tree.near(s.box(), 0, func(j int) {
			if j <= i || err != nil {
				return
			}
			o := spans[j]
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
				neighbors := j == i+1 || (i == 0 && j == len(spans)-1)
				if neighbors && math.Min(math.Min(q.Sub(s.from).Norm(), q.Sub(s.to).Norm()), math.Min(q.Sub(o.from).Norm(), q.Sub(o.to).Norm())) < crossingSlack {
					continue
				}
				err = &CrossingError{i + 1, j + 1, q}
				return
			}
		})
	}
	return err
}
