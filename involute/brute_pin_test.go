package involute

import (
	"fmt"
	"math"
	"testing"
)

// A wall is one side of a tooth space, drawn: the outline's pieces from the
// space's center line up to the tip, wound about the axis by twist rad/mm.
type wall struct {
	pieces []Piece
	center float64 // polar angle of the space's center line
	twist  float64
}

func newWall(t Tooth) wall {
	o := t.Outline()
	w := wall{center: -o.Pitch() / 2}
	for _, p := range o.Pieces {
		w.pieces = append(w.pieces, p)
		if p.Role == TipLand {
			break
		}
	}
	if pz, ok := t.Lead(); ok {
		w.twist = math.Copysign(2*math.Pi/pz, t.Spec().Helix)
	}
	return w
}

// gap returns the distance from a point at that radius, at angle beside from
// the space's center line, to one surface point's helix.
func (w wall) gap(radius, beside float64, q Vec) float64 {
	r, a := q.Norm(), q.Angle()-w.center-beside
	at := func(zeta float64) float64 {
		s := math.Sin((a + w.twist*zeta) / 2)
		return math.Sqrt((radius-r)*(radius-r) + 4*radius*r*s*s + zeta*zeta)
	}
	if w.twist == 0 {
		return at(0)
	}
	_, d := golden(at, min(0, -a/w.twist), max(0, -a/w.twist))
	return d
}

// nearest returns the distance to the pieces of the roles asked for (all, for
// none) and where on the wall it is.
func (w wall) nearest(radius, beside float64, roles ...Role) (least float64, role Role, contact float64) {
	least = math.Inf(1)
	for _, p := range w.pieces {
		asked := len(roles) == 0
		for _, r := range roles {
			asked = asked || r == p.Role
		}
		if !asked {
			continue
		}
		t0, t1 := p.Domain()
		u, d := lowest(func(u float64) float64 {
			q, _ := p.At(u)
			return w.gap(radius, beside, q)
		}, t0, t1, 24)
		if d < least {
			q, _ := p.At(u)
			least, role, contact = d, p.Role, 2*q.Norm()
		}
	}
	return least, role, contact
}

// push lowers a ball of diameter d along the space's center line until it
// touches, and returns its center's radius and what it touches.
func (w wall) push(d, from float64) (radius float64, role Role, contact float64) {
	free := func(c float64) bool {
		gap, _, _ := w.nearest(c, 0)
		return gap > d/2
	}
	high := from
	for free(high - d/50) {
		high -= d / 50
	}
	radius = bisect(free, high, high-d/50)
	_, role, contact = w.nearest(radius, 0)
	return radius, role, contact
}

type pushed struct {
	name  string
	tooth func(testing.TB) Tooth
	pin   float64
	on    Role // what the ball touches first
}

func pushedPins() []pushed {
	of := func(s Spec, thin float64) func(testing.TB) Tooth {
		return rolled{spec: s, thin: thin}.tooth
	}
	odd := Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: Rack{17.5 * Degree, 1, 1.25, 0.38}}
	left := odd
	left.Helix = -odd.Helix
	return []pushed{
		{"even spur", of(Spec{Teeth: 20, Module: 2, Rack: isoA()}, 0), 3.5, ToothFlank},
		{"even spur, thinned", of(Spec{Teeth: 20, Module: 2, Rack: isoA()}, 0.5), 3.5, ToothFlank},
		{"odd spur", of(Spec{Teeth: 17, Module: 2, Rack: isoA()}, 0), 3.5, ToothFlank},
		{"long addendum", of(Spec{Teeth: 20, Module: 3, Shift: 0.3, Rack: isoA()}, 0), 5.5, ToothFlank},
		{"many teeth", of(Spec{Teeth: 200, Module: 1, Shift: 0.3, Rack: isoA()}, 0.1), 1.75, ToothFlank},
		{"14.5 degrees", of(Spec{Teeth: 40, Module: 25.4 / 16, Rack: Rack{14.5 * Degree, 1, 1.157, 0.209}}, 0.03), 1.728 * 25.4 / 16, ToothFlank},
		{"chamfered", of(Spec{Teeth: 30, Module: 4, Rack: isoA(), TipChamfer: 0.3}, 0), 7, ToothFlank},
		{"helical even", of(Spec{Teeth: 20, Module: 3, Helix: 15 * Degree, Shift: 0.4, Rack: isoA()}, 0), 5.5, ToothFlank},
		{"helical odd", of(Spec{Teeth: 17, Module: 2, Helix: 25 * Degree, Rack: isoA()}, 0), 3.5, ToothFlank},
		{"helical steep", of(odd, 0), 3.25, ToothFlank},
		{"helical steep, left hand", of(left, 0.08), 3.25, ToothFlank},
		{"root first", of(Spec{Teeth: 40, Module: 2, Shift: -0.4, Rack: isoA()}, 0), 2.4, RootFillet},
		{"sharp root first", of(Spec{Teeth: 40, Module: 2, Shift: -0.4, Rack: Rack{20 * Degree, 1, 1.1, 0}}, 0), 2.4, RootLand},
		{"full radius fillet first", of(Spec{Teeth: 24, Module: 2, Rack: fullRadius(20, 1.25)}, 0), 2.34, RootFillet},
		{"helical, root first", of(Spec{Teeth: 40, Module: 2, Helix: 20 * Degree, Shift: -0.4, Rack: isoA()}, 0), 2.3, RootFillet},
		{"inside the undercut", of(Spec{Teeth: 8, Module: 2, Rack: isoA()}, 0), 2.8, RootFillet},
		{"milled, two arcs", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.2}}, 0.1), 3.5, ToothFlank},
		{"milled, radial line", of(Spec{Teeth: 12, Module: 2, Shift: 0.4, Rack: isoA(), Mill: MillSpec{Diameter: 1}}, 0), 3.8, ToothFlank},
		{"milled, one arc", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 3}}, 0), 3.5, ToothFlank},
		{"milled, arc just misses", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 3.45}}, 0), 3.5, ToothFlank},
		{"milled shallow, root land first", of(Spec{Teeth: 40, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 0.3, RootDiameter: 77.6}}, 0), 3, RootLand},
		{"milled, one arc too wide for the pin", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 4}}, 0), 3.5, RootFillet},
		{"rounded", of(Spec{Teeth: 30, Module: 4, Rack: isoA(), TipRound: 0.4}, 0), 7, ToothFlank},
		{"relieved", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: ReliefSpec{Amount: 0.02, Start: 50}}, 0.05), 3.5, ToothFlank},
		{"on the relief", of(Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: ReliefSpec{Amount: 0.02, Start: 49}}, 0), 4.2, ToothRelief},
		{"tip corner", of(Spec{Teeth: 40, Module: 2, Shift: -0.4, Rack: isoA()}, 0), 5.5, TipLand},
	}
}

// A ball pushed into the drawn space comes to rest where Seat says; where the
// root, an undercut or the tip corner stops it instead, the seat's own numbers say so.
func TestPushedBallRestsInSeat(t *testing.T) {
	for _, c := range pushedPins() {
		t.Run(c.name, func(t *testing.T) {
			tooth := c.tooth(t)
			w := newWall(tooth)
			radius, role, contact := w.push(c.pin, tooth.TipDiameter()/2+c.pin)
			seat, err := tooth.Seat(c.pin)
			if err != nil {
				t.Fatal(err)
			}
			clearance := tooth.PinRootClearance(seat)
			usable := seat.ContactDiameter > tooth.FormDiameter() && seat.ContactDiameter < tooth.InvoluteEndDiameter() && clearance > 0
			t.Logf("center %.9f touches role %d at %.6f; seat %.9f at %.6f; off by %.2g; root clearance %.6f",
				2*radius, role, contact, seat.CenterDiameter, seat.ContactDiameter, 2*radius-seat.CenterDiameter, clearance)
			corner := min(math.Abs(contact-tooth.FormDiameter()), math.Abs(contact-tooth.TipFormDiameter())) < 1e-6 // either neighbor may be the nearer
			if role != c.on && !corner {
				t.Errorf("touches role %d, expected %d", role, c.on)
			}
			if c.on == ToothFlank {
				near(t, "d_K", seat.CenterDiameter, 2*radius, 1e-9)
				near(t, "contact diameter", seat.ContactDiameter, contact, 2e-6) // a least distance tells its place to √ε only
			}
			if usable != (c.on == ToothFlank) {
				t.Errorf("seat usable %v, but the ball touches role %d", usable, role)
			}
			if rooted := role == RootLand || role == RootFillet && contact < tooth.FormDiameter()-1e-6; rooted && !(2*radius > seat.CenterDiameter) {
				t.Errorf("the root must hold the ball higher than the seat")
			}
			// The root's distance at the seat, by searching.
			gap, _, _ := w.nearest(seat.CenterDiameter/2, 0, RootLand, RootFillet)
			near(t, "root clearance", clearance, gap-c.pin/2, 1e-9)
		})
	}
}

// A straight pin along the helix's tangent at the ball's place touches the
// flanks there and nowhere cuts into them: what is read over straight pins
// follows from the ball's seat.
func TestStraightPinTouchesLikeBall(t *testing.T) {
	for _, c := range pushedPins() {
		tooth := c.tooth(t)
		if !tooth.Helical() || c.on != ToothFlank {
			continue
		}
		w := newWall(tooth)
		seat, err := tooth.Seat(c.pin)
		if err != nil {
			t.Fatal(err)
		}
		rK := seat.CenterDiameter / 2
		sin, cos := math.Sincos(math.Copysign(tooth.HelixAt(seat.CenterDiameter), w.twist))
		free := func(s float64) float64 { // of the point s along the pin's axis; the other flank is this one for −s
			beside := math.Atan2(s*sin, rK) - w.twist*s*cos
			gap, _, _ := w.nearest(math.Hypot(rK, s*sin), beside, ToothFlank)
			return gap
		}
		s, gap := lowest(free, -c.pin, c.pin, 10)
		near(t, c.name+": pin to flank", gap, c.pin/2, 1e-9)
		near(t, c.name+": place along the pin", s, 0, 1e-5) // to √ε only
	}
}

// The readings over two and three pins from the pushed centers: the anvils'
// distance by plane geometry.
func TestAnvilsOverPushedPins(t *testing.T) {
	for _, c := range pushedPins() {
		tooth := c.tooth(t)
		if c.on != ToothFlank {
			continue
		}
		radius, _, _ := newWall(tooth).push(c.pin, tooth.TipDiameter()/2+c.pin)
		z := tooth.Teeth()
		space := func(i int) Vec { return Polar(radius, 2*math.Pi*float64(i)/float64(z)) }
		two := space(0).Sub(space(z/2)).Norm() + c.pin
		near(t, c.name+": two", reading(t, tooth, TwoPins, c.pin).Value, two, 2e-9)
		if z%2 == 0 || tooth.Helical() {
			continue
		}
		// One anvil lies on both neighbors, its distance from the pin opposite is square to their line.
		a, b := space(z/2), space(z/2+1)
		square := b.Sub(a).Left().Scale(1 / b.Sub(a).Norm())
		three := math.Abs(square.Dot(a.Sub(space(0)))) + c.pin
		near(t, c.name+": three", reading(t, tooth, ThreePins, c.pin).Value, three, 2e-9)
	}
}

// Straight pins sliding between parallel anvils, as two straight lines in
// space: each turned about the axis along its own helix, symmetrically about the
// first's place, so that nothing of the closed form is used.
func TestFreePinsByTurningLines(t *testing.T) {
	type vec3 [3]float64
	cross := func(a, b vec3) vec3 {
		return vec3{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
	}
	dot := func(a, b vec3) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }
	for _, c := range []struct {
		z              int
		m, beta, x     float64
		alpha, pin, at float64
	}{
		{17, 2, 25, 0, 20, 3.5, 0}, {13, 1.5, 33, 0.5, 17.5, 3.25, 0}, {13, 1.5, -33, 0.5, 17.5, 3.25, 0.1},
		{21, 1, 8, 0, 20, 1.75, 0.05}, {35, 4, 15, -0.1, 20, 7, 0}, {9, 3, 45, 0.4, 20, 5.5, 0}, {101, 0.5, 30, 0, 14.5, 0.9, 0},
		{7, 2, 20, 0.5, 20, 4, 0}, {51, 3, 40, 0.2, 25, 5.5, 0.2},
	} {
		name := fmt.Sprintf("z %d β %v", c.z, c.beta)
		tooth := rolled{name, Spec{Teeth: c.z, Module: c.m, Helix: c.beta * Degree, Shift: c.x, Rack: isoAt(c.alpha)}, c.at}.tooth(t)
		seat, err := tooth.Seat(c.pin)
		if err != nil {
			t.Fatal(name, err)
		}
		r := seat.CenterDiameter / 2
		pz, _ := tooth.Lead()
		k := pz / (2 * math.Pi) // axial travel for a radian
		line := func(place, turn float64) (p, d vec3) {
			s, co := math.Sincos(place + turn)
			return vec3{r * co, r * s, k * turn}, vec3{-r * s, r * co, k}
		}
		apart := func(turn float64) float64 {
			p1, d1 := line(0, turn/2)
			p2, d2 := line(math.Pi-math.Pi/float64(c.z), -turn/2)
			n := cross(d1, d2)
			return math.Abs(dot(vec3{p2[0] - p1[0], p2[1] - p1[1], p2[2] - p1[2]}, n)) / math.Sqrt(dot(n, n))
		}
		turn, least := lowest(apart, -6*math.Pi/float64(c.z), 6*math.Pi/float64(c.z), 200) // not as far as where the lines are parallel
		got := reading(t, tooth, FreePins, c.pin)
		near(t, name+": free pins", got.Value, least+c.pin, 1e-9)
		near(t, name+": offset", math.Abs(got.AxialOffset), math.Abs(k*turn), 2e-5)
		t.Logf("%s: %.9f off by %.2g, offset %.6f", name, got.Value, got.Value-least-c.pin, got.AxialOffset)
	}
}
