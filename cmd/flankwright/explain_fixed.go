package main

import (
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// explainFixed explains thickness limits that come from a drawing, or from a
// gear already made: the formulas of the targets turned round.
func explainFixed(e *explainer, g *gear, d quantity) {
	if g.drawn == nil {
		return
	}
	for _, end := range []struct {
		index, name string
		value, s    float64
	}{{"max", "thickest", g.drawn.limits.Max, g.thickness.Limits.Max}, {"min", "thinnest", g.drawn.limits.Min, g.thickness.Limits.Min}} {
		b, at, s := deg("β", math.Abs(g.g.Spec().Helix)), deg("α_t", g.g.TransversePressureAngle()), mm("s_n"+end.index, end.s)
		db, bb := mm("d_b", g.g.BaseDiameter()), deg("β_b", g.g.BaseHelix())
		switch m := g.drawn.measure.(type) {
		case inspect.Span:
			e.result(end.name+" tooth, from the span over "+teethText(m.Teeth),
				s.Symbol+" = d * cos(β) * ((W_k - (k - 1) * pi * m_n * cos(α_n)) / (d_b * cos(β_b)) - inv(α_t))", s, srcThickness+" (span), turned round",
				d, b, mm("W_k", end.value), num("k", float64(m.Teeth)), mm("m_n", g.g.Module()), deg("α_n", g.g.PressureAngle()), db, bb, at)
		case inspect.OverPins:
			z, pin := num("z", float64(g.g.Teeth())), mm("D", m.Pin)
			dK, ok := explainCenters(e, g, m, end.name, end.value, z, pin)
			if !ok {
				return
			}
			ak := deg("α_Kt", math.Acos(db.Value/dK.Value))
			const src = srcThickness + " (over balls), turned round"
			e.result("pressure angle at the pin's center, "+end.name+" tooth", "α_Kt = acos(d_b / d_K)", ak, src, db, dK)
			e.result(end.name+" tooth, from over_pins", s.Symbol+" = d * cos(β) * (inv(α_Kt) + pi / z - D / (d_b * cos(β_b)) - inv(α_t))", s, src, d, b, ak, z, pin, db, bb, at)
		}
	}
}

// explainCenters explains the circle of the pin centers that a reading stands for.
func explainCenters(e *explainer, g *gear, m inspect.OverPins, name string, value float64, z, pin quantity) (dK quantity, ok bool) {
	center, err := g.g.CenterFromReading(m.Way, value, m.Pin, m.Bore)
	if err != nil {
		return dK, false
	}
	dK, reading, in := mm("d_K", center), mm("M", value), []quantity(nil)
	equation, source := "d_K = M - D", srcThickness+" (over balls), turned round"
	switch {
	case m.Way == involute.FreePins:
		tooth, err := g.g.Tooth(g.thickness.Limits.Middle())
		if err == nil {
			explainFree(e, tooth, dK, pin, z)
		}
		return dK, err == nil
	case m.Way == involute.TwoPins && g.g.Teeth()%2 != 0:
		equation, in = "d_K = (M - D) / cos(pi / (2 * z))", []quantity{z}
	case m.Way == involute.ThreePins:
		equation, in, source = "d_K = 2 * (M - D) / (1 + cos(pi / z))", []quantity{z}, srcGeometry
	case m.Way == involute.PinToAxis:
		equation, source = "d_K = 2 * M - D", srcGeometry
	case m.Way == involute.PinToFarSide:
		equation, in, source = "d_K = 2 * M - D - d_i", []quantity{mm("d_i", m.Bore)}, srcGeometry
	}
	e.result("circle of the pin centers, "+name+" tooth", equation, dK, source, append(in, reading, pin)...)
	return dK, true
}
