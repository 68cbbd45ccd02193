package main

import (
	"strings"

	"flankwright/inspect"
)

// center reads a center distance: a length, "2.0±0.0005", limits "1.9995..2.0005", or a
// table with at and a tolerance or a class, or with limits. at is 0 where it is left to the mesh.
func (s settings) center(key string) (at, tolerance float64, class string, err error) {
	v, ok := s.vals[key]
	if !ok {
		return 0, 0, "", nil
	}
	if t, isTable := v.content.(*table); isTable {
		return s.centerTable(key, t)
	}
	text, isText := asText(v)
	if at, class, ok := s.centerClass(v, text); ok {
		return at, 0, class, nil
	}
	if isText && strings.Contains(text, "..") {
		return s.centerLimits(key)
	}
	base, tol, hasTol := strings.Cut(strings.NewReplacer("+/-", "±", "+-", "±").Replace(text), "±")
	if _, class, hasClass := splitClass(text); isText && !hasTol && hasClass {
		return 0, 0, "", bad(key, v, "%s is a class for bores and shafts; a center distance takes a js class, such as \"50 js7\"", class)
	}
	if !isText || !hasTol {
		at, _, err = s.positive(key)
		return at, 0, "", err
	}
	unit := inspect.UnitOf(tol, s.bare(v)) // a unit at the end covers both
	distance, err1 := inspect.ParseLength(base, unit)
	tolerance, err2 := inspect.ParseLength(tol, unit)
	if err1 != nil || err2 != nil {
		return 0, 0, "", bad(key, v, "%q is not a center distance; write it like 50, \"50±0.02\" (or 50+-0.02), \"49.98..50.02\" or \"50 js7\"", text)
	}
	if distance <= 0 || tolerance < 0 {
		return 0, 0, "", bad(key, v, "needs a distance above 0 and a tolerance of 0 or more")
	}
	return distance, tolerance, "", nil
}

// centerLimits reads a center distance given by its limits, "49.98..50.02".
func (s settings) centerLimits(key string) (at, tolerance float64, class string, err error) {
	l, _, _, err := s.limits(key)
	if err == nil && l.Min <= 0 {
		err = bad(key, s.vals[key], "needs distances above 0")
	}
	return l.Middle(), l.Width() / 2, "", err
}

// centerClass reads a distance with an ISO 286 class: "50 js7" or "50js7".
func (s settings) centerClass(v value, text string) (at float64, class string, ok bool) {
	i := strings.Index(strings.ToLower(text), "js")
	if i < 0 {
		return 0, "", false
	}
	at, err := inspect.ParseLength(text[:i], s.bare(v))
	return at, strings.TrimSpace(text[i:]), err == nil && at > 0
}

func (s settings) centerTable(key string, t *table) (at, tolerance float64, class string, err error) {
	sub, err := s.inline(key, t)
	if err != nil {
		return 0, 0, "", err
	}
	if sub.has("limits") {
		for _, k := range []string{"at", "tolerance", "class"} {
			if sub.has(k) {
				return 0, 0, "", bad("limits", sub.vals["limits"], "and %s both say where the center is; keep one", k)
			}
		}
		return sub.centerLimits("limits")
	}
	if at, _, err = sub.positive("at"); err != nil {
		return 0, 0, "", err
	}
	var hasTol bool
	if tolerance, hasTol, err = sub.length("tolerance"); err != nil {
		return 0, 0, "", err
	}
	if tolerance < 0 {
		return 0, 0, "", bad("tolerance", sub.vals["tolerance"], "is ±, and needs a length of 0 or more")
	}
	class, hasClass, err := sub.word("class")
	if err == nil && hasClass && hasTol {
		err = bad("class", sub.vals["class"], "and tolerance say the same thing; give one of them")
	}
	return at, tolerance, class, err
}
