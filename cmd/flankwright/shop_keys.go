package main

import (
	"fmt"
	"slices"
	"strings"
)

// shopTop stands for the top of a shop file where its keys are asked for.
const shopTop = ""

// A shopTable is the keys that may stand at the top of a shop file, or in one of its [[tables]].
type shopTable struct {
	name string
	keys []string
}

// shopTables lists every key of a shop file, in the order of the README's table.
func shopTables() []shopTable {
	pins := []string{"size", "measured", "from", "to", "step", "class", "count", "place"}
	return []shopTable{
		{shopTop, []string{"title", "units", "pin", "ball", "micrometer", "caliper", "tooth_caliper", "end_mill", "form_cutter", "hob"}},
		{"pin", pins},
		{"ball", pins},
		{"micrometer", []string{"range", "uncertainty", "anvil", "anvil_diameter", "rim", "spindle", "name"}},
		{"caliper", []string{"range", "uncertainty", "graduation", "jaw", "name"}},
		{"tooth_caliper", []string{"module", "dp", "uncertainty", "name"}},
		{"end_mill", []string{"size", "measured", "count", "place"}},
		{"form_cutter", []string{"module", "dp", "pressure_angle", "numbers", "teeth", "place"}},
		{"hob", []string{"module", "dp", "pressure_angle", "rack", "place"}},
	}
}

// shopKeysIn returns the keys of a table of the shop file.
func shopKeysIn(table string) []string {
	for _, t := range shopTables() {
		if t.name == table {
			return t.keys
		}
	}
	return nil
}

// checkShopKeys refuses keys that do not exist in a table of the shop file; where names it for people.
func checkShopKeys(t *table, name, where string) error {
	names := shopKeysIn(name)
	for _, e := range t.entries {
		if !slices.Contains(names, e.key) {
			return unknownShopKey(e, where, names)
		}
	}
	return nil
}

// unknownShopKey words the error of a key that does not exist in a place.
func unknownShopKey(e entry, where string, names []string) error {
	near, ok := otherShopNames()[strings.ReplaceAll(strings.ToLower(e.key), "-", "_")]
	if !ok || !slices.Contains(names, near) {
		near, ok = nearest(e.key, names)
	}
	if ok {
		return fault(e.at, "%s: no such key in %s; did you mean %s?", e.key, where, near)
	}
	for _, t := range shopTables() {
		if t.name != shopTop && slices.Contains(t.keys, e.key) {
			return fault(e.at, "%s: belongs in [[%s]], not in %s", e.key, t.name, where)
		}
	}
	if _, ok := findKey(e.key); ok {
		return fault(e.at, "%s: belongs in a job file, not in %s", e.key, where)
	}
	return fault(e.at, "%s: no such key in %s; there are %s", e.key, where, strings.Join(names, ", "))
}

// otherShopNames are words of the trade for keys that are called otherwise here.
func otherShopNames() map[string]string {
	return map[string]string{
		"diameter": "size", "nominal": "size", "dia": "size", "actual": "measured", "real": "measured",
		"quantity": "count", "qty": "count", "pieces": "count", "number": "count", "grade": "class", "tolerance": "class",
		"where": "place", "location": "place", "drawer": "place", "shelf": "place", "accuracy": "uncertainty", "error": "uncertainty", "limit": "uncertainty",
		"resolution": "graduation", "reading": "graduation", "thickness": "rim", "disc": "rim", "disk": "rim", "faces": "anvil",
		"pins": "pin", "wire": "pin", "wires": "pin", "gauge_pin": "pin", "roller": "pin", "rollers": "pin", "balls": "ball", "mic": "micrometer", "vernier": "caliper",
		"gear_tooth_caliper": "tooth_caliper", "cutter": "form_cutter", "gear_cutter": "form_cutter", "endmill": "end_mill", "mill": "end_mill",
		"sizes": "range", "capacity": "range", "pitch": "dp", "diametral_pitch": "dp",
	}
}

// each reads the entries of one kind, each written [[table]].
func (r *shopReader) each(root *table, name string, read func(settings) error) error {
	e := root.find(name)
	if e == nil {
		return nil
	}
	list, ok := e.val.content.([]value)
	for _, v := range list {
		t, isTable := v.content.(*table)
		if ok = ok && isTable; !ok {
			break
		}
		where := fmt.Sprintf("[[%s]]", name)
		if err := checkShopKeys(t, name, where); err != nil {
			return err
		}
		s := settings{vals: map[string]value{}, jobUnit: r.shop.units, flagUnit: r.shop.units, at: v.at}
		for _, e := range t.entries {
			s.vals[e.key] = e.val
		}
		if err := read(s); err != nil {
			return err
		}
	}
	if !ok {
		return fault(e.at, "%s: needs a list of tables, each written [[%s]]", name, name)
	}
	return nil
}
