package inspect

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// Gears of m 2 over 3 teeth: of 20 the next tooth has turned out of the way and plain
// anvils pass; of 40, over 5, it stands before them and discs go in. Judged by where
// the next tooth's corner is: (z, k) → angle 180°(k + 1)/z less the half tip.
func TestForSpan(t *testing.T) {
	plain, disc := micrometer(0, 25), discs(0, 50, 0.7)
	for _, c := range []struct {
		name   string
		z, k   int
		gauges []Gauge
		want   string
		lack   SpanLack
	}{
		{"plain anvils pass", 20, 3, []Gauge{plain}, "micrometer", NothingLacks},
		{"the next tooth is in the way", 20, 2, []Gauge{plain}, "", NoReach},
		{"the next tooth is in the way", 40, 4, []Gauge{plain}, "", NoReach},
		{"discs go in", 40, 4, []Gauge{plain, disc}, "discs", NothingLacks},
		{"thick discs do not", 40, 4, []Gauge{discs(0, 50, 9)}, "", NoReach},
		{"small discs: their spindle does not", 40, 4, []Gauge{{Name: "small", Range: Limits{0, 50}, Face: Face{DiscAnvil, 10, 0.7, 8}}}, "", NoReach},
		{"out of range", 40, 4, []Gauge{discs(25, 50, 0.7)}, "", NoRange},
		{"jaws that are thin", 40, 4, []Gauge{{Name: "jaws", Caliper: true, Range: Limits{0, 150}, Face: Face{Kind: Jaws, Thickness: 1}}}, "jaws", NothingLacks},
		{"jaws of no known thickness", 40, 4, []Gauge{{Caliper: true, Range: Limits{0, 150}, Face: Face{Kind: Jaws}}}, "", NoReach},
		{"nothing there", 40, 4, nil, "", NoRange},
	} {
		g := spur(t, 2, c.z, 0)
		q := Subject{Gear: g, Thickness: Limits{g.NominalThickness() - 0.05, g.NominalThickness()}}
		got := Stock{Gauges: c.gauges}.ForSpan(q, c.k)
		name := ""
		if got.Gauge != nil {
			name = got.Gauge.Name
		}
		if name != c.want || got.Lack != c.lack || (got.Short != nil) != (c.lack == NoReach) {
			t.Errorf("z %d k %d, %s: %q, lack %v, short %+v", c.z, c.k, c.name, name, got.Lack, got.Short)
		}
		if open := math.IsInf(got.Room, 1); open != (c.z == 20 && c.k == 3) {
			t.Errorf("z %d k %d: room %v", c.z, c.k, got.Room)
		}
	}
}

// What is taken covers the readings and gets to the contacts; a disc as thick as
// the room said is the last that does.
func TestForSpanAlways(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		g, tooth := drawGear(t, "gear")
		q := Subject{Gear: g, Thickness: Limits{tooth.Thickness() - 0.02*g.Module(), tooth.Thickness()}}
		choices := SpanChoices(g, q.Thickness, Part{})
		for _, k := range choices[:min(1, len(choices))] {
			w := tooth.Span(k)
			s := Stock{Gauges: []Gauge{micrometer(w*0.9, w*1.1), discs(w*0.8, w*1.2, 0.7)}}
			got := s.ForSpan(q, k)
			if !got.Target.Exists {
				continue
			}
			if got.Gauge != nil && (!got.Gauge.Covers(got.Target.Value) || !q.Reaches(got.Gauge.Face, k)) {
				t.Errorf("k %d: %+v is taken", k, got)
			}
			if got.Gauge == nil && got.Lack == NothingLacks || !(got.Room >= 0) {
				t.Errorf("k %d: %+v", k, got)
			}
			f := Face{Kind: Jaws}
			room := q.SpanRoom(f, k)
			if math.IsInf(room, 1) || room == 0 {
				continue
			}
			f.Thickness = room * (1 - 1e-9)
			thicker := f
			thicker.Thickness = room * (1 + 1e-9)
			if !q.Reaches(f, k) || q.Reaches(thicker, k) {
				t.Errorf("k %d: room %v", k, room)
			}
		}
	})
}

// The land below the contact (common practice): 0.3 mm, less on small teeth.
func TestLand(t *testing.T) {
	for module, want := range map[float64]float64{4: 0.3, 0.5: 0.1 * 2.25 * 0.5} {
		g := gearOf(t, involute.Spec{Module: module, Teeth: 30, Rack: iso53A()})
		if got := (Subject{Gear: g, Thickness: nominalLimits(g)}).land(); math.Abs(got-want) > 1e-9 {
			t.Errorf("module %v: %v, want %v", module, got, want)
		}
	}
}
