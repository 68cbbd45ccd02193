package main

import "math"

// readOpenings reads what is inside the teeth: bore, keyway, bolt circle and hub.
func (j *job) readOpenings(g *gear) error {
	if err := j.readKeyway(g); err != nil {
		return err
	}
	if err := j.readBolts(g); err != nil {
		return err
	}
	var err error
	g.hub, _, err = g.settings.positive("hub")
	return err
}

// checkOpenings refuses what does not fit under the root circle, or cuts into each other.
func (j *job) checkOpenings(g *gear) error {
	root := g.rootLimits().Min
	if g.bore != nil && g.bore.limits.Max >= root {
		return bad("bore", g.settings.vals["bore"], "of %s reaches the root circle, %s; it must be smaller", j.length(g.bore.nominal), j.length(root))
	}
	if k := g.keyway; k != nil && 2*k.reach() >= root {
		return bad("keyway", g.settings.vals["keyway"], "has corners %s from the axis, past the root circle's radius %s", j.length(k.reach()), j.length(root/2))
	}
	if b := g.bolts; b != nil {
		for _, gap := range b.gaps(j, g, root) {
			if gap.metal <= 0 {
				return bad("bolt_circle", g.settings.vals["bolt_circle"], "of %s with holes of %s leaves no metal: they run %s into %s; take %s or smaller holes",
					j.length(b.diameter), j.length(b.hole), j.length(-gap.metal), gap.to, gap.cure)
			}
		}
	}
	return j.checkHub(g)
}

func (j *job) checkHub(g *gear) error {
	if g.hub == 0 {
		return nil
	}
	v := g.settings.vals["hub"]
	if g.hub >= g.g.TipDiameter() {
		return bad("hub", v, "of %s is no smaller than the gear's outside, %s; a hub stands inside the teeth", j.length(g.hub), j.length(g.g.TipDiameter()))
	}
	if g.bore == nil {
		return nil
	}
	if g.hub <= g.bore.limits.Max {
		return bad("hub", v, "of %s is no larger than the bore, %s", j.length(g.hub), j.length(g.bore.limits.Max))
	}
	if k := g.keyway; k != nil && g.hub <= 2*k.reach() {
		return bad("hub", v, "of %s is cut open by the keyway, whose corners lie on a diameter of %s; take a larger hub", j.length(g.hub), j.length(2*k.reach()))
	}
	return nil
}

// How much metal should be left, by common practice.
const (
	leastHub  = 1.5 // × bore: outside diameter of a steel hub; 1.5 to 2 is usual
	holeMetal = 0.5 // × hole: metal from a hole to the next edge; a center one hole diameter from the edge
)

// warnOpenings says where little metal is left between bore, keyway, holes, hub and root.
func (j *job) warnOpenings(g *gear) {
	root := g.rootLimits().Min
	rim := thinRim * (g.g.TipDiameter() - root) / 2
	least, where := math.Inf(1), ""
	closer := func(metal float64, to string) {
		if metal < least {
			least, where = metal, to
		}
	}
	if g.keyway != nil {
		closer(root/2-g.keyway.reach(), "keyway")
	} else if g.bore != nil {
		closer((root-g.bore.limits.Max)/2, "bore")
	}
	if b := g.bolts; b != nil {
		closer((root-b.diameter-b.hole)/2, "the holes")
	}
	if least < rim {
		j.addWarning("thin-rim", g.name, "only %s of metal is left between root and %s, under %.1f whole depths; the rim bends under load", j.length(least), where, thinRim)
	}
	if g.bolts != nil {
		j.warnHoles(g, root, rim)
	}
	if g.hub > 0 {
		j.warnHub(g, root)
	}
}

// warnHoles names the thinnest place beside the holes; a rim thinner than it
// should be has been said.
func (j *job) warnHoles(g *gear, root, rim float64) {
	b := g.bolts
	thin := gap{metal: math.Inf(1)}
	for i, gap := range b.gaps(j, g, root) {
		if said := i == 0 && gap.metal < rim; gap.metal < thin.metal && !said {
			thin = gap
		}
	}
	if thin.metal < holeMetal*b.hole {
		j.addWarning("thin-holes", g.name, "only %s of metal is left between a hole of the bolt circle and %s; common practice is a hole's radius, %s, or more. Take %s or smaller holes",
			j.length(thin.metal), thin.to, j.length(holeMetal*b.hole), thin.cure)
	}
	if g.hub > 0 && math.Abs(g.hub-b.diameter) < b.hole {
		j.addWarning("hub-holes", g.name, "the holes of the bolt circle, %s to %s, run through the side of the hub, %s; on that side no bolt head or nut finds a flat", j.length(b.diameter-b.hole), j.length(b.diameter+b.hole), j.length(g.hub))
	}
}

// warnHub judges a hub: its own wall, and the way of the cutter.
func (j *job) warnHub(g *gear, root float64) {
	if g.hub >= root {
		j.addWarning("hub-high", g.name, "the hub, %s, is no lower than the root circle, %s: a cutter that runs out on that side cuts into it. Cut from the other side with room to run out, or take a smaller hub", j.length(g.hub), j.length(root))
	}
	if g.bore == nil {
		return
	}
	metal, where, need := (g.hub-g.bore.limits.Max)/2, "bore", (leastHub-1)/2*g.bore.limits.Max
	if k := g.keyway; k != nil && metal >= need {
		metal, where, need = g.hub/2-k.reach(), "keyway", k.depth
	}
	if metal < need {
		j.addWarning("thin-hub", g.name, "only %s of metal is left between the %s and the outside of the hub; common practice is %s or more (a hub of %.1f × bore, and over a keyway as much as it is deep)", j.length(metal), where, j.length(need), leastHub)
	}
}
