package export

import (
	"math"

	"flankwright/involute"
)

// A gauge measures how far points lie off the circle or line that carries a piece.
type gauge struct {
	from, normal involute.Vec // a point of the circle and the unit normal there, to the left
	curvature    float64
}

// newGauge returns the gauge of a piece.
func newGauge(p piece) gauge {
	start, _ := p.directions()
	return gauge{from: p.From, normal: start.Left(), curvature: p.curvature()}
}

// offset returns the signed distance in mm of a point from the circle, positive
// to the left of the way along it. With w from the piece's start to the point,
// n the normal and κ the curvature, the distance from the center |w − n/κ| gives
//
//	offset = x / (1 + sqrt(1 − κx)),  x = 2 w·n − κ w²,
//
// which does not cancel for large radii and holds for a line too (κ = 0).
func (g gauge) offset(p involute.Vec) float64 {
	w := p.Sub(g.from)
	x := 2*w.Dot(g.normal) - g.curvature*w.Dot(w)
	return x / (1 + math.Sqrt(max(0, 1-g.curvature*x)))
}

// along reports whether the direction dir at p runs forward along the circle.
func (g gauge) along(p, dir involute.Vec) bool {
	inward := g.normal.Sub(p.Sub(g.from).Scale(g.curvature))
	return dir.Cross(inward) > 0
}

// pieceSamples is the number of steps at which each piece is measured.
const pieceSamples = 48

// deviation returns how far the pieces lie off the curves of the run, in mm: low
// is the farthest to the left of the way (inside the metal, negative) and high
// the farthest to the right (outside). ok is false if the pieces do not run along
// the curves at all.
//
// Why it can be trusted. Cut the curve where it crosses the normals of the
// chain at its joints. The part of the curve between two cuts starts and ends
// on the rays that bound the piece's sector, and (checked at every sample) runs
// forward round the piece's center, so all of it lies inside the sector, where
// the nearest point of the piece is the one on the same ray: the distance of a
// curve point is exactly |offset|. By continuity every ray of the sector is met,
// so each point of the piece has a curve point at some such |offset| too. The
// greatest |offset| therefore bounds both distances, and no nearest-point search
// is needed.
//
// The greatest |offset| is found at 48 steps a piece, and each peak among them is
// then closed in by golden section between its neighbors (or between an end and
// its one neighbor). A peak between samples H/48 apart on a piece of length H
// rises over both by no more than max|offset″| (H/48)²/8, offset″ being the
// difference between the curvatures, at most about |dκ/ds| H, while no arc at all
// comes closer to such a curve than |dκ/ds| H³/192: a peak that the samples did
// not show would be less than 192/(8·48²) = 1 % of what was found beside it.
// Where a piece spans the joint of two curves, each is sampled by itself.
func (r *run) deviation(pieces []piece) (low, high float64, ok bool) {
	from := 0.0
	for i, p := range pieces {
		to := r.last()
		if i+1 < len(pieces) {
			if to, ok = r.crossing(p, from); !ok {
				return 0, 0, false
			}
		}
		l, h, ok := r.offsets(newGauge(p), from, to)
		if !ok {
			return 0, 0, false
		}
		low, high = min(low, l), max(high, h)
		from = to
	}
	return low, high, true
}

// offsets returns the least and the greatest offset from a gauge of the run
// between two places, and 0 where neither is beyond it.
func (r *run) offsets(g gauge, from, to float64) (low, high float64, ok bool) {
	for a := from; a < to; {
		b := min(to, math.Floor(a)+1)
		l, h, ok := r.curveOffsets(g, a, b)
		if !ok {
			return 0, 0, false
		}
		low, high = min(low, l), max(high, h)
		a = b
	}
	return low, high, true
}

// certify measures a chain and reports whether it keeps the band.
func (r *run) certify(ch chain, b band) (chain, bool) {
	var ok bool
	ch.Low, ch.High, ok = r.deviation(ch.Pieces)
	return ch, ok && ch.keeps(b, r.size)
}

// keeps reports whether a measured chain keeps the band, up to the rounding of
// coordinates of the given size.
func (c chain) keeps(b band, size float64) bool {
	slack := 1e-14 * size
	return c.Low >= b.low-slack && c.High <= b.high+slack
}

// crossing returns the first place after low where the curve crosses the
// normal at the piece's end.
func (r *run) crossing(p piece, low float64) (place float64, ok bool) {
	_, dir := p.directions()
	past := func(place float64) float64 { return r.point(place).Sub(p.To).Dot(dir) }
	if past(low) >= 0 {
		return 0, false
	}
	// Steps of 1/256 turn far less than the quarter turn that could hide a crossing.
	const step = 1.0 / 256
	next := low
	for past(next) < 0 {
		if next >= r.last() {
			return 0, false
		}
		low, next = next, min(next+step, r.last())
	}
	place, err := involute.FindRoot(past, low, next)
	return place, err == nil
}

// curveOffsets is offsets between two places on one curve of the run; ok is false where it
// turns back.
func (r *run) curveOffsets(g gauge, a, b float64) (low, high float64, ok bool) {
	w := r.walks[int(a)]
	a, b = a-math.Floor(a), b-math.Floor(a)
	place := func(i int) float64 { return a + (b-a)*float64(i)/pieceSamples }
	off := func(u float64) float64 { return g.offset(w.point(u)) }
	var at [pieceSamples + 1]float64
	for i := range at {
		point, dir := w.pointAndDirection(place(i))
		if !g.along(point, dir) {
			return 0, 0, false
		}
		at[i] = g.offset(point)
		low, high = min(low, at[i]), max(high, at[i])
	}
	for i := range at {
		// An end that tops its only neighbor may hide a peak between the two.
		before, after := max(i-1, 0), min(i+1, pieceSamples)
		if at[i] >= at[before] && at[i] >= at[after] {
			_, peak := findMaximum(off, place(before), place(after))
			high = max(high, peak)
		}
		if at[i] <= at[before] && at[i] <= at[after] {
			_, peak := findMaximum(func(u float64) float64 { return -off(u) }, place(before), place(after))
			low = min(low, -peak)
		}
	}
	return low, high, true
}
