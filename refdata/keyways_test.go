package refdata

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"
)

// fraction reads inches such as "1-1/4", "3/32" or "2".
func fraction(t *testing.T, text string) float64 {
	t.Helper()
	whole, part, both := strings.Cut(text, "-")
	if !both && strings.Contains(text, "/") {
		whole, part = "0", text
	}
	num, den, ok := strings.Cut(part, "/")
	if !ok {
		num, den = "0", "1"
	}
	var v [3]float64
	for i, s := range []string{whole, num, den} {
		f, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatalf("%q is no fraction", text)
		}
		v[i] = f
	}
	return v[0] + v[1]/v[2]
}

// answers reads a file of known answers; the comment lines at its head name its source.
func answers(t *testing.T, name string) []map[string]string {
	t.Helper()
	f, err := os.Open("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	r := csv.NewReader(f)
	r.Comment = '#'
	rows, err := r.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var all []map[string]string
	for _, row := range rows[1:] {
		m := map[string]string{}
		for i, c := range rows[0] {
			m[c] = row[i]
		}
		all = append(all, m)
	}
	return all
}

func decimal(t *testing.T, text string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// ASME B17.1, published depth control values S and T (Machinery's Handbook,
// 31st edition): 129 values for 33 shafts, printed to 0.001 in.
func TestInchKeywayAgainstPublished(t *testing.T) {
	published, worst := 0, 0.0
	const rounding = 0.0005 // in; half of the last printed digit
	check := func(got float64, row map[string]string, column string) {
		if want := decimal(t, row[column]); math.Abs(got-want) > rounding {
			t.Errorf("shaft %s in: %s %.4f, printed %s", row["shaft_in"], column, got, row[column])
		} else {
			worst = max(worst, math.Abs(got-want))
		}
	}
	for _, row := range answers(t, "keyways_inch_depth.csv") {
		d, w, h := decimal(t, row["shaft_in"]), fraction(t, row["key_w"]), fraction(t, row["key_h_rect"])
		r, ok := sizeRow(records("keyways_inch"), d, "over_in", "upto_in")
		if !ok || r.text("key_w") != row["key_w"] || r.text("key_h_rect") != row["key_h_rect"] {
			t.Fatalf("shaft %g in: key %s × %s, printed %s × %s", d, r.text("key_w"), r.text("key_h_rect"), row["key_w"], row["key_h_rect"])
		}
		k, err := InchKeyway(d)
		if err != nil {
			t.Fatal(err)
		}
		check(k.AcrossBore/25.4, row, "T_square")
		check(acrossBoreInch(d, w, h), row, "T_rect")
		chord := (d - math.Sqrt(d*d-w*w)) / 2
		check(d-chord-w/2, row, "S_square")
		check(d-chord-h/2, row, "S_rect")
		published += 4
		if row["T_rect_mark"] == "c" {
			published--
		}
	}
	if published != 129 {
		t.Errorf("%d published values, want 129", published)
	}
	t.Logf("worst difference of %d published values: %.7f in", published, worst)
}

func TestInchKeyway(t *testing.T) {
	for _, r := range records("keyways_inch") {
		for text, number := range map[string]string{"over": "over_in", "upto": "upto_in", "key_w": "key_w_in", "key_h_rect": "key_h_rect_in"} {
			if r.has(text) && fraction(t, r.text(text)) != r.number(number) {
				t.Errorf("row %d: %s is not %s", r.row, r.text(text), r.text(number))
			}
		}
		if r.number("depth_sq_in") != r.number("key_w_in")/2 || r.has("depth_rect_in") && r.number("depth_rect_in") != r.number("key_h_rect_in")/2 {
			t.Errorf("row %d: depth is not half of the key", r.row)
		}
		for _, c := range []string{"confidence", "confidence_rect"} {
			if r.has(c) && !isConfidence(r.text(c)) {
				t.Errorf("row %d: %s %q", r.row, c, r.text(c))
			}
		}
	}
	k, err := InchKeyway(1)
	// 1 in: 1/4 × 1/4, T 1.114 (published)
	if err != nil || k.Width != 6.35 || k.Height != 6.35 || k.DepthTolerance != 0.254 || math.Abs(k.AcrossBore-1.114*25.4) > 0.0005*25.4 || math.Abs(25.4+k.HubDepth-k.AcrossBore) > 1e-14 {
		t.Errorf("1 in: %+v, %v", k, err)
	}
	// 9/16 in that went through mm may be off in the last place, and stays at the smaller key
	if k, err := InchKeyway(math.Nextafter(0.5625, 1)); err != nil || k.Width != 25.4/8 {
		t.Errorf("9/16 in: %+v, %v", k, err)
	}
	for _, bore := range []float64{0.25, 0.3125, math.Nextafter(0.3125, 1), 4.501, 0, -1, math.NaN(), math.Inf(1)} {
		if _, err := InchKeyway(bore); err == nil || !strings.Contains(err.Error(), "bores above 5/16 in (0.3125), up to 4-1/2 in") {
			t.Errorf("%g in: %v", bore, err)
		}
	}
}

func TestMetricKeyway(t *testing.T) {
	for _, r := range records("keyways_metric") {
		// top clearance by the rule of the standard (DIN 6885-1, recalled)
		b, want := r.number("b"), 0.4
		switch {
		case b <= 3:
			want = 0.2
		case b <= 16:
			want = 0.3
		}
		if c := r.number("t1") + r.number("t2") - r.number("h"); math.Abs(c-want) > 4e-15 {
			t.Errorf("b %g: top clearance %g, want %g", b, c, want)
		}
		// the width limits are those of ISO 286-1
		for class, columns := range map[string]string{"N9": "shaft_N9", "JS9": "hub_JS9", "P9": "P9", "H9": "shaft_H9", "D10": "hub_D10"} {
			lower, upper, _, err := ISO286Limits(b, class)
			if err != nil || lower != r.scaled(columns+"_lo", -3) || upper != r.scaled(columns+"_up", -3) {
				t.Errorf("b %g %s: %g to %g, %v", b, class, lower, upper, err)
			}
		}
	}
	// DIN 6885-1 (recalled): 6 belongs to 2 × 2, 22 to 6 × 6, just above to 8 × 7.
	for _, c := range []struct{ bore, b, h, t2, tol float64 }{
		{6, 2, 2, 1, 0.1}, {12, 4, 4, 1.8, 0.1}, {12.0001, 5, 5, 2.3, 0.1}, {22, 6, 6, 2.8, 0.1}, {22.001, 8, 7, 3.3, 0.2}, {24, 8, 7, 3.3, 0.2}, {150, 36, 20, 8.4, 0.3},
	} {
		k, err := MetricKeyway(c.bore)
		if err != nil || k.Width != c.b || k.Height != c.h || k.HubDepth != c.t2 || k.DepthTolerance != c.tol || k.AcrossBore != c.bore+c.t2 {
			t.Errorf("%g mm: %+v, %v", c.bore, k, err)
		}
		if k.Source.Standard != "DIN 6885-1" {
			t.Errorf("%g mm: %v", c.bore, k.Source)
		}
	}
	for _, bore := range []float64{5.9, 150.1, 0, -10, math.NaN(), math.Inf(1)} {
		if _, err := MetricKeyway(bore); err == nil || !strings.Contains(err.Error(), "from 6 to 150 mm") {
			t.Errorf("%g mm: %v", bore, err)
		}
	}
}
