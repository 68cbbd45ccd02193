package export

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// What the caption says, held against a pair worked out by hand from the closed forms.
func TestRollingWords(t *testing.T) {
	s, _ := drawnMesh{s1: involute.Spec{Teeth: 20, Module: 2.54, Rack: isoA()}, s2: involute.Spec{Teeth: 40, Module: 2.54, Rack: isoA()}}.make(t, 0.002)
	said := func(s MeshSpec) string {
		data, err := RollingSVG(s)
		if err != nil {
			t.Fatal(err)
		}
		var lines []string
		svgTree(t, data).walk(func(n *svgNode) {
			if n.name == "text" {
				lines = append(lines, n.text)
			}
		})
		return strings.Join(lines, " ")
	}
	s.Unit, s.Title = inspect.Inch, ""
	// a = (20 + 40)·2.54/2 mm = 3 in; ε = (√(22² − (20 cos 20°)²) + √(42² − (40 cos 20°)²) − 60 sin 20°)/(2π cos 20°) = 1.64.
	root := func(z float64) float64 {
		return math.Sqrt((z+2)*(z+2) - z*z*math.Pow(math.Cos(20*involute.Degree), 2))
	}
	ratio := (root(20) + root(40) - 60*math.Sin(20*involute.Degree)) / (2 * math.Pi * math.Cos(20*involute.Degree))
	for _, want := range []string{"Two gears in mesh", "20 and 40 teeth at a center distance of 3.0000 in: working pressure angle 20.00°, ",
		fmt.Sprintf("contact ratio %.2f (1 pair of flanks touches all the time, one more for %.0f %% of it)", ratio, 100*(ratio-1)), "through the pitch point C"} {
		if !strings.Contains(said(s), want) {
			t.Errorf("%q does not say %q", said(s), want)
		}
	}
	s.Title = strings.Repeat("Wheel and pinion ", 20)
	if text := said(s); !strings.Contains(text, "Wheel and pinion Wheel") || !strings.Contains(text, "…") {
		t.Errorf("%q", text)
	}
	for i, want := range map[int]string{8: "Helical gears in transverse section", 11: "relieved tips", 12: "overlap by 0.085 mm", 13: "of the time no flanks touch"} {
		s, _ := drawnMeshes()[i].make(t, 0.002)
		if text := said(s); !strings.Contains(text, want) {
			t.Errorf("%q does not say %q", text, want)
		}
	}
	if text := said(func() MeshSpec { s, _ := drawnMeshes()[9].make(t, 0.002); return s }()); strings.Contains(text, "pitch point C") {
		t.Errorf("%q", text)
	}
}

func TestRatioWords(t *testing.T) {
	for ratio, want := range map[float64]string{
		0.75:  "for 25 % of the time no flanks touch",
		1.62:  "1 pair of flanks touches all the time, one more for 62 % of it",
		1.001: "1 pair of flanks touches all the time",
		1.999: "1 pair of flanks touches all the time, one more for 99 % of it",
		0.999: "for 1 % of the time no flanks touch",
		2.25:  "2 pairs of flanks touch all the time, one more for 25 % of it",
	} {
		if got := ratioWords(ratio); got != want {
			t.Errorf("%g: %q, want %q", ratio, got, want)
		}
	}
}
