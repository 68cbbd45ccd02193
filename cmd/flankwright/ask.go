package main

import (
	"math"

	"github.com/urfave/cli/v2"

	"flankwright/inspect"
)

func targetFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringSliceFlag{Name: "pin", Usage: "pin or ball to measure with; may be given again", Category: "Measuring"},
		&cli.IntSliceFlag{Name: "span-teeth", Usage: "number of teeth to measure over; may be given again", Category: "Measuring"},
		&cli.StringFlag{Name: "arbor", Usage: "diameter of the arbor to measure to (the bore)", Category: "Measuring"},
	}
}

// An ask is what the user wants measured with; nil lists mean choose.
type ask struct {
	pins  []float64 // mm
	teeth []int
	arbor float64 // mm, 0 for the bore
	shop  *shop   // what is on hand; nil where it is not known
}

func readAsk(c *cli.Context, j *job, gears []*gear) (ask, error) {
	var a ask
	for _, text := range c.StringSlice("pin") {
		d, err := inspect.ParseLength(text, j.display)
		if err != nil {
			return a, wrong("--pin: %v", err)
		}
		if d <= 0 {
			return a, wrong("--pin: needs a diameter above 0, not %s", j.length(d))
		}
		a.pins = append(a.pins, d)
	}
	for _, k := range c.IntSlice("span-teeth") {
		if k < 1 || k > maxTeeth {
			return a, wrong("--span-teeth: needs 1 tooth or more, not %d", k)
		}
		a.teeth = append(a.teeth, k)
	}
	var err error
	if a.arbor, _, err = flagLength(c, j, "arbor"); err != nil {
		return a, err
	}
	if a.shop, err = loadShop(c); err != nil {
		return a, err
	}
	return a, j.checkArbor(a, gears)
}

// checkArbor refuses an arbor that does not go through the gears.
func (j *job) checkArbor(a ask, gears []*gear) error {
	for _, g := range gears {
		if root := g.rootLimits().Min; a.arbor >= root {
			return wrong("--arbor: %s does not go into %s, whose root diameter is %s", j.length(a.arbor), called(g), j.length(root))
		}
	}
	return nil
}

// readBlank takes a measured outside diameter, which is about one gear: from
// then on it is that gear's outside diameter.
func (j *job) readBlank(c *cli.Context, gears []*gear) error {
	tip, ok, err := flagLength(c, j, "measured-tip")
	if err != nil || !ok {
		return err
	}
	if len(gears) > 1 {
		return wrong("--measured-tip: is about one gear, and the job has %s; say which by --gear", quoted(j.gearNames()))
	}
	g := gears[0]
	if off := math.Abs(tip - g.g.TipDiameter()); off > g.g.Module() || tip <= g.nominal.FormDiameter() {
		return wrong("--measured-tip: %s is not this gear's blank, which is %s across", j.length(tip), j.length(g.g.TipDiameter()))
	}
	g.measured, g.drawnTip = true, g.g.TipDiameter()
	if err := j.retip(g, tip); err != nil {
		return err
	}
	if j.problem != nil {
		return nil // there are no thickness limits to go on with
	}
	if err := j.finishGear(g); err != nil {
		return err
	}
	j.warnings = j.warnings[:j.early]
	j.warn()
	return nil
}
