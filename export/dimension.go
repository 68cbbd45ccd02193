package export

import (
	"math"

	"flankwright/involute"
)

// The line widths of the pictures, in the proportion 2:1 of ISO 128-2:2020, mm, and
// the arrows of their dimensions (ISO 129-1:2018: closed and filled).
const (
	outlineWidth = 0.4
	thinLine     = 0.18
	faceWidth    = 0.7 // of anvils and measuring faces
	arrowLength  = 2.6
	arrowWidth   = 0.9
	beyond       = 1.5 // how far an extension line goes past its dimension line
)

func dimensionLetters() lettering { return lettering{Size: 9.5 * pt, Bold: true, Tone: black} }
func leaderLetters() lettering    { return lettering{Size: 8 * pt, Tone: black} }

// dimension draws a dimension line from one point to another, with arrows at both ends and its
// words upright in the middle. Where they do not fit between the arrows, the arrows point
// inward from outside, and the words of a level dimension go above the line.
func (b *board) dimension(from, to involute.Vec, words string, l lettering) {
	along := to.Sub(from)
	length := along.Norm()
	if length == 0 {
		return
	}
	dir := along.Scale(1 / length)
	level := math.Abs(dir.X) > math.Abs(dir.Y)
	width, height := b.width(words, l)+2, 1.3*l.Size
	need := height
	if level {
		need = width
	}
	inside := length >= need+2*arrowLength+2
	tail := 0.0
	if !inside {
		tail = arrowLength + 3
	}
	b.stroke(straight(from.Sub(dir.Scale(tail)), to.Add(dir.Scale(tail))), thinLine)
	b.arrow(from, dir, inside)
	b.arrow(to, dir.Scale(-1), inside)
	middle := from.Add(along.Scale(0.5))
	if level && !inside {
		b.say(middle.X, middle.Y+beyond+0.8, words, l, alignCenter)
		return
	}
	b.fill(box{middle.X - width/2, middle.Y - height/2, middle.X + width/2, middle.Y + height/2}.outline(), paper)
	b.say(middle.X, middle.Y-0.36*l.Size, words, l, alignCenter)
}

// arrow draws an arrowhead with its point at tip; it lies on the side of inward where inside
// is set, else on the other side and points inward.
func (b *board) arrow(tip, inward involute.Vec, inside bool) {
	back := inward.Scale(arrowLength)
	if !inside {
		back = back.Scale(-1)
	}
	side := inward.Left().Scale(arrowWidth / 2)
	head := straight(tip, tip.Add(back).Add(side), tip.Add(back).Sub(side))
	head.Closed = true
	b.fill(head, black)
}

// leader draws a thin line to a point, with a dot on it.
func (b *board) leader(from, to involute.Vec) {
	b.stroke(straight(from, to), thinLine)
	b.dot(to)
}

// dot draws a small filled circle.
func (b *board) dot(at involute.Vec) {
	const dot = 1.0
	b.fill(circlePath(at, dot).line(), black)
}
