package export

import (
	"math"
	"testing"

	"flankwright/involute"
	"pgregory.net/rapid"
)

// distanceToPiece is the distance from q to an arc or line by its center: to the
// circle inside the sector, else to the nearer end.
func distanceToPiece(p piece, q involute.Vec) float64 {
	ends := min(q.Sub(p.From).Norm(), q.Sub(p.To).Norm())
	switch c := (Path{Vertices: []Vertex{{p.From, p.Bulge}, {p.To, 0}}}).Curve(0).(type) {
	case involute.Arc:
		turned := q.Sub(c.Center).Angle() - c.Start
		turned = math.Mod(math.Copysign(1, c.Sweep)*turned+4*math.Pi, 2*math.Pi)
		if turned > math.Abs(c.Sweep) {
			return ends
		}
		return math.Abs(q.Sub(c.Center).Norm() - c.Radius)
	default:
		return distanceToChord(p.From, p.To, q)
	}
}

// distanceToChord is the distance from q to the straight piece from a to b.
func distanceToChord(a, b, q involute.Vec) float64 {
	d := b.Sub(a)
	s := min(1, max(0, q.Sub(a).Dot(d)/max(d.Dot(d), math.SmallestNonzeroFloat64)))
	return q.Sub(a.Add(d.Scale(s))).Norm()
}

// bruteDistance is the Hausdorff distance of chain and curve by dense points of
// each against all of the other. Curve points are even in the parameter and, by
// a square, dense toward both ends.
func bruteDistance(c involute.Curve, pieces []piece) float64 {
	const n = 3000
	t0, t1 := c.Domain()
	curve := make([]involute.Vec, n+1)
	worst := 0.0
	for i := range curve {
		s := float64(i) / n
		s = s * s * (3 - 2*s)
		curve[i], _ = c.At(t0 + s*(t1-t0))
		d := math.Inf(1)
		for _, p := range pieces {
			d = min(d, distanceToPiece(p, curve[i]))
		}
		worst = max(worst, d)
	}
	for _, p := range pieces {
		const m = 40
		for i := range m + 1 {
			q := pieceAt(p, float64(i)/m)
			d := math.Inf(1)
			for j := 1; j <= n; j++ {
				d = min(d, distanceToChord(curve[j-1], curve[j], q))
			}
			worst = max(worst, d)
		}
	}
	return worst
}

// deviation returns the greatest distance between chain and curves, mm.
func (c chain) deviation() float64 { return max(-c.Low, c.High) }

// checkAgainstBruteForce fits the curve and compares the deviation it reports
// with the one found point against point. The chords between curve points lie
// off the curve by at most slack.
func checkAgainstBruteForce(t *rapid.T, c involute.Curve, tol, slack float64) {
	ch, err := runOf(t, false, c).fit(both(tol), 0)
	if err != nil {
		t.Fatalf("%+v: %v", c, err)
	}
	if ch.deviation() > tol {
		t.Fatalf("%+v: reported %.9f over the tolerance %.9f", c, ch.deviation(), tol)
	}
	brute := bruteDistance(c, ch.Pieces)
	if brute > ch.deviation()+slack || brute < 0.98*ch.deviation()-slack {
		t.Fatalf("%+v: reported %.12f, by points %.12f (%d pieces, slack %g)", c, ch.deviation(), brute, len(ch.Pieces), slack)
	}
}

// chordSlack bounds the distance between a curve and the chords of
// bruteDistance: κh²/8 with the longest chord and the tightest curvature met.
func chordSlack(c involute.Curve) float64 {
	const n = 3000
	t0, t1 := c.Domain()
	before, _ := c.At(t0)
	slack := 0.0
	for i := 1; i <= n; i++ {
		s := float64(i) / n
		s = s * s * (3 - 2*s)
		t := t0 + s*(t1-t0)
		p, _ := c.At(t)
		h := p.Sub(before).Norm()
		k := math.Abs(c.Curvature(t))
		if math.IsInf(k, 0) || i == 1 {
			k = 4 / h // an involute's start: radius sqrt(2 r_b s) at length s
		}
		slack, before = max(slack, 2*k*h*h/8), p
	}
	size, _ := c.At(t1)
	return slack + 1e-13*size.Norm()
}

func drawTolerance(t *rapid.T, m float64) float64 {
	return m * math.Pow(10, rapid.Float64Range(-4, -1.5).Draw(t, "log tolerance/m"))
}

func drawModule(t *rapid.T) float64 {
	return math.Pow(10, rapid.Float64Range(-1, 1.7).Draw(t, "log m"))
}

func TestInvolutesKeepTheirTolerance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawModule(t)
		rb := m / 2 * rapid.Float64Range(6, 300).Draw(t, "z")
		t0 := rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(0, 0.5)).Draw(t, "t0")
		t1 := t0 + rapid.Float64Range(0.01, 0.8).Draw(t, "t1 - t0")
		c := involute.Flank{BaseRadius: rb, BaseAngle: rapid.Float64Range(-3, 3).Draw(t, "angle"), T0: t0, T1: t1}
		if rapid.Bool().Draw(t, "second flank") {
			c.T0, c.T1 = -t1, -t0
		}
		tol := drawTolerance(t, m)
		checkAgainstBruteForce(t, c, tol, chordSlack(c))
		if t0 > 0.01 {
			ch, _ := runOf(t, false, c).fit(both(tol), 0)
			checkChain(t, c, ch)
		}
	})
}

func TestTrochoidsKeepTheirTolerance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawModule(t)
		r := m / 2 * rapid.Float64Range(6, 200).Draw(t, "z")
		c := trochoid{
			r: r, h: m * math.Pow(10, rapid.Float64Range(-1.5, 0.2).Draw(t, "log h/m")),
			t0: -rapid.Float64Range(0, 2).Draw(t, "back") * m / r,
			t1: rapid.Float64Range(0.1, 2).Draw(t, "ahead") * m / r,
		}
		checkAgainstBruteForce(t, c, drawTolerance(t, m), chordSlack(c))
	})
}

func TestFilletsKeepTheirTolerance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawModule(t)
		c := involute.Fillet{
			R: m / 2 * rapid.Float64Range(6, 200).Draw(t, "z"), CosBeta: 1, Side: 1,
			H:   m * rapid.Float64Range(0.05, 1.4).Draw(t, "h"),
			Rho: m * rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(0, 0.47)).Draw(t, "rho"),
			E:   m * rapid.Float64Range(0, 0.3).Draw(t, "e"),
			T1:  70 * math.Pi / 180,
		}
		checkAgainstBruteForce(t, c, drawTolerance(t, m), chordSlack(c))
	})
}
