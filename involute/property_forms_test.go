package involute

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// between draws a number whose logarithm lies evenly between those of low and high.
func between(t *rapid.T, what string, low, high float64) float64 {
	return math.Pow(10, rapid.Float64Range(math.Log10(low), math.Log10(high)).Draw(t, what))
}

// oneIn is true for one draw in n.
func oneIn(t *rapid.T, what string, n int) bool { return rapid.IntRange(1, n).Draw(t, what) == 1 }

// drawFormSpec draws gears with everything a drawing can ask of a tooth's form, in
// sizes from nothing to far too much.
func drawFormSpec(t *rapid.T) Spec {
	s := drawSpec(t)
	m := s.Module
	s.Teeth = int(math.Round(between(t, "z", 3, 1000)))
	s.TipChamfer = 0
	if rapid.Bool().Draw(t, "spur") {
		s.Helix = 0
	}
	d := float64(s.Teeth) * m / math.Cos(s.Helix)
	full := d + 2*m*(s.Rack.Addendum+s.Shift)
	if oneIn(t, "own tip", 4) {
		s.TipDiameter = full + m*rapid.Float64Range(-0.6, 0.4).Draw(t, "tip")
		full = s.TipDiameter
	}
	s.Topped = oneIn(t, "topped", 4)
	s.Thinning = Thinning(rapid.IntRange(0, 1).Draw(t, "thinning"))
	switch rapid.IntRange(0, 4).Draw(t, "corner") {
	case 0:
		s.TipChamfer = m * between(t, "chamfer", 1e-6, 3)
	case 1, 2:
		s.TipRound = m * between(t, "rounding", 1e-6, 3)
	}
	if oneIn(t, "relief", 2) {
		s.Relief = ReliefSpec{
			Amount:    m * between(t, "amount", 1e-7, 1),
			Start:     full - m*between(t, "relief's height", 1e-6, 3),
			Parabolic: rapid.Bool().Draw(t, "parabolic"),
		}
	}
	if oneIn(t, "milled", 2) {
		s.Mill.Diameter = m * between(t, "mill", 1e-4, 100)
		if rapid.Bool().Draw(t, "own root") {
			s.Mill.RootDiameter = full * rapid.Float64Range(-0.1, 1.1).Draw(t, "root")
		}
		if !oneIn(t, "milled as it comes", 8) {
			s.Helix = 0
		}
	}
	return s
}

// drawForm draws a tooth of such a gear. What cannot be must be refused by
// reason, with finite numbers.
func drawForm(t *rapid.T) Tooth {
	for range 50 {
		s := drawFormSpec(t)
		g, err := NewGear(s)
		if err == nil {
			var tooth Tooth
			thin := rapid.Float64Range(-0.05, 0.3).Draw(t, "thin")
			if oneIn(t, "any thickness", 5) {
				thin = rapid.Float64Range(-2, 2).Draw(t, "thinner or thicker")
			}
			tooth, err = g.Tooth(g.NominalThickness() - thin*s.Module)
			if err == nil {
				return tooth
			}
		}
		var imp *Impossible
		if !errors.As(err, &imp) || !finite(imp.Value, imp.Limit) {
			t.Fatalf("%+v: refused by %v", s, err)
		}
	}
	t.Skip("no possible gear among fifty")
	return Tooth{}
}

// gapAfter returns how far the piece after the i-th starts from its end.
func (o Outline) gapAfter(i int) float64 {
	_, t1 := o.Pieces[i].Domain()
	end, _ := o.Pieces[i].At(t1)
	next, turn := 0, o.Pitch()
	if i+1 < len(o.Pieces) {
		next, turn = i+1, 0
	}
	t0, _ := o.Pieces[next].Domain()
	start, _ := o.Pieces[next].At(t0)
	return start.Rotate(turn).Sub(end).Norm()
}

// Any form's outline hangs together and closes, has finite curvature, and the metal
// on its left: points to the left of it have a negative offset, to the right a
// positive one.
func TestPropertyFormOutline(t *testing.T) {
	seen := map[Role]int{}
	milled := 0
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawForm(t)
		o, exact := tooth.Outline(), tooth.Profile()
		ra, m := tooth.TipDiameter()/2, tooth.Module()
		slack := 64*ulp(ra) + 2*noLand*ra // a root land too short to be drawn
		if tooth.Undercut() {
			slack *= 16 // the crossing of two curves at a small angle
		}
		if tooth.Spec().Mill.Diameter > 0 {
			milled++
			slack += 4e-12 * m // a mill's center is a large radius away from its arc
		}
		for i, p := range o.Pieces {
			seen[p.Role]++
			t0, t1 := p.Domain()
			if !(t0 < t1) {
				t.Fatalf("piece %d, role %d: domain %g to %g", i, p.Role, t0, t1)
			}
			if gap := o.gapAfter(i); !(gap <= slack) {
				t.Fatalf("piece %d, role %d, ends %g from the next", i, p.Role, gap)
			}
			for _, share := range []float64{0, 0.1, 0.5, 0.9, 1} {
				u := t0 + (t1-t0)*share
				q, dq := p.At(u)
				k := p.Curvature(u)
				allFinite(t, "point", q)
				allFinite(t, "derivative", dq)
				allFinite(t, "curvature", k)
				if !(dq.Norm() > 0) {
					t.Fatalf("piece %d, role %d: no direction at %g", i, p.Role, u)
				}
				h := min(1e-5*m, 0.02*dq.Norm()*(t1-t0), 0.1/math.Abs(k))
				if share == 0 || share == 1 || h < 1e4*slack {
					continue
				}
				n := dq.Left().Scale(h / dq.Norm())
				if in, out := exact.Offset(q.Add(n)), exact.Offset(q.Sub(n)); !(in < 0 && out > 0) {
					t.Fatalf("piece %d, role %d, share %g: %g to the left is %g, to the right %g", i, p.Role, share, h, in, out)
				}
			}
		}
		if land := tooth.TipLand(); !(land > 0) {
			t.Fatalf("tip land %g", land)
		}
	})
	t.Logf("pieces by role: %v, %d milled", seen, milled)
	for role := RootLand; role <= TipLand; role++ {
		if seen[role] == 0 {
			t.Errorf("no piece of role %d drawn", role)
		}
	}
}

// drawMate draws a gear that can run with the tooth's, false where it came out impossible.
func drawMate(t *rapid.T, tooth Tooth) (Tooth, bool) {
	s := Spec{Teeth: rapid.IntRange(12, 80).Draw(t, "mate"), Module: tooth.Module(), Helix: -tooth.Spec().Helix, Rack: tooth.Spec().Rack}
	s.TipRound = s.Module * rapid.Float64Range(0, 0.2).Draw(t, "mate's rounding")
	g, err := NewGear(s)
	if err != nil {
		return Tooth{}, false
	}
	mate, err := g.Nominal()
	return mate, err == nil
}

// Every question about any form is answered with finite numbers or refused by reason.
func TestPropertyFormNumbers(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawForm(t)
		ask := func(what string, err error, xs ...float64) {
			var imp *Impossible
			if err != nil && (!errors.As(err, &imp) || !finite(imp.Value, imp.Limit)) {
				t.Fatalf("%s: %v", what, err)
			}
			if err == nil && !finite(xs...) {
				t.Fatalf("%s: %v", what, xs)
			}
		}
		ask("diameters", nil, tooth.RootDiameter(), tooth.FormDiameter(), tooth.TipFormDiameter(), tooth.InvoluteEndDiameter())
		if !(tooth.RootDiameter() < tooth.FormDiameter()+1e-12 && tooth.FormDiameter() < tooth.TipFormDiameter() &&
			tooth.TipFormDiameter() <= tooth.TipDiameter() && tooth.InvoluteEndDiameter() <= tooth.TipFormDiameter()) {
			t.Fatalf("root %g, form %g, involute to %g, tip form %g, tip %g", tooth.RootDiameter(), tooth.FormDiameter(),
				tooth.InvoluteEndDiameter(), tooth.TipFormDiameter(), tooth.TipDiameter())
		}
		allFinite(t, "fillet end", tooth.FilletEnd())
		ask("land", nil, tooth.TipLand(), tooth.TipThickness(), tooth.LargestMill(), tooth.PointedDiameter())
		if mill := tooth.Spec().Mill.Diameter; mill > 0 && !(tooth.LargestMill() >= mill*(1-1e-9)) && mill < tooth.TipDiameter() {
			t.Fatalf("milled with %g, largest %g", mill, tooth.LargestMill())
		}
		pin, err := tooth.PinTouchingAt((tooth.FormDiameter() + tooth.InvoluteEndDiameter()) / 2)
		ask("pin", err, pin)
		if seat, err := tooth.Seat(pin); err == nil {
			allFinite(t, "seat", seat)
			ask("root clearance", nil, tooth.PinRootClearance(seat))
		}
		mate, ok := drawMate(t, tooth)
		if !ok {
			return
		}
		mesh, err := NewMesh(tooth.Gear, mate.Gear)
		if err != nil {
			t.Fatal(err)
		}
		a, err := mesh.TightCenter(tooth.Thickness(), mate.Thickness())
		if err != nil {
			return
		}
		contact, err := mesh.Contact(a, tooth, mate)
		ask("contact", err)
		allFinite(t, "contact", contact)
		if !(contact.UnrelievedRatio <= contact.TransverseRatio+1e-12) {
			t.Fatalf("contact ratio %g, unrelieved %g", contact.TransverseRatio, contact.UnrelievedRatio)
		}
		for _, first := range []bool{true, false} {
			if gap, err := mesh.FilletClearance(a, tooth, mate, first); err != nil || math.IsNaN(gap) || math.IsInf(gap, -1) {
				t.Fatalf("fillet clearance %g, %v", gap, err)
			}
		}
	})
}
