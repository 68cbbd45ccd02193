package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
	"pgregory.net/rapid"
)

// vertices makes a path of x, y, bulge triples.
func vertices(v ...float64) Path {
	var p Path
	for i := 0; i+2 < len(v); i += 3 {
		p.Vertices = append(p.Vertices, Vertex{involute.Vec{X: v[i], Y: v[i+1]}, v[i+2]})
	}
	return p
}

// cam is a lopsided plate with lines and arcs of both senses, a bore with a
// keyway, a hole and two reference circles.
func cam(unit inspect.Unit) Outline {
	return Outline{
		Unit:  unit,
		Title: "cam, 25° ± 1 & <test>",
		Contours: []Contour{
			{LayerCut, vertices(
				-20, -10, 0, 15, -10, 0.41421356237309503, 25, 0, 0, 25, 12, -0.2,
				10, 18, 0.05, -12, 21, 0, -20, 8, 0.3)},
			{LayerBore, vertices(
				3, 4.0/3, 0, 7, 4.0/3, 0, 7, -4.0/3, 0, 3, -4.0/3, -0.4,
				0, -4, -0.35, -4, 0, -0.41421356237309503, 0, 4, -0.25)}, // clockwise
		},
		Circles: []Circle{
			{LayerBore, involute.Vec{X: 18, Y: 5}, 2.5},
			{LayerReference, involute.Vec{}, 9.75},
			{LayerReference, involute.Vec{}, 1.0 / 3},
		},
	}
}

// drawPath draws a closed path round a random center, in either sense, with
// lines and arcs whose bulges go up to the limit given.
func drawPath(t *rapid.T, limit float64) Path {
	n := rapid.IntRange(3, 24).Draw(t, "n")
	size := math.Pow(10, rapid.Float64Range(-1, 3).Draw(t, "log size"))
	center := involute.Vec{X: rapid.Float64Range(-500, 500).Draw(t, "x"), Y: rapid.Float64Range(-500, 500).Draw(t, "y")}
	sense := rapid.SampledFrom([]float64{1, -1}).Draw(t, "sense")
	var p Path
	for i := range n {
		angle := sense * 2 * math.Pi * (float64(i) + rapid.Float64Range(-0.3, 0.3).Draw(t, "turn")) / float64(n)
		r := size * rapid.Float64Range(0.5, 1).Draw(t, "r")
		b := rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(-limit, limit)).Draw(t, "bulge")
		p.Vertices = append(p.Vertices, Vertex{center.Add(involute.Polar(r, angle)), b})
	}
	if p.check() != nil { // a rare one whose arcs cancel its area
		t.Skip("no outline")
	}
	return p
}

// drawOutline draws an outline as files hold it: counter-clockwise, arcs up to 90°.
func drawOutline(t *rapid.T) Outline {
	o := Outline{Unit: rapid.SampledFrom([]inspect.Unit{inspect.Millimeter, inspect.Inch}).Draw(t, "unit")}
	for range rapid.IntRange(1, 3).Draw(t, "paths") {
		o.Contours = append(o.Contours, Contour{
			rapid.SampledFrom([]Layer{LayerCut, LayerBore}).Draw(t, "layer"),
			drawPath(t, quarterBulge).counterClockwise()})
	}
	for range rapid.IntRange(0, 3).Draw(t, "circles") {
		o.Circles = append(o.Circles, Circle{
			rapid.SampledFrom([]Layer{LayerCut, LayerBore, LayerReference}).Draw(t, "layer"),
			involute.Vec{X: rapid.Float64Range(-500, 500).Draw(t, "x"), Y: rapid.Float64Range(-500, 500).Draw(t, "y")},
			rapid.Float64Range(0.01, 1000).Draw(t, "r")})
	}
	return o
}

// Differences that count as the same: 1e-9 mm, and a bulge off by 1e-12.
const (
	samePlace = 1e-9
	sameBulge = 1e-12
)

// sameOutline compares two outlines; bulgeSlack is added to sameBulge for an arc of a chord.
func sameOutline(t interface{ Fatalf(string, ...any) }, got, want Outline, bulgeSlack func(v, next Vertex) float64) {
	if got.Unit != want.Unit || len(got.Contours) != len(want.Contours) || len(got.Circles) != len(want.Circles) {
		t.Fatalf("%v, %d contours, %d circles; want %v, %d, %d", got.Unit, len(got.Contours), len(got.Circles), want.Unit, len(want.Contours), len(want.Circles))
	}
	for i, c := range want.Contours {
		g := got.Contours[i]
		if g.Layer != c.Layer || len(g.Path.Vertices) != len(c.Path.Vertices) {
			t.Fatalf("contour %d: layer %s, %d vertices; want %s, %d", i, g.Layer, len(g.Path.Vertices), c.Layer, len(c.Path.Vertices))
		}
		for j, v := range c.Path.Vertices {
			w := g.Path.Vertices[j]
			slack := sameBulge
			if bulgeSlack != nil {
				slack += bulgeSlack(v, c.Path.Vertices[(j+1)%len(c.Path.Vertices)])
			}
			if !(v.P.Sub(w.P).Norm() <= samePlace) || !(math.Abs(v.Bulge-w.Bulge) <= slack) {
				t.Fatalf("contour %d, vertex %d: %+v, want %+v", i, j, w, v)
			}
		}
	}
	for i, c := range want.Circles {
		g := got.Circles[i]
		if g.Layer != c.Layer || !(g.Center.Sub(c.Center).Norm() <= samePlace) || !(math.Abs(g.Radius-c.Radius) <= samePlace) {
			t.Fatalf("circle %d: %+v, want %+v", i, g, c)
		}
	}
}

func TestOutlineCheck(t *testing.T) {
	square := vertices(0, 0, 0, 1, 0, 0, 1, 1, 0, 0, 1, 0)
	contour := func(p Path) Outline { return Outline{Contours: []Contour{{LayerCut, p}}} }
	for _, test := range []struct {
		name string
		o    Outline
		want string // "" for a good one
	}{
		{"square", contour(square), ""},
		{"two semicircles", contour(vertices(-1, 0, 1, 1, 0, 1)), ""},
		{"nothing", Outline{}, "nothing in it"},
		{"unit", Outline{Unit: 7, Circles: []Circle{{LayerBore, involute.Vec{}, 1}}}, "neither mm nor inch"},
		{"layer", Outline{Contours: []Contour{{LayerReference, square}}}, `on layer "REFERENCE"; CUT or BORE`},
		{"circle's layer", Outline{Circles: []Circle{{"BOLTS", involute.Vec{}, 1}}}, `on layer "BOLTS"`},
		{"one vertex", contour(vertices(0, 0, 1)), "at least 2 vertices"},
		{"NaN", contour(vertices(0, 0, 0, math.NaN(), 0, 0, 1, 1, 0)), "vertex 2 at (NaN, 0)"},
		{"infinite bulge", contour(vertices(0, 0, math.Inf(-1), 1, 0, 0, 1, 1, 0)), "vertex 1: bulge -Inf"},
		{"far", contour(vertices(0, 0, 0, 2e5, 0, 0, 1, 1, 0)), "within ±100000 mm"},
		{"far arc", contour(vertices(0, 0, 1e6, 1, 0, 0, 1, 1, 0)), "an arc reaches beyond"},
		{"overflowing bulge", contour(vertices(0, 0, 1e300, 1, 0, 0, 1, 1, 0)), "an arc reaches beyond"},
		{"no length", contour(vertices(0, 0, 0, 1, 0, 0, 1, 1e-7, 0, 0, 1, 0)), "leaving vertex 2 is 1e-07 mm"},
		{"no length at the end", contour(vertices(0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 0)), "leaving vertex 4 is 0 mm"},
		{"no area", contour(vertices(0, 0, 0, 1, 0, 0, 2, 0, 0)), "no area"},
		{"there and back", contour(vertices(0, 0, 0.5, 1, 0, -0.5)), "no area"},
		{"no radius", Outline{Circles: []Circle{{LayerBore, involute.Vec{}, 0}}}, "radius 0 must be"},
		{"NaN radius", Outline{Circles: []Circle{{LayerBore, involute.Vec{}, math.NaN()}}}, "radius NaN must be"},
		{"NaN center", Outline{Circles: []Circle{{LayerBore, involute.Vec{X: math.NaN()}, 1}}}, "center (NaN, 0)"},
	} {
		err := test.o.check()
		if test.want == "" && err != nil || test.want != "" && (err == nil || !strings.Contains(err.Error(), test.want)) {
			t.Errorf("%s: %v, want %q", test.name, err, test.want)
		}
	}
}

// What can't be an outline is refused before the first byte.
func TestWritersRefuse(t *testing.T) {
	for name, o := range map[string]Outline{
		"empty": {},
		"NaN":   {Contours: []Contour{{LayerCut, vertices(0, 0, 0, math.NaN(), 0, 0, 1, 1, 0)}}},
	} {
		var b strings.Builder
		if err := writeDXF(&b, o, FormatDXF); err == nil || b.Len() > 0 {
			t.Errorf("%s: writeDXF wrote %d bytes, %v", name, b.Len(), err)
		}
		if err := writeSVG(&b, o); err == nil || b.Len() > 0 {
			t.Errorf("%s: writeSVG wrote %d bytes, %v", name, b.Len(), err)
		}
	}
	var b strings.Builder
	if err := writeDXF(&b, cam(inspect.Inch), 9); err == nil || b.Len() > 0 {
		t.Errorf("version 9: %v", err)
	}
}

// Writing leaves the caller's paths alone.
func TestWritersDoNotChangeTheOutline(t *testing.T) {
	o := cam(inspect.Inch)
	var b strings.Builder
	if err := writeDXF(&b, o, FormatDXFR12); err != nil {
		t.Fatal(err)
	}
	if err := writeSVG(&b, o); err != nil {
		t.Fatal(err)
	}
	want := cam(inspect.Inch)
	for i, c := range o.Contours {
		for j, v := range c.Path.Vertices {
			if v != want.Contours[i].Path.Vertices[j] {
				t.Fatalf("contour %d, vertex %d is now %+v", i, j, v)
			}
		}
	}
	for i, c := range o.Circles {
		if c != want.Circles[i] {
			t.Fatalf("circle %d is now %+v", i, c)
		}
	}
}

func TestSkippedIsBounded(t *testing.T) {
	var o Outline
	for i := range 1000 {
		o.skip(strings.Repeat("x", i), i)
	}
	total := 0
	for _, s := range o.Skipped {
		total += s.Count
	}
	if len(o.Skipped) > maxSkipped || total != 1000 {
		t.Errorf("%d kinds, %d things", len(o.Skipped), total)
	}
}
