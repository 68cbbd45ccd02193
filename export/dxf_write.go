package export

import (
	"bufio"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode/utf16"

	"flankwright/inspect"
	"flankwright/involute"
)

// writeDXF writes the outline as an ASCII DXF file.
//
// Every contour is one closed polyline: counter-clockwise, the last vertex not
// repeated, a bulge on every vertex, arcs over 90° split on their own circle.
// Full circles are CIRCLE. Numbers have twelve decimals and no exponent, so that
// mm come back within 1e-12 and inches within 2e-11 mm. Lines end in CR LF, as
// DXF has always had them: DOS-based controls need it, and every importer has met it.
// The title goes into a comment (group 999) at the top, cut at 200 bytes; the
// file holds no date and no random number. An outline that fails check, or a
// version that is neither FormatDXF nor FormatDXFR12, is an error before
// anything is written.
func writeDXF(w io.Writer, o Outline, version Format) error {
	if version != FormatDXF && version != FormatDXFR12 {
		return fmt.Errorf("DXF version %d is not known", int(version))
	}
	f, err := o.fileForm()
	if err != nil {
		return err
	}
	d := &dxfWriter{w: bufio.NewWriter(w)}
	if title := dxfText(f.Title); title != "" {
		d.put(999, title)
	}
	if version == FormatDXFR12 {
		d.r12(f)
	} else {
		d.r2000(f)
	}
	d.put(0, "EOF")
	if d.err == nil {
		d.err = d.w.Flush()
	}
	return d.err
}

// A dxfWriter writes group codes and values and remembers its first error.
type dxfWriter struct {
	w   *bufio.Writer
	err error
}

// put writes pairs of a group code and a value: text, whole number or length.
func (d *dxfWriter) put(pairs ...any) {
	for i := 0; i+1 < len(pairs) && d.err == nil; i += 2 {
		var value string
		switch v := pairs[i+1].(type) {
		case string:
			value = v
		case Layer:
			value = string(v)
		case int:
			value = strconv.Itoa(v)
		case float64:
			value, d.err = plainNumber(v)
		default:
			d.err = fmt.Errorf("DXF: no way to write a %T", v)
		}
		if d.err == nil {
			_, d.err = fmt.Fprintf(d.w, "%3d\r\n%s\r\n", pairs[i], value)
		}
	}
}

// point writes a point under the codes x, x+10 and x+20.
func (d *dxfWriter) point(x int, p involute.Vec) {
	d.put(x, p.X, x+10, p.Y, x+20, 0.0)
}

// begin opens a section.
func (d *dxfWriter) begin(section string) { d.put(0, "SECTION", 2, section) }

// end closes a section.
func (d *dxfWriter) end() { d.put(0, "ENDSEC") }

// header writes the variables that both versions share. Unit and extents are the
// file's. R12 knows no $INSUNITS or $MEASUREMENT, yet importers look for them
// there too and pass over what they don't know.
func (d *dxfWriter) header(acadver string, f Outline) {
	units, metric := 4, 1
	if f.Unit == inspect.Inch {
		units, metric = 1, 0
	}
	lo, hi := f.bounds()
	d.put(9, "$ACADVER", 1, acadver, 9, "$DWGCODEPAGE", 3, "ANSI_1252")
	d.put(9, "$INSBASE")
	d.point(10, involute.Vec{})
	d.put(9, "$EXTMIN")
	d.point(10, lo)
	d.put(9, "$EXTMAX")
	d.point(10, hi)
	d.put(9, "$LUNITS", 70, 2, 9, "$INSUNITS", 70, units, 9, "$MEASUREMENT", 70, metric)
}

// dashes returns the dash and the gap of line type DASHED in the file's unit.
func dashes(u inspect.Unit) (dash, gap float64) { return 2 / u.MM(), 1 / u.MM() }

// plainNumber formats x with twelve decimals, without exponent or negative zero.
func plainNumber(x float64) (string, error) {
	if !finite(x) {
		return "", fmt.Errorf("%g is not a finite number", x)
	}
	s := strconv.FormatFloat(x, 'f', 12, 64)
	if strings.HasPrefix(s, "-") && strings.Trim(s, "-0.") == "" {
		s = s[1:]
	}
	return s, nil
}

// maxDXFTitle bounds a title's bytes in a file; old readers take lines up to 255.
const maxDXFTitle = 200

// dxfText returns s for a one-line value: printable ASCII, all else as \U+XXXX
// (UTF-16), control characters as spaces.
func dxfText(s string) string {
	var b strings.Builder
	for _, r := range strings.TrimSpace(s) {
		var coded string
		switch {
		case r < ' ' || r == 0x7f:
			coded = " "
		case r < 0x7f && r != '\\' && r != '^':
			coded = string(r)
		default:
			for _, u := range utf16.Encode([]rune{r}) {
				coded += fmt.Sprintf(`\U+%04X`, u)
			}
		}
		if b.Len()+len(coded) > maxDXFTitle {
			break
		}
		b.WriteString(coded)
	}
	return strings.TrimSpace(b.String())
}
