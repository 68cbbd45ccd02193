package main

import (
	"math"

	"flankwright/involute"
)

// explainDims explains the dimensions of gears and of the meshes between them.
func (j *job) explainDims(gears []*gear) []explanation {
	var all []explanation
	for _, g := range gears {
		all = append(all, explainGear(g)...)
	}
	for _, m := range j.meshes {
		if len(gears) == len(j.gears) || gears[0] == m.first || gears[0] == m.second {
			all = append(all, explainMesh(m)...)
		}
	}
	return all
}

func explainGear(g *gear) []explanation {
	e := &explainer{about: g.name}
	t, gg := g.nominal, g.g
	s := gg.Spec()
	beta := math.Abs(s.Helix)
	z, m, x := num("z", float64(gg.Teeth())), mm("m_n", gg.Module()), num("x", s.Shift)
	an, b := deg("α_n", gg.PressureAngle()), deg("β", beta)
	at, d := deg("α_t", gg.TransversePressureAngle()), mm("d", gg.ReferenceDiameter())
	db, da := mm("d_b", gg.BaseDiameter()), mm("d_a", gg.TipDiameter())
	haP, hfP, rho := num("h_aP", s.Rack.Addendum), num("h_fP", s.Rack.Dedendum), num("ρ_fP", s.Rack.TipRadius)
	sn := mm("s_n", t.Thickness())

	if g.dp != 0 {
		e.result("module", "m_n = 25.4 / P_n", m, "the inch is 25.4 mm", num("P_n", g.dp))
	}
	e.result("pitch (reference) diameter", "d = z * m_n / cos(β)", d, srcGear, z, m, b)
	e.result("transverse pressure angle", "α_t = atan(tan(α_n) / cos(β))", at, srcGear, an, b)
	e.result("base diameter", "d_b = d * cos(α_t)", db, srcGear, d, at)
	e.result("tooth thickness, nominal", "s_n = m_n * (pi / 2 + 2 * x * tan(α_n))", sn, srcGear, m, x, an)
	explainTip(e, g, d, m, haP, x, da)
	df := explainRoot(e, g, d, m, hfP, x)
	e.result("whole depth", "h = (d_a - d_f) / 2", mm("h", (da.Value-df.Value)/2), srcGear, da, df)
	if seat, milled := t.MillSeat(); milled {
		explainMilledForm(e, seat, df, db, mm("d_Ff", t.FormDiameter()))
	} else {
		explainForm(e, t, z, x, m, an, at, db, hfP, rho)
	}
	explainTipEnd(e, g, da, db)
	ata := deg("α_at", math.Acos(gg.BaseDiameter()/gg.TipDiameter()))
	e.result("pressure angle at the tip", "α_at = acos(d_b / d_a)", ata, srcGear, db, da)
	e.result("tip thickness, normal", "s_an = d_a * (s_n / cos(β) / d + inv(α_t) - inv(α_at)) * cos(atan(tan(β) * d_a / d))",
		mm("s_an", t.TipThickness()), srcGear, da, sn, b, d, at, ata)
	e.result("base pitch, normal", "p_bn = pi * m_n * cos(α_n)", mm("p_bn", gg.NormalBasePitch()), srcGear, m, an)
	e.result("angle of index", "τ = 2 * pi / z", deg("τ", 2*math.Pi/z.Value), srcGear, z)
	if lead, ok := gg.Lead(); ok {
		e.result("lead", "p_z = z * pi * m_n / sin(β)", mm("p_z", lead), srcGear, z, m, b)
	}
	e.result("least shift without undercut", "x_min = h_fP - ρ_fP * (1 - sin(α_n)) - z * sin(α_t) ^ 2 / (2 * cos(β))", num("x_min", gg.UndercutLimit()), srcGear+"; "+srcRack,
		hfP, rho, an, z, at, b)
	explainLimits(e, g, an, m, hfP, haP, d)
	explainOpenings(e, g)
	return e.list
}

func explainTip(e *explainer, g *gear, d, m, haP, x, da quantity) {
	switch {
	case g.measured:
		e.result("outside (tip) diameter, as measured", "d_a = d_measured", da, "the blank", mm("d_measured", da.Value))
	case g.shortened:
		e.result("outside (tip) diameter, shortened for the mate", "d_a = 2 * a - d_f2 - 2 * c", da, srcPair, g.tipInputs()...)
	case g.settings.has("tip_diameter"):
		e.result("outside (tip) diameter, as given", "d_a = d_given", da, "the job", mm("d_given", da.Value))
	default:
		e.result("outside (tip) diameter", "d_a = d + 2 * m_n * (h_aP + x)", da, srcGear, d, m, haP, x)
	}
}

// tipInputs returns what decided a shortened tip.
func (g *gear) tipInputs() []quantity {
	return []quantity{mm("a", g.tipBy.a), mm("d_f2", g.tipBy.mateRoot), mm("c", g.tipBy.clearance)}
}

func explainForm(e *explainer, t involute.Tooth, z, x, m, an, at, db, hfP, rho quantity) {
	form := mm("d_Ff", t.FormDiameter())
	if t.Undercut() {
		explainUndercut(e, t, z, at, db, form)
		return
	}
	e.result("form diameter", "d_Ff = sqrt(d_b ^ 2 + (d_b * tan(α_t) - 2 * m_n * (h_fP - ρ_fP * (1 - sin(α_n)) - x) / sin(α_t)) ^ 2)",
		form, srcGear+"; "+srcRack, db, at, m, hfP, rho, an, x)
}

// explainUndercut explains the form diameter of an undercut tooth: the tool's
// normal angle ψ is solved for, the point follows.
func explainUndercut(e *explainer, t involute.Tooth, z, at, db, form quantity) {
	end := t.FilletEnd()
	b, d := deg("β", math.Abs(t.Spec().Helix)), mm("d", t.ReferenceDiameter())
	psi, h, rho, land := deg("ψ", end.Psi), mm("h_0", end.H), mm("ρ_0", end.Rho), mm("e_0", end.E)
	a, y, theta := mm("A", end.A), mm("Y", end.Y), deg("θ", end.SpaceAngle)
	const src = "trochoid of the rack's tip by the law of gearing; " + srcRack
	e.result("end of the fillet, across", "A = cos(β) * (h_0 * tan(ψ) + ρ_0 * sin(ψ))", a, src, b, h, psi, rho)
	e.result("end of the fillet, up", "Y = d / 2 - h_0 - ρ_0 * cos(ψ)", y, src, d, h, rho, psi)
	e.result("end of the fillet, angle from the space's center", "θ = atan(A / Y) - (A - (e_0 + ρ_0 * sin(ψ)) / cos(β)) / (d / 2)", theta, src, a, y, land, rho, psi, b, d)
	e.solved("where the undercut meets the involute (undercut)",
		"θ = pi / z - (s_n / cos(β) / d + inv(α_t) - inv(acos(d_b / (2 * sqrt(A ^ 2 + Y ^ 2)))))", psi, end.Residual, src,
		theta, z, mm("s_n", t.Thickness()), b, d, at, db, a, y)
	e.result("form diameter (undercut)", "d_Ff = 2 * sqrt(A ^ 2 + Y ^ 2)", form, src, a, y)
}

func explainLimits(e *explainer, g *gear, an, m, hfP, haP, d quantity) {
	low := g.thickness.Limits.Min
	if low == g.nominal.Thickness() {
		return
	}
	if g.thin != nil {
		sn := mm("s_n", g.nominal.Thickness())
		e.result("thickest tooth, from thin", "s_nmax = s_n - t_min", mm("s_nmax", g.thickness.Limits.Max), orDefault(g.thinSource, "the job"), sn, mm("t_min", g.thin.Min))
		e.result("thinnest tooth, from thin", "s_nmin = s_n - t_max", mm("s_nmin", low), orDefault(g.thinSource, "the job"), sn, mm("t_max", g.thin.Max))
	}
	explainFixed(e, g, d)
	dfe := mm("d_fE", g.rootLimits().Min)
	if g.g.GeneratingShift(low) == g.g.Spec().Shift { // the flanks alone are moved
		e.result("depth of cut of the thinnest tooth", "h_E = (d_blank - d_fE) / 2", mm("h_E", g.depthOfCut().Max), srcGear, mm("d_blank", g.g.TipDiameter()), dfe)
		return
	}
	xe := num("x_E", g.g.GeneratingShift(low))
	e.result("generating shift of the thinnest tooth", "x_E = (s_nmin / m_n - pi / 2) / (2 * tan(α_n))", xe, srcGear, mm("s_nmin", low), m, an)
	e.result("root diameter of the thinnest tooth", "d_fE = d - 2 * m_n * (h_fP - x_E)", dfe, srcGear, d, m, hfP, xe)
	blank := mm("d_blank", g.g.TipDiameter())
	if g.g.Spec().Topped {
		blank = mm("d_blank", g.tipLimits().Min)
		e.result("outside diameter of the thinnest tooth, topped", "d_blank = d + 2 * m_n * (h_aP + x_E)", blank, srcGear, d, m, haP, xe)
	}
	e.result("depth of cut of the thinnest tooth", "h_E = (d_blank - d_fE) / 2", mm("h_E", g.depthOfCut().Max), srcGear, blank, dfe)
}
