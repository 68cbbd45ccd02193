package main

import (
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
	"flankwright/involute"
)

// defaultTolerance is how far the arcs may leave the exact curves, mm: well
// under what a mill holds.
const defaultTolerance = 0.0025

func contourFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "tolerance", Usage: "how far the arcs may leave the exact curve, ± (0.0025mm)", Category: "Contour"},
		&cli.StringFlag{Name: "dxf-version", Usage: "r2000, or r12 for old controls (r2000)", Category: "Contour"},
	}
}

func contourCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("FILE.dxf or FILE.svg; a folder, DIR/, for all gears of the job")...)
	flags = append(flags, contourFlags()...)
	flags = append(flags, &cli.StringFlag{Name: "format", Usage: "dxf or svg, where -o is a folder (dxf)", Category: "Contour"})
	return &cli.Command{
		Name: "contour", Usage: "the outline as DXF or SVG, measured again after writing",
		UsageText: "flankwright contour [JOB] -o FILE [flags]\nflankwright contour JOB -o DIR/\nflankwright contour --dp 16 --teeth 20 -o gear.dxf", Flags: flags,
		Action: runContour,
	}
}

func runContour(c *cli.Context) error {
	j, gears, err := loadJob(c)
	if err != nil {
		return err
	}
	opt, err := readContourOptions(c, j)
	if err != nil {
		return err
	}
	out := c.String("output")
	if out == "" || out == "-" {
		return wrong("contour needs a file to write: -o gear.dxf, -o gear.svg, or a folder -o DIR/")
	}
	folder := isFolder(out)
	if folder {
		opt.format, err = formatByName(c.String("format"), opt.format)
	} else {
		opt.format, err = formatByEnding(out, opt.format)
		if f := c.String("format"); err == nil && f != "" && "."+strings.ToLower(f) != opt.format.Ending() {
			err = wrong("-o %s: and --format %s say different things; the ending decides, leave --format out", out, f)
		}
	}
	if err != nil {
		return err
	}
	if !folder && len(gears) > 1 {
		return wrong("-o %s: one file holds one gear, and the job has %s; give --gear NAME, or a folder -o DIR/", out, quoted(j.gearNames()))
	}
	drawn, files, err := j.draw(gears, opt)
	if err != nil {
		return err
	}
	if folder {
		err = fileError(out, export.WriteFolder(out, files, c.Bool("force")))
	} else {
		err = writeFile(c, out, files[0].Data)
	}
	if err != nil {
		return err
	}
	r := &contours{job: j, gears: drawn, Warnings: j.about(gears)}
	for i := range drawn {
		drawn[i].File = out
		if folder {
			drawn[i].File = filepath.ToSlash(filepath.Join(out, files[i].Name))
		}
		r.Gears.add(drawn[i].name, drawn[i])
	}
	if c.Bool("explain") {
		r.Explain = explainContours(drawn)
	}
	return emitBeside(c, r, func() []byte { return r.text(newPage(c.App.Writer), j.digits(c)) })
}

// formatByEnding returns the format that a file name asks for: SVG, or the DXF given.
func formatByEnding(path string, dxf export.Format) (export.Format, error) {
	ending := strings.TrimPrefix(strings.ToLower(filepath.Ext(path)), ".")
	if ending == "" {
		return 0, wrong("-o %s: the ending decides the format; write .dxf or .svg", path)
	}
	f, err := formatByName(ending, dxf)
	if err != nil {
		return f, wrong("-o %s: a contour is written as .dxf or .svg, not .%s", path, ending)
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

type contourOptions struct {
	tolerance float64 // mm
	format    export.Format
}

// readContourOptions reads the flags that contour and packet share. The format is
// a DXF, of the version asked for.
func readContourOptions(c *cli.Context, j *job) (contourOptions, error) {
	o := contourOptions{tolerance: defaultTolerance}
	if mm, ok, err := flagLength(c, j, "tolerance"); err != nil {
		return o, err
	} else if ok {
		if mm < leastTolerance || mm > 1 {
			return o, wrong("--tolerance: %g mm is out of range; take %g to 1 mm", mm, leastTolerance)
		}
		o.tolerance = mm
	}
	var err error
	if o.format, err = export.ParseDXFVersion(orDefault(c.String("dxf-version"), "r2000")); err != nil {
		return o, wrong("--dxf-version: %v", err)
	}
	return o, nil
}

// leastTolerance keeps the count of arcs sensible; nothing is cut to a hundredth of a micrometer.
const leastTolerance = 1e-5

func orDefault(s, d string) string {
	if s == "" {
		return d
	}
	return s
}

// A drawnGear is a contour with what was found on reading it back.
type drawnGear struct {
	File         string     `json:"file"`
	Segments     int        `json:"segments"`
	Arcs         int        `json:"arcs"`
	Lines        int        `json:"lines"`
	MaxDeviation float64    `json:"max_deviation_mm"`
	Tolerance    float64    `json:"tolerance_mm"`
	TangentBreak float64    `json:"max_tangent_break_deg"`
	ShortestArc  float64    `json:"shortest_arc_mm"`
	Radius       span       `json:"radius_mm"`
	LinesNeeded  int        `json:"lines_for_the_same_tolerance"`
	Thickness    float64    `json:"tooth_thickness_mm"`
	Section      string     `json:"section"`
	AsWritten    *asWritten `json:"as_written"`

	name  string
	kind  string
	tooth involute.Tooth
}

// asWritten is what the file measures, and what it should. Over pins it is null
// where no pin rests on the flanks, within the limits where there are none.
type asWritten struct {
	Pin        *float64 `json:"pin_diameter_mm"`
	OverPins   *float64 `json:"over_pins_mm"`
	Target     *float64 `json:"target_mm"`
	Difference *float64 `json:"difference_mm"`
	Limits     *span    `json:"limits_mm"`
	Within     *bool    `json:"within_limits"`
	Teeth      int      `json:"teeth_counted"`
	Shape      float64  `json:"shape_deviation_mm"`
}

func (w *asWritten) measured(pin, over, target float64) {
	diff := over - target
	w.Pin, w.OverPins, w.Target, w.Difference = &pin, &over, &target, &diff
}

// draw makes the contour files of gears: drawn at the middle of the thickness
// limits, encoded, read back and measured.
func (j *job) draw(gears []*gear, o contourOptions) ([]drawnGear, []export.File, error) {
	var drawn []drawnGear
	var files []export.File
	for _, g := range gears {
		d, data, err := j.drawOne(g, o)
		if err != nil {
			return nil, nil, err
		}
		drawn = append(drawn, d)
		files = append(files, export.File{Name: g.name + o.format.Ending(), Data: data})
	}
	return drawn, files, nil
}

func (j *job) drawOne(g *gear, o contourOptions) (drawnGear, []byte, error) {
	tooth := g.middle()
	outline, report, err := export.NewContour(g.contourSpec(j, tooth, o.tolerance))
	if err != nil {
		return drawnGear{}, nil, wrong("gear %s cannot be drawn within %g mm: %v", g.name, o.tolerance, err)
	}
	data, err := o.format.Encode(outline)
	if err != nil {
		return drawnGear{}, nil, cannot("gear %s: %v", g.name, err)
	}
	d := drawnGear{
		Segments: report.Segments, Arcs: report.Arcs, Lines: report.Lines,
		MaxDeviation: report.MaxDeviation, Tolerance: o.tolerance, TangentBreak: report.MaxTangentBreakDeg,
		ShortestArc: report.ShortestArc, Radius: span{report.MinRadius, report.MaxRadius}, LinesNeeded: report.LinesNeeded,
		Thickness: tooth.Thickness(), Section: "full", name: g.name, kind: "pins", tooth: tooth,
	}
	if g.g.Helical() {
		d.Section, d.kind = "transverse", "balls"
	}
	d.AsWritten, err = j.measureBack(g, tooth, data, o, report.MaxDeviation)
	return d, data, err
}

// contourSpec says what to draw of a gear. The bore is drawn at the middle of its limits,
// a keyway at its nominal size.
func (g *gear) contourSpec(j *job, tooth involute.Tooth, tolerance float64) export.ContourSpec {
	title, _, _ := j.top.word("title")
	s := export.ContourSpec{Tooth: tooth, Tolerance: tolerance, Unit: j.display, Title: strings.TrimPrefix(title+", "+g.name, ", ")}
	s.Bolts, s.Hub = g.bolts.layout(), g.hub
	if g.bore != nil {
		s.Bore = g.bore.limits.Middle()
	}
	if g.keyway != nil {
		s.KeyWidth, s.KeyDepth = g.keyway.width, g.keyway.drawn
	}
	return s
}
