package export

import (
	"math"
	"testing"

	"flankwright/involute"
)

func tooth(t testing.TB, s involute.Spec, thin float64) involute.Tooth {
	t.Helper()
	g, err := involute.NewGear(s)
	if err != nil {
		t.Fatal(err)
	}
	out, err := g.Tooth(g.NominalThickness() - thin)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func isoA() involute.Rack {
	return involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}
}

// fullRadius is a rack whose tip is all round and leaves no root land.
func fullRadius() involute.Rack {
	r := isoA()
	r.TipRadius = r.LargestTipRadius()
	return r
}

// readBack writes an outline and reads it again.
func readBack(t interface {
	Helper()
	Fatal(...any)
}, o Outline, f Format) Outline {
	t.Helper()
	data, err := f.Encode(o)
	if err != nil {
		t.Fatal(f, err)
	}
	back, err := f.Decode(data)
	if err != nil {
		t.Fatal(f, err)
	}
	return back
}

// What is written is measured: contours of several gears, through every format
// and back, must give the closed formula's reading over pins within what the
// tolerance allows: each flank off by ε moves a pin's center by ε/sin α_K.
func TestContourMeasuresItself(t *testing.T) {
	for _, c := range []struct {
		name string
		spec involute.Spec
		thin float64
		pin  float64
		bore float64
	}{
		{"even", involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.06, 3.5, 20},
		{"odd", involute.Spec{Teeth: 17, Module: 2, Rack: isoA(), Shift: 0.2}, 0.02, 3.5, 0},
		{"inch", involute.Spec{Teeth: 18, Module: 25.4 / 16, Rack: isoA(), Shift: 0.25}, 0.04, 3.048, 12.7},
		{"chamfer", involute.Spec{Teeth: 45, Module: 1, Rack: isoA(), TipChamfer: 0.1}, 0.03, 1.75, 8},
		{"helical", involute.Spec{Teeth: 17, Module: 1.5, Helix: 15 * involute.Degree, Rack: isoA(), Shift: 0.3}, 0.03, 2.75, 10},
		{"full radius", involute.Spec{Teeth: 30, Module: 1, Rack: fullRadius()}, 0.05, 1.75, 8},
		{"helical very steep", involute.Spec{Teeth: 12, Module: 1, Helix: 65 * involute.Degree, Rack: isoA()}, 0.02, 1.75, 0},
		{"helical steep", involute.Spec{Teeth: 20, Module: 2, Helix: -30 * involute.Degree, Rack: isoA()}, 0.05, 3.5, 10},
	} {
		const tolerance = 0.0025
		tt := tooth(t, c.spec, c.thin)
		o, report := fitted(t, ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: tolerance}, Bore: c.bore, KeyWidth: c.bore / 5, KeyDepth: c.bore / 10, Title: c.name})
		if report.MaxDeviation > tolerance {
			t.Errorf("%s: deviation %g", c.name, report.MaxDeviation)
		}
		seat, err := tt.Seat(c.pin)
		if err != nil {
			t.Fatal(err)
		}
		want, err := tt.Reading(involute.TwoPins, seat.CenterDiameter, c.pin, 0)
		if err != nil {
			t.Fatal(err)
		}
		slack := 2*tolerance*seat.CenterDiameter/math.Sqrt(seat.CenterDiameter*seat.CenterDiameter-tt.BaseDiameter()*tt.BaseDiameter())/math.Cos(tt.BaseHelix()) + 1e-6
		for _, f := range []Format{FormatDXF, FormatDXFR12, FormatSVG} {
			back := readBack(t, o, f)
			path, err := back.Cut()
			if err != nil {
				t.Fatal(c.name, err)
			}
			lead, _ := tt.Lead()
			s, err := NewSection(path, lead)
			if err != nil {
				t.Fatal(c.name, err)
			}
			if s.Teeth() != tt.Teeth() {
				t.Errorf("%s: %d teeth counted, want %d", c.name, s.Teeth(), tt.Teeth())
			}
			if in, out := s.Deviation(tt); max(-in, out) > report.MaxDeviation+2e-9 || max(-in, out) < report.MaxDeviation/2 {
				t.Errorf("%s: %.6f off the exact shape as read back, %.6f as fitted", c.name, max(-in, out), report.MaxDeviation)
			}
			least, most, err := s.OverPins(c.pin)
			if err != nil {
				t.Fatal(c.name, err)
			}
			t.Logf("%s: want %.6f, measured %.6f to %.6f", c.name, want.Value, least, most)
			if math.Abs(least-want.Value) > slack || math.Abs(most-want.Value) > slack {
				t.Errorf("%s: measured %.6f to %.6f, want %.6f ± %.6f", c.name, least, most, want.Value, slack)
			}
		}
	}
}

// A contour that is wrong must not measure right: one flank moved by 0.05 mm
// shifts one pin by 0.05 cos α/(2 sin α_K), 0.04 to 0.05 mm.
func TestSectionSeesAWrongFlank(t *testing.T) {
	tt := tooth(t, involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0)
	o, _, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.0025}})
	if err != nil {
		t.Fatal(err)
	}
	path := o.Contours[0].Path
	for i, v := range path.Vertices {
		if a := v.P.Angle(); a > 0.01 && a < 0.082 { // the second flank of the first tooth
			path.Vertices[i].P = v.P.Rotate(0.05 / v.P.Norm())
		}
	}
	s, err := NewSection(path, 0)
	if err != nil {
		t.Fatal(err)
	}
	least, most, err := s.OverPins(3.5)
	if err != nil {
		t.Fatal(err)
	}
	if most-least < 0.03 {
		t.Errorf("a flank moved by 0.05 mm spreads the readings by %.4f mm only", most-least)
	}
}

// Faults that pins do not touch show in the shape: a root too shallow, a tip too
// low, one vertex off, a contour turned or too large.
func TestDeviationSeesFaults(t *testing.T) {
	tt := tooth(t, involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0)
	rf, ra := tt.RootDiameter()/2, tt.TipDiameter()/2
	for name, change := range map[string]func(i int, p involute.Vec) involute.Vec{
		"shallow root": func(_ int, p involute.Vec) involute.Vec {
			if p.Norm() < rf+1e-6 {
				return p.Scale((rf + 0.3) / p.Norm())
			}
			return p
		},
		"low tip": func(_ int, p involute.Vec) involute.Vec {
			if p.Norm() > ra-1e-6 {
				return p.Scale((ra - 0.5) / p.Norm())
			}
			return p
		},
		"one vertex": func(i int, p involute.Vec) involute.Vec {
			if i == 100 {
				return p.Add(involute.Vec{X: 0.1, Y: 0.1})
			}
			return p
		},
		"turned": func(_ int, p involute.Vec) involute.Vec { return p.Rotate(1e-3) },
		"scaled": func(_ int, p involute.Vec) involute.Vec { return p.Scale(1.0005) },
	} {
		o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.0025}})
		if err != nil {
			t.Fatal(err)
		}
		path := o.Contours[0].Path
		for i, v := range path.Vertices {
			path.Vertices[i].P = change(i, v.P)
		}
		s, err := NewSection(path, 0)
		if err != nil {
			t.Fatal(name, err)
		}
		if in, out := s.Deviation(tt); max(-in, out) < 3*report.MaxDeviation {
			t.Errorf("%s: deviation %.4f only, the fit's own is %.4f", name, max(-in, out), report.MaxDeviation)
		}
	}
}
