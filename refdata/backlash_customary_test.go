package refdata

import (
	"math"
	"slices"
	"testing"
)

// inches returns mm in inches, to 1e-9.
func inches(mm float64) float64 { return math.Round(mm/25.4*1e9) / 1e9 }

// Machinery's Handbook, backlash of coarse-pitch gears (recalled): single values.
func TestCustomaryCoarse(t *testing.T) {
	for _, c := range []struct{ dp, center, least, most float64 }{
		{10, 3, .005, .015},
		{10, 0.5, .005, .015},
		{19.99, 5, .005, .015},
		{19.999, 5, .005, .015}, // after the last printed pitch and still under 20
		{12, 5.001, .010, .020},
		{6, 10, .010, .020}, // a limit: the lower range
		{6, 5, .010, .020},  // a limit whose lower range has no value
		{6, math.Nextafter(10, 11), .010, .020},
		{6, 10.01, .015, .025},
		{9.995, 8, .010, .020},                 // between 9.99 and 10: the coarser pitches
		{math.Nextafter(10, 9), 3, .005, .015}, // 10 by way of a module
		{2, 20, .030, .040},                    // likewise
		{3.495, 60, .045, .065},                // between 3.49 and 3.5
		{0.5, 120, .080, .110},
		{4, 45, .035, .050},
	} {
		least, most, source, ok := CustomaryCoarse(c.dp, c.center)
		if !ok || inches(least) != c.least || inches(most) != c.most || source.Confidence != "medium" {
			t.Errorf("P %g, %g in: %g to %g in, %v, %v; want %g to %g", c.dp, c.center, inches(least), inches(most), source, ok, c.least, c.most)
		}
	}
	for _, c := range [][2]float64{
		{20, 3}, {math.Nextafter(20, 19), 3}, {0.49, 35}, {6, 4.999}, {12, 20.1}, {2, 19.9}, {1, 121}, {10, 0}, {10, -3},
		{math.NaN(), 3}, {10, math.NaN()}, {math.Inf(1), 3}, {10, math.Inf(1)}, {-1, 35}, {0, 35},
	} {
		if least, most, source, ok := CustomaryCoarse(c[0], c[1]); ok || least != 0 || most != 0 || source != (Source{}) {
			t.Errorf("P %g, %g in: %g to %g, %v, want none", c[0], c[1], least, most, source)
		}
	}
}

// TestCoarseTable: the backlash never falls as centers grow or as pitches get coarser.
func TestCoarseTable(t *testing.T) {
	rs := records("backlash_coarse")
	compared := 0
	for _, a := range rs {
		if a.number("least_in") >= a.number("most_in") || a.number("p_from") >= a.number("p_to") || a.number("over_in") >= a.number("upto_in") {
			t.Errorf("row %d: %s to %s in", a.row+1, a.text("least_in"), a.text("most_in"))
		}
		for _, b := range rs {
			coarser := b.number("p_to") < a.number("p_from") && b.number("over_in") == a.number("over_in")
			farther := b.number("p_from") == a.number("p_from") && b.number("over_in") >= a.number("upto_in")
			if !coarser && !farther {
				continue
			}
			compared++
			if b.number("least_in") < a.number("least_in") || b.number("most_in") < a.number("most_in") {
				t.Errorf("row %d has less backlash than row %d", b.row+1, a.row+1)
			}
		}
	}
	if len(rs) != 23 || compared != 66 {
		t.Errorf("%d rows, %d pairs compared", len(rs), compared)
	}
}

// Machinery's Handbook, fine pitch: the pair's backlash is twice the allowance
// to twice the sum of allowance and tolerance, in all 16 rows, and never more from
// designation to designation.
func TestFineTable(t *testing.T) {
	rs := records("backlash_fine")
	for _, r := range rs {
		allowance, tolerance := r.number("allowance_in"), r.number("tolerance_in")
		if math.Abs(r.number("least_in")-2*allowance) > 1e-15 || math.Abs(r.number("most_in")-2*(allowance+tolerance)) > 1e-15 || tolerance <= 0 {
			t.Errorf("row %d: %s to %s in", r.row+1, r.text("least_in"), r.text("most_in"))
		}
	}
	if len(rs) != 16 {
		t.Errorf("%d rows, want 16", len(rs))
	}
	for dp := 20.0; dp <= 200; dp += 0.5 {
		classes := CustomaryFine(dp)
		var names []string
		for i, c := range classes {
			names = append(names, c.Designation)
			if i > 0 && (c.Least > classes[i-1].Least || c.Most > classes[i-1].Most) {
				t.Errorf("P %g: %s has more backlash than %s", dp, c.Designation, names[i-1])
			}
		}
		if !slices.Equal(names, []string{"A", "B", "C", "D", "E"}) {
			t.Errorf("P %g: %q", dp, names)
		}
	}
}

// Machinery's Handbook, fine pitch (recalled): single values.
func TestCustomaryFine(t *testing.T) {
	for _, c := range []struct {
		dp                                float64
		name                              string
		allowance, tolerance, least, most float64
	}{
		{20, "A", .002, .002, .004, .008},
		{math.Nextafter(20, 19), "A", .002, .002, .004, .008}, // 20 by way of a module
		{45.5, "A", .002, .002, .004, .008},                   // between 45 and 46: the coarser pitches
		{math.Nextafter(46, 45), "A", .0015, .002, .003, .007},
		{72, "A", .001, .00175, .002, .0055},
		{60, "B", .001, .001, .002, .004},
		{60.5, "B", .001, .001, .002, .004},
		{64, "C", .00035, .0004, .0007, .0015},
		{120, "D", .0002, .0002, .0004, .0008},
		{200, "E", 0, .0001, 0, .0002},
		{math.Nextafter(200, 201), "E", 0, .0001, 0, .0002},
	} {
		i := slices.IndexFunc(CustomaryFine(c.dp), func(f FineClass) bool { return f.Designation == c.name })
		if i < 0 {
			t.Errorf("P %g: no %s", c.dp, c.name)
			continue
		}
		got := CustomaryFine(c.dp)[i]
		if inches(got.Allowance) != c.allowance || inches(got.Tolerance) != c.tolerance || inches(got.Least) != c.least || inches(got.Most) != c.most {
			t.Errorf("P %g %s: %+v", c.dp, c.name, got)
		}
	}
	for _, dp := range []float64{19.99, 200.1, 0, -30, math.NaN(), math.Inf(1)} {
		if got := CustomaryFine(dp); got != nil {
			t.Errorf("P %g: %+v", dp, got)
		}
	}
}
