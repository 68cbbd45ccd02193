package export

import (
	"math"

	"flankwright/involute"
)

// A piece is a straight line or an arc from one point to another.
type piece struct {
	From, To involute.Vec // mm
	Bulge    float64      // tan(sweep/4), positive counter-clockwise; 0 is a line
}

// arcLeaving returns the arc that leaves from in the unit direction dir and ends at to.
func arcLeaving(from, dir, to involute.Vec) piece {
	chord := to.Sub(from)
	// The sweep is twice the angle from direction to chord; tan(x/2) = sin x/(1 + cos x).
	return piece{from, to, dir.Cross(chord) / (chord.Norm() + dir.Dot(chord))}
}

// arcArriving returns the arc that starts at from and reaches to in the unit direction dir.
func arcArriving(from, to, dir involute.Vec) piece {
	chord := to.Sub(from)
	return piece{from, to, chord.Cross(dir) / (chord.Norm() + dir.Dot(chord))}
}

// straighten turns a bulge too small to matter into that of a line.
func straighten(bulge float64) float64 {
	if math.Abs(bulge) < straightBulge {
		return 0
	}
	return bulge
}

// sweep returns the angle in radians by which the piece turns, positive counter-clockwise.
func (p piece) sweep() float64 { return 4 * math.Atan(p.Bulge) }

// length returns the length along the piece, in mm.
func (p piece) length() float64 {
	chord := p.To.Sub(p.From).Norm()
	half := p.sweep() / 2
	if math.Abs(half) < 1e-8 { // half/sin(half) is 1 to the last digit
		return chord
	}
	return chord * half / math.Sin(half)
}

// curvature returns 1/radius in 1/mm, positive where the piece turns to the
// left and 0 for a line: 2 sin(sweep/2)/chord with sin(sweep/2) = 2b/(1 + b²).
func (p piece) curvature() float64 {
	b := p.Bulge
	return 4 * b / ((1 + b*b) * p.To.Sub(p.From).Norm())
}

// directions returns the unit directions in which the piece starts and ends:
// the chord's, turned by half the sweep backward and forward.
func (p piece) directions() (start, end involute.Vec) {
	chord := p.To.Sub(p.From)
	u := chord.Scale(1 / chord.Norm())
	b := p.Bulge
	sin, cos := 2*b/(1+b*b), (1-b*b)/(1+b*b)
	start = u.Scale(cos).Sub(u.Left().Scale(sin))
	end = u.Scale(cos).Add(u.Left().Scale(sin))
	return start, end
}

// halves cuts the piece in the middle of its length.
func (p piece) halves() (piece, piece) {
	chord := p.To.Sub(p.From)
	// An arc's rise over its chord is bulge·chord/2, to the right of the chord where it turns left.
	middle := p.From.Add(chord.Scale(0.5)).Sub(chord.Left().Scale(p.Bulge / 2))
	b := p.Bulge / (1 + math.Hypot(1, p.Bulge)) // tan(x/2) from tan x
	return piece{p.From, middle, b}, piece{middle, p.To, b}
}

// parts cuts the piece into n of equal length.
func (p piece) parts(n int) []piece {
	if n < 2 {
		return []piece{p}
	}
	start, _ := p.directions()
	each := p.sweep() / float64(n)
	bulge := math.Tan(each / 4)
	out := make([]piece, n)
	from := p.From
	for i := range out {
		// The chord to the end of part i turns off the start by half of what was swept.
		half := each * float64(i+1) / 2
		chord := p.To.Sub(p.From).Norm() * math.Sin(half) / math.Sin(p.sweep()/2)
		to := p.From.Add(start.Rotate(half).Scale(chord))
		if i == n-1 {
			to = p.To
		}
		out[i] = piece{from, to, bulge}
		from = to
	}
	return out
}

// rotated returns the piece turned about the origin by theta radians.
func (p piece) rotated(theta float64) piece {
	return piece{p.From.Rotate(theta), p.To.Rotate(theta), p.Bulge}
}

// mirrored returns the pieces reflected in the line through the origin at polar
// angle axis, and walked the other way. Reflection and reversal each change the
// sign of a bulge, so bulges stay.
func mirrored(pieces []piece, axis float64) []piece {
	out := make([]piece, len(pieces))
	for i, p := range pieces {
		out[len(pieces)-1-i] = piece{reflected(p.To, axis), reflected(p.From, axis), p.Bulge}
	}
	return out
}

// reflected returns v reflected in the line through the origin at polar angle axis.
func reflected(v involute.Vec, axis float64) involute.Vec {
	s, c := math.Sincos(2 * axis)
	return involute.Vec{X: c*v.X + s*v.Y, Y: s*v.X - c*v.Y}
}

// turn returns the angle in radians from direction a to direction b, in (−π, π].
func turn(a, b involute.Vec) float64 { return math.Atan2(a.Cross(b), a.Dot(b)) }
