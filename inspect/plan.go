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

// A PlanGear's thickness is decided by the first of these that applies.
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
// the least, the thinnest at the loosest the greatest; a gear that is already
// fixed leaves its mate the rest; a gear in several meshes takes what
// satisfies all; else nominal.
func Plan(gears []PlanGear, meshes []PlanMesh) ([]Thickness, error) {
	out := make([]Thickness, len(gears))
	thin := make([]Limits, len(gears))
	for i, g := range gears {
		out[i].By = ByNothing
		if g.Thin != nil {
			out[i].By, thin[i] = ByThin, *g.Thin
		}
	}
	for k, m := range meshes {
		if m.Backlash == nil || (gears[m.First].Thin != nil && gears[m.Second].Thin != nil) {
			continue
		}
		want, err := m.thinning(gears)
		if err != nil {
			return nil, err
		}
		for _, w := range m.split(gears, want) {
			if kind, bad := w.thin.problem(); bad {
				return nil, m.explain(&PlanProblem{Kind: kind, Mesh: k, Gear: w.gear, Thin: w.thin}, gears)
			}
			if out[w.gear].By == ByBacklash {
				w.thin = Limits{max(w.thin.Min, thin[w.gear].Min), min(w.thin.Max, thin[w.gear].Max)}
				if w.thin.Min > w.thin.Max+noThinning {
					return nil, m.explain(&PlanProblem{Kind: Conflict, Mesh: k, Gear: w.gear, Thin: w.thin}, gears)
				}
			}
			out[w.gear].By, thin[w.gear] = ByBacklash, w.thin
		}
	}
	for i, g := range gears {
		s := g.Gear.NominalThickness()
		out[i].Limits = Limits{s - thin[i].Max, s - thin[i].Min}
	}
	return out, nil
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
}

// split shares the pair's thinning out to the gears that are still free. With
// one gear fixed, the thickest pair still has the least backlash, so the mate
// takes least − its least and most − its most.
func (m PlanMesh) split(gears []PlanGear, want Limits) []share {
	f1, f2 := gears[m.First].Thin, gears[m.Second].Thin
	switch {
	case f1 != nil:
		return []share{{m.Second, Limits{want.Min - f1.Min, want.Max - f1.Max}}}
	case f2 != nil:
		return []share{{m.First, Limits{want.Min - f2.Min, want.Max - f2.Max}}}
	case m.Share == ShareFirst:
		return []share{{m.First, want}, {m.Second, Limits{}}}
	case m.Share == ShareSecond:
		return []share{{m.First, Limits{}}, {m.Second, want}}
	}
	half := Limits{want.Min / 2, want.Max / 2}
	return []share{{m.First, half}, {m.Second, half}}
}

// problem reports an empty or a negative thinning.
func (l Limits) problem() (ProblemKind, bool) {
	switch {
	case l.Min > l.Max+noThinning:
		return NoRoom, true
	case l.Min < -noThinning:
		return TooThick, true
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
