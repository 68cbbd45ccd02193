package main

import (
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// A warning is something the user should know, in a machinist's words: a code
// to find it by, and what, how bad, what to do.
type warning struct {
	Code string `json:"code"`
	Gear string `json:"gear,omitempty"`
	Text string `json:"text"`
}

func (j *job) addWarning(code, gear, format string, args ...any) {
	j.warnings = append(j.warnings, warning{code, gear, fmt.Sprintf(format, args...)})
}

func (j *job) warnRackRadius(g *gear, asked, largest float64) {
	j.addWarning("rack-radius", g.name, "the tip radius %.4g × module of %s does not fit between the flanks at this pressure angle; %.4f, the largest that fits, is used", asked, g.rack, largest)
}

// Thresholds of warnings, as shares of the normal module or plain ratios.
const (
	lowClearance   = 0.15 // tip clearance; racks leave 0.25, and under 0.15 dirt and runout reach the root
	thinTip        = 0.2  // tip land; common practice wants 0.2 to 0.25, 0.4 where the case is hardened
	lowContact     = 1.2  // transverse contact ratio; common practice
	thinRim        = 1.2  // rim under the root, in whole depths; under it the rim bends (ISO 6336-3 rim factor)
	barelyNegative = 1e-9 // backlash below zero by rounding only, mm
)

// warn collects what there is to say of all gears and meshes.
func (j *job) warn() {
	for _, g := range j.gears {
		j.warnGear(g)
	}
	for _, m := range j.meshes {
		j.warnMesh(m)
	}
}

func (j *job) warnGear(g *gear) {
	m := g.g.Module()
	if g.thickness.By == inspect.ByNothing {
		j.addWarning("no-limits", g.name, "no thin and no backlash is given: the targets are the nominal tooth without tolerance. Give thin or backlash")
	}
	if g.nominal.Undercut() {
		lost := (g.nominal.FormDiameter() - g.g.BaseDiameter()) / 2
		j.addWarning("undercut", g.name, "the cutter undercuts the root; the involute begins at %s, %s above the base circle. A shift of %+.4f or more avoids it",
			j.length(g.nominal.FormDiameter()), j.length(lost), g.g.UndercutLimit())
	}
	thinnest, err := g.g.Tooth(g.thickness.Limits.Min)
	if err == nil {
		if land := thinnest.TipThickness(); land < thinTip*m {
			j.addWarning("thin-tip", g.name, "the tip is only %s wide (%.2f × module); under %.1f × module it chips and burrs. Lower shift or the outside diameter", j.length(land), land/m, thinTip)
		}
	}
	if g.bore != nil {
		j.warnRim(g)
	}
}

func (j *job) warnRim(g *gear) {
	root := g.g.RootDiameterAt(g.thickness.Limits.Min)
	depth := (g.g.TipDiameter() - root) / 2
	wall, where := (root-g.bore.limits.Max)/2, "bore"
	if g.keyway != nil {
		wall, where = wall-g.keyway.depth, "keyway"
	}
	if wall < thinRim*depth {
		j.addWarning("thin-rim", g.name, "only %s of metal is left between root and %s, under %.1f whole depths; the rim bends under load", j.length(wall), where, thinRim)
	}
}

func (j *job) warnMesh(m *mesh) {
	pair := m.first.name + " and " + m.second.name
	a := m.plan.Nominal()
	c1, c2 := m.plan.Mesh.TipClearances(a, m.first.nominal, m.second.nominal)
	module := m.first.g.Module()
	for _, side := range []struct {
		own, mate *gear
		c         float64
	}{{m.first, m.second, c1}, {m.second, m.first, c2}} {
		switch {
		case side.c <= 0:
			j.addWarning("tip-in-root", side.own.name, "the tip runs %s into the root of %s at the nominal center distance. Shorten the tip (tip = \"shortened\" or tip_diameter)", j.length(-side.c), side.mate.name)
		case side.c < lowClearance*module:
			j.addWarning("low-clearance", side.own.name, "only %s (%.2f × module) between its tip and the root of %s; racks leave 0.25. tip = \"shortened\" restores it", j.length(side.c), side.c/module, side.mate.name)
		}
	}
	j.warnContact(m, pair, a)
	j.warnBacklash(m, pair)
}

func (j *job) warnContact(m *mesh, pair string, a float64) {
	c, err := m.plan.Mesh.Contact(a, m.first.nominal, m.second.nominal)
	if err != nil {
		return
	}
	total := c.TransverseRatio + m.plan.Mesh.OverlapRatio(m.face())
	switch {
	case total < 1:
		j.addWarning("no-drive", m.first.name, "%s: contact ratio %.3f is under 1, the next teeth meet after the last have parted; the pair will not run smoothly", pair, c.TransverseRatio)
	case total < lowContact:
		j.addWarning("low-contact", m.first.name, "%s: contact ratio %.3f is low; under %.1f every error is heard", pair, c.TransverseRatio, lowContact)
	}
	if c.LimitedByRoots() && c.RatioByTips-c.TransverseRatio > 0.0005 {
		j.addWarning("short-contact", m.first.name, "%s: the tips alone promise a contact ratio of %.3f, but the involutes that are there give %.3f", pair, c.RatioByTips, c.TransverseRatio)
	}
	for _, first := range []bool{true, false} {
		own, mate := m.first, m.second
		if !first {
			own, mate = m.second, m.first
		}
		gap, err := m.plan.Mesh.FilletClearance(a, m.first.nominal, m.second.nominal, first)
		if err == nil && gap < -interferes*own.g.Module() {
			j.addWarning("interference", own.name, "the tip of %s cuts %s into its root fillet; the pair will bind. Shorten the tip of %s or shift %s outward", mate.name, j.length(-gap), mate.name, own.name)
		}
	}
}

// interferes is the least overlap of tip and fillet that counts, as a share of
// the module: a contact that ends just at the form diameter overlaps by rounding.
const interferes = 1e-5

func (j *job) warnBacklash(m *mesh, pair string) {
	least, most, err := m.plan.BacklashRange(m.first.thickness.Limits, m.second.thickness.Limits)
	if err != nil {
		return
	}
	if least.Circumferential < -barelyNegative {
		j.addWarning("no-backlash", m.first.name, "%s bind: at the tightest center with the thickest teeth the backlash is %s. Thin the teeth or open the center", pair, j.length(least.Circumferential))
	}
	want := m.plan.Backlash
	if want == nil || m.first.thin == nil || m.second.thin == nil {
		return
	}
	slack := 1e-6 // mm, rounding of limits given in decimals
	if least.Circumferential < want.Min-slack || most.Circumferential > want.Max+slack {
		j.addWarning("backlash-out", m.first.name, "%s: the thicknesses given make %s to %s of backlash, not the %s to %s asked for; the thicknesses rule", pair,
			j.length(least.Circumferential), j.length(most.Circumferential), j.length(want.Min), j.length(want.Max))
	}
}

// forGear returns the warnings of one gear.
func (j *job) forGear(name string) []warning {
	var ws []warning
	for _, w := range j.warnings {
		if w.Gear == name {
			ws = append(ws, w)
		}
	}
	return ws
}

// common returns how many gears of the job are chosen by --gear: all, or one.
func (j *job) chosen(name string) ([]*gear, error) {
	if name == "" {
		return j.gears, nil
	}
	for _, g := range j.gears {
		if g.name == name {
			return []*gear{g}, nil
		}
	}
	return nil, wrong("--gear: %s", noGear(name, j.gearNames()))
}

// angleDMS returns an angle in degrees, minutes and seconds, to a tenth of a second.
func angleDMS(rad float64) string {
	tenths := math.Round(rad / involute.Degree * 36000)
	d, rest := math.Floor(tenths/36000), math.Mod(tenths, 36000)
	return fmt.Sprintf("%d°%02d'%04.1f\"", int(d), int(rest)/600, math.Mod(rest, 600)/10)
}
