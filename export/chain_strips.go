package export

import "flankwright/involute"

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

// guide returns the point and direction that strips take up a share along a curve
// of the run: those of C − c n, where n is the normal to the left and c the way
// into the band, whose derivative is C′(1 + κc) − c′n.
func (r *run) guide(curve int, share float64, b band) (p, dir involute.Vec) {
	w := r.walks[curve]
	p, dir = w.pointAndDirection(share)
	switch last := len(r.walks) - 1; {
	case share == 0 && curve == 0:
		return r.start.point, r.start.direction(dir)
	case share == 1 && curve == last:
		return r.stop.point, r.stop.direction(dir)
	case b.middle() == 0:
		return p, dir // a kink between curves stays
	case share == 0:
		_, before := r.walks[curve-1].pointAndDirection(1)
		dir = halfway(before, dir)
	case share == 1:
		_, after := r.walks[curve+1].pointAndDirection(0)
		dir = halfway(dir, after)
	}
	into := func(share float64) float64 {
		place := (float64(curve) + share) / float64(len(r.walks))
		x := min(1, 4*min(place, 1-place)) // from 0 to 1 over a quarter of the run, flat at both ends
		return b.middle() * x * x * (3 - 2*x)
	}
	const h = 1e-6
	from, to := max(0, share-h), min(1, share+h)
	speed := w.point(to).Sub(w.point(from)).Norm() / (to - from)
	rise := (into(share+h) - into(share-h)) / (2 * h)
	c := into(share)
	d := dir.Scale(speed * (1 + w.curve.Curvature(w.parameter(share))*c)).Sub(dir.Left().Scale(rise))
	return p.Sub(dir.Left().Scale(c)), d.Scale(1 / d.Norm())
}

// direction returns the direction the chain has at the end, given the curve's.
func (e runEnd) direction(curve involute.Vec) involute.Vec {
	if e.free {
		return curve
	}
	return e.dir
}
