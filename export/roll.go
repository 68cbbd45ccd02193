package export

import (
	"cmp"
	"fmt"
	"math"
	"slices"
)

// Two sections rolled together. Read, in this order:
//
//   - roll.go, here: one pitch in steps, and the extremes of what is met
//   - roll_mesh.go: which sides of teeth face each other, and where they stand
//   - roll_piece.go: a line or an arc as it is turned
//   - roll_contact.go: the turn at which two pieces touch
//   - roll_clearance.go: how far apart two pieces are

// A Rolling is what two contours do when they are rolled through one pitch at a
// center distance. Lengths are in mm, in the transverse section.
type Rolling struct {
	// LeastFlank is the least distance between the sides of teeth that face each
	// other (flanks, fillets and tip corners), the second gear standing in the
	// middle of its play. Negative: each side would have to give way by so much.
	LeastFlank float64
	// LeastTipFirst is what is left between the farthest point of the first
	// contour and the lowest of the second, which pass each other on the line of
	// centers, and LeastTipSecond the reverse. Negative: a tip cuts into a root.
	LeastTipFirst, LeastTipSecond float64
	// LeastClearance is the least of these three.
	LeastClearance float64
	// Backlash is by how much the second gear can be turned between touching
	// forward and backward, on its working pitch circle. Negative: the teeth overlap.
	Backlash Range
	// TransmissionError is how far the second gear leaves the exact ratio while
	// the first drives it through one pitch, from the least to the greatest, on
	// the line of action.
	TransmissionError float64
	// Interferes says that the teeth overlap somewhere, or a tip cuts into a root.
	Interferes bool
}

// A Range is from the least to the greatest of something measured, mm.
type Range struct{ Least, Greatest float64 }

const (
	// rollSteps is in how many steps one pitch is rolled. A flank has a few arcs,
	// which lift and lower the mate a few times each over a pitch.
	rollSteps = 128

	// rollPeaks is how many of the highest peaks among the steps are closed in on.
	rollPeaks = 3
)

// Roll puts two external gears at a center distance (mm, axes parallel) and rolls
// them through one full pitch. A corner of a tip that touches (edge contact)
// counts like any contact.
//
// Helical gears are rolled in the transverse section, where they move alike all
// along the face; that their teeth take hold one section after the other, which
// evens the transmission error out, is left aside. The pitch rolled is that of
// one space of the first gear and one tooth of the second: that the other teeth
// are like these is for Unevenness to say.
func Roll(first, second Section, center float64) (Rolling, error) {
	m, err := newRollMesh(first, second, center)
	if err != nil {
		return Rolling{}, err
	}
	pitch := 2 * math.Pi / float64(first.Teeth())
	stands := make([]stand, rollSteps)
	for i := range stands {
		stands[i] = m.stand(pitch * float64(i) / rollSteps)
		if !finite(stands[i].forward) || !finite(stands[i].backward) {
			return Rolling{}, fmt.Errorf("roll: at a center distance of %.4g mm the teeth do not reach each other in every position: move the gears closer", center)
		}
	}
	most := func(f func(stand) float64) float64 { return m.most(stands, pitch, f) }
	working := center * float64(second.Teeth()) / float64(first.Teeth()+second.Teeth())
	out := Rolling{
		Backlash: Range{
			Least:    -working * most(func(s stand) float64 { return -s.play() }),
			Greatest: working * most(stand.play),
		},
		TransmissionError: middleLever(stands) * (most(func(s stand) float64 { return s.forward }) + most(func(s stand) float64 { return -s.forward })),
		LeastFlank:        -most(func(s stand) float64 { return -m.clearance(s) }),
		LeastTipFirst:     center - first.most - second.least,
		LeastTipSecond:    center - second.most - first.least,
	}
	out.LeastClearance = min(out.LeastFlank, out.LeastTipFirst, out.LeastTipSecond)
	out.Interferes = out.Backlash.Least < 0 || out.LeastClearance < 0
	return out, nil
}

// most returns the greatest value of f over one pitch: the highest peaks among
// the steps, closed in on by golden section between their neighbors.
func (m rollMesh) most(stands []stand, pitch float64, f func(stand) float64) float64 {
	n := len(stands)
	values := make([]float64, n)
	for i, s := range stands {
		values[i] = f(s)
	}
	var peaks []int
	for i, v := range values {
		if v >= values[(i+n-1)%n] && v >= values[(i+1)%n] {
			peaks = append(peaks, i)
		}
	}
	slices.SortStableFunc(peaks, func(a, b int) int { return cmp.Compare(values[b], values[a]) })
	best := slices.Max(values)
	for _, i := range peaks[:min(len(peaks), rollPeaks)] {
		step := pitch / float64(n)
		at := float64(i) * step
		_, v := findMaximum(func(angle float64) float64 { return f(m.stand(angle)) }, at-step, at+step)
		if finite(v) {
			best = max(best, v)
		}
	}
	return best
}

// middleLever returns the median lever of the forward contacts about the second
// gear's axis, mm: its base radius, as measured.
func middleLever(stands []stand) float64 {
	var levers []float64
	for _, s := range stands {
		levers = append(levers, s.lever)
	}
	slices.Sort(levers)
	return levers[len(levers)/2]
}
