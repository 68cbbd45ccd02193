package inspect

import (
	"math"

	"flankwright/involute"
)

// A split says how two gears share the thinning of their mesh out: a free gear's
// thinning begins at its share of the sum of the least thinnings, and is as wide as
// its share of the sum of the widths.
type split struct {
	fixed        [2]*Limits
	least, width [2]float64
}

// split returns how the gears of a mesh share out. A gear alone takes all.
func (m PlanMesh) split(pair [2]PlanGear) split {
	s := split{fixed: [2]*Limits{pair[0].Thin, pair[1].Thin}}
	first, width := 0.5, 0.5
	switch {
	case pair[0].Thin != nil || (pair[1].Thin == nil && m.Share == ShareSecond):
		first, width = 0, 0
	case pair[1].Thin != nil || m.Share == ShareFirst:
		first, width = 1, 1
	case m.Share == ShareByTeeth:
		z1, z2 := float64(pair[0].Gear.Teeth()), float64(pair[1].Gear.Teeth())
		first = z1 / (z1 + z2)
	}
	if both := pair[0].Tolerance + pair[1].Tolerance; m.LeastOnly && both > 0 && pair[0].Thin == nil && pair[1].Thin == nil {
		width = pair[0].Tolerance / both
	}
	s.least, s.width = [2]float64{first, 1 - first}, [2]float64{width, 1 - width}
	return s
}

// thin returns the thinnings for a sum of the least ones and a sum of the widths.
func (s split) thin(least, width float64) [2]Limits {
	var out [2]Limits
	for i := range out {
		if s.fixed[i] != nil {
			out[i] = *s.fixed[i]
			continue
		}
		a := s.least[i] * least
		out[i] = Limits{a, a + s.width[i]*width}
	}
	return out
}

// free returns the first gear that is not fixed.
func (s split) free() int {
	if s.fixed[0] != nil {
		return 1
	}
	return 0
}

// shares returns the limits of the thinning that a mesh asks of its two gears so
// that its backlash stays within the wish, by the mesh's method.
func (m PlanMesh) shares(index int, pair [2]PlanGear) ([2]Limits, error) {
	s := m.split(pair)
	find := m.worstThinning
	if m.Method == Statistical {
		find = m.statisticalThinning
	}
	least, width, err := find(pair, s)
	if err != nil {
		return [2]Limits{}, err
	}
	thin := s.thin(least, width)
	problem := &PlanProblem{Mesh: index, Gear: [2]int{m.First, m.Second}[s.free()], Thin: thin[s.free()]}
	switch {
	case least < -noThinning:
		problem.Kind = TooThick
	case width < -noThinning:
		problem.Kind = NoRoom
	default:
		return thin, nil
	}
	return thin, m.explain(problem, pair, s.thin(least, 0))
}

// tolerances returns the sum of the stated tolerances of the free gears.
func tolerances(pair [2]PlanGear) float64 {
	sum := 0.0
	for _, g := range pair {
		if g.Thin == nil {
			sum += g.Tolerance
		}
	}
	return sum
}

// worstThinning returns the sum of the least thinnings, which leaves the least backlash
// at its worst, and of the widths, which leave the greatest: both are linear in
// the thickness, j_wt = j_0 + t k cos α_t/(cos β cos α_wt) for a part grown by k.
func (m PlanMesh) worstThinning(pair [2]PlanGear, s split) (least, width float64, err error) {
	end := func(isLeast bool, wish float64) (float64, error) {
		thick := [2]Limits{pair[0].thickness(s.thin(0, 0)[0]), pair[1].thickness(s.thin(0, 0)[1])}
		extreme := math.Inf(-1)
		for _, g := range m.Climate.growths() {
			x := m.worst(thick, isLeast, g)
			j, err := m.backlash(x, isLeast)
			if err != nil {
				return 0, err
			}
			alpha, err := m.Mesh.GrownPressureAngle(x.a, g)
			if err != nil {
				return 0, err
			}
			t := (wish - j) * m.Mesh.ThinningPerBacklash(alpha) / s.grown(g, isLeast)
			if !isLeast {
				t = -t
			}
			extreme = max(extreme, t)
		}
		if !isLeast {
			extreme = -extreme
		}
		return extreme, nil
	}
	if least, err = end(true, m.Backlash.Min); err != nil {
		return 0, 0, err
	}
	if m.LeastOnly {
		return least, tolerances(pair), nil
	}
	most, err := end(false, m.Backlash.Max)
	return least, most - least, err
}

// grown returns by what factor the free gears have grown, on the safe side where
// they have grown unlike.
func (s split) grown(g involute.Growth, least bool) float64 {
	switch {
	case s.fixed[0] != nil:
		return g.Second
	case s.fixed[1] != nil:
		return g.First
	case least:
		return min(g.First, g.Second)
	}
	return max(g.First, g.Second)
}

// statisticalThinning is worstThinning for backlash held statistically. How far
// the thicknesses may vary and where their middle lies depend on each other through
// the root of the sum of squares, and both are solved for.
func (m PlanMesh) statisticalThinning(pair [2]PlanGear, s split) (least, width float64, err error) {
	var failed error
	backlash := func(least, width float64) Limits {
		thin := s.thin(least, width)
		b, err := m.Budget(pair[0].thickness(thin[0]), pair[1].thickness(thin[1]))
		if err != nil {
			failed = err
		}
		return b.Statistical()
	}
	far := m.Mesh.First.NormalPitch()
	leastFor := func(width float64) float64 {
		x, err := involute.FindRoot(func(x float64) float64 { return backlash(x, width).Min - m.Backlash.Min }, -far, far)
		if err != nil && failed == nil {
			failed = err
		}
		return x
	}
	if m.LeastOnly {
		width = tolerances(pair)
		return leastFor(width), width, failed
	}
	over := func(width float64) float64 { return backlash(leastFor(width), width).Max - m.Backlash.Max }
	if at := over(0); at >= 0 || failed != nil {
		// Not even a single thickness would do: the width is what is missing, below zero.
		alpha, _ := m.Mesh.WorkingPressureAngle(m.Nominal())
		return leastFor(0), -at * m.Mesh.ThinningPerBacklash(alpha), failed
	}
	width, err = involute.FindRoot(over, 0, far)
	if failed == nil {
		failed = err
	}
	return leastFor(width), width, failed
}
