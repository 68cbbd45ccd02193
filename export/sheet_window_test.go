package export

import (
	"math"
	"testing"

	"flankwright/involute"

	"pgregory.net/rapid"
)

// openLength returns the length of an open polyline, mm.
func openLength(l polyline) float64 {
	sum := 0.0
	for i := range len(l.Vertices) - 1 {
		v, to := l.Vertices[i], l.Vertices[i+1].P
		chord := to.Sub(v.P).Norm()
		if half := 2 * math.Atan(v.Bulge); half != 0 {
			chord *= half / math.Sin(half)
		}
		sum += chord
	}
	return sum
}

// n pitches cut out of a gear of z teeth are n/z of its contour, wherever the cut starts, and end on the rays.
func TestBetweenCutsWholePitches(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		z := rapid.IntRange(5, 120).Draw(t, "teeth")
		g := sampleGear(z, rapid.Float64Range(0.2, 20).Draw(t, "module"), 0)
		n := rapid.IntRange(1, z-1).Draw(t, "pitches")
		pitch := 2 * math.Pi / float64(z)
		from := rapid.Float64Range(-10, 10).Draw(t, "from")
		part, ok := g.Outline.between(from, from+float64(n)*pitch)
		if !ok {
			t.Fatal("nothing was cut")
		}
		want := g.Outline.length() * float64(n) / float64(z)
		if got := openLength(part); math.Abs(got-want) > 1e-9*g.Outline.length() { // ends found to the last bits of the contour
			t.Fatalf("cut is %g mm long, want %g", got, want)
		}
		ends := []involute.Vec{part.Vertices[0].P, part.Vertices[len(part.Vertices)-1].P}
		for i, angle := range []float64{from, from + float64(n)*pitch} {
			if ray := involute.Polar(1, angle); math.Abs(ray.Cross(ends[i])) > 1e-9*g.Tip || ray.Dot(ends[i]) < 0 {
				t.Fatalf("end %d at %v is off the ray at %g rad", i, ends[i], angle)
			}
		}
	})
}

func TestBetweenNeedsAContourRoundTheCenter(t *testing.T) {
	far := circlePath(involute.Vec{X: 100}, 10)
	if _, ok := far.between(1, 2); ok {
		t.Error("a circle beside the center was cut by rays that miss it")
	}
}

// ISO 5455:1979, table: 50:1 to 2:1, 1:1, 1:2 to 1:10 000 by 1, 2 and 5.
func TestScales(t *testing.T) {
	last := math.Inf(1)
	for _, s := range scalings() {
		digits := max(s.picture, s.part)
		for digits >= 10 {
			digits /= 10
		}
		if s.ratio() >= last || min(s.picture, s.part) != 1 || digits != 1 && digits != 2 && digits != 5 {
			t.Errorf("%v is out of order or no recommended scale", s)
		}
		last = s.ratio()
	}
	if s, ok := largestScale(0, func(r float64) bool { return r*33 < 50 }); !ok || s.String() != "Scale 1:1" {
		t.Errorf("33 mm in 50 mm: %v, %v", s, ok)
	}
	if s, ok := largestScale(0, func(r float64) bool { return r*7.8 < 50 }); !ok || s.String() != "Scale 5:1" {
		t.Errorf("7.8 mm in 50 mm: %v, %v", s, ok)
	}
	if _, ok := largestScale(1, func(r float64) bool { return r*51 < 50 }); ok {
		t.Error("51 mm was found to fit 50 mm at 1:1")
	}
}
