package inspect

import (
	"math"

	"flankwright/involute"
)

// Deviations are how far a gear's teeth may be from true, mm; 0 where not known.
// They are what an accuracy class allows (ISO 1328-1), or what was measured.
type Deviations struct {
	Runout   float64 // F_r, total: the teeth run out of true by half of it to either side
	Measured bool    // the runout is this gear's own, not the most that is allowed
	Pitch    float64 // f_pt, plus and minus, transverse on the reference circle
	Profile  float64 // F_α, total width of the band, along the transverse line of action
	Helix    float64 // F_β, total width of the band, along the transverse line of action
}

// A Climate is the heat and the water that a mesh runs in.
type Climate struct {
	Temperature Limits     // °C
	Expansion   [2]float64 // of the gears, 1/K
	Housing     float64    // expansion of what holds the centers apart, 1/K
	Swell       [2]Limits  // of the gears, linear, as a share of the size when made
}

// ReferenceTemperature is that at which drawings hold, °C (ISO 1).
const ReferenceTemperature = 20

// Steady reports whether the temperature always is the reference temperature.
func (c Climate) Steady() bool {
	return c.Temperature == Limits{ReferenceTemperature, ReferenceTemperature}
}

// growth returns the growth at a temperature and a state of swelling.
func (c Climate) growth(t, swell1, swell2 float64) involute.Growth {
	dt := t - ReferenceTemperature
	return involute.Growth{First: 1 + c.Expansion[0]*dt + swell1, Second: 1 + c.Expansion[1]*dt + swell2, Housing: 1 + c.Housing*dt}
}

// growths returns the corners of a climate: hot and cold, dry and swollen. Backlash
// goes up or down steadily with each, so its extremes are at corners.
func (c *Climate) growths() []involute.Growth {
	if c == nil {
		return []involute.Growth{involute.NoGrowth()}
	}
	var out []involute.Growth
	for _, t := range c.Temperature.ends() {
		for _, w1 := range c.Swell[0].ends() {
			for _, w2 := range c.Swell[1].ends() {
				out = append(out, c.growth(t, w1, w2))
			}
		}
	}
	return out
}

// ends returns the two ends of the range, or the one value that it is.
func (l Limits) ends() []float64 {
	if l.Min == l.Max {
		return []float64{l.Min}
	}
	return []float64{l.Min, l.Max}
}

// ServiceCenter returns the least center distance that a pair meets in its climate, as
// against the size of its gears: what decides how many teeth touch at once at most. With
// the sign of the formulas, mm.
func (m PlanMesh) ServiceCenter() float64 {
	tight := m.Tightest() - (m.Deviations[0].Runout+m.Deviations[1].Runout)/2
	least := tight
	for _, g := range m.Climate.growths() {
		least = min(least, tight*g.Housing*2/(g.First+g.Second))
	}
	return least
}

// AtTemperature returns the mesh at one temperature, °C, swollen or not.
func (m PlanMesh) AtTemperature(t float64) PlanMesh {
	if m.Climate != nil {
		c := *m.Climate
		c.Temperature = Limits{t, t}
		m.Climate = &c
	}
	return m
}

// A Cause is what takes backlash away or adds to it.
type Cause int

// The causes, in the order of a budget.
const (
	OfCenter  Cause = iota // the tolerance of the center distance
	OfRunout               // a gear's teeth run out of true
	OfPitch                // a gear's single pitch deviations
	OfProfile              // a gear's profile deviations
	OfHelix                // a gear's helix deviations
	OfClimate              // heat and swelling
	OfTeeth                // the tolerance of a gear's tooth thickness
)

// A Contribution is what one cause does to the backlash of a mesh, circumferential, mm.
type Contribution struct {
	Cause   Cause
	Gear    int     // of the mesh: 0 the first, 1 the second, -1 both
	Takes   float64 // from the least backlash, at worst
	Adds    float64 // to the greatest
	Certain bool    // every pair meets it in full, so it is not offset by others: heat, a measured runout
}

// A Budget says where the backlash of a mesh goes: from what it is with
// everything in its middle to the least and the greatest.
type Budget struct {
	Middle float64 // middle center, middle thickness, true teeth, reference temperature
	Rows   []Contribution
}

// Worst returns the least and the greatest backlash where everything comes
// together at its worst: the rows are added up.
func (b Budget) Worst() Limits {
	l := Limits{b.Middle, b.Middle}
	for _, r := range b.Rows {
		l.Min, l.Max = l.Min-r.Takes, l.Max+r.Adds
	}
	return l
}

// Statistical returns what to expect of nearly all pairs: what is certain is
// added up, and so are the means of the rest; of their spreads, three standard
// deviations each, the root of the sum of squares is taken. If the sum were normal,
// 99.73 % of pairs would lie between.
func (b Budget) Statistical() Limits {
	takes, adds := b.rss()
	l := Limits{b.Middle - takes, b.Middle + adds}
	for _, r := range b.Rows {
		mean, _ := r.Spread()
		l.Min, l.Max = l.Min-mean*r.Takes, l.Max+mean*r.Adds
	}
	return l
}

// Spread returns how a contribution is spread over pairs, as shares of what it is at
// worst: its mean, and three standard deviations about it. Tolerances of center and
// teeth lie normally about their middles with their limits at three standard
// deviations. Eccentricities lie normally in the plane, other deviations normally about
// zero, and a pair that turns meets them in full on either side: what counts is
// their size, which has a mean. Cut off at their limits, three standard deviations,
// these are √(2/π)(1 − e^(−9/2))/erf(3/√2)/3 of a band and
// (√(π/2) erf(3/√2) − 3 e^(−9/2))/(1 − e^(−9/2))/3 of an eccentricity, whose spread is
// what is left of its limit.
func (r Contribution) Spread() (mean, three float64) {
	cut, normal := 1-math.Exp(-4.5), math.Erf(3/math.Sqrt2)
	switch {
	case r.Certain:
		return 1, 0
	case r.Cause == OfRunout:
		mean = (math.Sqrt(math.Pi/2)*normal - 3*math.Exp(-4.5)) / cut / 3
		return mean, 1 - mean
	case r.Cause == OfPitch || r.Cause == OfProfile || r.Cause == OfHelix:
		mean = math.Sqrt(2/math.Pi) * cut / normal // of standard deviations
		square := 1 - 6*math.Exp(-4.5)/math.Sqrt(2*math.Pi)/normal
		return mean / 3, math.Sqrt(square - mean*mean)
	}
	return 0, 1
}

// MiddleWarm returns the backlash with everything in its middle but the climate,
// which counts in full; it is of use where that has one temperature.
func (b Budget) MiddleWarm() float64 {
	j := b.Middle
	for _, r := range b.Rows {
		if r.Cause == OfClimate {
			j += (r.Adds - r.Takes) / 2
		}
	}
	return j
}

// rss returns the roots of the sums of squares of the spreads.
func (b Budget) rss() (takes, adds float64) {
	for _, r := range b.Rows {
		_, three := r.Spread()
		takes, adds = math.Hypot(takes, three*r.Takes), math.Hypot(adds, three*r.Adds)
	}
	return takes, adds
}

// StatisticalShare returns a row's share in the statistical totals, so that the
// shares add up to them: its mean, and the square of its spread over the root of the
// sum of squares.
func (b Budget) StatisticalShare(r Contribution) (takes, adds float64) {
	mean, three := r.Spread()
	share := func(x, root float64) float64 {
		if root == 0 {
			return mean * x
		}
		return mean*x + three*x/root*three*x
	}
	allTakes, allAdds := b.rss()
	return share(r.Takes, allTakes), share(r.Adds, allAdds)
}

// A Method says how a budget adds up.
type Method int

// The methods.
const (
	WorstCase Method = iota
	Statistical
)

// By returns the least and the greatest backlash by a method.
func (b Budget) By(m Method) Limits {
	if m == Statistical {
		return b.Statistical()
	}
	return b.Worst()
}

// A Moment is a mesh at one moment: where everything that varies stands.
type Moment struct {
	Center    float64    // of the drawing, with the sign of the formulas, mm
	Thickness [2]float64 // normal, mm
	Proud     float64    // by how much the flanks that face each other stand proud of true, along the line of action, mm
	Growth    involute.Growth
}

// backlash returns j_wt at a moment: of the two ways in which unlike base pitches
// can meet the one that is asked for.
func (m PlanMesh) backlash(x Moment, least bool) (float64, error) {
	low, high, err := m.Mesh.CircumferentialBacklash(x.Center, x.Thickness[0], x.Thickness[1], x.Growth, involute.MorePitches(m.ContactRatio))
	if err != nil {
		return 0, err
	}
	alpha, err := m.Mesh.GrownPressureAngle(x.Center, x.Growth)
	j := high
	if least {
		j = low
	}
	return j - x.Proud/math.Cos(alpha), err
}

// A step moves a moment to the worst of one cause.
type step struct {
	cause   Cause
	gear    int
	certain bool
	apply   func(x *Moment)
}

// steps lists what leads from the middle to the least backlash (or the
// greatest): the center distance moves by its tolerance, and by half of each runout
// in a turn; flanks stand proud by the deviations. A flank lies at most half a
// band from its mean, two flanks make one band; in the helix the proudest spot of
// the face touches, so that it takes backlash and never adds. A pitch deviation
// counts once a gear, as f_pb = f_pt cos α_t along the line of action (as in
// ISO/TR 10064-2:1996, annex A).
func (m PlanMesh) steps(thick [2]Limits, least bool, g involute.Growth) []step {
	sign, center := 1.0, m.Loosest()
	if least {
		sign, center = -1, m.Tightest()
	}
	list := []step{{OfCenter, -1, false, func(x *Moment) { x.Center = center }}}
	each := func(c Cause, pick func(d Deviations) float64, certain bool, apply func(x *Moment, v float64)) {
		for i, d := range m.Deviations {
			if v := pick(d); v > 0 {
				list = append(list, step{c, i, certain && d.Measured, func(x *Moment) { apply(x, v) }})
			}
		}
	}
	proud := func(x *Moment, v float64) { x.Proud -= sign * v }
	each(OfRunout, func(d Deviations) float64 { return d.Runout }, true, func(x *Moment, v float64) { x.Center += sign * v / 2 })
	each(OfPitch, func(d Deviations) float64 { return d.Pitch * math.Cos(m.Mesh.First.TransversePressureAngle()) }, false, proud)
	each(OfProfile, func(d Deviations) float64 { return d.Profile }, false, proud)
	each(OfHelix, func(d Deviations) float64 { return d.Helix }, false, func(x *Moment, v float64) {
		if least {
			proud(x, v)
		}
	})
	if m.Climate != nil {
		list = append(list, step{OfClimate, -1, true, func(x *Moment) { x.Growth = g }})
	}
	for i, l := range thick {
		s := l.Min
		if least {
			s = l.Max
		}
		list = append(list, step{OfTeeth, i, false, func(x *Moment) { x.Thickness[i] = s }})
	}
	return list
}

// middle returns the moment with everything in its middle.
func (m PlanMesh) middle(thick [2]Limits) Moment {
	return Moment{Center: m.Nominal(), Thickness: [2]float64{thick[0].Middle(), thick[1].Middle()}, Growth: involute.NoGrowth()}
}

// worst returns the moment of the least (or the greatest) backlash in a growth.
func (m PlanMesh) worst(thick [2]Limits, least bool, g involute.Growth) Moment {
	x := m.middle(thick)
	for _, s := range m.steps(thick, least, g) {
		s.apply(&x)
	}
	return x
}

// worstGrowth returns the growth in which the backlash is the least (or the greatest).
func (m PlanMesh) worstGrowth(thick [2]Limits, least bool) (involute.Growth, error) {
	var best involute.Growth
	extreme := math.Inf(1)
	for _, g := range m.Climate.growths() {
		j, err := m.backlash(m.worst(thick, least, g), least)
		if err != nil {
			return g, err
		}
		if !least {
			j = -j
		}
		if j < extreme {
			best, extreme = g, j
		}
	}
	return best, nil
}

// Budget returns the budget of the mesh for the thickness limits of its gears,
// mm: causes are brought in one after the other, each with what it changes, so that
// the rows add up exactly. The involute's curvature makes what one cause takes
// depend a little, some hundredths of it, on those before it.
func (m PlanMesh) Budget(first, second Limits) (Budget, error) {
	takes, err := m.Stations(first, second, true)
	if err != nil {
		return Budget{}, err
	}
	adds, err := m.Stations(first, second, false)
	if err != nil {
		return Budget{}, err
	}
	b := Budget{Middle: takes[0].Backlash}
	for i := 1; i < len(takes); i++ {
		row := takes[i].Contribution
		row.Takes, row.Adds = takes[i-1].Backlash-takes[i].Backlash, adds[i].Backlash-adds[i-1].Backlash
		b.Rows = append(b.Rows, row)
	}
	return b, nil
}

// A Station is a stop on the way from the middle of everything to the least or
// the greatest backlash: the cause that was brought in last, and what is left.
type Station struct {
	Contribution // Takes and Adds are not set
	Moment
	Backlash float64 // circumferential, mm
}

// Stations returns the way from the middle, which is the first station, to the
// least or the greatest backlash.
func (m PlanMesh) Stations(first, second Limits, least bool) ([]Station, error) {
	thick := [2]Limits{first, second}
	g, err := m.worstGrowth(thick, least)
	if err != nil {
		return nil, err
	}
	x := m.middle(thick)
	j, err := m.backlash(x, least)
	list := []Station{{Moment: x, Backlash: j}}
	for _, s := range m.steps(thick, least, g) {
		if err != nil {
			return nil, err
		}
		s.apply(&x)
		j, err = m.backlash(x, least)
		list = append(list, Station{Contribution{Cause: s.cause, Gear: s.gear, Certain: s.certain}, x, j})
	}
	return list, err
}
