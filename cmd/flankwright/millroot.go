package main

import (
	"fmt"
	"math"

	"flankwright/inspect"
	"flankwright/involute"
	"flankwright/refdata"
)

// deepenRoots gives the milled roots of gears in meshes the depth that their
// mates' tips need: with the rack's clearance at the nominal center distance.
func (j *job) deepenRoots() error {
	for _, g := range j.gears {
		if g.g.Spec().Mill.Diameter == 0 {
			continue
		}
		root := math.Inf(1)
		for _, m := range j.meshes {
			mate, ok := m.mateOf(g)
			if !ok {
				continue
			}
			by := rootDecision{m.plan.Nominal(), mate.g.TipDiameter(), g.g.Spec().Rack.Clearance() * g.g.Module()}
			if d := 2*by.a - by.mateTip - 2*by.clearance; d < root {
				root, g.rootBy = d, by
			}
		}
		if math.IsInf(root, 1) {
			continue // no mesh: as deep as the rack
		}
		spec := g.g.Spec()
		spec.Mill.RootDiameter = root
		if err := j.remake(g, spec); err != nil {
			return err
		}
	}
	return nil
}

// mateOf returns the other gear of a mesh.
func (m *mesh) mateOf(g *gear) (*gear, bool) {
	switch g {
	case m.first:
		return m.second, true
	case m.second:
		return m.first, true
	}
	return nil, false
}

// checkMilled refuses a milled root that a mate's tip would touch, and says what
// end mill would do.
func (j *job) checkMilled() error {
	for _, g := range j.gears {
		if g.g.Spec().Mill.Diameter == 0 {
			continue
		}
		for _, m := range j.meshes {
			mate, ok := m.mateOf(g)
			if !ok {
				continue
			}
			overlap := m.touches(g, g.g)
			if overlap <= leastOverlap {
				continue
			}
			return bad("root", g.settings.vals["root"], "an end mill of %s leaves a root that the tip of %s would cut into at the tightest center distance, by up to %s across the space. %s",
				j.length(g.g.Spec().Mill.Diameter), mate.name, j.length(overlap), j.millThatPasses(g))
		}
	}
	return nil
}

// warnShallowRoot says where an end mill is too wide for the root circle, and
// the largest that gets down to it. A mate's tip is judged by checkMilled.
func (j *job) warnShallowRoot(g *gear) {
	spec := g.g.Spec()
	if spec.Mill.Diameter == 0 {
		return
	}
	want := g.g.RootDiameterAt(g.nominal.Thickness())
	root := g.rootLimits().Max // of the thickest tooth, whose space is narrowest
	if root-want > shallow*g.g.Module() {
		most := g.millToDepth(want)
		j.addWarning("shallow-root", g.name, "an end mill of %s rests on the flanks before it reaches the root circle: the root diameter comes out at %s, not %s. The largest that gets down is %s%s",
			j.length(spec.Mill.Diameter), j.length(root), j.length(want), j.lengthDown(most), j.usualMill(most))
	}
}

// shallow is how much higher than wanted a root may be before it is said, × module.
const shallow = 0.01

// millToDepth returns the largest end mill that reaches the root diameter, mm.
func (g *gear) millToDepth(root float64) float64 {
	reaches := func(diameter float64) bool {
		spec := g.g.Spec()
		spec.Mill.Diameter = diameter
		own, err := involute.NewGear(spec)
		if err != nil {
			return false
		}
		t, err := own.Tooth(g.thickness.Limits.Max)
		return err == nil && t.RootDiameter() <= root*(1+1e-12)
	}
	return involute.LargestFitting(reaches, 0, g.g.Spec().Mill.Diameter)
}

// touches returns how far the mate's tips cut into the root of g, made as own,
// in a mesh at its tightest with the thickest teeth, mm; 0 or less where they pass.
func (m *mesh) touches(g *gear, own *involute.Gear) float64 {
	mate, _ := m.mateOf(g)
	thick, err1 := own.Tooth(g.thickness.Limits.Max)
	other, err2 := mate.g.Tooth(mate.thickness.Limits.Max)
	if err1 != nil || err2 != nil {
		return math.Inf(1)
	}
	a, pair := m.plan.Tightest(), involute.Mesh{First: own, Second: mate.g}
	_, clearance := pair.TipClearances(a, thick, other)
	gap, err := pair.FilletClearance(a, thick, other, true)
	if err != nil {
		return math.Inf(1)
	}
	return max(-clearance, -gap)
}

// millThatPasses words the largest end mill whose root no mate touches, and the
// largest usual size under it.
func (j *job) millThatPasses(g *gear) string {
	passes := func(d float64) bool {
		spec := g.g.Spec()
		spec.Mill.Diameter = d
		own, err := involute.NewGear(spec)
		if err != nil {
			return false
		}
		for _, m := range j.meshes {
			if _, ok := m.mateOf(g); ok && m.touches(g, own) > leastOverlap {
				return false
			}
		}
		return true
	}
	least := 0.01 * g.g.Module()
	if !passes(least) {
		return "No end mill would do: its straight root stands in the way. Take root = \"generated\", or give this gear more shift"
	}
	largest := involute.LargestFitting(passes, least, g.g.Spec().Mill.Diameter)
	return fmt.Sprintf("The largest that passes is %s%s", j.lengthDown(largest), j.usualMill(largest))
}

// lengthDown words a length rounded down, so that what it says still passes.
func (r request) lengthDown(mm float64) string {
	return r.display.FormatLimits(inspect.Limits{Min: 0, Max: mm}, r.display.Decimals()).High + " " + r.display.String()
}

// lengthUp words a length rounded up, so that what it says is enough.
func (r request) lengthUp(mm float64) string {
	const far = 1e9
	return r.display.FormatLimits(inspect.Limits{Min: mm, Max: far}, r.display.Decimals()).Low + " " + r.display.String()
}

// usualMill words the largest usual end mill that is no larger than the size, in
// the display's own system.
func (j *job) usualMill(mm float64) string {
	best := refdata.EndMill{}
	for _, m := range refdata.EndMills() {
		if m.Unit == j.display.String() && m.Diameter <= mm && m.Diameter > best.Diameter {
			best = m
		}
	}
	if best.Diameter == 0 {
		return "; the usual sizes are all larger"
	}
	return fmt.Sprintf("; of the usual sizes %s %s", best.Size, best.Unit)
}
