package refdata

import "math"

// A Listed is a standard or customary value: a module in mm, a diametral pitch
// in 1/in or a pressure angle in degrees.
type Listed struct {
	Value  float64
	Series string // ISO 54: I, II; DIN 780 under 1 mm: 1, 2; pitches: coarse, fine; angles: none
	Status string // preferred, second choice, avoid, old or customary
	Source Source
}

// Modules returns the standard normal modules in mm, ascending.
func Modules() []Listed { return listed("modules", "module_mm", "series") }

// DiametralPitches returns the diametral pitches in use in 1/in, ascending.
func DiametralPitches() []Listed { return listed("diametral_pitches", "pitch_per_in", "series") }

// PressureAngles returns the normal pressure angles in use in degrees, ascending.
func PressureAngles() []Listed { return listed("pressure_angles", "angle_deg", "") }

// IsStandardModule reports whether mm is a standard module, and its status.
func IsStandardModule(mm float64) (status string, ok bool) { return statusIn(Modules(), mm) }

// IsStandardPitch reports whether perInch is a diametral pitch in use, and its status.
func IsStandardPitch(perInch float64) (status string, ok bool) {
	return statusIn(DiametralPitches(), perInch)
}

// NearestModule returns the standard module nearest to mm by ratio. It reports false unless mm is finite and above 0.
func NearestModule(mm float64) (Listed, bool) { return nearestListed(Modules(), mm) }

// NearestPitch returns the diametral pitch in use nearest to perInch by
// ratio. It reports false unless perInch is finite and above 0.
func NearestPitch(perInch float64) (Listed, bool) {
	return nearestListed(DiametralPitches(), perInch)
}

func listed(table, value, series string) []Listed {
	rs := records(table)
	all := make([]Listed, len(rs))
	for i, r := range rs {
		all[i] = Listed{Value: r.number(value), Status: r.text("status"), Source: r.source()}
		if series != "" {
			all[i].Series = r.text(series)
		}
	}
	return all
}

// sameValue is how far, relative to itself, a value may be from a listed one
// and still be it: a module worked out from a pitch or another unit is off by
// parts in 10^16, while neighbors on a list differ by 1 part in 100 and more.
const sameValue = 1e-9

func statusIn(list []Listed, v float64) (status string, ok bool) {
	for _, l := range list {
		if math.Abs(v-l.Value) <= sameValue*l.Value {
			return l.Status, true
		}
	}
	return "", false
}

func nearestListed(list []Listed, v float64) (Listed, bool) {
	if !(v > 0) || math.IsInf(v, 1) {
		return Listed{}, false
	}
	best, least := Listed{}, math.Inf(1)
	for _, l := range list {
		if ratio := max(v/l.Value, l.Value/v); ratio < least {
			best, least = l, ratio
		}
	}
	return best, true
}
