package involute

import (
	"math"
	"testing"
)

// Handbook values of the involute function (any handbook; recalled), degrees.
func TestInvHandbook(t *testing.T) {
	for _, c := range []struct{ deg, printed, full float64 }{
		{14.5, 0.005545, 0.005544843},
		{20, 0.014904, 0.014904384},
		{22.5, 0.021514, 0.021514481},
		{25, 0.029975, 0.029975345},
		{30, 0.053751, 0.053751494},
	} {
		got := Inv(c.deg * Degree)
		if math.Abs(got-c.printed) > 0.51e-6 || math.Abs(got-c.full) > 0.51e-9 {
			t.Errorf("inv %v° = %.10f, want %v", c.deg, got, c.full)
		}
	}
}

// The traps of bad starts and lost digits, computed elsewhere in high precision.
func TestInvTraps(t *testing.T) {
	alpha, ok := InverseInv(1e-6)
	if got := alpha / Degree; !ok || math.Abs(got-0.826325216) > 0.51e-9 {
		t.Errorf("inverse inv 1e-6 = %.9f°, want 0.826325216", got)
	}
	if got := Inv(1e-4); math.Abs(got/3.3333333466666667e-13-1) > 1e-14 {
		t.Errorf("inv 1e-4 = %.17g", got)
	}
	for _, y := range []float64{-1e-9, math.NaN(), math.Inf(1)} {
		if _, ok := InverseInv(y); ok {
			t.Errorf("inverse inv %v must not exist", y)
		}
	}
}

// TestInverseCost counts the calls of math.Tan: one for every Inv above the
// series limit.
func TestInverseCost(t *testing.T) {
	worst, worstErr := 0, 0.0
	for i := 1; i < 200000; i++ {
		alpha := math.Pi / 2 * float64(i) / 200000
		y := Inv(alpha)
		n, got := inverseCounting(y)
		worst = max(worst, n)
		// inv is only known to its last digit, and so is the angle that it gives back.
		slack := 2 * 2.3e-16 * y / max(math.Pow(math.Tan(alpha), 2), 1e-300)
		worstErr = max(worstErr, math.Abs(got-alpha)-slack)
	}
	if worst > 5 {
		t.Errorf("math.Tan called %d times, at most 5 allowed", worst)
	}
	if worstErr > 1e-14 {
		t.Errorf("inverse off by %g rad", worstErr)
	}
	t.Logf("at most %d calls of math.Tan, worst error %.2g rad", worst, worstErr)
}

// inverseCounting repeats InverseInv and counts the calls of math.Tan.
func inverseCounting(y float64) (calls int, alpha float64) {
	alpha = inverseStart(y)
	for range 4 {
		if math.Abs(alpha) > seriesLimit {
			calls++
		}
		inv := Inv(alpha)
		f, tan := inv-y, alpha+inv
		step := f * tan / (tan*tan*tan - f*(1+tan*tan))
		alpha -= step
		if math.Abs(step) <= 1e-5*min(alpha, math.Pi/2-alpha) {
			break
		}
	}
	if got, _ := InverseInv(y); got != alpha {
		panic("the count no longer follows InverseInv")
	}
	return calls, alpha
}

func BenchmarkTan(b *testing.B) {
	s := 0.0
	for i := 0; b.Loop(); i++ {
		s += math.Tan(0.2 + 1e-6*float64(i%1000000))
	}
	_ = s
}

func BenchmarkInverseInv(b *testing.B) {
	s := 0.0
	for i := 0; b.Loop(); i++ {
		a, _ := InverseInv(0.001 + 1e-7*float64(i%1000000))
		s += a
	}
	_ = s
}
