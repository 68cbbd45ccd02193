package involute

// Area returns the area of the whole transverse section, mm²: z times
// ½∮ (x dy − y dx) over one pitch, by Green's theorem. Lines, arcs and flanks
// are integrated in closed form, other curves by Gauss-Legendre quadrature.
// A ring, which has no outline yet, has the area 0.
func (o Outline) Area() float64 {
	sum := 0.0
	for _, p := range o.Pieces {
		sum += sector(p.Curve)
	}
	return sum * float64(o.Teeth)
}

// sector returns the area that the line from the origin to a curve's point
// sweeps, counter-clockwise positive. With p = r_b(e − t e') and dp = r_b t e a
// flank's x dy − y dx is r_b² t² dt.
func sector(c Curve) float64 {
	switch c := c.(type) {
	case Line:
		return c.From.Cross(c.To) / 2
	case Arc:
		from, to := Polar(c.Radius, c.Start), Polar(c.Radius, c.Start+c.Sweep)
		return (c.Radius*c.Radius*c.Sweep + c.Center.Cross(to.Sub(from))) / 2
	case Flank:
		return c.BaseRadius * c.BaseRadius * (c.T1*c.T1*c.T1 - c.T0*c.T0*c.T0) / 6
	}
	t0, t1 := c.Domain()
	return integrate(func(t float64) float64 { p, dp := c.At(t); return p.Cross(dp) / 2 }, t0, t1)
}

// integralParts is into how many parts an integral is cut. With five points in
// each, exact for polynomials of degree 9, a fillet's area comes out to the
// last few digits.
const integralParts = 32

// integrate returns the integral of f from a to b by the composite five-point
// Gauss-Legendre rule (Abramowitz and Stegun, Handbook of Mathematical
// Functions, 1964, table 25.4).
func integrate(f func(float64) float64, a, b float64) float64 {
	nodes := [...]float64{0, 0.5384693101056831, 0.9061798459386640}
	weights := [...]float64{0.5688888888888889, 0.4786286704993665, 0.2369268850561891}
	half := (b - a) / (2 * integralParts)
	sum := 0.0
	for i := range integralParts {
		middle := a + float64(2*i+1)*half
		sum += weights[0] * f(middle)
		for j := 1; j < len(nodes); j++ {
			sum += weights[j] * (f(middle-half*nodes[j]) + f(middle+half*nodes[j]))
		}
	}
	return sum * half
}
