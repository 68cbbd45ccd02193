package inspect

import (
	"math"

	"flankwright/involute"
)

// Sharing out mesh by mesh finds no plan for some trains that have one. Then all free
// gears are given one width of tolerance, the largest that every mesh leaves. With
// widths given, each mesh bounds the sum of its gears' least thinnings from both sides.

// An evenPlan is such a plan in the making.
type evenPlan struct {
	*planner
	free []int       // gears to be found
	at   map[int]int // place of a gear in free
}

// even plans a train evenly. It changes nothing and returns false where it finds no
// plan, or none better than least, the least width of what is planned already.
func (p *planner) even(least float64) bool {
	e := evenPlan{planner: p, at: map[int]int{}}
	for _, k := range p.active {
		for _, gear := range p.meshes[k].gears() {
			if _, known := e.at[gear]; !known && p.gears[gear].Thin == nil && !p.hard[gear] {
				e.at[gear] = len(e.free)
				e.free = append(e.free, gear)
			}
		}
	}
	if len(e.free) == 0 {
		return false
	}
	fits := func(width float64) bool { _, ok := e.thinnings(width); return ok }
	if !fits(0) {
		return false
	}
	width := involute.LargestFitting(fits, 0, p.gears[e.free[0]].Gear.NormalPitch())
	thin, ok := e.thinnings(width)
	if !ok || width <= least+noThinning {
		return false
	}
	e.thicken(thin, width)
	for i, gear := range e.free {
		p.by[gear], p.thin[gear] = ByBacklash, Limits{thin[i], thin[i] + e.width(gear, width)}
	}
	return true
}

// thicken makes each tooth in turn as thick as its meshes let it.
func (e evenPlan) thicken(thin []float64, width float64) {
	for i, gear := range e.free {
		needed := 0.0
		for _, k := range e.active {
			m := e.meshes[k]
			if m.First != gear && m.Second != gear {
				continue
			}
			least, _, _ := e.bounds(k, width)
			for _, mate := range m.gears() {
				if at, free := e.at[mate]; free && mate != gear {
					least -= thin[at]
				}
			}
			needed = max(needed, least)
		}
		thin[i] = min(max(0, thin[i]), needed)
	}
}

// width returns the width of a gear's tolerance: its own where one is stated for a
// mesh that asks for the least backlash only.
func (e evenPlan) width(gear int, width float64) float64 {
	for _, k := range e.active {
		if m := e.meshes[k]; m.LeastOnly && (m.First == gear || m.Second == gear) {
			return e.gears[gear].Tolerance
		}
	}
	return width
}

// thinnings returns the least thinnings of the free gears that hold all wishes with
// a width, false where there are none.
func (e evenPlan) thinnings(width float64) ([]float64, bool) {
	side, ok := e.sides()
	if !ok {
		return nil, false
	}
	// Seen with the sign of its side a gear's thinning differs from its mate's by what
	// their sum is: differences with bounds, which the shortest paths solve.
	origin := len(e.free)
	var edges []edge
	far := 0.0
	for _, k := range e.active {
		least, most, ok := e.bounds(k, width)
		if !ok || least > most {
			return nil, false
		}
		far += math.Abs(least) + math.Abs(most)
		from, to := origin, origin
		for _, gear := range e.meshes[k].gears() {
			if i, free := e.at[gear]; free && side[i] > 0 {
				to = i
			} else if free {
				from = i
			}
		}
		edges = append(edges, edge{from, to, most}, edge{to, from, -least})
	}
	for i, s := range side {
		edges = append(edges, edge{origin, i, map[bool]float64{true: far, false: 0}[s > 0]}, edge{i, origin, map[bool]float64{true: 0, false: far}[s > 0]})
	}
	high, ok1 := shortest(edges, origin, false)
	low, ok2 := shortest(edges, origin, true)
	if !ok1 || !ok2 {
		return nil, false
	}
	x := make([]float64, origin)
	for i := range x { // any mean of two solutions is one
		x[i] = side[i] * (high[i] - low[i]) / 2
	}
	return x, true
}

// sides parts the free gears so that mates are on different sides, +1 and −1, as they
// turn one way and the other; false where they lock.
func (e evenPlan) sides() ([]float64, bool) {
	side := make([]float64, len(e.free))
	for start := range side {
		if side[start] != 0 {
			continue
		}
		side[start] = 1
		for changed := true; changed; {
			changed = false
			for _, k := range e.active {
				i, free1 := e.at[e.meshes[k].First]
				j, free2 := e.at[e.meshes[k].Second]
				if !free1 || !free2 || side[i] == 0 && side[j] == 0 {
					continue
				}
				if side[i] == side[j] {
					return nil, false
				}
				if side[i] == 0 {
					side[i], changed = -side[j], true
				}
				if side[j] == 0 {
					side[j], changed = -side[i], true
				}
			}
		}
	}
	return side, true
}

// An edge says that the value at to exceeds that at from by at most by.
type edge struct {
	from, to int
	by       float64
}

// shortest returns the length of the shortest path from the origin, which is the
// last node, to each node (Bellman and Ford), or backward from each node to the
// origin; false where a cycle is negative.
func shortest(edges []edge, origin int, backward bool) ([]float64, bool) {
	length := make([]float64, origin+1)
	for i := range origin {
		length[i] = math.Inf(1)
	}
	for range origin + 1 {
		changed := false
		for _, e := range edges {
			from, to := e.from, e.to
			if backward {
				from, to = to, from
			}
			if l := length[from] + e.by; l < length[to]-noThinning/16 {
				length[to], changed = l, true
			}
		}
		if !changed {
			return length, true
		}
	}
	return nil, false
}

// bounds returns between what the sum of the free gears' least thinnings of a mesh
// must be for its wish, with a width. Where the gears grow unlike it is that of the one
// for which it is the narrower.
func (e evenPlan) bounds(k int, width float64) (least, most float64, ok bool) {
	m, pair := e.meshes[k], e.pair(k)
	index := m.gears()
	least, most = math.Inf(-1), math.Inf(1)
	for takes, gear := range index {
		if _, free := e.at[gear]; !free {
			continue
		}
		backlash := func(x float64) Limits {
			var thick [2]Limits
			for i, g := range index {
				thin := e.thin[g]
				if own := e.gears[g].Thin; own != nil {
					thin = *own
				} else if _, free := e.at[g]; free {
					thin = Limits{0, e.width(g, width)}
				}
				if i == takes {
					thin = Limits{thin.Min + x, thin.Max + x}
				}
				thick[i] = pair[i].Thickness(thin)
			}
			b, err := m.Budget(thick[0], thick[1])
			if err != nil {
				return Limits{math.NaN(), math.NaN()}
			}
			return b.By(m.Method)
		}
		far := 2 * (m.Mesh.First.NormalPitch() + m.Backlash.Max)
		low, err := involute.FindRoot(func(x float64) float64 { return backlash(x).Min - m.Backlash.Min }, -far, far)
		if err != nil {
			return 0, 0, false
		}
		least = max(least, low)
		if m.LeastOnly { // the thickest teeth will do
			most = max(least, 0) + e.width(m.First, width) + e.width(m.Second, width)
			continue
		}
		high, err := involute.FindRoot(func(x float64) float64 { return backlash(x).Max - m.Backlash.Max }, -far, far)
		if err != nil {
			return 0, 0, false
		}
		most = min(most, high)
	}
	return least, most, true
}
