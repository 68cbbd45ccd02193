package export

import (
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
)

// readSVG reads the closed paths and the circles of an SVG file at true scale:
// what writeSVG writes, and plain variants of it.
//
// width and height must be in mm or in, and a viewBox in the same proportions
// sets the scale. Paths are made of M, L, H, V, A (circular) and Z in absolute
// numbers, packed or not, one contour from M to Z; y is turned up again. A
// transform, a relative or Bézier command or an open path is an error that says
// where. The layer is the id of the nearest group around, or "0" without one. Text,
// other shapes and the like are listed in Skipped. Files over 16 MB or over
// 262144 vertices are refused.
func readSVG(r io.Reader) (Outline, error) {
	limited := &io.LimitedReader{R: r, N: maxOutlineBytes + 1}
	s := &svgReader{xml: xml.NewDecoder(limited)}
	err := s.read()
	switch {
	case limited.N <= 0:
		return Outline{}, fmt.Errorf("SVG: the file is larger than %d MB", maxOutlineBytes>>20)
	case err != nil:
		line, _ := s.xml.InputPos()
		return Outline{}, fmt.Errorf("SVG line %d: %w", line, err)
	case !s.root:
		return Outline{}, errors.New("SVG: no svg element in the file")
	case len(s.out.Contours)+len(s.out.Circles) == 0:
		return Outline{}, errors.New("SVG: no closed path and no circle in the file")
	}
	return s.out, nil
}

// An svgReader builds an outline from XML elements.
type svgReader struct {
	xml      *xml.Decoder
	out      Outline
	root     bool
	scale    float64 // mm in a user unit
	layers   []Layer // of the elements that are open
	vertices int
}

// maxSVGDepth bounds how deep groups may be nested.
const maxSVGDepth = 200

// read walks the elements.
func (s *svgReader) read() error {
	for {
		token, err := s.xml.Token()
		if errors.Is(err, io.EOF) {
			return nil
		}
		if err != nil {
			return err
		}
		switch t := token.(type) {
		case xml.StartElement:
			err = s.start(t)
		case xml.EndElement:
			s.layers = s.layers[:len(s.layers)-1]
		}
		if err != nil {
			return err
		}
	}
}

// start takes an element; what is inside a passed-over one is passed over too.
func (s *svgReader) start(e xml.StartElement) error {
	kind := e.Name.Local
	if !s.root && kind != "svg" {
		return fmt.Errorf("the file starts with <%.40s>; <svg> would be right", kind)
	}
	if s.root && len(s.layers) == 0 {
		return fmt.Errorf("<%.40s> after the end of <svg>", kind)
	}
	if len(s.layers) > maxSVGDepth {
		return fmt.Errorf("elements are nested over %d deep", maxSVGDepth)
	}
	if v := attribute(e, "transform"); v != "" {
		return fmt.Errorf("<%.40s> has a transform, which is not read; plain coordinates would be right", kind)
	}
	switch kind {
	case "svg":
		if s.root {
			return errors.New("an <svg> inside another")
		}
		s.root = true
		s.layers = append(s.layers, "0")
		return s.page(e)
	case "g":
		layer := s.layers[len(s.layers)-1]
		if id := attribute(e, "id"); id != "" {
			layer = Layer(id)
		}
		s.layers = append(s.layers, layer)
		return nil
	case "path", "circle":
		s.layers = append(s.layers, s.layers[len(s.layers)-1])
		if kind == "path" {
			return s.path(attribute(e, "d"))
		}
		return s.circle(e)
	case "title":
		return s.title(e)
	case "desc", "metadata", "style":
		return s.xml.Skip()
	}
	line, _ := s.xml.InputPos()
	s.out.skip(fmt.Sprintf("<%.40s>", kind), line)
	return s.xml.Skip()
}

// title takes the text of the first title that stands in svg itself.
func (s *svgReader) title(e xml.StartElement) error {
	var text string
	if err := s.xml.DecodeElement(&text, &e); err != nil {
		return err
	}
	if s.out.Title == "" && len(s.layers) == 1 {
		s.out.Title = strings.TrimSpace(text)
	}
	return nil
}

// page takes unit and scale.
func (s *svgReader) page(e xml.StartElement) error {
	w, unit, err := svgLength(e, "width")
	if err != nil {
		return err
	}
	h, unitH, err := svgLength(e, "height")
	if err != nil {
		return err
	}
	if unit != unitH {
		return errors.New("width and height are in different units")
	}
	box := numberScanner{text: attribute(e, "viewBox")}
	var v [4]float64
	for i := range v {
		if v[i], err = box.number(); err != nil {
			return fmt.Errorf("viewBox: %w", err)
		}
	}
	if !box.done() || !(v[2] > 0) || !(v[3] > 0) || !(w > 0) || !(h > 0) {
		return errors.New("width, height and viewBox must be positive, and the viewBox four numbers")
	}
	s.scale = w / v[2] * unit.MM()
	// The same scale both ways, to the six digits that other programs write.
	if k := h / v[3] * unit.MM(); !(math.Abs(k/s.scale-1) < 1e-6) || !finite(s.scale) {
		return errors.New("the viewBox has not the proportions of width and height")
	}
	s.out.Unit = unit
	return nil
}

// svgLength returns a length attribute and its unit.
func svgLength(e xml.StartElement, name string) (float64, inspect.Unit, error) {
	text := strings.TrimSpace(attribute(e, name))
	for _, u := range [...]inspect.Unit{inspect.Millimeter, inspect.Inch} {
		if number, ok := strings.CutSuffix(text, u.String()); ok {
			x, err := parsePlain(strings.TrimSpace(number))
			if err != nil {
				return 0, u, fmt.Errorf("%s: %w", name, err)
			}
			return x, u, nil
		}
	}
	return 0, 0, fmt.Errorf("%s %.40q has no unit; mm or in would be right", name, text)
}

// circle takes a circle.
func (s *svgReader) circle(e xml.StartElement) error {
	var v [3]float64
	for i, name := range [...]string{"cx", "cy", "r"} {
		text := strings.TrimSpace(attribute(e, name))
		if text == "" && name != "r" {
			continue // 0 by the standard
		}
		x, err := parsePlain(text)
		if err != nil {
			return fmt.Errorf("circle: %s: %w", name, err)
		}
		v[i] = x * s.scale
	}
	c := Circle{s.layers[len(s.layers)-1], involute.Vec{X: v[0], Y: 0 - v[1]}, v[2]}
	if err := c.check(); err != nil {
		return fmt.Errorf("circle: %w", err)
	}
	s.out.Circles = append(s.out.Circles, c)
	return nil
}

// attribute returns an attribute's value, or "".
func attribute(e xml.StartElement, name string) string {
	for _, a := range e.Attr {
		if a.Name.Local == name && a.Name.Space == "" {
			return a.Value
		}
	}
	return ""
}
