package main

import (
	"bytes"
	"errors"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
	"flankwright/inspect"
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
		opt.format, err = formatByName(c.String("format"), opt.r12)
	} else {
		opt.format, err = formatByEnding(out, opt.r12)
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
	if err := writeDrawn(c, out, folder, files); err != nil {
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

// isFolder reports whether an output names a folder: it ends in a slash, or is one.
func isFolder(path string) bool {
	if strings.HasSuffix(path, "/") || strings.HasSuffix(path, string(filepath.Separator)) {
		return true
	}
	info, err := os.Stat(path)
	return err == nil && info.IsDir()
}

func formatByEnding(path string, r12 bool) (export.Format, error) {
	ending := strings.TrimPrefix(strings.ToLower(filepath.Ext(path)), ".")
	if ending == "" {
		return 0, wrong("-o %s: the ending decides the format; write .dxf or .svg", path)
	}
	f, err := formatByName(ending, r12)
	if err != nil {
		return f, wrong("-o %s: a contour is written as .dxf or .svg, not .%s", path, ending)
	}
	return f, nil
}

func formatByName(name string, r12 bool) (export.Format, error) {
	switch strings.ToLower(name) {
	case "", "dxf":
		if r12 {
			return export.FormatDXFR12, nil
		}
		return export.FormatDXF, nil
	case "svg":
		return export.FormatSVG, nil
	}
	return 0, wrong("--format: %q is not a format; write dxf or svg", name)
}

type contourOptions struct {
	tolerance float64 // mm
	r12       bool
	format    export.Format
}

func readContourOptions(c *cli.Context, j *job) (contourOptions, error) {
	o := contourOptions{tolerance: defaultTolerance}
	if v, ok := flagValue(c, "tolerance"); ok {
		mm, _, err := settings{vals: map[string]value{"t": v}, flagUnit: j.display}.positive("t")
		if err != nil {
			return o, err
		}
		if mm < leastTolerance || mm > 1 {
			return o, wrong("--tolerance: %g mm is out of range; take %g to 1 mm", mm, leastTolerance)
		}
		o.tolerance = mm
	}
	v, err := export.ParseDXFVersion(orDefault(c.String("dxf-version"), "r2000"))
	if err != nil {
		return o, wrong("--dxf-version: %v", err)
	}
	o.r12 = v == export.R12
	return o, nil
}

// leastTolerance keeps the count of arcs sensible; nothing is cut to a tenth of a micrometer.
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

// asWritten is what the file measures, and what it should.
type asWritten struct {
	Pin        float64 `json:"pin_diameter_mm"`
	OverPins   float64 `json:"over_pins_mm"`
	Target     float64 `json:"target_mm"`
	Difference float64 `json:"difference_mm"`
	Limits     span    `json:"limits_mm"`
	Within     bool    `json:"within_limits"`
	Teeth      int     `json:"teeth_counted"`
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
	d.AsWritten, err = j.measureBack(g, tooth, data, o)
	return d, data, err
}

// contourSpec says what to draw of a gear. The bore is drawn at the middle of its limits.
func (g *gear) contourSpec(j *job, tooth involute.Tooth, tolerance float64) export.ContourSpec {
	title, _, _ := j.top.word("title")
	s := export.ContourSpec{Tooth: tooth, Tolerance: tolerance, Unit: j.display, Title: strings.TrimPrefix(title+", "+g.name, ", ")}
	if g.bore != nil {
		s.Bore = g.bore.limits.Middle()
	}
	if g.keyway != nil {
		s.KeyWidth, s.KeyDepth = g.keyway.width, g.keyway.depth
	}
	return s
}

// checkPin returns a pin to measure a contour with: the first usable choice, or the ideal one.
func (j *job) checkPin(g *gear) (float64, bool) {
	for _, p := range j.choosePins(g) {
		if _, err := g.middle().Seat(p.Diameter); err == nil {
			return p.Diameter, true
		}
	}
	return 0, false
}

// measureBack reads a file's bytes as anybody would, measures the contour over
// pins, and refuses a file that does not measure as it should: each flank may
// be off by the tolerance, which moves a pin's center by it over sin α_K.
func (j *job) measureBack(g *gear, tooth involute.Tooth, data []byte, o contourOptions) (*asWritten, error) {
	back, err := o.format.Decode(data)
	if err != nil {
		return nil, cannot("gear %s: the file written cannot be read back: %v", g.name, err)
	}
	path, err := back.Cut()
	if err != nil {
		return nil, cannot("gear %s: the file written holds no contour: %v", g.name, err)
	}
	lead, _ := g.g.Lead()
	section, err := export.NewSection(path, lead)
	if err != nil || section.Teeth() != g.g.Teeth() {
		return nil, cannot("gear %s: the contour written has %d teeth, not %d (%v)", g.name, section.Teeth(), g.g.Teeth(), err)
	}
	pin, ok := j.checkPin(g)
	if !ok {
		return nil, nil
	}
	m := inspect.OverPins{Pin: pin}
	target, err := m.Of(tooth)
	if err != nil {
		return nil, nil
	}
	least, most, err := section.OverPins(pin)
	if err != nil {
		return nil, nil // a pin that rests on the root first measures no flanks
	}
	w := &asWritten{Pin: pin, Target: target, OverPins: least, Teeth: section.Teeth()}
	if math.Abs(most-target) > math.Abs(least-target) {
		w.OverPins = most
	}
	w.Difference = w.OverPins - target
	limits := inspect.NewTarget(g.g, m, g.thickness.Limits, inspect.Part{})
	w.Limits = toSpan(limits.Value)
	w.Within = w.OverPins >= w.Limits.Min && w.OverPins <= w.Limits.Max
	if g.thickness.By != inspect.ByNothing && limits.Value.Width() > 0 && math.Abs(w.Difference) > mostDrift*limits.Value.Width() {
		j.addWarning("coarse-contour", g.name, "the arcs alone take %s of the %s between the limits over pins; draw it finer with --tolerance %.4gmm",
			j.length(math.Abs(w.Difference)), j.length(limits.Value.Width()), o.tolerance/4)
	}
	seat, err := tooth.Seat(pin)
	_, byPin := g.g.PinSensitivity(involute.TwoPins, seat)
	if usable := len(m.Faults(tooth, inspect.Part{})) == 0; err == nil && usable && math.Abs(w.Difference) > 2*o.tolerance*byPin+closeEnough {
		return nil, cannot("gear %s: the contour written measures %s over pins, not %s; it is not delivered", g.name, j.length(w.OverPins), j.length(target))
	}
	return w, nil
}

// mostDrift is the share of the tolerance over pins that a drawing may use up
// before it is said: a quarter leaves the machine most of it.
const mostDrift = 0.25

// closeEnough is what the search for a pin's seat on a contour may be off by, mm.
const closeEnough = 1e-6

// writeDrawn writes contour files, all or none, and reads them once more to see that the disk has them.
func writeDrawn(c *cli.Context, out string, folder bool, files []export.File) error {
	if folder {
		if err := fileError(out, export.WriteFolder(out, files, c.Bool("force"))); err != nil {
			return err
		}
	} else if err := writeFile(c, out, files[0].Data); err != nil {
		return err
	}
	for _, f := range files {
		path := out
		if folder {
			path = filepath.Join(out, f.Name)
		}
		data, err := os.ReadFile(path)
		if err != nil || !bytes.Equal(data, f.Data) {
			return cannot("%s: the disk gives back other bytes than were written (%v)", path, err)
		}
	}
	return nil
}

// fileError words an error of writing a file or into a folder.
func fileError(path string, err error) error {
	if err == nil {
		return nil
	}
	var exists *export.ExistError
	var p *os.PathError
	switch {
	case errors.As(err, &exists):
		return cannot("%v; --force overwrites", exists)
	case errors.Is(err, fs.ErrNotExist):
		return cannot("%s: there is no such folder; make it first", path)
	case errors.As(err, &p):
		return cannot("%s: %v", path, p.Err)
	}
	return cannot("%s: %v", path, err)
}
