package inspect

import (
	"math"

	"flankwright/involute"
)

// A Target is a measurement with its limits, from the limits of the tooth thickness.
type Target struct {
	Measure Measure
	Value   Limits // mm; only where Exists
	Aim     float64
	Exists  bool    // there is a number at both limits
	Contact Limits  // contact diameters at the limits, mm; zero where there is none
	Faults  []Fault // empty: usable at both limits
}

// Usable reports whether the measure can be taken at both limits of the thickness.
func (t Target) Usable() bool { return t.Exists && len(t.Faults) == 0 }

// NewTarget turns thickness limits into limits of a measure.
func NewTarget(g *involute.Gear, m Measure, s Limits, p Part) Target {
	out := Target{Measure: m, Exists: true}
	var values, contacts []float64
	for _, sn := range []float64{s.Min, s.Middle(), s.Max} {
		t, err := g.Tooth(sn)
		if err != nil {
			out.Exists = false
			out.addFault(Fault{NoReading, sn, 0})
			continue
		}
		v, err := m.Of(t)
		if err != nil || !finite(v) {
			out.Exists = false
		}
		values = append(values, v)
		if dc, ok := contactOf(t, m); ok {
			contacts = append(contacts, dc)
		}
		for _, f := range m.Faults(t, p) {
			out.addFault(f)
		}
	}
	if len(values) < 3 {
		out.Exists = false
	}
	if out.Exists {
		out.Value, out.Aim = ordered(values[0], values[2]), values[1]
	}
	if len(contacts) == 3 {
		out.Contact = ordered(contacts[0], contacts[2])
	}
	return out
}

// addFault keeps the worst of each kind.
func (t *Target) addFault(f Fault) {
	for i, old := range t.Faults {
		if old.Code == f.Code {
			if math.Abs(f.Value-f.Limit) > math.Abs(old.Value-old.Limit) {
				t.Faults[i] = f
			}
			return
		}
	}
	t.Faults = append(t.Faults, f)
}

// contactOf returns the contact diameter of a measure, where it has one.
func contactOf(t involute.Tooth, m Measure) (float64, bool) {
	switch m := m.(type) {
	case OverPins:
		seat, err := t.Seat(m.Pin)
		return seat.ContactDiameter, err == nil
	case Span:
		w, err := m.Of(t)
		return t.SpanContactDiameter(w), err == nil
	case ConstantChord:
		return t.ConstantChordDiameter(), true
	}
	return t.ReferenceDiameter(), true
}
