package refdata

import (
	"fmt"
	"math"
)

// An Accuracy is a flank tolerance class of ISO 1328-1 in one of its two
// editions, which differ in formulas and values. The lower the class, the finer.
type Accuracy struct {
	Edition int // 2013 or 1995
	Class   int // 1 to 11 (2013) or 0 to 12 (1995, which says grade)
}

// String returns the accuracy as it is written on drawings, for example
// "ISO 1328-1:2013 class 8" or "ISO 1328-1:1995 grade 8".
func (a Accuracy) String() string {
	return fmt.Sprintf("ISO 1328-1:%d %s %d", a.Edition, a.word(), a.Class)
}

// word is what the edition calls a class.
func (a Accuracy) word() string {
	if a.Edition == 1995 {
		return "grade"
	}
	return "class"
}

// check returns an error where there is no such edition or class.
func (a Accuracy) check() error {
	var finest, coarsest int
	switch a.Edition {
	case 2013:
		finest, coarsest = 1, 11
	case 1995:
		finest, coarsest = 0, 12
	default:
		return fmt.Errorf("ISO 1328-1 of %d is not carried; there are the editions 2013 and 1995", a.Edition)
	}
	if a.Class < finest || a.Class > coarsest {
		return fmt.Errorf("ISO 1328-1:%d goes from %s %d (finest) to %d; there is no %[2]s %[5]d", a.Edition, a.word(), finest, coarsest, a.Class)
	}
	return nil
}

// A ToothSize is what flank tolerances depend on. The signs
// that teeth and diameter of an internal gear and the helix angle of a hand have
// by ISO 21771 do not count.
type ToothSize struct {
	ReferenceDiameter float64 // d, mm
	Module            float64 // normal module m_n, mm
	FaceWidth         float64 // b of this gear, not of the pair, mm; 0: not known
	Teeth             int     // z; 0: not known
	HelixAngle        float64 // β, radians
}

// largestSize in mm is where a size is taken for a slip of the pen: 1 km.
const largestSize = 1e6

// settled returns g without signs, or an error where a size is no size.
func (g ToothSize) settled() (ToothSize, error) {
	g.ReferenceDiameter, g.HelixAngle = math.Abs(g.ReferenceDiameter), math.Abs(g.HelixAngle)
	if g.Teeth < 0 {
		g.Teeth = -g.Teeth
	}
	for _, s := range []struct {
		name string
		mm   float64
	}{{"reference diameter", g.ReferenceDiameter}, {"module", g.Module}, {"face width", g.FaceWidth}} {
		if known := s.mm > 0 || s.name == "face width" && s.mm == 0; !known || s.mm > largestSize {
			return g, fmt.Errorf("no flank tolerances for a %s of %.8g mm; it must be above 0 and at most %.0f mm", s.name, s.mm, largestSize)
		}
	}
	if !(g.HelixAngle < math.Pi/2) {
		return g, fmt.Errorf("no flank tolerances for a helix angle of %.8g°; it must be below 90°", degrees(g.HelixAngle))
	}
	return g, nil
}

func degrees(radians float64) float64 { return radians * 180 / math.Pi }

// FlankTolerances are the tolerances of one gear's flanks in mm. Single pitch
// and the slopes apply as plus and minus; the others are total widths.
type FlankTolerances struct {
	Accuracy        Accuracy
	SinglePitch     float64 // f_pt, ±
	CumulativePitch float64 // F_p
	AdjacentPitch   float64 // f_u; 0: the edition has none (1995)
	ProfileSlope    float64 // f_Hα, ±
	ProfileForm     float64 // f_fα
	Profile         float64 // F_α
	HelixSlope      float64 // f_Hβ, ±; 0 without HasHelix
	HelixForm       float64 // f_fβ; 0 without HasHelix
	Helix           float64 // F_β; 0 without HasHelix
	HasHelix        bool    // the face width is known
	Runout          float64 // F_r
	// Used is what went into the formulas: the gear's own sizes (2013) or the
	// geometric means of the standard's size ranges that hold them (1995).
	Used ToothSize
	// Outside names each size outside the standard's range of validity, with its
	// number and the range. The tolerances are extrapolated unless it is empty.
	Outside      []string
	Source       Source
	RunoutSource Source
}

// Tolerances returns the tolerances of a gear, rounded as the standard rounds:
// the value of class 5, unrounded, times √2^(class−5), then to the nearest
// micrometer above 10 µm, half a micrometer from 5 to 10 µm and 0.1 µm below;
// half a step goes up.
//
// Formulas (clause 5 of ISO 1328-1:2013; ISO 1328-1:1995, with runout of ISO
// 1328-2:1997) stand at class5of2013 and grade5of1995. Outside the range
// of validity the formulas of 2013 are extrapolated and those of 1995 take the
// nearest range; Outside says so. A size that is none is an error.
func (a Accuracy) Tolerances(g ToothSize) (FlankTolerances, error) {
	t, err := a.micrometers(g)
	t.each(roundedTolerance)
	return t, err
}

// Unrounded returns the tolerances before they are rounded.
func (a Accuracy) Unrounded(g ToothSize) (FlankTolerances, error) {
	t, err := a.micrometers(g)
	t.each(func(um float64) float64 { return um / 1000 })
	return t, err
}

// SectorPitch returns F_pk, the tolerance of the pitch over a sector of k
// pitches, in mm, rounded as Tolerances rounds. k goes from 2 to a quarter of
// the teeth: there F_pk of 2013 has become F_p, which rules beyond. Whether the
// gear lies outside of the range of validity is said by Tolerances.
func (a Accuracy) SectorPitch(g ToothSize, k int) (mm float64, source Source, err error) {
	um, source, err := a.sectorMicrometers(g, k)
	return roundedTolerance(um), source, err
}

func (a Accuracy) sectorMicrometers(g ToothSize, k int) (um float64, source Source, err error) {
	t, err := a.micrometers(g)
	if err != nil {
		return 0, Source{}, err
	}
	z := t.Used.Teeth
	if k < 2 || k > z/4 {
		return 0, Source{}, fmt.Errorf("no tolerance for a sector of %d pitches on %d teeth; a sector has from 2 pitches to a quarter of the teeth (%d), beyond which the cumulative pitch tolerance rules",
			k, z, z/4)
	}
	if a.Edition == 1995 {
		return t.SinglePitch + a.factor()*sector5of1995(t.Used, k), t.Source, nil
	}
	return t.SinglePitch + a.factor()*sector5of2013(t.Used, k), source2013("informative annex, sector pitch"), nil
}

// micrometers returns the unrounded tolerances in micrometers.
func (a Accuracy) micrometers(g ToothSize) (FlankTolerances, error) {
	if err := a.check(); err != nil {
		return FlankTolerances{}, err
	}
	g, err := g.settled()
	if err != nil {
		return FlankTolerances{}, err
	}
	var t FlankTolerances
	if a.Edition == 1995 {
		t = grade5of1995(g)
	} else {
		t = class5of2013(g)
	}
	t.Accuracy = a
	t.each(func(um float64) float64 { return um * a.factor() })
	return t, nil
}

// factor is what class 5 is multiplied by: √2 from class to class.
func (a Accuracy) factor() float64 { return math.Pow(2, float64(a.Class-5)/2) }

// each replaces every tolerance by f of it.
func (t *FlankTolerances) each(f func(float64) float64) {
	for _, v := range []*float64{
		&t.SinglePitch, &t.CumulativePitch, &t.AdjacentPitch, &t.ProfileSlope, &t.ProfileForm, &t.Profile,
		&t.HelixSlope, &t.HelixForm, &t.Helix, &t.Runout,
	} {
		*v = f(*v)
	}
}

// halfStep lets a value on half a step go up however its last bits fell, in
// steps; values that matter differ from half a step by more than 1e-6.
const halfStep = 0.5 + 1e-9

// roundedTolerance rounds micrometers by both editions' rule (2013: clause
// 5.2) and returns mm.
func roundedTolerance(um float64) (mm float64) {
	perUm := 10.0
	switch {
	case um > 10:
		perUm = 1
	case um >= 5:
		perUm = 2
	}
	return math.Floor(um*perUm+halfStep) / (perUm * 1000)
}
