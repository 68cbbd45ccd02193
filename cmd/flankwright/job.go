package main

import (
	"fmt"
	"slices"
	"strings"

	"flankwright/inspect"
)

// A request is what a job file, an example or flags alone ask: settings by
// gear and mesh, nothing worked out yet.
type request struct {
	file    string // for messages and derived names
	top     settings
	gears   []gearRequest
	meshes  []settings
	jobUnit inspect.Unit
	display inspect.Unit
}

type gearRequest struct {
	name string
	settings
	own map[string]value // what the gear itself says, without the shared values
}

// parseJob reads a job file into a request. data is TOML; file is its name for messages.
func parseJob(data []byte, file string) (request, error) {
	r := request{file: file}
	root, err := parseTree(data, file)
	if err != nil {
		return r, err
	}
	if err := checkKeys(root, atTop, "a job"); err != nil {
		return r, err
	}
	r.top = settings{vals: map[string]value{}, at: root.at}
	for _, e := range root.entries {
		r.top.vals[e.key] = e.val
	}
	if err := r.readUnits(); err != nil {
		return r, err
	}
	for _, k := range []string{"title", "part", "drawing", "author"} {
		if _, _, err := r.top.word(k); err != nil {
			return r, err
		}
	}
	shared, err := r.readTooth(root)
	if err != nil {
		return r, err
	}
	if err := r.readGears(root, shared); err != nil {
		return r, err
	}
	return r, r.readMeshes(root)
}

func (r *request) readUnits() error {
	word, ok, err := r.top.word("units", "mm", "in")
	if err != nil {
		return err
	}
	if !ok {
		return fault(r.top.at, "units is missing; write units = \"mm\" or units = \"in\" at the top")
	}
	if word == "in" {
		r.jobUnit = inspect.Inch
	}
	r.display = r.jobUnit
	r.top.jobUnit, r.top.flagUnit = r.jobUnit, r.jobUnit
	return nil
}

// asTable returns an entry's table, or says that it should be one.
func asTable(e entry, example string) (*table, error) {
	t, ok := e.val.content.(*table)
	if !ok {
		return nil, fault(e.at, "%s: needs a table, written %s", e.key, example)
	}
	return t, nil
}

func (r *request) readTooth(root *table) (map[string]value, error) {
	shared := map[string]value{}
	e := root.find("tooth")
	if e == nil {
		return shared, nil
	}
	t, err := asTable(*e, "[tooth]")
	if err != nil {
		return nil, err
	}
	if err := checkKeys(t, inTooth, "[tooth]"); err != nil {
		return nil, err
	}
	for _, e := range t.entries {
		shared[e.key] = e.val
	}
	return shared, nil
}

// pitchKeys are the three ways to give the tooth size; a gear's own replaces the shared one.
func pitchKeys() []string { return []string{"module", "dp", "transverse_dp"} }

func (r *request) readGears(root *table, shared map[string]value) error {
	e := root.find("gear")
	if e == nil {
		return fault(root.at, "no gear; write at least one [gear.NAME] with teeth = …")
	}
	all, err := asTable(*e, "[gear.NAME]")
	if err != nil {
		return err
	}
	for _, e := range all.entries {
		t, isTable := e.val.content.(*table)
		if !isTable {
			return fault(e.at, "gear.%s: needs a name, written [gear.NAME]", e.key)
		}
		if err := checkName(e.at, e.key); err != nil {
			return err
		}
		for _, g := range r.gears {
			if strings.EqualFold(g.name, e.key) {
				return fault(e.at, "gear.%s: and gear.%s differ by capitals only; they become names of files, which some machines cannot tell apart", e.key, g.name)
			}
		}
		where := fmt.Sprintf("[gear.%s]", e.key)
		if err := checkKeys(t, inGear, where); err != nil {
			return err
		}
		own := map[string]value{}
		for _, e := range t.entries {
			own[e.key] = e.val
		}
		s := settings{vals: shared, jobUnit: r.jobUnit, flagUnit: r.jobUnit, at: e.at}
		r.gears = append(r.gears, gearRequest{e.key, overlay(s, own), own})
	}
	if len(r.gears) == 0 {
		return fault(e.at, "no gear; write at least one [gear.NAME] with teeth = …")
	}
	return nil
}

// overlay puts a gear's own values over the shared ones, or flags over a job's.
// A tooth size or a thickness replaces one given in another way.
func overlay(s settings, own map[string]value) settings {
	for _, ways := range [][]string{pitchKeys(), thicknessKeys()} {
		if hasAny(own, ways) {
			s.vals = without(s.vals, ways...)
		}
	}
	return s.with(own)
}

func hasAny(vals map[string]value, keys []string) bool {
	return slices.ContainsFunc(keys, func(k string) bool { return has(vals, k) })
}

func without(vals map[string]value, keys ...string) map[string]value {
	rest := map[string]value{}
	for k, v := range vals {
		rest[k] = v
	}
	for _, k := range keys {
		delete(rest, k)
	}
	return rest
}

// reserved reports whether a name is a device on some machines, with any ending.
func reserved(name string) bool {
	switch strings.ToLower(name) {
	case "con", "prn", "aux", "nul":
		return true
	}
	return len(name) == 4 && isDigit(name[3]) && (strings.EqualFold(name[:3], "com") || strings.EqualFold(name[:3], "lpt"))
}

// checkName refuses gear names that cannot be part of a file's name everywhere.
func checkName(at place, name string) error {
	ok := name != "" && len(name) <= 40 && name[0] != '-'
	for i := range len(name) {
		c := name[i]
		ok = ok && (isLetter(c) || isDigit(c) || c == '-' || c == '_')
	}
	if reserved(name) {
		return fault(at, "gear name %q: is kept by some machines for a device and cannot be a file's name; take another", name)
	}
	if !ok {
		return fault(at, "gear name %q: use up to 40 letters, digits, - and _; it becomes part of file names", name)
	}
	return nil
}

func (r *request) readMeshes(root *table) error {
	e := root.find("mesh")
	if e == nil {
		return nil
	}
	list, ok := e.val.content.([]value)
	if !ok {
		return fault(e.at, "mesh: needs a list of tables, each written [[mesh]]")
	}
	for _, v := range list {
		t, ok := v.content.(*table)
		if !ok {
			return fault(e.at, "mesh: needs a list of tables, each written [[mesh]]")
		}
		if err := checkKeys(t, inMesh, "[[mesh]]"); err != nil {
			return err
		}
		s := settings{vals: map[string]value{}, jobUnit: r.jobUnit, flagUnit: r.jobUnit, at: v.at}
		for _, e := range t.entries {
			s.vals[e.key] = e.val
		}
		r.meshes = append(r.meshes, s)
	}
	return nil
}

// checkKeys refuses keys that do not exist in a place or are not supported yet.
func checkKeys(t *table, where scope, name string) error {
	for _, e := range t.entries {
		spec, ok := findKey(e.key)
		if !ok || spec.where&where == 0 {
			if text, isText := asText(e.val); isText && !ok {
				if why, other := otherDrive(text); other {
					return fault(e.at, "%s = %q: %s", e.key, text, why)
				}
			}
			return unknownKey(e.at, e.key, name, keysIn(where))
		}
		if err := refuseLater(spec, e.val, e.at); err != nil {
			return err
		}
	}
	return nil
}

// refuseLater refuses what the program knows but cannot do yet, by key or by value.
func refuseLater(spec keySpec, v value, at place) error {
	text, _ := asText(v)
	switch _, isFlag := v.content.(flagText); {
	case !spec.later, spec.name == "ring" && (v.content == false || text == "false"):
		return nil
	case isFlag:
		return fault(at, "not supported yet")
	}
	return fault(at, "%s: not supported yet", spec.name)
}
