package involute

import (
	"fmt"
	"math"
	"testing"
)

// A drawnPair is two outlines at a center distance a, each as one tooth to be
// repeated. The first gear's center is the origin and its tooth 0 points along
// +x at turn 0; the second's center is (a, 0) and a space points along −x at
// turn 0, its tooth 0 being the one above. Turns are counter-clockwise.
type drawnPair struct {
	a      float64
	o1, o2 Outline
}

// angleAt returns the polar angle from the tooth's center line of its
// counter-clockwise side at a radius, by halving the drawn piece that passes there.
func (o Outline) angleAt(radius float64, roles ...Role) (angle float64, ok bool) {
	for _, c := range o.pieces(roles...) {
		t0, t1 := c.Domain()
		high, _ := c.At(t0)
		low, _ := c.At(t1)
		if low.Angle() < 0 || radius > high.Norm() || radius < low.Norm() {
			continue
		}
		u := bisect(func(u float64) bool { q, _ := c.At(u); return q.Norm() > radius }, t0, t1)
		q, _ := c.At(u)
		return q.Angle(), true
	}
	return 0, false
}

// gap returns by what angle the second gear's tooth i stands clear of the point
// u on the counter-clockwise flank of the first's tooth i, seen from the second's center.
func (d drawnPair) gap(i int, u, turn1, turn2 float64, roles ...Role) (float64, bool) {
	q, _ := d.o1.pieces(ToothFlank)[1].At(u)
	q = q.Rotate(turn1 + float64(i)*d.o1.Pitch())
	v := Vec{d.a, 0}.Sub(q)
	side, ok := d.o2.angleAt(v.Norm(), roles...)
	tooth := turn2 - (float64(i)+0.5)*d.o2.Pitch()
	return v.Angle() - tooth - side, ok
}

// play returns how far the second gear can turn counter-clockwise until pieces
// of those roles touch the first's flanks. Clockwise it is the play of the mirror image, both turns negated.
func (d drawnPair) play(turn1, turn2 float64, roles ...Role) float64 {
	least := math.Inf(1)
	t0, t1 := d.o1.pieces(ToothFlank)[1].Domain()
	for i := -2; i <= 2; i++ {
		_, g := lowest(func(u float64) float64 {
			if g, ok := d.gap(i, u, turn1, turn2, roles...); ok {
				return g
			}
			return math.Inf(1)
		}, t0, t1, 60)
		least = min(least, g)
	}
	return least
}

// touches reports whether tooth 0 of both touch flank on flank at turn1, the
// second gear following: the least gap lies between the ends of both flanks.
func (d drawnPair) touches(turn1 float64) bool {
	t0, t1 := d.o1.pieces(ToothFlank)[1].Domain()
	gap := func(u float64) float64 { g, _ := d.gap(0, u, turn1, 0, ToothFlank); return g }
	there := func(u float64) bool { _, ok := d.gap(0, u, turn1, 0, ToothFlank); return ok }
	// The part of the first's flank at radii that the second's flank has.
	const n = 400
	first, last := -1, -1
	at := func(i int) float64 { return t0 + (t1-t0)*float64(i)/n }
	for i := range n + 1 {
		if there(at(i)) {
			if first < 0 {
				first = i
			}
			last = i
		}
	}
	if last-first < 1 {
		return false
	}
	a, b := at(first), at(last)
	if first > 0 {
		a = bisect(there, a, at(first-1))
	}
	if last < n {
		b = bisect(there, b, at(last+1))
	}
	// The ends of that part must be higher than points a hair inside.
	h := 1e-7 * (b - a)
	a, b = a+1e-12*(b-a), b-1e-12*(b-a)
	return gap(a+h) < gap(a) && gap(b-h) < gap(b)
}

// ratio returns the turn through which tooth 0 touches, in pitches.
func (d drawnPair) ratio() float64 {
	p := d.o1.Pitch()
	// Some turn at which they touch, then the ends to both sides.
	const n = 60
	for i := range n + 1 {
		if turn := 2 * p * (2*float64(i)/n - 1); d.touches(turn) {
			low, high := turn-4*p/n, turn+2*p
			return (bisect(d.touches, turn, high) - bisect(d.touches, turn, low)) / p
		}
	}
	return 0
}

type meshed struct {
	name         string
	s1, s2       Spec
	thin1, thin2 float64
	wider        float64 // center distance beyond the tight one of nominal teeth
}

func meshedPairs() []meshed {
	iso := isoA()
	return []meshed{
		{"plain", Spec{Teeth: 20, Module: 3, Rack: iso}, Spec{Teeth: 40, Module: 3, Rack: iso}, 0.05, 0.05, 0.03},
		{"wide", Spec{Teeth: 20, Module: 3, Rack: iso}, Spec{Teeth: 40, Module: 3, Rack: iso}, 0, 0, 0.4},
		{"shifted", Spec{Teeth: 12, Module: 3, Shift: 0.6, Rack: iso, TipDiameter: 44.839739}, Spec{Teeth: 24, Module: 3, Shift: 0.36, Rack: iso, TipDiameter: 79.399739}, 0.05, 0.02, 0.1},
		{"helical", Spec{Teeth: 18, Module: 2, Helix: 15 * Degree, Shift: 0.2, Rack: iso}, Spec{Teeth: 45, Module: 2, Helix: -15 * Degree, Shift: -0.1, Rack: iso}, 0.04, 0.06, 0.03},
		{"14.5 degrees", Spec{Teeth: 35, Module: 4, Rack: isoAt(14.5)}, Spec{Teeth: 40, Module: 4, Rack: isoAt(14.5)}, 0.05, 0.08, 0.05},
		{"undercut", Spec{Teeth: 10, Module: 2, Rack: iso}, Spec{Teeth: 40, Module: 2, Rack: iso}, 0.05, 0.05, 0},
		{"undercut, m 1", Spec{Teeth: 10, Module: 1, Rack: iso}, Spec{Teeth: 30, Module: 1, Rack: iso}, 0.02, 0.02, 0},
		{"chamfered", Spec{Teeth: 22, Module: 2, Rack: iso, TipChamfer: 0.1}, Spec{Teeth: 33, Module: 2, Rack: iso, TipChamfer: 0.1}, 0.02, 0.03, 0.02},
	}
}

// make returns the pair's mesh, teeth and center distance.
func (c meshed) make(t testing.TB) (m Mesh, t1, t2 Tooth, a float64) {
	t.Helper()
	t1 = rolled{c.name, c.s1, c.thin1}.tooth(t)
	t2 = rolled{c.name, c.s2, c.thin2}.tooth(t)
	m, err := NewMesh(t1.Gear, t2.Gear)
	if err != nil {
		t.Fatal(c.name, err)
	}
	a, err = m.TightCenter(t1.NominalThickness(), t2.NominalThickness())
	if err != nil {
		t.Fatal(c.name, err)
	}
	return m, t1, t2, a + c.wider
}

// Two drawn gears, one held, the other turned both ways until it touches: the
// backlash angle, the same in every position, either gear held.
func TestDrawnPairBacklash(t *testing.T) {
	off := &worst{}
	for _, c := range meshedPairs() {
		m, t1, t2, a := c.make(t)
		p, err := m.Backlash(a, t1.Thickness(), t2.Thickness())
		if err != nil {
			t.Fatal(c.name, err)
		}
		for i, d := range []drawnPair{{a, t1.Outline(), t2.Outline()}, {a, t2.Outline(), t1.Outline()}} {
			want := p.AngleSecond
			if i == 1 {
				want = p.AngleFirst
			}
			for _, share := range []float64{0, 0.23, 0.5, 0.81} {
				turn1 := share * d.o1.Pitch()
				turn2 := -share * d.o2.Pitch()
				got := d.play(turn1, turn2, ToothFlank, RootFillet) + d.play(-turn1, -turn2, ToothFlank, RootFillet)
				off.see(got - want)
				near(t, fmt.Sprintf("%s, gear %d held, at %v of a pitch", c.name, i+1, share), want, got, 1e-12)
			}
		}
	}
	off.within(t, "backlash angle, rad", 1e-12)
}

// The turn through which one pair of drawn flanks touches, over the pitch: the
// contact ratio, undercut and chamfers included. The pair z 10/40 was computed
// elsewhere with 60 digits: 1.092709.
func TestDrawnPairContactRatio(t *testing.T) {
	off := &worst{}
	for _, c := range meshedPairs() {
		m, t1, t2, a := c.make(t)
		if c.name == "undercut" {
			t1, t2 = rolled{"", c.s1, 0}.tooth(t), rolled{"", c.s2, 0}.tooth(t)
		}
		got, err := m.Contact(a, t1, t2)
		if err != nil {
			t.Fatal(c.name, err)
		}
		drawn := drawnPair{a, t1.Outline(), t2.Outline()}.ratio()
		off.see(got.TransverseRatio - drawn)
		t.Logf("%s: %.9f, drawn %.9f", c.name, got.TransverseRatio, drawn)
		if c.name == "undercut" {
			near(t, "z 10/40", drawn, 1.092709, 0.6e-6)
		}
	}
	off.within(t, "contact ratio", 5e-7)
}

// corners returns points of the corner between tip land and second flank, with its
// rounding or chamfer where it has one.
func (o Outline) corners() []Vec {
	for i, p := range o.Pieces {
		if p.Role != TipLand {
			continue
		}
		next := o.Pieces[i+1]
		t0, t1 := next.Domain()
		var vs []Vec
		for j := range 19 { // not the places that FilletClearance looks at
			v, _ := next.At(t0 + (t1-t0)*float64(j)/18)
			vs = append(vs, v)
			if next.Role != Chamfer && next.Role != TipRounding {
				break
			}
		}
		return vs
	}
	return nil
}

// tipToFillet returns the least gap across, along the circle round the first
// gear, between the second's tip corner and the first's fillet while the pair rolls with flanks touching;
// +Inf where the corner never comes down to the fillet.
func (d drawnPair) tipToFillet() float64 {
	touching, least := d.play(0, 0, ToothFlank), math.Inf(1)
	for _, corner := range d.o2.corners() {
		least = min(least, d.pointToFillet(corner, touching))
	}
	return least
}

// pointToFillet is tipToFillet of one point, the second gear turned so that flanks touch.
func (d drawnPair) pointToFillet(corner Vec, touching float64) float64 {
	ratio := d.o2.Pitch() / d.o1.Pitch()
	gap := func(turn1 float64) float64 {
		tooth := touching - turn1*ratio - 0.5*d.o2.Pitch()
		q := Vec{d.a, 0}.Add(corner.Rotate(math.Pi + tooth)).Rotate(-turn1)
		side, ok := d.o1.angleAt(q.Norm(), RootFillet)
		if !ok {
			return math.Inf(1)
		}
		return q.Norm() * (q.Angle() - side)
	}
	const n = 900
	_, least := lowest(gap, -1.5*d.o1.Pitch(), 1.5*d.o1.Pitch(), n)
	// The least may be where the corner passes the fillet's end.
	at := func(i int) float64 { return 1.5 * d.o1.Pitch() * (2*float64(i)/n - 1) }
	there := func(turn1 float64) bool { return !math.IsInf(gap(turn1), 1) }
	for i := range n {
		if a, b := at(i), at(i+1); there(a) != there(b) {
			if there(b) {
				a, b = b, a
			}
			edge := bisect(there, a, b)
			least = min(least, gap(edge-1e-12*(b-a)))
		}
	}
	return least
}

// The mate's tip against the fillet: the pairs that ISO 53 meant for each other
// never meet there, a mate with long tips cuts in, and the least gap is what
// passing the drawn corner through the drawn space gives.
func TestDrawnPairFilletClearance(t *testing.T) {
	pairs := meshedPairs()
	long := Spec{Teeth: 60, Module: 2, Rack: isoA(), TipDiameter: 124.8}
	shallow := Rack{20 * Degree, 1, 1.1, 0.3}
	clash := map[string]bool{"long tips": true, "shallow root": true}
	pairs = append(pairs,
		meshed{"long tips", Spec{Teeth: 18, Module: 2, Rack: isoA()}, long, 0, 0, 0},
		meshed{"shallow root", Spec{Teeth: 20, Module: 2, Rack: shallow}, Spec{Teeth: 50, Module: 2, Rack: shallow, TipDiameter: 104.15}, 0, 0, 0},
		meshed{"slightly long", Spec{Teeth: 30, Module: 2, Rack: isoA()}, Spec{Teeth: 40, Module: 2, Rack: isoA(), TipDiameter: 84.02}, 0.05, 0.05, 0.05},
	)
	for _, c := range pairs {
		m, t1, t2, a := c.make(t)
		for i, d := range []drawnPair{{a, t1.Outline(), t2.Outline()}, {a, t2.Outline(), t1.Outline()}} {
			drawn := d.tipToFillet()
			got, err := m.FilletClearance(a, t1, t2, i == 0)
			if err != nil {
				t.Fatal(c.name, err)
			}
			t.Logf("%s, fillet of gear %d: %.9f, drawn %.9f", c.name, i+1, got, drawn)
			if i == 0 && clash[c.name] != (drawn < -1e-9) {
				t.Errorf("%s: drawn gap %g", c.name, drawn)
			}
			if math.IsInf(drawn, 1) && math.IsInf(got, 1) {
				continue
			}
			near(t, fmt.Sprintf("%s, fillet of gear %d", c.name, i+1), got, drawn, 1e-6*c.s1.Module)
		}
	}
}
