package export

import "math"

// A fittingSearch puts a fitting to the minimizer. Its residuals are how far the samples
// lie off the chain, in units of half the band from its middle, and after them, where
// a shortest arc is asked for, how many times it exceeds each arc.
type fittingSearch struct {
	*fitting
	found chain
}

func (s *fittingSearch) residuals(x, out []float64) bool {
	next := 0
	for k := range s.shares {
		s.starts[k] = next
		var ok bool
		if next, ok = s.measure(x, k, next, len(s.samples), k == len(s.shares)-1, out); !ok {
			return false
		}
	}
	s.starts[len(s.shares)] = next
	return true
}

func (s *fittingSearch) changed(x []float64, i int, out []float64) bool {
	n := s.numbers[i]
	next := s.starts[n.from]
	for k := n.from; k < n.to; k++ {
		var ok bool
		if next, ok = s.measure(x, k, next, s.starts[n.to], k == n.to-1, out); !ok {
			return false
		}
	}
	return true
}

func (s *fittingSearch) reach(i int) reach {
	n := s.numbers[i]
	r := reach{{s.starts[n.from], s.starts[n.to]}}
	if s.minArc > 0 {
		r[1].from, r[1].to = s.lengthAt(n.from), s.lengthAt(n.to)
	}
	return r
}

// lengthAt returns the place among the residuals of the first arc of a span.
func (s *fittingSearch) lengthAt(span int) int {
	return len(s.samples) + max(2*span-s.total%2, 0)
}

func (s *fittingSearch) accept(x []float64) bool {
	ch, ok := s.chain(x)
	if !ok {
		return false
	}
	ch, ok = s.run.certify(ch, s.band)
	if ok {
		s.found = ch
	}
	return ok
}

// inset returns the band that the search aims at. The ends of a run lie on the
// curve, which is the very edge of a one-sided band; aimed at a little inside of
// that edge, the search leaves it for good.
func (b band) inset() band {
	const share = 0.01
	switch {
	case b.low == 0:
		b.low = share * b.high
	case b.high == 0:
		b.high = share * b.low
	}
	return b
}

// good reports whether no sample is beyond the band itself.
func (s *fittingSearch) good(r []float64) bool {
	aim := s.band.inset()
	low, high := (s.band.low-aim.middle())/aim.half(), (s.band.high-aim.middle())/aim.half()
	for _, x := range r[:len(s.samples)] {
		if x < low || x > high {
			return false
		}
	}
	for _, x := range r[len(s.samples):] {
		if x > 1 {
			return false
		}
	}
	return true
}

// measure fills in the residuals of a span whose first sample is next, and returns
// the first sample beyond it: beyond the normal at its end, or end where it takes all the rest.
func (s *fittingSearch) measure(x []float64, span, next, end int, rest bool, out []float64) (int, bool) {
	pieces, n, ok := s.span(x, span)
	if !ok {
		return next, false
	}
	aim := s.band.inset()
	middle, scale := aim.middle(), 1/aim.half()
	for i, p := range pieces[:n] {
		if s.minArc > 0 {
			out[s.lengthAt(span)+i] = s.minArc / p.length()
		}
		g := newGauge(p)
		_, dir := p.directions()
		all := rest && i == n-1
		for next < end && (all || s.samples[next].Sub(p.To).Dot(dir) < 0) {
			out[next] = (g.offset(s.samples[next]) - middle) * scale
			if math.IsNaN(out[next]) {
				return next, false
			}
			next++
		}
	}
	return next, true
}
