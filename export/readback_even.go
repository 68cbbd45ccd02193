package export

import (
	"math"

	"flankwright/involute"
)

// An Unevenness says how far the teeth of a contour differ from its first one.
type Unevenness struct {
	// Shape is the greatest distance of a point of any tooth from the first
	// tooth's contour, turned to it by whole pitches, mm.
	Shape float64
	// Joints is the greatest distance of a joint of any tooth from the nearest
	// joint of the first, mm: a vertex that slid along the contour changes the shape little.
	Joints float64
}

// evenSamples is at how many places of each piece the teeth are compared: its
// start, its middle, where an arc differs most from its chord, and between.
const evenSamples = 4

// Unevenness compares every tooth with the first by turning it there by whole
// pitches. Nothing needs to be known of the gear: one vertex out of place, or
// one bulge lost, makes one tooth unlike the others.
func (s Section) Unevenness() Unevenness {
	pitch := 2 * math.Pi / float64(s.Teeth())
	from := s.spaces[0]
	// A third of a pitch more on either side, for points near the border.
	first := s.between(from-pitch/3, from+pitch*4/3)
	joints := s.joints()
	var near []involute.Vec
	for _, q := range joints {
		if a := ahead(from-pitch/3, q.Angle()); a < pitch*5/3 {
			near = append(near, q)
		}
	}
	home := func(q involute.Vec) involute.Vec {
		return q.Rotate(-pitch * math.Floor(ahead(from, q.Angle())/pitch))
	}
	var out Unevenness
	for _, c := range s.curves {
		for i := range evenSamples {
			q, _ := c.At(float64(i) / evenSamples)
			_, off := nearestPiece(first, home(q))
			out.Shape = max(out.Shape, off)
		}
	}
	for _, q := range joints {
		least := math.Inf(1)
		for _, p := range near {
			least = min(least, p.Sub(home(q)).Norm())
		}
		out.Joints = max(out.Joints, least)
	}
	return out
}

// oneCircle is how near the centers and radii of two neighbors are one circle, as a share of the radius.
const oneCircle = 1e-6

// joints returns where the pieces of the path meet, but for joints inside one
// circle or line, such as the middle of the root where the path starts.
func (s Section) joints() []involute.Vec {
	var out []involute.Vec
	for i, c := range s.curves {
		before := s.curves[(i+len(s.curves)-1)%len(s.curves)]
		if q, _ := c.At(0); !sameCurve(before, c) {
			out = append(out, q)
		}
	}
	return out
}

// sameCurve reports whether two pieces that follow each other lie on one circle or line.
func sameCurve(a, b involute.Curve) bool {
	if l, ok := a.(involute.Line); ok {
		m, also := b.(involute.Line)
		d, e := l.To.Sub(l.From), m.To.Sub(m.From)
		return also && math.Abs(d.Cross(e)) < oneCircle*d.Norm()*e.Norm()
	}
	p, ok := a.(involute.Arc)
	q, also := b.(involute.Arc)
	return ok && also && p.Sweep*q.Sweep > 0 &&
		p.Center.Sub(q.Center).Norm() < oneCircle*p.Radius && math.Abs(p.Radius-q.Radius) < oneCircle*p.Radius
}
