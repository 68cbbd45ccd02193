package refdata

import (
	"math"
	"strings"
	"testing"
)

// Full tolerances of the classes as a US Army technical manual prints them for
// X to ZZ, in microinches, at both sides of the limits of the size ranges.
func TestGaugePinTolerance(t *testing.T) {
	for _, c := range []struct {
		class  string
		inches float64
		want   float64 // microinches
	}{
		{"X", 0.5, 40}, {"Y", 0.825, 70}, {"Y", 0.8251, 90}, {"Z", 1.5, 120}, {"ZZ", 0.061, 200}, {"ZZ", 0.825, 200}, {"zz", 0.8255, 240}, {"ZZ", 12, 800}, {"XX", 0.1, 20},
	} {
		got, src, err := GaugePinTolerance(c.class, c.inches*25.4)
		if err != nil || math.Abs(got-c.want*25.4e-6) > 1e-15 || src.Standard != "ASME B89.1.5" {
			t.Errorf("class %s, %v in: %v mm of %s (%v), want %v microinches", c.class, c.inches, got, src, err, c.want)
		}
	}
	for class, mm := range map[string]float64{"ZZ": 0.2, "X": 400, "W": 5, "": 5} {
		if _, _, err := GaugePinTolerance(class, mm); err == nil || strings.Contains(err.Error(), "NaN") {
			t.Errorf("class %q of %v mm: %v", class, mm, err)
		}
	}
}

// DIN 2269:1998: class 0 ±0.5 (read in its preface), 1 and 2 ±1 and ±2 micrometers (recalled), 0.1 to 20 mm.
func TestTestPinLimit(t *testing.T) {
	for class, want := range map[string]float64{"0": 0.0005, "1": 0.001, "2": 0.002} {
		for _, mm := range []float64{0.1, 3.5, 20} {
			if got, _, err := TestPinLimit(class, mm); err != nil || got != want {
				t.Errorf("class %s, %v mm: %v (%v)", class, mm, got, err)
			}
		}
		if _, _, err := TestPinLimit(class, 25); err == nil {
			t.Errorf("class %s at 25 mm is in no scope", class)
		}
	}
	if _, _, err := TestPinLimit("3", 5); err == nil || !strings.Contains(err.Error(), "0, 1, 2") {
		t.Errorf("class 3: %v", err)
	}
}
