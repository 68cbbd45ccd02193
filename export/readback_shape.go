package export

import (
	"math"

	"flankwright/involute"
)

// shapeSamples is at how many places each piece read back is held against the
// exact profile: its start, and evenly on from there. Its end is where the next
// piece starts.
const shapeSamples = 6

// Deviation returns the greatest distance of the contour from the exact profile
// of a tooth, found at points of every piece, mm: roots, fillets, flanks and
// tips, each at its own place round the gear.
func (s Section) Deviation(t involute.Tooth) float64 {
	most, exact := 0.0, t.Profile()
	for _, p := range s.pieces {
		for i := range shapeSamples {
			q, _ := p.At(float64(i) / shapeSamples)
			most = math.Max(most, math.Abs(exact.Offset(q)))
		}
	}
	return most
}
