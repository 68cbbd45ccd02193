package export

import (
	"math"

	"flankwright/involute"
)

// An extent is a box, a rectangle along the axes, from its lowest to its highest coordinates in mm.
type extent struct{ lo, hi involute.Vec }

// with returns the smallest box that holds both.
func (b extent) with(c extent) extent {
	lo, hi := stretch(b.lo, b.hi, c.lo)
	lo, hi = stretch(lo, hi, c.hi)
	return extent{lo, hi}
}

// meets tells whether two boxes come within slack (mm) of each other along both axes.
func (b extent) meets(c extent, slack float64) bool {
	return b.lo.X <= c.hi.X+slack && c.lo.X <= b.hi.X+slack && b.lo.Y <= c.hi.Y+slack && c.lo.Y <= b.hi.Y+slack
}

// distance returns the distance in mm from the box to q, 0 inside.
func (b extent) distance(q involute.Vec) float64 {
	return math.Hypot(max(b.lo.X-q.X, 0, q.X-b.hi.X), max(b.lo.Y-q.Y, 0, q.Y-b.hi.Y))
}

// A boxTree finds spans by where they are. Neighbors along a path are neighbors
// in the plane, so its boxes are those of runs of the list: all of it, its two
// halves, their halves and so on. A search for what is near one place opens
// about log n of them.
type boxTree struct {
	spans []span
	boxes []extent // node 1 is the whole list, nodes 2i and 2i+1 are the halves of node i
}

// newBoxTree returns the tree of a list of spans, which must not be empty.
func newBoxTree(spans []span) boxTree {
	t := boxTree{spans, make([]extent, 4*len(spans))}
	t.build(1, 0, len(spans))
	return t
}

// build works out the box of a node, which holds the spans from first to before last.
func (t boxTree) build(node, first, last int) extent {
	if last-first == 1 {
		t.boxes[node] = t.spans[first].box()
	} else {
		middle := (first + last) / 2
		t.boxes[node] = t.build(2*node, first, middle).with(t.build(2*node+1, middle, last))
	}
	return t.boxes[node]
}

// near calls visit with every span whose box comes within slack (mm) of b.
func (t boxTree) near(b extent, slack float64, visit func(i int)) {
	var search func(node, first, last int)
	search = func(node, first, last int) {
		switch {
		case !t.boxes[node].meets(b, slack):
		case last-first == 1:
			visit(first)
		default:
			middle := (first + last) / 2
			search(2*node, first, middle)
			search(2*node+1, middle, last)
		}
	}
	search(1, 0, len(t.spans))
}

// distance returns the distance in mm from q to the nearest span.
func (t boxTree) distance(q involute.Vec) float64 {
	best := math.Inf(1)
	var search func(node, first, last int)
	search = func(node, first, last int) {
		if last-first == 1 {
			best = min(best, t.spans[first].distance(q))
			return
		}
		middle := (first + last) / 2
		left, right := t.boxes[2*node].distance(q), t.boxes[2*node+1].distance(q)
		if left <= right && left < best {
			search(2*node, first, middle)
		}
		if right < best {
			search(2*node+1, middle, last)
		}
		if left > right && left < best {
			search(2*node, first, middle)
		}
	}
	search(1, 0, len(t.spans))
	return best
}
