package inspect

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A ProblemKind says what is wrong with a backlash that cannot be had.
type ProblemKind int

// The kinds of problems.
const (
	TooThick ProblemKind = iota // the teeth would have to be thicker than nominal
	NoRoom                      // what takes and adds backlash, or a mate already fixed, needs more than the range
	Conflict                    // another mesh of the same gear asks for something else
)

// A PlanProblem says why a mesh's backlash cannot be had.
type PlanProblem struct {
	Kind    ProblemKind
	Mesh    int       // index
	Gear    int       // index of the gear that cannot be made
	Thin    Limits    // the thinning it would need, mm; empty where Min > Max
	Nominal Limits    // the backlash of nominal (or fixed) teeth, mm
	Most    float64   // the greatest backlash that would have to be allowed, mm
	Sole    [2]Limits // the thinnings of both gears that give the least backlash and have no tolerance
}

// Error says so in short; the program's edge words it for people.
func (p *PlanProblem) Error() string {
	return fmt.Sprintf("mesh %d: no tooth thickness gives this backlash (thinning %g to %g mm)", p.Mesh+1, p.Thin.Min, p.Thin.Max)
}

// explain adds the numbers that tell a person what would make it possible: for
// nominal teeth, and for thinnings that would do but for the greatest backlash.
func (m PlanMesh) explain(p *PlanProblem, pair [2]PlanGear, thin [2]Limits) error {
	nominal := m.split(pair).thin(0, 0)
	n1, n2 := pair[0].Thickness(nominal[0]), pair[1].Thickness(nominal[1])
	if b, err := m.Budget(n1, n2); err == nil {
		p.Nominal = b.By(m.Method)
	}
	b, err := m.Budget(pair[0].Thickness(thin[0]), pair[1].Thickness(thin[1]))
	if err != nil {
		return p
	}
	p.Sole, p.Most = thin, b.By(m.Method).Max
	if p.Kind == NoRoom {
		p.Most = m.mostNeeded(pair, p.Most)
	}
	return p
}

// mostNeeded returns the greatest backlash from which on a wish leaves room. That of
// teeth without tolerance is a little less where gears grow unlike.
func (m PlanMesh) mostNeeded(pair [2]PlanGear, most float64) float64 {
	room := func(most float64) float64 {
		m.Backlash = &Limits{m.Backlash.Min, most}
		width, err := m.Room(pair, m.Method)
		if err != nil {
			return math.NaN()
		}
		return width
	}
	far := most + 0.01*(most+m.Mesh.First.Module())
	if found, err := involute.FindRoot(room, m.Backlash.Max, far); err == nil {
		return max(most, found)
	}
	return most
}
