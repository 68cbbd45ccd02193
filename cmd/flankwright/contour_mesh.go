package main

import (
	"slices"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
	"flankwright/involute"
)

// A rolledMesh is two contours as written, rolled together through one pitch.
type rolledMesh struct {
	Gears     []string    `json:"gears"`
	File      string      `json:"file,omitempty"`
	Center    float64     `json:"center_distance_mm"`
	AsWritten rolledPair  `json:"as_written"`
	Target    rolledAimed `json:"target"`
}

// rolledPair is what the two contours do.
type rolledPair struct {
	Clearance    float64  `json:"least_clearance_mm"` // teeth in the middle of their play
	Flank        float64  `json:"least_flank_clearance_mm"`
	Tip          pairDims `json:"tip_clearance_mm"`
	Backlash     span     `json:"circumferential_backlash_mm"`
	Transmission float64  `json:"transmission_error_mm"`
	Interferes   bool     `json:"interferes"`
}

// rolledAimed is what the exact teeth would do.
type rolledAimed struct {
	Backlash float64  `json:"circumferential_backlash_mm"`
	Tip      pairDims `json:"tip_clearance_mm"`
}

// meshesOf returns the meshes that --mesh and --gear choose.
func (j *job) meshesOf(name string) ([]*mesh, error) {
	var chosen []*mesh
	for _, m := range j.meshes {
		if name == "" || m.first.name == name || m.second.name == name {
			chosen = append(chosen, m)
		}
	}
	if len(chosen) == 0 {
		return nil, wrong("--mesh: there is no mesh to draw; give the job a [[mesh]], or --mate-teeth")
	}
	return chosen, nil
}

// title names a mesh in a drawing.
func (m *mesh) title(j *job) string {
	title, _, _ := j.top.word("title")
	return strings.TrimPrefix(title+", "+m.first.name+" and "+m.second.name, ", ")
}

// meshSpec says what to draw of a mesh.
func (j *job) meshSpec(m *mesh, o contourOptions) export.MeshSpec {
	return export.MeshSpec{First: j.contourSpec(m.first, o), Second: j.contourSpec(m.second, o), Center: m.plan.Nominal(), Unit: j.display, Title: m.title(j)}
}

// runMeshContour writes both gears of a mesh into one file, or each mesh of the job into a folder.
func (j *job) runMeshContour(c *cli.Context, out string, o contourOptions) error {
	meshes, err := j.meshesOf(c.String("gear"))
	if err != nil {
		return err
	}
	if !isFolder(out) && len(meshes) > 1 {
		return wrong("-o %s: one file holds one mesh, and there are %d; choose one by --gear NAME, or give a folder -o DIR/", out, len(meshes))
	}
	if c.Bool("roll") && o.format != export.FormatSVG {
		return wrong("--roll: only an SVG moves; write -o roll.svg, or --format svg with a folder")
	}
	var pairs [][2]drawnGear
	var rolled []rolledMesh
	var files []export.File
	for _, m := range meshes {
		pair, r, data, err := j.drawMesh(m, o, c.Bool("roll"))
		if err != nil {
			return err
		}
		pairs, rolled = append(pairs, pair), append(rolled, r)
		files = append(files, export.File{Name: m.first.name + "-" + m.second.name + o.format.Ending(), Data: data})
	}
	names, err := writeDrawings(c, out, files)
	if err != nil {
		return err
	}
	var drawn []drawnGear
	var gears []*gear
	for i, pair := range pairs {
		rolled[i].File = names[i]
		for _, d := range pair {
			d.File = names[i]
			if !slices.Contains(gears, d.gear) {
				gears, drawn = append(gears, d.gear), append(drawn, d)
			}
		}
	}
	return j.showContours(c, gears, drawn, rolled)
}

// drawMesh draws a mesh and measures both contours as read back, alone and
// rolled together. A picture that moves shows the same contours.
func (j *job) drawMesh(m *mesh, o contourOptions, moving bool) (pair [2]drawnGear, r rolledMesh, data []byte, err error) {
	spec := j.meshSpec(m, o)
	outline, reports, err := export.NewMeshContour(spec)
	if err != nil {
		return pair, r, nil, wrong("%s and %s: %v", m.first.name, m.second.name, err)
	}
	if data, err = o.format.Encode(outline); err != nil {
		return pair, r, nil, cannot("%s and %s: %v", m.first.name, m.second.name, err)
	}
	back, err := decode(data, o.format)
	if err != nil {
		return pair, r, nil, cannot("%s and %s: the file written %v; it is not delivered", m.first.name, m.second.name, err)
	}
	for i, g := range []*gear{m.first, m.second} {
		pair[i] = newDrawnGear(g, reports[i], o)
		path, err := gearOf(back, i, spec.Center)
		if err != nil {
			return pair, r, nil, cannot("%s: %v", called(g), err)
		}
		if err := j.deliverable(&pair[i], path, o); err != nil {
			return pair, r, nil, err
		}
	}
	if r, err = j.roll(m, &pair[0], &pair[1]); err != nil {
		return pair, r, nil, err
	}
	if moving {
		if data, err = export.RollingSVG(spec); err != nil {
			return pair, r, nil, wrong("%s and %s: %v", m.first.name, m.second.name, err)
		}
	}
	return pair, r, data, nil
}

// gearOf takes the first or the second gear out of a mesh's outline, and sets it
// upright: its axis at the origin, a tooth along +x.
func gearOf(o export.Outline, index int, center float64) (export.Path, error) {
	if index == 0 {
		path, err := o.Cut()
		return path.Upright(involute.Vec{}), err
	}
	path, err := o.Mate()
	return path.Upright(involute.Vec{X: center}), err
}

// rollDrawn rolls the meshes whose gears are both drawn.
func (j *job) rollDrawn(drawn []drawnGear, o contourOptions) ([]rolledMesh, error) {
	rolled := []rolledMesh{}
	if o.stock > 0 {
		return rolled, nil
	}
	find := func(g *gear) *drawnGear {
		for i := range drawn {
			if drawn[i].gear == g {
				return &drawn[i]
			}
		}
		return nil
	}
	for _, m := range j.meshes {
		first, second := find(m.first), find(m.second)
		if first == nil || second == nil {
			continue
		}
		r, err := j.roll(m, first, second)
		if err != nil {
			return nil, err
		}
		rolled = append(rolled, r)
	}
	return rolled, nil
}

// roll rolls two contours as read back at the nominal center distance, and warns
// where the arcs alone make them touch.
func (j *job) roll(m *mesh, first, second *drawnGear) (rolledMesh, error) {
	r := rolledMesh{Gears: []string{m.first.name, m.second.name}, Center: m.plan.Nominal()}
	play, err := m.plan.Mesh.Backlash(r.Center, first.tooth.Thickness(), second.tooth.Thickness())
	if err != nil {
		return r, cannot("%s and %s cannot be rolled: %v", m.first.name, m.second.name, err)
	}
	r.Target.Backlash = play.Circumferential
	r.Target.Tip.First, r.Target.Tip.Second = m.plan.Mesh.TipClearances(r.Center, first.tooth, second.tooth)
	found, err := export.Roll(first.read, second.read, r.Center)
	if err != nil {
		return r, cannot("%s and %s as drawn cannot be rolled: %v", m.first.name, m.second.name, err)
	}
	r.AsWritten = rolledPair{
		Clearance: found.LeastClearance, Flank: found.LeastFlank, Tip: pairDims{found.LeastTipFirst, found.LeastTipSecond},
		Backlash:     span{found.Backlash.Least, found.Backlash.Greatest},
		Transmission: found.TransmissionError, Interferes: found.Interferes,
	}
	j.warnRolled(m, found, play.Circumferential)
	return r, nil
}

// warnRolled says where contours overlap that exact teeth would not, or only just.
func (j *job) warnRolled(m *mesh, found export.Rolling, backlash float64) {
	switch {
	case found.Backlash.Least >= 0 || backlash < -barelyNegative:
		return // they clear, or bind by their thicknesses, which is said
	case backlash <= barelyNegative:
		j.addMeshWarning("drawn-tight", m, "%s and %s are drawn without backlash, and the arcs let their teeth overlap by up to %s. Give backlash or thin",
			m.first.name, m.second.name, j.fine(-found.Backlash.Least))
	default:
		j.addMeshWarning("drawn-tight", m, "%s and %s as drawn overlap by up to %s where exact teeth have %s of backlash; draw them finer, or with --tolerance-side inside",
			m.first.name, m.second.name, j.fine(-found.Backlash.Least), j.fine(backlash))
	}
}
