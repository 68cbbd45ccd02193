package inspect

import (
	"cmp"
	"math"
	"slices"

	"flankwright/involute"
)

// A Stock is what is on hand to measure gears with. What to take from it is
// chosen by ChoosePins, ForSpan and ForChord.
type Stock struct {
	Pins          []Pin
	Gauges        []Gauge
	ToothCalipers []ToothCaliper
}

// A Pin is a measuring pin, or a ball, of which there are Count alike.
type Pin struct {
	Ball     bool
	Nominal  float64 // mm
	Diameter float64 // what to compute with: as measured, else nominal, mm
	Measured bool
	// Off is how much larger than Diameter the pin may be by its class, mm: 0 to 0
	// where it is measured; +0.005 to 0, −0.005 to 0 or ± otherwise.
	Off   Limits
	Known bool   // measured or of a class; else Off says nothing
	Label string // its size as the shop calls it, for people: "3.5 mm"
	Class string // of a pin that is not measured, for people
	From  string // where it is, for people
	Count int
}

// SamePin is how near two nominal sizes are one, mm: a fiftieth of the finest step
// of a set, and above what 1/8 in and 3.175 mm differ by.
const SamePin = 5e-5

// A FaceKind is what an instrument puts on the tooth.
type FaceKind int

// The kinds of faces.
const (
	FlatAnvil FaceKind = iota // round, of Diameter; behind it the spindle goes on without end
	DiscAnvil                 // a disc of Diameter, Thickness at the rim, on a spindle of Spindle
	Jaws                      // straight, of Thickness at the tips; 0 for one that is not known
)

// A Face is a measuring face, sizes in mm.
type Face struct {
	Kind                         FaceKind
	Diameter, Thickness, Spindle float64
}

// A Gauge is a micrometer or a caliper.
type Gauge struct {
	Name        string
	Caliper     bool
	Range       Limits  // of readings, mm
	Uncertainty float64 // ±, mm
	By          string  // what Uncertainty comes from, for people
	Face        Face
}

// Covers reports whether readings lie in the gauge's range.
func (g Gauge) Covers(reading Limits) bool {
	return reading.Min >= g.Range.Min-onRange && reading.Max <= g.Range.Max+onRange
}

// onRange takes up rounding at the end of a range, mm.
const onRange = 1e-9

// A ToothCaliper measures chordal thicknesses.
type ToothCaliper struct {
	Name        string
	Modules     Limits  // that it is made for, mm
	Uncertainty float64 // ±, mm
	By          string
}

// GaugeFor returns the gauge with the least uncertainty that covers a reading,
// micrometers before calipers; nil where there is none.
func (s Stock) GaugeFor(reading Limits) *Gauge { return s.bestGauge(reading, nil) }

// GaugeAcross returns the gauge with the least uncertainty that covers a reading and
// whose faces are at least so wide, mm: over three pins one face lies on two.
func (s Stock) GaugeAcross(reading Limits, across float64) *Gauge {
	return s.bestGauge(reading, func(g Gauge) bool { return g.Face.Kind != Jaws && g.Face.Diameter < across })
}

// bestGauge returns the gauge with the least uncertainty that covers a reading and
// is not refused, micrometers before calipers; nil where there is none.
func (s Stock) bestGauge(reading Limits, refused func(Gauge) bool) *Gauge {
	var best *Gauge
	for i, g := range s.Gauges {
		if !g.Covers(reading) || refused != nil && refused(g) {
			continue
		}
		if best == nil || best.Caliper && !g.Caliper || best.Caliper == g.Caliper && g.Uncertainty < best.Uncertainty {
			best = &s.Gauges[i]
		}
	}
	return best
}

// A Subject is the gear that is to be measured.
type Subject struct {
	Gear      *involute.Gear
	Thickness Limits // s_n, mm
	Part      Part
	Bore      float64 // in its middle, mm; 0 for none
	Arbor     float64 // an arbor in the bore to measure to, mm; 0 for none
}

// ForChord returns the gear tooth caliper with the least uncertainty for a
// module, nil where there is none.
func (s Stock) ForChord(module float64) *ToothCaliper {
	var best *ToothCaliper
	for i, c := range s.ToothCalipers {
		fits := module >= c.Modules.Min*(1-onModule) && module <= c.Modules.Max*(1+onModule)
		if fits && (best == nil || c.Uncertainty < best.Uncertainty) {
			best = &s.ToothCalipers[i]
		}
	}
	return best
}

// onModule takes up the rounding of a module that was given as a pitch.
const onModule = 1e-9

// ToleranceShare returns what the instrument's ± and the pins' class take of the
// limits: (2 U + width of the pins' effect)/width of the limits. False for limits
// without width.
func ToleranceShare(limits Limits, uncertainty, pins float64) (float64, bool) {
	w := limits.Width()
	return (2*uncertainty + pins) / w, w > 0
}

// A PinSize is all pins, or all balls, of one nominal size.
type PinSize struct {
	Ball    bool
	Nominal float64 // mm
	Label   string  // for people
	Count   int
	pins    []Pin // up to three, one each, the best known first
}

// most is the largest number of pins that any way to measure takes.
const most = 3

// Sizes returns the sizes of the stock's pins, or of its balls, ascending.
func (s Stock) Sizes(ball bool) []PinSize {
	var pins []Pin
	for _, p := range s.Pins {
		if p.Ball == ball {
			pins = append(pins, p)
		}
	}
	slices.SortStableFunc(pins, func(a, b Pin) int { return cmp.Compare(a.Nominal, b.Nominal) })
	var sizes []PinSize
	for _, p := range pins {
		if n := len(sizes); n == 0 || p.Nominal-sizes[n-1].Nominal > SamePin {
			sizes = append(sizes, PinSize{Ball: ball, Nominal: p.Nominal, Label: p.Label})
		}
		z := &sizes[len(sizes)-1]
		z.Count += p.Count
		for range min(p.Count, most) {
			one := p
			one.Count = 1
			z.pins = append(z.pins, one)
		}
	}
	for i := range sizes {
		slices.SortStableFunc(sizes[i].pins, func(a, b Pin) int { return cmp.Compare(a.doubt(), b.doubt()) })
		sizes[i].pins = sizes[i].pins[:min(most, len(sizes[i].pins))]
	}
	return sizes
}

// doubt orders pins by how well their diameter is known.
func (p Pin) doubt() float64 {
	if !p.Known {
		return math.Inf(1)
	}
	return p.Off.Width()
}

// A Pick is the pins taken for one measurement.
type Pick struct {
	Pins     []Pin   // one each; of three the first goes alone, opposite the others
	Diameter float64 // that counts, mm
	Off      Limits  // how much larger it may be by the pins' classes, mm
	Known    bool    // each is measured or of a class
}

// Pick takes pins for a way to measure, false where there are too few.
//
// Pins of one size are never quite alike. Each sits in its own space and moves its own
// side of the reading, so that to first order the reading is that of pins of the
// mean diameter: of two the half of each, of three the half of the single one
// and a quarter of each of the others. What is left is second order: with pins of
// 3.5 mm that differ by 0.01 two read the same within 0.00001 mm, and three, where
// the anvil tips to touch both neighbors, within 0.0001 mm.
func (z PinSize) Pick(way involute.PinWay) (Pick, bool) {
	weights := pinWeights(way)
	if len(z.pins) < len(weights) {
		return Pick{}, false
	}
	out := Pick{Pins: z.pins[:len(weights)], Known: true}
	for i, w := range weights {
		p := z.pins[i]
		out.Diameter += w * p.Diameter
		out.Off.Min += w * p.Off.Min
		out.Off.Max += w * p.Off.Max
		out.Known = out.Known && p.Known
	}
	if alike(out.Pins) {
		out.Diameter = out.Pins[0].Diameter
	}
	return out, true
}

// PinsFor returns how many pins a way to measure takes.
func PinsFor(way involute.PinWay) int { return len(pinWeights(way)) }

// pinWeights returns how much each pin counts in the mean of a way.
func pinWeights(way involute.PinWay) []float64 {
	switch way {
	case involute.ThreePins:
		return []float64{0.5, 0.25, 0.25}
	case involute.PinToAxis, involute.PinToFarSide:
		return []float64{1}
	}
	return []float64{0.5, 0.5}
}

// Alike reports whether the pins picked have one diameter.
func (p Pick) Alike() bool { return alike(p.Pins) }

func alike(pins []Pin) bool {
	for _, p := range pins {
		if p.Diameter != pins[0].Diameter {
			return false
		}
	}
	return true
}
