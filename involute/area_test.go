package involute

import (
	"math"
	"testing"
)

// Areas known from elementary geometry: a ring sector's boundary, a polygon, and
// the involute of a circle, whose sector swept from the base circle to roll
// angle t is r_b² t³/6.
func TestOutlineAreaOfKnownShapes(t *testing.T) {
	circle := Outline{Pieces: []Piece{{Arc{Radius: 3, Start: 0.2, Sweep: math.Pi / 3}, TipLand}}, Teeth: 6}
	near(t, "circle", circle.Area(), 9*math.Pi, 1e-13)
	side := math.Pi / 4
	square := Outline{Pieces: []Piece{{Line{Polar(2, -side), Polar(2, side)}, RootLand}}, Teeth: 4}
	near(t, "square", square.Area(), 8, 1e-13)
	// A circle away from the origin, in two halves.
	off := Vec{5, 1}
	moved := Outline{Pieces: []Piece{{Arc{off, 2, 1, math.Pi}, TipLand}, {Arc{off, 2, 1 + math.Pi, math.Pi}, TipLand}}, Teeth: 1}
	near(t, "circle off center", moved.Area(), 4*math.Pi, 1e-13)
}

// The exact area against the polygon through points of the outline, whose error
// falls with the square of the spacing: two polygons extrapolated (Richardson).
func TestOutlineAreaByPolygons(t *testing.T) {
	for _, c := range rolledGears() {
		o := c.tooth(t).Outline()
		polygon := func(n int) float64 {
			sum := 0.0
			for _, p := range o.Pieces {
				t0, t1 := p.Domain()
				before, _ := p.At(t0)
				for i := 1; i <= n; i++ {
					q, _ := p.At(t0 + (t1-t0)*float64(i)/float64(n))
					sum += before.Cross(q) / 2
					before = q
				}
			}
			return sum * float64(o.Teeth)
		}
		coarse, fine := polygon(400), polygon(800)
		want := fine + (fine-coarse)/3
		near(t, c.name, o.Area(), want, 1e-9*want)
	}
}
