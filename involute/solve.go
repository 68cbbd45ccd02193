package involute

import (
	"errors"
	"math"
)

// ErrNoBracket is returned by FindRoot where the function has the same sign at
// both ends, or is not a number there.
var ErrNoBracket = errors.New("no change of sign between the ends")

// ErrNotConverged is returned by FindRoot where the function is not a number
// inside the bracket, or the steps run out.
var ErrNotConverged = errors.New("no root found in the bracket")

// FindRoot returns a zero of f between a and b, where f must change its sign.
// It is Brent's method (R. P. Brent, Algorithms for Minimization without
// Derivatives, 1973, chapter 4): it never leaves the bracket, and ends with a
// bracket no wider than a few units in the last place, or with an error.
func FindRoot(f func(float64) float64, a, b float64) (float64, error) {
	fa, fb := f(a), f(b)
	if fa == 0 {
		return a, nil
	}
	if fb == 0 {
		return b, nil
	}
	if !(fa < 0 && fb > 0) && !(fa > 0 && fb < 0) {
		return 0, ErrNoBracket
	}
	c, fc, d, e := a, fa, b-a, b-a
	for range 200 {
		if (fb > 0) == (fc > 0) {
			c, fc, d, e = a, fa, b-a, b-a
		}
		if math.Abs(fc) < math.Abs(fb) {
			a, b, c = b, c, b
			fa, fb, fc = fb, fc, fb
		}
		// Two units in the last place of b: the root cannot be told closer.
		tol := 2 * ulp(b)
		half := (c - b) / 2
		if math.Abs(half) <= tol || fb == 0 {
			return b, nil
		}
		d, e = brentStep(a, b, c, fa, fb, fc, d, e, tol)
		a, fa = b, fb
		if math.Abs(d) > tol {
			b += d
		} else {
			b += math.Copysign(tol, half)
		}
		if fb = f(b); math.IsNaN(fb) {
			return 0, ErrNotConverged
		}
	}
	return 0, ErrNotConverged
}

// brentStep returns the next step and the one before it: inverse quadratic or
// secant interpolation where that shrinks the bracket fast enough, else a bisection.
func brentStep(a, b, c, fa, fb, fc, d, e, tol float64) (step, previous float64) {
	half := (c - b) / 2
	if math.Abs(e) < tol || math.Abs(fa) <= math.Abs(fb) {
		return half, half
	}
	s := fb / fa
	var p, q float64
	if a == c {
		p, q = 2*half*s, 1-s
	} else {
		u, r := fa/fc, fb/fc
		p = s * (2*half*u*(u-r) - (b-a)*(r-1))
		q = (u - 1) * (r - 1) * (s - 1)
	}
	if p > 0 {
		q = -q
	}
	p = math.Abs(p)
	if 2*p < min(3*half*q-math.Abs(tol*q), math.Abs(e*q)) {
		return p / q, d
	}
	return half, half
}

// ulp returns the distance from |x| to the next float64.
func ulp(x float64) float64 {
	x = math.Abs(x)
	return math.Nextafter(x, math.Inf(1)) - x
}

// LargestFitting returns the largest value between low, which fits, and high for
// which fits says yes, by halving down to the last digit or to 60 times. Where
// fits changes its mind more than once it is one of the changes.
func LargestFitting(fits func(float64) bool, low, high float64) float64 {
	for range 60 {
		mid := (low + high) / 2
		if mid == low || mid == high {
			break
		}
		if fits(mid) {
			low = mid
		} else {
			high = mid
		}
	}
	return low
}
