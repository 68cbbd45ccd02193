package export

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"

	"flankwright/involute"
)

// A Section is a gear known by nothing but a closed contour: what was read back
// from a file. It is measured with the geometry of lines and arcs alone.
//
//   - here: over pins
//   - readback_distance.go: how far a point is from a side of a tooth
//   - readback_flank.go: where flanks, teeth and spaces are
//   - readback_span.go: span over teeth
//   - readback_limits.go: least and greatest radius, area, joints
//   - readback_even.go: every tooth against the first
//   - readback_shape.go: against the exact profile
//   - roll.go: two sections rolled through a pitch
type Section struct {
	path   Path             // counter-clockwise
	curves []involute.Curve // of the path, in its order
	pieces []placed         // the same, by polar angle
	flanks []flank          // in the order of the path: up, down, up, down, …
	spaces []float64        // polar angles of the middles of the tooth spaces, ascending
	least  float64          // smallest and largest radius, mm
	most   float64
	twist  float64 // turn per mm of face of a helical gear, radians
}

// NewSection takes a contour apart: it finds the tooth spaces where the path
// crosses the circle halfway between root and tip. lead is a helical gear's
// lead in mm, 0 for a spur gear.
func NewSection(p Path, lead float64) (Section, error) {
	s := Section{path: p.counterClockwise(), least: math.Inf(1)}
	if lead != 0 {
		s.twist = 2 * math.Pi / math.Abs(lead)
	}
	for i := range s.path.Vertices {
		c := s.path.Curve(i)
		s.curves = append(s.curves, c)
		s.pieces = append(s.pieces, newPlaced(c))
		near, far := reachFrom(involute.Vec{}, c)
		s.least, s.most = min(s.least, near), max(s.most, far)
	}
	slices.SortStableFunc(s.pieces, func(a, b placed) int { return cmp.Compare(a.angle, b.angle) })
	return s, s.findFlanks()
}

// Teeth returns the number of teeth counted on the contour.
func (s Section) Teeth() int { return len(s.spaces) }

// helicalPairs is how many pairs of spaces are measured on a helical gear, where
// each takes a search in space; on a spur gear all are.
const helicalPairs = 2

// OverPins pushes a pin (a ball where the gear is helical) into tooth spaces
// until it rests on both sides, and returns the least and greatest distance
// over two pins in spaces nearest to opposite.
func (s Section) OverPins(pin float64) (least, greatest float64, err error) {
	z := len(s.spaces)
	if z < 2 {
		return 0, 0, errors.New("contour: fewer than two tooth spaces")
	}
	pairs := z
	if s.twist != 0 {
		pairs = min(z, helicalPairs)
	}
	centers := map[int]involute.Vec{}
	at := func(k int) (involute.Vec, error) {
		k %= z
		if c, ok := centers[k]; ok {
			return c, nil
		}
		c, err := s.rest(s.spaces[k], pin)
		centers[k] = c
		return c, err
	}
	least = math.Inf(1)
	for k := range pairs {
		a, err := at(k)
		if err != nil {
			return 0, 0, err
		}
		b, err := at(k + z/2)
		if err != nil {
			return 0, 0, err
		}
		m := a.Sub(b).Norm() + pin
		least, greatest = min(least, m), max(greatest, m)
	}
	return least, greatest, nil
}

// rest returns the center of a pin that rests on both sides of the space about
// the polar angle space: for each radius the angle at which both sides are
// equally far, and the radius at which that is half the pin.
func (s Section) rest(space, pin float64) (involute.Vec, error) {
	left, right := s.sides(space)
	width := math.Pi / float64(len(s.spaces))
	// The middle of the space is where both sides are equally near; with a true
	// contour that is its center line, and never a quarter of the width away. (It is
	// sought as a polar angle: a turn of 0 would be sought to digits that are none.)
	balance := func(r float64) (involute.Vec, float64) {
		off := func(angle float64) float64 {
			c := involute.Polar(r, angle)
			return s.distance(left, c) - s.distance(right, c)
		}
		middle, err := involute.FindRoot(off, space-width/4, space+width/4)
		if err != nil {
			middle = space
		}
		c := involute.Polar(r, middle)
		return c, min(s.distance(left, c), s.distance(right, c))
	}
	r, err := involute.FindRoot(func(r float64) float64 {
		_, d := balance(r)
		return d - pin/2
	}, s.least, s.most+pin)
	if err != nil {
		return involute.Vec{}, fmt.Errorf("contour: a pin of %g mm does not rest in the space at %.3f°", pin, space/involute.Degree)
	}
	c, _ := balance(r)
	return c, nil
}

// sides returns the pieces of the two teeth beside a space, by side.
func (s Section) sides(space float64) (left, right []placed) {
	reach := 2 * math.Pi / float64(len(s.spaces))
	return s.between(space, space+reach), s.between(space-reach, space)
}

// between returns the pieces whose middles lie between two polar angles, from < to.
func (s Section) between(from, to float64) []placed {
	var out []placed
	for turn := -2 * math.Pi; turn <= 2*math.Pi; turn += 2 * math.Pi {
		i, _ := slices.BinarySearchFunc(s.pieces, from+turn, func(p placed, a float64) int { return cmp.Compare(p.angle, a) })
		for ; i < len(s.pieces) && s.pieces[i].angle < to+turn; i++ {
			out = append(out, s.pieces[i])
		}
	}
	return out
}
