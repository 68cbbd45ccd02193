package involute

import (
	"math"
	"testing"
)

// A rollingRack is the tool's right-hand boundary in the transverse section,
// as drawn: a straight flank, a rounded corner, a flat tip. The gear's center
// is the origin and the tool stands with its tooth on the y axis.
type rollingRack struct {
	r, alpha, cosB  float64
	half            float64 // half the tool's tooth on the rolling line, normal section
	bottom          float64 // y of the tip
	cx, cy, rho, yt float64 // the corner's circle in the normal section; yt where it leaves the flank
}

func newRollingRack(t Tooth) rollingRack {
	s := t.Spec()
	m, tan := s.Module, math.Tan(s.Rack.PressureAngle)
	k := rollingRack{r: t.ReferenceDiameter() / 2, alpha: s.Rack.PressureAngle, cosB: math.Cos(s.Helix)}
	// The tool's tooth fills the space on the rolling line, and is a quarter
	// pitch to each side on its datum line.
	k.half = (math.Pi*m - t.Thickness()) / 2
	datum := k.r + (math.Pi*m/4-k.half)/tan
	if s.Thinning == FlanksOnly { // at the drawing's depth, and as much wider
		datum = k.r + s.Shift*m
	}
	k.bottom = datum - s.Rack.Dedendum*m
	k.rho = s.Rack.TipRadius * m
	k.cy = k.bottom + k.rho
	k.cx = k.half + (k.cy-k.r)*tan - k.rho/math.Cos(k.alpha)
	k.yt = k.cy - k.rho*math.Sin(k.alpha)
	return k
}

// width returns half the tool's width at height y, transverse.
func (k rollingRack) width(y float64) float64 {
	if y >= k.yt {
		return k.flank(y)
	}
	d := k.cy - y
	return (k.cx + math.Sqrt(max(0, k.rho*k.rho-d*d))) / k.cosB
}

func (k rollingRack) flank(y float64) float64 {
	return (k.half + (y-k.r)*math.Tan(k.alpha)) / k.cosB
}

// cut returns the angle from the space's center line, in the gear, of the
// point that a tool of half width w cuts where it passes the fixed place
// (radius, tau from the y axis): the tool has then traveled u, and the gear
// has turned by u/r with it.
func (k rollingRack) cut(radius, tau float64, w func(float64) float64) float64 {
	u := radius*math.Sin(tau) - w(radius*math.Cos(tau))
	return tau - u/k.r
}

// removed returns how far the rolling tool cuts on the circle of that radius:
// the largest angle over all positions, by the tip alone and by the flank alone.
func (k rollingRack) removed(radius float64) (byTip, byFlank float64) {
	byFlank = math.Inf(-1)
	end := math.Acos(min(1, k.bottom/radius))
	turn := 0.0
	cut := func(tau float64) float64 { return k.cut(radius, tau, k.width) }
	if radius > k.yt {
		turn = math.Acos(k.yt / radius)
		_, byFlank = highest(cut, -turn, turn, 400)
	}
	_, right := highest(cut, turn, end, 200)
	_, left := highest(cut, -end, -turn, 200)
	return max(left, right), byFlank
}

// form returns the radius above which only the flank cuts, and whether the tip
// cuts into what the flank would leave.
func (k rollingRack) form(tip float64) (radius float64, undercut bool) {
	// Where the flank's last point cuts, the cut is stationary along the flank.
	along := func(radius, h float64) float64 {
		return k.cut(radius, math.Acos(k.yt/radius)+h, k.flank)
	}
	past := func(radius float64) bool { return along(radius, 1e-5) > along(radius, -1e-5) }
	radius = bisect(past, k.yt*(1+1e-12), tip)
	// A greatest cut: the flank goes on from there. A least one: the flank's
	// point has run back through what was cut before, and tip and flank cross lower.
	if along(radius, 1e-3)+along(radius, -1e-3) < 2*along(radius, 0) {
		return radius, false
	}
	tipAhead := func(radius float64) bool {
		byTip, byFlank := k.removed(radius)
		return byTip > byFlank-1e-15 // the corner of a sharp tool counts to both, but for rounding
	}
	return bisect(tipAhead, k.yt, radius), true
}

func fullRadius(alphaDeg, dedendum float64) Rack {
	r := Rack{PressureAngle: alphaDeg * Degree, Addendum: 1, Dedendum: dedendum}
	r.TipRadius = r.LargestTipRadius()
	return r
}

type rolled struct {
	name string
	spec Spec
	thin float64
}

func rolledGears() []rolled {
	sharp := Rack{20 * Degree, 1, 1.25, 0}
	stub := Rack{20 * Degree, 0.8, 1, 0.3}
	old := Rack{14.5 * Degree, 1, 1.157, 0.209}
	return []rolled{
		{"plain", Spec{Teeth: 24, Module: 2, Rack: isoA()}, 0},
		{"undercut z 8", Spec{Teeth: 8, Module: 2, Rack: isoA()}, 0},
		{"undercut by a hair", Spec{Teeth: 17, Module: 3, Rack: isoA()}, 0},
		{"undercut z 10", Spec{Teeth: 10, Module: 2, Rack: isoA()}, 0},
		{"z 6 shifted out", Spec{Teeth: 6, Module: 2, Shift: 0.4, Rack: isoA()}, 0},
		{"z 5 shifted out", Spec{Teeth: 5, Module: 2, Shift: 0.6, Rack: isoA(), TipDiameter: 14.2}, 0},
		{"z 6 shifted in", Spec{Teeth: 6, Module: 2, Shift: -0.05, Rack: stub}, 0},
		{"z 12 shifted in", Spec{Teeth: 12, Module: 2, Shift: -0.3, Rack: isoA()}, 0},
		{"sharp tool", Spec{Teeth: 20, Module: 2, Rack: sharp}, 0},
		{"sharp tool, undercut", Spec{Teeth: 9, Module: 2, Rack: sharp}, 0},
		{"sharp tool to the pitch circle", Spec{Teeth: 30, Module: 2, Shift: 1, Rack: Rack{20 * Degree, 0.5, 1, 0}}, 0},
		{"full radius tool", Spec{Teeth: 30, Module: 1, Rack: fullRadius(20, 1.4)}, 0},
		{"full radius tool, undercut", Spec{Teeth: 11, Module: 1, Rack: fullRadius(20, 1.4)}, 0},
		{"helical", Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: Rack{17.5 * Degree, 1, 1.25, 0.3}}, 0},
		{"helical, undercut", Spec{Teeth: 8, Module: 1.5, Helix: -33 * Degree, Rack: isoA()}, 0},
		{"thinned", Spec{Teeth: 20, Module: 2, Rack: isoA()}, 0.5},
		{"thinned, undercut z 6", Spec{Teeth: 6, Module: 2, Shift: 0.3, Rack: isoA()}, 0.1},
		{"thinned, full radius tool", Spec{Teeth: 30, Module: 1, Rack: fullRadius(20, 1.4)}, 0.1},
		{"thinned and topped", Spec{Teeth: 24, Module: 2, Rack: isoA(), Topped: true}, 0.2},
		{"thinned, undercut", Spec{Teeth: 14, Module: 2, Rack: isoA()}, 0.2},
		{"flanks moved", Spec{Teeth: 20, Module: 2, Rack: isoA(), Thinning: FlanksOnly}, 0.5},
		{"flanks moved, undercut z 8", Spec{Teeth: 8, Module: 2, Rack: isoA(), Thinning: FlanksOnly}, 0.15},
		{"flanks moved, undercut z 6", Spec{Teeth: 6, Module: 2, Shift: 0.3, Rack: isoA(), Thinning: FlanksOnly}, 0.1},
		{"flanks moved, sharp tool", Spec{Teeth: 20, Module: 2, Rack: sharp, Thinning: FlanksOnly}, 0.2},
		{"flanks moved together", Spec{Teeth: 20, Module: 2, Rack: isoA(), Thinning: FlanksOnly}, -0.05},
		{"rounded and relieved", Spec{Teeth: 24, Module: 2, Rack: isoA(), TipRound: 0.2, Relief: ReliefSpec{Amount: 0.02, Start: 50}}, 0.1},
		{"flanks moved, full radius tool", Spec{Teeth: 30, Module: 1, Rack: fullRadius(20, 1.4), Thinning: FlanksOnly}, 0.1},
		{"flanks moved, helical", Spec{Teeth: 13, Module: 1.5, Helix: 33 * Degree, Shift: 0.5, Rack: isoA(), Thinning: FlanksOnly}, 0.1},
		{"stub", Spec{Teeth: 14, Module: 3, Rack: stub}, 0},
		{"14.5 degrees", Spec{Teeth: 40, Module: 25.4 / 16, Rack: old}, 0.03},
		{"14.5 degrees, undercut", Spec{Teeth: 16, Module: 25.4 / 16, Rack: old}, 0},
		{"many teeth", Spec{Teeth: 200, Module: 1, Shift: 0.3, Rack: isoA()}, 0.1},
	}
}

func (c rolled) tooth(t testing.TB) Tooth {
	t.Helper()
	g, err := NewGear(c.spec)
	if err != nil {
		t.Fatal(c.name, err)
	}
	tooth, err := g.Tooth(g.NominalThickness() - c.thin)
	if err != nil {
		t.Fatal(c.name, err)
	}
	return tooth
}

// Rolling the rack through a blank leaves exactly the fillets and flanks of
// the outline. Each of their points is compared, square to the curve, with the
// farthest cut over all positions of the tool.
func TestRollingRackLeavesOutline(t *testing.T) {
	const tol = 1e-9 // mm, on modules of 1 to 3
	for _, c := range rolledGears() {
		tooth := c.tooth(t)
		k := newRollingRack(tooth)
		o := tooth.Outline()
		half := o.Pitch() / 2
		off := map[Role]*worst{RootFillet: {}, ToothFlank: {}}
		for i, p := range o.Pieces {
			w, ok := off[p.Role]
			if !ok {
				continue
			}
			t0, t1 := p.Domain()
			for j := range 24 {
				// No point on a joint itself, where two cuts are equal.
				q, dq := p.At(t0 + (t1-t0)*(float64(j)+0.5)/24)
				into := q.Angle() + half // from the space below the tooth
				if i > len(o.Pieces)/2 {
					into = half - q.Angle()
				}
				tip, flank := k.removed(q.Norm())
				side := q.Left().Scale(max(tip, flank) - into)
				w.see(side.Cross(dq) / dq.Norm())
			}
		}
		off[RootFillet].within(t, c.name+", fillet, mm", tol)
		off[ToothFlank].within(t, c.name+", flank, mm", tol)
	}
}

// The rolled boundary also has the root and form diameters that the tooth
// says, and is undercut where it says so.
func TestRollingRackDiameters(t *testing.T) {
	for _, c := range rolledGears() {
		t.Run(c.name, func(t *testing.T) {
			tooth := c.tooth(t)
			k := newRollingRack(tooth)
			near(t, "root diameter", tooth.RootDiameter(), 2*k.bottom, 1e-12*tooth.TipDiameter())
			radius, undercut := k.form(tooth.TipDiameter() / 2)
			tol := 1e-8 // mm: the differences along the flank are good to h²
			near(t, "form diameter", tooth.FormDiameter(), 2*radius, tol)
			if undercut != tooth.Undercut() {
				t.Errorf("undercut: the outline says %v, rolling %v", tooth.Undercut(), undercut)
			}
			t.Logf("form %.9f, off by %.2g", 2*radius, tooth.FormDiameter()-2*radius)
		})
	}
}
