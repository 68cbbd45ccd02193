package main

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"testing"
)

// The keyway that is left to a standard is the printed one: ASME B17.1, T for
// square keys by bore (Machinery's Handbook, 31st edition, printed to 0.001 in),
// and DIN 6885-1, b, t2 and its tolerance (makers' tables).
func TestKeywayByStandard(t *testing.T) {
	inch := func(bore, width, across float64) {
		v := runJSON(t, exitDone, "dims", "--dp", "4", "--teeth", "40", "--bore", fmt.Sprint(bore), "--keyway", "auto")
		checkKeyway(t, v, width*25.4, across*25.4, (across+0.010)*25.4, 0.0005*25.4)
	}
	inch(0.5, 1.0/8, 0.560)
	inch(0.875, 3.0/16, 0.964)
	inch(1, 1.0/4, 1.114)
	inch(1.25, 1.0/4, 1.367)
	inch(1.375, 5.0/16, 1.518)
	inch(1.75, 3.0/8, 1.922)
	inch(2.25, 1.0/2, 2.477)
	inch(2.5, 5.0/8, 2.778)
	metric := func(bore, width, depth, tolerance float64) {
		v := runJSON(t, exitDone, "dims", "--module", "5", "--teeth", "50", "--bore", fmt.Sprint(bore)+" H7", "--keyway", "Auto")
		checkKeyway(t, v, width, bore+depth, bore+depth+tolerance, 1e-12)
	}
	metric(6, 2, 1, 0.1)
	metric(12, 4, 1.8, 0.1)
	metric(25, 8, 3.3, 0.2)
	metric(44, 12, 3.3, 0.2)
	metric(50, 14, 3.8, 0.2)
	metric(110, 28, 6.4, 0.2)
	metric(150, 36, 8.4, 0.3)
	// The other standard by name: 1 in, 25.4 mm, takes DIN's 8 wide, 3.3 deep; 25.4 mm ASME's 1/4 in.
	checkKeyway(t, runJSON(t, exitDone, "dims", "--dp", "4", "--teeth", "40", "--bore", "1", "--keyway", "auto din 6885-1"), 8, 28.7, 28.9, 1e-12)
	checkKeyway(t, runJSON(t, exitDone, "dims", "--module", "4", "--teeth", "40", "--bore", "25.4", "--keyway", "auto ASME B17.1"), 6.35, 1.114*25.4, 1.124*25.4, 0.0005*25.4)
}

func checkKeyway(t *testing.T, v map[string]any, width, least, most, slack float64) {
	t.Helper()
	k := walk(v, "gears", "gear", "keyway_mm")
	w, _ := number(k, "width")
	depth, _ := number(k, "depth")
	a, _ := number(k, "across", "min")
	b, _ := number(k, "across", "max")
	bore, _ := number(v, "gears", "gear", "bore_mm", "min")
	if math.Abs(w-width) > 1e-12 || math.Abs(a-least) > slack || math.Abs(b-most) > slack || math.Abs(bore+depth-a) > 1e-12 {
		t.Errorf("bore %g: %v, want width %g, across %g to %g", bore, k, width, least, most)
	}
}

// The units of the job choose the standard, not those that are shown.
func TestKeywayByTheJobsUnits(t *testing.T) {
	file := filepath.Join(t.TempDir(), "job.toml")
	job := "units = %q\n[gear.gear]\nmodule = 2\nteeth = 40\nbore = \"1in\"\nkeyway = \"auto\"\n"
	for unit, width := range map[string]float64{"mm": 8, "in": 6.35} {
		if err := os.WriteFile(file, fmt.Appendf(nil, job, unit), 0o644); err != nil {
			t.Fatal(err)
		}
		for _, shown := range []string{"mm", "in"} {
			if got, _ := number(runJSON(t, exitDone, "dims", file, "--units", shown), "gears", "gear", "keyway_mm", "width"); got != width {
				t.Errorf("units %s, shown in %s: width %v, want %v", unit, shown, got, width)
			}
		}
	}
}

// A bolt circle written as a table and as text is one; a unit of the circle
// covers the holes. The chord is checked by the cosine law, on the centers.
func TestBoltCircle(t *testing.T) {
	file := filepath.Join(t.TempDir(), "job.toml")
	for _, c := range []struct {
		keyway, bolts                string
		diameter, hole, holes, start float64
	}{
		{"", "{ diameter = 60, holes = 5, hole = 8 }", 60, 8, 5, 0},
		{"", `"5x8 on 60"`, 60, 8, 5, 0},
		{"", `" 5 X 8mm on 60 mm "`, 60, 8, 5, 0},
		{"keyway = \"auto\"", `"5×8 on 60"`, 60, 8, 5, 36},
		{"keyway = \"auto\"", `"5x8 on 60 at 20"`, 60, 8, 5, 20},
		{"keyway = \"auto\"", `{ diameter = 60, holes = 5, hole = 8, start = "-12°30'" }`, 60, 8, 5, -12.5},
		{"", `"4x1/4 on 2-1/2in"`, 63.5, 6.35, 4, 0},
		{"", `"4x6mm on 2-1/2in"`, 63.5, 6, 4, 0},
		{"keyway = \"auto\"", `"1x10 on 55"`, 55, 10, 1, 180},
	} {
		job := "units = \"mm\"\n[gear.a]\nmodule = 2\nteeth = 50\nbore = 20\n" + c.keyway + "\nbolt_circle = " + c.bolts + "\n"
		if err := os.WriteFile(file, []byte(job), 0o644); err != nil {
			t.Fatal(err)
		}
		b := walk(runJSON(t, exitDone, "dims", file), "gears", "a", "bolt_circle")
		for name, want := range map[string]float64{"diameter_mm": c.diameter, "hole_mm": c.hole, "holes": c.holes, "start_deg": c.start} {
			if got, ok := number(b, name); !ok || math.Abs(got-want) > 1e-12 {
				t.Errorf("%s: %s is %v, want %v", c.bolts, name, walk(b, name), want)
			}
		}
		r := c.diameter / 2
		want := math.Sqrt(2 * r * r * (1 - math.Cos(2*math.Pi/c.holes)))
		if got, ok := number(b, "chord_mm"); ok != (c.holes > 1) || math.Abs(got-want) > 1e-9 && ok {
			t.Errorf("%s: chord %v, want %v", c.bolts, walk(b, "chord_mm"), want)
		}
	}
}

// Little metal left is said, and what is enough is not.
func TestWarningsOfOpenings(t *testing.T) {
	for _, c := range []struct {
		flags []string
		codes []string
	}{
		// 50 teeth, module 2: root circle 95, whole depth 4.5, so the rim should have 5.4
		{[]string{"--bore", "20", "--bolt-circle", "6x8 on 50", "--hub", "30"}, nil},
		{[]string{"--bore", "20", "--bolt-circle", "6x8 on 77"}, []string{"thin-rim"}},                 // (95 − 77 − 8)/2 = 5
		{[]string{"--bore", "20", "--bolt-circle", "6x8 on 35.8"}, []string{"thin-holes"}},             // (35.8 − 8 − 20)/2 = 3.9 < 4
		{[]string{"--bore", "20", "--bolt-circle", "6x8 on 36.2"}, nil},                                // 4.1 > 4
		{[]string{"--bore", "20", "--bolt-circle", "13x8 on 50"}, []string{"thin-holes"}},              // 50 sin(π/13) − 8 = 3.97
		{[]string{"--bore", "20", "--bolt-circle", "6x8 on 50", "--hub", "45"}, []string{"hub-holes"}}, // 42 to 58
		{[]string{"--bore", "20", "--hub", "29"}, []string{"thin-hub"}},                                // 4.5 < 20/4
		{[]string{"--bore", "20", "--keyway", "auto", "--hub", "31"}, []string{"thin-hub"}},            // corners at √(12.9² + 3²) = 13.24; 2.26 < 2.8
		{[]string{"--bore", "20", "--keyway", "auto", "--hub", "33"}, nil},                             // 3.26
		{[]string{"--hub", "96"}, []string{"hub-high"}},
	} {
		v := runJSON(t, exitDone, append([]string{"dims", "--module", "2", "--teeth", "50", "--thin", "0..0.1"}, c.flags...)...)
		var got []string
		for _, w := range v["warnings"].([]any) {
			got = append(got, walk(w, "code").(string))
		}
		if fmt.Sprint(got) != fmt.Sprint(c.codes) {
			t.Errorf("%v warns of %v, want %v", c.flags, got, c.codes)
		}
	}
}
