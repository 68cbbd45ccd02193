package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
)

// A rollPair is two gears and a center distance.
type rollPair struct {
	name         string
	one, two     involute.Spec
	thin, center float64
}

// spur returns a 20° spur gear.
func spur(z int, module, shift float64) involute.Spec {
	return involute.Spec{Teeth: z, Module: module, Shift: shift, Rack: isoA()}
}

func rollPairs() []rollPair {
	helical := func(z int, helix float64) involute.Spec {
		s := spur(z, 1.5, 0.2)
		s.Helix = helix * involute.Degree
		return s
	}
	return []rollPair{
		{"fixture", spur(18, 25.4/16, 0.25), spur(45, 25.4/16, 0.278), 0.03, 50.8},
		{"equal", spur(24, 2, 0), spur(24, 2, 0), 0.03, 48.05},
		{"wheel drives", spur(40, 2, 0.1), spur(17, 2, 0.2), 0.03, 57.7},
		{"handbook", spur(12, 3, 0.6), spur(24, 3, 0.36), 0.03, 56.5499},
		{"undercut", spur(8, 1, 0.5), spur(30, 1, 0), 0.03, 19.6},
		{"helical, transverse", helical(13, 15), helical(30, -15), 0.02, 34},
		{"one tooth number above", spur(101, 1, 0), spur(102, 1, 0), 0.02, 101.52},
	}
}

func (p rollPair) teeth(t testing.TB) (one, two involute.Tooth, m involute.Mesh) {
	t.Helper()
	one, two = tooth(t, p.one, p.thin), tooth(t, p.two, p.thin)
	m, err := involute.NewMesh(one.Gear, two.Gear)
	if err != nil {
		t.Fatal(p.name, err)
	}
	return one, two, m
}

// Rolled contours show the backlash and the clearances that the gears' closed
// formulas give (ISO 21771:2007, clause 5), within what the fits allow: each
// flank is off by its deviation along the normal at most, which moves the mate by so much
// on the line of action. The transmission error is then at most twice the
// deviations, and vanishes with them.
func TestRolledContours(t *testing.T) {
	for _, p := range rollPairs() {
		one, two, m := p.teeth(t)
		play, err := m.Backlash(p.center, one.Thickness(), two.Thickness())
		if err != nil {
			t.Fatal(err)
		}
		alpha, _ := m.WorkingPressureAngle(p.center)
		tip1, tip2 := m.TipClearances(p.center, one, two)
		for _, tolerance := range []float64{1e-5, 0.0025, 0.01} {
			s1, r1 := drawn(t, one, tolerance)
			s2, r2 := drawn(t, two, tolerance)
			got, err := Roll(s1, s2, p.center)
			if err != nil {
				t.Errorf("%s: %v", p.name, err)
				continue
			}
			dev := r1.MaxDeviation + r2.MaxDeviation
			slack := 2*dev/math.Cos(alpha) + 1e-9
			if math.Abs(got.Backlash.Least-play.Circumferential) > slack || math.Abs(got.Backlash.Greatest-play.Circumferential) > slack || got.Backlash.Least > got.Backlash.Greatest {
				t.Errorf("%s, ±%g: backlash %+v, want %.6f ± %.6f", p.name, tolerance, got.Backlash, play.Circumferential, slack)
			}
			if got.TransmissionError > 2*dev+1e-9 || got.TransmissionError < dev/100 {
				t.Errorf("%s, ±%g: transmission error %.6f, the deviations are %.6f together", p.name, tolerance, got.TransmissionError, dev)
			}
			if math.Abs(got.LeastFlank-play.Base/2) > 2*dev+1e-9 {
				t.Errorf("%s, ±%g: flanks %.6f apart, want %.6f ± %.6f", p.name, tolerance, got.LeastFlank, play.Base/2, 2*dev)
			}
			if math.Abs(got.LeastTipFirst-tip1) > dev+1e-9 || math.Abs(got.LeastTipSecond-tip2) > dev+1e-9 {
				t.Errorf("%s, ±%g: tips %.6f and %.6f, want %.6f and %.6f", p.name, tolerance, got.LeastTipFirst, got.LeastTipSecond, tip1, tip2)
			}
			if got.Interferes || got.LeastClearance != math.Min(got.LeastFlank, math.Min(got.LeastTipFirst, got.LeastTipSecond)) {
				t.Errorf("%s, ±%g: %+v", p.name, tolerance, got)
			}
		}
	}
}

// Worked examples, recomputed. Backlash is not the sum of the thinnings: m 3,
// z 12/24, x 0.6/0.36, each tooth 0.05 mm thinner, at the tight center of nominal
// teeth 56.499870: 0.104629 on the working circle. And a = a_d + m (x₁ + x₂) = 56.88
// gives nominal teeth a backlash of 0.3799.
func TestRolledExamples(t *testing.T) {
	for _, c := range []struct{ thin, center, backlash, digits float64 }{
		{0.05, 56.499870, 0.104629, 5e-7},
		{0, 56.88, 0.3799, 5e-5},
	} {
		p := rollPair{"", spur(12, 3, 0.6), spur(24, 3, 0.36), c.thin, c.center}
		one, two, _ := p.teeth(t)
		s1, r1 := drawn(t, one, 1e-5)
		s2, r2 := drawn(t, two, 1e-5)
		got, err := Roll(s1, s2, c.center)
		if err != nil {
			t.Fatal(err)
		}
		slack := 2*(r1.MaxDeviation+r2.MaxDeviation)/math.Cos(26*involute.Degree) + c.digits
		if math.Abs(got.Backlash.Least-c.backlash) > slack || math.Abs(got.Backlash.Greatest-c.backlash) > slack {
			t.Errorf("at %g: backlash %+v, want %g", c.center, got.Backlash, c.backlash)
		}
	}
}

// Gears that do not fit are told: too near, teeth too thick, and tips so high
// that they cut into roots or into fillets although the flanks have play.
func TestRolledInterference(t *testing.T) {
	high := spur(40, 2, 0)
	high.TipDiameter = 85.8 // 0.9 mm higher than the rack leaves room for
	corner := spur(60, 2, 0)
	corner.TipDiameter = 125
	for _, c := range []struct {
		name        string
		pair        rollPair
		flank, tips bool // which overlap; with tips flanks may or may not
	}{
		{"too near", rollPair{"", spur(24, 2, 0), spur(24, 2, 0), 0.03, 47.7}, true, false},
		{"much too near", rollPair{"", spur(24, 2, 0), spur(24, 2, 0), 0.03, 46.5}, true, true},
		{"tip in root", rollPair{"", spur(17, 2, 0.3), high, 0.2, 57.65}, false, true},
		{"tip corner in fillet", rollPair{"", spur(12, 2, 0), corner, 0.05, 72}, true, false},
	} {
		one, two, m := c.pair.teeth(t)
		if gap, err := m.FilletClearance(c.pair.center, one, two, true); c.name == "tip corner in fillet" && !(gap < 0) {
			t.Fatalf("%s: the gears' own formula leaves %.4f mm, %v", c.name, gap, err)
		}
		s1, _ := drawn(t, one, 0.001)
		s2, _ := drawn(t, two, 0.001)
		got, err := Roll(s1, s2, c.pair.center)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		if !got.Interferes || got.LeastClearance >= 0 {
			t.Errorf("%s: not told: %+v", c.name, got)
		}
		tip1, tip2 := m.TipClearances(c.pair.center, one, two)
		if tips := math.Min(tip1, tip2); (tips < 0) != c.tips || math.Abs(tips-math.Min(got.LeastTipFirst, got.LeastTipSecond)) > 0.001 {
			t.Errorf("%s: tips %.4f, measured %+v", c.name, tips, got)
		}
		if (got.LeastFlank < 0) != (got.Backlash.Least < 0) || (got.LeastFlank < 0) != c.flank && !c.tips {
			t.Errorf("%s: %+v", c.name, got)
		}
	}
}

// What cannot be rolled is refused in words.
func TestRollRefuses(t *testing.T) {
	one, _ := drawn(t, tooth(t, spur(24, 2, 0), 0), 0.0025)
	two, _ := drawn(t, tooth(t, spur(17, 2, 0.2), 0), 0.0025)
	for _, c := range []struct {
		center float64
		want   string
	}{
		{0, "above 0"}, {-40, "above 0"}, {math.NaN(), "above 0"}, {math.Inf(1), "above 0"},
		{60, "do not reach"}, {45.3, "closer"}, {20, "external"},
	} {
		r, err := Roll(one, two, c.center)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("center %g: %v, want %q; %+v", c.center, err, c.want, r)
		}
	}
}

// Short tips break the contact off before the next teeth take over: the gears
// run on corners for a while and lag by more than any fit.
func TestRollOnTipCorners(t *testing.T) {
	short := spur(20, 2, 0)
	short.TipDiameter = 41.2 // a tenth of the usual addendum is left of each
	p := rollPair{"", short, short, 0.02, 40.02}
	one, two, m := p.teeth(t)
	contact, err := m.Contact(p.center, one, two)
	if err != nil || contact.TransverseRatio >= 0.9 {
		t.Fatalf("contact ratio %g, %v", contact.TransverseRatio, err)
	}
	s1, r1 := drawn(t, one, 1e-4)
	s2, r2 := drawn(t, two, 1e-4)
	got, err := Roll(s1, s2, p.center)
	if err != nil {
		t.Fatal(err)
	}
	if got.TransmissionError < 20*(r1.MaxDeviation+r2.MaxDeviation) {
		t.Errorf("contact ratio %.3f and a transmission error of %.6f only", contact.TransverseRatio, got.TransmissionError)
	}
}

// A vertex moved by 0.01 mm round the gear stands out of the flank by 0.01 cos α
// there, and lifts the mate by that on the line of action.
func TestRollSeesAMovedVertex(t *testing.T) {
	p := rollPairs()[1]
	one, two, _ := p.teeth(t)
	whole, r1 := drawn(t, one, 1e-4)
	mate, r2 := drawn(t, two, 1e-4)
	sound, err := Roll(whole, mate, p.center)
	if err != nil {
		t.Fatal(err)
	}
	// The pushing side of the tooth before the space rolled, halfway up.
	vs := append([]Vertex(nil), whole.path.Vertices...)
	at := whole.flanks[1].piece
	r := vs[at].P.Norm()
	vs[at].P = vs[at].P.Rotate(0.01 / r)
	damaged, err := NewSection(Path{Vertices: vs}, 0)
	if err != nil {
		t.Fatal(err)
	}
	got, err := Roll(damaged, mate, p.center)
	if err != nil {
		t.Fatal(err)
	}
	out, slack := 0.01*one.BaseDiameter()/2/r, 3*(r1.MaxDeviation+r2.MaxDeviation)
	if math.Abs(got.TransmissionError-out) > slack {
		t.Errorf("transmission error %.6f, a vertex stands out by %.6f ± %.6f", got.TransmissionError, out, slack)
	}
	if lost := (sound.Backlash.Least - got.Backlash.Least) * two.BaseDiameter() / p.center; math.Abs(lost-out) > slack {
		t.Errorf("backlash along the line of action falls by %.6f, a vertex stands out by %.6f ± %.6f", lost, out, slack)
	}
}
