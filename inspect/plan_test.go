package inspect

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"flankwright/involute"
)

// A planned pair is what a property test of Plan draws.
type plannedPair struct {
	gears []PlanGear
	mesh  PlanMesh
}

// drawPair draws two gears that mesh, at a center distance near the tight one
// with a tolerance, without a wish for backlash yet.
func drawPair(t *rapid.T) plannedPair {
	first := drawSpec(t, "first")
	second := first
	second.Teeth, second.Helix = rapid.IntRange(12, 120).Draw(t, "teeth of second"), -first.Helix
	second.Shift = rapid.Float64Range(0, 0.5).Draw(t, "shift of second")
	g1, err1 := involute.NewGear(first)
	g2, err2 := involute.NewGear(second)
	if err1 != nil || err2 != nil {
		t.Skip(err1, err2)
	}
	m, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	tight, err := m.TightCenter(g1.NominalThickness(), g2.NominalThickness())
	if err != nil {
		t.Skip(err)
	}
	a := tight + rapid.Float64Range(-0.05, 0.05).Draw(t, "off")*first.Module
	tol := rapid.Float64Range(0, 0.02).Draw(t, "tolerance") * first.Module
	if a-tol <= m.LeastCenter()*1.001 {
		t.Skip("below the base circles")
	}
	return plannedPair{
		[]PlanGear{{Gear: g1}, {Gear: g2}},
		PlanMesh{First: 0, Second: 1, Mesh: m, Center: Limits{a - tol, a + tol}},
	}
}

// play returns the backlash of two thicknesses at a center distance by a way of
// its own: the two teeth and the backlash fill one pitch of the working circle.
func (p plannedPair) play(a, s1, s2 float64) float64 {
	g1, g2 := p.gears[0].Gear, p.gears[1].Gear
	u := float64(g2.Teeth()) / float64(g1.Teeth())
	dw1 := 2 * a / (1 + u)
	dw2 := dw1 * u
	thick := func(g *involute.Gear, sn, dw float64) float64 { // ISO 21771:2007, tooth thickness at any diameter
		st := sn / math.Cos(g.Spec().Helix)
		return dw * (st/g.ReferenceDiameter() + invOf(g.TransversePressureAngle()) - invOf(math.Acos(g.BaseDiameter()/dw)))
	}
	return math.Pi*dw1/float64(g1.Teeth()) - thick(g1, s1, dw1) - thick(g2, s2, dw2)
}

func invOf(a float64) float64 { return math.Tan(a) - a }

// drawWish draws a backlash that teeth thinner than nominal can give.
func (p *plannedPair) drawWish(t *rapid.T, thin1, thin2 Limits) {
	n1, n2 := p.gears[0].Gear.NominalThickness(), p.gears[1].Gear.NominalThickness()
	module := p.gears[0].Gear.Module()
	least := p.play(p.mesh.Center.Min, n1-thin1.Min, n2-thin2.Min) + rapid.Float64Range(0.001, 0.05).Draw(t, "least")*module
	least = math.Max(least, 0)
	most := p.play(p.mesh.Center.Max, n1-thin1.Max, n2-thin2.Max) + 0.12*module + rapid.Float64Range(0, 0.05).Draw(t, "most")*module
	p.mesh.Backlash = &Limits{least, math.Max(most, least)}
}

// checkWish demands that the thicknesses found give exactly the backlash asked for.
func (p plannedPair) checkWish(t *rapid.T, found []Thickness) {
	for _, end := range []struct {
		name      string
		got, want float64
	}{
		{"least", p.play(p.mesh.Center.Min, found[0].Limits.Max, found[1].Limits.Max), p.mesh.Backlash.Min},
		{"greatest", p.play(p.mesh.Center.Max, found[0].Limits.Min, found[1].Limits.Min), p.mesh.Backlash.Max},
	} {
		if math.Abs(end.got-end.want) > 1e-9 {
			t.Errorf("%s backlash %v, asked for %v", end.name, end.got, end.want)
		}
	}
	least, most, err := p.mesh.BacklashRange(found[0].Limits, found[1].Limits)
	if err != nil || math.Abs(least.Circumferential-p.mesh.Backlash.Min) > 1e-9 || math.Abs(most.Circumferential-p.mesh.Backlash.Max) > 1e-9 {
		t.Errorf("the program's own range is %v to %v (%v)", least.Circumferential, most.Circumferential, err)
	}
}

func thinOf(g PlanGear, s Thickness) Limits {
	n := g.Gear.NominalThickness()
	return Limits{n - s.Limits.Max, n - s.Limits.Min}
}

// The thickest pair at the tightest center has the least backlash asked for,
// the thinnest at the loosest the greatest: shared equally, or by one gear.
func TestPlanGivesTheBacklash(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		p.drawWish(t, Limits{}, Limits{})
		p.mesh.Share = rapid.SampledFrom([]Share{ShareEqual, ShareFirst, ShareSecond}).Draw(t, "share")
		found, err := Plan(p.gears, []PlanMesh{p.mesh})
		if err != nil {
			checkProblem(t, p, err)
			return
		}
		p.checkWish(t, found)
		first, second := thinOf(p.gears[0], found[0]), thinOf(p.gears[1], found[1])
		switch p.mesh.Share {
		case ShareEqual:
			if math.Abs(first.Min-second.Min) > 1e-12*p.gears[0].Gear.ReferenceDiameter() || math.Abs(first.Width()-second.Width()) > 1e-11 {
				t.Errorf("not shared equally: %v and %v", first, second)
			}
		case ShareFirst:
			if second != (Limits{}) {
				t.Errorf("the second gear is thinned by %v", second)
			}
		case ShareSecond:
			if first != (Limits{}) {
				t.Errorf("the first gear is thinned by %v", first)
			}
		}
		for i, f := range found {
			if f.By != ByBacklash || f.Limits.Min > f.Limits.Max+noThinning {
				t.Errorf("gear %d: %+v", i, f)
			}
		}
	})
}

// checkProblem checks that a refusal is right, and its numbers with it: the
// play of nominal teeth, the tight center, and the backlash that would do.
func checkProblem(t *rapid.T, p plannedPair, err error) ProblemKind {
	var problem *PlanProblem
	if !errors.As(err, &problem) {
		t.Fatalf("refused without reason: %v", err)
	}
	n1, n2 := p.gears[0].Gear.NominalThickness(), p.gears[1].Gear.NominalThickness()
	tight := p.play(p.mesh.Center.Min, n1, n2)
	if math.Abs(problem.Nominal.Min-tight) > 1e-9 {
		t.Errorf("says %v of play, is %v", problem.Nominal.Min, tight)
	}
	better := *p.mesh.Backlash
	switch problem.Kind {
	case TooThick:
		if tight <= p.mesh.Backlash.Min {
			t.Errorf("says the teeth are too thin already, and they have %v of %v", tight, p.mesh.Backlash.Min)
		}
		better.Min = problem.Nominal.Min + 1e-8
		better.Max = math.Max(better.Max, p.play(p.mesh.Center.Max, n1, n2)+1e-6)
	case NoRoom:
		if problem.Thin.Min <= problem.Thin.Max {
			t.Errorf("refused with a range that can be: %+v", problem)
		}
		better.Max = problem.Most + 1e-8
		less := better
		less.Max = problem.Most - 1e-6
		q := p.mesh
		q.Backlash = &less
		if _, err := Plan(p.gears, []PlanMesh{q}); err == nil {
			t.Errorf("says %v is needed, and %v does", problem.Most, less.Max)
		}
	default:
		t.Errorf("one mesh alone and kind %v", problem.Kind)
	}
	q := p.mesh
	q.Backlash = &better
	if _, err := Plan(p.gears, []PlanMesh{q}); err != nil {
		t.Errorf("following the advice to ask for %v is refused too: %v", better, err)
	}
	return problem.Kind
}

// A gear whose own thinning rules leaves its mate the rest.
func TestPlanLeavesTheRest(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		module := p.gears[0].Gear.Module()
		low := rapid.Float64Range(0, 0.02).Draw(t, "thin") * module
		own := Limits{low, low + rapid.Float64Range(0, 0.02).Draw(t, "thin range")*module}
		fixed := rapid.IntRange(0, 1).Draw(t, "fixed")
		p.gears[fixed].Thin = &own
		var thins [2]Limits
		thins[fixed] = own
		p.drawWish(t, thins[0], thins[1])
		found, err := Plan(p.gears, []PlanMesh{p.mesh})
		if err != nil {
			t.Fatalf("refused: %v", err)
		}
		if got := thinOf(p.gears[fixed], found[fixed]); found[fixed].By != ByThin || math.Abs(got.Min-own.Min) > 1e-12*p.gears[0].Gear.ReferenceDiameter() {
			t.Errorf("the gear's own thinning %v became %v", own, got)
		}
		p.checkWish(t, found)
	})
}

// Backlash that is there already at the tightest center, or less range than the
// center's tolerance takes, is refused with its numbers.
func TestPlanRefuses(t *testing.T) {
	negatives, empties := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		p := drawPair(t)
		n1, n2 := p.gears[0].Gear.NominalThickness(), p.gears[1].Gear.NominalThickness()
		tight, loose := p.play(p.mesh.Center.Min, n1, n2), p.play(p.mesh.Center.Max, n1, n2)
		module := p.gears[0].Gear.Module()
		less := rapid.Float64Range(0.001, 0.01).Draw(t, "less") * module
		if rapid.Bool().Draw(t, "negative") {
			p.mesh.Backlash = &Limits{tight - less, loose + module*0.1}
		} else {
			p.mesh.Backlash = &Limits{tight + less, tight + less + (loose-tight)*0.9 - 1e-6}
			if p.mesh.Backlash.Width() <= 0 || loose-tight < 1e-4 {
				t.Skip("no tolerance to speak of")
			}
		}
		_, err := Plan(p.gears, []PlanMesh{p.mesh})
		if err == nil {
			t.Fatalf("%v accepted; nominal teeth have %v to %v", *p.mesh.Backlash, tight, loose)
		}
		if checkProblem(t, p, err) == TooThick {
			negatives++
		} else {
			empties++
		}
	})
	if negatives == 0 || empties == 0 {
		t.Errorf("%d negative, %d empty: one of them is not tried", negatives, empties)
	}
}

// drawTrain draws three or four gears that run in a row, or all with the
// first, with a wish in every mesh, any shares, and now and then a gear whose
// own thinning rules.
func drawTrain(t *rapid.T) (gears []PlanGear, pairs []plannedPair) {
	spec := drawSpec(t, "gear")
	star := rapid.Bool().Draw(t, "star")
	for i := range rapid.IntRange(3, 4).Draw(t, "gears") {
		s := spec
		s.Teeth = rapid.IntRange(14, 90).Draw(t, "teeth")
		s.Shift = rapid.Float64Range(0, 0.4).Draw(t, "shift")
		if star && i > 0 || !star && i%2 == 1 {
			s.Helix = -spec.Helix
		}
		g, err := involute.NewGear(s)
		if err != nil {
			t.Skip(err)
		}
		one := PlanGear{Gear: g}
		if rapid.IntRange(0, 5).Draw(t, "own") == 0 {
			one.Thin = &Limits{0, 0.01 * s.Module}
		}
		gears = append(gears, one)
	}
	for i := 1; i < len(gears); i++ {
		mate := i - 1
		if star {
			mate = 0
		}
		pairs = append(pairs, drawWishedMesh(t, gears, mate, i))
	}
	return gears, pairs
}

func drawWishedMesh(t *rapid.T, gears []PlanGear, first, second int) plannedPair {
	g1, g2 := gears[first].Gear, gears[second].Gear
	m, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	a, err := m.TightCenter(g1.NominalThickness(), g2.NominalThickness())
	if err != nil {
		t.Skip(err)
	}
	tol := rapid.Float64Range(0, 0.005).Draw(t, "tolerance") * g1.Module()
	p := plannedPair{
		[]PlanGear{gears[first], gears[second]},
		PlanMesh{First: first, Second: second, Mesh: m, Center: Limits{a - tol, a + tol}, Share: rapid.SampledFrom([]Share{ShareEqual, ShareEqual, ShareFirst, ShareSecond}).Draw(t, "share")},
	}
	p.drawWish(t, Limits{}, Limits{})
	return p
}

// In a train no mesh has less than its least or more than its greatest
// backlash, no tooth is thicker than nominal, and a gear's own thinning stays.
func TestPlanOfTrains(t *testing.T) {
	planned, drawn := 0, 0
	rapid.Check(t, func(t *rapid.T) {
		gears, pairs := drawTrain(t)
		var meshes []PlanMesh
		for _, p := range pairs {
			meshes = append(meshes, p.mesh)
		}
		drawn++
		found, err := Plan(gears, meshes)
		if err != nil {
			if problem := (*PlanProblem)(nil); !errors.As(err, &problem) {
				t.Fatalf("refused without reason: %v", err)
			}
			return
		}
		planned++
		for i, f := range found {
			thin := thinOf(gears[i], f)
			if thin.Min < -2*noThinning || thin.Min > thin.Max+2*noThinning {
				t.Errorf("gear %d is thinned by %v", i, thin)
			}
			if own := gears[i].Thin; own != nil && math.Abs(thin.Max-own.Max) > 1e-12*gears[i].Gear.ReferenceDiameter() {
				t.Errorf("gear %d says %v and got %v", i, *own, thin)
			}
		}
		for _, p := range pairs {
			if gears[p.mesh.First].Thin == nil || gears[p.mesh.Second].Thin == nil {
				p.checkInside(t, found[p.mesh.First], found[p.mesh.Second])
			}
		}
	})
	if planned < drawn/4 {
		t.Errorf("only %d of %d drawn trains were planned", planned, drawn)
	}
}

// A gear that runs with several mates, each of which runs with it alone, leaves
// nothing unused where all share equally: every mesh has exactly its range.
func TestPlanLeavesNothingUnused(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		spec := drawSpec(t, "middle")
		spec.Teeth = rapid.IntRange(14, 60).Draw(t, "teeth")
		var gears []PlanGear
		for i := range 3 {
			s := spec
			if i > 0 {
				s.Teeth, s.Helix = rapid.IntRange(14, 90).Draw(t, "teeth"), -spec.Helix
			}
			g, err := involute.NewGear(s)
			if err != nil {
				t.Skip(err)
			}
			gears = append(gears, PlanGear{Gear: g})
		}
		p, q := drawWishedMesh(t, gears, 0, 1), drawWishedMesh(t, gears, 0, 2)
		p.mesh.Share, q.mesh.Share = ShareEqual, ShareEqual
		found, err := Plan(gears, []PlanMesh{p.mesh, q.mesh})
		if err != nil {
			t.Fatalf("refused: %v", err)
		}
		p.checkWish(t, []Thickness{found[0], found[1]})
		q.checkWish(t, []Thickness{found[0], found[2]})
	})
}

// checkInside demands that a backlash lies inside what was asked for.
func (p plannedPair) checkInside(t *rapid.T, first, second Thickness) {
	least := p.play(p.mesh.Center.Min, first.Limits.Max, second.Limits.Max)
	most := p.play(p.mesh.Center.Max, first.Limits.Min, second.Limits.Min)
	const slack = 2 * noThinning // what the planner takes for nothing, of backlash
	if least < p.mesh.Backlash.Min-slack || most > p.mesh.Backlash.Max+slack {
		t.Errorf("backlash %v to %v, asked for %v", least, most, *p.mesh.Backlash)
	}
}

// Without thin and without backlash a gear is nominal, both limits alike.
func TestPlanOfNothing(t *testing.T) {
	g := spur(t, 2, 20, 0.1)
	found, err := Plan([]PlanGear{{Gear: g}}, nil)
	if err != nil || found[0].By != ByNothing || found[0].Limits != nominalLimits(g) {
		t.Errorf("%+v %v", found, err)
	}
}

// Trap 11: m 3, z 12/24, x 0.6/0.36, 0.05 thinner each at the tight center
// distance of nominal teeth: j_wt 0.104629, j_bn 0.093969 (computed apart from the program).
func TestBacklashIsNotTheSumOfThinnings(t *testing.T) {
	g1, g2 := spur(t, 3, 12, 0.6), spur(t, 3, 24, 0.36)
	m, err := involute.NewMesh(g1, g2)
	if err != nil {
		t.Fatal(err)
	}
	a, err := m.TightCenter(g1.NominalThickness(), g2.NominalThickness())
	if err != nil {
		t.Fatal(err)
	}
	p := plannedPair{[]PlanGear{{Gear: g1}, {Gear: g2}}, PlanMesh{First: 0, Second: 1, Mesh: m, Center: Limits{a, a}}}
	p.mesh.Backlash = &Limits{0.104629, 0.104629}
	found, err := Plan(p.gears, []PlanMesh{p.mesh})
	if err != nil {
		t.Fatal(err)
	}
	for i, g := range p.gears {
		if thin := thinOf(g, found[i]); math.Abs(thin.Min-0.05) > 5e-7 || math.Abs(thin.Max-0.05) > 5e-7 {
			t.Errorf("gear %d is thinned by %v, not by 0.05", i, thin)
		}
	}
	least, _, err := p.mesh.BacklashRange(found[0].Limits, found[1].Limits)
	if err != nil || math.Abs(least.Normal-0.093969) > 5e-7 {
		t.Errorf("normal backlash %v, want 0.093969 (%v)", least.Normal, err)
	}
}
