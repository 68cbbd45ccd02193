package main

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"flankwright/inspect"
	"flankwright/refdata"
)

// settings are the values that stand for one gear, one mesh or the whole job,
// from a file, from flags, or from both, with readers that say where a wrong
// one stands.
type settings struct {
	vals     map[string]value
	jobUnit  inspect.Unit // of bare lengths in the file
	flagUnit inspect.Unit // of bare lengths on the command line
	at       place        // of the whole
}

func (s settings) has(key string) bool { _, ok := s.vals[key]; return ok }

// with returns a copy in which over's values take precedence.
func (s settings) with(over map[string]value) settings {
	vals := map[string]value{}
	for k, v := range s.vals {
		vals[k] = v
	}
	for k, v := range over {
		vals[k] = v
	}
	s.vals = vals
	return s
}

// bare returns the unit of a value's bare numbers.
func (s settings) bare(v value) inspect.Unit {
	if _, flag := v.content.(flagText); flag {
		return s.flagUnit
	}
	return s.jobUnit
}

// bad reports a wrong value of a key.
func bad(key string, v value, format string, args ...any) error {
	if _, flag := v.content.(flagText); flag {
		return fault(v.at, format, args...)
	}
	return fault(v.at, "%s: %s", key, fmt.Sprintf(format, args...))
}

func kindOf(v value) string {
	switch v.content.(type) {
	case string, flagText:
		return "a text"
	case bool:
		return "true or false"
	case *table:
		return "a table"
	case []value:
		return "a list"
	}
	return "a number"
}

// number reads a plain number.
func (s settings) number(key string) (x float64, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return 0, false, nil
	}
	switch c := v.content.(type) {
	case int64:
		x = float64(c)
	case float64:
		x = c
	case flagText:
		x, err = inspect.ParseNumber(string(c))
		if err != nil {
			return 0, true, bad(key, v, "%v", err)
		}
	default:
		return 0, true, bad(key, v, "needs a plain number, not %s", kindOf(v))
	}
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return 0, true, bad(key, v, "needs a finite number")
	}
	return x, true, nil
}

// count reads a whole number of at least 1.
func (s settings) count(key string) (n int, ok bool, err error) {
	x, ok, err := s.number(key)
	if err != nil || !ok {
		return 0, ok, err
	}
	if x != math.Trunc(x) || x < 1 || x > maxTeeth {
		return 0, true, bad(key, s.vals[key], "needs a whole number from 1 to %d, not %v", maxTeeth, x)
	}
	return int(x), true, nil
}

// maxTeeth bounds a number of teeth; it keeps a slip of the finger from asking for a million.
const maxTeeth = 10000

// length reads a length, in mm.
func (s settings) length(key string) (mm float64, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return 0, false, nil
	}
	mm, err = s.asLength(v)
	if err != nil {
		return 0, true, bad(key, v, "%v", err)
	}
	return mm, true, nil
}

func (s settings) asLength(v value) (float64, error) {
	var mm float64
	switch c := v.content.(type) {
	case int64:
		mm = float64(c) * s.jobUnit.MM()
	case float64:
		mm = c * s.jobUnit.MM()
	case string:
		return inspect.ParseLength(c, s.jobUnit)
	case flagText:
		return inspect.ParseLength(string(c), s.flagUnit)
	default:
		return 0, fmt.Errorf("needs a length, such as 12.5 or \"0.75in\", not %s", kindOf(v))
	}
	if math.IsNaN(mm) || math.IsInf(mm, 0) {
		return 0, fmt.Errorf("needs a finite length")
	}
	return inspect.ParseLength(strconv.FormatFloat(mm, 'g', -1, 64), inspect.Millimeter)
}

// positive reads a length above 0.
func (s settings) positive(key string) (mm float64, ok bool, err error) {
	mm, ok, err = s.length(key)
	if err == nil && ok && mm <= 0 {
		err = bad(key, s.vals[key], "needs a length above 0")
	}
	return mm, ok, err
}

// limits reads a range of lengths, or one length; single tells which.
func (s settings) limits(key string) (l inspect.Limits, single, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return l, false, false, nil
	}
	text, isText := asText(v)
	if !isText {
		mm, err := s.asLength(v)
		if err != nil {
			return l, true, true, bad(key, v, "needs a length or a range such as \"0.04..0.08\", not %s", kindOf(v))
		}
		return inspect.Limits{Min: mm, Max: mm}, true, true, nil
	}
	l, err = inspect.ParseLimits(text, s.bare(v))
	if err != nil {
		return l, false, true, bad(key, v, "%v", err)
	}
	return l, !strings.Contains(text, ".."), true, nil
}

// written returns a text, or a number as a text.
func written(v value) (string, bool) {
	switch c := v.content.(type) {
	case int64:
		return strconv.FormatInt(c, 10), true
	case float64:
		return strconv.FormatFloat(c, 'g', -1, 64), true
	}
	return asText(v)
}

func asText(v value) (string, bool) {
	switch c := v.content.(type) {
	case string:
		return c, true
	case flagText:
		return string(c), true
	}
	return "", false
}

// angle reads an angle in degrees.
func (s settings) angle(key string) (deg float64, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return 0, false, nil
	}
	if text, isText := asText(v); isText {
		deg, err = inspect.ParseAngle(text)
		if err != nil {
			err = bad(key, v, "%v", err)
		}
		return deg, true, err
	}
	return s.number(key)
}

// word reads a text; where words are given it must be one of them.
func (s settings) word(key string, words ...string) (text string, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return "", false, nil
	}
	text, isText := asText(v)
	if !isText {
		return "", true, bad(key, v, "needs a text in quotes, not %s", kindOf(v))
	}
	if len(words) == 0 {
		return text, true, nil
	}
	for _, w := range words {
		if strings.EqualFold(w, text) {
			return w, true, nil
		}
	}
	return "", true, bad(key, v, "%q is not one of %s", text, quoted(words))
}

func quoted(words []string) string {
	q := make([]string, len(words))
	for i, w := range words {
		q[i] = fmt.Sprintf("%q", w)
	}
	return strings.Join(q, ", ")
}

// A boreSize is a bore with its limits; without a class both are the nominal.
type boreSize struct {
	nominal float64 // mm
	limits  inspect.Limits
	class   string
	source  string
}

// bore reads a length, or a length with an ISO 286 class: "12 H7".
func (s settings) bore(key string) (b boreSize, ok bool, err error) {
	v, ok := s.vals[key]
	if !ok {
		return b, false, nil
	}
	text, isText := asText(v)
	size, class, hasClass := splitClass(text)
	if !isText || !hasClass {
		mm, _, err := s.positive(key)
		return boreSize{nominal: mm, limits: inspect.Limits{Min: mm, Max: mm}}, true, err
	}
	mm, err := inspect.ParseLength(size, s.bare(v))
	if err != nil || mm <= 0 {
		return b, true, bad(key, v, "%q is not a bore; write it like 12, 0.5in or \"12 H7\"", text)
	}
	if class[0] >= 'a' && class[0] <= 'z' {
		return b, true, bad(key, v, "%s is a class for shafts; a bore takes a hole's, in capitals: %s", class, strings.ToUpper(class[:1])+class[1:])
	}
	low, high, src, err := refdata.ISO286Limits(mm, class)
	if err != nil {
		return b, true, bad(key, v, "%v", err)
	}
	return boreSize{mm, inspect.Limits{Min: mm + low, Max: mm + high}, class, src.String()}, true, nil
}

// splitClass splits "12 H7", "12mm H7" or "12H7" into size and class.
func splitClass(text string) (size, class string, ok bool) {
	text = strings.TrimSpace(text)
	head := strings.TrimRight(text, "0123456789")
	if head == text {
		return text, "", false
	}
	for letters := 1; letters <= 2 && letters < len(head); letters++ {
		size, class := head[:len(head)-letters], text[len(head)-letters:]
		if _, err := inspect.ParseLength(size, inspect.Millimeter); err == nil && isLetter(class[0]) {
			return size, class, true
		}
	}
	if i := strings.LastIndexByte(text, ' '); i > 0 && isLetter(text[i+1]) {
		return text[:i], text[i+1:], true // no class that is known; the look-up says so
	}
	return text, "", false
}

func isLetter(c byte) bool { return c|0x20 >= 'a' && c|0x20 <= 'z' }
func isDigit(c byte) bool  { return c >= '0' && c <= '9' }

// inline returns the values of a table that stands for one value, and refuses unknown keys.
func (s settings) inline(key string, t *table) (settings, error) {
	names := inlineKeys()[key]
	vals := map[string]value{}
	for _, e := range t.entries {
		known := false
		for _, n := range names {
			known = known || n == e.key
		}
		if !known {
			return s, unknownKey(e.at, e.key, key, names)
		}
		vals[e.key] = e.val
	}
	return settings{vals, s.jobUnit, s.flagUnit, t.at}, nil
}

// unknownKey words the error of a key that does not exist in a place.
func unknownKey(at place, key, where string, names []string) error {
	if why, ok := otherDrive(key); ok {
		return fault(at, "%s: %s", key, why)
	}
	if key == "transverse_pressure_angle" {
		return fault(at, "%s: no such key; the normal one is wanted: tan(pressure_angle) = tan(transverse) · cos(helix_angle)", key)
	}
	if near, ok := nearest(key, names); ok {
		return fault(at, "%s: no such key in %s; did you mean %s?", key, where, near)
	}
	if spec, ok := findKey(key); ok {
		return fault(at, "%s: belongs %s, not in %s", key, scopeName(spec.where), where)
	}
	return fault(at, "%s: no such key in %s; there are %s", key, where, strings.Join(supported(names), ", "))
}
