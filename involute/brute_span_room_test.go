package involute

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// polygon returns the whole gear's section as many points, with a tooth on +x.
func (o Outline) polygon(n int) []Vec {
	var ps []Vec
	for k := range o.Teeth {
		for _, c := range o.Pieces {
			t0, t1 := c.Domain()
			for i := range n {
				p, _ := c.At(t0 + (t1-t0)*float64(i)/float64(n))
				ps = append(ps, p.Rotate(float64(k)*o.Pitch()))
			}
		}
	}
	return ps
}

// overlaps reports whether a polygon's edge enters the rectangle x0 < x < x1, y > y0:
// whether some of it is left when it is clipped by the rectangle's sides.
func overlaps(polygon []Vec, x0, x1, y0 float64) bool {
	for i, a := range polygon {
		b := polygon[(i+1)%len(polygon)]
		from, to := 0.0, 1.0
		for _, side := range [3][2]float64{{a.X - x0, b.X - x0}, {x1 - a.X, x1 - b.X}, {a.Y - y0, b.Y - y0}} {
			switch d := side[1] - side[0]; {
			case d == 0 && side[0] <= 0:
				from = 2
			case d > 0:
				from = max(from, -side[0]/d)
			case d < 0:
				to = min(to, -side[0]/d)
			}
		}
		if to > from {
			return true
		}
	}
	return false
}

// A rectangle laid against the last of the spanned teeth of a polygon with thousands
// of points: with a thickness a little under the room it touches nothing of the
// gear, a little over it does.
func TestSpanRoomByRectangle(t *testing.T) {
	open, tight, none := 0, 0, 0
	for _, c := range spannedGears() {
		if c.spec.Helix != 0 {
			continue
		}
		tooth := rolled{"", c.spec, c.thin}.tooth(t)
		o := tooth.Outline()
		gear := o.polygon(400)
		for k := max(1, c.k-1); k <= c.k+1; k++ {
			turned := make([]Vec, len(gear))
			for i, p := range gear {
				turned[i] = p.Rotate(math.Pi/2 - float64(k-1)/2*o.Pitch())
			}
			w := tooth.Span(k)
			if dc := tooth.SpanContactDiameter(w); dc <= tooth.FormDiameter() || dc >= tooth.InvoluteEndDiameter() {
				continue
			}
			for _, land := range []float64{-0.5, 0, 0.05, 0.3, 0.5, 0.8, 3} {
				land *= c.spec.Module
				room := tooth.SpanRoom(k, SpanFace{Land: land})
				edge := tooth.BaseDiameter()/2 - land
				// The polygon's chords lie within 1e-4 of the module of the curves.
				const slack = 1e-4
				x0 := w/2 + slack*c.spec.Module
				free := func(b float64) bool { return !overlaps(turned, x0, w/2+b, edge+slack*c.spec.Module) }
				switch {
				case math.IsInf(room, 1):
					open++
					if !free(tooth.TipDiameter()) {
						t.Errorf("z %d k %d land %v: something stands in the way of an endless face", c.spec.Teeth, k, land)
					}
				case room == 0:
					none++
					if !overlaps(turned, w/2-slack, w/2+0.03*c.spec.Module, edge-slack) {
						t.Errorf("z %d k %d land %v: nothing is there, and no room is said to be", c.spec.Teeth, k, land)
					}
				default:
					tight++
					if !free(room - 0.002*c.spec.Module) {
						t.Errorf("z %d k %d land %v: a face of less than %v meets the gear", c.spec.Teeth, k, land, room)
					}
					if !overlaps(turned, x0, w/2+room+0.002*c.spec.Module, edge-slack*c.spec.Module) {
						t.Errorf("z %d k %d land %v: a face of more than %v meets nothing", c.spec.Teeth, k, land, room)
					}
				}
			}
		}
	}
	if open < 3 || tight < 20 || none < 3 {
		t.Errorf("%d open, %d tight, %d without room: too few of a kind to say much", open, tight, none)
	}
}

// A disc pushed between the teeth of a helical gear, in space: its points are turned
// into their own sections and held against the exact profile. Somewhat thinner
// than the room they are all outside the metal, somewhat thicker some are inside.
func TestSpanRoomOfHelicalByPoints(t *testing.T) {
	tried := 0
	for _, c := range spannedGears() {
		if c.spec.Helix == 0 {
			continue
		}
		tooth := rolled{"", c.spec, c.thin}.tooth(t)
		profile, m := tooth.Profile(), c.spec.Module
		for i, f := range []SpanFace{{0.1 * m, 4 * m, 0}, {0.2 * m, 2 * m, 0}, {0.1 * m, 0, 0.7 * m}, {0.1 * m, 4 * m, 0}, {0.3 * m, 2 * m, 0}} {
			k := c.k - i/2
			dc := tooth.SpanContactDiameter(tooth.Span(k))
			room := tooth.SpanRoom(k, f)
			if math.IsInf(room, 1) || room == 0 || dc < tooth.FormDiameter() {
				continue
			}
			tried++
			deepest := func(thick float64) float64 { return deepestInMetal(tooth, profile, k, f, thick) }
			if d := deepest(room - 0.01*m); d > 1e-3*m {
				t.Errorf("z %d k %d %+v: a face thinner than %v is %v in the metal", c.spec.Teeth, k, f, room, d)
			}
			if d := deepest(room + 0.05*m); d <= 0 {
				t.Errorf("z %d k %d %+v: a face thicker than %v meets nothing", c.spec.Teeth, k, f, room)
			}
		}
	}
	if tried < 10 {
		t.Errorf("%d faces tried", tried)
	}
}

// deepestInMetal returns how far a measuring face sinks into a helical gear, by a
// grid of points on its rim and in front of its edge.
func deepestInMetal(tooth Tooth, profile Profile, k int, f SpanFace, thick float64) float64 {
	s, c := math.Sincos(tooth.BaseHelix())
	rb := tooth.BaseDiameter() / 2
	center := math.Pi/2 - float64(k-1)*math.Pi/float64(tooth.Teeth())
	deepest := 0.0
	const n = 32
	for i := range n + 1 {
		along := f.halfWidth() * (2*float64(i)/n - 1)
		edge := rb - f.Land
		if f.Radius > 0 {
			edge += f.Radius - math.Sqrt(max(0, f.Radius*f.Radius-along*along))
		}
		for j := range n + 1 {
			front := thick * float64(j) / n
			for up := range 12 {
				y := edge + (tooth.TipDiameter()/2-edge)*float64(up)/12
				if y < edge {
					continue
				}
				x := tooth.Span(k)*c/2 + front*c - along*s
				z := tooth.Span(k)*s/2 + front*s + along*c
				p := Vec{x, y}.Rotate(-z*s/c/rb - center)
				deepest = max(deepest, -profile.Offset(p))
			}
		}
	}
	return deepest
}

// A helix that vanishes has the spur gear's room; more land has less room.
func TestSpanRoomOfASlightHelix(t *testing.T) {
	spur := Spec{Teeth: 24, Module: 3, Rack: isoA()}
	slight := spur
	slight.Helix = 1e-4 * Degree
	a, b := rolled{"", spur, 0.1}.tooth(t), rolled{"", slight, 0.1}.tooth(t)
	for _, land := range []float64{0.1, 0.3, 0.6} {
		f := SpanFace{Land: land, Radius: 12}
		near(t, "room", b.SpanRoom(3, f), a.SpanRoom(3, f), 0.01*spur.Module)
	}
}

func TestPropertySpanRoom(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		k := rapid.IntRange(1, max(1, tooth.Teeth()/3)).Draw(t, "k")
		m := tooth.Module()
		land := rapid.Float64Range(-1, 1).Draw(t, "land") * m
		radius := rapid.Float64Range(0.5, 8).Draw(t, "radius") * m
		room := tooth.SpanRoom(k, SpanFace{Land: land, Radius: radius})
		if !(room >= 0) {
			t.Fatalf("room %v", room)
		}
		if !tooth.Helical() { // deeper never has more room
			if deeper := tooth.SpanRoom(k, SpanFace{Land: land + 0.2*m, Radius: radius}); deeper > room+onEdge {
				t.Errorf("land %v: room %v, 0.2 m deeper %v", land, room, deeper)
			}
		}
	})
}
