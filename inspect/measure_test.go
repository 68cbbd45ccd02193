package inspect

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// drawGear draws an external gear that can be made, with a tooth of it.
func drawGear(t *rapid.T, label string) (*involute.Gear, involute.Tooth) {
	spec := drawSpec(t, label)
	g, err := involute.NewGear(spec)
	if err != nil {
		t.Skip(err)
	}
	thin := rapid.Float64Range(0, 0.1).Draw(t, label+" thin") * spec.Module
	tooth, err := g.Tooth(g.NominalThickness() - thin)
	if err != nil {
		t.Skip(err)
	}
	return g, tooth
}

// drawSpec draws what a shop cuts: 6 to 200 teeth, 0.3 to 20 mm, spur and helical.
func drawSpec(t *rapid.T, label string) involute.Spec {
	helix := 0.0
	if rapid.Bool().Draw(t, label+" helical") {
		helix = rapid.Float64Range(-40, 40).Draw(t, label+" helix") * involute.Degree
	}
	return involute.Spec{
		Teeth: rapid.IntRange(6, 200).Draw(t, label+" teeth"), Module: rapid.Float64Range(0.3, 20).Draw(t, label+" module"), Helix: helix,
		Shift: rapid.Float64Range(-0.3, 0.8).Draw(t, label+" shift"),
		Rack: involute.Rack{
			PressureAngle: rapid.SampledFrom([]float64{14.5, 17.5, 20, 25}).Draw(t, label+" angle") * involute.Degree,
			Addendum:      1, Dedendum: 1.25, TipRadius: 0.25,
		},
	}
}

// measuresOf lists every kind of measure that a gear has, for one pin and one number of teeth.
func measuresOf(g *involute.Gear, pin float64, k int) []Measure {
	list := []Measure{Span{k}, Chordal{}, Chordal{Tip: g.TipDiameter() * 0.999}, ConstantChord{}}
	for _, way := range []involute.PinWay{involute.TwoPins, involute.ThreePins, involute.PinToAxis, involute.PinToFarSide, involute.OpposedPins, involute.FreePins} {
		if m := (OverPins{Pin: pin, Way: way, Bore: g.ReferenceDiameter() / 3}); m.exists(g) {
			list = append(list, m)
		}
	}
	return list
}

// The pair of functions that every measure is: a measurement turned back gives
// the thickness it was taken from.
func TestMeasuresAreInverse(t *testing.T) {
	kinds := map[string]int{}
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		ideal, ok := IdealPin(g, Limits{tooth.Thickness(), tooth.Thickness()})
		if !ok {
			t.Skip("no pin")
		}
		pin := ideal * rapid.Float64Range(0.95, 1.2).Draw(t, "pin")
		k := rapid.IntRange(1, g.Teeth()/2).Draw(t, "k")
		for _, m := range measuresOf(g, pin, k) {
			v, err := m.Of(tooth)
			if err != nil {
				continue // free rollers of some helices find no least distance
			}
			s, err := m.Thickness(g, v)
			if err != nil {
				t.Fatalf("%#v: %v has no thickness: %v", m, v, err)
			}
			if math.Abs(s-tooth.Thickness()) > 1e-9 {
				t.Errorf("%#v: %v mm gives back %v, not %v", m, v, s, tooth.Thickness())
			}
			kinds[kindName(m)]++
		}
	})
	for _, name := range []string{"two pins", "three pins", "axis", "far side", "opposed", "free", "span", "chordal", "constant chord"} {
		if kinds[name] == 0 {
			t.Errorf("%s was never measured", name)
		}
	}
}

func kindName(m Measure) string {
	switch m := m.(type) {
	case OverPins:
		return map[involute.PinWay]string{
			involute.TwoPins: "two pins", involute.ThreePins: "three pins", involute.PinToAxis: "axis",
			involute.PinToFarSide: "far side", involute.OpposedPins: "opposed", involute.FreePins: "free",
		}[m.Way]
	case Span:
		return "span"
	case Chordal:
		return "chordal"
	}
	return "constant chord"
}

// A thicker tooth measures more, in every way; on this rest limits and verdicts.
func TestMeasuresGrowWithThickness(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		thinner, err := g.Tooth(tooth.Thickness() - 0.02*g.Module())
		ideal, ok := IdealPin(g, Limits{tooth.Thickness(), tooth.Thickness()})
		if err != nil || !ok {
			t.Skip("no pin")
		}
		for _, m := range measuresOf(g, ideal, max(1, g.Teeth()/9)) {
			thick, err1 := m.Of(tooth)
			thin, err2 := m.Of(thinner)
			if err1 == nil && err2 == nil && thick <= thin {
				t.Errorf("%#v reads %v on a thick tooth and %v on a thin one", m, thick, thin)
			}
		}
	})
}

func spur(t *testing.T, module float64, teeth int, shift float64) *involute.Gear {
	t.Helper()
	return gearOf(t, involute.Spec{Module: module, Teeth: teeth, Shift: shift, Rack: iso53A()})
}

func gearOf(t *testing.T, s involute.Spec) *involute.Gear {
	t.Helper()
	g, err := involute.NewGear(s)
	if err != nil {
		t.Fatal(err)
	}
	return g
}

// iso53A is ISO 53:1998 profile A.
func iso53A() involute.Rack {
	return involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}
}

func has(faults []Fault, code FaultCode) bool {
	for _, f := range faults {
		if f.Code == code {
			return true
		}
	}
	return false
}
