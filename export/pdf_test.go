package export

import (
	"bytes"
	"compress/zlib"
	"encoding/binary"
	"fmt"
	"io"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"flankwright/involute"
)

// pdfBytes returns a PDF of the pages.
func pdfBytes(t *testing.T, pages ...Drawing) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := WritePDF(&b, pages[0].Title, pages); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// mustLayout lays out a sheet.
func mustLayout(t *testing.T, s Sheet, size PageSize) Drawing {
	t.Helper()
	d, err := LayoutSheet(s, size)
	if err != nil {
		t.Fatal(err)
	}
	return d
}

func TestPDFDoesNotDependOnTheClock(t *testing.T) {
	d := mustLayout(t, inchSheet(), A4)
	first := pdfBytes(t, d)
	time.Sleep(1100 * time.Millisecond) // PDF and font dates count seconds
	if second := pdfBytes(t, mustLayout(t, inchSheet(), A4)); !bytes.Equal(first, second) {
		t.Error("the same sheet gave other bytes a second later")
	}
	if m := regexp.MustCompile(`CreationDate|ModDate`).Find(first); m != nil {
		t.Errorf("the file holds %s", m)
	}
}

// Every entry of the cross-reference table must point at its object (ISO 32000-1:2008, 7.5.4).
func TestPDFCrossReferences(t *testing.T) {
	file := pdfBytes(t, mustLayout(t, inchSheet(), A4), mustLayout(t, helicalSheet(), Letter))
	tail := regexp.MustCompile(`startxref\n(\d+)\n%%EOF\n$`).FindSubmatch(file)
	if tail == nil {
		t.Fatal("no startxref at the end")
	}
	at, _ := strconv.Atoi(string(tail[1]))
	lines := strings.Split(string(file[at:]), "\n")
	var count int
	if _, err := fmt.Sscanf(lines[1], "0 %d", &count); lines[0] != "xref" || err != nil {
		t.Fatalf("table starts with %q, %q", lines[0], lines[1])
	}
	for n := 1; n < count; n++ {
		place, err := strconv.Atoi(lines[2+n][:10])
		if want := fmt.Sprintf("%d 0 obj\n", n); err != nil || !bytes.HasPrefix(file[place:], []byte(want)) {
			t.Errorf("object %d: entry %q points at %q", n, lines[2+n], file[place:min(place+20, len(file))])
		}
	}
}

// inflated returns the unpacked stream of an object.
func inflated(t *testing.T, object []byte) []byte {
	t.Helper()
	_, stream, _ := bytes.Cut(object, []byte("stream\n"))
	r, err := zlib.NewReader(bytes.NewReader(stream))
	if err != nil {
		t.Fatal(err)
	}
	b, err := io.ReadAll(r)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// An embedded font must sum up to the number OpenType asks for (ISO/IEC 14496-22, "head":
// checksumAdjustment makes the whole 0xB1B0AFBA), its tables to theirs, and bear no later date than its making.
func TestPDFFontsAreSound(t *testing.T) {
	_, objects, err := pdfObjects(pdfBytes(t, mustLayout(t, inchSheet(), A4)))
	if err != nil {
		t.Fatal(err)
	}
	numbers, err := pdfFontFiles(objects)
	if err != nil || len(numbers) != 2 {
		t.Fatalf("fonts in objects %v, %v; want 2", numbers, err)
	}
	sum := func(b []byte) (s uint32) {
		for i, c := range b {
			s += uint32(c) << (24 - 8*(i%4))
		}
		return s
	}
	for _, n := range numbers {
		font := inflated(t, objects[n-1])
		if got := sum(font); got != 0xB1B0AFBA {
			t.Errorf("font in object %d sums to %#x", n, got)
		}
		if want := fmt.Sprintf("/Length1 %d>>", len(font)); !bytes.Contains(objects[n-1], []byte(want)) {
			t.Errorf("font in object %d does not say %s", n, want)
		}
		for i := range int(binary.BigEndian.Uint16(font[4:])) {
			entry := font[12+16*i:]
			at, length := binary.BigEndian.Uint32(entry[8:]), binary.BigEndian.Uint32(entry[12:])
			data := bytes.Clone(font[at : at+length])
			if string(entry[:4]) == "head" {
				if !bytes.Equal(data[20:28], data[28:36]) {
					t.Errorf("font in object %d: created %x, modified %x", n, data[20:28], data[28:36])
				}
				copy(data[8:12], []byte{0, 0, 0, 0})
			}
			if got, want := sum(data), binary.BigEndian.Uint32(entry[4:]); got != want {
				t.Errorf("font in object %d: table %s sums to %#x, recorded %#x", n, entry[:4], got, want)
			}
		}
	}
}

// pdfCurves returns the chains of Bézier curves on the first page, mm: each a list of points, 3n + 1 of them.
func pdfCurves(t *testing.T, file []byte) [][]involute.Vec {
	t.Helper()
	_, objects, err := pdfObjects(file)
	if err != nil {
		t.Fatal(err)
	}
	content := ""
	for _, object := range objects {
		if m := regexp.MustCompile(`/Type/Page/Contents (\d+) 0 R`).FindSubmatch(object); m != nil {
			n, _ := strconv.Atoi(string(m[1]))
			content = string(inflated(t, objects[n-1]))
			break
		}
	}
	var chains [][]involute.Vec
	var stack []float64
	for _, word := range strings.Fields(content) {
		if x, err := strconv.ParseFloat(word, 64); err == nil {
			stack = append(stack, x)
			continue
		}
		point := func(i int) involute.Vec { return involute.Vec{X: stack[i], Y: stack[i+1]} }
		switch word {
		case "m":
			chains = append(chains, []involute.Vec{point(0)})
		case "c":
			chains[len(chains)-1] = append(chains[len(chains)-1], point(0), point(2), point(4))
		case "l":
			chain := chains[len(chains)-1]
			if gap := point(0).Sub(chain[len(chain)-1]).Norm(); gap > gridStep { // the library joins curves by lines of no length
				t.Errorf("an arc was drawn with a straight line of %g mm", gap)
			}
		}
		stack = nil
	}
	return chains
}

// The drawing library bends an arc whose horizontal chord equals its radius by 180° and
// strays by 3e-4 of the radius on quarter circles: no arc may reach it whole.
func TestPDFArcs(t *testing.T) {
	const radius = 50.0
	center := involute.Vec{X: 100, Y: 150}
	for _, c := range []struct{ start, sweep float64 }{ // degrees
		{60, 60}, {120, -60}, {240, 60}, {-60, -60}, // the chord is level and as long as the radius
		{150, 60}, {-30, 60}, {0, 90}, {45, -90}, {10, 180}, {200, 359}, {3, 1}, {77, -0.01},
	} {
		start, sweep := c.start*math.Pi/180, c.sweep*math.Pi/180
		from, to := center.Add(involute.Polar(radius, start)), center.Add(involute.Polar(radius, start+sweep))
		line := polyline{Vertices: []Vertex{{P: from, Bulge: math.Tan(sweep / 4)}, {P: to}}}
		d := Drawing{Width: 210, Height: 297, elements: []element{shape{line, shapeStyle{Width: 0.2, Line: black}}}}
		chains := pdfCurves(t, pdfBytes(t, d))
		if len(chains) != 1 {
			t.Fatalf("arc %v: %d chains", c, len(chains))
		}
		swept, last := 0.0, from.Sub(center)
		for i := 0; i+3 < len(chains[0]); i += 3 {
			for k := 1; k <= 16; k++ {
				p := bezier(chains[0][i:i+4], float64(k)/16).Sub(center)
				if off := math.Abs(p.Norm() - radius); off > 1e-4 {
					t.Errorf("arc %v: %g mm off the circle", c, off)
				}
				swept += math.Atan2(last.Cross(p), last.Dot(p))
				last = p
			}
		}
		if math.Abs(swept-sweep) > 1e-6 { // 5e-5 mm on the circle; coordinates are rounded to 1e-6 mm
			t.Errorf("arc %v: sweeps %g°", c, swept*180/math.Pi)
		}
	}
}

// bezier returns a point of a cubic Bézier curve.
func bezier(q []involute.Vec, u float64) involute.Vec {
	v := 1 - u
	return q[0].Scale(v * v * v).Add(q[1].Scale(3 * v * v * u)).Add(q[2].Scale(3 * v * u * u)).Add(q[3].Scale(u * u * u))
}

func TestPDFRefuses(t *testing.T) {
	for _, c := range []struct {
		name  string
		pages []Drawing
		want  string
	}{
		{"no page", nil, "no page"},
		{"no size", []Drawing{{Width: 0, Height: 10}}, "0 × 10"},
		{"NaN", []Drawing{{Width: 10, Height: 10, elements: []element{shape{Outline: straight(involute.Vec{X: math.NaN()}, involute.Vec{})}}}}, "NaN"},
		{"one point", []Drawing{{Width: 10, Height: 10, elements: []element{shape{Outline: straight(involute.Vec{})}}}}, "1 points"},
		{"text of no size", []Drawing{{Width: 10, Height: 10, elements: []element{textLine{Words: "x"}}}}, "size 0"},
	} {
		var b bytes.Buffer
		if err := WritePDF(&b, "", c.pages); err == nil || !strings.Contains(err.Error(), c.want) || b.Len() > 0 {
			t.Errorf("%s: error %v with %d bytes written, want %q and none", c.name, err, b.Len(), c.want)
		}
	}
}

// Poppler's tools, which share no code with the writer, find pages, sizes, fonts and words.
func TestPDFReadOutside(t *testing.T) {
	pdfinfo := outsideProgram(t, "pdfinfo", "poppler-utils")
	pdftotext := outsideProgram(t, "pdftotext", "poppler-utils")
	pdffonts := outsideProgram(t, "pdffonts", "poppler-utils")
	name := filepath.Join(t.TempDir(), "sheet.pdf")
	first := inchSheet()
	first.Title = "Räder (Ø) \\ 齿轮"
	if err := os.WriteFile(name, pdfBytes(t, mustLayout(t, first, A4), mustLayout(t, helicalSheet(), Letter)), 0o644); err != nil {
		t.Fatal(err)
	}
	info := string(outsideRun(t, pdfinfo, "-f", "1", "-l", "2", name))
	for _, want := range []string{`Pages: +2\n`, `Page +1 size: +595\.27\d* x 841\.89`, `Page +2 size: +612 x 792`, `Title: +Räder \(Ø\) \\ 齿轮\n`} {
		if !regexp.MustCompile(want).MatchString(info) {
			t.Errorf("pdfinfo does not say %q:\n%s", want, info)
		}
	}
	text := string(outsideRun(t, pdftotext, "-layout", name, "-"))
	for _, want := range []string{"1.3194", "1.3206", "1.3218", "33.543 mm", "257.981", "10.1567 in", "Do not use", "Ø 0.1080 in", "20 °C", "Scale 1:1", "driver", "bull gear"} {
		if !strings.Contains(text, want) {
			t.Errorf("pdftotext does not find %q", want)
		}
	}
	fonts := string(outsideRun(t, pdffonts, name))
	if n := len(regexp.MustCompile(`LiberationSans\S* +CID TrueType +Identity-H +yes yes yes`).FindAllString(fonts, -1)); n != 2 {
		t.Errorf("pdffonts finds %d embedded subset fonts with Unicode, want 2:\n%s", n, fonts)
	}
}
