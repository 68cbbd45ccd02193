package export

import (
	"bufio"
	"bytes"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
)

const (
	// maxOutlineBytes bounds an outline file. A gear of 500 teeth with 40 arcs
	// each takes about 1.5 MB.
	maxOutlineBytes = 16 << 20

	// maxOutlineVertices bounds the vertices of all contours of a file, and so
	// the memory a reader takes: 6 MB.
	maxOutlineVertices = 1 << 18

	// maxDXFLine bounds a line; the DXF reference allows 2049 characters.
	maxDXFLine = 4096
)

// A dxfPair is a group code, its value, and the line of the code.
type dxfPair struct {
	code  int
	value string
	line  int
}

// errorf returns an error that names the pair's place.
func (p dxfPair) errorf(format string, args ...any) error {
	return fmt.Errorf("DXF line %d: "+format, append([]any{p.line}, args...)...)
}

// is reports whether the pair is this code and value.
func (p dxfPair) is(code int, value string) bool {
	return p.code == code && strings.TrimSpace(p.value) == value
}

// number returns the value as a finite number.
func (p dxfPair) number() (float64, error) {
	x, err := parsePlain(strings.TrimSpace(p.value))
	if err != nil {
		return 0, fmt.Errorf("DXF line %d: group %d: %w", p.line+1, p.code, err)
	}
	return x, nil
}

// whole returns the value as a whole number.
func (p dxfPair) whole() (int, error) {
	n, err := strconv.Atoi(strings.TrimSpace(p.value))
	if err != nil {
		return 0, fmt.Errorf("DXF line %d: group %d: %.40q is not a whole number", p.line+1, p.code, p.value)
	}
	return n, nil
}

// parsePlain parses a decimal number, with or without exponent; the words and
// notations that Go knows beyond that are refused.
func parsePlain(s string) (float64, error) {
	if s == "" || strings.Trim(s, "+-.0123456789eE") != "" {
		return 0, fmt.Errorf("%.40q is not a number", s)
	}
	x, err := strconv.ParseFloat(s, 64)
	if err != nil || !finite(x) {
		return 0, fmt.Errorf("%.40q is not a number", s)
	}
	return x, nil
}

// A dxfScanner reads pairs from a file.
type dxfScanner struct {
	r     *bufio.Reader
	line  int // lines read
	bytes int
}

// newDXFScanner returns a scanner that takes lines up to maxDXFLine.
func newDXFScanner(r io.Reader) *dxfScanner {
	return &dxfScanner{r: bufio.NewReaderSize(r, maxDXFLine)}
}

// next returns the next pair, or io.EOF where the file ends before a group code.
func (s *dxfScanner) next() (dxfPair, error) {
	text, err := s.readLine()
	if err != nil {
		return dxfPair{}, err
	}
	p := dxfPair{line: s.line}
	p.code, err = strconv.Atoi(strings.TrimSpace(text))
	if err != nil || p.code < 0 || p.code > 1071 {
		if s.line == 1 && strings.HasPrefix(text, "AutoCAD Binary DXF") { // the format's own magic text
			return p, errors.New("DXF: this is a binary DXF file; save it as ASCII DXF")
		}
		return p, p.errorf("%.40q is not a group code (0 to 1071)", text)
	}
	p.value, err = s.readLine()
	if errors.Is(err, io.EOF) {
		return p, p.errorf("the file ends after group code %d, before its value", p.code)
	}
	return p, err
}

// readLine returns the next line without its end.
func (s *dxfScanner) readLine() (string, error) {
	b, err := s.r.ReadSlice('\n')
	s.bytes += len(b)
	if len(b) > 0 {
		s.line++
	}
	switch {
	case errors.Is(err, bufio.ErrBufferFull):
		return "", fmt.Errorf("DXF line %d: longer than %d characters", s.line, maxDXFLine)
	case err != nil && (!errors.Is(err, io.EOF) || len(b) == 0):
		return "", err
	case s.bytes > maxOutlineBytes:
		return "", fmt.Errorf("DXF line %d: the file is larger than %d MB", s.line, maxOutlineBytes>>20)
	case bytes.IndexByte(b, 0) >= 0 && s.line > 1:
		return "", fmt.Errorf("DXF line %d: a zero byte; this is no ASCII DXF file", s.line)
	}
	return strings.TrimRight(string(b), "\r\n"), nil
}
