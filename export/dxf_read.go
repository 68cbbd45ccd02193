package export

import (
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode/utf16"

	"flankwright/inspect"
)

// readDXF reads the closed polylines and the circles of an ASCII DXF file, of any
// release from R12 on, as they stand: paths keep their sense and first vertex.
//
// It takes LWPOLYLINE, POLYLINE with VERTEX, and CIRCLE in model space, seen from
// above; a polyline counts as closed by its flag or by repeating its first vertex at the end.
// All other entities are listed in Skipped. An error names the line. These are
// errors: $INSUNITS missing or other than 1 (inch) or 4 (mm); an open polyline; a
// wrong vertex count; a number that is none; a path that fails Path.check; a
// file without its EOF, over 16 MB or over 262144 vertices, or without any
// closed outline in it.
func readDXF(r io.Reader) (Outline, error) {
	d := &dxfReader{scan: newDXFScanner(r)}
	if err := d.file(); err != nil {
		return Outline{}, err
	}
	if len(d.out.Contours)+len(d.out.Circles) == 0 {
		found := ""
		for _, s := range d.out.Skipped {
			found += fmt.Sprintf("; passed over: %s", s)
		}
		return Outline{}, errors.New("DXF: no closed polyline and no circle in the file" + found)
	}
	return d.out, nil
}

// A dxfReader builds an outline from pairs.
type dxfReader struct {
	scan     *dxfScanner
	pair     dxfPair // the current one
	out      Outline
	vertices int
	unitLine int             // where $INSUNITS stands; 0 before
	seen     map[string]bool // sections
	contours []dxfPair       // where each contour of out starts
	circles  []dxfPair
}

// advance moves to the next pair, over comments.
func (d *dxfReader) advance() error {
	for {
		var err error
		d.pair, err = d.scan.next()
		if errors.Is(err, io.EOF) {
			return fmt.Errorf("DXF line %d: the file ends without EOF", d.scan.line)
		}
		if err != nil || d.pair.code != 999 {
			return err
		}
		if d.out.Title == "" && d.seen == nil {
			d.out.Title = dxfTitle(d.pair.value)
		}
	}
}

// file reads sections up to EOF.
func (d *dxfReader) file() error {
	if err := d.advance(); err != nil {
		return err
	}
	d.seen = map[string]bool{}
	for !d.pair.is(0, "EOF") {
		if !d.pair.is(0, "SECTION") {
			return d.pair.errorf("group %d %.40q where 0 SECTION or 0 EOF should be", d.pair.code, d.pair.value)
		}
		if err := d.advance(); err != nil {
			return err
		}
		name := strings.TrimSpace(d.pair.value)
		if d.pair.code != 2 || len(name) > 40 {
			return d.pair.errorf("a section without a name")
		}
		if d.seen[name] || len(d.seen) > maxSkipped {
			return d.pair.errorf("section %s for the second time", name)
		}
		d.seen[name] = true
		if err := d.section(name); err != nil {
			return err
		}
	}
	if !d.seen["ENTITIES"] {
		return errors.New("DXF: no ENTITIES section")
	}
	return d.finish()
}

// section reads one section and its ENDSEC.
func (d *dxfReader) section(name string) error {
	err := d.advance()
	for err == nil && !d.pair.is(0, "ENDSEC") {
		switch {
		case d.pair.is(0, "EOF") || d.pair.is(0, "SECTION"):
			err = d.pair.errorf("section %s has no ENDSEC", name)
		case name == "ENTITIES":
			err = d.entity() // moves on by itself
		case name == "HEADER" && d.pair.is(9, "$INSUNITS"):
			if err = d.advance(); err == nil {
				err = d.units()
			}
		default:
			err = d.advance()
		}
	}
	if err != nil {
		return err
	}
	return d.advance()
}

// units takes the value of $INSUNITS.
func (d *dxfReader) units() error {
	n, err := d.pair.whole()
	if err != nil {
		return err
	}
	switch {
	case d.pair.code == 70 && n == 1:
		d.out.Unit = inspect.Inch
	case d.pair.code == 70 && n == 4:
		d.out.Unit = inspect.Millimeter
	default:
		return d.pair.errorf("$INSUNITS is %d; 1 (inch) or 4 (mm) would be right", n)
	}
	d.unitLine = d.pair.line
	return nil
}

// finish turns the numbers into mm and checks every path and circle.
func (d *dxfReader) finish() error {
	if d.unitLine == 0 {
		return errors.New("DXF: the file does not say its unit; $INSUNITS 1 (inch) or 4 (mm) would be right")
	}
	d.out.scale(func(x float64) float64 { return x * d.out.Unit.MM() })
	for i, c := range d.out.Contours {
		if err := c.Path.check(); err != nil {
			return d.contours[i].errorf("%w", err)
		}
	}
	for i, c := range d.out.Circles {
		if err := c.check(); err != nil {
			return d.circles[i].errorf("%w", err)
		}
	}
	return nil
}

// dxfTitle undoes dxfText.
func dxfTitle(s string) string {
	var units []uint16
	s = strings.TrimSpace(s)
	for len(s) > 0 {
		if strings.HasPrefix(s, `\U+`) && len(s) >= 7 {
			if u, err := strconv.ParseUint(s[3:7], 16, 16); err == nil {
				units = append(units, uint16(u))
				s = s[7:]
				continue
			}
		}
		units = append(units, uint16(s[0]))
		s = s[1:]
	}
	return string(utf16.Decode(units))
}
