package export

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/involute"
)

// flattened returns points of a path, chords within error of its arcs, and their ends.
func flattened(p Path, err float64) [][2]float64 {
	var out [][2]float64
	for i := range p.Vertices {
		from, to, b := p.ends(i)
		q := piece{from, to, b}
		n := 1 // a chord over the angle x lies r·x²/8 off the arc
		if b != 0 {
			n = int(math.Ceil(math.Sqrt(math.Abs(q.sweep()) * q.length() / (8 * err))))
		}
		for k := range n {
			v := from
			if k > 0 {
				v = pieceAt(q, float64(k)/float64(n))
			}
			out = append(out, [2]float64{v.X, v.Y})
		}
	}
	return out
}

// A buffered is a path and what it becomes by our reckoning, for testdata/buffer_shapely.py.
type buffered struct {
	Path     [][2]float64 `json:"path"`
	Distance float64      `json:"distance"`
	Offset   [][2]float64 `json:"offset"`
}

// A bufferedReading is what the script says of one.
type bufferedReading struct {
	Valid, Simple, Left      bool
	Area, Buffer, Difference float64
}

// buffersOf gives the cases to the script.
func buffersOf(t *testing.T, cases []buffered) (got []bufferedReading) {
	t.Helper()
	python := outsidePython(t, "shapely", "python3-shapely")
	file := filepath.Join(t.TempDir(), "cases.json")
	data, err := json.Marshal(cases)
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(file, data, 0o644); err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(outsideRun(t, python, "testdata/buffer_shapely.py", file), &got); err != nil {
		t.Fatal(err)
	}
	if len(got) != len(cases) {
		t.Fatalf("%d answers to %d cases", len(got), len(cases))
	}
	return got
}

// The Python library shapely, given polygons of many points, finds the same outline
// for a spread of gears and distances, and nowhere a crossing.
func TestShapelyBuffersGears(t *testing.T) {
	const chordError = 5e-5 // of a module, as the buffer's with 64 chords to a quarter circle of radius 0.7
	var cases []buffered
	var paths []Path
	var slack []float64
	for _, s := range []involute.Spec{
		{Teeth: 6, Module: 2, Shift: 0.4, Rack: involute.Rack{TipRadius: 0.2}},
		{Teeth: 7, Module: 10, Rack: involute.Rack{TipRadius: 0.38}}, // undercut: the root is wider than its neck
		{Teeth: 12, Module: 0.5, Shift: 0.5, Rack: involute.Rack{TipRadius: 0.3}},
		{Teeth: 17, Module: 5, Rack: involute.Rack{TipRadius: 0.4719}},
		{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.38}, TipChamfer: 0.2},
		{Teeth: 30, Module: 3, Rack: involute.Rack{TipRadius: 0.38}},
	} {
		p, err := gearContour(s, 0.0005*s.Module)
		if err != nil {
			t.Fatal(err)
		}
		for _, share := range []float64{0.01, 0.125, 0.25, 0.4, 1.5} {
			d := share * s.Module
			out := offsetOf(t, p, d)
			e := chordError * s.Module
			cases = append(cases, buffered{flattened(p, e), d, flattened(out, e)})
			paths = append(paths, out)
			// Both polygons and the buffer's arcs, d(1 − cos(π/256)) inside of their circles.
			slack = append(slack, out.length()*(2*e+d*math.Pi*math.Pi/(2*256*256)))
		}
	}
	for i, g := range buffersOf(t, cases) {
		if !g.Valid || !g.Simple || !g.Left {
			t.Errorf("case %d: valid %v, simple %v, counter-clockwise %v", i, g.Valid, g.Simple, g.Left)
		}
		if !(g.Difference >= 0 && g.Difference <= slack[i]) || !near(slack[i], paths[i].area(), g.Buffer, g.Area, g.Buffer) {
			t.Errorf("case %d: area %.9g, as a polygon %.9g, the buffer's %.9g, %.3g in only one of them; slack %.3g",
				i, paths[i].area(), g.Area, g.Buffer, g.Difference, slack[i])
		}
	}
}
