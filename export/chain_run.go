package export

import (
	"math"

	"flankwright/involute"
)

// A run is what a chain of arcs has to follow in one go: the curves between two
// exact pieces (lines and arcs of the outline) or corners, such as a fillet and
// the flank above it. Places run from 0 to the number of curves: place 1.25 is a
// quarter along the second.
type run struct {
	walks       []*walk
	start, stop runEnd
	size        float64 // greatest coordinate, mm
}

// A runEnd is what the chain meets at one end of a run.
type runEnd struct {
	point involute.Vec
	dir   involute.Vec // in which the chain must run there, unless it is free to choose
	free  bool         // a corner: any direction will do
}

// newRun returns the run over curves that follow one another.
func newRun(walks []*walk, start, stop runEnd) *run {
	r := &run{walks: walks, start: start, stop: stop}
	for _, w := range walks {
		r.size = max(r.size, w.size)
	}
	return r
}

// at returns the curve a place lies on and the place on it.
func (r *run) at(place float64) (*walk, float64) {
	i := min(max(int(place), 0), len(r.walks)-1)
	return r.walks[i], place - float64(i)
}

// point returns the point at a place.
func (r *run) point(place float64) involute.Vec {
	w, u := r.at(place)
	return w.point(u)
}

// pointAndDirection returns the point and the unit direction at a place.
func (r *run) pointAndDirection(place float64) (p, dir involute.Vec) {
	w, u := r.at(place)
	return w.pointAndDirection(u)
}

// last returns the place where the run ends.
func (r *run) last() float64 { return float64(len(r.walks)) }

// length returns the length of all curves, mm.
func (r *run) length() float64 {
	sum := 0.0
	for _, w := range r.walks {
		sum += w.length
	}
	return sum
}

// work returns the work of all curves, mm^(1/3).
func (r *run) work() float64 {
	sum := 0.0
	for _, w := range r.walks {
		sum += w.work()
	}
	return sum
}

// smooth is the turn between two curves of a run that counts for none, radians.
const smooth = 1e-6

// brokenAtKinks returns the runs between the joints at which the curves turn.
func (r *run) brokenAtKinks() []*run {
	var out []*run
	first, start := 0, r.start
	for i := 1; i < len(r.walks); i++ {
		p, before := r.walks[i-1].pointAndDirection(1)
		q, after := r.walks[i].pointAndDirection(0)
		if math.Abs(turn(before, after)) < smooth {
			continue
		}
		out = append(out, newRun(r.walks[first:i], start, runEnd{p, before, true}))
		first, start = i, runEnd{q, after, true}
	}
	return append(out, newRun(r.walks[first:], start, r.stop))
}
