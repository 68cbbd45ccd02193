package export

import (
	"fmt"
	"sort"
	"strings"
	"unicode"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"github.com/tdewolff/canvas"
)

// pt is the printer's point, 1/72 in, in mm.
const pt = 25.4 / 72

// A typeface is the program's own lettering, carried inside it: Liberation Sans
// (SIL Open Font License 1.1), regular and bold. It is loaded anew for every
// document, since cutting a font down for a PDF alters the one it is cut from.
type typeface struct{ regular, bold *canvas.Font }

func loadTypeface() (typeface, error) {
	regular, err := canvas.LoadFont(liberationsansregular.TTF, 0, canvas.FontRegular)
	if err != nil {
		return typeface{}, fmt.Errorf("embedded regular font: %w", err)
	}
	bold, err := canvas.LoadFont(liberationsansbold.TTF, 0, canvas.FontBold)
	if err != nil {
		return typeface{}, fmt.Errorf("embedded bold font: %w", err)
	}
	for _, f := range []*canvas.Font{regular, bold} {
		// Kerning would push figures out of their columns; ligatures hide words from a search.
		f.SetFeatures("-kern,-liga")
	}
	return typeface{regular, bold}, nil
}

func (t typeface) font(bold bool) *canvas.Font {
	if bold {
		return t.bold
	}
	return t.regular
}

// face returns the lettering of a size in mm.
func (t typeface) face(size float64, bold bool, in tone) *canvas.FontFace {
	return t.font(bold).Face(size/pt, ink(in))
}

// width returns how long a line of words is, mm: the sum of its letters' advances, as nothing is kerned.
func (t typeface) width(s string, l lettering) float64 {
	font := t.font(l.Bold)
	sum := 0
	for _, r := range t.printable(s) {
		sum += int(font.GlyphAdvance(font.GlyphIndex(r)))
	}
	return l.Size * float64(sum) / float64(font.Head.UnitsPerEm)
}

// printable returns the words as they can be set: white space of any kind becomes a
// blank, control characters go, and what the font does not hold shows as "?".
func (t typeface) printable(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case unicode.IsSpace(r):
			return ' '
		case unicode.IsControl(r), unicode.Is(unicode.Cf, r):
			return -1
		case t.regular.GlyphIndex(r) == 0 || t.bold.GlyphIndex(r) == 0:
			return '?'
		}
		return r
	}, s)
}

// A lettering is the look of a line of words.
type lettering struct {
	Size float64 // mm
	Bold bool
	Tone tone
}

// smallest is how far words may shrink before they are cut: to 70 % of their size.
const smallest = 0.7

// fitted returns words and lettering that are no wider than width: smaller letters
// first, then fewer words with an ellipsis.
func (t typeface) fitted(s string, l lettering, width float64) (string, lettering) {
	s = strings.TrimSpace(t.printable(s))
	w := t.width(s, l)
	if w <= width {
		return s, l
	}
	l.Size *= max(smallest, 0.999*width/w)
	return t.cut(s, l, width), l
}

// cut shortens words to a width, with an ellipsis in place of what is lost.
func (t typeface) cut(s string, l lettering, width float64) string {
	if t.width(s, l) <= width {
		return s
	}
	runes := []rune(s)
	short := func(n int) string { return strings.TrimRight(string(runes[:n]), " ") + "…" }
	n := sort.Search(len(runes), func(n int) bool { return t.width(short(n), l) > width })
	if n <= 1 {
		return ""
	}
	return short(n - 1)
}

// wrapped breaks words into lines no wider than width, at blanks where there are any.
func (t typeface) wrapped(s string, l lettering, width float64) []string {
	var lines []string
	line := ""
	for _, word := range unbroken(strings.Fields(t.printable(s))) {
		if line != "" && t.width(line+" "+word, l) <= width {
			line += " " + word
			continue
		}
		if line != "" {
			lines = append(lines, line)
		}
		for t.width(word, l) > width {
			head := t.head(word, l, width)
			lines = append(lines, head)
			word = word[len(head):]
		}
		line = word
	}
	if line != "" {
		lines = append(lines, line)
	}
	return lines
}

// unbroken joins words that belong on one line: a diameter sign and a number with what follows and precedes.
func unbroken(words []string) []string {
	var joined []string
	for _, word := range words {
		if n := len(joined); n > 0 && clings(joined[n-1], word) {
			joined[n-1] += " " + word
			continue
		}
		joined = append(joined, word)
	}
	return joined
}

// clings tells whether a line must not end between two words.
func clings(before, word string) bool {
	switch strings.TrimRight(word, ".,;:)") {
	case "mm", "in", "°C", "°F":
		return strings.ContainsAny(before, "0123456789")
	}
	return strings.HasSuffix(before, "Ø")
}

// head returns the longest start of a word, at least one letter, that fits a width.
func (t typeface) head(word string, l lettering, width float64) string {
	end := 0
	for i, r := range word {
		next := i + len(string(r))
		if end > 0 && t.width(word[:next], l) > width {
			break
		}
		end = next
	}
	return word[:end]
}

// settled wraps words into at most n lines of a width, smaller the more lines it takes,
// and cut at last: one line of full size, else two of 72 %, three of 60 %.
func (t typeface) settled(s string, l lettering, width float64, n int) ([]string, lettering) {
	full := l.Size
	for lines, share := range []float64{1, 0.72, 0.6}[:n] {
		l.Size = full * share
		if words := t.wrapped(s, l, width); len(words) <= lines+1 {
			return words, l
		}
	}
	return t.paragraph(s, l, width, n), l
}

// paragraph wraps words into at most n lines; the last one is cut with an ellipsis where that is not enough.
func (t typeface) paragraph(s string, l lettering, width float64, n int) []string {
	lines := t.wrapped(s, l, width)
	if len(lines) <= n {
		return lines
	}
	rest := strings.Join(lines[n-1:], " ")
	return append(lines[:n-1:n-1], t.cut(rest, l, width))
}
