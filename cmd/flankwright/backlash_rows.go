package main

import (
	"fmt"

	"flankwright/inspect"
)

// addRows adds the budget's rows, and names the one that costs most.
func (b *meshBacklash) addRows(j *job) {
	most := 0.0
	for _, r := range b.budget.Rows {
		takes, adds := b.budget.StatisticalShare(r)
		row := budgetRow{What: rowName(b.mesh, r.Cause), Worst: r.Takes, Statistical: takes, WorstAdds: r.Adds, StatisticalAdds: adds, Certain: r.Certain, text: j.causeText(b.mesh, r)}
		if r.Gear >= 0 {
			row.Gear = b.Gears[r.Gear]
		}
		b.Budget = append(b.Budget, row)
		if cost := r.Takes + r.Adds; r.Cause != inspect.OfTeeth && cost > most {
			most, b.CostsMost = cost, row.name()
		}
	}
}

// name names a row in a sentence.
func (r budgetRow) name() string {
	if r.Gear == "" {
		return r.What
	}
	return r.What + " of " + r.Gear
}

// rowName names a row's cause: a climate is heat, swelling or both.
func rowName(m *mesh, c inspect.Cause) string {
	if c != inspect.OfClimate || m.plan.Climate.Swell == [2]inspect.Limits{} {
		return causeName(c)
	}
	if m.plan.Climate.Steady() {
		return "swelling"
	}
	return "temperature and swelling"
}

// causeName names a cause as JSON does.
func causeName(c inspect.Cause) string {
	switch c {
	case inspect.OfCenter:
		return "center distance"
	case inspect.OfRunout:
		return "runout"
	case inspect.OfPitch:
		return "pitch deviation"
	case inspect.OfProfile:
		return "profile deviation"
	case inspect.OfHelix:
		return "helix deviation"
	case inspect.OfClimate:
		return "temperature"
	}
	return "tooth thickness"
}

// causeText words a row of the budget with its size.
func (j *job) causeText(m *mesh, r inspect.Contribution) string {
	if r.Gear < 0 {
		if r.Cause == inspect.OfClimate {
			return climateText(m.plan.Climate)
		}
		return "Center distance, ±" + j.length(m.plan.Center.Width()/2)
	}
	g := []*gear{m.first, m.second}[r.Gear]
	d := m.plan.Deviations[r.Gear]
	switch r.Cause {
	case inspect.OfRunout:
		how := "allowed"
		if d.Measured {
			how = "measured"
		}
		return fmt.Sprintf("Runout of %s, %s %s", g.name, j.length(d.Runout), how)
	case inspect.OfPitch:
		return fmt.Sprintf("Pitch of %s, f_pt ±%s", g.name, j.length(d.Pitch))
	case inspect.OfProfile:
		return fmt.Sprintf("Profile of %s, F_α %s", g.name, j.length(d.Profile))
	case inspect.OfHelix:
		return fmt.Sprintf("Helix of %s, F_β %s", g.name, j.length(d.Helix))
	}
	return fmt.Sprintf("Tooth thickness of %s, its tolerance", g.name)
}

// climateText words what a mesh runs in.
func climateText(c *inspect.Climate) string {
	text := ""
	if t := c.Temperature; !c.Steady() {
		text = fmt.Sprintf("Temperature, %s to %s °C", celsius(t.Min), celsius(t.Max))
		if t.Width() == 0 {
			text = fmt.Sprintf("Temperature, %s °C", celsius(t.Min))
		}
	}
	if c.Swell == [2]inspect.Limits{} {
		return text
	}
	if text != "" {
		return text + ", and swelling"
	}
	return "Swelling in water"
}

// celsius words a temperature to a tenth.
func celsius(t float64) string { return trim("%.1f", t) }
