package refdata

import (
	"fmt"
	"math"
)

// A Keyway is a keyway in a bore for a parallel key. All lengths are in mm,
// for inch keys too.
type Keyway struct {
	Width      float64 // of key and keyway
	Height     float64 // of the key
	HubDepth   float64 // DIN's t2: AcrossBore − bore
	AcrossBore float64 // from the wall of the bore across to the bottom of the keyway: d + t2, ASME's T
	// DepthTolerance is how much greater AcrossBore may be; it may not be less.
	DepthTolerance float64
	Source         Source
}

// MetricKeyway returns the hub keyway of DIN 6885-1 for a bore from 6 to
// 150 mm (a size on a limit belongs to the smaller key).
func MetricKeyway(boreMM float64) (Keyway, error) {
	rs := records("keyways_metric")
	least, most := rs[0].number("over_mm"), rs[len(rs)-1].number("upto_mm")
	r, ok := sizeRow(rs, boreMM, "over_mm", "upto_mm")
	if !ok && math.Abs(boreMM-least) <= sizeSlack {
		r, ok = rs[0], true // the table's first limit belongs to its first row
	}
	if !ok {
		return Keyway{}, fmt.Errorf("no metric keyway for a bore of %g mm: %s covers bores from %g to %g mm; give width and depth instead",
			boreMM, rs[0].source().Standard, least, most)
	}
	depth := r.number("t2")
	return Keyway{
		Width:          r.number("b"),
		Height:         r.number("h"),
		HubDepth:       depth,
		AcrossBore:     boreMM + depth,
		DepthTolerance: r.number("t2_tol_plus"),
		Source:         r.source(),
	}, nil
}

// InchKeyway returns the hub keyway of ASME B17.1 for a square parallel key in
// a bore above 5/16 in, up to 4-1/2 in. The bore is in inches, the result in mm:
//
//	Y = (D − √(D² − W²))/2,  T = D − Y + H/2 + 0.005 in, tolerance +0.010/−0 in,
//
// with D the bore, W the key's width, H its height and T the distance across
// the bore.
func InchKeyway(boreIn float64) (Keyway, error) {
	rs := records("keyways_inch")
	r, ok := sizeRow(rs, boreIn, "over_in", "upto_in")
	if !ok {
		return Keyway{}, fmt.Errorf("no inch keyway for a bore of %g in: %s covers bores above %s in (%g), up to %s in; give width and depth instead",
			boreIn, rs[0].source().Standard, rs[0].text("over"), rs[0].number("over_in"), rs[len(rs)-1].text("upto"))
	}
	width := r.number("key_w_in")
	across := acrossBoreInch(boreIn, width, width)
	return Keyway{
		Width:          width * mmPerInch,
		Height:         width * mmPerInch,
		HubDepth:       (across - boreIn) * mmPerInch,
		AcrossBore:     across * mmPerInch,
		DepthTolerance: 0.010 * mmPerInch,
		Source:         r.source(),
	}, nil
}

// acrossBoreInch returns ASME B17.1's T in inches for a parallel key.
func acrossBoreInch(bore, width, height float64) float64 {
	chord := (bore - math.Sqrt(bore*bore-width*width)) / 2
	return bore - chord + height/2 + 0.005
}
