package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// longAddendum is the shift from which the 1.92/P pins, made for long-addendum
// pinions, may come before the 1.728/P ones: half the usual long addendum of 0.5.
const longAddendum = 0.25

// idealOnly marks a pin of the ideal size that no series has.
const idealOnly = "the ideal size, in no series"

// offers returns the pins to measure a gear with: those asked for, else what the shop
// has, with how that was chosen, else of the standard series.
func (j *job) offers(g *gear, a ask) (offers []pinOffer, choice inspect.PinChoice) {
	if a.pins != nil {
		for _, d := range a.pins {
			offers = append(offers, pinOffer{PinCandidate: inspect.PinCandidate{Diameter: d, From: "asked for"}})
		}
		return offers, choice
	}
	if a.shop != nil {
		choice = a.shop.stock.ChoosePins(g.subject(a.arbor))
		if len(choice.Takes) > 0 {
			return sizeOffers(choice), choice
		}
	}
	for _, p := range j.choosePins(g) {
		offers = append(offers, pinOffer{PinCandidate: p})
	}
	return offers, choice
}

// choosePins returns the pins to measure a gear with when none is asked for:
// first of a series that shops keep for gears, then of a gauge-pin set. Where
// none of a series is usable it is left out; where none at all is, the ideal
// pin alone is shown with the reason.
func (j *job) choosePins(g *gear) []inspect.PinCandidate {
	ideal, ok := inspect.IdealPin(g.g, g.thickness.Limits)
	if !ok {
		return nil
	}
	series := [][]inspect.PinCandidate{metricSeries(), setCandidates("mm", "metric 0.0")}
	if g.dp != 0 || j.jobUnit == inspect.Inch {
		series = append(pitchSeries(g, ideal), setCandidates("in", "inch"))
	}
	var chosen []inspect.PinCandidate
	for _, candidates := range series {
		pin, ok := inspect.NearestUsable(g.g, g.thickness.Limits, g.part(), ideal, candidates)
		if ok && !holds(chosen, pin.Diameter) {
			chosen = append(chosen, pin)
		}
	}
	if len(chosen) > 1 {
		chosen = dropFar(chosen, ideal)
	}
	if len(chosen) == 0 {
		return []inspect.PinCandidate{{Diameter: ideal, From: idealOnly}}
	}
	return chosen
}

// farPin is how far a pin may be from the ideal and still be offered beside a
// nearer one, as a share: farther ones touch near tip or root.
const farPin = 1.0 / 3

// dropFar drops pins far from the ideal, as long as one is left.
func dropFar(pins []inspect.PinCandidate, ideal float64) []inspect.PinCandidate {
	var near []inspect.PinCandidate
	for _, p := range pins {
		if math.Abs(p.Diameter-ideal) <= farPin*ideal {
			near = append(near, p)
		}
	}
	if len(near) == 0 {
		return pins
	}
	return near
}

func holds(list []inspect.PinCandidate, d float64) bool {
	for _, p := range list {
		if math.Abs(p.Diameter-d) < inspect.SamePin {
			return true
		}
	}
	return false
}

func metricSeries() []inspect.PinCandidate {
	var out []inspect.PinCandidate
	for _, p := range refdata.GearPins() {
		out = append(out, inspect.PinCandidate{Diameter: p.Diameter, From: "gear pins of DIN 3977"})
	}
	return out
}

// pitchSeries returns the inch series by their roles, one pin each for the
// pitch: 1.728/P first, or 1.92/P where the addendum is long and that pin is
// nearer to the ideal; 1.68/P is tried where neither can be used.
func pitchSeries(g *gear, ideal float64) [][]inspect.PinCandidate {
	var pins []inspect.PinCandidate
	for _, name := range []string{"1.728", "1.92", "1.68"} {
		for _, s := range refdata.PinSeries() {
			if s.Name == name {
				pins = append(pins, inspect.PinCandidate{Diameter: s.Factor * g.g.Module(), From: s.Name + "/P series, " + s.Role})
			}
		}
	}
	if g.g.Spec().Shift >= longAddendum && math.Abs(pins[1].Diameter-ideal) < math.Abs(pins[0].Diameter-ideal) {
		pins[0], pins[1] = pins[1], pins[0]
	}
	usable := func(p inspect.PinCandidate) bool {
		return inspect.NewTarget(g.g, inspect.OverPins{Pin: p.Diameter}, g.thickness.Limits, g.part()).Usable()
	}
	if usable(pins[0]) || usable(pins[1]) {
		pins = pins[:2]
	}
	var out [][]inspect.PinCandidate
	for _, p := range pins {
		out = append(out, []inspect.PinCandidate{p})
	}
	return out
}

// setCandidates returns the sizes of the gauge-pin sets whose name begins so.
func setCandidates(unit, prefix string) []inspect.PinCandidate {
	var out []inspect.PinCandidate
	for _, s := range refdata.PinSets() {
		if s.Unit != unit || !strings.HasPrefix(s.Name, prefix) {
			continue
		}
		from := fmt.Sprintf("gauge-pin set in steps of %g %s", s.Step, s.Unit)
		for _, d := range s.Sizes() {
			out = append(out, inspect.PinCandidate{Diameter: d, From: from})
		}
	}
	return out
}

// A namedWay is a way to measure over pins, with its name in JSON and for people.
type namedWay struct {
	way  involute.PinWay
	name string
	text string
}

// farSideOfArbor names the way to the bore's far side where an arbor stands in the bore.
const farSideOfArbor = "one pin to the far side of the arbor"

// otherWays lists the ways that stand beside the two-pin reading.
func otherWays() []namedWay {
	return []namedWay{
		{involute.ThreePins, "three pins", "three pins, flat anvils"},
		{involute.OpposedPins, "rollers exactly opposed", "straight pins exactly opposed"},
		{involute.FreePins, "rollers between free parallel anvils", "straight pins, free anvils, least reading"},
		{involute.PinToAxis, "one pin to the axis", "one %s to the axis"},
		{involute.PinToFarSide, "one pin to the far side of the bore", "one %s to the bore's far side"},
	}
}
