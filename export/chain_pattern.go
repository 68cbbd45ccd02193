package export

import "math"

// How far arcs reach, and where their joints belong.
//
// Let the normal of an involute turn by t, its roll angle. The line that touches
// it there square to the normal has the distance r_b·t (plus a constant) from the
// gear's center along the normal, and the tangent of a circle has the distance
// a + b cos t + c sin t, whatever the circle. The first difference of the two is
// the distance D(t) between curve and arc along the normal, to the first order,
// and since D‴ + D′ is 0 for every circle
//
//	D‴ + D′ = −r_b,
//
// the same all along the flank. On any other curve the arc length s takes the
// place of t and the change of curvature κ' = dκ/ds that of r_b: D‴ = −κ'. Arcs
// that meet in one direction make D smooth, so a chain is a row of cubics in which
// only the quadratic part is free: the best such row has its joints on the curve, at
// equal steps h, with
//
//	D = −κ'/6 · s (s − h/2) (s − h)
//
// on each arc: peaks of −e and +e, e = |κ'| h³/(72√3), and every joint turned
// off the curve by −κ' h²/12. Turned over, N arcs at ±e follow a curve with
//
//	N e^(1/3) = (72√3)^(−1/3) ∫|κ'|^(1/3) ds = 0.2002 · work,
//
// where the work of an involute is r_b^(1/3) Δt. Arcs that need not even meet come to
// |κ'|h³/192, 0.1733 · work. An end that must be tangent costs about a third of
// an arc: its first arc D = a s²/2 − κ' s³/6 peaks at e when it is 0.69 h long.
const (
	chainReach = 0.2002497 // (72√3)^(−1/3)
	looseReach = 0.1733411 // 192^(−1/3)

	// tangentArc is the length of an arc at a tangent end, in lengths of those inside.
	tangentArc = 0.69
)

// patternTurn returns the angle by which the pattern turns off the curve at the
// joint at a place, where each arc does the given work.
func (w *walk) patternTurn(u, work float64) float64 {
	h := 0.5 / walkSteps
	from, to := max(0, u-h), min(1, u+h)
	for {
		k0, k1 := w.curve.Curvature(w.parameter(from)), w.curve.Curvature(w.parameter(to))
		change := (k1 - k0) / w.point(to).Sub(w.point(from)).Norm()
		if !finite(change) && from == 0 {
			from = to / 2 // an involute on its base circle
			continue
		}
		if !finite(change) && to == 1 {
			to = (1 + from) / 2
			continue
		}
		turn := -math.Copysign(math.Cbrt(math.Abs(change)), change) * work * work / 12
		const most = 0.3 // rad; what the search can do without a better start
		return max(-most, min(most, turn))
	}
}

// joints returns the places where the pattern has its joints, both ends of the
// run included.
func (f *fitting) joints() []float64 {
	places := []float64{0}
	for c, n := range f.arcs {
		weights := make([]float64, n)
		all := 0.0
		for i := range weights {
			weights[i] = 1
			if c == 0 && i == 0 && !f.run.start.free || c == len(f.arcs)-1 && i == n-1 && !f.run.stop.free {
				weights[i] = tangentArc
			}
			all += weights[i]
		}
		done := 0.0
		for _, weight := range weights[:n-1] {
			done += weight
			places = append(places, float64(c)+f.run.walks[c].placeAtWork(done/all))
		}
		places = append(places, float64(c+1))
	}
	return places
}
