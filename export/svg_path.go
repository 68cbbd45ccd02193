package export

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"flankwright/involute"
)

// path takes the data of one path element: contours from M to Z.
func (s *svgReader) path(data string) error {
	scan := numberScanner{text: data}
	p := svgPath{scan: &scan, scale: s.scale, room: maxOutlineVertices - s.vertices}
	for !scan.done() {
		path, err := p.contour()
		if err != nil {
			return fmt.Errorf("path, character %d: %w", scan.at+1, err)
		}
		if err := path.check(); err != nil {
			return fmt.Errorf("path ending at character %d: %w", scan.at, err)
		}
		s.vertices += len(path.Vertices)
		s.out.Contours = append(s.out.Contours, Contour{s.layers[len(s.layers)-1], path})
	}
	return nil
}

// An svgPath reads contours from path data (SVG 1.1, 8.3).
type svgPath struct {
	scan     *numberScanner
	scale    float64
	room     int // vertices still allowed
	vertices []Vertex
	now      involute.Vec // the current point, mm, y up
}

// contour reads M, lines and arcs, Z.
func (p *svgPath) contour() (Path, error) {
	if c := p.scan.command(); c != 'M' {
		return Path{}, errors.New("a path must start with M")
	}
	start, err := p.point()
	p.vertices, p.now = nil, start
	for command := byte('L'); err == nil; {
		switch c := p.scan.command(); c {
		case 'Z', 'z':
			if p.now.Sub(start).Norm() >= minPiece {
				err = p.add(start, 0) // Z draws the last line
			}
			return Path{Vertices: p.vertices}, err
		case 'L', 'A', 'H', 'V':
			command = c
		case 0:
			if !p.scan.atNumber() {
				return Path{}, errors.New("the path is not closed by Z")
			}
		default:
			return Path{}, fmt.Errorf("command %q is not read; M, L, H, V, A and Z would be right", c)
		}
		err = p.piece(command)
	}
	return Path{}, err
}

// piece reads the numbers of one line or arc.
func (p *svgPath) piece(command byte) error {
	var x float64
	var err error
	to := p.now
	switch command {
	case 'A':
		return p.arc()
	case 'H':
		x, err = p.scan.number()
		to.X = x * p.scale
	case 'V':
		x, err = p.scan.number()
		to.Y = 0 - x*p.scale
	default:
		to, err = p.point()
	}
	if err != nil {
		return err
	}
	return p.add(to, 0)
}

// arc reads rx, ry, rotation, two flags and the end point.
func (p *svgPath) arc() error {
	var v [3]float64
	var flags [2]bool
	var err error
	for i := range v {
		if v[i], err = p.scan.number(); err != nil {
			return err
		}
	}
	for i := range flags {
		if flags[i], err = p.scan.flag(); err != nil {
			return err
		}
	}
	to, err := p.point()
	if err != nil {
		return err
	}
	if v[0] != v[1] || !(v[0] > 0) {
		return fmt.Errorf("an arc with radii %g and %g is not circular", v[0], v[1])
	}
	b, err := arcBulge(to.Sub(p.now).Norm(), v[0]*p.scale, flags[0])
	if err != nil {
		return err
	}
	if flags[1] {
		b = -b // sweep flag 1 turns with y down: clockwise on the page
	}
	return p.add(to, b)
}

// point reads a point and turns it to mm, y up.
func (p *svgPath) point() (involute.Vec, error) {
	x, err := p.scan.number()
	if err != nil {
		return involute.Vec{}, err
	}
	y, err := p.scan.number()
	return involute.Vec{X: x * p.scale, Y: 0 - y*p.scale}, err
}

// add adds the piece from the current point to another, which is the current one then.
func (p *svgPath) add(to involute.Vec, bulge float64) error {
	if len(p.vertices) == p.room {
		return fmt.Errorf("more than %d vertices", maxOutlineVertices)
	}
	p.vertices = append(p.vertices, Vertex{P: p.now, Bulge: bulge})
	p.now = to
	return nil
}

// arcBulge returns the bulge of an arc of radius r over a chord c: tan(θ/4) with
// sin(θ/2) = c/(2r), written as s/(1 + √(1 − s²)), and its inverse for the large arc.
func arcBulge(c, r float64, large bool) (float64, error) {
	s := c / (2 * r)
	// SVG stretches a radius that is too small; beyond rounding that is a mistake.
	if !(s <= 1+1e-9) || c == 0 {
		return 0, fmt.Errorf("no arc of radius %g mm spans a chord of %g mm", r, c)
	}
	b := s / (1 + math.Sqrt(math.Max(0, 1-s*s)))
	if large {
		b = 1 / b
	}
	return b, nil
}

// A numberScanner walks over commands and numbers of SVG attributes.
type numberScanner struct {
	text string
	at   int
}

// space moves over white space and commas.
func (n *numberScanner) space() {
	for n.at < len(n.text) && strings.IndexByte(" \t\r\n\f,", n.text[n.at]) >= 0 {
		n.at++
	}
}

// done reports whether nothing but space is left.
func (n *numberScanner) done() bool {
	n.space()
	return n.at == len(n.text)
}

// command takes a letter, or returns 0 where none stands.
func (n *numberScanner) command() byte {
	n.space()
	if n.at < len(n.text) && (n.text[n.at]|0x20 >= 'a' && n.text[n.at]|0x20 <= 'z') {
		n.at++
		return n.text[n.at-1]
	}
	return 0
}

// atNumber reports whether a number may start here.
func (n *numberScanner) atNumber() bool {
	return !n.done() && strings.IndexByte("+-.0123456789", n.text[n.at]) >= 0
}

// number takes a number; one ends where the next can only start.
func (n *numberScanner) number() (float64, error) {
	n.space()
	start, dot, exponent := n.at, false, false
	for ; n.at < len(n.text); n.at++ {
		c := n.text[n.at]
		sign := n.at == start || n.text[n.at-1]|0x20 == 'e'
		switch {
		case c >= '0' && c <= '9', (c == '+' || c == '-') && sign:
			continue
		case c == '.' && !dot && !exponent:
			dot = true
			continue
		case c|0x20 == 'e' && !exponent && n.at > start:
			exponent = true
			continue
		}
		break
	}
	return parsePlain(n.text[start:n.at])
}

// flag takes a 0 or 1, which may stand packed.
func (n *numberScanner) flag() (bool, error) {
	n.space()
	if n.at == len(n.text) || n.text[n.at] != '0' && n.text[n.at] != '1' {
		return false, errors.New("an arc's flags must be 0 or 1")
	}
	n.at++
	return n.text[n.at-1] == '1', nil
}
