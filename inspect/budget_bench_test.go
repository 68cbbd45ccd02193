package inspect

import (
	"math"
	"testing"
)

// What a statistical plan, one that solves for two unknowns, and a thousand pairs drawn
// at random cost, beside a single budget: ratios in one run.
func BenchmarkBudget(b *testing.B) {
	m := handMesh(b)
	m.Deviations = [2]Deviations{{Runout: 0.03, Pitch: 0.01, Profile: 0.012, Helix: 0.01}, {Runout: 0.04, Pitch: 0.01, Profile: 0.012, Helix: 0.01}}
	m.Climate = &Climate{Temperature: Limits{5, 60}, Expansion: [2]float64{12e-6, 11e-6}, Housing: 23.6e-6}
	m.Backlash, m.Method = &Limits{0.02, 0.3}, Statistical
	first, second := thinned(m.Mesh.First, 0.05, 0.09), thinned(m.Mesh.Second, 0.05, 0.09)
	b.Run("one", func(b *testing.B) {
		for b.Loop() {
			if _, err := m.Budget(first, second); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("plan", func(b *testing.B) {
		gears := []PlanGear{{Gear: m.Mesh.First}, {Gear: m.Mesh.Second}}
		for b.Loop() {
			if _, err := Plan(gears, []PlanMesh{m}); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("thousand pairs", func(b *testing.B) {
		for b.Loop() {
			if _, err := m.Simulate(first, second, Limits{0, math.Inf(1)}, 1000, 1); err != nil {
				b.Fatal(err)
			}
		}
	})
}
