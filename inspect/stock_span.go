package inspect

import (
	"math"

	"flankwright/involute"
)

// A SpanLack says what a stock lacks for a span.
type SpanLack int

// The lacks.
const (
	NothingLacks SpanLack = iota
	NoRange               // no gauge covers the reading
	NoReach               // those that do meet the next teeth or the root first
)

// A SpanTake is a span and what reads it.
type SpanTake struct {
	Teeth  int
	Target Target
	Gauge  *Gauge // nil where the stock has none for it
	Lack   SpanLack
	Short  *Gauge // NoReach: one that covers the reading
	// Room is how thick the face of Gauge may be, or of Short, or a usual disc's, mm;
	// +Inf where nothing stands in the way.
	Room float64
}

// ForSpan picks what measures a span over k teeth: of the gauges that cover the
// readings at both limits and whose faces get to the flanks at both, the one
// with the least uncertainty, micrometers before calipers.
func (s Stock) ForSpan(q Subject, k int) SpanTake {
	out := SpanTake{Teeth: k, Target: NewTarget(q.Gear, Span{k}, q.Thickness, q.Part)}
	if !out.Target.Exists {
		return out
	}
	if out.Gauge = s.bestGauge(out.Target.Value, func(g Gauge) bool { return !q.Reaches(g.Face, k) }); out.Gauge != nil {
		out.Room = q.SpanRoom(out.Gauge.Face, k)
		return out
	}
	out.Lack, out.Short = NoRange, s.bestGauge(out.Target.Value, nil)
	out.Room = q.SpanRoom(usualDisc(), k)
	if out.Short != nil {
		out.Lack, out.Room = NoReach, q.SpanRoom(out.Short.Face, k)
	}
	return out
}

// Reaches reports whether a face gets to the flanks of a span over k teeth, at both
// limits of the thickness, without meeting the next tooth or the root.
func (q Subject) Reaches(f Face, k int) bool {
	room := q.SpanRoom(f, k)
	switch {
	case f.Kind == DiscAnvil:
		// Over the rim the spindle goes on without end.
		over := involute.SpanFace{Land: q.land() - (f.Diameter-f.Spindle)/2, Radius: f.Spindle / 2}
		return room >= f.Thickness && math.IsInf(q.room(over, k), 1)
	case f.Kind == Jaws && f.Thickness > 0:
		return room >= f.Thickness
	}
	return math.IsInf(room, 1)
}

// SpanRoom returns how thick a face of that form may be, at both limits of the
// thickness, mm; +Inf where nothing stands in the way.
func (q Subject) SpanRoom(f Face, k int) float64 {
	edge := involute.SpanFace{Land: q.land(), Radius: f.Diameter / 2}
	if f.Kind == Jaws {
		edge = involute.SpanFace{Land: q.land(), HalfWidth: jawWidth / 2}
	}
	return q.room(edge, k)
}

const (
	// jawWidth is how wide the jaws of a caliper are along the gear's axis, mm
	// (common practice). It counts with helical gears only.
	jawWidth = 4
	// keptBack is the share of a helical gear's room that is not used: it is sought
	// in sections, and a disc is never laid on as squarely as it is drawn.
	keptBack = 0.1
)

// usualDisc is the disc of a usual micrometer, 25 mm across (common practice).
func usualDisc() Face { return Face{Kind: DiscAnvil, Diameter: 25, Thickness: 0.7, Spindle: 8} }

// land is how far a face must reach below its contact, mm: 0.3 mm, so that a rim's
// chamfer stays off the flank, or a tenth of the tooth's depth where that is less
// (common practice).
func (q Subject) land() float64 {
	depth := (q.Gear.TipDiameter() - q.Gear.RootDiameterAt(q.Thickness.Max)) / 2
	return min(0.3, 0.1*depth)
}

func (q Subject) room(f involute.SpanFace, k int) float64 {
	room := math.Inf(1)
	for _, s := range []float64{q.Thickness.Min, q.Thickness.Max} {
		t, err := q.Gear.Tooth(s)
		if err != nil {
			return 0
		}
		room = min(room, t.SpanRoom(k, f))
	}
	if q.Gear.Helical() {
		room *= 1 - keptBack
	}
	return room
}
