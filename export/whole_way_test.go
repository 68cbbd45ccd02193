package export

import (
	"errors"
	"fmt"
	"maps"
	"math"
	"math/rand/v2"
	"os"
	"runtime"
	"slices"
	"strconv"
	"sync"
	"testing"

	"flankwright/involute"
)

// wayGears is how many random gears go the whole way; FLANKWRIGHT_GEARS says otherwise.
const wayGears = 300

// A journey is one random gear and how it is to be drawn.
type journey struct {
	spec   involute.Spec
	thin   float64 // mm
	fit    FitOptions
	format Format
}

// randomJourney draws a gear as wild as a job file may ask for; many are impossible.
func randomJourney(r *rand.Rand) journey {
	uniform := func(a, b float64) float64 { return a + (b-a)*r.Float64() }
	m := math.Pow(10, uniform(-0.7, 1.3))
	z := int(math.Pow(10, uniform(0.7, 2.1)))
	alpha := []float64{14.5, 17.5, 20, 20, 20, 25, 30}[r.IntN(7)] * involute.Degree
	rack := involute.Rack{PressureAngle: alpha, Addendum: uniform(0.7, 1.1), Dedendum: uniform(0.95, 1.4)}
	rack.TipRadius = max(0, rack.LargestTipRadius()) * []float64{0, 1, r.Float64(), r.Float64()}[r.IntN(4)]
	s := involute.Spec{Teeth: z, Module: m, Shift: uniform(-0.5, 0.8), Rack: rack}
	if r.IntN(4) == 0 {
		s.Helix = uniform(-40, 40) * involute.Degree
	} else if r.IntN(4) == 0 {
		s.Mill.Diameter = m * uniform(0.2, 1.6)
	}
	if r.IntN(2) == 0 {
		s.Thinning = involute.FlanksOnly
	}
	switch r.IntN(5) {
	case 0:
		s.TipChamfer = m * uniform(0.02, 0.3)
	case 1:
		s.TipRound = m * uniform(0.02, 0.4)
	}
	if r.IntN(5) == 0 {
		d, _ := involute.NewGear(s)
		if d != nil {
			s.Relief = involute.ReliefSpec{Amount: m * uniform(0.002, 0.02), Start: d.TipDiameter() - m*uniform(0.3, 1.2), Parabolic: r.IntN(2) == 0}
		}
	}
	s.Topped = s.Mill.Diameter == 0 && r.IntN(6) == 0
	j := journey{spec: s, thin: m * uniform(0, 0.06), format: []Format{FormatDXF, FormatDXFR12, FormatSVG}[r.IntN(3)]}
	j.fit = FitOptions{Tolerance: m * math.Pow(10, uniform(-3.7, -1.9)), Side: []Side{Both, Both, Outside, Inside}[r.IntN(4)], Lines: r.IntN(6) == 0}
	if r.IntN(6) == 0 {
		j.fit.MinArc = m * uniform(0.01, 0.3)
	}
	if r.IntN(6) == 0 {
		j.fit.MaxSweep = uniform(5, 90) * involute.Degree
	}
	return j
}

// A tally is what became of all of them.
type tally struct {
	gears, refused, drawn, pinned int
	reasons                       map[involute.Reason]int
	shape, pins, brk              float64 // the worst share of the tolerance, of a pin's allowance, and break, degrees
}

// add adds what became of others.
func (s *tally) add(o tally) {
	s.gears, s.refused, s.drawn, s.pinned = s.gears+o.gears, s.refused+o.refused, s.drawn+o.drawn, s.pinned+o.pinned
	s.shape, s.pins, s.brk = max(s.shape, o.shape), max(s.pins, o.pins), max(s.brk, o.brk)
	for r, n := range o.reasons {
		s.reasons[r] += n
	}
}

// Twenty thousand (here three hundred) random gears go the whole way: tooth,
// outline, arcs, file, read back, measured. Each is refused with a reason or gives
// a closed, simple contour within its tolerance, whose pins read what the closed
// formula says, to what the tolerance itself can do: each flank off by ε moves a
// pin's center by ε/sin α_K.
func TestRandomGearsGoTheWholeWay(t *testing.T) {
	n := wayGears
	if s := os.Getenv("FLANKWRIGHT_GEARS"); s != "" {
		var err error
		if n, err = strconv.Atoi(s); err != nil {
			t.Fatal(err)
		}
	}
	sum := tally{reasons: map[involute.Reason]int{}}
	var mu sync.Mutex
	var wg sync.WaitGroup
	workers := runtime.GOMAXPROCS(0)
	for k := range workers {
		wg.Go(func() {
			for i := k; i < n; i += workers {
				j := randomJourney(rand.New(rand.NewPCG(7, uint64(i))))
				one := tally{reasons: map[involute.Reason]int{}}
				err := j.travel(&one)
				mu.Lock()
				sum.add(one)
				mu.Unlock()
				if err != nil {
					t.Errorf("gear %d, %+v: %v", i, j, err)
				}
			}
		})
	}
	wg.Wait()
	t.Logf("%d gears: %d refused, %d drawn, %d of them measured over pins; worst shape %.4f of the tolerance, worst pin %.3f of its allowance, largest break %.4f°",
		sum.gears, sum.refused, sum.drawn, sum.pinned, sum.shape, sum.pins, sum.brk)
	for _, r := range slices.Sorted(maps.Keys(sum.reasons)) {
		t.Logf("  reason %d: %d", r, sum.reasons[r])
	}
	if sum.drawn < n/4 || sum.pinned < n/8 || sum.refused < n/20 {
		t.Errorf("too few of a kind: %+v", sum)
	}
}

// A tolerance as coarse as the tooth itself still gives a closed, simple contour
// within it: random gears of few teeth, and one on which a number of the fit moved
// nothing that is measured.
func TestCoarseTolerancesGoTheWholeWay(t *testing.T) {
	still := journey{
		spec: involute.Spec{
			Teeth: 5, Module: 2.215724419577992, Shift: 0.2923265359577384, Thinning: involute.FlanksOnly, Mill: involute.MillSpec{Diameter: 2.602312873081933},
			Rack: involute.Rack{PressureAngle: 20 * involute.Degree, Addendum: 0.9628610796055506, Dedendum: 1.3253491732983407, TipRadius: 0.19340001460643902},
		},
		thin: 0.12670525669556204, fit: FitOptions{Tolerance: 1.2382355294399223, Side: Outside}, format: FormatDXF,
	}
	journeys := []journey{still}
	for i := range 200 {
		r := rand.New(rand.NewPCG(17, uint64(i)))
		j := randomJourney(r)
		j.spec.Teeth = 5 + r.IntN(20)
		j.fit.Tolerance = j.spec.Module * math.Pow(10, -0.6+0.9*r.Float64())
		journeys = append(journeys, j)
	}
	sum := tally{reasons: map[involute.Reason]int{}}
	for i, j := range journeys {
		if err := j.travel(&sum); err != nil {
			t.Errorf("gear %d, %+v: %v", i, j, err)
		}
	}
	impossible := 0
	for _, n := range sum.reasons {
		impossible += n
	}
	if sum.refused != impossible || sum.drawn < 100 {
		t.Errorf("%d of %d possible gears refused: %+v", sum.refused-impossible, len(journeys)-impossible, sum)
	}
}

// travel takes one gear the whole way.
func (j journey) travel(sum *tally) error {
	sum.gears++
	g, err := involute.NewGear(j.spec)
	var tooth involute.Tooth
	if err == nil {
		tooth, err = g.Tooth(g.NominalThickness() - j.thin)
	}
	if err != nil {
		var why *involute.Impossible
		if !errors.As(err, &why) {
			return fmt.Errorf("refused without a reason: %w", err)
		}
		sum.refused++
		sum.reasons[why.Reason]++
		return nil
	}
	sum.drawn++
	o, report, err := NewContour(ContourSpec{Tooth: tooth, Fit: j.fit})
	var thin *CrossingError
	if errors.As(err, &thin) {
		sum.drawn--
		sum.refused++ // a tooth undercut to less than the tolerance
		return nil
	}
	if err != nil {
		return err
	}
	data, err := j.format.Encode(o)
	if err != nil {
		return err
	}
	back, err := j.format.Decode(data)
	if err != nil {
		return err
	}
	path, err := back.Cut()
	if err != nil {
		return err
	}
	lead, _ := g.Lead()
	section, err := NewSection(path, lead)
	if err != nil || section.Teeth() != g.Teeth() {
		return fmt.Errorf("%d teeth counted, %w", section.Teeth(), err)
	}
	if err := j.judge(sum, tooth, path, section, report); err != nil {
		return err
	}
	return j.pinned(sum, tooth, section, report)
}

// judge checks the shape that was read back.
func (j journey) judge(sum *tally, tooth involute.Tooth, path Path, section Section, report FitReport) error {
	const rounding = 2e-9 // mm: twelve decimals in an inch or a mm file, and the search for the nearest point
	if err := path.Simple(); err != nil {
		return err
	}
	least, most := section.Deviation(tooth)
	low, high := -j.fit.Tolerance, j.fit.Tolerance
	switch j.fit.Side {
	case Outside:
		low = 0
	case Inside:
		high = 0
	}
	if least < low-rounding || most > high+rounding {
		return fmt.Errorf("read back from %g to %g mm off the exact shape, allowed %g to %g", least, most, low, high)
	}
	if report.MaxDeviation > j.fit.Tolerance || max(most, -least) > report.MaxDeviation+rounding {
		return fmt.Errorf("certified %g, allowed %g, found %g", report.MaxDeviation, j.fit.Tolerance, max(most, -least))
	}
	sum.shape = max(sum.shape, max(most, -least)/j.fit.Tolerance)
	if !j.fit.Lines {
		if report.MaxTangentBreakDeg > 0.01 {
			return fmt.Errorf("a break of %.4f°", report.MaxTangentBreakDeg)
		}
		sum.brk = max(sum.brk, report.MaxTangentBreakDeg)
	}
	return nil
}

// pinned measures over a pin that touches in the middle of the flank.
func (j journey) pinned(sum *tally, tooth involute.Tooth, section Section, report FitReport) error {
	pin, err := tooth.PinTouchingAt((tooth.FormDiameter() + tooth.InvoluteEndDiameter()) / 2)
	if err != nil || pin <= 0 {
		return nil
	}
	seat, err := tooth.Seat(pin)
	if err != nil || tooth.PinRootClearance(seat) < 2*report.MaxDeviation || tooth.Teeth() < 3 {
		return nil
	}
	reading, err := tooth.Reading(involute.TwoPins, seat.CenterDiameter, pin, 0)
	if err != nil {
		return nil
	}
	least, most, err := section.OverPins(pin)
	if err != nil {
		return err
	}
	_, byPin := tooth.PinSensitivity(involute.TwoPins, seat)
	allowed := 2*report.MaxDeviation*byPin + 1e-6
	off := max(math.Abs(least-reading.Value), math.Abs(most-reading.Value))
	if off > allowed {
		return fmt.Errorf("reads %g to %g over a pin of %g, the formula %g; the fit allows %g", least, most, pin, reading.Value, allowed)
	}
	sum.pinned++
	sum.pins = max(sum.pins, off/allowed)
	return nil
}
