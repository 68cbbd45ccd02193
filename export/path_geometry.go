package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

const (
	// maxCoordinate bounds the coordinates of an outline, in mm. Up to 100 m
	// neighboring float64 numbers lie 1.5e-11 mm apart, so that twelve written
	// decimals still come back within 1e-9 mm.
	maxCoordinate = 1e5

	// minPiece is the shortest chord a piece may have, in mm. It is the finest
	// distance at which importers join ends (coarser ones use 0.001 to 0.15
	// mm): a shorter piece would be taken for a point.
	minPiece = 1e-6

	// bulgeStep is the last decimal of a bulge in a file. A smaller bulge is
	// written as 0, so a piece with one is straight.
	bulgeStep = 1e-12

	// quarterBulge is the bulge of a quarter circle, tan(90°/4) = √2 − 1.
	quarterBulge = math.Sqrt2 - 1
)

// ends returns where piece i starts and ends, and its bulge.
func (p Path) ends(i int) (from, to involute.Vec, bulge float64) {
	v := p.Vertices[i]
	return v.P, p.Vertices[(i+1)%len(p.Vertices)].P, v.Bulge
}

// Curve returns the line or arc that leaves vertex i.
//
// An arc from P to Q with chord c and bulge b sweeps 4·atan b about the center
// (P + Q)/2 + left(Q − P)·(1 − b²)/(4b), at radius c(1 + b²)/(4|b|); these follow
// from the bulge's definition b = tan(sweep/4) in the DXF reference (LWPOLYLINE,
// group code 42). Points of the arc are off by some 1e-16 of its radius.
func (p Path) Curve(i int) involute.Curve {
	from, to, b := p.ends(i)
	if math.Abs(b) < bulgeStep {
		return involute.Line{From: from, To: to}
	}
	chord := to.Sub(from)
	center := from.Add(chord.Scale(0.5)).Add(chord.Left().Scale((1 - b*b) / (4 * b)))
	return involute.Arc{
		Center: center,
		Radius: arcRadius(chord.Norm(), b),
		Start:  from.Sub(center).Angle(),
		Sweep:  4 * math.Atan(b),
	}
}

// arcRadius returns the radius of an arc over a chord of length c with bulge b ≠ 0.
func arcRadius(c, b float64) float64 { return c * (1 + b*b) / (4 * math.Abs(b)) }

// length returns the length of the whole path in mm.
func (p Path) length() float64 {
	sum := 0.0
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		c := to.Sub(from).Norm()
		if math.Abs(b) >= bulgeStep {
			c *= (1 + b*b) * math.Atan(b) / b // radius times sweep
		}
		sum += c
	}
	return sum
}

// area returns the area the path encloses in mm², positive where the path runs
// counter-clockwise: the polygon of the chords and the circular segments on them.
func (p Path) area() float64 {
	if len(p.Vertices) == 0 {
		return 0
	}
	origin := p.Vertices[0].P // the cross products stay small far from (0, 0)
	sum := 0.0
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		sum += from.Sub(origin).Cross(to.Sub(origin)) / 2
		c := to.Sub(from)
		sum += c.Dot(c) * segmentArea(b)
	}
	return sum
}

// segmentArea returns the area between an arc of bulge b and its chord of length 1:
// r²(θ − sin θ)/2 with θ = 4·atan b and r = (1 + b²)/(4b). Below |θ| = 0.5 the
// difference is summed as θ³/6·(1 − θ²/20·(1 − …)), whose first dropped term is
// below 1e-14 of the whole.
func segmentArea(b float64) float64 {
	if math.Abs(b) < bulgeStep {
		return 0
	}
	t := 4 * math.Atan(b)
	s := t * t
	d := t - math.Sin(t)
	if math.Abs(t) < 0.5 {
		d = t * s / 6 * (1 - s/20*(1-s/42*(1-s/72*(1-s/110*(1-s/156)))))
	}
	return (1 + b*b) * (1 + b*b) / (32 * b * b) * d
}

// bounds returns the lowest and highest coordinates the path reaches, the
// bulging of its arcs included.
func (p Path) bounds() (lo, hi involute.Vec) {
	lo = involute.Vec{X: math.Inf(1), Y: math.Inf(1)}
	hi = lo.Scale(-1)
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		lo, hi = stretch(lo, hi, from)
		if math.Abs(b) < bulgeStep {
			continue
		}
		chord := to.Sub(from)
		r := arcRadius(chord.Norm(), b)
		sweep := 4 * math.Atan(b)
		// The outward normal at the start, measured from the chord so that a
		// flat arc with a distant center loses no digits.
		normal := chord.Angle() - sweep/2 - math.Copysign(math.Pi/2, b)
		for q, axis := range [...]involute.Vec{{X: 1}, {Y: 1}, {X: -1}, {Y: -1}} {
			turn := math.Mod(math.Copysign(1, b)*(float64(q)*math.Pi/2-normal), 2*math.Pi)
			if turn < 0 {
				turn += 2 * math.Pi
			}
			if turn < math.Abs(sweep) {
				h := math.Sin(turn / 2)
				lo, hi = stretch(lo, hi, from.Add(axis.Scale(2*r*h*h)))
			}
		}
	}
	return lo, hi
}

// stretch returns the box lo…hi stretched to hold v.
func stretch(lo, hi, v involute.Vec) (involute.Vec, involute.Vec) {
	return involute.Vec{X: math.Min(lo.X, v.X), Y: math.Min(lo.Y, v.Y)},
		involute.Vec{X: math.Max(hi.X, v.X), Y: math.Max(hi.Y, v.Y)}
}

// counterClockwise returns the path running counter-clockwise: itself, or itself
// walked backwards from the same first vertex. No number changes but the sign of
// the bulges.
func (p Path) counterClockwise() Path {
	if p.area() >= 0 {
		return p
	}
	n := len(p.Vertices)
	back := make([]Vertex, n)
	for i := range back {
		back[i] = Vertex{
			P:     p.Vertices[(n-i)%n].P,
			Bulge: -p.Vertices[n-1-i].Bulge,
		}
	}
	return Path{Vertices: back}
}

// splitArcs returns the path with every arc over 90° cut into equal arcs of at
// most 90° on the same circle. A path without such arcs comes back unchanged.
func (p Path) splitArcs() Path {
	var out []Vertex
	for i, v := range p.Vertices {
		arc, ok := p.Curve(i).(involute.Arc)
		if !ok || math.Abs(v.Bulge) <= quarterBulge+bulgeStep {
			out = append(out, v)
			continue
		}
		n := int(math.Ceil(math.Abs(arc.Sweep) / (math.Pi / 2)))
		b := math.Tan(arc.Sweep / float64(4*n))
		out = append(out, Vertex{v.P, b})
		for k := 1; k < n; k++ {
			q, _ := arc.At(float64(k) / float64(n))
			out = append(out, Vertex{q, b})
		}
	}
	return Path{Vertices: out}
}

// chords returns the path with each arc as equal chords that leave it by no more
// than tolerance, mm: r(1 − cos(x/2)) over the angle x.
func (p Path) chords(tolerance float64) Path {
	var out []Vertex
	for i, v := range p.Vertices {
		arc, ok := p.Curve(i).(involute.Arc)
		if !ok {
			out = append(out, v)
			continue
		}
		n := int(math.Ceil(math.Abs(arc.Sweep) / (2 * math.Acos(max(0, 1-tolerance/arc.Radius)))))
		for k := range n {
			q, _ := arc.At(float64(k) / float64(n))
			if k == 0 {
				q = v.P
			}
			out = append(out, Vertex{P: q})
		}
	}
	return Path{Vertices: out}
}

// check reports why the path can't be an outline: too few vertices, a number
// that is not finite or beyond 100 m, a piece shorter than 1e-6 mm, or no area inside.
func (p Path) check() error {
	n := len(p.Vertices)
	if n < 2 {
		return fmt.Errorf("a closed path needs at least 2 vertices, not %d", n)
	}
	for i, v := range p.Vertices {
		if !inReach(v.P.X) || !inReach(v.P.Y) {
			return fmt.Errorf("vertex %d at (%g, %g): coordinates must be within ±%g mm", i+1, v.P.X, v.P.Y, maxCoordinate)
		}
		if !finite(v.Bulge) {
			return fmt.Errorf("vertex %d: bulge %g is not a finite number", i+1, v.Bulge)
		}
	}
	for i := range p.Vertices {
		from, to, _ := p.ends(i)
		if c := to.Sub(from).Norm(); c < minPiece {
			return fmt.Errorf("the piece leaving vertex %d is %.2g mm long; at least %g mm is needed", i+1, c, minPiece)
		}
	}
	lo, hi := p.bounds()
	if !inReach(lo.X) || !inReach(lo.Y) || !inReach(hi.X) || !inReach(hi.Y) {
		return fmt.Errorf("an arc reaches beyond ±%g mm", maxCoordinate)
	}
	if math.Abs(p.area()) < minPiece*p.length() {
		return fmt.Errorf("the path encloses no area")
	}
	return nil
}

// inReach reports whether a coordinate is finite and below maxCoordinate.
func inReach(x float64) bool { return math.Abs(x) <= maxCoordinate }
