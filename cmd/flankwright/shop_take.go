package main

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
)

// A take is a measurement for which everything is in the shop.
type take struct {
	What        string   `json:"what"` // over pins, one pin to …, span, chordal, constant chord
	Kind        string   `json:"kind"` // pins or balls; blank where none are used
	PinNominal  *float64 `json:"pin_nominal_mm"`
	PinDiameter *float64 `json:"pin_diameter_mm"` // that is computed with
	PinEffect   *span    `json:"pin_class_effect_mm"`
	Teeth       *int     `json:"teeth"`      // of a span
	Instrument  *string  `json:"instrument"` // null: between centers, with an indicator
	Uncertainty *float64 `json:"uncertainty_mm"`
	From        string   `json:"uncertainty_from"`
	Share       *float64 `json:"tolerance_share"` // (2 × uncertainty + what the pins' class does)/width of the limits
	Why         string   `json:"why"`
	with        string   // what to take, for people
}

// A missing is a measurement that the shop cannot take, with what it lacks.
type missing struct {
	What string `json:"what"`
	Text string `json:"text"`
}

// subject returns what the choice from a stock needs to know of a gear.
func (g *gear) subject(arbor float64) inspect.Subject {
	q := inspect.Subject{Gear: g.g, Thickness: g.thickness.Limits, Part: g.part(), Arbor: arbor}
	if g.bore != nil {
		q.Bore = g.bore.limits.Middle()
	}
	return q
}

// takeFrom fills in what to take from the shop for one gear.
func (j *job) takeFrom(out *gearTargets, g *gear, a ask, pins inspect.PinChoice) {
	out.Take = []take{}
	q := g.subject(a.arbor)
	if a.pins != nil {
		j.takeAsked(out, g, a)
	} else {
		j.takePins(out, g, a, pins)
	}
	j.takeSpan(out, q, a)
	j.takeChord(out, g, a)
	slices.SortStableFunc(out.Take, func(x, y take) int { return cmp.Compare(valueOf(x.Share), valueOf(y.Share)) })
}

// measuredBy adds an instrument and what it takes of the tolerance.
func (t *take) measuredBy(name, from string, uncertainty float64, limits inspect.Limits) {
	t.Instrument, t.Uncertainty, t.From = &name, &uncertainty, from
	effect := 0.0
	if t.PinEffect != nil {
		effect = t.PinEffect.Max - t.PinEffect.Min
	}
	if share, ok := inspect.ToleranceShare(limits, uncertainty, effect); ok {
		t.Share = &share
	}
}

// takePins takes pins or balls as they were chosen from the shop.
func (j *job) takePins(out *gearTargets, g *gear, a ask, c inspect.PinChoice) {
	if len(c.Takes) == 0 || !c.Takes[0].Complete() {
		out.Missing = append(out.Missing, missing{"over pins", j.missingPins(g, c)})
		return
	}
	p := c.Takes[0]
	t := take{What: wayName(p, a.arbor), Kind: kindOfPins(p.Size.Ball), PinNominal: &p.Size.Nominal, PinDiameter: &p.Pick.Diameter}
	if p.Pick.Known {
		e := toSpan(p.Effect)
		t.PinEffect = &e
	}
	t.with = j.pickText(p.Pick, p.Size, inspect.PinsFor(p.Way))
	if p.Gauge != nil {
		t.measuredBy(p.Gauge.Name, p.Gauge.By, p.Gauge.Uncertainty, p.Target.Value)
	}
	t.Why = j.whyPins(g, c)
	out.Take = append(out.Take, t)
}

// wayName names a way over pins as the JSON of targets does.
func wayName(p inspect.PinTake, arbor float64) string {
	if p.Way == involute.PinToFarSide && arbor > 0 {
		return farSideOfArbor
	}
	for _, w := range otherWays() {
		if w.way == p.Way {
			return w.name
		}
	}
	return "over pins"
}

func kindOfPins(ball bool) string {
	if ball {
		return "balls"
	}
	return "pins"
}

// onlyOne reports whether the shop has a pin (or ball) of a size, and no second one.
func (s *shop) onlyOne(d float64, ball bool) bool {
	for _, z := range s.stock.Sizes(ball) {
		if math.Abs(z.Nominal-d) < inspect.SamePin {
			_, two := z.Pick(involute.TwoPins)
			return !two
		}
	}
	return false
}

// takeAsked takes the first usable of the pins asked for. Their sizes are the user's
// word, be they listed in the shop or not; of one that is listed there must be two.
func (j *job) takeAsked(out *gearTargets, g *gear, a ask) {
	for _, p := range out.OverPins {
		if !p.Usable || p.Measurement == nil {
			continue
		}
		l := inspect.Limits{Min: p.Measurement.Min, Max: p.Measurement.Max}
		if a.shop.onlyOne(p.Pin, p.Kind == "balls") {
			out.Missing = append(out.Missing, missing{"over pins", fmt.Sprintf("there is only one %s in the shop; two are needed", pinText(p.Pin, j.display))})
			continue
		}
		gauge := a.shop.stock.GaugeFor(l)
		if gauge == nil {
			out.Missing = append(out.Missing, missing{"over pins", j.noGauge(l)})
			return
		}
		t := take{What: "over pins", Kind: p.Kind, PinNominal: &p.Pin, PinDiameter: &p.Pin, Why: "asked for"}
		t.with = fmt.Sprintf("two %s %s", pinText(p.Pin, j.display), p.Kind)
		t.measuredBy(gauge.Name, gauge.By, gauge.Uncertainty, l)
		out.Take = append(out.Take, t)
		return
	}
}

// takeSpan takes the first span that a micrometer of the shop can measure, or else
// a caliper, and says of the others what is missing.
func (j *job) takeSpan(out *gearTargets, q inspect.Subject, a ask) {
	var best *inspect.SpanTake
	first := ""
	for i := range out.Span {
		s := &out.Span[i]
		if !s.Usable {
			continue
		}
		c := a.shop.stock.ForSpan(q, s.Teeth)
		switch {
		case c.Gauge == nil:
			s.Missing = j.missingSpan(c)
			first = orDefault(first, fmt.Sprintf("span over %s: %s", teethText(s.Teeth), s.Missing))
		case best == nil || best.Gauge.Caliper && !c.Gauge.Caliper:
			best = &c
		}
	}
	switch {
	case best != nil:
		t := take{What: "span", Teeth: &best.Teeth, with: "span over " + teethText(best.Teeth), Why: j.whySpan(*best, q)}
		t.measuredBy(best.Gauge.Name, best.Gauge.By, best.Gauge.Uncertainty, best.Target.Value)
		out.Take = append(out.Take, t)
	case first != "":
		out.Missing = append(out.Missing, missing{"span", first})
	}
}

// takeChord takes a gear tooth caliper for the chordal thickness, or else for the constant chord.
func (j *job) takeChord(out *gearTargets, g *gear, a ask) {
	for _, m := range []struct {
		what, with string
		t          chordTarget
	}{{"chordal", "chordal thickness", out.Chordal}, {"constant chord", "constant chord", out.ConstantChord}} {
		if !m.t.Usable {
			continue
		}
		c := a.shop.stock.ForChord(g.g.Module())
		if c == nil {
			out.Missing = append(out.Missing, missing{m.what, fmt.Sprintf("%s: no gear tooth caliper for module %.4g in the shop", m.with, g.g.Module())})
			return
		}
		t := take{What: m.what, with: m.with, Why: "height set to " + j.length(m.t.Height)}
		t.measuredBy(c.Name, c.By, c.Uncertainty, inspect.Limits{Min: m.t.Thickness.Min, Max: m.t.Thickness.Max})
		out.Take = append(out.Take, t)
		return
	}
}

// shopMeasured returns what the shop's pins (or balls) of a nominal size measure,
// two of them or a single one, nil where that is just their size or not known.
func (s *shop) shopMeasured(d float64, ball bool) (*float64, inspect.Pick) {
	if s == nil {
		return nil, inspect.Pick{}
	}
	for _, z := range s.stock.Sizes(ball) {
		if math.Abs(z.Nominal-d) >= inspect.SamePin {
			continue
		}
		pick, ok := z.Pick(involute.TwoPins)
		if !ok {
			pick, _ = z.Pick(involute.PinToAxis)
		}
		measured := !slices.ContainsFunc(pick.Pins, func(p inspect.Pin) bool { return !p.Measured })
		if measured && pick.Diameter != d {
			return &pick.Diameter, pick
		}
	}
	return nil, inspect.Pick{}
}

// sizeOffers turns the sizes chosen from the shop into pins to measure with.
func sizeOffers(c inspect.PinChoice) []pinOffer {
	var out []pinOffer
	for i := range c.Takes {
		t := &c.Takes[i]
		out = append(out, pinOffer{inspect.PinCandidate{Diameter: t.Pick.Diameter, From: fromPins(t.Pick)}, &t.Size})
	}
	return out
}

// fromPins names where the pins picked are.
func fromPins(p inspect.Pick) string {
	var from []string
	for _, one := range p.Pins {
		if !slices.Contains(from, one.From) {
			from = append(from, one.From)
		}
	}
	return strings.Join(from, " and ")
}

// threePinNeed says what the shop lacks to measure over three pins: a face that lies
// on two of them at once, whose centers are d_K sin(180°/z) apart.
func (j *job) threePinNeed(g *gear, s *shop, t inspect.Target) string {
	m, _ := t.Measure.(inspect.OverPins)
	seat, err := g.middle().Seat(m.Pin)
	if err != nil {
		return ""
	}
	across := seat.CenterDiameter * math.Sin(math.Pi/float64(g.g.Teeth()))
	if s.stock.GaugeAcross(t.Value, across) != nil {
		return ""
	}
	return fmt.Sprintf("nothing in the shop covers %s with faces at least %s across", j.between(t.Value), j.length(across))
}

// A pinOffer is a pin to measure with; size is set where it is one of the shop's.
type pinOffer struct {
	inspect.PinCandidate
	size *inspect.PinSize
}

// in returns the diameter to compute a way with, and why the shop's pins cannot
// be measured with in that way.
func (o pinOffer) in(way involute.PinWay) (diameter float64, why string) {
	if o.size == nil {
		return o.Diameter, ""
	}
	if (way == involute.OpposedPins || way == involute.FreePins) && o.size.Ball {
		return o.Diameter, "takes straight pins, and these are balls"
	}
	if pick, ok := o.size.Pick(way); ok {
		return pick.Diameter, ""
	}
	return o.Diameter, onlyText(o.size.Count) + " in the shop"
}

func onlyText(n int) string {
	if n == 1 {
		return "there is only one of it"
	}
	return "there are only two of them"
}
