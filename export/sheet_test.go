package export

import (
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func sampleSheets() map[string]Sheet {
	return map[string]Sheet{"inch": inchSheet(), "helical": helicalSheet(), "tiny": tinySheet(), "crowded": crowdedSheet(), "empty": {}}
}

// textBox returns the box a line of words covers, from its descenders to its capitals.
func textBox(fonts typeface, t textLine) box {
	w := fonts.width(t.Words, lettering{Size: t.Size, Bold: t.Bold})
	x := t.At.X
	switch t.Align {
	case alignCenter:
		x -= w / 2
	case alignRight:
		x -= w
	}
	return box{x, t.At.Y - 0.2*t.Size, x + w, t.At.Y + 0.72*t.Size}
}

// checkWords fails where words leave the margins or run into other words.
func checkWords(t rapid.TB, fonts typeface, d Drawing) {
	t.Helper()
	const slack = 1e-6 // mm, rounding
	var boxes []box
	var words []string
	for _, e := range d.elements {
		text, ok := e.(textLine)
		if !ok {
			continue
		}
		b := textBox(fonts, text)
		if b.X0 < sheetMargin-slack || b.X1 > d.Width-sheetMargin+slack || b.Y0 < sheetMargin-slack || b.Y1 > d.Height-sheetMargin+slack {
			t.Fatalf("%q covers %v, beyond the margins of %g × %g", text.Words, b, d.Width, d.Height)
		}
		for i, other := range boxes {
			if b.X0 < other.X1-slack && other.X0 < b.X1-slack && b.Y0 < other.Y1-slack && other.Y0 < b.Y1-slack {
				t.Fatalf("%q at %v runs into %q at %v", text.Words, b, words[i], other)
			}
		}
		boxes, words = append(boxes, b), append(words, text.Words)
	}
}

func TestSheetWordsStayInTheirPlace(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for name, s := range sampleSheets() {
		for _, size := range []PageSize{A4, Letter} {
			t.Run(fmt.Sprint(name, " ", size), func(t *testing.T) { checkWords(t, fonts, mustLayout(t, s, size)) })
		}
	}
}

// Whatever the words, however many: nothing leaves the page or covers other words.
func TestSheetOfAnyWords(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(t *rapid.T) {
		word := rapid.StringOfN(rapid.RuneFrom([]rune("abcmWØ123.,-")), 1, 60, -1)
		words := rapid.Custom(func(t *rapid.T) string {
			return strings.Join(rapid.SliceOfN(word, 0, 24).Draw(t, "words"), " ")
		})
		many := func(most int, name string) []string { return rapid.SliceOfN(words, 0, most).Draw(t, name) }
		fields := func(most int, name string) []Field {
			var f []Field
			for _, s := range many(most, name) {
				f = append(f, Field{Label: s, Value: words.Draw(t, "value"), Other: words.Draw(t, "other")})
			}
			return f
		}
		s := rapid.SampledFrom([]Sheet{inchSheet(), helicalSheet(), tinySheet()}).Draw(t, "sheet")
		s.Title, s.Gear, s.Part, s.DrawingNumber = words.Draw(t, "title"), words.Draw(t, "gear"), words.Draw(t, "part"), words.Draw(t, "number")
		s.Material, s.Author, s.Date, s.Foot = words.Draw(t, "material"), words.Draw(t, "author"), words.Draw(t, "date"), words.Draw(t, "foot")
		s.Data, s.Limits = fields(15, "data"), fields(5, "limits")
		s.Method, s.Warnings, s.Cautions = many(5, "method"), many(20, "warnings"), many(4, "cautions")
		pins, span := *s.Pins, *s.Span
		pins.Title, pins.Label, pins.Dimension, pins.Note = words.Draw(t, "pins"), words.Draw(t, "pin"), words.Draw(t, "M"), words.Draw(t, "note")
		span.Title, span.Dimension, span.Note = words.Draw(t, "span"), words.Draw(t, "W"), words.Draw(t, "note")
		s.Pins, s.Span = &pins, &span
		for _, name := range many(9, "targets") {
			target := Target{Measure: name, With: words.Draw(t, "with"), Unusable: words.Draw(t, "unusable")}
			target.Aim = Figure{words.Draw(t, "mm"), words.Draw(t, "inch")}
			s.Targets = append(s.Targets, target)
		}
		for i := range s.Readings {
			s.Readings[i] = Reading{words.Draw(t, "measure"), words.Draw(t, "limits")}
		}
		d, err := LayoutSheet(s, rapid.SampledFrom([]PageSize{A4, Letter}).Draw(t, "page"))
		if err != nil {
			t.Fatal(err)
		}
		checkWords(t, fonts, d)
	})
}

// said returns all words of a page.
func said(d Drawing) []string {
	var words []string
	for _, e := range d.elements {
		if t, ok := e.(textLine); ok {
			words = append(words, t.Words)
		}
	}
	return words
}

func TestSheetSaysWhatItIsGiven(t *testing.T) {
	for name, s := range map[string]Sheet{"inch": inchSheet(), "helical": helicalSheet()} {
		for _, size := range []PageSize{A4, Letter} {
			all := strings.Join(said(mustLayout(t, s, size)), " ")
			want := []string{s.Title, s.Gear, s.Material, s.Foot, s.Pins.Dimension, s.Span.Dimension, s.Pins.Title, s.Span.Title,
				"0°", "90°", "180°", "270°", "Instrument no.", "Temperature", "Initials", "50 mm", "2 in"}
			for _, f := range append(s.Data, s.Limits...) {
				want = append(want, f.Label, f.Value, f.Other)
			}
			for _, target := range s.Targets {
				want = append(want, target.Measure, target.With, target.Unusable)
				for _, f := range []Figure{target.Low, target.Aim, target.High} {
					want = append(want, f.MM, f.Inch)
				}
			}
			want = append(want, append(append(s.Method, s.Warnings...), s.Cautions...)...)
			for _, w := range want {
				if !strings.Contains(all, w) {
					t.Errorf("%s on %v: %q is not on the sheet", name, size, w)
				}
			}
		}
	}
}

// The figures to aim at are the largest words below the title, the reader's unit first.
func TestSheetTargetFiguresAreLargest(t *testing.T) {
	for _, s := range []Sheet{inchSheet(), helicalSheet()} {
		want := s.Targets[0].Aim.MM
		if s.InchFirst {
			want = s.Targets[0].Aim.Inch
		}
		largest := textLine{}
		for _, e := range mustLayout(t, s, A4).elements {
			if text, ok := e.(textLine); ok && text.Words != s.Title && text.Words != s.Gear && text.Size > largest.Size {
				largest = text
			}
		}
		if largest.Words != want || largest.Size < 13*pt {
			t.Errorf("largest words %q of %g mm, want %q", largest.Words, largest.Size, want)
		}
	}
}

func TestLayoutLeavesTheSheetAlone(t *testing.T) {
	s := crowdedSheet()
	first := mustLayout(t, s, A4)
	if !reflect.DeepEqual(s, crowdedSheet()) {
		t.Error("laying out changed the sheet")
	}
	if !reflect.DeepEqual(first, mustLayout(t, s, A4)) {
		t.Error("the second layout differs from the first")
	}
}

func TestCrowdedSheetKeepsUsableTargets(t *testing.T) {
	s := crowdedSheet()
	last := Target{Measure: "Constant chord", Aim: Figure{"1.000", "0.0394"}}
	s.Targets = append(s.Targets, last)
	all := strings.Join(said(mustLayout(t, s, Letter)), "\n")
	for _, want := range []string{last.Measure, "more measures are not shown", "more warnings", "Over two balls"} {
		if !strings.Contains(all, want) {
			t.Errorf("%q is not on the sheet", want)
		}
	}
}

func TestLayoutRefuses(t *testing.T) {
	for _, c := range []struct {
		name  string
		spoil func(*Sheet)
		want  string
	}{
		{"no teeth", func(s *Sheet) { s.Shape.Teeth = 0 }, "0 teeth"},
		{"tip below root", func(s *Sheet) { s.Shape.Tip = 1 }, "tip 1 mm"},
		{"no contour", func(s *Sheet) { s.Shape.Outline = Path{} }, "0 points"},
		{"NaN in the bore", func(s *Sheet) { s.Shape.Bore[0].Vertices[0].P.X = math.NaN() }, "NaN"},
		{"one pin", func(s *Sheet) { s.Pins.Centers = s.Pins.Centers[:1] }, "1 pins"},
		{"pin at infinity", func(s *Sheet) { s.Pins.Centers[1].Y = math.Inf(1) }, "Inf"},
		{"pins at one place", func(s *Sheet) { s.Pins.Centers[1] = s.Pins.Centers[0] }, "one place"},
		{"pin of no size", func(s *Sheet) { s.Pins.Diameter = 0 }, "diameter 0"},
		{"no span", func(s *Sheet) { s.Span.To = s.Span.From }, "two finite points"},
		{"no face", func(s *Sheet) { s.Span.Reach = math.NaN() }, "NaN"},
	} {
		s := inchSheet()
		c.spoil(&s)
		if _, err := LayoutSheet(s, A4); err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), "driver") {
			t.Errorf("%s: error %v, want %q and the gear's name", c.name, err, c.want)
		}
	}
}

func TestPageSizes(t *testing.T) {
	for _, c := range []struct {
		word          string
		size          PageSize
		width, height float64
	}{{"a4", A4, 210, 297}, {"A4", A4, 210, 297}, {"Letter", Letter, 215.9, 279.4}} {
		size, err := ParsePageSize(c.word)
		if w, h := size.Size(); err != nil || size != c.size || math.Abs(w-c.width) > 1e-9 || math.Abs(h-c.height) > 1e-9 {
			t.Errorf("%s: %v of %g × %g, %v", c.word, size, w, h, err)
		}
	}
	if _, err := ParsePageSize("a5"); err == nil || !strings.Contains(err.Error(), "a4 or letter") {
		t.Errorf("a5: %v", err)
	}
}
