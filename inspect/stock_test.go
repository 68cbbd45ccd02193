package inspect

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

func micrometer(from, to float64) Gauge {
	return Gauge{Name: "micrometer", Range: Limits{from, to}, Uncertainty: 0.004, Face: Face{Kind: FlatAnvil, Diameter: 6.5}}
}

func discs(from, to, thick float64) Gauge {
	return Gauge{Name: "discs", Range: Limits{from, to}, Uncertainty: 0.004, Face: Face{DiscAnvil, 25, thick, 8}}
}

// pinsOf makes pins that are measured and as large as they should be.
func pinsOf(count int, sizes ...float64) []Pin {
	var out []Pin
	for _, d := range sizes {
		out = append(out, Pin{Nominal: d, Diameter: d, Measured: true, Known: true, Count: count})
	}
	return out
}

// Sizes of several tables are one size, pins and balls are two, and the pins known best come first.
func TestSizes(t *testing.T) {
	s := Stock{Pins: []Pin{
		{Nominal: 3.5, Diameter: 3.5, Count: 2},
		{Nominal: 3.175, Diameter: 3.175, Off: Limits{-0.005, 0}, Known: true, Count: 1},
		{Nominal: 3.5, Diameter: 3.4993, Measured: true, Known: true, Count: 1},
		{Nominal: 0.125 * 25.4, Diameter: 3.176, Measured: true, Known: true, Count: 1},
		{Ball: true, Nominal: 3.5, Diameter: 3.5, Count: 40},
	}}
	sizes := s.Sizes(false)
	if len(sizes) != 2 || sizes[0].Count != 2 || sizes[1].Count != 3 || len(s.Sizes(true)) != 1 || s.Sizes(true)[0].Count != 40 {
		t.Fatalf("%+v", sizes)
	}
	two, ok := sizes[0].Pick(involute.TwoPins)
	if !ok || !two.Pins[0].Measured || math.Abs(two.Diameter-(3.175+3.176)/2) > 1e-12 || math.Abs(two.Off.Min+0.0025) > 1e-12 || !two.Known || two.Alike() {
		t.Errorf("one measured, one of a class: %+v", two)
	}
	three, ok := sizes[1].Pick(involute.ThreePins)
	if !ok || math.Abs(three.Diameter-(3.4993/2+3.5/2)) > 1e-12 || three.Known {
		t.Errorf("three: %+v", three)
	}
	if _, ok := sizes[0].Pick(involute.ThreePins); ok {
		t.Error("three taken of two")
	}
	if one, ok := sizes[1].Pick(involute.PinToAxis); !ok || one.Diameter != 3.4993 || !one.Alike() {
		t.Errorf("one: %+v", one)
	}
}

// Pins that differ, laid into their spaces by plane geometry, read what the mean
// pin reads: over two, and over three between flat anvils that tip to touch both neighbors.
func TestUnlikePinsReadTheirMean(t *testing.T) {
	const small, large, third = 3.495, 3.505, 3.498
	for _, z := range []int{17, 20, 43} {
		g := spur(t, 2, z, 0.1)
		tooth, err := g.Nominal()
		if err != nil {
			t.Fatal(err)
		}
		center := func(d, angle float64) involute.Vec {
			seat, err := tooth.Seat(d)
			if err != nil {
				t.Fatal(err)
			}
			return involute.Polar(seat.CenterDiameter/2, angle)
		}
		read := func(m OverPins) float64 {
			v, err := m.Of(tooth)
			if err != nil {
				t.Fatal(err)
			}
			return v
		}
		pins := PinSize{Nominal: 3.5, pins: pinsOf(1, large, small, third)}
		a, b := center(large, 0), center(small, 2*math.Pi/float64(z)*float64(z/2))
		two := a.Sub(b).Norm() + (large+small)/2
		if mean, _ := pins.Pick(involute.TwoPins); math.Abs(read(OverPins{Pin: mean.Diameter})-two) > 1e-5 {
			t.Errorf("z %d: two pins read %.6f, their mean %.6f", z, two, read(OverPins{Pin: mean.Diameter}))
		}
		if z%2 == 0 {
			continue
		}
		// the single one, and the two opposite it
		c, d := center(small, math.Pi*(1-1/float64(z))), center(third, math.Pi*(1+1/float64(z)))
		// the anvil's normal n, with n·c + small/2 = n·d + third/2
		along := d.Sub(c)
		sin := (small - third) / 2 / along.Norm()
		n := along.Scale(sin / along.Norm()).Sub(along.Left().Scale(math.Sqrt(1-sin*sin) / along.Norm()))
		if n.Dot(c) < 0 {
			n = along.Scale(sin / along.Norm()).Add(along.Left().Scale(math.Sqrt(1-sin*sin) / along.Norm()))
		}
		three := n.Dot(c) + small/2 - (n.Dot(a) - large/2)
		mean, _ := pins.Pick(involute.ThreePins)
		if math.Abs(n.Dot(d)+third/2-n.Dot(c)-small/2) > 1e-12 || math.Abs(read(OverPins{Pin: mean.Diameter, Way: involute.ThreePins})-three) > 1e-4 {
			t.Errorf("z %d: three pins read %.6f, their mean %.6f", z, three, read(OverPins{Pin: mean.Diameter, Way: involute.ThreePins}))
		}
	}
}

// The nearest usable size that there are two of and that a micrometer reads: m 2,
// z 20, ideal pin 3.41, M 44.93 for 3.5 (trap 20).
func TestChoosePins(t *testing.T) {
	g := spur(t, 2, 20, 0)
	q := Subject{Gear: g, Thickness: Limits{g.NominalThickness() - 0.05, g.NominalThickness()}, Bore: 15}
	mics := []Gauge{micrometer(25, 50), {Name: "caliper", Caliper: true, Range: Limits{0, 150}, Uncertainty: 0.02}}
	for _, c := range []struct {
		name   string
		stock  Stock
		size   float64 // 0: nothing is taken
		way    involute.PinWay
		gauge  string
		passed PassReason // -1: none
	}{
		{"nearest", Stock{Pins: pinsOf(2, 2.8, 3.4, 3.5, 4), Gauges: mics}, 3.4, involute.TwoPins, "micrometer", -1},
		{"only one of the nearest", Stock{Pins: append(pinsOf(2, 3.5), pinsOf(1, 3.4)...), Gauges: mics}, 3.5, involute.TwoPins, "micrometer", TooFew},
		{"one of two tables each", Stock{Pins: append(pinsOf(1, 3.4, 3.5), pinsOf(1, 3.4)...), Gauges: mics}, 3.4, involute.TwoPins, "micrometer", -1},
		{"the nearest stands under the tips", Stock{Pins: pinsOf(2, 2.8, 5), Gauges: mics[1:]}, 5, involute.TwoPins, "caliper", Unfit},
		{"off the micrometer", Stock{Pins: pinsOf(2, 3.4, 4), Gauges: []Gauge{micrometer(46, 60), mics[1]}}, 4, involute.TwoPins, "micrometer", OffGauges},
		{"no gauge at all", Stock{Pins: pinsOf(2, 3.4)}, 3.4, involute.TwoPins, "", -1},
		{"single ones", Stock{Pins: pinsOf(1, 3.4, 3.6), Gauges: mics}, 3.4, involute.PinToFarSide, "caliper", -1},
		{"single ones, no caliper", Stock{Pins: pinsOf(1, 3.4, 3.6), Gauges: mics[:1]}, 3.4, involute.PinToAxis, "", -1},
		{"nothing fits", Stock{Pins: pinsOf(4, 1, 2), Gauges: mics}, 0, 0, "", Unfit},
		{"nothing there", Stock{Gauges: mics}, 0, 0, "", -1},
	} {
		got := c.stock.ChoosePins(q)
		if c.size == 0 {
			if len(got.Takes) > 0 || (got.Passed != nil) != (c.passed >= 0) {
				t.Errorf("%s: %+v", c.name, got)
			}
			continue
		}
		if len(got.Takes) == 0 {
			t.Errorf("%s: nothing taken", c.name)
			continue
		}
		best, gauge := got.Takes[0], ""
		if best.Gauge != nil {
			gauge = best.Gauge.Name
		}
		if best.Size.Nominal != c.size || best.Way != c.way || gauge != c.gauge {
			t.Errorf("%s: Ø%v in way %v by %q", c.name, best.Size.Nominal, best.Way, gauge)
		}
		if passed := got.Passed; (passed != nil) != (c.passed >= 0) || passed != nil && passed.Reason != c.passed {
			t.Errorf("%s: passed over %+v", c.name, passed)
		}
	}
	arbor := q
	arbor.Arbor = 15
	if got := (Stock{Pins: pinsOf(1, 3.4), Gauges: mics}).ChoosePins(arbor); got.Takes[0].Way != involute.PinToFarSide || got.Takes[0].Gauge.Caliper {
		t.Errorf("a micrometer spans pin and arbor: %+v", got.Takes)
	}
}

// A helical gear takes balls, a spur gear the nearer of both.
func TestChooseBalls(t *testing.T) {
	pins, balls := pinsOf(2, 3.5), pinsOf(2, 3.6)
	balls[0].Ball = true
	s := Stock{Pins: append(pins, balls...), Gauges: []Gauge{micrometer(0, 500)}}
	for _, beta := range []float64{0, 15} {
		g := gearOf(t, involute.Spec{Module: 2, Teeth: 20, Helix: beta * involute.Degree, Rack: iso53A()})
		got := s.ChoosePins(Subject{Gear: g, Thickness: nominalLimits(g)})
		if len(got.Takes) == 0 || got.Takes[0].Size.Ball != (beta > 0) {
			t.Errorf("β %v: %+v", beta, got)
		}
	}
}

// Whatever the drawer holds: the pin taken is usable at both limits, there are
// enough of it, its reading lies in the gauge's range, the diameter computed with
// gives the thickness back, and none that would do as well is nearer to the ideal.
func TestChoosePinsAlways(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		q := Subject{Gear: g, Thickness: Limits{tooth.Thickness() - 0.02*g.Module(), tooth.Thickness()}, Bore: g.ReferenceDiameter() / 3}
		ideal, ok := IdealPin(g, q.Thickness)
		if !ok {
			t.Skip("no pin")
		}
		var s Stock
		for range rapid.IntRange(0, 10).Draw(t, "pins") {
			p := Pin{Nominal: ideal * rapid.Float64Range(0.4, 2.5).Draw(t, "size"), Known: true, Measured: true, Count: rapid.IntRange(1, 3).Draw(t, "count"), Ball: rapid.Bool().Draw(t, "ball")}
			p.Diameter = p.Nominal + rapid.Float64Range(-0.01, 0.01).Draw(t, "off")
			s.Pins = append(s.Pins, p)
		}
		for range rapid.IntRange(0, 4).Draw(t, "gauges") {
			from := g.TipDiameter() * rapid.Float64Range(0.4, 1.1).Draw(t, "from")
			m := micrometer(from, from+g.TipDiameter()*0.2)
			m.Caliper = rapid.Bool().Draw(t, "caliper")
			s.Gauges = append(s.Gauges, m)
		}
		got := s.ChoosePins(q)
		for _, take := range got.Takes {
			checkTake(t, q, take)
		}
		if len(got.Takes) == 0 || got.Takes[0].Way != involute.TwoPins {
			return
		}
		for _, z := range append(s.Sizes(true), s.Sizes(false)...) {
			pick, ok := z.Pick(involute.TwoPins)
			target := NewTarget(g, OverPins{Pin: pick.Diameter}, q.Thickness, q.Part)
			if !ok || z.Ball == false && g.Helical() || !target.Usable() {
				continue
			}
			rank := PinTake{Gauge: s.GaugeFor(target.Value)}.rank()
			best := got.Takes[0]
			if rank < best.rank() || rank == best.rank() && math.Abs(z.Nominal-ideal) < math.Abs(best.Size.Nominal-ideal)-SamePin {
				t.Errorf("Ø%v is taken, Ø%v is as good and nearer to %v", best.Size.Nominal, z.Nominal, ideal)
			}
		}
	})
}

func checkTake(t *rapid.T, q Subject, take PinTake) {
	m := OverPins{Pin: take.Pick.Diameter, Way: take.Way, Bore: take.Bore}
	again := NewTarget(q.Gear, m, q.Thickness, q.Part)
	switch {
	case !again.Usable() || again.Value != take.Target.Value:
		t.Errorf("%+v cannot be used", take)
	case take.Size.Count < PinsFor(take.Way) || len(take.Pick.Pins) != PinsFor(take.Way):
		t.Errorf("%d pins taken of %d", PinsFor(take.Way), take.Size.Count)
	case take.Gauge != nil && !take.Gauge.Covers(again.Value):
		t.Errorf("%v lies outside %v", again.Value, take.Gauge.Range)
	}
	for _, end := range [2][2]float64{{again.Value.Min, q.Thickness.Min}, {again.Value.Max, q.Thickness.Max}} {
		if s, err := m.Thickness(q.Gear, end[0]); err != nil || math.Abs(s-end[1]) > 1e-9 {
			t.Errorf("%v read belongs to a thickness of %v, not %v (%v)", end[0], s, end[1], err)
		}
	}
}

// What a class can do to the reading, against readings with the pins at its ends
// (trap 15: dM/dD is 3.4 there, and over two pins both are off).
func TestPinClassEffect(t *testing.T) {
	g := gearOf(t, involute.Spec{Module: 25.4 / 6, Teeth: 20, Rack: iso53A()})
	n := g.NominalThickness()
	q := Subject{Gear: g, Thickness: Limits{n, n}}
	const tol = 0.00508
	s := Stock{Pins: []Pin{{Nominal: 7.3152, Diameter: 7.3152, Off: Limits{-tol, 0}, Known: true, Count: 2}}, Gauges: []Gauge{micrometer(75, 100)}}
	got := s.ChoosePins(q).Takes[0]
	tooth, _ := g.Nominal()
	full, _ := OverPins{Pin: 7.3152}.Of(tooth)
	least, _ := OverPins{Pin: 7.3152 - tol}.Of(tooth)
	if math.Abs(got.Effect.Min-(least-full)) > 2e-5 || got.Effect.Max != 0 || math.Abs(got.Effect.Min/tol+3.407) > 5e-4 {
		t.Errorf("effect %v, readings %v to %v", got.Effect, least, full)
	}
}

func TestToleranceShare(t *testing.T) {
	if share, ok := ToleranceShare(Limits{10, 10.02}, 0.004, 0.002); !ok || math.Abs(share-0.5) > 1e-9 {
		t.Errorf("share %v", share)
	}
	if _, ok := ToleranceShare(Limits{10, 10}, 0.004, 0); ok {
		t.Error("limits without width have no share")
	}
}

// A gear tooth caliper by its modules; 16 P is module 1.5875 exactly.
func TestForChord(t *testing.T) {
	s := Stock{ToothCalipers: []ToothCaliper{{Name: "coarse", Modules: Limits{1, 25}, Uncertainty: 0.02}, {Name: "fine", Modules: Limits{25.4 / 20, 25.4 / 16}, Uncertainty: 0.01}}}
	for module, want := range map[float64]string{1.5875: "fine", 1.6: "coarse", 1: "coarse", 0.9: "", 26: ""} {
		got := s.ForChord(module)
		if (got == nil) != (want == "") || got != nil && got.Name != want {
			t.Errorf("module %v: %+v", module, got)
		}
	}
}
