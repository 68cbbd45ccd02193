package export

import (
	"bytes"
	"fmt"
	"strings"
	"testing"

	"flankwright/inspect"
	"flankwright/involute"
)

// minimal is a DXF with an entity or two; lines are given without group padding.
func minimal(units int, entities string) string {
	return fmt.Sprintf("0\nSECTION\n2\nHEADER\n9\n$INSUNITS\n70\n%d\n0\nENDSEC\n0\nSECTION\n2\nENTITIES\n%s0\nENDSEC\n0\nEOF\n", units, entities)
}

// Files of other programs: LF, lower decimals, exponents, unknown entities, a
// repeated first vertex, groups in another order.
func TestReadDXFVariants(t *testing.T) {
	square := vertices(0, 0, 0.25, 1, 0, 0, 1, 1, 0, 0, 1, 0)
	want := Outline{Contours: []Contour{{"0", square}}}
	for name, text := range map[string]string{
		"plain":      minimal(4, "0\nLWPOLYLINE\n90\n4\n70\n1\n10\n0\n20\n0\n42\n.25\n10\n1\n20\n0\n10\n1\n20\n1\n10\n0\n20\n1\n"),
		"spaces":     minimal(4, "  0\nLWPOLYLINE \n 90\n   4\n 70\n  129\n 10\n 0.0 \n 20\n0\n 42\n0.25\n 10\n1E0\n 20\n-0\n 10\n1\n 20\n1\n 10\n0\n 20\n1.\n"),
		"repeated":   minimal(4, "0\nLWPOLYLINE\n90\n5\n10\n0\n20\n0\n42\n.25\n10\n1\n20\n0\n10\n1\n20\n1\n10\n0\n20\n1\n10\n0\n20\n0\n"),
		"old":        minimal(4, "0\nPOLYLINE\n66\n1\n70\n1\n0\nVERTEX\n10\n0\n20\n0\n42\n.25\n0\nVERTEX\n10\n1\n20\n0\n0\nVERTEX\n10\n1\n20\n1\n0\nVERTEX\n10\n0\n20\n1\n0\nSEQEND\n"),
		"with more":  minimal(4, "0\nLINE\n10\n0\n20\nx\n0\nLWPOLYLINE\n67\n1\n0\nLWPOLYLINE\n90\n4\n70\n1\n10\n0\n20\n0\n42\n.25\n10\n1\n20\n0\n10\n1\n20\n1\n10\n0\n20\n1\n0\nLINE\n"),
		"no newline": strings.TrimSuffix(minimal(4, "0\nLWPOLYLINE\n90\n4\n70\n1\n10\n0\n20\n0\n42\n.25\n10\n1\n20\n0\n10\n1\n20\n1\n10\n0\n20\n1\n"), "\n"),
	} {
		got, err := readDXF(strings.NewReader(text))
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if name == "with more" && fmt.Sprint(got.Skipped) != "[2 LINE, first in line 15 1 LWPOLYLINE in paper space, first in line 21]" {
			t.Errorf("skipped: %v", got.Skipped)
		}
		sameOutline(t, got, want, nil)
	}
	got, err := readDXF(strings.NewReader(minimal(1, "0\nCIRCLE\n8\nHOLES\n10\n1\n20\n-2\n40\n.5\n")))
	if err != nil {
		t.Fatal(err)
	}
	sameOutline(t, got, Outline{Unit: inspect.Inch, Circles: []Circle{{"HOLES", involute.Vec{X: 25.4, Y: -50.8}, 12.7}}}, nil)
}

func TestReadDXFErrors(t *testing.T) {
	const circle = "0\nCIRCLE\n10\n0\n20\n0\n40\n1\n"
	lw := func(n int, rest string) string { return fmt.Sprintf("0\nLWPOLYLINE\n90\n%d\n", n) + rest }
	const triangle = "10\n0\n20\n0\n10\n1\n20\n0\n10\n0\n20\n1\n"
	for _, test := range []struct{ name, text, want string }{
		{"empty", "", "line 0: the file ends without EOF"},
		{"binary", "AutoCAD Binary DXF\r\n\x1a\x00", "save it as ASCII"},
		{"picture", "\x89PNG\r\n", "is not a group code"},
		{"cut short", strings.TrimSuffix(minimal(4, circle), "0\nEOF\n"), "line 24: the file ends without EOF"},
		{"cut in a pair", strings.TrimSuffix(minimal(4, circle), "EOF\n"), "line 25: the file ends after group code 0"},
		{"no unit", strings.Replace(minimal(4, circle), "$INSUNITS", "$LUNITS", 1), "does not say its unit"},
		{"feet", minimal(2, circle), "line 7: $INSUNITS is 2; 1 (inch) or 4 (mm) would be right"},
		{"unitless", minimal(0, circle), "$INSUNITS is 0"},
		{"nothing", minimal(4, "0\nLINE\n0\nARC\n0\nLINE\n"), "no closed polyline and no circle in the file; passed over: 2 LINE, first in line 15; passed over: 1 ARC"},
		{"no section", "0\nEOF\n", "no ENTITIES"},
		{"twice", strings.Replace(minimal(4, circle), "HEADER", "ENTITIES", 1), "line 5: group 9 before the first entity"},
		{"section twice", strings.Replace(minimal(4, circle), "2\nENTITIES", "2\nHEADER", 1), "section HEADER for the second time"},
		{"no ENDSEC", strings.Replace(minimal(4, circle), "0\nENDSEC\n", "", 1), "section HEADER has no ENDSEC"},
		{"open", minimal(4, lw(3, triangle)), "line 15: LWPOLYLINE is open"},
		{"count", minimal(4, lw(4, "70\n1\n"+triangle)), "says 4 vertices (group 90) and has 3"},
		{"no count", minimal(4, "0\nLWPOLYLINE\n70\n1\n"+triangle), "says -1 vertices"},
		{"no y", minimal(4, lw(2, "70\n1\n10\n0\n10\n1\n20\n0\n")), "line 23: the point before has no y"},
		{"last without y", minimal(4, lw(2, "70\n1\n10\n0\n20\n0\n10\n1\n")), "the last point has no y"},
		{"y first", minimal(4, lw(1, "20\n1\n")), "line 19: group 20 before"},
		{"second y", minimal(4, lw(1, "10\n1\n20\n1\n20\n2\n")), "a second y"},
		{"NaN", minimal(4, lw(3, "70\n1\n10\nNaN\n")), `line 22: group 10: "NaN" is not a number`},
		{"infinite", minimal(4, lw(3, "70\n1\n10\n1e999\n")), "is not a number"},
		{"hexadecimal", minimal(4, lw(3, "70\n1\n10\n0x10\n")), "is not a number"},
		{"flags", minimal(4, lw(3, "70\nclosed\n")), "is not a whole number"},
		{"spline-fit", minimal(4, "0\nPOLYLINE\n70\n5\n0\nSEQEND\n"), "flags 5 (group 70) is no plane outline"},
		{"no SEQEND", minimal(4, "0\nPOLYLINE\n70\n1\n0\nVERTEX\n10\n0\n20\n0\n"), `line 25: "ENDSEC" where VERTEX or SEQEND should be`},
		{"stray VERTEX", minimal(4, "0\nVERTEX\n10\n0\n20\n0\n"), "VERTEX outside a POLYLINE"},
		{"from below", minimal(4, "0\nCIRCLE\n10\n0\n20\n0\n40\n1\n230\n-1\n"), "not seen from above"},
		{"no radius", minimal(4, "0\nCIRCLE\n10\n0\n20\n0\n"), "line 15: radius 0 must be"},
		{"no center", minimal(4, "0\nCIRCLE\n40\n1\n"), "CIRCLE with 0 centers"},
		{"doubled vertex", minimal(4, lw(4, "70\n1\n"+triangle+"10\n0\n20\n1\n")), "line 15: the piece leaving vertex 3 is 0 mm"},
		{"long line", minimal(4, "0\n"+strings.Repeat("x", 5000)+"\n"), "longer than 4096"},
		{"zero byte", minimal(4, "0\nLI\x00NE\n"), "zero byte"},
	} {
		_, err := readDXF(strings.NewReader(test.text))
		if err == nil || !strings.Contains(err.Error(), test.want) {
			t.Errorf("%s: %v, want %q", test.name, err, test.want)
		}
	}
}

// An endless reader gives start, then again for ever.
type endless struct{ start, again string }

func (e *endless) Read(p []byte) (int, error) {
	n := copy(p, e.start)
	e.start = e.start[n:]
	for n < len(p) {
		k := copy(p[n:], e.again)
		e.start = e.again[k:]
		n += k
	}
	return n, nil
}

// A file that never ends is given up.
func TestReadDXFIsBounded(t *testing.T) {
	const start = "0\nSECTION\n2\nENTITIES\n"
	for _, test := range []struct{ start, again, want string }{
		{start + "0\nLWPOLYLINE\n", "10\n1\n20\n1\n", "more than 262144 vertices"},
		{start + "0\nPOLYLINE\n", "0\nVERTEX\n10\n1\n20\n1\n", "more than 262144 vertices"},
		{start, "0\nARC\n1\n" + strings.Repeat("x", 2000) + "\n", "larger than 16 MB"},
		{"", "x", "longer than 4096"},
		{"999\n", "x", "longer than 4096"},
	} {
		_, err := readDXF(&endless{test.start, test.again})
		if err == nil || !strings.Contains(err.Error(), test.want) {
			t.Errorf("%q: %v, want %q", test.start, err, test.want)
		}
	}
}

// Whatever comes in, readDXF and CheckDXF return; what readDXF takes is a sound outline.
func FuzzReadDXF(f *testing.F) {
	// Short seeds: the tool that shrinks finds takes minutes over whole files.
	whole := string(dxfBytes(f, cam(inspect.Millimeter), FormatDXF))
	_, entities, _ := strings.Cut(whole, "  2\r\nENTITIES\r\n")
	entities, _, _ = strings.Cut(entities, "  0\r\nENDSEC")
	for k := range 3 {
		f.Add([]byte(minimal(1+k, entities[:len(entities)*k/2])))
	}
	f.Add([]byte(minimalClockwise))
	f.Add([]byte(minimal(4, "0\nPOLYLINE\n70\n1\n0\nVERTEX\n10\n0\n20\n0\n42\n1\n0\nVERTEX\n10\n1\n20\n0\n42\n1\n0\nSEQEND\n")))
	f.Add([]byte(minimal(4, "0\nCIRCLE\n10\n0\n20\n0\n40\n1\n0\nSPLINE\n")))
	f.Add([]byte("0\nSECTION\n2\nENTITIES\n0\n"))
	f.Fuzz(func(t *testing.T, data []byte) {
		CheckDXF(data)
		o, err := readDXF(bytes.NewReader(data))
		if err == nil {
			soundOutline(t, o)
		}
	})
}

// soundOutline puts what was read on our own layers, and writes and reads it again.
func soundOutline(t *testing.T, o Outline) {
	t.Helper()
	for i := range o.Contours {
		o.Contours[i].Layer = LayerCut
	}
	for i := range o.Circles {
		o.Circles[i].Layer = LayerBore
	}
	if err := o.check(); err != nil {
		t.Fatal(err)
	}
	var b bytes.Buffer
	if writeDXF(&b, o, FormatDXF) != nil {
		t.Fatal("what was read can't be written")
	}
}
