package main

import (
	"fmt"
	"math"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
	"flankwright/involute"
)

func targetsCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("file to write instead of standard output")...)
	flags = append(flags, targetFlags()...)
	return &cli.Command{
		Name: "targets", Usage: "what to measure: over pins, span, chordal thickness, with limits",
		UsageText: "flankwright targets [JOB] [flags]\nflankwright targets --module 2 --teeth 24 --thin 0.04..0.08 --pin 3.5mm", Flags: flags,
		Action: func(c *cli.Context) error {
			j, gears, err := loadJob(c)
			if err != nil {
				return err
			}
			ask, err := readAsk(c, j, gears)
			if err != nil {
				return err
			}
			t := newTargets(j, gears, ask)
			if c.Bool("explain") {
				t.Explain = j.explainTargets(t)
			}
			if err := emit(c, t, func() []byte { return t.text(newPage(c.App.Writer), j.digits(c)) }); err != nil {
				return err
			}
			return t.verdict()
		},
	}
}

// targets is the result of the command, as JSON writes it.
type targets struct {
	Gears    ordered       `json:"gears"`
	Warnings []warning     `json:"warnings"`
	Explain  []explanation `json:"explain,omitempty"`

	job   *job
	list  []*gear
	ask   ask  // what was asked for
	asked bool // the pins were asked for, not chosen
	gears []gearTargets
}

type gearTargets struct {
	Thickness     span         `json:"tooth_thickness_mm"`
	DecidedBy     string       `json:"thickness_decided_by"`
	IdealPin      *float64     `json:"ideal_pin_mm"`
	OverPins      []pinTarget  `json:"over_pins"`
	Span          []spanTarget `json:"span"`
	Chordal       chordTarget  `json:"chordal"`
	ConstantChord chordTarget  `json:"constant_chord"`
	Take          []take       `json:"take,omitzero"` // with a shop file: what can be measured with what is there
	Missing       []missing    `json:"missing,omitempty"`
	Warnings      []warning    `json:"-"`
}

type pinTarget struct {
	Pin         float64   `json:"pin_diameter_mm"`
	From        string    `json:"from"`
	Pins        int       `json:"pins"`
	Kind        string    `json:"kind"`
	Measurement *span     `json:"measurement_mm"`
	Aim         *float64  `json:"aim_mm"`
	Contact     *span     `json:"contact_diameter_mm"`
	ByThickness *float64  `json:"change_per_thickness"`
	ByPin       *float64  `json:"change_per_pin_diameter"`
	ByDepth     *float64  `json:"change_per_depth_of_cut"` // null where the flanks alone are moved
	ByFlank     *float64  `json:"change_per_flank_moved"`  // both flanks along their normals
	FaceNeeded  float64   `json:"face_width_needed_mm"`
	Usable      bool      `json:"usable"`
	Why         string    `json:"why"`
	Also        []alsoWay `json:"also"`
	// ShopMeasured is what the shop's pins of a size asked for measure, where that is another diameter.
	ShopMeasured *float64 `json:"shop_measured_mm,omitempty"`
	shopPick     inspect.Pick
	even         bool // number of teeth
}

type alsoWay struct {
	Way         string   `json:"way"`
	Pin         *float64 `json:"pin_diameter_mm,omitempty"` // where it is not that of the two pins
	Measurement *span    `json:"measurement_mm"`
	Aim         *float64 `json:"aim_mm"`
	AxialOffset float64  `json:"axial_offset_mm"`
	FaceNeeded  float64  `json:"face_width_needed_mm"`
	Usable      bool     `json:"usable"`
	Why         string   `json:"why"`
	text        string
	bore        float64 // of the bore that the reading is for, where it has limits, mm
}

type spanTarget struct {
	Teeth      int      `json:"teeth"`
	Length     *span    `json:"length_mm"`
	Aim        *float64 `json:"aim_mm"`
	Contact    *span    `json:"contact_diameter_mm"`
	FaceNeeded float64  `json:"face_width_needed_mm"`
	Usable     bool     `json:"usable"`
	Why        string   `json:"why"`
	Missing    string   `json:"missing,omitempty"` // what the shop lacks for it
}

type chordTarget struct {
	Thickness span    `json:"thickness_mm"`
	Aim       float64 `json:"aim_mm"`
	Height    float64 `json:"height_mm"`
	Tip       float64 `json:"tip_diameter_mm"`
	Usable    bool    `json:"usable"`
	Why       string  `json:"why"`
}

func newTargets(j *job, gears []*gear, a ask) *targets {
	t := &targets{job: j, list: gears, ask: a, asked: a.pins != nil, Warnings: j.about(gears)}
	for _, g := range gears {
		one := j.gearTargets(g, a)
		t.gears = append(t.gears, one)
		t.Gears.add(g.name, one)
	}
	return t
}

func (j *job) gearTargets(g *gear, a ask) gearTargets {
	out := gearTargets{
		Thickness: toSpan(g.thickness.Limits), DecidedBy: thicknessWords(g),
		OverPins: []pinTarget{}, Span: []spanTarget{},
	}
	if ideal, ok := inspect.IdealPin(g.g, g.thickness.Limits); ok {
		out.IdealPin = &ideal
	}
	offers, choice := j.offers(g, a)
	for _, p := range offers {
		out.OverPins = append(out.OverPins, j.pinTarget(g, p, a))
	}
	teeth := a.teeth
	if teeth == nil {
		teeth = inspect.SpanChoices(g.g, g.thickness.Limits, g.part())
	}
	for _, k := range teeth {
		out.Span = append(out.Span, j.spanTarget(g, k))
	}
	out.Chordal = j.chordTarget(g, inspect.Chordal{Tip: g.g.TipDiameter()})
	out.ConstantChord = j.chordTarget(g, inspect.ConstantChord{Tip: g.g.TipDiameter()})
	if a.shop != nil {
		j.takeFrom(&out, g, a, choice)
	}
	return out
}

// measured returns the JSON fields of a target that has numbers.
func measured(t inspect.Target) (value *span, aim *float64, contact *span) {
	if t.Exists {
		s, a := toSpan(t.Value), t.Aim
		value, aim = &s, &a
	}
	if t.Contact.Max > 0 {
		s := toSpan(t.Contact)
		contact = &s
	}
	return value, aim, contact
}

func (j *job) pinTarget(g *gear, p pinOffer, a ask) pinTarget {
	d, few := p.in(involute.TwoPins)
	m := inspect.OverPins{Pin: d}
	t := inspect.NewTarget(g.g, m, g.thickness.Limits, g.part())
	out := pinTarget{Pin: d, From: p.From, Pins: 2, Kind: "pins", Usable: t.Usable() && few == "", Why: orDefault(j.why(t.Faults), few), Also: []alsoWay{}}
	if g.g.Helical() {
		out.Kind, out.even = "balls", g.g.Teeth()%2 == 0 && p.size == nil
		out.FaceNeeded = m.FaceNeeded(g.middle())
	}
	if p.size != nil {
		out.Kind = kindOfPins(p.size.Ball)
	} else if a.pins != nil {
		out.ShopMeasured, out.shopPick = a.shop.shopMeasured(d, g.g.Helical())
	}
	out.Measurement, out.Aim, out.Contact = measured(t)
	if seat, err := g.middle().Seat(d); err == nil {
		bt, bp := g.g.PinSensitivity(involute.TwoPins, seat)
		bd := g.g.ThinningPerDepth() * bt
		bf := 2 * bt / math.Cos(g.g.PressureAngle())
		out.ByThickness, out.ByPin, out.ByFlank = &bt, &bp, &bf
		if g.g.FedDeeper() {
			out.ByDepth = &bd
		}
	}
	for _, w := range otherWays() {
		if also, ok := j.alsoWay(g, p, w, a); ok {
			out.Also = append(out.Also, also)
		}
	}
	return out
}

// alsoWay measures with the same pin in another way, where that way exists for the gear.
func (j *job) alsoWay(g *gear, p pinOffer, w namedWay, a ask) (alsoWay, bool) {
	d, few := p.in(w.way)
	m := inspect.OverPins{Pin: d, Way: w.way}
	out := alsoWay{Way: w.name, text: w.text}
	if d != p.Diameter {
		out.Pin = &d
	}
	if w.way == involute.PinToFarSide {
		switch {
		case a.arbor > 0:
			m.Bore = a.arbor
			out.Way, out.text = farSideOfArbor, "one %s to the arbor's far side"
		case g.bore != nil:
			m.Bore = g.bore.limits.Middle()
		default:
			return out, false
		}
	}
	t := inspect.NewTarget(g.g, m, g.thickness.Limits, g.part())
	if len(t.Faults) > 0 && t.Faults[0].Code == inspect.WrongWay {
		return out, false
	}
	out.Usable, out.Why = t.Usable() && few == "", orDefault(j.why(t.Faults), few)
	if w.way == involute.PinToFarSide && out.Why == "" && a.arbor == 0 && g.bore.limits.Width() > 0 {
		out.bore = m.Bore
		out.Why = fmt.Sprintf("for a bore of %s; half of any difference goes on or off", j.length(g.bore.limits.Middle()))
	}
	out.Measurement, out.Aim, _ = measured(t)
	if p.size != nil && w.way == involute.ThreePins && out.Usable {
		out.Why = j.threePinNeed(g, a.shop, t)
	}
	if seat, err := g.middle().Seat(d); err == nil && g.g.Helical() {
		if r, err := g.g.Reading(w.way, seat.CenterDiameter, d, m.Bore); err == nil {
			out.AxialOffset, out.FaceNeeded = r.AxialOffset, g.g.FaceForPins(r, d)
		}
	}
	return out, true
}

func (j *job) spanTarget(g *gear, k int) spanTarget {
	t := inspect.NewTarget(g.g, inspect.Span{Teeth: k}, g.thickness.Limits, g.part())
	out := spanTarget{Teeth: k, Usable: t.Usable(), Why: j.why(t.Faults)}
	if len(t.Faults) > 0 && t.Faults[0].Code == inspect.NoReading {
		out.Why = "the gear has not that many teeth"
	}
	out.Length, out.Aim, out.Contact = measured(t)
	if out.Length != nil && g.g.Helical() {
		out.FaceNeeded = g.g.SpanFaceWidth(out.Length.Max)
	}
	return out
}

// heighted is a chordal measure, which has a height too.
type heighted interface {
	inspect.Measure
	Height(t involute.Tooth) float64
}

func (j *job) chordTarget(g *gear, m heighted) chordTarget {
	t := inspect.NewTarget(g.g, m, g.thickness.Limits, g.part())
	out := chordTarget{
		Thickness: toSpan(t.Value), Aim: t.Aim, Height: m.Height(g.middle()),
		Tip: g.g.TipDiameter(), Usable: t.Usable(), Why: j.why(t.Faults),
	}
	for _, f := range t.Faults {
		if f.Code == inspect.NoReading {
			out.Why = "the caliper's tongue would have to stand above the tip"
		}
	}
	return out
}

// verdict is errNo where pins were asked for and none of them can be used.
func (t *targets) verdict() error {
	if t.asked && !t.anyPinUsable() {
		return errNo
	}
	return nil
}

// anyPinUsable reports whether one of the pins of any gear can be used.
func (t *targets) anyPinUsable() bool {
	for _, g := range t.gears {
		for _, p := range g.OverPins {
			if p.Usable {
				return true
			}
		}
	}
	return false
}

// warningsBelow returns how many warnings a gear has.
func (t *targets) warningsBelow(g *gear) int { return len(t.job.about([]*gear{g})) }
