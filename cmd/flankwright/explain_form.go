package main

import (
	"math"

	"flankwright/involute"
)

const srcMill = "geometry: an end mill between the flanks, as a pin over which one measures; ISO/TR 10064-2:1996"

// explainRoot explains the nominal tooth's root diameter.
func explainRoot(e *explainer, g *gear, d, m, hfP, x quantity) quantity {
	df := mm("d_f", g.nominal.RootDiameter())
	seat, milled := g.nominal.MillSeat()
	switch {
	case milled && seat.Single:
		explainSingleArc(e, g, seat, df)
	case milled && g.rootBy.a > 0:
		e.result("root diameter, as the mate needs it", "d_f = 2 * a - d_a2 - 2 * c", df, srcPair,
			mm("a", g.rootBy.a), mm("d_a2", g.rootBy.mateTip), mm("c", g.rootBy.clearance))
	default:
		e.result("root diameter, nominal", "d_f = d - 2 * m_n * (h_fP - x)", df, srcGear, d, m, hfP, x)
	}
	return df
}

// explainSingleArc explains the root of a mill that rests on both flanks.
func explainSingleArc(e *explainer, g *gear, seat involute.MillSeat, df quantity) {
	t := g.nominal
	z, sn, d, at := num("z", float64(g.g.Teeth())), mm("s_n", t.Thickness()), mm("d", g.g.ReferenceDiameter()), deg("α_t", g.g.TransversePressureAngle())
	mill, rc := mm("D", 2*seat.Radius), mm("r_c", seat.Center)
	if seat.Radial {
		e.result("center of the end mill between the radial flanks", "r_c = D / 2 / sin(pi / z - s_n / d - inv(α_t))", rc, srcMill, mill, z, sn, d, at)
	} else {
		db := mm("d_b", g.g.BaseDiameter())
		inv := involute.Inv(math.Acos(min(1, g.g.BaseDiameter()/2/seat.Center)))
		right := t.Thickness()/d.Value + involute.Inv(g.g.TransversePressureAngle()) - math.Pi/z.Value + mill.Value/db.Value
		e.solved("center of the end mill between the flanks", "inv(acos(d_b / (2 * r_c))) = s_n / d + inv(α_t) - pi / z + D / d_b", rc, inv-right, srcMill,
			db, sn, d, at, z, mill)
	}
	e.result("root diameter, as deep as the end mill gets", "d_f = 2 * r_c - D", df, srcMill, rc, mill)
}

// explainMilledForm explains where the involute begins above a milled root.
func explainMilledForm(e *explainer, seat involute.MillSeat, df, db, form quantity) {
	if seat.Radial {
		e.result("form diameter: radial below the base circle", "d_Ff = d_b", form, srcMill, db)
		return
	}
	e.result("form diameter, where the end mill's arc meets the involute",
		"d_Ff = 2 * sqrt((d_b / 2) ^ 2 + (sqrt((d_f / 2 + D / 2) ^ 2 - (d_b / 2) ^ 2) - D / 2) ^ 2)", form, srcMill, db, df, mm("D", 2*seat.Radius))
}

// explainTipEnd explains where chamfer or rounding begin, and the relief.
func explainTipEnd(e *explainer, g *gear, da, db quantity) {
	s := g.g.Spec()
	end := mm("d_Fa", g.g.TipFormDiameter())
	switch {
	case s.TipChamfer > 0:
		e.result("end of the flank, at the chamfer", "d_Fa = d_a - 2 * h_K", end, srcGear, da, mm("h_K", s.TipChamfer))
	case s.TipRound > 0 && s.Relief.Amount == 0:
		e.result("end of the flank, at the rounding", "d_Fa = 2 * sqrt((d_b / 2) ^ 2 + (sqrt((d_a / 2 - ρ_K) ^ 2 - (d_b / 2) ^ 2) + ρ_K) ^ 2)", end, srcGeometry,
			db, da, mm("ρ_K", s.TipRound))
	}
	if s.Relief.Amount > 0 {
		length := (math.Sqrt(da.Value*da.Value-db.Value*db.Value) - math.Sqrt(s.Relief.Start*s.Relief.Start-db.Value*db.Value)) / 2
		e.result("length of roll over which the tip is relieved", "L_C = (sqrt(d_a ^ 2 - d_b ^ 2) - sqrt(d_C ^ 2 - d_b ^ 2)) / 2", mm("L_C", length), srcGear,
			da, db, mm("d_C", s.Relief.Start))
	}
}
