package main

import (
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

func explainMesh(m *mesh) []explanation {
	e := &explainer{about: m.first.name + " and " + m.second.name}
	mm1, g1, g2 := m.plan.Mesh, m.first.g, m.second.g
	a := mm("a", m.plan.Nominal())
	db1, db2 := mm("d_b1", g1.BaseDiameter()), mm("d_b2", g2.BaseDiameter())
	alpha, err := mm1.WorkingPressureAngle(a.Value)
	if err != nil {
		return nil
	}
	aw := deg("α_wt", alpha)
	e.result("working pressure angle", "α_wt = acos((d_b1 + d_b2) / (2 * a))", aw, srcPair, db1, db2, a)
	explainTight(e, m, db1, db2)
	explainContact(e, m, a, aw, db1, db2)
	explainThinning(e, m)
	explainPlay(e, m, db1, db2)
	c1, c2 := mm1.TipClearances(a.Value, m.first.nominal, m.second.nominal)
	e.result("tip clearance of "+m.first.name, "c_1 = a - d_a1 / 2 - d_f2 / 2", mm("c_1", c1), srcPair, a, mm("d_a1", g1.TipDiameter()), mm("d_f2", m.second.nominal.RootDiameter()))
	e.result("tip clearance of "+m.second.name, "c_2 = a - d_a2 / 2 - d_f1 / 2", mm("c_2", c2), srcPair, a, mm("d_a2", g2.TipDiameter()), mm("d_f1", m.first.nominal.RootDiameter()))
	if face := m.face(); face > 0 && g1.Helical() {
		e.result("overlap ratio", "ε_β = b * sin(β) / (pi * m_n)", num("ε_β", mm1.OverlapRatio(face)), srcPair, mm("b", face), deg("β", math.Abs(g1.Spec().Helix)), mm("m_n", g1.Module()))
	}
	return e.list
}

// explainTight explains the center distance without backlash: an inverse involute.
func explainTight(e *explainer, m *mesh, db1, db2 quantity) {
	g := m.first.g
	s1, s2 := m.first.g.NominalThickness(), m.second.g.NominalThickness()
	a0, err := m.plan.Mesh.TightCenter(s1, s2)
	if err != nil {
		return
	}
	alpha, err := m.plan.Mesh.WorkingPressureAngle(a0)
	if err != nil {
		return
	}
	at := g.TransversePressureAngle()
	d1, d2 := g.ReferenceDiameter(), m.second.g.ReferenceDiameter()
	right := m.plan.Mesh.TightInv(s1, s2)
	e.solved("working pressure angle without backlash, nominal teeth",
		"inv(α_w0) = inv(α_t) + ((s_n1 + s_n2) / cos(β) - pi * m_n / cos(β)) / (d_1 + d_2)",
		deg("α_w0", alpha), involute.Inv(alpha)-right, srcPair,
		deg("α_t", at), mm("s_n1", s1), mm("s_n2", s2), deg("β", math.Abs(g.Spec().Helix)), mm("m_n", g.Module()), mm("d_1", d1), mm("d_2", d2))
	e.result("center distance without backlash, nominal teeth", "a_0 = (d_b1 + d_b2) / (2 * cos(α_w0))", mm("a_0", a0), srcPair, db1, db2, deg("α_w0", alpha))
}

// explainEnds explains where the active profiles begin at the roots, and the
// specific sliding there.
func explainEnds(e *explainer, m *mesh, c involute.Contact, a, aw, db1, db2 quantity) {
	line := mm("T", a.Value*math.Sin(aw.Value*involute.Degree))
	e.result("distance of the base tangent points", "T = a * sin(α_wt)", line, srcPair, a, aw)
	for _, end := range []struct {
		own, mate         *gear
		ownBase, mateBase quantity
		i, k              string
		rho, other, start float64
		limited           bool
		u                 float64
		slide             involute.Sliding
	}{
		{m.first, m.second, db1, db2, "1", "2", c.RhoA1, c.RhoA2, c.Start1, c.PastForm1 > 0, m.plan.Mesh.Ratio(), c.SlidingA1},
		{m.second, m.first, db2, db1, "2", "1", c.RhoE2, c.RhoE1, c.Start2, c.PastForm2 > 0, 1 / m.plan.Mesh.Ratio(), c.SlidingE2},
	} {
		rho := mm("ρ_f"+end.i, end.rho)
		own, mate := quantity{"d_b" + end.i, end.ownBase.Value, "mm"}, quantity{"d_b" + end.k, end.mateBase.Value, "mm"}
		if end.limited {
			form := mm("d_Ff"+end.i, end.own.nominal.FormDiameter())
			e.result("contact at the root of "+end.own.name+", ended by its own form diameter", rho.Symbol+" = sqrt("+form.Symbol+" ^ 2 - "+own.Symbol+" ^ 2) / 2", rho, srcPair, form, own)
		} else {
			tip := mm("d_Fa"+end.k, end.mate.g.TipFormDiameter())
			e.result("contact at the root of "+end.own.name+", ended by the mate's tip", rho.Symbol+" = T - sqrt("+tip.Symbol+" ^ 2 - "+mate.Symbol+" ^ 2) / 2", rho, srcPair, line, tip, mate)
		}
		start := mm("d_Nf"+end.i, end.start)
		e.result("start of active profile of "+end.own.name, start.Symbol+" = sqrt("+own.Symbol+" ^ 2 + 4 * "+rho.Symbol+" ^ 2)", start, srcPair, own, rho)
		if !end.slide.Unbounded {
			z := num("ζ_f"+end.i, end.slide.Value)
			e.result("specific sliding at the root of "+end.own.name, z.Symbol+" = 1 - (T - "+rho.Symbol+") / (u * "+rho.Symbol+")", z, srcPair+"; ratio of the rolling speeds", line, rho, num("u", end.u))
		}
	}
}

func explainContact(e *explainer, m *mesh, a, aw, db1, db2 quantity) {
	c, err := m.plan.Mesh.Contact(a.Value, m.first.nominal, m.second.nominal)
	if err != nil || c.TransverseRatio == 0 {
		return
	}
	pbt := mm("p_bt", m.first.g.TransverseBasePitch())
	end1, end2 := mm("d_Na1", c.End1), mm("d_Na2", c.End2)
	e.result("contact ratio, transverse, between the ends of the active profiles",
		"ε_α = (sqrt(d_Na1 ^ 2 - d_b1 ^ 2) / 2 + sqrt(d_Na2 ^ 2 - d_b2 ^ 2) / 2 - a * sin(α_wt)) / p_bt",
		num("ε_α", c.TransverseRatio), srcPair, end1, db1, end2, db2, a, aw, pbt)
	explainEnds(e, m, c, a, aw, db1, db2)
}

// explainThinning explains what both gears together must be thinner for the
// backlash asked for, and where they share it alone, the limits that follow. With more
// than geometry in the budget that is for the command backlash to explain.
func explainThinning(e *explainer, m *mesh) {
	want := m.plan.Backlash
	geometric := !m.burdened() && m.plan.Method == inspect.WorstCase && !m.plan.LeastOnly
	if want == nil || !geometric || (m.first.ownThin() != nil && m.second.ownThin() != nil) {
		return
	}
	g := m.first.g
	s1, s2 := m.first.g.NominalThickness(), m.second.g.NominalThickness()
	for _, end := range []struct {
		name, index string
		a, j        float64
		pick        func(inspect.Limits) float64
	}{
		{"least", "min", m.plan.Tightest(), want.Min, func(l inspect.Limits) float64 { return l.Max }},
		{"greatest", "max", m.plan.Loosest(), want.Max, func(l inspect.Limits) float64 { return l.Min }},
	} {
		p, err1 := m.plan.Mesh.Backlash(end.a, s1, s2)
		alpha, err2 := m.plan.Mesh.WorkingPressureAngle(end.a)
		sum, err3 := m.plan.Mesh.ThinningForBacklash(end.a, s1, s2, end.j)
		if err1 != nil || err2 != nil || err3 != nil {
			return
		}
		aw := workingAt(e, m, end.index, end.a, alpha)
		t := mm("T_"+end.index, sum)
		e.result("thinning of both gears for the "+end.name+" backlash, from what nominal teeth have at that center",
			t.Symbol+" = (j_asked - j_nominal) * cos("+aw.Symbol+") * cos(β) / cos(α_t)", t, srcPair,
			mm("j_asked", end.j), mm("j_nominal", p.Circumferential), aw, deg("β", math.Abs(g.Spec().Helix)), deg("α_t", g.TransversePressureAngle()))
		r := mm("T_"+end.index, (s1-end.pick(m.first.thickness.Limits))+(s2-end.pick(m.second.thickness.Limits)))
		e.result("what the thickness limits found come to", r.Symbol+" = s_n1 - s_1 + s_n2 - s_2", r, srcPair,
			mm("s_n1", s1), mm("s_1", end.pick(m.first.thickness.Limits)), mm("s_n2", s2), mm("s_2", end.pick(m.second.thickness.Limits)))
	}
}

// workingAt explains the working pressure angle at the tightest (min) or the
// loosest (max) center distance, and returns it.
func workingAt(e *explainer, m *mesh, index string, a, alpha float64) quantity {
	aw, at := deg("α_wt"+index, alpha), mm("a_"+index, a)
	e.result("working pressure angle at the center distance of the "+map[string]string{"min": "least", "max": "greatest"}[index]+" backlash",
		aw.Symbol+" = acos((d_b1 + d_b2) / (2 * "+at.Symbol+"))", aw, srcPair, mm("d_b1", m.first.g.BaseDiameter()), mm("d_b2", m.second.g.BaseDiameter()), at)
	return aw
}

// explainPlay explains the least and the greatest backlash.
func explainPlay(e *explainer, m *mesh, db1, db2 quantity) {
	mm1 := m.plan.Mesh
	g := m.first.g
	for _, end := range []struct {
		name, index string
		a, s1, s2   float64
	}{
		{"least", "min", m.plan.Tightest(), m.first.thickness.Limits.Max, m.second.thickness.Limits.Max},
		{"greatest", "max", m.plan.Loosest(), m.first.thickness.Limits.Min, m.second.thickness.Limits.Min},
	} {
		p, err := mm1.Backlash(end.a, end.s1, end.s2)
		if err != nil {
			continue
		}
		alpha, _ := mm1.WorkingPressureAngle(end.a)
		aw := workingAt(e, m, end.index, end.a, alpha)
		inv := num("inv_tight_"+end.index, mm1.TightInv(end.s1, end.s2))
		e.result("involute of the working angle at which the "+end.name+" backlash would be nil",
			inv.Symbol+" = inv(α_t) + ((s_n1 + s_n2) / cos(β) - pi * m_n / cos(β)) / (d_1 + d_2)", inv, srcPair,
			deg("α_t", g.TransversePressureAngle()), mm("s_n1", end.s1), mm("s_n2", end.s2), deg("β", math.Abs(g.Spec().Helix)),
			mm("m_n", g.Module()), mm("d_1", g.ReferenceDiameter()), mm("d_2", m.second.g.ReferenceDiameter()))
		j := mm("j_wt"+end.index, p.Circumferential)
		e.result(end.name+" backlash, circumferential", j.Symbol+" = (d_b1 + d_b2) * (inv("+aw.Symbol+") - "+inv.Symbol+") / cos("+aw.Symbol+")", j, srcPair, db1, db2, aw, inv)
		n := mm("j_bn"+end.index, p.Normal)
		e.result(end.name+" backlash, normal", n.Symbol+" = "+j.Symbol+" * cos("+aw.Symbol+") * cos(β_b)", n, srcPair, j, aw, deg("β_b", g.BaseHelix()))
		t1, t2 := deg("j_θ1"+end.index, p.AngleFirst), deg("j_θ2"+end.index, p.AngleSecond)
		e.result(end.name+" backlash as an angle of "+m.first.name, t1.Symbol+" = 2 * "+j.Symbol+" * cos("+aw.Symbol+") / d_b1", t1, srcPair, j, aw, db1)
		e.result(end.name+" backlash as an angle of "+m.second.name, t2.Symbol+" = 2 * "+j.Symbol+" * cos("+aw.Symbol+") / d_b2", t2, srcPair, j, aw, db2)
		if tight, err := mm1.TightCenter(end.s1, end.s2); err == nil && p.CanTighten {
			angle, _ := mm1.WorkingPressureAngle(tight)
			at := deg("α_tight_"+end.index, angle)
			e.solved("working pressure angle at which the "+end.name+" backlash would be nil", "inv("+at.Symbol+") = "+inv.Symbol, at, involute.Inv(angle)-inv.Value, srcPair, inv)
			r := mm("j_r"+end.index, p.CenterPlay)
			e.result(end.name+" play of the center distance", r.Symbol+" = a_"+end.index+" - (d_b1 + d_b2) / (2 * cos("+at.Symbol+"))", r, srcPair, mm("a_"+end.index, end.a), db1, db2, at)
		}
	}
}
