package involute

import (
	"math"
	"testing"
)

// A drawnSector is the outline of three teeth as a polygon of many short edges,
// closed through the gear's center. Points near the middle tooth see no more.
type drawnSector struct {
	points []Vec
	sag    float64 // no edge is farther from its curve than this
}

func newDrawnSector(o Outline, steps int) drawnSector {
	var d drawnSector
	for turn := -1; turn <= 1; turn++ {
		for _, p := range o.Pieces {
			t0, t1 := p.Domain()
			at := func(i float64) Vec { q, _ := p.At(t0 + (t1-t0)*i/float64(steps)); return q }
			for i := range steps {
				a, b, mid := at(float64(i)), at(float64(i)+1), at(float64(i)+0.5)
				d.points = append(d.points, a.Rotate(float64(turn)*o.Pitch()))
				d.sag = max(d.sag, math.Abs(b.Sub(a).Cross(mid.Sub(a)))/b.Sub(a).Norm())
			}
		}
	}
	d.points = append(d.points, Vec{})
	return d
}

// offset returns the least distance of a point from the polygon, its two radial
// sides left out, negative inside, which is told by counting the edges that a ray crosses.
func (d drawnSector) offset(v Vec) float64 {
	least, inside := math.Inf(1), false
	for i, a := range d.points {
		b := d.points[(i+1)%len(d.points)]
		if (a.Y > v.Y) != (b.Y > v.Y) && v.X < a.X+(v.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X) {
			inside = !inside
		}
		if i < len(d.points)-2 {
			ab, av := b.Sub(a), v.Sub(a)
			share := min(max(av.Dot(ab)/ab.Dot(ab), 0), 1)
			least = min(least, av.Sub(ab.Scale(share)).Norm())
		}
	}
	if inside {
		return -least
	}
	return least
}

// The offset of points beside the profile of every kind of outline, on both sides,
// near and square to its pieces, about its corners and anywhere in the ring of the
// teeth, is their distance from a finely drawn polygon, with the sign of the side.
func TestOffsetByPolygon(t *testing.T) {
	specs := outlineSpecs()
	for _, c := range milledGears() {
		if c.spec.Mill.Diameter == 1.2 || c.thin != 0 {
			specs = append(specs, c.spec)
		}
	}
	for _, s := range specs {
		tooth := mustTooth(t, s)
		o, exact := tooth.Outline(), tooth.Profile()
		drawn := newDrawnSector(o, 100)
		m := s.Module
		var asked []Vec
		for _, p := range o.Pieces {
			t0, t1 := p.Domain()
			for _, share := range []float64{0, 0.003, 0.21, 0.5, 0.77, 0.998} {
				q, dq := p.At(t0 + (t1-t0)*share)
				n := dq.Left().Scale(1 / dq.Norm())
				for _, h := range []float64{-0.3, -0.04, -0.003, 0.003, 0.04, 0.3} {
					asked = append(asked, q.Add(n.Scale(h*m)))
				}
				for k := range 5 { // all round a place: at share 0 these are corners
					asked = append(asked, q.Add(Polar(0.05*m, 0.3+2*math.Pi*float64(k)/5)))
				}
			}
		}
		for i := range 40 {
			for j := range 7 {
				r := (tooth.RootDiameter() - m + (tooth.TipDiameter()-tooth.RootDiameter()+2*m)*(float64(j)+0.5)/7) / 2
				asked = append(asked, Polar(r, o.Pitch()*(float64(i)/40-0.5)))
			}
		}
		off := &worst{}
		for i, v := range asked {
			want, got := drawn.offset(v), exact.Offset(v.Rotate(o.Pitch()*float64(i%o.Teeth)))
			off.see(got - want)
			if d := math.Abs(got - want); d > 1.5*drawn.sag {
				t.Errorf("%+v: %v is %.9f from the polygon, offset %.9f", s, v, want, got)
			}
		}
		if !(off.value > 0) || drawn.sag > 5e-4*m {
			t.Errorf("%+v: polygon too coarse, %g, or the check is none", s, drawn.sag)
		}
	}
}

// On a gear of one tooth the flank rolls through more than half a turn: the points
// of its own outline still lie on it.
func TestOffsetOfOneTooth(t *testing.T) {
	tooth := mustTooth(t, Spec{
		Teeth: 1, Module: 3.8049, Helix: 0.6309, Shift: 0.58505,
		Rack: Rack{PressureAngle: 17.5 * Degree, Addendum: 0.7363, Dedendum: 0.99817, TipRadius: 0.64192},
	})
	if roll := tooth.RollAngle(tooth.TipFormDiameter()); roll <= math.Pi {
		t.Fatalf("it rolls through %g only", roll)
	}
	exact := tooth.Profile()
	for _, p := range tooth.Outline().Pieces {
		t0, t1 := p.Domain()
		for i := range 201 {
			q, _ := p.At(t0 + (t1-t0)*float64(i)/200)
			if off := exact.Offset(q); math.Abs(off) > 1e-9 {
				t.Errorf("piece of role %d, %d/200 along: offset %g", p.Role, i, off)
			}
		}
	}
}
