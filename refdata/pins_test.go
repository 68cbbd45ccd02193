package refdata

import (
	"math"
	"strings"
	"testing"
)

// Handbook over-wire table for 1 diametral pitch, 20°, 32 teeth, 1.728 wires:
// 34.4130 in (as reprinted in a gear maker's pages).
func Test1728Series(t *testing.T) {
	k := cellRecord(t, "pin_series", func(r record) bool { return r.text("role") == "external" }).number("factor")
	inv := func(a float64) float64 { return math.Tan(a) - a }
	const z = 32
	alpha := 20 * math.Pi / 180
	base := z * math.Cos(alpha)
	want := inv(alpha) + k/base - math.Pi/(2*z)
	lo, hi := 0.0, 1.5
	for range 60 { // halving 1.5 sixty times leaves less than one unit in the last place
		if mid := (lo + hi) / 2; inv(mid) < want {
			lo = mid
		} else {
			hi = mid
		}
	}
	if over := base/math.Cos(lo) + k; math.Abs(over-34.4130) > 0.00005 {
		t.Errorf("over pins %.5f, printed 34.4130", over)
	}
}

func TestPinSeries(t *testing.T) {
	roles := map[float64]string{1.728: "external", 1.92: "long addendum", 1.68: "alternate", 1.44: "internal"}
	for _, s := range PinSeries() {
		if !strings.Contains(s.Role, roles[s.Factor]) || roles[s.Factor] == "" {
			t.Errorf("series %g has the role %q", s.Factor, s.Role)
		}
		if s.Factor == 1.92 && s.Source.Confidence != "medium" || s.Factor == 1.728 && s.Source.Confidence != "high" {
			t.Errorf("series %g: %v", s.Factor, s.Source)
		}
	}
	if n := len(PinSeries()); n != len(roles) {
		t.Errorf("%d series, want %d", n, len(roles))
	}
}

func TestPinSets(t *testing.T) {
	for i, s := range PinSets() {
		sizes := s.Sizes()
		// the number of pins in the box, common practice
		if want := int(records("pin_sets")[i].number("pieces")); len(sizes) != want {
			t.Errorf("%s from %g: %d pins, want %d", s.Name, s.First, len(sizes), want)
		}
		scale := 1.0
		if s.Unit == "in" {
			scale = 25.4
		}
		if sizes[0] != s.First*scale || sizes[len(sizes)-1] != s.Last*scale {
			t.Errorf("%s: sizes %g to %g", s.Name, sizes[0], sizes[len(sizes)-1])
		}
		if s.Source.Confidence != "common practice" {
			t.Errorf("%s: %v", s.Name, s.Source)
		}
	}
	// decimals stay exact: 1.73 mm is pin 73 of the 0.01 mm box from 1 mm
	for _, s := range PinSets() {
		if s.Step == 0.01 && s.Sizes()[73] != 1.73 {
			t.Errorf("pin 73 is %v", s.Sizes()[73])
		}
		if s.Unit == "in" && s.First == 0.061 && s.Sizes()[47] != 0.108*25.4 {
			t.Errorf("pin 47 is %v", s.Sizes()[47])
		}
	}
	if n := len(PinSet{First: 1, Last: 2}.Sizes()); n != 0 {
		t.Errorf("a set without step has %d sizes", n)
	}
}

func TestGearPins(t *testing.T) {
	pins := GearPins()
	// steps of a quarter of a millimeter throughout (DIN 3977, recalled)
	for _, p := range pins {
		if math.Mod(p.Diameter, 0.25) != 0 {
			t.Errorf("pin of %g mm is no multiple of 0.25 mm", p.Diameter)
		}
	}
	if len(pins) != 35 {
		t.Errorf("%d pins, want 35", len(pins))
	}
	// the ends of the list, and the usual pin for module 2 (DIN 3977, recalled)
	for _, want := range []float64{1, 3.5, 25} {
		found := false
		for _, p := range pins {
			found = found || p.Diameter == want
		}
		if !found {
			t.Errorf("no pin of %g mm", want)
		}
	}
	if c := pins[0].Source.Confidence; c != "medium" {
		t.Errorf("confidence %q", c)
	}
}

// ASME B89.1.5: X is twice XX and ZZ twice Z (common practice); the printed micrometers are the microinches converted.
func TestPinClasses(t *testing.T) {
	width := map[string]map[float64]float64{}
	for _, r := range records("pin_classes") {
		class, uin := r.text("class"), r.number("tolerance_uin")
		if width[class] == nil {
			width[class] = map[float64]float64{}
		}
		width[class][r.number("over_in")] = uin
		if um := uin * 0.0254; math.Abs(um-r.number("tolerance_um")) > 0.005+1e-12 {
			t.Errorf("class %s: %g microinches are %g um, not %s", class, uin, um, r.text("tolerance_um"))
		}
	}
	for over, xx := range width["XX"] {
		if len(width["XX"]) != 7 ||
			width["X"][over] != 2*xx || width["ZZ"][over] != 2*width["Z"][over] ||
			width["Y"][over] <= width["X"][over] || width["Z"][over] <= width["Y"][over] {
			t.Errorf("above %g in: XX %g, X %g, Y %g, Z %g, ZZ %g", over, xx, width["X"][over], width["Y"][over], width["Z"][over], width["ZZ"][over])
		}
	}
}

func TestEndMills(t *testing.T) {
	for i, m := range EndMills() {
		want := records("end_mills")[i].number("diameter")
		if m.Unit == "in" {
			if f := fraction(t, m.Size); f != want {
				t.Errorf("%s in is %g, not %g", m.Size, f, want)
			}
			want *= 25.4
		}
		// a product in float64 against decimals: within a unit in the last place of 50.8
		if math.Abs(m.Diameter-want) > 7.2e-15 || m.Tier < 1 || m.Tier > 3 {
			t.Errorf("%s %s: %v mm, tier %d, want %v", m.Size, m.Unit, m.Diameter, m.Tier, want)
		}
	}
}
