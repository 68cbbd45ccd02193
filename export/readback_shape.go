package export

import (
	"math"

	"flankwright/involute"
)

// shapeSamples is at how many places each piece read back is held against the
// exact profile: its start, and evenly on from there. Its end is where the next
// piece starts.
const shapeSamples = 6

// Deviation returns how far the contour lies inside (≤ 0) and outside of the
// exact profile of a tooth, found at points of every piece, mm: roots, fillets,
// flanks and tips, each at its own place round the gear.
func (s Section) Deviation(t involute.Tooth) (least, most float64) {
	exact := t.Profile()
	least, most = math.Inf(1), math.Inf(-1)
	for _, p := range s.pieces {
		for i := range shapeSamples {
			q, _ := p.At(float64(i) / shapeSamples)
			off := exact.Offset(q)
			least, most = min(least, off), max(most, off)
		}
	}
	return least, most
}

// Farthest returns the point of the contour, among those that Deviation looks at,
// that lies farthest from where a contour moved outward by stock (mm) should be.
func (s Section) Farthest(t involute.Tooth, stock float64) involute.Vec {
	exact := t.Profile()
	var at involute.Vec
	most := -1.0
	for _, p := range s.pieces {
		for i := range shapeSamples {
			q, _ := p.At(float64(i) / shapeSamples)
			if off := math.Abs(exact.Offset(q) - stock); off > most {
				at, most = q, off
			}
		}
	}
	return at
}

// Upright returns the path as that of a gear about center (mm) moved to the
// origin and turned so that its teeth stand as those of a drawing: one along +x.
// Which way it has to turn is taken from all teeth. A path that is no gear comes
// back moved only.
func (p Path) Upright(center involute.Vec) Path {
	out := Path{append([]Vertex(nil), p.Vertices...)}
	for i := range out.Vertices {
		out.Vertices[i].P = out.Vertices[i].P.Sub(center)
	}
	s, err := NewSection(out, 0)
	if err != nil {
		return out
	}
	// Each space's center is half a pitch from a tooth's; z times the angle is the same for all.
	z := float64(s.Teeth())
	var sum involute.Vec
	for _, a := range s.spaces {
		sum = sum.Add(involute.Polar(1, z*a-math.Pi))
	}
	turn := sum.Angle() / z
	for i := range out.Vertices {
		out.Vertices[i].P = out.Vertices[i].P.Rotate(-turn)
	}
	return out
}
