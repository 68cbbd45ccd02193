package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"

	"flankwright/inspect"
	"flankwright/involute"
)

// text prints the dimensions: first what the lathe and the mill need, then backlash, theory last.
func (d *dims) text(p *page, digits int) []byte {
	u := d.job.display
	f := func(mm float64) string { return u.Format(mm, digits) }
	if title, _, _ := d.job.top.word("title"); title != "" {
		p.head(title)
	}
	if n := len(d.Warnings); n > 0 {
		p.line("%s below", plural(n, "warning"))
	}
	p.blank()
	p.grid(d.shopGrid(u, f, digits))
	for _, m := range d.Meshes {
		p.blank()
		p.grid(m.shopGrid(u, f, digits))
	}
	p.blank()
	p.grid(d.theoryGrid(u, f, digits))
	for _, m := range d.Meshes {
		p.blank()
		p.grid(m.theoryGrid(u, f))
		p.grid(m.pairGrid(u, f))
	}
	d.backlashNote(p)
	d.job.moreDigits(p, d.list, digits)
	d.printIndex(p)
	p.explanations(d.Explain)
	p.warnings(d.Warnings)
	return []byte(p.b.String())
}

// backlashNote says what the backlash shown does not count.
func (d *dims) backlashNote(p *page) {
	burdened := false
	for _, m := range d.Meshes {
		burdened = burdened || m.Counted != nil
	}
	if len(d.Meshes) == 0 {
		return
	}
	p.blank()
	if burdened {
		p.wrapped("Backlash here is geometric, before runout, pitch error and temperature, but for the rows that count them; see flankwright backlash.", "  ")
		return
	}
	p.line("Backlash here is geometric: before runout, pitch error and temperature.")
}

// moreDigits says where a narrow range took more decimals than asked.
func (j *job) moreDigits(p *page, gears []*gear, digits int) {
	for _, g := range gears {
		if out := j.display.FormatLimits(g.thickness.Limits, digits); out.More {
			p.line("Limits of %s are narrower than a %s of %d decimals; they are printed with %d.", g.name, j.display, digits, out.Decimals)
		}
	}
}

func (d *dims) names() []string {
	var names []string
	for _, g := range d.list {
		names = append(names, g.name)
	}
	return names
}

// each makes a row's cells from a function of the gears.
func (d *dims) each(cell func(i int, g gearDims) string) []string {
	var cells []string
	for i, g := range d.gears {
		cells = append(cells, cell(i, g))
	}
	return cells
}

func (d *dims) shopGrid(u inspect.Unit, f func(float64) string, digits int) grid {
	g := grid{heads: d.names()}
	unit := u.String()
	length := func(label string, pick func(gearDims) float64) {
		g.row(label, unit, d.each(func(_ int, x gearDims) string { return f(pick(x)) })...)
	}
	limits := func(label string, pick func(gearDims) span) {
		var low, high []string
		for _, x := range d.gears {
			s := pick(x)
			out := u.FormatLimits(inspect.Limits{Min: s.Min, Max: s.Max}, digits)
			low, high = append(low, out.Low), append(high, out.High)
		}
		g.row(label+", least", unit, low...)
		g.row("  most", unit, high...)
	}
	g.row("Teeth", "", d.each(func(_ int, x gearDims) string { return strconv.Itoa(x.Teeth) })...)
	length("Outside (tip) diameter", func(x gearDims) float64 { return x.Tip })
	d.blankRow(&g, unit, f)
	d.tipRows(&g, u, digits)
	length("Whole depth, nominal tooth", func(x gearDims) float64 { return x.WholeDepth })
	limits("Depth of cut from the outside", func(x gearDims) span { return x.CutDepth })
	length("Root diameter, nominal tooth", func(x gearDims) float64 { return x.Root })
	limits("Root diameter, thinned tooth", func(x gearDims) span { return x.RootLimits })
	d.formRows(&g, unit, f)
	d.boreRows(&g, u, digits)
	limits("Tooth thickness, normal, thinned", func(x gearDims) span { return x.Limits })
	g.row("  decided by", "", d.each(func(i int, _ gearDims) string { return thicknessWords(d.list[i]) })...)
	g.row("Angle of index", "deg", d.each(func(_ int, x gearDims) string { return fmt.Sprintf("%.6f", x.Index) })...)
	g.row("", "", d.each(func(_ int, x gearDims) string { return angleDMS(2 * math.Pi / float64(x.Teeth)) })...)
	g.row("  turns of a 40:1 dividing head", "", d.each(func(_ int, x gearDims) string { return headTurns(x.Teeth) })...)
	return g
}

// blankRow shows measured blanks, where there are any.
func (d *dims) blankRow(g *grid, unit string, f func(float64) string) {
	var cells []string
	any := false
	for _, x := range d.list {
		any = any || x.measured
		cells = append(cells, f(x.drawnTip))
	}
	if any {
		g.row("  of the drawing; the blank is as measured", unit, cells...)
	}
}

func (d *dims) boreRows(g *grid, u inspect.Unit, digits int) {
	any := false
	var low, high, class []string
	for _, x := range d.list {
		if x.bore == nil {
			low, high, class = append(low, "-"), append(high, "-"), append(class, "")
			continue
		}
		any = true
		out := u.FormatLimits(x.bore.limits, digits)
		low, high, class = append(low, out.Low), append(high, out.High), append(class, x.bore.class)
	}
	switch {
	case any && slices.Equal(low, high):
		g.row("Bore", u.String(), low...)
	case any:
		g.row("Bore, least", u.String(), low...)
		g.row("  most", u.String(), high...)
	}
	for _, c := range class {
		if c != "" {
			g.row("  ISO 286 class", "", class...)
			break
		}
	}
	d.openingRows(g, u, digits)
}

func (d *dims) theoryGrid(u inspect.Unit, f func(float64) string, digits int) grid {
	g := grid{heads: d.names()}
	unit := u.String()
	length := func(label string, pick func(gearDims) float64) {
		g.row(label, unit, d.each(func(_ int, x gearDims) string { return f(pick(x)) })...)
	}
	number := func(label, unit, format string, pick func(gearDims) float64) {
		g.row(label, unit, d.each(func(_ int, x gearDims) string { return fmt.Sprintf(format, pick(x)) })...)
	}
	number("Diametral pitch, normal", "1/in", "%.4f", func(x gearDims) float64 { return x.DP })
	number("Module, normal", "mm", "%.4f", func(x gearDims) float64 { return x.Module })
	number("Pressure angle, normal", "deg", "%.4f", func(x gearDims) float64 { return x.PressureAngle })
	if d.helical() {
		number("Diametral pitch, transverse", "1/in", "%.4f", func(x gearDims) float64 { return x.DP * math.Cos(x.Helix*involute.Degree) })
		number("  transverse", "deg", "%.4f", func(x gearDims) float64 { return x.TransverseAngle })
		number("Helix angle", "deg", "%.4f", func(x gearDims) float64 { return x.Helix })
		g.row("  hand", "", d.each(func(_ int, x gearDims) string { return x.Hand })...)
		length("Lead", func(x gearDims) float64 {
			if x.Lead == nil {
				return 0
			}
			return *x.Lead
		})
		number("Virtual teeth z/cos³β (form cutter)", "", "%.2f", func(x gearDims) float64 { return x.VirtualTeeth })
	}
	number("Profile shift coefficient x", "", "%+.4f", func(x gearDims) float64 { return x.Shift })
	length("  as a length", func(x gearDims) float64 { return x.ShiftLength })
	length("Pitch (reference) diameter", func(x gearDims) float64 { return x.Reference })
	length("Base diameter", func(x gearDims) float64 { return x.Base })
	length("Form diameter (involute begins), nominal", func(x gearDims) float64 { return x.Form })
	length("  thinnest tooth", func(x gearDims) float64 { return x.FormThinnest })
	g.row("  undercut, thinnest tooth", "", d.each(func(_ int, x gearDims) string { return yesNo(x.undercutThinnest) })...)
	length("Tooth thickness, nominal, normal", func(x gearDims) float64 { return x.Thickness })
	length("Tip thickness, normal", func(x gearDims) float64 { return x.TipThickness })
	length("Circular pitch, normal", func(x gearDims) float64 { return x.NormalPitch })
	length("Base pitch, normal", func(x gearDims) float64 { return x.BasePitch })
	g.row("Rack", "", d.each(func(_ int, x gearDims) string { return x.Rack.Name })...)
	return g
}

// headTurns returns the turns of the crank of a dividing head with a worm of 40
// to 1 for one tooth of z: 40/z as a whole number and a fraction in lowest terms
// (common practice). Any circle of holes that the denominator divides will do.
func headTurns(z int) string {
	whole, rest := 40/z, 40%z
	if rest == 0 {
		return strconv.Itoa(whole)
	}
	a, b := z, rest
	for b != 0 {
		a, b = b, a%b
	}
	fraction := fmt.Sprintf("%d/%d", rest/a, z/a)
	if whole == 0 {
		return fraction
	}
	return fmt.Sprintf("%d + %s", whole, fraction)
}

func (d *dims) helical() bool {
	for _, g := range d.list {
		if g.g.Helical() {
			return true
		}
	}
	return false
}

func yesNo(b bool) string {
	if b {
		return "yes"
	}
	return "no"
}

// shopGrid holds what the pair's mounting needs, least and most.
func (m meshDims) shopGrid(u inspect.Unit, f func(float64) string, digits int) grid {
	g := grid{heads: []string{"least", "most"}}
	unit := u.String()
	g.section(m.Gears[0] + " and " + m.Gears[1])
	center := u.FormatLimits(m.mesh.plan.Center, digits)
	g.row("Center distance", unit, center.Low, center.High)
	// What follows is what comes out, not what to hold: rounded to the nearest.
	lengths := func(label string, s span) { g.row(label, unit, f(s.Min), f(s.Max)) }
	minutes := func(label string, s span) {
		g.row(label, "arcmin", fmt.Sprintf("%.2f", s.Min*60), fmt.Sprintf("%.2f", s.Max*60))
	}
	lengths("Backlash, circumferential, at the working pitch circle", m.Circumferential)
	lengths("  normal to the flanks", m.Normal)
	minutes("  as an angle of "+m.Gears[0], m.AngleFirst)
	minutes("  as an angle of "+m.Gears[1], m.AngleSecond)
	if m.CenterPlay != nil {
		lengths("  as play of the center distance", *m.CenterPlay)
	}
	if c := m.Counted; c != nil {
		lengths("  with runout, deviations and climate, at worst", c.Worst)
		lengths("  the same, statistically", c.Statistical)
	}
	lengths(fmt.Sprintf("  on a dial at radius %s of %s", f(m.Dial.Radius.First), m.Gears[0]), m.Dial.First)
	lengths(fmt.Sprintf("  on a dial at radius %s of %s", f(m.Dial.Radius.Second), m.Gears[1]), m.Dial.Second)
	return g
}

// theoryGrid holds how the pair runs at the nominal center distance.
func (m meshDims) theoryGrid(u inspect.Unit, f func(float64) string) grid {
	g := grid{heads: m.Gears}
	unit := u.String()
	g.section("Running at center distance " + f(m.Center))
	pair := func(label string, d pairDims) { g.row(label, unit, f(d.First), f(d.Second)) }
	pair("Working pitch diameter", m.Pitch)
	pair("Tip clearance, tip to the mate's root", m.Clearance)
	if m.Start == nil {
		g.row("Start of active profile", "", "no contact", "no contact")
		return g
	}
	pair("Start of active profile", *m.Start)
	pair("End of active profile", *m.End)
	slides := func(label string, s pairSlides) { g.row(label, "", slideText(s.First), slideText(s.Second)) }
	slides("Specific sliding at the root end", m.SlidingRoot)
	slides("  at the tip end", m.SlidingTip)
	return g
}

// pairGrid holds what belongs to the pair, not to one of its gears.
func (m meshDims) pairGrid(u inspect.Unit, f func(float64) string) grid {
	g := grid{heads: []string{""}}
	g.row("Ratio", "", fmt.Sprintf("%.5f", m.Ratio))
	g.row("Working pressure angle, transverse", "deg", fmt.Sprintf("%.4f", m.WorkingAngle))
	g.row("Contact ratio, transverse", "", fmt.Sprintf("%.4f", m.Contact))
	if m.Unrelieved < m.Contact {
		g.row("  without the relieved tips (no load)", "", fmt.Sprintf("%.4f", m.Unrelieved))
	}
	if m.mesh.first.g.Helical() {
		g.row("Overlap ratio", "", overlapText(m))
	}
	tight := "none"
	if m.Tight != nil {
		tight = f(*m.Tight)
	}
	g.row("Center distance without backlash, nominal teeth", u.String(), tight)
	g.row("Sum of shifts", "", signed(m.mesh.first.g.Spec().Shift+m.mesh.second.g.Spec().Shift))
	g.row("  that is tight at the tightest center", "", signed(m.mesh.tightShift()))
	return g
}

// signed writes a coefficient with its sign, and no sign of rounding before a zero.
func signed(x float64) string {
	const last = 1e-4
	return fmt.Sprintf("%+.4f", math.Round(x/last)*last+0)
}

func overlapText(m meshDims) string {
	if m.mesh.face() == 0 {
		return "needs face_width"
	}
	return fmt.Sprintf("%.4f", m.Overlap)
}

func slideText(s *float64) string {
	if s == nil {
		return "unbounded"
	}
	return fmt.Sprintf("%.3f", *s)
}

func (d *dims) printIndex(p *page) {
	for i, g := range d.gears {
		if g.IndexList == nil {
			continue
		}
		p.blank()
		p.head("Index list, " + d.list[i].name)
		for k, deg := range g.IndexList {
			p.line("%5d  %12.6f  %s", k+1, deg, angleDMS(deg*involute.Degree))
		}
	}
}
