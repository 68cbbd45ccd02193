package involute

import (
	"fmt"
	"math"
)

// A Reason says why a gear or a mesh cannot be.
type Reason int

// The reasons, each with what Value and Limit of an Impossible hold.
const (
	NotFinite            Reason = iota // a number is not finite, or out of any sense
	BadTeeth                           // Value: z; Limit: the least
	BadModule                          // Value: m_n, mm
	BadPressureAngle                   // Value: α_n; Limit: the bound passed, radians
	BadHelix                           // Value: β; Limit: the bound passed, radians
	RackPointed                        // Value: h_fP*; Limit: where the tool comes to a point, π/(4 tan α_n)
	RackTipTooRound                    // Value: ρ_fP*; Limit: the largest that fits
	RackTooShallow                     // Value: h_fP*; Limit: 0
	TipBelowBase                       // Value: d_a; Limit: d_b
	TipBelowRoot                       // Value: d_a; Limit: d_f
	RootNotPositive                    // Value: d_f; Limit: 0
	Pointed                            // Value: d_a; Limit: the diameter at which the flanks meet
	ThicknessNotPositive               // Value: s_n; Limit: 0
	SpaceClosed                        // Value: s_n; Limit: the normal pitch
	NoInvolute                         // Value: d_Ff; Limit: the tip form diameter
	CutOff                             // Value: the least width of the tooth above its root, mm (negative or 0)
	ChamferTooLarge                    // Value: the chamfer, mm; Limit: the largest
	RoundTooLarge                      // Value: the rounding's radius, mm; Limit: the largest
	ReliefOff                          // Value: where the relief starts, diameter; Limit: the end of the flank that it passes
	ReliefTooLarge                     // Value: the amount, mm; Limit: the largest
	TooThick                           // Value: s_n; Limit: the thickest that a tool at this depth leaves
	MillTooLarge                       // Value: the end mill's diameter; Limit: the largest that passes, 0 where none does
	MillHelical                        // Value: β, radians; an end mill along the axis cuts no helix
	MillTooDeep                        // Value: the root diameter asked for; Limit: 0 or the tip diameter, between which it must lie
	CenterTooSmall                     // Value: a; Limit: (d_b1 + d_b2)/2
	CenterNeverTight                   // Value: inv α_wt wanted, negative; Limit 0
	MatesDiffer                        // the two gears' base pitches or helices do not fit
	PinFallsThrough                    // Value: D; Limit: the least pin that rests on both flanks
	NoSpan                             // Value: k; Limit: the least
	ReadingTooSmall                    // Value: the reading, mm; Limit: what the base circle alone gives
	ReadingTooLarge                    // Value: the reading, mm; Limit: what the circle allows
	NotExternal                        // Value: z; the question is about external gears
	NoFreeReading                      // straight pins between free anvils find no least distance; Value: β_K
)

// An Impossible is the error of a gear or a mesh that cannot be. Lengths in
// Value and Limit are mm, angles radians, diameters positive.
type Impossible struct {
	Reason       Reason
	Value, Limit float64
}

// Error names the reason by number; the program's edge words it for people.
func (e *Impossible) Error() string {
	return fmt.Sprintf("impossible gear (reason %d): %g against %g", e.Reason, e.Value, e.Limit)
}

func impossible(r Reason, value, limit float64) error {
	return &Impossible{Reason: r, Value: value, Limit: limit}
}

func finite(xs ...float64) bool {
	for _, x := range xs {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return false
		}
	}
	return true
}
