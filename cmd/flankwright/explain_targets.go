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

// explainSeat explains where a pin's center comes to lie.
func explainSeat(e *explainer, t involute.Tooth, seat involute.PinSeat, z, pin quantity) (ak, dK quantity) {
	d, db := mm("d", t.ReferenceDiameter()), mm("d_b", t.BaseDiameter())
	b, bb := deg("β", math.Abs(t.Spec().Helix)), deg("β_b", t.BaseHelix())
	at, sn := deg("α_t", t.TransversePressureAngle()), mm("s_n", t.Thickness())
	alpha := math.Acos(t.BaseDiameter() / seat.CenterDiameter)
	ak = deg("α_Kt", alpha)
	right := t.Thickness()/math.Cos(t.Spec().Helix)/t.ReferenceDiameter() + involute.Inv(t.TransversePressureAngle()) -
		math.Pi/float64(t.Teeth()) + pin.Value/(t.BaseDiameter()*math.Cos(t.BaseHelix()))
	e.solved("pressure angle at the pin's center", "inv(α_Kt) = s_n / cos(β) / d + inv(α_t) - pi / z + D / (d_b * cos(β_b))",
		ak, involute.Inv(alpha)-right, srcThickness+" (over balls)", sn, b, d, at, z, pin, db, bb)
	dK = mm("d_K", seat.CenterDiameter)
	e.result("circle of the pin centers", "d_K = d_b / cos(α_Kt)", dK, srcThickness+" (over balls)", db, ak)
	return ak, dK
}

func explainPins(e *explainer, t involute.Tooth, p pinTarget) {
	seat, err := t.Seat(p.Pin)
	if err != nil {
		return
	}
	z, pin := num("z", float64(t.Teeth())), mm("D", p.Pin)
	db, at := mm("d_b", t.BaseDiameter()), deg("α_t", t.TransversePressureAngle())
	b, bb := deg("β", math.Abs(t.Spec().Helix)), deg("β_b", t.BaseHelix())
	ak, dK := explainSeat(e, t, seat, z, pin)
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
	explainSensitivity(e, t, seat, at, b, ak, bb, z)
	explainAlso(e, t, p, dK, pin, z)
}

// explainSensitivity explains what a thinner tooth and a larger pin do to the reading.
func explainSensitivity(e *explainer, t involute.Tooth, seat involute.PinSeat, at, b, ak, bb, z quantity) {
	byThickness, byPin := t.PinSensitivity(involute.TwoPins, seat)
	factor, more := "1", []quantity(nil)
	if t.Teeth()%2 != 0 {
		factor, more = "cos(pi / (2 * z))", []quantity{z}
	}
	e.result("how much less a tooth thinner by 1 reads", "M_s = "+factor+" * cos(α_t) / (cos(β) * sin(α_Kt))", num("M_s", byThickness), srcGeometry, append(more, at, b, ak)...)
	an := deg("α_n", t.PressureAngle())
	if t.FedDeeper() {
		e.result("how much less a cut deeper by 1 reads", "M_h = 2 * tan(α_n) * M_s", num("M_h", t.ThinningPerDepth()*byThickness), srcGeometry, an, num("M_s", byThickness))
	} else {
		e.result("how much less it reads with 1 off each flank, along its normal", "M_n = 2 * M_s / cos(α_n)", num("M_n", 2*byThickness/math.Cos(t.PressureAngle())), srcGeometry, num("M_s", byThickness), an)
	}
	e.result("how much more a pin larger by 1 reads", "M_D = "+factor+" / (sin(α_Kt) * cos(β_b)) + 1", num("M_D", byPin), srcGeometry, append(more, ak, bb)...)
}

func valueOf(p *float64) float64 {
	if p == nil {
		return 0
	}
	return *p
}

func explainAlso(e *explainer, t involute.Tooth, p pinTarget, dK, pin, z quantity) {
	twoPins, twoD := dK, pin
	for _, a := range p.Also {
		dK, pin := twoPins, twoD
		if a.Pin != nil { // measured otherwise than the two
			seat, err := t.Seat(*a.Pin)
			if err != nil {
				continue
			}
			pin = mm("D", *a.Pin)
			_, dK = explainSeat(e, t, seat, z, pin)
		}
		switch a.Way {
		case "three pins":
			e.result("over three pins", "M_3 = d_K * (1 + cos(pi / z)) / 2 + D", mm("M_3", dK.Value*(1+math.Cos(math.Pi/z.Value))/2+pin.Value), srcGeometry, dK, z, pin)
		case "one pin to the axis":
			e.result("one pin to the axis", "M_1 = (d_K + D) / 2", mm("M_1", (dK.Value+pin.Value)/2), srcGeometry, dK, pin)
		case "one pin to the far side of the bore", "one pin to the far side of the arbor":
			bore := mm("d_i", 2*valueOf(a.Aim)-dK.Value-pin.Value)
			e.result(a.Way, "M_b = (d_K + D + d_i) / 2", mm("M_b", valueOf(a.Aim)), srcGeometry, dK, pin, bore)
		case "rollers between free parallel anvils":
			explainFree(e, t, dK, pin, z)
		case "rollers exactly opposed":
			e.result("over straight pins exactly opposed", "M_R = d_K + D", mm("M_R", dK.Value+pin.Value), "DIN 3960:1987, rollers", dK, pin)
		}
	}
}

// explainFree explains the least reading over straight pins between free
// anvils: the slide ζ along the axis is solved for, the reading follows.
func explainFree(e *explainer, t involute.Tooth, dK, pin, z quantity) {
	r, err := t.Reading(involute.FreePins, dK.Value, pin.Value, 0)
	if err != nil {
		return
	}
	const src = "geometry of two skew pins between parallel anvils; no standard gives it"
	b, d := deg("β", math.Abs(t.Spec().Helix)), mm("d", t.ReferenceDiameter())
	bk := deg("β_K", t.HelixAt(dK.Value))
	e.result("helix angle on the circle of the pin centers", "β_K = atan(tan(β) * d_K / d)", bk, srcGear, b, dK, d)
	s, c := math.Sincos(bk.Value * involute.Degree)
	zeta := mm("ζ", -r.AxialOffset)
	delta := -math.Pi/z.Value + zeta.Value*s/c/(dK.Value/2)
	sd, cd := math.Sincos(delta / 2)
	dq := deg("δ", delta)
	e.result("how far the pins stand from exactly opposite", "δ = -pi / z + ζ * tan(β_K) / (d_K / 2)", dq, src, z, zeta, bk, dK)
	left := zeta.Value * (c*c + s*s*sd*sd)
	e.solved("slide along the axis for the least reading", "ζ * (cos(β_K) ^ 2 + sin(β_K) ^ 2 * sin(δ / 2) ^ 2) = (d_K * cos(β_K) * cos(δ / 2) + ζ * sin(β_K) * sin(δ / 2)) * sin(β_K) * sin(δ / 2)",
		zeta, left-(dK.Value*c*cd+zeta.Value*s*sd)*s*sd, src, bk, dq, dK)
	e.result("over straight pins, free anvils", "M_F = (d_K * cos(β_K) * cos(δ / 2) + ζ * sin(β_K) * sin(δ / 2)) / sqrt(cos(β_K) ^ 2 + sin(β_K) ^ 2 * sin(δ / 2) ^ 2) + D",
		mm("M_F", r.Value), src, dK, bk, dq, zeta, pin)
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
