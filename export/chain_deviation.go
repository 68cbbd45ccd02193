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

// deviation returns the greatest distance in mm between the pieces and the
// stretch of the curve between the places a and b, both ways; +Inf if the
// pieces do not run along the curve at all.
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
func (w *walk) deviation(pieces []piece, a, b float64) float64 {
	worst := max(w.point(a).Sub(pieces[0].From).Norm(), w.point(b).Sub(pieces[len(pieces)-1].To).Norm())
	low := a
	for i, p := range pieces {
		high := b
		if i+1 < len(pieces) {
			var ok bool
			if high, ok = w.crossing(p, low, b); !ok {
				return math.Inf(1)
			}
		}
		worst = max(worst, w.pieceDeviation(p, low, high))
		low = high
	}
	return worst
}

// crossing returns the first place between low and high where the curve crosses
// the normal at the piece's end.
func (w *walk) crossing(p piece, low, high float64) (place float64, ok bool) {
	_, dir := p.directions()
	past := func(place float64) float64 { return w.point(place).Sub(p.To).Dot(dir) }
	if past(low) >= 0 {
		return 0, false
	}
	// Steps of 1/256 turn far less than the quarter turn that could hide a crossing.
	const step = 1.0 / 256
	next := low
	for past(next) < 0 {
		if next >= high {
			return 0, false
		}
		low, next = next, min(next+step, high)
	}
	place, err := involute.FindRoot(past, low, next)
	return place, err == nil
}

// pieceDeviation returns the greatest |offset| of the curve between the places a
// and b from the piece, +Inf if the curve turns back on it.
func (w *walk) pieceDeviation(p piece, a, b float64) float64 {
	g := newGauge(p)
	place := func(i int) float64 { return a + (b-a)*float64(i)/pieceSamples }
	off := func(u float64) float64 { return math.Abs(g.offset(w.point(u))) }
	var at [pieceSamples + 1]float64
	for i := range at {
		point, dir := w.pointAndDirection(place(i))
		if !g.along(point, dir) {
			return math.Inf(1)
		}
		at[i] = math.Abs(g.offset(point))
	}
	worst := 0.0
	for i := range at {
		// An end that tops its only neighbor may hide a peak between the two.
		before, after := max(i-1, 0), min(i+1, pieceSamples)
		if at[i] >= at[before] && at[i] >= at[after] {
			_, peak := findMaximum(off, place(before), place(after))
			worst = max(worst, at[i], peak)
		}
	}
	return worst
}
