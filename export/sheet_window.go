package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A placement carries a point of the gear to the page: turned, scaled, moved.
type placement struct {
	turn   float64 // radians
	scale  float64
	origin involute.Vec // of the gear's center, mm on the page
}

func (p placement) at(g involute.Vec) involute.Vec {
	return g.Rotate(p.turn).Scale(p.scale).Add(p.origin)
}

// line carries a polyline; its bulges stay, as angles do.
func (p placement) line(l polyline) polyline {
	moved := polyline{Closed: l.Closed, Vertices: make([]Vertex, len(l.Vertices))}
	for i, v := range l.Vertices {
		moved.Vertices[i] = Vertex{P: p.at(v.P), Bulge: v.Bulge}
	}
	return moved
}

// A scaling is a ratio of picture to part.
type scaling struct{ picture, part float64 }

// scalings returns the recommended scales of ISO 5455:1979, the largest first.
func scalings() []scaling {
	return []scaling{
		{50, 1}, {20, 1}, {10, 1}, {5, 1}, {2, 1}, {1, 1}, {1, 2}, {1, 5}, {1, 10}, {1, 20},
		{1, 50}, {1, 100}, {1, 200}, {1, 500}, {1, 1000}, {1, 2000}, {1, 5000}, {1, 10000},
	}
}

func (s scaling) ratio() float64 { return s.picture / s.part }

func (s scaling) String() string { return fmt.Sprintf("Scale %g:%g", s.picture, s.part) }

// largestScale returns the largest recommended scale that fits, at least least; ok is false where none does.
func largestScale(least float64, fits func(ratio float64) bool) (s scaling, ok bool) {
	for _, s := range scalings() {
		if s.ratio() >= least && fits(s.ratio()) {
			return s, true
		}
	}
	return scaling{}, false
}

// A cutting is where a picture cuts a gear: between two rays, ccw from From to To, and at an inner radius.
type cutting struct {
	From, To float64 // radians, in the gear's coordinates
	Inner    float64 // mm
}

func (c cutting) half() float64 { return (c.To - c.From) / 2 }

// widestCutting is the widest half angle of a picture that shows a part of the gear
// only: beyond it the cut would hang beside the teeth instead of below them.
const widestCutting = 80 * math.Pi / 180

// innerRadius is where a picture of some teeth ends: a rim of most of a tooth's height below the root, outside the bore.
func (g GearShape) innerRadius() float64 {
	const rim = 0.7
	inner := max(0, g.Root/2-rim*(g.Tip-g.Root)/2)
	for _, bore := range g.Bore {
		for _, v := range bore.Vertices {
			if r := v.P.Norm(); r < g.Root/2 {
				inner = max(inner, r)
			}
		}
	}
	return inner
}

// rayCrossing returns which piece of a path crosses the ray at an angle counter-clockwise, and how far along it, 0 to 1.
func (p Path) rayCrossing(angle float64) (index int, share float64, ok bool) {
	ray := involute.Polar(1, angle)
	for i := range p.Vertices {
		from, to, _ := p.ends(i)
		if ray.Cross(from) > 0 || ray.Cross(to) <= 0 || ray.Dot(from.Add(to)) <= 0 {
			continue
		}
		curve := p.Curve(i)
		t0, t1 := curve.Domain()
		lo, hi := t0, t1
		for range 60 { // halving to the last bit
			mid := (lo + hi) / 2
			if at, _ := curve.At(mid); ray.Cross(at) > 0 {
				hi = mid
			} else {
				lo = mid
			}
		}
		return i, (lo - t0) / (t1 - t0), true
	}
	return 0, 0, false
}

// part returns a share of a piece, from t0 to t1 of its length, as its first vertex and its end.
func (p Path) part(index int, t0, t1 float64) (Vertex, involute.Vec) {
	curve := p.Curve(index)
	lo, hi := curve.Domain()
	from, _ := curve.At(lo + t0*(hi-lo))
	to, _ := curve.At(lo + t1*(hi-lo))
	return Vertex{P: from, Bulge: math.Tan((t1 - t0) * math.Atan(p.Vertices[index].Bulge))}, to
}

// between returns the open part of a counter-clockwise contour from one ray to another. The
// rays should run through tooth spaces or teeth at their middle, where they meet the contour once.
func (p Path) between(from, to float64) (polyline, bool) {
	i, s, ok0 := p.rayCrossing(from)
	j, t, ok1 := p.rayCrossing(to)
	if !ok0 || !ok1 || i == j && s <= t {
		return polyline{}, false
	}
	first, _ := p.part(i, s, 1)
	line := polyline{Vertices: []Vertex{first}}
	for k := (i + 1) % len(p.Vertices); k != j; k = (k + 1) % len(p.Vertices) {
		line.Vertices = append(line.Vertices, p.Vertices[k])
	}
	last, end := p.part(j, 0, t)
	line.Vertices = append(line.Vertices, last, Vertex{P: end})
	return line, true
}

// draw draws the whole gear with its reference circle and center.
func (g GearShape) draw(b *board, p placement) {
	outline := p.line(g.Outline.line())
	b.add(shape{Outline: outline, Style: shapeStyle{Width: outlineWidth, Line: black, Fill: tint}})
	for _, bore := range g.Bore {
		line := p.line(bore.line())
		b.add(shape{Outline: line, Style: shapeStyle{Width: outlineWidth, Line: black, Fill: paper}})
	}
	if g.Hub > 0 {
		b.stroke(circlePath(p.origin, g.Hub*p.scale).line(), thinLine)
	}
	b.axis(circlePath(p.origin, g.Reference*p.scale).line())
	const mark = 3.0
	x, y := involute.Vec{X: mark}, involute.Vec{Y: mark}
	b.stroke(straight(p.origin.Sub(x), p.origin.Add(x)), thinLine)
	b.stroke(straight(p.origin.Sub(y), p.origin.Add(y)), thinLine)
}

// drawPart draws the teeth inside a cutting, with break lines where the gear goes on.
func (g GearShape) drawPart(b *board, p placement, c cutting) {
	line, ok := g.Outline.between(c.From, c.To)
	if !ok {
		return
	}
	line = p.line(line)
	inner := arcLine(p, c.Inner, c.To, c.From)
	metal := polyline{Closed: true}
	metal.Vertices = append(append(metal.Vertices, line.Vertices...), inner.Vertices...)
	b.fill(metal, tint)
	first, last := line.Vertices[0].P, line.Vertices[len(line.Vertices)-1].P
	b.breakLine(last, p.at(involute.Polar(c.Inner, c.To)))
	b.breakArc(p, c)
	b.breakLine(p.at(involute.Polar(c.Inner, c.From)), first)
	b.axis(arcLine(p, g.Reference/2, c.From, c.To))
	b.stroke(line, outlineWidth)
}

// arcLine returns the arc about the gear's center from one angle to another, on the page.
func arcLine(p placement, radius, from, to float64) polyline {
	return p.line(polyline{Vertices: []Vertex{
		{P: involute.Polar(radius, from), Bulge: math.Tan((to - from) / 4)}, {P: involute.Polar(radius, to)},
	}})
}

// axis draws a thin long-dashed dotted line, as pitch circles have.
func (b *board) axis(line polyline) {
	b.add(shape{Outline: line, Style: shapeStyle{Width: thinLine, Line: black, Dash: dashDot}})
}

// breakLine draws a wavy line, which says that the part goes on (ISO 128-2:2020, thin freehand line).
func (b *board) breakLine(from, to involute.Vec) {
	n := waves(to.Sub(from).Norm())
	points := make([]involute.Vec, n+1)
	for i := range points {
		points[i] = from.Add(to.Sub(from).Scale(float64(i) / float64(n)))
	}
	b.wavy(points)
}

// breakArc draws a wavy line along the inner radius of a cutting.
func (b *board) breakArc(p placement, c cutting) {
	n := waves(c.Inner * p.scale * (c.To - c.From))
	points := make([]involute.Vec, n+1)
	for i := range points {
		points[i] = p.at(involute.Polar(c.Inner, c.To+(c.From-c.To)*float64(i)/float64(n)))
	}
	b.wavy(points)
}

// waves returns how many half waves a break line of a length (mm) has, an even number.
func waves(length float64) int {
	const wave = 5.0 // mm
	return 2 * max(1, int(math.Round(length/wave)))
}

func (b *board) wavy(points []involute.Vec) {
	const swing = 0.25 // bulge
	line := straight(points...)
	for i := range line.Vertices {
		line.Vertices[i].Bulge = swing * float64(1-2*(i%2))
	}
	b.stroke(line, thinLine)
}
