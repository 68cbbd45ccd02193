package export

import (
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"flankwright/involute"

	"pgregory.net/rapid"
)

// scalesSaid returns the ratios the sheet states, in order.
func scalesSaid(d Drawing) []float64 {
	var ratios []float64
	for _, s := range said(d) {
		if m := regexp.MustCompile(`^Scale (\d+):(\d+)$`).FindStringSubmatch(s); m != nil {
			a, _ := strconv.ParseFloat(m[1], 64)
			b, _ := strconv.ParseFloat(m[2], 64)
			ratios = append(ratios, a/b)
		}
	}
	return ratios
}

// circles returns the pins drawn: circles filled like paper, of a diameter.
func circles(d Drawing, diameter float64) []involute.Vec {
	var centers []involute.Vec
	for _, e := range d.elements {
		s, ok := e.(shape)
		if !ok || s.Style.Fill != paper || len(s.Outline.Vertices) != 2 || s.Outline.Vertices[0].Bulge != 1 {
			continue
		}
		a, b := s.Outline.Vertices[0].P, s.Outline.Vertices[1].P
		if math.Abs(a.Sub(b).Norm()-diameter) < 1e-9*diameter {
			centers = append(centers, a.Add(b).Scale(0.5))
		}
	}
	return centers
}

// The stated scale is true: pins have their diameter at it, and a gear drawn whole its distance between pins.
func TestSheetPicturesAreAtTheStatedScale(t *testing.T) {
	for _, c := range []struct {
		teeth  int
		module float64
		pin    float64
		whole  bool
	}{
		{18, 25.4 / 16, 2.7432, true}, {13, 0.5, 0.9, true}, {17, 1, 1.75, true}, {8, 0.3, 0.55, true},
		{60, 4, 7, false}, {61, 4, 7, false}, {200, 1, 1.7, false}, {31, 12, 22, false}, {12, 25, 45, false},
	} {
		g := sampleGear(c.teeth, c.module, 0)
		s := inchSheet()
		s.Shape, s.Pins, s.Span = g, samplePins(g, c.module, c.pin), nil
		d := mustLayout(t, s, A4)
		scales := scalesSaid(d)
		if len(scales) != 1 {
			t.Fatalf("z %d m %g: scales %v", c.teeth, c.module, scales)
		}
		pins := circles(d, c.pin*scales[0])
		if len(pins) != 2 {
			t.Errorf("z %d m %g: %d pins at the scale %g, want 2", c.teeth, c.module, len(pins), scales[0])
			continue
		}
		if pins[0].Y <= pins[1].Y || math.Abs(pins[0].X-pins[1].X) > 1e-9 {
			t.Errorf("z %d m %g: pins at %v, want the first straight above the second", c.teeth, c.module, pins)
		}
		apart := pins[0].Sub(pins[1]).Norm() / scales[0]
		want := s.Pins.Centers[0].Sub(s.Pins.Centers[1]).Norm()
		shortened := strings.Contains(strings.Join(said(d), " "), "Shortened")
		if c.whole != !shortened || c.whole != (math.Abs(apart-want) < 1e-9) {
			t.Errorf("z %d m %g: pins %g mm apart, really %g; shortened said: %v", c.teeth, c.module, apart, want, shortened)
		}
	}
}

// The span's faces are as far apart as the points of contact, at the stated scale.
func TestSheetSpanIsAtTheStatedScale(t *testing.T) {
	for _, c := range []struct {
		teeth, spanned int
		module         float64
	}{{18, 3, 25.4 / 16}, {60, 7, 4}, {13, 2, 0.5}, {8, 3, 2}, {200, 23, 1}} {
		g := sampleGear(c.teeth, c.module, 0)
		s := inchSheet()
		s.Shape, s.Pins, s.Span = g, nil, sampleSpan(g, c.module, c.spanned)
		d := mustLayout(t, s, Letter)
		var faces []float64
		for _, e := range d.elements {
			if shape, ok := e.(shape); ok && shape.Style.Width == faceWidth {
				faces = append(faces, shape.Outline.Vertices[0].P.X)
			}
		}
		scales := scalesSaid(d)
		if len(faces) != 2 || len(scales) != 1 {
			t.Fatalf("z %d: %d faces, scales %v", c.teeth, len(faces), scales)
		}
		got, want := math.Abs(faces[1]-faces[0])/scales[0], s.Span.From.Sub(s.Span.To).Norm()
		if math.Abs(got-want) > 1e-9*want {
			t.Errorf("z %d: faces %g mm apart, points of contact %g", c.teeth, got, want)
		}
	}
}

// Gears of any size, with two or three pins, stay inside the margins.
func TestSheetPicturesStayOnThePage(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		z := rapid.IntRange(6, 300).Draw(t, "teeth")
		m := math.Exp(rapid.Float64Range(math.Log(0.1), math.Log(50)).Draw(t, "ln module"))
		g := sampleGear(z, m, m*float64(z)*rapid.Float64Range(0, 0.6).Draw(t, "bore"))
		s := inchSheet()
		s.Shape, s.Pins, s.Span = g, samplePins(g, m, 1.7*m), sampleSpan(g, m, max(2, z/9))
		if z%2 == 1 && rapid.Bool().Draw(t, "three pins") {
			half := math.Pi / float64(z)
			r := g.Reference / 2
			s.Pins.Centers = []involute.Vec{involute.Polar(r, math.Pi/2), involute.Polar(r, 1.5*math.Pi-half), involute.Polar(r, 1.5*math.Pi+half)}
		}
		d, err := LayoutSheet(s, rapid.SampledFrom([]PageSize{A4, Letter}).Draw(t, "page"))
		if err != nil {
			t.Fatal(err)
		}
		for _, e := range d.elements {
			shape, ok := e.(shape)
			if !ok {
				continue
			}
			for _, v := range shape.Outline.Vertices {
				if v.P.X < sheetMargin-1 || v.P.X > d.Width-sheetMargin+1 || v.P.Y < sheetMargin-1 || v.P.Y > d.Height-sheetMargin+1 {
					t.Fatalf("z %d m %g: a line goes to %v", z, m, v.P)
				}
			}
		}
	})
}
