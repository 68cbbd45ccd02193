package export

import (
	"errors"
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// A Contour is a closed path to be cut.
type Contour struct {
	Layer Layer
	Path  Path
}

// A Circle is a full circle: a bore to be cut, or a reference circle.
type Circle struct {
	Layer  Layer
	Center involute.Vec // mm
	Radius float64      // mm, > 0
}

// An Outline is what an outline file holds. Lengths are in mm; Unit is the unit
// of the numbers in the file.
//
// A gear is one Contour on LayerCut, its mate one on LayerMate. A plain bore is a
// Circle on LayerBore, a bore with a keyway a Contour there. In a file every contour runs
// counter-clockwise, outer ones and holes alike, whichever way it was given:
// CAM tells a hole from an outside by nesting or by the layer, and with one
// sense for all, "tool left of the line" means inside the closed line everywhere.
type Outline struct {
	Unit     inspect.Unit
	Title    string
	Contours []Contour
	Circles  []Circle
	Skipped  []Skipped // what a reader passed over; writers ignore it
}

// Skipped counts the things of one kind that a reader passed over because an
// outline has no place for them.
type Skipped struct {
	Kind  string
	Count int
	Line  int // of the first
}

// String returns "3 LINE, first in line 120".
func (s Skipped) String() string {
	return fmt.Sprintf("%d %s, first in line %d", s.Count, s.Kind, s.Line)
}

// maxSkipped bounds the list of skipped kinds. The DXF reference knows about 50
// kinds of entities, SVG about as many drawing elements.
const maxSkipped = 64

// skip counts one more thing of a kind.
func (o *Outline) skip(kind string, line int) {
	for i := range o.Skipped {
		if o.Skipped[i].Kind == kind {
			o.Skipped[i].Count++
			return
		}
	}
	if len(o.Skipped) == maxSkipped {
		last := &o.Skipped[maxSkipped-1]
		last.Kind = "of this and other kinds"
		last.Count++
		return
	}
	o.Skipped = append(o.Skipped, Skipped{kind, 1, line})
}

// Cut returns the one closed contour on the cut layer.
func (o Outline) Cut() (Path, error) { return o.only(LayerCut) }

// Mate returns the one closed contour on the layer of the second gear.
func (o Outline) Mate() (Path, error) { return o.only(LayerMate) }

// only returns the one closed contour on a layer.
func (o Outline) only(layer Layer) (Path, error) {
	var found []Path
	for _, c := range o.Contours {
		if c.Layer == layer {
			found = append(found, c.Path)
		}
	}
	if len(found) != 1 {
		return Path{}, fmt.Errorf("%d closed contours on layer %s, not 1", len(found), layer)
	}
	return found[0], nil
}

// Strays says what is in the outline that no file of ours holds, and CAM might
// cut: circles where a gear's contour alone belongs, shapes on layers that are
// none of ours, and what a reader passed over.
func (o Outline) Strays() []string {
	var out []string
	for _, c := range o.Circles {
		_, ours := styleOf(c.Layer)
		if !ours || c.Layer == LayerCut || c.Layer == LayerMate {
			out = append(out, fmt.Sprintf("a circle of radius %.6g mm on layer %s", c.Radius, c.Layer))
		}
	}
	for _, c := range o.Contours {
		if l, ours := styleOf(c.Layer); !ours || !l.contours {
			out = append(out, fmt.Sprintf("a closed contour on layer %s", c.Layer))
		}
	}
	for _, s := range o.Skipped {
		out = append(out, s.String())
	}
	return out
}

// bounds returns the lowest and highest coordinates of all that is in the
// outline, reference circles included.
func (o Outline) bounds() (lo, hi involute.Vec) {
	lo = involute.Vec{X: math.Inf(1), Y: math.Inf(1)}
	hi = lo.Scale(-1)
	for _, c := range o.Contours {
		a, b := c.Path.bounds()
		lo, hi = stretch(lo, hi, a)
		lo, hi = stretch(lo, hi, b)
	}
	for _, c := range o.Circles {
		r := involute.Vec{X: c.Radius, Y: c.Radius}
		lo, hi = stretch(lo, hi, c.Center.Sub(r))
		lo, hi = stretch(lo, hi, c.Center.Add(r))
	}
	return lo, hi
}

// check reports why the outline can't be written.
func (o Outline) check() error {
	if len(o.Contours)+len(o.Circles) == 0 {
		return errors.New("outline: nothing in it")
	}
	if o.Unit != inspect.Millimeter && o.Unit != inspect.Inch {
		return fmt.Errorf("outline: unit %d is neither mm nor inch", int(o.Unit))
	}
	for i, c := range o.Contours {
		if l, ok := styleOf(c.Layer); !ok || !l.contours {
			return fmt.Errorf("outline: contour %d is on layer %q; %s or %s would be right", i+1, c.Layer, LayerCut, LayerBore)
		}
		if err := c.Path.check(); err != nil {
			return fmt.Errorf("outline: contour %d: %w", i+1, err)
		}
	}
	for i, c := range o.Circles {
		if _, ok := styleOf(c.Layer); !ok {
			return fmt.Errorf("outline: circle %d is on layer %q; %s or %s would be right", i+1, c.Layer, LayerBore, LayerReference)
		}
		if err := c.check(); err != nil {
			return fmt.Errorf("outline: circle %d: %w", i+1, err)
		}
	}
	return nil
}

// check reports why a circle can't be in an outline.
func (c Circle) check() error {
	if !(c.Radius >= minPiece) || !inReach(c.Radius) {
		return fmt.Errorf("radius %g must be from %g to %g mm", c.Radius, minPiece, maxCoordinate)
	}
	if !inReach(c.Center.X) || !inReach(c.Center.Y) {
		return fmt.Errorf("center (%g, %g) must be within ±%g mm", c.Center.X, c.Center.Y, maxCoordinate)
	}
	return nil
}

// fileForm checks the outline and returns it as a file holds it: contours
// counter-clockwise, arcs up to 90°, and numbers in the file's unit.
func (o Outline) fileForm() (Outline, error) {
	if err := o.check(); err != nil {
		return Outline{}, err
	}
	f := Outline{Unit: o.Unit, Title: o.Title}
	for _, c := range o.Contours {
		f.Contours = append(f.Contours, Contour{c.Layer, c.Path.counterClockwise().splitArcs()})
	}
	f.Circles = append(f.Circles, o.Circles...)
	f.scale(func(x float64) float64 { return x / o.Unit.MM() })
	return f, nil
}

// scale replaces every length by its image under k. Paths must be the outline's own.
func (o *Outline) scale(k func(float64) float64) {
	for _, c := range o.Contours {
		for i, v := range c.Path.Vertices {
			c.Path.Vertices[i].P = involute.Vec{X: k(v.P.X), Y: k(v.P.Y)}
		}
	}
	for i, c := range o.Circles {
		o.Circles[i].Center = involute.Vec{X: k(c.Center.X), Y: k(c.Center.Y)}
		o.Circles[i].Radius = k(c.Radius)
	}
}
