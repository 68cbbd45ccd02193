package export

import (
	"fmt"
	"math"
	"sort"

	"flankwright/involute"
)

// A walk is a curve with an even pace: places run from 0 to 1, and equal steps
// of the place make about equal progress, half of it counted in length and
// half in turning. Whatever parameter a curve is given in, samples at equal
// steps then neither rush through its tight parts nor linger at one end.
type walk struct {
	curve    involute.Curve
	t, place []float64 // knots; t is taken as linear in the place between them
	length   float64   // mm
	turning  float64   // sum of the absolute turning, radians
	size     float64   // greatest coordinate, mm
	chords   float64   // ∫ sqrt(|κ|/8) ds: over sqrt(tolerance) the chords that would be needed
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

// measure sums length and turning from knot to knot and sets the places.
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
			w.chords += math.Sqrt(steps[i] * turns[i] / 8)
		}
		w.length += steps[i]
		w.turning += turns[i]
		w.size = max(w.size, math.Abs(p.X), math.Abs(p.Y))
		before, dirBefore = p, dir
	}
	if !(w.length > 1e-12*w.size) {
		return fmt.Errorf("a curve of length %g mm: too short to fit", w.length)
	}
	w.place = make([]float64, n)
	for i := 1; i < n; i++ {
		w.place[i] = w.place[i-1] + steps[i]/w.length
		if w.turning > 0 {
			w.place[i] += turns[i] / w.turning
		}
	}
	for i, end := 0, w.place[n-1]; i < n; i++ {
		w.place[i] /= end
	}
	return nil
}

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

// parameter returns the curve's parameter at a place.
func (w *walk) parameter(place float64) float64 {
	i := sort.SearchFloat64s(w.place, place)
	if i == 0 {
		return w.t[0]
	}
	if i == len(w.place) {
		return w.t[len(w.t)-1]
	}
	share := (place - w.place[i-1]) / (w.place[i] - w.place[i-1])
	return w.t[i-1]*(1-share) + w.t[i]*share
}

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

// extremes returns the places inside the walk where the curvature has a
// maximum or minimum. Ripples below a millionth of the greatest curvature are
// taken for rounding.
func (w *walk) extremes() []float64 {
	at := func(place float64) float64 { return w.curve.Curvature(w.parameter(place)) }
	ks := make([]float64, len(w.place))
	greatest := 0.0
	for i, t := range w.t {
		ks[i] = w.curve.Curvature(t)
		if a := math.Abs(ks[i]); a > greatest && !math.IsInf(a, 0) {
			greatest = a
		}
	}
	var out []float64
	top, sense := 0, 0.0 // the latest extreme knot and whether curvature rises (+1) or falls to it
	for i := 1; i < len(ks); i++ {
		change := ks[i] - ks[top]
		switch {
		case change*sense > 0 || sense == 0 && math.Abs(change) > 1e-6*greatest:
			if sense == 0 {
				sense = math.Copysign(1, change)
			}
			top = i
		case sense != 0 && math.Abs(change) > 1e-6*greatest:
			if top > 0 {
				peak, _ := findMaximum(func(u float64) float64 { return sense * at(u) }, w.place[top-1], w.place[top+1])
				out = append(out, peak)
			}
			sense, top = -sense, i
		}
	}
	return out
}
