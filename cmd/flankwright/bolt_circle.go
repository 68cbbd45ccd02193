package main

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"flankwright/export"
	"flankwright/inspect"
	"flankwright/involute"
)

// A boltCircle is a ring of equal holes about the axis.
type boltCircle struct {
	diameter float64 // through the centers, mm
	holes    int
	hole     float64 // diameter of each, mm
	start    float64 // of the first from the first tooth's center line, counter-clockwise, degrees
}

// layout returns the holes as they are drawn.
func (b *boltCircle) layout() export.BoltCircle {
	if b == nil {
		return export.BoltCircle{}
	}
	return export.BoltCircle{Diameter: b.diameter, Holes: b.holes, Hole: b.hole, Start: b.start * involute.Degree}
}

// chord returns the straight distance between the centers of neighboring holes,
// D·sin(π/n), mm; 0 for a single one.
func (b *boltCircle) chord() float64 {
	if b.holes < 2 {
		return 0
	}
	return b.diameter * math.Sin(math.Pi/float64(b.holes))
}

const boltWords = "write { diameter = …, holes = …, hole = … }, or such as \"6x5.5mm on 40mm\""

// readBolts reads a bolt circle. Where no start is given the holes begin on the
// first tooth's center line, or with a keyway, which lies there, half a hole
// pitch beside it.
func (j *job) readBolts(g *gear) error {
	v, ok := g.settings.vals["bolt_circle"]
	if !ok {
		return nil
	}
	var sub settings
	var err error
	text, isText := asText(v)
	if t, isTable := v.content.(*table); isTable {
		sub, err = g.settings.inline("bolt_circle", t)
	} else if isText {
		sub, err = g.settings.boltText(v, text)
	} else {
		err = bad("bolt_circle", v, "needs more than one value; %s", boltWords)
	}
	if err != nil {
		return err
	}
	b, part, err := sub.bolts(g.keyway != nil)
	var p *problem
	if errors.As(err, &p) && isText { // the parts of a text have no place of their own
		return bad("bolt_circle", v, "%s %s", part, p.text)
	}
	if err != nil {
		return err
	}
	if b.diameter == 0 || b.holes == 0 || b.hole == 0 {
		return bad("bolt_circle", v, "needs diameter (through the centers), holes (how many) and hole (diameter of each); %s", boltWords)
	}
	g.bolts = b
	return nil
}

// bolts reads the values of a bolt circle, 0 for those that are missing; part is
// the one an error is about.
func (s settings) bolts(keyed bool) (b *boltCircle, part string, err error) {
	b = &boltCircle{}
	if b.diameter, _, err = s.positive("diameter"); err != nil {
		return b, "diameter", err
	}
	if b.holes, _, err = s.count("holes"); err != nil {
		return b, "holes", err
	}
	if b.hole, _, err = s.positive("hole"); err != nil {
		return b, "hole", err
	}
	deg, ok, err := s.angle("start")
	switch {
	case err != nil:
	case ok && math.Abs(deg) > 360:
		err = bad("start", s.vals["start"], "is an angle from the first tooth's center line, from -360° to 360°, not %v°", deg)
	case ok:
		b.start = deg
	case keyed:
		b.start = 180 / float64(max(1, b.holes))
	}
	return b, "start", err
}

// boltText takes "6x5.5mm on 40mm" or "6x5.5mm on 40mm at 30" apart. A unit of the
// circle covers the holes too.
func (s settings) boltText(v value, text string) (settings, error) {
	plain := strings.NewReplacer("×", "x", "X", "x").Replace(strings.ToLower(text))
	head, tail, ok1 := strings.Cut(plain, " on ")
	holes, hole, ok2 := strings.Cut(head, "x")
	circle, start, hasStart := strings.Cut(tail, " at ")
	if !ok1 || !ok2 {
		return s, bad("bolt_circle", v, "%q is not a bolt circle; %s", text, boltWords)
	}
	if unit := inspect.UnitOf(circle, s.bare(v)); inspect.UnitOf(hole, unit) == unit {
		hole = strings.TrimSuffix(strings.TrimSpace(hole), unit.String()) + unit.String()
	}
	word := func(part string) value { return value{flagText(strings.TrimSpace(part)), v.at} }
	vals := map[string]value{"diameter": word(circle), "holes": word(holes), "hole": word(hole)}
	if hasStart {
		vals["start"] = word(start)
	}
	return settings{vals, s.jobUnit, s.bare(v), v.at}, nil
}

// A gap is the metal left between a hole and something else.
type gap struct {
	metal float64 // mm, below 0 where they overlap
	to    string
	cure  string // what to take beside smaller holes
}

// gaps returns the metal left between the holes and all that is near them; root
// is the root diameter of the thinnest tooth.
func (b *boltCircle) gaps(j *job, g *gear, root float64) []gap {
	list := []gap{{(root - b.diameter - b.hole) / 2, "the root circle, " + j.length(root), "a smaller bolt circle"}}
	if b.holes > 1 {
		list = append(list, gap{b.chord() - b.hole, fmt.Sprintf("the next hole, %s from center to center", j.length(b.chord())), "fewer holes, a larger bolt circle"})
	}
	if g.bore != nil {
		list = append(list, gap{(b.diameter - b.hole - g.bore.limits.Max) / 2, "the bore, " + j.length(g.bore.limits.Max), "a larger bolt circle"})
	}
	if k := g.keyway; k != nil {
		near := math.Inf(1)
		for _, c := range b.layout().Centers() {
			x := max(0, -c.X, c.X-k.deepest)
			near = min(near, math.Hypot(x, max(0, math.Abs(c.Y)-k.width/2)))
		}
		list = append(list, gap{near - b.hole/2, "the keyway", "another start, a larger bolt circle"})
	}
	return list
}
