package involute

import "math"

// A Chord is a chordal thickness and the height above it to the tip, mm.
type Chord struct{ Thickness, Height float64 }

// Chord returns the chordal thickness at the reference cylinder, in the normal
// section taken as a spur tooth of z_v = z/cos³ β teeth, and its height below
// a blank of measured tip diameter tip (mm):
//
//	ψ = s_n/(z_v m_n),  s_c = z_v m_n sin ψ,  h_c = (tip − d)/2 + z_v m_n (1 − cos ψ)/2
//
// (ISO/TR 10064-2:1996, chordal tooth thickness; Machinery's Handbook, chordal dimensions.)
func (t Tooth) Chord(tip float64) Chord {
	dv := t.VirtualTeeth() * t.spec.Module
	s, c := math.Sincos(t.sn / dv)
	return Chord{dv * s, (tip-t.d)/2 + dv*(1-c)/2}
}

// ThicknessFromChord returns s_n for a chordal thickness at the reference
// cylinder: Chord turned round.
func (g *Gear) ThicknessFromChord(chord float64) (float64, error) {
	dv := g.VirtualTeeth() * g.spec.Module
	if math.Abs(chord) > math.Abs(dv) {
		return 0, impossible(ReadingTooLarge, chord, math.Abs(dv))
	}
	return dv * math.Asin(chord/dv), nil
}

// ConstantChord returns the chord between the points where the basic rack
// touches the tooth, s_cc = s_n cos² α_n, and its height below the tip
// diameter tip: (tip − d)/2 − s_n sin α_n cos α_n/2 (ISO/TR 10064-2:1996, chordal tooth thickness; DIN 3960:1987, constant chord).
// It does not depend on the number of teeth.
func (t Tooth) ConstantChord(tip float64) Chord {
	s, c := math.Sincos(t.PressureAngle())
	return Chord{t.sn * c * c, (tip-t.d)/2 - t.sn*s*c/2}
}

// ThicknessFromConstantChord returns s_n for a constant chord.
func (g *Gear) ThicknessFromConstantChord(chord float64) float64 {
	c := math.Cos(g.PressureAngle())
	return chord / (c * c)
}

// ConstantChordDiameter returns the cylinder that the constant chord touches, mm:
// the point s_n cos α_n/2 along the flank's normal from the pitch point.
func (t Tooth) ConstantChordDiameter() float64 {
	along := t.db/2*math.Tan(t.alphaT) + t.sn*math.Cos(t.PressureAngle())/2*math.Cos(t.betaB)
	return math.Copysign(2*math.Hypot(t.db/2, along), t.z)
}
