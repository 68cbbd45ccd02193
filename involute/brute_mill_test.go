package involute

import (
	"fmt"
	"math"
	"testing"
)

// A stringSpace is half a tooth space as drawn on paper: the space's center line
// is +x, and its counter-clockwise flank the end of a string unwound from the base
// circle, with the radial line below.
type stringSpace struct {
	base, root, tip float64 // radii, mm
	start           float64 // polar angle at which the string leaves the base circle
	full            float64 // the unwound angle at which the flank ends
}

// end returns the end of the string when it is unwound by that angle.
func (s stringSpace) end(unwound float64) Vec {
	on := Polar(s.base, s.start+unwound)
	return on.Add(Vec{on.Y, -on.X}.Scale(unwound)) // back along the tangent by the arc set free
}

// unwoundTo returns the unwound angle at which the string's end is at that radius.
func (s stringSpace) unwoundTo(radius float64) float64 {
	return bisect(func(u float64) bool { return s.end(u).Norm() < radius }, 0, 20)
}

// newStringSpace draws the space beside teeth, in the transverse section, as thick as asked on the
// reference circle, down to the root circle and up to the end of the involute.
func newStringSpace(t Tooth, root float64) stringSpace {
	spec := t.Spec()
	across := math.Cos(spec.Helix)
	r := float64(spec.Teeth) * spec.Module / across / 2
	lean := math.Atan2(math.Tan(spec.Rack.PressureAngle), across)
	s := stringSpace{base: r * math.Cos(lean), root: root / 2, tip: t.InvoluteEndDiameter() / 2}
	// With the string started at 0, the flank passes the reference circle here:
	here := s.end(s.unwoundTo(r)).Angle()
	s.start = (math.Pi*spec.Module-t.Thickness())/across/2/r - here
	s.full = s.unwoundTo(s.tip)
	return s
}

// nearest returns the distance of a point from the drawn flank and the radius of
// the flank's nearest point.
func (s stringSpace) nearest(m Vec) (gap, radius float64) {
	u, gap := lowest(func(u float64) float64 { return s.end(u).Sub(m).Norm() }, 0, s.full, 40)
	radius = s.end(u).Norm()
	r, line := lowest(func(r float64) float64 { return Polar(r, s.start).Sub(m).Norm() }, 0, s.base, 40)
	if line < gap {
		return line, r
	}
	return gap, radius
}

// A restingMill is where a pushed circle of that radius comes to rest.
type restingMill struct {
	center Vec
	foot   float64 // radius at which it touches the flank
	single bool    // touching both flanks
	passes bool    // touching them below their end
}

// push lowers the circle along the center line until it touches flank or root
// circle, then moves it aside to the flank.
func (s stringSpace) push(rho float64) restingMill {
	free := func(m Vec) bool { gap, _ := s.nearest(m); return gap > rho }
	high, floor, step := s.tip+2*rho, s.root+rho, min(rho, s.tip-s.root)/25
	for high > floor && free(Vec{max(high-step, floor), 0}) {
		high = max(high-step, floor)
	}
	var w restingMill
	if high > floor {
		w.single = true
		c := bisect(func(c float64) bool { return free(Vec{c, 0}) }, high, max(high-step, floor))
		w.center = Vec{c, 0}
	} else {
		aside, by := 0.0, step/floor
		for free(Polar(floor, aside+by)) {
			aside += by
		}
		w.center = Polar(floor, bisect(func(turn float64) bool { return free(Polar(floor, turn)) }, aside, aside+by))
	}
	_, w.foot = s.nearest(w.center)
	w.passes = w.foot < s.tip-1e-7
	return w
}

// milledGears are gears of many and few teeth with mills from thin to wide.
func milledGears() []rolled {
	var cs []rolled
	for _, z := range []int{8, 12, 17, 24, 45, 100} {
		for _, x := range []float64{-0.3, 0, 0.45} {
			for _, share := range []float64{0.15, 0.6, 1.0, 1.4, 1.9, 2.6, 3.4} {
				s := Spec{Teeth: z, Module: 2, Shift: x, Rack: isoA(), Mill: MillSpec{Diameter: 2 * share}}
				cs = append(cs, rolled{fmt.Sprintf("z %d x %v mill %v", z, x, 2*share), s, 0})
			}
		}
	}
	old := Rack{14.5 * Degree, 1, 1.157, 0.209}
	return append(cs,
		rolled{"thinned", Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1}}, 0.2},
		rolled{"own root", Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1, RootDiameter: 42}}, 0},
		rolled{"shallow root", Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.5, RootDiameter: 46}}, 0.1},
		rolled{"deep slot", Spec{Teeth: 10, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1, RootDiameter: 9}}, 0},
		rolled{"pin-sized axle", Spec{Teeth: 7, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 0.6, RootDiameter: 2}}, 0},
		rolled{"14.5 degrees", Spec{Teeth: 40, Module: 25.4 / 16, Rack: old, Mill: MillSpec{Diameter: 1.5}}, 0.03},
		rolled{"25 degrees, one arc", Spec{Teeth: 20, Module: 3, Rack: isoAt(25), Mill: MillSpec{Diameter: 4}}, 0},
		rolled{"relieved", Spec{Teeth: 30, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.6}, Relief: ReliefSpec{Amount: 0.02, Start: 62}}, 0},
		rolled{"chamfered", Spec{Teeth: 30, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1.6}, TipChamfer: 0.2}, 0},
		rolled{"very many teeth", Spec{Teeth: 300, Module: 1, Rack: isoA(), Mill: MillSpec{Diameter: 0.5}}, 0},
	)
}

// millArc returns the first arc of a milled root, and whether the root circle comes before it.
func (o Outline) millArc() (arc Arc, land bool) {
	first := o.Pieces[0]
	if land = first.Role == RootLand; land {
		first = o.Pieces[1]
	}
	arc, _ = first.Curve.(Arc)
	return arc, land
}

// A circle pushed into the drawn space comes to rest where the milled root has
// its arc; where it rests on the ends of the flanks, the mill is refused.
func TestPushedMillLeavesRoot(t *testing.T) {
	roots, forms, centers := &worst{}, &worst{}, &worst{}
	count := map[string]int{}
	for _, c := range milledGears() {
		g, err := NewGear(c.spec)
		if err != nil {
			t.Fatal(c.name, err)
		}
		sn := g.NominalThickness() - c.thin
		rho := c.spec.Mill.Diameter / 2
		bare := Tooth{Gear: g, sn: sn}
		space := newStringSpace(bare, g.RootDiameterAt(sn))
		rests := space.push(rho)
		tooth, err := g.Tooth(sn)
		if !rests.passes {
			count["refused"]++
			if e := refusedFor(t, c.name, err, MillTooLarge); e.Value != 2*rho {
				t.Errorf("%s: refused for a mill of %g", c.name, e.Value)
			}
			continue
		}
		if err != nil {
			t.Errorf("%s: %v, but the circle touches at %.6f", c.name, err, 2*rests.foot)
			continue
		}
		arc, land := tooth.Outline().millArc()
		count[map[bool]string{true: "one arc", false: "two arcs"}[rests.single]]++
		if 2*rests.foot < g.BaseDiameter() {
			count["radial line"]++
		}
		if rests.single == land {
			t.Errorf("%s: one arc %v, root land %v", c.name, rests.single, land)
		}
		center := rests.center.Rotate(-math.Pi / float64(c.spec.Teeth))
		centers.see(arc.Center.Sub(center).Norm())
		centers.see(arc.Radius - rho)
		roots.see(tooth.RootDiameter() - 2*(rests.center.Norm()-rho))
		forms.see(tooth.FormDiameter() - max(2*rests.foot, g.BaseDiameter()))
		if tooth.Undercut() {
			t.Errorf("%s: a mill undercuts nothing", c.name)
		}
	}
	centers.within(t, "arc's center and radius, mm", 1e-9)
	roots.within(t, "root diameter, mm", 1e-9)
	forms.within(t, "form diameter, mm", 1e-5) // a least distance tells its place to √ε only
	for _, what := range []string{"one arc", "two arcs", "refused", "radial line"} {
		if count[what] < 3 {
			t.Errorf("only %d gears with %s", count[what], what)
		}
	}
	t.Log(count)
}

// The largest mill by pushing larger and larger circles; the error of one too large
// names it, it passes, and one a thousandth larger does not.
func TestLargestMillByPushing(t *testing.T) {
	off := &worst{}
	for _, c := range milledGears() {
		if c.spec.Mill.Diameter != 1.2 && c.thin == 0 && c.spec.Mill.RootDiameter == 0 && c.spec.Relief == (ReliefSpec{}) {
			continue // the mill at hand does not matter
		}
		g, err := NewGear(c.spec)
		if err != nil {
			t.Fatal(c.name, err)
		}
		sn := g.NominalThickness() - c.thin
		space := newStringSpace(Tooth{Gear: g, sn: sn}, g.RootDiameterAt(sn))
		pushed := bisect(func(d float64) bool { return space.push(d / 2).passes }, 0.01, 3*g.TipDiameter())
		with := func(d float64) error {
			s := c.spec
			s.Mill.Diameter = d
			g, err := NewGear(s)
			if err != nil {
				t.Fatal(c.name, err)
			}
			_, err = g.Tooth(sn)
			return err
		}
		e := refusedFor(t, c.name, with(3*g.TipDiameter()), MillTooLarge)
		off.see((e.Limit - pushed) / c.spec.Module)
		t.Logf("%s: %.7f, pushed %.7f", c.name, e.Limit, pushed)
		if err := with(e.Limit); err != nil {
			t.Errorf("%s: the largest, %g, is refused: %v", c.name, e.Limit, err)
		}
		refusedFor(t, c.name, with(1.001*e.Limit), MillTooLarge)
		if tooth, err := g.Tooth(sn); err == nil {
			near(t, c.name+": LargestMill", tooth.LargestMill(), e.Limit, 1e-12)
		}
	}
	off.within(t, "largest mill, of the module", 1e-5)
}

// LargestMill of a generated tooth is that of the same tooth milled as deep, and there is none where an end mill cannot work.
func TestLargestMillOfOtherRoots(t *testing.T) {
	generated := rolled{"", Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.2}.tooth(t)
	space := newStringSpace(generated, generated.RootDiameter())
	pushed := bisect(func(d float64) bool { return space.push(d / 2).passes }, 0.01, 12)
	near(t, "generated", generated.LargestMill(), pushed, 2e-5)
	for name, s := range map[string]Spec{
		"helical": {Teeth: 24, Module: 2, Helix: 20 * Degree, Rack: isoA()},
		"ring":    {Teeth: -60, Module: 2, Rack: isoA()},
	} {
		if d := mustTooth(t, s).LargestMill(); d != 0 {
			t.Errorf("%s: largest mill %g", name, d)
		}
	}
}

// Mills that cannot be are refused with the reason.
func TestMillsThatCannotBe(t *testing.T) {
	for _, c := range []struct {
		name string
		z    int
		beta float64
		mill MillSpec
		why  Reason
	}{
		{"helical", 24, 20, MillSpec{Diameter: 1}, MillHelical},
		{"ring", -60, 0, MillSpec{Diameter: 1}, NotExternal},
		{"negative", 24, 0, MillSpec{Diameter: -1}, NotFinite},
		{"no mill but a root", 24, 0, MillSpec{RootDiameter: 40}, NotFinite},
		{"negative root", 24, 0, MillSpec{1, -40}, MillTooDeep},
		{"root at the tip", 24, 0, MillSpec{1, 52}, MillTooDeep},
	} {
		_, err := NewGear(Spec{Teeth: c.z, Module: 2, Helix: c.beta * Degree, Rack: isoA(), Mill: c.mill})
		refusedFor(t, c.name, err, c.why)
	}
	// A root hardly below the tip leaves no flank to touch, but a thin mill does.
	shallow := Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{1, 51.999}}
	g, err := NewGear(shallow)
	if err != nil {
		t.Fatal(err)
	}
	_, err = g.Nominal()
	e := refusedFor(t, "hardly a groove", err, MillTooLarge)
	if shallow.Mill.Diameter = e.Limit; e.Limit <= 0 {
		t.Fatalf("largest %g", e.Limit)
	}
	mustTooth(t, shallow)
}

// Where two pieces of an outline run on into each other, the turn between them is
// nothing: all joints of a milled root, the ends of a rounding, where a parabolic
// relief begins, and a generated fillet with a flank that is not undercut.
func TestSmoothJoints(t *testing.T) {
	specs := outlineSpecs()
	for _, c := range milledGears() {
		specs = append(specs, c.spec)
	}
	off, joints := &worst{}, map[[2]Role]int{}
	for _, s := range specs {
		g, err := NewGear(s)
		if err != nil {
			t.Fatal(err)
		}
		tooth, err := g.Nominal()
		if err != nil {
			continue // a mill too large: see TestPushedMillLeavesRoot
		}
		ps := tooth.Outline().Pieces
		for i, p := range ps[:len(ps)-1] {
			kind := [2]Role{min(p.Role, ps[i+1].Role), max(p.Role, ps[i+1].Role)}
			switch {
			case kind[1] == TipLand && kind[0] != TipRounding, kind[1] == Chamfer, kind == [2]Role{RootLand, ToothFlank}, // corners
				kind == [2]Role{RootFillet, ToothFlank} && tooth.Undercut(),
				kind == [2]Role{ToothFlank, ToothRelief} && !s.Relief.Parabolic,
				kind == [2]Role{RootLand, RootFillet} && s.Rack.TipRadius == 0 && s.Mill.Diameter == 0:
				continue
			}
			_, t1 := p.Domain()
			t0, _ := ps[i+1].Domain()
			_, before := p.At(t1)
			_, after := ps[i+1].At(t0)
			if !(before.Norm() > 0 && after.Norm() > 0) {
				t.Fatalf("%+v: joint %v without direction", s, kind)
			}
			joints[kind]++
			off.see(math.Atan2(before.Cross(after), before.Dot(after)))
		}
	}
	off.within(t, "turn at a joint, rad", 1e-9)
	for _, kind := range [][2]Role{{RootLand, RootFillet}, {RootFillet, RootFillet}, {RootFillet, ToothFlank}, {ToothFlank, ToothRelief}, {ToothFlank, TipRounding}, {ToothRelief, TipRounding}, {TipRounding, TipLand}} {
		if joints[kind] < 2 {
			t.Errorf("joint %v: only %d", kind, joints[kind])
		}
	}
}
