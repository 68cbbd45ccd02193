package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// offsetOf moves a path outward and fails where the result is not what it must be.
func offsetOf(t rapid.TB, p Path, d float64) Path {
	t.Helper()
	out, err := p.offsetOutward(d)
	if err != nil {
		t.Fatalf("%v\n%#v", err, p)
	}
	lo, hi := out.bounds()
	checkParallel(t, p, out, d, max(smoothError, 1e-9*hi.Sub(lo).Norm()))
	return out
}

// roughOffsetOf is offsetOf for cases where pieces or spaces below 1e-6 mm are left out.
func roughOffsetOf(t rapid.TB, p Path, d float64) Path {
	t.Helper()
	out, err := p.offsetOutward(d)
	if err != nil {
		t.Fatalf("%v\n%#v", err, p)
	}
	checkParallel(t, p, out, d, minPiece)
	return out
}

// checkParallel fails unless out is an outline that turns once round, with pieces
// no longer than a quarter circle, all at the distance d from p by brute force, and no
// vertex of p beyond it.
func checkParallel(t rapid.TB, p, out Path, d, slack float64) {
	t.Helper()
	if err := out.check(); err != nil {
		t.Fatal(err)
	}
	for i := range p.Vertices { // brute force goes by centers, good to the last digit of the radius
		if arc, ok := p.Curve(i).(involute.Arc); ok {
			slack = max(slack, 1e-15*arc.Radius)
		}
	}
	turned := 0.0
	n := len(out.Vertices)
	for i := range out.Vertices {
		from, to, b := out.ends(i)
		q := piece{from, to, b}
		if math.Abs(b) > quarterBulge+bulgeStep {
			t.Fatalf("piece %d sweeps %g°", i, q.sweep()*180/math.Pi)
		}
		after, far, c := out.ends((i + 1) % n)
		_, end := q.directions()
		start, _ := piece{after, far, c}.directions()
		turned += q.sweep() + turn(end, start)
		if n > 100 && i%(n/50) != 0 { // brute force on some 50 of them
			continue
		}
		for _, s := range []float64{0, 0.2137, 0.5, 0.8731} {
			point := pieceAt(q, s)
			if got := bruteDistanceToPath(p, point); math.Abs(got-d) > slack {
				t.Fatalf("piece %d of %d at %g, %v: %.12g mm from the path, want %g", i, n, s, point, got, d)
			}
		}
	}
	if math.Abs(turned-2*math.Pi) > 1e-6 {
		t.Fatalf("turns by %g°", turned*180/math.Pi)
	}
}

// bruteDistanceToPath tries all pieces but those that are certainly farther away:
// an arc up to a half circle stays within its chord's length of its start.
func bruteDistanceToPath(p Path, q involute.Vec) float64 {
	best := math.Inf(1)
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		if math.Abs(b) <= 1 && q.Sub(from).Norm()-to.Sub(from).Norm() > best {
			continue
		}
		best = min(best, distanceToPiece(piece{from, to, b}, q))
	}
	return best
}

// Steiner's formula for convex shapes (J. Steiner, 1840): the area grows by
// distance × circumference + π·distance², the circumference by 2π·distance.
func checkSteiner(t rapid.TB, p Path, d float64) {
	t.Helper()
	out := offsetOf(t, p, d)
	area := p.area() + d*p.length() + math.Pi*d*d
	length := p.length() + 2*math.Pi*d
	if math.Abs(out.area()-area) > 1e-10*area || math.Abs(out.length()-length) > 1e-10*length {
		t.Errorf("area %.12g, length %.12g; want %.12g and %.12g", out.area(), out.length(), area, length)
	}
}

func TestOffsetOfConvexShapes(t *testing.T) {
	quarter := math.Sqrt2 - 1
	for name, p := range map[string]Path{
		"square":         vertices(0, 0, 0, 2, 0, 0, 2, 2, 0, 0, 2, 0),
		"circle":         vertices(-3, 1, 1, 3, 1, 1),
		"half disk":      vertices(5, 0, 1, -5, 0, 0),
		"slot":           vertices(0, -1, 0, 4, -1, 1, 4, 1, 0, 0, 1, 1),
		"segment":        vertices(2, 0, quarter, 0, 2, 0),
		"needle":         vertices(0, 0, 0, 100, 0, 0, 100, 0.001, 0),
		"three quarters": vertices(1, 0, 0.35, -1, 0.2, 0.3, 0.1, -1, 0.2),
	} {
		t.Run(name, func(t *testing.T) {
			for _, d := range []float64{0.001, 0.25, 1, 40} {
				checkSteiner(t, p, d)
			}
		})
	}
}

func TestOffsetOfAnyConvexShape(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(3, 40).Draw(t, "n")
		r := math.Pow(10, rapid.Float64Range(-1, 3).Draw(t, "log r"))
		var angles []float64
		for i := range n {
			angles = append(angles, 2*math.Pi*(float64(i)+rapid.Float64Range(-0.25, 0.25).Draw(t, "turn"))/float64(n))
		}
		var p Path
		for i, a := range angles {
			b := math.Tan((angles[(i+1)%n] + 2*math.Pi*float64((i+1)/n) - a) / 4) // of the circle through all
			b *= rapid.SampledFrom([]float64{0, 0.3, 1}).Draw(t, "share")
			p.Vertices = append(p.Vertices, Vertex{involute.Polar(r, a), b})
		}
		checkSteiner(t, p, r*math.Pow(10, rapid.Float64Range(-2, 1).Draw(t, "log d/r")))
	})
}

// An L of two bars 4 by 2: five convex corners and one concave, where two strips of
// the width d overlap in a square.
func TestOffsetTrimsConcaveCorner(t *testing.T) {
	p := vertices(0, 0, 0, 4, 0, 0, 4, 2, 0, 2, 2, 0, 2, 4, 0, 0, 4, 0)
	for _, d := range []float64{0.001, 0.3, 1.7} {
		out := offsetOf(t, p, d)
		if want := 12 + 16*d + 5*math.Pi*d*d/4 - d*d; math.Abs(out.area()-want) > 1e-10 {
			t.Errorf("d %g: area %.12g, want %.12g", d, out.area(), want)
		}
		if len(out.Vertices) != 16 {
			t.Errorf("d %g: %d pieces, want 6 sides and 5 arcs in two halves", d, len(out.Vertices))
		}
	}
}

// dip is what is missing under the straight line over the mouth, width w ≤ 2d, of
// a closed space: w·d less twice the area under a circle of radius d from 0 to w/2.
func dip(w, d float64) float64 {
	x := w / 2
	return w*d - x*math.Sqrt(d*d-x*x) - d*d*math.Asin(x/d)
}

// plate is 20 by 10 mm with something cut into the middle of its upper side, given
// from right to left relative to that point.
func plate(cut ...float64) Path {
	p := vertices(0, 0, 0, 20, 0, 0, 20, 10, 0)
	for _, v := range vertices(cut...).Vertices {
		p.Vertices = append(p.Vertices, Vertex{v.P.Add(involute.Vec{X: 10, Y: 10}), v.Bulge})
	}
	p.Vertices = append(p.Vertices, Vertex{P: involute.Vec{Y: 10}})
	return p
}

// A slot of width 2, or a keyhole: the same and a round room of radius 3 at its
// end. Where the slot closes, all behind it is dropped and two arcs meet over its mouth.
func TestOffsetClosesSlots(t *testing.T) {
	slot := plate(1, 0, 0, 1, -5, 0, -1, -5, 0, -1, 0, 0)
	keyhole := plate(1, 0, 0, 1, -2, -math.Tan((math.Pi-math.Asin(1./3))/2), -1, -2, 0, -1, 0, 0)
	for _, d := range []float64{1, 1 + 1e-12, 1 + 1e-8, 1.001, 1.5, 6, 500} {
		for name, p := range map[string]Path{"slot": slot, "keyhole": keyhole} {
			out := offsetOf(t, p, d)
			want := 200 + 60*d + math.Pi*d*d - dip(2, d)
			if math.Abs(out.area()-want) > 1e-9*want {
				t.Errorf("%s, d %g: area %.12g, want %.12g", name, d, out.area(), want)
			}
		}
	}
	for _, d := range []float64{0.01, 0.5, 0.999, 1 - 1e-5} {
		// Open, two quarter disks about the corners of its mouth lie in the band over
		// it. The slot becomes 2 − 2d wide and 5 − d deep.
		around := 200 + 60*d + math.Pi*d*d - (2*d - math.Pi*d*d/2)
		out := offsetOf(t, slot, d)
		want := around - (2-2*d)*(5-d)
		if math.Abs(out.area()-want) > 1e-9*want {
			t.Errorf("open slot, d %g: area %.12g, want %.12g", d, out.area(), want)
		}
		// The room's corners toward the slot are seen from its center at ±a. Outside of
		// that wedge a sector of radius 3 − d is left, in it the triangle less two sectors about its corners.
		a := math.Asin(1. / 3)
		out = offsetOf(t, keyhole, d)
		want = around - (2-2*d)*2 - (3-d)*(3-d)*(math.Pi-a) - 3*math.Cos(a) + d*d*(math.Pi/2-a)
		if math.Abs(out.area()-want) > 1e-9*want {
			t.Errorf("open keyhole, d %g: area %.12g, want %.12g", d, out.area(), want)
		}
	}
}

// A half-round notch of radius 1: its arc shrinks to a point at d = 1, and beyond
// that two arcs about the corners of its mouth meet. A piece under 1e-6 mm may not be
// left, so that close to d = 1 the result is only that good.
func TestOffsetOfVanishingArc(t *testing.T) {
	p := plate(1, 0, -1, -1, 0, 0)
	for _, d := range []float64{0.25, 1 - 1e-4, 1 - 1e-7, 1 - 1e-10, 1, 1 + 1e-10, 1 + 1e-7, 1.2} {
		out := roughOffsetOf(t, p, d)
		slack := 1e-10
		if math.Abs(d-1) < minPiece {
			slack = minPiece
		}
		// Under the new upper side two quarter disks fill the band over the mouth, and a half disk is left below.
		want := 200 + 60*d + math.Pi*d*d - dip(2, max(1, d))
		if d < 1 {
			want = 200 + 60*d + math.Pi*d*d - (2*d - math.Pi*d*d/2) - math.Pi*(1-d)*(1-d)/2
		}
		if math.Abs(out.area()-want) > 10*slack {
			t.Errorf("d %g: area %.12g, want %.12g", d, out.area(), want)
		}
	}
}

// Three moved pieces through one point, or a piece that just vanishes: a slot with
// rounded corners becomes what one with sharp corners becomes once d reaches their
// radius, and a notch with a flat bottom what one without becomes once that is gone.
func TestOffsetWhereArcsJustVanish(t *testing.T) {
	quarter := 1 - math.Sqrt2 // a right-angled concave corner, rounded
	sharp := plate(1, 0, 0, 1, -5, 0, -1, -5, 0, -1, 0, 0)
	round := plate(1, 0, 0, 1, -4.75, quarter, 0.75, -5, 0, -0.75, -5, quarter, -1, -4.75, 0, -1, 0, 0)
	full := plate(1, 0, 0, 1, -4, -1, -1, -4, 0, -1, 0, 0) // one half circle for a bottom
	deep := plate(3, 0, 0, 0, -4, 0, -3, 0, 0)
	flat := plate(3, 0, 0, 0.75, -3, 0, -0.75, -3, 0, -3, 0, 0) // its sides run at 53.13°
	for name, tt := range map[string]struct {
		p, like Path
		d       float64
	}{
		"rounded slot":  {round, sharp, 0.25},
		"full radius":   {full, sharp, 1},
		"flat V":        {flat, deep, 0.75 / math.Tan(math.Asin(0.8)/2)},
		"flat V, wider": {flat, deep, 1.6},
	} {
		for _, more := range []float64{0, 1e-16, 1e-13, 1e-10, 1e-8, 1e-7, 1e-5} {
			for _, d := range []float64{tt.d * (1 + more), tt.d * (1 - more)} {
				out, like := roughOffsetOf(t, tt.p, d), roughOffsetOf(t, tt.like, d)
				if diff := math.Abs(out.area() - like.area()); diff > 1e-9+10*(tt.d-d)*(tt.d-d) {
					t.Errorf("%s, d %.17g: area off by %g", name, d, diff)
				}
			}
		}
	}
}

func TestOffsetRefuses(t *testing.T) {
	square := vertices(0, 0, 0, 2, 0, 0, 2, 2, 0, 0, 2, 0)
	for name, tt := range map[string]struct {
		p   Path
		d   float64
		say string
	}{
		"zero":         {square, 0, "at least 0.001 mm"},
		"negative":     {square, -1, "at least 0.001 mm"},
		"too little":   {square, 1e-4, "at least 0.001 mm"},
		"not a number": {square, math.NaN(), "at least 0.001 mm"},
		"infinite":     {square, math.Inf(1), "at least 0.001 mm"},
		"too much":     {square, 1e6, "nothing is left of the shape"},
		"out of reach": {square, 99999, "within ±100000 mm"},
		"clockwise":    {vertices(0, 0, 0, 0, 2, 0, 2, 2, 0, 2, 0, 0), 1, "clockwise"},
		"no path":      {Path{}, 1, "at least 2 vertices"},
		"crossed":      {vertices(0, 0, 0, 2, 0, 0, 0, 3, 0, 4, 3, 0, 2, 4, 0), 0.1, "cross itself"},
	} {
		if p, err := tt.p.offsetOutward(tt.d); err == nil || !strings.Contains(err.Error(), tt.say) {
			t.Errorf("%s: %v, %v; want an error with %q", name, p, err, tt.say)
		}
	}
}
