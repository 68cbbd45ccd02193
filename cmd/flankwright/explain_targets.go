package main

import (
	"math"

	"flankwright/involute"
)

// explainTargets explains the measurements of every gear at the middle of the
// thickness limits.
func (j *job) explainTargets(t *targets) []explanation {
	var all []explanation
	for i, g := range t.list {
		e := &explainer{about: g.name}
		tooth := g.middle()
		for _, p := range t.gears[i].OverPins {
			explainPins(e, tooth, p)
		}
		for _, s := range t.gears[i].Span {
			explainSpan(e, tooth, s)
		}
		explainChords(e, tooth, t.gears[i])
		all = append(all, e.list...)
	}
	return all
}

func explainPins(e *explainer, t involute.Tooth, p pinTarget) {
	seat, err := t.Seat(p.Pin)
	if err != nil {
		return
	}
	z, pin := num("z", float64(t.Teeth())), mm("D", p.Pin)
	d, db := mm("d", t.ReferenceDiameter()), mm("d_b", t.BaseDiameter())
	b, bb := deg("β", math.Abs(t.Spec().Helix)), deg("β_b", t.BaseHelix())
	at, sn := deg("α_t", t.TransversePressureAngle()), mm("s_n", t.Thickness())
	alpha := math.Acos(t.BaseDiameter() / seat.CenterDiameter)
	ak := deg("α_Kt", alpha)
	right := t.Thickness()/math.Cos(t.Spec().Helix)/t.ReferenceDiameter() + involute.Inv(t.TransversePressureAngle()) -
		math.Pi/float64(t.Teeth()) + p.Pin/(t.BaseDiameter()*math.Cos(t.BaseHelix()))
	e.solved("pressure angle at the pin's center", "inv(α_Kt) = s_n / cos(β) / d + inv(α_t) - pi / z + D / (d_b * cos(β_b))",
		ak, involute.Inv(alpha)-right, srcThickness+" (over balls)", sn, b, d, at, z, pin, db, bb)
	dK := mm("d_K", seat.CenterDiameter)
	e.result("circle of the pin centers", "d_K = d_b / cos(α_Kt)", dK, srcThickness+" (over balls)", db, ak)
	r, err := t.Reading(involute.TwoPins, seat.CenterDiameter, p.Pin, 0)
	if err != nil {
		return
	}
	m := mm("M", r.Value)
	if t.Teeth()%2 == 0 {
		e.result("over two "+p.Kind, "M = d_K + D", m, srcThickness+" (over balls)", dK, pin)
	} else {
		e.result("over two "+p.Kind, "M = d_K * cos(pi / (2 * z)) + D", m, srcThickness+" (over balls)", dK, pin, z)
	}
	e.result("contact diameter of the "+p.Kind, "d_c = d_b * sqrt(1 + (tan(α_Kt) - D * cos(β_b) / d_b) ^ 2)", mm("d_c", seat.ContactDiameter), srcGeometry, db, ak, pin, bb)
	explainAlso(e, t, p, dK, pin, z)
}

func explainAlso(e *explainer, t involute.Tooth, p pinTarget, dK, pin, z quantity) {
	for _, a := range p.Also {
		switch a.Way {
		case "three pins":
			e.result("over three pins", "M_3 = d_K * (1 + cos(pi / z)) / 2 + D", mm("M_3", dK.Value*(1+math.Cos(math.Pi/z.Value))/2+pin.Value), srcGeometry, dK, z, pin)
		case "one pin to the axis":
			e.result("one pin to the axis", "M_1 = (d_K + D) / 2", mm("M_1", (dK.Value+pin.Value)/2), srcGeometry, dK, pin)
		case "rollers exactly opposed":
			e.result("over straight pins exactly opposed", "M_R = d_K + D", mm("M_R", dK.Value+pin.Value), "DIN 3960:1987, rollers", dK, pin)
		}
	}
}

func explainSpan(e *explainer, t involute.Tooth, s spanTarget) {
	if s.Length == nil {
		return
	}
	k, m, an := num("k", float64(s.Teeth)), mm("m_n", t.Module()), deg("α_n", t.PressureAngle())
	db, bb, b := mm("d_b", t.BaseDiameter()), deg("β_b", t.BaseHelix()), deg("β", math.Abs(t.Spec().Helix))
	w := mm("W_k", t.Span(s.Teeth))
	e.result("span over "+teethText(s.Teeth), "W_k = (k - 1) * pi * m_n * cos(α_n) + d_b * cos(β_b) * (s_n / cos(β) / d + inv(α_t))", w,
		srcThickness+" (span)", k, m, an, db, bb, mm("s_n", t.Thickness()), b, mm("d", t.ReferenceDiameter()), deg("α_t", t.TransversePressureAngle()))
	e.result("contact diameter of the span over "+teethText(s.Teeth), "d_c = sqrt(d_b ^ 2 + (W_k * cos(β_b)) ^ 2)",
		mm("d_c", t.SpanContactDiameter(w.Value)), srcGeometry, db, w, bb)
}

func explainChords(e *explainer, t involute.Tooth, g gearTargets) {
	zv, m, sn := num("z_v", t.VirtualTeeth()), mm("m_n", t.Module()), mm("s_n", t.Thickness())
	tip, d, an := mm("d_aM", g.Chordal.Tip), mm("d", t.ReferenceDiameter()), deg("α_n", t.PressureAngle())
	c, cc := t.Chord(g.Chordal.Tip), t.ConstantChord(g.Chordal.Tip)
	e.result("chordal thickness", "s_c = z_v * m_n * sin(s_n / (z_v * m_n))", mm("s_c", c.Thickness), srcThickness+" (chordal)", zv, m, sn)
	e.result("chordal height", "h_c = (d_aM - d) / 2 + z_v * m_n / 2 * (1 - cos(s_n / (z_v * m_n)))", mm("h_c", c.Height), srcThickness+" (chordal)", tip, d, zv, m, sn)
	e.result("constant chord", "s_cc = s_n * cos(α_n) ^ 2", mm("s_cc", cc.Thickness), "DIN 3960:1987, constant chord", sn, an)
	e.result("constant chord height", "h_cc = (d_aM - d) / 2 - s_n * sin(α_n) * cos(α_n) / 2", mm("h_cc", cc.Height), "DIN 3960:1987, constant chord", tip, d, sn, an)
}
