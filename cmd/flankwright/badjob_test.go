package main

import (
	"bytes"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// The jobs that a mistake is put into: a gear whose next line is the fifth, a
// pair whose next line is the tenth.
const (
	oneGear = "units = \"mm\"\n[gear.a]\nmodule = 2\nteeth = 20\n"
	onePair = "units = \"mm\"\n[tooth]\nmodule = 2\n[gear.a]\nteeth = 20\n[gear.b]\nteeth = 30\n[[mesh]]\ngears = [\"a\", \"b\"]\n"
)

// A badJob is a job file with one mistake: where the message must point, and
// what it must say.
type badJob struct {
	job, at string
	says    []string
}

// badFiles are files that are no jobs, or lack what a job needs.
func badFiles() []badJob {
	return []badJob{
		{"", "1:1", []string{"units is missing", `units = "mm"`}},
		{"units = \"mm\"\n", "1:1", []string{"no gear", "[gear.NAME]"}},
		{"units = \"cm\"\n[gear.a]\n", "1:9", []string{`"cm" is not one of "mm", "in"`}},
		{"units = 3\n[gear.a]\n", "1:9", []string{"units: needs a text in quotes, not a number"}},
		{"unit = \"mm\"\n[gear.a]\n", "1:1", []string{"unit: no such key", "did you mean units?"}},
		{"units = \"mm\n", "1:12", []string{"new lines"}},
		{"units = \"mm\"\n[gear.a\n", "2:8", []string{"']'"}},
		{"units = \"mm\"\nunits = \"in\"\n", "2:1", []string{"units", "already defined"}},
		{oneGear + "[gear.a]\nteeth = 3\n", "5:2", []string{"a already exists"}},
		{"units = \"mm\"\n[gear]\nmodule = 1\n", "3:1", []string{"gear.module: needs a name", "[gear.NAME]"}},
		{"units = \"mm\"\ngear = 3\n", "2:1", []string{"gear: needs a table"}},
		{"units = \"mm\"\n[gear.\"a b\"]\nmodule = 1\nteeth = 20\n", "2:7", []string{`"a b"`, "letters, digits"}},
		{"units = \"mm\"\n[gear.a]\nmodule = 2\n", "2:7", []string{"teeth is missing", "teeth = 24"}},
		{"units = \"mm\"\n[gear.a]\nteeth = 20\n", "2:7", []string{"module is missing", "dp = 16"}},
		{"units = \"mm\"\ntitle = 3\n" + oneGear[13:], "2:9", []string{"title: needs a text in quotes"}},
		{"\xff\xfe", "", []string{"is no text", "TOML"}},
	}
}

// badKeys are keys that do not exist, stand in the wrong place, or are not there yet.
func badKeys() []badJob {
	later := func(line string) badJob { return badJob{oneGear + line, "5:1", []string{"not supported yet"}} }
	return []badJob{
		{oneGear + "teeht = 4\n", "5:1", []string{"teeht: no such key in [gear.a]; did you mean teeth?"}},
		{oneGear + "Shift = 0.1\n", "5:1", []string{"did you mean shift?"}},
		{oneGear + "tip-diameter = 43\n", "5:1", []string{"did you mean tip_diameter?"}},
		{oneGear + "face_wdith = 4\n", "5:1", []string{"did you mean face_width?"}},
		{oneGear + "center = 4\n", "5:1", []string{"center: belongs in [[mesh]], not in [gear.a]"}},
		{oneGear + "[tooth]\nteeth = 4\n", "6:1", []string{"teeth: belongs in [gear.NAME], not in [tooth]"}},
		{onePair + "helix_angle = 3\n", "10:1", []string{"helix_angle: belongs in [tooth] or [gear.NAME], not in [[mesh]]"}},
		{oneGear + "[loads]\n", "5:2", []string{"loads: no such key in a job; did you mean load?"}},
		{oneGear + "[mesh]\ngears = [\"a\", \"b\"]\n", "5:2", []string{"mesh: needs a list of tables", "[[mesh]]"}},
		{oneGear + "bore = 10\nkeyway = { width = 3, dpth = 1 }\n", "6:23", []string{"dpth: no such key in keyway; did you mean depth?"}},
		{onePair + "center = { at = 50, tolernce = 0.2 }\n", "10:21", []string{"tolernce: no such key in center; did you mean tolerance?"}},
		later("ring = true\n"), later("hardness = 50\n"), later("shaft = \"one\"\n"),
		{oneGear + "[load]\ntorque = 4\n", "5:2", []string{"load: not supported yet"}},
		{oneGear + "cone_angle = 45\n", "5:1", []string{"bevel gears are not done", "taper"}},
		{oneGear + "spiral_angle = 45\n", "5:1", []string{"bevel gears are not done"}},
		{oneGear + "lead_angle = 5\n", "5:1", []string{"worm gears are not done", "not by a rack"}},
		{oneGear + "shaft_angle = 90\n", "5:1", []string{"crossed-axis gears are not done", "parallel axes"}},
		{oneGear + "spline = true\n", "5:1", []string{"splines are not done"}},
	}
}

// badValues are values of the wrong type, or out of any sense.
func badValues() []badJob {
	return []badJob{
		{oneGear + "shift = nan\n", "5:9", []string{"shift: needs a finite number"}},
		{oneGear + "shift = -inf\n", "5:9", []string{"shift: needs a finite number"}},
		{oneGear + "bore = inf\n", "5:8", []string{"bore: "}},
		{oneGear + "shift = \"0.5\"\n", "5:9", []string{"shift: needs a plain number, not a text"}},
		{oneGear + "shift = 9\n", "5:9", []string{"coefficient", "±5"}},
		{oneGear + "thin = true\n", "5:8", []string{"thin: needs a length or a range"}},
		{oneGear + "thin = \"0.2..0.1\"\n", "5:8", []string{"runs backwards"}},
		{oneGear + "thin = \"0,04..0,08\"\n", "5:8", []string{`"0,04" is not a length`}},
		{oneGear + "thin = -0.1\n", "5:8", []string{"0 or more"}},
		{oneGear + "face_width = \"wide\"\n", "5:14", []string{`"wide" is not a length`, "0.75in"}},
		{oneGear + "face_width = 0\n", "5:14", []string{"above 0"}},
		{oneGear + "bore = \"10 H99\"\n", "5:8", []string{"H99", "IT1 to IT14"}},
		{oneGear + "keyway = { width = 3, depth = 1 }\n", "5:10", []string{"keyway: needs a bore"}},
		{oneGear + "bore = 10\nkeyway = { width = 3 }\n", "6:10", []string{"both width and depth"}},
		{oneGear + "bore = 10\nkeyway = { width = 30, depth = 1 }\n", "6:10", []string{"30.000 mm", "10.000 mm"}},
		{oneGear + "thinning = \"side\"\n", "5:12", []string{`"infeed", "flanks"`}},
		{oneGear + "root = \"milled\"\n", "5:8", []string{"generated", `{ end_mill = "2mm" }`}},
		{oneGear + "root = { endmill = 2 }\n", "5:10", []string{"endmill: no such key in root; did you mean end_mill?"}},
		{oneGear + "root = { end_mill = 0 }\n", "5:21", []string{"above 0"}},
		{oneGear + "root = { }\n", "5:8", []string{"needs the end mill's diameter"}},
		{oneGear + "root = { end_mill = 1 }\nthinning = \"infeed\"\n", "6:12", []string{`thinning = "flanks"`}},
		{oneGear + "root = { end_mill = 1 }\ntip = \"topped\"\n", "6:7", []string{"gear cutter"}},
		{oneGear + "root = { end_mill = 1 }\nhelix_angle = 10\n", "5:8", []string{"helical", `root = "generated"`}},
		{oneGear + "relief = 0.1\n", "5:10", []string{"amount", "start", "0.02mm from 51mm linear"}},
		{oneGear + "relief = { amount = 0.02 }\n", "5:10", []string{"amount", "start"}},
		{oneGear + "relief = \"0.02 from 42 cubic\"\n", "5:10", []string{"amount", "start"}},
		{oneGear + "relief = { amount = 0.02, start = 42, form = \"cubic\" }\n", "5:46", []string{`"linear", "parabolic"`}},
		{oneGear + "tip_round = -0.1\n", "5:13", []string{"above 0"}},
		{oneGear + "tip_round = 0.1\ntip_chamfer = 0.1\n", "5:13", []string{"keep one"}},
		{oneGear + "tip = \"topped\"\ntip_diameter = 43\n", "5:7", []string{"give one of them"}},
		{oneGear + "keyway = \"auto\"\n", "5:10", []string{"keyway: needs a bore"}},
		{oneGear + "bore = 10\nkeyway = \"auto DIN 6886\"\n", "6:10", []string{`"auto DIN 6886"`, `"auto DIN 6885-1"`, `"auto ASME B17.1"`}},
		{oneGear + "bore = 5\nkeyway = \"auto\"\n", "6:10", []string{"5 mm", "from 6 to 150 mm", "give width and depth"}},
		{oneGear + "bore = \"1/4in\"\nkeyway = \"auto asme b17.1\"\n", "6:10", []string{"0.25 in", "above 5/16 in", "4-1/2 in"}},
		{oneGear + "keyway = 3\n", "5:10", []string{"keyway: needs a bore"}},
		{oneGear + "bore = 10\nkeyway = 3\n", "6:10", []string{`"auto"`, "{ width = …, depth = … }"}},
		{oneGear + "bolt_circle = 30\n", "5:15", []string{"more than one value", "6x5.5mm on 40mm"}},
		{oneGear + "bolt_circle = \"6 on 30\"\n", "5:15", []string{`"6 on 30" is not a bolt circle`, "6x5.5mm on 40mm"}},
		{oneGear + "bolt_circle = \"0x3 on 20\"\n", "5:15", []string{"bolt_circle: holes", "whole number", "not 0"}},
		{oneGear + "bolt_circle = \"3x3 on 20 at 400\"\n", "5:15", []string{"bolt_circle: start", "360°", "400°"}},
		{oneGear + "bolt_circle = { diameter = 20, holes = 3 }\n", "5:15", []string{"hole (diameter of each)"}},
		{oneGear + "bolt_circle = { diameter = 20, holes = 2.5, hole = 3 }\n", "5:40", []string{"holes: needs a whole number", "2.5"}},
		{oneGear + "bolt_circle = { diameter = 20, holes = 2, hole = -3 }\n", "5:50", []string{"hole: needs a length above 0"}},
		{oneGear + "bolt_circle = { diameter = 20, holes = 2, hol = 3 }\n", "5:43", []string{"hol: no such key in bolt_circle; did you mean hole?"}},
		{oneGear + "hub = 0\n", "5:7", []string{"hub: needs a length above 0"}},
		{oneGear + "hand = \"up\"\n", "5:8", []string{`"right", "left"`}},
		{oneGear + "rack = \"ISO 53 Z\"\n", "5:8", []string{`"ISO 53 Z"`, `nearest is "ISO 53 A"`}},
		{oneGear + "rack = \"14.5 full depth\"\npressure_angle = 20\n", "5:8", []string{"14.5°", "20°"}},
		{oneGear + "pressure_angle = 60\n", "5:18", []string{"5° to 45°", "60°"}},
		{oneGear + "pressure_angle = \"12°70'\"\n", "5:18", []string{"is not an angle", "14.5°"}},
		{oneGear + "helix_angle = 85\n", "5:15", []string{"80°", "85°"}},
		{oneGear + "dp = 3\n", "5:6", []string{"dp", "module", "keep one"}},
		{oneGear + "tip = \"shortened\"\ntip_diameter = 43\n", "5:7", []string{"tip_diameter", "give one of them"}},
		{oneGear + "tip = \"shortened\"\n", "5:7", []string{"needs a mesh"}},
		{strings.Replace(oneGear, "20", "20.5", 1), "4:9", []string{"teeth: needs a whole number", "20.5"}},
		{strings.Replace(oneGear, "20", "-20", 1), "4:9", []string{"teeth: needs a whole number", "-20"}},
		{strings.Replace(oneGear, "20", "99999", 1), "4:9", []string{"10000", "99999"}},
		{strings.Replace(oneGear, "module = 2", "module = 0", 1), "3:10", []string{"module: must be above 0"}},
		{strings.Replace(oneGear, "module = 2", "module = 1e9", 1), "3:10", []string{"0.01 to 500 mm"}},
		{strings.Replace(oneGear, "module = 2", "module = 1979-05-27", 1), "3:10", []string{"1979-05-27"}},
		{onePair[:len(onePair)-len("gears = [\"a\", \"b\"]\n")], "8:3", []string{"gears is missing"}},
		{strings.Replace(onePair, `"b"]`, `"c"]`, 1), "9:15", []string{`no gear "c"`}},
		{strings.Replace(onePair, `"b"]`, `"a"]`, 1), "9:1", []string{"cannot mesh with itself"}},
		{strings.Replace(onePair, `, "b"]`, `]`, 1), "9:1", []string{"two names"}},
		{onePair + "thin_share = \"c\"\n", "10:14", []string{`"c"`, `"a", "b"`, `"by strength"`}},
		{onePair + "backlash = \"-0.1..0.1\"\n", "10:12", []string{"0 or more", "-0.100 mm"}},
		{onePair + "center = \"50+0.1\"\n", "10:10", []string{`"50+0.1" is not`}},
		{onePair + "center = { at = 50, tolerance = -0.2 }\n", "10:33", []string{"0 or more"}},
		{onePair + "center = { at = 50, class = \"js7\", tolerance = 0.1 }\n", "10:29", []string{"give one of them"}},
	}
}

// impossibleJobs are gears and meshes that cannot be; the message names the
// numbers and the limit.
func impossibleJobs() []badJob {
	return []badJob{
		// d_b = 40 cos 20° = 37.588
		{oneGear + "tip_diameter = 36\n", "5:16", []string{"36.000 mm", "base circle, 37.588 mm"}},
		{strings.Replace(oneGear, "20", "20\nshift = 1.3", 1), "", []string{"pointed", "49.055 mm", "49.200 mm"}}, // tip 40 + 4·2.3
		// d_f = 40 − 5 = 35
		{oneGear + "bore = 35.5\n", "5:8", []string{"bore", "35.500 mm", "root circle, 35.000 mm"}},
		{oneGear + "bore = \"35 H7\"\n", "5:8", []string{"bore", "35.000 mm"}},
		{oneGear + "bore = 10\nkeyway = { width = 3, depth = 30 }\n", "6:10", []string{"35.032 mm", "17.500 mm"}},
		// holes: root circle 35; neighbors 20 sin(π/6) = 10 and 10 − 11 = −1; bore (22 − 5 − 18)/2 = −0.5;
		// the keyway of an 18 mm bore (6 × 6, t2 2.8 +0.1) ends 18/2 + 2.9 = 11.9 from the axis; a hole there at 12.5 − 2.5 = 10: 1.9
		{oneGear + "bolt_circle = \"6x5 on 31\"\n", "5:15", []string{"31.000 mm", "5.000 mm", "0.500 mm into the root circle, 35.000 mm", "smaller bolt circle"}},
		{oneGear + "bolt_circle = \"6x11 on 20\"\n", "5:15", []string{"1.000 mm into the next hole, 10.000 mm", "fewer holes"}},
		{oneGear + "bore = 18\nbolt_circle = \"6x5 on 22\"\n", "6:15", []string{"0.500 mm into the bore, 18.000 mm", "larger bolt circle"}},
		{oneGear + "bore = 18\nkeyway = \"auto\"\nbolt_circle = \"6x5 on 25 at 60\"\n", "7:15", []string{"1.900 mm into the keyway", "another start"}},
		// hub: tip 44; the keyway's corners lie at √(11.9² + 3²) = 12.272
		{oneGear + "hub = 44\n", "5:7", []string{"44.000 mm", "the gear's outside, 44.000 mm"}},
		{oneGear + "bore = 18\nhub = 18\n", "6:7", []string{"no larger than the bore, 18.000 mm"}},
		{oneGear + "bore = 18\nkeyway = \"auto\"\nhub = 24.5\n", "7:7", []string{"24.500 mm", "diameter of 24.545 mm", "larger hub"}},
		// s_n = π; 4 mm thinner is −0.858
		{oneGear + "thin = \"0.1..4\"\n", "5:8", []string{"-0.858 mm"}},
		{onePair + "center = 50\nbacklash = \"6..7\"\n", "11:12", []string{"tooth thickness", "-0."}},
		{onePair + "center = 1e300\n", "10:10", []string{"1e+300"}},
		{onePair + "center = 58\n", "10:10", []string{"58.000 mm", "do not reach each other", "54.000 mm"}}, // (44 + 64)/2
		{onePair + "center = 40\n", "10:10", []string{"40.000 mm", "base circles alone need 46.985 mm"}},    // 50 cos 20°
		{onePair + "center = 50.5\nbacklash = \"0.1..0.2\"\n", "11:12", []string{"thicker than nominal", "0.382 mm", "close the center distance by 0.365 mm, to 50.135 mm", "raise the sum of the shifts by 0.19"}},
		{onePair + "center = \"50±0.2\"\nbacklash = \"0.1..0.2\"\n", "11:12", []string{"0.100 mm to 0.200 mm", "leaves nothing for the teeth"}},
		{strings.Replace(onePair, "teeth = 30", "teeth = 30\nmodule = 3", 1), "", []string{"modules differ, 2 and 3 mm"}},
		{strings.Replace(onePair, "teeth = 30", "teeth = 30\npressure_angle = 14.5", 1), "", []string{"20°", "14.5°"}},
		{"units = \"mm\"\n[tooth]\nmodule = 2\nhelix_angle = 10\n[gear.a]\nteeth = 20\nhand = \"left\"\n[gear.b]\nteeth = 30\nhand = \"left\"\n[[mesh]]\ngears = [\"a\", \"b\"]\n", "11:3", []string{"10° left hand", "opposite"}},
		{oneGear + "tip_radius = 0.5\n", "5:14", []string{"0.5", "0.4719"}}, // (π/4 − 1.25 tan 20°)/tan 35°
		{oneGear + "dedendum = 3\n", "5:12", []string{"pointed", "dedendum"}},
		{oneGear + "tip_round = 1.5\n", "5:13", []string{"1.500 mm", "must be under 1."}},
		{oneGear + "relief = \"0.02 from 37\"\n", "5:10", []string{"37.000 mm", "37.588 mm"}},
		{oneGear + "relief = \"0.02 from 37.6\"\n", "5:10", []string{"37.600 mm", "37.640 mm"}},
		{oneGear + "relief = \"0.02 from 45\"\n", "5:10", []string{"45.000 mm", "44.000 mm"}},
		{oneGear + "relief = \"1 from 42\"\n", "5:10", []string{"1.000 mm", "at most 0."}},
		{oneGear + "root = { end_mill = 9 }\n", "5:8", []string{"9.000 mm", "largest that passes is ", "of the usual sizes "}},
		{strings.Replace(onePair, "teeth = 30", "teeth = 30\nroot = \"end mill 3\"", 1), "8:8", []string{"3.000 mm", "tip of a", "largest that passes is "}},
		{oneGear + "tip_chamfer = 3\n", "5:15", []string{"3.000 mm"}},
		{strings.Replace(oneGear, "20", "1", 1), "4:9", []string{"root diameter", "-3.000 mm"}}, // 2 − 5
	}
}

// Every mistake in a job file ends with status 2 and one line that says the
// file, the line, the column and what would be right; nothing else is printed.
func TestBadJobs(t *testing.T) {
	file := filepath.Join(t.TempDir(), "job.toml")
	for name, list := range map[string][]badJob{"files": badFiles(), "keys": badKeys(), "values": badValues(), "impossible": impossibleJobs(),
		"thickness": badThickness(), "conditions": badConditions(), "service": badService()} {
		for _, c := range list {
			if err := os.WriteFile(file, []byte(c.job), 0o644); err != nil {
				t.Fatal(err)
			}
			status, stdout, stderr := runProgram("dims", file)
			where := "flankwright: " + filepath.ToSlash(file) + ":"
			if c.at != "" {
				where += c.at + ": "
			}
			if status != exitQuestion || stdout != "" || !strings.HasPrefix(stderr, where) || strings.Count(stderr, "\n") != 1 {
				t.Errorf("%s: %q\nends with %d and prints %q and %q, wanted 2 and %q", name, c.job, status, stdout, stderr, where)
			}
			for _, s := range c.says {
				if !strings.Contains(stderr, s) {
					t.Errorf("%s: %q\nsays %q, nothing of %q", name, c.job, stderr, s)
				}
			}
		}
	}
}

// The same job from standard input names standard input.
func TestBadJobFromStandardInput(t *testing.T) {
	var out, err bytes.Buffer
	status := run([]string{"targets", "-"}, strings.NewReader(oneGear+"teeht = 3\n"), &out, &err)
	if want := "flankwright: standard input:5:1: teeht: no such key in [gear.a]; did you mean teeth?\n"; status != exitQuestion || err.String() != want || out.Len() != 0 {
		t.Errorf("%d %q %q", status, err.String(), out.String())
	}
}
