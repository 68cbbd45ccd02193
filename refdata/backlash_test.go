package refdata

import (
	"math"
	"strings"
	"testing"
)

// printed is a row of a printed table of least backlash: by center distance
// from the first column on; 0 where it has no value.
type printed struct {
	size   float64
	values []float64
}

// ISO/TR 10064-2:1996, annex A.4, printed table (recalled): 22 values, each the
// formula rounded up to 0.01 mm.
func TestLeastBacklashISO(t *testing.T) {
	centers := []float64{50, 100, 200, 400, 800, 1600}
	n := 0
	for _, row := range []printed{
		{1.5, []float64{0.09, 0.11, 0, 0, 0, 0}},
		{2, []float64{0.10, 0.12, 0.15, 0, 0, 0}},
		{3, []float64{0.12, 0.14, 0.17, 0.24, 0, 0}},
		{5, []float64{0, 0.18, 0.21, 0.28, 0, 0}},
		{8, []float64{0, 0.24, 0.27, 0.34, 0.47, 0}},
		{12, []float64{0, 0, 0.35, 0.42, 0.55, 0}},
		{18, []float64{0, 0, 0, 0.54, 0.67, 0.94}},
	} {
		for i, want := range row.values {
			if want == 0 {
				continue
			}
			n++
			got, err := LeastBacklashISO(centers[i], row.size)
			if up := math.Ceil(got.Normal*100-1e-9) / 100; err != nil || up != want || len(got.Outside) > 0 || !isConfidence(got.Source.Confidence) {
				t.Errorf("a %g, m %g: %+v, rounded up %g, printed %g, %v", centers[i], row.size, got, up, want, err)
			}
		}
	}
	if n != 22 {
		t.Errorf("%d values, want 22", n)
	}
	// unrounded, by hand: (2/3)(0.06 + 0.05 + 0.3)
	if got, err := LeastBacklashISO(100, 10); err != nil || math.Abs(got.Normal-0.82/3) > 1e-15 {
		t.Errorf("a 100, m 10: %g mm, %v", got.Normal, err)
	}
}

// AGMA 2002-B88, appendix, printed table (recalled): 21 values, each the
// formula rounded to 0.001 in.
func TestLeastBacklashAGMA(t *testing.T) {
	centers := []float64{2, 4, 8, 16, 32} // in
	n := 0
	for _, row := range []printed{ // by diametral pitch, in inches
		{18, []float64{0.005, 0.006, 0, 0, 0}},
		{12, []float64{0.006, 0.007, 0.009, 0, 0}},
		{8, []float64{0.007, 0.008, 0.010, 0.014, 0}},
		{5, []float64{0, 0.010, 0.012, 0.016, 0}},
		{3, []float64{0, 0.014, 0.016, 0.020, 0.028}},
		{2, []float64{0, 0, 0.021, 0.025, 0.033}},
		{1.25, []float64{0, 0, 0, 0.034, 0.042}},
	} {
		for i, want := range row.values {
			if want == 0 {
				continue
			}
			n++
			got, err := LeastBacklashAGMA(centers[i]*25.4, 25.4/row.size)
			if in := math.Round(got.Normal/25.4*1000) / 1000; err != nil || in != want || len(got.Outside) > 0 || got.Source.Edition != "B88" {
				t.Errorf("a %g in, P %g: %+v, rounded %g in, printed %g, %v", centers[i], row.size, got, in, want, err)
			}
		}
	}
	if n != 21 {
		t.Errorf("%d values, want 21", n)
	}
	iso, _ := LeastBacklashISO(90, 3)
	agma, err := LeastBacklashAGMA(-90, 3) // the center distance of an internal pair
	if err != nil || math.Abs(agma.Normal-1.5*iso.Normal) > 1e-15 {
		t.Errorf("%g is not half as much again as %g, %v", agma.Normal, iso.Normal, err)
	}
}

func TestLeastBacklashOutside(t *testing.T) {
	for _, c := range []struct {
		of    func(a, mn float64) (LeastBacklash, error)
		a, mn float64
		want  string
	}{
		{LeastBacklashISO, 50, 1.5, ""},
		{LeastBacklashISO, 1600, 18, ""},
		{LeastBacklashISO, 0.9, 0.5, "module 0.5 mm (the table of ISO/TR 10064-2 covers 1.5 to 18 mm), center distance 0.9 mm (the table of ISO/TR 10064-2 covers 50 to 1600 mm)"},
		{LeastBacklashISO, -1601, 20, "module 20 mm (the table of ISO/TR 10064-2 covers 1.5 to 18 mm), center distance 1601 mm (the table of ISO/TR 10064-2 covers 50 to 1600 mm)"},
		{LeastBacklashAGMA, 2 * 25.4, 25.4 / 18.0, ""},
		{LeastBacklashAGMA, 32 * 25.4, 25.4 / 1.25, ""},
		{LeastBacklashAGMA, 25.4, 1.27, "diametral pitch 20 (the table of AGMA 2002 covers 1.25 to 18), center distance 1 in (the table of AGMA 2002 covers 2 to 32 in)"},
	} {
		got, err := c.of(c.a, c.mn)
		if s := strings.Join(got.Outside, ", "); err != nil || s != c.want {
			t.Errorf("a %g, m %g: %q, %v; want %q", c.a, c.mn, s, err, c.want)
		}
	}
	for _, c := range [][2]float64{{0, 3}, {90, 0}, {90, -3}, {math.NaN(), 3}, {90, math.NaN()}, {math.Inf(1), 3}, {90, math.Inf(1)}, {2e6, 3}} {
		iso, err1 := LeastBacklashISO(c[0], c[1])
		agma, err2 := LeastBacklashAGMA(c[0], c[1])
		for _, err := range []error{err1, err2} {
			if err == nil || !strings.Contains(err.Error(), "above 0 and at most 1000000 mm") || iso.Normal != 0 || agma.Normal != 0 || agma.Outside != nil {
				t.Errorf("a %g, m %g: %v, %+v, %+v", c[0], c[1], err, iso, agma)
			}
		}
	}
}

func TestRuleOfThumbBacklash(t *testing.T) {
	least, most, source := RuleOfThumbBacklash(2.54) // P 10: 0.003 to 0.005 in
	if math.Abs(least-0.003*25.4) > 1e-15 || math.Abs(most-0.005*25.4) > 1e-15 || !isConfidence(source.Confidence) || !isHow(source.How) {
		t.Errorf("%g to %g, %v", least, most, source)
	}
}
