package inspect

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// handMesh is the pair that the tests below work out by hand: m 3, 20 and 40 teeth,
// a = 90 ± 0.03, so that the working pressure angle is 20° and the pitch circles
// are the reference circles.
func handMesh(t testing.TB) PlanMesh {
	t.Helper()
	rack := involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}
	g1, err1 := involute.NewGear(involute.Spec{Teeth: 20, Module: 3, Rack: rack})
	g2, err2 := involute.NewGear(involute.Spec{Teeth: 40, Module: 3, Rack: rack})
	if err1 != nil || err2 != nil {
		t.Fatal(err1, err2)
	}
	m, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	return PlanMesh{First: 0, Second: 1, Mesh: m, Center: Limits{89.97, 90.03}}
}

// thinned returns the thickness limits of teeth thinner than nominal by a range.
func thinned(g *involute.Gear, least, most float64) Limits {
	return PlanGear{Gear: g}.Thickness(Limits{least, most})
}

// A whole budget by hand, first order. Everything is spelled out as on paper: a
// center distance off by δ makes 2 δ tan 20°, a runout F_r moves it by F_r/2; a
// pitch deviation f_pt on the reference circle is itself there; what lies along the
// line of action is divided by cos 20°; heat moves the center by a Δα ΔT. The
// sum of the exact calculation is done again from the involutes.
func TestBudgetByHand(t *testing.T) {
	m := handMesh(t)
	m.Deviations = [2]Deviations{
		{Runout: 0.030, Pitch: 0.012, Profile: 0.015, Helix: 0.017},
		{Runout: 0.040, Measured: true, Pitch: 0.014, Profile: 0.017, Helix: 0.020},
	}
	m.Climate = &Climate{Temperature: Limits{5, 60}, Expansion: [2]float64{11.5e-6, 11.5e-6}, Housing: 23.6e-6}
	first, second := thinned(m.Mesh.First, 0.04, 0.08), thinned(m.Mesh.Second, 0.05, 0.07)
	b, err := m.Budget(first, second)
	if err != nil {
		t.Fatal(err)
	}
	const tan20, cos20 = 0.363970234, 0.939692621
	if want := 0.06 + 0.06; math.Abs(b.Middle-want) > 1e-12 {
		t.Errorf("middle: %v, by hand %v", b.Middle, want)
	}
	want := []Contribution{
		{OfCenter, -1, 2 * 0.03 * tan20, 2 * 0.03 * tan20, false},
		{OfRunout, 0, 0.030 * tan20, 0.030 * tan20, false},
		{OfRunout, 1, 0.040 * tan20, 0.040 * tan20, true},
		{OfPitch, 0, 0.012, 0.012, false},
		{OfPitch, 1, 0.014, 0.014, false},
		{OfProfile, 0, 0.015 / cos20, 0.015 / cos20, false},
		{OfProfile, 1, 0.017 / cos20, 0.017 / cos20, false},
		{OfHelix, 0, 0.017 / cos20, 0, false},
		{OfHelix, 1, 0.020 / cos20, 0, false},
		{OfClimate, -1, 2 * 90 * (23.6e-6 - 11.5e-6) * 15 * tan20, 2 * 90 * (23.6e-6 - 11.5e-6) * 40 * tan20, true},
		{OfTeeth, 0, 0.02, 0.02, false},
		{OfTeeth, 1, 0.01, 0.01, false},
	}
	if len(b.Rows) != len(want) {
		t.Fatalf("%d rows, by hand %d: %+v", len(b.Rows), len(want), b.Rows)
	}
	takes, adds, takesSquared, addsSquared, sure := 0.0, 0.0, 0.0, 0.0, Limits{}
	for i, w := range want {
		r := b.Rows[i]
		if r.Cause != w.Cause || r.Gear != w.Gear || r.Certain != w.Certain {
			t.Errorf("row %d is %+v, by hand %+v", i, r, w)
		}
		if math.Abs(r.Takes-w.Takes) > 0.02*w.Takes || math.Abs(r.Adds-w.Adds) > 0.02*w.Adds {
			t.Errorf("row %d takes %.6f and adds %.6f, by hand %.6f and %.6f", i, r.Takes, r.Adds, w.Takes, w.Adds)
		}
		takes, adds = takes+w.Takes, adds+w.Adds
		// Means and three standard deviations of a half normal distribution, and of the
		// distance in a plane (Rayleigh), both cut at three: tables of statistics.
		mean, three := 0.0, 1.0
		switch {
		case w.Certain:
			mean, three = 1, 0
		case w.Cause == OfRunout:
			mean, three = 0.4101, 0.5899
		case w.Cause == OfPitch || w.Cause == OfProfile || w.Cause == OfHelix:
			mean, three = 0.2637, 0.5894
		}
		sure.Min, sure.Max = sure.Min+mean*w.Takes, sure.Max+mean*w.Adds
		takesSquared, addsSquared = takesSquared+three*three*w.Takes*w.Takes, addsSquared+three*three*w.Adds*w.Adds
	}
	nearly := func(what string, got Limits, low, high float64) {
		if math.Abs(got.Min-low) > 1e-3 || math.Abs(got.Max-high) > 1e-3 {
			t.Errorf("%s: %.5f to %.5f, by hand %.5f to %.5f", what, got.Min, got.Max, low, high)
		}
	}
	nearly("worst", b.Worst(), 0.12-takes, 0.12+adds)
	nearly("statistical", b.Statistical(), 0.12-sure.Min-math.Sqrt(takesSquared), 0.12+sure.Max+math.Sqrt(addsSquared))

	// Exactly, from the involutes, cold: everything 15 K smaller, the least center.
	inv := func(a float64) float64 { return math.Tan(a) - a }
	k, kh := 1-15*11.5e-6, 1-15*23.6e-6
	db1, db2 := 60*math.Cos(20*involute.Degree)*k, 120*math.Cos(20*involute.Degree)*k
	alpha := math.Acos((db1 + db2) / 2 / ((90 - 0.03 - 0.015 - 0.020) * kh))
	s := (3*math.Pi - 0.04 - 0.05) * k // of both teeth, thickest
	jbt := (db1+db2)*(inv(alpha)-inv(20*involute.Degree)) - (s-3*math.Pi*k)*math.Cos(20*involute.Degree)
	jbt -= (0.012+0.014)*math.Cos(20*involute.Degree) + 0.015 + 0.017 + 0.017 + 0.020
	if got, want := b.Worst().Min, jbt/math.Cos(alpha); math.Abs(got-want) > 1e-12 {
		t.Errorf("least at worst: %.15f, from the involutes %.15f", got, want)
	}
}

// Published rules of thumb for heat, first order: steel gears in aluminum 40 K warmer
// gain 0.0358 mm at a = 100 mm; plastic gears (80e-6) in steel lose 0.1995 mm.
func TestClimateRulesOfThumb(t *testing.T) {
	rack := involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}
	g1, _ := involute.NewGear(involute.Spec{Teeth: 40, Module: 2, Rack: rack})
	g2, _ := involute.NewGear(involute.Spec{Teeth: 60, Module: 2, Rack: rack})
	pair, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	m := PlanMesh{Second: 1, Mesh: pair, Center: Limits{100, 100}}
	for _, c := range []struct{ gears, housing, gain float64 }{{11.5e-6, 23.8e-6, 0.0358}, {80e-6, 11.5e-6, -0.1995}} {
		m.Climate = &Climate{Temperature: Limits{60, 60}, Expansion: [2]float64{c.gears, c.gears}, Housing: c.housing}
		b, err := m.Budget(thinned(g1, 0.2, 0.2), thinned(g2, 0.2, 0.2))
		if err != nil {
			t.Fatal(err)
		}
		for _, r := range b.Rows {
			if r.Cause == OfClimate && (math.Abs(r.Adds-c.gain) > 0.01*math.Abs(c.gain)+0.4*0.0032 || math.Abs(r.Adds+r.Takes) > 1e-12) {
				t.Errorf("%+v: gains %v and takes %v", c, r.Adds, r.Takes)
			}
		}
	}
	// Swelling by 0.6 % is as heat that grows the gears by 0.6 % and not the housing.
	m.Climate = &Climate{Temperature: Limits{20, 20}, Swell: [2]Limits{{0, 0.006}, {0, 0.006}}}
	wet, err1 := m.Budget(thinned(g1, 0.5, 0.5), thinned(g2, 0.5, 0.5))
	m.Climate = &Climate{Temperature: Limits{20, 80}, Expansion: [2]float64{1e-4, 1e-4}}
	hot, err2 := m.Budget(thinned(g1, 0.5, 0.5), thinned(g2, 0.5, 0.5))
	if err1 != nil || err2 != nil || wet.Worst().Max-wet.Middle < -1e-12 || math.Abs(hot.Worst().Min-wet.Worst().Min) > 1e-12 || wet.Worst().Min > wet.Middle-0.4 {
		t.Errorf("swollen %+v, hot %+v (%v, %v)", wet.Worst(), hot.Worst(), err1, err2)
	}
}

// drawBurden gives a pair deviations and a climate.
func (p *plannedPair) drawBurden(t *rapid.T, alike bool) {
	size := func(name string) float64 {
		return rapid.Float64Range(0, 0.004).Draw(t, name) * p.gears[0].Gear.Module()
	}
	for i := range p.mesh.Deviations {
		p.mesh.Deviations[i] = Deviations{Runout: size("runout"), Measured: rapid.Bool().Draw(t, "measured"), Pitch: size("pitch"), Profile: size("profile"), Helix: size("helix")}
	}
	if !rapid.Bool().Draw(t, "climate") {
		return
	}
	expansion := func(name string) float64 { return rapid.Float64Range(9e-6, 25e-6).Draw(t, name) }
	c := &Climate{Temperature: Limits{rapid.Float64Range(0, 20).Draw(t, "cold"), rapid.Float64Range(20, 40).Draw(t, "hot")}}
	c.Expansion = [2]float64{expansion("first"), expansion("second")}
	c.Housing = expansion("housing")
	if alike {
		c.Expansion[1] = c.Expansion[0]
	}
	p.mesh.Climate = c
}

// The rows of every budget add up to what the mesh comes to at its worst, and the
// statistical shares to the statistical range, which lies within the worst.
func TestBudgetsAddUp(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		p.drawBurden(t, false)
		thick := func(i int) Limits {
			g := p.gears[i].Gear
			least := rapid.Float64Range(0, 0.05).Draw(t, "thin") * g.Module()
			return thinned(g, least, least+rapid.Float64Range(0, 0.05).Draw(t, "width")*g.Module())
		}
		first, second := thick(0), thick(1)
		b, err := p.mesh.Budget(first, second)
		if err != nil {
			t.Skip(err)
		}
		var shares Limits
		for _, r := range b.Rows {
			takes, adds := b.StatisticalShare(r)
			shares.Min, shares.Max = shares.Min+takes, shares.Max+adds
			if r.Cause != OfClimate && (r.Takes < 0 || r.Adds < 0 || takes > r.Takes*(1+1e-12) || adds > r.Adds*(1+1e-12)) {
				t.Errorf("%+v has shares of %v and %v", r, takes, adds)
			}
		}
		worst, likely := b.Worst(), b.Statistical()
		if math.Abs(b.Middle-shares.Min-likely.Min) > 1e-12 || math.Abs(b.Middle+shares.Max-likely.Max) > 1e-12 {
			t.Errorf("shares of %v make %v about %v", shares, likely, b.Middle)
		}
		if likely.Min < worst.Min-1e-12 || likely.Max > worst.Max+1e-12 {
			t.Errorf("statistical %v is wider than the worst %v", likely, worst)
		}
		// Any state inside has a backlash between the worst ones.
		u := func(l Limits) float64 { return l.Min + rapid.Float64Range(0, 1).Draw(t, "at")*l.Width() }
		ecc, proud := 0.0, 0.0
		for _, d := range p.mesh.Deviations {
			ecc += u(Limits{-d.Runout / 2, d.Runout / 2})
			proud += u(Limits{-d.Profile, d.Profile + d.Helix})
		}
		g := rapid.SampledFrom(p.mesh.Climate.growths()).Draw(t, "growth")
		j, err := p.mesh.backlash(Moment{u(p.mesh.Center) + ecc, [2]float64{u(first), u(second)}, proud, g}, true)
		if err != nil || j < worst.Min-1e-12 || j > worst.Max+1e-12 {
			t.Errorf("a state between has %v of %v (%v)", j, worst, err)
		}
	})
}
