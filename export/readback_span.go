package export

import (
	"fmt"
	"math"
	"slices"

	"flankwright/involute"
)

// Span measures over k teeth with two parallel faces, as a span (disc)
// micrometer does, over every group of k neighbors, and returns the least and
// the greatest reading, mm. Each reading is what a careful hand takes: the least
// over a little rocking while both faces lie on flanks.
//
// With H(ν) the greatest reach of a flank in the direction ν, two faces square to
// ν stand H₁(ν) + H₂(ν + π) apart. On a spur gear the faces rock in the plane, and
// the least over ν is taken.
//
// On a helical gear the faces also tilt by τ out of the transverse plane, and
// flanks are swept along the helix, by q radians per mm. A face that touches a
// flank farther along the axis by ζ touches a section turned by qζ, so that with
// λ = tan τ/q the faces stand
//
//	cos τ (max over ν of [H₁(ν) + λν] + max over ν of [H₂(ν) − λν] − λπ)
//
// apart, whichever way the gear is turned; the least over τ is the span, normal
// to the flanks like involute.Tooth.Span. An error says that the faces, set
// opposite each other, do not find flanks to lie on.
//
// A flank counts between two distances from the axis (mm; 0 and +Inf for all of it):
// radial lines below, a relief or a rounding above run on without a corner.
func (s Section) Span(k int, from, to float64) (least, greatest float64, err error) {
	z := s.Teeth()
	if k < 1 || k >= z {
		return 0, 0, fmt.Errorf("contour: a span is measured over 1 to %d of %d teeth, not over %d", z-1, z, k)
	}
	least = math.Inf(1)
	for i := range z {
		w, err := s.spanFrom(i, k, from, to)
		if err != nil {
			return 0, 0, err
		}
		least, greatest = min(least, w), max(greatest, w)
	}
	return least, greatest, nil
}

// spanFrom returns the reading over k teeth from tooth i on.
func (s Section) spanFrom(i, k int, inner, outer float64) (float64, error) {
	last := s.flankAt(2*(i+k-1) + 1)
	first := s.flankAt(2 * i)
	// Straight across the middle of the group.
	across := first.angle + ahead(first.angle, last.angle)/2 + math.Pi/2
	far := newFace(within(s.flankRun(2*(i+k-1)+1), inner, outer), across)
	near := newFace(within(s.flankRun(2*i), inner, outer), across-math.Pi)
	if far.low > far.top || near.low > near.top { // more than half a turn from facing each other
		return 0, fmt.Errorf("contour: over %d teeth the faces would touch no flanks: measure over fewer teeth", k)
	}
	var w, shift float64
	if s.twist != 0 {
		var tilt float64
		w, tilt = far.tilted(near, s.twist)
		shift = s.twist * w * math.Sin(tilt) / 2 // the section where the far face touches is turned by so much
	}
	if from, to := far.overlap(near, shift); from > to {
		where, way := "above the tips", "fewer"
		if near.low > far.top-2*shift {
			where, way = "below the flanks", "more"
		}
		return 0, fmt.Errorf("contour: over %d teeth the faces would touch %s, %.2f° off: measure over %s teeth", k, where, (from-to)/involute.Degree, way)
	}
	if s.twist == 0 {
		w = far.rocked(near)
	}
	return w, nil
}

// A face is a flank as a flat face feels it: how far it reaches in each
// direction. Directions are counted from the one straight across the group.
type face struct {
	touches  []touch
	low, top float64 // the directions square to the flank's two ends, radians
	// Least and greatest dH/dν on its pieces, mm: the levers of the normals about
	// the axis.
	flattest, steepest float64
}

// A touch is a part of a flank that a face can lie on: an arc, or a corner with radius 0.
type touch struct {
	distance, angle float64 // polar coordinates of the arc's center, mm and radians
	radius          float64
	from, to        float64 // the directions in which it counts
}

// newFace returns the face of a flank's pieces; ref is the direction counted as 0.
func newFace(pieces []involute.Curve, ref float64) face {
	away := func(dir involute.Vec) float64 { return math.Remainder(dir.Angle()-math.Pi/2-ref, 2*math.Pi) }
	start, _ := directions(pieces[0])
	_, end := directions(pieces[len(pieces)-1])
	f := face{low: away(start), top: away(end), flattest: math.Inf(1), steepest: math.Inf(-1)}
	add := func(center involute.Vec, radius, from, to float64) {
		f.touches = append(f.touches, touch{center.Norm(), math.Remainder(center.Angle()-ref, 2*math.Pi), radius, from, to})
	}
	for _, c := range pieces {
		from, _ := c.At(0)
		to, _ := c.At(1)
		start, end := directions(c)
		add(from, 0, f.low, f.top)
		f.flattest = min(f.flattest, from.Dot(start), to.Dot(end))
		f.steepest = max(f.steepest, from.Dot(start), to.Dot(end))
		if arc, ok := c.(involute.Arc); ok && arc.Sweep > 0 {
			add(arc.Center, arc.Radius, away(start), away(end))
			// The lever of an arc's normal is center·direction, and greatest where the two are in line.
			for _, side := range []float64{1, -1} {
				if v := away(arc.Center.Scale(side)); v > away(start) && v < away(end) {
					f.flattest = min(f.flattest, side*arc.Center.Norm())
					f.steepest = max(f.steepest, side*arc.Center.Norm())
				}
			}
		}
	}
	to, _ := pieces[len(pieces)-1].At(1)
	add(to, 0, f.low, f.top)
	return f
}

// reach returns the greatest of H(ν) + λν over the directions ν of the face, mm.
// A part with its center at (d, γ) and radius R reaches d cos(ν − γ) + R, which
// with λν is greatest at sin(ν − γ) = λ/d or at an end.
func (f face) reach(lambda float64) float64 {
	most := math.Inf(-1)
	for _, t := range f.touches {
		at := func(v float64) {
			if v >= t.from && v <= t.to {
				most = max(most, t.distance*math.Cos(v-t.angle)+t.radius+lambda*v)
			}
		}
		at(t.from)
		at(t.to)
		if math.Abs(lambda) < t.distance {
			at(math.Remainder(t.angle+math.Asin(lambda/t.distance), 2*math.Pi))
		}
	}
	return most
}

// reachAt returns H(ν), mm.
func (f face) reachAt(v float64) float64 {
	most := math.Inf(-1)
	for _, t := range f.touches {
		if v >= t.from && v <= t.to {
			most = max(most, t.distance*math.Cos(v-t.angle)+t.radius)
		}
	}
	return most
}

// overlap returns the directions in which both faces lie on flanks, the far
// one's section being turned back by shift and the near one's forward. There are none where from > to.
func (f face) overlap(near face, shift float64) (from, to float64) {
	return max(f.low-shift, near.low+shift), min(f.top-shift, near.top+shift)
}

// rocked returns the least distance of the two faces over the inner half of the directions
// in which both lie on flanks: toward the ends a face may lean on the arc that a
// drawing lays round the start of a relief or into a fillet. Between the ends of its arcs it has one minimum at most.
func (f face) rocked(near face) float64 {
	from, to := f.overlap(near, 0)
	if from < 0 && to > 0 { // 0 is straight across, where a hand sets the faces before rocking
		from, to = from/2, to/2
	}
	stops := []float64{from}
	for _, t := range append(append([]touch(nil), f.touches...), near.touches...) {
		if t.from > from && t.from < to {
			stops = append(stops, t.from)
		}
	}
	stops = append(stops, to)
	slices.Sort(stops)
	stops = slices.Compact(stops)
	least := math.Inf(1)
	apart := func(v float64) float64 { return f.reachAt(v) + near.reachAt(v) }
	for i, v := range stops {
		least = min(least, apart(v))
		if i > 0 {
			_, low := findMaximum(func(v float64) float64 { return -apart(v) }, stops[i-1], v)
			least = min(least, -low)
		}
	}
	return least
}

// tilted returns the least distance over the faces' tilt, and that tilt. At the
// least, the lever λ is that of some normal of the flanks, which bounds it.
func (f face) tilted(near face, twist float64) (apart, tilt float64) {
	// Directions of the far face are counted from across, of the near one from
	// across − π, so that the λπ between them is taken out already.
	at := func(lambda float64) float64 {
		return (f.reach(lambda) + near.reach(-lambda)) / math.Hypot(1, twist*lambda)
	}
	from, to := min(-f.steepest, near.flattest), max(-f.flattest, near.steepest)
	lambda, low := findMaximum(func(l float64) float64 { return -at(l) }, from, to)
	return -low, math.Atan(twist * lambda)
}
