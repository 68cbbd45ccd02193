package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// What fixes a gear's thickness limits before any backlash does: its thinning,
// limits that a drawing gives over pins or over a span, or one such reading of
// a gear that is already made.

// fixingKeys are the keys that fix a gear's thickness limits; a gear takes one.
func fixingKeys() []string { return []string{"thin", "over_pins", "span"} }

// thicknessKeys are the keys that say anything of a gear's thickness. They
// exclude each other, and a flag replaces what the job says by another.
func thicknessKeys() []string { return append(fixingKeys(), "thin_tolerance") }

// drawnLimits are limits of a measurement as a drawing gives them, or one reading.
type drawnLimits struct {
	measure inspect.Measure
	limits  inspect.Limits // mm
	at      value
}

// ownThin returns how much thinner than nominal the gear's own keys make its
// teeth, nil where they leave it to the meshes.
func (g *gear) ownThin() *inspect.Limits {
	if g.fixed != nil {
		return g.fixed
	}
	return g.thin
}

// readThickness reads what the gear itself says of its thickness.
func (j *job) readThickness(g *gear) error {
	if err := g.settings.oneThickness(); err != nil {
		return err
	}
	if done, err := g.readCallOut(); done || err != nil {
		return err
	}
	l, _, ok, err := g.settings.limits("thin")
	switch {
	case err != nil:
		return err
	case ok && l.Min < 0:
		return bad("thin", g.settings.vals["thin"], "is how much thinner the tooth is, 0 or more; for a thicker tooth raise shift")
	case ok:
		g.thin = &l
	}
	tolerance, ok, err := g.settings.positive("thin_tolerance")
	if err != nil {
		return err
	}
	if ok {
		g.thinTolerance = &tolerance
	}
	if err := j.readOverPins(g); err != nil {
		return err
	}
	return j.readSpan(g)
}

// readCallOut reads a thin that is a call-out of DIN 3967, such as "DIN 3967 cd25".
func (g *gear) readCallOut() (done bool, err error) {
	v, ok := g.settings.vals["thin"]
	text, isText := asText(v)
	if t := strings.ToUpper(strings.TrimSpace(text)); !ok || !isText || t == "" || t[0] < 'A' || t[0] > 'Z' {
		return false, nil // a length or a range
	}
	least, most, source, err := refdata.ThicknessCallOut(math.Abs(g.g.ReferenceDiameter()), text)
	if err != nil {
		return true, bad("thin", v, "%v", err)
	}
	g.thin, g.thinSource = &inspect.Limits{Min: least, Max: most}, source.String()
	return true, nil
}

// oneThickness refuses a second key that says how thick the teeth are.
func (s settings) oneThickness() error {
	given := ""
	for _, key := range thicknessKeys() {
		switch {
		case !s.has(key):
		case given == "":
			given = key
		case key == "thin_tolerance":
			return bad(key, s.vals[key], "is for teeth that a backlash of one value decides, and %s already gives both limits; keep one", given)
		default:
			return bad(key, s.vals[key], "and %s both say how thick the teeth are; keep one", given)
		}
	}
	return nil
}

// readOverPins reads limits or a reading over pins.
func (j *job) readOverPins(g *gear) error {
	const key = "over_pins"
	v, ok := g.settings.vals[key]
	if !ok {
		return nil
	}
	s, err := g.settings.overParts(key, "pin", "needs the limits, or the reading, and the pin's diameter: { pin = \"0.108in\", limits = \"2.2345..2.2371in\" } in a job, \"2.2345..2.2371in over 0.108in\" as a flag")
	if err != nil {
		return err
	}
	var m inspect.OverPins
	if m.Pin, _, err = s.positive("pin"); err != nil {
		return err
	}
	m.Way = involute.TwoPins
	if text, ok := asText(s.vals["way"]); ok {
		if m.Way, ok = wayNamed(text); !ok {
			return bad("way", s.vals["way"], "%q is not one of %s", text, quoted(wayNames()))
		}
	} else if s.has("way") {
		return bad("way", s.vals["way"], "needs a text in quotes, not %s", kindOf(s.vals["way"]))
	}
	if m.Way == involute.PinToFarSide {
		if g.bore == nil {
			return bad(key, v, "to the far side of the bore needs the bore's diameter: give bore")
		}
		m.Bore = g.bore.limits.Middle()
	}
	return g.readDrawn(s, key, m)
}

// readSpan reads limits or a reading of a span.
func (j *job) readSpan(g *gear) error {
	const key = "span"
	if !g.settings.has(key) {
		return nil
	}
	s, err := g.settings.overParts(key, "teeth", "needs the limits, or the reading, and the number of teeth: { teeth = 3, limits = \"0.4857..0.4866in\" } in a job, \"0.4857..0.4866in over 3\" as a flag")
	if err != nil {
		return err
	}
	k, _, err := s.count("teeth")
	if err != nil {
		return err
	}
	if k > g.g.Teeth() {
		return bad(key, g.settings.vals[key], "over %d teeth: the gear has only %d", k, g.g.Teeth())
	}
	return g.readDrawn(s, key, inspect.Span{Teeth: k})
}

// overParts returns the parts of limits from a drawing, called limits, way and
// what with says: of a table, or of a text such as "2.2345..2.2371in over 0.108in, three pins".
func (s settings) overParts(key, with, how string) (settings, error) {
	v := s.vals[key]
	if t, isTable := v.content.(*table); isTable {
		parts, err := s.inline(key, t)
		if err == nil && !(parts.has(with) && parts.has("limits")) {
			err = bad(key, v, "%s", how)
		}
		return parts, err
	}
	text, isText := asText(v)
	limits, rest, ok := strings.Cut(text, " over ")
	if !isText || !ok {
		return s, bad(key, v, "%s", how)
	}
	rest, way, hasWay := strings.Cut(rest, ",")
	part := func(text string) value { // bare numbers keep their unit
		if _, flag := v.content.(flagText); flag {
			return value{flagText(strings.TrimSpace(text)), v.at}
		}
		return value{strings.TrimSpace(text), v.at}
	}
	parts := settings{map[string]value{"limits": part(limits), with: part(rest)}, s.jobUnit, s.flagUnit, v.at}
	if with == "teeth" {
		n, err := inspect.ParseNumber(strings.TrimSuffix(strings.TrimSpace(rest), "teeth"))
		if err != nil || hasWay {
			return s, bad(key, v, "%s", how)
		}
		parts.vals[with] = value{n, v.at}
	}
	if hasWay {
		parts.vals["way"] = part(way)
	}
	return parts, nil
}

// readDrawn keeps a measure with the limits that the parts give.
func (g *gear) readDrawn(parts settings, key string, m inspect.Measure) error {
	l, _, _, err := parts.limits("limits")
	if err != nil {
		return err
	}
	if l.Min <= 0 {
		return bad("limits", parts.vals["limits"], "must be above 0")
	}
	g.drawn, g.fixedBy = &drawnLimits{m, l, g.settings.vals[key]}, key
	return nil
}

// wayNames lists the ways to measure over pins, the usual one first.
func wayNames() []string {
	names := []string{"two pins", "two balls"}
	for _, w := range otherWays() {
		names = append(names, w.name)
	}
	return names
}

// wayNamed returns the way of that name, in JSON's words or as targets prints it.
func wayNamed(name string) (involute.PinWay, bool) {
	for _, way := range []string{"two pins", "two balls"} {
		if strings.EqualFold(way, name) {
			return involute.TwoPins, true
		}
	}
	for _, w := range otherWays() {
		for _, known := range []string{w.name, w.text, wayText(w.text, "pins"), wayText(w.text, "balls")} {
			if strings.EqualFold(known, name) {
				return w.way, true
			}
		}
	}
	return 0, false
}

// How far from nominal, and how far apart, thickness limits read off a drawing
// may be, as shares of the nominal tooth: what is farther is another gear,
// another pin or a slip of the pen.
const (
	farOff   = 0.5
	farApart = 0.25
)

// fix turns the limits of a drawing into thickness limits, and refuses what no tooth reads.
func (j *job) fix(g *gear) error {
	d := g.drawn
	if d == nil {
		return nil
	}
	if f := d.measure.Faults(g.nominal, inspect.Part{}); len(f) > 0 && f[0].Code == inspect.WrongWay {
		return bad(g.fixedBy, d.at, "%s", wrongWay(d.measure))
	}
	nominal := g.g.NominalThickness()
	thin := inspect.Limits{}
	for _, end := range []struct {
		value float64
		name  string
		to    *float64
	}{{d.limits.Min, ", the lower limit,", &thin.Max}, {d.limits.Max, ", the upper limit,", &thin.Min}} {
		if d.limits.Width() == 0 {
			end.name = ""
		}
		s, why := j.toothOf(g, end.value)
		if why != "" {
			return bad(g.fixedBy, d.at, "%s %s%s %s; %s", j.length(end.value), j.overWhat(g), end.name, why, j.nominalReads(g))
		}
		*end.to = nominal - s
	}
	if thin.Width() > farApart*nominal {
		return bad(g.fixedBy, d.at, "%s to %s %s leaves the tooth thickness %s of room, more than a quarter of the tooth's %s; %s",
			j.length(d.limits.Min), j.length(d.limits.Max), j.overWhat(g), j.length(thin.Width()), j.length(nominal), j.nominalReads(g))
	}
	g.fixed = &thin
	return nil
}

// toothOf returns the thickness of the tooth that a reading is of, mm, or why there is none.
func (j *job) toothOf(g *gear, value float64) (s float64, why string) {
	s, err := g.drawn.measure.Thickness(g.g, value)
	if err != nil {
		return 0, "is read on no tooth: the pins would stand inside the base circle, " + j.length(g.g.BaseDiameter())
	}
	nominal := g.g.NominalThickness()
	switch thin := nominal - s; {
	case thin > farOff*nominal:
		return s, fmt.Sprintf("makes the tooth %s thinner than nominal, more than half of its %s", j.length(thin), j.length(nominal))
	case !(thin >= -farOff*nominal):
		return s, fmt.Sprintf("makes the tooth %s thicker than nominal, more than half of its %s", j.length(-thin), j.length(nominal))
	}
	t, err := g.g.Tooth(s)
	if err != nil {
		return s, fmt.Sprintf("means a tooth thickness of %s, and such a tooth %s", j.length(s), noTooth(err))
	}
	if faults := g.drawn.measure.Faults(t, g.part()); len(faults) > 0 {
		return s, "is no reading of the flanks: " + j.why(faults)
	}
	return s, ""
}

// overWhat words what a drawing's limits are taken over.
func (j *job) overWhat(g *gear) string {
	switch m := g.drawn.measure.(type) {
	case inspect.OverPins:
		for _, w := range otherWays() {
			if w.way == m.Way {
				return fmt.Sprintf("over %s (%s)", w.name, j.length(m.Pin))
			}
		}
		if g.g.Helical() {
			return "over balls of " + j.length(m.Pin)
		}
		return "over pins of " + j.length(m.Pin)
	case inspect.Span:
		return "over " + teethText(m.Teeth)
	}
	return ""
}

// nominalReads says what the nominal tooth reads, and asks what may be wrong.
func (j *job) nominalReads(g *gear) string {
	doubt := "Is this the right pin?"
	if g.fixedBy == "span" {
		doubt = "Is this the right number of teeth?"
	}
	v, err := g.drawn.measure.Of(g.nominal)
	if err != nil {
		return "on the nominal tooth this pin touches no flank. " + doubt
	}
	return fmt.Sprintf("the nominal tooth reads %s. %s", j.length(v), doubt)
}

// wrongWay says for which gears a way to measure is.
func wrongWay(m inspect.Measure) string {
	gears, name := "helical", ""
	if over, ok := m.(inspect.OverPins); ok {
		for _, w := range otherWays() {
			if w.way == over.Way {
				name = w.name
			}
		}
		if over.Way == involute.ThreePins {
			gears = "spur"
		}
	}
	return fmt.Sprintf("%s are for %s gears with an odd number of teeth; leave way out for two pins or balls", name, gears)
}

// offNominal is how far from nominal, as a share of the tooth, readings are said to be surprising.
const offNominal = 0.1

// warnFixed says where a drawing, or a gear already made, is not the gear described.
func (j *job) warnFixed(g *gear) {
	nominal := g.g.NominalThickness()
	off, word := g.fixed.Max, "thinner"
	if -g.fixed.Min > off {
		off, word = -g.fixed.Min, "thicker"
	}
	if off <= offNominal*nominal {
		return
	}
	spec := g.g.Spec()
	x := spec.Shift - g.fixed.Middle()/(2*spec.Module*math.Tan(g.g.PressureAngle()))
	j.addWarning("off-nominal", g.name, "by %s the teeth are up to %s %s than nominal, %.0f %% of the tooth; with a shift of %+.4f they would be nominal. Are shift, pin and number of teeth right?",
		g.fixedBy, j.length(off), word, 100*off/nominal, x)
}
