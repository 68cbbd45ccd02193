package involute

// A Flank is a piece of an involute of the circle BaseRadius that leaves it at
// polar angle BaseAngle. Its parameter is the signed roll angle t:
//
//	p = r_b (e(φ + t) − t e'(φ + t)),  e = (cos, sin), e' = (−sin, cos)
//
// at radius r_b √(1 + t²) and polar angle φ + t − atan t. For t > 0 it runs
// outward and is a tooth's first flank (counter-clockwise round the gear); for
// t < 0 it runs inward and is the second. One formula serves both.
type Flank struct {
	BaseRadius, BaseAngle float64
	T0, T1                float64
}

// Domain returns T0 and T1.
func (f Flank) Domain() (t0, t1 float64) { return f.T0, f.T1 }

// At returns the point and its derivative r_b t e(φ + t).
func (f Flank) At(t float64) (p, dp Vec) {
	e := Polar(f.BaseRadius, f.BaseAngle+t)
	return e.Sub(e.Left().Scale(t)), e.Scale(t)
}

// Curvature returns 1/(r_b |t|): an involute bends to the left both ways.
func (f Flank) Curvature(t float64) float64 {
	if t < 0 {
		t = -t
	}
	return 1 / (f.BaseRadius * t)
}

func (Flank) curve() {}
