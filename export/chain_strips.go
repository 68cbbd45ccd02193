package export

import (
	"math"

	"flankwright/involute"
)

// strips is the last resort where the search for fewest arcs finds none: biarcs
// that take up point and direction at even places, doubled in number until they
// keep the band. They follow the middle of the band, which a one-sided band
// reaches from its edge, where the ends are, over a quarter of the run; so that
// with their cube law they come within any band.
func (r *run) strips(b band) (chain, bool) {
	for n := 1; n <= maxStrips; n *= 2 {
		var ch chain
		for c := range r.walks {
			ch.Counts = append(ch.Counts, 2*n)
			for i := range n {
				p, u := r.guide(c, float64(i)/float64(n), b)
				q, v := r.guide(c, float64(i+1)/float64(n), b)
				two, ok := biarcOfShare(p, u, q, v, 0.5)
				if !ok {
					ch.Pieces = nil
					break
				}
				for _, x := range two {
					x.Bulge = straighten(x.Bulge)
					ch.Pieces = append(ch.Pieces, x)
				}
			}
		}
		if len(ch.Pieces) != 2*n*len(r.walks) {
			continue
		}
		if done, ok := r.certify(ch, b); ok {
			return done, true
		}
	}
	return chain{}, false
}

// guide returns the point and direction that strips take up a share along a curve of the run.
func (r *run) guide(curve int, share float64, b band) (p, dir involute.Vec) {
	all := float64(len(r.walks))
	place := (float64(curve) + share) / all
	p, dir = r.walks[curve].pointAndDirection(share)
	switch {
	case place == 0:
		return r.start.point, r.start.direction(dir)
	case place == 1:
		return r.stop.point, r.stop.direction(dir)
	case b.middle() == 0:
		return p, dir
	}
	rise := func(x float64) float64 { // from 0 to 1 over a quarter, flat at both ends
		x = min(1, 4*x)
		return x * x * (3 - 2*x)
	}
	offset := func(place float64) involute.Vec {
		w, u := r.at(place * all)
		q, d := w.pointAndDirection(u)
		// The metal is on the left, so the outside of the band is to the right.
		return q.Sub(d.Left().Scale(b.middle() * rise(min(place, 1-place))))
	}
	const h = 1e-6
	d := offset(place + h).Sub(offset(place - h))
	return offset(place), d.Scale(1 / math.Max(d.Norm(), math.SmallestNonzeroFloat64))
}

// direction returns the direction the chain has at the end, given the curve's.
func (e runEnd) direction(curve involute.Vec) involute.Vec {
	if e.free {
		return curve
	}
	return e.dir
}
