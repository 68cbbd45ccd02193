package main

import (
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
	"flankwright/involute"
)

// defaultTolerance is how far the arcs may leave the exact curves, mm: well
// under what a mill holds. Teeth under module 1 get less, as they are smaller.
const defaultTolerance = 0.0025

// usualTolerance returns the tolerance for the smallest of the job's gears.
func (j *job) usualTolerance() float64 {
	t := defaultTolerance
	for _, g := range j.gears {
		t = min(t, defaultTolerance*g.g.Module())
	}
	return max(t, leastTolerance)
}

// leastTolerance keeps the count of arcs sensible; nothing is cut to a hundredth of a micrometer.
const leastTolerance = 1e-5

// contourFlags are what contour and packet share.
func contourFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "tolerance", Usage: "how far the arcs may leave the exact curve, ± (0.0025mm, less under module 1)", Category: "Contour"},
		&cli.StringFlag{Name: "tolerance-side", Usage: "both; outside, to leave metal only; inside, to leave none (both)", Category: "Contour"},
		&cli.StringFlag{Name: "as", Usage: "arcs, or lines for readers without arcs (arcs)", Category: "Contour"},
		&cli.StringFlag{Name: "min-arc", Usage: "no arc shorter than this, as far as the tolerance allows", Category: "Contour"},
		&cli.StringFlag{Name: "max-sweep", Usage: "no arc turns by more than this, degrees (90)", Category: "Contour"},
		&cli.BoolFlag{Name: "pins", Usage: "draw the measuring pins where they rest", Category: "Contour", DisableDefaultText: true},
		&cli.StringFlag{Name: "dxf-version", Usage: "r2000, or r12 for old controls (r2000)", Category: "Contour"},
	}
}

type contourOptions struct {
	fit    export.FitOptions
	stock  float64 // left on all round for roughing, mm
	pins   bool
	format export.Format
}

// readContourOptions reads the flags that contour and packet share. The format is
// a DXF, of the version asked for.
func readContourOptions(c *cli.Context, j *job) (contourOptions, error) {
	o := contourOptions{fit: export.FitOptions{Tolerance: j.usualTolerance()}, pins: c.Bool("pins")}
	if mm, ok, err := flagLength(c, j, "tolerance"); err != nil {
		return o, err
	} else if ok {
		if mm < leastTolerance || mm > 1 {
			return o, wrong("--tolerance: %g mm is out of range; take %g to 1 mm", mm, leastTolerance)
		}
		o.fit.Tolerance = mm
	}
	var err error
	if o.fit.MinArc, _, err = flagLength(c, j, "min-arc"); err != nil {
		return o, err
	}
	if err := o.readSweep(c); err != nil {
		return o, err
	}
	if err := o.readWords(c); err != nil {
		return o, err
	}
	if o.format, err = export.ParseDXFVersion(orDefault(c.String("dxf-version"), "r2000")); err != nil {
		return o, wrong("--dxf-version: %v", err)
	}
	return o, nil
}

// readSweep reads how far one arc may turn.
func (o *contourOptions) readSweep(c *cli.Context) error {
	v, ok := flagValue(c, "max-sweep")
	if !ok {
		return nil
	}
	deg, _, err := settings{vals: map[string]value{"max-sweep": v}}.angle("max-sweep")
	if err != nil {
		return err
	}
	if least := export.LeastSweep / involute.Degree; !(deg >= least && deg <= 90) {
		return wrong("--max-sweep: %v° is out of range; take %g° to 90°", deg, least)
	}
	o.fit.MaxSweep = deg * involute.Degree
	return nil
}

// readWords reads the side of the tolerance and what the contour is made of.
func (o *contourOptions) readWords(c *cli.Context) error {
	switch side := strings.ToLower(c.String("tolerance-side")); side {
	case "", "both":
	case "outside":
		o.fit.Side = export.Outside
	case "inside":
		o.fit.Side = export.Inside
	default:
		return wrong("--tolerance-side: %q is not a side; write both, outside (leaves metal only) or inside (leaves none)", side)
	}
	switch as := strings.ToLower(c.String("as")); as {
	case "", "arcs":
	case "lines":
		o.fit.Lines = true
		for _, name := range []string{"min-arc", "max-sweep"} {
			if c.IsSet(name) {
				return wrong("--%s: is about arcs, and --as lines asks for none", name)
			}
		}
	default:
		return wrong("--as: %q is nothing a contour is made of; write arcs or lines", as)
	}
	return nil
}

func orDefault(s, d string) string {
	if s == "" {
		return d
	}
	return s
}

// formatByEnding returns the format that a file name asks for: SVG, or the DXF given.
func formatByEnding(flag, path string, dxf export.Format) (export.Format, error) {
	dot := strings.LastIndexByte(path, '.')
	if dot < 0 || strings.ContainsAny(path[dot:], `/\`) || dot == len(path)-1 {
		return 0, wrong("%s %s: the ending decides the format; write .dxf or .svg", flag, path)
	}
	f, err := formatByName(path[dot+1:], dxf)
	if err != nil {
		return f, wrong("%s %s: a contour is written as .dxf or .svg, not %s", flag, path, path[dot:])
	}
	return f, nil
}

// formatByName returns SVG, or the DXF given, which is also what no name means.
func formatByName(name string, dxf export.Format) (export.Format, error) {
	switch strings.ToLower(name) {
	case "", "dxf":
		return dxf, nil
	case "svg":
		return export.FormatSVG, nil
	}
	return 0, wrong("--format: %q is not a format; write dxf or svg", name)
}
