package export

import (
	"math"

	"flankwright/involute"
)

// A rollPiece is a line or an arc of a tooth, ready to be turned and compared.
type rollPiece struct {
	from, to          involute.Vec
	center            involute.Vec // of an arc
	radius            float64      // mm, positive where the metal bulges, negative where it is hollow, 0 for a line
	middle            involute.Vec // unit normal out of the metal, in the middle
	cosHalf           float64      // cosine of half the angle by which the normal turns
	fromNormal        involute.Vec // unit normals out of the metal at the ends
	toNormal          involute.Vec
	spot              involute.Vec // the middle of the chord
	size              float64      // no point is farther from spot, mm
	lowest, outermost float64      // distances from the second gear's axis, mm
}

// right returns a direction turned by a quarter turn clockwise: out of the metal.
func right(v involute.Vec) involute.Vec { return involute.Vec{X: v.Y, Y: -v.X} }

// newRollPiece readies a line or an arc.
func newRollPiece(c involute.Curve) rollPiece {
	from, _ := c.At(0)
	to, _ := c.At(1)
	start, end := directions(c)
	_, along := c.At(0.5)
	p := rollPiece{
		from: from, to: to, fromNormal: right(start), toNormal: right(end),
		middle: right(along.Scale(1 / along.Norm())), cosHalf: 1,
		spot: from.Add(to).Scale(0.5), size: to.Sub(from).Norm() / 2,
	}
	if arc, ok := c.(involute.Arc); ok {
		p.center, p.radius = arc.Center, math.Copysign(arc.Radius, arc.Sweep)
		half := math.Abs(arc.Sweep) / 2
		p.cosHalf = math.Cos(half)
		p.size = max(p.size, arc.Radius*(1-p.cosHalf)) // the rise of an arc over 180°
	}
	return p
}

// A motion turns by an angle and then shifts.
type motion struct {
	sin, cos float64
	shift    involute.Vec
}

func (m motion) turned(v involute.Vec) involute.Vec {
	return involute.Vec{X: m.cos*v.X - m.sin*v.Y, Y: m.sin*v.X + m.cos*v.Y}
}

func (m motion) moved(v involute.Vec) involute.Vec { return m.turned(v).Add(m.shift) }

// moved returns the piece moved, with its distances from the origin there.
func (p rollPiece) moved(m motion) rollPiece {
	p.from, p.to, p.center, p.spot = m.moved(p.from), m.moved(p.to), m.moved(p.center), m.moved(p.spot)
	p.middle, p.fromNormal, p.toNormal = m.turned(p.middle), m.turned(p.fromNormal), m.turned(p.toNormal)
	return p.measured()
}

// measured returns the piece with its distances from the origin noted.
func (p rollPiece) measured() rollPiece {
	away := p.spot.Norm()
	p.lowest, p.outermost = away-p.size, away+p.size
	return p
}

// faces reports whether the unit vector n is a normal of the arc, up to rounding: a
// contact in a joint belongs to both its pieces.
func (p rollPiece) faces(n involute.Vec) bool { return n.Dot(p.middle) >= p.cosHalf-1e-12 }

// holds reports whether a point stands on a normal of the line between its ends.
func (p rollPiece) holds(q involute.Vec) bool {
	along := p.to.Sub(p.from)
	t := q.Sub(p.from).Dot(along)
	return t >= 0 && t <= along.Dot(along)
}

// normalAt returns the unit normal out of the metal on which a point stands.
func (p rollPiece) normalAt(q involute.Vec) involute.Vec {
	if p.radius == 0 {
		return p.middle
	}
	out := q.Sub(p.center)
	return out.Scale(math.Copysign(1/out.Norm(), p.radius))
}

// on reports whether a point stands on a normal of the piece itself.
func (p rollPiece) on(q involute.Vec) bool {
	if p.radius == 0 {
		return p.holds(q)
	}
	return p.faces(p.normalAt(q))
}

// crossings returns the points of the piece at distance r from the origin.
func (p rollPiece) crossings(r float64) (points [2]involute.Vec, n int) {
	var both [2]involute.Vec
	if p.radius == 0 {
		d := p.to.Sub(p.from)
		length := d.Norm()
		u := d.Scale(1 / length)
		foot := p.from.Sub(u.Scale(p.from.Dot(u)))
		h := r*r - foot.Dot(foot)
		if h < 0 {
			return points, 0
		}
		half := math.Sqrt(h)
		both = [2]involute.Vec{foot.Add(u.Scale(half)), foot.Sub(u.Scale(half))}
	} else {
		d := p.center.Norm()
		cos := (d*d + r*r - p.radius*p.radius) / (2 * d * r)
		if !(math.Abs(cos) <= 1) {
			return points, 0
		}
		axis := p.center.Scale(r / d)
		sin := math.Sqrt(1 - cos*cos)
		both = [2]involute.Vec{
			{X: axis.X*cos - axis.Y*sin, Y: axis.X*sin + axis.Y*cos},
			{X: axis.X*cos + axis.Y*sin, Y: axis.Y*cos - axis.X*sin},
		}
	}
	for _, q := range both {
		if p.on(q) {
			points[n] = q
			n++
		}
	}
	return points, n
}
