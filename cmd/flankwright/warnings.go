package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// A warning is something the user should know, in a machinist's words: a code
// to find it by, and what, how bad, what to do.
type warning struct {
	Code string `json:"code"`
	Gear string `json:"gear,omitempty"`
	Text string `json:"text"`
	mate string // of a warning about a mesh: the other gear
}

func (j *job) addWarning(code, gear, format string, args ...any) {
	j.warnings = append(j.warnings, warning{Code: code, Gear: gear, Text: fmt.Sprintf(format, args...)})
}

// addMeshWarning adds a warning about two gears; it stands under the first.
func (j *job) addMeshWarning(code string, m *mesh, format string, args ...any) {
	j.warnings = append(j.warnings, warning{code, m.first.name, fmt.Sprintf(format, args...), m.second.name})
}

func (j *job) warnRackRadius(g *gear, asked, largest float64) {
	j.addWarning("rack-radius", g.name, "the tip radius %.4g × module of %s does not fit between the flanks at this pressure angle; %.4f, the largest that fits, is used", asked, g.rack, largest)
}

// warnRackAngle says, where no rack is named, that another named rack is made
// for the pressure angle asked for.
func (j *job) warnRackAngle(g *gear, angle float64) {
	if math.Abs(angle-20) < 1e-9 {
		return
	}
	for _, r := range refdata.Racks() {
		if math.Abs(r.PressureAngleDeg-angle) < 1e-9 {
			j.addWarning("rack-angle", g.name, "the depths are those of ISO 53 A, a rack for 20°; gears of %g° are usually rack = %q, with a whole depth of %.3f × module", angle, r.Name, r.Addendum+r.Dedendum)
			return
		}
	}
}

// Thresholds of warnings, as shares of the normal module or plain ratios.
const (
	lowClearance   = 0.15  // tip clearance; racks leave 0.25, and under 0.15 dirt and runout reach the root
	thinTip        = 0.2   // tip land; common practice wants 0.2 to 0.25, 0.4 where the case is hardened
	heavyThinning  = 0.1   // of the tooth; backlash takes a few percent
	lowContact     = 1.2   // transverse contact ratio; common practice
	thinRim        = 1.2   // rim under the root, in whole depths; under it the rim bends (ISO 6336-3 rim factor)
	tightThickness = 0.008 // tolerance of the thickness, mm: twice the error limit of a micrometer up to 50 mm (DIN 863-1)
	barelyNegative = 1e-9  // backlash below zero by rounding only, mm
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
	if g.thickness.By == inspect.ByBacklash && g.thickness.Limits.Width() == 0 {
		j.addWarning("no-tolerance", g.name, "its mate takes all the thinning and all the tolerance: its targets are without tolerance. thin_share = \"equal\" would share them")
	}
	if g.thin != nil && g.thin.Width() == 0 {
		j.addWarning("no-tolerance", g.name, "thin is one value: the targets are without tolerance. Give a range such as \"0.04..0.08\"")
	}
	if g.fixed != nil {
		j.warnFixed(g)
	} else if taken := g.g.NominalThickness() - g.thickness.Limits.Min; taken > heavyThinning*g.g.NominalThickness() {
		j.addWarning("heavy-thinning", g.name, "the teeth come out up to %s thinner than nominal, %.0f %% of the tooth; check center distance, backlash and climate", j.length(taken), 100*taken/g.g.NominalThickness())
	}
	thinnest, err := g.g.Tooth(g.thickness.Limits.Min)
	if err != nil {
		return
	}
	if thinnest.Undercut() {
		deeper := g.g.Spec().Shift - g.g.GeneratingShift(thinnest.Thickness())
		form, base := j.apart(thinnest.FormDiameter(), g.g.BaseDiameter())
		j.addWarning("undercut", g.name, "generated (hobbed, or cut to the contour) the thinnest tooth is undercut: its involute begins at a diameter of %s, the base circle is %s. A shift of %+.4f or more avoids it",
			form, base, g.g.UndercutLimit()+deeper)
	}
	land := thinnest.TipLand()
	if g.g.Spec().TipRound > 0 {
		land = thinnest.TipThickness() // a rounding may take the whole land
	}
	if land < thinTip*m {
		j.addWarning("thin-tip", g.name, "the tip is only %s wide (%.2f × module); under %.1f × module it chips and burrs. Lower shift, chamfer or the outside diameter", j.length(land), land/m, thinTip)
	}
	if w := g.thickness.Limits.Width(); g.thickness.By == inspect.ByBacklash && w > 0 && w < tightThickness {
		j.addWarning("tight-tolerance", g.name, "only %s of tooth thickness is left as tolerance, no more than a good micrometer is off by; allow more backlash", j.length(w))
	}
	if g.swell.Max > 0 {
		j.addWarning("measure-dry", g.name, "it swells by up to %.3g %% in water; its limits are for the teeth as made, dry: measure it before it has drawn water", 100*g.swell.Max)
	}
	if g.flanks != nil && len(g.flanks.Outside) > 0 {
		j.addWarning("accuracy-range", g.name, "%s is extrapolated: %s", g.flanks.Accuracy, strings.Join(g.flanks.Outside, "; "))
	}
	j.warnShallowRoot(g)
	j.warnOpenings(g)
	if g.g.Helical() && g.faceWidth == 0 {
		j.warnFace(g)
	}
	if g.g.Helical() && g.handAssumed {
		j.addWarning("no-hand", g.name, "no hand is given; it is taken as %s hand, its mates as the other. Say hand = \"right\" or \"left\"", handWord(g.g.Spec().Helix))
	}
	if pins := j.choosePins(g); len(pins) == 1 && pins[0].From == idealOnly {
		j.addWarning("no-pin", g.name, "no pin of the usual series can be used; the ideal size, %s, is shown instead and would have to be made", j.length(pins[0].Diameter))
	}
}

// warnFace says what face a helical gear needs to be measured.
func (j *job) warnFace(g *gear) {
	text := ""
	if pins := j.choosePins(g); len(pins) > 0 {
		m := inspect.OverPins{Pin: pins[0].Diameter}
		text += fmt.Sprintf("; two balls of %s need over %s", j.length(m.Pin), j.length(m.FaceNeeded(g.middle())))
	}
	if ks := inspect.SpanChoices(g.g, g.thickness.Limits, g.part()); len(ks) > 0 {
		text += fmt.Sprintf("; a span over %s needs over %s", teethText(ks[0]), j.length(g.g.SpanFaceWidth(g.middle().Span(ks[0]))))
	}
	j.addWarning("no-face-width", g.name, "no face_width is given, and a helical gear needs some face to be measured%s", text)
}

// warnMesh judges the teeth that will be cut: clearance and interference of the
// thickest, with the highest roots, at the tightest center; contact of the
// thinnest at the loosest.
func (j *job) warnMesh(m *mesh) {
	pair := m.first.name + " and " + m.second.name
	thick1, err1 := m.first.g.Tooth(m.first.thickness.Limits.Max)
	thick2, err2 := m.second.g.Tooth(m.second.thickness.Limits.Max)
	if err1 == nil && err2 == nil {
		j.warnClearance(m, thick1, thick2)
		j.warnInterference(m, thick1, thick2)
	}
	j.warnContact(m, pair)
	j.warnBacklash(m, pair)
}

func (j *job) warnClearance(m *mesh, t1, t2 involute.Tooth) {
	c1, c2 := m.plan.Mesh.TipClearances(m.plan.Tightest(), t1, t2)
	module := m.first.g.Module()
	for _, side := range []struct {
		own, mate *gear
		c         float64
	}{{m.first, m.second, c1}, {m.second, m.first, c2}} {
		switch {
		case side.c <= 0:
			j.addWarning("tip-in-root", side.own.name, "the tip runs %s into the root of %s at the tightest center distance. Shorten the tip (tip = \"shortened\" or tip_diameter)", j.length(-side.c), side.mate.name)
		case side.c < lowClearance*module:
			j.addWarning("low-clearance", side.own.name, "only %s (%.2f × module) between its tip and the root of %s; racks leave 0.25. tip = \"shortened\" restores it", j.length(side.c), side.c/module, side.mate.name)
		}
	}
}

func (j *job) warnInterference(m *mesh, t1, t2 involute.Tooth) {
	a := m.plan.Tightest()
	c1, c2 := m.plan.Mesh.TipClearances(a, t1, t2)
	play, err := m.plan.Mesh.Backlash(a, t1.Thickness(), t2.Thickness())
	if err != nil {
		return
	}
	for _, first := range []bool{true, false} {
		own, mate := m.first, m.second
		if !first {
			own, mate = m.second, m.first
		}
		if (first && c2 <= 0) || (!first && c1 <= 0) {
			continue // the mate's tip is in the root already; that is said
		}
		gap, err := m.plan.Mesh.FilletClearance(a, t1, t2, first)
		if err != nil || gap >= -max(interferes*own.g.Module(), leastOverlap) {
			continue
		}
		then := "it rubs there"
		if -gap > play.Circumferential {
			then = "the pair will bind"
		}
		j.addWarning("interference", own.name, "the tip of %s cuts %s into its root fillet; %s. Shorten the tip of %s, or give %s less of the shift and %s more", mate.name, j.length(-gap), then, mate.name, mate.name, own.name)
	}
}

func (j *job) warnContact(m *mesh, pair string) {
	thin1, err1 := m.first.g.Tooth(m.first.thickness.Limits.Min)
	thin2, err2 := m.second.g.Tooth(m.second.thickness.Limits.Min)
	if err1 != nil || err2 != nil {
		return
	}
	c, err := m.plan.Mesh.Contact(m.plan.Loosest(), thin1, thin2)
	if err != nil {
		return
	}
	overlap := m.plan.Mesh.OverlapRatio(m.face())
	total := c.TransverseRatio + overlap
	switch {
	case m.first.g.Helical() && m.face() == 0 && total < lowContact:
		j.addMeshWarning("low-contact", m, "%s: the transverse contact ratio is %.3f; whether the helix makes up for it needs face_width", pair, total)
	case total < 1:
		j.addMeshWarning("no-drive", m, "%s: contact ratio %.3f is under 1, the next teeth meet after the last have parted: it knocks and wears. Take more teeth, a smaller center distance or longer tips", pair, total)
	case total < lowContact:
		j.addMeshWarning("low-contact", m, "%s: contact ratio %.3f is low; under %.1f every error is heard. More teeth, less shift or longer tips raise it", pair, total, lowContact)
	}
	if m.first.g.Helical() {
		overlap = 0
	}
	if plain := c.UnrelievedRatio; plain < 1 && total >= 1 && plain < c.TransverseRatio && overlap == 0 {
		j.addMeshWarning("relief-contact", m, "%s: without load the relieved tips do not touch, and the contact ratio is only %.3f; under 1 the pair knocks when lightly loaded. Start the relief farther out", pair, plain)
	}
	if c.LimitedByRoots() && c.RatioByTips-c.TransverseRatio > 0.0005 {
		j.addMeshWarning("short-contact", m, "%s: the tips alone promise a contact ratio of %.3f, but the involutes that are there give %.3f. Shift the undercut gear outward", pair, c.RatioByTips, c.TransverseRatio)
	}
}

// What counts as interference: a contact that ends just at the form diameter
// overlaps by rounding, and under a micrometer no harm is done.
const (
	interferes   = 1e-4  // share of the module
	leastOverlap = 0.001 // mm
)

func (j *job) warnBacklash(m *mesh, pair string) {
	least, _, err := m.plan.BacklashRange(m.first.thickness.Limits, m.second.thickness.Limits)
	if err != nil {
		return
	}
	if least.Circumferential < -barelyNegative {
		j.addMeshWarning("no-backlash", m, "%s bind: at the tightest center with the thickest teeth the backlash is %s. Thin the teeth, open the center toward %s, or bring the shifts together to %+.4f, from %+.4f",
			pair, j.length(least.Circumferential), j.length(m.tight()), m.tightShift(), m.first.g.Spec().Shift+m.second.g.Spec().Shift)
	}
	b, err := m.budget()
	if err != nil {
		return
	}
	got := b.By(m.plan.Method)
	if got.Min < -barelyNegative && least.Circumferential >= -barelyNegative {
		j.addMeshWarning("may-bind", m, "%s may bind: with runout, deviations and climate the least backlash is %s, held %s; the command backlash shows what takes it", pair, j.length(got.Min), methodWord(m.plan.Method))
	}
	want := m.plan.Backlash
	if want == nil || m.first.ownThin() == nil || m.second.ownThin() == nil || held(got, *want, m.plan.LeastOnly) {
		return
	}
	what := j.length(got.Min) + " to " + j.length(got.Max)
	if m.plan.LeastOnly {
		what = j.length(got.Min)
	}
	j.addMeshWarning("backlash-out", m, "%s: the thicknesses given make %s of backlash, not the %s asked for; the thicknesses rule", pair, what, j.wishText(m))
}

// tightShift returns the sum of the shifts with which nominal teeth are tight at
// the tightest center.
func (m *mesh) tightShift() float64 {
	sum, err := m.plan.Mesh.ShiftSum(m.plan.Tightest())
	if err != nil {
		return 0 // the center was found possible when it was read
	}
	return sum
}

// about returns the warnings that concern any of some gears, never nil.
func (j *job) about(gears []*gear) []warning {
	ws := []warning{}
	for _, w := range j.warnings {
		for _, g := range gears {
			if w.Gear == g.name || w.mate == g.name {
				ws = append(ws, w)
				break
			}
		}
	}
	return ws
}

// chosen returns the gears that --gear chooses: all, or one.
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
