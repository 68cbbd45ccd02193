package inspect

import (
	"math"
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
	for _, s := range []string{"0.75in", "3/16in", "1-1/2\"", "19.05mm", "-1e3", "0.04..0.08", "12°30'15\""} {
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
