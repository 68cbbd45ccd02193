package involute

import "math"

// A Vec is a point or a direction in the plane, in mm.
type Vec struct{ X, Y float64 }

// Polar returns the point at radius r (mm) and polar angle theta (radians, counter-clockwise from +x).
func Polar(r, theta float64) Vec {
	s, c := math.Sincos(theta)
	return Vec{r * c, r * s}
}

// Add returns v + w.
func (v Vec) Add(w Vec) Vec { return Vec{v.X + w.X, v.Y + w.Y} }

// Sub returns v − w.
func (v Vec) Sub(w Vec) Vec { return Vec{v.X - w.X, v.Y - w.Y} }

// Scale returns v stretched by k.
func (v Vec) Scale(k float64) Vec { return Vec{k * v.X, k * v.Y} }

// Dot returns the scalar product of v and w.
func (v Vec) Dot(w Vec) float64 { return v.X*w.X + v.Y*w.Y }

// Cross returns the z component of the vector product: positive where w is to the left of v.
func (v Vec) Cross(w Vec) float64 { return v.X*w.Y - v.Y*w.X }

// Norm returns the length of v.
func (v Vec) Norm() float64 { return math.Hypot(v.X, v.Y) }

// Angle returns the polar angle of v in (−π, π].
func (v Vec) Angle() float64 { return math.Atan2(v.Y, v.X) }

// Left returns v turned by a quarter turn counter-clockwise.
func (v Vec) Left() Vec { return Vec{-v.Y, v.X} }

// Rotate returns v turned about the origin by theta radians, counter-clockwise.
func (v Vec) Rotate(theta float64) Vec {
	s, c := math.Sincos(theta)
	return Vec{v.X*c - v.Y*s, v.X*s + v.Y*c}
}
