package inspect

import (
	"errors"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// maxLength bounds a length, mm; it keeps slips of the finger from overflowing.
const maxLength = 1e6

// maxText bounds what is read as one quantity; nothing sensible is longer.
const maxText = 80

// ParseNumber reads a plain decimal number. It refuses what is not finite.
func ParseNumber(text string) (float64, error) {
	s := strings.TrimSpace(strings.ReplaceAll(text, "−", "-"))
	if len(s) > maxText || s == "" || strings.ContainsAny(s, "xXpP_") {
		return 0, fmt.Errorf("%q is not a number", clip(text))
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
		if strings.Contains(s, ",") && decimalComma(s) {
			return 0, fmt.Errorf("%q is not a number; decimals take a point, not a comma", clip(text))
		}
		return 0, fmt.Errorf("%q is not a number", clip(text))
	}
	return v, nil
}

func clip(s string) string {
	if len(s) > maxText {
		return strings.ToValidUTF8(s[:maxText], "") + "…"
	}
	return s
}

// ParseLength reads a length such as 19.05mm, 0.75in, 3/16in, 1-1/2 in or,
// without a unit, a number in the unit bare. It returns mm.
func ParseLength(text string, bare Unit) (float64, error) {
	number, unit := splitUnit(text, bare)
	v, err := parseFraction(number)
	if err != nil && decimalComma(number) {
		return 0, fmt.Errorf("%q is not a length; decimals take a point, not a comma", clip(text))
	}
	if err != nil {
		return 0, fmt.Errorf("%q is not a length; write it like 19.05mm, 0.75in or 3/16in", clip(text))
	}
	if mm := v * unit.MM(); math.Abs(mm) <= maxLength {
		return mm, nil
	}
	return 0, fmt.Errorf("%q is longer than a kilometer; that is no length in a gear shop", clip(text))
}

// UnitOf returns the unit that a length names, or bare where it names none.
func UnitOf(text string, bare Unit) Unit {
	_, u := splitUnit(text, bare)
	return u
}

// decimalComma reports whether a number would do if its comma were a point.
func decimalComma(number string) bool {
	_, err := ParseNumber(strings.Replace(number, ",", ".", 1))
	return err == nil && strings.Contains(number, ",")
}

// splitUnit takes the unit off the end of a length.
func splitUnit(text string, bare Unit) (string, Unit) {
	s := strings.TrimSpace(text)
	for _, u := range []struct {
		name string
		unit Unit
	}{{"mm", Millimeter}, {"in", Inch}, {"\"", Inch}, {"″", Inch}} {
		if rest, ok := strings.CutSuffix(s, u.name); ok {
			return strings.TrimSpace(rest), u.unit
		}
	}
	return s, bare
}

// parseFraction reads 0.75, 3/16 or 1-1/2.
func parseFraction(s string) (float64, error) {
	num, den, isFraction := strings.Cut(s, "/")
	if !isFraction {
		return ParseNumber(s)
	}
	whole := 0.0
	if w, n, mixed := cutMixed(num); mixed {
		v, err := ParseNumber(w)
		if err != nil || v < 0 || v != math.Trunc(v) {
			return 0, errors.New("bad whole part")
		}
		whole, num = v, n
	}
	a, err1 := ParseNumber(num)
	b, err2 := ParseNumber(den)
	if err1 != nil || err2 != nil || b <= 0 || a != math.Trunc(a) || b != math.Trunc(b) {
		return 0, errors.New("bad fraction")
	}
	return whole + a/b, nil
}

// cutMixed splits the whole part off a mixed number: 1-1 or 1 1 before the slash.
func cutMixed(num string) (whole, rest string, ok bool) {
	num = strings.TrimSpace(num)
	i := strings.LastIndexAny(num, "- ")
	if i <= 0 {
		return "", "", false
	}
	return strings.TrimSpace(num[:i]), num[i+1:], true
}

// ParseLimits reads a range of lengths such as 0.04..0.08, 0.002in..0.005in or
// 2.2345..2.2371in, where a unit at the end covers both ends; one value stands for
// a range without width. It returns mm.
func ParseLimits(text string, bare Unit) (Limits, error) {
	low, high, isRange := strings.Cut(text, "..")
	if !isRange {
		v, err := ParseLength(text, bare)
		return Limits{v, v}, twoPoints(text, err)
	}
	bare = UnitOf(high, bare)
	a, err := ParseLength(low, bare)
	if err != nil {
		return Limits{}, err
	}
	b, err := ParseLength(high, bare)
	if err != nil {
		return Limits{}, err
	}
	return rising(text, a, b)
}

// rising returns the range of two values in their order.
func rising(text string, a, b float64) (Limits, error) {
	if a > b {
		return Limits{}, fmt.Errorf("%q runs backwards; write the smaller value first", clip(text))
	}
	return Limits{a, b}, nil
}

// twoPoints words an error anew where a range seems to be meant, written 5-60.
func twoPoints(text string, err error) error {
	i := strings.LastIndexByte(text, '-')
	if err == nil || i <= 0 || strings.Contains(text, "/") {
		return err
	}
	return fmt.Errorf("%q is not a range; write it with two points: %s..%s", clip(text), clip(strings.TrimSpace(text[:i])), clip(strings.TrimSpace(text[i+1:])))
}

// ParsePercents reads a range of percentages such as 0.1..0.6, or one for a
// range without width; a % may stand behind. It returns fractions: 0.001..0.006.
func ParsePercents(text string) (Limits, error) {
	low, high, isRange := strings.Cut(text, "..")
	if !isRange {
		high = low
	}
	a, err1 := parsePercent(low)
	b, err2 := parsePercent(high)
	if err1 != nil || err2 != nil {
		return Limits{}, twoPoints(text, fmt.Errorf("%q is not a percentage; write it like 0.6 or 0.1..0.6", clip(text)))
	}
	return rising(text, a, b)
}

func parsePercent(text string) (float64, error) {
	v, err := ParseNumber(strings.TrimSuffix(strings.TrimSpace(text), "%"))
	return v / 100, err
}

// coldest and hottest bound temperatures in service, °C: what gears and their
// grease meet outdoors in the cold, and past what the expansions of tables hold for.
const (
	coldest = -60
	hottest = 200
)

// ParseTemperatures reads a range of temperatures such as 5..60, 5..60 °C or
// 40..140 F, where a unit at the end covers both ends; one value stands for a
// range without width. Without a unit they are °C. It returns °C, by t = (F − 32)·5/9.
func ParseTemperatures(text string) (Limits, error) {
	low, high, isRange := strings.Cut(text, "..")
	if !isRange {
		high = low
	}
	low, lowUnit := splitDegrees(low)
	high, highUnit := splitDegrees(high)
	a, err1 := ParseNumber(low)
	b, err2 := ParseNumber(high)
	if err1 != nil || err2 != nil {
		return Limits{}, twoPoints(text, fmt.Errorf("%q is not a temperature; write it like 60, 5..60 or 40..140 F", clip(text)))
	}
	switch {
	case lowUnit == 0:
		lowUnit = highUnit
	case highUnit == 0:
		return Limits{}, fmt.Errorf("%q has its unit in the middle; write it at the end, where it covers both", clip(text))
	}
	l, err := rising(text, celsius(a, lowUnit), celsius(b, highUnit))
	if err == nil && (l.Min < coldest || l.Max > hottest) {
		return Limits{}, fmt.Errorf("%q is out of what gears meet and expansions are known for; it must be from %d to %d °C (%g to %g °F)",
			clip(text), coldest, hottest, coldest*1.8+32, hottest*1.8+32)
	}
	return l, err
}

// splitDegrees takes the unit off the end of a temperature: 'C', 'F', or 0 for none.
func splitDegrees(text string) (number string, unit byte) {
	s := strings.TrimSpace(text)
	if s == "" {
		return s, 0
	}
	unit = s[len(s)-1] &^ 0x20 // upper case
	if unit != 'C' && unit != 'F' {
		return s, 0
	}
	s = strings.TrimSpace(s[:len(s)-1])
	return strings.TrimSpace(strings.TrimSuffix(strings.TrimSuffix(s, "°"), "deg")), unit
}

// celsius returns a temperature in °C.
func celsius(t float64, unit byte) float64 {
	if unit == 'F' {
		return (t - 32) * 5 / 9
	}
	return t
}

// ParseAngle reads an angle in degrees: 20, 14.5°, 12°30', 12°30'15", 20deg. It returns degrees.
func ParseAngle(text string) (float64, error) {
	fail := fmt.Errorf("%q is not an angle; write it like 20, 14.5° or 12°30'", clip(text))
	s := strings.TrimSpace(text)
	if rest, ok := strings.CutSuffix(s, "deg"); ok {
		s = strings.TrimSpace(rest)
	}
	deg, rest, _ := strings.Cut(s, "°")
	d, err := ParseNumber(deg)
	if err != nil {
		return 0, fail
	}
	rest = strings.NewReplacer("′", "'", "″", "\"").Replace(strings.TrimSpace(rest))
	total := 0.0
	for _, part := range []struct {
		mark string
		size float64
	}{{"'", 60}, {"\"", 3600}} {
		v, tail, ok := strings.Cut(rest, part.mark)
		if !ok {
			continue
		}
		n, err := ParseNumber(v)
		if err != nil || n < 0 || n >= 60 {
			return 0, fail
		}
		total += n / part.size
		rest = strings.TrimSpace(tail)
	}
	if rest != "" || (total != 0 && d != math.Trunc(d)) {
		return 0, fail
	}
	return d + math.Copysign(total, d), nil
}
