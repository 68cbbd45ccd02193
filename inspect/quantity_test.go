package inspect

import (
	"math"
	"strings"
	"testing"
)

func TestParseLength(t *testing.T) {
	for _, c := range []struct {
		text string
		bare Unit
		want float64
	}{
		{"0.75in", Millimeter, 19.05}, {"3/16in", Millimeter, 4.7625}, {"19.05mm", Inch, 19.05},
		{"19.05", Millimeter, 19.05}, {"0.75", Inch, 19.05}, {"1-1/2 in", Millimeter, 38.1},
		{"1 1/2in", Millimeter, 38.1}, {"0.5\"", Millimeter, 12.7}, {" 2 mm ", Inch, 2}, {"-0.5mm", Inch, -0.5},
	} {
		got, err := ParseLength(c.text, c.bare)
		if err != nil || math.Abs(got-c.want) > 1e-12 {
			t.Errorf("%q = %v, %v; want %v", c.text, got, err, c.want)
		}
	}
	for _, text := range []string{"", "mm", "1,5mm", "1/0in", "one", "1.5/2in", "NaN", "Inf", "0x10", "1e400", "3/16/2in", "12 cm"} {
		if v, err := ParseLength(text, Millimeter); err == nil {
			t.Errorf("%q read as %v", text, v)
		}
	}
}

func TestParseLimits(t *testing.T) {
	got, err := ParseLimits("0.002..0.005in", Millimeter)
	if err != nil || math.Abs(got.Min-0.0508) > 1e-12 || math.Abs(got.Max-0.127) > 1e-12 {
		t.Errorf("a unit at the end covers both ends: %v %v", got, err)
	}
	if _, err := ParseLimits("0.5..0.4", Millimeter); err == nil {
		t.Error("backwards range read")
	}
}

// Fixed points of the Fahrenheit scale: ice at 32, the reference of ISO 1 at 68,
// the scales' meeting at −40; 140 °F is 60 °C.
func TestParseTemperatures(t *testing.T) {
	for text, want := range map[string]Limits{
		"5..60": {5, 60}, "5..60 °C": {5, 60}, "5 .. 60C": {5, 60}, "60": {60, 60}, "-20..60": {-20, 60}, "−40": {-40, -40},
		"68F": {20, 20}, "68..140 F": {20, 60}, "32..140°F": {0, 60}, "-40 degF": {-40, -40}, "32f..60c": {0, 60}, "0C..140F": {0, 60}, "2e1": {20, 20},
	} {
		if got, err := ParseTemperatures(text); err != nil || got != want {
			t.Errorf("%q = %v, %v; want %v", text, got, err, want)
		}
	}
	for text, says := range map[string]string{
		"": "5..60", "F": "40..140 F", "warm": "40..140 F", "60..5": "runs backwards", "40F..0C": "runs backwards", "5-60": "two points: 5..60", "40F..140": "at the end",
		"-61": "-60 to 200 °C", "201": "(-76 to 392 °F)", "20..393F": "-60 to 200 °C", "NaN": "is not", "Inf": "is not", "1..2..3": "is not", "60°": "is not", "300 K": "is not",
	} {
		if v, err := ParseTemperatures(text); err == nil || !strings.Contains(err.Error(), says) {
			t.Errorf("%q read as %v, %v; wanted %q", text, v, err, says)
		}
	}
}

func TestParsePercents(t *testing.T) {
	for text, want := range map[string]Limits{"0.5": {0.005, 0.005}, "0.5 %": {0.005, 0.005}, "0.25..0.5%": {0.0025, 0.005}, "0.25% .. 0.5%": {0.0025, 0.005}, "-1..1": {-0.01, 0.01}} {
		if got, err := ParsePercents(text); err != nil || got != want {
			t.Errorf("%q = %v, %v; want %v", text, got, err, want)
		}
	}
	for _, text := range []string{"", "%", "0.5 mm", "0.5..0.25", "0.2-0.5", "0,5", "NaN"} {
		if v, err := ParsePercents(text); err == nil {
			t.Errorf("%q read as %v", text, v)
		}
	}
}

func TestParseAngle(t *testing.T) {
	for text, want := range map[string]float64{"20": 20, "14.5°": 14.5, "12°30'": 12.5, "12°30'36\"": 12.51, "20deg": 20, "-7°30'": -7.5} {
		got, err := ParseAngle(text)
		if err != nil || math.Abs(got-want) > 1e-12 {
			t.Errorf("%q = %v, %v; want %v", text, got, err, want)
		}
	}
	for _, text := range []string{"", "20°70'", "12.5°30'", "x", "20°30", "30'"} {
		if v, err := ParseAngle(text); err == nil {
			t.Errorf("%q read as %v", text, v)
		}
	}
}

// Limits are rounded inward (trap 27): the nearest would be outside.
func TestFormatLimits(t *testing.T) {
	l := Limits{44.83651, 44.87654}
	if p := Millimeter.FormatLimits(l, 3); p.Low != "44.837" || p.High != "44.876" || p.More {
		t.Errorf("mm: %+v", p)
	}
	if p := Inch.FormatLimits(l, 4); p.Low != "1.7653" || p.High != "1.7667" {
		t.Errorf("in: %+v", p)
	}
	narrow := Limits{0.12341, 0.12344}
	if p := Millimeter.FormatLimits(narrow, 4); p.Low != "0.12341" || p.High != "0.12344" || !p.More || p.Decimals != 5 {
		t.Errorf("narrow: %+v", p)
	}
	if p := Millimeter.FormatLimits(Limits{1.35, 1.35}, 3); p.Low != "1.350" || p.High != "1.350" {
		t.Errorf("one value: %+v", p)
	}
	one := 0.1234567890123
	if p := Millimeter.FormatLimits(Limits{one, one}, 3); p.Low != "0.123" || p.High != "0.123" {
		t.Errorf("one value: %+v", p)
	}
}

func FuzzParseLength(f *testing.F) {
	for _, s := range []string{"0.75in", "3/16in", "1-1/2\"", "19.05mm", "-1e3", "0.04..0.08", "12°30'15\"", "5..60 °C", "40..140 F", "0.1..0.6 %", "-20F..5"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		for _, u := range []Unit{Millimeter, Inch} {
			if v, err := ParseLength(s, u); err == nil && !finite(v) {
				t.Errorf("%q read as %v", s, v)
			}
			if l, err := ParseLimits(s, u); err == nil && !(l.Min <= l.Max && finite(l.Min, l.Max)) {
				t.Errorf("%q read as %v", s, l)
			}
		}
		if v, err := ParseAngle(s); err == nil && !finite(v) {
			t.Errorf("%q read as %v", s, v)
		}
		if l, err := ParseTemperatures(s); err == nil && !(l.Min <= l.Max && l.Min >= coldest && l.Max <= hottest) {
			t.Errorf("%q read as %v °C", s, l)
		}
		if l, err := ParsePercents(s); err == nil && !(l.Min <= l.Max && finite(l.Min, l.Max)) {
			t.Errorf("%q read as %v", s, l)
		}
	})
}

// A length exactly between two printable ones is printed alike however its last
// bit fell: 32.54375 mm is 1.28125 in.
func TestFormatHalves(t *testing.T) {
	for _, mm := range []float64{32.54375, 32.543749999999996, 32.543750000000003} {
		if got := Inch.Format(mm, 4); got != "1.2813" {
			t.Errorf("%.17g mm printed as %s in", mm, got)
		}
		if got := Inch.Format(-mm, 4); got != "-1.2813" {
			t.Errorf("%.17g mm printed as %s in", -mm, got)
		}
	}
}
