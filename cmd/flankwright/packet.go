package main

import (
	"path/filepath"

	"github.com/urfave/cli/v2"

	"flankwright/export"
)

func packetCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("folder to write into; made if missing")...)
	flags = append(flags, targetFlags()...)
	flags = append(flags, contourFlags()...)
	flags = append(flags, sheetFlags()...)
	return &cli.Command{
		Name: "packet", Usage: "everything for a job, into one folder (-o DIR)",
		UsageText: "flankwright packet [JOB] -o DIR [flags]", Flags: flags,
		Action: runPacket,
	}
}

// runPacket writes contours, sheet, dimensions and targets, all or nothing.
func runPacket(c *cli.Context) error {
	j, gears, err := loadJob(c)
	if err != nil {
		return err
	}
	dir := c.String("output")
	if dir == "" || dir == "-" {
		return wrong("packet needs a folder to write into: -o DIR")
	}
	a, err := readAsk(c, j, gears)
	if err != nil {
		return err
	}
	t := newTargets(j, gears, a)
	files, drawn, err := j.packetFiles(c, t)
	if err != nil {
		return err
	}
	n := len(drawn.gears)
	if err := fileError(dir, export.WriteFolder(dir, files, c.Bool("force"))); err != nil {
		return err
	}
	r := packetResult{}
	for _, f := range files {
		r.Files = append(r.Files, filepath.ToSlash(filepath.Join(dir, f.Name)))
	}
	r.contours = drawn.in(r.Files[:n])
	err = emitBeside(c, r, func() []byte {
		p := newPage(c.App.Writer)
		for _, name := range r.Files[n:] {
			p.line("%s", name)
		}
		p.b.Write(r.text(newPage(c.App.Writer), j.digits(c)))
		return []byte(p.b.String())
	})
	if err != nil {
		return err
	}
	return pinVerdict(c, t)
}

// packetResult is what the command says, as JSON writes it.
type packetResult struct {
	Files []string `json:"files"`
	contours
}

// in returns the contours as they are named where they are written.
func (r contours) in(files []string) contours {
	gears := append([]drawnGear(nil), r.gears...)
	r.gears, r.Gears = gears, ordered{}
	for i := range gears {
		gears[i].File = files[i]
		r.Gears.add(gears[i].name, gears[i])
	}
	return r
}

// A packetPart is a result that goes into a packet as text and as JSON.
type packetPart struct {
	name   string
	result any
	text   func() []byte
}

// packetFiles makes every file of a packet in memory; the contours come first.
func (j *job) packetFiles(c *cli.Context, t *targets) ([]export.File, *contours, error) {
	opt, err := readContourOptions(c, j)
	if err != nil {
		return nil, nil, err
	}
	gears, files, err := j.draw(t.list, opt)
	if err != nil {
		return nil, nil, err
	}
	drawn := &contours{job: j, gears: gears}
	if drawn.Meshes, err = j.rollDrawn(gears, opt); err != nil {
		return nil, nil, err
	}
	drawn.Warnings = j.about(t.list)
	var names []string
	for _, f := range files {
		names = append(names, f.Name)
	}
	measured := drawn.in(names)
	t.Warnings = j.about(t.list) // the drawing may have added some
	pages, err := t.sheetPages(c)
	if err != nil {
		return nil, nil, err
	}
	sheet, err := sheetBytes(j, pages, ".pdf")
	if err != nil {
		return nil, nil, err
	}
	files = append(files, export.File{Name: "sheet.pdf", Data: sheet})
	d := newDims(j, t.list, 0)
	if c.Bool("explain") {
		d.Explain, t.Explain = j.explainDims(t.list), j.explainTargets(t)
	}
	digits := j.digits(c)
	results := []packetPart{
		{"dims", d, func() []byte { return d.text(&page{}, digits) }},
		{"targets", t, func() []byte { return t.text(&page{}, digits) }},
		{"contour", measured, func() []byte { return measured.text(&page{}, digits) }},
	}
	if len(j.meshes) > 0 {
		b, err := newBacklash(j, t.list, backlashOptions{pairs: usualPairs, seed: usualSeed, explain: c.Bool("explain"), ask: t.ask})
		if err != nil {
			return nil, nil, err
		}
		results = append(results, packetPart{"backlash", b, func() []byte { return b.text(&page{}, digits) }})
	}
	for _, r := range results {
		data, err := jsonText(r.result)
		if err != nil {
			return nil, nil, err
		}
		files = append(files, export.File{Name: r.name + ".txt", Data: r.text()}, export.File{Name: r.name + ".json", Data: data})
	}
	return files, drawn, nil
}
