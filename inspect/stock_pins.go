package inspect

import (
	"cmp"
	"iter"
	"math"
	"slices"

	"flankwright/involute"
)

// A PinTake is pins of the stock, a way to measure with them, and what reads it.
type PinTake struct {
	Size   PinSize
	Pick   Pick
	Way    involute.PinWay
	Bore   float64 // of the bore or arbor measured to, mm
	Target Target  // usable, with the diameter that counts
	Gauge  *Gauge  // nil where none of the stock covers the reading
	Effect Limits  // what the pins' classes can do to the reading, mm
}

// Complete reports whether nothing is missing. One pin to the axis is read between
// centers with an indicator, which no stock lists.
func (t PinTake) Complete() bool { return t.Gauge != nil || t.Way == involute.PinToAxis }

// A PassReason says why the size nearest to the ideal was passed over.
type PassReason int

// The reasons.
const (
	TooFew    PassReason = iota // fewer than the measurement takes
	Unfit                       // it cannot be used: see Faults
	OffGauges                   // no micrometer covers its reading
)

// A Passed is the size nearest to the ideal, where another was chosen or none.
type Passed struct {
	Size   PinSize
	Reason PassReason
	Faults []Fault
}

// A PinChoice is the answer to what to take over pins.
type PinChoice struct {
	Ideal  float64   // mm; 0 where no pin does
	Takes  []PinTake // the best first; two at most; empty where nothing is usable
	Passed *Passed
}

const (
	// takes is how many sizes a choice names.
	takes = 2
	// tries is how many sizes near the ideal are measured with, in each way: of a set
	// in steps of 0.01 mm those within 1 mm.
	tries = 200
)

// ChoosePins picks pins for a spur gear, or balls for any gear, and what reads
// them. Over two pins is taken before one pin, a reading that a micrometer covers
// before one that a caliper or nothing does, and among equals the size nearest to
// the ideal. Spur gears take pins or balls, helical ones balls.
func (s Stock) ChoosePins(q Subject) PinChoice {
	ideal, ok := IdealPin(q.Gear, q.Thickness)
	if !ok {
		return PinChoice{}
	}
	out := PinChoice{Ideal: ideal}
	sizes := s.sizesNear(q, ideal)
	if out.Takes = s.overTwo(q, sizes, ideal); len(out.Takes) == 0 {
		out.Takes = s.withOne(q, sizes)
	}
	if len(sizes) > 0 && (len(out.Takes) == 0 || !out.Takes[0].Size.is(sizes[0])) {
		out.Passed = s.passed(q, sizes[0], out.Takes)
	}
	return out
}

// is reports whether two are the same size and kind.
func (z PinSize) is(other PinSize) bool { return z.Ball == other.Ball && z.Nominal == other.Nominal }

// sizesNear returns the sizes that can be meant for a gear, nearest to the ideal
// first. No pin of twice the ideal size, or of none, touches the flanks.
func (s Stock) sizesNear(q Subject, ideal float64) []PinSize {
	sizes := s.Sizes(true)
	if !q.Gear.Helical() {
		sizes = append(s.Sizes(false), sizes...)
	}
	far := func(z PinSize) float64 { return math.Abs(z.Nominal - ideal) }
	sizes = slices.DeleteFunc(sizes, func(z PinSize) bool { return far(z) > ideal })
	slices.SortStableFunc(sizes, func(a, b PinSize) int { return cmp.Compare(far(a), far(b)) })
	return sizes
}

// overTwo returns the best takes over two pins.
func (s Stock) overTwo(q Subject, sizes []PinSize, ideal float64) []PinTake {
	var all []PinTake
	full := 0
	for t := range s.inWay(q, sizes, involute.TwoPins, 0) {
		t.Gauge = s.bestGauge(t.Target.Value, nil)
		all = append(all, t)
		if t.rank() == 0 {
			full++
		}
		if full == takes {
			break
		}
	}
	slices.SortStableFunc(all, func(a, b PinTake) int { return cmp.Compare(a.rank(), b.rank()) })
	if len(all) > 1 && math.Abs(all[1].Size.Nominal-ideal) > farPin*ideal {
		return all[:1]
	}
	return all[:min(takes, len(all))]
}

// farPin is how far a pin may be from the ideal and still be offered beside a
// better one, as a share: farther ones touch near tip or root.
const farPin = 1.0 / 3

// rank orders takes by what reads them.
func (t PinTake) rank() int {
	switch {
	case t.Gauge == nil:
		return 2
	case t.Gauge.Caliper:
		return 1
	}
	return 0
}

// withOne returns the best take with one pin: to the far side of an arbor, which
// any instrument spans; or of the bore, whose wall the points of a caliper's jaws
// find and a flat anvil does not (common practice), where the caliper is fine enough
// for the limits; or to the axis.
func (s Stock) withOne(q Subject, sizes []PinSize) []PinTake {
	for _, way := range []struct {
		way     involute.PinWay
		bore    float64
		there   bool
		refused func(Gauge, Limits) bool
	}{
		{involute.PinToFarSide, q.Arbor, q.Arbor > 0, func(Gauge, Limits) bool { return false }},
		{involute.PinToFarSide, q.Bore, q.Bore > 0 && q.Arbor == 0, notInBore},
		{involute.PinToAxis, 0, true, nil},
	} {
		if !way.there {
			continue
		}
		for t := range s.inWay(q, sizes, way.way, way.bore) {
			if way.way != involute.PinToAxis {
				t.Gauge = s.bestGauge(t.Target.Value, func(g Gauge) bool { return way.refused(g, t.Target.Value) })
			}
			if t.Complete() {
				return []PinTake{t}
			}
		}
	}
	return nil
}

// notInBore refuses what cannot measure to the wall of a bore, or not to the limits.
func notInBore(g Gauge, reading Limits) bool {
	share, ok := ToleranceShare(reading, g.Uncertainty, 0)
	return !g.Caliper || ok && share >= 1
}

// inWay goes through the usable takes with sizes that there are enough of, in order.
func (s Stock) inWay(q Subject, sizes []PinSize, way involute.PinWay, bore float64) iter.Seq[PinTake] {
	return func(yield func(PinTake) bool) {
		tried := 0
		for _, z := range sizes {
			t, ok := s.take(q, z, way, bore)
			if !ok {
				continue
			}
			if tried++; tried > tries || t.Target.Usable() && !yield(t) {
				return
			}
		}
	}
}

// take measures with a size in one way; false where there are too few.
func (s Stock) take(q Subject, z PinSize, way involute.PinWay, bore float64) (PinTake, bool) {
	pick, ok := z.Pick(way)
	if !ok {
		return PinTake{}, false
	}
	m := OverPins{Pin: pick.Diameter, Way: way, Bore: bore}
	t := PinTake{Size: z, Pick: pick, Way: way, Bore: bore, Target: NewTarget(q.Gear, m, q.Thickness, q.Part)}
	t.Effect = pinEffect(q, m, pick.Off)
	return t, true
}

// pinEffect returns what pins larger by off do to a reading, at the middle thickness, mm.
func pinEffect(q Subject, m OverPins, off Limits) Limits {
	tooth, err := q.Gear.Tooth(q.Thickness.Middle())
	if err != nil {
		return Limits{}
	}
	seat, err := tooth.Seat(m.Pin)
	if err != nil {
		return Limits{}
	}
	_, by := q.Gear.PinSensitivity(m.Way, seat)
	return Limits{by * off.Min, by * off.Max}
}

// passed says why a size was not taken.
func (s Stock) passed(q Subject, z PinSize, taken []PinTake) *Passed {
	way, bore := involute.TwoPins, 0.0
	if len(taken) > 0 {
		way, bore = taken[0].Way, taken[0].Bore
	}
	t, ok := s.take(q, z, way, bore)
	switch {
	case !ok:
		return &Passed{Size: z, Reason: TooFew}
	case !t.Target.Usable():
		return &Passed{Size: z, Reason: Unfit, Faults: t.Target.Faults}
	}
	return &Passed{Size: z, Reason: OffGauges}
}
