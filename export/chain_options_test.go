package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// signedDistance returns the distance from q to the nearest of the pieces, positive
// where q is to the left of it: where the pieces lie outside of q.
func signedDistance(pieces []piece, q involute.Vec) float64 {
	nearest, signed := math.Inf(1), 0.0
	for _, p := range pieces {
		if q.Sub(p.From).Norm()-p.length() >= nearest {
			continue // none of it is nearer
		}
		d := distanceToPiece(p, q)
		if d >= nearest {
			continue
		}
		nearest = d
		left := p.To.Sub(p.From).Cross(q.Sub(p.From)) > 0
		if arc, ok := (Path{Vertices: []Vertex{{p.From, p.Bulge}, {p.To, 0}}}).Curve(0).(involute.Arc); ok {
			inside := q.Sub(arc.Center).Norm() < arc.Radius
			left = inside == (p.Bulge > 0)
		}
		signed = math.Copysign(d, -1)
		if left {
			signed = d
		}
	}
	return signed
}

// Points of the exact outline, 400 on each curve, are held against all pieces of
// their pitch and its neighbors: no search along rays, no samples shared with the fit.
func TestGearsKeepTheirSideByBruteForce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		pitch, z, tol := drawGear(t)
		o := FitOptions{Tolerance: tol, Side: drawSide(t), Lines: rapid.Bool().Draw(t, "lines")}
		path, r, err := closedPath(pitch, z, o)
		if err != nil {
			t.Fatal(err)
		}
		var pieces []piece
		n := len(path.Vertices)
		for i := -n / z; i < 2*n/z; i++ {
			from, to, b := path.ends((i + n) % n)
			pieces = append(pieces, piece{from, to, b})
		}
		low, high := 0.0, 0.0
		for _, c := range pitch {
			const steps = 400
			t0, t1 := c.Domain()
			for i := range steps + 1 {
				q, _ := c.At(t0 + (t1-t0)*float64(i)/steps)
				d := signedDistance(pieces, q)
				low, high = min(low, d), max(high, d)
			}
		}
		slack := 1e-9
		if low < r.MaxInside-slack || high > r.MaxOutside+slack || r.MaxDeviation > tol {
			t.Errorf("%v: by points %.10f to %.10f mm, reported %.10f to %.10f", o, low, high, r.MaxInside, r.MaxOutside)
		}
		if o.Side == Outside && low < -slack || o.Side == Inside && high > slack {
			t.Errorf("%v: by points %.12f to %.12f mm, on the wrong side", o, low, high)
		}
		// Arcs come as far off as reported, but for peaks between the points. (Lines do so at
		// their vertices, which no curve point need be opposite.)
		if !o.Lines && max(-low, high) < 0.85*r.MaxDeviation-slack {
			t.Errorf("%v: by points %.10f to %.10f mm, reported %.10f", o, low, high, r.MaxDeviation)
		}
	})
}

func TestLinesAreAsManyAsReported(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		pitch, z, tol := drawGear(t)
		o := FitOptions{Tolerance: tol, Side: drawSide(t)}
		_, arcs, err := closedPath(pitch, z, o)
		if err != nil {
			t.Fatal(err)
		}
		o.Lines = true
		_, lines, err := closedPath(pitch, z, o)
		if err != nil {
			t.Fatal(err)
		}
		if lines.Arcs != 0 || lines.Segments > arcs.LinesNeeded || lines.LinesNeeded != arcs.LinesNeeded {
			t.Errorf("%d lines, reported %d and with arcs %d", lines.Segments, lines.LinesNeeded, arcs.LinesNeeded)
		}
	})
}

// A gear whose arcs keep a wide band that straight lines do not: how many lines it
// would take is told all the same, of the closer band that lines do keep.
func TestLinesNeededWhereArcsAloneKeepTheBand(t *testing.T) {
	m := math.Pow(10, 1.7)
	rack := involute.Rack{PressureAngle: 27 * math.Pi / 180, Addendum: 1, Dedendum: 1.25}
	rack.TipRadius = rack.LargestTipRadius()
	g, err := involute.NewGear(involute.Spec{Teeth: 11, Module: m, Shift: 0.0009765625, Rack: rack})
	if err != nil {
		t.Fatal(err)
	}
	tooth, err := g.Tooth(g.NominalThickness() - 0.0166015625*m)
	if err != nil {
		t.Fatal(err)
	}
	var pitch []involute.Curve
	for _, p := range tooth.Outline().Pieces {
		pitch = append(pitch, p)
	}
	o := FitOptions{Tolerance: m / 100, Side: Outside}
	_, arcs, err := closedPath(pitch, 11, o)
	if err != nil {
		t.Fatal(err)
	}
	o.Lines = true
	if _, lines, err := closedPath(pitch, 11, o); err != nil || arcs.LinesNeeded != lines.Segments {
		t.Errorf("with arcs %d lines are said to be needed, with lines %d are (%v)", arcs.LinesNeeded, lines.Segments, err)
	}
}

// Chords on the curve leave it by κh²/8: the lines may not need more than those,
// which a separate program has minimized for these flanks.
func TestLinesBeatChordsOnTheCurve(t *testing.T) {
	for _, tt := range []struct {
		m, z   float64
		chords [4]int
	}{{2, 24, [4]int{15, 9, 5, 3}}, {1, 17, [4]int{11, 7, 4, 3}}, {5, 40, [4]int{19, 12, 6, 4}}} {
		for i, tol := range fewestTolerances {
			ch, err := runOf(t, true, flankOf(tt.m, tt.z)).evenLines(both(tol))
			if err != nil {
				t.Fatal(err)
			}
			if len(ch.Pieces) > tt.chords[i] || ch.deviation() > tol {
				t.Errorf("m %g z %g ±%g: %d lines off by %.6f, chords on the curve: %d", tt.m, tt.z, tol, len(ch.Pieces), ch.deviation(), tt.chords[i])
			}
		}
	}
}

func TestMaxSweep(t *testing.T) {
	pitch := pitchOf(t, involute.Spec{Teeth: 12, Module: 2, Shift: 0.4, Rack: involute.Rack{TipRadius: 0.38}})
	for _, degrees := range []float64{0, 10, 30, 90} {
		path, r, err := closedPath(pitch, 12, FitOptions{Tolerance: 0.005, MaxSweep: degrees * math.Pi / 180})
		if err != nil {
			t.Fatal(err)
		}
		most := degrees
		if most == 0 {
			most = 90
		}
		for i := range path.Vertices {
			from, to, b := path.ends(i)
			if s := math.Abs(piece{from, to, b}.sweep()) * 180 / math.Pi; s > most*(1+1e-8) {
				t.Errorf("at most %g°: an arc of %.9f°", most, s)
			}
		}
		if r.MaxTangentBreakDeg > 0.01 || r.MaxDeviation > 0.005 {
			t.Errorf("at most %g°: %+v", most, r)
		}
	}
}

// A run of fillet and flank whose fewest arcs include a short one: with a shortest
// arc asked for, none is shorter; asked for the impossible, the tolerance wins.
func TestMinArc(t *testing.T) {
	found := false
	rapid.Check(t, func(t *rapid.T) {
		pitch, _, tol := drawGear(t)
		p, err := newPitch(pitch, 1)
		if err != nil {
			t.Skip(err)
		}
		for _, s := range p.sections() {
			if s.exact {
				continue
			}
			r := runOf(t, true, p.curves[s.from:s.to]...)
			plain, err := r.fit(both(tol), 0)
			if err != nil {
				t.Fatal(err)
			}
			asked := 1.1 * plain.shortest()
			ch, err := r.fit(both(tol), asked)
			if err != nil || len(ch.Pieces) > len(plain.Pieces) || ch.deviation() > tol {
				t.Fatalf("%d arcs off by %g mm, %v; want at most %d within %g", len(ch.Pieces), ch.deviation(), err, len(plain.Pieces), tol)
			}
			if ch.shortest() < plain.shortest()*(1-1e-12) {
				t.Errorf("shortest arc %g mm, without the wish %g", ch.shortest(), plain.shortest())
			}
			found = found || ch.shortest() >= asked
			if hopeless, err := r.fit(both(tol), 2*r.length()); err != nil || len(hopeless.Pieces) != len(plain.Pieces) {
				t.Errorf("longer than the run: %d arcs, %v; want %d", len(hopeless.Pieces), err, len(plain.Pieces))
			}
		}
	})
	if !found {
		t.Error("no chain with longer arcs was ever found")
	}
}

// A flank that turns by 0.5° on its way, as tip relief makes it turn: two involutes of
// one base circle, the second turned about the point where they meet.
func kinkedFlank() (first, second involute.Flank) {
	first = involute.Flank{BaseRadius: 20, T0: 0.2, T1: 0.5}
	second = involute.Flank{BaseRadius: 19.8, T1: 0.7}
	p, _ := first.At(first.T1)
	second.T0 = math.Sqrt(p.Dot(p)/(second.BaseRadius*second.BaseRadius) - 1)
	q, _ := second.At(second.T0)
	second.BaseAngle = p.Angle() - q.Angle()
	return first, second
}

func TestKinksAreSmoothedOrKept(t *testing.T) {
	first, second := kinkedFlank()
	r := runOf(t, true, first, second)
	_, before := r.walks[0].pointAndDirection(1)
	_, after := r.walks[1].pointAndDirection(0)
	if kink := math.Abs(turn(before, after)) * 180 / math.Pi; kink < 0.3 || kink > 1.5 {
		t.Fatalf("the test's own kink turns by %.3f°", kink)
	}
	for _, b := range []band{both(0.02), both(0.001), both(1e-4), {0, 0.002}, {-0.002, 0}} {
		ch, err := r.fit(b, 0)
		if err != nil {
			t.Fatal(err)
		}
		if len(ch.Corners) != 0 || ch.Low < b.low-1e-12 || ch.High > b.high+1e-12 {
			t.Errorf("%+v: corners %v, off by %g to %g", b, ch.Corners, ch.Low, ch.High)
		}
		for i, p := range ch.Pieces[1:] {
			_, end := ch.Pieces[i].directions()
			start, _ := p.directions()
			if a := math.Abs(turn(end, start)) * 180 / math.Pi; a > 0.01 {
				t.Errorf("%+v: a break of %.4f°", b, a)
			}
		}
		kept, ok := r.fitBroken(b, 0)
		if !ok || len(kept.Corners) != 1 || kept.Corners[0] != kept.Counts[0] || kept.Low < b.low-1e-12 || kept.High > b.high+1e-12 {
			t.Errorf("%+v kept as a corner: %v, %+v", b, ok, kept)
		}
		if got := kept.splitSweeps(0.02); len(got.Corners) != 1 || got.Pieces[got.Corners[0]].From != kept.Pieces[kept.Corners[0]].From {
			t.Errorf("%+v: the corner is lost where arcs are cut", b)
		}
	}
}

// The last resort keeps any band, on curves with and without a kink.
func TestStripsKeepTheBand(t *testing.T) {
	first, second := kinkedFlank()
	fillet := involute.Fillet{R: 20, CosBeta: 1, Side: 1, H: 1.5, Rho: 0.6, E: 0.2, T1: 1.2}
	for _, r := range []*run{runOf(t, false, first, second), runOf(t, false, fillet), runOf(t, false, flankOf(2, 24))} {
		for _, b := range []band{both(0.02), both(1e-4), {0, 0.02}, {0, 0.001}, {-0.02, 0}, {-0.001, 0}} {
			ch, ok := r.strips(b)
			if !ok || ch.Low < b.low-1e-12 || ch.High > b.high+1e-12 {
				t.Errorf("%+v: %v, %d arcs off by %g to %g", b, ok, len(ch.Pieces), ch.Low, ch.High)
			}
		}
	}
}

// Hundreds of arcs: as many as the law of the pattern says.
func TestFineTolerances(t *testing.T) {
	for _, tt := range []struct{ m, z, tol float64 }{{2, 24, 1e-6}, {50, 100, 1e-5}, {0.1, 1000, 1e-7}, {50, 20, 1e-6}, {50, 20, 6e-8}} {
		c := flankOf(tt.m, tt.z)
		ch, err := runOf(t, true, c).fit(both(tt.tol), 0)
		want := math.Pow(72*math.Sqrt(3)*tt.tol/c.BaseRadius, -1.0/3) * (c.T1 - c.T0)
		if err != nil || float64(len(ch.Pieces)) > math.Ceil(want)+1 {
			t.Errorf("m %g z %g ±%g: %d arcs, %v; the law says %.2f", tt.m, tt.z, tt.tol, len(ch.Pieces), err, want)
		}
	}
}

func TestFitOptionsRefuse(t *testing.T) {
	pitch := pitchOf(t, involute.Spec{Teeth: 24, Module: 2, Rack: involute.Rack{TipRadius: 0.38}})
	for name, tt := range map[string]struct {
		o   FitOptions
		say string
	}{
		"no tolerance":    {FitOptions{}, "above 0"},
		"not a number":    {FitOptions{Tolerance: math.NaN()}, "above 0"},
		"infinite":        {FitOptions{Tolerance: math.Inf(1)}, "above 0"},
		"too fine":        {FitOptions{Tolerance: 1e-12}, "at least"},
		"negative arc":    {FitOptions{Tolerance: 0.001, MinArc: -1}, "shortest arc"},
		"no side":         {FitOptions{Tolerance: 0.001, Side: 3}, "both, outside or inside"},
		"sweep too small": {FitOptions{Tolerance: 0.001, MaxSweep: 1e-5}, "greatest sweep"},
		"sweep too large": {FitOptions{Tolerance: 0.001, MaxSweep: 4}, "greatest sweep"},
	} {
		if _, _, err := closedPath(pitch, 24, tt.o); err == nil || !strings.Contains(err.Error(), tt.say) {
			t.Errorf("%s: %v; want an error with %q", name, err, tt.say)
		}
	}
	for name, tt := range map[string]struct {
		c   involute.Curve
		say string
	}{
		"no length":    {involute.Line{}, "above 0"},
		"two turns":    {involute.Arc{Radius: 1, Sweep: 13}, "at most one"},
		"no sweep":     {involute.Arc{Radius: 1}, "other than 0"},
		"neither":      {flankOf(2, 24), "neither"},
		"empty domain": {involute.Flank{BaseRadius: 10, T0: 1, T1: 1}, "rising"},
		"not finite":   {involute.Flank{BaseRadius: math.Inf(1), T0: 0, T1: 1}, "finite"},
		"a point":      {ellipse{t1: 1}, "not a finite number"},
	} {
		_, err := exactChain(tt.c)
		if tt.say == "rising" || strings.Contains(tt.say, "finite") {
			_, err = newWalk(tt.c)
		}
		if err == nil || !strings.Contains(err.Error(), tt.say) {
			t.Errorf("%s: %v; want an error with %q", name, err, tt.say)
		}
	}
}

// Where a linear relief starts the flank breaks by up to some degrees. The chain
// goes round it within the band and breaks nowhere; corners are at the tips alone.
func TestChainGoesRoundTheStartOfARelief(t *testing.T) {
	for _, c := range []struct {
		z             int
		amount, depth float64 // mm, below the tip
	}{{24, 0.002, 1}, {24, 0.02, 1}, {24, 0.05, 1}, {20, 0.005, 0.8}, {33, 0.02, 0.4}, {33, 0.02, 1.2}, {50, 0.005, 1.2}} {
		spec := involute.Spec{Teeth: c.z, Module: 2, Rack: isoA(), Relief: involute.ReliefSpec{Amount: c.amount, Start: float64(2*c.z+4) - 2*c.depth}}
		tt := tooth(t, spec, 0)
		for _, side := range []Side{Both, Outside, Inside} {
			for _, tol := range []float64{0.0001, 0.0025, 0.01} {
				_, r, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: tol, Side: side}})
				if err != nil {
					t.Fatal(err)
				}
				if r.MaxTangentBreakDeg > 0.01 || r.Corners != 2*c.z || r.MaxDeviation > tol {
					t.Errorf("%+v, %v ±%g: %+v", c, side, tol, r)
				}
			}
		}
	}
}
