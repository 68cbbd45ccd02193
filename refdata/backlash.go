package refdata

import (
	"fmt"
	"math"
)

// A LeastBacklash is the least backlash a standard recommends for a pair.
type LeastBacklash struct {
	Normal float64 // j_bn, normal to the flanks, mm; not rounded
	// Outside names what lies outside of the standard's printed table, with its
	// number and the range; the value is extrapolated unless it is empty.
	Outside []string
	Source  Source
}

// LeastBacklashISO returns the least normal backlash in mm of ISO/TR
// 10064-2:1996, annex A.4,
//
//	j_bn = (2/3)(0.06 + 0.0005 |a| + 0.03 m_n),
//
// for gears and housings of iron or steel, pitch line speeds under 15 m/s and
// usual tolerances of housings, shafts and bearings, with the center distance a
// and the normal module in mm. The printed table, modules 1.5 to 18 and center
// distances 50 to 1600 mm, is this rounded up to 0.01 mm. A size that is none is
// an error.
func LeastBacklashISO(a, mn float64) (LeastBacklash, error) {
	brackets, err := backlashBrackets(a, mn)
	if err != nil {
		return LeastBacklash{}, err
	}
	return LeastBacklash{
		Normal: 2 * brackets / 3,
		Outside: outside("the table of ISO/TR 10064-2",
			validity{"module", mn, 1.5, 18, " mm"},
			validity{"center distance", math.Abs(a), 50, 1600, " mm"}),
		Source: sourceLeastBacklash("ISO/TR 10064-2", "1996",
			"annex A.4, minimum backlash (iron and steel gears and housings, pitch line speed under 15 m/s)"),
	}, nil
}

// LeastBacklashAGMA returns the least backlash in mm of ANSI/AGMA 2002-B88,
// appendix, for coarse-pitch gears,
//
//	0.06 + 0.0005 |a| + 0.03 m_n,
//
// half as much again as LeastBacklashISO, with the center distance a and the
// normal module in mm. The printed table, diametral pitches 18 to 1.25 and center
// distances 2 to 32 in, is this rounded to 0.001 in. It is taken as normal
// backlash, which is on the safe side: were it meant along the pitch circle, the
// normal backlash would be less by the cosine of the pressure angle.
func LeastBacklashAGMA(a, mn float64) (LeastBacklash, error) {
	brackets, err := backlashBrackets(a, mn)
	if err != nil {
		return LeastBacklash{}, err
	}
	return LeastBacklash{
		Normal: brackets,
		Outside: outside("the table of AGMA 2002",
			validity{"diametral pitch", mmPerInch / mn, 1.25, 18, ""},
			validity{"center distance", math.Abs(a) / mmPerInch, 2, 32, " in"}),
		Source: sourceLeastBacklash("ANSI/AGMA 2002", "B88", "appendix, minimum backlash of coarse-pitch gears"),
	}, nil
}

// backlashBrackets returns 0.06 + 0.0005 |a| + 0.03 m_n, all in mm.
func backlashBrackets(a, mn float64) (float64, error) {
	a = math.Abs(a)
	if !(a > 0 && a <= largestSize && mn > 0 && mn <= largestSize) {
		return 0, fmt.Errorf("no least backlash for a center distance of %.8g mm and a module of %.8g mm; each must be above 0 and at most %.0f mm",
			a, mn, largestSize)
	}
	return 0.06 + 0.0005*a + 0.03*mn, nil
}

// sourceLeastBacklash: the printed tables, recalled too, are the formulas' values, rounded.
func sourceLeastBacklash(standard, edition, where string) Source {
	return Source{
		Standard: standard, Edition: edition, Table: where,
		How: "recalled; computed by the formula", Confidence: "medium-high",
	}
}

// RuleOfThumbBacklash returns the backlash many handbooks give as a rule of
// thumb, 0.03/P to 0.05/P, which is 0.03 to 0.05 times the module, in its unit.
func RuleOfThumbBacklash(module float64) (least, most float64, source Source) {
	return 0.03 * module, 0.05 * module, Source{
		Standard: "none (rule of thumb of many handbooks)", Edition: "none", Table: "0.03/P to 0.05/P",
		How: "common practice", Confidence: "common practice",
	}
}
