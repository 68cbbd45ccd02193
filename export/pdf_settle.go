package export

import (
	"bytes"
	"compress/zlib"
	"encoding/binary"
	"fmt"
	"io"
	"regexp"
	"strconv"
	"strings"
	"unicode/utf16"
)

// settlePDF rewrites a PDF as the drawing library makes it (objects 1, 2 and 3 are the
// catalog, the document information and the page tree) so that it no longer depends
// on the clock: the creation date goes, and embedded fonts get their own creation
// date in place of the time they were cut. The catalog asks for printing at true
// size (ISO 32000-1:2008, table 150, PrintScaling). The cross-reference table is made anew.
func settlePDF(file []byte, title string) ([]byte, error) {
	head, objects, err := pdfObjects(file)
	if err != nil {
		return nil, err
	}
	fonts, err := pdfFontFiles(objects)
	if err != nil {
		return nil, err
	}
	for _, n := range fonts {
		if objects[n-1], err = settleFontObject(n, objects[n-1]); err != nil {
			return nil, fmt.Errorf("font in object %d: %w", n, err)
		}
	}
	objects[0] = []byte("1 0 obj\n<</Type/Catalog/Pages 3 0 R/ViewerPreferences<</PrintScaling/None>>>>\nendobj\n")
	objects[1] = fmt.Appendf(nil, "2 0 obj\n<</Creator(flankwright)/Title%s>>\nendobj\n", pdfText(title))
	return joinPDF(head, objects), nil
}

// pdfObjects cuts a PDF file into what stands before the first object, and the objects by number, the first at 0.
func pdfObjects(file []byte) (head []byte, objects [][]byte, err error) {
	start := bytes.LastIndex(file, []byte("startxref\n"))
	if start < 0 {
		return nil, nil, fmt.Errorf("no startxref")
	}
	var table int
	if _, err := fmt.Sscanf(string(file[start:]), "startxref\n%d", &table); err != nil || table < 0 || table >= start {
		return nil, nil, fmt.Errorf("startxref without a place in the file")
	}
	lines := strings.Split(string(file[table:start]), "\n")
	if len(lines) < 3 || lines[0] != "xref" {
		return nil, nil, fmt.Errorf("no cross-reference table where startxref says")
	}
	first := len(file)
	for _, line := range lines[3:] { // after "xref", the range and the free object 0
		if !strings.HasSuffix(line, " n ") {
			break
		}
		at, err := strconv.Atoi(line[:10])
		if err != nil || at >= table {
			return nil, nil, fmt.Errorf("cross-reference %q", line)
		}
		end := bytes.Index(file[at:], []byte("\nendobj\n"))
		if end < 0 {
			return nil, nil, fmt.Errorf("object at %d has no end", at)
		}
		objects = append(objects, file[at:at+end+len("\nendobj\n")])
		first = min(first, at)
	}
	if len(objects) < 3 {
		return nil, nil, fmt.Errorf("%d objects, at least 3 are needed", len(objects))
	}
	return file[:first], objects, nil
}

// fontFileReference finds the object that holds a TrueType font in a font's description.
var fontFileReference = regexp.MustCompile(`/FontFile2 (\d+) 0 R`)

// pdfFontFiles returns the numbers of the objects that hold fonts.
func pdfFontFiles(objects [][]byte) ([]int, error) {
	var numbers []int
	for _, object := range objects {
		if bytes.Contains(object, []byte("stream\n")) {
			continue
		}
		for _, m := range fontFileReference.FindAllSubmatch(object, -1) {
			n, err := strconv.Atoi(string(m[1]))
			if err != nil || n < 1 || n > len(objects) {
				return nil, fmt.Errorf("font in object %s, which is not there", m[1])
			}
			numbers = append(numbers, n)
		}
	}
	return numbers, nil
}

// settleFontObject returns the stream object n with the dates in its font settled.
func settleFontObject(n int, object []byte) ([]byte, error) {
	_, stream, found := bytes.Cut(object, []byte("stream\n"))
	if !found {
		return nil, fmt.Errorf("no stream")
	}
	inflate, err := zlib.NewReader(bytes.NewReader(stream))
	if err != nil {
		return nil, err
	}
	font, err := io.ReadAll(inflate)
	if err != nil {
		return nil, err
	}
	if err := settleFont(font); err != nil {
		return nil, err
	}
	var packed bytes.Buffer
	deflate := zlib.NewWriter(&packed)
	if _, err := deflate.Write(font); err != nil {
		return nil, err
	}
	if err := deflate.Close(); err != nil {
		return nil, err
	}
	out := fmt.Appendf(nil, "%d 0 obj\n<</Filter/FlateDecode/Length %d/Length1 %d>>stream\n", n, packed.Len(), len(font))
	out = append(out, packed.Bytes()...)
	return append(out, "\nendstream\n\nendobj\n"...), nil
}

// settleFont sets a TrueType font's date of change to its date of creation and mends the
// checksums. Layout and checksums: ISO/IEC 14496-22 (OpenType), font header table "head".
func settleFont(font []byte) error {
	const (
		directory  = 12 // bytes before the table records
		record     = 16 // bytes a table record: tag, checksum, offset, length
		adjustment = 8  // places in "head"
		created    = 20
		modified   = 28
		headLength = 54
		magic      = 0xB1B0AFBA // what a whole font sums up to
	)
	if len(font) < directory {
		return fmt.Errorf("%d bytes are no font", len(font))
	}
	tables := int(binary.BigEndian.Uint16(font[4:]))
	for i := 0; i < tables && directory+(i+1)*record <= len(font); i++ {
		entry := font[directory+i*record:]
		if string(entry[:4]) != "head" {
			continue
		}
		at := uint64(binary.BigEndian.Uint32(entry[8:]))
		if at+headLength+2 > uint64(len(font)) {
			return fmt.Errorf("header table beyond the end")
		}
		head := font[at : at+headLength+2] // with its padding to 4 bytes
		copy(head[modified:modified+8], head[created:created+8])
		binary.BigEndian.PutUint32(head[adjustment:], 0)
		binary.BigEndian.PutUint32(entry[4:], fontSum(head))
		binary.BigEndian.PutUint32(head[adjustment:], magic-fontSum(font))
		return nil
	}
	return fmt.Errorf("no header table")
}

// fontSum is OpenType's checksum: the sum of the big-endian 32-bit words, modulo 2³².
func fontSum(b []byte) uint32 {
	sum := uint32(0)
	for ; len(b) >= 4; b = b[4:] {
		sum += binary.BigEndian.Uint32(b)
	}
	return sum
}

// pdfText writes a text string in UTF-16 with its mark, in hexadecimal (ISO 32000-1:2008, 7.9.2.2).
func pdfText(s string) string {
	var b strings.Builder
	b.WriteString("<FEFF")
	for _, u := range utf16.Encode([]rune(s)) {
		fmt.Fprintf(&b, "%04X", u)
	}
	return b.String() + ">"
}

// joinPDF puts objects together with a cross-reference table (ISO 32000-1:2008, 7.5.4).
func joinPDF(head []byte, objects [][]byte) []byte {
	out := bytes.NewBuffer(bytes.Clone(head))
	places := make([]int, len(objects))
	for i, object := range objects {
		places[i] = out.Len()
		out.Write(object)
	}
	table := out.Len()
	fmt.Fprintf(out, "xref\n0 %d\n0000000000 65535 f \n", len(objects)+1)
	for _, at := range places {
		fmt.Fprintf(out, "%010d 00000 n \n", at)
	}
	fmt.Fprintf(out, "trailer\n<</Info 2 0 R/Root 1 0 R/Size %d>>\nstartxref\n%d\n%%%%EOF\n", len(objects)+1, table)
	return out.Bytes()
}
