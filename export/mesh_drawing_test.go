package export

import (
	"errors"
	"math"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
	"pgregory.net/rapid"
)

// A drawnMesh is a pair to be drawn, at the tight center distance of nominal
// teeth and wider by more.
type drawnMesh struct {
	name         string
	s1, s2       involute.Spec
	thin1, thin2 float64
	wider        float64 // mm
}

func drawnMeshes() []drawnMesh {
	iso := isoA()
	gear := func(z int, x float64) involute.Spec { return involute.Spec{Teeth: z, Module: 2, Rack: iso, Shift: x} }
	slanted := func(z int, x, beta float64) involute.Spec {
		s := gear(z, x)
		s.Helix = beta * involute.Degree
		return s
	}
	short, relieved, chamfered := gear(20, 0), gear(24, 0), gear(31, 0)
	short.TipDiameter = 39.6 // below the pitch circle
	relieved.Relief = involute.ReliefSpec{Amount: 0.03, Start: 50.5}
	chamfered.TipChamfer = 0.2
	other := gear(31, 0)
	other.Relief = involute.ReliefSpec{Amount: 0.03, Start: 64.5, Parabolic: true}
	return []drawnMesh{
		{"even and odd", gear(20, 0), gear(41, 0), 0.05, 0.05, 0.02},
		{"odd and even", gear(17, 0.3), gear(40, -0.1), 0.03, 0.06, 0},
		{"odd and odd, wide", gear(21, 0), gear(21, 0), 0, 0, 0.5},
		{"12 and 12, shifted", gear(12, 0.5), gear(12, 0.5), 0.02, 0.02, 0.01},
		{"no backlash", gear(18, 0.1), gear(25, 0.2), 0, 0, 0},
		{"undercut", gear(10, 0), gear(40, 0), 0.05, 0.05, 0},
		{"large ratio", gear(14, 0.3), gear(151, 0), 0.05, 0.1, 0.02},
		{"helical", slanted(18, 0.2, 15), slanted(45, -0.1, -15), 0.04, 0.06, 0.03},
		{"helical, steep", slanted(13, 0.1, -35), slanted(16, 0.1, 35), 0.05, 0.05, 0},
		{"pitch point left out", short, gear(40, 0), 0.05, 0.05, 0},
		{"chamfered", chamfered, gear(22, 0), 0.05, 0.05, 0},
		{"relieved", relieved, other, 0.05, 0.05, 0},
		{"too thick", gear(20, 0), gear(41, 0), -0.04, -0.05, 0},
		{"contact lost", gear(10, 0), gear(11, 0), 0.05, 0.05, 1.1},
	}
}

// make returns what is to be drawn.
func (c drawnMesh) make(t testing.TB, tolerance float64) (MeshSpec, involute.Mesh) {
	t.Helper()
	t1, t2 := tooth(t, c.s1, c.thin1), tooth(t, c.s2, c.thin2)
	m, err := involute.NewMesh(t1.Gear, t2.Gear)
	if err != nil {
		t.Fatal(c.name, err)
	}
	a, err := m.TightCenter(t1.NominalThickness(), t2.NominalThickness())
	if err != nil {
		t.Fatal(c.name, err)
	}
	return MeshSpec{
		First:  ContourSpec{Tooth: t1, Fit: FitOptions{Tolerance: tolerance}, Bore: 6, KeyWidth: 2, KeyDepth: 1},
		Second: ContourSpec{Tooth: t2, Fit: FitOptions{Tolerance: tolerance}, Bore: 6},
		Center: a + c.wider, Title: c.name,
	}, m
}

// A standing gear is a contour in place: its pieces near the mesh.
type standing struct {
	pieces []involute.Curve
	turn   float64
	at     involute.Vec
}

// standAt takes the pieces of a contour that come within reach of the point near.
func standAt(p Path, turn float64, at, near involute.Vec, reach float64) standing {
	s := standing{turn: turn, at: at}
	for i := range p.Vertices {
		if c := p.Curve(i); newPlaced(c).distance(near) < reach {
			s.pieces = append(s.pieces, c)
		}
	}
	return s
}

// distance returns how far a point is from the contour, negative where it is inside:
// to the left of the nearest piece, and at a corner to the left of both.
func (s standing) distance(q involute.Vec) float64 {
	least, right := math.Inf(1), false
	for _, c := range s.pieces {
		d := newPlaced(c).distance(q)
		switch side := toTheRight(c, q); {
		case d < least-1e-9:
			least, right = d, side
		case d < least+1e-9:
			right = right || side
		}
	}
	if right {
		return least
	}
	return -least
}

// toTheRight reports whether a point lies to the right of a line or of an arc's circle.
func toTheRight(c involute.Curve, q involute.Vec) bool {
	switch c := c.(type) {
	case involute.Arc:
		return (q.Sub(c.Center).Norm() > c.Radius) == (c.Sweep > 0)
	case involute.Line:
		return c.To.Sub(c.From).Cross(q.Sub(c.From)) < 0
	}
	return false
}

// leading tells the counter-clockwise half of a tooth from the other.
func (s standing) leading(q involute.Vec, teeth int) bool {
	return math.Remainder(q.Sub(s.at).Angle()-s.turn, 2*math.Pi/float64(teeth)) > 0
}

// leastDistances returns the least distance of points on the leading flanks of
// the first gear's teeth from the second gear, and of those on the other flanks.
// Tip lands, which end on both, are left out.
func leastDistances(first, second standing, t involute.Tooth) (leading, trailing float64) {
	const n = 8
	leading, trailing = math.Inf(1), math.Inf(1)
	for _, c := range first.pieces {
		q, _ := c.At(0.5)
		if q.Sub(first.at).Norm() > t.TipDiameter()/2-1e-6 {
			continue
		}
		at := func(u float64) float64 { q, _ := c.At(u); return second.distance(q) }
		best := 0.0
		for i := range n + 1 {
			if u := float64(i) / n; at(u) < at(best) {
				best = u
			}
		}
		_, most := findMaximum(func(u float64) float64 { return -at(u) }, max(0, best-1.0/n), min(1, best+1.0/n))
		if first.leading(q, t.Teeth()) {
			leading = min(leading, -most, at(best))
		} else {
			trailing = min(trailing, -most, at(best))
		}
	}
	return leading, trailing
}

// The gears as drawn, held against each other point by point: the leading flanks of
// the driving gear touch, and behind them is all of the backlash j_bt: more
// where the contact ratio lets no pair of flanks face each other there.
func TestMeshContourTouchesOnOneSide(t *testing.T) {
	for _, c := range drawnMeshes() {
		s, m := c.make(t, 0.001)
		o, reports, err := NewMeshContour(s)
		if err != nil {
			t.Fatal(c.name, err)
		}
		cut, err := o.Cut()
		if err != nil {
			t.Fatal(c.name, err)
		}
		mate, err := o.Mate()
		if err != nil {
			t.Fatal(c.name, err)
		}
		play, err := m.Backlash(s.Center, s.First.Tooth.Thickness(), s.Second.Tooth.Thickness())
		if err != nil {
			t.Fatal(c.name, err)
		}
		pose, err := s.pose()
		if err != nil {
			t.Fatal(c.name, err)
		}
		turn1, turn2 := pose.turns(pose.start)
		near, reach := pose.at(pose.start), 2*s.First.Tooth.TransversePitch()
		first := standAt(cut, turn1, involute.Vec{}, near, reach)
		second := standAt(mate, turn2, involute.Vec{X: s.Center}, near, reach)
		leading, trailing := leastDistances(first, second, s.First.Tooth)
		slack := reports[0].MaxDeviation + reports[1].MaxDeviation + 1e-9
		t.Logf("%s: %.6f before, %.6f behind, j_bt %.6f, deviations %.6f", c.name, leading, trailing, play.Base, slack)
		// The arcs themselves touch; behind them the backlash may be off by both deviations twice.
		if math.Abs(leading) > 2e-6 || trailing < play.Base-2*slack || pose.ratio() > 1.1 && trailing > play.Base+2*slack {
			t.Errorf("%s: %.6f before and %.6f behind, want 0 and %.6f ± %.6f", c.name, leading, trailing, play.Base, 2*slack)
		}
	}
}

// Bores, pins and circles go where their gear goes, and all comes back from a file.
func TestMeshContourHoldsAllOfBothGears(t *testing.T) {
	c := drawnMeshes()[1]
	s, m := c.make(t, 0.001)
	s.Unit, s.First.Pin, s.Second.Pin = inspect.Inch, 3.5, 3.6
	o, reports, err := NewMeshContour(s)
	if err != nil {
		t.Fatal(err)
	}
	pins := onLayer(o, LayerPins)
	if len(pins) != 4 {
		t.Fatalf("%d pins", len(pins))
	}
	for i, c := range pins {
		own, gear := o.Contours[0].Path, i/2
		if gear == 1 {
			own, _ = o.Mate()
		}
		if d := pathDistance(own, c.Center); math.Abs(d-c.Radius) > reports[gear].MaxDeviation+1e-9 {
			t.Errorf("pin %d of radius %g is %.6f from its gear", i, c.Radius, d)
		}
	}
	// The keyway stays in line with a tooth: its floor's middle and the tip land's middle at one angle.
	floor := o.Contours[1].Path.Vertices[1].P.Add(o.Contours[1].Path.Vertices[2].P).Scale(0.5)
	tip := involute.Polar(s.First.Tooth.TipDiameter()/2, floor.Angle())
	if d := pathDistance(o.Contours[0].Path, tip); d > 1e-6 || o.Contours[1].Layer != LayerBore {
		t.Errorf("the keyway points %.6f mm beside a tip", d)
	}
	want := map[float64]bool{}
	dw1, dw2 := m.PitchDiameters(s.Center)
	for _, d := range []float64{dw1, dw2, m.First.BaseDiameter(), m.Second.BaseDiameter(), m.First.TipDiameter(), m.Second.TipDiameter()} {
		want[d] = true
	}
	for _, c := range onLayer(o, LayerReference) {
		delete(want, 2*c.Radius)
	}
	if len(want) > 0 {
		t.Errorf("circles missing: %v", want)
	}
	for _, f := range []Format{FormatDXF, FormatDXFR12, FormatSVG} {
		back := readBack(t, o, f)
		cut, err1 := back.Cut()
		mate, err2 := back.Mate()
		if err := errors.Join(err1, err2); err != nil {
			t.Fatal(f, err)
		}
		own, _ := o.Mate()
		if !near(1e-9, cut.area(), o.Contours[0].Path.area(), mate.area(), own.area()) || len(back.Circles) != len(o.Circles) || len(back.Contours) != len(o.Contours) {
			t.Errorf("%v: %d contours and %d circles came back", f, len(back.Contours), len(back.Circles))
		}
		lo, hi := mate.bounds()
		ownLo, ownHi := own.bounds()
		if lo.Sub(ownLo).Norm()+hi.Sub(ownHi).Norm() > 1e-8 {
			t.Errorf("%v: the second gear reaches from %v to %v, want %v to %v", f, lo, hi, ownLo, ownHi)
		}
	}
}

func TestMeshContourRefuses(t *testing.T) {
	good, _ := drawnMeshes()[0].make(t, 0.001)
	change := func(f func(*MeshSpec)) MeshSpec { s := good; f(&s); return s }
	ring := tooth(t, involute.Spec{Teeth: -60, Module: 2, Rack: isoA()}, 0)
	large := tooth(t, involute.Spec{Teeth: 41, Module: 3, Rack: isoA()}, 0)
	for name, s := range map[string]MeshSpec{
		"apart":        change(func(s *MeshSpec) { s.Center += 4 }),
		"far apart":    change(func(s *MeshSpec) { s.Center = 1e300 }),
		"inside":       change(func(s *MeshSpec) { s.Center = 30 }),
		"no center":    change(func(s *MeshSpec) { s.Center = math.NaN() }),
		"infinite":     change(func(s *MeshSpec) { s.Center = math.Inf(1) }),
		"other module": change(func(s *MeshSpec) { s.Second.Tooth = large }),
		"ring":         change(func(s *MeshSpec) { s.Second.Tooth = ring }),
		"small pin":    change(func(s *MeshSpec) { s.Second.Pin = 0.1 }),
		"no tolerance": change(func(s *MeshSpec) { s.First.Fit.Tolerance = 0 }),
	} {
		if _, _, err := NewMeshContour(s); err == nil {
			t.Errorf("%s: drawn", name)
		} else {
			t.Logf("%s: %v", name, err)
		}
		if _, err := RollingSVG(s); err == nil && name != "small pin" { // which leaves pins out
			t.Errorf("%s: rolls", name)
		}
	}
}

// Wherever on the path of contact, the point lies on the exact flanks of both
// gears, turned as they are said to be, and the turns keep the ratio of the teeth.
func TestPoseTouchesOnExactFlanks(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		beta := rapid.SampledFrom([]float64{0, 0.1, -0.3, 0.6}).Draw(t, "β")
		teeth := func(beta float64) (involute.Tooth, bool) {
			g, err := involute.NewGear(involute.Spec{
				Teeth: rapid.IntRange(9, 160).Draw(t, "z"), Module: rapid.Float64Range(0.3, 10).Draw(t, "m"), Helix: beta,
				Shift: rapid.Float64Range(-0.3, 0.5).Draw(t, "x"), Rack: isoA()})
			if err != nil {
				return involute.Tooth{}, false
			}
			out, err := g.Tooth(g.NominalThickness() - rapid.Float64Range(-0.02, 0.1).Draw(t, "thin")*g.Module())
			return out, err == nil
		}
		t1, ok := teeth(beta)
		if !ok {
			t.Skip("no such gear")
		}
		spec := t1.Spec()
		spec.Helix, spec.Teeth, spec.Shift = -beta, rapid.IntRange(9, 160).Draw(t, "z2"), rapid.Float64Range(-0.2, 0.4).Draw(t, "x2")
		g2, err := involute.NewGear(spec)
		if err != nil {
			t.Skip("no such gear")
		}
		t2, err := g2.Nominal()
		if err != nil {
			t.Skip("no such tooth")
		}
		a := (t1.ReferenceDiameter()+t2.ReferenceDiameter())/2 + rapid.Float64Range(0, 1).Draw(t, "wider")*t1.Module()
		p, err := MeshSpec{First: ContourSpec{Tooth: t1}, Second: ContourSpec{Tooth: t2}, Center: a}.pose()
		if err != nil {
			t.Skip("no contact")
		}
		share := rapid.Float64Range(0.001, 0.999).Draw(t, "share")
		rho := p.from + share*(p.to-p.from)
		turn1, turn2 := p.turns(rho)
		off1 := t1.Profile().Offset(p.at(rho).Rotate(-turn1))
		off2 := t2.Profile().Offset(p.at(rho).Sub(involute.Vec{X: a}).Rotate(-turn2))
		if !(math.Abs(off1)+math.Abs(off2) < 1e-9*a) {
			t.Fatalf("%g and %g off the flanks", off1, off2)
		}
		start1, start2 := p.turns(p.start)
		if d := (turn1-start1)*float64(t1.Teeth()) + (turn2-start2)*float64(t2.Teeth()); math.Abs(d) > 1e-9 {
			t.Fatalf("the turns are %g out of step", d)
		}
	})
}
