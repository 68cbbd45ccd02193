package export

// findMaximum returns the place of a maximum of f between a and b, and its value,
// by golden section down to 1e-7 of the bracket, where a smooth maximum is
// flat to the last digit.
func findMaximum(f func(float64) float64, a, b float64) (place, value float64) {
	const g = 0.6180339887498949
	x, y := b-g*(b-a), a+g*(b-a)
	fx, fy := f(x), f(y)
	for range 34 {
		if fx > fy {
			b, y, fy = y, x, fx
			x = b - g*(b-a)
			fx = f(x)
		} else {
			a, x, fx = x, y, fy
			y = a + g*(b-a)
			fy = f(y)
		}
	}
	if fx > fy {
		return x, fx
	}
	return y, fy
}
