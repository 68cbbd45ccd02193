package export

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"flankwright/involute"
)

// smallDrawing has one of everything.
func smallDrawing() Drawing {
	at := func(x, y float64) involute.Vec { return involute.Vec{X: x, Y: y} }
	flag := straight(at(5, 5), at(15, 5), at(15, 10))
	flag.Closed = true
	return Drawing{Title: `"A" < B & C`, Width: 60, Height: 40, elements: []element{
		shape{circlePath(at(30, 20), 20).line(), shapeStyle{Width: 0.4, Line: black, Fill: tint}},
		shape{circlePath(at(30, 20), 14).line(), shapeStyle{Width: 0.18, Line: black, Dash: dashDot}},
		shape{flag, shapeStyle{Fill: black}},
		shape{straight(at(5, 30), at(20, 30)), shapeStyle{Width: 0.25, Line: gray, Dash: dashed}},
		shape{polyline{Vertices: []Vertex{{P: at(45, 5), Bulge: math.Sqrt2 - 1}, {P: at(50, 10), Bulge: -3}, {P: at(50, 12)}}}, shapeStyle{Width: 0.25, Line: black}},
		textLine{At: at(30, 20), Words: "Ø 20", Size: 4, Align: alignCenter, Tone: black},
		textLine{At: at(58, 36), Words: `"5" < 6`, Size: 3, Bold: true, Align: alignRight, Tone: gray},
		textLine{At: at(3, 12), Words: "up", Size: 3, Turn: math.Pi / 2, Tone: black},
	}}
}

func drawingSVG(t *testing.T, d Drawing) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := d.WriteSVG(&b); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestDrawingSVGGolden(t *testing.T) {
	golden(t, "drawing.svg", drawingSVG(t, smallDrawing()))
}

func TestDrawingSVGIsXML(t *testing.T) {
	for _, d := range []Drawing{smallDrawing(), mustLayout(t, crowdedSheet(), Letter)} {
		file := xml.NewDecoder(bytes.NewReader(drawingSVG(t, d)))
		for {
			if _, err := file.Token(); errors.Is(err, io.EOF) {
				break
			} else if err != nil {
				t.Fatal(err)
			}
		}
	}
}

func TestDrawingSVGIsTheSameTwice(t *testing.T) {
	if !bytes.Equal(drawingSVG(t, mustLayout(t, helicalSheet(), A4)), drawingSVG(t, mustLayout(t, helicalSheet(), A4))) {
		t.Error("the same sheet gave other bytes")
	}
}

// The check bars are true in the file: one user unit is one mm.
func TestDrawingSVGCheckBars(t *testing.T) {
	file := string(drawingSVG(t, mustLayout(t, inchSheet(), Letter)))
	if want := `width="215.9mm" height="279.4mm" viewBox="0 0 215.9 279.4"`; !strings.Contains(file, want) {
		t.Errorf("no %s", want)
	}
	for _, length := range []float64{50, 50.8} {
		found := 0
		for line := range strings.Lines(file) {
			var x0, y0, x1, y1 float64
			if n, _ := fmt.Sscanf(line, `<path d="M%g %g L%g %g"`, &x0, &y0, &x1, &y1); n == 4 && y0 == y1 && math.Abs(x1-x0-length) < 1e-9 {
				found++
			}
		}
		if found != 1 {
			t.Errorf("%d level lines of %g mm, want 1", found, length)
		}
	}
}

func TestDrawingPNG(t *testing.T) {
	var b bytes.Buffer
	if err := smallDrawing().WritePNG(&b, 254); err != nil {
		t.Fatal(err)
	}
	img := decodePNG(t, b.Bytes())
	if size := img.Bounds().Size(); size.X != 600 || size.Y != 400 {
		t.Fatalf("picture of %v points, want 600 × 400", size)
	}
	for _, c := range []struct {
		what       string
		x, y, gray int // points from the upper left, 0 to 255
	}{
		{"paper", 20, 20, 255}, {"metal", 300, 290, 236}, {"flag", 140, 345, 0}, {"outline", 400, 200, 0},
	} {
		if got := grayAt(img, c.x, c.y); abs(got-c.gray) > 4 { // colors are blended in linear light and rounded
			t.Errorf("%s at (%d, %d) is %d, want %d", c.what, c.x, c.y, got, c.gray)
		}
	}
	for _, dpi := range []float64{0, 9, 1201, math.NaN()} {
		if err := smallDrawing().WritePNG(io.Discard, dpi); err == nil {
			t.Errorf("%g dots per inch were accepted", dpi)
		}
	}
}

// Poppler prints the PDF at 20 points a mm: the 50 mm bar must be 1000 points long, seen by a program that shares no code with the writer.
func TestCheckBarPrinted(t *testing.T) {
	pdftoppm := outsideProgram(t, "pdftoppm", "poppler-utils")
	const perMM = 20
	for _, size := range []PageSize{A4, Letter} {
		d := mustLayout(t, inchSheet(), size)
		dir := t.TempDir()
		name := filepath.Join(dir, "sheet.pdf")
		if err := os.WriteFile(name, pdfBytes(t, d), 0o644); err != nil {
			t.Fatal(err)
		}
		bar := levelLine(t, d, 50)
		const strip = 10 * perMM // points printed from above to below the bar
		above := int(perMM*(d.Height-bar.Y)) - strip/2
		outsideRun(t, pdftoppm, "-r", fmt.Sprint(perMM*25.4), "-y", fmt.Sprint(above), "-H", fmt.Sprint(strip), "-png", "-singlefile", name, filepath.Join(dir, "sheet"))
		file, err := os.ReadFile(filepath.Join(dir, "sheet.png"))
		if err != nil {
			t.Fatal(err)
		}
		img := decodePNG(t, file)
		y := int(perMM*(d.Height-bar.Y)) - above
		x0 := int(perMM * bar.X)
		length := 0
		for x := x0 - perMM; x < x0+60*perMM; x++ {
			if grayAt(img, x, y) < 128 {
				length++
			} else if length > 100 {
				break
			}
		}
		if length < 50*perMM-2 || length > 50*perMM+5 { // the end marks are 0.25 mm = 5 points wide, half of each beyond
			t.Errorf("%v: the 50 mm bar is printed %d points long, want %d", size, length, 50*perMM)
		}
	}
}

// levelLine returns where the only level line of a length starts.
func levelLine(t *testing.T, d Drawing, length float64) involute.Vec {
	t.Helper()
	for _, e := range d.elements {
		if s, ok := e.(shape); ok && len(s.Outline.Vertices) == 2 && !s.Outline.Closed {
			from, to := s.Outline.Vertices[0].P, s.Outline.Vertices[1].P
			if from.Y == to.Y && math.Abs(to.X-from.X-length) < 1e-9 {
				return from
			}
		}
	}
	t.Fatalf("no level line of %g mm", length)
	return involute.Vec{}
}
