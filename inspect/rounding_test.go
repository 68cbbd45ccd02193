package inspect

import (
	"math"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

// No rounding widens a tolerance: whatever is measured, in whichever unit and with
// however many decimals it is printed, a reading at a printed limit is that of a
// tooth within the thickness limits.
func TestPrintedLimitsStayInside(t *testing.T) {
	printed := 0
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		s := Limits{tooth.Thickness() - rapid.Float64Range(1e-5, 0.02).Draw(t, "width")*g.Module(), tooth.Thickness()}
		ideal, ok := IdealPin(g, s)
		if !ok {
			t.Skip("no pin")
		}
		unit := rapid.SampledFrom([]Unit{Millimeter, Inch}).Draw(t, "unit")
		digits := rapid.IntRange(0, 6).Draw(t, "digits")
		for _, m := range measuresOf(g, ideal, max(2, g.Teeth()/8)) {
			target := NewTarget(g, m, s, Part{})
			if !target.Usable() {
				continue
			}
			text := unit.FormatLimits(target.Value, digits)
			for _, limit := range []string{text.Low, text.High} {
				v, err := strconv.ParseFloat(limit, 64)
				if err != nil {
					t.Fatal(err)
				}
				// A limit that is a printable number but for the noise of its last bits, a
				// millionth of the last printed digit, is printed as that number.
				slack := 2e-6*math.Pow10(-text.Decimals)*unit.MM() + 1e-11
				if target.Value.Width() < slack {
					continue
				}
				sn, err := m.Thickness(g, v*unit.MM())
				if err != nil {
					t.Fatalf("%T at %s: %v", m, limit, err)
				}
				if sn < s.Min-slack || sn > s.Max+slack {
					t.Errorf("%T prints %s %s for %v: a thickness of %v, outside of %v", m, limit, unit, target.Value, sn, s)
				}
				printed++
			}
		}
	})
	if printed == 0 {
		t.Error("nothing was printed")
	}
}
