package involute

import (
	"fmt"
	"math"
	"testing"
)

// deepest rolls the second gear's tooth 0, all of its outline, through the first
// gear with flanks touching and returns the least offset of its points from the
// first's profile: negative where it cuts in.
func (d drawnPair) deepest(own Profile) float64 {
	touching := d.play(0, 0, ToothFlank)
	ratio := d.o2.Pitch() / d.o1.Pitch()
	var points []Vec
	for _, p := range d.o2.Pieces {
		t0, t1 := p.Domain()
		for i := range 17 {
			q, _ := p.At(t0 + (t1-t0)*float64(i)/16)
			points = append(points, q)
		}
	}
	least := math.Inf(1)
	for i := range 401 {
		turn1 := 1.5 * d.o1.Pitch() * (float64(i)/200 - 1)
		tooth := touching - turn1*ratio - 0.5*d.o2.Pitch()
		for _, q := range points {
			least = min(least, own.Offset(Vec{d.a, 0}.Add(q.Rotate(math.Pi+tooth)).Rotate(-turn1)))
		}
	}
	return least
}

func milledPairs() []meshed {
	iso := isoA()
	var ps []meshed
	plain := Spec{Teeth: 36, Module: 2, Rack: iso}
	rounded, chamfered, relieved := plain, plain, plain
	rounded.TipRound, chamfered.TipChamfer = 0.4, 0.25
	relieved.Relief = ReliefSpec{Amount: 0.02, Start: 74.5}
	for _, mill := range []float64{1.4, 2.2, 2.4, 2.5, 3.4} {
		own := Spec{Teeth: 24, Module: 2, Rack: iso, Mill: MillSpec{Diameter: mill}}
		for name, mate := range map[string]Spec{"plain": plain, "rounded": rounded, "chamfered": chamfered, "relieved": relieved} {
			ps = append(ps, meshed{fmt.Sprintf("mill %v, %s mate", mill, name), own, mate, 0.04, 0.05, 0.03})
		}
	}
	few := Spec{Teeth: 12, Module: 2, Rack: iso, Mill: MillSpec{Diameter: 1}}
	shifted := few
	shifted.Shift = 0.4
	deep, shallow := shifted, shifted
	deep.Mill.RootDiameter, shallow.Mill.RootDiameter = 18, 21.2
	return append(ps,
		meshed{"tip below the base circle", few, plain, 0.05, 0.05, 0},
		meshed{"radial line", shifted, plain, 0.05, 0.05, 0},
		meshed{"deep slot", deep, plain, 0.05, 0.05, 0},
		meshed{"hardly deep enough", shallow, plain, 0.05, 0.05, 0.05},
		meshed{"both milled", Spec{Teeth: 24, Module: 2, Rack: iso, Mill: MillSpec{Diameter: 1.6}}, Spec{Teeth: 45, Module: 2, Rack: iso, Mill: MillSpec{Diameter: 2}}, 0.05, 0.05, 0},
	)
}

// The mate's tip against a milled root: the least gap across is what passing the
// drawn corner, rounding or chamfer through the drawn space gives, and no gap is
// promised where any point of the mate's outline cuts into the root. Tips that run
// into the root circle are TipClearances' to say.
func TestRolledMateInMilledRoot(t *testing.T) {
	cut, clear, off := 0, 0, &worst{}
	for _, c := range milledPairs() {
		m, t1, t2, a := c.make(t)
		d := drawnPair{a, t1.Outline(), t2.Outline()}
		got, err := m.FilletClearance(a, t1, t2, true)
		if err != nil {
			t.Fatal(c.name, err)
		}
		_, below := m.TipClearances(a, t1, t2)
		deepest := d.deepest(t1.Profile())
		t.Logf("%s: gap %.6f, below the tip %.6f, deepest point %.6f", c.name, got, below, deepest)
		if says, is := got < 0 || below < 0, deepest < -1e-7; says != is {
			t.Errorf("%s: gap %.6f, below the tip %.6f, but the deepest point lies at %.6f", c.name, got, below, deepest)
		}
		if deepest < -1e-7 {
			cut++
		} else {
			clear++
		}
		contact, err := m.Contact(a, t1, t2)
		if err != nil {
			t.Fatal(c.name, err)
		}
		if below <= 0 || contact.PastForm1 > 0 {
			continue // the drawn gears then touch elsewhere than on the line of action
		}
		drawn := d.tipToFillet()
		if math.IsInf(drawn, 1) && math.IsInf(got, 1) {
			continue
		}
		tol := 1e-6 * c.s1.Module
		if c.s2.TipRound > 0 {
			tol = 1e-3 * c.s2.TipRound // as FilletClearance samples it
		}
		off.see(got - drawn)
		near(t, c.name, got, drawn, tol)
	}
	t.Logf("%d cut in, %d clear, gaps off by %.2g", cut, clear, off.value)
	if cut < 5 || clear < 5 {
		t.Errorf("%d cut in, %d clear", cut, clear)
	}
}
