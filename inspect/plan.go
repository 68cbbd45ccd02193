package inspect

import (
	"math"
	"slices"

	"flankwright/involute"
)

// A PlanGear is a gear whose thickness limits are to be found.
type PlanGear struct {
	Gear      *involute.Gear
	Thin      *Limits // how much thinner than nominal, normal, mm; nil where the meshes decide
	Tolerance float64 // how much the thickness may vary where a mesh asks for the least backlash only, mm
}

// A Decider says what decided a gear's thickness: the first of these that applies.
type Decider int

// The deciders.
const (
	ByThin     Decider = iota // the gear's own limits
	ByBacklash                // the backlash of its meshes
	ByNothing                 // nominal thickness, no tolerance
)

// Thickness is the result of a plan for one gear.
type Thickness struct {
	Limits Limits // s_n, mm
	By     Decider
}

// noThinning takes up rounding: a thinning this little below zero is zero, mm.
const noThinning = 1e-9

// Plan finds the thickness limits of all gears: a gear's own thinning rules;
// else its meshes' backlash, with everything that takes or adds to it; else nominal.
//
// In each mesh the gears share the thinning out, and a gear that is already fixed
// leaves its mate the rest. A gear in several meshes takes the least of its
// shares, least thinning and range alike, which suits all; its mates in one mesh
// only take what that leaves them. A train for which that finds nothing is planned
// evenly, see even.
func Plan(gears []PlanGear, meshes []PlanMesh) ([]Thickness, error) {
	p := planner{gears: gears, meshes: meshes, thin: make([]Limits, len(gears)), by: make([]Decider, len(gears)), hard: make([]bool, len(gears)), bound: make([]*Limits, len(gears))}
	for i, g := range gears {
		p.by[i] = ByNothing
		if g.Thin != nil {
			p.by[i], p.thin[i] = ByThin, *g.Thin
		}
	}
	if err := p.shareOut(); err != nil {
		return nil, err
	}
	if err := p.settle(); err != nil && (len(p.active) < 2 || !p.even(-1) || p.check() != nil) {
		return nil, err
	}
	if least := p.leastWidth(); len(p.active) > 1 && least < noThinning {
		before := slices.Clone(p.thin)
		if p.even(least) && p.check() != nil {
			p.thin = before
		}
	}
	out := make([]Thickness, len(gears))
	for i, g := range gears {
		out[i] = Thickness{g.Thickness(p.thin[i]), p.by[i]}
	}
	return out, nil
}

// Thickness returns the limits of the thickness for limits of the thinning, and the
// other way round, mm.
func (g PlanGear) Thickness(thin Limits) Limits {
	s := g.Gear.NominalThickness()
	return Limits{s - thin.Max, s - thin.Min}
}

// A planner works a plan out.
type planner struct {
	gears  []PlanGear
	meshes []PlanMesh
	thin   []Limits
	by     []Decider
	active []int     // the meshes that decide something
	hard   []bool    // by gear: its share is not to be changed
	bound  []*Limits // by gear: what meshes with settled gears leave it
}

// pair returns the gears of a mesh.
func (p *planner) pair(k int) [2]PlanGear {
	return [2]PlanGear{p.gears[p.meshes[k].First], p.gears[p.meshes[k].Second]}
}

// shareOut gives every free gear its share: first of meshes that name the gear that
// takes it all, then of meshes whose other gear is settled so, which bounds it, then
// the least of what the rest ask for.
func (p *planner) shareOut() error {
	for k, m := range p.meshes {
		if m.Backlash != nil && (p.gears[m.First].Thin == nil || p.gears[m.Second].Thin == nil) {
			p.active = append(p.active, k)
		}
	}
	for _, pass := range []func(k int) error{p.shareNamed, p.shareBound, p.shareSoft} {
		for _, k := range p.active {
			if err := pass(k); err != nil {
				return err
			}
		}
	}
	p.keepBounds()
	return nil
}

// settled returns the gears of a mesh with those fixed that are settled: by their own
// thinning, or by a mesh that names the gear that takes all; and how many they are.
func (p *planner) settled(k int) (pair [2]PlanGear, n int) {
	pair = p.pair(k)
	for i, gear := range p.meshes[k].gears() {
		if pair[i].Thin == nil && p.hard[gear] {
			pair[i].Thin = &p.thin[gear]
		}
		if pair[i].Thin != nil {
			n++
		}
	}
	return pair, n
}

// named reports whether a mesh with two free gears names the one that takes all.
func (p *planner) named(k int) bool {
	m, pair := p.meshes[k], p.pair(k)
	return pair[0].Thin == nil && pair[1].Thin == nil && (m.Share == ShareFirst || m.Share == ShareSecond)
}

// shareNamed shares out in a mesh that names the gear that takes all.
func (p *planner) shareNamed(k int) error {
	if !p.named(k) {
		return nil
	}
	thin, err := p.meshes[k].shares(k, p.pair(k))
	if err == nil {
		p.take(p.meshes[k].First, thin[0], true)
		p.take(p.meshes[k].Second, thin[1], true)
	}
	return err
}

// shareBound bounds the free gear of a mesh whose other gear is settled.
func (p *planner) shareBound(k int) error {
	pair, n := p.settled(k)
	if n != 1 || p.named(k) {
		return nil
	}
	gears := p.meshes[k].gears()
	for i, gear := range gears {
		mate := gears[1-i]
		switch {
		case pair[i].Thin != nil:
		case p.hard[mate]:
			left, err := p.left(k, i, pair)
			if err != nil {
				return err
			}
			p.bind(gear, left)
		default:
			thin, err := p.meshes[k].shares(k, pair)
			if err != nil {
				return err
			}
			p.bind(gear, thin[i])
		}
	}
	return nil
}

// shareSoft shares out in a mesh of two gears that can both give way.
func (p *planner) shareSoft(k int) error {
	pair, n := p.settled(k)
	if n != 0 {
		return nil
	}
	thin, err := p.meshes[k].shares(k, pair)
	if err == nil {
		p.take(p.meshes[k].First, thin[0], false)
		p.take(p.meshes[k].Second, thin[1], false)
	}
	return err
}

// bind bounds a gear by what a mesh with a settled gear leaves it.
func (p *planner) bind(gear int, thin Limits) {
	if old := p.bound[gear]; old != nil {
		thin = Limits{max(old.Min, thin.Min), min(old.Max, thin.Max)}
	}
	p.bound[gear] = &thin
}

// keepBounds brings what gears take into their bounds; a gear that has only bounds takes them.
func (p *planner) keepBounds() {
	for i, bound := range p.bound {
		switch {
		case bound == nil:
		case p.by[i] != ByBacklash:
			p.by[i], p.thin[i] = ByBacklash, *bound
		default:
			least := max(bound.Min, min(p.thin[i].Min, bound.Max))
			p.thin[i] = Limits{least, min(least+p.thin[i].Width(), bound.Max)}
		}
	}
}

// leastWidth returns the least width that a gear is left that is free to give way.
func (p *planner) leastWidth() float64 {
	least := math.Inf(1)
	for i, by := range p.by {
		if by == ByBacklash && !p.hard[i] {
			least = min(least, p.thin[i].Width())
		}
	}
	return least
}

// take adds one mesh's share to what a gear has. A hard share, of a mesh that
// names the gear that takes it all, rules over soft ones.
func (p *planner) take(gear int, thin Limits, hard bool) {
	old, first := p.thin[gear], p.by[gear] != ByBacklash
	p.by[gear] = ByBacklash
	switch {
	case first || (hard && !p.hard[gear]):
		p.thin[gear], p.hard[gear] = thin, hard
		return
	case hard:
		p.thin[gear] = Limits{max(old.Min, thin.Min), min(old.Max, thin.Max)}
		return
	case p.hard[gear]:
		return
	}
	least := min(old.Min, thin.Min)
	p.thin[gear] = Limits{least, least + min(old.Width(), thin.Width())}
}

// settle deepens meshes whose gears both run in others too, gives what a gear in
// several meshes leaves over to its mates, and checks every mesh.
func (p *planner) settle() error {
	for _, k := range p.active {
		if p.yielding(k) < 0 {
			if err := p.deepen(k); err != nil {
				return p.conflict(k)
			}
		}
	}
	for _, k := range p.active {
		if err := p.yield(k); err != nil {
			return p.conflict(k)
		}
	}
	for _, k := range p.active {
		if err := p.deepen(k); err != nil {
			return p.conflict(k)
		}
	}
	return p.check()
}

// yielding returns which gear of a mesh, 0 or 1, runs in no other and so can take
// what the other leaves it; -1 for none.
func (p *planner) yielding(k int) int {
	gears := p.meshes[k].gears()
	for i, own := range gears {
		mate := gears[1-i]
		if p.by[own] == ByBacklash && !p.hard[own] && p.count(own) == 1 && p.count(mate) > 1 {
			return i
		}
	}
	return -1
}

// yield gives the yielding gear of a mesh what the other leaves it.
func (p *planner) yield(k int) error {
	i := p.yielding(k)
	if i < 0 {
		return nil
	}
	gears, pair := p.meshes[k].gears(), p.pair(k)
	pair[1-i].Thin = &p.thin[gears[1-i]]
	left, err := p.left(k, i, pair)
	p.thin[gears[i]] = left
	return err
}

// left returns what the other gear of a mesh, which is settled, leaves gear i of it. One
// that another mesh thins more than this one asks leaves nothing to take, not a thicker tooth.
func (p *planner) left(k, i int, pair [2]PlanGear) (Limits, error) {
	thin, err := p.meshes[k].shares(k, pair)
	if problem, ok := err.(*PlanProblem); ok && problem.Kind == TooThick && thin[i].Max > -noThinning {
		err = nil
	}
	left := Limits{max(0, thin[i].Min), thin[i].Max}
	if p.meshes[k].LeastOnly { // then the width is what is stated
		left.Max = left.Min + thin[i].Width()
	}
	return left, err
}

// backlash returns what the thinnings of a mesh's gears come to by its method.
func (p *planner) backlash(k int) (Limits, error) {
	m, pair := p.meshes[k], p.pair(k)
	b, err := m.Budget(pair[0].Thickness(p.thin[m.First]), pair[1].Thickness(p.thin[m.Second]))
	return b.By(m.Method), err
}

// check holds every mesh against what it asked for.
func (p *planner) check() error {
	for _, k := range p.active {
		m := p.meshes[k]
		got, err := p.backlash(k)
		bad := func(gear int) bool {
			return p.by[gear] == ByBacklash && (p.thin[gear].Width() < -noThinning || p.thin[gear].Min < -noThinning)
		}
		if err != nil || bad(m.First) || bad(m.Second) || got.Min < m.Backlash.Min-2*noThinning || (!m.LeastOnly && got.Max > m.Backlash.Max+2*noThinning) {
			return p.conflict(k)
		}
	}
	return nil
}

func (p *planner) conflict(k int) error {
	m := p.meshes[k]
	sole := [2]Limits{}
	for i, gear := range m.gears() {
		sole[i] = Limits{p.thin[gear].Min, p.thin[gear].Min}
		if own := p.gears[gear].Thin; own != nil {
			sole[i] = *own
		}
	}
	return m.explain(&PlanProblem{Kind: Conflict, Mesh: k, Gear: m.First, Thin: p.thin[m.First]}, p.pair(k), sole)
}

// deepen thins one of two gears that both run in several meshes by what their own
// mesh still lacks of its least backlash.
func (p *planner) deepen(k int) error {
	m := p.meshes[k]
	got, err := p.backlash(k)
	if err != nil || got.Min >= m.Backlash.Min-noThinning {
		return err
	}
	for _, i := range m.gears() {
		if p.by[i] != ByBacklash || p.hard[i] {
			continue
		}
		old := p.thin[i]
		by, err := involute.FindRoot(func(by float64) float64 {
			p.thin[i] = Limits{old.Min + by, old.Max + by}
			got, err := p.backlash(k)
			if err != nil {
				return math.NaN()
			}
			return got.Min - m.Backlash.Min
		}, 0, m.Mesh.First.NormalPitch()+m.Backlash.Min)
		p.thin[i] = Limits{old.Min + by, old.Max + by}
		return err
	}
	return p.conflict(k)
}

// count returns how many deciding meshes a gear runs in.
func (p *planner) count(gear int) int {
	n := 0
	for _, k := range p.active {
		if p.meshes[k].First == gear || p.meshes[k].Second == gear {
			n++
		}
	}
	return n
}
