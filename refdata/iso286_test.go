package refdata

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// ISO 286-2, well-known classes: common fit and bearing-seat tables (recalled)
// and a coupling maker's table of keyway widths.
func TestISO286KnownLimits(t *testing.T) {
	rows := answers(t, "iso286_known_limits.csv")
	if len(rows) != 69 {
		t.Errorf("%d known limits, want 69", len(rows))
	}
	for _, row := range rows {
		lower, upper, source, err := ISO286Limits(decimal(t, row["nominal_mm"]), row["class"])
		if wl, wu := decimal(t, row["lower_um"]+"e-3"), decimal(t, row["upper_um"]+"e-3"); err != nil || lower != wl || upper != wu {
			t.Errorf("%s %s: %g to %g, want %g to %g (%s), %v", row["nominal_mm"], row["class"], lower, upper, wl, wu, row["source"], err)
		}
		if source.Standard != "ISO 286-1" || source.Confidence != "high" {
			t.Errorf("%s: %v", row["class"], source)
		}
	}
}

// TestISO286Rules checks the rules and exceptions the known limits leave out.
func TestISO286Rules(t *testing.T) {
	for _, c := range []struct {
		size         float64
		class        string
		lower, upper float64 // um
		why          string
	}{
		{250, "M6", -37, -8, "just below the exception: −17 + 9"},
		{300, "M6", -41, -9, "the exception covers both ranges from 250 to 315 mm"},
		{280, "M7", -52, 0, "the exception is of grade 6 only: −20 + 20"},
		{2, "K7", -10, 0, "no delta in the first range"},
		{2, "K9", -25, 0, "K above grade 8 in the first range"},
		{2, "N9", -29, -4, "N above grade 8, first range"},
		{20, "N9", -52, 0, "N above grade 8"},
		{20, "M9", -60, -8, "M above grade 8 has no delta"},
		{20, "P8", -55, -22, "P above grade 7 has no delta"},
		{20, "N8", -36, -3, "N8 has delta: −15 + 12"},
		{3, "H7", 0, 10, "3 mm belongs to the first range"},
		{3.001, "H7", 0, 12, "above 3 mm"},
		{math.Nextafter(30, 31), "H7", 0, 21, "30 mm off in the last place, as by way of inches, stays in its range"},
		{20, "k8", 0, 33, "k above grade 7 starts at 0"},
		{20, "k3", 0, 4, "k finer than grade 4 starts at 0"},
		{40, "j7", -10, 15, "j7"},
		{30, "t6", 41, 54, "t above 24 mm"},
		{35, "JS7", -12.5, 12.5, "exact half of an odd grade"},
		{20, " H7 ", 0, 21, "blanks around"},
	} {
		lower, upper, _, err := ISO286Limits(c.size, c.class)
		if err != nil || lower != c.lower/1000 || upper != c.upper/1000 {
			t.Errorf("%g %s: %g to %g, %v (%s)", c.size, c.class, lower*1000, upper*1000, err, c.why)
		}
	}
}

func TestISO286Errors(t *testing.T) {
	for _, c := range []struct {
		size  float64
		class string
		want  string
	}{
		{20, "", "is not understood"},
		{20, "7", "is not understood"},
		{20, "H", "is not understood"},
		{20, "H7a", "is not understood"},
		{20, "H99999999999999999999", "is not understood"},
		{20, "A7", "holes C to H"},
		{20, "x6", "shafts c to h"},
		{20, "Js7", "no table for"},
		{20, "H0", "IT1 to IT14"},
		{20, "H15", "IT1 to IT14"},
		{0, "H7", "above 0 and at most 500 mm"},
		{-20, "H7", "above 0 and at most 500 mm"},
		{500.1, "H7", "above 0 and at most 500 mm"},
		{math.NaN(), "H7", "above 0 and at most 500 mm"},
		{math.Inf(1), "js7", "above 0 and at most 500 mm"},
		{1, "H14", "not used up to 1 mm"},
		{1, "N9", "not used up to 1 mm"},
		{20, "K9", "use JS9"},
		{20, "J9", "use JS9"},
		{20, "j8", "use js8"},
		{20, "t6", "use u6"},
		{20, "T7", "use U7"},
		{20, "P2", "use P3 or coarser"},
		{20, "K1", "use K3 or coarser"},
	} {
		if _, _, _, err := ISO286Limits(c.size, c.class); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%g %s: error %v, want %q", c.size, c.class, err, c.want)
		}
	}
}

// ISO 286-1, formula of the standard tolerances (machine-drawing textbooks). The
// standard rounds its own way, so 162 of 182 values lie within 5 % or 0.5 um, no more.
func TestISO286GradesAgainstFormula(t *testing.T) {
	factors := []float64{7, 10, 16, 25, 40, 64, 100, 160, 250, 400} // IT5 to IT14, times i
	near, total := 0, 0
	for _, r := range records("iso286_it") {
		d := math.Sqrt(r.number("over_mm") * r.number("upto_mm"))
		if r.number("over_mm") == 0 {
			d = math.Sqrt(3)
		}
		i := 0.45*math.Cbrt(d) + 0.001*d
		it1, it5 := 0.8+0.020*d, 7*i
		last := 0.0
		for grade := 1; grade <= 14; grade++ {
			want := it1 * math.Pow(it5/it1, float64(grade-1)/4)
			if grade >= 5 {
				want = factors[grade-5] * i
			}
			got := r.number("IT" + strconv.Itoa(grade))
			if got <= last {
				t.Errorf("up to %s mm: IT%d %g is not above the finer grade", r.text("upto_mm"), grade, got)
			}
			last = got
			total++
			if diff := math.Abs(got - want); diff <= 0.5 || diff <= 0.05*want {
				near++
			}
		}
	}
	if near != 162 || total != 182 {
		t.Errorf("%d of %d near the formula, want 162 of 182", near, total)
	}
}

// ISO 286-1: EI of a hole is −es of the shaft for c to h; delta is the step of
// the grades; ES of P to U is −ei of p to u; the formulas of the deviations.
func TestISO286HolesAgainstShafts(t *testing.T) {
	shafts := records("iso286_shaft")
	for i, h := range records("iso286_hole") {
		s := shafts[i]
		if h.text("upto_mm") != s.text("upto_mm") {
			t.Fatalf("row %d: ranges differ", i)
		}
		for _, l := range []string{"c", "d", "e", "f", "g", "h", "p", "r", "s", "t", "u"} {
			hole := strings.ToUpper(l)
			if s.has(l) != h.has(hole) || s.has(l) && s.number(l) != -h.number(hole) {
				t.Errorf("up to %s mm: %s %s, %s %s", s.text("upto_mm"), l, s.text(l), hole, h.text(hole))
			}
		}
		it, _ := sizeRow(records("iso286_it"), h.number("upto_mm"), "over_mm", "upto_mm")
		for grade := 3; grade <= 8; grade++ {
			want := it.number("IT"+strconv.Itoa(grade)) - it.number("IT"+strconv.Itoa(grade-1))
			if i == 0 {
				want = 0
			}
			if got := h.number("delta_IT" + strconv.Itoa(grade)); got != want {
				t.Errorf("up to %s mm: delta IT%d %g, want %g", h.text("upto_mm"), grade, got, want)
			}
		}
	}
}

// ISO 286-1, formulas of the fundamental deviations, with D the geometric mean
// of the standard's main ranges: within 1 um or 6 %. Left out are the first
// range and u up to 14 mm, where the standard departs from them.
func TestISO286DeviationsAgainstFormula(t *testing.T) {
	for _, r := range records("iso286_shaft")[1:] {
		upto := r.number("upto_mm")
		it, _ := sizeRow(records("iso286_it"), upto, "over_mm", "upto_mm")
		main := math.Sqrt(it.number("over_mm") * it.number("upto_mm"))
		own := math.Sqrt(r.number("over_mm") * upto)
		check := func(letter string, want float64) {
			if got := math.Abs(r.number(letter)); math.Abs(got-want) > max(1, 0.06*want) {
				t.Errorf("up to %g mm: %s %g, by formula %.2f", upto, letter, got, want)
			}
		}
		check("d", 16*math.Pow(main, 0.44))
		check("e", 11*math.Pow(main, 0.41))
		check("f", 5.5*math.Pow(main, 0.41))
		check("g", 2.5*math.Pow(main, 0.34))
		check("k_other", 0)
		check("k4_to_k7", 0.6*math.Cbrt(main))
		check("m", it.number("IT7")-it.number("IT6"))
		check("n", 5*math.Pow(main, 0.34))
		check("r", math.Sqrt(r.number("p")*r.number("s")))
		if upto > 14 {
			check("u", it.number("IT7")+own)
		}
		if upto > 30 {
			check("t", it.number("IT7")+0.63*own)
		}
	}
}

// TestISO286Width: whatever the class, the limits lie one grade apart, and finite.
func TestISO286Width(t *testing.T) {
	letters := []string{"C", "D", "E", "F", "G", "H", "J", "JS", "K", "M", "N", "P", "R", "S", "T", "U"}
	rapid.Check(t, func(t *rapid.T) {
		size := rapid.Float64Range(0.1, 500).Draw(t, "size")
		grade := rapid.IntRange(1, 14).Draw(t, "grade")
		letter := rapid.SampledFrom(letters).Draw(t, "letter")
		if rapid.Bool().Draw(t, "shaft") {
			letter = strings.ToLower(letter)
		}
		lower, upper, _, err := ISO286Limits(size, letter+strconv.Itoa(grade))
		if err != nil {
			return // not tabulated; the errors have their own test
		}
		_, it, _, err := ISO286Limits(size, "H"+strconv.Itoa(grade))
		// limits under 2 mm: three roundings and the difference, 1.1e-16 each
		if err != nil || math.Abs(upper-lower-it) > 5e-16 {
			t.Fatalf("%g %s%d: %g to %g, grade %g, %v", size, letter, grade, lower, upper, it, err)
		}
	})
}

func FuzzISO286Limits(f *testing.F) {
	f.Add(20.0, "H7")
	f.Add(280.0, "M6")
	f.Add(0.5, "js14")
	f.Fuzz(func(t *testing.T, size float64, class string) {
		lower, upper, source, err := ISO286Limits(size, class)
		if err == nil && !(lower < upper && upper-lower < 2 && source.Standard == "ISO 286-1") {
			t.Fatalf("%g %q: %g to %g, %v", size, class, lower, upper, source)
		}
	})
}
