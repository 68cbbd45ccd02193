package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A contour moved outward, for roughing. Read, in this order:
//
//   - offset_span.go: one line or arc, told by its start, direction and curvature
//   - offset_raw.go: every piece moved on its own, arcs about the convex corners
//   - offset_tree.go: boxes in boxes, to find neighbors without trying all pieces
//   - offset_walk.go: once round the outside, turning off at every crossing
//   - offset_legs.go: what was walked, as a path without pieces too short
//   - offset.go, here: the whole, and the check of what came out

// leastOffset is the smallest distance a path is moved, in mm. Below it the arcs
// about slight corners would be shorter than the shortest piece.
const leastOffset = 1e-3

// offsetOutward returns the path moved outward by distance (mm): the outer
// boundary of all points that lie within distance of the inside.
//
// The path must be closed, counter-clockwise and without self-intersection. Its
// arcs become arcs about the same centers, radius + distance where they bulge
// outward and radius − distance where they bulge inward; its lines are shifted;
// a convex corner becomes an arc of radius distance about the corner. Where
// the moved pieces cross (concave corners, narrow spaces, arcs that vanish), they
// are trimmed at the crossing, and only there has the result corners. Arcs sweep
// at most 90°, no piece is shorter than 1e-6 mm, and joints are shared exactly.
//
// Where a space closes at its mouth, a pocket enclosed behind it is dropped: the
// result is one closed path, the outermost. A space narrower than 1e-6 mm counts
// as closed. The result starts at the image of the path's start, or at the first
// place after it that is left.
//
// Every piece of the result is measured: its ends and middle lie at distance from
// the path, to 1e-6 mm, or an error is returned. Errors too for a distance
// that is not a number of at least 0.001 mm, a path that is not an outline, and
// a result that reaches beyond 100 m.
//
// This is the offset of a planar set by a disk (Minkowski sum; its boundary is
// made of parallel curves, see Farouki and Neff, CAGD 7, 1990).
func (p Path) offsetOutward(distance float64) (Path, error) {
	if !positive(distance) || distance < leastOffset {
		return Path{}, fmt.Errorf("offset by %g mm: must be a length of at least %g mm", distance, leastOffset)
	}
	if distance > maxCoordinate {
		return Path{}, fmt.Errorf("offset by %g mm: nothing is left of the shape; at most %g mm, and less for a small one", distance, maxCoordinate)
	}
	if err := p.check(); err != nil {
		return Path{}, fmt.Errorf("offset: %w", err)
	}
	if p.area() < 0 {
		return Path{}, fmt.Errorf("offset: the path runs clockwise; counter-clockwise is needed, with the material on its left")
	}
	original := p.splitArcs().spans()
	out, err := followOutside(rawOffset(original, distance), distance)
	if err != nil {
		return Path{}, fmt.Errorf("offset by %g mm: %w", distance, err)
	}
	if err := checkOffset(original, out, p.area(), distance); err != nil {
		return Path{}, fmt.Errorf("offset by %g mm: %w", distance, err)
	}
	return out, nil
}

// spans returns the pieces of the path, none of which may turn by more than a right angle.
func (p Path) spans() []span {
	out := make([]span, len(p.Vertices))
	for i := range out {
		from, to, b := p.ends(i)
		out[i] = newSpan(piece{from, to, b})
	}
	return out
}

// checkOffset reports why a path can't be the offset: it is no outline, encloses
// no more than the original, or a piece's end or middle is not at the distance from it.
func checkOffset(original []span, out Path, area, distance float64) error {
	if err := out.check(); err != nil {
		return err
	}
	if out.area() <= area {
		return fmt.Errorf("it encloses less than before: does the contour cross itself?")
	}
	tree := newBoxTree(original)
	for i := range out.Vertices {
		from, to, b := out.ends(i)
		_, second := piece{from, to, b}.halves()
		for _, q := range [...]involute.Vec{from, second.From} {
			if d := tree.distance(q); !(math.Abs(d-distance) <= minPiece) {
				return fmt.Errorf("at (%.6f, %.6f) it lies %.7g mm from the contour: does the contour cross itself?", q.X, q.Y, d)
			}
		}
	}
	return nil
}
