package export

import (
	"bufio"
	"fmt"
	"io"
	"slices"
	"strings"

	"flankwright/involute"
)

// Lengths in an SVG outline, in mm: room round the drawing so that no line is
// cut off at the edge, the width of lines, and dash and gap of reference circles.
const (
	svgMargin   = 1.0
	svgCutLine  = 0.1
	svgThinLine = 0.05
	svgDash     = 2.0
	svgGap      = 1.0
)

// svgNamespace is the name of SVG among the XML languages.
const svgNamespace = "http://www.w3.org/2000/svg"

// writeSVG writes the outline as an SVG file at true scale.
//
// The page's width and height are in mm or inches, and the viewBox holds the
// same numbers, so that one user unit is one unit of the file. SVG's y axis
// points down; every y is written negated, without any transform, so that the
// outline stands upright and its origin stays at user (0, 0). Seen on the page a
// counter-clockwise arc stays counter-clockwise, which SVG calls sweep flag 0.
// Each contour is one path of M, L, A and Z with absolute, separated numbers of
// twelve decimals; each layer is a group with the layer's name as id.
func writeSVG(w io.Writer, o Outline) error {
	f, err := o.fileForm()
	if err != nil {
		return err
	}
	s := &svgWriter{w: bufio.NewWriter(w), mm: 1 / o.Unit.MM()}
	lo, hi := f.bounds()
	margin := involute.Vec{X: svgMargin * s.mm, Y: svgMargin * s.mm}
	lo, hi = lo.Sub(margin), hi.Add(margin)
	width, height := s.number(hi.X-lo.X), s.number(hi.Y-lo.Y)
	s.printf(`<?xml version="1.0" encoding="UTF-8"?>` + "\n")
	s.printf(`<svg xmlns="%s" version="1.1" width="%s%s" height="%s%s" viewBox="%s %s %s %s">`+"\n",
		svgNamespace, width, f.Unit, height, f.Unit, s.number(lo.X), s.number(-hi.Y), width, height)
	if title := xmlText(f.Title); title != "" {
		s.printf("<title>%s</title>\n", title)
	}
	for _, l := range slices.Backward(allLayers()) {
		s.group(f, l)
	}
	s.printf("</svg>\n")
	if s.err == nil {
		s.err = s.w.Flush()
	}
	return s.err
}

// An svgWriter writes text and remembers its first error.
type svgWriter struct {
	w   *bufio.Writer
	mm  float64 // one mm in the file's unit
	err error
}

func (s *svgWriter) printf(format string, args ...any) {
	if s.err == nil {
		_, s.err = fmt.Fprintf(s.w, format, args...)
	}
}

// number formats x as in a DXF.
func (s *svgWriter) number(x float64) string {
	text, err := plainNumber(x)
	if s.err == nil {
		s.err = err
	}
	return text
}

// point formats a point, y down.
func (s *svgWriter) point(p involute.Vec) string {
	return s.number(p.X) + " " + s.number(-p.Y)
}

// group writes one layer, if there is anything on it.
func (s *svgWriter) group(f Outline, l layerStyle) {
	var things []string
	for _, c := range f.Contours {
		if c.Layer == l.name {
			things = append(things, `<path d="`+s.pathData(c.Path)+`"/>`)
		}
	}
	for _, c := range f.Circles {
		if c.Layer == l.name {
			things = append(things, fmt.Sprintf(`<circle cx="%s" cy="%s" r="%s"/>`,
				s.number(c.Center.X), s.number(-c.Center.Y), s.number(c.Radius)))
		}
	}
	if len(things) == 0 {
		return
	}
	dashes := ""
	if l.dashed {
		dashes = fmt.Sprintf(` stroke-dasharray="%s %s"`, s.number(svgDash*s.mm), s.number(svgGap*s.mm))
	}
	s.printf(`<g id="%s" fill="none" stroke="%s" stroke-width="%s"%s>`+"\n%s\n</g>\n",
		l.name, l.stroke, s.number(l.width*s.mm), dashes, strings.Join(things, "\n"))
}

// pathData writes a path, one piece a line. A last arc ends on the first point
// and Z closes nothing; a last straight line is drawn by Z itself.
func (s *svgWriter) pathData(p Path) string {
	var b strings.Builder
	b.WriteString("M " + s.point(p.Vertices[0].P))
	for i := range p.Vertices {
		_, to, bulge := p.ends(i)
		arc, ok := p.Curve(i).(involute.Arc)
		switch {
		case ok:
			sweep := "0"
			if bulge < 0 {
				sweep = "1"
			}
			r := s.number(arc.Radius) // the large-arc flag is 0: arcs are up to 90°
			b.WriteString("\nA " + r + " " + r + " 0 0 " + sweep + " " + s.point(to))
		case i+1 < len(p.Vertices):
			b.WriteString("\nL " + s.point(to))
		}
	}
	b.WriteString("\nZ")
	return b.String()
}

// xmlText escapes a title, on one line.
func xmlText(s string) string {
	s = strings.Map(func(r rune) rune {
		if r < ' ' || r >= 0x7f && r < 0xa0 || r == 0xfffe || r == 0xffff {
			return ' '
		}
		return r
	}, strings.ToValidUTF8(s, "\ufffd"))
	return strings.NewReplacer("&", "&amp;", "<", "&lt;", ">", "&gt;").Replace(strings.TrimSpace(s))
}
