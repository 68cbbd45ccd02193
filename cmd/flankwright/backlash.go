package main

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
)

// The simulation that backlash runs unless told otherwise.
const (
	usualPairs  = 20000
	usualSeed   = 1
	fewestPairs = 1000
	mostPairs   = 2000000
)

func backlashCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("file to write instead of standard output")...)
	flags = append(flags,
		&cli.BoolFlag{Name: "customary", Usage: "what standards and custom would give this pair, as a starting point", Category: catMesh, DisableDefaultText: true},
		&cli.IntFlag{Name: "pairs", Usage: "how many pairs to draw at random for the chance of binding", Value: usualPairs, Category: catMesh},
		&cli.Int64Flag{Name: "seed", Usage: "where the random numbers begin; the same seed gives the same pairs", Value: usualSeed, Category: catMesh})
	return &cli.Command{
		Name: "backlash", Usage: "how thin the teeth must be for the backlash wanted, and what takes it",
		UsageText: "flankwright backlash [JOB] [flags]\nflankwright backlash --module 2 --teeth 20 --mate-teeth 41 --center 61±0.02 --backlash 0.05..0.15", Flags: flags,
		Action: func(c *cli.Context) error {
			j, gears, err := loadPlanned(c)
			if err != nil {
				return err
			}
			opt, err := readBacklashOptions(c)
			if err != nil {
				return err
			}
			b, err := newBacklash(j, gears, opt)
			if err != nil {
				return err
			}
			if err := emit(c, b, func() []byte { return b.text(newPage(c.App.Writer), j.digits(c)) }); err != nil {
				return err
			}
			return b.verdict()
		},
	}
}

// loadPlanned is loadJob, but a backlash that cannot be had is an answer.
func loadPlanned(c *cli.Context) (*job, []*gear, error) {
	j, gears, err := loadJob(c)
	if j != nil && j.problem != nil {
		if gears, err = j.chosen(c.String("gear")); err == nil {
			err = j.readBlank(c, gears)
		}
	}
	if err != nil {
		return nil, nil, err
	}
	if len(j.meshes) == 0 {
		return nil, nil, wrong("backlash is of a pair: give --mate-teeth, or a [[mesh]] in the job")
	}
	return j, gears, nil
}

// backlash is the result of the command, as JSON writes it.
type backlash struct {
	Gears    ordered        `json:"gears"`
	Meshes   []meshBacklash `json:"meshes"`
	Warnings []warning      `json:"warnings"`
	Explain  []explanation  `json:"explain,omitempty"`

	job     *job
	list    []*gear
	targets *targets
}

type gearBacklash struct {
	gearTargets
	Thinning     span      `json:"thinner_than_nominal_mm"`
	Tolerance    float64   `json:"thickness_tolerance_mm"`
	Accuracy     string    `json:"accuracy,omitempty"`
	Tolerances   *flankSet `json:"flank_tolerances_mm,omitempty"`
	OutsideRange []string  `json:"outside_of_the_standard,omitempty"`
}

// A flankSet is what an accuracy class allows one gear, mm.
type flankSet struct {
	Pitch      float64 `json:"single_pitch"`
	Cumulative float64 `json:"cumulative_pitch"`
	Profile    float64 `json:"profile"`
	Helix      float64 `json:"helix,omitempty"`
	Runout     float64 `json:"runout"`
}

type meshBacklash struct {
	Gears           []string     `json:"gears"`
	Asked           *askedSpan   `json:"asked_mm"`
	Method          string       `json:"held"`
	Possible        bool         `json:"possible"`
	Problem         string       `json:"problem,omitempty"`
	Circumferential span         `json:"circumferential_backlash_mm"`
	Statistical     span         `json:"statistical_backlash_mm"`
	Middle          float64      `json:"middle_backlash_mm"`
	Budget          []budgetRow  `json:"budget"`
	CostsMost       string       `json:"costs_most"`
	Left            *leftOver    `json:"left_for_thickness_mm"`
	Remedies        []remedyText `json:"remedies"`
	At              []atHeat     `json:"at"`
	Random          *randomPairs `json:"random_pairs"`
	Customary       []custom     `json:"customary"`

	mesh    *mesh
	thick   [2]inspect.Limits // of which the budget is
	problem *inspect.PlanProblem
	alone   bool // planned by itself, since another mesh's backlash cannot be had
	budget  inspect.Budget
}

// leftOver is what the wish leaves the thicknesses of both gears together.
type leftOver struct {
	Worst       float64 `json:"worst"`
	Statistical float64 `json:"statistical"`
}

type budgetRow struct {
	What            string  `json:"what"`
	Gear            string  `json:"gear,omitempty"`
	Worst           float64 `json:"worst_mm"`
	Statistical     float64 `json:"statistical_mm"`
	WorstAdds       float64 `json:"worst_adds_mm"`
	StatisticalAdds float64 `json:"statistical_adds_mm"`
	Certain         bool    `json:"met_by_every_pair"`
	text            string
}

// atHeat is the backlash at one temperature.
type atHeat struct {
	Temperature float64 `json:"temperature_c"`
	Worst       span    `json:"worst_mm"`
	Statistical span    `json:"statistical_mm"`
	Middle      float64 `json:"middle_mm"`
}

type randomPairs struct {
	Pairs  int      `json:"pairs"`
	Seed   uint64   `json:"seed"`
	Bind   float64  `json:"chance_of_binding"`
	Short  *float64 `json:"chance_of_falling_short"` // of the least asked for; null where none is
	Over   *float64 `json:"chance_of_exceeding"`     // null where no greatest is asked for
	Mean   float64  `json:"mean_mm"`
	Nearly span     `json:"nearly_all_mm"`
}

// backlashOptions say how much is to be told.
type backlashOptions struct {
	pairs              int
	seed               uint64
	customary, explain bool
	ask                ask // what to measure with
}

func readBacklashOptions(c *cli.Context) (backlashOptions, error) {
	pairs, seed := c.Int("pairs"), c.Int64("seed")
	switch {
	case pairs < fewestPairs || pairs > mostPairs:
		return backlashOptions{}, wrong("--pairs: %d pairs tell nothing or take too long; give %d to %d", pairs, fewestPairs, mostPairs)
	case seed < 0:
		return backlashOptions{}, wrong("--seed: needs a whole number of 0 or more, not %d", seed)
	}
	shop, err := loadShop(c)
	return backlashOptions{pairs, uint64(seed), c.Bool("customary"), c.Bool("explain"), ask{shop: shop}}, err
}

func newBacklash(j *job, gears []*gear, opt backlashOptions) (*backlash, error) {
	b := &backlash{job: j, list: gears, Warnings: j.about(gears), Meshes: []meshBacklash{}}
	if j.problem == nil {
		b.addGears(opt.ask)
	}
	for _, m := range j.meshes {
		if len(gears) < len(j.gears) && gears[0] != m.first && gears[0] != m.second {
			continue
		}
		one, err := j.meshBacklash(m)
		if err != nil {
			return nil, j.impossibleMesh(m, err)
		}
		if j.problem == nil {
			if err := one.simulate(opt.pairs, opt.seed); err != nil {
				return nil, j.impossibleMesh(m, err)
			}
		}
		if opt.customary || m.plan.Backlash == nil {
			one.Customary = m.customary()
		}
		b.Meshes = append(b.Meshes, one)
	}
	if opt.explain {
		b.Explain = explainBacklash(b)
	}
	return b, nil
}

// addGears adds each gear's limits and what to measure.
func (b *backlash) addGears(a ask) {
	b.targets = newTargets(b.job, b.list, a)
	for i, g := range b.list {
		t := b.targets.gears[i]
		one := gearBacklash{
			gearTargets: t, Tolerance: g.thickness.Limits.Width(),
			Thinning: toSpan(g.planned().Thickness(g.thickness.Limits)), // what is left to nominal
		}
		if f := g.flanks; f != nil {
			one.Accuracy, one.OutsideRange = f.Accuracy.String(), f.Outside
			one.Tolerances = &flankSet{f.SinglePitch, f.CumulativePitch, f.Profile, f.Helix, f.Runout}
		}
		b.Gears.add(g.name, one)
	}
}

// meshBacklash works out the budget of a mesh: of the thicknesses found, or where
// the job's backlash cannot be had, of those that would give the least of it.
func (j *job) meshBacklash(m *mesh) (meshBacklash, error) {
	out := meshBacklash{
		Gears: []string{m.first.name, m.second.name}, mesh: m, Possible: true, Budget: []budgetRow{}, Remedies: []remedyText{}, At: []atHeat{}, Customary: []custom{},
		Method: methodWord(m.plan.Method),
	}
	err := out.plan(j)
	if err != nil {
		return out, err
	}
	if out.budget, err = m.plan.Budget(out.thick[0], out.thick[1]); err != nil {
		return out, err
	}
	out.Circumferential, out.Statistical, out.Middle = toSpan(out.budget.Worst()), toSpan(out.budget.Statistical()), out.budget.Middle
	out.addRows(j)
	if want := m.plan.Backlash; want != nil {
		out.Asked = &askedSpan{Min: want.Min}
		if !m.plan.LeastOnly {
			out.Asked.Max = &want.Max
		}
		out.Possible = out.problem == nil && held(out.budget.By(m.plan.Method), *want, m.plan.LeastOnly)
	}
	if err := out.addLeft(); err != nil {
		return out, err
	}
	if !out.Possible {
		if out.problem == nil {
			got := out.budget.By(m.plan.Method)
			out.Problem = fmt.Sprintf("%s and %s: the teeth as they are give %s to %s of backlash %s, not the %s asked for", m.first.name, m.second.name,
				j.length(got.Min), j.length(got.Max), out.Method, j.wishText(m))
		}
		out.Remedies = j.remedies(&out)
	}
	return out, out.addHeat()
}

// plan finds the thicknesses that a budget is shown of: those of the job's plan; or
// where that failed, at the mesh to blame those that give its least backlash with no
// tolerance, and at others what comes out of planning them alone.
func (b *meshBacklash) plan(j *job) error {
	m := b.mesh
	switch {
	case j.problem == nil:
		b.thick = [2]inspect.Limits{m.first.thickness.Limits, m.second.thickness.Limits}
		return nil
	case j.meshes[j.problem.Mesh] == m:
		b.problem = j.problem
	default:
		plan, pair := m.plan, m.pair()
		plan.First, plan.Second = 0, 1
		found, err := inspect.Plan(pair[:], []inspect.PlanMesh{plan})
		if err == nil {
			b.alone, b.thick = true, [2]inspect.Limits{found[0].Limits, found[1].Limits}
			return nil
		}
		if !errors.As(err, &b.problem) {
			return err
		}
		b.problem.Mesh = m.index
	}
	b.Problem = j.planReason(b.problem)
	for i, g := range m.pair() {
		b.thick[i] = g.Thickness(b.problem.Sole[i])
	}
	return nil
}

// methodWord says how a backlash is held.
func methodWord(m inspect.Method) string {
	if m == inspect.Statistical {
		return "statistically"
	}
	return "at worst"
}

// held reports whether a backlash lies within what was asked for, to a rounding
// of limits that are given in decimals.
func held(got, want inspect.Limits, leastOnly bool) bool {
	const slack = 1e-6 // mm
	return got.Min >= want.Min-slack && (leastOnly || got.Max <= want.Max+slack)
}

// addLeft adds what a range of backlash leaves for the thicknesses.
func (b *meshBacklash) addLeft() error {
	m := b.mesh
	if m.plan.Backlash == nil || m.plan.LeastOnly || (m.first.ownThin() != nil && m.second.ownThin() != nil) {
		return nil
	}
	worst, err := m.plan.Room(m.pair(), inspect.WorstCase)
	if err != nil {
		return err
	}
	statistical, err := m.plan.Room(m.pair(), inspect.Statistical)
	b.Left = &leftOver{worst, statistical}
	return err
}

// addHeat adds the backlash at the ends of the temperature's range and at 20 °C.
func (b *meshBacklash) addHeat() error {
	m := b.mesh
	heats := []float64{inspect.ReferenceTemperature}
	if m.temperature != nil {
		heats = append(heats, m.temperature.Min, m.temperature.Max)
		slices.Sort(heats)
		heats = slices.Compact(heats)
	}
	for _, h := range heats {
		at := m.plan.AtTemperature(h)
		budget, err := at.Budget(b.thick[0], b.thick[1])
		if err != nil {
			return err
		}
		b.At = append(b.At, atHeat{h, toSpan(budget.Worst()), toSpan(budget.Statistical()), budget.MiddleWarm()})
	}
	return nil
}

// simulate draws pairs at random.
func (b *meshBacklash) simulate(pairs int, seed uint64) error {
	m := b.mesh
	limits := inspect.Limits{Min: math.Inf(-1), Max: math.Inf(1)}
	if want := m.plan.Backlash; want != nil {
		limits.Min = want.Min
		if !m.plan.LeastOnly {
			limits.Max = want.Max
		}
	}
	s, err := m.plan.Simulate(m.first.thickness.Limits, m.second.thickness.Limits, limits, pairs, seed)
	b.Random = &randomPairs{Pairs: s.Pairs, Seed: s.Seed, Bind: s.Bind, Mean: s.Mean, Nearly: toSpan(s.Nearly)}
	if b.Asked != nil {
		b.Random.Short = &s.Short
		if b.Asked.Max != nil {
			b.Random.Over = &s.Over
		}
	}
	return err
}

// verdict is errNo where a backlash that is asked for cannot be had.
func (b *backlash) verdict() error {
	for _, m := range b.Meshes {
		if !m.Possible {
			return errNo
		}
	}
	return nil
}
