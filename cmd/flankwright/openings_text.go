package main

import (
	"fmt"
	"math"
	"slices"

	"flankwright/export"
	"flankwright/inspect"
)

// keywayDims is a keyway as JSON writes it, mm.
type keywayDims struct {
	Width     float64 `json:"width"`
	Depth     float64 `json:"depth"`           // beyond the bore's wall
	Tolerance float64 `json:"depth_tolerance"` // plus only
	Across    span    `json:"across"`          // from the bore's wall to the bottom of the keyway
	Drawn     float64 `json:"depth_drawn"`
	Source    string  `json:"source"`
}

type boltDims struct {
	Diameter float64  `json:"diameter_mm"`
	Holes    int      `json:"holes"`
	Hole     float64  `json:"hole_mm"`
	Start    float64  `json:"start_deg"`
	Chord    *float64 `json:"chord_mm"` // null for a single hole
}

// openingDims is what is inside the teeth beside the bore.
type openingDims struct {
	Keyway *keywayDims `json:"keyway_mm,omitempty"`
	Bolts  *boltDims   `json:"bolt_circle,omitempty"`
	Hub    *float64    `json:"hub_diameter_mm,omitempty"`
}

func newOpeningDims(g *gear) openingDims {
	var d openingDims
	if k := g.keyway; k != nil {
		d.Keyway = &keywayDims{k.width, k.depth, k.tolerance, toSpan(k.across), k.drawn, "the job"}
		if k.table != nil {
			d.Keyway.Source = k.table.Source.String()
		}
	}
	if b := g.bolts; b != nil {
		d.Bolts = &boltDims{Diameter: b.diameter, Holes: b.holes, Hole: b.hole, Start: b.start}
		if chord := b.chord(); chord > 0 {
			d.Bolts.Chord = &chord
		}
	}
	if g.hub > 0 {
		d.Hub = &g.hub
	}
	return d
}

// openingRows adds the rows of keyway, bolt circle and hub, where there are any.
func (d *dims) openingRows(g *grid, u inspect.Unit, digits int) {
	f := func(mm float64) string { return u.Format(mm, digits) }
	if rows := d.rowsOf(func(x *gear) bool { return x.keyway != nil }); rows != nil {
		g.row("Keyway, width", u.String(), rows(func(x *gear) string { return f(x.keyway.width) })...)
		g.row("  depth beyond the bore's wall", u.String(), rows(func(x *gear) string { return f(x.keyway.depth) })...)
		low := rows(func(x *gear) string { return u.FormatLimits(x.keyway.across, digits).Low })
		high := rows(func(x *gear) string { return u.FormatLimits(x.keyway.across, digits).High })
		if slices.Equal(low, high) {
			g.row("  across from the bore's wall", u.String(), low...)
		} else {
			g.row("  across from the bore's wall, least", u.String(), low...)
			g.row("    most", u.String(), high...)
		}
	}
	if rows := d.rowsOf(func(x *gear) bool { return x.keyway != nil && x.keyway.table != nil }); rows != nil {
		g.row("  for the key", "", rows(func(x *gear) string { return x.keyway.keySize() })...)
		g.row("  by", "", rows(func(x *gear) string { return x.keyway.table.Source.Standard })...)
	}
	if rows := d.rowsOf(func(x *gear) bool { return x.bolts != nil }); rows != nil {
		g.row("Bolt circle, diameter", u.String(), rows(func(x *gear) string { return f(x.bolts.diameter) })...)
		g.row("  holes × diameter", u.String(), rows(func(x *gear) string { return fmt.Sprintf("%d × %s", x.bolts.holes, f(x.bolts.hole)) })...)
		g.row("  first hole from the first tooth's middle", "deg", rows(func(x *gear) string { return fmt.Sprintf("%.4f", x.bolts.start) })...)
		g.row("  chord from hole to hole", u.String(), rows(func(x *gear) string {
			if x.bolts.holes < 2 {
				return "-"
			}
			return f(x.bolts.chord())
		})...)
	}
	if rows := d.rowsOf(func(x *gear) bool { return x.hub > 0 }); rows != nil {
		g.row("Hub, outside diameter", u.String(), rows(func(x *gear) string { return f(x.hub) })...)
	}
}

// rowsOf returns a maker of cells for the gears that have something, with a dash
// for the others; nil where none has it.
func (d *dims) rowsOf(has func(*gear) bool) func(cell func(*gear) string) []string {
	if !slices.ContainsFunc(d.list, has) {
		return nil
	}
	return func(cell func(*gear) string) []string {
		var cells []string
		for _, x := range d.list {
			if has(x) {
				cells = append(cells, cell(x))
			} else {
				cells = append(cells, "-")
			}
		}
		return cells
	}
}

// openingFields words keyway, bolt circle and hub for the head of the sheet.
func (j *job) openingFields(g *gear) []export.Field {
	var fields []export.Field
	if g.keyway != nil {
		fields = append(fields, j.keywayField(g.keyway))
	}
	if b := g.bolts; b != nil {
		fields = append(fields, j.boltField(b))
	}
	if g.hub > 0 {
		fields = append(fields, j.lengthField("Hub, outside diameter", g.hub))
	}
	return fields
}

// keywayField words a keyway: its width, and the limits across from the bore's wall.
func (j *job) keywayField(k *keyway) export.Field {
	u := j.display
	across := u.FormatLimits(k.across, u.Decimals())
	words := u.Format(k.width, u.Decimals()) + " × " + across.Low
	if across.High != across.Low {
		words += " … " + across.High
	}
	label := "Keyway, width × across"
	if k.table != nil {
		label = "Keyway " + k.table.Source.Standard + ", width × across"
	}
	return export.Field{Label: label, Value: words + " " + u.String()}
}

// boltField words a bolt circle in one line.
func (j *job) boltField(b *boltCircle) export.Field {
	f := export.Field{Label: "Bolt circle, first hole at " + trim("%.4f", b.start) + "°"}
	f.Value = fmt.Sprintf("%d × Ø %s on Ø %s", b.holes, j.display.Format(b.hole, j.display.Decimals()), j.length(b.diameter))
	if b.holes > 1 {
		f.Other = "chord " + j.length(b.chord())
	}
	return f
}

// explainOpenings explains the keyway across the bore, and the chord of the bolt circle.
func explainOpenings(e *explainer, g *gear) {
	if g.keyway != nil {
		explainKeyway(e, g)
	}
	if b := g.bolts; b != nil && b.holes > 1 {
		e.result("chord from hole to hole of the bolt circle", "c_H = D_H * sin(pi / n_H)", mm("c_H", b.chord()), "geometry of the circle", mm("D_H", b.diameter), num("n_H", float64(b.holes)))
	}
}

func explainKeyway(e *explainer, g *gear) {
	k, bore := g.keyway, mm("d_B", g.bore.nominal)
	least, most := mm("T", k.across.Min), mm("T_max", k.across.Max)
	if k.table == nil {
		e.result("keyway across from the bore's wall, least bore", "T = d_Bmin + t", least, "the job", mm("d_Bmin", g.bore.limits.Min), mm("t", k.depth))
		if most.Value == least.Value {
			return
		}
		e.result("keyway across from the bore's wall, largest bore", "T_max = d_Bmax + t", most, "the job", mm("d_Bmax", g.bore.limits.Max), mm("t", k.depth))
		return
	}
	source, w := k.table.Source.String(), mm("W", k.width)
	if k.inch {
		chord := mm("Y_K", (bore.Value-math.Sqrt(bore.Value*bore.Value-w.Value*w.Value))/2)
		e.result("bore's chord height over the key, "+k.keySize(), "Y_K = (d_B - sqrt(d_B ^ 2 - W ^ 2)) / 2", chord, source, bore, w)
		e.result("keyway across from the bore's wall, least", "T = d_B - Y_K + H / 2 + 0.005 * 25.4", least, source, bore, chord, mm("H", k.table.Height))
	} else {
		e.result("keyway across from the bore's wall, least, key "+k.keySize(), "T = d_B + t_2", least, source, bore, mm("t_2", k.depth))
	}
	e.result("keyway across from the bore's wall, most", "T_max = T + Δ_T", most, source, least, mm("Δ_T", k.tolerance))
	e.result("depth beyond the bore's wall", "t = T - d_B", mm("t", k.depth), source, least, bore)
}
