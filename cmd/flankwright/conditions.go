package main

import (
	"fmt"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// What a gear is made of and how well, and what a mesh meets in service.

// conditions are what a gear brings to the backlash beside its teeth.
type conditions struct {
	material      *material
	swell         inspect.Limits // linear, as a fraction, from dry
	runout        *float64       // total reading, mm
	accuracyText  string
	flanks        *refdata.FlankTolerances // what the accuracy class allows
	thinTolerance *float64                 // how much thinner than its thickest a tooth may be, mm
}

// A material is what a gear or a housing is made of.
type material struct {
	name      string  // as given; blank for numbers without a name
	expansion float64 // linear, 1/K; 0 for not known
	source    string  // of the expansion
	metal     bool    // by the table: it does not swell
}

// word returns the material's name for the head of a sheet, blank where there is none.
func (m *material) word() string {
	if m == nil {
		return ""
	}
	return m.name
}

// known reports whether a material's expansion is.
func (m *material) known() bool { return m != nil && m.expansion > 0 }

// readConditions reads what a gear is made of and how well.
func (g *gear) readConditions() (err error) {
	if g.material, err = g.settings.material("material"); err != nil {
		return err
	}
	if g.swell, err = g.settings.swell("swell"); err != nil {
		return err
	}
	if g.swell.Max > 0 && g.material != nil && g.material.metal {
		return bad("swell", g.settings.vals["swell"], "is for plastics in water; %s does not swell", g.material.name)
	}
	if g.accuracyText, err = g.settings.accuracy("accuracy"); err != nil {
		return err
	}
	mm, ok, err := g.settings.length("runout")
	switch {
	case err != nil:
		return err
	case ok && mm < 0:
		return bad("runout", g.settings.vals["runout"], "is the indicator's total reading, 0 or more")
	case ok && mm > mostRunout*g.g.Module():
		return bad("runout", g.settings.vals["runout"], "of %.4g modules is no gear that runs; the indicator's total reading must be under %.1f × module", mm/g.g.Module(), mostRunout)
	case ok:
		g.runout = &mm
	}
	return nil
}

// mostRunout is the most runout that is believed, × module: a quarter of the tooth's height.
const mostRunout = 0.5

// The greatest and the least expansion of a material that is believed, 1e-6/K:
// from a tenth of the least of nickel-iron alloys to rubber.
const (
	leastExpansion = 0.1
	mostExpansion  = 500
)

// material reads a material by name, or with its own expansion:
// { name = "brass bar", expansion = 20.5 }, in 1e-6/K. A name in no table is kept as a word.
func (s settings) material(key string) (*material, error) {
	v, ok := s.vals[key]
	if !ok {
		return nil, nil
	}
	if t, isTable := v.content.(*table); isTable {
		sub, err := s.inline(key, t)
		if err != nil {
			return nil, err
		}
		name, _, err := sub.word("name")
		if err != nil {
			return nil, err
		}
		x, hasExpansion, err := sub.number("expansion")
		switch {
		case err != nil:
			return nil, err
		case !hasExpansion && strings.TrimSpace(name) == "":
			return nil, bad(key, v, "needs a name from the tables, or an expansion: { name = \"brass bar\", expansion = 20.5 }")
		case !hasExpansion:
			return namedMaterial(name), nil
		case x < leastExpansion || x > mostExpansion:
			return nil, bad("expansion", sub.vals["expansion"], "is in 1e-6/K, such as 11.5 for steel or 20.5 for brass, not %v", x)
		}
		return &material{name: name, expansion: x * 1e-6, source: "the job"}, nil
	}
	name, isText := asText(v)
	if !isText {
		return nil, bad(key, v, "needs a name from the tables, or its own expansion: { name = \"brass bar\", expansion = 20.5 }, not %s", kindOf(v))
	}
	if strings.TrimSpace(name) == "" {
		return nil, nil
	}
	return namedMaterial(name), nil
}

func namedMaterial(name string) *material {
	m, err := refdata.MaterialByName(name)
	if err != nil {
		return &material{name: name}
	}
	return &material{name: name, expansion: m.Expansion, source: m.Source.String(), metal: m.E > stiffestPlastic}
}

// stiffestPlastic is Young's modulus above which a material is a metal, MPa.
const stiffestPlastic = 20e3

// mostSwell is the most that a plastic gear is believed to swell, as a fraction:
// nylon in water swells by 0.03.
const mostSwell = 0.1

// swell reads how much a plastic gear swells in water, in percent: up to one value, or a range.
func (s settings) swell(key string) (inspect.Limits, error) {
	v, ok := s.vals[key]
	if !ok {
		return inspect.Limits{}, nil
	}
	text, ok := written(v)
	if !ok {
		return inspect.Limits{}, bad(key, v, "needs a percentage such as 0.6 or \"0.1..0.6\", not %s", kindOf(v))
	}
	l, err := inspect.ParsePercents(text)
	if err != nil {
		return l, bad(key, v, "%v", err)
	}
	if l.Min < 0 || l.Max > mostSwell {
		return l, bad(key, v, "is linear, in percent from dry, from 0 to %g; nylon in water comes to about 3", 100*mostSwell)
	}
	if !strings.Contains(text, "..") {
		l.Min = 0
	}
	return l, nil
}

// accuracy reads an accuracy class with its standard.
func (s settings) accuracy(key string) (string, error) {
	v, ok := s.vals[key]
	if !ok {
		return "", nil
	}
	text, ok := written(v)
	if _, err := inspect.ParseNumber(text); ok && err == nil {
		return "", bad(key, v, "%s alone is not enough, since older inch quality numbers run the other way: write accuracy = \"ISO 1328-1:2013 class 8\"", text)
	}
	text, _, err := s.word(key)
	if err == nil && strings.TrimSpace(text) == "" {
		err = bad(key, v, "needs a standard and a class: accuracy = \"ISO 1328-1:2013 class 8\"")
	}
	return strings.TrimSpace(text), err
}

// readService reads what a mesh meets in service, and how its backlash is budgeted.
func (j *job) readService(m *mesh, s settings) error {
	budget, _, err := s.word("budget", "worst", "statistical")
	if err != nil {
		return err
	}
	if budget == "statistical" {
		m.plan.Method = inspect.Statistical
	}
	if m.housing, err = s.material("housing"); err != nil {
		return err
	}
	v, ok := s.vals["temperature"]
	if !ok {
		return nil
	}
	text, ok := written(v)
	if !ok {
		return bad("temperature", v, "needs a temperature or a range such as \"5..60\" (°C) or \"40..140 F\", not %s", kindOf(v))
	}
	l, err := inspect.ParseTemperatures(text)
	if err != nil {
		return bad("temperature", v, "%v", err)
	}
	m.temperature = &l
	if l.Min == inspect.ReferenceTemperature && l.Max == inspect.ReferenceTemperature {
		return nil
	}
	return j.checkExpansions(m, s)
}

// checkExpansions asks for the materials that a temperature other than 20 °C needs.
func (j *job) checkExpansions(m *mesh, s settings) error {
	var lack []*gear
	for _, g := range []*gear{m.first, m.second} {
		if g.material == nil {
			lack = append(lack, g)
		}
	}
	var wanted []string
	if len(lack) > 0 {
		wanted = append(wanted, j.keyOf("material", lack))
	}
	if m.housing == nil {
		housing := "housing in [[mesh]]"
		if j.byFlags() {
			housing = "--housing"
		}
		wanted = append(wanted, housing)
	}
	if len(wanted) > 0 {
		return bad("temperature", s.vals["temperature"], "other than %d °C needs to know how gears and housing grow: give %s", inspect.ReferenceTemperature, strings.Join(wanted, ", and "))
	}
	for _, part := range []struct {
		key string
		m   *material
		s   settings
	}{{"material", m.first.material, m.first.settings}, {"material", m.second.material, m.second.settings}, {"housing", m.housing, s}} {
		if part.m.known() {
			continue
		}
		_, err := refdata.MaterialByName(part.m.name)
		if err == nil {
			err = fmt.Errorf("the table has no expansion of %q", part.m.name)
		}
		return bad(part.key, part.s.vals[part.key], "%v; or give its own expansion in 1e-6/K, { name = %q, expansion = … }: the temperature needs it", err, part.m.name)
	}
	return nil
}

// keyOf words where a key that some gears lack goes.
func (j *job) keyOf(key string, gears []*gear) string {
	if j.byFlags() {
		return "--" + flagName(key)
	}
	var names []string
	for _, g := range gears {
		names = append(names, "[gear."+g.name+"]")
	}
	return key + " in " + inWords(names)
}

// byFlags reports whether the gears are given by flags alone, and so stand nowhere in a file.
func (r request) byFlags() bool { return r.gears[0].settings.at.line == 0 }

// inWords joins names: "a, b and c".
func inWords(names []string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	last := len(names) - 1
	return strings.Join(names[:last], ", ") + " and " + names[last]
}

// checkTolerances holds thin_tolerance and backlashes of one value against each
// other: such a backlash is the least, and the tolerance says how much more there may be.
func (j *job) checkTolerances() error {
	used := map[*gear]bool{}
	for _, m := range j.meshes {
		if !m.plan.LeastOnly {
			continue
		}
		var lack []*gear
		for _, g := range []*gear{m.first, m.second} {
			used[g] = true
			if g.thinTolerance == nil && !hasAny(g.settings.vals, fixingKeys()) {
				lack = append(lack, g)
			}
		}
		if len(lack) > 0 {
			return bad("backlash", j.request.meshes[m.index].vals["backlash"], "one value is the least, and nothing says how much more there may be: give the range, such as \"0.05..0.15\", or %s", j.keyOf("thin_tolerance", lack))
		}
	}
	for _, g := range j.gears {
		if g.thinTolerance != nil && !used[g] {
			return bad("thin_tolerance", g.settings.vals["thin_tolerance"], "belongs to a backlash of one value, the least; a range already says how thin the teeth may be. Give %s a mesh with such a backlash, or limits by thin", called(g))
		}
	}
	return nil
}
