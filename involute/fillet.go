package involute

import "math"

// A Fillet is the root curve that the tip of the rack generates: the exact
// trochoid, in the transverse section. The tool's tip circle is an ellipse
// there, stretched by 1/cos β along the pitch line.
//
// Its parameter is Side·ψ, ψ ≥ 0 being the angle in the tool's normal
// section between the tip's normal and the line to the gear's center: 0 at the
// bottom, 90° − α_n where the tip meets the tool's straight flank. For each ψ
// the tool stands where the normal passes through the pitch point (the law of
// gearing), and the point then cut is turned into the gear. In a frame with the
// space's center line as y and the pitch point at (0, r), with lengths in mm:
//
//	A = cos β (h tan ψ + ρ sin ψ)        across, from the center line
//	Y = r − h − ρ cos ψ                  up, from the gear's center
//	u = A − (e + ρ sin ψ)/cos β          the tool's travel
//	point = (A, Y) turned by u/r
//
// with h = (h_fP* − ρ* − x_E) m_n, ρ = ρ* m_n and e half the tool's tip land.
type Fillet struct {
	R, H, Rho, E float64 // r, h, ρ, e, mm
	CosBeta      float64
	Space        float64 // polar angle of the space's center line
	Side         float64 // +1: at the space's counter-clockwise side, run from the root up; −1: at the other, run down
	T0, T1       float64
}

// Domain returns T0 and T1.
func (f Fillet) Domain() (t0, t1 float64) { return f.T0, f.T1 }

// motion returns A, Y and u/r with their first and second derivatives by ψ.
func (f Fillet) motion(psi float64) (a, y, phi [3]float64) {
	s, c := math.Sincos(psi)
	tan, sec2 := s/c, 1/(c*c)
	a = [3]float64{
		f.CosBeta * (f.H*tan + f.Rho*s),
		f.CosBeta * (f.H*sec2 + f.Rho*c),
		f.CosBeta * (2*f.H*sec2*tan - f.Rho*s),
	}
	y = [3]float64{f.R - f.H - f.Rho*c, f.Rho * s, f.Rho * c}
	x := [3]float64{(f.E + f.Rho*s) / f.CosBeta, f.Rho * c / f.CosBeta, -f.Rho * s / f.CosBeta}
	for i := range phi {
		phi[i] = (a[i] - x[i]) / f.R
	}
	return a, y, phi
}

// derivatives returns the point and its two derivatives by ψ in the space's
// frame: x across, y along the center line.
func (f Fillet) derivatives(psi float64) (p, d1, d2 Vec) {
	a, y, phi := f.motion(psi)
	q, q1, q2 := Vec{a[0], y[0]}, Vec{a[1], y[1]}, Vec{a[2], y[2]}
	p = q.Rotate(phi[0])
	d1 = q1.Add(q.Left().Scale(phi[1])).Rotate(phi[0])
	d2 = q2.Add(q1.Left().Scale(2 * phi[1])).Add(q.Left().Scale(phi[2])).
		Sub(q.Scale(phi[1] * phi[1])).Rotate(phi[0])
	return p, d1, d2
}

// place turns a vector of the space's frame into the gear's, on the fillet's side.
func (f Fillet) place(v Vec) Vec {
	return Vec{v.Y, f.Side * v.X}.Rotate(f.Space)
}

// At returns the point and its derivative.
func (f Fillet) At(t float64) (p, dp Vec) {
	q, d1, _ := f.derivatives(f.Side * t)
	return f.place(q), f.place(d1.Scale(f.Side))
}

// Curvature returns the curvature, negative where the root is hollow. One of
// mirroring and running backwards applies on each side, so the sign of the
// space's frame is turned on both.
func (f Fillet) Curvature(t float64) float64 {
	_, d1, d2 := f.derivatives(f.Side * t)
	return -d1.Cross(d2) / math.Pow(d1.Norm(), 3)
}

func (Fillet) curve() {}
