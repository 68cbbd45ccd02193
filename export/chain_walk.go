package export

import (
	"fmt"
	"math"
	"sort"

	"flankwright/involute"
)

// A walk is a curve with an even pace: places run from 0 to 1, and equal steps
// of the place hold about as much of what makes a curve hard to follow. Half of
// the pace is the work ∫|κ'|^(1/3) ds, by which arcs are dealt out (see
// chain_pattern.go); a quarter each are length and turning, so that the walk does
// not stall where the curvature has an extreme.
type walk struct {
	curve    involute.Curve
	t, place []float64 // knots; t is taken as linear in the place between them
	works    []float64 // work up to each knot, mm^(1/3)
	length   float64   // mm
	turning  float64   // sum of the absolute turning, radians
	size     float64   // greatest coordinate, mm
}

// A knot of the walk is added wherever a step turns by more than walkTurn or
// is longer than 1/walkSteps of the whole.
const (
	walkSteps  = 96
	walkTurn   = 2 * math.Pi / 180
	walkDepths = 20 // times that a step of the parameter may be halved
)

// newWalk measures the curve out.
func newWalk(c involute.Curve) (*walk, error) {
	t0, t1 := c.Domain()
	if !(t0 < t1) || !finite(t0, t1) {
		return nil, fmt.Errorf("a curve over the parameters %g to %g: must be finite and rising", t0, t1)
	}
	w := &walk{curve: c, t: []float64{t0}}
	for i := 1; i <= walkSteps; i++ {
		share := float64(i) / walkSteps
		w.refine(w.t[len(w.t)-1], t0*(1-share)+t1*share, walkDepths)
	}
	w.t[len(w.t)-1] = t1
	if err := w.measure(); err != nil {
		return nil, err
	}
	return w, nil
}

// refine adds knots between the parameters a (already there) and b, and b itself.
func (w *walk) refine(a, b float64, depth int) {
	if mid := (a + b) / 2; depth > 0 && mid != a && mid != b &&
		math.Abs(turn(w.direction(a), w.direction(b))) > walkTurn {
		w.refine(a, mid, depth-1)
		w.refine(mid, b, depth-1)
		return
	}
	w.t = append(w.t, b)
}

// measure sums length, turning and work from knot to knot and sets the places.
func (w *walk) measure() error {
	n := len(w.t)
	steps, turns := make([]float64, n), make([]float64, n)
	var before, dirBefore involute.Vec
	for i, t := range w.t {
		p, _ := w.curve.At(t)
		dir := w.direction(t)
		if !finite(p.X + p.Y + dir.X + dir.Y) {
			return fmt.Errorf("a curve whose point or direction at parameter %g is not a finite number", t)
		}
		if i > 0 {
			steps[i] = p.Sub(before).Norm()
			turns[i] = math.Abs(turn(dirBefore, dir))
		}
		w.length += steps[i]
		w.turning += turns[i]
		w.size = max(w.size, math.Abs(p.X), math.Abs(p.Y))
		before, dirBefore = p, dir
	}
	if !(w.length > 1e-12*w.size) {
		return fmt.Errorf("a curve of length %g mm: too short to fit", w.length)
	}
	w.measureWork(steps, turns)
	w.place = make([]float64, n)
	for i := 1; i < n; i++ {
		w.place[i] = w.place[i-1] + steps[i]/w.length
		if w.turning > 0 {
			w.place[i] += turns[i] / w.turning
		}
		if all := w.work(); all > 0 {
			w.place[i] += 2 * (w.works[i] - w.works[i-1]) / all
		}
	}
	for i, end := 0, w.place[n-1]; i < n; i++ {
		w.place[i] /= end
	}
	return nil
}

// measureWork sums |κ'|^(1/3) ds = |Δκ|^(1/3) Δs^(2/3) over the knots. Where an
// involute leaves its base circle the curvature is not finite; there the change is
// taken as twice the mean curvature of the step, which gives the involute's work
// r_b^(1/3) Δt exactly.
func (w *walk) measureWork(steps, turns []float64) {
	w.works = make([]float64, len(w.t))
	for i := 1; i < len(w.t); i++ {
		change := math.Abs(w.curve.Curvature(w.t[i]) - w.curve.Curvature(w.t[i-1]))
		if most := 2 * turns[i] / steps[i]; !(change < most) {
			change = most
		}
		w.works[i] = w.works[i-1] + math.Cbrt(change*steps[i]*steps[i])
	}
}

// work returns ∫|κ'|^(1/3) ds over the whole curve, mm^(1/3).
func (w *walk) work() float64 { return w.works[len(w.works)-1] }

// direction returns the curve's unit direction at parameter t. Where the
// derivative vanishes (an involute at its base circle) it is the limit from
// inside, extrapolated from two points close by.
func (w *walk) direction(t float64) involute.Vec {
	unit := func(t float64) (involute.Vec, bool) {
		_, dp := w.curve.At(t)
		n := dp.Norm()
		return dp.Scale(1 / n), n > 0
	}
	if d, ok := unit(t); ok {
		return d
	}
	t0, t1 := w.curve.Domain()
	h := 1e-6 * (t1 - t0)
	if t+2*h > t1 {
		h = -h
	}
	near, _ := unit(t + h)
	far, _ := unit(t + 2*h)
	d := near.Scale(2).Sub(far)
	return d.Scale(1 / d.Norm())
}

// between returns the value of ys where xs (rising) comes to x, linear between knots.
func between(xs, ys []float64, x float64) float64 {
	i := sort.SearchFloat64s(xs, x)
	if i == 0 {
		return ys[0]
	}
	if i == len(xs) {
		return ys[len(ys)-1]
	}
	share := (x - xs[i-1]) / (xs[i] - xs[i-1])
	return ys[i-1]*(1-share) + ys[i]*share
}

// parameter returns the curve's parameter at a place.
func (w *walk) parameter(place float64) float64 { return between(w.place, w.t, place) }

// point returns the curve's point at a place.
func (w *walk) point(place float64) involute.Vec {
	p, _ := w.curve.At(w.parameter(place))
	return p
}

// pointAndDirection returns the curve's point and unit direction at a place.
func (w *walk) pointAndDirection(place float64) (p, dir involute.Vec) {
	t := w.parameter(place)
	p, _ = w.curve.At(t)
	return p, w.direction(t)
}

// placeAtWork returns the place up to which the curve holds the given share of its work.
func (w *walk) placeAtWork(share float64) float64 {
	if !(w.work() > 0) {
		return share
	}
	return between(w.works, w.place, share*w.work())
}
