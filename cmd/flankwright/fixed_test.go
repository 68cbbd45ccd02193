package main

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// badThickness are wrong words about how thick a gear's teeth are.
func badThickness() []badJob {
	helical := strings.Replace(oneGear, "teeth = 20\n", "teeth = 20\nhelix_angle = 20\nface_width = 30\n", 1)
	return []badJob{
		{oneGear + "thin = 0.1\nover_pins = \"44.8 over 3.5\"\n", "6:13", []string{"over_pins: and thin both say how thick", "keep one"}},
		{oneGear + "span = \"15.2 over 3\"\nover_pins = \"44.8 over 3.5\"\n", "5:8", []string{"span: and over_pins both say how thick", "keep one"}},
		{oneGear + "thin_tolerance = 0.1\nspan = \"15.2 over 3\"\n", "5:18", []string{"thin_tolerance: is for teeth that a backlash of one value decides", "span already gives both limits"}},
		{oneGear + "thin_tolerance = 0\n", "5:18", []string{"thin_tolerance: needs a length above 0"}},
		{oneGear + "thin_tolerance = \"0.02..0.04\"\n", "5:18", []string{"thin_tolerance: ", "is not a length"}},
		{oneGear + "thin_tolerance = 0.1\n", "5:18", []string{"belongs to a backlash of one value", "thin"}},
		{onePair + "backlash = \"0.1..0.3\"\n[gear.c]\nteeth = 20\nthin_tolerance = 0.1\n", "13:18", []string{"belongs to a backlash of one value", "gear c"}},
		{strings.Replace(onePair, "teeth = 30\n", "teeth = 30\nthin_tolerance = 0.1\n", 1) + "backlash = \"0.1..0.3\"\n", "8:18", []string{"belongs to a backlash of one value", "a range already says"}},
		{onePair + "backlash = 0.1\n", "10:12", []string{"one value is the least", `"0.05..0.15"`, "thin_tolerance in [gear.a] and [gear.b]"}},
		{strings.Replace(onePair, "teeth = 30\n", "teeth = 30\nthin_tolerance = 0.1\n", 1) + "backlash = 0.1\n", "11:12", []string{"thin_tolerance in [gear.a]\n"}},
		{strings.Replace(onePair, "teeth = 20\n", "teeth = 20\nspan = \"15.2 over 3\"\n", 1) + "backlash = \"0.1mm\"\n", "11:12", []string{"thin_tolerance in [gear.b]\n"}},
		{onePair + "backlash = -0.1\n", "10:12", []string{"0 or more"}},

		{oneGear + "over_pins = 44.8\n", "5:13", []string{"needs the limits, or the reading, and the pin's diameter", "{ pin = ", " over 0.108in"}},
		{oneGear + "over_pins = \"44.8\"\n", "5:13", []string{"the pin's diameter"}},
		{oneGear + "over_pins = { limits = 44.8 }\n", "5:13", []string{"the pin's diameter"}},
		{oneGear + "over_pins = { pin = 3.5 }\n", "5:13", []string{"needs the limits"}},
		{oneGear + "over_pins = { pin = 3.5, limits = 44.8, ways = \"two pins\" }\n", "5:41", []string{"ways: no such key in over_pins; did you mean way?"}},
		{oneGear + "over_pins = { pin = 0, limits = 44.8 }\n", "5:21", []string{"pin: needs a length above 0"}},
		{oneGear + "over_pins = { pin = 3.5, limits = 0 }\n", "5:35", []string{"limits: must be above 0"}},
		{oneGear + "over_pins = { pin = 3.5, limits = \"44.8..44.7\" }\n", "5:35", []string{"runs backwards"}},
		{oneGear + "over_pins = { pin = 3.5, limits = \"44.8\", way = \"four pins\" }\n", "5:49", []string{`"four pins" is not one of "two pins", "two balls", "three pins"`}},
		{oneGear + "over_pins = \"44,8 over 3.5\"\n", "5:13", []string{`limits: "44,8" is not a length`, "decimals take a point"}},
		{oneGear + "over_pins = \"44.8 over thick\"\n", "5:13", []string{`pin: "thick" is not a length`}},
		{oneGear + "over_pins = \"46.6 over 3.5, three pins\"\n", "5:13", []string{"three pins are for spur gears with an odd number of teeth"}},
		{helical + "over_pins = \"49.5 over 3.5, rollers exactly opposed\"\n", "7:13", []string{"helical gears with an odd number of teeth"}},
		{oneGear + "over_pins = \"27.4 over 3.5, one pin to the far side of the bore\"\n", "5:13", []string{"give bore"}},
		{oneGear + "span = \"15.2 over three\"\n", "5:8", []string{"needs the limits, or the reading, and the number of teeth", "{ teeth = 3"}},
		{oneGear + "span = \"15.2 over 3, outside\"\n", "5:8", []string{"the number of teeth"}},
		{oneGear + "span = { teeth = 3 }\n", "5:8", []string{"needs the limits"}},
		{oneGear + "span = \"15.2 over 2.5\"\n", "5:8", []string{"teeth: needs a whole number", "2.5"}},
		{oneGear + "span = \"15.2 over 21\"\n", "5:8", []string{"over 21 teeth: the gear has only 20"}},
		{oneGear + "span = \"-15.2 over 3\"\n", "5:8", []string{"limits: must be above 0"}},

		// The nominal tooth, π thick, reads 44.929 over pins of 3.5 and 15.321 over 3 teeth; d_b 37.588, d_a 44.
		{oneGear + "over_pins = \"20..44.8 over 3.5\"\n", "5:13", []string{"20.000 mm over pins of 3.500 mm, the lower limit, is read on no tooth", "base circle, 37.588 mm", "nominal tooth reads 44.929 mm", "right pin?"}},
		{oneGear + "over_pins = \"44.8..49 over 3.5\"\n", "5:13", []string{"49.000 mm over pins of 3.500 mm, the upper limit, makes the tooth", "thicker than nominal", "3.142 mm", "44.929 mm", "right pin?"}},
		{oneGear + "over_pins = \"51 over 6.5\"\n", "5:13", []string{"51.000 mm over pins of 6.500 mm makes the tooth", "thinner than nominal, more than half of its 3.142 mm"}},
		{oneGear + "over_pins = \"44.1..46 over 3.5\"\n", "5:13", []string{"44.100 mm to 46.000 mm over pins of 3.500 mm leaves", "more than a quarter", "44.929 mm"}},
		{oneGear + "over_pins = \"56.8 over 8\"\n", "5:13", []string{"no reading of the flanks", "touches at 4", "above the end of the flank at 44.000 mm", "right pin?"}},
		{oneGear + "over_pins = \"42.2 over 2.5\"\n", "5:13", []string{"no reading of the flanks", "below the tips", "44.000 mm"}},
		{oneGear + "span = \"9.3 over 3\"\n", "5:8", []string{"9.300 mm over 3 teeth makes the tooth", "15.321 mm", "right number of teeth?"}},
		{oneGear + "span = \"27 over 5\"\n", "5:8", []string{"no reading of the flanks", "above the end of the flank", "right number of teeth?"}}, // √(37.588² + 27²) = 46.28
		{strings.Replace(helical, "face_width = 30", "face_width = 2", 1) + "span = \"15.3 over 3\"\n", "7:8", []string{"needs a face width over", "2.000 mm"}},
	}
}

// A gear without tolerance reads what over-wire and span tables for 1 diametral
// pitch print (Machinery's Handbook, 20°, 1.728 in wires; recalled), so that such
// a reading makes the nominal tooth, π/2 in, to the tables' last place.
func TestFixedByPrintedTables(t *testing.T) {
	thickness := func(args ...string) float64 {
		v := runJSON(t, exitDone, append([]string{"targets", "--dp", "1"}, args...)...)
		g := walk(v, "gears", "gear")
		low, _ := number(g, "tooth_thickness_mm", "min")
		high, _ := number(g, "tooth_thickness_mm", "max")
		if by := walk(g, "thickness_decided_by"); low != high || !strings.Contains(strings.Join(args, " "), "--"+strings.ReplaceAll(fmt.Sprint(by), "_", "-")) {
			t.Errorf("%q: %v to %v, decided by %v", args, low, high, by)
		}
		return low
	}
	const nominal, place = math.Pi / 2 * 25.4, 0.51e-4 * 25.4
	for z, m := range map[int]string{15: "17.2871", 18: "20.3840", 20: "22.3900", 26: "28.4036", 30: "32.4102"} {
		if s := thickness("--teeth", strconv.Itoa(z), "--over-pins", m+"in over 1.728"); math.Abs(s-nominal) > place { // a thickness moves less than its reading
			t.Errorf("%d teeth, %s over wires: %v, want %v", z, m, s, nominal)
		}
	}
	for z, w := range map[int]string{15: "4.6383 over 2", 18: "4.6803 over 2 teeth", 20: "7.6604in over 3"} {
		if s := thickness("--teeth", strconv.Itoa(z), "--span", w); math.Abs(s-nominal) > 1.1*place { // cos 20° turns one into the other
			t.Errorf("%d teeth, span %s: %v, want %v", z, w, s, nominal)
		}
	}
}

// drawFlags draws a gear as flags, without what decides its thickness.
func drawFlags(t *rapid.T) []string {
	f := func(name string, low, high float64) string {
		return strconv.FormatFloat(rapid.Float64Range(low, high).Draw(t, name), 'g', 6, 64)
	}
	args := []string{"--module", f("module", 0.5, 8), "--teeth", strconv.Itoa(rapid.IntRange(14, 60).Draw(t, "teeth")), "--shift", f("shift", 0.1, 0.6), "--bore", "2"}
	if rapid.Bool().Draw(t, "helical") {
		args = append(args, "--helix-angle", f("helix", 5, 35), "--face-width", "200")
	}
	if rapid.Bool().Draw(t, "flanks") {
		args = append(args, "--thinning", "flanks")
	}
	return args
}

// What targets prints for a gear and its thinning, given back as limits of a
// drawing, is that gear: every way over pins, and every span.
func TestFixedRoundTrip(t *testing.T) {
	ways := map[string]int{}
	rapid.Check(t, func(rt *rapid.T) {
		args := drawFlags(rt)
		module, _ := strconv.ParseFloat(args[1], 64)
		low := rapid.Float64Range(0, 0.05).Draw(rt, "thin") * module
		high := low + rapid.Float64Range(0, 0.1).Draw(rt, "range")*module
		status, out, stderr := runProgram(append([]string{"targets", "--json", "--thin", fmt.Sprintf("%v..%vmm", low, high)}, args...)...)
		if status == exitQuestion {
			rt.Skip(stderr) // a shift or helix that makes no gear
		}
		gear := walk(decoded(t, out), "gears", "gear")
		wantLow, _ := number(gear, "tooth_thickness_mm", "min")
		wantHigh, _ := number(gear, "tooth_thickness_mm", "max")
		all := readingsOf(gear)
		if len(all) == 0 {
			rt.Skip("nothing can be measured")
		}
		r := rapid.SampledFrom(all).Draw(rt, "reading")
		ways[r.way]++
		status, out, stderr = runProgram(append([]string{"targets", "--json", r.flag, r.value}, args...)...)
		if status == exitQuestion {
			rt.Fatalf("%s %q is refused: %s", r.flag, r.value, stderr)
		}
		again := walk(decoded(t, out), "gears", "gear")
		gotLow, _ := number(again, "tooth_thickness_mm", "min")
		gotHigh, _ := number(again, "tooth_thickness_mm", "max")
		if !(math.Abs(gotLow-wantLow) < 1e-9 && math.Abs(gotHigh-wantHigh) < 1e-9) {
			rt.Errorf("%s %q: %v to %v, was %v to %v", r.flag, r.value, gotLow, gotHigh, wantLow, wantHigh)
		}
	})
	for _, w := range append(wayNames()[2:], "two pins", "span") {
		if ways[w] == 0 {
			t.Logf("%s was not tried this time", w)
		}
	}
}

// A flagReading is a target as the flag that gives it back.
type flagReading struct{ way, flag, value string }

// readingsOf returns the usable targets of a gear's JSON, with all their digits.
func readingsOf(gear any) []flagReading {
	var all []flagReading
	limits := func(v any, name string) string {
		low, _ := number(v, name, "min")
		high, _ := number(v, name, "max")
		return fmt.Sprintf("%v..%vmm over ", low, high)
	}
	for _, p := range walk(gear, "over_pins").([]any) {
		pin, _ := number(p, "pin_diameter_mm")
		over := fmt.Sprintf("%vmm", pin)
		if walk(p, "usable") == true {
			all = append(all, flagReading{"two pins", "--over-pins", limits(p, "measurement_mm") + over})
		}
		for _, a := range walk(p, "also").([]any) {
			if way := walk(a, "way").(string); walk(a, "usable") == true {
				all = append(all, flagReading{way, "--over-pins", limits(a, "measurement_mm") + over + ", " + way})
			}
		}
	}
	for _, s := range walk(gear, "span").([]any) {
		if k, _ := number(s, "teeth"); walk(s, "usable") == true {
			all = append(all, flagReading{"span", "--span", limits(s, "length_mm") + fmt.Sprint(k)})
		}
	}
	return all
}

// A new gear for a mate that is already made, thinner or thicker than nominal,
// gets the rest: the pair's backlash is what is asked for, at both ends.
func TestNewGearForAMadeMate(t *testing.T) {
	thin := map[string]float64{}
	for name, reading := range map[string]string{"thinner": "91.2 over 3.5", "nominal": "91.3 over 3.5", "thicker": "91.45 over 3.5"} {
		args := []string{"--module", "2.1", "--teeth", "14", "--shift", "0.4", "--mate-teeth", "41", "--mate-over-pins", reading, "--center", "59±0.01", "--backlash", "0.3..0.42"}
		v := runJSON(t, exitDone, append([]string{"dims"}, args...)...)
		low, _ := number(v, "meshes", 0, "circumferential_backlash_mm", "min")
		high, _ := number(v, "meshes", 0, "circumferential_backlash_mm", "max")
		if math.Abs(low-0.3) > 1e-9 || math.Abs(high-0.42) > 1e-9 {
			t.Errorf("%s: backlash %v to %v", name, low, high)
		}
		targets := runJSON(t, exitDone, append([]string{"targets", "--pin", "3.5"}, args...)...)
		wheel := walk(targets, "gears", "wheel")
		m, _ := number(wheel, "over_pins", 0, "aim_mm")
		want, _ := strconv.ParseFloat(strings.Fields(reading)[0], 64)
		if by := walk(wheel, "thickness_decided_by"); by != "over_pins" || math.Abs(m-want) > 1e-9 {
			t.Errorf("%s: the wheel reads %v, decided by %v", name, m, by)
		}
		s, _ := number(targets, "gears", "pinion", "tooth_thickness_mm", "max")
		thin[name] = s
	}
	if !(thin["thinner"] > thin["nominal"] && thin["nominal"] > thin["thicker"]) {
		t.Errorf("a thicker mate must leave a thinner tooth: %v", thin)
	}
}
