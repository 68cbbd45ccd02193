package involute

import "math"

// A Growth says how much larger than at the reference temperature the parts of
// a mesh are, as factors: 1 is the size of the drawing. Heat and, for plastics,
// water make parts grow alike in all directions.
type Growth struct{ First, Second, Housing float64 }

// NoGrowth is the growth at the reference temperature.
func NoGrowth() Growth { return Growth{1, 1, 1} }

// CircumferentialBacklash returns j_wt, transverse on the working pitch
// circles, of teeth with normal thicknesses s1 and s2 in a housing with center
// distance a, all mm and of the drawing, after every part has grown:
//
//	j_bt = Σ d_b,i k_i (inv α_wt − s_t,i/d_i − inv α_t) + p_bt,  j_wt = j_bt/cos α_wt
//	cos α_wt = Σ d_b,i k_i/(2 a k_housing)
//
// which without growth is that of Backlash (ISO 21771:2007, clause 5). Gears that
// grow unlike have unlike base pitches: a tooth of the first in a space of the second
// has the second's for p_bt, one of the second the first's, and where n + 1 pairs
// of teeth touch at once their difference may count n times more. Least and most
// bound the backlash in all positions. more is n, see MorePitches.
func (m Mesh) CircumferentialBacklash(a, s1, s2 float64, g Growth, more int) (least, most float64, err error) {
	alpha, err := m.GrownPressureAngle(a, g)
	if err != nil {
		return 0, 0, err
	}
	side := func(gear *Gear, s, k float64) float64 {
		return gear.db * k * (Inv(alpha) - s/math.Cos(gear.spec.Helix)/gear.d - gear.invT)
	}
	free := side(m.First, s1, g.First) + side(m.Second, s2, g.Second)
	p1, p2 := m.First.TransverseBasePitch()*g.First, m.First.TransverseBasePitch()*g.Second
	least, most = free+min(p1, p2)-float64(more)*math.Abs(p1-p2), free+max(p1, p2)
	return least / math.Cos(alpha), most / math.Cos(alpha), nil
}

// MorePitches returns how many times the difference of unlike base pitches may
// count beyond the smaller pitch: as many as pairs of teeth touch on one side while
// another touches on the other, half a pitch away, ⌊ε_γ − 1/2⌋, at least 1; a tenth of
// a pitch is kept back.
func MorePitches(totalContactRatio float64) int {
	return max(1, int(math.Floor(totalContactRatio-0.4)))
}

// GrownPressureAngle returns α_wt of the grown parts at the drawing's center
// distance a: cos α_wt = Σ d_b,i k_i/(2 a k_housing), radians.
func (m Mesh) GrownPressureAngle(a float64, g Growth) (float64, error) {
	db := m.First.db*g.First + m.Second.db*g.Second
	center := 2 * a * g.Housing
	if c := db / center; !(c > 0 && c < 1) {
		return 0, impossible(CenterTooSmall, math.Abs(center/2), math.Abs(db/2))
	}
	return math.Atan(tanOfCos(db, center)), nil
}
