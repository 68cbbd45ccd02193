package involute

import (
	"math"
	"testing"
)

func relievedGears() []rolled {
	linear := func(amount, start float64) ReliefSpec { return ReliefSpec{Amount: amount, Start: start} }
	parabolic := func(amount, start float64) ReliefSpec { return ReliefSpec{amount, start, true} }
	return []rolled{
		{"linear", Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: linear(0.02, 50)}, 0},
		{"parabolic", Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: parabolic(0.02, 50)}, 0.1},
		{"strong, linear", Spec{Teeth: 30, Module: 4, Rack: isoA(), Relief: linear(0.15, 124)}, 0},
		{"strong, parabolic", Spec{Teeth: 30, Module: 4, Rack: isoA(), Relief: parabolic(0.15, 124)}, 0},
		{"helical", Spec{Teeth: 21, Module: 3, Helix: 25 * Degree, Shift: 0.2, Rack: isoA(), Relief: linear(0.03, 73)}, 0.05},
		{"helical, parabolic", Spec{Teeth: 21, Module: 3, Helix: -25 * Degree, Shift: 0.2, Rack: isoA(), Relief: parabolic(0.03, 73)}, 0.05},
		{"few teeth", Spec{Teeth: 9, Module: 2, Shift: 0.4, Rack: isoA(), Relief: linear(0.03, 21)}, 0},
		{"from just above the base circle", Spec{Teeth: 40, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1}, Relief: parabolic(0.03, 77.5)}, 0},
		{"a hair from the tip", Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: linear(1e-5, 51.999)}, 0},
		{"chamfered", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipChamfer: 0.25, Relief: linear(0.02, 50)}, 0},
		{"chamfered, parabolic", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipChamfer: 0.25, Relief: parabolic(0.02, 50)}, 0},
		{"rounded", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipRound: 0.2, Relief: linear(0.02, 50)}, 0},
		{"topped", Spec{Teeth: 24, Module: 2, Rack: isoA(), Topped: true, Relief: parabolic(0.02, 50)}, 0.3},
		{"many teeth", Spec{Teeth: 150, Module: 1, Rack: isoA(), Relief: parabolic(0.01, 151)}, 0},
	}
}

// What a relief has taken off is the least distance of the relieved flank's points
// from the string-drawn involute: the amount asked at the tip diameter, nothing at
// the start, and between them the share, or its square, of the string unwound.
// A linear relief starts with a break, by its rise over the length of the string.
func TestReliefByDistance(t *testing.T) {
	amounts, between, breaks := &worst{}, &worst{}, &worst{}
	for _, c := range relievedGears() {
		tooth := c.tooth(t)
		relief := c.spec.Relief
		space := newStringSpace(tooth, tooth.RootDiameter())
		space.full = space.unwoundTo(tooth.TipDiameter()/2 + 0.1*c.spec.Module)
		// The relieved piece of the tooth's first flank bounds the space below it.
		off := func(p Vec) (gap, unwound float64) {
			p = p.Rotate(math.Pi / float64(c.spec.Teeth))
			unwound, gap = lowest(func(u float64) float64 { return space.end(u).Sub(p).Norm() }, 0, space.full, 100)
			return gap, unwound
		}
		piece, ok := tooth.Outline().pieces(ToothRelief)[0].(Relief)
		if !ok {
			t.Fatalf("%s: no relief drawn", c.name)
		}
		t0, t1 := piece.Domain()
		start, _ := piece.At(t0)
		near(t, c.name+": start", 2*start.Norm(), relief.Start, 1e-9)
		// The tip's own point is on the drawn piece where no chamfer or rounding took it off.
		end, _ := piece.At(t1)
		near(t, c.name+": end", 2*end.Norm(), tooth.TipFormDiameter(), 1e-9)
		whole := piece
		whole.T1 = bisect(func(u float64) bool { p, _ := piece.At(u); return 2*p.Norm() < tooth.TipDiameter() }, t0, t1+0.5)
		tip, _ := whole.At(whole.T1)
		taken, last := off(tip)
		amounts.see(taken - relief.Amount)
		first := space.unwoundTo(relief.Start / 2)
		for i := range 21 {
			p, _ := piece.At(t0 + (t1-t0)*float64(i)/20)
			gap, unwound := off(p)
			share := (unwound - first) / (last - first)
			if relief.Parabolic {
				share *= share
			}
			between.see(gap - relief.Amount*share)
		}
		_, before := tooth.Outline().pieces(ToothFlank)[0].At(tooth.RollAngle(relief.Start))
		_, after := piece.At(t0)
		turn, rise := math.Atan2(before.Cross(after), before.Dot(after)), 0.0
		if !relief.Parabolic {
			rise = relief.Amount / (last - first)
		}
		breaks.see(turn - math.Atan(rise/(space.base*first)))
	}
	amounts.within(t, "amount at the tip diameter, mm", 1e-9)
	between.within(t, "amount between, mm", 1e-8) // a least distance tells its place to √ε only
	breaks.within(t, "break at the start, rad", 1e-8)
}

// realHalfAngleAt and so the tip land agree with the drawn relieved flank.
func TestReliefNarrowsTip(t *testing.T) {
	for _, c := range relievedGears() {
		tooth := c.tooth(t)
		for _, share := range []float64{0.1, 0.5, 0.9} {
			d := c.spec.Relief.Start + share*(tooth.TipFormDiameter()-c.spec.Relief.Start)
			drawn, ok := tooth.Outline().angleAt(d/2, ToothRelief)
			if !ok {
				t.Fatalf("%s: no flank drawn at %g", c.name, d)
			}
			near(t, c.name+": half angle", tooth.realHalfAngleAt(d), drawn, 1e-12)
		}
		d := c.spec.Relief.Start - 1e-3
		near(t, c.name+": below", tooth.realHalfAngleAt(d), tooth.HalfAngleAt(d), 0)
	}
}

// The turn through which drawn involutes touch, the relieved pieces left out, over
// the pitch: the contact ratio that is left without load.
func TestDrawnPairUnrelievedRatio(t *testing.T) {
	iso := isoA()
	first := Spec{Teeth: 24, Module: 2, Rack: iso, Relief: ReliefSpec{Amount: 0.02, Start: 50}}
	second := Spec{Teeth: 36, Module: 2, Rack: iso, Relief: ReliefSpec{0.02, 74.5, true}}
	plain := Spec{Teeth: 36, Module: 2, Rack: iso}
	late := first
	late.Relief.Start, late.TipRound = 51.8, 0.3 // all of it within the rounding
	pairs := []meshed{
		{"both relieved", first, second, 0.03, 0.03, 0.02},
		{"one relieved", first, plain, 0.03, 0, 0.05},
		{"relief gone with the rounding", late, plain, 0.03, 0, 0.05},
		{"helical", Spec{Teeth: 18, Module: 2, Helix: 15 * Degree, Rack: iso, Relief: ReliefSpec{Amount: 0.01, Start: 39.5}},
			Spec{Teeth: 45, Module: 2, Helix: -15 * Degree, Rack: iso, Relief: ReliefSpec{0.01, 96, true}}, 0.04, 0.06, 0.03},
		{"milled", Spec{Teeth: 24, Module: 2, Rack: iso, Mill: MillSpec{Diameter: 2}, Relief: ReliefSpec{Amount: 0.02, Start: 50.5}}, plain, 0.03, 0.02, 0.02},
	}
	off := &worst{}
	for _, c := range pairs {
		m, t1, t2, a := c.make(t)
		got, err := m.Contact(a, t1, t2)
		if err != nil {
			t.Fatal(c.name, err)
		}
		drawn := drawnPair{a, t1.Outline(), t2.Outline()}.ratio()
		off.see(got.UnrelievedRatio - drawn)
		t.Logf("%s: %.9f, drawn %.9f, in all %.9f", c.name, got.UnrelievedRatio, drawn, got.TransverseRatio)
		if relief := c.name != "relief gone with the rounding"; relief != (got.UnrelievedRatio < got.TransverseRatio-0.01) {
			t.Errorf("%s: %.6f without the reliefs, %.6f with them", c.name, got.UnrelievedRatio, got.TransverseRatio)
		}
	}
	off.within(t, "contact ratio", 5e-7)
}

// Reliefs that cannot be are refused with the reason and a limit that works.
func TestReliefsThatCannotBe(t *testing.T) {
	spec := func(r ReliefSpec) Spec { return Spec{Teeth: 24, Module: 2, Rack: isoA(), Relief: r} }
	tooth := mustTooth(t, spec(ReliefSpec{}))
	for _, c := range []struct {
		name  string
		r     ReliefSpec
		why   Reason
		limit float64
	}{
		{"no amount", ReliefSpec{Start: 50}, ReliefTooLarge, 0},
		{"negative", ReliefSpec{Amount: -0.01, Start: 50}, ReliefTooLarge, 0},
		{"no start", ReliefSpec{Amount: 0.02}, ReliefOff, tooth.BaseDiameter()},
		{"in the fillet", ReliefSpec{Amount: 0.02, Start: (tooth.BaseDiameter() + tooth.FormDiameter()) / 2}, ReliefOff, tooth.FormDiameter()},
		{"above the tip", ReliefSpec{Amount: 0.02, Start: 52}, ReliefOff, 52},
	} {
		g, err := NewGear(spec(c.r))
		if err == nil {
			_, err = g.Nominal()
		}
		near(t, c.name, refusedFor(t, c.name, err, c.why).Limit, c.limit, 1e-12)
	}
	_, err := NewGear(spec(ReliefSpec{Amount: 1, Start: 50}))
	e := refusedFor(t, "too strong", err, ReliefTooLarge)
	mustTooth(t, spec(ReliefSpec{Amount: e.Limit * 0.999, Start: 50}))
	// A tooth all but pointed has no more to take off than half its tip.
	thin := Spec{Teeth: 12, Module: 2, Shift: 0.55, Rack: isoA(), Relief: ReliefSpec{Amount: 0.18, Start: 26}}
	g, err := NewGear(thin)
	if err != nil {
		t.Fatal(err)
	}
	_, err = g.Tooth(g.NominalThickness() - 0.2)
	e = refusedFor(t, "pointed by its relief", err, ReliefTooLarge)
	for share, fits := range map[float64]bool{0.999: true, 1.001: false} {
		thin.Relief.Amount = e.Limit * share
		if g, err = NewGear(thin); err == nil {
			_, err = g.Tooth(g.NominalThickness() - 0.2)
		}
		if fits != (err == nil) {
			t.Errorf("%v of the largest amount: %v", share, err)
		}
	}
}
