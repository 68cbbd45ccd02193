package export

import (
	"bufio"
	"encoding/json"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/involute"
)

// sampled returns points along a curve, without its end, so near that chords
// between them lie within sagitta of it.
func sampled(c involute.Curve, sagitta float64) []involute.Vec {
	var out []involute.Vec
	var halve func(a, b float64, p, q involute.Vec, depth int)
	halve = func(a, b float64, p, q involute.Vec, depth int) {
		m := (a + b) / 2
		middle, _ := c.At(m)
		// The first halvings are made anyhow: a curve that turns both ways may pass its chord's middle.
		if depth > 1 && middle.Sub(p.Add(q).Scale(0.5)).Norm() <= sagitta {
			out = append(out, p)
			return
		}
		halve(a, m, p, middle, depth+1)
		halve(m, b, middle, q, depth+1)
	}
	a, b := c.Domain()
	p, _ := c.At(a)
	q, _ := c.At(b)
	halve(a, b, p, q, 0)
	return out
}

// writeExact writes the points of a gear's exact shape, "x,y" a line.
func writeExact(t *testing.T, path string, tt involute.Tooth, sagitta float64) {
	t.Helper()
	f, err := os.Create(path)
	if err != nil {
		t.Fatal(err)
	}
	w := bufio.NewWriter(f)
	o := tt.Outline()
	for k := range o.Teeth {
		for _, c := range o.Pieces {
			for _, p := range sampled(c, sagitta) {
				p = p.Rotate(float64(k) * o.Pitch())
				fmt.Fprintf(w, "%.12f,%.12f\n", p.X, p.Y)
			}
		}
	}
	if err := w.Flush(); err != nil {
		t.Fatal(err)
	}
	if err := f.Close(); err != nil {
		t.Fatal(err)
	}
}

// A shapelyReading is what testdata/read_shapely.py measured.
type shapelyReading struct {
	Closed, Simple, CCW bool
	Valid, ExactValid   string
	Bored               []bool
	Area, Length        float64
	ExactArea, Distance float64
}

// The geometry library shapely, given the DXF file as another library reads it,
// finds one closed line that does not cross itself, with the area we say, and
// as far from the exact gear as the report says.
func TestShapelyMeasuresContours(t *testing.T) {
	python := outsidePython(t, "ezdxf", "python3-ezdxf")
	outsidePython(t, "shapely", "python3-shapely")
	cases := []struct {
		name      string
		spec      involute.Spec
		thin      float64
		tolerance float64
		bore, key float64
		version   Format
	}{
		{"plain", involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.06, 0.0025, 14, 5, FormatDXF},
		{"6 undercut teeth", involute.Spec{Teeth: 6, Module: 2, Rack: isoA()}, 0, 0.002, 3, 0, FormatDXFR12},
		{"8 undercut teeth", involute.Spec{Teeth: 8, Module: 1.5, Rack: isoA()}, 0.03, 0.001, 4, 0, FormatDXF},
		{"full radius", involute.Spec{Teeth: 30, Module: 1, Rack: fullRadius()}, 0.05, 0.0025, 8, 0, FormatDXFR12},
		{"big", involute.Spec{Teeth: 30, Module: 10, Rack: isoA()}, 0.2, 0.01, 80, 22, FormatDXF},
		{"shifted, chamfered", involute.Spec{Teeth: 13, Module: 3, Shift: 0.5, TipChamfer: 0.2, Rack: isoA()}, 0.05, 0.005, 10, 3, FormatDXFR12},
		{"milled, rounded", involute.Spec{Teeth: 16, Module: 2, Shift: 0.3, TipRound: 0.2, Mill: involute.MillSpec{Diameter: 1.2}, Rack: isoA()}, 0.04, 0.0025, 12, 4, FormatDXF},
		{"one milled arc", involute.Spec{Teeth: 45, Module: 2, Mill: involute.MillSpec{Diameter: 3}, Rack: isoA()}, 0.04, 0.0025, 12, 4, FormatDXF},
		{"relieved, flanks moved", involute.Spec{Teeth: 24, Module: 2, Relief: involute.ReliefSpec{Amount: 0.02, Start: 50}, Thinning: involute.FlanksOnly, Rack: isoA()}, 0.1, 0.0025, 12, 4, FormatDXFR12},
		{"helical", involute.Spec{Teeth: 20, Module: 2, Helix: 30 * involute.Degree, Rack: isoA()}, 0.05, 0.0025, 10, 0, FormatDXF},
	}
	dir, args := t.TempDir(), []string{"testdata/read_shapely.py"}
	var checks []func(*testing.T, shapelyReading)
	for i, c := range cases {
		tt := tooth(t, c.spec, c.thin)
		o, report := fitted(t, ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: c.tolerance}, Bore: c.bore, KeyWidth: c.key, KeyDepth: c.key / 2})
		dxf, csv := filepath.Join(dir, fmt.Sprint(i, ".dxf")), filepath.Join(dir, fmt.Sprint(i, ".csv"))
		if err := os.WriteFile(dxf, dxfBytes(t, o, c.version), 0o644); err != nil {
			t.Fatal(err)
		}
		sagitta := c.tolerance / 20
		writeExact(t, csv, tt, sagitta)
		args = append(args, dxf, csv, fmt.Sprint(sagitta))
		path, err := o.Cut()
		if err != nil {
			t.Fatal(err)
		}
		checks = append(checks, func(t *testing.T, got shapelyReading) { checkShapely(t, got, path, report.MaxDeviation, sagitta) })
	}
	var got []shapelyReading
	if err := json.Unmarshal(outsideRun(t, python, args...), &got); err != nil || len(got) != len(cases) {
		t.Fatalf("%d readings of %d gears, %v", len(got), len(cases), err)
	}
	for i, c := range cases {
		t.Run(c.name, func(t *testing.T) { checks[i](t, got[i]) })
	}
}

// checkShapely compares what was measured on chords within sagitta of both
// curves with the path and its deviation from the exact shape.
func checkShapely(t *testing.T, got shapelyReading, path Path, deviation, sagitta float64) {
	t.Helper()
	if !got.Closed || !got.Simple || !got.CCW || got.Valid != "Valid Geometry" || got.ExactValid != "Valid Geometry" {
		t.Errorf("closed %v, simple %v, counter-clockwise %v, %s; exact: %s", got.Closed, got.Simple, got.CCW, got.Valid, got.ExactValid)
	}
	if len(got.Bored) != 1 || !got.Bored[0] {
		t.Errorf("bores within the gear: %v", got.Bored)
	}
	// Chords lose up to two thirds of the sagitta all along the arcs.
	loss := sagitta * path.length()
	if math.Abs(got.Area-path.area()) > loss {
		t.Errorf("area %.6f, ours %.6f", got.Area, path.area())
	}
	if math.Abs(got.ExactArea-path.area()) > deviation*path.length()+loss {
		t.Errorf("area of the exact shape %.6f, ours %.6f", got.ExactArea, path.area())
	}
	// A chord is shorter than its arc of sagitta s and radius r by the share s/(3r); the
	// sharpest fillets here are 0.3 mm round.
	if short := path.length() - got.Length; short < 0 || short > sagitta/0.9*path.length() {
		t.Errorf("%.6f long, ours %.6f", got.Length, path.length())
	}
	if math.Abs(got.Distance-deviation) > 2*sagitta {
		t.Errorf("%.6f mm off the exact shape, %.6f reported", got.Distance, deviation)
	}
	t.Logf("%.6f mm off the exact shape, %.6f reported; area %.5f, ours %.5f, exact %.5f", got.Distance, deviation, got.Area, path.area(), got.ExactArea)
}
