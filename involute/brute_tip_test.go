package involute

import (
	"math"
	"testing"
)

// A drawnTip is the upper part of one tooth without its rounding or chamfer, the
// tooth's center line being +x: the first flank, below it, and the tip circle.
type drawnTip struct {
	flanks []Curve
	ra     float64
}

func newDrawnTip(t testing.TB, s Spec, thin float64) drawnTip {
	s.TipRound, s.TipChamfer = 0, 0
	tooth := rolled{"bare", s, thin}.tooth(t)
	d := drawnTip{ra: tooth.TipDiameter() / 2}
	for _, p := range tooth.Outline().Pieces {
		if p.Role == TipLand {
			break
		}
		if p.Role == ToothFlank || p.Role == ToothRelief {
			d.flanks = append(d.flanks, p.Curve)
		}
	}
	return d
}

// nearest returns the least distance of a point from the drawn flank, and where.
func (d drawnTip) nearest(m Vec) (gap float64, at Vec) {
	gap = math.Inf(1)
	for _, f := range d.flanks {
		t0, t1 := f.Domain()
		u, g := lowest(func(u float64) float64 { p, _ := f.At(u); return p.Sub(m).Norm() }, t0, t1, 60)
		if g < gap {
			gap = g
			at, _ = f.At(u)
		}
	}
	return gap, at
}

// round lays a circle of that radius into the tooth, touching the tip circle from
// inside, and slides it toward the flank until it touches that too. It is false
// where the circle has no room on the tooth's center line.
func (d drawnTip) round(rho float64) (center, touches Vec, ok bool) {
	stands := func(turn float64) Vec { return Polar(d.ra-rho, -turn) }
	free := func(turn float64) bool { gap, _ := d.nearest(stands(turn)); return gap > rho }
	if rho >= d.ra || !free(0) {
		return Vec{}, Vec{}, false
	}
	turn, by := 0.0, rho/20/d.ra
	for free(turn + by) {
		turn += by
	}
	center = stands(bisect(free, turn, turn+by))
	_, touches = d.nearest(center)
	return center, touches, true
}

func roundedGears() []rolled {
	iso := isoA()
	return []rolled{
		{"plain", Spec{Teeth: 24, Module: 2, Rack: iso, TipRound: 0.3}, 0},
		{"hardly", Spec{Teeth: 24, Module: 2, Rack: iso, TipRound: 0.001}, 0},
		{"nearly all of the land", Spec{Teeth: 40, Module: 2, Rack: iso, TipRound: 0.84}, 0},
		{"few teeth", Spec{Teeth: 9, Module: 2, Shift: 0.3, Rack: iso, TipRound: 0.2}, 0.05},
		{"flanks moved", Spec{Teeth: 12, Module: 2, Shift: 0.3, Rack: iso, TipRound: 0.2, Thinning: FlanksOnly}, 0.2},
		{"helical", Spec{Teeth: 21, Module: 3, Helix: 25 * Degree, Rack: iso, TipRound: 0.4}, 0.1},
		{"topped", Spec{Teeth: 30, Module: 2, Rack: iso, Topped: true, TipRound: 0.3}, 0.3},
		{"own tip", Spec{Teeth: 30, Module: 2, Rack: iso, TipDiameter: 63.5, TipRound: 0.2}, 0},
		{"milled", Spec{Teeth: 24, Module: 2, Rack: iso, Mill: MillSpec{Diameter: 1.5}, TipRound: 0.3}, 0.1},
		{"linear relief", Spec{Teeth: 24, Module: 2, Rack: iso, TipRound: 0.2, Relief: ReliefSpec{Amount: 0.02, Start: 50}}, 0},
		{"parabolic relief", Spec{Teeth: 24, Module: 2, Rack: iso, TipRound: 0.3, Relief: ReliefSpec{0.03, 49, true}}, 0},
		{"relief within the rounding", Spec{Teeth: 24, Module: 2, Rack: iso, TipRound: 0.3, Relief: ReliefSpec{0.001, 51.9, true}}, 0},
	}
}

// The rounding is the circle of its radius that lies in the tooth and touches flank
// and tip circle: center, tip land, tip form diameter.
func TestRoundingByLayingCircle(t *testing.T) {
	centers, lands, forms := &worst{}, &worst{}, &worst{}
	for _, c := range roundedGears() {
		tooth := c.tooth(t)
		drawn := newDrawnTip(t, c.spec, c.thin)
		center, touches, ok := drawn.round(c.spec.TipRound)
		if !ok {
			t.Fatalf("%s: the circle finds no room", c.name)
		}
		arc := tooth.Outline().pieces(TipRounding)[0].(Arc)
		centers.see(arc.Center.Sub(center).Norm())
		centers.see(arc.Radius - c.spec.TipRound)
		helixThere := math.Atan(math.Tan(c.spec.Helix) * tooth.TipDiameter() / tooth.ReferenceDiameter())
		lands.see(tooth.TipLand() - 2*drawn.ra*-center.Angle()*math.Cos(helixThere))
		forms.see(tooth.TipFormDiameter() - 2*touches.Norm())
	}
	centers.within(t, "rounding's center and radius, mm", 1e-9)
	lands.within(t, "tip land, mm", 1e-9)
	forms.within(t, "tip form diameter, mm", 1e-6) // a least distance tells its place to √ε only
}

// Where a linear relief breaks the flank just above the place at which a rounding
// touches the involute, the circle rests on the relieved flank already: roundings
// that end below, on and above the break.
func TestRoundingAtReliefBreak(t *testing.T) {
	centers, joints := &worst{}, &worst{}
	on := map[bool]int{}
	for i := range 41 {
		s := Spec{Teeth: 24, Module: 2, Rack: isoA(), TipRound: 0.3, Relief: ReliefSpec{Amount: 0.02, Start: 51.5 + 0.0065*float64(i)}}
		tooth := mustTooth(t, s)
		center, _, _ := newDrawnTip(t, s, 0).round(s.TipRound)
		o := tooth.Outline()
		arc := o.pieces(TipRounding)[0].(Arc)
		centers.see(arc.Center.Sub(center).Norm())
		on[len(o.pieces(ToothRelief)) > 0]++
		end, _ := arc.At(1)
		joints.see(end.Norm() - tooth.TipDiameter()/2)
	}
	centers.within(t, "rounding's center, mm", 1e-9)
	joints.within(t, "its end to the tip circle, mm", 1e-12)
	if on[true] < 5 || on[false] < 5 {
		t.Errorf("roundings on relieved flanks and below: %v", on)
	}
}

// A rounding too large is refused with the largest circle that has room on the
// tooth's center line, however much too large it was.
func TestLargestRounding(t *testing.T) {
	off := &worst{}
	for _, c := range roundedGears() {
		if c.spec.Relief.Start > 51 { // the largest circle rests below the relief
			continue
		}
		drawn := newDrawnTip(t, c.spec, c.thin)
		largest := bisect(func(rho float64) bool { _, _, ok := drawn.round(rho); return ok }, 1e-3, 2*c.spec.Module)
		for _, asked := range []float64{1.001 * largest, 1.2 * largest, 50 * c.spec.Module} {
			s := c.spec
			s.TipRound = asked
			g, err := NewGear(s)
			if err == nil {
				_, err = g.Tooth(g.NominalThickness() - c.thin)
				e := refusedFor(t, c.name, err, RoundTooLarge)
				off.see(e.Limit - largest)
				s.TipRound = e.Limit
				rolled{c.name, s, c.thin}.tooth(t)
				continue
			}
			// So large that no tooth of this gear has room: what the nominal tooth can have.
			e := refusedFor(t, c.name, err, RoundTooLarge)
			if s.TipRound = e.Limit; !s.Topped && !(e.Limit >= largest-1e-9) {
				t.Errorf("%s: the largest is %g at nominal thickness, %g when thinned", c.name, e.Limit, largest)
			}
			rolled{c.name, s, 0}.tooth(t)
		}
	}
	off.within(t, "largest rounding, mm", 1e-9)
}

// A chamfer runs at 45° to the tooth's center line from where the drawn flank is
// its height below the tip circle; one too large is refused with the largest that fits.
func TestChamferByDrawing(t *testing.T) {
	land := func(s Spec, thin, height float64) (half float64, from Vec) {
		bare := s
		bare.TipChamfer = 0
		tooth := rolled{"bare", bare, thin}.tooth(t)
		ra := tooth.TipDiameter() / 2
		angle, ok := tooth.Outline().angleAt(ra-height, ToothFlank, ToothRelief)
		if !ok {
			t.Fatalf("no flank %g below the tip", height)
		}
		from = Polar(ra-height, -angle)
		run := bisect(func(k float64) bool { return from.Add(Vec{k, k}).Norm() < ra }, 0, 4*height)
		return -from.Add(Vec{run, run}).Angle(), from
	}
	for _, c := range []rolled{
		{"plain", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipChamfer: 0.3}, 0},
		{"helical, thinned", Spec{Teeth: 21, Module: 3, Helix: 25 * Degree, Rack: isoA(), TipChamfer: 0.4}, 0.1},
		{"relieved", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipChamfer: 0.25, Relief: ReliefSpec{Amount: 0.02, Start: 50}}, 0},
		{"topped", Spec{Teeth: 30, Module: 2, Rack: isoA(), Topped: true, TipChamfer: 0.3}, 0.3},
	} {
		tooth := c.tooth(t)
		half, from := land(c.spec, c.thin, c.spec.TipChamfer)
		line := tooth.Outline().pieces(Chamfer)[0].(Line)
		near(t, c.name+": from", line.From.Sub(from).Norm(), 0, 1e-9)
		helixThere := math.Atan(math.Tan(c.spec.Helix) * tooth.TipDiameter() / tooth.ReferenceDiameter())
		near(t, c.name+": tip land", tooth.TipLand(), tooth.TipDiameter()*half*math.Cos(helixThere), 1e-9)

		largest := bisect(func(h float64) bool { half, _ := land(c.spec, c.thin, h); return half > 0 }, 1e-3, c.spec.Module)
		s := c.spec
		s.TipChamfer = 1.1 * largest
		g, err := NewGear(s)
		if err != nil {
			t.Fatal(c.name, err)
		}
		_, err = g.Tooth(g.NominalThickness() - c.thin)
		e := refusedFor(t, c.name, err, ChamferTooLarge)
		near(t, c.name+": largest", e.Limit, largest, 1e-9)
		s.TipChamfer = e.Limit
		rolled{c.name, s, c.thin}.tooth(t)
		s.TipChamfer = 40 * c.spec.Module
		_, err = NewGear(s)
		s.TipChamfer = refusedFor(t, c.name, err, ChamferTooLarge).Limit
		rolled{c.name, s, 0}.tooth(t)
	}
}

// A topping cutter fed deeper takes as much off the tip as off the root, found here
// by lowering a rack with straight flanks until the tooth is as thin as asked.
func TestToppedTip(t *testing.T) {
	for _, s := range []Spec{
		{Teeth: 24, Module: 2, Rack: isoA(), Topped: true},
		{Teeth: 17, Module: 3, Shift: 0.3, Helix: 20 * Degree, Rack: isoAt(17.5), Topped: true},
		{Teeth: 24, Module: 2, Rack: isoA(), TipDiameter: 51.4, Topped: true},
		{Teeth: 24, Module: 2, Rack: isoA(), Topped: true, TipChamfer: 0.2},
	} {
		full := mustTooth(t, s)
		for _, thin := range []float64{0.03, 0.2, 0.4} {
			tooth := rolled{"topped", s, thin}.tooth(t)
			lower := bisect(func(deeper float64) bool { return 2*deeper*math.Tan(s.Rack.PressureAngle) < thin }, 0, 10)
			near(t, "tip", tooth.TipDiameter(), full.TipDiameter()-2*lower, 1e-9)
			near(t, "root", tooth.RootDiameter(), full.RootDiameter()-2*lower, 1e-9)
			near(t, "TipDiameterAt", full.TipDiameterAt(tooth.Thickness()), tooth.TipDiameter(), 1e-12)
			near(t, "TipDiameterAt of the thin tooth's gear", tooth.TipDiameterAt(full.Thickness()), full.TipDiameter(), 1e-12)
			land := tooth.Outline().pieces(TipLand)[0].(Arc)
			near(t, "drawn tip", 2*land.Radius, tooth.TipDiameter(), 0)
			near(t, "chamfer's height", tooth.TipDiameter()-tooth.TipFormDiameter(), 2*s.TipChamfer, 1e-12)
		}
		// Moved flanks and untopped tips leave the tip where it is.
		still := s
		still.Thinning = FlanksOnly
		near(t, "flanks moved", rolled{"", still, 0.2}.tooth(t).TipDiameter(), full.TipDiameter(), 1e-12)
		still = s
		still.Topped = false
		near(t, "not topped", rolled{"", still, 0.2}.tooth(t).TipDiameter(), full.TipDiameter(), 1e-12)
	}
	// Fed so deep that the tip comes below the start of its relief.
	s := Spec{Teeth: 24, Module: 2, Rack: isoA(), Topped: true, Relief: ReliefSpec{Amount: 0.01, Start: 51.5}}
	g, err := NewGear(s)
	if err != nil {
		t.Fatal(err)
	}
	_, err = g.Tooth(g.NominalThickness() - 0.3)
	refusedFor(t, "relief above the topped tip", err, ReliefOff)
}
