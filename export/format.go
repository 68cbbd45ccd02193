package export

import (
	"bytes"
	"fmt"
	"strings"
)

// A Format is a kind of outline file.
type Format int

// The formats. DXF R2000 (AC1015) holds a contour as one LWPOLYLINE; R12 (AC1009)
// is for old controls and holds it as POLYLINE, VERTEX and SEQEND.
const (
	FormatDXF Format = iota // R2000
	FormatDXFR12
	FormatSVG
)

// ParseDXFVersion returns the format of the DXF version named r2000 or r12, in
// either case.
func ParseDXFVersion(s string) (Format, error) {
	for _, f := range []Format{FormatDXF, FormatDXFR12} {
		if strings.EqualFold(s, f.String()) {
			return f, nil
		}
	}
	return FormatDXF, fmt.Errorf("DXF version %q is not known; r2000 or r12 would be right", s)
}

// String returns "r2000" or "r12", the DXF's version, or "svg".
func (f Format) String() string {
	switch f {
	case FormatDXFR12:
		return "r12"
	case FormatSVG:
		return "svg"
	}
	return "r2000"
}

// Ending returns the file name's ending, with its dot.
func (f Format) Ending() string {
	if f == FormatSVG {
		return ".svg"
	}
	return ".dxf"
}

// Encode writes an outline as a file's bytes.
func (f Format) Encode(o Outline) ([]byte, error) {
	var b bytes.Buffer
	var err error
	if f == FormatSVG {
		err = writeSVG(&b, o)
	} else {
		err = writeDXF(&b, o, f)
	}
	return b.Bytes(), err
}

// Decode reads an outline back from a file's bytes.
func (f Format) Decode(data []byte) (Outline, error) {
	if f == FormatSVG {
		return readSVG(bytes.NewReader(data))
	}
	return readDXF(bytes.NewReader(data))
}
