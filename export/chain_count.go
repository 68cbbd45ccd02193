package export

import (
	"fmt"
	"math"
	"sort"
)

const (
	// maxArcs bounds the search: a run that asks for more is refused.
	maxArcs = 4000

	// maxStrips bounds the last resort.
	maxStrips = maxArcs / 2
)

// fit returns the chain of fewest arcs that keeps the band.
func (r *run) fit(b band, minArc float64) (chain, error) {
	tolerance := max(b.high, -b.low)
	if least := finestTolerance * r.size; tolerance < least {
		return chain{}, fmt.Errorf("tolerance %.3g mm is finer than coordinates of this size carry: at least %.2g mm", tolerance, least)
	}
	tooFine := fmt.Errorf("%d arcs do not bring the curve within %.3g mm: the tolerance is too fine for it", maxArcs, tolerance)
	if r.work()*chainReach > maxArcs*math.Cbrt(b.half()) {
		return chain{}, tooFine
	}
	if ch, ok := r.fitFewest(b, minArc); ok {
		return ch, nil
	}
	if ch, ok := r.fitBroken(b, minArc); ok {
		return ch, nil
	}
	if ch, ok := r.strips(b); ok {
		return ch, nil
	}
	return chain{}, tooFine
}

// fitFewest tries numbers of arcs in the order of their sum, and of equal sums
// the one first that is nearest to what the pattern asks for. With a shortest arc
// asked for, it looks among the chains of the fewest arcs for one that has
// none shorter; if there is none, the tolerance wins.
func (r *run) fitFewest(b band, minArc float64) (best chain, ok bool) {
	for _, arcs := range r.counts(b) {
		if ok && total(arcs) > len(best.Pieces) {
			break
		}
		if !ok {
			if best, ok = newFitting(r, arcs, b, 0).search(); ok && best.shortest() >= minArc {
				break
			}
		}
		if ok {
			if ch, longer := newFitting(r, arcs, b, minArc).search(); longer {
				return ch, true
			}
		}
	}
	return best, ok
}

// fitBroken keeps the kinks of a run as corners and fits what lies between them.
func (r *run) fitBroken(b band, minArc float64) (all chain, ok bool) {
	parts := r.brokenAtKinks()
	if len(parts) < 2 {
		return all, false
	}
	for i, part := range parts {
		ch, ok := part.fitFewest(b, minArc)
		if !ok {
			return all, false
		}
		if i > 0 {
			all.Corners = append(all.Corners, len(all.Pieces))
		}
		all.Pieces, all.Counts = append(all.Pieces, ch.Pieces...), append(all.Counts, ch.Counts...)
		all.Low, all.High = min(all.Low, ch.Low), max(all.High, ch.High)
	}
	return all, true
}

// total returns the sum of the numbers.
func total(arcs []int) int {
	sum := 0
	for _, n := range arcs {
		sum += n
	}
	return sum
}

// shortest returns the length of the shortest piece, mm.
func (c chain) shortest() float64 {
	least := math.Inf(1)
	for _, p := range c.Pieces {
		least = min(least, p.length())
	}
	return least
}

// extraArcs is how many more arcs than the pattern's are tried on each curve, and
// kinkArcs how many more yet where the run has kinks to go round.
const (
	extraArcs = 2
	kinkArcs  = 2
)

// counts returns the numbers of arcs, for each curve of the run, that may keep
// the band, in the order in which they are to be tried.
func (r *run) counts(b band) [][]int {
	var least []int
	var want []float64
	all := [][]int{nil}
	extra := extraArcs
	if len(r.brokenAtKinks()) > 1 {
		extra += kinkArcs
	}
	for _, w := range r.walks {
		share := w.work() / math.Cbrt(b.half())
		want = append(want, chainReach*share)
		// Few arcs are judged by what even loose arcs need, many by the pattern's law.
		least = append(least, max(1, int(math.Ceil(max(0.95*looseReach*share, chainReach*share-0.6)))))
		var longer [][]int
		for _, arcs := range all {
			for n := least[len(least)-1]; n <= int(chainReach*share)+1+extra; n++ {
				longer = append(longer, append(append([]int(nil), arcs...), n))
			}
		}
		all = longer
	}
	// The curve that is shortest of arcs decides.
	lack := func(arcs []int) float64 {
		most := math.Inf(-1)
		for i, n := range arcs {
			most = max(most, want[i]-float64(n))
		}
		return most
	}
	sort.SliceStable(all, func(i, j int) bool {
		ni, nj := total(all[i]), total(all[j])
		return ni < nj || ni == nj && lack(all[i]) < lack(all[j])
	})
	return all
}
