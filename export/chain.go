package export

import (
	"fmt"
	"math"

	"flankwright/involute"
)

// From a tooth's exact curves to the arcs that a machine runs. Read, in this order:
//
//   - chain_piece.go: one line or arc between two points, told by its bulge
//   - chain_pattern.go: how far arcs reach on a flank, and why their joints lie where they do
//   - chain_walk.go and chain_run.go: the curves between two corners or exact arcs, walked at an even pace
//   - chain_fit.go and chain_biarc.go: a chain of a given number of arcs, told by a few numbers
//   - chain_search.go and chain_minimax.go: the numbers for which it comes nearest to the curves
//   - chain_deviation.go: how far arcs and curve lie apart, and why that is certain
//   - chain_count.go: the fewest arcs that keep the tolerance
//   - chain_strips.go: what is done if the search finds none
//   - chain_lines.go: straight lines instead of arcs
//   - chain_pitch.go: one pitch cut into runs and exact pieces
//   - chain_path.go and chain_report.go: the chains of one pitch, repeated round the gear, and what became of it

// A Side says to which side of the exact outline a fitted one may lie.
type Side int

// The sides: both, or one of them. The metal is on the inside.
const (
	Both    Side = iota
	Outside      // the drawn tooth never lacks metal
	Inside       // the drawn tooth never has metal to spare
)

// String returns "both", "outside" or "inside".
func (s Side) String() string { return [...]string{"both", "outside", "inside"}[s] }

// FitOptions say how a curve is turned into arcs.
type FitOptions struct {
	Tolerance float64 // how far the arcs may leave the exact curves, mm
	Side      Side    // to which side
	MinArc    float64 // no arc shorter than this as far as the tolerance allows, mm; 0 for none
	MaxSweep  float64 // no arc turns by more, radians; 0 for a quarter turn
	Lines     bool    // straight lines instead of arcs
}

const (
	// straightBulge is the bulge below which an arc is written as its chord:
	// tan(sweep/4) of an arc 10 000 times as large in radius as long. The chord
	// turns off the arc's ends by half the sweep, 0.003°, so that even two
	// chords in a row keep their joint under 0.01°; the distance between chord
	// and curve is measured like any other.
	straightBulge = 0.25e-4

	// finestTolerance is the smallest tolerance taken, as a share of the curve's
	// size: coordinates carry 2.2e-16 of themselves and the measured deviation
	// some ten times that, so 1e-10 leaves five digits of the tolerance.
	finestTolerance = 1e-10
)

// check refuses options that make no sense and fills in the sweep.
func (o FitOptions) check() (FitOptions, error) {
	switch {
	case !positive(o.Tolerance):
		return o, fmt.Errorf("tolerance %g mm: must be a length above 0", o.Tolerance)
	case o.MinArc < 0 || !finite(o.MinArc):
		return o, fmt.Errorf("shortest arc %g mm: must be a length, or 0 for none", o.MinArc)
	case o.Side < Both || o.Side > Inside:
		return o, fmt.Errorf("tolerance side %d: must be both, outside or inside", o.Side)
	case o.MaxSweep == 0:
		o.MaxSweep = math.Pi / 2
	}
	if !(o.MaxSweep >= LeastSweep && o.MaxSweep <= math.Pi) {
		return o, fmt.Errorf("greatest sweep %g°: must be from %g° to 180°", o.MaxSweep*180/math.Pi, LeastSweep*180/math.Pi)
	}
	return o, nil
}

// LeastSweep is the smallest limit for the sweep of an arc, radians: a finer one
// would cut a gear into tens of thousands of arcs.
const LeastSweep = math.Pi / 180

// Band returns how far inside (≤ 0) and outside of the exact curves the options
// let the fitted ones lie, mm.
func (o FitOptions) Band() (inside, outside float64) {
	switch o.Side {
	case Outside:
		return 0, o.Tolerance
	case Inside:
		return -o.Tolerance, 0
	}
	return -o.Tolerance, o.Tolerance
}

// band returns the offsets the options allow, a millionth short of the
// tolerance, so that closing the joints between chains (to the rounding of
// coordinates) does not exceed it.
func (o FitOptions) band() band {
	most := o.Tolerance * (1 - 1e-6)
	switch o.Side {
	case Outside:
		return band{0, most}
	case Inside:
		return band{-most, 0}
	}
	return band{-most, most}
}

// A chain is what a stretch of the outline becomes: arcs and lines that meet end
// to end. Those of a run, and of an exact line or arc, meet without a corner.
type chain struct {
	Pieces    []piece
	Counts    []int   // of the pieces, on each curve
	Corners   []int   // the pieces that start at a kink of the curves which was kept
	Low, High float64 // the farthest it lies inside (≤ 0) and outside of the curves, mm: measured, not assumed
}

// splitSweeps returns the chain with every arc that turns by more than most cut into equal parts.
func (c chain) splitSweeps(most float64) chain {
	out := chain{Low: c.Low, High: c.High}
	i, corners := 0, c.Corners
	for _, n := range c.Counts {
		before := len(out.Pieces)
		for ; n > 0; n-- {
			if len(corners) > 0 && corners[0] == i {
				out.Corners, corners = append(out.Corners, len(out.Pieces)), corners[1:]
			}
			parts := int(math.Ceil(math.Abs(c.Pieces[i].sweep())/most - 1e-13))
			out.Pieces = append(out.Pieces, c.Pieces[i].parts(parts)...)
			i++
		}
		out.Counts = append(out.Counts, len(out.Pieces)-before)
	}
	return out
}

// exactChain returns a line or an arc as itself.
func exactChain(c involute.Curve) (chain, error) {
	switch c := c.(type) {
	case involute.Line:
		if length := c.To.Sub(c.From).Norm(); !positive(length) {
			return chain{}, fmt.Errorf("a line of length %g mm: must be above 0", length)
		}
		return chain{Pieces: []piece{{From: c.From, To: c.To}}, Counts: []int{1}}, nil
	case involute.Arc:
		return exactArc(c)
	}
	return chain{}, fmt.Errorf("a %T is neither a line nor an arc", c)
}

// exactArc returns an arc as itself, over 90° in equal parts.
func exactArc(a involute.Arc) (chain, error) {
	if length := a.Radius * math.Abs(a.Sweep); !positive(length) {
		return chain{}, fmt.Errorf("an arc of radius %g mm and sweep %g rad: both must be numbers other than 0", a.Radius, a.Sweep)
	}
	if turns := math.Abs(a.Sweep) / (2 * math.Pi); turns > 1+1e-12 {
		return chain{}, fmt.Errorf("an arc of %.3g turns: at most one", turns)
	}
	parts := int(math.Ceil(math.Abs(a.Sweep)/(math.Pi/2) - 1e-13))
	bulge := math.Tan(a.Sweep / float64(parts) / 4)
	ch := chain{Counts: []int{parts}}
	from, _ := a.At(0)
	for i := 1; i <= parts; i++ {
		to, _ := a.At(float64(i) / float64(parts))
		ch.Pieces = append(ch.Pieces, piece{From: from, To: to, Bulge: bulge})
		from = to
	}
	return ch, nil
}
