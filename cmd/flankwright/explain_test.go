package main

import (
	"bytes"
	"encoding/json"
	"math"
	"path/filepath"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"testing"
)

// explained lists what --explain is checked on: the examples, and gears that
// take every branch of an explanation.
func explained() map[string][]string {
	cases := map[string][]string{
		"undercut":           {"--module", "2", "--teeth", "8"},
		"undercut, thin":     {"--module", "3", "--teeth", "10", "--thin", "0.1..0.2"},
		"undercut helical":   {"--module", "2", "--teeth", "7", "--helix-angle", "20"},
		"odd":                {"--module", "2", "--teeth", "17", "--thin", "0.05", "--bore", "10"},
		"even":               {"--module", "2", "--teeth", "24", "--thin", "0..0.1"},
		"helical odd, left":  {"--module", "1.5", "--teeth", "13", "--pressure-angle", "17.5", "--helix-angle", "33", "--hand", "left", "--shift", "0.5"},
		"dp":                 {"--dp", "10", "--teeth", "31", "--rack", "14.5 full depth", "--thin", "0.002..0.004"},
		"transverse dp":      {"--transverse-dp", "10", "--teeth", "24", "--helix-angle", "30"},
		"given tip diameter": {"--module", "2", "--teeth", "20", "--tip-diameter", "43.5", "--tip-chamfer", "0.2"},
		"fine pitch":         {"--dp", "32", "--teeth", "20"},
		"stub":               {"--module", "4", "--teeth", "40", "--addendum", "0.8", "--dedendum", "1", "--tip-radius", "0.3", "--shift", "-0.2"},
		"pair, tight":        {"--module", "3", "--teeth", "12", "--shift", "0.6", "--mate-teeth", "24", "--mate-shift", "0.36"},
		"pair, shortened":    {"--module", "3", "--teeth", "12", "--shift", "0.6", "--mate-teeth", "24", "--mate-shift", "0.36", "--tip", "shortened"},
		"pair, undercut":     {"--module", "2", "--teeth", "10", "--mate-teeth", "40", "--center", "50±0.02", "--backlash", "0.1..0.2"},
		"helical pair":       {"--module", "2", "--teeth", "21", "--mate-teeth", "40", "--helix-angle", "12°30'", "--face-width", "20", "--backlash", "0.1..0.2"},
		"milled root":        {"--module", "2", "--teeth", "45", "--root", "end mill 1.5mm", "--thin", "0.05..0.1"},
		"milled, one arc":    {"--module", "2", "--teeth", "45", "--root", "end mill 3mm"},
		"milled, radial":     {"--module", "2", "--teeth", "14", "--root", "end mill 1mm", "--shift", "0.4"},
		"milled, one radial": {"--module", "2", "--teeth", "10", "--root", "end mill 2.6mm", "--shift", "0.5"},
		"milled pair":        {"--module", "2", "--teeth", "18", "--mate-teeth", "40", "--center", "58.2", "--backlash", "0.3..0.4", "--root", "end mill 1mm"},
		"rounded":            {"--module", "2", "--teeth", "24", "--tip-round", "0.25mm", "--thinning", "flanks", "--thin", "0.05..0.1"},
		"relieved":           {"--module", "2", "--teeth", "24", "--relief", "0.02mm from 50mm", "--tip-round", "0.2"},
		"topped":             {"--module", "2", "--teeth", "24", "--tip", "topped", "--thin", "0.05..0.1"},
		"metric keyway":      {"--module", "2", "--teeth", "40", "--bore", "25 H7", "--keyway", "auto", "--bolt-circle", "5x6 on 50", "--hub", "40"},
		"inch keyway":        {"--dp", "10", "--teeth", "40", "--bore", "1-1/8", "--keyway", "auto", "--bolt-circle", "8x1/4 on 2.5"},
		"keyway by size":     {"--module", "2", "--teeth", "8", "--bore", "6 H8", "--keyway", "2x1"},
		"over pins, even":    {"--module", "2", "--teeth", "20", "--over-pins", "44.75..44.8 over 3.5"},
		"over pins, odd":     {"--dp", "16", "--teeth", "17", "--over-pins", "1.203..1.204in over 0.108in"},
		"over three pins":    {"--module", "2", "--teeth", "21", "--over-pins", "46.5..46.6 over 3.5, three pins"},
		"one pin to axis":    {"--module", "2", "--teeth", "20", "--over-pins", "22.4 over 3.5, one pin to the axis"},
		"one pin to bore":    {"--module", "2", "--teeth", "20", "--bore", "10 H7", "--over-pins", "27.4..27.42 over 3.5, one pin to the far side of the bore"},
		"free pins":          {"--module", "2", "--teeth", "21", "--helix-angle", "20", "--face-width", "30", "--over-pins", "49.3..49.4 over 3.5, rollers between free parallel anvils"},
		"opposed pins":       {"--module", "2", "--teeth", "21", "--helix-angle", "20", "--face-width", "30", "--over-pins", "49.5..49.6 over 3.5, rollers exactly opposed"},
		"by span":            {"--module", "2", "--teeth", "21", "--helix-angle", "20", "--face-width", "30", "--span", "15.4..15.45 over 3", "--thinning", "flanks"},
		"asked for":          {"--module", "2", "--teeth", "17", "--measured-tip", "37.9", "--pin", "3.5", "--pin", "4", "--span-teeth", "2", "--arbor", "10"},
	}
	budget := []string{"--module", "2", "--teeth", "20", "--mate-teeth", "41", "--center", "61±0.02", "--face-width", "20", "--accuracy", "ISO 1328-1:2013 class 6", "--backlash", "0.05..1.2", "--temperature", "0..50", "--material", "4140", "--housing", "6061"}
	cases["budget pair"] = budget
	cases["budget pair, unlike"] = append(slices.Clone(budget), "--mate-material", "POM-C", "--runout", "0.03", "--budget", "statistical", "--customary")
	cases["budget pair that swells"] = []string{"--module", "2", "--teeth", "20", "--mate-teeth", "41", "--center", "61.3", "--backlash", "0.2..1.2", "--material", "PA66", "--swell", "0.1..0.2", "--temperature", "60", "--housing", "aluminum"}
	cases["budget pair of 1995"] = []string{"--dp", "12", "--teeth", "20", "--helix-angle", "15", "--mate-teeth", "41", "--face-width", "20mm", "--accuracy", "ISO 1328-1:1995 grade 7", "--backlash", "0.001..0.02", "--thin-share", "by strength"}
	for _, name := range exampleNames() {
		cases["example "+name] = []string{"--example", name}
	}
	return cases
}

// runProgram runs the program without a process of its own.
func runProgram(args ...string) (status int, stdout, stderr string) {
	var out, err bytes.Buffer
	status = run(args, strings.NewReader(""), &out, &err)
	return status, out.String(), err.String()
}

// explainRuns calls f with the text of --explain and the JSON of the same run, for every command and case.
func explainRuns(t *testing.T, f func(t *testing.T, command, text string, result map[string]any)) {
	for name, args := range explained() {
		for _, command := range []string{"dims", "targets", "contour", "backlash"} {
			pair := strings.Contains(name, "pair") || strings.HasPrefix(name, "example") && name != "example change-gear" // which is one gear
			if command == "backlash" && !pair || command != "backlash" && slices.Contains(args, "--customary") {
				continue
			}
			if command != "targets" && name == "asked for" {
				continue // flags that only targets knows
			}
			if command == "contour" && name != "example indexer" && name != "odd" && name != "undercut" {
				continue // it explains one measurement alone, and drawing takes its time
			}
			t.Run(command+"/"+name, func(t *testing.T) {
				line := append([]string{command, "--explain"}, args...)
				if command == "contour" {
					line = append(line, "--tolerance", "0.02mm", "--force", "-o", filepath.ToSlash(t.TempDir())+"/")
				}
				status, text, stderr := runProgram(line...)
				if status != exitDone {
					t.Fatalf("%q ends with %d: %s", line, status, stderr)
				}
				status, out, stderr := runProgram(append(line, "--json")...)
				if status != exitDone {
					t.Fatalf("%q --json ends with %d: %s", line, status, stderr)
				}
				var result map[string]any
				if err := json.Unmarshal([]byte(out), &result); err != nil {
					t.Fatal(err)
				}
				f(t, command, text, result)
			})
		}
	}
}

// A printedBlock is an explanation as a reader finds it.
type printedBlock struct {
	title, equation, source string
	inputs                  []printedNumber
	result                  printedNumber
	solved                  bool
	residual                float64
}

type printedNumber struct {
	symbol, unit, digits string
}

// value returns the number as the evaluator takes it: angles in radians.
func (p printedNumber) value(t *testing.T) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(p.digits, 64)
	if err != nil {
		t.Fatalf("%s = %q is no number", p.symbol, p.digits)
	}
	if p.unit == "deg" {
		v *= math.Pi / 180
	}
	return v
}

var (
	numberLine   = regexp.MustCompile(`^([\pL][\pL\d_]*) = (-?[\d.]+(?:e[-+]\d+)?)(?: (mm|deg))?$`)
	residualLine = regexp.MustCompile(`^left − right: (-?[\d.]+(?:e[-+]\d+)?)$`)
)

func readNumber(t *testing.T, line string) printedNumber {
	t.Helper()
	m := numberLine.FindStringSubmatch(line)
	if m == nil {
		t.Fatalf("cannot read the number %q", line)
	}
	return printedNumber{m[1], m[3], m[2]}
}

// readBlocks reads the printed explanations; every line must be understood.
func readBlocks(t *testing.T, text string) []printedBlock {
	t.Helper()
	_, text, ok := strings.Cut(text, "How the numbers come about (mm and degrees)\n")
	if !ok {
		t.Fatal("no explanations are printed")
	}
	text, _, _ = strings.Cut(text, "\nWarnings\n")
	var blocks []printedBlock
	for _, part := range strings.Split(strings.TrimSpace(text), "\n\n") {
		lines := strings.Split(part, "\n")
		if len(lines) < 4 {
			t.Fatalf("a block of %d lines: %q", len(lines), part)
		}
		b := printedBlock{title: lines[0], equation: strings.TrimSpace(lines[1])}
		for _, line := range lines[2:] {
			s := strings.TrimSpace(line)
			switch {
			case strings.HasPrefix(line, "    "):
				b.inputs = append(b.inputs, readNumber(t, s))
			case strings.HasPrefix(s, "gives "):
				b.result = readNumber(t, strings.TrimPrefix(s, "gives "))
			case strings.HasPrefix(s, "solved: "):
				b.solved, b.result = true, readNumber(t, strings.TrimPrefix(s, "solved: "))
			case strings.HasPrefix(s, "source: "):
				b.source = strings.TrimPrefix(s, "source: ")
			case residualLine.MatchString(s):
				b.residual, _ = strconv.ParseFloat(residualLine.FindStringSubmatch(s)[1], 64)
			default:
				t.Fatalf("%s: a line that says nothing known: %q", b.title, line)
			}
		}
		blocks = append(blocks, b)
	}
	return blocks
}

// printedRounding is the greatest relative error of a number printed with 15
// significant digits: half a unit of the fifteenth.
const printedRounding = 5e-15

// workOut evaluates left − right of an equation with the block's numbers, and
// how far the rounding of the printed numbers alone may move it.
func workOut(t *testing.T, b printedBlock, expression string, numbers []printedNumber) (v, rounding float64, used map[string]bool) {
	t.Helper()
	vals := map[string]float64{}
	for _, q := range numbers {
		vals[q.symbol] = q.value(t)
	}
	v, used, err := evaluate(expression, vals)
	if err != nil {
		t.Fatalf("%s: %s: %v", b.title, expression, err)
	}
	for _, q := range numbers {
		was := vals[q.symbol]
		vals[q.symbol] = was * (1 + printedRounding)
		moved, _, err := evaluate(expression, vals)
		if err != nil {
			t.Fatalf("%s: %v", b.title, err)
		}
		rounding += math.Abs(moved - v)
		vals[q.symbol] = was
	}
	return v, rounding, used
}

// The formulas printed are the ones computed: worked out by an evaluator of
// the test's own with nothing but what is printed, each lands on its result.
// The scale of 1e-9 is the result itself; a difference of nearly equal numbers
// may besides be off by what the fifteen printed digits leave open.
func TestExplanationsLandOnTheirResults(t *testing.T) {
	explainRuns(t, func(t *testing.T, command, text string, result map[string]any) {
		blocks := readBlocks(t, text)
		checkAgainstJSON(t, command, blocks, result)
		checkChain(t, blocks)
		for _, b := range blocks {
			left, right, ok := strings.Cut(b.equation, " = ")
			if !ok || b.source == "" || b.title == "" {
				t.Fatalf("%q: equation %q, source %q", b.title, b.equation, b.source)
			}
			numbers := b.inputs
			if b.solved {
				checkSolved(t, b, left, right)
				continue
			}
			if left != b.result.symbol {
				t.Errorf("%s: the equation gives %s, the result is called %s", b.title, left, b.result.symbol)
			}
			v, rounding, used := workOut(t, b, right, numbers)
			want := b.result.value(t)
			if !(math.Abs(v-want) <= 1e-9*math.Abs(want)+rounding) {
				t.Errorf("%s: %s gives %.15g, printed is %.15g", b.title, b.equation, v, want)
			}
			for _, q := range b.inputs {
				if !used[q.symbol] {
					t.Errorf("%s: %s is printed but not in the equation", b.title, q.symbol)
				}
			}
		}
	})
}

// checkSolved compares both sides of an equation that was solved: their
// difference is the residual printed, and nothing but rounding.
func checkSolved(t *testing.T, b printedBlock, left, right string) {
	t.Helper()
	v, rounding, _ := workOut(t, b, left+" - ("+right+")", append([]printedNumber{b.result}, b.inputs...))
	const noise = 1e-15 // radians: the last places of angles near 1
	if !(math.Abs(v-b.residual) <= rounding+noise) {
		t.Errorf("%s: left − right is %.3g with the printed numbers, printed %.3g", b.title, v, b.residual)
	}
	const solvedTo = 1e-13 // radians: 1e-11 mm on a gear of 200 mm
	if math.Abs(b.residual) > solvedTo {
		t.Errorf("%s: not solved, left − right is %.3g", b.title, b.residual)
	}
}
