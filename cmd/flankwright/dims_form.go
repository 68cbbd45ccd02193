package main

import (
	"flankwright/inspect"
	"flankwright/involute"
)

// formDims says how a tooth's root and tip are made, beside the flanks.
type formDims struct {
	Thinning  string      `json:"thinning"` // "infeed" or "flanks"
	Root      string      `json:"root"`     // "generated" or "milled"
	EndMill   *float64    `json:"end_mill_mm,omitempty"`
	Largest   *float64    `json:"largest_end_mill_mm,omitempty"` // that gets into the space
	Topped    bool        `json:"topped"`
	TipLimits span        `json:"tip_diameter_limits_mm"`
	Chamfer   *float64    `json:"tip_chamfer_mm,omitempty"`
	Round     *float64    `json:"tip_round_mm,omitempty"`
	Relief    *reliefDims `json:"relief,omitempty"`
	TipLand   float64     `json:"tip_land_mm"` // of the thinnest tooth
}

type reliefDims struct {
	Amount float64 `json:"amount_mm"`
	Start  float64 `json:"start_diameter_mm"`
	Form   string  `json:"form"`
}

func newFormDims(g *gear) formDims {
	s := g.g.Spec()
	d := formDims{Thinning: "infeed", Root: "generated", Topped: s.Topped, TipLimits: toSpan(g.tipLimits()), TipLand: g.nominal.TipLand()}
	if thinnest, err := g.g.Tooth(g.thickness.Limits.Min); err == nil {
		d.TipLand = thinnest.TipLand()
	}
	if s.Thinning == involute.FlanksOnly || s.Mill.Diameter > 0 {
		d.Thinning = "flanks"
	}
	if s.Mill.Diameter > 0 {
		largest := g.nominal.LargestMill()
		d.Root, d.EndMill, d.Largest = "milled", &s.Mill.Diameter, &largest
	}
	if s.TipChamfer > 0 {
		d.Chamfer = &s.TipChamfer
	}
	if s.TipRound > 0 {
		d.Round = &s.TipRound
	}
	if r := s.Relief; r.Amount > 0 {
		d.Relief = &reliefDims{r.Amount, r.Start, reliefForm(r)}
	}
	return d
}

func reliefForm(r involute.ReliefSpec) string {
	if r.Parabolic {
		return "parabolic"
	}
	return "linear"
}

// tipRows adds the outside diameter's limits where the cutter tops the teeth.
func (d *dims) tipRows(g *grid, u inspect.Unit, digits int) {
	any := false
	var low, high []string
	for _, x := range d.gears {
		any = any || x.Topped
		out := u.FormatLimits(inspect.Limits{Min: x.TipLimits.Min, Max: x.TipLimits.Max}, digits)
		low, high = append(low, out.Low), append(high, out.High)
	}
	if any {
		g.row("  topped, thinned tooth, least", u.String(), low...)
		g.row("  most", u.String(), high...)
	}
}

// formRows adds how roots and tips are made, where they are not plain.
func (d *dims) formRows(g *grid, unit string, f func(float64) string) {
	some := func(label, unit string, has func(formDims) bool, cell func(formDims) string) {
		any := false
		cells := d.each(func(_ int, x gearDims) string {
			if !has(x.formDims) {
				return "-"
			}
			any = true
			return cell(x.formDims)
		})
		if any {
			g.row(label, unit, cells...)
		}
	}
	length := func(label string, pick func(formDims) *float64) {
		some(label, unit, func(x formDims) bool { return pick(x) != nil }, func(x formDims) string { return f(*pick(x)) })
	}
	some("Thinned by", "", func(x formDims) bool { return x.Thinning == "flanks" }, func(x formDims) string { return x.Thinning })
	length("Root cut by an end mill of", func(x formDims) *float64 { return x.EndMill })
	length("Tip chamfer 45°, radial height", func(x formDims) *float64 { return x.Chamfer })
	length("Tip rounding, radius", func(x formDims) *float64 { return x.Round })
	relieved := func(x formDims) bool { return x.Relief != nil }
	some("Tip relief, at the tip, normal", unit, relieved, func(x formDims) string { return f(x.Relief.Amount) })
	some("  from diameter", unit, relieved, func(x formDims) string { return f(x.Relief.Start) })
	some("  growing", "", relieved, func(x formDims) string { return x.Relief.Form })
	shaped := func(x formDims) bool { return x.Chamfer != nil || x.Round != nil || x.Relief != nil }
	some("Tip land left, thinnest tooth", unit, shaped, func(x formDims) string { return f(x.TipLand) })
}
