package involute

import (
	"math"
	"testing"
)

// Where the flanks alone move, each side of the nominal tooth space is turned about
// the axis, fillet and flank together, by half the thinning over the reference
// radius: its points lie on the thinned tooth's curves, the root circle and form
// diameter stay, and the land between is as much wider as the tooth is thinner.
func TestFlanksOnlyTurnsTheNominalSpace(t *testing.T) {
	off := map[Role]*worst{RootFillet: {}, ToothFlank: {}}
	diameters, lands := &worst{}, &worst{}
	for _, c := range []rolled{
		{"plain", Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0.3},
		{"undercut z 6", Spec{Teeth: 6, Module: 2, Shift: 0.3, Rack: isoA()}, 0.1},
		{"undercut z 8", Spec{Teeth: 8, Module: 2, Rack: isoA()}, 0.15},
		{"full radius tool", Spec{Teeth: 30, Module: 1, Rack: fullRadius(20, 1.4)}, 0.1},
		{"helical", Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: isoA()}, 0.1},
		{"thicker", Spec{Teeth: 24, Module: 2, Rack: isoA()}, -0.05},
		{"milled", Spec{Teeth: 24, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 1}}, 0.2},
		{"milled, few teeth", Spec{Teeth: 9, Module: 2, Rack: isoA(), Mill: MillSpec{Diameter: 0.8}}, 0.2},
	} {
		c.spec.Thinning = FlanksOnly
		nominal, thinned := mustTooth(t, c.spec), c.tooth(t)
		across := c.thin / math.Cos(c.spec.Helix) // transverse
		turn := across / nominal.ReferenceDiameter()
		for role, w := range off {
			// The first half of the outline only: the other is its mirror image.
			was, is := nominal.Outline().pieces(role), thinned.Outline().pieces(role)
			for _, curve := range was[:len(was)/2] {
				t0, t1 := curve.Domain()
				for i := range 20 {
					p, _ := curve.At(t0 + (t1-t0)*(float64(i)+0.5)/20)
					p = p.Rotate(turn)
					least := math.Inf(1)
					for _, other := range is[:len(is)/2] {
						u0, u1 := other.Domain()
						_, gap := lowest(func(u float64) float64 { q, _ := other.At(u); return q.Sub(p).Norm() }, u0, u1, 60)
						least = min(least, gap)
					}
					w.see(least)
				}
			}
		}
		diameters.see(thinned.RootDiameter() - nominal.RootDiameter())
		diameters.see(thinned.FormDiameter() - nominal.FormDiameter())
		diameters.see(thinned.TipDiameter() - nominal.TipDiameter())
		width := func(o Outline) float64 { // as seen from the axis, on the reference circle
			for _, p := range o.pieces(RootLand) {
				return p.(Arc).Sweep * nominal.ReferenceDiameter() / 2
			}
			return 0
		}
		lands.see(width(thinned.Outline()) - width(nominal.Outline()) - across)
	}
	off[RootFillet].within(t, "nominal fillets turned, mm", 1e-12)
	off[ToothFlank].within(t, "nominal flanks turned, mm", 1e-12)
	diameters.within(t, "root, form and tip diameters, mm", 1e-11)
	lands.within(t, "root land, mm", 1e-12)
}

// A tool at a fixed depth leaves no thicker tooth than the land of its tip allows;
// the limit that the error names is one that can be cut, and a thickness found from
// a reading of the nominal tooth is not refused for its roundings.
func TestFlanksOnlyThickest(t *testing.T) {
	for _, s := range []Spec{
		{Teeth: 30, Module: 1, Rack: fullRadius(20, 1.4), Thinning: FlanksOnly},
		{Teeth: 24, Module: 2, Rack: isoA(), Thinning: FlanksOnly},
	} {
		nominal := mustTooth(t, s)
		_, err := nominal.Gear.Tooth(nominal.Thickness() + 0.4*s.Module)
		e := refusedFor(t, "too thick", err, TooThick)
		if _, err := nominal.Gear.Tooth(e.Limit); err != nil {
			t.Errorf("the thickest, %g, is refused: %v", e.Limit, err)
		}
		for k := 1; k < 9; k++ {
			read, err := nominal.ThicknessFromSpan(k, nominal.Span(k))
			if err != nil {
				t.Fatal(err)
			}
			if _, err := nominal.Gear.Tooth(read); err != nil {
				t.Errorf("nominal thickness read over %d teeth, %g off, is refused: %v", k, read-nominal.Thickness(), err)
			}
		}
	}
}
