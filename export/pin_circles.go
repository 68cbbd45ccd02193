package export

import (
	"math"

	"flankwright/involute"
)

// pinCircles returns the measuring pins of diameter pin (mm) where they rest in
// the tooth spaces, as circles on LayerPins; the first tooth points along +x.
//
// They are the two of a measurement over two pins: in spaces exactly opposite
// where the number of teeth is even, else in two that are nearest to it, and of
// all such pairs one that stands upright, clear of a mate on the x axis. With
// all set there is one in every space. A gear of one tooth has room for one.
//
// A spur gear's pins are exact: their centers lie on the spaces' center lines at
// d_K/2 (see involute.Tooth.Seat). A helical gear is measured with balls, both
// with their centers in the plane drawn; what is drawn is their section by that
// plane, a circle of the ball's radius, which keeps off the flanks drawn, since a
// ball touches them above and below the plane. The error is an *involute.Impossible
// where the pin does not rest on the flanks.
func pinCircles(t involute.Tooth, pin float64, all bool) ([]Circle, error) {
	seat, err := t.Seat(pin)
	if err != nil {
		return nil, err
	}
	var pins []Circle
	for _, k := range pinSpaces(t.Teeth(), all) {
		center := involute.Polar(seat.CenterDiameter/2, (float64(k)+0.5)*2*math.Pi/float64(t.Teeth()))
		pins = append(pins, Circle{Layer: LayerPins, Center: center, Radius: pin / 2})
	}
	return pins, nil
}

// pinSpaces returns the spaces that pins are drawn in: all, or the upright pair
// nearest to opposite. Space k follows tooth k counter-clockwise.
func pinSpaces(teeth int, all bool) []int {
	first := teeth / 4 // the space at 90°, or the next below or above it
	second := first + teeth/2
	if teeth%2 != 0 {
		second = teeth - 1 - first // the mirror image in the x axis
	}
	switch {
	case all:
		spaces := make([]int, max(0, teeth))
		for k := range spaces {
			spaces[k] = k
		}
		return spaces
	case second <= first:
		return []int{first}
	}
	return []int{first, second}
}
