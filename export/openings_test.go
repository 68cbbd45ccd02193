package export

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
	"pgregory.net/rapid"
)

// drawOpenings draws what may be inside a gear's teeth, without minding whether it overlaps.
func drawOpenings(t *rapid.T) ContourSpec {
	s := ContourSpec{Unit: rapid.SampledFrom([]inspect.Unit{inspect.Millimeter, inspect.Inch}).Draw(t, "unit")}
	s.Bore = rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(1, 300)).Draw(t, "bore")
	if s.Bore > 0 && rapid.Bool().Draw(t, "keyway") {
		s.KeyWidth = s.Bore * rapid.Float64Range(0.05, 0.9).Draw(t, "width")
		s.KeyDepth = s.Bore * rapid.Float64Range(0.02, 0.5).Draw(t, "depth")
	}
	if n := rapid.IntRange(0, 12).Draw(t, "holes"); n > 0 {
		s.Bolts = BoltCircle{
			Diameter: rapid.Float64Range(5, 500).Draw(t, "circle"), Holes: n,
			Hole:  rapid.Float64Range(0.5, 40).Draw(t, "hole"),
			Start: rapid.Float64Range(-2*math.Pi, 2*math.Pi).Draw(t, "start"),
		}
	}
	s.Hub = rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(1, 400)).Draw(t, "hub")
	return s
}

// What is inside the teeth comes back from every kind of file in its place.
func TestOpeningsComeBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawOpenings(t)
		o := Outline{Unit: s.Unit, Circles: []Circle{{LayerReference, involute.Vec{}, 500}}}
		o.openings(s)
		for _, f := range []Format{FormatDXF, FormatDXFR12, FormatSVG} {
			back := readBack(t, o, f)
			const asWritten = 2e-9 // mm: the decimals of a file
			if off, err := s.CheckOpenings(back); err != nil || off > asWritten {
				t.Fatalf("%v of %+v: off by %g, %v", f, s, off, err)
			}
		}
	})
}

// A shape that is moved, turned, of another size, missing or too many is found.
func TestOpeningsOffAreFound(t *testing.T) {
	whole := ContourSpec{Bore: 20, KeyWidth: 6, KeyDepth: 2.8, Hub: 40, Bolts: BoltCircle{Diameter: 60, Holes: 6, Hole: 8, Start: 0.5}}
	const a = 2e-6 // mm, twice what is allowed
	for name, change := range map[string]func(s *ContourSpec){
		"no bore":        func(s *ContourSpec) { s.Bore = 0 },
		"bore":           func(s *ContourSpec) { s.Bore += 2 * a },
		"no keyway":      func(s *ContourSpec) { s.KeyWidth = 0 },
		"key width":      func(s *ContourSpec) { s.KeyWidth -= 2 * a },
		"key depth":      func(s *ContourSpec) { s.KeyDepth += a },
		"no hub":         func(s *ContourSpec) { s.Hub = 0 },
		"hub":            func(s *ContourSpec) { s.Hub += 2 * a },
		"no holes":       func(s *ContourSpec) { s.Bolts = BoltCircle{} },
		"a hole less":    func(s *ContourSpec) { s.Bolts.Holes-- },
		"larger holes":   func(s *ContourSpec) { s.Bolts.Hole += 2 * a },
		"larger circle":  func(s *ContourSpec) { s.Bolts.Diameter += 2 * a },
		"turned":         func(s *ContourSpec) { s.Bolts.Start += a / 30 },
		"turned by half": func(s *ContourSpec) { s.Bolts.Start += math.Pi / 6 },
	} {
		other := whole
		change(&other)
		var drawn Outline
		drawn.openings(other)
		if off, err := whole.CheckOpenings(drawn); err == nil {
			t.Errorf("%s: not found, off by %g", name, off)
		}
	}
	var drawn Outline
	drawn.openings(whole)
	if off, err := whole.CheckOpenings(drawn); err != nil || off > 1e-12 {
		t.Errorf("itself: off by %g, %v", off, err)
	}
	for i, c := range drawn.Circles {
		if c.Layer == LayerHoles {
			drawn.Circles[i] = drawn.Circles[i+1] // two holes in one place, none in the other
			break
		}
	}
	if _, err := whole.CheckOpenings(drawn); err == nil {
		t.Error("two holes in one place: not found")
	}
	// a keyway turned a quarter, of the right size
	drawn = Outline{}
	drawn.openings(whole)
	for i, v := range drawn.Contours[0].Path.Vertices {
		drawn.Contours[0].Path.Vertices[i].P = v.P.Left()
	}
	if _, err := whole.CheckOpenings(drawn); err == nil {
		t.Error("turned keyway: not found")
	}
}

// The area of a bore with its keyway by the closed form: the circle without the
// strip |y| < w/2 of its half x > 0, which is w/2·√(r² − w²/4) + r²·asin(w/2r), and
// the rectangle from the axis to the keyway's bottom in its place.
func TestBoreArea(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawOpenings(t)
		if s.Bore == 0 {
			return
		}
		r, h := s.Bore/2, s.KeyWidth/2
		want := math.Pi * r * r
		if h > 0 {
			want += 2*h*(r+s.KeyDepth) - (h*math.Sqrt(r*r-h*h) + r*r*math.Asin(h/r))
		}
		if got := BorePath(s).area(); math.Abs(got-want) > 1e-12*want {
			t.Fatalf("%+v: area %.15g, want %.15g", s, got, want)
		}
	})
}

// Another reader finds the holes on their layer: as many, of their size, each on
// the circle, D·sin(π/n) from the next one, the first at its angle; and the hub.
func TestOutsideReaderFindsTheHoles(t *testing.T) {
	python := outsidePython(t, "ezdxf", "python3-ezdxf")
	s := ContourSpec{Unit: inspect.Inch, Bore: 25.4, Hub: 44.45, Bolts: BoltCircle{Diameter: 63.5, Holes: 7, Hole: 7.9375, Start: 0.3}}
	o := Outline{Unit: s.Unit}
	o.openings(s)
	for _, f := range []Format{FormatDXF, FormatDXFR12} {
		data, err := f.Encode(o)
		if err != nil {
			t.Fatal(err)
		}
		path := filepath.Join(t.TempDir(), "flange.dxf")
		if err := os.WriteFile(path, data, 0o644); err != nil {
			t.Fatal(err)
		}
		var found map[string][][3]float64
		out := outsideRun(t, python, "-c", `
import ezdxf, json, sys
found = {}
for c in ezdxf.readfile(sys.argv[1]).modelspace().query("CIRCLE"):
    found.setdefault(c.dxf.layer, []).append([c.dxf.center.x, c.dxf.center.y, c.dxf.radius])
print(json.dumps(found))`, path)
		if err := json.Unmarshal(out, &found); err != nil {
			t.Fatal(err)
		}
		holes := found["HOLES"]
		if len(holes) != 7 || len(found["HUB"]) != 1 || len(found["BORE"]) != 1 {
			t.Fatalf("%v: %v", f, found)
		}
		if got := found["HUB"][0]; got != [3]float64{0, 0, 0.875} {
			t.Errorf("%v: hub %v", f, got)
		}
		for k, h := range holes {
			next := holes[(k+1)%7]
			chord := math.Hypot(next[0]-h[0], next[1]-h[1])
			if math.Abs(math.Hypot(h[0], h[1])-1.25) > 1e-9 || math.Abs(h[2]-0.15625) > 1e-9 || math.Abs(chord-2.5*math.Sin(math.Pi/7)) > 1e-9 {
				t.Errorf("%v: hole %d: %v, chord %v", f, k, h, chord)
			}
		}
		if first := math.Atan2(holes[0][1], holes[0][0]); math.Abs(first-0.3) > 1e-9 {
			t.Errorf("%v: first hole at %v", f, first)
		}
	}
}
