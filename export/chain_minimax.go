package export

import "math"

// peaks is a problem of least greatest residual: numbers x are sought for which
// no |residual| is over 1, by making the greatest as small as can be. Each
// number moves only some of the residuals.
type peaks interface {
	// residuals fills out for x and reports whether x makes sense at all. What it
	// was called for last is the x from which changed starts.
	residuals(x, out []float64) bool
	// reach returns which residuals number i moves.
	reach(i int) reach
	// changed fills in those residuals of out for x, which differs in number i alone.
	changed(x []float64, i int, out []float64) bool
	// good reports whether residuals are low enough for accept to be asked.
	good(r []float64) bool
	// accept ends the search.
	accept(x []float64) bool
}

// A reach is two ranges of residuals, from ≤ j < to, either of which may be empty.
type reach [2]struct{ from, to int }

const (
	// highestNorm is where the search ends: the 2048-norm of some hundred
	// residuals is within 0.3 % of the greatest.
	highestNorm = 2048

	// normSteps is the most steps taken in one norm.
	normSteps = 8

	// outOfReach is the mean residual, in the sense of a norm's minimum, at which
	// the search is given up: no x brings the greatest below the least mean, and
	// 1 % is left for a minimum that was not quite reached.
	outOfReach = 1.01

	// quietWeight keeps residuals far below the greatest in the equations, so
	// that they can be solved where only a few peaks count.
	quietWeight = 1e-8
)

// A minimizer holds the numbers x of a problem, where it has come to.
type minimizer struct {
	peaks
	x, step []float64 // step: of the differences from which slopes are taken
	damping float64

	r, trial, ahead []float64 // residuals: at x, and at other x that are tried
	slopes          []slope
}

// A slope is how residuals change with one number: those it reaches.
type slope struct {
	reach
	d [2][]float64
}

// solve lowers the greatest of count residuals until accept agrees, and reports
// whether it did. It minimizes Σ|r|^p for p = 2, 4, 8 …, each from where the
// one before ended.
func (m *minimizer) solve(count int) bool {
	m.r, m.trial, m.ahead = make([]float64, count), make([]float64, count), make([]float64, count)
	m.slopes = make([]slope, len(m.x))
	if !m.residuals(m.x, m.r) {
		return false
	}
	if m.good(m.r) && m.accept(m.x) {
		return true
	}
	m.damping = 1e-6
	for p := 2.0; len(m.x) > 0 && p <= highestNorm; p *= 2 {
		for range normSteps {
			gain := m.improve(p)
			if m.good(m.r) && m.accept(m.x) {
				return true
			}
			if gain < 0.02/p {
				break
			}
		}
		if powerMean(m.r, p) > outOfReach {
			break
		}
	}
	return false
}

// improve takes one step that lowers the p-norm, by Newton's method damped as
// by Levenberg and Marquardt: with the slopes J and the weights w = |r|^(p−2) it solves
//
//	((p − 1) JᵀwJ + λ diag) Δx = −Jᵀ w r.
//
// It returns by what share the norm fell, 0 where no step lowers it.
func (m *minimizer) improve(p float64) (gain float64) {
	if !m.findSlopes() {
		return 0
	}
	now := powerMean(m.r, p)
	next := make([]float64, len(m.x))
	a, b := m.equations(p)
	for range 12 {
		if dx, ok := a.solve(b, m.damping); ok {
			for i := range next {
				next[i] = m.x[i] + dx[i]
			}
			if m.residuals(next, m.trial) {
				if gain = 1 - powerMean(m.trial, p)/now; gain > 0 {
					copy(m.x, next)
					m.r, m.trial = m.trial, m.r
					m.damping = max(m.damping/10, 1e-12)
					return gain
				}
			}
		}
		m.damping *= 10
	}
	m.damping = 1e-4
	return 0
}

// findSlopes fills in how the residuals r at x change with each number, from a
// step to both sides.
func (m *minimizer) findSlopes() bool {
	if !m.residuals(m.x, m.r) {
		return false
	}
	for i := range m.slopes {
		x, h := m.x[i], m.step[i]
		m.x[i] = x - h
		ok := m.changed(m.x, i, m.trial)
		m.x[i] = x + h
		ok = m.changed(m.x, i, m.ahead) && ok
		m.x[i] = x
		if !ok {
			return false
		}
		s := &m.slopes[i]
		s.reach = m.reach(i)
		for k, in := range s.reach {
			s.d[k] = s.d[k][:0]
			for j := in.from; j < in.to; j++ {
				s.d[k] = append(s.d[k], (m.ahead[j]-m.trial[j])/(2*h))
			}
		}
	}
	return true
}

// equations sets up the Newton step. Residuals are taken in units of the
// greatest, which leaves the step as it is.
func (m *minimizer) equations(p float64) (bandMatrix, []float64) {
	top := highest(m.r)
	weight := make([]float64, len(m.r))
	for j, x := range m.r {
		weight[j] = 1
		if s := math.Abs(x) / top; p > 2 {
			weight[j] = power(s, p) / max(s*s, 1e-300)
		}
	}
	a, b := make(bandMatrix, len(m.x)), make([]float64, len(m.x))
	for i := range a {
		s := &m.slopes[i]
		for k, in := range s.reach {
			for j := in.from; j < in.to; j++ {
				b[i] -= s.d[k][j-in.from] * weight[j] * m.r[j]
			}
		}
		for k := i; k >= 0; k-- {
			sum, any := s.product(&m.slopes[k], weight)
			if !any && k < i { // the diagonal stays, 0 for a number that moves nothing
				break
			}
			a[i] = append(a[i], (p-1)*sum)
		}
	}
	return a, b
}

// product returns the weighted scalar product of two slopes, and whether they
// have any residuals in common.
func (s *slope) product(other *slope, weight []float64) (sum float64, any bool) {
	for k := range s.reach {
		from, to := max(s.reach[k].from, other.reach[k].from), min(s.reach[k].to, other.reach[k].to)
		for j := from; j < to; j++ {
			sum += s.d[k][j-s.reach[k].from] * other.d[k][j-other.reach[k].from] * (weight[j] + quietWeight)
		}
		any = any || from < to
	}
	return sum, any
}

// highest returns the greatest |r|.
func highest(r []float64) float64 {
	top := 0.0
	for _, x := range r {
		top = max(top, math.Abs(x))
	}
	return top
}

// powerMean returns (Σ|r|^p / n)^(1/p).
func powerMean(r []float64, p float64) float64 {
	top := highest(r)
	sum := 0.0
	for _, x := range r {
		sum += power(math.Abs(x)/top, p)
	}
	return top * math.Pow(sum/float64(len(r)), 1/p)
}

// power returns x^p for p a power of 2, by squaring.
func power(x, p float64) float64 {
	for ; p > 1; p /= 2 {
		x *= x
	}
	return x
}

// A bandMatrix is a symmetric matrix with nothing far from its diagonal: row i holds
// a(i,i), a(i,i−1), a(i,i−2) … as far as there is anything.
type bandMatrix [][]float64

// solve returns the x for which a x = b, with the diagonal raised by a share,
// by Cholesky's method; false if a is not positive definite.
func (a bandMatrix) solve(b []float64, damping float64) ([]float64, bool) {
	n := len(a)
	l := make(bandMatrix, n)
	at := func(i, k int) float64 {
		if i-k < len(l[i]) {
			return l[i][i-k]
		}
		return 0
	}
	for i, row := range a {
		if len(row) == 0 {
			return nil, false // a number that moves nothing: an arc too short to hold a sample
		}
		l[i] = append([]float64(nil), row...)
		for k := i - len(row) + 1; k <= i; k++ {
			sum := row[i-k]
			for j := i - len(row) + 1; j < k; j++ {
				sum -= l[i][i-j] * at(k, j)
			}
			if k < i {
				l[i][i-k] = sum / l[k][0]
				continue
			}
			if sum += damping * row[0]; !(sum > 0) {
				return nil, false
			}
			l[i][0] = math.Sqrt(sum)
		}
	}
	x := append([]float64(nil), b...)
	for i := range x {
		for j := i - len(l[i]) + 1; j < i; j++ {
			x[i] -= l[i][i-j] * x[j]
		}
		x[i] /= l[i][0]
	}
	for i := n - 1; i >= 0; i-- {
		x[i] /= l[i][0]
		for j := i - len(l[i]) + 1; j < i; j++ {
			x[j] -= l[i][i-j] * x[i]
		}
	}
	return x, finite(x...)
}
