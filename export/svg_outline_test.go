package export

import (
	"bytes"
	"fmt"
	"math"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
	"pgregory.net/rapid"
)

// svgBytes writes an outline to memory.
func svgBytes(t interface{ Fatal(...any) }, o Outline) []byte {
	var b bytes.Buffer
	if err := writeSVG(&b, o); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestSVGGolden(t *testing.T) {
	golden(t, "cam_mm.svg", svgBytes(t, cam(inspect.Millimeter)))
	golden(t, "cam_in.svg", svgBytes(t, cam(inspect.Inch)))
}

// svgBulgeSlack is how far a bulge may come back off through SVG, which keeps
// radius and ends instead. With s = c/(2r), b = tan(½·asin s), so that
// db/ds = (1 + b²)²/(2(1 − b²)), at most 0.83 up to 90°; each coordinate and the
// radius are off by step, so c by 2√2·step. A bulge below bulgeStep is a line.
func svgBulgeSlack(unit inspect.Unit) func(v, next Vertex) float64 {
	return func(v, next Vertex) float64 {
		c := next.P.Sub(v.P).Norm()
		b := math.Abs(v.Bulge)
		if b < 2*bulgeStep {
			return 2 * bulgeStep
		}
		r := arcRadius(c, b)
		step := 0.5e-12*unit.MM() + 1e-15*(math.Abs(v.P.X)+math.Abs(v.P.Y)+c)
		return 0.83 * (2*math.Sqrt2*step/(2*r) + c*step/(2*r*r) + 4e-16*c/r)
	}
}

func TestSVGRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		o := drawOutline(t)
		o.Title = rapid.StringMatching(`[ -~°é±Ø]{0,20}`).Draw(t, "title")
		got, err := readSVG(bytes.NewReader(svgBytes(t, o)))
		if err != nil {
			t.Fatal(err)
		}
		want := Outline{Unit: o.Unit} // in the order of the layers in the file
		for _, layer := range []Layer{LayerReference, LayerBore, LayerCut} {
			for _, c := range o.Contours {
				if c.Layer == layer {
					want.Contours = append(want.Contours, c)
				}
			}
			for _, c := range o.Circles {
				if c.Layer == layer {
					want.Circles = append(want.Circles, c)
				}
			}
		}
		sameOutline(t, got, want, svgBulgeSlack(o.Unit))
		if got.Title != strings.TrimSpace(o.Title) || len(got.Skipped) > 0 {
			t.Fatalf("title %q, want %q; skipped %v", got.Title, o.Title, got.Skipped)
		}
	})
}

// The page shows the part at true scale, its origin at user (0, 0), y up.
func TestSVGPage(t *testing.T) {
	o := Outline{Unit: inspect.Inch, Circles: []Circle{{LayerBore, involute.Vec{X: 25.4, Y: 50.8}, 25.4}}}
	text := string(svgBytes(t, o))
	margin := 1 / 25.4
	want := fmt.Sprintf(`width="%.12fin" height="%.12fin" viewBox="%.12f %.12f %.12f %.12f"`,
		2+2*margin, 2+2*margin, -margin, -3-margin, 2+2*margin, 2+2*margin)
	if !strings.Contains(text, want) || !strings.Contains(text, `<circle cx="1.000000000000" cy="-2.000000000000" r="1.000000000000"/>`) {
		t.Errorf("want %s in\n%s", want, text)
	}
	if strings.Contains(text, "transform") || strings.Contains(text, `"-0.0000`) {
		t.Error("a transform or a negative zero")
	}
}

// svgOf is a page of 10 by 10 mm with something in it.
func svgOf(inside string) string {
	return `<svg xmlns="http://www.w3.org/2000/svg" width="10mm" height="10mm" viewBox="0 0 10 10">` + inside + `</svg>`
}

// Plain variants: packed numbers and flags, commas, H and V, no Z line, other
// scales, groups without id, things that are passed over.
func TestReadSVGVariants(t *testing.T) {
	// One shape: 1 by 1 mm with a semicircle over its top, standing on y = −2.
	shape := vertices(0, -2, 0, 1, -2, 0, 1, -1, 1, 0, -1, 0)
	for name, text := range map[string]string{
		"plain":   svgOf(`<path d="M 0 2 L 1 2 L 1 1 A 0.5 0.5 0 0 0 0 1 Z"/>`),
		"packed":  svgOf(`<path d="M0,2L1,2,1,1A.5.5,0,000,1z"/>`),
		"implied": svgOf(`<path d="M0 2 1 2 1 1A.5.5 0 0 0 0 1 L 0 2 Z"/>`),
		"H and V": svgOf(`<path d="M0 2H1V1A5e-1+.5-0 000 1Z"/>`),
		"scaled":  strings.Replace(svgOf(`<path d="M 0 20 L 10 20 L 10 10 A 5 5 0 0 0 0 10 Z"/>`), "0 0 10 10", "0 0 100 100", 1),
		"skipped": svgOf(`<desc><b>x</b></desc><rect width="3"/><text>hi</text><g><path d="M0 2H1V1A.5.5 0 0 0 0 1Z"/></g>`),
		"around":  `<?xml version="1.0"?><!-- a --><!DOCTYPE svg>` + svgOf(`<style>g{}</style><path d="M0 2H1V1A.5.5 0 0 0 0 1Z"/>`) + "\n<!-- b -->",
	} {
		got, err := readSVG(strings.NewReader(text))
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if name == "skipped" && fmt.Sprint(got.Skipped) != "[1 <rect>, first in line 1 1 <text>, first in line 1]" {
			t.Errorf("skipped: %v", got.Skipped)
		}
		sameOutline(t, got, Outline{Contours: []Contour{{"0", shape}}}, nil)
	}

	// Two contours in one path, on a layer; large arcs; inches.
	text := strings.ReplaceAll(svgOf(`<g id="CUT"><path d="M 1 0 A 1 1 0 1 1 0 -1 Z M 5 5 L 6 5 L 5 6 Z"/></g><circle r=".5"/>`), `10mm`, `10in`)
	got, err := readSVG(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	in := inspect.Inch.MM()
	sameOutline(t, got, Outline{Unit: inspect.Inch,
		Contours: []Contour{
			{LayerCut, vertices(in, 0, -math.Tan(3*math.Pi/8), 0, in, 0)},
			{LayerCut, vertices(5*in, -5*in, 0, 6*in, -5*in, 0, 5*in, -6*in, 0)}},
		Circles: []Circle{{"0", involute.Vec{}, in / 2}}}, func(_, _ Vertex) float64 { return 1e-11 })
}

func TestReadSVGErrors(t *testing.T) {
	const ok = `<path d="M0 0H1V1Z"/>`
	for _, test := range []struct{ name, text, want string }{
		{"empty", "", "no svg element"},
		{"text", "hello", "no svg element"},
		{"html", "<html/>", "<svg> would be right"},
		{"cut", strings.TrimSuffix(svgOf(ok), "</svg>"), "SVG line 1: XML syntax error"},
		{"nothing", svgOf(""), "no closed path"},
		{"pixels", strings.Replace(svgOf(ok), "10mm", "10px", 1), `width "10px" has no unit; mm or in`},
		{"no width", `<svg viewBox="0 0 1 1"/>`, `width "" has no unit`},
		{"two units", strings.Replace(svgOf(ok), "10mm", "10in", 1), "different units"},
		{"no viewBox", strings.Replace(svgOf(ok), "viewBox", "view", 1), "viewBox:"},
		{"flat viewBox", strings.Replace(svgOf(ok), "0 0 10 10", "0 0 10 0", 1), "must be positive"},
		{"stretched", strings.Replace(svgOf(ok), "0 0 10 10", "0 0 10 20", 1), "proportions"},
		{"transform", svgOf(`<g transform="scale(2)">` + ok + "</g>"), "has a transform"},
		{"nested", svgOf(svgOf(ok)), "inside another"},
		{"second root", svgOf(ok) + "<path/>", "<path> after the end of <svg>"},
		{"deep", svgOf(strings.Repeat("<g>", 300) + ok + strings.Repeat("</g>", 300)), "nested over 200"},
		{"relative", svgOf(`<path d="M0 0l1 0Z"/>`), `path, character 6: command 'l' is not read`},
		{"Bézier", svgOf(`<path d="M0 0C1 0 1 1 0 1Z"/>`), `command 'C'`},
		{"relative start", svgOf(`<path d="m0 0H1V1Z"/>`), "must start with M"},
		{"open", svgOf("\n" + `<path d="M0 0H1V1"/>`), "SVG line 2: path, character 9: the path is not closed by Z"},
		{"open, then another", svgOf(`<path d="M0 0H1V1M5 5H6V6Z"/>`), "command 'M'"},
		{"no number", svgOf(`<path d="M0 0L1 Z"/>`), `"" is not a number`},
		{"ellipse", svgOf(`<path d="M0 0A1 2 0 0 0 1 1Z"/>`), "not circular"},
		{"flag", svgOf(`<path d="M0 0A1 1 0 2 0 1 1Z"/>`), "flags must be 0 or 1"},
		{"small radius", svgOf(`<path d="M0 0A1 1 0 0 0 3 0Z"/>`), "no arc of radius 1 mm spans a chord of 3 mm"},
		{"no radius", svgOf(`<path d="M0 0A0 0 0 0 0 3 0Z"/>`), "not circular"},
		{"full turn", svgOf(`<path d="M0 0A1 1 0 1 0 0 0Z"/>`), "chord of 0 mm"},
		{"doubled vertex", svgOf(`<path d="M0 0H1H1V1Z"/>`), "leaving vertex 2 is 0 mm"},
		{"circle", svgOf(`<circle r="-1"/>`), "radius -1 must be"},
		{"circle without radius", svgOf(`<circle cx="1"/>`), `circle: r: "" is not a number`},
		{"far", svgOf(`<circle cx="1e9" r="1"/>`), "must be within"},
		{"odd number of numbers", svgOf(`<path d="M0 0L1.2.3.4Z"/>`), "is not a number"},
	} {
		_, err := readSVG(strings.NewReader(test.text))
		if err == nil || !strings.Contains(err.Error(), test.want) {
			t.Errorf("%s: %v, want %q", test.name, err, test.want)
		}
	}
}

// A page that never ends is given up.
func TestReadSVGIsBounded(t *testing.T) {
	start := strings.TrimSuffix(svgOf(`<path d="`), "</svg>")
	if _, err := readSVG(&endless{start, "M 0 0 "}); err == nil || !strings.Contains(err.Error(), "larger than 16 MB") {
		t.Errorf("endless path: %v", err)
	}
	data := svgOf(`<path d="M0 0` + strings.Repeat("H1H2", maxOutlineVertices/2+1) + `V1Z"/>`)
	if _, err := readSVG(strings.NewReader(data)); err == nil || !strings.Contains(err.Error(), "more than 262144 vertices") {
		t.Errorf("many vertices: %v", err)
	}
}

// Whatever comes in, readSVG returns; what it takes is a sound outline.
func FuzzReadSVG(f *testing.F) {
	f.Add(svgBytes(f, cam(inspect.Millimeter)))
	f.Add(svgBytes(f, cam(inspect.Inch)))
	f.Add([]byte(svgOf(`<path d="M0,2L1,2,1,1A.5.5,0,000,1z"/><circle r="1"/>`)))
	f.Fuzz(func(t *testing.T, data []byte) {
		o, err := readSVG(bytes.NewReader(data))
		if err == nil {
			soundOutline(t, o)
		}
	})
}
