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
// joint at place u, where each arc does the given work: −κ' h²/12, with κ' from the
// curvatures at the ends of one arc's length about the joint. Where the curvature
// is endless at one of them (an involute on its base circle) the same angle is had
// from the radii of curvature ρ: D by the angle of the normal is ρ' h²/12 there.
func (w *walk) patternTurn(u, work float64) float64 {
	if !(w.work() > 0) {
		return 0
	}
	at := between(w.place, w.works, u)
	first := max(0, min(at-work/2, w.work()-work))
	from, to := w.placeAtWork(first/w.work()), w.placeAtWork((first+work)/w.work())
	p, u0 := w.pointAndDirection(from)
	q, u1 := w.pointAndDirection(to)
	length, normal := q.Sub(p).Norm(), turn(u0, u1)
	k0, k1 := w.curve.Curvature(w.parameter(from)), w.curve.Curvature(w.parameter(to))
	byCurvature := -(k1 - k0) * length / 12
	byRadius := (1/k1 - 1/k0) * normal * normal / (12 * length)
	if !(math.Abs(byCurvature) < math.Abs(byRadius)) {
		byCurvature = byRadius
	}
	if !finite(byCurvature) {
		return 0
	}
	return byCurvature
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
