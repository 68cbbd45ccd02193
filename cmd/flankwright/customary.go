package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// A custom is a habit of the trade as a starting point, and what it gives this pair.
type custom struct {
	Name            string    `json:"name"`
	Source          string    `json:"source"`
	Note            string    `json:"note,omitempty"`
	Circumferential askedSpan `json:"circumferential_backlash_mm"`
	Normal          askedSpan `json:"normal_backlash_mm"`
	Thinning        pairSpans `json:"thinner_than_nominal_mm"` // min: the least; max: where a tolerance belongs to it
	OpenCenter      *float64  `json:"open_center_mm"`          // for teeth of nominal thickness, from the tight center
}

// An askedSpan is a least value, and a greatest where there is one.
type askedSpan struct {
	Min float64  `json:"min"`
	Max *float64 `json:"max"`
}

type pairSpans struct {
	First  askedSpan `json:"first"`
	Second askedSpan `json:"second"`
}

// mostOfMetals is the expansion above which a gear is of plastic, 1/K: that of zinc.
const mostOfMetals = 32e-6

// usualCallOut is the DIN 3967 call-out that drawings show most.
const usualCallOut = "cd25"

// customary lists the habits that reach this pair. Backlash is at the nominal center
// distance; thinnings are what each gear's share of it takes there at the tightest.
func (m *mesh) customary() []custom {
	a, mn := math.Abs(m.plan.Nominal()), m.first.g.Module()
	dp, center := 25.4/mn, a/25.4
	out := []custom{}
	if want := m.plan.Backlash; want != nil {
		asked := m.wished(want.Min)
		asked.Name, asked.Source = "As asked for", "the job"
		if !m.plan.LeastOnly {
			normal := want.Max * m.normalShare()
			asked.Circumferential.Max, asked.Normal.Max = &want.Max, &normal
		}
		out = append(out, asked)
	}
	if l, err := refdata.LeastBacklashISO(a, mn); err == nil {
		out = append(out, m.byNormal("ISO/TR 10064-2, least", l))
	}
	if l, err := refdata.LeastBacklashAGMA(a, mn); err == nil {
		out = append(out, m.byNormal("AGMA 2002, least", l))
	}
	if least, most, src, ok := refdata.CustomaryCoarse(dp, center); ok {
		out = append(out, m.byRange("Coarse pitch, customary", src, least, most))
	}
	for _, f := range refdata.CustomaryFine(dp) {
		thin := inspect.Limits{Min: f.Allowance, Max: f.Allowance + f.Tolerance}
		out = append(out, m.byThinning("Fine pitch, class "+f.Designation, f.Source, [2]inspect.Limits{thin, thin}))
	}
	for _, series := range din3967Shown() {
		one, ok := m.byCallOut(series)
		if ok {
			out = append(out, one)
		}
	}
	least, most, src := refdata.RuleOfThumbBacklash(mn)
	return append(out, m.byRange("0.03/P to 0.05/P (0.03 to 0.05 modules)", src, least, most))
}

// din3967Shown lists the call-outs shown: every allowance with the usual tolerance.
func din3967Shown() []string {
	var out []string
	for _, s := range refdata.AllowanceSeries() {
		out = append(out, s+strings.TrimLeft(usualCallOut, "abcdefgh"))
	}
	return out
}

// byNormal is a custom that gives the least normal backlash: j_wt = j_bn/(cos α_wt cos β_b).
func (m *mesh) byNormal(name string, l refdata.LeastBacklash) custom {
	out := m.wished(l.Normal / m.normalShare())
	out.Name, out.Source = name, l.Source.String()
	var notes []string
	if len(l.Outside) > 0 {
		notes = append(notes, "extrapolated: "+strings.Join(l.Outside, "; "))
	}
	for _, g := range []*gear{m.first, m.second} {
		if g.swell.Max > 0 || g.material.known() && g.material.expansion > mostOfMetals {
			notes = append(notes, "made for gears and housings of iron and steel")
			break
		}
	}
	out.Note = strings.Join(notes, "; ")
	return out
}

// byRange is a custom that gives a range of circumferential backlash.
func (m *mesh) byRange(name string, src refdata.Source, least, most float64) custom {
	out := m.wished(least)
	out.Name, out.Source, out.Circumferential.Max = name, src.String(), &most
	normal := most * m.normalShare()
	out.Normal.Max = &normal
	return out
}

// wished works out a least backlash: what thinning it takes of each gear, and how
// far the center would have to be opened instead.
func (m *mesh) wished(least float64) custom {
	out := custom{Circumferential: askedSpan{Min: least}, Normal: askedSpan{Min: least * m.normalShare()}, OpenCenter: m.openFor(least)}
	plan := m.plan
	plan.Deviations, plan.Climate, plan.LeastOnly, plan.Backlash, plan.Method = [2]inspect.Deviations{}, nil, true, &inspect.Limits{Min: least, Max: least}, inspect.WorstCase
	plan.First, plan.Second = 0, 1
	free := []inspect.PlanGear{{Gear: m.first.g}, {Gear: m.second.g}}
	if found, err := inspect.Plan(free, []inspect.PlanMesh{plan}); err == nil {
		out.Thinning.First.Min = free[0].Thickness(found[0].Limits).Min
		out.Thinning.Second.Min = free[1].Thickness(found[1].Limits).Min
	} // else nominal teeth at this center have more backlash than that already
	return out
}

// byCallOut is a call-out of DIN 3967, "cd25".
func (m *mesh) byCallOut(callOut string) (custom, bool) {
	var thin [2]inspect.Limits
	var src refdata.Source
	for i, g := range []*gear{m.first, m.second} {
		least, most, source, err := refdata.ThicknessCallOut(math.Abs(g.g.ReferenceDiameter()), callOut)
		if err != nil {
			return custom{}, false
		}
		thin[i], src = inspect.Limits{Min: least, Max: most}, source
	}
	return m.byThinning("DIN 3967 "+callOut, src, thin), true
}

// byThinning is a custom that gives thinnings: backlash follows, center tolerance included.
func (m *mesh) byThinning(name string, src refdata.Source, thin [2]inspect.Limits) custom {
	least, most, err := m.plan.BacklashRange(m.first.planned().Thickness(thin[0]), m.second.planned().Thickness(thin[1]))
	if err != nil {
		return custom{}
	}
	j, n := most.Circumferential, most.Normal
	return custom{
		Name: name, Source: src.String(), OpenCenter: m.openFor(least.Circumferential),
		Circumferential: askedSpan{least.Circumferential, &j}, Normal: askedSpan{least.Normal, &n},
		Thinning: pairSpans{askedSpan{thin[0].Min, &thin[0].Max}, askedSpan{thin[1].Min, &thin[1].Max}},
	}
}

// normalShare returns cos α_wt cos β_b at the nominal center distance.
func (m *mesh) normalShare() float64 {
	alpha, err := m.plan.Mesh.WorkingPressureAngle(m.plan.Nominal())
	if err != nil {
		return 1 // the center was found possible when it was read
	}
	return math.Cos(alpha) * math.Cos(m.first.g.BaseHelix())
}

// openFor returns by how much the center must be farther than the tight one of
// nominal teeth for a circumferential backlash, which is what standard cutters
// used at their depth need, the center's tolerance included; nil where there is none.
func (m *mesh) openFor(least float64) *float64 {
	tight := m.tight()
	if tight == 0 || least < 0 {
		return nil
	}
	plan := m.plan
	half := m.plan.Center.Width() / 2
	plan.Center, plan.Deviations, plan.Climate, plan.Method = inspect.Limits{Min: tight - half, Max: tight + half}, [2]inspect.Deviations{}, nil, inspect.WorstCase
	n1, n2 := m.first.g.NominalThickness(), m.second.g.NominalThickness()
	by, ok := plan.CenterFor(inspect.Limits{Min: n1, Max: n1}, inspect.Limits{Min: n2, Max: n2}, least)
	if !ok {
		return nil
	}
	return &by
}

// customaryText prints the customs of a mesh.
func (b *meshBacklash) customaryText(p *page, j *job, digits int) {
	u := j.display
	f := func(mm float64) string { return u.Format(mm, digits) }
	span := func(s askedSpan) (string, string) {
		if s.Max == nil {
			return f(s.Min), ""
		}
		return f(s.Min), f(*s.Max)
	}
	var sources []string
	g := grid{heads: []string{"least", "most", "normal", b.Gears[0], "to", b.Gears[1], "to", "or open"}}
	var notes []string
	for _, c := range b.Customary {
		least, most := span(c.Circumferential)
		t1, t1most := span(c.Thinning.First)
		t2, t2most := span(c.Thinning.Second)
		open := "-"
		if c.OpenCenter != nil {
			open = f(*c.OpenCenter)
		}
		family, _, _ := strings.Cut(c.Name, ",")
		if strings.HasPrefix(family, "DIN 3967") {
			family = "DIN 3967"
		}
		if line := family + ": " + c.Source; !slices.Contains(sources, line) && c.Source != "the job" {
			sources = append(sources, line)
		}
		name := c.Name
		if c.Note != "" {
			name += " *"
			notes = append(notes, "* "+c.Name+", "+c.Note)
		}
		g.row(name, u.String(), least, most, f(c.Normal.Min), t1, t1most, t2, t2most, open)
	}
	p.blank()
	p.head(fmt.Sprintf("Customary for %s and %s", b.Gears[0], b.Gears[1]))
	p.wrapped("Backlash, circumferential, and the least of it normal to the flanks; how much thinner than nominal it makes each gear's teeth; or how much to open the center from the tight one for standard cutters at full depth.", "")
	p.grid(g)
	for _, n := range notes {
		p.wrapped(n, "  ")
	}
	p.line("DIN 3967's call-out goes into a job as thin = \"DIN 3967 %s\". Sources:", usualCallOut)
	for _, s := range sources {
		p.wrapped("  "+s, "  ")
	}
}
