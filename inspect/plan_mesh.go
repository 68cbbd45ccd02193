package inspect

import "flankwright/involute"

// Share says which gear of a mesh takes the thinning.
type Share int

// The shares.
const (
	ShareEqual   Share = iota // half each
	ShareFirst                // the first gear takes all
	ShareSecond               // the second gear takes all
	ShareByTeeth              // in proportion to the numbers of teeth, so that small pinions keep their strength
)

// A PlanMesh is a mesh whose backlash may decide thicknesses.
type PlanMesh struct {
	First, Second int // indices of the gears
	Mesh          involute.Mesh
	Center        Limits  // |a|, mm
	Backlash      *Limits // circumferential, on the working pitch circle, mm; nil for no wish
	LeastOnly     bool    // Backlash.Min alone is asked for; the greatest follows from the gears' tolerances
	Share         Share
	Deviations    [2]Deviations // of the gears
	Climate       *Climate      // nil: always at the reference temperature
	ContactRatio  float64       // ε_γ, of transverse section and helix; for gears that grow unlike
	Method        Method        // by which the wish is to be held
}

// gears returns the indices of the two gears.
func (m PlanMesh) gears() [2]int { return [2]int{m.First, m.Second} }

// Tightest returns the center distance with the least backlash: the smaller, or
// with a ring the larger; with the sign of the formulas.
func (m PlanMesh) Tightest() float64 {
	if m.ring() {
		return -m.Center.Max
	}
	return m.Center.Min
}

// Loosest returns the center distance with the greatest backlash.
func (m PlanMesh) Loosest() float64 {
	if m.ring() {
		return -m.Center.Min
	}
	return m.Center.Max
}

// Nominal returns the middle of the center distance, with the sign of the formulas.
func (m PlanMesh) Nominal() float64 {
	if m.ring() {
		return -m.Center.Middle()
	}
	return m.Center.Middle()
}

func (m PlanMesh) ring() bool { return m.Mesh.LeastCenter() < 0 }

// BacklashRange returns the least backlash (thickest teeth, tightest center)
// and the greatest (thinnest, loosest), each on that center's own pitch circles:
// geometry alone, before deviations and climate.
func (m PlanMesh) BacklashRange(first, second Limits) (least, most involute.Play, err error) {
	least, err = m.Mesh.Backlash(m.Tightest(), first.Max, second.Max)
	if err != nil {
		return
	}
	most, err = m.Mesh.Backlash(m.Loosest(), first.Min, second.Min)
	return
}
