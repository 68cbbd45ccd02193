package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// Straight lines instead of arcs. A chord with both ends on a curve leaves it by
// κh²/8 to one side. If its ends may lie off the curve to the other side, where the
// band ends, it can be longer: sqrt(2) times as long in a band that is as wide
// on both sides. So vertices go to the outer edge of the band where the metal is convex
// (the curve bends to the left) and to its inner edge where it is hollow, and
// each line runs as far as it keeps the band. (Near such a vertex the curve lies on
// the inside of the bend, so its nearest points are feet of perpendiculars on the
// two lines, and the offsets measured are distances.) The ends of the run stay on
// the curve.

const (
	// lineSamples is the number of steps at which a line is compared with the curve.
	lineSamples = 16

	// steepest is the cosine of the angle that a line may have with the curve, 75°.
	steepest = 0.26

	// maxLines bounds the lines of a run.
	maxLines = 100000
)

// vertex returns the end of lines at a place.
func (r *run) vertex(place float64, b band) involute.Vec {
	switch {
	case place <= 0:
		return r.start.point
	case place >= r.last():
		return r.stop.point
	}
	p, dir := r.pointAndDirection(place)
	return p.Sub(dir.Left().Scale(r.level(place, b))) // the outside is to the right
}

// level returns how far outside of the curve the vertex at a place lies: at the
// edge of the band, but no farther than a little over the tangents at the ends of the
// run, beyond which a vertex near an end would only make a steep line.
func (r *run) level(place float64, b band) float64 {
	const over = 1.1
	w, u := r.at(place)
	p, dir := w.pointAndDirection(u)
	most := math.Inf(1)
	for _, end := range [...]float64{0, r.last()} {
		w, u := r.at(end)
		q, tangent := w.pointAndDirection(u)
		if cos := tangent.Dot(dir); cos > 0 {
			most = min(most, over*math.Abs(tangent.Cross(p.Sub(q)))/cos)
		}
	}
	if w.curve.Curvature(w.parameter(u)) < 0 {
		return max(b.low, -most)
	}
	return min(b.high, most)
}

// lineFits reports whether the line between the vertices at two places keeps the
// band, and at its peaks a margin from its edges (mm): both judged by the
// parabolas through each three samples of the offset.
func (r *run) lineFits(from, to float64, b band, margin float64) bool {
	line := piece{From: r.vertex(from, b), To: r.vertex(to, b)}
	dir, _ := line.directions()
	_, leaves := r.pointAndDirection(from)
	_, arrives := r.pointAndDirection(to)
	if !(dir.Dot(leaves) > steepest && dir.Dot(arrives) > steepest) {
		return false
	}
	g := newGauge(line)
	slack := 0.5e-14 * r.size
	var at [lineSamples + 1]float64
	for i := range at {
		at[i] = g.offset(r.point(from + (to-from)*float64(i)/lineSamples))
		if !(at[i] >= b.low-slack && at[i] <= b.high+slack) {
			return false
		}
		if i < 2 {
			continue
		}
		rise, bend := (at[i]-at[i-2])/2, at[i]-2*at[i-1]+at[i-2]
		if math.Abs(rise) >= 1.2*math.Abs(bend) || math.Abs(bend) < slack {
			continue // its vertex lies well beyond the three
		}
		if i == 2 && r.startsLevel(from) || i == lineSamples && r.startsLevel(to) {
			continue
		}
		top := at[i-1] - rise*rise/(2*bend)
		if bend > 0 && top < b.low+margin || bend < 0 && top > b.high-margin {
			return false
		}
	}
	return true
}

// startsLevel reports whether a place is an end of the run at which the curve
// starts out of a point of boundless curvature, as an involute does on its base
// circle: its offset from a line starts level there, which is no peak.
func (r *run) startsLevel(place float64) bool {
	if place > 0 && place < r.last() {
		return false
	}
	const boundless = 1e6
	w, u := r.at(place)
	return math.Abs(w.curve.Curvature(w.parameter(u)))*w.length > boundless
}

// farthest returns the farthest place from at, toward goal, to which one line
// can run; step is how far it is expected to be, which may be wrong.
func (r *run) farthest(at, goal, step float64, fits func(from, to float64) bool) float64 {
	ahead := func(step float64) float64 {
		if goal < at {
			return max(at-step, goal)
		}
		return min(at+step, goal)
	}
	for ; !fits(at, ahead(step)); step /= 2 {
		if ahead(step) == at {
			return at
		}
	}
	for ahead(step) != goal && fits(at, ahead(2*step)) {
		step *= 2
	}
	low, high := ahead(step), ahead(2*step)
	for range 16 {
		if mid := (low + high) / 2; fits(at, mid) {
			low = mid
		} else {
			high = mid
		}
	}
	return low
}

// reachLines returns the places of the vertices of lines of which each runs as
// far as it keeps the band and the margin. (The last but one ends half way
// between what it reaches and what the last one can do, so that no stub is left.)
func (r *run) reachLines(b band, margin float64) ([]float64, error) {
	end := r.last()
	forward := func(from, to float64) bool { return r.lineFits(from, to, b, margin) }
	last := r.farthest(end, 0, end, func(from, to float64) bool { return r.lineFits(to, from, b, margin) })
	places := []float64{0}
	at, step := 0.0, end
	for last > 0 {
		to := r.farthest(at, end, step, forward)
		if to == at || len(places) > maxLines {
			return nil, fmt.Errorf("%d straight lines do not bring the curve within %.3g mm: the tolerance is too fine for it", len(places), max(b.high, -b.low))
		}
		if to >= end {
			break
		}
		done := to >= last
		if done {
			to = (to + max(last, at)) / 2
		}
		step, at = to-at, to
		places = append(places, at)
		if done {
			break
		}
	}
	return append(places, end), nil
}

// lines returns lines that keep the band. Where they do not quite, since peaks
// were not quite parabolas, they are sought again with more margin; where the
// tolerance is so coarse that lines no longer run along the curve, with half of it.
func (r *run) lines(b band) (chain, error) {
	for wide := 1.0; wide > 1e-3; wide /= 2 {
		b := band{wide * b.low, wide * b.high}
		for share := 0.001; share < 0.5; share *= 2 {
			places, err := r.reachLines(b, share*b.half())
			if err != nil {
				return chain{}, err
			}
			places = r.apart(places, b)
			r.evenOut(places)
			if ch, ok := r.lineChain(places, b); ok && ch.keeps(b, r.size) {
				return ch, nil
			}
		}
	}
	return chain{}, fmt.Errorf("straight lines do not keep along the curve within %.3g mm", max(b.high, -b.low))
}

// apart leaves out places whose vertices lie closer together than a curve that is kept.
func (r *run) apart(places []float64, b band) []float64 {
	out := places[:1]
	for _, place := range places[1:] {
		last := len(out) - 1
		if r.vertex(place, b).Sub(r.vertex(out[last], b)).Norm() >= negligible {
			out = append(out, place)
		} else if last > 0 && place >= r.last() {
			out[last] = place // the end stays
		}
	}
	return out
}

// evenOut makes the places symmetric where the run is its own mirror image, as the lands are.
func (r *run) evenOut(places []float64) {
	if !r.mirrors(r, (r.start.point.Angle()+r.stop.point.Angle())/2) {
		return
	}
	n := len(places) - 1
	for i := 0; i <= n-i; i++ {
		first, last := places[i], r.last()-places[n-i]
		places[i] = (first + last) / 2
		places[n-i] = r.last() - places[i]
	}
}

// evenLines returns as many lines as lines does, in the narrowest band they keep.
func (r *run) evenLines(b band) (chain, error) {
	best, err := r.lines(b)
	if err != nil {
		return best, err
	}
	for low, high := 0.2, 1.0; high-low > 0.01; {
		mid := (low + high) / 2
		ch, err := r.lines(band{mid * b.low, mid * b.high})
		if err == nil && len(ch.Pieces) == len(best.Pieces) {
			best, high = ch, mid
		} else {
			low = mid
		}
	}
	return best, nil
}

// lineChain returns the lines between vertices at the places, measured.
func (r *run) lineChain(places []float64, b band) (chain, bool) {
	ch := chain{Counts: make([]int, len(r.walks))}
	for i := 1; i < len(places); i++ {
		p := piece{From: r.vertex(places[i-1], b), To: r.vertex(places[i], b)}
		ch.Pieces = append(ch.Pieces, p)
		ch.Counts[min(int(places[i-1]), len(r.walks)-1)]++
		low, high, ok := r.offsets(newGauge(p), places[i-1], places[i])
		if !ok {
			return ch, false
		}
		ch.Low, ch.High = min(ch.Low, low), max(ch.High, high)
		if i < len(places)-1 { // the vertex itself
			level := r.level(places[i], b)
			ch.Low, ch.High = min(ch.Low, level), max(ch.High, level)
		}
	}
	return ch, true
}

// linesNeeded returns how many straight lines the whole path takes, within less of the
// tolerance where they cannot keep the whole, as in closedPath; 0 where they cannot at all.
func (p *pitch) linesNeeded(sections []section, o FitOptions) int {
	for _, share := range append([]float64{1}, closerShares()...) {
		closer := o
		closer.Tolerance *= share
		chains, err := p.chains(sections, func(_ section, r *run) (chain, error) { return r.lines(closer.band()) })
		if err == nil {
			return p.countLines(sections, chains)
		}
	}
	return 0
}

// countLines returns how many lines chains of lines make of the whole path.
func (p *pitch) countLines(sections []section, chains []chain) int {
	sum := 0
	for _, ch := range chains {
		sum += len(ch.Pieces)
	}
	halved := 0
	if p.startsInMiddle(sections, 0) {
		halved = len(chains[0].Pieces) % 2 // the path starts in the middle of one
	}
	return p.count*sum + halved
}
