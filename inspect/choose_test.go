package inspect

import (
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// Trap 8: of 20 teeth, m 1, three are spanned, then its neighbors 2 and 4; never 5.
func TestSpanChoices(t *testing.T) {
	g := spur(t, 1, 20, 0)
	ks := SpanChoices(g, nominalLimits(g), Part{})
	if len(ks) != 3 || ks[0] != 3 || !slices.Contains(ks, 2) && !slices.Contains(ks, 4) || slices.Contains(ks, 5) {
		t.Errorf("z 20: %v", ks)
	}
	// trap 9: with a face of 20 there is no span reading of k 5, and the choice says so by giving one alone
	helical := gearOf(t, involute.Spec{Module: 4, Teeth: 30, Helix: 25 * involute.Degree, Rack: iso53A()})
	wide, narrow := SpanChoices(helical, nominalLimits(helical), Part{FaceWidth: 40}), SpanChoices(helical, nominalLimits(helical), Part{FaceWidth: 5})
	if len(wide) < 2 || len(narrow) != 1 {
		t.Errorf("face 40: %v; face 5: %v", wide, narrow)
	}
}

// What is chosen first can be measured wherever anything can, and nothing unusable stands beside it.
func TestSpanChoicesAreUsable(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		s := Limits{tooth.Thickness() - 0.02*g.Module(), tooth.Thickness()}
		if _, err := g.Tooth(s.Min); err != nil {
			t.Skip(err)
		}
		ks := SpanChoices(g, s, Part{})
		if len(ks) == 0 || len(ks) > 3 {
			t.Fatalf("%d choices", len(ks))
		}
		usable := func(k int) bool { return NewTarget(g, Span{k}, s, Part{}).Usable() }
		any := false
		for k := 1; k < g.Teeth(); k++ {
			any = any || usable(k)
		}
		for _, k := range ks {
			if usable(k) != any {
				t.Errorf("z %d: %v chosen, %d usable: %v, any usable: %v", g.Teeth(), ks, k, usable(k), any)
			}
		}
	})
}

// The ideal pin touches the middle tooth on the cylinder d + 2 x_E m_n (common
// practice), or in the flank's middle where that cylinder is off the flank.
func TestIdealPin(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		pin, ok := IdealPin(g, Limits{tooth.Thickness(), tooth.Thickness()})
		if !ok {
			t.Skip("no pin")
		}
		seat, err := tooth.Seat(pin)
		if err != nil {
			t.Fatalf("pin %v falls through: %v", pin, err)
		}
		want := g.ReferenceDiameter() + 2*g.GeneratingShift(tooth.Thickness())*g.Module()
		if want <= tooth.FormDiameter() || want >= tooth.TipFormDiameter() {
			want = (tooth.FormDiameter() + tooth.TipFormDiameter()) / 2
		}
		if math.Abs(seat.ContactDiameter-want) > 1e-8 {
			t.Errorf("pin %v touches at %v, not at %v", pin, seat.ContactDiameter, want)
		}
	})
}

// The pin chosen is usable, and no usable one of the list is nearer to the ideal.
func TestNearestUsable(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		s := Limits{tooth.Thickness() - 0.02*g.Module(), tooth.Thickness()}
		ideal, ok := IdealPin(g, s)
		if !ok {
			t.Skip("no pin")
		}
		var drawer []PinCandidate
		for range rapid.IntRange(0, 12).Draw(t, "pins") {
			drawer = append(drawer, PinCandidate{Diameter: ideal * rapid.Float64Range(0.3, 3).Draw(t, "pin")})
		}
		got, found := NearestUsable(g, s, Part{}, ideal, drawer)
		usable := func(d float64) bool { return NewTarget(g, OverPins{Pin: d}, s, Part{}).Usable() }
		if found && (!slices.Contains(drawer, got) || !usable(got.Diameter)) {
			t.Errorf("%v is chosen of %v", got, drawer)
		}
		for _, c := range drawer {
			if usable(c.Diameter) && (!found || math.Abs(c.Diameter-ideal) < math.Abs(got.Diameter-ideal)) {
				t.Errorf("ideal %v: %v (%v) is chosen, %v is nearer and usable", ideal, got.Diameter, found, c.Diameter)
			}
		}
	})
}

// m 1, z 17, pin 1.2 makes no contact on the involute; a set that holds
// a fitting pin too gives that one (values computed apart from the program).
func TestNearestUsablePassesOver(t *testing.T) {
	g := spur(t, 1, 17, 0)
	s := nominalLimits(g)
	if NewTarget(g, OverPins{Pin: 1.2}, s, Part{}).Exists {
		t.Error("pin 1.2 touches")
	}
	got, ok := NearestUsable(g, s, Part{}, 1.4, []PinCandidate{{1.2, "drawer"}, {1.75, "drawer"}, {3, "drawer"}})
	if !ok || got.Diameter != 1.75 {
		t.Errorf("%v %v", got, ok)
	}
	if got, ok := NearestUsable(g, s, Part{}, 1.7, []PinCandidate{{1.2, "drawer"}}); ok {
		t.Errorf("%v chosen of nothing usable", got)
	}
}
