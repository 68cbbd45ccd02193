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

// An ezdxfReading is what testdata/read_ezdxf.py found in a file.
type ezdxfReading struct {
	Version       string
	Errors, Fixes []string
	Units         int
	Layers        map[string][2]any
	Kinds         map[string]int
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

// The Python library ezdxf reads every number as written, and its audit has
// nothing to report and nothing to mend.
func TestEzdxfReadsDXF(t *testing.T) {
	python := outsidePython(t, "ezdxf", "python3-ezdxf")
	files := dxfFiles(t)
	var readings []ezdxfReading
	if err := json.Unmarshal(outsideRun(t, python, append([]string{"testdata/read_ezdxf.py"}, paths(files)...)...), &readings); err != nil {
		t.Fatal(err)
	}
	if len(readings) != len(files) {
		t.Fatalf("%d files read, want %d", len(readings), len(files))
	}
	for i, f := range files {
		t.Run(f.name, func(t *testing.T) { checkEzdxf(t, readings[i], f.version, f.outline) })
	}
}

func checkEzdxf(t *testing.T, got ezdxfReading, version Format, o Outline) {
	wantVersion, wantUnits := map[Format]string{FormatDXF: "AC1015", FormatDXFR12: "AC1009"}[version], 4
	if o.Unit == inspect.Inch {
		wantUnits = 1
	}
	if got.Version != wantVersion || got.Units != wantUnits || len(got.Errors)+len(got.Fixes) > 0 {
		t.Errorf("version %s, units %d, errors %q, fixes %q", got.Version, got.Units, got.Errors, got.Fixes)
	}
	for _, l := range o.layerStyles()[1:] { // after layer 0, those in use: colors and line types as they look
		if got.Layers[string(l.name)] != [2]any{float64(l.color), l.lineType()} {
			t.Errorf("layer %s: %v, want color %d, %s", l.name, got.Layers, l.color, l.lineType())
		}
	}
	polyline := map[Format]string{FormatDXF: "LWPOLYLINE", FormatDXFR12: "POLYLINE"}[version]
	if len(got.Paths) != len(o.Contours) || len(got.Circles) != len(o.Circles) || got.Kinds[polyline] != len(o.Contours) || got.Kinds["CIRCLE"] != len(o.Circles) {
		t.Fatalf("%d paths, %d circles: %v", len(got.Paths), len(got.Circles), got.Kinds)
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
}

// gdalFeature finds a feature's layer and line in what ogrinfo prints.
var gdalFeature = regexp.MustCompile(`OGRFeature\(entities\):\d+\n  Layer \(String\) = (\S+)\n(?:  .*\n)*?  LINESTRING(?: Z)? \(([^)]*)\)`)

// gdalSlack is how far GDAL's points may lie off, in the file's unit: it prints
// 15 digits, and works an arc's center out from numbers of twelve decimals.
const gdalSlack = 1e-9

// GDAL finds every contour and circle on its layer, in the file's order, walks
// along every arc in steps of at most 4°, and closes every line.
func TestGDALReadsDXF(t *testing.T) {
	ogrinfo := outsideProgram(t, "ogrinfo", "gdal-bin")
	for _, f := range dxfFiles(t) {
		t.Run(f.name, func(t *testing.T) {
			out := string(outsideRun(t, ogrinfo, "-ro", "-al", f.path))
			features := gdalFeature.FindAllStringSubmatch(out, -1)
			o := f.outline
			if count := fmt.Sprintf("Feature Count: %d\n", len(features)); len(features) != len(o.Contours)+len(o.Circles) || !strings.Contains(out, count) {
				t.Fatalf("%d lines in\n%.600s", len(features), out)
			}
			for i, m := range features {
				points := gdalPoints(t, m[2])
				layer := LayerCut
				if i < len(o.Contours) {
					layer = o.Contours[i].Layer
					checkGDALPath(t, points, o.Contours[i].Path)
				} else {
					c := o.Circles[i-len(o.Contours)]
					layer = c.Layer
					checkGDALCircle(t, points, c)
				}
				if m[1] != string(layer) {
					t.Errorf("feature %d is on layer %s, want %s", i, m[1], layer)
				}
			}
		})
	}
}

// gdalPoints reads "x y z,x y z,…".
func gdalPoints(t *testing.T, list string) []involute.Vec {
	var points []involute.Vec
	for text := range strings.SplitSeq(list, ",") {
		var p involute.Vec
		if _, err := fmt.Sscan(text, &p.X, &p.Y); err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		points = append(points, p)
	}
	return points
}

// checkGDALPath follows the points along the path's pieces.
func checkGDALPath(t *testing.T, points []involute.Vec, path Path) {
	t.Helper()
	piece, steps := 0, 0
	for _, p := range points {
		if piece == len(path.Vertices) {
			if p.Sub(path.Vertices[0].P).Norm() > gdalSlack {
				t.Fatalf("%v comes after the end", p)
			}
			continue
		}
		if off := strays(path.Curve(piece), p); off > gdalSlack {
			t.Fatalf("piece %d: %v lies %g off", piece, p, off)
		}
		steps++
		if _, to, b := path.ends(piece); to.Sub(p).Norm() <= gdalSlack {
			if sweep := 4 * math.Abs(math.Atan(b)); float64(steps)*4*involute.Degree < sweep {
				t.Fatalf("piece %d turns by %g° in %d steps", piece, sweep/involute.Degree, steps)
			}
			piece, steps = piece+1, 0
		}
	}
	if piece != len(path.Vertices) {
		t.Errorf("the line ends in piece %d of %d: not closed", piece+1, len(path.Vertices))
	}
}

// checkGDALCircle holds the points against the circle.
func checkGDALCircle(t *testing.T, points []involute.Vec, c Circle) {
	t.Helper()
	for _, p := range points {
		if off := p.Sub(c.Center).Norm() - c.Radius; math.Abs(off) > gdalSlack {
			t.Fatalf("%v lies %g off the circle %v", p, off, c)
		}
	}
	if len(points) < 90 || points[0].Sub(points[len(points)-1]).Norm() > gdalSlack {
		t.Errorf("%d points from %v to %v", len(points), points[0], points[len(points)-1])
	}
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
	for _, f := range dxfFiles(t) {
		t.Run(f.name, func(t *testing.T) { checkDxflib(t, outsideRun(t, reader, f.path), f.outline) })
	}
}

// checkDxflib compares the lines that testdata/read_dxflib.cpp prints.
func checkDxflib(t *testing.T, printed []byte, o Outline) {
	var got []string
	units := ""
	for l := range strings.Lines(string(printed)) {
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
}
