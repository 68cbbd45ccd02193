package export

import (
	"encoding/json"
	"fmt"
	"math"
	"slices"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

const (
	// A browser's numbers have 24 bits. boxSlack bounds what that does to a box, as a
	// share of the largest coordinate (2e-7 was the most that was measured), and
	// lengthSlack what it does to the length of some thousand pieces, as a share of
	// it (4e-6).
	boxSlack    = 5e-7
	lengthSlack = 1e-5

	// pixelStep is the grid that boxes on the page are laid out on, in pixels.
	pixelStep = 1.0 / 64
)

// A browserReading is what a browser measures of an outline: its size on the page, in pixels, and each
// path's and circle's box (x, y, width, height) and length, in user units.
type browserReading struct {
	Width, Height float64
	Shapes        []struct {
		Tag, Layer string
		Box        [4]float64
		Length     float64
	}
}

// measureScript reads browserReadings.
const measureScript = `return svgs.map(s => {
	const page = s.getBoundingClientRect()
	return {Width: page.width, Height: page.height, Shapes: [...s.querySelectorAll("path, circle")].map(e => {
		const b = e.getBBox()
		return {Tag: e.tagName, Layer: e.parentNode.id, Box: [b.x, b.y, b.width, b.height], Length: e.getTotalLength()}
	})}
})`

// A browser shows every outline at true scale, and its own measures of each
// path and circle are ours.
func TestBrowserMeasuresSVG(t *testing.T) {
	var names []string
	var svgs [][]byte
	all := outsideOutlines(t)
	for name, o := range all {
		names = append(names, name)
		svgs = append(svgs, svgBytes(t, o))
	}
	var readings []browserReading
	browse(t, &readings, measureScript, svgs...)
	if len(readings) != len(names) {
		t.Fatalf("%d outlines shown, want %d", len(readings), len(names))
	}
	for i, name := range names {
		t.Run(name, func(t *testing.T) { checkBrowser(t, readings[i], all[name]) })
	}
}

func checkBrowser(t *testing.T, got browserReading, o Outline) {
	f, err := o.fileForm()
	if err != nil {
		t.Fatal(err)
	}
	lo, hi := o.bounds()
	size := hi.Sub(lo).Add(involute.Vec{X: 2 * svgMargin, Y: 2 * svgMargin}).Scale(96 / inspect.Inch.MM())
	if !near(pixelStep, got.Width, size.X, got.Height, size.Y) {
		t.Errorf("%g by %g pixels on the page, want %v", got.Width, got.Height, size)
	}
	lo, hi = f.bounds()
	slack := boxSlack * max(math.Abs(lo.X), math.Abs(lo.Y), math.Abs(hi.X), math.Abs(hi.Y))
	shapes := got.Shapes
	next := func(tag string, layer Layer, lo, hi involute.Vec) float64 {
		t.Helper()
		if len(shapes) == 0 {
			t.Fatal("something is missing")
		}
		s := shapes[0]
		shapes = shapes[1:]
		if s.Tag != tag || s.Layer != string(layer) || !near(slack, s.Box[0], lo.X, s.Box[1], -hi.Y, s.Box[0]+s.Box[2], hi.X, s.Box[1]+s.Box[3], -lo.Y) {
			t.Errorf("%s on %s, box %v, want %s on %s from %v to %v", s.Tag, s.Layer, s.Box, tag, layer, lo, hi)
		}
		return s.Length
	}
	for _, l := range slices.Backward(allLayers()) { // as the file has them
		layer := l.name
		for _, c := range f.Contours {
			if c.Layer != layer {
				continue
			}
			lo, hi := c.Path.bounds()
			length := next("path", layer, lo, hi)
			want := c.Path.length()
			if over := length - want; over < -lengthSlack*want || over > lengthSlack*want+cubicExcess(c.Path) {
				t.Errorf("a path on %s is %.9g long, want %.9g, up to %.2g more", layer, length, want, cubicExcess(c.Path))
			}
		}
		for _, c := range f.Circles {
			if c.Layer != layer {
				continue
			}
			// The browser takes 4 to 32 chords for a circle element's length (a square's
			// for a radius of 1, so 10 % short), which says nothing of the file.
			r := involute.Vec{X: c.Radius, Y: c.Radius}
			next("circle", layer, c.Center.Sub(r), c.Center.Add(r))
		}
	}
	if len(shapes) > 0 {
		t.Errorf("too much: %v", shapes)
	}
}

// cubicExcess bounds how much longer a path gets when a browser draws its arcs as
// cubic Bézier curves. The usual one for a sweep θ, with the arc's ends, tangents
// and middle, lies outside the arc by up to r·(2/27)·sin⁶(θ/4)/cos²(θ/4) (the
// greatest of its distance from the center, expanded in closed form), so its
// length is up to θ times that more.
func cubicExcess(p Path) float64 {
	sum := 0.0
	for i := range p.Vertices {
		if arc, ok := p.Curve(i).(involute.Arc); ok {
			q := math.Abs(arc.Sweep) / 4
			sum += arc.Radius * math.Abs(arc.Sweep) * 2 / 27 * math.Pow(math.Sin(q), 6) / math.Pow(math.Cos(q), 2)
		}
	}
	return sum
}

// The helper shows animations at a given time: a wheel that turns once in eight
// seconds about a pin at (30, 20), clockwise on the page, and no script in the file.
func TestBrowserHoldsAnimations(t *testing.T) {
	svg := `<svg xmlns="http://www.w3.org/2000/svg" width="96px" height="96px" viewBox="0 0 48 48">
<g id="wheel"><animateTransform attributeName="transform" type="rotate" from="0 30 20" to="360 30 20" dur="8s" repeatCount="indefinite"/>
<circle id="mark" cx="40" cy="20" r="1"/></g></svg>`
	times := []float64{0, 1, 2, 3.5, 9, 801}
	list, err := json.Marshal(times)
	if err != nil {
		t.Fatal(err)
	}
	var got []struct {
		Matrix [6]float64
		Mark   [2]float64 // middle of its box on the page, in pixels
	}
	browse(t, &got, fmt.Sprintf(`
svg.pauseAnimations()
const page = svg.getBoundingClientRect()
return %s.map(time => {
	svg.setCurrentTime(time)
	const m = svg.getElementById("wheel").getCTM()
	const b = svg.getElementById("mark").getBoundingClientRect()
	return {Matrix: [m.a, m.b, m.c, m.d, m.e, m.f], Mark: [(b.left + b.right) / 2 - page.left, (b.top + b.bottom) / 2 - page.top]}
})`, list), []byte(svg))
	if len(got) != len(times) {
		t.Fatalf("%d times shown, want %d", len(got), len(times))
	}
	const scale = 2 // pixels to the unit
	for i, time := range times {
		turn := 2 * math.Pi * time / 8
		c, s := math.Cos(turn), math.Sin(turn)
		m := got[i].Matrix
		if !near(1e-4, m[0], scale*c, m[1], scale*s, m[2], -scale*s, m[3], scale*c, m[4], scale*(30-30*c+20*s), m[5], scale*(20-30*s-20*c)) {
			t.Errorf("at %g s the wheel's matrix is %v", time, m)
		}
		if p := got[i].Mark; !near(0.01, p[0], scale*(30+10*c), p[1], scale*(20+10*s)) {
			t.Errorf("at %g s the mark is at %v", time, p)
		}
	}
}
