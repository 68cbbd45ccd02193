package inspect

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

func nominalLimits(g *involute.Gear) Limits {
	return Limits{g.NominalThickness(), g.NominalThickness()}
}

// Trap 20: pins that do not fit. Values computed apart from the program:
// m 2, z 20, x 0: a pin of 2.8 gives M = 42.3338, below the tip diameter 44;
// a pin of 3.5 touches at 40.0834.
func TestPinsThatDoNotFit(t *testing.T) {
	g := spur(t, 2, 20, 0)
	small := NewTarget(g, OverPins{Pin: 2.8}, nominalLimits(g), Part{})
	if small.Usable() || !has(small.Faults, UnderTips) || math.Abs(small.Aim-42.3338) > 5e-5 {
		t.Errorf("pin 2.8: %+v", small)
	}
	right := NewTarget(g, OverPins{Pin: 3.5}, nominalLimits(g), Part{})
	if !right.Usable() || math.Abs(right.Contact.Min-40.0834) > 5e-5 || math.Abs(right.Aim-44.929290) > 5e-7 {
		t.Errorf("pin 3.5: %+v", right)
	}
	if big := NewTarget(g, OverPins{Pin: 7.2}, nominalLimits(g), Part{}); big.Usable() || !has(big.Faults, AboveTip) {
		t.Errorf("pin 7.2: %+v", big)
	}
	if none := NewTarget(g, OverPins{Pin: 0.5}, nominalLimits(g), Part{}); none.Usable() || none.Exists || !has(none.Faults, NoContact) {
		t.Errorf("pin 0.5: %+v", none)
	}
	// trap 1, z 17: the numbers of the three ways
	odd := spur(t, 2, 17, 0)
	for _, c := range []struct {
		way  involute.PinWay
		want float64
	}{{involute.TwoPins, 38.756841}, {involute.ThreePins, 38.60644}, {involute.PinToAxis, (35.407885 + 3.5) / 2}} {
		got := NewTarget(odd, OverPins{Pin: 3.5, Way: c.way}, nominalLimits(odd), Part{})
		if math.Abs(got.Aim-c.want) > 5e-6 {
			t.Errorf("way %v: %v, want %v", c.way, got.Aim, c.want)
		}
	}
}

// Trap 8: m 1, z 20, x 0, computed apart from the program: the formula gives a
// number for every k, but k 5 measures on air and k 1 at the very bottom.
func TestSpanOverTeethThatDoNotFit(t *testing.T) {
	g := spur(t, 1, 20, 0)
	for _, c := range []struct {
		k       int
		w, dc   float64
		fault   FaultCode
		faulted bool
	}{
		{1, 1.7562, 18.876, 0, false}, {2, 4.7083, 19.375, 0, false}, {3, 7.6604, 20.295, 0, false},
		{4, 10.6126, 21.583, 0, false}, {5, 13.5647, 23.178, AboveTip, true},
	} {
		got := NewTarget(g, Span{c.k}, nominalLimits(g), Part{})
		if math.Abs(got.Aim-c.w) > 5e-5 || math.Abs(got.Contact.Max-c.dc) > 5e-4 || got.Usable() == c.faulted || has(got.Faults, c.fault) != c.faulted {
			t.Errorf("k %d: %+v", c.k, got)
		}
	}
	if none := NewTarget(g, Span{21}, nominalLimits(g), Part{}); none.Exists || none.Usable() || !has(none.Faults, NoReading) {
		t.Errorf("more teeth than there are: %+v", none)
	}
}

// Trap 9: m_n 4, z 30, β 25°, k 5: W 55.3614, contact points 21.986 apart
// along the axis: a face of 20 has no span reading, one of 22 has.
func TestSpanNeedsFaceWidth(t *testing.T) {
	g := gearOf(t, involute.Spec{Module: 4, Teeth: 30, Helix: 25 * involute.Degree, Rack: iso53A()})
	narrow := NewTarget(g, Span{5}, nominalLimits(g), Part{FaceWidth: 20})
	if narrow.Usable() || !has(narrow.Faults, FaceTooNarrow) || math.Abs(narrow.Aim-55.3614) > 5e-5 {
		t.Errorf("b 20: %+v", narrow)
	}
	for _, f := range narrow.Faults {
		if f.Code == FaceTooNarrow && (math.Abs(f.Limit-21.986) > 5e-4 || f.Value != 20) {
			t.Errorf("b 20 needs 21.986: %+v", f)
		}
	}
	if wide := NewTarget(g, Span{5}, nominalLimits(g), Part{FaceWidth: 22}); !wide.Usable() {
		t.Errorf("b 22: %+v", wide)
	}
}

// Usable means at both limits: pins that fit the thick tooth only, or the thin
// one only, are refused. The limits of m 2, z 20 are drawn far apart for it.
func TestUsableAtBothLimits(t *testing.T) {
	g := spur(t, 2, 20, 0)
	n := g.NominalThickness()
	thick, thin := Limits{n, n}, Limits{n - 0.5, n - 0.5}
	both := Limits{n - 0.5, n}
	onlyOne := 0
	for d := 2.5; d < 5; d += 0.01 {
		m := OverPins{Pin: d}
		a, b := NewTarget(g, m, thick, Part{}).Usable(), NewTarget(g, m, thin, Part{}).Usable()
		if got := NewTarget(g, m, both, Part{}).Usable(); got != (a && b) {
			t.Errorf("pin %.2f: usable %v, at the limits %v and %v", d, got, a, b)
		}
		if a != b {
			onlyOne++
		}
	}
	if onlyOne == 0 {
		t.Error("no pin fits one limit only; the test tries nothing")
	}
}

// Limits of a target are the measurements at the limits of the thickness, in order.
func TestTargetLimits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		s := Limits{tooth.Thickness() - 0.02*g.Module(), tooth.Thickness()}
		pin, ok := IdealPin(g, s)
		if !ok {
			t.Skip("no pin")
		}
		for _, m := range measuresOf(g, pin, max(1, g.Teeth()/9)) {
			target := NewTarget(g, m, s, Part{})
			if !target.Exists {
				continue
			}
			for _, end := range []struct{ value, thickness float64 }{{target.Value.Min, s.Min}, {target.Aim, s.Middle()}, {target.Value.Max, s.Max}} {
				back, err := m.Thickness(g, end.value)
				if err != nil || math.Abs(back-end.thickness) > 1e-9 {
					t.Errorf("%#v: %v belongs to %v, not %v (%v)", m, end.value, back, end.thickness, err)
				}
			}
		}
	})
}

// Trap 27, for any limits, unit and number of digits: what is printed lies
// inside the limits (to a millionth of the last digit), and reads back as a range.
func TestPrintedLimitsLieInside(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		u := rapid.SampledFrom([]Unit{Millimeter, Inch}).Draw(t, "unit")
		digits := rapid.IntRange(0, 9).Draw(t, "digits")
		lo := rapid.Float64Range(-50, 2000).Draw(t, "low")
		width := math.Pow(10, rapid.Float64Range(-6, 1).Draw(t, "log width"))
		if width/u.MM() < 2*math.Pow(10, float64(1-digits-moreDigits)) {
			t.Skip("closer than any digit that is printed")
		}
		l := Limits{lo, lo + width}
		p := u.FormatLimits(l, digits)
		a, err1 := strconv.ParseFloat(p.Low, 64)
		b, err2 := strconv.ParseFloat(p.High, 64)
		if err1 != nil || err2 != nil {
			t.Fatalf("%v prints as %q and %q", l, p.Low, p.High)
		}
		slack := 2e-6*math.Pow(10, -float64(p.Decimals))*u.MM() + 1e-12
		if a*u.MM() < l.Min-slack || b*u.MM() > l.Max+slack {
			t.Errorf("%v %v with %d digits: %s to %s lies outside", l, u, digits, p.Low, p.High)
		}
		if a > b {
			t.Errorf("%v: %s to %s is empty", l, p.Low, p.High)
		}
		if p.More != (p.Decimals > digits) || decimals(p.Low) != p.Decimals || decimals(p.High) != p.Decimals {
			t.Errorf("%v with %d digits: %+v", l, digits, p)
		}
		for _, end := range [2][2]float64{{a * u.MM(), l.Min}, {b * u.MM(), l.Max}} { // nothing is given away beyond a digit
			if math.Abs(end[0]-end[1]) > math.Pow(10, -float64(p.Decimals))*u.MM()*(1+1e-6) {
				t.Errorf("%v: %+v gives more than a digit away", l, p)
			}
		}
	})
}

func decimals(s string) int {
	_, frac, _ := strings.Cut(s, ".")
	return len(frac)
}
