package main

import (
	"bytes"
	"fmt"
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
	"flankwright/inspect"
)

func sheetFlags() []cli.Flag {
	var flags []cli.Flag
	for _, k := range keys() {
		if k.where&atTop != 0 && k.usage != "" {
			flags = append(flags, keyFlag(flagName(k.name), k.usage, catHead, k))
		}
	}
	return append(flags,
		&cli.StringFlag{Name: "page", Usage: "a4 or letter (letter for inch jobs)", Category: catHead},
		&cli.StringFlag{Name: "date", Usage: "date to print; otherwise a blank to fill in", Category: catHead})
}

func sheetCommand() *cli.Command {
	flags := append(jobFlags(), commonFlags()...)
	flags = append(flags, fileFlags("FILE.pdf, a page a gear; FILE.svg or .png for one gear; a folder, DIR/, for an SVG of every gear")...)
	flags = append(flags, targetFlags()...)
	flags = append(flags, sheetFlags()...)
	return &cli.Command{
		Name: "sheet", Usage: "the inspection sheet, PDF, SVG or PNG, at true scale",
		UsageText: "flankwright sheet [JOB] -o FILE.pdf [flags]", Flags: flags,
		Action: runSheet,
	}
}

func runSheet(c *cli.Context) error {
	j, gears, err := loadJob(c)
	if err != nil {
		return err
	}
	a, err := readAsk(c, j, gears)
	if err != nil {
		return err
	}
	out := c.String("output")
	ending := strings.ToLower(filepath.Ext(out))
	folder := out != "" && isFolder(out)
	switch {
	case out == "" || out == "-":
		return wrong("sheet needs a file to write: -o sheet.pdf, or -o sheet.svg for one gear")
	case folder, ending == ".pdf":
	case ending != ".svg" && ending != ".png":
		return wrong("-o %s: a sheet is written as .pdf, .svg or .png", out)
	case len(gears) > 1:
		return wrong("-o %s: a picture holds one page, and the job has %s; give --gear NAME, a folder -o DIR/, or a .pdf", out, quoted(j.gearNames()))
	}
	t := newTargets(j, gears, a)
	pages, err := t.sheetPages(c)
	if err != nil {
		return err
	}
	names, err := writeSheets(c, out, folder, ending, j, gears, pages)
	if err != nil {
		return err
	}
	r := sheetResult{Files: names, Pages: len(pages), Warnings: j.about(gears)}
	if c.Bool("explain") {
		r.Explain = j.explainTargets(t)
	}
	err = emitBeside(c, r, func() []byte {
		p := newPage(c.App.Writer)
		for _, n := range names {
			p.line("%s", n)
		}
		p.line("%s, true scale: print without fitting to the page, and check the bar with a rule.", plural(len(pages), "page"))
		p.explanations(r.Explain)
		p.warnings(r.Warnings)
		return []byte(p.b.String())
	})
	if err != nil {
		return err
	}
	return pinVerdict(c, t)
}

// pinVerdict says, of files that are written, that none of the pins asked for can be used.
func pinVerdict(c *cli.Context, t *targets) error {
	err := t.verdict()
	if err != nil {
		fmt.Fprintln(c.App.ErrWriter, "flankwright: none of the pins asked for can be used; the sheet says why")
	}
	return err
}

// sheetResult is what the command says, as JSON writes it.
type sheetResult struct {
	Files    []string      `json:"files"`
	Pages    int           `json:"pages"`
	Warnings []warning     `json:"warnings"`
	Explain  []explanation `json:"explain,omitempty"`
}

func writeSheets(c *cli.Context, out string, folder bool, ending string, j *job, gears []*gear, pages []export.Drawing) ([]string, error) {
	if folder {
		var files []export.File
		var names []string
		for i, g := range gears {
			var b bytes.Buffer
			if err := pages[i].WriteSVG(&b); err != nil {
				return nil, cannot("sheet of %s: %v", g.name, err)
			}
			name := g.name + "-sheet.svg"
			files = append(files, export.File{Name: name, Data: b.Bytes()})
			names = append(names, filepath.ToSlash(filepath.Join(out, name)))
		}
		return names, fileError(out, export.WriteFolder(out, files, c.Bool("force")))
	}
	data, err := sheetBytes(j, pages, ending)
	if err != nil {
		return nil, err
	}
	return []string{filepath.ToSlash(out)}, writeFile(c, out, data)
}

// pictureDPI is the resolution of a sheet as PNG, for a look on a screen.
const pictureDPI = 110

func sheetBytes(j *job, pages []export.Drawing, ending string) ([]byte, error) {
	var b bytes.Buffer
	title, _, _ := j.top.word("title")
	var err error
	switch ending {
	case ".svg":
		err = pages[0].WriteSVG(&b)
	case ".png":
		err = pages[0].WritePNG(&b, pictureDPI)
	default:
		err = export.WritePDF(&b, orDefault(title, "Inspection sheet"), pages)
	}
	if err != nil {
		return nil, cannot("sheet: %v", err)
	}
	return b.Bytes(), nil
}

// sheetPages lays out a page for each gear.
func (t *targets) sheetPages(c *cli.Context) ([]export.Drawing, error) {
	size := export.A4
	if t.job.display == inspect.Inch {
		size = export.Letter
	}
	if p := c.String("page"); p != "" {
		var err error
		if size, err = export.ParsePageSize(p); err != nil {
			return nil, wrong("--page: %v", err)
		}
	}
	var pages []export.Drawing
	for i, g := range t.list {
		s, err := t.job.sheet(g, t.gears[i], c.String("date"))
		if err != nil {
			return nil, err
		}
		s.Foot = footText(g.name, i+1, len(t.list))
		page, err := export.LayoutSheet(s, size)
		if err != nil {
			return nil, cannot("sheet of %s: %v", g.name, err)
		}
		pages = append(pages, page)
	}
	return pages, nil
}
