package main

import (
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// A job is a request worked out: possible gears with thickness limits, and their meshes.
type job struct {
	request
	gears    []*gear
	meshes   []*mesh
	warnings []warning
	early    int                  // how many of them came up before the gears were whole
	problem  *inspect.PlanProblem // why the backlash asked for cannot be had
}

// A gear is one gear of a job.
type gear struct {
	name       string
	g          *involute.Gear
	nominal    involute.Tooth
	thickness  inspect.Thickness
	thin       *inspect.Limits
	thinSource string          // of a thin that is a call-out
	drawn      *drawnLimits    // of a drawing, or read off the gear; not with thin
	fixed      *inspect.Limits // how much thinner than nominal they make the teeth, mm; below 0 where thicker
	fixedBy    string          // their key: over_pins or span
	faceWidth  float64         // mm, 0 for not given
	bore       *boreSize
	keyway     *keyway
	bolts      *boltCircle
	hub        float64 // outside diameter, mm, 0 for none
	dp         float64 // normal diametral pitch as given, 0 where a module was
	rack       string  // name for people
	source     string  // of the rack
	shortened  bool
	// handAssumed: neither the gear nor a mate nor the shared values say a hand.
	handAssumed bool
	measured    bool    // the outside diameter is the blank's, as measured
	drawnTip    float64 // then, what it was to be, mm
	tipBy       tipDecision
	rootBy      rootDecision
	settings    settings
	conditions
}

// depthOfCut returns the limits of the depth of cut from the blank's outside, mm.
func (g *gear) depthOfCut() inspect.Limits {
	root := g.rootLimits()
	if g.g.Spec().Topped { // root and tip are cut at once
		depth := (g.nominal.TipDiameter() - g.nominal.RootDiameter()) / 2
		return inspect.Limits{Min: depth, Max: depth}
	}
	tip := g.g.TipDiameter()
	return inspect.Limits{Min: (tip - root.Max) / 2, Max: (tip - root.Min) / 2}
}

// rootLimits returns the limits of the root diameter, mm.
func (g *gear) rootLimits() inspect.Limits {
	thin, err1 := g.g.Tooth(g.thickness.Limits.Min)
	thick, err2 := g.g.Tooth(g.thickness.Limits.Max)
	if err1 != nil || err2 != nil {
		return inspect.Limits{Min: g.nominal.RootDiameter(), Max: g.nominal.RootDiameter()}
	}
	return inspect.Limits{Min: thin.RootDiameter(), Max: thick.RootDiameter()}
}

// tipLimits returns the limits of the outside diameter, which differ where the cutter tops the teeth, mm.
func (g *gear) tipLimits() inspect.Limits {
	l := g.thickness.Limits
	return inspect.Limits{Min: g.g.TipDiameterAt(l.Min), Max: g.g.TipDiameterAt(l.Max)}
}

// A tipDecision is what decided a shortened tip: the center distance, the
// mate's root diameter and the clearance kept, mm.
type tipDecision struct{ a, mateRoot, clearance float64 }

// A rootDecision is what decided the depth of a milled root: the center
// distance, the mate's tip diameter and the clearance kept, mm.
type rootDecision struct{ a, mateTip, clearance float64 }

// part returns what a measuring hand needs to know of the gear.
func (g *gear) part() inspect.Part { return inspect.Part{FaceWidth: g.faceWidth} }

// middle returns the tooth in the middle of the thickness limits: what is drawn and aimed at.
func (g *gear) middle() involute.Tooth {
	t, err := g.g.Tooth(g.thickness.Limits.Middle())
	if err != nil {
		return g.nominal // both limits were found possible, so the middle is
	}
	return t
}

// A mesh is two gears of a job that run together.
type mesh struct {
	index         int
	first, second *gear
	plan          inspect.PlanMesh
	at            place // of the center distance, or of the mesh
	temperature   *inspect.Limits
	housing       *material
}

// mate returns the other gear of a mesh.
func (m *mesh) mate(g *gear) *gear {
	if g == m.first {
		return m.second
	}
	return m.first
}

// face returns the common face width, 0 where one is not known.
func (m *mesh) face() float64 {
	return min(m.first.faceWidth, m.second.faceWidth)
}

// resolve works a request out. Where its backlash cannot be had it returns, with the
// error, the job as far as it got.
func resolve(r request) (*job, error) {
	j := &job{request: r}
	hands, assumed, err := j.hands()
	if err != nil {
		return nil, err
	}
	for i := range r.gears {
		if err := j.addGear(i, hands[i]); err != nil {
			return nil, err
		}
		j.gears[i].handAssumed = assumed[i]
	}
	for i := range r.meshes {
		if err := j.addMesh(i); err != nil {
			return nil, err
		}
	}
	if err := j.checkTolerances(); err != nil {
		return nil, err
	}
	if err := j.shortenTips(); err != nil {
		return nil, err
	}
	if err := j.deepenRoots(); err != nil {
		return nil, err
	}
	if err := j.planThickness(); err != nil {
		return j, err
	}
	for _, m := range j.meshes {
		if _, err := m.budget(); err != nil {
			return nil, j.impossibleMesh(m, err)
		}
	}
	for _, g := range j.gears {
		if err := j.finishGear(g); err != nil {
			return nil, err
		}
	}
	if err := j.checkMilled(); err != nil {
		return nil, err
	}
	j.early = len(j.warnings)
	j.warn()
	return j, nil
}

func (j *job) addGear(i int, hand float64) error {
	gr := j.request.gears[i]
	g := &gear{name: gr.name, settings: gr.settings}
	spec, err := j.spec(g, hand)
	if err != nil {
		return err
	}
	if g.g, err = involute.NewGear(spec); err != nil {
		return j.impossibleGear(g, err)
	}
	if g.nominal, err = g.g.Nominal(); err != nil {
		return j.impossibleGear(g, err)
	}
	if g.faceWidth, _, err = gr.positive("face_width"); err != nil {
		return err
	}
	if b, ok, err := gr.bore("bore"); err != nil {
		return err
	} else if ok {
		g.bore = &b
	}
	if err := j.readOpenings(g); err != nil {
		return err
	}
	if err := j.readThickness(g); err != nil {
		return err
	}
	if err := g.readConditions(); err != nil {
		return err
	}
	if err := g.readAccuracy(); err != nil {
		return err
	}
	j.gears = append(j.gears, g)
	return nil
}

// spec reads a gear's specification.
func (j *job) spec(g *gear, hand float64) (involute.Spec, error) {
	var s involute.Spec
	var err error
	var ok bool
	if s.Teeth, ok, err = g.settings.count("teeth"); err != nil {
		return s, err
	} else if !ok {
		return s, j.missing(g, "teeth", "write teeth = 24, or --teeth 24")
	}
	if s.Shift, _, err = g.settings.number("shift"); err != nil {
		return s, err
	}
	if math.Abs(s.Shift) > 5 {
		return s, bad("shift", g.settings.vals["shift"], "is a coefficient (× module), %v is far beyond ±5; a length is divided by the module first", s.Shift)
	}
	helix, _, err := g.settings.angle("helix_angle")
	if err != nil {
		return s, err
	}
	if helix < 0 || helix >= 80 {
		return s, bad("helix_angle", g.settings.vals["helix_angle"], "must be from 0° to below 80°, not %v°; the side is said by hand", helix)
	}
	s.Helix = hand * helix * involute.Degree
	if s.Module, err = j.module(g, helix); err != nil {
		return s, err
	}
	if s.Rack, err = j.rack(g, s.Module); err != nil {
		return s, err
	}
	if err := j.form(g, &s); err != nil {
		return s, err
	}
	return s, j.tip(g, &s)
}

// largestModule and smallestModule bound what the computation is made for.
const (
	smallestModule = 0.01
	largestModule  = 500
)

// module reads the normal module from module, dp or transverse_dp, exactly one.
func (j *job) module(g *gear, helixDeg float64) (float64, error) {
	var found []string
	for _, k := range pitchKeys() {
		if g.settings.has(k) {
			found = append(found, k)
		}
	}
	if len(found) == 0 {
		return 0, j.missing(g, "module", "give module = 2 or dp = 16 (or --module, --dp)")
	}
	key := found[0]
	if len(found) > 1 {
		return 0, bad(found[1], g.settings.vals[found[1]], "and %s both give the tooth size; keep one", found[0])
	}
	x, _, err := j.pitchValue(g, key)
	if err != nil {
		return 0, err
	}
	if x <= 0 {
		return 0, bad(key, g.settings.vals[key], "must be above 0")
	}
	m := x
	switch key {
	case "dp":
		m, g.dp = 25.4/x, x
	case "transverse_dp":
		m = 25.4 / x * math.Cos(helixDeg*involute.Degree)
		g.dp = 25.4 / m
	}
	if m < smallestModule || m > largestModule {
		return 0, bad(key, g.settings.vals[key], "gives a module of %.4g mm; it must be from %g to %g mm", m, smallestModule, float64(largestModule))
	}
	return m, nil
}

// pitchValue reads a tooth size: a plain number (a module may carry mm).
func (j *job) pitchValue(g *gear, key string) (float64, bool, error) {
	v := g.settings.vals[key]
	if text, isText := asText(v); isText && key == "module" {
		if t := strings.TrimSpace(text); strings.HasSuffix(t, "in") || strings.HasSuffix(t, "\"") {
			return 0, true, bad(key, v, "a module is in mm; for inch gears give dp instead")
		}
		mm, err := inspect.ParseLength(text, inspect.Millimeter)
		if err != nil {
			return 0, true, bad(key, v, "%v", err)
		}
		return mm, true, nil
	}
	return g.settings.number(key)
}

// rack reads the basic rack: a named one, with free proportions over it.
func (j *job) rack(g *gear, module float64) (involute.Rack, error) {
	var out involute.Rack
	angle, hasAngle, err := g.settings.angle("pressure_angle")
	if err != nil {
		return out, err
	}
	if hasAngle && (angle < 5 || angle > 45) {
		return out, bad("pressure_angle", g.settings.vals["pressure_angle"], "must be from 5° to 45°, not %v°", angle)
	}
	name, named, err := g.settings.word("rack")
	if err != nil {
		return out, err
	}
	if !named {
		name = "ISO 53 A"
	}
	table, err := refdata.RackFor(name, angle)
	if err != nil {
		return out, bad("rack", g.settings.vals["rack"], "%v", err)
	}
	out = involute.Rack{
		PressureAngle: table.PressureAngleDeg * involute.Degree,
		Addendum:      table.Addendum,
		Dedendum:      table.Dedendum + table.DedendumExtraInch*25.4/module,
		TipRadius:     table.TipRadius,
	}
	g.rack, g.source = table.Name, table.Source.String()
	free := false
	for _, p := range []struct {
		key string
		to  *float64
	}{{"addendum", &out.Addendum}, {"dedendum", &out.Dedendum}, {"tip_radius", &out.TipRadius}} {
		x, ok, err := g.settings.number(p.key)
		if err != nil {
			return out, err
		}
		if ok {
			*p.to, free = x, true
		}
	}
	switch {
	case free:
		g.rack += ", own proportions"
	case !named:
		j.warnRackAngle(g, table.PressureAngleDeg)
	}
	return out, j.fitTipRadius(g, &out)
}

// fitTipRadius takes the largest tip radius that fits where a named rack's does
// not, and says so; a radius of the user's own is left for the gear to refuse.
func (j *job) fitTipRadius(g *gear, r *involute.Rack) error {
	largest := r.LargestTipRadius()
	if g.settings.has("tip_radius") || r.TipRadius <= largest || largest < 0 {
		return nil
	}
	j.warnRackRadius(g, r.TipRadius, largest)
	r.TipRadius = largest
	return nil
}
