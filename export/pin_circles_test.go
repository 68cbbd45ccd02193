package export

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"flankwright/involute"
)

// pathDistance returns the distance of a point from the lines and arcs of a path.
func pathDistance(p Path, q involute.Vec) float64 {
	least := math.Inf(1)
	for i := range p.Vertices {
		least = min(least, newPlaced(p.Curve(i)).distance(q))
	}
	return least
}

// onLayer returns the circles of a layer.
func onLayer(o Outline, layer Layer) []Circle {
	var out []Circle
	for _, c := range o.Circles {
		if c.Layer == layer {
			out = append(out, c)
		}
	}
	return out
}

// A pin drawn touches the contour drawn: the contour is nowhere farther from the exact flanks than
// its deviation, and so is its distance from the pin's center.
func TestPinsTouchTheContour(t *testing.T) {
	for z := 8; z <= 40; z++ {
		spec := involute.Spec{Teeth: z, Module: 2, Rack: isoA(), Shift: max(0, 0.4-0.02*float64(z))}
		tt := tooth(t, spec, 0.05)
		pin, err := tt.PinTouchingAt((tt.FormDiameter() + tt.TipDiameter()) / 2)
		if err != nil {
			t.Fatal(err)
		}
		o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.002}, Pin: pin})
		if err != nil {
			t.Fatal(err)
		}
		pins := onLayer(o, LayerPins)
		if len(pins) != 2 {
			t.Fatalf("z %d: %d pins", z, len(pins))
		}
		for _, c := range pins {
			if d := pathDistance(o.Contours[0].Path, c.Center); math.Abs(d-c.Radius) > report.MaxDeviation+1e-9 || c.Radius != pin/2 {
				t.Errorf("z %d: pin of radius %.6f, contour at %.6f from its center", z, c.Radius, d)
			}
			if math.Abs(c.Center.X) > math.Abs(c.Center.Y) {
				t.Errorf("z %d: pin at %v is not clear of the x axis", z, c.Center)
			}
		}
		between := math.Abs(math.Remainder(pins[0].Center.Angle()-pins[1].Center.Angle(), 2*math.Pi))
		if off := math.Pi - between - float64(z%2)*math.Pi/float64(z); math.Abs(off) > 1e-9 {
			t.Errorf("z %d: pins %.6f° apart", z, between/involute.Degree)
		}
	}
}

// The pins drawn are the ones that are measured: on the arcs alone, pins (balls in
// space where the gear is helical) pushed into the spaces read the distance over them.
func TestPinsAreTheOnesMeasured(t *testing.T) {
	for _, c := range []struct {
		spec involute.Spec
		pin  float64
	}{
		{involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 3.5},
		{involute.Spec{Teeth: 17, Module: 2, Rack: isoA(), Shift: 0.2}, 3.5},
		{involute.Spec{Teeth: 20, Module: 2, Helix: -30 * involute.Degree, Rack: isoA()}, 3.5},
		{involute.Spec{Teeth: 17, Module: 1.5, Helix: 15 * involute.Degree, Rack: isoA(), Shift: 0.3}, 2.75},
	} {
		tt := tooth(t, c.spec, 0.05)
		o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.0005}, Pin: c.pin})
		if err != nil {
			t.Fatal(err)
		}
		pins := onLayer(o, LayerPins)
		over := pins[0].Center.Sub(pins[1].Center).Norm() + c.pin
		lead, _ := tt.Lead()
		s, err := NewSection(o.Contours[0].Path, lead)
		if err != nil {
			t.Fatal(err)
		}
		least, most, err := s.OverPins(c.pin)
		if err != nil {
			t.Fatal(err)
		}
		// A flank off by ε moves a pin's center by ε/sin α_K, which is over 0.25 here.
		slack := 2*report.MaxDeviation/0.25 + 1e-9
		if over < least-slack || over > most+slack {
			t.Errorf("z %d, β %.0f°: %.5f over the pins drawn, %.5f to %.5f measured", tt.Teeth(), c.spec.Helix/involute.Degree, over, least, most)
		}
		d := pathDistance(o.Contours[0].Path, pins[0].Center) - c.pin/2
		if tt.Helical() && d < report.MaxDeviation {
			t.Errorf("z %d: the section of a ball lies %.5f off the flanks drawn", tt.Teeth(), d)
		}
	}
}

// A pin in every space: each touches, none twice.
func TestPinsInEverySpace(t *testing.T) {
	for _, z := range []int{7, 12} {
		tt := tooth(t, involute.Spec{Teeth: z, Module: 2, Rack: isoA(), Shift: 0.2}, 0.05)
		pins, err := pinCircles(tt, 3.5, true)
		if err != nil {
			t.Fatal(err)
		}
		seen := map[string]bool{}
		o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.002}})
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range pins {
			seen[fmt.Sprintf("%.6f", c.Center)] = true
			if d := pathDistance(o.Contours[0].Path, c.Center); math.Abs(d-1.75) > report.MaxDeviation+1e-9 {
				t.Errorf("z %d: contour at %.6f from the pin's center", z, d)
			}
		}
		if len(pins) != z || len(seen) != z {
			t.Errorf("z %d: %d pins at %d places", z, len(pins), len(seen))
		}
	}
}

func TestPinsThatDoNotRest(t *testing.T) {
	tt := tooth(t, involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.05)
	for _, pin := range []float64{-1, 0, 0.5, math.NaN()} {
		var imp *involute.Impossible
		if _, err := pinCircles(tt, pin, false); !errors.As(err, &imp) || imp.Reason != involute.PinFallsThrough {
			t.Errorf("pin %g: %v", pin, err)
		}
	}
	if _, _, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: 0.002}, Pin: 0.5}); err == nil {
		t.Error("a pin that falls through is drawn")
	}
}
