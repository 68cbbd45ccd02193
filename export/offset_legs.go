package export

import (
	"flankwright/involute"
)

// A leg is a part of the walk: along one span, from a point on it to the next leg.
type leg struct {
	span int
	from involute.Vec // mm
}

// startEarly lets the legs begin with the one whose span comes first.
func (w *offsetWalk) startEarly() {
	first := 0
	for i, l := range w.legs {
		if l.span < w.legs[first].span {
			first = i
		}
	}
	w.legs = append(append([]leg(nil), w.legs[first:]...), w.legs[:first]...)
}

// path returns the legs as a path, each with its span's curvature.
func (w *offsetWalk) path() (Path, error) {
	legs := w.withoutShort()
	if len(legs) < 2 {
		return Path{}, errOffsetLost
	}
	var p Path
	for i, l := range legs {
		chord := legs[(i+1)%len(legs)].from.Sub(l.from).Norm()
		p.Vertices = append(p.Vertices, Vertex{l.from, bulgeOver(chord, w.tree.spans[l.span].k)})
	}
	return p, nil
}

// withoutShort returns the legs without those shorter than minPiece.
func (w *offsetWalk) withoutShort() []leg {
	legs := append([]leg(nil), w.legs...)
	for i := 0; i < len(legs) && len(legs) > 2; {
		n := len(legs)
		next := &legs[(i+1)%n]
		if next.from.Sub(legs[i].from).Norm() >= minPiece {
			i++
			continue
		}
		next.from = w.closing(legs[(i+n-1)%n], legs[i], *next)
		legs = append(legs[:i], legs[i+1:]...)
		if i--; i < 0 || i == n-2 { // legs before it have changed their ends
			i = 0
		}
	}
	return legs
}

// closing returns where the legs before and after a short one meet once that is
// gone: at the crossing of their circles or lines if there is one near, else in its middle.
func (w *offsetWalk) closing(before, short, after leg) involute.Vec {
	middle := short.from.Add(after.from).Scale(0.5)
	s := w.tree.spans[before.span]
	for _, place := range s.meet(w.tree.spans[after.span], 0) {
		if q, _ := s.at(place); q.Sub(middle).Norm() < negligible {
			return q
		}
	}
	return middle
}
