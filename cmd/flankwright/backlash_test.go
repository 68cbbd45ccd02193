package main

import (
	"fmt"
	"math"
	"testing"

	"flankwright/export"
	"flankwright/involute"
)

// budgetCases are pairs with everything that can take backlash, given by flags.
func budgetCases() map[string][]string {
	pair := []string{"--module", "3", "--teeth", "20", "--mate-teeth", "40", "--center", "90±0.03", "--face-width", "25"}
	with := func(more ...string) []string { return append(append([]string{}, pair...), more...) }
	return map[string][]string{
		"range":         with("--backlash", "0.1..0.4"),
		"runout":        with("--backlash", "0.1..0.4", "--runout", "0.04"),
		"class":         with("--backlash", "0.05..0.6", "--accuracy", "ISO 1328-1:2013 class 6"),
		"class, likely": with("--backlash", "0.05..0.4", "--accuracy", "ISO 1328-1:2013 class 7", "--budget", "statistical"),
		"heat":          with("--backlash", "0.05..0.6", "--accuracy", "ISO 1328-1:2013 class 6", "--temperature", "5..60", "--material", "4140", "--housing", "6061"),
		"least alone":   with("--backlash", "0.1", "--thin-tolerance", "0.05", "--accuracy", "ISO 1328-1:2013 class 6"),
		"made mate":     with("--backlash", "0.1..0.5", "--mate-over-pins", "127.25 over 5.25"),
		"by teeth":      with("--backlash", "0.1..0.5", "--thin-share", "by strength"),
		"helical":       {"--module", "2", "--teeth", "21", "--helix-angle", "15", "--hand", "left", "--mate-teeth", "40", "--center", "63.3±0.02", "--face-width", "20", "--backlash", "0.1..0.6", "--accuracy", "ISO 1328-1:2013 class 6"},
	}
}

func at(t *testing.T, v any, path ...any) float64 {
	t.Helper()
	x, ok := number(v, path...)
	if !ok {
		t.Fatalf("no number at %v in %v", path, v)
	}
	return x
}

// Every name that is relied on is there; the rows of the budget add up to the
// backlash, and the backlash held is the one asked for.
func TestBacklashJSON(t *testing.T) {
	for name, args := range budgetCases() {
		t.Run(name, func(t *testing.T) {
			v := runJSON(t, exitDone, append([]string{"backlash"}, args...)...)
			for _, g := range gearsOf(t, v) {
				checkTargetNames(t, g)
			}
			for _, m := range v["meshes"].([]any) {
				checkNames(t, "mesh budget", m)
				worst := [2]float64{at(t, m, "middle_backlash_mm"), at(t, m, "middle_backlash_mm")}
				likely := worst
				for _, r := range walk(m, "budget").([]any) {
					checkNames(t, "budget row", r)
					worst[0] -= at(t, r, "worst_mm")
					worst[1] += at(t, r, "worst_adds_mm")
					likely[0] -= at(t, r, "statistical_mm")
					likely[1] += at(t, r, "statistical_adds_mm")
				}
				for i, end := range []string{"min", "max"} {
					if got := at(t, m, "circumferential_backlash_mm", end); math.Abs(got-worst[i]) > 1e-12 {
						t.Errorf("%s at worst %v, the rows make %v", end, got, worst[i])
					}
					if got := at(t, m, "statistical_backlash_mm", end); math.Abs(got-likely[i]) > 1e-12 {
						t.Errorf("%s statistically %v, the rows make %v", end, got, likely[i])
					}
				}
				held := "circumferential_backlash_mm"
				if walk(m, "held") == "statistically" {
					held = "statistical_backlash_mm"
				}
				// A statistical tolerance may be cut off at the nominal thickness: more backlash, no thicker tooth.
				cut := at(t, v, "gears", "pinion", "thinner_than_nominal_mm", "min") == 0
				if got, want := at(t, m, held, "min"), at(t, m, "asked_mm", "min"); got < want-1e-8 || got > want+1e-8 && !cut {
					t.Errorf("holds %v at the least, asked for %v", got, want)
				}
				if want, ok := number(m, "asked_mm", "max"); ok && math.Abs(at(t, m, held, "max")-want) > 1e-8 {
					t.Errorf("holds %v at the most, asked for %v", at(t, m, held, "max"), want)
				}
			}
		})
	}
}

// Limits by hand: 20 and 40 teeth of module 3 at 90 ± 0.03, the pinion running out by 0.04.
// At 89.97 − 0.02 the pair is to have 0.1, at 90.03 + 0.02 it may have 0.4; both
// teeth together must then be thinner than 3 π by
//
//	[j cos α_w/cos 20° − (180/2)(inv α_w − inv 20°) 2], cos α_w = 90 cos 20°/a
//
// half of it each.
func TestBacklashLimitsByHand(t *testing.T) {
	v := runJSON(t, exitDone, append([]string{"backlash"}, budgetCases()["runout"]...)...)
	const c20 = 0.93969262078590838405 // cos 20°
	inv := func(a float64) float64 { return math.Tan(a) - a }
	thinner := func(j, a float64) float64 {
		aw := math.Acos(90 * c20 / a)
		return (j*math.Cos(aw) - 180*c20*(inv(aw)-inv(math.Acos(c20)))) / c20
	}
	most, least := 1.5*math.Pi-thinner(0.1, 89.95)/2, 1.5*math.Pi-thinner(0.4, 90.05)/2
	for name, g := range gearsOf(t, v) {
		for _, end := range []struct {
			name string
			want float64
		}{{"min", least}, {"max", most}} {
			if got := at(t, g, "tooth_thickness_mm", end.name); math.Abs(got-end.want) > 1e-9 {
				t.Errorf("%s, %s: %.12f, by hand %.12f", name, end.name, got, end.want)
			}
		}
	}
}

// Brute force: the gears are drawn at their limits and rolled in each other at the
// extreme centers, the center moved by half of each runout, until they touch both
// ways. What play is left is the least and the greatest backlash.
func TestDrawnGearsHaveTheBacklash(t *testing.T) {
	for _, name := range []string{"range", "runout", "made mate", "by teeth"} {
		v := runJSON(t, exitDone, append([]string{"backlash"}, budgetCases()[name]...)...)
		m := v["meshes"].([]any)[0]
		runout := 0.0
		if name == "runout" {
			runout = 0.02 // half of the pinion's
		}
		for _, end := range []struct {
			thickness, backlash string
			center              float64
		}{{"max", "min", 89.97 - runout}, {"min", "max", 90.03 + runout}} {
			var sections []export.Section
			for i, gear := range []string{"pinion", "wheel"} {
				sections = append(sections, drawnSection(t, 20*(i+1), at(t, v, "gears", gear, "tooth_thickness_mm", end.thickness)))
			}
			rolled, err := export.Roll(sections[0], sections[1], end.center)
			if err != nil {
				t.Fatal(err)
			}
			want := at(t, m, "circumferential_backlash_mm", end.backlash)
			if off := math.Max(math.Abs(rolled.Backlash.Least-want), math.Abs(rolled.Backlash.Greatest-want)); off > 2e-3 {
				t.Errorf("%s: %s backlash of the drawn gears %+v, said %v", name, end.backlash, rolled.Backlash, want)
			}
		}
	}
}

// drawnSection draws a gear of module 3 with teeth of a thickness, writes it as DXF and reads it back.
func drawnSection(t *testing.T, teeth int, thickness float64) export.Section {
	t.Helper()
	g, err := involute.NewGear(involute.Spec{Teeth: teeth, Module: 3, Rack: involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}})
	if err != nil {
		t.Fatal(err)
	}
	tooth, err := g.Tooth(thickness)
	if err != nil {
		t.Fatal(err)
	}
	outline, _, err := export.NewContour(export.ContourSpec{Tooth: tooth, Fit: export.FitOptions{Tolerance: 2e-4}})
	if err != nil {
		t.Fatal(err)
	}
	data, err := export.FormatDXF.Encode(outline)
	if err != nil {
		t.Fatal(err)
	}
	read, err := export.FormatDXF.Decode(data)
	if err != nil {
		t.Fatal(err)
	}
	cut, err := read.Cut()
	if err != nil {
		t.Fatal(err)
	}
	section, err := export.NewSection(cut, 0)
	if err != nil {
		t.Fatal(fmt.Errorf("%d teeth: %w", teeth, err))
	}
	return section
}
