package involute

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Rolling the rack through a blank, for random gears: see TestRollingRackLeavesOutline.
func TestPropertyRollingRack(t *testing.T) {
	off := &worst{}
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		k := newRollingRack(tooth)
		o := tooth.Outline()
		for _, p := range o.Pieces[:len(o.Pieces)/2] {
			if p.Role != RootFillet && p.Role != ToothFlank {
				continue
			}
			t0, t1 := p.Domain()
			q, dq := p.At(t0 + (t1-t0)*rapid.Float64Range(0.001, 0.999).Draw(t, "share"))
			tip, flank := k.removed(q.Norm())
			side := q.Left().Scale(max(tip, flank) - q.Angle() - o.Pitch()/2)
			d := side.Cross(dq) / dq.Norm()
			off.see(d)
			if !(math.Abs(d) <= 1e-9) {
				t.Fatalf("role %d, radius %.6f: the rolling tool cuts %g deeper", p.Role, q.Norm(), d)
			}
		}
	})
	off.within(t, "outline against the rolling tool, mm", 1e-9)
}

// A pin pushed into the drawn space of random spur gears: see
// TestPushedBallRestsInSeat. Helical ones there only, for time.
func TestPropertyPushedPin(t *testing.T) {
	seats, roots := &worst{}, &worst{}
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		if tooth.Helical() {
			return
		}
		form, tip := tooth.FormDiameter(), tooth.TipFormDiameter()
		pin, err := tooth.PinTouchingAt(form + (tip-form)*rapid.Float64Range(0.02, 0.98).Draw(t, "share"))
		if err != nil || pin > 3*tooth.Module() {
			return // see TestPropertyPinTouchingAt
		}
		seat, err := tooth.Seat(pin)
		if err != nil {
			t.Fatal(err)
		}
		w := newWall(tooth)
		radius, role, contact := w.push(pin, tip/2+pin)
		clearance := tooth.PinRootClearance(seat)
		gap, _, _ := w.nearest(seat.CenterDiameter/2, 0, RootLand, RootFillet)
		roots.see((clearance - gap + pin/2) / tooth.Module())
		if clearance > 1e-6*tooth.Module() {
			seats.see(2*radius - seat.CenterDiameter)
			if !(math.Abs(2*radius-seat.CenterDiameter) <= 1e-9) {
				t.Fatalf("pin %g rests with its center on %.12f, seat %.12f; touches role %d at %.6f", pin, 2*radius, seat.CenterDiameter, role, contact)
			}
		}
		if clearance < -1e-6*tooth.Module() && !(2*radius > seat.CenterDiameter) {
			t.Fatalf("root clearance %g, but the pin sinks to %.9f, seat %.9f", clearance, 2*radius, seat.CenterDiameter)
		}
	})
	seats.within(t, "d_K, mm", 1e-9)
	roots.within(t, "root clearance, of the module", 1e-6)
}
