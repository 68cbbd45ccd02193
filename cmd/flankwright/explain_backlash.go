package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// Sources that only backlash names.
const (
	srcGrowth  = "ISO 21771:2007, clause 5 (gear pairs), with every length grown as heat and water make it"
	srcRSS     = "statistics of independent deviations, common practice; ISO/TR 10064-2:1996, annex A, adds up deviations of the teeth by the root of the sum of squares"
	srcLeast   = "ISO/TR 10064-2:1996, annex A.4 (minimum backlash)"
	srcWorst   = "sum of all at their worst"
	srcRounded = "; then rounded as clause 5.2 rounds"
)

func explainBacklash(b *backlash) []explanation {
	var list []explanation
	for _, g := range b.list {
		list = append(list, explainFlanks(g)...)
	}
	for _, m := range b.Meshes {
		list = append(list, explainBudget(m)...)
	}
	return list
}

// explainFlanks explains the tolerances of a gear's accuracy class.
func explainFlanks(g *gear) []explanation {
	t := g.flanks
	if t == nil {
		return nil
	}
	raw, err := t.Accuracy.Unrounded(g.toothSize())
	if err != nil {
		return nil
	}
	e := &explainer{about: g.name}
	class := num("A", float64(t.Accuracy.Class))
	d, m, width := mm("d", t.Used.ReferenceDiameter), mm("m_n", t.Used.Module), mm("b", t.Used.FaceWidth)
	one := func(what, symbol, formula string, value, rounded float64, src refdata.Source, in ...quantity) {
		equation := fmt.Sprintf("%s = (%s) / 1000 * sqrt(2) ^ (A - 5)", symbol, formula)
		e.result(fmt.Sprintf("%s, used rounded: %s mm", what, figure(rounded)), equation, mm(symbol, value), src.String()+srcRounded, append(in, class)...)
	}
	if t.Accuracy.Edition == 2013 {
		one("single pitch tolerance", "f_pt", "0.001 * d + 0.4 * m_n + 5", raw.SinglePitch, t.SinglePitch, t.Source, d, m)
		one("profile tolerance, total", "F_α", "sqrt((0.4 * m_n + 0.001 * d + 4) ^ 2 + (0.55 * m_n + 5) ^ 2)", raw.Profile, t.Profile, t.Source, d, m)
		one("runout tolerance", "F_r", "0.9 * (0.002 * d + 0.55 * sqrt(d) + 0.7 * m_n + 12)", raw.Runout, t.Runout, t.RunoutSource, d, m)
		if t.HasHelix {
			one("helix tolerance, total", "F_β", "sqrt((0.05 * sqrt(d) + 0.35 * sqrt(b) + 4) ^ 2 + (0.07 * sqrt(d) + 0.45 * sqrt(b) + 4) ^ 2)", raw.Helix, t.Helix, t.Source, d, width)
		}
		return e.list
	}
	one("single pitch tolerance, at the geometric means of the size ranges", "f_pt", "0.3 * (m_n + 0.4 * sqrt(d)) + 4", raw.SinglePitch, t.SinglePitch, t.Source, d, m)
	one("profile tolerance, total", "F_α", "3.2 * sqrt(m_n) + 0.22 * sqrt(d) + 0.7", raw.Profile, t.Profile, t.Source, d, m)
	one("runout tolerance", "F_r", "0.8 * (0.3 * m_n + 1.25 * sqrt(d) + 7)", raw.Runout, t.Runout, t.RunoutSource, d, m)
	if t.HasHelix {
		one("helix tolerance, total", "F_β", "0.1 * sqrt(d) + 0.63 * sqrt(b) + 4.2", raw.Helix, t.Helix, t.Source, d, width)
	}
	return e.list
}

// explainBudget explains each row of a budget, the totals and the customs.
func explainBudget(b meshBacklash) []explanation {
	m := b.mesh
	e := &explainer{about: m.first.name + " and " + m.second.name}
	for _, least := range []bool{true, false} {
		stations, err := m.plan.Stations(b.thick[0], b.thick[1], least)
		if err != nil {
			continue
		}
		for i, s := range stations {
			explainStation(e, m, i, s, least)
			if i > 0 {
				explainChange(e, b, i, stations, least)
			}
		}
	}
	explainTotals(e, b)
	if len(b.Customary) > 0 {
		explainLeast(e, m)
	}
	return e.list
}

// explainStation explains the backlash at one station of a budget.
func explainStation(e *explainer, m *mesh, i int, s inspect.Station, least bool) {
	if i == 0 && !least {
		return // the middle is explained once
	}
	mesh, g := m.plan.Mesh, s.Growth
	alpha, err := mesh.GrownPressureAngle(s.Center, g)
	if err != nil {
		return
	}
	index, name := fmt.Sprint(i), "the middle of everything"
	if i > 0 {
		index += map[bool]string{true: "t", false: "a"}[least]
		name = "what goes before and " + causeName(s.Cause)
		if s.Gear >= 0 {
			name += " of " + []*gear{m.first, m.second}[s.Gear].name
		}
	}
	k1, k2, kh := num("k_1", g.First), num("k_2", g.Second), num("k_h", g.Housing)
	db1, db2 := mm("d_b1", m.first.g.BaseDiameter()), mm("d_b2", m.second.g.BaseDiameter())
	aw := deg("α_"+index, alpha)
	e.result("working pressure angle with "+name, aw.Symbol+" = acos((d_b1 * k_1 + d_b2 * k_2) / (2 * a * k_h))", aw, srcGrowth, db1, db2, mm("a", s.Center), k1, k2, kh)
	p := m.first.g.TransverseBasePitch()
	pitch := mm("p", p*max(g.First, g.Second))
	if least {
		pitch.Value = p*min(g.First, g.Second) - float64(involute.MorePitches(m.plan.ContactRatio))*p*math.Abs(g.First-g.Second)
	}
	out := mm("j_"+index, s.Backlash)
	e.result("backlash with "+name,
		out.Symbol+" = (d_b1 * k_1 * (inv("+aw.Symbol+") - s_1 / (cos(β) * d_1) - inv(α_t)) + d_b2 * k_2 * (inv("+aw.Symbol+") - s_2 / (cos(β) * d_2) - inv(α_t)) + p - e) / cos("+aw.Symbol+")",
		out, srcGrowth, db1, db2, k1, k2, aw, mm("s_1", s.Thickness[0]), mm("s_2", s.Thickness[1]), deg("β", math.Abs(m.first.g.Spec().Helix)),
		mm("d_1", m.first.g.ReferenceDiameter()), mm("d_2", m.second.g.ReferenceDiameter()), deg("α_t", m.first.g.TransversePressureAngle()), pitch, mm("e", s.Proud))
}

// explainChange explains what a cause takes or adds: the difference of two stations.
func explainChange(e *explainer, b meshBacklash, i int, stations []inspect.Station, least bool) {
	before, after := mm("j_before", stations[i-1].Backlash), mm("j_after", stations[i].Backlash)
	name := b.Budget[i-1].name()
	if least {
		e.result(name+" takes", "Δj = j_before - j_after", mm("Δj", before.Value-after.Value), "difference of the two", before, after)
		return
	}
	e.result(name+" adds", "Δj = j_after - j_before", mm("Δj", after.Value-before.Value), "difference of the two", before, after)
}

// explainTotals explains the worst and the statistical backlash.
func explainTotals(e *explainer, b meshBacklash) {
	for _, side := range []struct {
		name, sign string
		worst      float64
		likely     float64
		pick       func(r budgetRow) float64
	}{
		{"least", "-", b.Circumferential.Min, b.Statistical.Min, func(r budgetRow) float64 { return r.Worst }},
		{"greatest", "+", b.Circumferential.Max, b.Statistical.Max, func(r budgetRow) float64 { return r.WorstAdds }},
	} {
		var all, sure, squares []string
		in := []quantity{mm("j_m", b.Middle)}
		for i, r := range b.budget.Rows {
			x := mm(fmt.Sprintf("x_%d", i+1), side.pick(b.Budget[i]))
			in, all = append(in, x), append(all, x.Symbol)
			mean, three := r.Spread()
			if mean > 0 {
				sure = append(sure, figure(mean)+" * "+x.Symbol)
			}
			if three > 0 {
				squares = append(squares, "("+figure(three)+" * "+x.Symbol+") ^ 2")
			}
		}
		e.result(side.name+" backlash at worst", "j = j_m "+side.sign+" ("+strings.Join(all, " + ")+")", mm("j", side.worst), srcWorst, in...)
		equation := "j = j_m " + side.sign + " sqrt(" + strings.Join(squares, " + ") + ")"
		if len(sure) > 0 {
			equation += " " + side.sign + " (" + strings.Join(sure, " + ") + ")"
		}
		e.result(side.name+" backlash, statistically: means, and three standard deviations by the root of the sum of squares", equation, mm("j", side.likely), srcRSS, in...)
	}
}

// explainLeast explains the least backlash that ISO/TR 10064-2 recommends, normal and circumferential.
func explainLeast(e *explainer, m *mesh) {
	a := math.Abs(m.plan.Nominal())
	l, err := refdata.LeastBacklashISO(a, m.first.g.Module())
	alpha, err2 := m.plan.Mesh.WorkingPressureAngle(m.plan.Nominal())
	if err != nil || err2 != nil {
		return
	}
	n := mm("j_bn", l.Normal)
	e.result("least normal backlash", "j_bn = 2 / 3 * (0.06 + 0.0005 * a + 0.03 * m_n)", n, srcLeast, mm("a", a), mm("m_n", m.first.g.Module()))
	aw, bb := deg("α_wt", alpha), deg("β_b", m.first.g.BaseHelix())
	e.result("the same, circumferential", "j_wt = j_bn / (cos(α_wt) * cos(β_b))", mm("j_wt", l.Normal/(math.Cos(alpha)*math.Cos(bb.Value*math.Pi/180))), srcPair, n, aw, bb)
}
