package export

import (
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
)

// A MeshSpec is two external gears to be drawn in mesh, the first at the origin,
// the second at (Center, 0). What the two ContourSpecs say of unit and title is
// not looked at.
type MeshSpec struct {
	First, Second ContourSpec
	Center        float64 // center distance, mm
	Unit          inspect.Unit
	Title         string
}

// NewMeshContour draws both gears of a mesh in place, turned until they touch as
// when the first drives counter-clockwise: its leading flank touches the second
// gear's at the pitch point (in the middle of the path of contact where that
// leaves the pitch point out), and all the backlash is on the other flanks. The
// arcs that are drawn touch, not the exact teeth only.
// Where the teeth are too thick for the center distance they are drawn
// overlapping there.
//
// The first gear's contour is on LayerCut, the second's on LayerMate; bores and
// pins turn with their gear; the circles for reference are the tip, working pitch and
// base circles of both. Helical gears are drawn in transverse section.
func NewMeshContour(s MeshSpec) (Outline, [2]FitReport, error) {
	o := Outline{Unit: s.Unit, Title: s.Title}
	var reports [2]FitReport
	pose, err := s.pose()
	if err != nil {
		return o, reports, err
	}
	turn1, turn2 := pose.turns(pose.start)
	var own [2]Outline
	for i, g := range []ContourSpec{s.First, s.Second} {
		if own[i], reports[i], err = NewContour(g); err != nil {
			return o, reports, err
		}
	}
	turn2 += toContact(own, s.Center, turn1, turn2)
	for i, g := range []struct {
		tooth involute.Tooth
		turn  float64
		at    involute.Vec
		pitch float64 // d_w, mm
		layer Layer
	}{
		{s.First.Tooth, turn1, involute.Vec{}, pose.contact.Pitch1, LayerCut},
		{s.Second.Tooth, turn2, involute.Vec{X: s.Center}, pose.contact.Pitch2, LayerMate},
	} {
		o.take(own[i].placed(g.turn, g.at), g.layer)
		for _, d := range []float64{g.tooth.TipDiameter(), g.pitch, g.tooth.BaseDiameter()} {
			o.Circles = append(o.Circles, Circle{LayerReference, g.at, d / 2})
		}
	}
	return o, reports, nil
}

// toContact returns by how much farther than exact teeth the second gear must be
// turned until the contours that are drawn touch, radians; 0 where they cannot
// be rolled.
func toContact(own [2]Outline, center, turn1, turn2 float64) float64 {
	var sections [2]Section
	for i := range own {
		path, err := own[i].Cut()
		if err != nil {
			return 0
		}
		if sections[i], err = NewSection(path, 0); err != nil {
			return 0
		}
	}
	m, err := newRollMesh(sections[0], sections[1], center)
	if err != nil {
		return 0
	}
	pitch1, pitch2 := 2*math.Pi/float64(m.first.Teeth()), 2*math.Pi/float64(m.second.Teeth())
	angle := math.Remainder(turn1+m.first.space(0), pitch1)
	forward := m.stand(angle).forward
	if !finite(forward) {
		return 0
	}
	return math.Remainder(math.Pi-m.second.tooth(0)-angle*pitch2/pitch1+forward-turn2, pitch2)
}

// take adds a gear's outline, its contour on the layer given and without its
// circles for reference.
func (o *Outline) take(gear Outline, layer Layer) {
	for _, c := range gear.Contours {
		if c.Layer == LayerCut {
			c.Layer = layer
		}
		o.Contours = append(o.Contours, c)
	}
	for _, c := range gear.Circles {
		if c.Layer != LayerReference {
			o.Circles = append(o.Circles, c)
		}
	}
}

// placed returns the outline turned about the origin by turn (radians,
// counter-clockwise) and then moved by at.
func (o Outline) placed(turn float64, at involute.Vec) Outline {
	move := func(v involute.Vec) involute.Vec { return v.Rotate(turn).Add(at) }
	out := Outline{Unit: o.Unit, Title: o.Title}
	for _, c := range o.Contours {
		vs := make([]Vertex, len(c.Path.Vertices))
		for i, v := range c.Path.Vertices {
			vs[i] = Vertex{move(v.P), v.Bulge}
		}
		out.Contours = append(out.Contours, Contour{c.Layer, Path{vs}})
	}
	for _, c := range o.Circles {
		out.Circles = append(out.Circles, Circle{c.Layer, move(c.Center), c.Radius})
	}
	return out
}

// A meshPose is how two gears stand while their driving flanks touch. The place
// of contact is told by ρ, its distance in mm along the line of action from where
// that leaves the first gear's base circle; ρ grows while the first gear
// turns counter-clockwise, by one base pitch for every tooth.
type meshPose struct {
	first, second involute.Tooth
	center        float64 // mm
	contact       involute.Contact
	from, to      float64 // ρ of A and E, the ends of the contact between unrelieved involutes
	start         float64 // ρ of the pose that is drawn
	pitch         float64 // p_bt, mm
	play          float64 // j_bt, backlash along the line of action, mm
}

// pose works out how the gears stand.
func (s MeshSpec) pose() (meshPose, error) {
	p := meshPose{first: s.First.Tooth, second: s.Second.Tooth, center: s.Center}
	if p.first.Teeth() < 0 || p.second.Teeth() < 0 {
		return p, fmt.Errorf("a mesh with a ring gear is not drawn yet: both gears must have outside teeth")
	}
	mesh, err := involute.NewMesh(p.first.Gear, p.second.Gear)
	if err != nil {
		return p, err
	}
	if p.contact, err = mesh.Contact(s.Center, p.first, p.second); err != nil {
		return p, err
	}
	play, err := mesh.Backlash(s.Center, p.first.Thickness(), p.second.Thickness())
	if err != nil {
		return p, err
	}
	p.play, p.pitch = play.Base, p.first.TransverseBasePitch()
	p.from = max(p.contact.RhoA1, p.line()-involuteEnd(p.second))
	p.to = min(p.contact.RhoE1, involuteEnd(p.first))
	if !(p.to > p.from) {
		return p, fmt.Errorf("at a center distance of %s no flanks touch: contact would end %s before it begins; a smaller center distance or longer teeth would be right",
			s.length(s.Center), s.length(p.from-p.to))
	}
	p.start = p.pitchPoint()
	if p.start <= p.from || p.start >= p.to {
		p.start = (p.from + p.to) / 2
	}
	return p, nil
}

// length words a length in the drawing's unit.
func (s MeshSpec) length(mm float64) string {
	return s.Unit.Format(mm, s.Unit.Decimals()) + " " + s.Unit.String()
}

// involuteEnd returns how long the line of action is from the base circle to
// where the unrelieved involute ends, √(d² − d_b²)/2.
func involuteEnd(t involute.Tooth) float64 {
	return t.RollAngle(t.InvoluteEndDiameter()) * t.BaseDiameter() / 2
}

// line returns the length of the line of action between the base circles.
func (p meshPose) line() float64 { return p.contact.RhoA1 + p.contact.RhoA2 }

// pitchPoint returns ρ of the pitch point, (d_w1/2) sin α_wt.
func (p meshPose) pitchPoint() float64 {
	return p.contact.Pitch1 / 2 * math.Sin(p.contact.WorkingAngle)
}

// ratio returns ε_α of the path of contact drawn.
func (p meshPose) ratio() float64 { return (p.to - p.from) / p.pitch }

// at returns the point of the line of action at ρ. The line leaves the first gear's base
// circle at polar angle −α_wt, counter-clockwise.
func (p meshPose) at(rho float64) involute.Vec {
	out := involute.Polar(p.first.BaseDiameter()/2, -p.contact.WorkingAngle)
	along := involute.Polar(1, math.Pi/2-p.contact.WorkingAngle)
	return out.Add(along.Scale(rho))
}

// turns returns by what angles the gears are turned, counter-clockwise, from
// where tooth 0 points along +x, when a pair of driving flanks touches at ρ.
//
// The counter-clockwise flank of a tooth that points along +x leaves the base circle
// at polar angle ψ_b, and its involute meets the line of action at ρ when that
// point stands at ρ/r_b − α_wt: at the pitch point inv α_wt, so that the turn
// there is −ψ_w, half the angle of the tooth at the working pitch circle. For
// the second gear the same holds, seen from its center with the mesh turned by 180°.
func (p meshPose) turns(rho float64) (first, second float64) {
	one := func(t involute.Tooth, rho float64) float64 {
		return rho/(t.BaseDiameter()/2) - p.contact.WorkingAngle - t.HalfAngleAt(t.BaseDiameter())
	}
	return one(p.first, rho), math.Pi + one(p.second, p.line()-rho)
}
