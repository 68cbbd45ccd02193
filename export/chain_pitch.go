package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A section of the pitch is one exact line or arc, or a run of other curves.
type section struct {
	from, to int // curves from ≤ i < to
	exact    bool
}

// A pitch is one pitch of an outline, cut up.
type pitch struct {
	curves  []involute.Curve
	walks   []*walk
	numbers []int   // of the curves in the outline they came from, from 1
	count   int     // pitches round the gear
	step    float64 // by which the pitch repeats, radians

	oneSided bool // the band lies to one side of the curves
}

// newPitch measures the curves that are long enough to keep.
func newPitch(curves []involute.Curve, count int) (*pitch, error) {
	p := &pitch{count: count, step: 2 * math.Pi / float64(count)}
	for i, c := range curves {
		if roughLength(c) < negligible {
			continue
		}
		w, err := newWalk(plain(c))
		if err != nil {
			return nil, fmt.Errorf("curve %d of the pitch: %w", i+1, err)
		}
		p.curves, p.walks, p.numbers = append(p.curves, c), append(p.walks, w), append(p.numbers, i+1)
	}
	if len(p.walks) == 0 {
		return nil, fmt.Errorf("a pitch without curves longer than %g mm", negligible)
	}
	return p, nil
}

// plain takes the role off a curve.
func plain(c involute.Curve) involute.Curve {
	if p, ok := c.(involute.Piece); ok {
		return p.Curve
	}
	return c
}

// exact reports whether curve i is a line or an arc that passes as it is. The
// radial line below the base circle does not where the band lies to one side: the
// involute leaves it with boundless curvature, which no tangent arc can follow
// on the inside, so the line has to give way too.
func (p *pitch) exact(i int) bool {
	switch plain(p.curves[i]).(type) {
	case involute.Line:
		return !p.oneSided || role(p.curves[i]) != involute.RootFillet
	case involute.Arc:
		return true
	}
	return false
}

// directionsAt returns the directions in which curve i starts and the one before it ends.
func (p *pitch) directionsAt(i int) (before, after involute.Vec) {
	n := len(p.walks)
	_, before = p.walks[(i+n-1)%n].pointAndDirection(1)
	_, after = p.walks[i%n].pointAndDirection(0)
	switch {
	case i == n:
		after = after.Rotate(p.step)
	case i == 0:
		before = before.Rotate(-p.step)
	}
	return before, after
}

// corner reports whether the outline has a corner at the start of curve i. Where a
// flank breaks into its relief none is meant: the chain goes round the break.
func (p *pitch) corner(i int) bool {
	before, after := p.directionsAt(i)
	angle := math.Abs(turn(before, after))
	if p.reliefStarts(i) {
		return angle > reliefBreak
	}
	return angle > cornerAngle
}

// reliefBreak is the break at the start of a relief up to which the chain goes
// round it. The largest that a gear may have is some 15°; usual ones are 0.1° to 2°.
const reliefBreak = 5 * math.Pi / 180

// reliefStarts reports whether curve i and the one before are a flank and its relief.
func (p *pitch) reliefStarts(i int) bool {
	n := len(p.curves)
	a, b := role(p.curves[(i+n-1)%n]), role(p.curves[i%n])
	return a == involute.ToothFlank && b == involute.ToothRelief || a == involute.ToothRelief && b == involute.ToothFlank
}

// sections cuts the pitch up.
func (p *pitch) sections() []section {
	var out []section
	for i := range p.walks {
		exact := p.exact(i)
		if last := len(out) - 1; !exact && last >= 0 && !out[last].exact && !p.corner(i) {
			out[last].to++
			continue
		}
		out = append(out, section{from: i, to: i + 1, exact: exact})
	}
	return out
}

// startsInMiddle reports whether the path starts in the middle of the first
// section: where that is exact, and its halves are no shorter than an arc may be.
// (A first curve that was left out for its length has its end there.)
func (p *pitch) startsInMiddle(sections []section, minArc float64) bool {
	return sections[0].exact && p.numbers[0] == 1 && (minArc == 0 || roughLength(p.curves[0]) >= 2*minArc)
}

// run returns the run over the curves of a section that starts and stops at
// corners where told so, and else in the direction of the exact neighbor; where
// two runs meet at the ends of the pitch, half way between their directions.
func (p *pitch) run(s section) *run {
	n := len(p.walks)
	before, after := p.directionsAt(s.from)
	start, stop := runEnd{dir: before}, runEnd{}
	start.point, _ = p.walks[s.from].pointAndDirection(0)
	switch start.free = p.corner(s.from); {
	case start.free:
		start.dir = after
	case !p.exact((s.from + n - 1) % n):
		start.dir = halfway(before, after)
	}
	before, after = p.directionsAt(s.to)
	stop.dir = after
	stop.point, _ = p.walks[s.to-1].pointAndDirection(1)
	switch stop.free = p.corner(s.to); {
	case stop.free:
		stop.dir = before
	case !p.exact(s.to % n):
		stop.dir = halfway(before, after)
	}
	return newRun(p.walks[s.from:s.to], start, stop)
}

// halfway returns the direction between two that are not opposite.
func halfway(a, b involute.Vec) involute.Vec {
	d := a.Add(b)
	return d.Scale(1 / d.Norm())
}

// chains returns a chain for each section: fit is asked for those that do not
// mirror an earlier one.
func (p *pitch) chains(sections []section, fit func(section, *run) (chain, error)) ([]chain, error) {
	var out []chain
	var runs []*run
	for _, s := range sections {
		r := p.run(s)
		ch, ok := mirrorOfEarlier(r, runs, out)
		if !ok {
			var err error
			if ch, err = fit(s, r); err != nil {
				return nil, fmt.Errorf("curve %d of the pitch: %w", p.numbers[s.from], err)
			}
		}
		out, runs = append(out, ch), append(runs, r)
	}
	return out, nil
}

// fit returns the chain for one section.
func (p *pitch) fit(s section, r *run, o FitOptions) (chain, error) {
	var ch chain
	var err error
	switch {
	case o.Lines:
		return r.evenLines(o.band())
	case s.exact:
		ch, err = exactChain(plain(p.curves[s.from]))
	default:
		ch, err = r.fit(o.band(), o.MinArc)
	}
	return ch.splitSweeps(o.MaxSweep), err
}

// mirrorOfEarlier returns the chain of an earlier run of which r is the mirror
// image in a line through the origin, mirrored.
func mirrorOfEarlier(r *run, runs []*run, chains []chain) (chain, bool) {
	for i, other := range runs {
		axis := (other.start.point.Angle() + r.stop.point.Angle()) / 2
		if !r.mirrors(other, axis) {
			continue
		}
		ch := chain{Pieces: mirrored(chains[i].Pieces, axis), Low: chains[i].Low, High: chains[i].High}
		for c := range chains[i].Counts {
			ch.Counts = append(ch.Counts, chains[i].Counts[len(chains[i].Counts)-1-c])
		}
		for c := range chains[i].Corners {
			ch.Corners = append(ch.Corners, len(ch.Pieces)-chains[i].Corners[len(chains[i].Corners)-1-c])
		}
		return ch, true
	}
	return chain{}, false
}

// mirrors reports whether the run is another's mirror image, walked backward, and
// may do the same at its ends: points all along it and the directions there
// agree to the rounding of coordinates.
func (r *run) mirrors(other *run, axis float64) bool {
	const steps = 16
	alike := 1e-9 * r.size
	if len(other.walks) != len(r.walks) || math.Abs(other.length()-r.length()) > alike {
		return false
	}
	for i := range steps + 1 {
		place := r.last() * float64(i) / steps
		if r.point(place).Sub(reflected(other.point(r.last()-place), axis)).Norm() > alike {
			return false
		}
	}
	return r.start.mirrors(other.stop, axis) && r.stop.mirrors(other.start, axis)
}

// mirrors reports whether what the chain meets at two ends is mirrored.
func (e runEnd) mirrors(other runEnd, axis float64) bool {
	const alike = 1e-9 // rad
	back := reflected(other.dir, axis).Scale(-1)
	return e.free == other.free && math.Abs(turn(e.dir, back)) < alike
}
