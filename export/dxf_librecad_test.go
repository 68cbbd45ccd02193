package export

import (
	"bytes"
	"fmt"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

const (
	// LibreCAD draws in whole steps of 1/1200 inch from the top left corner of an
	// A4 page (in a drawing in inches a page of 210 by 297 inches), each piece of
	// a polyline as a path of its own and arcs as many short chords.
	librecadSteps = 1200

	// librecadReach is how wide things are drawn, in steps.
	librecadReach = 9000

	// librecadSlack is how far drawn points may lie off, in steps: each coordinate
	// is rounded twice, to a point of an arc's chords and to a step, 2·√½ in all,
	// and the place of the whole is a mean. 1.6 was the most that was measured.
	librecadSlack = 2
)

// The CAD program LibreCAD converts every file to PDF and draws each piece and
// circle where it belongs, arcs as arcs, the last piece back to the first
// vertex: the same lines for both versions.
func TestLibreCADConvertsDXF(t *testing.T) {
	librecad := outsideProgram(t, "librecad", "librecad")
	home := t.TempDir()
	drawn := map[string][][]involute.Vec{}
	for _, f := range dxfFiles(t) {
		t.Run(f.name, func(t *testing.T) {
			lo, hi := f.outline.bounds()
			steps := librecadReach / max(hi.X-lo.X, hi.Y-lo.Y)
			scale := steps / librecadSteps * (inspect.Inch.MM() / f.outline.Unit.MM())
			cmd := exec.Command(librecad, "dxf2pdf", "-c", "-s", fmt.Sprintf("%.9f", scale), "-t", home, f.path)
			cmd.Env = append(os.Environ(), "QT_QPA_PLATFORM=offscreen", "HOME="+home, "XDG_RUNTIME_DIR="+home, "XDG_CONFIG_HOME="+home)
			if out, err := cmd.CombinedOutput(); err != nil {
				t.Fatalf("%v\n%s", err, out)
			}
			lines := librecadLines(t, filepath.Join(home, f.name+".pdf"))
			checkLibreCAD(t, lines, f.outline, steps)

			name := strings.TrimSuffix(f.name, "_"+f.version.String())
			if other, ok := drawn[name]; ok && fmt.Sprint(other) != fmt.Sprint(lines) {
				t.Error("the two versions are drawn differently")
			}
			drawn[name] = lines
		})
	}
}

// librecadLines returns the points of each path of the PDF's page, in steps.
// Of Bézier curves, which circles are drawn with, it takes the ends.
func librecadLines(t *testing.T, path string) [][]involute.Vec {
	t.Helper()
	pdf, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	m := regexp.MustCompile(`/Contents (\d+) 0 R`).FindSubmatch(pdf)
	if m == nil {
		t.Fatal("a PDF without a page")
	}
	_, object, ok := bytes.Cut(pdf, []byte("\n"+string(m[1])+" 0 obj\n"))
	if !ok {
		t.Fatalf("no object %s", m[1])
	}
	var lines [][]involute.Vec
	var line []involute.Vec
	var stack []float64
	for _, word := range strings.Fields(string(inflated(t, object))) {
		if x, err := strconv.ParseFloat(word, 64); err == nil {
			stack = append(stack, x)
			continue
		}
		if n := len(stack); n >= 2 {
			end := involute.Vec{X: stack[n-2], Y: -stack[n-1]} // y points down
			switch word {
			case "m":
				line = []involute.Vec{end}
			case "l", "c":
				line = append(line, end)
			}
		}
		if word == "S" {
			lines = append(lines, line)
		}
		stack = nil
	}
	return lines
}

// checkLibreCAD holds the lines against the outline at so many steps to its unit.
func checkLibreCAD(t *testing.T, lines [][]involute.Vec, o Outline, steps float64) {
	t.Helper()
	want := len(o.Circles)
	for _, c := range o.Contours {
		want += len(c.Path.Vertices)
	}
	if len(lines) != want {
		t.Fatalf("%d lines drawn, want %d", len(lines), want)
	}
	shift := librecadShift(lines, o, steps)
	place := func(p involute.Vec) involute.Vec { return p.Sub(shift).Scale(1 / steps) }
	slack := librecadSlack / steps

	for _, c := range o.Contours {
		for i := range c.Path.Vertices {
			from, to, _ := c.Path.ends(i)
			line := lines[0]
			lines = lines[1:]
			a, b := place(line[0]), place(line[len(line)-1])
			if math.Min(a.Sub(from).Norm()+b.Sub(to).Norm(), a.Sub(to).Norm()+b.Sub(from).Norm()) > 2*slack {
				t.Fatalf("piece %d drawn from %v to %v, want %v to %v", i, a, b, from, to)
			}
			checkDrawn(t, line, place, c.Path.Curve(i), slack)
		}
	}
	for i, c := range o.Circles {
		line := lines[i]
		for _, p := range line {
			if off := place(p).Sub(c.Center).Norm() - c.Radius; math.Abs(off) > slack {
				t.Fatalf("circle %d: %v lies %g off %v", i, place(p), off, c)
			}
		}
		if len(line) < 4 || line[0].Sub(line[len(line)-1]).Norm() > 1 {
			t.Fatalf("circle %d: %v", i, line)
		}
	}
}

// librecadShift returns by how many steps everything is moved, since the program
// centers it: the mean over all pieces and circles, in which rounding cancels.
func librecadShift(lines [][]involute.Vec, o Outline, steps float64) involute.Vec {
	var sum involute.Vec
	n := 0
	add := func(a, b involute.Vec) {
		line := lines[n]
		n++
		drawn := line[0].Add(line[len(line)-1]) // pieces may be drawn backwards
		sum = sum.Add(drawn.Sub(a.Add(b).Scale(steps)).Scale(0.5))
	}
	for _, c := range o.Contours {
		for i := range c.Path.Vertices {
			from, to, _ := c.Path.ends(i)
			add(from, to)
		}
	}
	for _, c := range o.Circles {
		right := c.Center.Add(involute.Vec{X: c.Radius})
		add(right, right)
	}
	return sum.Scale(1 / float64(n))
}

// checkDrawn fails if a drawn point leaves the curve, or a chord strays from it.
func checkDrawn(t *testing.T, line []involute.Vec, place func(involute.Vec) involute.Vec, c involute.Curve, slack float64) {
	t.Helper()
	for i, p := range line {
		if off := strays(c, place(p)); off > slack {
			t.Fatalf("%v lies %g off %+v", place(p), off, c)
		}
		if i == 0 {
			continue
		}
		middle := place(p.Add(line[i-1]).Scale(0.5))
		if off := strays(c, middle); off > 1.5*slack {
			t.Fatalf("a chord by %v lies %g off %+v", middle, off, c)
		}
	}
}
