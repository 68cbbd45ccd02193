package export

import (
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// outsideOutlines are the outlines that outside readers are given.
func outsideOutlines() map[string]Outline {
	wheel := Outline{Title: "wheel", Circles: []Circle{{LayerBore, involute.Vec{}, 6}, {LayerReference, involute.Vec{}, 44}}}
	var p Path
	for k := range 40 { // bumps and hollows in turn, as many pieces as a real gear
		turn := 2 * math.Pi * float64(k) / 40
		for i, b := range []float64{0.02, 0.3, 0.02, -0.35} {
			r := 40 + 5*float64((i+1)/2%2)
			p.Vertices = append(p.Vertices, Vertex{involute.Polar(r, turn+2*math.Pi/160*float64(i)), b})
		}
	}
	wheel.Contours = []Contour{{LayerCut, p}}
	return map[string]Outline{
		"cam_mm": cam(inspect.Millimeter), "cam_in": cam(inspect.Inch), "wheel": wheel,
		"disk": {Contours: []Contour{{LayerCut, vertices(30, 20, 1, 10, 20, 1)}}},
	}
}

// forEachDXF writes each outline in both versions and hands on what the file holds, in its unit.
func forEachDXF(t *testing.T, check func(t *testing.T, path string, version Format, o Outline)) {
	for name, o := range outsideOutlines() {
		for _, v := range []Format{FormatDXF, FormatDXFR12} {
			t.Run(name+"_"+v.String(), func(t *testing.T) {
				f, err := o.fileForm()
				if err != nil {
					t.Fatal(err)
				}
				path := filepath.Join(t.TempDir(), "outline.dxf")
				if err := os.WriteFile(path, dxfBytes(t, o, v), 0o644); err != nil {
					t.Fatal(err)
				}
				check(t, path, v, f)
			})
		}
	}
}

// Numbers in a file lie within half of the twelfth decimal.
const written = 0.6e-12

// near reports whether all pairs of numbers lie within slack.
func near(slack float64, pairs ...float64) bool {
	for i := 0; i+1 < len(pairs); i += 2 {
		if !(math.Abs(pairs[i]-pairs[i+1]) <= slack) {
			return false
		}
	}
	return true
}

// The Python library ezdxf reads every number as written, and its audit has
// nothing to report and nothing to mend.
func TestEzdxfReadsDXF(t *testing.T) {
	python := outsidePython(t, "ezdxf", "python3-ezdxf")
	forEachDXF(t, func(t *testing.T, path string, version Format, o Outline) {
		var got struct {
			Version       string
			Errors, Fixes []string
			Units         int
			Layers        map[string][2]any
			Paths         []struct {
				Layer  string
				Closed bool
				Count  int
				Points [][3]float64
			}
			Circles []struct {
				Layer  string
				Center [2]float64
				Radius float64
			}
			Header, Box [2][2]float64
		}
		if err := json.Unmarshal(outsideRun(t, python, "testdata/read_ezdxf.py", path), &got); err != nil {
			t.Fatal(err)
		}
		wantVersion, wantUnits := map[Format]string{FormatDXF: "AC1015", FormatDXFR12: "AC1009"}[version], 4
		if o.Unit == inspect.Inch {
			wantUnits = 1
		}
		if got.Version != wantVersion || got.Units != wantUnits || len(got.Errors)+len(got.Fixes) > 0 {
			t.Errorf("version %s, units %d, errors %q, fixes %q", got.Version, got.Units, got.Errors, got.Fixes)
		}
		if got.Layers["CUT"] == got.Layers["REFERENCE"] || got.Layers["REFERENCE"] != [2]any{8.0, "DASHED"} {
			t.Errorf("layers %v", got.Layers)
		}
		if len(got.Paths) != len(o.Contours) || len(got.Circles) != len(o.Circles) {
			t.Fatalf("%d paths, %d circles", len(got.Paths), len(got.Circles))
		}
		for i, c := range o.Contours {
			g := got.Paths[i]
			if g.Layer != string(c.Layer) || !g.Closed || g.Count != len(c.Path.Vertices) || len(g.Points) != g.Count {
				t.Fatalf("path %d: %s, closed %v, %d vertices", i, g.Layer, g.Closed, g.Count)
			}
			for j, v := range c.Path.Vertices {
				if p := g.Points[j]; !near(written, p[0], v.P.X, p[1], v.P.Y, p[2], v.Bulge) {
					t.Errorf("path %d, vertex %d: %v, want %v", i, j, p, v)
				}
			}
		}
		for i, c := range o.Circles {
			if g := got.Circles[i]; g.Layer != string(c.Layer) || !near(written, g.Center[0], c.Center.X, g.Center[1], c.Center.Y, g.Radius, c.Radius) {
				t.Errorf("circle %d: %v, want %v", i, g, c)
			}
		}
		lo, hi := o.bounds()
		for i, corner := range []involute.Vec{lo, hi} {
			if !near(written, got.Header[i][0], corner.X, got.Header[i][1], corner.Y) || !near(extentSlack, got.Box[i][0], corner.X, got.Box[i][1], corner.Y) {
				t.Errorf("extents %v, ezdxf's %v, want %v", got.Header[i], got.Box[i], corner)
			}
		}
	})
}

// GDAL sees as many features, closed lines, and the extents; it walks arcs in
// steps of 4°, so that a chord lies up to r(1 − cos 2°) inside.
func TestGDALReadsDXF(t *testing.T) {
	ogrinfo := outsideProgram(t, "ogrinfo", "gdal-bin")
	line := regexp.MustCompile(`LINESTRING(?: Z)? \(([^,]*),.*,([^,)]*)\)`)
	extent := regexp.MustCompile(`Extent: \((\S+), (\S+)\) - \((\S+), (\S+)\)`)
	forEachDXF(t, func(t *testing.T, path string, _ Format, o Outline) {
		out := string(outsideRun(t, ogrinfo, "-ro", "-al", path))
		lines := line.FindAllStringSubmatch(out, -1)
		if len(lines) != len(o.Contours)+len(o.Circles) {
			t.Fatalf("%d lines in\n%.600s", len(lines), out)
		}
		for _, l := range lines {
			var x, y, u, v float64
			if _, err := fmt.Sscan(l[1]+" ", &x, &y); err != nil {
				t.Fatal(err)
			}
			if _, err := fmt.Sscan(l[2]+" ", &u, &v); err != nil || x != u || y != v {
				t.Errorf("from %s to %s: not closed", l[1], l[2])
			}
		}
		m := extent.FindStringSubmatch(out)
		if m == nil {
			t.Fatalf("no extent in\n%.600s", out)
		}
		lo, hi := o.bounds()
		inside := hi.Sub(lo).Norm() / 2 * (1 - math.Cos(2*math.Pi/180))
		for i, want := range []float64{lo.X, lo.Y, hi.X, hi.Y} {
			got, err := strconv.ParseFloat(m[i+1], 64)
			d := got - want
			if i >= 2 {
				d = -d
			}
			if err != nil || d < -1e-6 || d > inside { // six decimals are printed
				t.Errorf("extent %s, want %g", m[0], want)
			}
		}
	})
}

// The C++ library dxflib, which many CAD and CAM programs read DXF with, gets
// every vertex and bulge as written.
func TestDxflibReadsDXF(t *testing.T) {
	compiler := outsideProgram(t, "g++", "g++")
	reader := filepath.Join(t.TempDir(), "read_dxflib")
	if _, err := os.Stat("/usr/include/dxflib/dl_dxf.h"); err != nil {
		outsideMissing(t, "library dxflib", "libdxflib-dev")
	}
	outsideRun(t, compiler, "-o", reader, "testdata/read_dxflib.cpp", "-ldxflib")
	forEachDXF(t, func(t *testing.T, path string, _ Format, o Outline) {
		var got []string
		units := ""
		for l := range strings.Lines(string(outsideRun(t, reader, path))) {
			if strings.HasPrefix(l, "variable $INSUNITS ") {
				units = strings.Fields(l)[2]
			} else if !strings.HasPrefix(l, "variable ") {
				got = append(got, strings.TrimSpace(l))
			}
		}
		if want := map[inspect.Unit]string{inspect.Millimeter: "4", inspect.Inch: "1"}[o.Unit]; units != want {
			t.Errorf("$INSUNITS %q, want %s", units, want)
		}
		next := func(format string, want ...any) {
			t.Helper()
			if len(got) == 0 {
				t.Fatal("something is missing")
			}
			fields := strings.Fields(got[0])
			got = got[1:]
			for i, w := range strings.Fields(fmt.Sprintf(format, want...)) {
				x, errX := strconv.ParseFloat(w, 64)
				y, errY := strconv.ParseFloat(fields[i], 64)
				if fields[i] != w && (errX != nil || errY != nil || !near(written, x, y)) {
					t.Fatalf("%v, want "+format, append([]any{fields}, want...)...)
				}
			}
		}
		for _, c := range o.Contours {
			// dxflib tells R12's vertices one by one and their number as 0.
			if len(got) > 0 && strings.HasPrefix(got[0], fmt.Sprintf("polyline %s 0 ", c.Layer)) {
				next("polyline %s 0 1", c.Layer)
			} else {
				next("polyline %s %d 1", c.Layer, len(c.Path.Vertices))
			}
			for _, v := range c.Path.Vertices {
				next("vertex %.17g %.17g %.17g", v.P.X, v.P.Y, v.Bulge)
			}
		}
		for _, c := range o.Circles {
			next("circle %s %.17g %.17g %.17g", c.Layer, c.Center.X, c.Center.Y, c.Radius)
		}
		if len(got) > 0 {
			t.Errorf("too much: %q", got)
		}
	})
}
