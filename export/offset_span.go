package export

import (
	"math"

	"flankwright/involute"
)

// A span is a line or an arc of at most 90°, told by its ends, its directions
// there and its curvature k (1/mm, positive where it turns left, 0 for a line).
// All its formulas pass through k = 0, so that a flat arc with a center miles
// away loses no digits and a line needs no case of its own.
//
// With t and n = left(t) at the start, w = q − from and the place
// σ = tan(φ/2)·2/k, φ being the angle turned so far, the span's points are
//
//	w(σ) = (σ·t + kσ²/2·n)/(1 + k²σ²/4)
//
// (half-angle formulas; for a line σ is the length). Its circle is
// k|w|² − 2 w·n = 0.
type span struct {
	from, to   involute.Vec // mm
	start, end involute.Vec // unit directions at from and to
	k          float64
}

// newSpan returns a piece as a span. One with a bulge that a file would write as 0 is straight.
func newSpan(p piece) span {
	if math.Abs(p.Bulge) < bulgeStep {
		p.Bulge = 0
	}
	start, end := p.directions()
	return span{from: p.From, to: p.To, start: start, end: end, k: p.curvature()}
}

// spanBetween returns the span of curvature k from one point to another.
func spanBetween(from, to involute.Vec, k float64) span {
	s := newSpan(piece{from, to, bulgeOver(to.Sub(from).Norm(), k)})
	s.k = k
	return s
}

// bulgeOver returns the bulge of the arc of curvature k over a chord of length c:
// sin(sweep/2) = ck/2, and tan(x/2) = sin x/(1 + cos x) with x = sweep/2. Rounding
// must not lift a quarter circle over 90°.
func bulgeOver(c, k float64) float64 {
	sin := max(-math.Sqrt2/2, min(math.Sqrt2/2, c*k/2))
	return sin / (1 + math.Sqrt(1-sin*sin))
}

// place returns σ of a point on the span's circle: w·t/(1 − k w·n/2).
func (s span) place(q involute.Vec) float64 {
	w := q.Sub(s.from)
	return w.Dot(s.start) / (1 - s.k*w.Dot(s.start.Left())/2)
}

// at returns the point and the unit direction at the place σ.
func (s span) at(sigma float64) (point, direction involute.Vec) {
	u := s.k * sigma / 2
	n := s.start.Left()
	f := 1 / (1 + u*u)
	point = s.from.Add(s.start.Scale(sigma * f)).Add(n.Scale(sigma * u * f))
	direction = s.start.Scale((1 - u*u) * f).Add(n.Scale(2 * u * f))
	return point, direction
}

// aside returns the distance in mm from the span's whole circle or line to q,
// positive to the right: with h = k|w|² − 2 w·n it is h/(1 + √(1 + kh)), where
// √(1 + kh) is |k| times the distance to the center.
func (s span) aside(q involute.Vec) float64 {
	w := q.Sub(s.from)
	h := s.k*w.Dot(w) - 2*w.Dot(s.start.Left())
	return h / (1 + math.Sqrt(max(0, 1+s.k*h)))
}

// distance returns the distance in mm from the span to q. Ahead of the normal at
// the start and behind that at the end the foot is inside, else an end is nearest.
func (s span) distance(q involute.Vec) float64 {
	v, w := q.Sub(s.from), q.Sub(s.to)
	if v.Dot(s.start) >= 0 && w.Dot(s.end) <= 0 {
		return math.Abs(s.aside(q))
	}
	return min(v.Norm(), w.Norm())
}

// box returns a box that holds the span: that of its ends and of the point where
// the tangents there meet, half of σ's range along the first.
func (s span) box() extent {
	lo, hi := stretch(s.from, s.from, s.to)
	lo, hi = stretch(lo, hi, s.from.Add(s.start.Scale(s.place(s.to)/2)))
	return extent{lo, hi}
}

// meet returns the places on s where its whole circle or line meets that of o,
// and 0 to 2 of them are good; the others are infinite or NaN. Circles that
// miss each other by less than slack (mm) meet at the nearest place.
//
// Putting w(σ) into the circle of o gives, with e = s.from − o.from,
// g = k₂e − n₂ and h = k₂|e|² − 2 e·n₂,
//
//	(k₂ + k₁ n₁·g + h k₁²/4)·σ² + 2 t₁·g·σ + h = 0
func (s span) meet(o span, slack float64) [2]float64 {
	e := s.from.Sub(o.from)
	n := o.start.Left()
	g := e.Scale(o.k).Sub(n)
	h := o.k*e.Dot(e) - 2*e.Dot(n)
	a := o.k + s.k*s.start.Left().Dot(g) + h*s.k*s.k/4
	b := s.start.Dot(g) // half the factor of σ
	d := b*b - a*h
	if d < 0 {
		nearest := -b / a
		if q, _ := s.at(nearest); !(math.Abs(o.aside(q)) < slack) {
			return [2]float64{math.NaN(), math.NaN()}
		}
		return [2]float64{nearest, math.NaN()}
	}
	q := -(b + math.Copysign(math.Sqrt(d), b))
	return [2]float64{q / a, h / q}
}
