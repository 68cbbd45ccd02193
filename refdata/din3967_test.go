package refdata

import (
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// DIN 3967 and DIN 3964: the number rows of T_sn, the monotone A_sne, and A_a as half of ISO 286's grades.
func TestDIN3967(t *testing.T) {
	rows := [][]float64{
		{3, 5, 8, 12, 20, 30, 50, 80, 130, 200, 300, 500, 800, 1300},
		{6, 10, 16, 25, 40, 60, 100, 160, 250, 400, 600, 1000},
	}
	tolerances := map[float64][]float64{} // by diameter range, series 21 to 30
	allowance := map[string]float64{}     // by series: the range before
	var before record
	halves := 0
	for _, r := range records("allowance_din3967") {
		over, to, v := r.number("over_mm"), r.number("to_mm"), r.number("value_um")
		switch r.text("table") {
		case "T_sn":
			tolerances[to] = append(tolerances[to], v)
		case "A_sne":
			if series := r.text("series"); series != "h" && over > 0 && v >= allowance[series] || v > 0 || series == "h" && v != 0 {
				t.Errorf("A_sne %s to %g mm: %g after %g", series, to, v, allowance[series])
			}
			allowance[r.text("series")] = v
			if before.table != nil && before.text("table") == "A_sne" && before.number("to_mm") == to && v <= before.number("value_um") {
				t.Errorf("A_sne to %g mm: %s is not thinner than %s", to, before.text("series"), r.text("series"))
			}
		case "A_a":
			if to > 500 {
				break // ISO 286-1's table ends here
			}
			halves++
			if _, upper, _, err := ISO286Limits(to, r.text("series")); err != nil || upper != r.scaled("value_um", -3) {
				t.Errorf("A_a %s to %g mm: %g, by ISO 286-1 %g, %v", r.text("series"), to, v, upper*1000, err)
			}
		default:
			t.Errorf("table %q", r.text("table"))
		}
		before = r
	}
	for to, got := range tolerances {
		stretch := slices.ContainsFunc(rows, func(row []float64) bool {
			i := slices.Index(row, got[0])
			return i >= 0 && i+len(got) <= len(row) && slices.Equal(row[i:i+len(got)], got)
		})
		if len(got) != 10 || !stretch {
			t.Errorf("T_sn to %g mm: %g", to, got)
		}
	}
	if len(tolerances) != 7 || halves != 70 {
		t.Errorf("%d ranges of T_sn, %d halves of grades", len(tolerances), halves)
	}
}

// DIN 3967:1978-08, tables 1 and 2 (recalled): single values by diameter and series.
func TestThicknessCallOut(t *testing.T) {
	for _, c := range []struct {
		d           float64
		text        string
		least, most float64
	}{
		{60, "cd25", 0.070, 0.110},
		{60, "DIN 3967 cd25", 0.070, 0.110},
		{-60, "din3967 CD 25", 0.070, 0.110}, // an internal gear
		{60, " c-25 ", 0.085, 0.125},
		{125, "cd25", 0.070, 0.110}, // a limit belongs to the range below
		{math.Nextafter(125, 126), "cd25", 0.070, 0.110},
		{125.01, "cd25", 0.095, 0.145},
		{5, "a21", 0.100, 0.103},
		{30, "e26", 0.030, 0.080},
		{200, "bc27", 0.140, 0.270},
		{1600, "g30", 0.030, 1.030},
		{30, "h24", 0, 0.020},
	} {
		least, most, source, err := ThicknessCallOut(c.d, c.text)
		if err != nil || least != c.least || most != c.most {
			t.Errorf("%g mm, %q: %g to %g, %v; want %g to %g", c.d, c.text, least, most, err, c.least, c.most)
		}
		if math.Signbit(least) || source.Standard != "DIN 3967" || source.Edition != "1978-08" || !strings.HasPrefix(source.Table, "tables 1 and 2") {
			t.Errorf("%g mm, %q: %g, %v", c.d, c.text, least, source)
		}
	}
}

// TestThicknessParts: a call-out is its two parts, and each part a cell of the table.
func TestThicknessParts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := rapid.Float64Range(0.001, 1600).Draw(t, "d")
		series := rapid.SampledFrom(AllowanceSeries()).Draw(t, "allowance")
		number := rapid.SampledFrom(ToleranceSeries()).Draw(t, "tolerance")
		thin, from1, err1 := ThicknessAllowance(d, series)
		width, from2, err2 := ThicknessTolerance(d, number)
		least, most, _, err := ThicknessCallOut(d, series+strconv.Itoa(number))
		if err != nil || err1 != nil || err2 != nil || least != thin || math.Abs(most-least-width) > 1e-15 || width <= 0 {
			t.Fatalf("%g to %g, parts %g and %g, %v %v %v", least, most, thin, width, err, err1, err2)
		}
		if !strings.HasPrefix(from1.Table, "table 1") || !strings.HasPrefix(from2.Table, "table 2") || from1.How != "recalled" {
			t.Fatalf("%v, %v", from1, from2)
		}
		cells := 0
		for _, r := range records("allowance_din3967") {
			inside := d > r.number("over_mm") && d <= r.number("to_mm")
			switch {
			case inside && r.text("table") == "A_sne" && r.text("series") == series && r.number("value_um") == -math.Round(thin*1000),
				inside && r.text("table") == "T_sn" && r.number("series") == float64(number) && r.number("value_um") == math.Round(width*1000):
				cells++
			}
		}
		if cells != 2 {
			t.Fatalf("%d cells", cells)
		}
	})
}

func TestThicknessSeries(t *testing.T) {
	if got := AllowanceSeries(); !slices.Equal(got, []string{"a", "ab", "b", "bc", "c", "cd", "d", "e", "f", "g", "h"}) {
		t.Error(got)
	}
	if got := ToleranceSeries(); !slices.Equal(got, []int{21, 22, 23, 24, 25, 26, 27, 28, 29, 30}) {
		t.Error(got)
	}
}

func TestThicknessRefused(t *testing.T) {
	for _, c := range []struct {
		d    float64
		text string
		want string
	}{
		{60, "", `such as "cd25"`},
		{60, "cd", `such as "cd25"`},
		{60, "25", `such as "cd25"`},
		{60, "cd2.5", `such as "cd25"`},
		{60, "cd25 26", `such as "cd25"`},
		{60, "8 cd 25", `such as "cd25"`},
		{60, "c d 25", `such as "cd25"`},
		{60, "cd25²", `such as "cd25"`},
		{60, "cd99999999999999999999", `such as "cd25"`},
		{60, "DIN 58405 cd25", `such as "cd25"`},
		{60, "js7", `no tooth thickness allowance series "js"; there are a, ab, b, bc, c, cd, d, e, f, g, h`},
		{60, "25 cd", `such as "cd25"`},
		{60, "cd31", "no tooth thickness tolerance series 31; there are 21 to 30"},
		{60, "cd -25", "there are 21 to 30"},
		{0, "cd25", "above 0 up to 1600 mm"},
		{1600.1, "cd25", "diameter of 1600.1 mm: DIN 3967 covers diameters above 0 up to 1600 mm; give the thinning itself instead"},
		{math.NaN(), "cd25", "diameter of NaN mm"},
		{math.Inf(-1), "cd25", "diameter of -Inf mm"},
	} {
		least, most, source, err := ThicknessCallOut(c.d, c.text)
		if err == nil || !strings.Contains(err.Error(), c.want) || least != 0 || most != 0 || source != (Source{}) {
			t.Errorf("%g mm, %q: %g to %g, %v; want %q", c.d, c.text, least, most, err, c.want)
		}
	}
	if _, _, err := ThicknessAllowance(60, "i"); err == nil {
		t.Error("allowance series i")
	}
	if _, _, err := ThicknessTolerance(2000, 25); err == nil {
		t.Error("tolerance at 2000 mm")
	}
}

func FuzzThicknessCallOut(f *testing.F) {
	f.Add(60.0, "DIN 3967 cd25")
	f.Add(5.0, "h 21")
	f.Add(-1600.0, "AB-30")
	f.Fuzz(func(t *testing.T, d float64, text string) {
		least, most, source, err := ThicknessCallOut(d, text)
		if err != nil {
			return
		}
		if !(least >= 0 && most > least && most < 2) || source.Standard != "DIN 3967" {
			t.Fatalf("%g, %q: %g to %g, %v", d, text, least, most, source)
		}
	})
}
