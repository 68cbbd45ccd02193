package involute

import (
	"math"
	"testing"
)

// The brute checks know a gear only as the drawn curves of its outline, or a
// tool as the region that a workman's drawing would show, and find contacts by
// searching: sampling, then golden sections. None of the closed formulas of
// this package is used in them.

// goldenShare is the share of a bracket that one golden section keeps.
const goldenShare = 0.6180339887498949

// golden returns a minimum of f in [a, b], which should hold only one. Seventy
// sections narrow the bracket to 2e-15 of itself; the value of a smooth
// minimum is then as good as f.
func golden(f func(float64) float64, a, b float64) (x, fx float64) {
	l, r := b-goldenShare*(b-a), a+goldenShare*(b-a)
	fl, fr := f(l), f(r)
	for range 70 {
		if fl <= fr {
			b, r, fr = r, l, fl
			l = b - goldenShare*(b-a)
			fl = f(l)
		} else {
			a, l, fl = l, r, fr
			r = a + goldenShare*(b-a)
			fr = f(r)
		}
	}
	if fl <= fr {
		return l, fl
	}
	return r, fr
}

// lowest returns the least value of f in [a, b]: n steps, then golden sections
// about every low step, and both ends.
func lowest(f func(float64) float64, a, b float64, n int) (x, fx float64) {
	x, fx = a, f(a)
	keep := func(u, fu float64) {
		if fu < fx {
			x, fx = u, fu
		}
	}
	keep(b, f(b))
	at := func(i int) float64 { return a + (b-a)*float64(i)/float64(n) }
	before, here := math.Inf(1), f(a)
	for i := range n + 1 {
		after := math.Inf(1)
		if i < n {
			after = f(at(i + 1))
		}
		if here <= before && here <= after && !math.IsInf(here, 1) {
			keep(golden(f, at(max(i-1, 0)), at(min(i+1, n))))
		}
		before, here = here, after
	}
	return x, fx
}

// highest returns the greatest value of f in [a, b], like lowest.
func highest(f func(float64) float64, a, b float64, n int) (x, fx float64) {
	x, fx = lowest(func(u float64) float64 { return -f(u) }, a, b, n)
	return x, -fx
}

// bisect returns where yes turns: it holds at a and not at b.
func bisect(yes func(float64) bool, a, b float64) float64 {
	for range 200 {
		mid := a + (b-a)/2
		if mid == a || mid == b {
			break
		}
		if yes(mid) {
			a = mid
		} else {
			b = mid
		}
	}
	return a + (b-a)/2
}

// pieces returns the outline's curves of the roles asked for.
func (o Outline) pieces(roles ...Role) []Curve {
	var cs []Curve
	for _, p := range o.Pieces {
		for _, r := range roles {
			if p.Role == r {
				cs = append(cs, p.Curve)
			}
		}
	}
	return cs
}

// A worst keeps the largest disagreement it has seen.
type worst struct{ value float64 }

func (w *worst) see(x float64) {
	if !(math.Abs(x) <= w.value) {
		w.value = math.Abs(x)
	}
}

func (w *worst) within(t *testing.T, what string, tol float64) {
	t.Helper()
	if !(w.value <= tol) {
		t.Errorf("%s: off by %.3g, at most %.3g allowed", what, w.value, tol)
	}
	t.Logf("%s: worst %.2g", what, w.value)
}
