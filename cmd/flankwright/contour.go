package main

import (
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
)

func contourCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("FILE.dxf or FILE.svg; a folder, DIR/, for all gears of the job")...)
	flags = append(flags, contourFlags()...)
	flags = append(flags,
		&cli.StringFlag{Name: "stock", Usage: "the contour this much farther out, for roughing", Category: "Contour"},
		&cli.StringFlag{Name: "format", Usage: "dxf or svg, where -o is a folder (dxf)", Category: "Contour"},
		&cli.BoolFlag{Name: "mesh", Usage: "both gears of a mesh in place, turned until they touch", Category: "Contour", DisableDefaultText: true},
		&cli.BoolFlag{Name: "roll", Usage: "with --mesh and -o FILE.svg: a picture that moves, the pair rolling through one pitch", Category: "Contour", DisableDefaultText: true},
		&cli.StringFlag{Name: "check", Usage: "measure an existing FILE.dxf or FILE.svg instead of writing one", Category: "Contour"})
	return &cli.Command{
		Name: "contour", Usage: "the outline as DXF or SVG, measured again after writing",
		UsageText: "flankwright contour [JOB] -o FILE [flags]\nflankwright contour JOB -o DIR/\nflankwright contour --dp 16 --teeth 20 -o gear.dxf\n" +
			"flankwright contour JOB --mesh -o pair.dxf\nflankwright contour JOB --mesh --roll -o roll.svg\nflankwright contour JOB --gear NAME --check FILE",
		Flags:  flags,
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
	if opt.stock, _, err = flagLength(c, j, "stock"); err != nil {
		return err
	}
	if err := agree(c); err != nil {
		return err
	}
	if c.IsSet("check") {
		return j.runCheck(c, gears, opt)
	}
	out := c.String("output")
	if out == "" || out == "-" {
		return wrong("contour needs a file to write: -o gear.dxf, -o gear.svg, or a folder -o DIR/")
	}
	if opt.format, err = fileFormat(c, out, opt.format); err != nil {
		return err
	}
	if c.Bool("mesh") {
		return j.runMeshContour(c, out, opt)
	}
	return j.runGearContours(c, out, gears, opt)
}

// agree refuses flags that do not go together.
func agree(c *cli.Context) error {
	for _, pair := range []struct{ one, other, why string }{
		{"check", "output", "measures a file that is there; leave -o out"},
		{"roll", "check", "a picture that moves is not measured"},
		{"roll", "stock", "the picture shows the finished teeth; leave --stock out"},
		{"mesh", "stock", "with stock on, the gears do not mesh; leave one of the two out"},
		{"stock", "pins", "pins rest on finished flanks; leave one of the two out"},
	} {
		if c.IsSet(pair.one) && c.IsSet(pair.other) {
			return wrong("--%s: %s", pair.one, pair.why)
		}
	}
	if c.Bool("roll") && !c.Bool("mesh") {
		return wrong("--roll: shows a pair; give --mesh too")
	}
	return nil
}

// fileFormat returns the format of what is written to out: by its ending, or, for a folder, by --format.
func fileFormat(c *cli.Context, out string, dxf export.Format) (export.Format, error) {
	if isFolder(out) {
		return formatByName(c.String("format"), dxf)
	}
	format, err := formatByEnding("-o", out, dxf)
	if f := c.String("format"); err == nil && f != "" && "."+strings.ToLower(f) != format.Ending() {
		err = wrong("-o %s: and --format %s say different things; the ending decides, leave --format out", out, f)
	}
	return format, err
}

// runGearContours writes one gear to a file, or all to a folder.
func (j *job) runGearContours(c *cli.Context, out string, gears []*gear, opt contourOptions) error {
	folder := isFolder(out)
	if !folder && len(gears) > 1 {
		return wrong("-o %s: one file holds one gear, and the job has %s; give --gear NAME, --mesh for a pair, or a folder -o DIR/", out, quoted(j.gearNames()))
	}
	drawn, files, err := j.draw(gears, opt)
	if err != nil {
		return err
	}
	meshes, err := j.rollDrawn(drawn, opt)
	if err != nil {
		return err
	}
	names, err := writeDrawings(c, out, files)
	if err != nil {
		return err
	}
	for i := range drawn {
		drawn[i].File = names[i]
	}
	return j.showContours(c, gears, drawn, meshes)
}

// writeDrawings writes drawings into the folder out, or the only one to the file
// out, and returns what they are called there.
func writeDrawings(c *cli.Context, out string, files []export.File) (names []string, err error) {
	if !isFolder(out) {
		return []string{out}, writeFile(c, out, files[0].Data)
	}
	for _, f := range files {
		names = append(names, filepath.ToSlash(filepath.Join(out, f.Name)))
	}
	return names, fileError(out, export.WriteFolder(out, files, c.Bool("force")))
}

// showContours prints what was drawn and measured.
func (j *job) showContours(c *cli.Context, gears []*gear, drawn []drawnGear, meshes []rolledMesh) error {
	r := &contours{job: j, gears: drawn, Meshes: meshes, Warnings: j.about(gears)}
	for _, d := range drawn {
		r.Gears.add(d.name, d)
	}
	if c.Bool("explain") {
		r.Explain = explainContours(drawn)
	}
	return emitBeside(c, r, func() []byte { return r.text(newPage(c.App.Writer), j.digits(c)) })
}
