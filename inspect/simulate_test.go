package inspect

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/stat"

	"flankwright/involute"
)

// below returns the share of a normal distribution, cut off at three standard
// deviations, that lies below z of them.
func below(z float64) float64 {
	phi := func(z float64) float64 { return math.Erfc(-z/math.Sqrt2) / 2 }
	return (phi(z) - phi(-3)) / (phi(3) - phi(-3))
}

// With one cause that is linear in the backlash the chance of binding is that
// of the cut normal distribution, exactly; so is that of too much backlash.
func TestSimulationOfOneCause(t *testing.T) {
	const pairs = 100000
	for _, z := range []float64{-2, -1, 0, 0.7} {
		m := handMesh(t)
		m.Center = Limits{90, 90}
		// The first tooth alone varies, by 0.03 to each side: binds where it takes more than the middle.
		middle := -z * 0.01
		first := thinned(m.Mesh.First, middle-0.03, middle+0.03)
		got, err := m.Simulate(first, thinned(m.Mesh.Second, 0, 0), Limits{middle - 0.02, middle + 0.01}, pairs, 7)
		if err != nil {
			t.Fatal(err)
		}
		check := func(what string, share, want float64) {
			if spread := math.Sqrt(want * (1 - want) / pairs); math.Abs(share-want) > 4.5*spread {
				t.Errorf("z %v: %s %v, by the normal distribution %v ± %v", z, what, share, want, spread)
			}
		}
		check("binds", got.Bind, below(z))
		check("exceeds", got.Over, below(-1))
		check("falls short", got.Short, below(-2))
		if math.Abs(got.Mean-middle) > 4.5*0.01/math.Sqrt(pairs) {
			t.Errorf("z %v: mean %v, want %v", z, got.Mean, middle)
		}
	}
}

// With three causes spread normally the root of the sum of squares is exact but for
// what is cut off at three standard deviations (1.3 % of each spread).
func TestSimulationAgainstRSS(t *testing.T) {
	m := handMesh(t)
	first, second := thinned(m.Mesh.First, 0.05, 0.09), thinned(m.Mesh.Second, 0.05, 0.08)
	b, err := m.Budget(first, second)
	if err != nil {
		t.Fatal(err)
	}
	got, err := m.Simulate(first, second, Limits{math.Inf(-1), math.Inf(1)}, 200000, 1)
	if err != nil {
		t.Fatal(err)
	}
	likely := b.Statistical()
	low, high := (b.Middle-got.Nearly.Min)/(b.Middle-likely.Min), (got.Nearly.Max-b.Middle)/(likely.Max-b.Middle)
	if low < 0.95 || low > 1.01 || high < 0.95 || high > 1.01 {
		t.Errorf("99.73 %% of pairs within %v, RSS %v: ratios %.4f and %.4f", got.Nearly, likely, low, high)
	}
	if got.Bind != 0 || got.Over != 0 {
		t.Errorf("%v bind and %v exceed without limit", got.Bind, got.Over)
	}
}

// With deviations of every kind, some of which can only take, the statistical range
// is what nearly all pairs have: to a tenth of it, and a few pairs in a thousand
// beyond. Means and spreads of each kind are those of the pairs drawn.
func TestStatisticalRangeOfPairs(t *testing.T) {
	m := handMesh(t)
	d := Deviations{Runout: 0.04, Pitch: 0.012, Profile: 0.015, Helix: 0.018}
	m.Deviations = [2]Deviations{d, d}
	first, second := thinned(m.Mesh.First, 0.12, 0.15), thinned(m.Mesh.Second, 0.12, 0.15)
	b, err := m.Budget(first, second)
	if err != nil {
		t.Fatal(err)
	}
	likely := b.Statistical()
	got, err := m.Simulate(first, second, likely, 200000, 5)
	if err != nil {
		t.Fatal(err)
	}
	low, high := (b.Middle-got.Nearly.Min)/(b.Middle-likely.Min), (got.Nearly.Max-b.Middle)/(likely.Max-b.Middle)
	if low < 0.95 || low > 1.02 || high < 0.95 || high > 1.02 || got.Short > 0.003 || got.Over > 0.003 {
		t.Errorf("99.73 %% of pairs within %v, said %v: ratios %.4f and %.4f, %v and %v beyond", got.Nearly, likely, low, high, got.Short, got.Over)
	}
	for _, c := range []struct {
		cause Cause
		only  Deviations
	}{{OfRunout, Deviations{Runout: d.Runout}}, {OfProfile, Deviations{Profile: d.Profile}}, {OfHelix, Deviations{Helix: d.Helix}}} {
		one := handMesh(t)
		one.Center, one.Deviations = Limits{90, 90}, [2]Deviations{c.only, {}}
		rng := rand.New(rand.NewPCG(11, 0))
		var taken []float64
		for range 50000 {
			p := one.draw(rng, [2]Limits{first, second})
			taken = append(taken, (p.ecc+p.takes)/max(c.only.Runout/2, c.only.Profile, c.only.Helix))
		}
		mean, three := Contribution{Cause: c.cause}.Spread()
		gotMean, gotDev := stat.MeanStdDev(taken, nil)
		if math.Abs(gotMean-mean) > 0.005 || 3*gotDev < three-0.005 || 3*gotDev > three+0.04 { // the eccentricity's is bounded by its limit
			t.Errorf("cause %d: mean %.4f, spread %.4f, said %.4f and %.4f", c.cause, gotMean, 3*gotDev, mean, three)
		}
	}
}

// A measured runout is met in full by every pair, in every turn; one that is only
// bounded by less. Nothing exceeds the worst case. One seed gives one result.
func TestSimulationBounds(t *testing.T) {
	m := handMesh(t)
	m.Deviations = [2]Deviations{{Runout: 0.05, Pitch: 0.01, Profile: 0.012, Helix: 0.01}, {Runout: 0.06, Pitch: 0.01, Profile: 0.012, Helix: 0.01}}
	m.Climate = &Climate{Temperature: Limits{0, 50}, Expansion: [2]float64{11.5e-6, 11.5e-6}, Housing: 23.6e-6}
	first, second := thinned(m.Mesh.First, 0.05, 0.09), thinned(m.Mesh.Second, 0.05, 0.08)
	run := func(m PlanMesh, seed uint64) Simulation {
		s, err := m.Simulate(first, second, Limits{0, 0.2}, 20000, seed)
		if err != nil {
			t.Fatal(err)
		}
		return s
	}
	bounded := run(m, 1)
	if again := run(m, 1); again != bounded {
		t.Errorf("the same seed gives %+v and %+v", bounded, again)
	}
	if other := run(m, 2); other == bounded {
		t.Error("another seed gives the same pairs")
	}
	b, err := m.Budget(first, second)
	if err != nil {
		t.Fatal(err)
	}
	if w := b.Worst(); bounded.Nearly.Min < w.Min || bounded.Nearly.Max > w.Max {
		t.Errorf("pairs reach %v beyond the worst case %v", bounded.Nearly, w)
	}
	sure := m
	sure.Deviations[0].Measured, sure.Deviations[1].Measured = true, true
	if s := run(sure, 1); s.Nearly.Min >= bounded.Nearly.Min || s.Nearly.Max <= bounded.Nearly.Max {
		t.Errorf("measured runout spreads %v, bounded runout %v", s.Nearly, bounded.Nearly)
	}
	// A ring gear's backlash goes the other way with the center distance, not with the runout.
	rack := involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 1, Dedendum: 1.25, TipRadius: 0.38}
	g1, _ := involute.NewGear(involute.Spec{Teeth: 20, Module: 3, Rack: rack})
	g2, err := involute.NewGear(involute.Spec{Teeth: -60, Module: 3, Rack: rack})
	if err != nil {
		t.Fatal(err)
	}
	pair, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	ring := PlanMesh{Second: 1, Mesh: pair, Center: Limits{59.99, 60.01}, Deviations: sure.Deviations}
	rb, err := ring.Budget(thinned(g1, 0.1, 0.1), thinned(g2, 0.1, 0.1))
	if err != nil {
		t.Fatal(err)
	}
	rs, err := ring.Simulate(thinned(g1, 0.1, 0.1), thinned(g2, 0.1, 0.1), Limits{0, math.Inf(1)}, 5000, 3)
	if err != nil || rs.Nearly.Min < rb.Worst().Min || rs.Nearly.Max > rb.Worst().Max || rb.Worst().Min > rb.Middle-0.04 {
		t.Errorf("ring: pairs within %v, worst %v about %v (%v)", rs.Nearly, rb.Worst(), rb.Middle, err)
	}
}
