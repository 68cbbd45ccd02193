package inspect

import (
	"math"

	"flankwright/involute"
)

// A RemedyKind is a change that would make a backlash possible.
type RemedyKind int

// The remedies.
const (
	WidenBacklash      RemedyKind = iota // Value: the greatest backlash that must be allowed, mm
	AskForMore                           // Value: the least backlash to ask for, mm
	CloserCenter                         // Value: the tolerance of the center distance, plus and minus, that must not be reached, mm
	CloserRunout                         // Value: the share of the runouts that must not be reached
	FinerTeeth                           // Value: the share of all deviations of the teeth that must not be reached
	MoveCenter                           // Value: by how much to change the center distance, mm
	RaiseShift                           // Value: by how much to raise the shift coefficients of the free gears, together
	TakeNominal                          // Thin: nominal teeth as the thickest, and how thin they may be
	Statistically                        // hold the backlash statistically instead of at worst
	WidenStatistically                   // Value: the greatest backlash that must be allowed if it is held statistically, mm
	SteadierWarmth                       // Value: the share of the climate's growth that must not be reached
)

// A Remedy is one change; all else stays.
type Remedy struct {
	Kind  RemedyKind
	Value float64
	Thin  [2]Limits // thinnings, mm
}

// hair is how far beyond its value a remedy is tried, as a share of it, or of a module.
const hair = 1e-6

// Moved returns the mesh with its center distance farther by so much, mm.
func (m PlanMesh) Moved(by float64) PlanMesh {
	m.Center = Limits{m.Center.Min + by, m.Center.Max + by}
	return m
}

// WithFinerTeeth returns the mesh with a share of all deviations of its teeth, but for a
// runout that is measured.
func (m PlanMesh) WithFinerTeeth(share float64) PlanMesh {
	for i, d := range m.Deviations {
		m.Deviations[i] = Deviations{d.Runout * share, d.Measured, d.Pitch * share, d.Profile * share, d.Helix * share}
		if d.Measured {
			m.Deviations[i].Runout = d.Runout
		}
	}
	return m
}

// Room returns what a wish leaves for the thicknesses of the gears together, by a
// method: the sum of the tolerances, mm. Below zero it is what is missing.
func (m PlanMesh) Room(pair [2]PlanGear, method Method) (float64, error) {
	m.Method, m.LeastOnly = method, false
	least, width, err := m.thinning(pair, m.split(pair))
	return width + min(0, least), err // no tooth is thicker than nominal
}

// Possible reports whether the wish can be had.
func (m PlanMesh) Possible(pair [2]PlanGear) bool {
	_, err := m.shares(0, pair)
	return err == nil
}

// Remedies lists what would make a wish possible that is not, each alone; what
// alone would not do is left out.
func (m PlanMesh) Remedies(pair [2]PlanGear, p *PlanProblem) []Remedy {
	if p.Kind == TooThick {
		list := []Remedy{{Kind: AskForMore, Value: p.Nominal.Min}}
		nominal := m.split(pair).thin(0, 0)
		by, ok := m.CenterFor(pair[0].Thickness(nominal[0]), pair[1].Thickness(nominal[1]), m.Backlash.Min)
		if ok && m.Moved(by-hair*m.Mesh.First.Module()).Possible(pair) {
			list = append(list, Remedy{Kind: MoveCenter, Value: by})
		}
		return append(list, m.nominalRemedies(pair)...)
	}
	list := []Remedy{{Kind: WidenBacklash, Value: p.Most}}
	scaled := func(kind RemedyKind, size float64, scale func(m *PlanMesh, by float64)) {
		at := func(by float64) PlanMesh {
			try := m
			scale(&try, by)
			return try
		}
		room := func(by float64) float64 {
			width, err := at(by).Room(pair, m.Method)
			if err != nil {
				return math.NaN()
			}
			return width
		}
		if by, err := involute.FindRoot(room, 0, 1); err == nil && by > hair && at(by-hair).Possible(pair) {
			list = append(list, Remedy{Kind: kind, Value: size * by})
		}
	}
	scaled(CloserCenter, m.Center.Width()/2, func(m *PlanMesh, by float64) {
		middle, half := m.Center.Middle(), by*m.Center.Width()/2
		m.Center = Limits{middle - half, middle + half}
	})
	scaled(CloserRunout, 1, func(m *PlanMesh, by float64) {
		for i := range m.Deviations {
			m.Deviations[i].Runout *= by
		}
	})
	scaled(FinerTeeth, 1, func(m *PlanMesh, by float64) { *m = m.WithFinerTeeth(by) })
	scaled(SteadierWarmth, 1, func(m *PlanMesh, by float64) { m.Climate = m.Climate.scaled(by) })
	if worst := p.Most; m.Method == WorstCase {
		m.Method = Statistical
		_, err := m.shares(0, pair)
		switch p, isProblem := err.(*PlanProblem); {
		case err == nil:
			list = append(list, Remedy{Kind: Statistically})
		case isProblem && p.Kind == NoRoom && p.Most < worst-hair:
			list = append(list, Remedy{Kind: WidenStatistically, Value: p.Most})
		}
	}
	return list
}

// nominalRemedies are for nominal teeth that have more than the least backlash asked for.
func (m PlanMesh) nominalRemedies(pair [2]PlanGear) []Remedy {
	s := m.split(pair)
	least, width, err := m.thinning(pair, s)
	if err != nil {
		return nil
	}
	var list []Remedy
	module := m.Mesh.First.Module()
	if width > hair*module {
		list = append(list, Remedy{Kind: RaiseShift, Value: -least / (2 * module * math.Tan(m.Mesh.First.PressureAngle()))})
	}
	if width += least; width > hair*module {
		list = append(list, Remedy{Kind: TakeNominal, Thin: s.thin(0, width)})
	}
	return list
}

// scaled returns a climate with a share of the growth.
func (c *Climate) scaled(by float64) *Climate {
	if c == nil {
		return nil
	}
	out := *c
	near := func(l Limits, to float64) Limits { return Limits{to + by*(l.Min-to), to + by*(l.Max-to)} }
	out.Temperature = near(c.Temperature, ReferenceTemperature)
	out.Swell = [2]Limits{near(c.Swell[0], 0), near(c.Swell[1], 0)}
	return &out
}

// CenterFor returns by how much the center distance must change, positive for
// farther apart by its absolute value, so that teeth of these thicknesses have the
// least backlash asked for, by the mesh's method. It is false where no change
// up to a module does it.
func (m PlanMesh) CenterFor(first, second Limits, least float64) (by float64, ok bool) {
	off := func(by float64) float64 {
		b, err := m.Moved(by).Budget(first, second)
		if err != nil {
			return math.Inf(-1) // closer than the base circles allow
		}
		return b.By(m.Method).Min - least
	}
	module := m.Mesh.First.Module()
	by, err := involute.FindRoot(off, -module, module)
	return by, err == nil
}
