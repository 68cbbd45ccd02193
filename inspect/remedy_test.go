package inspect

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// Every remedy works when it is taken, a hair beyond its value, and does not
// where it is not gone as far.
func TestRemediesWork(t *testing.T) {
	seen := map[RemedyKind]int{}
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		p.drawBurden(t, true)
		p.mesh.Deviations[rapid.IntRange(0, 1).Draw(t, "eccentric")].Runout += rapid.Float64Range(0, 0.08).Draw(t, "eccentricity") * p.gears[0].Gear.Module()
		p.mesh.Method = rapid.SampledFrom([]Method{WorstCase, WorstCase, WorstCase, Statistical}).Draw(t, "method")
		module := p.gears[0].Gear.Module()
		least := rapid.Float64Range(0, 0.08).Draw(t, "least") * module
		p.mesh.Backlash = &Limits{least, least + rapid.Float64Range(0, 0.06).Draw(t, "range")*module}
		pair := [2]PlanGear{p.gears[0], p.gears[1]}
		_, err := p.mesh.shares(0, pair)
		var problem *PlanProblem
		if !errors.As(err, &problem) {
			return
		}
		for _, r := range p.mesh.Remedies(pair, problem) {
			seen[r.Kind]++
			for _, share := range []float64{0.999, 1.001} {
				m := p.mesh
				wish := *m.Backlash
				m.Backlash = &wish
				works := share < 1
				v := r.Value * share
				switch r.Kind {
				case WidenBacklash:
					m.Backlash.Max, works = v, share > 1
				case WidenStatistically:
					m.Backlash.Max, m.Method, works = v, Statistical, share > 1
				case AskForMore:
					m.Backlash = &Limits{v, v + module}
					works = share > 1
				case CloserCenter:
					m.Center = Limits{m.Center.Middle() - v, m.Center.Middle() + v}
				case CloserRunout:
					m.Deviations[0].Runout *= v
					m.Deviations[1].Runout *= v
				case FinerTeeth:
					m = m.WithFinerTeeth(v)
				case SteadierWarmth:
					m.Climate = m.Climate.scaled(v)
				case MoveCenter: // a hair closer it works; a hair farther nominal teeth have too much
					m, works = m.Moved(r.Value+(1-share)*1e-3*module), share > 1
				case RaiseShift:
					continue // TestRaiseShift
				case TakeNominal:
					b, err := m.Budget(pair[0].Thickness(r.Thin[0]), pair[1].Thickness(r.Thin[1]))
					if got := b.By(m.Method); err != nil || got.Min < wish.Min-1e-8 || got.Max > wish.Max+1e-8 || got.Max < wish.Max-1e-3*module {
						t.Errorf("nominal teeth and thinner have %v, asked for %v (%v)", got, wish, err)
					}
					continue
				case Statistically:
					m.Method, works = Statistical, true
				}
				if math.Abs(r.Value) < 1e-2*min(module, 1) {
					continue // too small for a thousandth of it to tell
				}
				if got := m.Possible(pair); got != works {
					t.Errorf("%+v at %v of it: possible %v (%v)", r, share, got, problem)
				}
			}
		}
	})
	for _, k := range []RemedyKind{WidenBacklash, AskForMore} {
		if seen[k] == 0 {
			t.Errorf("remedy %d never came up: %v", k, seen)
		}
	}
}

// What the center's tolerance and the runouts may be, by hand and to first order: a
// range of 0.03 mm bears 2 · 2 δ tan 20°, and with ± 0.01 mm of center runouts of 0.015 mm in all.
func TestCloserByHand(t *testing.T) {
	value := func(m PlanMesh, kind RemedyKind) float64 {
		m.Backlash = &Limits{0.1, 0.13}
		pair := [2]PlanGear{{Gear: m.Mesh.First}, {Gear: m.Mesh.Second}}
		_, err := m.shares(0, pair)
		var problem *PlanProblem
		if !errors.As(err, &problem) {
			t.Fatal(err)
		}
		for _, r := range m.Remedies(pair, problem) {
			if r.Kind == kind {
				return r.Value
			}
		}
		t.Fatalf("no remedy %d", kind)
		return 0
	}
	m := handMesh(t)
	if got, want := value(m, CloserCenter), 0.03/(4*0.363970234); math.Abs(got-want) > 0.01*want {
		t.Errorf("center within ±%v, by hand ±%v", got, want)
	}
	m.Center = Limits{89.99, 90.01}
	m.Deviations = [2]Deviations{{Runout: 0.03}, {Runout: 0.05}}
	if got, want := value(m, CloserRunout), (0.03/(2*0.363970234)-2*0.01)/0.08; math.Abs(got-want) > 0.02*want {
		t.Errorf("runouts to %v of what they are, by hand %v", got, want)
	}
}

// Raised so far, nominal teeth have just the least backlash asked for.
func TestRaiseShift(t *testing.T) {
	m := handMesh(t)
	m.Center, m.Backlash = Limits{90.3, 90.3}, &Limits{0.05, 0.06}
	pair := [2]PlanGear{{Gear: m.Mesh.First}, {Gear: m.Mesh.Second}}
	_, err := m.shares(0, pair)
	var problem *PlanProblem
	if !errors.As(err, &problem) {
		t.Fatal(err)
	}
	for _, r := range m.Remedies(pair, problem) {
		if r.Kind != RaiseShift {
			continue
		}
		spec := m.Mesh.First.Spec()
		spec.Shift += r.Value
		g, err := involute.NewGear(spec)
		if err != nil {
			t.Fatal(err)
		}
		mesh, err := involute.NewMesh(g, m.Mesh.Second)
		if err != nil {
			t.Fatal(err)
		}
		play, err := mesh.Backlash(90.3, g.NominalThickness(), m.Mesh.Second.NominalThickness())
		if err != nil || math.Abs(play.Circumferential-0.05) > 1e-9 {
			t.Errorf("raised by %v nominal teeth have %v (%v)", r.Value, play.Circumferential, err)
		}
		return
	}
	t.Error("no shift is named")
}

// Opening the center for a wanted backlash, the textbook rule to first order:
// Δa = j/(2 tan α_wt).
func TestCenterFor(t *testing.T) {
	m := handMesh(t)
	m.Center = Limits{90, 90}
	nominal := m.Mesh.First.NominalThickness()
	by, ok := m.CenterFor(Limits{nominal, nominal}, Limits{nominal, nominal}, 0.1)
	if want := 0.1 / 2 / 0.363970234; !ok || math.Abs(by-want) > 0.01*want {
		t.Errorf("open by %v, the rule says %v", by, want)
	}
	m.Center = Limits{90 + by, 90 + by}
	b, err := m.Budget(Limits{nominal, nominal}, Limits{nominal, nominal})
	if err != nil || math.Abs(b.Worst().Min-0.1) > 1e-12 {
		t.Errorf("opened so far it has %v (%v)", b.Worst(), err)
	}
	if _, ok := m.CenterFor(Limits{nominal, nominal}, Limits{nominal, nominal}, 100); ok {
		t.Error("a center for 100 mm of backlash")
	}
}
