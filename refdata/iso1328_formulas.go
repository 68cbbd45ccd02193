package refdata

import (
	"fmt"
	"math"
)

// class5of2013 returns the tolerances of class 5 in micrometers by clause 5.3
// of ISO 1328-1:2013, with d, m_n and b in mm:
//
//	f_pt = 0.001 d + 0.4 m_n + 5         F_p  = 0.002 d + 0.55 √d + 0.7 m_n + 12
//	f_Hα = 0.4 m_n + 0.001 d + 4         f_fα = 0.55 m_n + 5
//	f_Hβ = 0.05 √d + 0.35 √b + 4         f_fβ = 0.07 √d + 0.45 √b + 4
//	F_α, F_β: root of the sum of the squares of slope and form, both unrounded
//
// and, from the informative annexes, F_r = 0.9 F_p and f_u = √2 f_pt.
func class5of2013(g ToothSize) FlankTolerances {
	d, m, b := g.ReferenceDiameter, g.Module, g.FaceWidth
	t := FlankTolerances{
		SinglePitch:     0.001*d + 0.4*m + 5,
		CumulativePitch: 0.002*d + 0.55*math.Sqrt(d) + 0.7*m + 12,
		ProfileSlope:    0.4*m + 0.001*d + 4,
		ProfileForm:     0.55*m + 5,
		HasHelix:        b > 0,
		Used:            g,
		Outside:         outside2013(g),
		Source:          source2013("clause 5.3"),
		RunoutSource:    source2013("informative annex, runout 0.9 F_p"),
	}
	t.AdjacentPitch = math.Sqrt2 * t.SinglePitch
	t.Profile = math.Hypot(t.ProfileSlope, t.ProfileForm)
	t.Runout = 0.9 * t.CumulativePitch
	if t.HasHelix {
		t.HelixSlope = 0.05*math.Sqrt(d) + 0.35*math.Sqrt(b) + 4
		t.HelixForm = 0.07*math.Sqrt(d) + 0.45*math.Sqrt(b) + 4
		t.Helix = math.Hypot(t.HelixSlope, t.HelixForm)
	}
	return t
}

// sector5of2013 returns F_pk − f_pt of class 5 in micrometers (informative
// annex of ISO 1328-1:2013): (4 k/z)(0.001 d + 0.55 √d + 0.3 m_n + 7).
func sector5of2013(g ToothSize, k int) float64 {
	d := g.ReferenceDiameter
	return 4 * float64(k) / float64(g.Teeth) * (0.001*d + 0.55*math.Sqrt(d) + 0.3*g.Module + 7)
}

// grade5of1995 returns the tolerances of grade 5 in micrometers by ISO
// 1328-1:1995, where d, m and b are the geometric means of the size ranges:
//
//	f_pt = 0.3 (m + 0.4 √d) + 4               F_p  = 0.3 m + 1.25 √d + 7
//	F_α  = 3.2 √m + 0.22 √d + 0.7             F_β  = 0.1 √d + 0.63 √b + 4.2
//	f_fα = 2.5 √m + 0.17 √d + 0.5             f_Hα = 2 √m + 0.14 √d + 0.5
//	f_fβ = f_Hβ = 0.07 √d + 0.45 √b + 3       F_r  = 0.8 F_p (ISO 1328-2:1997)
func grade5of1995(g ToothSize) FlankTolerances {
	used := g
	used.ReferenceDiameter = diameters1995().mean(g.ReferenceDiameter)
	used.Module = modules1995().mean(g.Module)
	if g.FaceWidth > 0 {
		used.FaceWidth = faceWidths1995().mean(g.FaceWidth)
	}
	m, d, b := used.Module, math.Sqrt(used.ReferenceDiameter), math.Sqrt(used.FaceWidth) // d, b: the roots
	t := FlankTolerances{
		SinglePitch:     0.3*(m+0.4*d) + 4,
		CumulativePitch: 0.3*m + 1.25*d + 7,
		ProfileSlope:    2*math.Sqrt(m) + 0.14*d + 0.5,
		ProfileForm:     2.5*math.Sqrt(m) + 0.17*d + 0.5,
		Profile:         3.2*math.Sqrt(m) + 0.22*d + 0.7,
		HasHelix:        g.FaceWidth > 0,
		Used:            used,
		Outside:         outside1995(g),
		Source:          source1995("ISO 1328-1", "1995", "formulas of grade 5 at the geometric means of the size ranges"),
		RunoutSource:    source1995("ISO 1328-2", "1997", "runout, 0.8 F_p of ISO 1328-1:1995"),
	}
	t.Runout = 0.8 * t.CumulativePitch
	if t.HasHelix {
		t.HelixSlope = 0.07*d + 0.45*b + 3
		t.HelixForm = t.HelixSlope
		t.Helix = 0.1*d + 0.63*b + 4.2
	}
	return t
}

// sector5of1995 returns F_pk − f_pt of grade 5 in micrometers: 1.6 √((k−1) m).
func sector5of1995(used ToothSize, k int) float64 {
	return 1.6 * math.Sqrt(float64(k-1)*used.Module)
}

// sizeSteps are the ends of size ranges that meet, ascending; a size on an end
// belongs to the range below, the first end to the first range.
type sizeSteps []float64

func diameters1995() sizeSteps {
	return sizeSteps{5, 20, 50, 125, 280, 560, 1000, 1600, 2500, 4000, 6000, 8000, 10000}
}
func modules1995() sizeSteps    { return sizeSteps{0.5, 2, 3.5, 6, 10, 16, 25, 40, 70} }
func faceWidths1995() sizeSteps { return sizeSteps{4, 10, 20, 40, 80, 160, 250, 400, 650, 1000} }

// around returns the range that holds v or is nearest to it.
func (s sizeSteps) around(v float64) (from, to float64) {
	i := 1
	for i < len(s)-1 && v > s[i]+sizeSlack {
		i++
	}
	return s[i-1], s[i]
}

// mean returns the geometric mean of the range around v.
func (s sizeSteps) mean(v float64) float64 {
	from, to := s.around(v)
	return math.Sqrt(from * to)
}

func outside2013(g ToothSize) []string {
	return outside("ISO 1328-1:2013",
		validity{"reference diameter", g.ReferenceDiameter, 5, 15000, " mm"},
		validity{"module", g.Module, 0.5, 70, " mm"},
		validity{"face width", known(g.FaceWidth, 4), 4, 1200, " mm"},
		validity{"number of teeth", known(float64(g.Teeth), 5), 5, 1000, ""},
		validity{"helix angle", degrees(g.HelixAngle), 0, 45, "°"})
}

// outside1995 also says which size range stands in; that edition has no limits
// of tooth number and helix angle.
func outside1995(g ToothSize) []string {
	var all []string
	for _, s := range []struct {
		name  string
		value float64
		steps sizeSteps
	}{
		{"reference diameter", g.ReferenceDiameter, diameters1995()},
		{"module", g.Module, modules1995()},
		{"face width", known(g.FaceWidth, 4), faceWidths1995()},
	} {
		from, to := s.steps.around(s.value)
		for _, text := range outside("ISO 1328-1:1995", validity{s.name, s.value, s.steps[0], s.steps[len(s.steps)-1], " mm"}) {
			all = append(all, fmt.Sprintf("%s, its range %g to %g mm is used", text, from, to))
		}
	}
	return all
}

// known returns v, or where it is 0, that is not known, a value that is inside.
func known(v, inside float64) float64 {
	if v == 0 {
		return inside
	}
	return v
}

func source2013(clause string) Source {
	return Source{
		Standard: "ISO 1328-1", Edition: "2013", Table: clause,
		How:        "recalled; computed by the formulas from the gear's own sizes",
		Confidence: "medium-high for the pitches, whose formulas check each other; medium for profile, helix and runout",
	}
}

// source1995: 43 values remembered from the tables are the formulas' values, rounded.
func source1995(standard, edition, what string) Source {
	return Source{
		Standard: standard, Edition: edition, Table: what,
		How: "recalled; computed by the formulas", Confidence: "medium-high",
	}
}
