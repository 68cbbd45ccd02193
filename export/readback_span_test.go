package export

import (
	"math"
	"strings"
	"testing"

	"flankwright/involute"
)

// drawn returns a tooth's contour as a section, and what the fit reported.
func drawn(t testing.TB, tt involute.Tooth, tolerance float64) (Section, FitReport) {
	t.Helper()
	o, report, err := NewContour(ContourSpec{Tooth: tt, Fit: FitOptions{Tolerance: tolerance}})
	if err != nil {
		t.Fatal(err)
	}
	lead, _ := tt.Lead()
	s, err := NewSection(o.Contours[0].Path, lead)
	if err != nil {
		t.Fatal(err)
	}
	return s, report
}

// The span of a contour is that of the tooth within what the fit allows: each of
// the two flanks may be off by the deviation. Printed values: a widely reprinted
// metric gear handbook (both span examples); the 30 teeth helical one is
// recomputed common practice. Printed digits end at 0.00005 mm.
func TestSpanOfContour(t *testing.T) {
	for _, c := range []struct {
		name    string
		spec    involute.Spec
		teeth   int
		printed float64 // mm, 0 for none
	}{
		{"handbook, spur", involute.Spec{Teeth: 24, Module: 3, Shift: 0.4, Rack: isoA()}, 4, 32.8266},
		{"handbook, helical", involute.Spec{Teeth: 24, Module: 3, Helix: 25 * involute.Degree, Shift: 0.4, Rack: isoA()}, 5, 42.0085},
		{"helical, left hand", involute.Spec{Teeth: 30, Module: 4, Helix: -25 * involute.Degree, Rack: isoA()}, 5, 55.3614},
		{"one tooth", involute.Spec{Teeth: 20, Module: 1, Rack: isoA()}, 1, 1.7562},
		{"two teeth", involute.Spec{Teeth: 20, Module: 1, Rack: isoA()}, 2, 4.7083},
		{"three teeth", involute.Spec{Teeth: 20, Module: 1, Rack: isoA()}, 3, 7.6604},
		{"undercut", involute.Spec{Teeth: 9, Module: 2, Rack: isoA()}, 2, 0},
		{"many teeth", involute.Spec{Teeth: 100, Module: 1, Rack: isoA()}, 12, 0},
		{"chamfered", involute.Spec{Teeth: 45, Module: 1, Rack: isoA(), TipChamfer: 0.1}, 5, 0},
		{"steep", involute.Spec{Teeth: 12, Module: 1, Helix: 45 * involute.Degree, Rack: isoA()}, 4, 0},
	} {
		tt := tooth(t, c.spec, 0)
		for _, tolerance := range []float64{1e-5, 0.001, 0.0025} {
			s, report := drawn(t, tt, tolerance)
			least, greatest, err := s.Span(c.teeth, 0, math.Inf(1))
			if err != nil {
				t.Errorf("%s: %v", c.name, err)
				continue
			}
			want, slack := tt.Span(c.teeth), 2*report.MaxDeviation+1e-9
			if math.Abs(least-want) > slack || math.Abs(greatest-want) > slack || greatest-least > 1e-9 {
				t.Errorf("%s, ±%g: span %.7f to %.7f, want %.7f ± %.7f", c.name, tolerance, least, greatest, want, slack)
			}
			if c.printed != 0 && math.Abs(least-c.printed) > slack+5e-5 {
				t.Errorf("%s, ±%g: span %.5f, printed %.4f", c.name, tolerance, least, c.printed)
			}
		}
	}
}

// The formula gives a number for every count of teeth; the faces do not. For
// m 1, z 20 the contact over five teeth would be at diameter 23.178, outside the
// tip of 22; with 60 teeth over three it would be inside the form diameter.
func TestSpanWithoutContact(t *testing.T) {
	few := tooth(t, involute.Spec{Teeth: 20, Module: 1, Rack: isoA()}, 0)
	many := tooth(t, involute.Spec{Teeth: 60, Module: 1, Rack: isoA()}, 0)
	helical := tooth(t, involute.Spec{Teeth: 24, Module: 3, Helix: 25 * involute.Degree, Rack: isoA()}, 0)
	for _, c := range []struct {
		tooth involute.Tooth
		teeth int
		want  string // "" where it can be measured
	}{
		{few, 0, "1 to 19"}, {few, 1, ""}, {few, 4, ""}, {few, 5, "fewer"}, {few, 12, "fewer"}, {few, 19, "fewer"}, {few, 20, "1 to 19"},
		{many, 3, "more"}, {many, 9, "fewer"},
		{helical, 1, "more"}, {helical, 8, "fewer"}, {helical, 16, "fewer"}, {helical, 22, "fewer"}, {helical, 23, "fewer"},
	} {
		s, _ := drawn(t, c.tooth, 1e-5) // a coarse chain's own ends lie a little off
		_, _, err := s.Span(c.teeth, 0, math.Inf(1))
		if (err == nil) != (c.want == "") || (err != nil && !strings.Contains(err.Error(), c.want)) {
			t.Errorf("%d of %d teeth: %v, want %q", c.teeth, c.tooth.Teeth(), err, c.want)
		}
		// The tooth's own formula agrees on where the faces touch, if both alike.
		if k := c.teeth; k >= 1 && k < c.tooth.Teeth() {
			d := c.tooth.SpanContactDiameter(c.tooth.Span(k))
			if on := d > c.tooth.FormDiameter() && d < c.tooth.TipFormDiameter(); on != (err == nil) {
				t.Errorf("%d of %d teeth touch at diameter %.3f, and the faces say: %v", k, c.tooth.Teeth(), d, err)
			}
		}
	}
}

// flankPoints returns points all along a flank.
func flankPoints(s Section, i int) []involute.Vec {
	const n = 400
	var out []involute.Vec
	for _, c := range s.flankRun(i) {
		for i := range n + 1 {
			q, _ := c.At(float64(i) / n)
			out = append(out, q)
		}
	}
	return out
}

// Brute force: points all along the two flanks, held between lines of every
// direction in which neither touches an end of its flank, and (helical) swept
// along the helix and held between planes of every tilt. Points lie under 1e-3 mm
// apart on radii of 3 mm and more, less than 1e-7 mm below the arcs.
func TestSpanByBruteForce(t *testing.T) {
	for _, c := range []struct {
		spec  involute.Spec
		teeth int
	}{
		{involute.Spec{Teeth: 24, Module: 2, Rack: isoA()}, 3},
		{involute.Spec{Teeth: 17, Module: 1, Shift: 0.3, Rack: isoA()}, 3},
		{involute.Spec{Teeth: 16, Module: 1, Helix: 20 * involute.Degree, Rack: isoA()}, 3},
	} {
		tt := tooth(t, c.spec, 0.02)
		s, _ := drawn(t, tt, 0.01)
		got, _, err := s.Span(c.teeth, 0, math.Inf(1))
		if err != nil {
			t.Fatal(err)
		}
		far, near := flankPoints(s, 2*c.teeth-1), flankPoints(s, 0)
		across := s.tooth(0) + float64(c.teeth-1)*math.Pi/float64(s.Teeth()) + math.Pi/2
		want, slack := bruteRocked(far, near, across), 1e-4
		if s.twist != 0 {
			want, slack = bruteTilted(far, near, across, s.twist, tt.BaseHelix()), 2e-5
		}
		if math.Abs(got-want) > slack {
			t.Errorf("z %d over %d: %.7f, by brute force %.7f", c.spec.Teeth, c.teeth, got, want)
		}
	}
}

// bruteRocked returns the least width of the points over the directions near
// across, out to half way to where one of the extremes is no longer an inner point of its flank.
func bruteRocked(far, near []involute.Vec, across float64) float64 {
	const step = 1e-3
	at := func(i int) (width float64, inner bool) {
		e := involute.Polar(1, across+float64(i)*step)
		a, top := extreme(far, e)
		b, low := extreme(near, e.Scale(-1))
		return top + low, a > 0 && a < len(far)-1 && b > 0 && b < len(near)-1
	}
	edge := func(sign int) int {
		for i := 0; ; i += sign {
			if _, inner := at(i); !inner {
				return i
			}
		}
	}
	least := math.Inf(1)
	for i := edge(-1) / 2; i <= edge(1)/2; i++ {
		width, _ := at(i)
		least = math.Min(least, width)
	}
	return least
}

// extreme returns which point reaches farthest in a direction, and how far.
func extreme(points []involute.Vec, e involute.Vec) (at int, reach float64) {
	reach = math.Inf(-1)
	for i, p := range points {
		if d := p.Dot(e); d > reach {
			at, reach = i, d
		}
	}
	return at, reach
}

// bruteTilted returns the least distance of two planes, over their tilt, that
// hold the points swept along the helix half a radian each way. The tilt is
// searched within 0.05 of the base helix angle, backward as the helix here rises.
func bruteTilted(far, near []involute.Vec, across, twist, baseHelix float64) float64 {
	reach := func(points []involute.Vec, direction, tilt float64) float64 {
		sin, cos := math.Sincos(tilt)
		most := math.Inf(-1)
		for i := 0; i < len(points); i += 5 {
			r, angle := points[i].Norm(), points[i].Angle()-direction
			for j := range 601 {
				turned := 0.5 * float64(j-300) / 300
				most = math.Max(most, cos*r*math.Cos(angle+turned)+sin*turned/twist)
			}
		}
		return most
	}
	_, low := findMaximum(func(tilt float64) float64 {
		return -reach(far, across, tilt) - reach(near, across+math.Pi, -tilt)
	}, -baseHelix-0.05, -baseHelix+0.05)
	return -low
}

// Told where the flanks end, the faces read the same: on gears of all sizes, whose
// tip corners lie on the limit to within rounding.
func TestSpanBetweenTheEndsOfTheFlanks(t *testing.T) {
	for z := 8; z <= 70; z++ {
		for _, mill := range []float64{0, 1.5} {
			spec := involute.Spec{Teeth: z, Module: 2, Shift: 0.2, Rack: isoA(), Mill: involute.MillSpec{Diameter: mill}}
			if z%3 == 0 {
				spec.TipRound = 0.2
			}
			tt := tooth(t, spec, 0.03)
			s, report := drawn(t, tt, 0.0025)
			k := int(math.Round(tt.IdealSpanTeeth()))
			least, greatest, err := s.Span(k, tt.FormDiameter()/2, tt.InvoluteEndDiameter()/2)
			if want := tt.Span(k); err != nil || max(want-least, greatest-want) > 2*report.MaxDeviation+1e-6 {
				t.Errorf("z %d, mill %g: %.6f to %.6f over %d teeth, want %.6f; %v", z, mill, least, greatest, k, want, err)
			}
		}
	}
}
