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
		z1, z2 := math.Abs(float64(pair[0].Gear.Teeth())), math.Abs(float64(pair[1].Gear.Teeth()))
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
	least, width, err := m.thinning(pair, s)
	if err != nil {
		return [2]Limits{}, err
	}
	thin := s.thin(least, width)
	problem := &PlanProblem{Mesh: index, Gear: m.gears()[s.free()], Thin: thin[s.free()]}
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

// thinning returns the sum of the least thinnings of the free gears and the sum of
// their widths that hold the wish by the mesh's method, mm; either may be below zero.
func (m PlanMesh) thinning(pair [2]PlanGear, s split) (least, width float64, err error) {
	if m.Method == Statistical {
		return m.statisticalThinning(pair, s)
	}
	return m.worstThinning(pair, s)
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
		thick := [2]Limits{pair[0].Thickness(s.thin(0, 0)[0]), pair[1].Thickness(s.thin(0, 0)[1])}
		extreme := math.Inf(-1)
		for _, g := range m.Climate.growths() {
			x := m.worst(thick, isLeast, g)
			j, err := m.backlash(x, isLeast)
			if err != nil {
				return 0, err
			}
			alpha, err := m.Mesh.GrownPressureAngle(x.Center, g)
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
	if m.LeastOnly { // and nominal teeth may have more
		return max(0, least), tolerances(pair), nil
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
// the root of the sum of squares, and both are solved for. A tolerance that would
// begin above the nominal thickness is cut off there.
func (m PlanMesh) statisticalThinning(pair [2]PlanGear, s split) (least, width float64, err error) {
	q := statisticalQuest{mesh: m, pair: pair, split: s, far: 2 * (m.Mesh.First.NormalPitch() + m.Backlash.Max)}
	alone := q.leastFor(0)
	over := func(width float64) float64 { return q.backlash(q.leastFor(width), width).Max - m.Backlash.Max }
	switch {
	case q.err != nil:
		return 0, 0, q.err
	case m.LeastOnly: // and nominal teeth may have more
		width = tolerances(pair)
		return max(0, q.leastFor(width)), width, q.err
	}
	nominalOver := func(width float64) float64 { return q.backlash(0, width).Max - m.Backlash.Max }
	if alone < 0 {
		over = nominalOver
	}
	if at := over(0); at >= 0 {
		// Not even a single thickness would do: the width is what is missing, below zero.
		alpha, err := m.Mesh.WorkingPressureAngle(m.Nominal())
		return alone, -at*m.Mesh.ThinningPerBacklash(alpha) - min(0, alone), err
	}
	width = q.root(over, 0, q.far)
	if alone < 0 { // nominal teeth have more than the least asked for: the width begins at them
		return alone, width - alone, q.err
	}
	if least = q.leastFor(width); least >= 0 {
		return least, width, q.err
	}
	return 0, q.root(nominalOver, 0, width), q.err
}

// A statisticalQuest keeps the first error of the functions that are solved.
type statisticalQuest struct {
	mesh  PlanMesh
	pair  [2]PlanGear
	split split
	far   float64 // farther than any thinning, mm
	err   error
}

func (q *statisticalQuest) root(f func(float64) float64, a, b float64) float64 {
	x, err := involute.FindRoot(f, a, b)
	if q.err == nil {
		q.err = err
	}
	return x
}

// backlash returns the statistical backlash of a sum of least thinnings and a sum of widths.
func (q *statisticalQuest) backlash(least, width float64) Limits {
	thin := q.split.thin(least, width)
	b, err := q.mesh.Budget(q.pair[0].Thickness(thin[0]), q.pair[1].Thickness(thin[1]))
	if q.err == nil {
		q.err = err
	}
	return b.Statistical()
}

// leastFor returns the sum of the least thinnings that gives the least backlash.
func (q *statisticalQuest) leastFor(width float64) float64 {
	return q.root(func(x float64) float64 { return q.backlash(x, width).Min - q.mesh.Backlash.Min }, -q.far, q.far)
}
