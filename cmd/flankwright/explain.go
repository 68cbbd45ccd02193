package main

import (
	"math"
	"strconv"

	"flankwright/inspect"
	"flankwright/involute"
)

// A quantity is a named number with its unit: mm, deg, or none.
type quantity struct {
	Symbol string  `json:"symbol"`
	Value  float64 `json:"value"`
	Unit   string  `json:"unit,omitempty"`
}

// An explanation shows how one result came about. Its equation is written so
// that it can be worked out with the numbers beside it: * / + - ^ ( ), pi, and
// inv, sin, cos, tan, asin, acos, atan, sqrt, abs of angles or numbers.
type explanation struct {
	What     string     `json:"what"`
	Equation string     `json:"equation"` // left = right; a solved one does not begin with the result
	Inputs   []quantity `json:"inputs"`
	Result   quantity   `json:"result"`
	Residual *float64   `json:"residual,omitempty"` // of a solved equation, left − right
	Source   string     `json:"source"`
}

// Sources that explanations name.
const (
	srcGear      = "ISO 21771:2007, clause 4 (individual gears)"
	srcPair      = "ISO 21771:2007, clause 5 (gear pairs)"
	srcThickness = "ISO/TR 10064-2:1996, tooth thickness"
	srcRack      = "ISO 53:1998, basic rack and its counterpart"
	srcGeometry  = "geometry of the involute"
)

// An explainer collects explanations about one subject.
type explainer struct {
	about string
	list  []explanation
}

// result adds a result that an equation gives at once.
func (e *explainer) result(what, equation string, r quantity, source string, in ...quantity) {
	e.list = append(e.list, explanation{What: what + ", " + e.about, Equation: equation, Inputs: in, Result: r, Source: source})
}

// solved adds a result found from an equation, with what is left of it.
func (e *explainer) solved(what, equation string, r quantity, residual float64, source string, in ...quantity) {
	e.list = append(e.list, explanation{What: what + ", " + e.about, Equation: equation, Inputs: in, Result: r, Residual: &residual, Source: source})
}

func mm(symbol string, v float64) quantity  { return quantity{symbol, v, "mm"} }
func num(symbol string, v float64) quantity { return quantity{symbol, v, ""} }
func deg(symbol string, rad float64) quantity {
	return quantity{symbol, rad / involute.Degree, "deg"}
}

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
	e.result("root diameter, nominal", "d_f = d - 2 * m_n * (h_fP - x)", mm("d_f", t.RootDiameter()), srcGear, d, m, hfP, x)
	e.result("whole depth", "h = (d_a - d_f) / 2", mm("h", (da.Value-t.RootDiameter())/2), srcGear, da, mm("d_f", t.RootDiameter()))
	explainForm(e, t, z, x, m, an, at, db, hfP, rho)
	ata := deg("α_at", math.Acos(gg.BaseDiameter()/gg.TipDiameter()))
	e.result("pressure angle at the tip", "α_at = acos(d_b / d_a)", ata, srcGear, db, da)
	e.result("tip thickness, normal", "s_an = d_a * (s_n / cos(β) / d + inv(α_t) - inv(α_at)) * cos(atan(tan(β) * d_a / d))",
		mm("s_an", t.TipThickness()), srcGear, da, sn, b, d, at, ata)
	e.result("base pitch, normal", "p_bn = pi * m_n * cos(α_n)", mm("p_bn", gg.NormalBasePitch()), srcGear, m, an)
	explainLimits(e, g, an, m, hfP, d)
	return e.list
}

func explainTip(e *explainer, g *gear, d, m, haP, x, da quantity) {
	switch {
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
	psi, h, rho, land := deg("ψ", end.Psi), mm("h", end.H), mm("ρ", end.Rho), mm("e", end.E)
	a, y, theta := mm("A", end.A), mm("Y", end.Y), deg("θ", end.SpaceAngle)
	const src = "trochoid of the rack's tip by the law of gearing; " + srcRack
	e.result("end of the fillet, across", "A = cos(β) * (h * tan(ψ) + ρ * sin(ψ))", a, src, b, h, psi, rho)
	e.result("end of the fillet, up", "Y = d / 2 - h - ρ * cos(ψ)", y, src, d, h, rho, psi)
	e.result("end of the fillet, angle from the space's center", "θ = atan(A / Y) - (A - (e + ρ * sin(ψ)) / cos(β)) / (d / 2)", theta, src, a, y, land, rho, psi, b, d)
	e.solved("where the undercut meets the involute (undercut)",
		"θ = pi / z - (s_n / cos(β) / d + inv(α_t) - inv(acos(d_b / (2 * sqrt(A ^ 2 + Y ^ 2)))))", psi, end.Residual, src,
		theta, z, mm("s_n", t.Thickness()), b, d, at, db, a, y)
	e.result("form diameter (undercut)", "d_Ff = 2 * sqrt(A ^ 2 + Y ^ 2)", form, src, a, y)
}

func explainLimits(e *explainer, g *gear, an, m, hfP, d quantity) {
	low := g.thickness.Limits.Min
	if low == g.nominal.Thickness() {
		return
	}
	if g.thin != nil {
		sn := mm("s_n", g.nominal.Thickness())
		e.result("thickest tooth, from thin", "s_nmax = s_n - t_min", mm("s_nmax", g.thickness.Limits.Max), "the job", sn, mm("t_min", g.thin.Min))
		e.result("thinnest tooth, from thin", "s_nmin = s_n - t_max", mm("s_nmin", low), "the job", sn, mm("t_max", g.thin.Max))
	}
	xe := num("x_E", g.g.GeneratingShift(low))
	e.result("generating shift of the thinnest tooth", "x_E = (s_nmin / m_n - pi / 2) / (2 * tan(α_n))", xe, srcGear, mm("s_nmin", low), m, an)
	dfe := mm("d_fE", g.g.RootDiameterAt(low))
	e.result("root diameter of the thinnest tooth", "d_fE = d - 2 * m_n * (h_fP - x_E)", dfe, srcGear, d, m, hfP, xe)
	e.result("depth of cut of the thinnest tooth", "h_E = (d_blank - d_fE) / 2", mm("h_E", g.depthOfCut().Max), srcGear, mm("d_blank", g.blank()), dfe)
}

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
	cb := math.Cos(g.Spec().Helix)
	d1, d2 := g.ReferenceDiameter(), m.second.g.ReferenceDiameter()
	right := involute.Inv(at) + ((s1+s2)/cb-math.Pi*g.Module()/cb)/(d1+d2)
	e.solved("working pressure angle without backlash, nominal teeth",
		"inv(α_w0) = inv(α_t) + ((s_n1 + s_n2) / cos(β) - pi * m_n / cos(β)) / (d_1 + d_2)",
		deg("α_w0", alpha), involute.Inv(alpha)-right, srcPair,
		deg("α_t", at), mm("s_n1", s1), mm("s_n2", s2), deg("β", math.Abs(g.Spec().Helix)), mm("m_n", g.Module()), mm("d_1", d1), mm("d_2", d2))
	e.result("center distance without backlash, nominal teeth", "a_0 = (d_b1 + d_b2) / (2 * cos(α_w0))", mm("a_0", a0), srcPair, db1, db2, deg("α_w0", alpha))
}

func explainContact(e *explainer, m *mesh, a, aw, db1, db2 quantity) {
	c, err := m.plan.Mesh.Contact(a.Value, m.first.nominal, m.second.nominal)
	if err != nil {
		return
	}
	pbt := mm("p_bt", m.first.g.TransverseBasePitch())
	end1, end2 := mm("d_Na1", c.End1), mm("d_Na2", c.End2)
	e.result("contact ratio, transverse, between the ends of the active profiles",
		"ε_α = (sqrt(d_Na1 ^ 2 - d_b1 ^ 2) / 2 + sqrt(d_Na2 ^ 2 - d_b2 ^ 2) / 2 - a * sin(α_wt)) / p_bt",
		num("ε_α", c.TransverseRatio), srcPair, end1, db1, end2, db2, a, aw, pbt)
}

// explainThinning explains what both gears together must be thinner for the
// backlash asked for, and where they share it alone, the limits that follow.
func explainThinning(e *explainer, m *mesh) {
	want := m.plan.Backlash
	if want == nil || (m.first.thin != nil && m.second.thin != nil) {
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
		t := mm("T_"+end.index, sum)
		e.result("thinning of both gears for the "+end.name+" backlash, from what nominal teeth have at that center",
			t.Symbol+" = (j_asked - j_nominal) * cos(α_wt) * cos(β) / cos(α_t)", t, srcPair,
			mm("j_asked", end.j), mm("j_nominal", p.Circumferential), deg("α_wt", alpha), deg("β", math.Abs(g.Spec().Helix)), deg("α_t", g.TransversePressureAngle()))
		r := mm("T_"+end.index, (s1-end.pick(m.first.thickness.Limits))+(s2-end.pick(m.second.thickness.Limits)))
		e.result("what the thickness limits found come to", r.Symbol+" = s_n1 - s_1 + s_n2 - s_2", r, srcPair,
			mm("s_n1", s1), mm("s_1", end.pick(m.first.thickness.Limits)), mm("s_n2", s2), mm("s_2", end.pick(m.second.thickness.Limits)))
	}
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
		aw := deg("α_wt", alpha)
		inv := num("inv_tight", involute.Inv(g.TransversePressureAngle())+
			((end.s1+end.s2)/math.Cos(g.Spec().Helix)-g.TransversePitch())/(g.ReferenceDiameter()+m.second.g.ReferenceDiameter()))
		e.result("involute of the working angle at which the "+end.name+" backlash would be nil",
			"inv_tight = inv(α_t) + ((s_n1 + s_n2) / cos(β) - pi * m_n / cos(β)) / (d_1 + d_2)", inv, srcPair,
			deg("α_t", g.TransversePressureAngle()), mm("s_n1", end.s1), mm("s_n2", end.s2), deg("β", math.Abs(g.Spec().Helix)),
			mm("m_n", g.Module()), mm("d_1", g.ReferenceDiameter()), mm("d_2", m.second.g.ReferenceDiameter()))
		j := mm("j_wt"+end.index, p.Circumferential)
		e.result(end.name+" backlash, circumferential", j.Symbol+" = (d_b1 + d_b2) * (inv(α_wt) - inv_tight) / cos(α_wt)", j, srcPair, db1, db2, aw, inv)
		n := mm("j_bn"+end.index, p.Normal)
		e.result(end.name+" backlash, normal", n.Symbol+" = "+j.Symbol+" * cos(α_wt) * cos(β_b)", n, srcPair, j, aw, deg("β_b", g.BaseHelix()))
	}
}

// figure writes a number with all the digits that matter.
func figure(v float64) string {
	return strconv.FormatFloat(v, 'g', 15, 64)
}

func (q quantity) String() string {
	s := q.Symbol + " = " + figure(q.Value)
	if q.Unit != "" {
		s += " " + q.Unit
	}
	return s
}

// explanations prints how results came about.
func (p *page) explanations(list []explanation) {
	if len(list) == 0 {
		return
	}
	p.blank()
	p.head("How the numbers come about (mm and degrees)")
	for _, e := range list {
		p.blank()
		p.line("%s", e.What)
		p.line("  %s", e.Equation)
		for _, q := range e.Inputs {
			p.line("    %s", q)
		}
		if e.Residual != nil {
			p.line("  solved: %s", e.Result)
			p.line("  left − right: %.3g", *e.Residual)
		} else {
			p.line("  gives %s", e.Result)
		}
		p.line("  source: %s", e.Source)
	}
}
