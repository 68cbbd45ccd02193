package involute

import "math"

// A Role says what a piece of an Outline is.
type Role int

// The roles, in the order in which they are met.
const (
	RootLand Role = iota
	RootFillet
	ToothFlank
	Chamfer
	TipLand
)

// A Piece is a curve with its role.
type Piece struct {
	Curve
	Role Role
}

// An Outline is one pitch of a gear's transverse section about the tooth whose
// center line is the +x axis: root, fillet, flank, tip, flank, fillet (with
// chamfers beside the tip where there are any; without root where the fillets
// of a full-radius tool meet). Its invariants:
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

// Outline returns one pitch of the tooth's transverse section. Only external
// gears have one yet; a ring's is empty.
func (t Tooth) Outline() Outline {
	if t.z < 0 {
		return Outline{Teeth: t.spec.Teeth}
	}
	half := math.Pi / t.z
	up := t.rackTip(-half, 1)
	up.T1 = t.tau
	down := t.rackTip(half, -1)
	down.T0 = -t.tau

	var ps []Piece
	add := func(c Curve, r Role) { ps = append(ps, Piece{c, r}) }
	// The fillet starts where the tool's tip land ends: e/(r cos β) from the space's center.
	land := up.E / up.CosBeta / up.R
	if land > noLand {
		add(Arc{Radius: t.RootDiameter() / 2, Start: -half - land, Sweep: 2 * land}, RootLand)
	}
	add(up, RootFillet)
	rb, psiB := t.db/2, t.halfBaseAngle()
	t0, t1 := t.RollAngle(t.form), t.RollAngle(t.daFa)
	add(Flank{rb, -psiB, t0, t1}, ToothFlank)
	psiA := t.HalfAngleAt(t.daFa)
	if t.spec.TipChamfer > 0 {
		from, to := t.chamferEnd()
		psiA = to.Angle()
		add(Line{Vec{from.X, -from.Y}, Vec{to.X, -to.Y}}, Chamfer)
		add(Arc{Radius: t.da / 2, Start: -psiA, Sweep: 2 * psiA}, TipLand)
		add(Line{to, from}, Chamfer)
	} else {
		add(Arc{Radius: t.da / 2, Start: -psiA, Sweep: 2 * psiA}, TipLand)
	}
	add(Flank{rb, psiB, -t1, -t0}, ToothFlank)
	add(down, RootFillet)
	return Outline{ps, t.spec.Teeth}
}
