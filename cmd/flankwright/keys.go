package main

import (
	"slices"
	"strings"
)

// A scope is where in a job file a key may stand.
type scope int

const (
	atTop scope = 1 << iota
	inTooth
	inGear
	inMesh
	inLoad
)

// A keySpec is one key of the job file; the flag of the same name has - for _.
type keySpec struct {
	name  string
	where scope
	later bool   // not supported yet: refused, never ignored
	usage string // what the flag's help says; blank where there is no flag
}

// keys lists every key there is, in the order of the README's table.
func keys() []keySpec {
	return []keySpec{
		{"title", atTop, false, "job title for sheets"},
		{"part", atTop, false, "part name or number"},
		{"drawing", atTop, false, "drawing number"},
		{"author", atTop, false, "who made the sheet"},
		{"units", atTop, false, ""},
		{"tooth", atTop, false, ""},
		{"gear", atTop, false, ""},
		{"mesh", atTop, false, ""},
		{"load", atTop, true, ""},

		{"module", inTooth | inGear, false, "normal module, mm"},
		{"dp", inTooth | inGear, false, "normal diametral pitch, 1/in"},
		{"transverse_dp", inTooth | inGear, false, "transverse diametral pitch, 1/in"},
		{"pressure_angle", inTooth | inGear, false, "normal pressure angle, degrees (20)"},
		{"helix_angle", inTooth | inGear, false, "helix angle at the reference cylinder, degrees (0)"},
		{"hand", inTooth | inGear, false, "right or left (the mate has the other)"},
		{"rack", inTooth | inGear, false, "basic rack by name, see tables (\"ISO 53 A\")"},
		{"addendum", inTooth | inGear, false, "rack addendum, × module"},
		{"dedendum", inTooth | inGear, false, "rack dedendum, × module"},
		{"tip_radius", inTooth | inGear, false, "tip radius of the rack's tool, × module"},

		{"teeth", inGear, false, "number of teeth"},
		{"ring", inGear, true, "internal gear"},
		{"shift", inGear, false, "profile shift coefficient; positive thickens the tooth (0)"},
		{"tip", inGear, false, "full; shortened, to keep the rack's clearance; topped, cut by the gear cutter (full)"},
		{"tip_diameter", inGear, false, "outside (tip) diameter"},
		{"tip_chamfer", inGear, false, "45° chamfer of the tip corners, radial height"},
		{"tip_round", inGear, false, "rounding of the tip corners, radius"},
		{"relief", inGear, false, "tip relief, amount and start diameter: \"0.02mm from 51mm linear\" (or parabolic)"},
		{"thin", inGear, false, "how much thinner than nominal, normal: 0.04..0.08"},
		{"over_pins", inGear, false, "limits over pins from a drawing, or one reading of a gear already made: \"2.2345..2.2371in over 0.108in\""},
		{"span", inGear, false, "limits of a span from a drawing, or one reading of a gear already made: \"0.4857..0.4866in over 3\""},
		{"thin_tolerance", inGear, false, "how much thinner than its thickest a tooth may be, where backlash is one value"},
		{"thinning", inGear, false, "how the teeth are thinned: infeed (cutter deeper) or flanks (root stays) (infeed)"},
		{"root", inGear, false, "generated, or cut by an end mill: \"end mill 2mm\" (generated)"},
		{"face_width", inGear, false, "face width"},
		{"bore", inGear, false, "bore, with an ISO 286 class if wanted: \"12 H7\""},
		{"keyway", inGear, false, "keyway, auto (from the bore), or width x depth beyond the bore's wall: 4x1.8mm"},
		{"hub", inGear, false, "outside diameter of the hub, on one face"},
		{"bolt_circle", inGear, false, "bolt circle: \"6x5.5mm on 40mm\", or with the first hole's angle, \"6x5.5mm on 40mm at 30\""},
		{"material", inTooth | inGear, false, "material by name, see tables (any word for the sheet alone)"},
		{"swell", inGear, false, "swelling of a plastic gear in water, linear, %: 0.6 (from dry), or 0.1..0.6"},
		{"hardness", inGear, true, "hardness"},
		{"accuracy", inTooth | inGear, false, "accuracy class: \"ISO 1328-1:2013 class 8\""},
		{"runout", inGear, false, "runout as measured, total reading"},
		{"shaft", inGear, true, "shaft name"},

		{"gears", inMesh, false, ""},
		{"center", inMesh, false, "center distance: 50, 50±0.02 (or 50+-0.02), 49.98..50.02, 50js7 (tight for nominal teeth)"},
		{"backlash", inMesh, false, "backlash wanted, circumferential: 0.05..0.15, or the least alone"},
		{"thin_share", inMesh, false, "equal, by strength, or the gear that takes it all (equal)"},
		{"budget", inMesh, false, "limits from the worst case, or from the statistical budget (worst)"},
		{"temperature", inMesh, false, "temperatures in service: 5..60 (°C), \"40..140 F\" (20)"},
		{"housing", inMesh, false, "material of the housing by name, see tables"},

		{"torque", inLoad, true, "torque"},
		{"speed", inLoad, true, "speed"},
		{"power", inLoad, true, "power"},
		{"hours", inLoad, true, "hours"},
		{"application", inLoad, true, "application factor"},
	}
}

// inlineKeys are the keys of the tables that stand for one value.
func inlineKeys() map[string][]string {
	return map[string][]string{
		"center":      {"at", "tolerance", "class", "limits"},
		"keyway":      {"width", "depth"},
		"bolt_circle": {"diameter", "holes", "hole", "start"},
		"root":        {"end_mill"},
		"relief":      {"amount", "start", "form"},
		"over_pins":   {"pin", "limits", "way"},
		"span":        {"teeth", "limits"},
		"material":    {"name", "expansion"},
		"housing":     {"name", "expansion"},
	}
}

// findKey returns the key of that name.
func findKey(name string) (keySpec, bool) {
	for _, k := range keys() {
		if k.name == name {
			return k, true
		}
	}
	return keySpec{}, false
}

// supported drops the names of keys that are not supported yet.
func supported(names []string) []string {
	var out []string
	for _, n := range names {
		if k, ok := findKey(n); !ok || !k.later {
			out = append(out, n)
		}
	}
	return out
}

// keysIn returns the names of the keys that may stand in a scope.
func keysIn(where scope) []string {
	var names []string
	for _, k := range keys() {
		if k.where&where != 0 {
			names = append(names, k.name)
		}
	}
	return names
}

// scopeName says where a key belongs, for people.
func scopeName(where scope) string {
	switch {
	case where&atTop != 0:
		return "at the top of the file"
	case where&inTooth != 0:
		return "in [tooth] or [gear.NAME]"
	case where&inGear != 0:
		return "in [gear.NAME]"
	}
	if where&inLoad != 0 {
		return "in [load]"
	}
	return "in [[mesh]]"
}

// otherDrives are words for drives that the program does not do, with a reason each.
func otherDrives() map[string]string {
	const (
		bevel  = "bevel gears are not done: their teeth taper toward a point, and no plane outline or span describes them"
		worm   = "worm gears are not done: the worm wheel is cut by a copy of its worm, not by a rack"
		cross  = "crossed-axis gears are not done: they touch in a point, and backlash and contact here are for parallel axes"
		spline = "splines are not done: they center and fit by their own standards and do not roll"
	)
	return map[string]string{
		"bevel": bevel, "cone_angle": bevel, "pitch_angle": bevel, "spiral_angle": bevel, "hypoid": bevel,
		"worm": worm, "worm_wheel": worm, "lead_angle": worm, "starts": worm,
		"crossed": cross, "crossed_axis": cross, "shaft_angle": cross, "screw": cross,
		"spline": spline, "splines": spline, "serration": spline,
	}
}

// otherDrive returns why a drive of that name is not done.
func otherDrive(name string) (string, bool) {
	why, ok := otherDrives()[strings.ReplaceAll(strings.ToLower(name), "-", "_")]
	return why, ok
}

// otherNames are words of the trade for keys that are called otherwise here.
func otherNames() map[string]string {
	return map[string]string{
		"diametral_pitch": "dp", "pitch": "dp", "normal_diametral_pitch": "dp", "mod": "module", "normal_module": "module",
		"number_of_teeth": "teeth", "z": "teeth", "profile_shift": "shift", "x": "shift", "outside_diameter": "tip_diameter", "od": "tip_diameter",
		"center_distance": "center", "centre": "center", "width": "face_width", "face": "face_width", "helix": "helix_angle", "angle": "pressure_angle",
		"play": "backlash", "internal": "ring", "hole": "bore", "holes": "bolt_circle", "bolts": "bolt_circle", "pcd": "bolt_circle", "key": "keyway", "boss": "hub",
	}
}

// nearest returns the name closest to the one given, if it is close enough to
// be meant: at most a third of its letters differ, or one contains the other as a word.
func nearest(name string, names []string) (string, bool) {
	low := strings.ReplaceAll(strings.ToLower(name), "-", "_")
	if n, ok := otherNames()[low]; ok && slices.Contains(names, n) {
		return n, true
	}
	best, at := "", 1<<30
	for _, n := range names {
		if d := editDistance(low, strings.ReplaceAll(n, "-", "_")); d < at {
			best, at = n, d
		}
	}
	if at <= max(1, (len(best)+1)/3) {
		return best, true
	}
	for _, n := range names {
		if len(low) >= 3 && strings.HasPrefix(n, low) || len(n) > 2 && (strings.HasPrefix(low, n) || strings.HasSuffix(low, "_"+n)) {
			return n, true
		}
	}
	return "", false
}

// editDistance counts the letters to insert, drop or change (Levenshtein), with
// two neighbors exchanged counted once.
func editDistance(a, b string) int {
	prev2, prev := []int(nil), make([]int, len(b)+1)
	for j := range prev {
		prev[j] = j
	}
	for i := 1; i <= len(a); i++ {
		row := make([]int, len(b)+1)
		row[0] = i
		for j := 1; j <= len(b); j++ {
			cost := 1
			if a[i-1] == b[j-1] {
				cost = 0
			}
			row[j] = min(prev[j]+1, row[j-1]+1, prev[j-1]+cost)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], prev2[j-2]+1)
			}
		}
		prev2, prev = prev, row
	}
	return prev[len(b)]
}
