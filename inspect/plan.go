package inspect

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A PlanGear is a gear whose thickness limits are to be found.
type PlanGear struct {
	Gear *involute.Gear
	Thin *Limits // how much thinner than nominal, normal, mm; nil where the meshes decide
}

// Share says which gear of a mesh takes the thinning.
type Share int

// The shares.
const (
	ShareEqual  Share = iota // half each
	ShareFirst               // the first gear takes all
	ShareSecond              // the second gear takes all
)

// A PlanMesh is a mesh whose backlash may decide thicknesses.
type PlanMesh struct {
	First, Second int // indices of the gears
	Mesh          involute.Mesh
	Center        Limits  // |a|, mm
	Backlash      *Limits // circumferential, on the working pitch circle, mm; nil for no wish
	Share         Share
}

// Tightest returns the center distance with the least backlash: the smaller, or
// with a ring the larger; with the sign of the formulas.
func (m PlanMesh) Tightest() float64 {
	if m.ring() {
		return -m.Center.Max
	}
	return m.Center.Min
}

// Loosest returns the center distance with the greatest backlash.
func (m PlanMesh) Loosest() float64 {
	if m.ring() {
		return -m.Center.Min
	}
	return m.Center.Max
}

// Nominal returns the middle of the center distance, with the sign of the formulas.
func (m PlanMesh) Nominal() float64 {
	if m.ring() {
		return -m.Center.Middle()
	}
	return m.Center.Middle()
}

func (m PlanMesh) ring() bool { return m.Mesh.LeastCenter() < 0 }

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

// A ProblemKind says what is wrong with a backlash that cannot be had.
type ProblemKind int

// The kinds of problems.
const (
	TooThick ProblemKind = iota // the teeth would have to be thicker than nominal
	NoRoom                      // the center's tolerance, or a mate already fixed, takes more than the range
	Conflict                    // another mesh of the same gear asks for something else
)

// A PlanProblem says why a mesh's backlash cannot be had.
type PlanProblem struct {
	Kind  ProblemKind
	Mesh  int     // index
	Gear  int     // index of the gear that cannot be made
	Thin  Limits  // the thinning it would need, mm; empty where Min > Max
	Play  float64 // the least backlash of nominal (or fixed) teeth, at the tightest center, mm
	Tight float64 // the center distance without backlash of nominal (or fixed) teeth, positive; 0 for none
	Most  float64 // NoRoom: the greatest backlash that would have to be allowed, mm
}

// Error says so in short; the program's edge words it for people.
func (p *PlanProblem) Error() string {
	return fmt.Sprintf("mesh %d: no tooth thickness gives this backlash (thinning %g to %g mm)", p.Mesh+1, p.Thin.Min, p.Thin.Max)
}

// noThinning takes up rounding: a thinning this little below zero is zero, mm.
const noThinning = 1e-9

// Plan finds the thickness limits of all gears: a gear's own thinning rules;
// else its meshes' backlash, the thickest pair at the tightest center giving
// the least, the thinnest at the loosest the greatest; else nominal.
//
// In each mesh the gears share the thinning out, and a gear that is already fixed
// leaves its mate the rest. A gear in several meshes takes the least of its
// shares, least thinning and range alike, which suits all; its mates in one mesh
// only take what that leaves them.
func Plan(gears []PlanGear, meshes []PlanMesh) ([]Thickness, error) {
	p := planner{gears: gears, meshes: meshes, thin: make([]Limits, len(gears)), by: make([]Decider, len(gears)), hard: make([]bool, len(gears))}
	for i, g := range gears {
		p.by[i] = ByNothing
		if g.Thin != nil {
			p.by[i], p.thin[i] = ByThin, *g.Thin
		}
	}
	if err := p.shareOut(); err != nil {
		return nil, err
	}
	if err := p.settle(); err != nil {
		return nil, err
	}
	out := make([]Thickness, len(gears))
	for i, g := range gears {
		s := g.Gear.NominalThickness()
		out[i] = Thickness{Limits{s - p.thin[i].Max, s - p.thin[i].Min}, p.by[i]}
	}
	return out, nil
}

// A planner works a plan out.
type planner struct {
	gears  []PlanGear
	meshes []PlanMesh
	thin   []Limits
	by     []Decider
	wants  []Limits // by mesh: the thinning of both gears together
	active []int    // the meshes that decide something
	hard   []bool   // by gear: its share is not to be changed
}

// shareOut gives every free gear the least of the shares that its meshes ask for.
func (p *planner) shareOut() error {
	p.wants = make([]Limits, len(p.meshes))
	for k, m := range p.meshes {
		if m.Backlash == nil || (p.gears[m.First].Thin != nil && p.gears[m.Second].Thin != nil) {
			continue
		}
		var err error
		if p.wants[k], err = m.thinning(p.gears); err != nil {
			return err
		}
		p.active = append(p.active, k)
		for _, w := range m.split(p.gears, p.wants[k]) {
			if kind, bad := w.thin.problem(); bad {
				return m.explain(&PlanProblem{Kind: kind, Mesh: k, Gear: w.gear, Thin: w.thin}, p.gears)
			}
			p.take(w)
		}
	}
	return nil
}

// take adds one mesh's share to what a gear has. A hard share, of a mesh that
// names the gear that takes it all, rules over soft ones.
func (p *planner) take(w share) {
	old, first := p.thin[w.gear], p.by[w.gear] != ByBacklash
	p.by[w.gear] = ByBacklash
	switch {
	case first || (w.hard && !p.hard[w.gear]):
		p.thin[w.gear], p.hard[w.gear] = w.thin, w.hard
		return
	case w.hard:
		p.thin[w.gear] = Limits{max(old.Min, w.thin.Min), min(old.Max, w.thin.Max)}
		return
	case p.hard[w.gear]:
		return
	}
	least := min(old.Min, w.thin.Min)
	p.thin[w.gear] = Limits{least, least + min(old.Width(), w.thin.Width())}
}

// settle gives what a gear in several meshes leaves over to its mates, and
// checks every mesh.
func (p *planner) settle() error {
	for _, k := range p.active {
		m := p.meshes[k]
		for _, side := range []struct{ own, mate int }{{m.First, m.Second}, {m.Second, m.First}} {
			if p.by[side.own] == ByBacklash && !p.hard[side.own] && p.count(side.own) == 1 && p.count(side.mate) > 1 {
				// A mate that another mesh thins more than this one asks leaves nothing to take, not a thicker tooth.
				p.thin[side.own] = Limits{max(0, p.wants[k].Min-p.thin[side.mate].Min), p.wants[k].Max - p.thin[side.mate].Max}
				break
			}
		}
	}
	for _, k := range p.active {
		m, want := p.meshes[k], p.wants[k]
		a, b := p.thin[m.First], p.thin[m.Second]
		if short := want.Min - a.Min - b.Min; short > noThinning && !p.deepen(k, short) {
			return m.explain(&PlanProblem{Kind: Conflict, Mesh: k, Gear: m.First, Thin: a}, p.gears)
		}
	}
	return p.check()
}

// check holds every mesh against what it asked for.
func (p *planner) check() error {
	for _, k := range p.active {
		m, want := p.meshes[k], p.wants[k]
		a, b := p.thin[m.First], p.thin[m.Second]
		if a.Min > a.Max+noThinning || b.Min > b.Max+noThinning || a.Min+b.Min < want.Min-noThinning || a.Max+b.Max > want.Max+noThinning {
			return m.explain(&PlanProblem{Kind: Conflict, Mesh: k, Gear: m.First, Thin: a}, p.gears)
		}
	}
	return nil
}

// deepen thins one of two gears that both run in several meshes by what their own mesh still lacks.
func (p *planner) deepen(k int, short float64) bool {
	for _, i := range []int{p.meshes[k].First, p.meshes[k].Second} {
		if p.by[i] == ByBacklash && !p.hard[i] {
			p.thin[i] = Limits{p.thin[i].Min + short, p.thin[i].Max + short}
			return true
		}
	}
	return false
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

// thinning returns how much the two teeth together must be thinner than
// nominal, least and most: the backlash asked for, turned into thickness at
// the tightest and the loosest center.
func (m PlanMesh) thinning(gears []PlanGear) (Limits, error) {
	s1, s2 := gears[m.First].Gear.NominalThickness(), gears[m.Second].Gear.NominalThickness()
	least, err := m.Mesh.ThinningForBacklash(m.Tightest(), s1, s2, m.Backlash.Min)
	if err != nil {
		return Limits{}, err
	}
	most, err := m.Mesh.ThinningForBacklash(m.Loosest(), s1, s2, m.Backlash.Max)
	return Limits{least, most}, err
}

type share struct {
	gear int
	thin Limits
	hard bool
}

// split shares the pair's thinning out to the gears that are still free. With
// one gear fixed, the thickest pair still has the least backlash, so the mate
// takes least − its least and most − its most.
func (m PlanMesh) split(gears []PlanGear, want Limits) []share {
	f1, f2 := gears[m.First].Thin, gears[m.Second].Thin
	switch {
	case f1 != nil:
		return []share{{m.Second, Limits{want.Min - f1.Min, want.Max - f1.Max}, false}}
	case f2 != nil:
		return []share{{m.First, Limits{want.Min - f2.Min, want.Max - f2.Max}, false}}
	case m.Share == ShareFirst:
		return []share{{m.First, want, true}, {m.Second, Limits{}, true}}
	case m.Share == ShareSecond:
		return []share{{m.First, Limits{}, true}, {m.Second, want, true}}
	}
	half := Limits{want.Min / 2, want.Max / 2}
	return []share{{m.First, half, false}, {m.Second, half, false}}
}

// problem reports an empty or a negative thinning.
func (l Limits) problem() (ProblemKind, bool) {
	switch {
	case l.Min < -noThinning:
		return TooThick, true
	case l.Min > l.Max+noThinning:
		return NoRoom, true
	}
	return 0, false
}

// explain adds the numbers that tell a person what would make it possible.
func (m PlanMesh) explain(p *PlanProblem, gears []PlanGear) error {
	thickest := func(i int) float64 {
		n := gears[i].Gear.NominalThickness()
		if t := gears[i].Thin; t != nil {
			n -= t.Min
		}
		return n
	}
	s1, s2 := thickest(m.First), thickest(m.Second)
	play, err := m.Mesh.Backlash(m.Tightest(), s1, s2)
	if err != nil {
		return p
	}
	p.Play = play.Circumferential
	if a, err := m.Mesh.TightCenter(s1, s2); err == nil {
		p.Tight = math.Abs(a)
	}
	alpha, err := m.Mesh.WorkingPressureAngle(m.Loosest())
	if err == nil {
		short := p.Thin.Min - p.Thin.Max
		if gears[m.First].Thin == nil && gears[m.Second].Thin == nil && m.Share == ShareEqual {
			short *= 2
		}
		p.Most = m.Backlash.Max + short/m.Mesh.ThinningPerBacklash(alpha)
	}
	return p
}

// BacklashRange returns the least backlash (thickest teeth, tightest center)
// and the greatest (thinnest, loosest), each on that center's own pitch circles.
func (m PlanMesh) BacklashRange(first, second Limits) (least, most involute.Play, err error) {
	least, err = m.Mesh.Backlash(m.Tightest(), first.Max, second.Max)
	if err != nil {
		return
	}
	most, err = m.Mesh.Backlash(m.Loosest(), first.Min, second.Min)
	return
}
