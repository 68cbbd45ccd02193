package involute

import "math"

// A Role says what a piece of an Outline is.
type Role int

// The roles, in the order in which they are met.
const (
	RootLand Role = iota
	RootFillet
	ToothFlank
	ToothRelief
	Chamfer
	TipRounding
	TipLand
)

// A Piece is a curve with its role.
type Piece struct {
	Curve
	Role Role
}

// An Outline is one pitch of a gear's transverse section about the tooth whose
// center line is the +x axis: root, fillet, flank, tip, flank, fillet (with
// relieved pieces, chamfers or roundings beside the tip where there are any;
// without root land where the fillets of a full-radius tool meet, or where one
// arc of an end mill joins the flanks; without fillets where a sharp tool's tip ends
// on the pitch circle). Its invariants:
//
//	end of piece i              = start of piece i + 1
//	end of the last piece       = start of the first, turned by 2π/z
//	the metal is on the left of every piece
type Outline struct {
	Pieces []Piece
	Teeth  int
}

// Pitch returns the angle 2π/z by which the outline repeats, radians.
func (o Outline) Pitch() float64 { return 2 * math.Pi / float64(o.Teeth) }

// RollAngle returns t = tan α_y of the involute at diameter dy.
func (g *Gear) RollAngle(dy float64) float64 { return tanOfCos(g.db, dy) }

// noLand is the angle up to which a root land is rounding: a full-radius tool
// leaves none, but its tip's half width comes out as a few 1e-17 of the radius.
const noLand = 1e-12

// leastRoll is where a flank that begins on the base circle is begun: at 0 an
// involute has no direction, and up to here it has left its start by 5e-25 of r_b.
const leastRoll = 1e-12

// Outline returns one pitch of the tooth's transverse section. Only external
// gears have one yet; a ring's is empty.
func (t Tooth) Outline() Outline {
	if t.z < 0 {
		return Outline{Teeth: t.spec.Teeth}
	}
	ps := t.firstHalf()
	land := t.landAngle()
	half := ps
	if half[0].Role == RootLand {
		half = half[1:]
	}
	n := len(half)
	ps = append(ps, Piece{Arc{Radius: t.da / 2, Start: -land, Sweep: 2 * land}, TipLand})
	for i := range n {
		p := half[n-1-i]
		ps = append(ps, Piece{Mirrored(p.Curve), p.Role})
	}
	return Outline{ps, t.spec.Teeth}
}

// firstHalf returns the outline from the root land to the end of the first flank
// and its chamfer or rounding.
func (t Tooth) firstHalf() []Piece {
	half := math.Pi / t.z
	var ps []Piece
	add := func(c Curve, r Role) { ps = append(ps, Piece{c, r}) }
	if t.spec.Mill.Diameter > 0 {
		ps = t.mill.curves(t, -half)
	} else {
		up := t.rackTip(-half, 1)
		up.T1 = t.tau
		// The fillet starts where the tool's tip land ends: e/(r cos β) from the space's center.
		if land := up.E / up.CosBeta / up.R; land > noLand {
			add(Arc{Radius: t.root / 2, Start: -half - land, Sweep: 2 * land}, RootLand)
		}
		// A sharp tool whose tip ends on the pitch circle leaves a corner and no fillet.
		if math.Abs(up.H)+up.Rho > noWidth*t.spec.Module {
			add(up, RootFillet)
		}
	}
	psi := t.halfBaseAngle()
	end, _ := t.reliefAt(t.daFa)
	flank := Flank{t.db / 2, -psi, max(t.RollAngle(t.form), leastRoll), end}
	if t.relieved() && end > t.relief.Start {
		flank.T1 = t.relief.Start
		add(flank, ToothFlank)
		f := t.relief
		f.BaseAngle, f.T1 = -psi, end
		add(f, ToothRelief)
	} else {
		add(flank, ToothFlank)
	}
	switch {
	case t.spec.TipChamfer > 0:
		add(Line{t.flankEnd(), t.chamferEnd()}, Chamfer)
	case t.spec.TipRound > 0:
		add(t.rounding(t.spec.TipRound), TipRounding)
	}
	return ps
}
