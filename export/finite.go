package export

import "math"

// positive tells whether x is a finite number above 0.
func positive(x float64) bool { return x > 0 && finite(x) }

// finite tells whether all numbers are neither NaN nor infinite.
func finite(xs ...float64) bool {
	for _, x := range xs {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
