package export

import (
	"math"

	"flankwright/involute"
)

// A pinPicture is the measurement over pins turned so that the anvils lie level,
// the first pin at the top; lengths are mm of the part.
type pinPicture struct {
	view        *PinView
	gear        GearShape
	turn        float64
	pins        []involute.Vec // turned
	top, bottom float64        // heights of the anvils above the center
	lead        float64        // width on the page for the pins' label, mm
	room        box            // for the gear itself, on the page
}

// The white kept above and below a gear in its picture, and between its two parts, mm.
const (
	pinClearance = 2.0
	pinBreak     = 5.0
)

func (s Sheet) pinPicture(b *board, room box) {
	const leastGear = 0.35 // of the width, whatever the words ask for
	v := s.Pins
	frame := viewFrame(room)
	p := pinPicture{view: v, gear: s.Shape, turn: math.Pi/2 - v.axis().Angle()}
	for _, c := range v.Centers {
		p.pins = append(p.pins, c.Rotate(p.turn))
	}
	p.top = p.pins[0].Y + v.Diameter/2
	p.bottom = p.pins[1].Y - v.Diameter/2
	for _, q := range p.pins[1:] {
		p.bottom = min(p.bottom, q.Y-v.Diameter/2)
	}
	words := frame.width() * (1 - leastGear)
	p.lead = min(26, 0.5*words)
	dimension := min(b.width(v.Dimension, dimensionLetters())+4, 0.5*words)
	p.room = box{frame.X0 + p.lead, frame.Y0 + pinClearance, frame.X1 - dimension - 5, frame.Y1 - pinClearance}
	scale, note := p.draw(b, frame)
	if v.Note != "" {
		if note != "" {
			note += " "
		}
		note += v.Note
	}
	b.viewWords(room, v.Title, scale.String(), note)
}

// draw draws the whole gear where it fits at 1:1 or larger, else its two sides.
func (p pinPicture) draw(b *board, frame box) (scaling, string) {
	whole := func(s float64) bool {
		high := max(p.top, p.gear.Tip/2) - min(p.bottom, -p.gear.Tip/2)
		return s*high <= p.room.height() && s*p.gear.Tip <= p.room.width()
	}
	scale, ok := largestScale(1, whole)
	if !ok {
		for _, side := range []int{2, 1} {
			if scale, n, ok := p.broken(side); ok {
				p.drawBroken(b, frame, scale.ratio(), n)
				return scale, "Shortened between the wavy lines."
			}
		}
		scale, _ = largestScale(0, whole)
	}
	middle := (p.room.Y0+p.room.Y1)/2 - scale.ratio()*(p.top+p.bottom)/2
	at := placement{p.turn, scale.ratio(), involute.Vec{X: (p.room.X0 + p.room.X1) / 2, Y: middle}}
	p.gear.draw(b, at)
	p.drawPins(b, at, p.pins[:1], p.top)
	p.drawPins(b, at, p.pins[1:], p.bottom)
	p.words(b, frame, at, at)
	return scale, ""
}

// cuttings returns what is shown round the upper and the lower pins: n pitches to each side.
func (p pinPicture) cuttings(n int) (upper, lower cutting) {
	inner := p.gear.innerRadius()
	pitch := 2 * math.Pi / float64(p.gear.Teeth)
	group := func(pins []involute.Vec, toward float64) cutting {
		lo, hi := math.Inf(1), math.Inf(-1)
		for _, q := range pins {
			a := math.Remainder(q.Angle()-toward, 2*math.Pi) + toward
			lo, hi = min(lo, a), max(hi, a)
		}
		side := float64(n) * pitch
		return cutting{From: lo - side - p.turn, To: hi + side - p.turn, Inner: inner}
	}
	return group(p.pins[:1], math.Pi/2), group(p.pins[1:], -math.Pi/2)
}

// broken looks for the largest scale that shows n pitches beside each pin, and then for more pitches at that scale.
func (p pinPicture) broken(n int) (scaling, int, bool) {
	const widest = 40 * math.Pi / 180 // half angle to which more pitches are added
	fits := func(s float64, n int) bool {
		upper, lower := p.cuttings(n)
		half := max(upper.half(), lower.half())
		if half > widestCutting {
			return false
		}
		inner := upper.Inner * math.Cos(half)
		high := max(p.top-inner, -p.bottom-inner)
		return s*high <= (p.room.height()-pinBreak)/2 && s*p.gear.Tip*math.Sin(half) <= p.room.width()
	}
	least := 0.0
	if n > 1 {
		least = 1
	}
	scale, ok := largestScale(least, func(s float64) bool { return fits(s, n) })
	for ok && fits(scale.ratio(), n+1) {
		if upper, lower := p.cuttings(n + 1); max(upper.half(), lower.half()) > widest {
			break
		}
		n++
	}
	return scale, n, ok
}

// drawBroken draws the upper and the lower side, each at true scale, moved together.
func (p pinPicture) drawBroken(b *board, frame box, scale float64, n int) {
	upper, lower := p.cuttings(n)
	x := (p.room.X0+p.room.X1)/2 - scale*p.pins[0].X
	up := placement{p.turn, scale, involute.Vec{X: x, Y: p.room.Y1 - scale*p.top}}
	down := placement{p.turn, scale, involute.Vec{X: x, Y: p.room.Y0 - scale*p.bottom}}
	p.gear.drawPart(b, up, upper)
	p.gear.drawPart(b, down, lower)
	p.drawPins(b, up, p.pins[:1], p.top)
	p.drawPins(b, down, p.pins[1:], p.bottom)
	p.words(b, frame, up, down)
}

// drawPins draws the pins of one anvil, and the anvil.
func (p pinPicture) drawPins(b *board, at placement, pins []involute.Vec, anvil float64) {
	left, right := math.Inf(1), math.Inf(-1)
	for _, q := range pins {
		c := q.Scale(at.scale).Add(at.origin)
		b.add(shape{Outline: circlePath(c, p.view.Diameter*at.scale).line(), Style: shapeStyle{Width: outlineWidth, Line: black, Fill: paper}})
		cross := min(1.2, 0.3*p.view.Diameter*at.scale)
		b.stroke(straight(c.Sub(involute.Vec{X: cross}), c.Add(involute.Vec{X: cross})), thinLine)
		b.stroke(straight(c.Sub(involute.Vec{Y: cross}), c.Add(involute.Vec{Y: cross})), thinLine)
		left, right = min(left, c.X), max(right, c.X)
	}
	reach := max(3, 0.7*p.view.Diameter*at.scale)
	b.rule(left-reach, right+reach, at.origin.Y+at.scale*anvil, faceWidth)
}

// words draws the dimension at the right and the pins' label at the upper left.
func (p pinPicture) words(b *board, frame box, up, down placement) {
	top := up.origin.Y + up.scale*p.top
	bottom := down.origin.Y + down.scale*p.bottom
	half := min(b.width(p.view.Dimension, dimensionLetters())/2, (frame.X1-p.room.X1)/2-1)
	x := frame.X1 - half - 1
	reach := max(3, 0.7*p.view.Diameter*up.scale) + 1
	right := math.Inf(-1)
	for _, q := range p.pins[1:] {
		right = max(right, down.origin.X+down.scale*q.X)
	}
	b.rule(up.origin.X+up.scale*p.pins[0].X+reach, x+beyond, top, thinLine)
	b.rule(right+reach, x+beyond, bottom, thinLine)
	words, l := b.fitted(p.view.Dimension, dimensionLetters(), 2*half+0.01)
	b.dimension(involute.Vec{X: x, Y: bottom}, involute.Vec{X: x, Y: top}, words, l)
	l = leaderLetters()
	lines := b.paragraph(p.view.Label, l, p.lead, 4)
	b.lines(frame.X0, frame.Y1, lines, l)
	if len(lines) == 0 {
		return
	}
	pin := p.pins[0].Scale(up.scale).Add(up.origin)
	edge := pin.Add(involute.Polar(p.view.Diameter*up.scale/2, 150*math.Pi/180))
	start := involute.Vec{X: frame.X0 + b.width(lines[0], l) + 1, Y: frame.Y1 - 0.65*l.Size}
	b.leader(start, edge)
}
