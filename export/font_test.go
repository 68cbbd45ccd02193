package export

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// The sheet's signs must be in both embedded fonts, or they print as nothing.
func TestFontsHoldTheSigns(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for _, r := range "−±×°ØαβΔ≤≥µ…–·″′√φ²≈" {
		if fonts.regular.GlyphIndex(r) == 0 {
			t.Errorf("regular font lacks %q", r)
		}
		if fonts.bold.GlyphIndex(r) == 0 {
			t.Errorf("bold font lacks %q", r)
		}
	}
}

// Figures of one width, without kerning, keep the columns of a table straight.
func TestFiguresAreTabular(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for _, bold := range []bool{false, true} {
		l := lettering{Size: 10, Bold: bold}
		want := fonts.width("000.0000", l)
		for _, s := range []string{"111.1111", "174.7411", "999.0099"} {
			if got := fonts.width(s, l); got != want {
				t.Errorf("bold %v: %s is %g mm wide, 000.0000 is %g", bold, s, got, want)
			}
		}
	}
}

// The sum of advances is what the text shaper, which also sets the words in the PDF, comes to.
func TestWidthAgreesWithTheShaper(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for _, s := range []string{"AV To 11.1 fi ffl", "Ø 2.743 mm ± 0.5° ≤ ≥ − × µ αβΔ", "Räder, naïve"} {
		for _, bold := range []bool{false, true} {
			l := lettering{Size: 7, Bold: bold}
			got, want := fonts.width(s, l), fonts.face(l.Size, bold, black).TextWidth(s)
			if math.Abs(got-want) > 1e-12*want {
				t.Errorf("%q, bold %v: %g mm, shaped %g", s, bold, got, want)
			}
		}
	}
}

func TestPrintable(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ in, want string }{
		{"Ø 12 ± 0.5°", "Ø 12 ± 0.5°"},
		{"one\ntwo\tthree", "one two three"},
		{"bell\a", "bell"},
		{"歯車 gear", "?? gear"},
	} {
		if got := fonts.printable(c.in); got != c.want {
			t.Errorf("printable(%q) = %q, want %q", c.in, got, c.want)
		}
	}
}

func TestWrappingKeepsSignsWithNumbers(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	l := lettering{Size: 3}
	for width := 25.0; width < 60; width++ {
		for _, line := range fonts.wrapped("two pins Ø 2.743 mm (0.1080 in) at 20 °C", l, width) {
			if strings.HasSuffix(line, "Ø") || strings.HasPrefix(line, "mm") || strings.HasPrefix(line, "in)") || strings.HasPrefix(line, "°C") {
				t.Errorf("width %g mm: line %q starts or ends between a number and its sign", width, line)
			}
		}
	}
}

// Wrapped words keep to the width and lose nothing but blanks; cut and fitted words keep to it too.
func TestWordsKeepToTheirWidth(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(t *rapid.T) {
		s := rapid.StringOf(rapid.RuneFrom([]rune("abWi ØĂ0123456789.,-±° "))).Draw(t, "words")
		l := lettering{Size: rapid.Float64Range(1.5, 8).Draw(t, "size"), Bold: rapid.Bool().Draw(t, "bold")}
		width := rapid.Float64Range(10, 120).Draw(t, "width")
		lines := fonts.wrapped(s, l, width)
		for _, line := range lines {
			if w := fonts.width(line, l); w > width {
				t.Fatalf("line %q is %g mm wide, wider than %g", line, w, width)
			}
		}
		squeeze := strings.NewReplacer(" ", "").Replace
		if got, want := squeeze(strings.Join(lines, "")), squeeze(fonts.printable(s)); got != want {
			t.Fatalf("wrapped into %q, want %q", got, want)
		}
		short, small := fonts.fitted(s, l, width)
		if w := fonts.width(short, small); w > width {
			t.Fatalf("fitted %q is %g mm wide, wider than %g", short, w, width)
		}
		if small.Size < smallest*l.Size*(1-1e-12) { // rounding of one product
			t.Fatalf("fitted to %g mm from %g: smaller than allowed", small.Size, l.Size)
		}
	})
}
