package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// pitchOf returns one pitch of the outline of a 20° gear.
func pitchOf(t rapid.TB, s involute.Spec) []involute.Curve {
	t.Helper()
	s.Rack.PressureAngle, s.Rack.Addendum, s.Rack.Dedendum = 20*math.Pi/180, 1, 1.25
	g, err := involute.NewGear(s)
	if err != nil {
		t.Fatal(err)
	}
	tooth, err := g.Nominal()
	if err != nil {
		t.Fatal(err)
	}
	var cs []involute.Curve
	for _, p := range tooth.Outline().Pieces {
		cs = append(cs, p)
	}
	return cs
}

// sectorArea integrates (p × dp)/2 over a curve by Simpson's rule.
func sectorArea(c involute.Curve) float64 {
	const n = 2000
	t0, t1 := c.Domain()
	h := (t1 - t0) / n
	sum := 0.0
	for i := range n + 1 {
		p, dp := c.At(t0 + float64(i)*h)
		weight := 2.0 + 2*float64(i%2)
		if i == 0 || i == n {
			weight = 1
		}
		sum += weight * p.Cross(dp)
	}
	return sum * h / 6
}

// checkGearPath fails unless the path is a closed outline with the area, the
// starting point, the symmetry and the report it must have.
func checkGearPath(t rapid.TB, pitch []involute.Curve, z int, o FitOptions) (Path, FitReport) {
	t.Helper()
	tol := o.Tolerance
	path, r, err := closedPath(pitch, z, o)
	if err != nil {
		t.Fatal(err)
	}
	if err := path.check(); err != nil {
		t.Fatal(err)
	}
	if r.MaxDeviation > tol || r.Arcs+r.Lines != r.Segments || r.Segments != len(path.Vertices) {
		t.Errorf("±%g: %+v for %d vertices", tol, r, len(path.Vertices))
	}
	want := 0.0
	for _, c := range pitch {
		want += float64(z) * sectorArea(c)
	}
	// The path lies in a band of the deviation on both sides of the outline.
	if d := math.Abs(path.area() - want); d > r.MaxDeviation*path.length()+1e-10*want {
		t.Errorf("area off by %g mm² of %g, deviation %g over %g mm", d, want, r.MaxDeviation, path.length())
	}
	// Turned by any pitch, and mirrored in the first root's center line, the path is itself.
	start := path.Vertices[0].P
	if a := start.Angle() + math.Pi/float64(z); math.Abs(math.Remainder(a, 2*math.Pi)) > 1e-6 {
		t.Errorf("starts at %.9f rad, %.2g off the root center", start.Angle(), a)
	}
	axis := start.Angle()
	n := len(path.Vertices)
	for i := range path.Vertices {
		from, to, b := path.ends(i)
		back := mirrored([]piece{{from, to, b}}, axis)[0]
		mFrom, mTo, mB := path.ends(n - 1 - i)
		if d := max(back.From.Sub(mFrom).Norm(), back.To.Sub(mTo).Norm()); d > 1e-9*start.Norm() || math.Abs(back.Bulge-mB) > 1e-9 {
			t.Fatalf("piece %d and its mirror image differ by %g mm, bulges %g and %g", i, d, b, mB)
		}
	}
	return path, r
}

func TestGearPaths(t *testing.T) {
	for name, tt := range map[string]struct {
		spec    involute.Spec
		corners int // a pitch
	}{
		"plain":          {involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.38}}, 2},
		"undercut":       {involute.Spec{Teeth: 8, Module: 2, Rack: involute.Rack{TipRadius: 0.38}}, 4},
		"shifted":        {involute.Spec{Teeth: 12, Module: 3, Shift: 0.6, Rack: involute.Rack{TipRadius: 0.38}}, 2},
		"chamfered":      {involute.Spec{Teeth: 30, Module: 2, TipChamfer: 0.2, Rack: involute.Rack{TipRadius: 0.38}}, 4},
		"sharp rack tip": {involute.Spec{Teeth: 30, Module: 50, Rack: involute.Rack{}}, 2},
		"tiny":           {involute.Spec{Teeth: 20, Module: 0.1, Rack: involute.Rack{TipRadius: 0.2}}, 2},
		"full radius":    {involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.4719}}, 2},
		"helical":        {involute.Spec{Teeth: 24, Module: 2, Helix: 0.5, Rack: involute.Rack{TipRadius: 0.3}}, 2},
	} {
		t.Run(name, func(t *testing.T) {
			for _, share := range []float64{0.0001, 0.001, 0.01} {
				_, r := checkGearPath(t, pitchOf(t, tt.spec), tt.spec.Teeth, FitOptions{Tolerance: share * tt.spec.Module})
				if r.Corners != tt.corners*tt.spec.Teeth {
					t.Errorf("%d corners, want %d a pitch", r.Corners, tt.corners)
				}
				if r.MaxTangentBreakDeg > 0.01 {
					t.Errorf("a break of %.4f° that is no corner", r.MaxTangentBreakDeg)
				}
				if r.LinesNeeded < 2*r.Segments && share < 0.01 {
					t.Errorf("%d chords against %d pieces", r.LinesNeeded, r.Segments)
				}
			}
		})
	}
}

func TestGearPathsOfAnySpec(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := involute.Spec{
			Teeth:  rapid.IntRange(10, 150).Draw(t, "z"),
			Module: drawModule(t),
			Shift:  rapid.Float64Range(0, 0.3).Draw(t, "x"),
			Rack:   involute.Rack{TipRadius: rapid.Float64Range(0, 0.38).Draw(t, "rho")},
		}
		checkGearPath(t, pitchOf(t, s), s.Teeth, FitOptions{
			Tolerance: drawTolerance(t, s.Module), Side: drawSide(t), Lines: rapid.Bool().Draw(t, "lines"),
		})
	})
}

// A square with rounded corners, turned four times a quarter: side 10, radius 1.
// Each quarter arc stays an arc, each side a line.
func TestRoundedSquare(t *testing.T) {
	pitch := []involute.Curve{
		involute.Line{From: involute.Vec{X: 5, Y: -4}, To: involute.Vec{X: 5, Y: 4}},
		involute.Arc{Center: involute.Vec{X: 4, Y: 4}, Radius: 1, Sweep: math.Pi / 2},
	}
	path, r, err := closedPath(pitch, 4, FitOptions{Tolerance: 0.001})
	if err != nil {
		t.Fatal(err)
	}
	if r.Segments != 9 || r.Arcs != 4 || r.Lines != 5 || r.Corners != 0 || math.Abs(r.MinRadius-1) > 1e-12 ||
		math.Abs(r.MaxRadius-1) > 1e-12 || math.Abs(r.ShortestArc-math.Pi/2) > 1e-12 || r.MaxTangentBreakDeg > 1e-10 {
		t.Errorf("%+v", r)
	}
	// Between vertices 0.001 outside of an arc of radius 1 a line that dips 0.001 inside
	// sweeps 2·acos(0.999/1.001), from a vertex on the arc half of that and acos 0.999.
	// The first side is halved, since the path starts in its middle.
	whole := 2 * math.Acos(0.999/1.001)
	first := whole/2 + math.Acos(0.999)
	if want := 4*(1+2+int(math.Ceil((math.Pi/2-2*first)/whole))) + 1; r.LinesNeeded != want {
		t.Errorf("%d chords, want %d", r.LinesNeeded, want)
	}
	if want := 100 - 4 + math.Pi; math.Abs(path.area()-want) > 1e-10 {
		t.Errorf("area %.12f, want %.12f", path.area(), want)
	}
	if p := path.Vertices[0].P; p != (involute.Vec{X: 5}) {
		t.Errorf("starts at %v, want the middle of the first side", p)
	}
}

func TestClosedPathLeavesOutLandsWithoutLength(t *testing.T) {
	pitch := pitchOf(t, involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.38}})
	_, want, err := closedPath(pitch, 24, FitOptions{Tolerance: 0.001})
	if err != nil {
		t.Fatal(err)
	}
	end := involute.Arc{Radius: 26, Start: 0.3}
	corner, _ := pitch[3].At(0)
	end.Start, end.Radius = corner.Angle(), corner.Norm()
	with := append(append(append([]involute.Curve(nil), pitch[:3]...), end), pitch[3:]...)
	if _, r, err := closedPath(with, 24, FitOptions{Tolerance: 0.001}); err != nil || r.Segments != want.Segments {
		t.Errorf("%d pieces, %v; want %d", r.Segments, err, want.Segments)
	}
}

func TestClosedPathRefuses(t *testing.T) {
	pitch := pitchOf(t, involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.38}})
	for name, tt := range map[string]struct {
		pitch []involute.Curve
		count int
		say   string
	}{
		"no pitch":     {nil, 24, "without curves"},
		"no count":     {pitch, 0, "at least 1"},
		"wrong count":  {pitch, 23, "ends must meet"},
		"curve missed": {append(append([]involute.Curve(nil), pitch[:2]...), pitch[3:]...), 24, "curve 2 of the pitch ends at"},
		"not a number": {[]involute.Curve{involute.Arc{Radius: math.NaN(), Sweep: 1}}, 24, "curve 1"},
	} {
		if p, _, err := closedPath(tt.pitch, tt.count, FitOptions{Tolerance: 0.001}); err == nil || !strings.Contains(err.Error(), tt.say) {
			t.Errorf("%s: %d vertices, %v; want an error with %q", name, len(p.Vertices), err, tt.say)
		}
	}
}

func BenchmarkFit(b *testing.B) {
	s := involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{PressureAngle: 20 * math.Pi / 180, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}}
	g, err := involute.NewGear(s)
	if err != nil {
		b.Fatal(err)
	}
	tooth, err := g.Nominal()
	if err != nil {
		b.Fatal(err)
	}
	var pitch []involute.Curve
	for _, p := range tooth.Outline().Pieces {
		pitch = append(pitch, p)
	}
	var r FitReport
	for b.Loop() {
		if _, r, err = closedPath(pitch, 24, FitOptions{Tolerance: 0.0025}); err != nil {
			b.Fatal(err)
		}
	}
	b.ReportMetric(float64(r.ArcsPerFlank), "arcs/flank")
	b.ReportMetric(float64(r.Segments), "pieces")
	b.ReportMetric(float64(r.LinesNeeded)/float64(r.Segments), "lines/piece")
}
