package involute

import "math"

// A SpanFace is the part of a measuring face that goes into the tooth space: flat,
// with an edge that reaches Land below the contact, toward the axis (mm; negative
// for an edge above it). The edge is round with Radius, as of a disc or an anvil, or
// with a Radius of 0 straight and HalfWidth to either side along the axis.
type SpanFace struct{ Land, Radius, HalfWidth float64 }

// SpanRoom returns how thick a measuring face may be, outward from the tooth that
// it touches, before it meets the next tooth or the root, with k teeth spanned, mm;
// 0 where it does not even get down to the contact, and +Inf where nothing stands in
// the way of a face of any thickness. The tooth must have an outline (external gears).
//
// With the axis at 0 and the span along x, the faces are the lines x = ±W/2 of a
// spur gear's section, and touch at y = r_b, where all lines that cross the flanks
// squarely meet them. The outermost tooth's center line is (k − 1) π/z from +y, the
// next tooth's 2π/z farther. A face whose edge is at y_0 = r_b − Land has room for
//
//	least x − W/2 of all metal with x > W/2, y ≥ y_0.
//
// The spanned tooth's own flank is hollow nowhere, and lies behind the line that
// touches it; its root may not.
//
// The faces of a helical gear are tilted by β_b: x cos β_b + z sin β_b is the
// distance from the middle, ±W/2, they touch at z = ±W sin β_b/2, and the section at z
// is turned by z tan β_b/r_b, which keeps the face touching the flank at y = r_b.
// Its room is the least distance in front of the face of metal that the face's own
// outline covers, sought in sections along z: it may come out larger than it is, by a hundredth of the module. The face width is
// taken as endless.
// Derived from the geometry; no standard gives it.
func (t Tooth) SpanRoom(k int, f SpanFace) float64 {
	o := t.Outline()
	next := math.Pi/2 - float64(k+1)*math.Pi/t.z
	var metal []turnedCurve
	for _, p := range o.Pieces {
		metal = append(metal, turnedCurve{p.Curve, next})
	}
	for _, p := range o.Pieces {
		if p.Role > RootFillet {
			break // from here on it is the spanned tooth's flank
		}
		metal = append(metal, turnedCurve{p.Curve, next + o.Pitch()})
	}
	if t.Helical() {
		return t.tiltedRoom(metal, t.Span(k), f)
	}
	room := math.Inf(1)
	for _, c := range metal {
		room = min(room, c.roomBeside(t.Span(k)/2, t.db/2-f.Land))
	}
	return room
}

// A turnedCurve is a curve turned about the axis.
type turnedCurve struct {
	Curve
	by float64
}

func (c turnedCurve) at(t float64) (p, dp Vec) {
	p, dp = c.At(t)
	return p.Rotate(c.by), dp.Rotate(c.by)
}

const (
	// roomSteps divides a curve for the search: along a flank or a fillet neither
	// height nor side turns more than once within a step.
	roomSteps = 24
	// onEdge takes up rounding: a point found to lie on an edge is off it by a few
	// units in the last place, 1e-12 mm on a wheel of 5 m.
	onEdge = 1e-9
)

// roomBeside returns the least x − side of the curve's points with x ≥ side and
// y ≥ low, +Inf where there are none. It looks at the curve's ends, where it turns
// toward the face, and where it crosses either line.
func (c turnedCurve) roomBeside(side, low float64) float64 {
	room := math.Inf(1)
	see := func(t float64) {
		if p, _ := c.at(t); p.X >= side-onEdge && p.Y >= low-onEdge {
			room = min(room, max(0, p.X-side))
		}
	}
	over := func(t float64) float64 { p, _ := c.at(t); return p.Y - low }
	off := func(t float64) float64 { p, _ := c.at(t); return p.X - side }
	turns := func(t float64) float64 { _, dp := c.at(t); return dp.X }
	t0, t1 := c.Domain()
	see(t0)
	a := t0
	for i := 1; i <= roomSteps; i++ {
		b := t0 + (t1-t0)*float64(i)/roomSteps
		see(b)
		for _, f := range []func(float64) float64{over, off, turns} {
			if t, err := FindRoot(f, a, b); err == nil {
				see(t)
			}
		}
		a = b
	}
	return room
}

const (
	// sections is how many sections of a helical gear are looked at, first along
	// the whole face and then again between the neighbors of the nearest.
	sections = 48
	// sectionPoints divides each curve of a section: what is nearest between two
	// points of a flank is no nearer than they are by a thousandth of the module.
	sectionPoints = 24
)

// tiltedRoom is SpanRoom of a helical gear: metal holds the curves of the section
// in the middle, w is the span. Heights z are taken from the contact.
func (t Tooth) tiltedRoom(metal []turnedCurve, w float64, f SpanFace) float64 {
	s, c := math.Sincos(t.betaB)
	side, rb := w*c/2, t.db/2
	// The next tooth begins within a pitch of the face and is no wider than another half.
	reach := 1.5 * t.TransversePitch()
	low, high := -f.halfWidth()*c, f.halfWidth()*c+reach*s
	section := func(z float64) float64 {
		room := math.Inf(1)
		for _, m := range metal {
			m.by += (z + w*s/2) * s / c / rb
			room = min(room, m.roomBefore(func(p Vec) (front float64, covered bool) {
				front = (p.X-side)*c + z*s
				return front, front >= -onEdge && f.covers(z*c-(p.X-side)*s, p.Y-rb)
			}))
		}
		return room
	}
	room, at := math.Inf(1), 0.0
	for range 2 {
		step := (high - low) / sections
		for i := range sections + 1 {
			if r := section(low + float64(i)*step); r < room {
				room, at = r, low+float64(i)*step
			}
		}
		if math.IsInf(room, 1) {
			break
		}
		low, high = at-step, at+step
	}
	return room
}

// roomBefore returns how far in front of a face the nearest of the curve's points
// lies that the face covers, +Inf where it covers none: of the points looked at and of
// those where the curve goes under the face's edge.
func (c turnedCurve) roomBefore(face func(p Vec) (front float64, covered bool)) float64 {
	room := math.Inf(1)
	see := func(t float64) bool {
		p, _ := c.at(t)
		front, covered := face(p)
		if covered {
			room = min(room, max(0, front))
		}
		return covered
	}
	t0, t1 := c.Domain()
	before := see(t0)
	for i := 1; i <= sectionPoints; i++ {
		a, b := t0+(t1-t0)*float64(i-1)/sectionPoints, t0+(t1-t0)*float64(i)/sectionPoints
		here := see(b)
		if here != before {
			if before {
				a, b = b, a
			}
			LargestFitting(func(u float64) bool { return !see(a + (b-a)*u) }, 0, 1)
		}
		before = here
	}
	return room
}

func (f SpanFace) halfWidth() float64 {
	if f.Radius > 0 {
		return f.Radius
	}
	return f.HalfWidth
}

// covers reports whether a point of the face's plane lies on the face: along the
// axis and up from the contact, mm. What is over the edge counts, to any height.
func (f SpanFace) covers(along, up float64) bool {
	if math.Abs(along) > f.halfWidth() {
		return false
	}
	edge := -f.Land
	if f.Radius > 0 {
		edge += f.Radius - math.Sqrt(f.Radius*f.Radius-along*along)
	}
	return up >= edge-onEdge
}
