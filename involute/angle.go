// Package involute holds what gears are: pure mathematics of involute
// cylindrical gears, in mm and radians, without I/O, text or units.
//
// Three ideas carry it. A Gear is a specification; the one number that
// matters beside it is its tooth thickness, and the two together are a Tooth.
// A tooth is a list of Curves. Every measurement is a pair of functions,
// thickness to measurement and back.
//
// The formulas follow ISO 21771:2007 and its sign rule: an internal gear has
// z < 0, so its diameters and the center distance of its mesh are negative,
// and one set of formulas serves both kinds.
package involute

import "math"

// Degree is one degree in radians: 20 * Degree.
const Degree = math.Pi / 180

// tanSeries holds the coefficients of tan α − α = Σ c_k α^(2k+3), k = 0, 1, …:
// c = 2^2n (2^2n − 1) |B_2n| / (2n)!, n = k + 2, with Bernoulli numbers B
// (DLMF 4.19.3).
var tanSeries = [...]float64{
	1.0 / 3, 2.0 / 15, 17.0 / 315, 62.0 / 2835, 1382.0 / 155925, 21844.0 / 6081075,
	929569.0 / 638512875, 6404582.0 / 10854718875,
	2.3912911424355248149e-4, 9.6915379569294503256e-5, 3.9278323883316834053e-5,
	1.5918905069328964741e-5, 6.4516892156554307632e-6, 2.6147711512907545543e-6,
	1.0597268320104654351e-6, 4.2949110782738058548e-7, 1.740661896357164778e-7,
}

// seriesLimit is the angle up to which Inv sums the series. Above it tan α − α
// loses at most one unit in the last place of tan α, 5.6e-17, out of
// inv 0.4 = 0.0228: a relative 2.5e-15. Below it the first coefficient left out
// (k = 17) times α^37 stays under 1e-16 of the sum.
const seriesLimit = 0.4

// Inv returns the involute function inv α = tan α − α (ISO 21771:2007, clause 4),
// α in radians, 0 ≤ α < π/2, to a relative 1e-14.
func Inv(alpha float64) float64 {
	if math.Abs(alpha) > seriesLimit {
		return math.Tan(alpha) - alpha
	}
	a2 := alpha * alpha
	sum := 0.0
	for k := len(tanSeries) - 1; k >= 0; k-- {
		sum = sum*a2 + tanSeries[k]
	}
	return sum * a2 * alpha
}

// inverseSeries holds the coefficients of α = q Σ c_k q^2k with q = (3 inv α)^(1/3),
// the reversion of the series of tan α − α.
var inverseSeries = [...]float64{
	1, -2.0 / 15, 3.0 / 175, -2.0 / 1575, -16.0 / 202125, 362.0 / 9384375, -49711.0 / 12415528125,
}

// inverseStart returns an angle within about one part in a thousand of the
// solution: the reverted series for small y; for large y the first terms of
// cot δ = y + π/2 − δ about δ = π/2 − α = 0.
func inverseStart(y float64) float64 {
	if y > 1.5 {
		c := y + math.Pi/2
		return math.Pi/2 - 1/(c-2/(3*c))
	}
	q := math.Cbrt(3 * y)
	v := q * q
	sum := 0.0
	for k := len(inverseSeries) - 1; k >= 0; k-- {
		sum = sum*v + inverseSeries[k]
	}
	return q * sum
}

// InverseInv returns the angle α in [0, π/2) with inv α = y, to 1e-14 rad. It
// is false where there is none that can be told from 90°: y negative, not finite,
// or above 1e15. Each step is
// Halley's (third order) and calls math.Tan at most once; two or three steps do.
func InverseInv(y float64) (alpha float64, ok bool) {
	if !(y >= 0 && y <= 1e15) {
		return 0, false
	}
	if y == 0 {
		return 0, true
	}
	alpha = inverseStart(y)
	for range 4 {
		inv := Inv(alpha)
		f, t := inv-y, alpha+inv // t = tan α
		step := f * t / (t*t*t - f*(1+t*t))
		alpha -= step
		// The next error is about step³ over the square of the distance to
		// the nearer end, so this step leaves less than 1e-14 of it.
		if math.Abs(step) <= 1e-5*min(alpha, math.Pi/2-alpha) {
			break
		}
	}
	return alpha, true
}

// invOfCos returns inv α for cos α = dBase/d without losing digits near the
// base circle, where acos would: tan α = √(d² − d_b²)/d_b. Both diameters
// carry the same sign and |d| ≥ |dBase|; inside the base circle it returns 0.
func invOfCos(dBase, d float64) float64 {
	return Inv(math.Atan(tanOfCos(dBase, d)))
}

// tanOfCos returns tan α for cos α = dBase/d, 0 inside the base circle.
func tanOfCos(dBase, d float64) float64 {
	q := (d - dBase) * (d + dBase)
	if q <= 0 {
		return 0
	}
	return math.Sqrt(q) / math.Abs(dBase)
}
