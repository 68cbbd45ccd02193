package involute

import "math"

// A Profile is the exact outline of a gear's teeth, ready to be held against points.
type Profile struct {
	half  []Piece   // from the root land to the tip land, below a tooth on +x
	reach []float64 // the greatest radius of each
	pitch float64
}

// Profile returns the tooth's exact transverse profile, repeated round the gear
// with a tooth on the +x axis. It is empty for a ring, which has no outline yet.
func (t Tooth) Profile() Profile {
	if t.z < 0 {
		return Profile{}
	}
	land := t.landAngle()
	p := Profile{half: append(t.firstHalf(), Piece{Arc{Radius: t.da / 2, Start: -land, Sweep: 2 * land}, TipLand}), pitch: 2 * math.Pi / t.z}
	for _, c := range p.half {
		_, t1 := c.Domain()
		end, _ := c.At(t1) // radii grow along the first half
		p.reach = append(p.reach, end.Norm())
	}
	return p
}

// Offset returns how far a point lies from the profile, mm: positive outside the
// metal. +Inf for an empty profile.
func (p Profile) Offset(v Vec) float64 {
	best := math.Inf(1)
	if len(p.half) == 0 {
		return best
	}
	r := v.Norm()
	q := Polar(r, -math.Abs(math.Remainder(v.Angle(), p.pitch))) // below the nearest tooth's center
	low := 0.0
	for i, c := range p.half {
		// A curve between the radii low and reach is no nearer than the point is to that ring.
		if max(low-r, r-p.reach[i]) < math.Abs(best) {
			if d := offset(c.Curve, q); math.Abs(d) < math.Abs(best) {
				best = d
			}
		}
		low = p.reach[i]
	}
	return best
}

// offset returns the distance of a point from a curve with the sign of its
// side: positive on the right, where there is no metal.
func offset(c Curve, q Vec) float64 {
	p, dp := c.At(nearest(c, q))
	d := q.Sub(p)
	return math.Copysign(d.Norm(), d.Cross(dp))
}

// nearest returns the parameter of the point of the curve that is nearest to q.
//
// On an involute the normal through q touches the base circle: with q on the
// involute that leaves the base circle at φ', the foot is at roll φ' + t' − φ.
func nearest(c Curve, q Vec) float64 {
	t0, t1 := c.Domain()
	clamp := func(t float64) float64 { return min(max(t, t0), t1) }
	switch c := c.(type) {
	case Line:
		d := c.To.Sub(c.From)
		return clamp(q.Sub(c.From).Dot(d) / d.Dot(d))
	case Arc:
		turn := math.Remainder(q.Sub(c.Center).Angle()-c.Start-c.Sweep/2, 2*math.Pi)
		return clamp(0.5 + turn/c.Sweep)
	case Flank:
		r := q.Norm()
		if r <= c.BaseRadius {
			return clamp(0)
		}
		roll := math.Copysign(tanOfCos(2*c.BaseRadius, 2*r), c.T0+c.T1)
		middle := (c.T0 + c.T1) / 2 // with one or two teeth the roll may pass half a turn
		return clamp(middle + math.Remainder(q.Angle()+math.Atan(roll)-c.BaseAngle-middle, 2*math.Pi))
	}
	return nearestBySteps(c, q)
}

// nearSteps divides a fillet or relief: from a point deep in the metal under a
// fillet several places are square to it, never two of them within a step.
const nearSteps = 8

// nearestBySteps is nearest for a curve without a closed solution: between the
// neighbors of the nearest of some points, where the way to q is square to the curve.
func nearestBySteps(c Curve, q Vec) float64 {
	t0, t1 := c.Domain()
	at := func(i int) float64 { return t0 + (t1-t0)*float64(i)/nearSteps }
	best, least := 0, math.Inf(1)
	for i := range nearSteps + 1 {
		if p, _ := c.At(at(i)); p.Sub(q).Norm() < least {
			best, least = i, p.Sub(q).Norm()
		}
	}
	low, high := at(max(best-1, 0)), at(min(best+1, nearSteps))
	along := func(t float64) float64 { p, dp := c.At(t); return p.Sub(q).Dot(dp) }
	if along(low) >= 0 {
		return low
	}
	if along(high) <= 0 {
		return high
	}
	t, err := FindRoot(along, low, high)
	if err != nil {
		return at(best)
	}
	return t
}
