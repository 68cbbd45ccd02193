package inspect

import (
	"cmp"
	"math"
	"slices"

	"flankwright/involute"
)

// A PinCandidate is a pin that can be had, and where it comes from.
type PinCandidate struct {
	Diameter float64 // mm
	From     string  // the series or set, for people
}

// IdealPin returns the pin that touches the middle tooth of the limits where a
// pin tells most about the thickness: near d + 2 x m_n, or, where that cylinder
// is off the flank, in the flank's middle. False where no pin does.
func IdealPin(g *involute.Gear, s Limits) (float64, bool) {
	t, err := g.Tooth(s.Middle())
	if err != nil {
		return 0, false
	}
	dc := t.TouchDiameter()
	if end := t.InvoluteEndDiameter(); dc <= t.FormDiameter() || dc >= end {
		dc = (t.FormDiameter() + end) / 2
	}
	pin, err := t.PinTouchingAt(dc)
	return pin, err == nil && pin > 0
}

// NearestUsable returns the candidate nearest to the ideal pin with which the
// two-pin measurement can be taken at both limits. It walks outward from the
// ideal and gives up where no candidate is left.
func NearestUsable(g *involute.Gear, s Limits, p Part, ideal float64, candidates []PinCandidate) (PinCandidate, bool) {
	sorted := slices.Clone(candidates)
	slices.SortStableFunc(sorted, func(a, b PinCandidate) int {
		return cmp.Compare(math.Abs(a.Diameter-ideal), math.Abs(b.Diameter-ideal))
	})
	for _, c := range sorted {
		if NewTarget(g, OverPins{Pin: c.Diameter}, s, p).Usable() {
			return c, true
		}
		if math.Abs(c.Diameter-ideal) > ideal {
			break // no pin of twice the ideal size, or of none, touches the flanks
		}
	}
	return PinCandidate{}, false
}

// SpanChoices returns the numbers of teeth worth measuring over, the best
// first: the usable one nearest to the ideal and its usable neighbors. Where
// none is usable, it returns the nearest alone.
func SpanChoices(g *involute.Gear, s Limits, p Part) []int {
	t, err := g.Tooth(s.Middle())
	if err != nil {
		return nil
	}
	ideal := t.IdealSpanTeeth()
	if !finite(ideal) {
		ideal = float64(g.Teeth()) / 9
	}
	nearest := min(max(int(math.Round(ideal)), 1), max(g.Teeth()/2, 1))
	var usable []int
	for k := max(2, nearest-2); k <= nearest+2 && k < g.Teeth(); k++ {
		if NewTarget(g, Span{k}, s, p).Usable() {
			usable = append(usable, k)
		}
	}
	if len(usable) == 0 {
		return []int{nearest} // of few teeth perhaps one: its base thickness, which a narrow caliper can take
	}
	slices.SortStableFunc(usable, func(a, b int) int {
		return cmp.Compare(math.Abs(float64(a)-ideal), math.Abs(float64(b)-ideal))
	})
	return usable[:min(3, len(usable))]
}
