package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// From a tooth's exact curves to the arcs that a machine runs. Read, in this order:
//
//   - chain_piece.go: one line or arc between two points, told by its bulge
//   - chain_walk.go: the curve to be fitted (a flank, a fillet), walked at an even pace
//   - chain_biarc.go and chain_triarc.go: two or three arcs over a stretch of it, a strip
//   - chain_deviation.go: how far arcs and curve lie apart, and why that is certain
//   - chain.go, here: strips dealt out over the whole curve, with the fewest arcs
//   - chain_path.go: the chains of one pitch, repeated round the gear to its contour

// A chain is a curve written as arcs and lines that meet end to end without a
// corner: piece i+1 starts where piece i ends, in the same direction.
type chain struct {
	Pieces []piece
	// MaxDeviation is the greatest distance in mm between chain and curve, both
	// ways: no point of the one is farther than this from the other. It is
	// measured on the finished chain (see walk.deviation), not assumed.
	MaxDeviation float64
}

const (
	// maxSweep is the most one arc turns: 85°, so that no rounding lifts an arc
	// over the quarter turn at which old controls divide circles.
	maxSweep = 85 * math.Pi / 180

	// straightBulge is the bulge below which an arc is written as its chord:
	// tan(sweep/4) of an arc 10 000 times as large in radius as long. The chord
	// turns off the arc's ends by half the sweep, 0.003°, so that even two
	// chords in a row keep their joint under 0.01°; the distance between chord
	// and curve is measured like any other.
	straightBulge = 0.25e-4

	// maxArcs bounds the search: a curve that asks for more is refused.
	maxArcs = 4000

	// finestTolerance is the smallest tolerance taken, as a share of the curve's
	// size: coordinates carry 2.2e-16 of themselves and the measured deviation
	// some ten times that, so 1e-10 leaves five digits of the tolerance.
	finestTolerance = 1e-10
)

// fitArcs returns a chain of arcs that stays within tolerance (mm, on both
// sides) of the curve, starts and ends exactly on its ends and in its
// direction there, and has no corner inside. Lines and arcs pass as they are
// (an arc over 85° in equal parts).
//
// Other curves become strips of two or three arcs that take up point and
// direction of the curve at both ends of a stretch (biarcs: Meek and Walton, J.
// Comput. Appl. Math. 59, 1995). Strips deviate with the cube of their length, so
// their joints are moved until all deviate alike, with the fewest arcs that keep
// the tolerance. A curve whose curvature has an extreme is tried both in one run
// and cut there, since arcs follow rising or falling curvature best.
//
// An error is returned for a tolerance that is not a positive number or is
// beyond the precision of coordinates, and for a curve without length or with
// a point that is not finite.
func fitArcs(c involute.Curve, tolerance float64) (chain, error) {
	if !positive(tolerance) {
		return chain{}, fmt.Errorf("fit arcs: tolerance %g mm: must be a length above 0", tolerance)
	}
	switch c := plain(c).(type) {
	case involute.Line:
		return exactLine(c)
	case involute.Arc:
		return exactArc(c)
	}
	w, err := newWalk(c)
	if err != nil {
		return chain{}, fmt.Errorf("fit arcs: %w", err)
	}
	if least := finestTolerance * w.size; tolerance < least {
		return chain{}, fmt.Errorf("fit arcs: tolerance %g mm is finer than coordinates of this size carry: at least %.2g mm", tolerance, least)
	}
	best, err := w.fitBetween([]float64{0, 1}, tolerance)
	if cuts := w.extremes(); len(cuts) > 0 {
		stops := append(append([]float64{0}, cuts...), 1)
		cut, cutErr := w.fitBetween(stops, tolerance)
		if cutErr == nil && (err != nil || len(cut.Pieces) < len(best.Pieces)) {
			best, err = cut, nil
		}
	}
	if err != nil {
		return chain{}, fmt.Errorf("fit arcs: %w", err)
	}
	return best, nil
}

// exactLine returns a line as the chain of one piece that it is.
func exactLine(l involute.Line) (chain, error) {
	if length := l.To.Sub(l.From).Norm(); !positive(length) {
		return chain{}, fmt.Errorf("fit arcs: a line of length %g mm: must be above 0", length)
	}
	return chain{Pieces: []piece{{From: l.From, To: l.To}}}, nil
}

// exactArc returns an arc as itself, in equal parts if it turns by more than maxSweep.
func exactArc(a involute.Arc) (chain, error) {
	if length := a.Radius * math.Abs(a.Sweep); !positive(length) {
		return chain{}, fmt.Errorf("fit arcs: an arc of radius %g mm and sweep %g rad: both must be numbers other than 0", a.Radius, a.Sweep)
	}
	if turns := math.Abs(a.Sweep) / (2 * math.Pi); turns > 1+1e-12 {
		return chain{}, fmt.Errorf("fit arcs: an arc of %.3g turns: at most one", turns)
	}
	parts := int(math.Ceil(math.Abs(a.Sweep) / maxSweep))
	bulge := math.Tan(a.Sweep / float64(parts) / 4)
	var ch chain
	from, _ := a.At(0)
	for i := 1; i <= parts; i++ {
		to, _ := a.At(float64(i) / float64(parts))
		ch.Pieces = append(ch.Pieces, piece{From: from, To: to, Bulge: bulge})
		from = to
	}
	return ch, nil
}

// fitBetween returns a chain of strips that passes through every stop (places
// on the walk, from 0 to 1) with the curve's direction there.
func (w *walk) fitBetween(stops []float64, tolerance float64) (chain, error) {
	var all chain
	for i := 1; i < len(stops); i++ {
		ch, err := w.fitRun(stops[i-1], stops[i], tolerance)
		if err != nil {
			return chain{}, err
		}
		all.Pieces = append(all.Pieces, ch.Pieces...)
		all.MaxDeviation = max(all.MaxDeviation, ch.MaxDeviation)
	}
	return all, nil
}

// fitRun returns the fewest arcs, in strips that are evenly good, between the places a and b.
func (w *walk) fitRun(a, b, tolerance float64) (chain, error) {
	for n := 2; n <= maxArcs; {
		strips, worst := w.spread(a, b, n, tolerance)
		// Measured only where the samples say that it can hold.
		if worst <= tolerance {
			var ch chain
			for _, x := range strips {
				ch.Pieces = append(ch.Pieces, x.pieces...)
			}
			ch.MaxDeviation = w.deviation(ch.Pieces, a, b)
			if ch.MaxDeviation <= tolerance {
				return ch, nil
			}
		}
		// The deviation falls with the cube of the number; 0.7 keeps the step from overshooting.
		n = max(n+1, int(0.7*float64(n)*math.Cbrt(worst/tolerance)))
	}
	return chain{}, fmt.Errorf("%d arcs do not bring the curve within %g mm: the tolerance is too fine for it", maxArcs, tolerance)
}

// reach is the length a strip of 2 or 3 arcs covers at deviation ε on a curve
// whose curvature changes by κ' per mm, in units of (ε/|κ'|)^(1/3): the cube
// roots of the 324 of a biarc and of 1668, both worked out by hand from the
// cubic by which curve and chain then differ.
func reach(arcs int) float64 {
	if arcs == 2 {
		return 6.868
	}
	return 11.86
}

// spread returns strips of n arcs in all between a and b, as many as can be of
// three arcs (which reach farther than one and a half biarcs) and the rest of
// two, with deviations made as even as can be, and the worst deviation. A
// strip's deviation grows with the cube of its length, so cbrt(deviation)·reach
// is the work its stretch holds, and new joints deal the work out by reach.
func (w *walk) spread(a, b float64, n int, tolerance float64) ([]strip, float64) {
	const rounds = 8
	arcs := stripArcs(n)
	shares := make([]float64, len(arcs))
	joints := []float64{a}
	total := 0.0
	for i := range arcs {
		shares[i] = reach(arcs[i])
		total += shares[i]
	}
	for i := range shares {
		shares[i] /= total
		joints = append(joints, joints[i]+shares[i]*(b-a))
	}
	joints[len(arcs)] = b
	var best []strip
	worst := math.Inf(1)
	for range rounds {
		strips := make([]strip, len(arcs))
		work := make([]float64, len(arcs))
		top, least := 0.0, math.Inf(1)
		for i := range strips {
			if arcs[i] == 2 {
				strips[i] = w.bestBiarc(joints[i], joints[i+1], tolerance)
			} else {
				strips[i] = w.bestTriarc(joints[i], joints[i+1], tolerance)
			}
			top, least = max(top, strips[i].cost), min(least, strips[i].cost)
		}
		if top < worst {
			best, worst = strips, top
		}
		if least >= 0.97*top {
			break
		}
		for i := range work {
			// A stretch that is a circle costs nothing, but no stretch may shrink to nothing.
			work[i] = shares[i] * math.Cbrt(max(strips[i].cost, 1e-6*top))
		}
		joints = dealOut(joints, work, shares)
	}
	return best, worst
}

// stripArcs divides n ≥ 2 arcs into strips of three and, where that does not go up, of two.
func stripArcs(n int) []int {
	var arcs []int
	for ; n > 4 || n == 3; n -= 3 {
		arcs = append(arcs, 3)
	}
	for ; n > 0; n -= 2 {
		arcs = append(arcs, 2)
	}
	return arcs
}

// dealOut returns joints between which stretch i holds its share of all the
// work, which is taken to lie evenly within each old stretch.
func dealOut(old, work, shares []float64) []float64 {
	n := len(work)
	total := 0.0
	for _, x := range work {
		total += x
	}
	joints := append([]float64(nil), old...)
	k, below, goal := 0, 0.0, 0.0 // old stretch k begins after the work below
	for i := 1; i < n; i++ {
		goal += shares[i-1] * total
		for k < n-1 && below+work[k] < goal {
			below += work[k]
			k++
		}
		part := min(1, (goal-below)/work[k])
		joints[i] = old[k] + part*(old[k+1]-old[k])
	}
	return joints
}
