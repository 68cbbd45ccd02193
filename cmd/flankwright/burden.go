package main

import (
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// What takes backlash, put together for the planner: the accuracy of the gears,
// the climate of the mesh, and how its budget is to be held.

// readAccuracy works out the flank tolerances that a gear's accuracy class allows.
func (g *gear) readAccuracy() error {
	if g.accuracyText == "" {
		return nil
	}
	class, err := refdata.ParseAccuracy(g.accuracyText)
	if err != nil {
		return bad("accuracy", g.settings.vals["accuracy"], "%s", strings.TrimPrefix(err.Error(), "accuracy "))
	}
	t, err := class.Tolerances(g.toothSize())
	if err != nil {
		return bad("accuracy", g.settings.vals["accuracy"], "%v", err)
	}
	g.flanks = &t
	return nil
}

// toothSize returns what flank tolerances depend on.
func (g *gear) toothSize() refdata.ToothSize {
	return refdata.ToothSize{
		ReferenceDiameter: g.g.ReferenceDiameter(), Module: g.g.Module(), FaceWidth: g.faceWidth,
		Teeth: g.g.Teeth(), HelixAngle: g.g.Spec().Helix,
	}
}

// deviations returns how far a gear's teeth may be from true: by its class, with
// the runout that was measured instead of the one allowed.
func (g *gear) deviations() inspect.Deviations {
	var d inspect.Deviations
	if t := g.flanks; t != nil {
		d = inspect.Deviations{Runout: t.Runout, Pitch: t.SinglePitch, Profile: t.Profile, Helix: t.Helix}
	}
	if g.runout != nil {
		d.Runout, d.Measured = *g.runout, true
	}
	return d
}

// burden tells a mesh's plan what takes backlash.
func (m *mesh) burden() {
	m.plan.Deviations = [2]inspect.Deviations{m.first.deviations(), m.second.deviations()}
	m.plan.Climate = m.climate()
	if c, err := m.plan.Mesh.Contact(m.plan.ServiceCenter(), m.first.nominal, m.second.nominal); err == nil {
		m.plan.ContactRatio = c.TransverseRatio + m.plan.Mesh.OverlapRatio(m.face())
	}
}

// climate returns the heat and water that the mesh runs in, nil where it always
// has the reference temperature and its gears do not swell.
func (m *mesh) climate() *inspect.Climate {
	c := inspect.Climate{
		Temperature: inspect.Limits{Min: inspect.ReferenceTemperature, Max: inspect.ReferenceTemperature},
		Swell:       [2]inspect.Limits{m.first.swell, m.second.swell},
	}
	if m.temperature != nil {
		c.Temperature = *m.temperature
	}
	if c.Steady() && c.Swell == [2]inspect.Limits{} {
		return nil
	}
	for i, g := range []*gear{m.first, m.second} {
		if g.material.known() {
			c.Expansion[i] = g.material.expansion
		}
	}
	if m.housing.known() {
		c.Housing = m.housing.expansion
	}
	return &c
}

// burdened reports whether anything beside the center's tolerance and the teeth's
// own takes backlash in a mesh.
func (m *mesh) burdened() bool {
	return m.plan.Climate != nil || m.plan.Deviations != [2]inspect.Deviations{}
}

// pair returns the two gears as the planner sees them.
func (m *mesh) pair() [2]inspect.PlanGear {
	return [2]inspect.PlanGear{m.first.planned(), m.second.planned()}
}

// planned returns a gear as the planner sees it.
func (g *gear) planned() inspect.PlanGear {
	p := inspect.PlanGear{Gear: g.g, Thin: g.ownThin()}
	if g.thinTolerance != nil {
		p.Tolerance = *g.thinTolerance
	}
	return p
}

// budget returns the budget of the thicknesses that were found.
func (m *mesh) budget() (inspect.Budget, error) {
	return m.plan.Budget(m.first.thickness.Limits, m.second.thickness.Limits)
}

// wishText words the backlash asked for.
func (j *job) wishText(m *mesh) string {
	want := m.plan.Backlash
	switch {
	case want == nil:
		return ""
	case m.plan.LeastOnly:
		return j.length(want.Min) + " or more"
	}
	return j.length(want.Min) + " to " + j.length(want.Max)
}
