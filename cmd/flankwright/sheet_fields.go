package main

import (
	"fmt"
	"math"
	"strings"

	"flankwright/export"
	"flankwright/inspect"
	"flankwright/involute"
)

// plainTitle is the title of a gear without one.
func (g *gear) plainTitle() string {
	size := "module " + trim("%.4f", g.g.Module())
	if g.dp != 0 {
		size = trim("%.4f", g.dp) + " DP"
	}
	return fmt.Sprintf("Gear, %d teeth, %s", g.g.Teeth(), size)
}

// both words a length in the display unit, and in the other.
func (j *job) both(mm float64) (value, other string) {
	u, o := j.display, j.display.Other()
	return u.Format(mm, u.Decimals()) + " " + u.String(), o.Format(mm, o.Decimals()) + " " + o.String()
}

func (j *job) lengthField(label string, mm float64) export.Field {
	v, o := j.both(mm)
	return export.Field{Label: label, Value: v, Other: o}
}

// limitsField words limits in both units, each rounded inward.
func (j *job) limitsField(label string, l inspect.Limits) export.Field {
	words := func(u inspect.Unit) string {
		p := u.FormatLimits(l, u.Decimals())
		if p.Low == p.High {
			return p.Low + " " + u.String()
		}
		return p.Low + " … " + p.High + " " + u.String()
	}
	return export.Field{Label: label, Value: words(j.display), Other: words(j.display.Other())}
}

// rangeField words a range that comes out, in both units, each rounded to the nearest.
func (j *job) rangeField(label string, least, most float64) export.Field {
	words := func(u inspect.Unit) string {
		return u.Format(least, u.Decimals()) + " … " + u.Format(most, u.Decimals()) + " " + u.String()
	}
	return export.Field{Label: label, Value: words(j.display), Other: words(j.display.Other())}
}

func trim(format string, x float64) string {
	return strings.TrimSuffix(strings.TrimRight(fmt.Sprintf(format, x), "0"), ".")
}

func (j *job) sheetData(g *gear) []export.Field {
	gg := g.g
	pitch := export.Field{Label: "Module, normal", Value: trim("%.4f", gg.Module()) + " mm", Other: trim("%.4f", 25.4/gg.Module()) + " /in"}
	if g.dp != 0 {
		pitch = export.Field{Label: "Diametral pitch, normal", Value: trim("%.4f", 25.4/gg.Module()) + " /in", Other: "module " + trim("%.4f", gg.Module())}
	}
	shift := gg.Spec().Shift
	_, other := j.both(shift * gg.Module())
	value, _ := j.both(shift * gg.Module())
	data := []export.Field{{Label: "Teeth, spur", Value: fmt.Sprint(gg.Teeth())}, pitch, {Label: "Pressure angle, normal", Value: degrees(gg.PressureAngle())}}
	if gg.Helical() {
		data[0].Label = "Teeth, helical"
		data = append(data, export.Field{Label: "Helix angle, hand", Value: degrees(math.Abs(gg.Spec().Helix)) + " " + handWord(gg.Spec().Helix)})
	}
	data = append(data, []export.Field{
		shiftField(shift, value+" ("+other+")"),
		j.lengthField(g.tipLabel(), g.middle().TipDiameter()),
		j.lengthField("Pitch (reference) diameter", gg.ReferenceDiameter()),
		j.lengthField("Root diameter, aim", g.middle().RootDiameter()),
		j.lengthField("Depth of cut, aim", g.depthOfCut().Middle()),
	}...)
	data = append(data, j.formFields(g)...)
	if g.bore != nil {
		data = append(data, j.boreField(g.bore))
	}
	data = append(data, j.openingFields(g)...)
	if g.faceWidth > 0 {
		data = append(data, j.lengthField("Face width", g.faceWidth))
	}
	if lead, ok := gg.Lead(); ok {
		data = append(data, j.lengthField("Lead", lead))
	}
	return append(data,
		export.Field{Label: "Angle of index", Value: angleDMS(2 * math.Pi / float64(gg.Teeth())), Other: headTurns(gg.Teeth()) + " of a 40:1 head"},
		export.Field{Label: "Rack", Value: g.rack})
}

// shiftField words a profile shift, as a coefficient and a length.
func shiftField(x float64, length string) export.Field {
	if x == 0 {
		return export.Field{Label: "Profile shift", Value: "none"}
	}
	return export.Field{Label: "Profile shift x", Value: fmt.Sprintf("%+.4f", x), Other: length}
}

// tipLabel names the outside diameter, nominal or as measured.
func (g *gear) tipLabel() string {
	if g.measured {
		return "Outside diameter, as measured"
	}
	if g.g.Spec().Topped {
		return "Outside diameter, topped, aim"
	}
	return "Outside (tip) diameter"
}

// formFields words how root and tip are made, where they are not plain.
func (j *job) formFields(g *gear) []export.Field {
	s := g.g.Spec()
	var fields []export.Field
	if s.Mill.Diameter > 0 {
		fields = append(fields, j.lengthField("Root, end mill no larger than", s.Mill.Diameter))
	} else if s.Thinning == involute.FlanksOnly {
		fields = append(fields, export.Field{Label: "Thinned by", Value: "the flanks, root stays"})
	}
	if s.TipChamfer > 0 {
		fields = append(fields, j.lengthField("Tip chamfer 45°, height", s.TipChamfer))
	}
	if s.TipRound > 0 {
		fields = append(fields, j.lengthField("Tip rounding, radius", s.TipRound))
	}
	if r := s.Relief; r.Amount > 0 {
		value, _ := j.both(r.Amount)
		from, _ := j.both(r.Start)
		fields = append(fields, export.Field{Label: "Tip relief, " + reliefForm(r), Value: value, Other: "from Ø" + from})
	}
	return fields
}

// boreField words a bore: its size in both units, or with a class its limits in the display unit.
func (j *job) boreField(b *boreSize) export.Field {
	if b.class == "" {
		return j.lengthField("Bore", b.nominal)
	}
	f := j.limitsField("Bore "+b.class, b.limits)
	f.Other = ""
	return f
}

func (j *job) sheetLimits(g *gear) []export.Field {
	fields := []export.Field{j.limitsField("Tooth thickness", g.thickness.Limits)}
	if g.thickness.By == inspect.ByNothing {
		fields[0].Label = "Thickness, nominal"
	}
	for _, m := range j.meshes {
		if m.first != g && m.second != g {
			continue
		}
		mate := m.mate(g).name
		center := j.limitsField(fmt.Sprintf("Center, %s (%d teeth)", mate, m.mate(g).g.Teeth()), m.plan.Center)
		center.Other = ""
		fields = append(fields, center)
		fields = append(fields, j.backlashFields(m, mate)...)
	}
	return append(fields, export.Field{Label: "Reference temperature", Value: "20 °C (68 °F)", Other: "ISO 1"})
}

// backlashFields word the backlash that is allowed, and what the limits make of it:
// with deviations and climate where they are given.
func (j *job) backlashFields(m *mesh, mate string) []export.Field {
	var fields []export.Field
	if want := m.plan.Backlash; want != nil {
		allowed := export.Field{Label: "Backlash allowed, " + mate, Value: "over " + j.length(want.Min)}
		if !m.plan.LeastOnly {
			allowed = j.rangeField(allowed.Label, want.Min, want.Max)
		}
		fields = append(fields, allowed)
		if m.plan.Method == inspect.Statistical {
			fields = append(fields, export.Field{Label: "  held", Value: "statistically"})
		}
	}
	b, err := m.budget()
	least, most, err2 := m.plan.BacklashRange(m.first.thickness.Limits, m.second.thickness.Limits)
	if err != nil || err2 != nil {
		return fields
	}
	fields = append(fields, j.rangeField("Backlash, "+mate, least.Circumferential, most.Circumferential))
	if m.burdened() {
		got := b.By(m.plan.Method)
		fields = append(fields, j.rangeField("Backlash with deviations", got.Min, got.Max))
	}
	return fields
}
