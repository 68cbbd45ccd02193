package main

import (
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// badJobs are jobs with a mistake each, as seeds and to hold their messages.
func badJobs(f *testing.F) []string {
	var jobs []string
	for _, name := range exampleNames() {
		data, err := exampleJob(name)
		if err != nil {
			f.Fatal(err)
		}
		jobs = append(jobs, string(data))
	}
	const gear = "units = \"mm\"\n[gear.a]\nmodule = 2\nteeth = 20\n"
	const pair = "units = \"mm\"\n[tooth]\nmodule = 2\n[gear.a]\nteeth = 20\n[gear.b]\nteeth = 30\n[[mesh]]\ngears = [\"a\", \"b\"]\n"
	return append(jobs,
		"", "units = \"mm\"", gear, pair, gear+"shift = nan", gear+"shift = 1.3", gear+"thin = \"3..4\"", gear+"tip_diameter = 36",
		gear+"bore = \"10 H7\"\nkeyway = \"auto\"\nhub = 20\nbolt_circle = \"3x2 on 25 at 12°30'\"", gear+"bolt_circle = { diameter = 20, holes = 4, hole = \"1/8in\", start = -3 }",
		gear+"bore = \"10 H7\"\nkeyway = { width = 3, depth = 1.4 }", gear+"helix_angle = \"12°30'\"\nhand = \"left\"", gear+"rack = \"ISO 53 D\"",
		gear+"addendum = 0.8\ndedendum = 1.0\ntip_radius = 0.3", gear+"tip_chamfer = 0.2", gear+"[gear.a.b]\nx = 1", gear+"gear.b.teeth = 3",
		pair+"center = { at = 50.2, tolerance = 0.02 }\nbacklash = \"0.2..0.4\"\nthin_share = \"a\"", pair+"center = \"50±0.01\"", pair+"center = 1e300", gear+"face_width = 1e308\nhelix_angle = 20",
		pair+"center = {at = 50, class = \"js7\"}", strings.Replace(pair, "teeth = 20", "teeth = 8\ntip = \"shortened\"", 1), strings.Replace(gear, "module = 2", "transverse_dp = 12\nhelix_angle = 30", 1),
		gear+"over_pins = { pin = 3.5, limits = \"44.7..44.8\", way = \"two pins\" }", gear+"over_pins = \"22.3 over 3.5, one pin to the axis\"", gear+"span = \"15.2..15.3 over 3 teeth\"",
		gear+"span = { teeth = 3, limits = 15.2 }", gear+"runout = 0.02\nswell = \"0.1..0.6 %\"\nmaterial = { name = \"bar\", expansion = 20.5 }\naccuracy = \"ISO 1328-1:2013 class 8\"",
		pair+"backlash = 0.1\n[gear.a.x]", strings.ReplaceAll(pair, "teeth = ", "material = \"4140\"\nthin_tolerance = 0.05\nteeth = ")+"backlash = 0.1\nthin_share = \"by strength\"\nbudget = \"statistical\"\ntemperature = \"40..140 F\"\nhousing = \"6061-T6\"",
		"units = \"in\"\n[gear.a]\ndp = 1e-9\nteeth = 10000", "units = \"in\"\n[[gear]]\nteeth = 3", "units = \"mm\"\nmesh = [1, [2]]\n[gear.a]\nteeth = 9\nmodule = 1",
	)
}

// FuzzJob: no job file makes the program panic or print what is no number, and
// every complaint says where in the file.
func FuzzJob(f *testing.F) {
	for _, job := range badJobs(f) {
		f.Add(job)
	}
	f.Fuzz(func(t *testing.T, text string) {
		r, err := parseJob([]byte(text), "job.toml")
		if err != nil {
			checkComplaint(t, err)
			return
		}
		if teethOf(r) > 400 {
			return // possible, and slow to sweep
		}
		j, err := resolve(r)
		if err != nil {
			checkComplaint(t, err)
		}
		var results []any
		switch {
		case err == nil:
			results = []any{newDims(j, j.gears, 0), newTargets(j, j.gears, ask{})}
		case j == nil || j.problem == nil:
			return
		}
		if len(j.meshes) > 0 { // a backlash that cannot be had has its budget too
			b, err := newBacklash(j, j.gears, backlashOptions{pairs: 100, customary: true, explain: true})
			if err != nil {
				checkComplaint(t, err)
			} else {
				results = append(results, b)
			}
		}
		for _, result := range results {
			data, err := jsonText(result) // refuses NaN and infinities
			if err != nil {
				t.Errorf("%v in\n%s", err, text)
			}
			if !json.Valid(data) {
				t.Errorf("no JSON of\n%s", text)
			}
		}
	})
}

// checkComplaint checks that an error is for people: exit status 2, and a place in the file.
func checkComplaint(t *testing.T, err error) {
	t.Helper()
	p, ok := err.(*problem)
	if !ok {
		t.Fatalf("an error that no one worded: %v", err)
	}
	if p.status != exitQuestion || !strings.HasPrefix(p.where, "job.toml") || p.text == "" {
		t.Errorf("status %d, where %q, text %q", p.status, p.where, p.text)
	}
}

func teethOf(r request) int {
	sum := 0
	for _, g := range r.gears {
		n, _, _ := g.count("teeth")
		sum += n
	}
	return sum
}

// FuzzArguments: no command line makes the program panic or end with a status
// that is none of the four; a flag before the job is the same after it.
func FuzzArguments(f *testing.F) {
	for _, line := range []string{
		"dims --example indexer", "dims --json --example feed-drive", "targets --example change-gear --pin 1.7 --pin 2mm", "dims --teeth 20 --module 2",
		"targets --teeth 17 --module 1 --pin 1.2", "tables racks --json", "new", "--version", "dims --", "dims -- -", "targets - --gear", "dims --digits", "--json dims",
		"dims --example indexer --gear driver --teeth 19 --thin 0.1..0.2", "dims --mate-teeth 20 --teeth 4 --dp 8 --backlash 0.1", "bevel", "dims --bevel", "dims --module 2 --teeth 20 --span 0.6in", "targets --module 2 --teeth 20 --temperature 5..60", "dims --shop x", "targets --span-teeth x --example indexer",
	} {
		f.Add(line)
	}
	f.Fuzz(func(t *testing.T, line string) {
		args := strings.Fields(line)
		if len(args) > 30 || writes(args) {
			return
		}
		status, stdout, stderr := runProgram(args...)
		if status < exitDone || status > exitNo {
			t.Errorf("%q ends with %d", args, status)
		}
		if (status == exitCannot || status == exitQuestion) && (stderr == "" || stdout != "") {
			t.Errorf("%q ends with %d, says %q and prints %q", args, status, stderr, stdout)
		}
		if strings.Contains(stdout, "NaN") || strings.Contains(stdout, "Inf") && !strings.Contains(stdout, "Info") {
			t.Errorf("%q prints what is no number: %s", args, stdout)
		}
	})
}

// writes reports whether a command line could write or read files, or names
// more teeth than a fuzzer should wait for.
func writes(args []string) bool {
	for _, a := range args {
		name := strings.TrimLeft(a, "-")
		if strings.HasPrefix(name, "o") || strings.HasPrefix(a, "--force") || len(name) > 40 || strings.ContainsAny(a, "\x00") {
			return true
		}
		switch a {
		case "contour", "sheet", "packet":
			return true
		}
		if _, err := os.Stat(a); err == nil && filepath.Base(a) != "" {
			return true
		}
	}
	return strings.Contains(strings.Join(args, " "), "000")
}
