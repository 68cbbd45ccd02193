package main

import (
	"math"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
	"flankwright/involute"
)

func dimsCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("file to write instead of standard output")...)
	flags = append(flags,
		&cli.BoolFlag{Name: "index-list", Usage: "the angle of every tooth from the first, for the dividing head", Category: catOutput, DisableDefaultText: true},
		&cli.StringFlag{Name: "dial-radius", Usage: "radius at which a dial indicator reads the backlash (the pitch circle's)", Category: catOutput})
	return &cli.Command{
		Name: "dims", Usage: "all dimensions of the gears and meshes, with warnings",
		UsageText: "flankwright dims [JOB] [flags]\nflankwright dims --dp 16 --teeth 18", Flags: flags,
		Action: func(c *cli.Context) error {
			j, gears, err := loadJob(c)
			if err != nil {
				return err
			}
			radius, _, err := flagLength(c, j, "dial-radius")
			if err != nil {
				return err
			}
			d := newDims(j, gears, radius)
			if c.Bool("index-list") {
				d.listIndex()
			}
			if c.Bool("explain") {
				d.Explain = j.explainDims(gears)
			}
			return emit(c, d, func() []byte { return d.text(newPage(c.App.Writer), j.digits(c)) })
		},
	}
}

// dims is the result of the command, as JSON writes it.
type dims struct {
	Gears    ordered       `json:"gears"`
	Meshes   []meshDims    `json:"meshes"`
	Warnings []warning     `json:"warnings"`
	Explain  []explanation `json:"explain,omitempty"`

	job   *job
	list  []*gear
	gears []gearDims
}

type gearDims struct {
	Teeth           int       `json:"teeth"`
	Module          float64   `json:"module_mm"`
	DP              float64   `json:"dp"`
	PressureAngle   float64   `json:"pressure_angle_deg"`
	TransverseAngle float64   `json:"transverse_pressure_angle_deg"`
	Helix           float64   `json:"helix_angle_deg"`
	Hand            string    `json:"hand,omitempty"`
	Lead            *float64  `json:"lead_mm,omitempty"`
	Shift           float64   `json:"shift"`
	ShiftLength     float64   `json:"shift_mm"`
	Reference       float64   `json:"reference_diameter_mm"`
	Base            float64   `json:"base_diameter_mm"`
	Tip             float64   `json:"tip_diameter_mm"`
	Root            float64   `json:"root_diameter_mm"`
	Form            float64   `json:"form_diameter_mm"`
	FormThinnest    float64   `json:"form_diameter_thinnest_mm"`
	TipForm         float64   `json:"tip_form_diameter_mm"`
	Thickness       float64   `json:"tooth_thickness_mm"`
	TransverseThick float64   `json:"transverse_tooth_thickness_mm"`
	TipThickness    float64   `json:"tip_thickness_mm"`
	MeasuredTip     *float64  `json:"measured_tip_diameter_mm,omitempty"`
	Undercut        bool      `json:"undercut"`
	WholeDepth      float64   `json:"whole_depth_mm"`
	Limits          span      `json:"thickness_limits_mm"`
	RootLimits      span      `json:"root_diameter_limits_mm"`
	CutDepth        span      `json:"depth_of_cut_mm"`
	NormalPitch     float64   `json:"normal_pitch_mm"`
	BasePitch       float64   `json:"normal_base_pitch_mm"`
	TransverseBase  float64   `json:"transverse_base_pitch_mm"`
	Index           float64   `json:"index_angle_deg"`
	IndexList       []float64 `json:"index_list_deg,omitempty"`
	VirtualTeeth    float64   `json:"virtual_teeth"`
	Bore            *span     `json:"bore_mm,omitempty"`
	Rack            rackDims  `json:"rack"`
	formDims
	openingDims

	undercutThinnest bool
}

type rackDims struct {
	Name      string  `json:"name"`
	Addendum  float64 `json:"addendum"`
	Dedendum  float64 `json:"dedendum"`
	TipRadius float64 `json:"tip_radius"`
	Source    string  `json:"source"`
}

func newDims(j *job, gears []*gear, dial float64) *dims {
	d := &dims{job: j, list: gears, Warnings: j.about(gears), Meshes: []meshDims{}}
	for _, g := range gears {
		one := newGearDims(g)
		d.gears = append(d.gears, one)
		d.Gears.add(g.name, one)
	}
	for _, m := range j.meshes {
		if len(gears) == len(j.gears) || gears[0] == m.first || gears[0] == m.second {
			d.Meshes = append(d.Meshes, newMeshDims(m, dial))
		}
	}
	return d
}

// listIndex adds the angle of every tooth from the first.
func (d *dims) listIndex() {
	d.Gears = ordered{}
	for i := range d.gears {
		g := &d.gears[i]
		for k := range g.Teeth {
			g.IndexList = append(g.IndexList, 360*float64(k)/float64(g.Teeth))
		}
		d.Gears.add(d.list[i].name, *g)
	}
}

func newGearDims(g *gear) gearDims {
	gg, t := g.g, g.nominal
	spec := gg.Spec()
	thick := g.thickness.Limits
	d := gearDims{
		Teeth: gg.Teeth(), Module: gg.Module(), DP: 25.4 / gg.Module(),
		PressureAngle:   plainDegrees(gg.PressureAngle()),
		TransverseAngle: gg.TransversePressureAngle() / involute.Degree,
		Helix:           plainDegrees(math.Abs(spec.Helix)),
		Shift:           spec.Shift, ShiftLength: spec.Shift * gg.Module(),
		Reference: gg.ReferenceDiameter(), Base: gg.BaseDiameter(), Tip: gg.TipDiameter(),
		Root: t.RootDiameter(), Form: t.FormDiameter(), TipForm: gg.TipFormDiameter(),
		Thickness: t.Thickness(), TransverseThick: t.ThicknessAt(gg.ReferenceDiameter()),
		TipThickness: t.TipThickness(), Undercut: t.Undercut(),
		WholeDepth:  (gg.TipDiameter() - t.RootDiameter()) / 2,
		Limits:      toSpan(thick),
		RootLimits:  toSpan(g.rootLimits()),
		NormalPitch: gg.NormalPitch(), BasePitch: gg.NormalBasePitch(), TransverseBase: gg.TransverseBasePitch(),
		Index: 360 / float64(gg.Teeth()), VirtualTeeth: gg.VirtualTeeth(),
		Rack: rackDims{g.rack, spec.Rack.Addendum, spec.Rack.Dedendum, spec.Rack.TipRadius, g.source},
	}
	d.CutDepth = toSpan(g.depthOfCut())
	d.formDims = newFormDims(g)
	if thinnest, err := gg.Tooth(thick.Min); err == nil {
		d.FormThinnest, d.undercutThinnest = thinnest.FormDiameter(), thinnest.Undercut()
	}
	if lead, ok := gg.Lead(); ok {
		d.Lead, d.Hand = &lead, handWord(spec.Helix)
	}
	if g.measured {
		d.MeasuredTip = &d.Tip
	}
	if g.bore != nil {
		b := toSpan(g.bore.limits)
		d.Bore = &b
	}
	d.openingDims = newOpeningDims(g)
	return d
}

// plainDegrees returns an angle in degrees as it was given, free of what going to
// radians and back adds in the sixteenth digit.
func plainDegrees(rad float64) float64 { return math.Round(rad/involute.Degree*1e12) / 1e12 }

func handWord(helix float64) string {
	if helix < 0 {
		return "left"
	}
	return "right"
}

type meshDims struct {
	Gears           []string   `json:"gears"`
	Center          float64    `json:"center_distance_mm"`
	CenterLimits    span       `json:"center_distance_limits_mm"`
	Tight           *float64   `json:"tight_center_distance_mm"` // null where no center distance is tight
	ReferenceCtr    float64    `json:"reference_center_distance_mm"`
	Ratio           float64    `json:"ratio"`
	WorkingAngle    float64    `json:"working_pressure_angle_deg"`
	Contact         float64    `json:"transverse_contact_ratio"`
	ContactByTips   float64    `json:"transverse_contact_ratio_by_tips"`
	Unrelieved      float64    `json:"transverse_contact_ratio_without_relief"`
	Overlap         float64    `json:"overlap_ratio"`
	Circumferential span       `json:"circumferential_backlash_mm"`
	Normal          span       `json:"normal_backlash_mm"`
	AngleFirst      span       `json:"angular_backlash_first_deg"`
	AngleSecond     span       `json:"angular_backlash_second_deg"`
	CenterPlay      *span      `json:"center_play_mm"` // null where no center distance is tight
	Dial            dialDims   `json:"dial_backlash"`
	Clearance       pairDims   `json:"tip_clearance_mm"`
	Pitch           pairDims   `json:"working_pitch_diameter_mm"`
	Start           *pairDims  `json:"start_of_active_profile_mm"` // null where the involutes do not meet
	End             *pairDims  `json:"end_of_active_profile_mm"`
	SlidingRoot     pairSlides `json:"specific_sliding_at_root"`
	SlidingTip      pairSlides `json:"specific_sliding_at_tip"`
	Counted         *counted   `json:"backlash_with_deviations"` // null where no deviations and no climate are given
	Note            string     `json:"note"`

	mesh *mesh
}

// counted is the circumferential backlash with runout, deviations and climate counted.
type counted struct {
	Held        string `json:"held"`
	Worst       span   `json:"worst_mm"`
	Statistical span   `json:"statistical_mm"`
}

type pairDims struct {
	First  float64 `json:"first"`
	Second float64 `json:"second"`
}

// pairSlides holds null where sliding is unbounded, on the base circle.
type pairSlides struct {
	First  *float64 `json:"first"`
	Second *float64 `json:"second"`
}

type dialDims struct {
	Radius pairDims `json:"radius_mm"`
	First  span     `json:"first_mm"`
	Second span     `json:"second_mm"`
}

// geometricNote is said with every backlash until a budget can be made.
const geometricNote = "circumferential, normal and angular backlash are geometric: before runout, pitch error and temperature"

func newMeshDims(m *mesh, dial float64) meshDims {
	d := meshDims{Gears: []string{m.first.name, m.second.name}, mesh: m, Note: geometricNote}
	mm, a := m.plan.Mesh, m.plan.Nominal()
	d.Center, d.CenterLimits = a, toSpan(m.plan.Center)
	if tight, err := mm.TightCenter(m.first.g.NominalThickness(), m.second.g.NominalThickness()); err == nil {
		d.Tight = &tight
	}
	d.ReferenceCtr, d.Ratio = mm.ReferenceCenter(), mm.Ratio()
	c, err := mm.Contact(a, m.first.nominal, m.second.nominal)
	if err == nil {
		d.WorkingAngle = c.WorkingAngle / involute.Degree
		d.Contact, d.ContactByTips, d.Unrelieved = c.TransverseRatio, c.RatioByTips, c.UnrelievedRatio
		d.Pitch = pairDims{c.Pitch1, c.Pitch2}
		if c.TransverseRatio > 0 {
			d.Start, d.End = &pairDims{c.Start1, c.Start2}, &pairDims{c.End1, c.End2}
			d.SlidingRoot = pairSlides{slide(c.SlidingA1), slide(c.SlidingE2)}
			d.SlidingTip = pairSlides{slide(c.SlidingE1), slide(c.SlidingA2)}
		}
	}
	d.Overlap = mm.OverlapRatio(m.face())
	d.Clearance.First, d.Clearance.Second = mm.TipClearances(a, m.first.nominal, m.second.nominal)
	least, most, err := m.plan.BacklashRange(m.first.thickness.Limits, m.second.thickness.Limits)
	if err == nil {
		d.backlash(least, most, dial)
	}
	if b, err := m.budget(); err == nil && m.burdened() {
		d.Counted = &counted{methodWord(m.plan.Method), toSpan(b.Worst()), toSpan(b.Statistical())}
	}
	return d
}

func (d *meshDims) backlash(least, most involute.Play, dial float64) {
	d.Circumferential = span{least.Circumferential, most.Circumferential}
	d.Normal = span{least.Normal, most.Normal}
	d.AngleFirst = span{least.AngleFirst / involute.Degree, most.AngleFirst / involute.Degree}
	d.AngleSecond = span{least.AngleSecond / involute.Degree, most.AngleSecond / involute.Degree}
	if least.CanTighten && most.CanTighten {
		d.CenterPlay = &span{least.CenterPlay, most.CenterPlay}
	}
	r1, r2 := dial, dial
	if dial == 0 {
		r1, r2 = d.Pitch.First/2, d.Pitch.Second/2
	}
	d.Dial = dialDims{
		Radius: pairDims{r1, r2},
		First:  span{least.AngleFirst * r1, most.AngleFirst * r1},
		Second: span{least.AngleSecond * r2, most.AngleSecond * r2},
	}
}

func slide(s involute.Sliding) *float64 {
	if s.Unbounded {
		return nil
	}
	return &s.Value
}

// thicknessWords says where the thickness limits come from.
func thicknessWords(g *gear) string {
	switch g.thickness.By {
	case inspect.ByThin:
		return orDefault(g.fixedBy, "thin")
	case inspect.ByBacklash:
		return "backlash"
	}
	return "nominal"
}
