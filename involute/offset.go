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

// Offset returns how far a point lies from the profile along the normal, mm:
// positive outside the metal. Exact for points nearer than the profile's radii of
// curvature. +Inf for an empty profile.
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
		return clamp(math.Remainder(q.Angle()+math.Atan(roll)-c.BaseAngle, 2*math.Pi))
	}
	along := func(t float64) float64 { p, dp := c.At(t); return p.Sub(q).Dot(dp) }
	if along(t0) >= 0 {
		return t0
	}
	if along(t1) <= 0 {
		return t1
	}
	t, err := FindRoot(along, t0, t1)
	if err != nil {
		return t0
	}
	return t
}
