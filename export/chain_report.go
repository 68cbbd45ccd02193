package export

import (
	"math"
	"slices"

	"flankwright/involute"
)

// A FitReport says what became of a gear's outline when it was turned into arcs.
// A joint of two exact lines or arcs that turns by up to 1° is no corner and shows
// in MaxTangentBreakDeg; fitted arcs add under 0.01°.
type FitReport struct {
	Segments, Arcs, Lines int     // of the whole path; Segments = Arcs + Lines
	MaxDeviation          float64 // mm, either side of the exact outline
	MaxOutside, MaxInside float64 // mm, to the outside (≥ 0) and to the inside (≤ 0)
	MaxTangentBreakDeg    float64 // the sharpest turn at a joint that is no corner
	Corners               int     // joints that stay corners of the outline (tooth tips)
	ShortestArc           float64 // mm, along it; 0 without arcs
	MinRadius, MaxRadius  float64 // mm; 0 without arcs
	MinHollow             float64 // the smallest radius of a hollow arc, which a cutter has to follow, mm; 0 at a hollow corner
	LinesNeeded           int     // straight lines that the same tolerance would take
	ArcsPerFlank          int     // pieces on one flank
	ArcsPerFillet         int     // pieces on one fillet

	kinks int // joints of Corners that are none of the outline's, but kept since no chain went round them
}

// report fills in the report on a finished path.
func (p *pitch) report(sections []section, chains []chain, gap float64, path Path) FitReport {
	var r FitReport
	var flank, fillet int
	for i, ch := range chains {
		r.MaxOutside, r.MaxInside = max(r.MaxOutside, ch.High), min(r.MaxInside, ch.Low)
		for c, n := range ch.Counts {
			switch role(p.curves[sections[i].from+c]) {
			case involute.ToothFlank:
				flank += n
			case involute.RootFillet:
				fillet += n
			}
		}
	}
	// The pitch holds two of each, mirror images of one another.
	r.ArcsPerFlank, r.ArcsPerFillet = (flank+1)/2, (fillet+1)/2
	r.MaxDeviation = max(r.MaxOutside, -r.MaxInside) + gap
	r.judgeJoints(p, sections, chains)
	r.countPieces(path)
	return r
}

// role returns the role of a curve, −1 for one without.
func role(c involute.Curve) involute.Role {
	if p, ok := c.(involute.Piece); ok {
		return p.Role
	}
	return -1
}

// judgeJoints notes corners and the sharpest break at the joints of one pitch.
func (r *FitReport) judgeJoints(p *pitch, sections []section, chains []chain) {
	var pieces []piece
	var corner []bool // before each piece
	for i, ch := range chains {
		pieces = append(pieces, ch.Pieces...)
		r.kinks += len(ch.Corners)
		for j := range ch.Pieces {
			corner = append(corner, j == 0 && p.corner(sections[i].from) || slices.Contains(ch.Corners, j))
		}
	}
	pieces = append(pieces, pieces[0].rotated(p.step))
	corner = append(corner, corner[0])
	for i := 1; i < len(pieces); i++ {
		if corner[i] {
			r.Corners++
			continue
		}
		_, end := pieces[i-1].directions()
		start, _ := pieces[i].directions()
		r.MaxTangentBreakDeg = max(r.MaxTangentBreakDeg, math.Abs(turn(end, start))*180/math.Pi)
	}
	r.Corners *= p.count
}

// countPieces counts and measures the pieces of the whole path.
func (r *FitReport) countPieces(path Path) {
	r.Segments, r.MinHollow = len(path.Vertices), path.minHollow()
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

// recount counts the pieces of another path made of this one.
func (r *FitReport) recount(path Path) {
	r.Arcs, r.Lines, r.ShortestArc, r.MinRadius, r.MaxRadius, r.LinesNeeded = 0, 0, 0, 0, 0, 0
	r.countPieces(path)
}

// Pieces counts and measures the pieces of a path, in a report that says no more.
func (p Path) Pieces() FitReport {
	var r FitReport
	r.countPieces(p)
	return r
}

// minHollow returns the smallest radius at which the path turns to the right, away
// from the metal: 0 where it has a corner of more than 1° there, +Inf where it
// never does.
func (p Path) minHollow() float64 {
	least := math.Inf(1)
	n := len(p.Vertices)
	at := func(i int) piece { from, to, b := p.ends(i % n); return piece{from, to, b} }
	for i := range n {
		if k := at(i).curvature(); k < 0 {
			least = min(least, -1/k)
		}
		_, end := at(i).directions()
		start, _ := at(i + 1).directions()
		if turn(end, start) < -cornerAngle {
			return 0
		}
	}
	return least
}
