package export

import (
	"fmt"
	"image/color"
	"math"
	"strings"

	"flankwright/involute"

	"github.com/tdewolff/canvas"
)

// arcStep is the longest arc handed to the drawing library in one piece, 15°:
// its Bézier curve then strays by 5·10⁻⁸ of the radius, 0.01 µm on a 200 mm
// circle, while a 90° one strays by 3·10⁻⁴. Short pieces also stay clear of
// arcs whose horizontal chord equals their radius, which the library bends wrong.
const arcStep = math.Pi / 12

// gridStep is the grid all coordinates are put on, mm. It is far below what paper
// shows, and keeps the last bits of a sine out of the files.
const gridStep = 1e-6

// flatBulge is the bulge below which an arc is drawn as its chord: on a chord
// as long as a page (400 mm) the arc rises by chord·bulge/2 = 2·10⁻⁷ mm, less than the grid.
const flatBulge = 1e-9

// render draws the elements of a page. Where the format should not carry fonts,
// words become outlines.
func render(d Drawing, to canvas.Renderer, fonts typeface, words wordsAs) error {
	for _, e := range d.elements {
		switch e := e.(type) {
		case shape:
			to.RenderPath(canvasPath(e.Outline), canvasStyle(e.Style), canvas.Identity)
		case textLine:
			if err := renderText(e, to, fonts, words); err != nil {
				return err
			}
		}
	}
	return nil
}

// wordsAs says how words are written: as text that can be searched, or as outlines.
type wordsAs int

const (
	wordsAsText wordsAs = iota
	wordsAsOutlines
)

func renderText(t textLine, to canvas.Renderer, fonts typeface, words wordsAs) error {
	if t.Tone == noInk || t.Words == "" {
		return nil
	}
	face := fonts.face(t.Size, t.Bold, t.Tone)
	s := fonts.printable(t.Words)
	shift := 0.0
	switch t.Align {
	case alignCenter:
		shift = -fonts.width(s, lettering{Size: t.Size, Bold: t.Bold}) / 2
	case alignRight:
		shift = -fonts.width(s, lettering{Size: t.Size, Bold: t.Bold})
	}
	place := canvas.Identity.Translate(onGrid(t.At.X), onGrid(t.At.Y)).
		Rotate(t.Turn*180/math.Pi).Translate(onGrid(shift), 0)
	if words == wordsAsText {
		to.RenderText(canvas.NewTextLine(face, s, canvas.Left), place)
		return nil
	}
	outline, _, err := face.ToPath(s)
	if err != nil {
		return fmt.Errorf("text %q: %w", t.Words, err)
	}
	style := canvas.DefaultStyle
	style.Fill = canvas.Paint{Color: ink(t.Tone)}
	to.RenderPath(outline, style, place)
	return nil
}

// ink returns the color of a tone.
func ink(t tone) color.RGBA {
	shade := func(y uint8) color.RGBA { return color.RGBA{R: y, G: y, B: y, A: 255} }
	switch t {
	case black:
		return shade(0)
	case gray:
		return shade(88)
	case tint:
		return shade(236)
	case paper:
		return shade(255)
	}
	return color.RGBA{}
}

func canvasStyle(s shapeStyle) canvas.Style {
	style := canvas.DefaultStyle // fills by the non-zero rule: the other one makes invalid PDF strokes
	style.Fill = canvas.Paint{Color: ink(s.Fill)}
	style.Stroke = canvas.Paint{Color: ink(s.Line)}
	style.StrokeWidth = s.Width
	style.StrokeJoiner = canvas.RoundJoin
	if s.Width > 0 {
		for _, mm := range dashPattern(s.Dash) {
			style.Dashes = append(style.Dashes, mm/s.Width) // the library wants line widths
		}
	}
	return style
}

// dashPattern returns the lengths of a pattern, line and gap in turn, mm; nil for a solid line.
func dashPattern(d linePattern) []float64 {
	switch d {
	case dashed:
		return []float64{2, 1}
	case dashDot:
		return []float64{6, 1, 0.6, 1}
	}
	return nil
}

func canvasPath(line polyline) *canvas.Path {
	p := &canvas.Path{}
	n := len(line.Vertices)
	first := snapped(line.Vertices[0].P)
	p.MoveTo(first.X, first.Y)
	for i, v := range line.Vertices {
		if i == n-1 && !line.Closed {
			break
		}
		addPiece(p, v, line.Vertices[(i+1)%n].P)
	}
	if line.Closed {
		p.Close()
	}
	return p
}

// addPiece appends the line or arc from a vertex to the point to.
func addPiece(p *canvas.Path, v Vertex, to involute.Vec) {
	end := snapped(to)
	arc, bent := Path{Vertices: []Vertex{v, {P: to}}}.Curve(0).(involute.Arc)
	if !bent || math.Abs(v.Bulge) < flatBulge {
		p.LineTo(end.X, end.Y)
		return
	}
	n := int(math.Ceil(math.Abs(arc.Sweep) / arcStep))
	for i := 1; i <= n; i++ {
		q := end
		if i < n {
			on, _ := arc.At(float64(i) / float64(n))
			q = snapped(on)
		}
		p.ArcTo(arc.Radius, arc.Radius, 0, false, arc.Sweep > 0, q.X, q.Y)
	}
}

// onGrid rounds a length to the grid, without a negative zero.
func onGrid(x float64) float64 { return math.Round(x/gridStep)*gridStep + 0 }

func snapped(p involute.Vec) involute.Vec {
	return involute.Vec{X: onGrid(p.X), Y: onGrid(p.Y)}
}

// svgOutline writes a letter's outline as SVG path data, in whole units, y down.
func svgOutline(p *canvas.Path) string {
	var b strings.Builder
	for s := p.Scanner(); s.Scan(); {
		points := []canvas.Point{s.End()}
		switch s.Cmd() {
		case canvas.MoveToCmd:
			b.WriteByte('M')
		case canvas.LineToCmd:
			b.WriteByte('L')
		case canvas.QuadToCmd:
			b.WriteByte('Q')
			points = []canvas.Point{s.CP1(), s.End()}
		case canvas.CubeToCmd:
			b.WriteByte('C')
			points = []canvas.Point{s.CP1(), s.CP2(), s.End()}
		case canvas.CloseCmd:
			b.WriteByte('Z')
			continue
		}
		for i, q := range points {
			if i > 0 {
				b.WriteByte(' ')
			}
			fmt.Fprintf(&b, "%.0f %.0f", math.Round(q.X)+0, math.Round(-q.Y)+0)
		}
	}
	return b.String()
}
