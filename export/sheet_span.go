package export

import (
	"math"

	"flankwright/involute"
)

// spanHead is the height kept above the tips for the dimension of a span, mm.
const spanHead = 12.0

// spanPicture draws the teeth spanned and one more at each side, turned so that the faces stand upright.
func (s Sheet) spanPicture(b *board, room box) {
	v, g := s.Span, s.Shape
	frame := viewFrame(room)
	frame.Y0 += pinClearance
	outward := v.To.Sub(v.From).Left()
	middle := v.From.Add(v.To).Scale(0.5)
	if outward.Dot(middle) < 0 {
		outward = outward.Scale(-1)
	}
	turn := math.Pi/2 - outward.Angle()
	half := (float64(v.Teeth)/2 + 1) * 2 * math.Pi / float64(g.Teeth)
	cut := cutting{From: outward.Angle() - half, To: outward.Angle() + half, Inner: g.innerRadius()}
	low, wide := cut.Inner*math.Cos(half), g.Tip*math.Sin(half)
	if half > widestCutting {
		low, wide = -g.Tip/2, g.Tip
	}
	scale, _ := largestScale(0, func(r float64) bool {
		return r*(g.Tip/2-low) <= frame.height()-spanHead && r*wide <= frame.width()
	})
	r := scale.ratio()
	spare := frame.height() - spanHead - r*(g.Tip/2-low)
	at := placement{turn, r, involute.Vec{X: (frame.X0 + frame.X1) / 2, Y: frame.Y0 + spare/2 - r*low}}
	if half > widestCutting {
		g.draw(b, at)
	} else {
		g.drawPart(b, at, cut)
	}
	spanFaces(b, v, at, at.origin.Y+r*g.Tip/2, frame)
	b.viewWords(room, v.Title, scale.String(), v.Note)
}

// spanFaces draws the two measuring faces, their points of contact, and the dimension above the tips.
func spanFaces(b *board, v *SpanView, at placement, tips float64, frame box) {
	const clear = 2.0
	from, to := at.at(v.From), at.at(v.To)
	if from.X > to.X {
		from, to = to, from
	}
	reach := v.Reach * at.scale
	y := tips + 6
	for _, p := range []involute.Vec{from, to} {
		top := min(max(p.Y+reach, tips+clear), y-beyond)
		upright(b, p.X, max(p.Y-reach, frame.Y0), top, faceWidth)
		upright(b, p.X, top, y+beyond, thinLine)
		b.dot(p)
	}
	words, l := b.fitted(v.Dimension, dimensionLetters(), frame.width()-4)
	b.dimension(involute.Vec{X: from.X, Y: y}, involute.Vec{X: to.X, Y: y}, words, l)
}
