package export

import (
	"encoding/json"
	"fmt"
	"image"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// svgFile writes an outline's SVG to a file.
func svgFile(t *testing.T, o Outline) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "outline.svg")
	if err := os.WriteFile(path, svgBytes(t, o), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// The Python library svgelements finds the pieces, radii and senses of every arc.
func TestSvgelementsReadsSVG(t *testing.T) {
	python := outsidePython(t, "svgelements", "python3-svgelements")
	for name, o := range plates() {
		t.Run(name, func(t *testing.T) {
			var got struct {
				Width, Height float64
				Paths         []struct {
					Pieces [][]any
					Box    [4]float64
				}
				Circles [][4]float64
			}
			ppi := 25.4 / o.Unit.MM()
			if err := json.Unmarshal(outsideRun(t, python, "testdata/read_svgelements.py", svgFile(t, o), fmt.Sprint(ppi)), &got); err != nil {
				t.Fatal(err)
			}
			f, err := readSVG(mustOpen(t, svgFile(t, o)))
			if err != nil {
				t.Fatal(err)
			}
			lo, hi := f.bounds()
			f.scale(func(x float64) float64 { return x / o.Unit.MM() })
			size := hi.Sub(lo).Add(involute.Vec{X: 2 * svgMargin, Y: 2 * svgMargin}).Scale(1 / o.Unit.MM())
			// The library takes a mm for 0.0393701 in, 5.1e-7 too long; all its numbers are divided by that.
			stretch := 1.0
			if o.Unit == inspect.Millimeter {
				stretch = 0.0393701 * 25.4
			}
			// It moves the page to (0, 0): its left top corner is the viewBox's.
			corner := involute.Vec{X: lo.X - svgMargin, Y: hi.Y + svgMargin}.Scale(1 / o.Unit.MM())
			place := func(x, y any) involute.Vec {
				return corner.Add(involute.Vec{X: x.(float64), Y: -y.(float64)}.Scale(1 / stretch))
			}
			const slack = 1e-9
			if !near(slack, got.Width/stretch, size.X, got.Height/stretch, size.Y) || len(got.Paths) != len(f.Contours) || len(got.Circles) != len(f.Circles) {
				t.Fatalf("%g by %g, %d paths, %d circles; want %v", got.Width, got.Height, len(got.Paths), len(got.Circles), size)
			}
			for i, c := range f.Contours {
				pieces := got.Paths[i].Pieces
				for j := range c.Path.Vertices {
					from, to, b := c.Path.ends(j)
					p := pieces[j]
					if place(p[1], p[2]).Sub(from).Norm() > slack || place(p[3], p[4]).Sub(to).Norm() > slack {
						t.Fatalf("path %d, piece %d: %v, want from %v to %v", i, j, p, from, to)
					}
					arc, ok := c.Path.Curve(j).(involute.Arc)
					if !ok && p[0] == "A" || ok && (p[0] != "A" || !near(slack, p[5].(float64)/stretch, arc.Radius, p[6].(float64)/stretch, arc.Radius, p[7].(float64), -4*math.Atan(b))) {
						t.Fatalf("path %d, piece %d: %v, want %+v", i, j, p, c.Path.Curve(j))
					}
				}
				blo, bhi := c.Path.bounds()
				x := got.Paths[i].Box
				if g, h := place(x[0], x[3]), place(x[2], x[1]); g.Sub(blo).Norm()+h.Sub(bhi).Norm() > 1e-7 {
					t.Errorf("path %d reaches from %v to %v, want %v to %v", i, g, h, blo, bhi)
				}
			}
			for i, c := range f.Circles {
				g := got.Circles[i]
				if place(g[0], g[1]).Sub(c.Center).Norm() > slack || !near(slack, g[2]/stretch, c.Radius, g[3]/stretch, c.Radius) {
					t.Errorf("circle %d: %v, want %v", i, g, c)
				}
			}
		})
	}
}

func mustOpen(t *testing.T, path string) *os.File {
	t.Helper()
	f, err := os.Open(path)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

// The picture that librsvg draws is as large as it says, and dark where the
// outline runs and nowhere else: true scale, upright, arcs to the right side.
func TestLibrsvgDrawsSVG(t *testing.T) {
	convert := outsideProgram(t, "rsvg-convert", "librsvg2-bin")
	const dpi = 508 // 20 pixels to the mm
	const scale = dpi / 25.4
	for name, o := range plates() {
		t.Run(name, func(t *testing.T) {
			picture := filepath.Join(t.TempDir(), "outline.png")
			outsideRun(t, convert, "--dpi-x", fmt.Sprint(dpi), "--dpi-y", fmt.Sprint(dpi), "--background-color", "white", "-o", picture, svgFile(t, o))
			img, err := png.Decode(mustOpen(t, picture))
			if err != nil {
				t.Fatal(err)
			}
			lo, hi := o.bounds()
			size := hi.Sub(lo).Add(involute.Vec{X: 2 * svgMargin, Y: 2 * svgMargin}).Scale(scale)
			if b := img.Bounds(); !near(1, float64(b.Dx()), size.X, float64(b.Dy()), size.Y) {
				t.Fatalf("%d by %d pixels, want %v", b.Dx(), b.Dy(), size)
			}
			pixel := func(p involute.Vec) image.Point {
				return image.Pt(int(math.Floor((p.X-lo.X+svgMargin)*scale)), int(math.Floor((hi.Y+svgMargin-p.Y)*scale)))
			}
			expected := map[image.Point]bool{} // pixels within 2 of the outline
			mark := func(p involute.Vec, dark bool) {
				at := pixel(p)
				if r, _, _, _ := img.At(at.X, at.Y).RGBA(); dark && r > 0x9000 {
					t.Errorf("nothing drawn at %v, pixel %v", p, at)
				}
				for dx := -2; dx <= 2; dx++ {
					for dy := -2; dy <= 2; dy++ {
						expected[at.Add(image.Pt(dx, dy))] = true
					}
				}
			}
			for _, c := range o.Contours {
				for i := range c.Path.Vertices {
					piece := c.Path.Curve(i)
					for k := range 1500 {
						p, _ := piece.At(float64(k) / 1500)
						mark(p, true)
					}
				}
			}
			for _, c := range o.Circles {
				for k := range 9000 {
					mark(c.Center.Add(involute.Polar(c.Radius, 2*math.Pi*float64(k)/9000)), c.Layer != LayerReference)
				}
			}
			for x := range img.Bounds().Dx() {
				for y := range img.Bounds().Dy() {
					if r, _, _, _ := img.At(x, y).RGBA(); r < 0xf000 && !expected[image.Pt(x, y)] {
						t.Fatalf("pixel (%d, %d) is dark, far from the outline", x, y)
					}
				}
			}
		})
	}
}
