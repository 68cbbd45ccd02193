package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A BoltCircle is a ring of equal round holes about the gear's axis. The zero
// value is none.
type BoltCircle struct {
	Diameter float64 // of the circle through the centers, mm
	Holes    int
	Hole     float64 // diameter of each, mm
	Start    float64 // of the first hole, from +x counter-clockwise, radians
}

// Centers returns the centers of the holes, the first at Start, evenly on
// counter-clockwise from there: D/2 at Start + 2πk/n.
func (b BoltCircle) Centers() []involute.Vec {
	var out []involute.Vec
	for k := range b.Holes {
		out = append(out, involute.Polar(b.Diameter/2, b.Start+2*math.Pi*float64(k)/float64(b.Holes)))
	}
	return out
}

// Paths returns the holes as closed paths, each from its point farthest from
// the axis on.
func (b BoltCircle) Paths() []Path {
	var out []Path
	for _, c := range b.Centers() {
		r := involute.Polar(b.Hole/2, c.Angle())
		out = append(out, Path{Vertices: []Vertex{{P: c.Add(r), Bulge: 1}, {P: c.Sub(r), Bulge: 1}}})
	}
	return out
}

// openings adds what is inside the teeth: the bore with its keyway, holes and hub.
func (o *Outline) openings(s ContourSpec) {
	if s.Bore > 0 && s.KeyWidth > 0 {
		o.Contours = append(o.Contours, Contour{LayerBore, BorePath(s)})
	} else if s.Bore > 0 {
		o.Circles = append(o.Circles, Circle{Layer: LayerBore, Radius: s.Bore / 2})
	}
	for _, c := range s.Bolts.Centers() {
		o.Circles = append(o.Circles, Circle{LayerHoles, c, s.Bolts.Hole / 2})
	}
	if s.Hub > 0 {
		o.Circles = append(o.Circles, Circle{Layer: LayerHub, Radius: s.Hub / 2})
	}
}

// sameOpening is how far a bore, keyway, hole or hub that is read back may be
// from its place, mm. Writers keep nine decimals or more.
const sameOpening = 1e-6

// CheckOpenings holds an outline that was read back against what is to be
// inside the teeth: bore, keyway, holes and hub, each on its layer and no other
// beside it. It returns the greatest deviation (mm) of a radius, a center, a
// corner or a side; one above 1e-6 mm, or a wrong number of shapes, is an error.
// Measured are the shapes read, by themselves: nothing is drawn again to compare.
func (s ContourSpec) CheckOpenings(o Outline) (float64, error) {
	worst := 0.0
	for _, check := range []struct {
		layer    Layer
		circles  int
		contours int
		measure  func([]Circle, []Path) float64
	}{
		{LayerBore, count(s.Bore > 0 && s.KeyWidth <= 0), count(s.Bore > 0 && s.KeyWidth > 0), s.boreOff},
		{LayerHoles, s.Bolts.Holes, 0, s.Bolts.off},
		{LayerHub, count(s.Hub > 0), 0, func(c []Circle, _ []Path) float64 { return roundOff(c, s.Hub/2) }},
	} {
		circles, paths := o.on(check.layer)
		if len(circles) != check.circles || len(paths) != check.contours {
			return worst, fmt.Errorf("layer %s: circles %d, closed contours %d; %d and %d belong there", check.layer, len(circles), len(paths), check.circles, check.contours)
		}
		off := check.measure(circles, paths)
		worst = max(worst, off)
		switch {
		case math.IsInf(off, 0):
			return worst, fmt.Errorf("layer %s: a hole is missing from its place, and another is there twice or turned", check.layer)
		case !(off <= sameOpening):
			return worst, fmt.Errorf("layer %s: a shape is %.6f mm off its place or size", check.layer, off)
		}
	}
	return worst, nil
}

// count returns how many there are of what is there once or not at all.
func count(there bool) int {
	if there {
		return 1
	}
	return 0
}

// on returns the circles and the closed contours of a layer.
func (o Outline) on(layer Layer) (circles []Circle, paths []Path) {
	for _, c := range o.Circles {
		if c.Layer == layer {
			circles = append(circles, c)
		}
	}
	for _, c := range o.Contours {
		if c.Layer == layer {
			paths = append(paths, c.Path)
		}
	}
	return circles, paths
}

// roundOff returns how far circles are from circles of a radius about the axis, mm.
func roundOff(circles []Circle, radius float64) float64 {
	worst := 0.0
	for _, c := range circles {
		worst = max(worst, c.Center.Norm(), math.Abs(c.Radius-radius))
	}
	return worst
}

// off returns how far circles are from the holes, mm: each in radius, in its
// distance from the axis and in its place round it. A place taken twice is
// infinitely far off.
func (b BoltCircle) off(circles []Circle, _ []Path) float64 {
	worst := 0.0
	taken := make([]bool, b.Holes)
	for _, c := range circles {
		pitch := 2 * math.Pi / float64(b.Holes)
		turns := (c.Center.Angle() - b.Start) / pitch
		k := (int(math.Round(turns))%b.Holes + b.Holes) % b.Holes
		if taken[k] {
			return math.Inf(1)
		}
		taken[k] = true
		along := math.Abs(turns-math.Round(turns)) * pitch * b.Diameter / 2
		worst = max(worst, along, math.Abs(c.Center.Norm()-b.Diameter/2), math.Abs(c.Radius-b.Hole/2))
	}
	return worst
}

// boreOff returns how far a bore is from what it should be, mm. One with a
// keyway is measured by its pieces: arcs on the bore's circle that leave out just
// the keyway's width, and three straight lines between two corners on that circle
// and two on the floor, at half the width from the middle.
func (s ContourSpec) boreOff(circles []Circle, paths []Path) float64 {
	r, half, floor := s.Bore/2, s.KeyWidth/2, s.Bore/2+s.KeyDepth
	worst, sweep, straight := roundOff(circles, r), 0.0, 0.0
	for _, p := range paths {
		for i := range p.Vertices {
			switch c := p.Curve(i).(type) {
			case involute.Arc:
				worst = max(worst, c.Center.Norm(), math.Abs(c.Radius-r))
				sweep += math.Abs(c.Sweep)
			case involute.Line:
				straight += c.To.Sub(c.From).Norm()
				for _, q := range []involute.Vec{c.From, c.To} {
					end := min(math.Abs(q.X-floor), math.Abs(q.Norm()-r)+max(0, -q.X))
					worst = max(worst, end, math.Abs(math.Abs(q.Y)-half))
				}
			}
		}
		wall := math.Sqrt(r*r - half*half)
		worst = max(worst, math.Abs(sweep-2*(math.Pi-math.Asin(half/r)))*r, math.Abs(straight-2*(floor-wall)-2*half))
	}
	return worst
}
