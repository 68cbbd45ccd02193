package refdata

import (
	"math"
	"testing"
)

// ISO 54:1996 (recalled): series I repeats ten values by tens, series II lies between: one in each gap, two between 6 and 8.
func TestModuleSeries(t *testing.T) {
	tens := []float64{1, 1.25, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10, 12, 16, 20, 25, 32, 40, 50}
	var first, second []float64
	for _, m := range Modules() {
		switch m.Series {
		case "I":
			first = append(first, m.Value)
		case "II":
			second = append(second, m.Value)
		case "1", "2":
			if m.Value >= 1 || m.Source.Standard != "DIN 780-1" || m.Source.Confidence != "medium" {
				t.Errorf("fine module %g: %v", m.Value, m.Source)
			}
		default:
			t.Errorf("module %g: series %q", m.Value, m.Series)
		}
		if (m.Series == "I" || m.Series == "II") && (m.Source.Standard != "ISO 54" || m.Source.Confidence != "high") {
			t.Errorf("module %g: %v", m.Value, m.Source)
		}
	}
	if len(first) != len(tens) || len(second) != len(tens) {
		t.Fatalf("%d modules in series I, %d in II, want %d each", len(first), len(second), len(tens))
	}
	for i := range tens {
		if first[i] != tens[i] {
			t.Errorf("series I: %g, want %g", first[i], tens[i])
		}
		if i == 0 {
			continue
		}
		between, want := 0, 1
		if tens[i] == 8 {
			want = 2 // 6.5, to be avoided, and 7
		}
		for _, m := range second {
			if m > tens[i-1] && m < tens[i] {
				between++
			}
		}
		if between != want {
			t.Errorf("%d modules of series II between %g and %g, want %d", between, tens[i-1], tens[i], want)
		}
	}
}

func TestIsStandard(t *testing.T) {
	for _, c := range []struct {
		m      float64
		status string
		ok     bool
	}{
		{2, "preferred", true}, {2.0000000000000004, "preferred", true}, {2.25, "second choice", true}, {6.5, "avoid", true},
		{25.4 / 16, "", false}, // 16 P is not module 1.6
		{1.6, "", false}, {0, "", false}, {-2, "", false}, {math.NaN(), "", false}, {math.Inf(1), "", false},
	} {
		if status, ok := IsStandardModule(c.m); status != c.status || ok != c.ok {
			t.Errorf("module %g: %q, %v", c.m, status, ok)
		}
	}
	if status, ok := IsStandardPitch(25.4 / (25.4 / 24)); !ok || status != "preferred" {
		t.Errorf("24 P: %q, %v", status, ok)
	}
	if status, ok := IsStandardPitch(14); !ok || status != "customary" {
		t.Errorf("14 P: %q, %v", status, ok)
	}
	if _, ok := IsStandardPitch(13); ok {
		t.Error("13 P is on the list")
	}
}

func TestNearest(t *testing.T) {
	for _, c := range []struct{ m, want float64 }{{25.4 / 16, 1.5}, {1, 1}, {1000, 50}, {1e-6, 0.05}, {2.13, 2.25}, {2.11, 2}} {
		if got, ok := NearestModule(c.m); !ok || got.Value != c.want {
			t.Errorf("nearest to %g: %g, %v, want %g", c.m, got.Value, ok, c.want)
		}
	}
	if got, ok := NearestPitch(25.4 / 2); !ok || got.Value != 12 {
		t.Errorf("nearest pitch to module 2: %g, %v", got.Value, ok)
	}
	for _, m := range []float64{0, -1, math.NaN(), math.Inf(1)} {
		if _, ok := NearestModule(m); ok {
			t.Errorf("%g has a nearest module", m)
		}
	}
}

func TestPressureAngles(t *testing.T) {
	for _, a := range PressureAngles() {
		if a.Value == 20 && a.Status == "preferred" {
			return
		}
	}
	t.Error("20° is not preferred (ISO 53)")
}
