package export

import (
	"fmt"
	"math"
	"slices"

	"flankwright/involute"
)

// A flank is where the contour crosses the circle halfway between root and tip.
type flank struct {
	piece int     // which piece of the path crosses
	angle float64 // polar angle of the crossing
	up    bool    // from root to tip: a tooth's first side, counter-clockwise round the gear
}

// findFlanks finds the flanks in the order of the path, the first one going up,
// and the middles of the tooth spaces between flanks down and up.
func (s *Section) findFlanks() error {
	half := (s.least + s.most) / 2
	for i, c := range s.curves {
		a, _ := c.At(0)
		b, _ := c.At(1)
		up := a.Norm() < half
		if up == (b.Norm() < half) {
			continue
		}
		t, err := involute.FindRoot(func(t float64) float64 { q, _ := c.At(t); return q.Norm() - half }, 0, 1)
		if err != nil {
			return fmt.Errorf("contour: a flank does not cross the middle circle: %w", err)
		}
		q, _ := c.At(t)
		s.flanks = append(s.flanks, flank{i, q.Angle(), up})
	}
	n := len(s.flanks)
	if n == 0 {
		return fmt.Errorf("contour: no flank crosses the circle of diameter %.4g mm halfway between root and tip, which makes no gear", 2*half)
	}
	// Along a closed path flanks up and down take turns.
	if !s.flanks[0].up {
		s.flanks = append(s.flanks[1:], s.flanks[0])
	}
	for k := range n / 2 {
		s.spaces = append(s.spaces, math.Remainder(s.space(k), 2*math.Pi))
	}
	slices.Sort(s.spaces)
	return nil
}

// flankAt returns flank i, counted on round the gear in either direction.
func (s Section) flankAt(i int) flank {
	n := len(s.flanks)
	return s.flanks[((i%n)+n)%n]
}

// ahead returns the angle by which b lies ahead of a, counter-clockwise, in [0, 2π).
func ahead(a, b float64) float64 {
	d := math.Mod(b-a, 2*math.Pi)
	if d < 0 {
		d += 2 * math.Pi
	}
	return d
}

// tooth returns the polar angle of the middle of tooth k, counted in the path's order.
func (s Section) tooth(k int) float64 {
	up, down := s.flankAt(2*k), s.flankAt(2*k+1)
	return up.angle + ahead(up.angle, down.angle)/2
}

// space returns the polar angle of the middle of the space that follows tooth k.
func (s Section) space(k int) float64 {
	down, up := s.flankAt(2*k+1), s.flankAt(2*k+2)
	return down.angle + ahead(down.angle, up.angle)/2
}

// onlyTouching is the angle up to which a piece that ends at the middle of a
// tooth or space counts as staying on its side of it, radians.
const onlyTouching = 1e-9

// half returns the pieces of one side of tooth k, in the order of the path: from
// the middle of the space before it to the middle of its tip, or (down) from there
// to the middle of the space behind it. A piece across a middle is on both sides.
func (s Section) half(k int, down bool) []involute.Curve {
	i := 2 * k
	from, to := s.space(k-1), s.tooth(k)
	if down {
		i++
		from, to = s.tooth(k), s.space(k)
	}
	at := s.flankAt(i)
	from, to = -ahead(from, at.angle), ahead(at.angle, to)
	n := len(s.curves)
	first, last := s.flankAt(i-1).piece, s.flankAt(i+1).piece
	var out []involute.Curve
	for j := first; ; j = (j + 1) % n {
		a, _ := s.curves[j].At(0)
		b, _ := s.curves[j].At(1)
		p, q := math.Remainder(a.Angle()-at.angle, 2*math.Pi), math.Remainder(b.Angle()-at.angle, 2*math.Pi)
		if max(p, q) > from+onlyTouching && min(p, q) < to-onlyTouching {
			out = append(out, s.curves[j])
		}
		if j == last {
			return out
		}
	}
}

// directions returns the unit directions in which a line or an arc starts and ends.
func directions(c involute.Curve) (start, end involute.Vec) {
	_, a := c.At(0)
	_, b := c.At(1)
	return a.Scale(1 / a.Norm()), b.Scale(1 / b.Norm())
}

// flankCorner ends a flank: a joint that turns by more. A tip's corner and a 45°
// chamfer turn by more than 10°; a vertex moved by hand by 0.01 mm in a chain of
// pieces of 0.3 mm and longer by less than 4°.
const flankCorner = 5 * involute.Degree

// flankRun returns the pieces of flank i from end to end in the order of the
// path: on both sides of the middle circle up to a corner, a hollow piece, or one
// that no longer runs outward (inward) as the flank does.
func (s Section) flankRun(i int) []involute.Curve {
	n := len(s.curves)
	at := func(j int) involute.Curve { return s.curves[((j%n)+n)%n] }
	rise := func(c involute.Curve) float64 {
		a, _ := c.At(0)
		b, _ := c.At(1)
		return b.Norm() - a.Norm()
	}
	sense := math.Copysign(1, rise(at(s.flankAt(i).piece)))
	belongs := func(before, after, next involute.Curve) bool {
		arc, ok := next.(involute.Arc)
		if sense*rise(next) < minPiece {
			return false
		}
		_, end := directions(before)
		start, _ := directions(after)
		return (!ok || arc.Sweep > 0) && math.Abs(turn(end, start)) < flankCorner
	}
	first := s.flankAt(i).piece
	last := first
	for last-first < n && belongs(at(last), at(last+1), at(last+1)) {
		last++
	}
	for last-first < n && belongs(at(first-1), at(first), at(first-1)) {
		first--
	}
	var out []involute.Curve
	for j := first; j <= last; j++ {
		out = append(out, at(j))
	}
	return out
}

// within returns what of a flank's pieces lies between two distances from the
// axis, mm; all of it where nothing does. Along a flank the distance rises or
// falls, so each limit is crossed once; an end nearer to it than the finest length
// in a file lies on it.
func within(pieces []involute.Curve, inner, outer float64) []involute.Curve {
	var out []involute.Curve
	for _, c := range pieces {
		radius := func(t float64) float64 { q, _ := c.At(t); return q.Norm() }
		from, to := 0.0, 1.0
		if radius(0) > radius(1) {
			from, to = 1, 0
		} // from the inner end to the outer one
		if radius(to) < inner+minPiece || radius(from) > outer-minPiece {
			continue
		}
		if radius(from) < inner-minPiece {
			if t, err := involute.FindRoot(func(t float64) float64 { return radius(t) - inner }, 0, 1); err == nil {
				from = t
			}
		}
		if radius(to) > outer+minPiece {
			if t, err := involute.FindRoot(func(t float64) float64 { return radius(t) - outer }, 0, 1); err == nil {
				to = t
			}
		}
		out = append(out, part(c, min(from, to), max(from, to)))
	}
	if len(out) == 0 {
		return pieces
	}
	return out
}

// part returns the part of a line or an arc between two shares of it.
func part(c involute.Curve, from, to float64) involute.Curve {
	if arc, ok := c.(involute.Arc); ok {
		arc.Start, arc.Sweep = arc.Start+from*arc.Sweep, (to-from)*arc.Sweep
		return arc
	}
	a, _ := c.At(from)
	b, _ := c.At(to)
	return involute.Line{From: a, To: b}
}
