package inspect

import (
	"math"
	"math/rand/v2"
	"slices"

	"gonum.org/v1/gonum/stat"

	"flankwright/involute"
)

// A Simulation is what came out of many pairs drawn at random.
type Simulation struct {
	Pairs int
	Seed  uint64
	Bind  float64 // share of pairs that bind somewhere in a turn, hot or cold
	Short float64 // share of pairs whose backlash falls below the least asked for somewhere
	Over  float64 // share of pairs whose backlash exceeds the greatest allowed somewhere
	Mean  float64 // of the middle of each pair, circumferential, mm
	// Nearly holds the least backlash that only 0.135 % of pairs fall below, and the
	// greatest that only as many exceed, mm: three standard deviations, if it were normal.
	Nearly Limits
}

// Shares of pairs beyond three standard deviations of a normal distribution, to one side.
const beyond3Sigma = 0.00135

// Simulate draws pairs at random (Monte Carlo) and counts those that bind, and
// those whose backlash leaves the limits (mm, circumferential; ±Inf for none). What is
// assumed of the shop: center distance and thicknesses lie normally about their
// middles, their limits at three standard deviations, and nothing beyond is let
// through; eccentricities lie normally in the plane, other deviations normally
// about zero, none beyond what is allowed; a measured runout is what it is. Each
// pair is turned until all its deviations have come together, and taken to
// every corner of the climate.
func (m PlanMesh) Simulate(first, second, limits Limits, pairs int, seed uint64) (Simulation, error) {
	out := Simulation{Pairs: pairs, Seed: seed}
	rng := rand.New(rand.NewPCG(seed, 0))
	growths := m.Climate.growths()
	var lows, highs, middles []float64
	for range pairs {
		pair := m.draw(rng, [2]Limits{first, second})
		low, high, err := m.extremes(pair, growths)
		if err != nil {
			return out, err
		}
		middle, err := m.backlash(Moment{Center: pair.a, Thickness: pair.s, Growth: involute.NoGrowth()}, true)
		if err != nil {
			return out, err
		}
		if low < 0 {
			out.Bind++
		}
		if low < limits.Min {
			out.Short++
		}
		if high > limits.Max {
			out.Over++
		}
		lows, highs, middles = append(lows, low), append(highs, high), append(middles, middle)
	}
	out.Bind, out.Short, out.Over = out.Bind/float64(pairs), out.Short/float64(pairs), out.Over/float64(pairs)
	slices.Sort(lows)
	slices.Sort(highs)
	out.Nearly = Limits{stat.Quantile(beyond3Sigma, stat.Empirical, lows, nil), stat.Quantile(1-beyond3Sigma, stat.Empirical, highs, nil)}
	out.Mean = stat.Mean(middles, nil)
	return out, nil
}

// A drawn pair: its center distance, thicknesses, and what its deviations come to.
type drawn struct {
	a     float64
	s     [2]float64
	ecc   float64 // both eccentricities together, mm
	takes float64 // along the line of action, mm
	adds  float64
}

// draw draws one pair.
func (m PlanMesh) draw(rng *rand.Rand, thick [2]Limits) drawn {
	p := drawn{a: within(rng, m.Center)}
	if m.ring() {
		p.a = -p.a
	}
	for i, l := range thick {
		p.s[i] = within(rng, l)
	}
	for _, d := range m.Deviations {
		p.ecc += eccentricity(rng, d)
		flank := cut(rng)*d.Pitch*math.Cos(m.Mesh.First.TransversePressureAngle()) + cut(rng)*d.Profile
		p.adds += flank
		p.takes += flank + cut(rng)*d.Helix
	}
	return p
}

// within draws from a range: normal about its middle, cut off at its ends.
func within(rng *rand.Rand, l Limits) float64 {
	x := cut(rng)
	if rng.IntN(2) == 0 {
		x = -x
	}
	return l.Middle() + x*l.Width()/2
}

// cut draws the size of a normal deviation as a share of three standard ones, none beyond.
func cut(rng *rand.Rand) float64 {
	for {
		if x := math.Abs(rng.NormFloat64()) / 3; x <= 1 {
			return x
		}
	}
}

// eccentricity draws how far a gear's teeth lie off its axis: half of its runout.
func eccentricity(rng *rand.Rand, d Deviations) float64 {
	if d.Measured {
		return d.Runout / 2
	}
	for {
		if e := math.Hypot(rng.NormFloat64(), rng.NormFloat64()) / 3; e <= 1 {
			return e * d.Runout / 2
		}
	}
}

// extremes returns the least and the greatest backlash of a drawn pair in a turn and in every growth.
func (m PlanMesh) extremes(p drawn, growths []involute.Growth) (low, high float64, err error) {
	low, high = math.Inf(1), math.Inf(-1)
	for _, g := range growths {
		least, err := m.backlash(Moment{p.a - p.ecc, p.s, p.takes, g}, true)
		if err != nil {
			return 0, 0, err
		}
		most, err := m.backlash(Moment{p.a + p.ecc, p.s, -p.adds, g}, false)
		if err != nil {
			return 0, 0, err
		}
		low, high = min(low, least), max(high, most)
	}
	return low, high, nil
}
