package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// gearContour returns the contour of a 20° gear, or an error if there is no such gear.
func gearContour(s involute.Spec, tolerance float64) (Path, error) {
	s.Rack.PressureAngle, s.Rack.Addendum, s.Rack.Dedendum = 20*math.Pi/180, 1, 1.25
	g, err := involute.NewGear(s)
	if err != nil {
		return Path{}, err
	}
	tooth, err := g.Nominal()
	if err != nil {
		return Path{}, err
	}
	o, _, err := NewContour(ContourSpec{Tooth: tooth, Fit: FitOptions{Tolerance: tolerance}})
	if err != nil {
		return Path{}, err
	}
	return o.Cut()
}

// drawContour draws a gear's contour and its module. With few teeth and little shift
// it is undercut, so that spaces are narrower at their mouth than inside.
func drawContour(t *rapid.T) (Path, float64) {
	m := math.Pow(10, rapid.Float64Range(-0.3, 1).Draw(t, "log m"))
	s := involute.Spec{
		Teeth: rapid.IntRange(6, 60).Draw(t, "z"), Module: m,
		Shift: rapid.Float64Range(-0.3, 0.5).Draw(t, "x"),
		Rack:  involute.Rack{TipRadius: rapid.Float64Range(0, 0.38).Draw(t, "rho")},
	}
	p, err := gearContour(s, m*math.Pow(10, rapid.Float64Range(-4, -2).Draw(t, "log tolerance/m")))
	if err != nil {
		t.Skip(err)
	}
	return p, m
}

// inside tells by winding whether q lies in the path, with n chords to a piece.
func inside(p Path, q involute.Vec, n int) bool {
	sum := 0.0
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		before := from.Sub(q)
		for k := 1; k <= n; k++ {
			v := to.Sub(q)
			if k < n {
				v = pieceAt(piece{from, to, b}, float64(k)/float64(n)).Sub(q)
			}
			sum += turn(before, v)
			before = v
		}
	}
	return math.Abs(sum) > math.Pi
}

// checkCovers fails unless points at less than d from vertices of p lie in its offset, out.
func checkCovers(t *rapid.T, p, out Path, d float64) {
	for range 4 {
		v := p.Vertices[rapid.IntRange(0, len(p.Vertices)-1).Draw(t, "vertex")].P
		q := v.Add(involute.Polar(0.98*d, rapid.Float64Range(0, 2*math.Pi).Draw(t, "way")))
		if !inside(out, q, 32) { // the chords of a quarter circle lie 0.03 % inside of it
			t.Fatalf("%v, %g mm from the vertex %v, is not inside", q, 0.98*d, v)
		}
	}
}

func TestOffsetOfGears(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, m := drawContour(t)
		d := max(leastOffset, m*rapid.Float64Range(0.01, 0.4).Draw(t, "d/m"))
		checkCovers(t, p, offsetOf(t, p, d), d)
	})
}

// Moving twice is moving once by the sum: what lies within d₂ of what lies within
// d₁ lies within d₁ + d₂ (Minkowski sums are associative), and filled pockets stay filled.
func TestOffsetTwice(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, m := drawContour(t)
		sum := m * math.Pow(10, rapid.Float64Range(-1.5, 1).Draw(t, "log d/m"))
		first := sum * rapid.Float64Range(0.1, 0.9).Draw(t, "share")
		once := offsetOf(t, p, sum)
		twice := offsetOf(t, offsetOf(t, p, first), sum-first)
		if diff := math.Abs(once.area() - twice.area()); diff > 1e-9*once.area() {
			t.Errorf("area %.12g at once, %.12g in two steps", once.area(), twice.area())
		}
	})
}

// crossesItself tells whether a path's chords, n to a piece, cross or nearly touch,
// or a corner is so sharp that they can't tell.
func crossesItself(p Path, n int) bool {
	var points []involute.Vec
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		_, far, c := p.ends((i + 1) % len(p.Vertices))
		_, end := piece{from, to, b}.directions()
		start, _ := piece{to, far, c}.directions()
		if end.Dot(start) < -0.9 {
			return true
		}
		for k := range n {
			points = append(points, pieceAt(piece{from, to, b}, float64(k)/float64(n)))
		}
	}
	lo, hi := p.bounds()
	close := 1e-3 * hi.Sub(lo).Norm()
	for i, a := range points {
		b := points[(i+1)%len(points)]
		for j := i + 2; j < len(points) && (i > 0 || j+1 < len(points)); j++ {
			c, d := points[j], points[(j+1)%len(points)]
			if b.Sub(a).Cross(c.Sub(a))*b.Sub(a).Cross(d.Sub(a)) < 0 && d.Sub(c).Cross(a.Sub(c))*d.Sub(c).Cross(b.Sub(c)) < 0 {
				return true
			}
			if j > i+n && j+n < i+len(points) && distanceToChord(a, b, c) < close {
				return true
			}
		}
	}
	return false
}

// drawSimplePath draws a star of lines and arcs of both senses that does not cross itself.
func drawSimplePath(t *rapid.T) Path {
	p := drawPath(t, 0.4).counterClockwise()
	if crossesItself(p, 8) {
		t.Skip("crosses itself")
	}
	return p
}

func TestOffsetOfAnyPath(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawSimplePath(t)
		lo, hi := p.bounds()
		d := max(leastOffset, hi.Sub(lo).Norm()*math.Pow(10, rapid.Float64Range(-3, 0.5).Draw(t, "log d/size")))
		checkCovers(t, p, offsetOf(t, p, d), d)
	})
}

// Whatever is asked of it, the offset is an outline or an error.
func FuzzOffsetOutward(f *testing.F) {
	f.Add(uint64(1), 0.25)
	f.Add(uint64(77), 1e-3)
	f.Fuzz(func(t *testing.T, seed uint64, d float64) {
		var p Path
		for range seed%9 + 2 {
			p.Vertices = append(p.Vertices, Vertex{involute.Vec{X: float64(seed % 17), Y: float64(seed / 17 % 13)}, float64(seed/221%5)/2 - 1})
			seed = seed*6364136223846793005 + 1442695040888963407 // a linear congruential generator's step
			seed ^= seed >> 29
		}
		out, err := p.offsetOutward(d)
		if err == nil && out.check() != nil {
			t.Errorf("%v by %g: %v", p, d, out.check())
		}
	})
}

// BenchmarkOffset moves the contour of 1000 teeth by a tenth of its module.
func BenchmarkOffset(b *testing.B) {
	p, err := gearContour(involute.Spec{Teeth: 1000, Module: 2, Rack: involute.Rack{TipRadius: 0.38}}, 0.0002)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := p.offsetOutward(0.2); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(len(p.Vertices)), "pieces")
}
