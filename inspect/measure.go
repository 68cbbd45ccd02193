package inspect

import (
	"math"

	"flankwright/involute"
)

// A Measure is one kind of measurement as a pair of functions, thickness to
// measurement and back; everything that is written about limits, readings and
// backlash is written once against this pair. The set is closed: OverPins,
// Span, Chordal and ConstantChord.
type Measure interface {
	// Of returns the measurement of a tooth, mm.
	Of(t involute.Tooth) (float64, error)
	// Thickness returns the normal tooth thickness that gives the measurement, mm.
	Thickness(g *involute.Gear, value float64) (float64, error)
	// Faults says what keeps the measure from being taken on this tooth.
	Faults(t involute.Tooth, p Part) []Fault
	measure() // sealed
}

// A Part is what the measuring hand needs to know beside the teeth, mm; 0 is not known.
type Part struct{ FaceWidth float64 }

// A FaultCode says why a measure cannot be trusted or taken.
type FaultCode int

// The faults, with what Value and Limit of a Fault hold (mm).
const (
	NoContact     FaultCode = iota // the pin touches no involute; Value: pin, Limit: the least that would
	BelowForm                      // touches below the form diameter; Value: contact diameter, Limit: form diameter
	AboveTip                       // touches above the tip (form) diameter; Value: contact diameter, Limit: tip form diameter
	OnRelief                       // touches the relieved flank; Value: contact diameter, Limit: where the relief starts
	TipMoves                       // the cutter tops the teeth, and what is measured from the tip moves with it
	UnderTips                      // the pin stands below the tips; Value: measurement, Limit: what it must exceed
	TouchesRoot                    // the pin rests on the root first; Value: how deep it would go in, Limit 0
	FaceTooNarrow                  // Value: face width, Limit: the least needed
	WrongWay                       // this way does not exist for the number of teeth or the helix
	NoReading                      // no thickness or measurement exists; Value: the number that fails, Limit: its bound
)

// A Fault is a reason against a measure.
type Fault struct {
	Code         FaultCode
	Value, Limit float64
}

// contactFaults checks a contact diameter against the flank that is there.
func contactFaults(t involute.Tooth, dc float64) []Fault {
	switch {
	case dc < t.FormDiameter():
		return []Fault{{BelowForm, dc, t.FormDiameter()}}
	case dc > t.TipFormDiameter():
		return []Fault{{AboveTip, dc, t.TipFormDiameter()}}
	case dc > t.InvoluteEndDiameter():
		return []Fault{{OnRelief, dc, t.InvoluteEndDiameter()}}
	}
	return nil
}

func faceFault(p Part, need float64) []Fault {
	if p.FaceWidth > 0 && p.FaceWidth <= need {
		return []Fault{{FaceTooNarrow, p.FaceWidth, need}}
	}
	return nil
}

// OverPins is a measurement over pins or balls of one size.
type OverPins struct {
	Pin  float64 // mm
	Way  involute.PinWay
	Bore float64 // of the bore or arbor measured to, for PinToFarSide, mm
}

// Of returns M, mm.
func (m OverPins) Of(t involute.Tooth) (float64, error) {
	r, err := m.reading(t)
	return r.Value, err
}

func (m OverPins) reading(t involute.Tooth) (involute.PinReading, error) {
	seat, err := t.Seat(m.Pin)
	if err != nil {
		return involute.PinReading{}, err
	}
	return t.Reading(m.Way, seat.CenterDiameter, m.Pin, m.Bore)
}

// Thickness returns s_n for a measurement M, mm.
func (m OverPins) Thickness(g *involute.Gear, value float64) (float64, error) {
	dK, err := g.CenterFromReading(m.Way, value, m.Pin, m.Bore)
	if err != nil {
		return 0, err
	}
	return g.ThicknessFromCenter(dK, m.Pin)
}

// FaceNeeded returns the face width that the measurement takes up, mm.
func (m OverPins) FaceNeeded(t involute.Tooth) float64 {
	r, err := m.reading(t)
	if err != nil {
		return 0
	}
	return t.FaceForPins(r, m.Pin)
}

// Faults says where the pin touches off the flank, rests on the root, stands
// below the tips, or finds no face.
func (m OverPins) Faults(t involute.Tooth, p Part) []Fault {
	if !m.exists(t.Gear) {
		return []Fault{{Code: WrongWay}}
	}
	seat, err := t.Seat(m.Pin)
	if err != nil {
		return []Fault{noContact(err, m.Pin)}
	}
	r, err := t.Reading(m.Way, seat.CenterDiameter, m.Pin, m.Bore)
	if err != nil {
		return []Fault{{Code: NoReading, Value: m.Pin}}
	}
	faults := contactFaults(t, seat.ContactDiameter)
	if c := t.PinRootClearance(seat); c < -rootTouch {
		faults = append(faults, Fault{TouchesRoot, -c, 0})
	}
	if over, need := m.aboveTips(t, seat.CenterDiameter, r.Value); over <= need {
		faults = append(faults, Fault{UnderTips, over, need})
	}
	return append(faults, faceFault(p, t.FaceForPins(r, m.Pin))...)
}

// rootTouch is how deep a pin must sink into the root before it is said to
// touch, mm: far below what matters, and above rounding. The root's distance is
// sampled and so never too small; a touch by less than a micrometer can be missed.
const rootTouch = 1e-6

// noContact turns the error of a pin that falls through into a fault.
func noContact(err error, pin float64) Fault {
	if imp, ok := err.(*involute.Impossible); ok && imp.Reason == involute.PinFallsThrough {
		return Fault{NoContact, pin, imp.Limit}
	}
	return Fault{Code: NoReading, Value: pin}
}

// aboveTips returns the reading and the value above which flat anvils meet the
// pins before the teeth. It asks that the pins stand above the whole tip circle;
// with few teeth an anvil could pass a pin that sits a little lower. Of three
// pins the two in neighboring spaces decide: the anvil across them must clear the
// tooth between, d_K cos(180°/z) + D > d_a.
func (m OverPins) aboveTips(t involute.Tooth, dK, value float64) (over, need float64) {
	switch m.Way {
	case involute.ThreePins:
		return dK*math.Cos(math.Pi/float64(t.Teeth())) + m.Pin, t.TipDiameter()
	case involute.PinToAxis:
		return value, t.TipDiameter() / 2
	case involute.PinToFarSide:
		return value, (t.TipDiameter() + m.Bore) / 2
	}
	return value, t.TipDiameter()
}

// exists reports whether the way is there for the gear's teeth and helix.
func (m OverPins) exists(g *involute.Gear) bool {
	odd := g.Teeth()%2 != 0
	switch m.Way {
	case involute.ThreePins:
		return odd && !g.Helical() && g.Teeth() > 2
	case involute.OpposedPins, involute.FreePins:
		return odd && g.Helical()
	}
	return true
}

func (OverPins) measure() {}

// Span is a measurement over Teeth teeth with flat parallel faces.
type Span struct{ Teeth int }

// Of returns W_k, mm.
func (m Span) Of(t involute.Tooth) (float64, error) {
	if m.Teeth < 1 || m.Teeth > t.Teeth() {
		return 0, &involute.Impossible{Reason: involute.NoSpan, Value: float64(m.Teeth), Limit: float64(t.Teeth())}
	}
	return t.Span(m.Teeth), nil
}

// Thickness returns s_n for a span, mm.
func (m Span) Thickness(g *involute.Gear, value float64) (float64, error) {
	return g.ThicknessFromSpan(m.Teeth, value)
}

// Faults says where the faces touch off the flanks, or the face is too narrow.
func (m Span) Faults(t involute.Tooth, p Part) []Fault {
	w, err := m.Of(t)
	if err != nil {
		return []Fault{{NoReading, float64(m.Teeth), float64(t.Teeth())}}
	}
	return append(contactFaults(t, t.SpanContactDiameter(w)), faceFault(p, t.SpanFaceWidth(w))...)
}

func (Span) measure() {}

// Chordal is the chordal thickness at the reference cylinder, taken with a
// gear-tooth caliper set to the height below the blank's tip.
type Chordal struct{ Tip float64 } // measured tip diameter, mm; 0 for the nominal one

func (m Chordal) tip(g *involute.Gear) float64 {
	if m.Tip > 0 {
		return m.Tip
	}
	return g.TipDiameter()
}

// Of returns the chordal thickness, mm.
func (m Chordal) Of(t involute.Tooth) (float64, error) { return t.Chord(m.tip(t.Gear)).Thickness, nil }

// Height returns the height below the tip at which to measure, mm.
func (m Chordal) Height(t involute.Tooth) float64 { return t.Chord(m.tip(t.Gear)).Height }

// Thickness returns s_n for a chordal thickness, mm.
func (m Chordal) Thickness(g *involute.Gear, value float64) (float64, error) {
	return g.ThicknessFromChord(value)
}

// Faults says where the reference cylinder lies off the flank.
func (m Chordal) Faults(t involute.Tooth, _ Part) []Fault {
	return append(contactFaults(t, t.ReferenceDiameter()), heightFaults(t, m.Height(t))...)
}

// heightFaults checks a height below the tip. A cutter that tops the teeth takes
// the tip along with the flanks, so that the chord at a height below it stays the
// same however deep it cuts.
func heightFaults(t involute.Tooth, h float64) []Fault {
	switch {
	case h <= 0:
		return []Fault{{NoReading, h, 0}}
	case t.Spec().Topped && t.Spec().Thinning == involute.Infeed:
		return []Fault{{Code: TipMoves}}
	}
	return nil
}

func (Chordal) measure() {}

// ConstantChord is the chord that the basic rack touches, the same for every number of teeth.
type ConstantChord struct{ Tip float64 } // measured tip diameter, mm; 0 for the nominal one

// Of returns the constant chord, mm.
func (m ConstantChord) Of(t involute.Tooth) (float64, error) {
	return t.ConstantChord(Chordal(m).tip(t.Gear)).Thickness, nil
}

// Height returns the height below the tip at which to measure, mm.
func (m ConstantChord) Height(t involute.Tooth) float64 {
	return t.ConstantChord(Chordal(m).tip(t.Gear)).Height
}

// Thickness returns s_n for a constant chord, mm.
func (m ConstantChord) Thickness(g *involute.Gear, value float64) (float64, error) {
	return g.ThicknessFromConstantChord(value), nil
}

// Faults says where the chord's points lie off the flank.
func (m ConstantChord) Faults(t involute.Tooth, _ Part) []Fault {
	return append(contactFaults(t, t.ConstantChordDiameter()), heightFaults(t, m.Height(t))...)
}

func (ConstantChord) measure() {}

// finite reports whether all are numbers.
func finite(xs ...float64) bool {
	for _, x := range xs {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
