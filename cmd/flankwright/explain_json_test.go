package main

import (
	"math"
	"strings"
	"testing"
)

// checkAgainstJSON compares every explained result with the JSON of the same
// run, where JSON has it; both are one number, so they agree to the fifteen
// digits printed. At least a few must have been found.
func checkAgainstJSON(t *testing.T, command string, blocks []printedBlock, result map[string]any) {
	t.Helper()
	compared := 0
	seen := map[string]int{} // how many blocks of a gear and symbol there were: one a pin, one a span
	for _, b := range blocks {
		about := lastPart(b.title)
		count := seen[about+" "+b.result.symbol]
		seen[about+" "+b.result.symbol]++
		want, ok := jsonOf(command, result, about, b, count)
		if !ok {
			continue
		}
		compared++
		got := b.result.value(t)
		if b.result.unit == "deg" {
			got *= 180 / math.Pi
		}
		if !(math.Abs(got-want) <= 2*printedRounding*math.Abs(want)) {
			t.Errorf("%s: explained %s, JSON %.17g", b.title, b.result.digits, want)
		}
	}
	least := map[string]int{"dims": 10, "targets": 5, "contour": 2}[command]
	if compared < least {
		t.Errorf("only %d explained results were found in the JSON, expected %d or more", compared, least)
	}
}

// lastPart is the subject of a title: what stands behind the last comma.
func lastPart(title string) string { return title[strings.LastIndex(title, ", ")+2:] }

// jsonOf returns the number of the JSON that a block explains.
func jsonOf(command string, result map[string]any, about string, b printedBlock, count int) (float64, bool) {
	if first, second, isPair := strings.Cut(about, " and "); isPair && command == "dims" {
		for _, m := range walk(result, "meshes").([]any) {
			if names := walk(m, "gears").([]any); names[0] == first && names[1] == second {
				return number(m, dimsMeshFields()[b.result.symbol]...)
			}
		}
		return 0, false
	}
	gear := walk(result, "gears", about)
	switch command {
	case "dims":
		return number(gear, dimsGearFields()[b.result.symbol]...)
	case "contour":
		return number(gear, map[string][]any{"M": {"as_written", "target_mm"}, "Δ": {"as_written", "difference_mm"}}[b.result.symbol]...)
	}
	if way, ok := map[string]string{"M_3": "three pins", "M_1": "one pin to the axis", "M_R": "rollers exactly opposed"}[b.result.symbol]; ok {
		also, _ := walk(gear, "over_pins", count, "also").([]any)
		for _, a := range also {
			if walk(a, "way") == way {
				return number(a, "aim_mm")
			}
		}
		return 0, false
	}
	return number(gear, map[string][]any{
		"M": {"over_pins", count, "aim_mm"}, "W_k": {"span", count, "aim_mm"},
		"s_c": {"chordal", "aim_mm"}, "h_c": {"chordal", "height_mm"},
		"s_cc": {"constant_chord", "aim_mm"}, "h_cc": {"constant_chord", "height_mm"},
	}[b.result.symbol]...)
}

func dimsGearFields() map[string][]any {
	return map[string][]any{
		"m_n": {"module_mm"}, "d": {"reference_diameter_mm"}, "α_t": {"transverse_pressure_angle_deg"}, "d_b": {"base_diameter_mm"},
		"d_a": {"tip_diameter_mm"}, "d_f": {"root_diameter_mm"}, "d_Ff": {"form_diameter_mm"}, "h": {"whole_depth_mm"},
		"s_n": {"tooth_thickness_mm"}, "s_an": {"tip_thickness_mm"}, "p_bn": {"normal_base_pitch_mm"}, "d_fE": {"root_diameter_limits_mm", "min"},
		"T": {"keyway_mm", "across", "min"}, "T_max": {"keyway_mm", "across", "max"}, "t": {"keyway_mm", "depth"}, "c_H": {"bolt_circle", "chord_mm"},
	}
}

func dimsMeshFields() map[string][]any {
	return map[string][]any{
		"α_wt": {"working_pressure_angle_deg"}, "a_0": {"tight_center_distance_mm"}, "ε_α": {"transverse_contact_ratio"}, "ε_β": {"overlap_ratio"},
		"j_wtmin": {"circumferential_backlash_mm", "min"}, "j_wtmax": {"circumferential_backlash_mm", "max"},
		"j_bnmin": {"normal_backlash_mm", "min"}, "j_bnmax": {"normal_backlash_mm", "max"},
		"c_1": {"tip_clearance_mm", "first"}, "c_2": {"tip_clearance_mm", "second"},
	}
}

// walk follows names and indices into decoded JSON; nil where they lead nowhere.
func walk(v any, path ...any) any {
	for _, step := range path {
		switch s := step.(type) {
		case string:
			m, _ := v.(map[string]any)
			v = m[s]
		case int:
			list, _ := v.([]any)
			if s >= len(list) {
				return nil
			}
			v = list[s]
		}
	}
	return v
}

func number(v any, path ...any) (float64, bool) {
	if len(path) == 0 {
		return 0, false
	}
	x, ok := walk(v, path...).(float64)
	return x, ok
}

// checkChain follows the numbers through the blocks: an input that was a
// result before, of the same subject, is that number again, or the one that
// the equation solved next gives (the slide ζ stands in two equations at once).
func checkChain(t *testing.T, blocks []printedBlock) {
	t.Helper()
	results := map[string]printedNumber{}
	for i, b := range blocks {
		about := lastPart(b.title) + " "
		for _, q := range b.inputs {
			was, ok := results[about+q.symbol]
			if ok && was.digits != q.digits && !solvedNext(blocks[i:], q) {
				t.Errorf("%s: %s is %s here and came out as %s above", b.title, q.symbol, q.digits, was.digits)
			}
		}
		results[about+b.result.symbol] = b.result
	}
}

// solvedNext reports whether the next block that solves an equation gives the number.
func solvedNext(blocks []printedBlock, q printedNumber) bool {
	for _, b := range blocks {
		if b.solved {
			return b.result == q
		}
	}
	return false
}
