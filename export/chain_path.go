package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// A FitReport says what became of a gear's outline when it was turned into arcs.
// A joint where the outline itself turns by up to 1° (a tooth undercut by a hair)
// is no corner and shows in MaxTangentBreakDeg; the arcs add under 0.01°.
type FitReport struct {
	Segments, Arcs, Lines int     // of the whole path; Segments = Arcs + Lines
	MaxDeviation          float64 // mm, either side of the exact outline
	MaxTangentBreakDeg    float64 // the sharpest turn at a joint that is no corner
	Corners               int     // joints of the outline itself that turn by more than 1° (tooth tips)
	ShortestArc           float64 // mm, along it; 0 without arcs
	MinRadius, MaxRadius  float64 // mm; 0 without arcs
	LinesNeeded           int     // straight chords that the same tolerance would take
}

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
// must end where the first starts, turned about the origin by 2π/count. Each is
// fitted by fitArcs; one that mirrors an earlier one (a tooth's second flank)
// takes that one's chain, mirrored, so that teeth come out exactly symmetric.
// Pitch k is the first one turned by 2πk/count, not the one before turned once
// more, and joints are shared, so the path closes without gap.
//
// Where two curves meet at more than 1° the corner is real and stays. The path
// starts in the middle of the first curve if that is an arc or a line, and at
// its start otherwise: give the pitch from its root land on and the path starts
// in the center of a root, where a lead-in does no harm.
func closedPath(pitch []involute.Curve, count int, tolerance float64) (Path, FitReport, error) {
	if count < 1 {
		return Path{}, FitReport{}, fmt.Errorf("closed path: %d pitches: must be at least 1", count)
	}
	chains, report, err := fitPitch(pitch, tolerance)
	if err != nil {
		return Path{}, FitReport{}, fmt.Errorf("closed path: %w", err)
	}
	step := 2 * math.Pi / float64(count)
	gap, err := joinChains(chains, step)
	if err != nil {
		return Path{}, FitReport{}, fmt.Errorf("closed path: %w", err)
	}
	report.MaxDeviation += gap
	report.LinesNeeded *= count
	report.judgeJoints(chains, step)

	var path Path
	for k := range count {
		for _, ch := range chains {
			for _, p := range ch.Pieces {
				path.Vertices = append(path.Vertices, Vertex{p.From.Rotate(float64(k) * step), p.Bulge})
			}
		}
	}
	switch plain(pitch[0]).(type) {
	case involute.Line, involute.Arc:
		if roughLength(pitch[0]) >= negligible { // else it was left out, and its end is where the path starts
			path = startInMiddle(path, len(chains[0].Pieces))
		}
	}
	report.countPieces(path)
	return path, report, nil
}

// plain takes the role off a curve.
func plain(c involute.Curve) involute.Curve {
	if p, ok := c.(involute.Piece); ok {
		return p.Curve
	}
	return c
}

// fitPitch returns a chain for each curve that is long enough to keep, and the
// deviation and chord count of one pitch.
func fitPitch(pitch []involute.Curve, tolerance float64) ([]chain, FitReport, error) {
	var chains []chain
	var walks []*walk
	var report FitReport
	chords := 0
	for i, c := range pitch {
		if roughLength(c) < negligible {
			continue
		}
		w, err := newWalk(plain(c))
		if err != nil {
			return nil, report, fmt.Errorf("curve %d of the pitch: %w", i+1, err)
		}
		ch, ok := mirrorOfEarlier(w, walks, chains)
		if !ok {
			if ch, err = fitArcs(c, tolerance); err != nil {
				return nil, report, fmt.Errorf("curve %d of the pitch: %w", i+1, err)
			}
		}
		chains, walks = append(chains, ch), append(walks, w)
		report.MaxDeviation = max(report.MaxDeviation, ch.MaxDeviation)
		chords += max(1, int(math.Ceil(w.chords/math.Sqrt(tolerance))))
	}
	if len(chains) == 0 {
		return nil, report, fmt.Errorf("a pitch without curves longer than %g mm", negligible)
	}
	report.LinesNeeded = chords
	return chains, report, nil
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

// mirrorOfEarlier returns the chain of an earlier curve of which w is the mirror
// image in a line through the origin. It is taken as one only if the mirrored
// chain, measured on w, deviates exactly as it does on its own curve.
func mirrorOfEarlier(w *walk, walks []*walk, chains []chain) (chain, bool) {
	const alike = 1e-9 // mm or radians: rounding of a curve and its mirror image
	first, firstDir := w.pointAndDirection(0)
	last, lastDir := w.pointAndDirection(1)
	for i, other := range walks {
		from, _ := other.pointAndDirection(0)
		if math.Abs(other.length-w.length) > alike*w.size || math.Abs(from.Norm()-last.Norm()) > alike*w.size {
			continue
		}
		pieces := mirrored(chains[i].Pieces, (from.Angle()+last.Angle())/2)
		start, _ := pieces[0].directions()
		_, end := pieces[len(pieces)-1].directions()
		if pieces[0].From.Sub(first).Norm() > alike*w.size ||
			math.Abs(turn(start, firstDir)) > straightBulge*4 || math.Abs(turn(end, lastDir)) > straightBulge*4 {
			continue
		}
		if d := w.deviation(pieces, 0, 1); math.Abs(d-chains[i].MaxDeviation) <= alike*w.size {
			return chain{pieces, max(d, chains[i].MaxDeviation)}, true
		}
	}
	return chain{}, false
}

// joinChains moves each chain's end onto the start of the next one, and returns
// the greatest such move.
func joinChains(chains []chain, step float64) (gap float64, err error) {
	for i := range chains {
		pieces := chains[i].Pieces
		end := &pieces[len(pieces)-1].To
		next := chains[(i+1)%len(chains)].Pieces[0].From
		if i == len(chains)-1 {
			next = next.Rotate(step)
		}
		move := next.Sub(*end).Norm()
		if !(move < negligible) {
			return 0, fmt.Errorf("curve %d of the pitch ends at (%.6f, %.6f), the next starts at (%.6f, %.6f): the ends must meet",
				i+1, end.X, end.Y, next.X, next.Y)
		}
		gap = max(gap, move)
		*end = next
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

// judgeJoints notes corners and the sharpest break at the joints of one pitch.
func (r *FitReport) judgeJoints(chains []chain, step float64) {
	for i, ch := range chains {
		for j, p := range ch.Pieces {
			inside := j+1 < len(ch.Pieces)
			var next piece
			switch {
			case inside:
				next = ch.Pieces[j+1]
			case i+1 < len(chains):
				next = chains[i+1].Pieces[0]
			default:
				next = chains[0].Pieces[0].rotated(step)
			}
			_, end := p.directions()
			start, _ := next.directions()
			angle := math.Abs(turn(end, start))
			if !inside && angle > cornerAngle {
				r.Corners++
				continue
			}
			r.MaxTangentBreakDeg = max(r.MaxTangentBreakDeg, angle*180/math.Pi)
		}
	}
	r.Corners *= int(math.Round(2 * math.Pi / step))
}

// countPieces counts and measures the pieces of the whole path.
func (r *FitReport) countPieces(path Path) {
	r.Segments = len(path.Vertices)
	for i := range path.Vertices {
		from, to, b := path.ends(i)
		if b == 0 {
			r.Lines++
			continue
		}
		p := piece{from, to, b}
		length, radius := p.length(), 1/math.Abs(p.curvature())
		if r.Arcs == 0 {
			r.ShortestArc, r.MinRadius = length, radius
		}
		r.Arcs++
		r.ShortestArc = min(r.ShortestArc, length)
		r.MinRadius, r.MaxRadius = min(r.MinRadius, radius), max(r.MaxRadius, radius)
	}
}
