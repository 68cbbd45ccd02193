package involute

import (
	"errors"
	"math"
	"reflect"
	"testing"

	"pgregory.net/rapid"
)

// drawRack draws proportions in use and some that only their owner would choose.
func drawRack(t *rapid.T) Rack {
	named := []Rack{
		isoA(), {20 * Degree, 1, 1.25, 0.25}, fullRadius(20, 1.4), {25 * Degree, 1, 1.25, 0.3},
		{14.5 * Degree, 1, 1.157, 0.209}, {20 * Degree, 0.8, 1, 0.3}, {20 * Degree, 1, 1.25, 0}, {30 * Degree, 0.8, 1, 0.1},
	}
	if i := rapid.IntRange(0, len(named)).Draw(t, "rack"); i < len(named) {
		return named[i]
	}
	r := Rack{PressureAngle: rapid.Float64Range(12, 32).Draw(t, "alpha") * Degree}
	r.Addendum = rapid.Float64Range(0.5, 1.2).Draw(t, "addendum")
	r.Dedendum = r.Addendum + rapid.Float64Range(0.1, 0.5).Draw(t, "clearance")
	r.TipRadius = rapid.Float64Range(0, 1).Draw(t, "tip radius") * max(0, r.LargestTipRadius())
	return r
}

func drawSpec(t *rapid.T) Spec {
	s := Spec{
		Module: math.Pow(10, rapid.Float64Range(-1, math.Log10(50)).Draw(t, "log module")),
		Teeth:  int(math.Round(math.Pow(10, rapid.Float64Range(math.Log10(4), 3).Draw(t, "log teeth")))),
		Shift:  rapid.Float64Range(-0.7, 1).Draw(t, "shift"),
		Rack:   drawRack(t),
	}
	if rapid.Bool().Draw(t, "helical") {
		s.Helix = rapid.Float64Range(-45, 45).Draw(t, "beta") * Degree
	}
	if rapid.IntRange(0, 3).Draw(t, "chamfer") == 0 {
		s.TipChamfer = 0.05 * s.Module
	}
	return s
}

// drawTooth draws a tooth that can be; what cannot must be refused by reason,
// with finite numbers.
func drawTooth(t *rapid.T) Tooth {
	for range 50 {
		s := drawSpec(t)
		g, err := NewGear(s)
		if err == nil {
			var tooth Tooth
			tooth, err = g.Tooth(g.NominalThickness() - rapid.Float64Range(0, 0.1).Draw(t, "thin")*s.Module)
			if err == nil {
				return tooth
			}
		}
		var imp *Impossible
		if !errors.As(err, &imp) || !finite(imp.Value, imp.Limit) {
			t.Fatalf("%+v: refused by %v", s, err)
		}
	}
	t.Skip("no possible gear among fifty")
	return Tooth{}
}

// allFinite fails where a number in v, a struct, is NaN or infinite.
func allFinite(t *rapid.T, what string, v any) {
	x := reflect.ValueOf(v)
	if x.Kind() == reflect.Float64 {
		if !finite(x.Float()) {
			t.Fatalf("%s: %v", what, v)
		}
		return
	}
	for i := range x.NumField() {
		if f := x.Field(i); f.CanInterface() && (f.Kind() == reflect.Float64 || f.Kind() == reflect.Struct) {
			allFinite(t, what+"."+x.Type().Field(i).Name, f.Interface())
		}
	}
}

// The outline's invariants, its direction, its area and its thickness.
func TestPropertyOutline(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		o := tooth.Outline()
		ra, rf := tooth.TipDiameter()/2, tooth.RootDiameter()/2
		// Points are sums of a few numbers no larger than the radius; fillet
		// and flank join where a root was found to two roundings.
		slack := 64 * ulp(ra)
		if tooth.Undercut() {
			slack *= 16 // the crossing of two curves at a small angle
		}
		end := func(c Curve, last bool) Vec {
			t0, t1 := c.Domain()
			if last {
				t0 = t1
			}
			p, _ := c.At(t0)
			return p
		}
		area := 0.0
		for i, p := range o.Pieces {
			next := end(o.Pieces[0], false).Rotate(o.Pitch())
			if i+1 < len(o.Pieces) {
				next = end(o.Pieces[i+1], false)
			}
			if gap := next.Sub(end(p, true)).Norm(); !(gap <= slack) {
				t.Fatalf("piece %d ends %g from the next", i, gap)
			}
			t0, t1 := p.Domain()
			if !(t0 < t1) {
				t.Fatalf("piece %d: domain %g to %g", i, t0, t1)
			}
			const n = 64
			outward := 1.0
			if i > len(o.Pieces)/2 {
				outward = -1
			}
			for j := range n {
				q, dq := p.At(t0 + (t1-t0)*(float64(j)+0.5)/n)
				allFinite(t, "point", q)
				allFinite(t, "curvature", p.Curvature(t0+(t1-t0)*(float64(j)+0.5)/n))
				area += q.Cross(dq) * (t1 - t0) / n / 2
				switch r := q.Norm(); {
				case p.Role == RootLand && !(dq.Left().Dot(q) < 0 && math.Abs(r-rf) <= slack),
					p.Role == TipLand && !(dq.Left().Dot(q) < 0 && math.Abs(r-ra) <= slack):
					t.Fatalf("piece %d: a land that is not its circle with the metal inside", i)
				case (p.Role == RootFillet || p.Role == ToothFlank) && !(outward*dq.Dot(q) > 0 && r >= rf-slack && r <= ra+slack):
					t.Fatalf("piece %d, role %d: radius %g does not run on between %g and %g", i, p.Role, r, rf, ra)
				}
			}
		}
		z := float64(o.Teeth)
		if !(area > math.Pi*rf*rf/z && area < math.Pi*ra*ra/z) {
			t.Fatalf("area of a pitch %g, between %g and %g expected", area, math.Pi*rf*rf/z, math.Pi*ra*ra/z)
		}
		if r := tooth.ReferenceDiameter() / 2; 2*r > tooth.FormDiameter() && 2*r < tooth.TipFormDiameter() {
			half, ok := o.angleAt(r, ToothFlank)
			if drawn := 2 * r * half * math.Cos(tooth.Spec().Helix); !ok || math.Abs(drawn-tooth.Thickness()) > 1e-9 {
				t.Fatalf("drawn thickness %.12f, tooth %.12f", drawn, tooth.Thickness())
			}
		}
	})
}

// ways returns the ways to read pins that a gear has.
func (g *Gear) ways() []PinWay {
	ways := []PinWay{TwoPins, PinToAxis, PinToFarSide}
	switch odd := g.Teeth()%2 != 0; {
	case odd && g.Helical():
		ways = append(ways, OpposedPins, FreePins)
	case odd:
		ways = append(ways, ThreePins)
	}
	return ways
}

// A kind is a measurement as a pair of functions.
type kind struct {
	name    string
	measure func(Tooth) (float64, error)
	back    func(float64) (float64, error)
	grows   bool // with the thickness, strictly
}

// kinds returns every measurement of a gear like this tooth, with a pin that suits it.
func kinds(tooth Tooth, pin float64) []kind {
	g := tooth.Gear
	ks := []kind{
		{"chord", func(t Tooth) (float64, error) { return t.Chord(t.TipDiameter()).Thickness, nil }, g.ThicknessFromChord, true},
		{"constant chord", func(t Tooth) (float64, error) { return t.ConstantChord(t.TipDiameter()).Thickness, nil },
			func(c float64) (float64, error) { return g.ThicknessFromConstantChord(c), nil }, true},
	}
	for k := 1; k <= 12; k += 3 {
		ks = append(ks, kind{"span", func(t Tooth) (float64, error) { return t.Span(k), nil },
			func(w float64) (float64, error) { return g.ThicknessFromSpan(k, w) }, true})
	}
	bore := 0.3 * g.TipDiameter()
	for _, way := range g.ways() {
		ks = append(ks, kind{[]string{"two pins", "three pins", "pin to axis", "pin to far side", "opposed pins", "free pins"}[way],
			func(t Tooth) (float64, error) {
				seat, err := t.Seat(pin)
				if err != nil {
					return 0, err
				}
				r, err := t.Reading(way, seat.CenterDiameter, pin, bore)
				return r.Value, err
			},
			func(m float64) (float64, error) {
				dK, err := g.CenterFromReading(way, m, pin, bore)
				if err != nil {
					return 0, err
				}
				return g.ThicknessFromCenter(dK, pin)
			}, true})
	}
	return ks
}

// Every kind and way: thickness to measurement and back, and a thinner tooth reads less.
func TestPropertyMeasurements(t *testing.T) {
	off := &worst{}
	tried, measured := 0, 0
	refused := map[string]int{}
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		pin, err := tooth.PinTouchingAt(max(tooth.TouchDiameter(), tooth.FormDiameter()))
		if err != nil {
			t.Fatalf("no pin touches at d + 2 x m: %v", err)
		}
		pin *= rapid.Float64Range(0.99, 1.05).Draw(t, "pin")
		thinner, err := tooth.Gear.Tooth(tooth.Thickness() * 0.999)
		if err != nil {
			return
		}
		for _, k := range kinds(tooth, pin) {
			tried++
			m, err := k.measure(tooth)
			var imp *Impossible
			if errors.As(err, &imp) && (imp.Reason == NoFreeReading || imp.Reason == PinFallsThrough) {
				refused[k.name]++
				continue
			}
			if err != nil {
				t.Fatalf("%s: %v", k.name, err)
			}
			allFinite(t, k.name, m)
			s, err := k.back(m)
			if err != nil {
				t.Fatalf("%s: %v back from %.9f", k.name, err, m)
			}
			measured++
			off.see(s - tooth.Thickness())
			if !(math.Abs(s-tooth.Thickness()) <= 1e-9) {
				t.Fatalf("%s: thickness %.12f comes back as %.12f", k.name, tooth.Thickness(), s)
			}
			if less, err := k.measure(thinner); err == nil && !(less < m) {
				t.Fatalf("%s: a thinner tooth reads %.12f, not less than %.12f", k.name, less, m)
			}
		}
	})
	off.within(t, "thickness there and back, mm", 1e-9)
	t.Logf("%d of %d measured, refused: %v", measured, tried, refused)
	if measured < tried*9/10 {
		t.Errorf("only %d of %d measured", measured, tried)
	}
}

// Seat and PinTouchingAt undo each other between form and tip.
func TestPropertyPinTouchingAt(t *testing.T) {
	off := &worst{}
	rapid.Check(t, func(t *rapid.T) {
		tooth := drawTooth(t)
		form, tip := tooth.FormDiameter(), tooth.TipFormDiameter()
		dc := form + (tip-form)*rapid.Float64Range(0, 1).Draw(t, "share")
		pin, err := tooth.PinTouchingAt(dc)
		if err != nil {
			// Right only where the drawn flank at dc no longer faces the space's
			// center line: few teeth, near the tip.
			flank := tooth.Outline().pieces(ToothFlank)[0]
			_, dp := flank.At(tooth.RollAngle(dc))
			across := Polar(1, -math.Pi/float64(tooth.Teeth())).Left()
			if dp.Left().Dot(across) > 0 {
				t.Fatalf("no pin touches at %g: %v", dc, err)
			}
			return
		}
		if pin <= 0 {
			t.Fatalf("a pin of %g touches at %g", pin, dc)
		}
		if pin > 20*tooth.Module() {
			return // the flanks all but face along the space: no pin of this world
		}
		seat, err := tooth.Seat(pin)
		var imp *Impossible
		if errors.As(err, &imp) && imp.Reason == PinFallsThrough && dc-tooth.BaseDiameter() < 1e-9*dc {
			return // at the base circle itself, within rounding
		}
		if err != nil {
			t.Fatalf("pin %g for %g: %v", pin, dc, err)
		}
		allFinite(t, "seat", seat)
		allFinite(t, "root clearance", tooth.PinRootClearance(seat))
		// The contact is a difference of lengths as large as the pin, and near
		// the base circle its diameter moves faster than it.
		tol := 1e-13 * max(dc, pin) * dc / math.Sqrt((dc-tooth.BaseDiameter())*(dc+tooth.BaseDiameter()))
		off.see((seat.ContactDiameter - dc) / tol)
		if !(math.Abs(seat.ContactDiameter-dc) <= tol) {
			t.Fatalf("pin %g touches at %.12f, wanted %.12f", pin, seat.ContactDiameter, dc)
		}
	})
	t.Logf("worst %.3g of what is allowed", off.value)
}

// Numbers beyond any gear are refused, not carried on as infinities.
func TestNumbersTooLargeAreRefused(t *testing.T) {
	for _, s := range []Spec{
		{Teeth: 20, Module: 1e308, Rack: isoA()},
		{Teeth: 20, Module: 1, Shift: 1e308, Rack: isoA()},
		{Teeth: 1 << 60, Module: 1e300, Rack: isoA()},
		{Teeth: 20, Module: math.NaN(), Rack: isoA()},
		{Teeth: 20, Module: 1, TipDiameter: math.Inf(1), Rack: isoA()},
	} {
		_, err := NewGear(s)
		refusedFor(t, "too large", err, NotFinite)
	}
}
