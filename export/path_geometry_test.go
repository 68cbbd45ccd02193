package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// Elementary geometry: circle, half circle, quarter segment r²(π/4 − 1/2), and a slot.
func TestPathGeometry(t *testing.T) {
	quarter := math.Sqrt2 - 1
	for _, test := range []struct {
		name         string
		p            Path
		area, length float64
		lo, hi       involute.Vec
	}{
		{"square", vertices(0, 0, 0, 2, 0, 0, 2, 2, 0, 0, 2, 0), 4, 8, involute.Vec{}, involute.Vec{X: 2, Y: 2}},
		{"clockwise square", vertices(0, 0, 0, 0, 2, 0, 2, 2, 0, 2, 0, 0), -4, 8, involute.Vec{}, involute.Vec{X: 2, Y: 2}},
		{"circle", vertices(-3, 1, 1, 3, 1, 1), 9 * math.Pi, 6 * math.Pi, involute.Vec{X: -3, Y: -2}, involute.Vec{X: 3, Y: 4}},
		{"clockwise circle", vertices(-3, 1, -1, 3, 1, -1), -9 * math.Pi, 6 * math.Pi, involute.Vec{X: -3, Y: -2}, involute.Vec{X: 3, Y: 4}},
		{"half disk", vertices(5, 0, 1, -5, 0, 0), 12.5 * math.Pi, 5*math.Pi + 10, involute.Vec{X: -5}, involute.Vec{X: 5, Y: 5}},
		{"segment", vertices(2, 0, quarter, 0, 2, 0), math.Pi - 2, math.Pi + math.Sqrt(8), involute.Vec{}, involute.Vec{X: 2, Y: 2}},
		{"slot", vertices(0, -1, 0, 4, -1, 1, 4, 1, 0, 0, 1, 1), 8 + math.Pi, 8 + 2*math.Pi, involute.Vec{X: -1, Y: -1}, involute.Vec{X: 5, Y: 1}},
		{"bitten square", vertices(0, 0, 0, 2, 0, -quarter, 4, 2, 0, 0, 2, 0), 4 + 2 - (math.Pi - 2), 2 + math.Pi + 4 + 2, involute.Vec{}, involute.Vec{X: 4, Y: 2}},
		{"three quarters", vertices(1, 0, math.Tan(3*math.Pi/8), 0, -1, 0, 0, 0, 0), 0.75 * math.Pi, 1.5*math.Pi + 2, involute.Vec{X: -1, Y: -1}, involute.Vec{X: 1, Y: 1}},
	} {
		lo, hi := test.p.bounds()
		if math.Abs(test.p.area()-test.area) > 1e-13*math.Abs(test.area) || math.Abs(test.p.length()-test.length) > 1e-14*test.length ||
			lo.Sub(test.lo).Norm() > 1e-14 || hi.Sub(test.hi).Norm() > 1e-14 {
			t.Errorf("%s: area %.17g, length %.17g, bounds %v %v; want %.17g, %.17g, %v %v",
				test.name, test.p.area(), test.p.length(), lo, hi, test.area, test.length, test.lo, test.hi)
		}
	}
}

// The area between arc and chord, against its power series in b: with
// θ = 4·atan b it is b/3 + b³/15 − b⁵/105 + …; both branches meet the series
// where it is good, and each other at their border.
func TestSegmentArea(t *testing.T) {
	for _, b := range []float64{1e-9, 1e-5, 1e-3, -1e-3, 0.01} {
		want := b/3 + b*b*b/15 - b*b*b*b*b/105
		if got := segmentArea(b); math.Abs(got-want) > 1e-14*math.Abs(want) {
			t.Errorf("segmentArea(%g) = %.17g, want %.17g", b, got, want)
		}
	}
	border := math.Tan(0.125)
	below, above := segmentArea(border*(1-1e-15)), segmentArea(border*(1+1e-15))
	if math.Abs(below-above) > 1e-13*above {
		t.Errorf("segmentArea jumps from %.17g to %.17g", below, above)
	}
	if got, want := segmentArea(1), math.Pi/8; math.Abs(got-want) > 1e-15 {
		t.Errorf("half circle: %.17g, want %.17g", got, want)
	}
}

// The pieces start and end on the vertices; area, bounds and length agree with a
// fine polygon through points of the pieces.
func TestPathGeometryAgainstPolygon(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t, 3)
		const n = 400
		var poly Path
		off := 0.0
		for i := range p.Vertices {
			from, to, _ := p.ends(i)
			piece := p.Curve(i)
			start, _ := piece.At(0)
			end, _ := piece.At(1)
			slack := 1e-9 // a point of an arc is off by some 1e-16 of its radius
			if arc, ok := piece.(involute.Arc); ok {
				slack += 1e-15 * arc.Radius
			}
			if start.Sub(from).Norm() > slack || end.Sub(to).Norm() > slack {
				t.Fatalf("piece %d runs from %v to %v, want %v to %v", i, start, end, from, to)
			}
			for k := range n {
				q, _ := piece.At(float64(k) / n)
				poly.Vertices = append(poly.Vertices, Vertex{P: q})
			}
			off = max(off, slack)
		}
		// A chord of 1/n of an arc lies below it by s²/(8r), s = rθ/n; θ ≤ 2π.
		lo, hi := p.bounds()
		polyLo, polyHi := poly.bounds()
		size := hi.Sub(lo).Norm()
		gap := size * math.Pi * math.Pi / (2 * n * n)
		for _, d := range []float64{polyLo.X - lo.X, polyLo.Y - lo.Y, hi.X - polyHi.X, hi.Y - polyHi.Y} {
			if d < -off || d > gap+off {
				t.Fatalf("bounds %v %v, of the polygon %v %v", lo, hi, polyLo, polyHi)
			}
		}
		if d := math.Abs(p.area() - poly.area()); d > (gap+off)*p.length() {
			t.Fatalf("area %g, of the polygon %g", p.area(), poly.area())
		}
		if d := p.length() - poly.length(); d < -2*n*off || d > p.length()*math.Pi*math.Pi/(6*n*n)+2*n*off {
			t.Fatalf("length %g, of the polygon %g", p.length(), poly.length())
		}
	})
}

// Splitting and turning change nothing of the shape.
func TestSplitAndTurnKeepTheShape(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t, 20)
		q := p.counterClockwise().splitArcs()
		if q.area() < 0 || math.Abs(q.area()-math.Abs(p.area())) > 1e-11*p.length()*p.length() || math.Abs(q.length()-p.length()) > 1e-11*p.length() {
			t.Fatalf("area %g, length %g; were %g, %g", q.area(), q.length(), p.area(), p.length())
		}
		lo, hi := p.bounds()
		qlo, qhi := q.bounds()
		if lo.Sub(qlo).Norm()+hi.Sub(qhi).Norm() > 1e-10*(1+hi.Sub(lo).Norm()) {
			t.Fatalf("bounds %v %v, were %v %v", qlo, qhi, lo, hi)
		}
		if q.Vertices[0].P != p.Vertices[0].P {
			t.Fatalf("starts on %v, not %v", q.Vertices[0].P, p.Vertices[0].P)
		}
		for i, v := range q.Vertices {
			if math.Abs(v.Bulge) > quarterBulge+bulgeStep {
				t.Fatalf("piece %d of %d: bulge %g is over 90°", i, len(q.Vertices), v.Bulge)
			}
		}
	})
}

// A flat arc with its center 2.5e9 mm away still has its true top: sagitta = c·b/2.
func TestBoundsOfFlatArc(t *testing.T) {
	p := vertices(0, 0, 0, 10, 0, 1e-9, 10, 10, 0, 0, 10, 0)
	_, hi := p.bounds()
	if want := 10 + 5e-9; math.Abs(hi.X-want) > 1e-14 {
		t.Errorf("reaches x %.17g, want %.17g", hi.X, want)
	}
}
