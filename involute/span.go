package involute

import "math"

// Span returns W_k, the base tangent length over k teeth, normal to the flanks:
// W_k = (k − 1) p_bn + s_bn, with s_bn = d_b ψ_b cos β_b, mm
// (ISO/TR 10064-2:1996, span measurement). External gears, k ≥ 1.
func (t Tooth) Span(k int) float64 {
	return float64(k-1)*t.NormalBasePitch() + t.baseSpan()*t.halfBaseAngle()
}

// ThicknessFromSpan returns the normal thickness s_n at the reference cylinder
// for a span w over k teeth: Span turned round.
func (g *Gear) ThicknessFromSpan(k int, w float64) (float64, error) {
	base := w - float64(k-1)*g.NormalBasePitch()
	if k < 1 {
		return 0, impossible(NoSpan, float64(k), 1)
	}
	return (base/g.baseSpan() - g.invT) * g.d * math.Cos(g.spec.Helix), nil
}

// SpanContactDiameter returns where the measuring faces touch, if both touch
// alike: √(d_b² + (W cos β_b)²), mm.
func (g *Gear) SpanContactDiameter(w float64) float64 {
	return math.Hypot(g.db, w*math.Cos(g.betaB))
}

// SpanFaceWidth returns W sin β_b, how far the two contact points of a helical
// gear lie apart along the axis, mm. A narrower face cannot be measured.
func (g *Gear) SpanFaceWidth(w float64) float64 { return w * math.Sin(g.betaB) }

// IdealSpanTeeth returns the number of teeth, not rounded, whose span touches
// on the cylinder d + 2 x m_n, x being the shift that the thickness implies.
func (t Tooth) IdealSpanTeeth() float64 {
	w := t.db * tanOfCos(t.db, t.TouchDiameter()) / math.Cos(t.betaB)
	return (w-t.Span(1))/t.NormalBasePitch() + 1
}

// TouchDiameter returns the cylinder d + 2 x_E m_n on which a pin or a span touches best, mm.
func (t Tooth) TouchDiameter() float64 {
	return t.d + 2*t.GeneratingShift(t.sn)*t.spec.Module
}
