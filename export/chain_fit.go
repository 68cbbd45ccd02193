package export

import (
	"math"

	"flankwright/involute"
)

// A fitting is the search for a chain of a given number of arcs over a run. The
// chain is divided into spans of two arcs, a biarc each (and one of a single
// arc in front where the number is odd), so that every number sought moves only
// the arcs beside it:
//
//	for each node between spans: its place on the run, its offset to the left of the
//	curve (mm), and the angle by which the chain turns off the curve there (radians);
//	for each biarc: the share its first tangent takes of the longest it may be;
//	at an end where the chain is free to choose its direction: that angle.
//
// The single arc in front sets the direction at the node it leads to.
type fitting struct {
	run    *run
	arcs   []int // for each curve of the run
	total  int
	band   band
	minArc float64 // no arc shorter than this is accepted, mm; 0 for none

	nodes   []node
	shares  []int // of the spans: which number, −1 for a single arc
	numbers []number
	samples []involute.Vec // of the run, without its ends
	starts  []int          // the first sample of each span at the x last measured, and the end
}

// A node is an end of a span. It names the numbers that set it, −1 where given.
type node struct{ place, offset, angle int }

// A number is one of those sought.
type number struct {
	start, step float64
	from, to    int // the spans it moves
}

// A band is how far a chain may lie off the curve, mm: low to the inside
// (negative) and high to the outside of the metal.
type band struct{ low, high float64 }

func (b band) middle() float64 { return (b.low + b.high) / 2 }
func (b band) half() float64   { return (b.high - b.low) / 2 }

// arcSamples is the number of steps on an arc at which it is compared with the
// curve while joints are sought. (One lies 0.003 of the arc beside each peak of
// the pattern.) The finished chain is measured exactly.
//
// Where two curves of the run meet, the curvature jumps, and a chain that is to
// follow a jump of Δκ leaves within sqrt(8 ε/Δκ): much less than a step where the
// tolerance is fine. So steps are halved there again and again, down to nearestSample.
const (
	arcSamples    = 24
	nearestSample = 1.0 / 256
)

// newFitting prepares the search with the given numbers of arcs on the curves of the run.
func newFitting(r *run, arcs []int, b band, minArc float64) *fitting {
	f := &fitting{run: r, arcs: arcs, band: b, minArc: minArc}
	for c, n := range arcs {
		f.total += n
		steps := arcSamples * n
		add := func(place float64) { f.samples = append(f.samples, r.walks[c].point(place)) }
		if c > 0 {
			add(0)
			for near := nearestSample; near < 1; near *= 2 {
				add(near / float64(steps))
			}
		}
		for i := 1; i < steps; i++ {
			add(float64(i) / float64(steps))
		}
		if c < len(arcs)-1 {
			for near := 0.5; near >= nearestSample; near /= 2 {
				add(1 - near/float64(steps))
			}
		}
	}
	f.layOut()
	return f
}

// layOut names the numbers sought and starts them from the pattern.
func (f *fitting) layOut() {
	joints := f.joints()
	single := f.total % 2
	spans := (f.total + 1) / 2
	small := 0.01 * f.band.half()
	add := func(start, step float64, from, to int) int {
		f.numbers = append(f.numbers, number{start, step, max(from, 0), min(to, spans)})
		return len(f.numbers) - 1
	}
	arc := f.run.length() / float64(f.total)
	start := node{-1, -1, -1}
	if f.run.start.free && !(f.total == 1 && !f.run.stop.free) {
		start.angle = add(f.patternTurn(0), small/arc, 0, 1+single)
	}
	f.nodes = []node{start}
	for s := range spans {
		from, to := max(2*s-single, 0), 2*s+2-single // joints at the ends of the span
		share, end := -1, node{-1, -1, -1}
		if to-from == 2 {
			a, b, c := f.run.point(joints[from]), f.run.point(joints[from+1]), f.run.point(joints[to])
			in, out := b.Sub(a).Norm(), c.Sub(b).Norm()
			share = add(in/(in+out), 1e-4, s, s+1)
		}
		if s < spans-1 {
			end.place = add(joints[to], 1e-4*(joints[to+1]-joints[to-1]), s, s+2)
			end.offset = add(-f.band.middle(), small, s, s+2) // the outside is to the right
		}
		// A single arc arrives in the direction it does.
		if share >= 0 && (s < spans-1 || f.run.stop.free) {
			end.angle = add(f.patternTurn(joints[to]), small/arc, s, s+2)
		}
		f.shares = append(f.shares, share)
		f.nodes = append(f.nodes, end)
	}
	f.starts = make([]int, spans+1)
}

// patternTurn returns the angle of the pattern at a joint.
func (f *fitting) patternTurn(joint float64) float64 {
	w, u := f.run.at(joint)
	c := min(int(joint), len(f.arcs)-1)
	return w.patternTurn(u, w.work()/float64(f.arcs[c]))
}

// search returns a chain that keeps the band, if it finds one.
func (f *fitting) search() (chain, bool) {
	count := len(f.samples)
	if f.minArc > 0 {
		count += f.total
	}
	s := fittingSearch{fitting: f}
	m := minimizer{peaks: &s}
	for _, n := range f.numbers {
		m.x, m.step = append(m.x, n.start), append(m.step, n.step)
	}
	ok := m.solve(count)
	return s.found, ok
}

// state returns the point and direction of the chain at a node.
func (f *fitting) state(x []float64, k int) (p, dir involute.Vec) {
	n := f.nodes[k]
	switch {
	case k == 0:
		p, dir = f.run.start.point, f.run.start.dir
	case k == len(f.nodes)-1:
		p, dir = f.run.stop.point, f.run.stop.dir
	default:
		p, dir = f.run.pointAndDirection(x[n.place])
		p = p.Add(dir.Left().Scale(x[n.offset]))
	}
	switch {
	case n.angle >= 0:
		dir = dir.Rotate(x[n.angle])
	case k == 1 && f.shares[0] < 0 && len(f.shares) > 1:
		from, start := f.state(x, 0)
		_, dir = arcLeaving(from, start, p).directions()
	}
	return p, dir
}

// span returns the arcs of a span; false if the numbers make none.
func (f *fitting) span(x []float64, s int) (pieces [2]piece, n int, ok bool) {
	p, u := f.state(x, s)
	q, v := f.state(x, s+1)
	from, to := 0.0, f.run.last()
	if i := f.nodes[s].place; i >= 0 {
		from = x[i]
	}
	if i := f.nodes[s+1].place; i >= 0 {
		to = x[i]
	}
	switch {
	case !(0 <= from && from < to && to <= f.run.last()):
		return pieces, 0, false
	case f.shares[s] >= 0:
		pieces, ok = biarcOfShare(p, u, q, v, x[f.shares[s]])
		n = 2
	case f.nodes[0].angle < 0 && f.run.start.free: // alone, to a given direction
		pieces[0], n, ok = arcArriving(p, q, v), 1, true
	default:
		pieces[0], n, ok = arcLeaving(p, u, q), 1, f.total > 1 || f.run.stop.free
	}
	for _, a := range pieces[:n] {
		ok = ok && math.Abs(a.Bulge) < 1
	}
	return pieces, n, ok
}

// chain builds the whole chain.
func (f *fitting) chain(x []float64) (chain, bool) {
	ch := chain{Counts: f.arcs}
	for s := range f.shares {
		pieces, n, ok := f.span(x, s)
		if !ok {
			return ch, false
		}
		for _, p := range pieces[:n] {
			p.Bulge = straighten(p.Bulge)
			ch.Pieces = append(ch.Pieces, p)
		}
	}
	return ch, true
}
