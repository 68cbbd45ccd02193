package main

import (
	"errors"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// meshGears returns the indices of a mesh's two gears.
func (j *job) meshGears(m settings) (first, second int, err error) {
	v, ok := m.vals["gears"]
	if !ok {
		return 0, 0, fault(m.at, "mesh: gears is missing; write gears = [\"driver\", \"driven\"]")
	}
	list, isList := v.content.([]value)
	if !isList || len(list) != 2 {
		return 0, 0, bad("gears", v, "needs two names, such as [\"driver\", \"driven\"]")
	}
	index := [2]int{}
	for k, item := range list {
		name, isText := asText(item)
		if !isText {
			return 0, 0, bad("gears", item, "needs names in quotes, not %s", kindOf(item))
		}
		i, ok := j.request.gearIndex(name)
		if !ok {
			return 0, 0, bad("gears", item, "%s", noGear(name, j.request.gearNames()))
		}
		index[k] = i
	}
	if index[0] == index[1] {
		return 0, 0, bad("gears", v, "a gear cannot mesh with itself")
	}
	return index[0], index[1], nil
}

func (r request) gearIndex(name string) (int, bool) {
	for i, g := range r.gears {
		if g.name == name {
			return i, true
		}
	}
	return 0, false
}

func (r request) gearNames() []string {
	var names []string
	for _, g := range r.gears {
		names = append(names, g.name)
	}
	return names
}

func (j *job) addMesh(i int) error {
	s := j.request.meshes[i]
	a, b, err := j.meshGears(s)
	if err != nil {
		return err
	}
	for _, old := range j.meshes {
		if (old.plan.First == a && old.plan.Second == b) || (old.plan.First == b && old.plan.Second == a) {
			return fault(s.at, "mesh: %s and %s mesh already; keep one of the two", j.gears[a].name, j.gears[b].name)
		}
	}
	m := &mesh{index: i, first: j.gears[a], second: j.gears[b], at: s.at}
	m.plan.First, m.plan.Second = a, b
	if m.plan.Mesh, err = involute.NewMesh(m.first.g, m.second.g); err != nil {
		return j.impossibleMesh(m, err)
	}
	if err := j.readCenter(m, s); err != nil {
		return err
	}
	if err := j.readBacklash(m, s); err != nil {
		return err
	}
	if err := j.readService(m, s); err != nil {
		return err
	}
	m.burden()
	j.meshes = append(j.meshes, m)
	return nil
}

// readCenter reads the center distance; where it is not given it is the tight one of nominal teeth.
func (j *job) readCenter(m *mesh, s settings) error {
	at, tol, class, err := s.center("center")
	if err != nil {
		return err
	}
	if at == 0 {
		at, err = m.plan.Mesh.TightCenter(m.first.g.NominalThickness(), m.second.g.NominalThickness())
		if err != nil {
			return j.impossibleMesh(m, err)
		}
		at = math.Abs(at)
	}
	low, high := -tol, tol
	if class != "" {
		if !strings.HasPrefix(strings.ToLower(class), "js") {
			return bad("center", s.vals["center"], "class = %q: a center distance takes a js class, such as js7", class)
		}
		low, high, _, err = refdata.ISO286Limits(at, class)
		if err != nil {
			return bad("center", s.vals["center"], "%v", err)
		}
	}
	m.plan.Center = inspect.Limits{Min: at + low, Max: at + high}
	if v, ok := s.vals["center"]; ok {
		m.at = v.at
	}
	for _, a := range []float64{m.plan.Tightest(), m.plan.Loosest()} {
		if _, err := m.plan.Mesh.WorkingPressureAngle(a); err != nil {
			return j.impossibleMesh(m, err)
		}
	}
	if reach := (m.first.g.TipDiameter() + m.second.g.TipDiameter()) / 2; at >= reach {
		return fault(m.at, "%s and %s: at a center distance of %s the teeth do not reach each other; the tips alone meet at %s",
			m.first.name, m.second.name, j.length(at), j.length(reach))
	}
	return nil
}

// tight returns the center distance without backlash of nominal teeth, 0 where
// there is none.
func (m *mesh) tight() float64 {
	a, err := m.plan.Mesh.TightCenter(m.first.g.NominalThickness(), m.second.g.NominalThickness())
	if err != nil {
		return 0
	}
	return math.Abs(a)
}

func (j *job) readBacklash(m *mesh, s settings) error {
	l, single, ok, err := s.limits("backlash")
	if err != nil {
		return err
	}
	if ok && l.Min < 0 {
		return bad("backlash", s.vals["backlash"], "must be 0 or more, not %s", j.length(l.Min))
	}
	if ok {
		m.plan.Backlash, m.plan.LeastOnly = &l, single
	}
	share, ok, err := s.word("thin_share")
	if err != nil || !ok {
		return err
	}
	switch share {
	case "equal":
	case "by strength":
		m.plan.Share = inspect.ShareByTeeth
	case m.first.name:
		m.plan.Share = inspect.ShareFirst
	case m.second.name:
		m.plan.Share = inspect.ShareSecond
	default:
		return bad("thin_share", s.vals["thin_share"], "%q is neither \"equal\" nor \"by strength\" nor a gear of this mesh (%q, %q)", share, m.first.name, m.second.name)
	}
	for _, g := range []*gear{m.first, m.second} {
		if share == g.name && hasAny(g.settings.vals, fixingKeys()) {
			return bad("thin_share", s.vals["thin_share"], "%q is fixed already and takes nothing; leave thin_share out", share)
		}
	}
	if m.plan.Backlash == nil {
		return bad("thin_share", s.vals["thin_share"], "shares out the thinning that a backlash asks for; give backlash too")
	}
	return nil
}

// shortenTips gives the gears that ask for it the tip that keeps the rack's
// clearance in every mesh, never longer than the full one.
func (j *job) shortenTips() error {
	tips := map[*gear]float64{}
	for _, m := range j.meshes {
		a := m.plan.Nominal()
		for _, side := range []struct{ own, mate *gear }{{m.first, m.second}, {m.second, m.first}} {
			if !side.own.shortened {
				continue
			}
			c := side.mate.g.Spec().Rack.Clearance() * side.mate.g.Module()
			root := side.mate.g.RootDiameterAt(side.mate.g.NominalThickness())
			tip := involute.TipForClearance(a, root, c)
			if old, ok := tips[side.own]; ok && old <= tip {
				continue
			}
			tips[side.own] = tip
			side.own.tipBy = tipDecision{a, root, c}
		}
	}
	for _, g := range j.gears {
		if !g.shortened {
			continue
		}
		tip, ok := tips[g]
		if !ok {
			return bad("tip", g.settings.vals["tip"], "\"shortened\" needs a mesh: the mate's root decides")
		}
		if full := g.g.TipDiameter(); tip >= full {
			g.shortened = false // the full tip already keeps the clearance
			continue
		}
		if err := j.retip(g, tip); err != nil {
			return err
		}
	}
	return nil
}

// retip makes the gear anew with a tip diameter.
func (j *job) retip(g *gear, tip float64) error {
	spec := g.g.Spec()
	spec.TipDiameter, spec.Topped = tip, false
	return j.remake(g, spec)
}

// remake makes the gear anew, and its meshes with it.
func (j *job) remake(g *gear, spec involute.Spec) error {
	var err error
	if g.g, err = involute.NewGear(spec); err != nil {
		return j.impossibleGear(g, err)
	}
	if g.nominal, err = g.g.Nominal(); err != nil {
		return j.impossibleGear(g, err)
	}
	for _, m := range j.meshes {
		if m.plan.Mesh, err = involute.NewMesh(m.first.g, m.second.g); err != nil {
			return j.impossibleMesh(m, err)
		}
	}
	return nil
}

// planThickness finds the thickness limits of all gears.
func (j *job) planThickness() error {
	var gears []inspect.PlanGear
	for _, g := range j.gears {
		if err := j.fix(g); err != nil {
			return err
		}
		gears = append(gears, g.planned())
	}
	var meshes []inspect.PlanMesh
	for _, m := range j.meshes {
		meshes = append(meshes, m.plan)
	}
	found, err := inspect.Plan(gears, meshes)
	if err != nil {
		errors.As(err, &j.problem)
		return j.planError(err)
	}
	for i, g := range j.gears {
		g.thickness = found[i]
	}
	return nil
}

// finishGear checks what depends on the thickness: the teeth at both limits, and what is under the root.
func (j *job) finishGear(g *gear) error {
	for _, s := range []float64{g.thickness.Limits.Min, g.thickness.Limits.Max} {
		if _, err := g.g.Tooth(s); err != nil {
			return j.impossibleThinning(g, err)
		}
	}
	return j.checkOpenings(g)
}
