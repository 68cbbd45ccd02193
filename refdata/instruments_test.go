package refdata

import (
	"math"
	"testing"
)

// Micrometers: G = floor(4 + A/50) micrometers, A the lower end in mm (DIN 863-1,
// read); an inch micrometer has the limit of the range that it begins in.
func TestInstrumentLimits(t *testing.T) {
	for a := 0.0; a < 300; a += 25 {
		if got, src, ok := MicrometerLimit(a); !ok || math.Abs(got-math.Floor(4+a/50)/1000) > 1e-15 || src.Standard != "DIN 863-1" {
			t.Errorf("from %v mm: %v of %s, %v", a, got, src, ok)
		}
	}
	if got, _, ok := MicrometerLimit(2 * 25.4); !ok || got != 0.005 {
		t.Errorf("2 to 3 in: %v", got)
	}
	for _, from := range []float64{-1, 1e4} {
		if _, _, ok := MicrometerLimit(from); ok {
			t.Errorf("from %v mm there is no limit", from)
		}
	}
	if got, _, ok := DiscMicrometerLimit(25); !ok || got != 0.004 {
		t.Errorf("disc, 25 to 50 mm: %v", got)
	}
	if _, _, ok := DiscMicrometerLimit(100); ok {
		t.Error("no customary limit is known for discs from 100 mm")
	}
	for _, c := range []struct{ upto, graduation, want float64 }{{100, 0.01, 0.02}, {150, 0, 0.03}, {150, 0.05, 0.05}, {6 * 25.4, 0.0254, 0.03}, {50, 25.4 / 128, 0.05}} {
		if got, _, ok := CaliperLimit(c.upto, c.graduation); !ok || got != c.want {
			t.Errorf("caliper to %v mm, %v: %v, want %v", c.upto, c.graduation, got, c.want)
		}
	}
	if _, _, ok := CaliperLimit(1000, 0); ok {
		t.Error("no limit is listed for a caliper of a meter")
	}
	if got, _ := ToothCaliperLimit(); got != 0.02 {
		t.Errorf("gear tooth caliper: %v", got)
	}
}
