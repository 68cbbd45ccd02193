package refdata

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// The tables that are shown but have no look-up of their own yet.

// ANSI B4.1-1967: the clearances printed beside the limits, and the widths of
// its own grade table, 6 to 10, in thousandths of an inch.
func TestB41(t *testing.T) {
	widths := map[int][]float64{
		6:  {.25, .3, .4, .4, .5, .6, .7, .9},
		7:  {.4, .5, .6, .7, .8, 1.0, 1.2, 1.4},
		8:  {.6, .7, .9, 1.0, 1.2, 1.6, 1.8, 2.2},
		9:  {1.0, 1.2, 1.4, 1.6, 2.0, 2.5, 3.0, 3.5},
		10: {1.6, 1.8, 2.2, 2.8, 3.5, 4.0, 4.5, 5.0},
	}
	ends := []float64{0.12, 0.24, 0.40, 0.71, 1.19, 1.97, 3.15, 4.73}
	const digits = 1e-9 // the table has hundredths; sums of them in float64 are off by 1e-15
	near := func(a, b float64) bool { return math.Abs(a-b) < digits }
	rows, checked := records("ansi_b4_1"), 0
	for _, r := range rows {
		name := fmt.Sprintf("%s up to %s in", r.text("class"), r.text("upto_in"))
		hu, hl, su, sl := r.number("hole_upper"), r.number("hole_lower"), r.number("shaft_upper"), r.number("shaft_lower")
		if hl != 0 || !near(r.number("fit_min"), hl-su) || !near(r.number("fit_max"), hu-sl) {
			t.Errorf("%s: fit %s to %s does not follow from the limits", name, r.text("fit_min"), r.text("fit_max"))
		}
		i := slices.IndexFunc(ends, func(end float64) bool { return r.number("upto_in") <= end })
		hole, shaft, _ := strings.Cut(r.text("symbol"), "/")
		if want := widths[grade(hole)]; !near(hu-hl, want[i]) {
			t.Errorf("%s: hole width %g, want %g", name, hu-hl, want[i])
		}
		want, ok := widths[grade(shaft)]
		if !ok {
			continue // grade 5 is printed rounder than any table; FN1 names no grade
		}
		checked++
		// js is plus and minus the half, rounded down by 0.05 at most to its printed digits
		js := strings.HasPrefix(shaft, "js") && near(su, -sl) && su < want[i]/2+digits && su > want[i]/2-0.05-digits
		if !js && !near(su-sl, want[i]) {
			t.Errorf("%s: shaft width %g, want %g", name, su-sl, want[i])
		}
	}
	if len(rows) != 207 || checked != 178 {
		t.Errorf("%d rows, %d shaft widths checked", len(rows), checked)
	}
}

// grade returns the number at the end of a class such as "js6"; 0 where there is none.
func grade(class string) int {
	n, err := strconv.Atoi(strings.TrimLeft(class, "abcdefghijklmnopqrstuvwxyzABCDEFGHIJKLMNOPQRSTUVWXYZ"))
	if err != nil {
		return 0
	}
	return n
}

// ISO 6336-5: better quality never carries less; ANSI/AGMA 2001: the MPa form is the psi form in its note.
func TestGearAllowables(t *testing.T) {
	order := map[string]int{"ML": 0, "ML/MQ": 1, "MQ": 1, "MQ/ME": 2, "ME": 2}
	rows := records("gear_allowables")
	compared, converted := 0, 0
	for i, a := range rows {
		if a.text("scheme") == "agma2001" {
			converted++
			checkPsi(t, a)
		}
		for _, b := range rows[i+1:] {
			qa, oka := order[a.text("quality")]
			qb, okb := order[b.text("quality")]
			if !oka || !okb || qa == qb || a.text("material") != b.text("material") || a.text("kind") != b.text("kind") {
				continue
			}
			if qa > qb {
				t.Errorf("%s %s: %s stands before %s", a.text("material"), a.text("kind"), a.text("quality"), b.text("quality"))
			}
			from, to := max(a.number("x_min"), b.number("x_min")), min(a.number("x_max"), b.number("x_max"))
			for _, x := range []float64{from, to} {
				if from < to && a.number("A")*x+a.number("B") > b.number("A")*x+b.number("B") {
					t.Errorf("%s %s at %g: %s is above %s", a.text("material"), a.text("kind"), x, a.text("quality"), b.text("quality"))
				}
			}
			compared++
		}
	}
	if compared != 54 || converted != 26 {
		t.Errorf("%d pairs compared, %d rows converted", compared, converted)
	}
	// ISO 6336-5, well-known points (recalled): alloy steel of 300 HV, MQ: 767 and 315 MPa.
	for kind, want := range map[string]float64{"contact": 767, "bending": 315} {
		r := cellRecord(t, "gear_allowables", func(r record) bool {
			return r.text("code") == "V (alloy)" && r.text("quality") == "MQ" && r.text("kind") == kind
		})
		if got := r.number("A")*300 + r.number("B"); math.Round(got) != want && math.Abs(got-want) > 0.5+1e-9 {
			t.Errorf("%s: %g, want %g", kind, got, want)
		}
	}
}

// checkPsi compares A and B in MPa with the note, such as "102*HB + 16400 psi".
func checkPsi(t *testing.T, r record) {
	t.Helper()
	const psi = 0.006894757 // MPa: 4.4482216 N on 25.4² mm²
	text := strings.TrimSuffix(r.text("note"), " psi")
	slope, rest, ok := strings.Cut(text, "*HB + ")
	if !ok {
		slope, rest = "0", text
	}
	for column, value := range map[string]float64{"A": decimal(t, slope) * psi, "B": decimal(t, rest) * psi} {
		// three digits are given, four above 1000; recalled psi forms are as short: one in the last of three
		if got := r.number(column); math.Abs(got-value) > 0.005*value {
			t.Errorf("%s %s: %s %g, from psi %.4g", r.text("material"), r.text("kind"), column, got, value)
		}
	}
}

// DIN 863-1: G = floor(4 + A/50) um for the measuring range that begins at A mm.
func TestInstruments(t *testing.T) {
	n := 0
	for _, r := range records("instruments") {
		if r.text("basis") != "DIN 863-1" {
			continue
		}
		n++
		if want := math.Floor(4 + r.number("over")/50); r.number("value") != want {
			t.Errorf("micrometer from %s mm: %s um, want %g", r.text("over"), r.text("value"), want)
		}
	}
	if n != 12 {
		t.Errorf("%d micrometers, want 12", n)
	}
	r := cellRecord(t, "instruments", func(r record) bool { return r.text("record") == "constant" })
	if r.number("value") != 20 || r.text("unit") != "degC" { // ISO 1
		t.Errorf("reference temperature %s %s", r.text("value"), r.text("unit"))
	}
}

// The older handbook table of y = Y/π for 20° full-depth teeth (recalled) agrees
// with the textbook's Y within 0.0008; y is printed to 0.001, Y to 0.001.
func TestLewis(t *testing.T) {
	y := map[string]float64{
		"12": 0.078, "13": 0.083, "14": 0.088, "15": 0.092, "16": 0.094, "17": 0.096, "18": 0.098, "19": 0.100, "20": 0.102, "21": 0.104,
		"30": 0.114, "34": 0.118, "38": 0.122, "43": 0.126, "50": 0.130, "60": 0.134, "75": 0.138, "100": 0.142, "150": 0.146, "300": 0.150, "rack": 0.154,
	}
	last := 0.0
	for _, r := range records("lewis") {
		v := r.number("Y")
		if v <= last {
			t.Errorf("Y %g after %g", v, last)
		}
		last = v
		if want, ok := y[r.text("z")]; ok && math.Abs(v/math.Pi-want) > 0.0008 {
			t.Errorf("z %s: y %.4f, older table %g", r.text("z"), v/math.Pi, want)
		}
	}
}
