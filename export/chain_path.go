package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

const (
	// cornerAngle tells a corner of the outline from the joint of two curves
	// that were meant to be tangent.
	cornerAngle = math.Pi / 180

	// negligible is the length in mm of a curve that is left out (the root land
	// of a full-radius tool, the tip land of a pointed tooth), and the gap
	// between curves that is still closed: four of the shortest pieces a path
	// may hold, so that a curve kept can be halved.
	negligible = 4 * minPiece
)

// closedPath turns one pitch of an outline into a closed path of count pitches.
//
// Each curve of pitch must start where the one before it ends, and the last
// must end where the first starts, turned about the origin by 2π/count. Lines and
// arcs pass as they are. The curves between them or between corners are fitted
// together (run.fit); what mirrors an earlier one (a tooth's second fillet and
// flank) takes that one's chain, mirrored, so that teeth come out exactly
// symmetric. Pitch k is the first one turned by 2πk/count, not the one before
// turned once more, and joints are shared, so the path closes without gap.
//
// Where two curves meet at more than 1° the corner is real and stays. The path
// starts in the middle of the first curve if that is an arc or a line, and at
// its start otherwise: give the pitch from its root land on and the path starts
// in the center of a root, where a lead-in does no harm.
//
// A chain may by chance hold a piece too short for a file, or find no way round
// the start of a relief; and a tolerance of a good part of the tooth's own size may
// lose the curves, or let the path cross itself. Then a path within less of the
// tolerance is taken.
func closedPath(curves []involute.Curve, count int, o FitOptions) (Path, FitReport, error) {
	path, report, err := fitPath(curves, count, o)
	if err == nil && sound(path, report) {
		return path, report, nil
	}
	for _, share := range closerShares() {
		closer := o
		closer.Tolerance *= share
		if again, other, failed := fitPath(curves, count, closer); failed == nil && sound(again, other) {
			return again, other, nil
		}
	}
	if err != nil {
		return Path{}, FitReport{}, fmt.Errorf("closed path: %w", err)
	}
	return path, report, nil
}

// closerShares are the shares of a tolerance that are tried where the whole finds no way.
func closerShares() []float64 { return []float64{0.97, 0.9, 0.8, 0.6, 0.4, 0.25, 0.1, 0.03} }

// sound reports whether a path can go into a file, crosses itself nowhere and keeps
// no kink that was none of the outline's corners.
func sound(path Path, report FitReport) bool {
	return report.kinks == 0 && path.check() == nil && path.Simple() == nil
}

// fitPath is closedPath without the name of the job in its errors.
func fitPath(curves []involute.Curve, count int, o FitOptions) (Path, FitReport, error) {
	o, err := o.check()
	if err != nil {
		return Path{}, FitReport{}, err
	}
	if count < 1 {
		return Path{}, FitReport{}, fmt.Errorf("%d pitches: must be at least 1", count)
	}
	p, err := newPitch(curves, count)
	if err != nil {
		return Path{}, FitReport{}, err
	}
	p.oneSided = o.Side != Both
	sections := p.sections()
	chains, err := p.chains(sections, func(s section, r *run) (chain, error) { return p.fit(s, r, o) })
	if err != nil {
		return Path{}, FitReport{}, err
	}
	gap, err := p.joinChains(sections, chains)
	if err != nil {
		return Path{}, FitReport{}, err
	}
	var path Path
	for k := range count {
		for _, ch := range chains {
			for _, x := range ch.Pieces {
				path.Vertices = append(path.Vertices, Vertex{x.From.Rotate(float64(k) * p.step), x.Bulge})
			}
		}
	}
	if p.startsInMiddle(sections, o.MinArc) {
		path = startInMiddle(path, len(chains[0].Pieces))
	}
	report := p.report(sections, chains, gap, path)
	report.LinesNeeded = p.linesNeeded(sections, o)
	return path, report, nil
}

// roughLength returns the length of a curve over 16 chords, in mm.
func roughLength(c involute.Curve) float64 {
	const chords = 16
	t0, t1 := c.Domain()
	before, _ := c.At(t0)
	sum := 0.0
	for i := 1; i <= chords; i++ {
		p, _ := c.At(t0 + (t1-t0)*float64(i)/chords)
		sum += p.Sub(before).Norm()
		before = p
	}
	return sum
}

// joinChains moves each chain's end onto the start of the next one, and returns
// the greatest such move.
func (p *pitch) joinChains(sections []section, chains []chain) (gap float64, err error) {
	for i := range p.walks { // the joints inside runs too
		next, _ := p.walks[(i+1)%len(p.walks)].pointAndDirection(0)
		if i == len(p.walks)-1 {
			next = next.Rotate(p.step)
		}
		end, _ := p.walks[i].pointAndDirection(1)
		move := next.Sub(end).Norm()
		if !(move < negligible) {
			return 0, fmt.Errorf("curve %d of the pitch ends at (%.6f, %.6f), the next starts at (%.6f, %.6f): the ends must meet",
				p.numbers[i], end.X, end.Y, next.X, next.Y)
		}
		gap = max(gap, move)
	}
	for i := range chains {
		next := chains[(i+1)%len(chains)].Pieces[0].From
		if i == len(chains)-1 {
			next = next.Rotate(p.step)
		}
		chains[i].Pieces[len(chains[i].Pieces)-1].To = next
	}
	return gap, nil
}

// startInMiddle returns the path started in the middle of its first n pieces,
// the middle one of which is halved if n is odd.
func startInMiddle(p Path, n int) Path {
	m := n / 2
	vs := append([]Vertex(nil), p.Vertices...)
	if n%2 == 1 {
		from, to, b := p.ends(m)
		one, two := piece{from, to, b}.halves()
		vs[m].Bulge = one.Bulge
		m++
		vs = append(vs[:m], append([]Vertex{{two.From, two.Bulge}}, vs[m:]...)...)
	}
	return Path{Vertices: append(append([]Vertex(nil), vs[m:]...), vs[:m]...)}
}
