package main

import (
	"encoding/json"
	"math"
	"path/filepath"
	"strings"
	"testing"
)

// The names of JSON fields that tests outside this repository rely on, each
// with its type: # a number, 0 a number or null, b true or false, s a text,
// r a range {min, max} in order, R such a range or null, p a pair {first, second}.
func requiredNames() map[string]string {
	return map[string]string{
		"dims gear":    "teeth# reference_diameter_mm# base_diameter_mm# tip_diameter_mm# root_diameter_mm# form_diameter_mm# tooth_thickness_mm# tip_thickness_mm# undercut:b",
		"mesh":         "center_distance_mm# working_pressure_angle_deg# transverse_contact_ratio# overlap_ratio# circumferential_backlash_mm:r normal_backlash_mm:r tip_clearance_mm:p",
		"warning":      "code:s text:s",
		"targets gear": "tooth_thickness_mm:r",
		"over_pins":    "pin_diameter_mm# pins# kind:s measurement_mm:R contact_diameter_mm:R usable:b why:s",
		"also":         "way:s measurement_mm:R usable:b why:s",
		"span":         "teeth# length_mm:R usable:b why:s",
		"chordal":      "thickness_mm:r height_mm#",
		"mesh budget":  "circumferential_backlash_mm:r statistical_backlash_mm:r middle_backlash_mm# possible:b held:s",
		"budget row":   "what:s worst_mm# statistical_mm# worst_adds_mm# statistical_adds_mm# met_by_every_pair:b",
		"contour gear": "file:s segments# arcs# lines# max_deviation_mm# tolerance_mm#",
		"as_written":   "over_pins_mm# target_mm# difference_mm#",
	}
}

// checkNames demands the required names of a kind of object.
func checkNames(t *testing.T, kind string, v any) {
	t.Helper()
	object, ok := v.(map[string]any)
	if !ok {
		t.Fatalf("%s is no object: %v", kind, v)
	}
	for _, spec := range strings.Fields(requiredNames()[kind]) {
		name, form, _ := strings.Cut(strings.Replace(spec, "#", ":#", 1), ":")
		x, there := object[name]
		if !there {
			t.Errorf("%s has no %s", kind, name)
			continue
		}
		if !hasForm(x, form) {
			t.Errorf("%s: %s is %v, not %s", kind, name, x, form)
		}
	}
}

func hasForm(x any, form string) bool {
	var ok bool
	switch form {
	case "#":
		_, ok = x.(float64)
	case "b":
		_, ok = x.(bool)
	case "s":
		_, ok = x.(string)
	case "r":
		lo, ok1 := number(x, "min")
		hi, ok2 := number(x, "max")
		ok = ok1 && ok2 && lo <= hi
	case "R":
		ok = x == nil || hasForm(x, "r")
	case "p":
		_, ok1 := number(x, "first")
		_, ok2 := number(x, "second")
		ok = ok1 && ok2
	}
	return ok
}

// runJSON runs a command that must end with the status and print one JSON value.
func runJSON(t *testing.T, status int, args ...string) map[string]any {
	t.Helper()
	got, out, stderr := runProgram(append(args, "--json")...)
	if got != status {
		t.Fatalf("%q ends with %d: %s", args, got, stderr)
	}
	return decoded(t, out)
}

func decoded(t *testing.T, text string) map[string]any {
	t.Helper()
	var v map[string]any
	if err := json.Unmarshal([]byte(text), &v); err != nil {
		t.Fatalf("%v in %s", err, text)
	}
	return v
}

// gearsOf returns the gears of a result by name; there must be as many as the text says.
func gearsOf(t *testing.T, v map[string]any) map[string]any {
	t.Helper()
	gears, ok := v["gears"].(map[string]any)
	if !ok || len(gears) == 0 {
		t.Fatalf("no gears in %v", v)
	}
	if _, ok := v["warnings"].([]any); !ok {
		t.Errorf("warnings is no list: %v", v["warnings"])
	}
	for _, w := range v["warnings"].([]any) {
		checkNames(t, "warning", w)
	}
	return gears
}

// Every name that is relied on is there, in every example and every kind of gear.
func TestJSONNames(t *testing.T) {
	for name, args := range explained() {
		if example := strings.HasPrefix(name, "example"); !example && name != "undercut" && name != "helical odd, left" && name != "asked for" {
			continue // the fields are the same for every gear of a kind
		}
		t.Run("targets/"+name, func(t *testing.T) {
			for _, g := range gearsOf(t, runJSON(t, exitDone, append([]string{"targets"}, args...)...)) {
				checkTargetNames(t, g)
			}
		})
		if name == "asked for" {
			continue // flags that only targets knows
		}
		t.Run("dims/"+name, func(t *testing.T) {
			v := runJSON(t, exitDone, append([]string{"dims"}, args...)...)
			for _, g := range gearsOf(t, v) {
				checkNames(t, "dims gear", g)
			}
			for _, m := range v["meshes"].([]any) {
				checkNames(t, "mesh", m)
				if names, _ := walk(m, "gears").([]any); len(names) != 2 {
					t.Errorf("gears of a mesh: %v", names)
				}
			}
		})
	}
	for _, name := range exampleNames() {
		if name == "helical-table" {
			continue // a helical section takes seconds to measure under -race; a script draws one
		}
		t.Run("contour/"+name, func(t *testing.T) {
			dir := filepath.ToSlash(t.TempDir()) + "/"
			for _, g := range gearsOf(t, runJSON(t, exitDone, "contour", "--example", name, "-o", dir)) {
				checkNames(t, "contour gear", g)
				checkNames(t, "as_written", walk(g, "as_written"))
				checkContourNumbers(t, g)
			}
		})
	}
}

func checkTargetNames(t *testing.T, g any) {
	t.Helper()
	checkNames(t, "targets gear", g)
	checkNames(t, "chordal", walk(g, "chordal"))
	for _, p := range walk(g, "over_pins").([]any) {
		checkNames(t, "over_pins", p)
		if kind := walk(p, "kind"); kind != "pins" && kind != "balls" || walk(p, "pins") != 2.0 {
			t.Errorf("kind %v, pins %v", kind, walk(p, "pins"))
		}
		if walk(p, "measurement_mm") == nil && walk(p, "usable") == true {
			t.Errorf("usable without a measurement: %v", p)
		}
		for _, a := range walk(p, "also").([]any) {
			checkNames(t, "also", a)
		}
	}
	for _, s := range walk(g, "span").([]any) {
		checkNames(t, "span", s)
	}
}

func checkContourNumbers(t *testing.T, g any) {
	t.Helper()
	segments, _ := number(g, "segments")
	arcs, _ := number(g, "arcs")
	lines, _ := number(g, "lines")
	deviation, _ := number(g, "max_deviation_mm")
	tolerance, _ := number(g, "tolerance_mm")
	if segments != arcs+lines || deviation > tolerance || tolerance != 0.0025 {
		t.Errorf("%v pieces, %v arcs and %v lines, off by %v of %v", segments, arcs, lines, deviation, tolerance)
	}
	over, _ := number(g, "as_written", "over_pins_mm")
	target, _ := number(g, "as_written", "target_mm")
	difference, _ := number(g, "as_written", "difference_mm")
	if math.Abs(over-target-difference) > 1e-12 {
		t.Errorf("%v - %v is not %v", over, target, difference)
	}
}

// The contour drawn is the middle of the limits: its target is the aim of the same pin.
func TestContourAimsAtTheMiddle(t *testing.T) {
	for name, g := range gearsOf(t, runJSON(t, exitDone, "contour", "--example", "feed-drive", "-o", filepath.ToSlash(t.TempDir())+"/")) {
		pins := walk(runJSON(t, exitDone, "targets", "--example", "feed-drive"), "gears", name, "over_pins").([]any)
		target, _ := number(g, "as_written", "target_mm")
		found := false
		for _, p := range pins {
			aim, _ := number(p, "aim_mm")
			found = found || aim == target
		}
		if !found {
			t.Errorf("%s is drawn for %v, which targets does not aim at", name, target)
		}
	}
}

// Pins asked for are answered in their order, one entry each, the same pin twice too.
func TestPinsInTheirOrder(t *testing.T) {
	v := runJSON(t, exitDone, "targets", "--example", "indexer", "--pin", "0.25", "--pin", "0.108", "--pin", "2.75mm", "--pin", "0.108", "--span-teeth", "4", "--span-teeth", "2")
	for name, g := range gearsOf(t, v) {
		var got []float64
		for _, p := range walk(g, "over_pins").([]any) {
			d, _ := number(p, "pin_diameter_mm")
			got = append(got, d)
		}
		want := []float64{0.25 * 25.4, 0.108 * 25.4, 2.75, 0.108 * 25.4}
		if len(got) != len(want) {
			t.Fatalf("%s: %v", name, got)
		}
		for i := range want {
			if got[i] != want[i] {
				t.Errorf("%s: pins %v, want %v", name, got, want)
			}
		}
		first, _ := number(g, "span", 0, "teeth")
		second, _ := number(g, "span", 1, "teeth")
		if first != 4 || second != 2 || len(walk(g, "span").([]any)) != 2 {
			t.Errorf("%s: spans %v", name, walk(g, "span"))
		}
	}
}

// --units and --digits change what is shown and nothing of the JSON; bare
// lengths of flags are read in --units, those of the job in its own.
func TestUnitsOfTheJSON(t *testing.T) {
	want := walk(runJSON(t, exitDone, "dims", "--example", "indexer"), "gears")
	for _, flags := range [][]string{{"--units", "mm"}, {"--digits", "0"}, {"--units=in", "--digits=9"}} {
		got := walk(runJSON(t, exitDone, append([]string{"dims", "--example", "indexer"}, flags...)...), "gears")
		if a, b := marshal(t, want), marshal(t, got); a != b {
			t.Errorf("%v changes the JSON:\n%s\n%s", flags, a, b)
		}
	}
	for _, c := range []struct {
		flags []string
		want  float64
	}{
		{[]string{"--tip-diameter", "1.28"}, 1.28 * 25.4}, {[]string{"--tip-diameter", "32.5", "--units", "mm"}, 32.5}, {[]string{"--tip-diameter", "32.5mm"}, 32.5},
	} {
		v := runJSON(t, exitDone, append([]string{"dims", "--example", "indexer", "--gear", "driver"}, c.flags...)...)
		if got, _ := number(v, "gears", "driver", "tip_diameter_mm"); math.Abs(got-c.want) > 1e-12 {
			t.Errorf("%v: tip %v, want %v", c.flags, got, c.want)
		}
	}
}

func marshal(t *testing.T, v any) string {
	t.Helper()
	data, err := json.Marshal(v)
	if err != nil {
		t.Fatal(err)
	}
	return string(data)
}
