package export

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"flankwright/involute"
)

// WriteSVG writes the page as an SVG file that measures true in mm: width and
// height are in mm and one user unit is one mm. Words are drawn by outlines of
// their letters, each letter once under <defs> and used where it stands, so the file
// needs no font and looks the same everywhere; what a line says stands beside it as its aria-label.
// Arcs are exact. A drawing with a number that is none is refused.
func (d Drawing) WriteSVG(w io.Writer) error {
	if err := d.check(); err != nil {
		return fmt.Errorf("svg: %w", err)
	}
	fonts, err := loadTypeface()
	if err != nil {
		return fmt.Errorf("svg: %w", err)
	}
	page := &svgPage{fonts: fonts, height: d.Height, known: map[svgGlyph]string{}}
	for _, e := range d.elements {
		switch e := e.(type) {
		case shape:
			page.shape(e)
		case textLine:
			if err := page.text(e); err != nil {
				return fmt.Errorf("svg: %w", err)
			}
		}
	}
	width, height := svgNumber(d.Width), svgNumber(d.Height)
	var file bytes.Buffer
	fmt.Fprintf(&file, "<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n")
	fmt.Fprintf(&file, "<svg xmlns=\"%s\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" version=\"1.1\" width=\"%smm\" height=\"%smm\" viewBox=\"0 0 %s %s\">\n",
		svgNamespace, width, height, width, height)
	if d.Title != "" {
		fmt.Fprintf(&file, "<title>%s</title>\n", xmlText(d.Title))
	}
	if page.glyphs.Len() > 0 {
		fmt.Fprintf(&file, "<defs>\n%s</defs>\n", page.glyphs.String())
	}
	fmt.Fprintf(&file, "<rect width=\"%s\" height=\"%s\" fill=\"#ffffff\"/>\n", width, height)
	file.Write(page.body.Bytes())
	file.WriteString("</svg>\n")
	_, err = w.Write(file.Bytes())
	return err
}

// An svgPage gathers a page's elements and the letters they use.
type svgPage struct {
	fonts        typeface
	height       float64 // mm; SVG's y points down from there
	body, glyphs bytes.Buffer
	known        map[svgGlyph]string // letter to id
}

// An svgGlyph is a letter of one of the two fonts.
type svgGlyph struct {
	letter rune
	bold   bool
}

// svgNumber writes a length to the grid of six decimals, without needless zeros.
func svgNumber(x float64) string { return svgDecimals(onGrid(x), 6) }

// svgDecimals writes a number with at most n decimals.
func svgDecimals(x float64, n int) string {
	return strings.TrimRight(strings.TrimRight(strconv.FormatFloat(x, 'f', n, 64), "0"), ".")
}

func (p *svgPage) point(v involute.Vec) string {
	return svgNumber(v.X) + " " + svgNumber(p.height-v.Y)
}

// svgTone writes a tone as a color.
func svgTone(t tone) string {
	if t == noInk {
		return "none"
	}
	c := ink(t)
	return fmt.Sprintf("#%02x%02x%02x", c.R, c.G, c.B)
}

func (p *svgPage) shape(s shape) {
	fmt.Fprintf(&p.body, `<path d="%s" fill="%s"`, p.path(s.Outline), svgTone(s.Style.Fill))
	if s.Style.Line != noInk && s.Style.Width > 0 {
		fmt.Fprintf(&p.body, ` stroke="%s" stroke-width="%s" stroke-linejoin="round"`, svgTone(s.Style.Line), svgNumber(s.Style.Width))
		if mm := dashPattern(s.Style.Dash); mm != nil {
			words := make([]string, len(mm))
			for i, x := range mm {
				words[i] = svgNumber(x)
			}
			fmt.Fprintf(&p.body, ` stroke-dasharray="%s"`, strings.Join(words, " "))
		}
	}
	p.body.WriteString("/>\n")
}

// path writes a polyline as SVG path data. A counter-clockwise arc still turns
// counter-clockwise to the eye, which SVG calls sweep flag 0.
func (p *svgPage) path(line polyline) string {
	n := len(line.Vertices)
	var b strings.Builder
	b.WriteString("M" + p.point(line.Vertices[0].P))
	for i, v := range line.Vertices {
		if i == n-1 && !line.Closed {
			break
		}
		to := line.Vertices[(i+1)%n].P
		arc, bent := Path{Vertices: []Vertex{v, {P: to}}}.Curve(0).(involute.Arc)
		switch {
		case !bent || math.Abs(v.Bulge) < flatBulge:
			if i < n-1 { // Z draws the last one
				b.WriteString(" L" + p.point(to))
			}
		default:
			large, sweep := 0, 0
			if math.Abs(arc.Sweep) > math.Pi {
				large = 1
			}
			if arc.Sweep < 0 {
				sweep = 1
			}
			r := svgNumber(arc.Radius)
			fmt.Fprintf(&b, " A%s %s 0 %d %d %s", r, r, large, sweep, p.point(to))
		}
	}
	if line.Closed {
		b.WriteString(" Z")
	}
	return b.String()
}

// svgEm is the size letters are defined at, in user units; they are scaled where they are used.
const svgEm = 1000.0

// text writes a line of words as a group of letters.
func (p *svgPage) text(t textLine) error {
	words := p.fonts.printable(t.Words)
	if t.Tone == noInk || strings.TrimSpace(words) == "" {
		return nil
	}
	unit := lettering{Size: svgEm, Bold: t.Bold}
	x := 0.0
	switch t.Align {
	case alignCenter:
		x = -p.fonts.width(words, unit) / 2
	case alignRight:
		x = -p.fonts.width(words, unit)
	}
	fmt.Fprintf(&p.body, `<g aria-label="%s" fill="%s" transform="translate(%s)`, svgLabel(words), svgTone(t.Tone), p.point(t.At))
	if t.Turn != 0 {
		fmt.Fprintf(&p.body, " rotate(%s)", svgNumber(-t.Turn*180/math.Pi))
	}
	fmt.Fprintf(&p.body, " scale(%s)\">", svgDecimals(t.Size/svgEm, 9))
	for _, letter := range words {
		if letter != ' ' {
			id, err := p.glyph(svgGlyph{letter, t.Bold})
			if err != nil {
				return err
			}
			fmt.Fprintf(&p.body, `<use xlink:href="#%s" x="%.0f"/>`, id, x)
		}
		x += p.fonts.width(string(letter), unit)
	}
	p.body.WriteString("</g>\n")
	return nil
}

// glyph returns the id of a letter, and defines it at its first use.
func (p *svgPage) glyph(g svgGlyph) (string, error) {
	if id, ok := p.known[g]; ok {
		return id, nil
	}
	outline, _, err := p.fonts.face(svgEm, g.bold, black).ToPath(string(g.letter))
	if err != nil {
		return "", fmt.Errorf("letter %q: %w", g.letter, err)
	}
	id := fmt.Sprintf("r%x", g.letter)
	if g.bold {
		id = fmt.Sprintf("b%x", g.letter)
	}
	p.known[g] = id
	fmt.Fprintf(&p.glyphs, "<path id=\"%s\" d=\"%s\"/>\n", id, svgOutline(outline))
	return id, nil
}

// svgLabel escapes words for an attribute.
func svgLabel(s string) string { return strings.ReplaceAll(xmlText(s), `"`, "&quot;") }
