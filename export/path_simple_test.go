package export

import (
	"math"
	"testing"

	"flankwright/involute"
)

func TestSimple(t *testing.T) {
	square := func(last involute.Vec) Path {
		return Path{[]Vertex{{P: involute.Vec{}}, {P: involute.Vec{X: 4}}, {P: involute.Vec{X: 4, Y: 4}}, {P: last}}}
	}
	slot := Path{[]Vertex{{P: involute.Vec{}}, {P: involute.Vec{X: 4}, Bulge: 1}, {P: involute.Vec{X: 4, Y: 2}}, {P: involute.Vec{Y: 2}, Bulge: 1}}}
	// The arc over the top of a square of side 4 that hangs down by 3 bulges past its sides.
	deep := Path{[]Vertex{{P: involute.Vec{}}, {P: involute.Vec{X: 4}}, {P: involute.Vec{X: 4, Y: 4}, Bulge: -1.5}, {P: involute.Vec{Y: 4}}}}
	for name, tt := range map[string]struct {
		p      Path
		simple bool
	}{
		"square":           {square(involute.Vec{Y: 4}), true},
		"bow tie":          {square(involute.Vec{X: 1, Y: -1}), false},
		"slot":             {slot, true},
		"hanging too deep": {deep, false},
		"circle":           {circlePath(involute.Vec{X: 3}, 5), true},
		"touching":         {square(involute.Vec{X: 2}), false},
	} {
		if err := tt.p.Simple(); (err == nil) != tt.simple {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// A flank moved sideways through the next one is found on every tooth.
func TestSimpleFindsCrossedTeeth(t *testing.T) {
	p, err := gearContour(involute.Spec{Teeth: 12, Module: 2, Shift: 0.3, Rack: isoA()}, 0.0025)
	if err != nil {
		t.Fatal(err)
	}
	if err := p.Simple(); err != nil {
		t.Fatal(err)
	}
	for i, v := range p.Vertices {
		if v.P.Norm() < 13.5 { // a tip
			continue
		}
		bad := Path{append([]Vertex(nil), p.Vertices...)}
		bad.Vertices[i].P = v.P.Rotate(1.3 * math.Pi / 6)
		if bad.Simple() == nil {
			t.Errorf("vertex %d moved past the next tooth: not found", i)
		}
	}
}
