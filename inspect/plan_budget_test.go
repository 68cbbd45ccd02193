package inspect

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// With deviations and a climate the thicknesses found hold the wish exactly, by the
// method asked for, however the gears share it out, one gear fixed or none.
// Gears that grow unlike hold it on the safe side.
func TestPlanHoldsTheBudget(t *testing.T) {
	found := map[string]int{}
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		alike := rapid.Bool().Draw(t, "alike")
		p.drawBurden(t, alike)
		p.mesh.Method = rapid.SampledFrom([]Method{WorstCase, Statistical}).Draw(t, "method")
		p.mesh.Share = rapid.SampledFrom([]Share{ShareEqual, ShareFirst, ShareSecond, ShareByTeeth}).Draw(t, "share")
		p.mesh.LeastOnly = rapid.Bool().Draw(t, "least only")
		if fixed := rapid.IntRange(-1, 1).Draw(t, "fixed"); fixed >= 0 {
			at := rapid.Float64Range(0, 0.02).Draw(t, "made") * p.gears[fixed].Gear.Module()
			p.gears[fixed].Thin = &Limits{at, at + rapid.Float64Range(0, 0.005).Draw(t, "by")*p.gears[fixed].Gear.Module()}
		}
		module := p.gears[0].Gear.Module()
		for i := range p.gears {
			p.gears[i].Tolerance = rapid.Float64Range(0.001, 0.03).Draw(t, "tolerance") * module
		}
		least := rapid.Float64Range(0, 0.08).Draw(t, "least") * module
		p.mesh.Backlash = &Limits{least, least + rapid.Float64Range(0.02, 0.3).Draw(t, "range")*module}
		got, err := Plan(p.gears, []PlanMesh{p.mesh})
		if err != nil {
			checkBudgetProblem(t, p, err)
			return
		}
		b, err := p.mesh.Budget(got[0].Limits, got[1].Limits)
		if err != nil {
			t.Fatal(err)
		}
		j, want := b.By(p.mesh.Method), *p.mesh.Backlash
		if p.mesh.LeastOnly {
			want.Max = j.Max
			for i, g := range p.gears {
				if g.Thin == nil && math.Abs(got[i].Limits.Width()-g.Tolerance) > 1e-12 && p.mesh.Share != ShareFirst && p.mesh.Share != ShareSecond {
					t.Errorf("gear %d varies by %v, stated %v", i, got[i].Limits.Width(), g.Tolerance)
				}
			}
		}
		slack := 1e-9
		if !alike && p.mesh.Climate != nil {
			slack = 2e-3 * (want.Max + module*0.05)
		}
		nominal := (p.mesh.Method == Statistical || p.mesh.LeastOnly) && (thinOf(p.gears[0], got[0]).Min < 1e-9 || thinOf(p.gears[1], got[1]).Min < 1e-9)
		if j.Min < want.Min-2*noThinning || j.Max > want.Max+2*noThinning || (j.Min > want.Min+slack && !nominal) || (!p.mesh.LeastOnly && j.Max < want.Max-slack) {
			t.Errorf("comes to %v, asked for %v", j, want)
		}
		found[[]string{"worst", "statistical"}[p.mesh.Method]]++
	})
	if found["worst"] == 0 || found["statistical"] == 0 {
		t.Errorf("plans found: %v", found)
	}
}

// checkBudgetProblem checks that a refusal is right: nominal teeth have more than the
// least asked for, or a wider range would do and the one asked for would not.
func checkBudgetProblem(t *rapid.T, p plannedPair, err error) {
	var problem *PlanProblem
	if !errors.As(err, &problem) {
		return // a center distance that leaves no working angle
	}
	switch problem.Kind {
	case TooThick:
		if problem.Nominal.Min < p.mesh.Backlash.Min {
			t.Errorf("refused as too thick, but nominal teeth have %v of the %v asked for", problem.Nominal.Min, p.mesh.Backlash.Min)
		}
		p.mesh.Backlash = &Limits{problem.Nominal.Min + 1e-6, math.Max(problem.Nominal.Min, p.mesh.Backlash.Max) + p.gears[0].Gear.Module()*0.5}
	case NoRoom:
		if problem.Most < p.mesh.Backlash.Max {
			t.Errorf("refused for want of room, but %v would do", problem.Most)
		}
		p.mesh.Backlash = &Limits{p.mesh.Backlash.Min, problem.Most * (1 + 5e-3)}
	}
	if _, err := Plan(p.gears, []PlanMesh{p.mesh}); err != nil {
		t.Errorf("the way out that the refusal names does not lead out: %v, then %v", problem, err)
	}
}

// Trains whose gears have deviations and a climate hold every mesh's wish by its
// method, ranges and least values alike; no tooth is thicker than nominal.
func TestTrainsHoldTheBudget(t *testing.T) {
	planned, drawn := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		gears, pairs := drawTrain(t)
		module := gears[0].Gear.Module()
		var meshes []PlanMesh
		for i := range gears {
			gears[i].Tolerance = 0.01 * module
		}
		for _, p := range pairs {
			p.drawBurden(t, false)
			p.mesh.Method = rapid.SampledFrom([]Method{WorstCase, Statistical}).Draw(t, "method")
			p.mesh.LeastOnly = rapid.IntRange(0, 2).Draw(t, "least only") == 0
			p.mesh.Backlash.Max += 0.15 * module
			meshes = append(meshes, p.mesh)
		}
		drawn++
		found, err := Plan(gears, meshes)
		if err != nil {
			if problem := (*PlanProblem)(nil); !errors.As(err, &problem) {
				t.Fatalf("refused without reason: %v", err)
			}
			return
		}
		planned++
		for i, f := range found {
			if thin := thinOf(gears[i], f); f.By == ByBacklash && (thin.Min < -2*noThinning || thin.Width() < -2*noThinning) {
				t.Errorf("gear %d is thinned by %v", i, thin)
			}
		}
		for _, m := range meshes {
			if gears[m.First].Thin != nil && gears[m.Second].Thin != nil {
				continue
			}
			b, err := m.Budget(found[m.First].Limits, found[m.Second].Limits)
			if err != nil {
				t.Fatal(err)
			}
			if got := b.By(m.Method); got.Min < m.Backlash.Min-1e-8 || !m.LeastOnly && got.Max > m.Backlash.Max+1e-8 {
				t.Errorf("gears %d and %d have %v of backlash, asked for %v", m.First, m.Second, got, *m.Backlash)
			}
		}
	})
	t.Logf("%d of %d trains planned", planned, drawn)
	if planned < drawn/4 {
		t.Errorf("only %d of %d drawn trains were planned", planned, drawn)
	}
}

// A train for which a plan exists is planned: the wishes are what teeth drawn first, all
// with one tolerance, come to, with a hair of room above.
func TestFeasibleTrainsArePlanned(t *testing.T) {
	evenly := 0
	rapid.Check(t, func(t *rapid.T) {
		gears, pairs := drawTrain(t)
		module := gears[0].Gear.Module()
		width := rapid.Float64Range(0.001, 0.02).Draw(t, "width") * module
		var thick []Limits
		for i := range gears {
			gears[i].Thin = nil
			least := rapid.SampledFrom([]float64{0, 0.02, 0.06}).Draw(t, "least thinning") * module
			thick = append(thick, gears[i].Thickness(Limits{least, least + width}))
		}
		var meshes []PlanMesh
		for _, p := range pairs {
			p.drawBurden(t, true)
			m := p.mesh
			m.Share, m.Method = ShareEqual, rapid.SampledFrom([]Method{WorstCase, Statistical}).Draw(t, "method")
			b, err := m.Budget(thick[m.First], thick[m.Second])
			if err != nil {
				t.Skip(err)
			}
			const hair = 1e-4
			wish := b.By(m.Method)
			m.Backlash = &Limits{wish.Min, wish.Max + hair*module}
			meshes = append(meshes, m)
		}
		found, err := Plan(gears, meshes)
		if err != nil {
			t.Fatalf("refused (%v), but %v do", err, thick)
		}
		alike := true
		for _, f := range found {
			alike = alike && math.Abs(f.Limits.Width()-found[0].Limits.Width()) < 1e-9
		}
		if alike && len(gears) > 2 {
			evenly++
		}
	})
	if evenly == 0 {
		t.Error("no train had to be planned evenly")
	}
}
