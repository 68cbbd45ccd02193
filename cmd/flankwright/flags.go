package main

import (
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
)

// Flag categories, as the help groups them.
const (
	catTooth  = "Tooth, shared by all gears (× module means a plain number)"
	catGear   = "Gear (with a job file: of the gear that --gear names)"
	catMate   = "Mate, for a pair without a job file (the gears are then called pinion and wheel)"
	catMesh   = "Mesh"
	catOutput = "Output"
	catHead   = "Head of the sheet"
)

func flagName(key string) string { return strings.ReplaceAll(key, "_", "-") }

// mateKeys are the gear keys that --mate-… flags give the second gear of a pair.
func mateKeys() []string {
	return []string{"teeth", "shift", "thin", "over_pins", "span", "tip_diameter", "face_width", "ring", "material"}
}

// jobFlags are the flags that describe a gear or a pair, one for each key that
// is a single value. What is not supported yet is accepted here and refused by name.
func jobFlags() []cli.Flag {
	var flags []cli.Flag
	for _, k := range keys() {
		category := ""
		switch {
		case k.usage == "" || k.where&atTop != 0:
			continue
		case k.where&inTooth != 0:
			category = catTooth
		case k.where&inGear != 0:
			category = catGear
		case k.where&inMesh != 0:
			category = catMesh
		case k.where&inLoad != 0:
			category = "Load"
		}
		flags = append(flags, keyFlag(flagName(k.name), k.usage, category, k))
	}
	for _, name := range mateKeys() {
		k, _ := findKey(name)
		flags = append(flags, keyFlag("mate-"+flagName(name), k.usage, catMate, k))
	}
	return flags
}

func keyFlag(name, usage, category string, k keySpec) cli.Flag {
	if k.name == "ring" {
		return &cli.BoolFlag{Name: name, Usage: usage, Category: category, Hidden: k.later, DisableDefaultText: true}
	}
	return &cli.StringFlag{Name: name, Usage: usage, Category: category, Hidden: k.later}
}

// commonFlags mean the same in every command that computes.
func commonFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "units", Usage: "show lengths in mm or in, and read bare lengths of flags so", Category: catOutput},
		&cli.BoolFlag{Name: "json", Usage: "JSON instead of text, not rounded, lengths in mm", Category: catOutput, DisableDefaultText: true},
		&cli.IntFlag{Name: "digits", Usage: "decimals of lengths (3 in mm, 4 in inches)", Value: -1, DefaultText: "by unit", Category: catOutput},
		&cli.BoolFlag{Name: "explain", Usage: "each result with its formula, the numbers put in and the source", Category: catOutput, DisableDefaultText: true},
		&cli.StringFlag{Name: "gear", Usage: "one gear of the job, by name", Category: catOutput},
		&cli.StringFlag{Name: "measured-tip", Usage: "outside diameter of the blank as measured; heights, depth of cut and contact follow", Category: "Measuring"},
		&cli.StringFlag{Name: "example", Usage: "use an example job that the program carries", Category: catOutput},
		&cli.StringFlag{Name: "shop", Usage: "what is on hand, a file (flankwright new --shop writes one); none: not the one in your configuration folder", Category: "Measuring"},
	}
}

// fileFlags are for commands that write files.
func fileFlags(usage string) []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "output", Aliases: []string{"o"}, Usage: usage, Category: catOutput},
		&cli.BoolFlag{Name: "force", Usage: "overwrite files that exist", Category: catOutput, DisableDefaultText: true},
	}
}

// flagValue returns what a flag says, as a value placed at the flag.
func flagValue(c *cli.Context, name string) (value, bool) {
	if !c.IsSet(name) {
		return value{}, false
	}
	text := c.String(name)
	if text == "" && c.Bool(name) {
		text = "true"
	}
	return value{flagText(text), place{file: "--" + name}}, true
}

// flagLength reads a flag's length above 0; ok tells whether it is given.
func flagLength(c *cli.Context, j *job, name string) (mm float64, ok bool, err error) {
	v, ok := flagValue(c, name)
	if !ok {
		return 0, false, nil
	}
	mm, _, err = settings{vals: map[string]value{name: v}, flagUnit: j.display}.positive(name)
	return mm, true, err
}

// flagged collects the flags of the keys of a scope; prefix is "" or "mate-".
func flagged(c *cli.Context, where scope, prefix string) (map[string]value, error) {
	vals := map[string]value{}
	for _, k := range keys() {
		if k.where&where == 0 {
			continue
		}
		v, ok := flagValue(c, prefix+flagName(k.name))
		if !ok {
			continue
		}
		if err := refuseLater(k, v, v.at); err != nil {
			return nil, err
		}
		vals[k.name] = v
	}
	return vals, nil
}

// unitFlag reads --units.
func unitFlag(c *cli.Context) (inspect.Unit, bool, error) {
	switch c.String("units") {
	case "":
		return inspect.Millimeter, false, nil
	case "mm":
		return inspect.Millimeter, true, nil
	case "in":
		return inspect.Inch, true, nil
	}
	return 0, false, wrong("--units: %q is not a unit; write mm or in", c.String("units"))
}

// requestFromFlags builds a request from flags alone: a gear called gear, or
// with --mate-teeth a pinion and a wheel.
func requestFromFlags(c *cli.Context) (request, error) {
	r := request{file: "flags"}
	shared, err := flagged(c, inTooth, "")
	if err != nil {
		return r, err
	}
	if c.NumFlags() == 0 {
		return r, wrong("give a job file (flankwright new writes one), or a gear by flags: --dp 16 --teeth 20")
	}
	unit, ok, err := unitFlag(c)
	if err != nil {
		return r, err
	}
	if !ok && (has(shared, "dp") || has(shared, "transverse_dp")) {
		unit = inspect.Inch
	}
	r.jobUnit, r.display = unit, unit
	if r.top, err = r.flagSettings(c, atTop, ""); err != nil {
		return r, err
	}
	own, err := flagged(c, inGear, "")
	if err != nil {
		return r, err
	}
	mate, err := flagged(c, inGear, "mate-")
	if err != nil {
		return r, err
	}
	mesh, err := r.flagSettings(c, inMesh, "")
	if err != nil {
		return r, err
	}
	base := settings{vals: shared, jobUnit: unit, flagUnit: unit}
	if _, err := flagged(c, inLoad, ""); err != nil {
		return r, err
	}
	if len(mate) == 0 {
		if len(mesh.vals) > 0 {
			return r, wrong("%s are about a pair: give --mate-teeth too", meshFlags())
		}
		r.gears = []gearRequest{{"gear", base.with(own), own}}
		return r, nil
	}
	return r, r.addPair(base, own, mate, mesh)
}

// meshFlags names the flags of a mesh.
func meshFlags() string {
	var names []string
	for _, k := range keys() {
		if k.where&inMesh != 0 && k.usage != "" {
			names = append(names, "--"+flagName(k.name))
		}
	}
	return inWords(names)
}

// addPair makes the request's gears a pinion and a wheel that mesh.
func (r *request) addPair(base settings, own, mate map[string]value, mesh settings) error {
	if !has(mate, "teeth") {
		return wrong("a pair needs --mate-teeth")
	}
	if face, ok := own["face_width"]; ok && !has(mate, "face_width") {
		mate["face_width"] = face // one face width given is meant for both
	}
	if tip, ok := own["tip"]; ok && !has(mate, "tip_diameter") {
		mate["tip"] = tip // so is a word about tips
	}
	if tolerance, ok := own["thin_tolerance"]; ok && !hasAny(mate, thicknessKeys()) {
		mate["thin_tolerance"] = tolerance // and a tolerance for what is still to be decided
		if hasAny(own, fixingKeys()) {
			delete(own, "thin_tolerance")
		}
	}
	r.gears = []gearRequest{
		{"pinion", base.with(own), own},
		{"wheel", base.with(mate), mate},
	}
	r.gears[1].settings.vals = without(r.gears[1].settings.vals, "hand")
	mesh.vals["gears"] = value{content: []value{{content: "pinion"}, {content: "wheel"}}}
	r.meshes = []settings{mesh}
	return nil
}

func has(vals map[string]value, key string) bool { _, ok := vals[key]; return ok }

func (r request) flagSettings(c *cli.Context, where scope, prefix string) (settings, error) {
	vals, err := flagged(c, where, prefix)
	return settings{vals: vals, jobUnit: r.jobUnit, flagUnit: r.display}, err
}

// overrideByFlags lays flags over a job file. Flags of the tooth go to every
// gear, or to the one that --gear names; flags of a gear need that name where
// the job has several; flags of a mesh need a job with one mesh.
func (r *request) overrideByFlags(c *cli.Context) error {
	unit, ok, err := unitFlag(c)
	if err != nil {
		return err
	}
	if ok {
		r.display = unit
	}
	r.setFlagUnit(r.display)
	for _, k := range mateKeys() {
		if c.IsSet("mate-" + flagName(k)) {
			return wrong("--mate-%s: is for a pair without a job file; use --gear NAME --%s", flagName(k), flagName(k))
		}
	}
	if _, err := flagged(c, inLoad, ""); err != nil {
		return err
	}
	top, err := flagged(c, atTop, "")
	if err != nil {
		return err
	}
	r.top = r.top.with(top)
	if err := r.overrideGears(c); err != nil {
		return err
	}
	mesh, err := flagged(c, inMesh, "")
	if err != nil || len(mesh) == 0 {
		return err
	}
	if len(r.meshes) != 1 {
		return wrong("%s need a job with exactly one mesh; this one has %d: write them into its [[mesh]]", meshFlags(), len(r.meshes))
	}
	r.meshes[0] = r.meshes[0].with(mesh)
	if text, _ := asText(mesh["backlash"]); strings.Contains(text, "..") && !c.IsSet("thin-tolerance") {
		for i := range r.gears { // which were for the job's one value
			r.gears[i].vals = without(r.gears[i].vals, "thin_tolerance")
		}
	}
	return nil
}

func (r *request) setFlagUnit(u inspect.Unit) {
	r.top.flagUnit = u
	for i := range r.gears {
		r.gears[i].settings.flagUnit = u
	}
	for i := range r.meshes {
		r.meshes[i].flagUnit = u
	}
}

func (r *request) overrideGears(c *cli.Context) error {
	tooth, err := flagged(c, inTooth, "")
	if err != nil {
		return err
	}
	all, err := flagged(c, inGear, "")
	if err != nil {
		return err
	}
	name := c.String("gear")
	if name != "" {
		if _, ok := r.gearIndex(name); !ok {
			return wrong("--gear: %s", noGear(name, r.gearNames()))
		}
	}
	for i := range r.gears {
		g := &r.gears[i]
		if name != "" && g.name != name {
			continue
		}
		over := tooth
		if name != "" || len(r.gears) == 1 {
			over = all
		} else if key, ok := onlyGear(all, tooth); ok {
			return wrong("--%s: is about one gear, and the job has %s; say which by --gear", flagName(key), quoted(r.gearNames()))
		}
		g.settings = overlay(g.settings, over)
		for k, v := range over {
			g.own[k] = v
		}
	}
	return nil
}

// onlyGear returns a flag that is not shared by all gears, in the order of the keys.
func onlyGear(all, tooth map[string]value) (string, bool) {
	for _, k := range keys() {
		if has(all, k.name) && !has(tooth, k.name) {
			return k.name, true
		}
	}
	return "", false
}
