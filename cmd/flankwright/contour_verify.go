package main

import (
	"errors"
	"io/fs"
	"os"

	"github.com/urfave/cli/v2"

	"flankwright/export"
)

// checked is the result of contour --check, as JSON writes it.
type checked struct {
	contours
	Sound  bool     `json:"sound"`
	Faults []string `json:"faults"`
	file   string
}

// runCheck measures a file that is there against the job, and says whether it is
// the contour that the same flags would write.
func (j *job) runCheck(c *cli.Context, gears []*gear, o contourOptions) error {
	path := c.String("check")
	var err error
	if o.format, err = formatByEnding("--check", path, o.format); err != nil {
		return err
	}
	if c.Bool("mesh") {
		return j.checkMesh(c, path, o)
	}
	if len(gears) > 1 {
		return wrong("--check %s: is about one gear, and the job has %s; say which by --gear, or --mesh for a pair", path, quoted(j.gearNames()))
	}
	back, err := readOutline(path, o.format)
	if err != nil {
		return err
	}
	r := &checked{contours: contours{job: j, Meshes: []rolledMesh{}, Warnings: j.about(gears)}, file: path, Faults: []string{}}
	contour, err := back.Cut()
	if err != nil {
		r.Faults = append(r.Faults, err.Error())
		return r.show(c)
	}
	r.Faults = append(r.Faults, openingFaults(j.contourSpec(gears[0], o), back)...)
	if err := r.add(gears[0], contour, o); err != nil {
		return err
	}
	return r.show(c)
}

// readOutline reads an outline file.
func readOutline(path string, format export.Format) (export.Outline, error) {
	data, err := os.ReadFile(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return export.Outline{}, cannot("--check %s: there is no such file", path)
	case err != nil:
		return export.Outline{}, cannot("--check %s: %v", path, err)
	}
	back, err := decode(data, format)
	if err != nil {
		return back, cannot("%s %v", path, err)
	}
	return back, nil
}

// add measures one contour of the file against the fit that would be drawn now.
func (r *checked) add(g *gear, path export.Path, o contourOptions) error {
	j := r.job
	_, report, err := export.NewContour(j.contourSpec(g, o))
	if err != nil {
		return j.cannotDraw(g, o, err)
	}
	d := newDrawnGear(g, report, o)
	d.File, d.MaxDeviation = r.file, o.fit.Tolerance
	d.count(path)
	o.fit.Lines = o.fit.Lines || d.Arcs == 0
	faults, err := j.measure(&d, path, o)
	if err != nil {
		r.Faults = append(r.Faults, called(g)+" "+err.Error())
		return nil
	}
	for _, f := range faults {
		r.Faults = append(r.Faults, called(g)+" "+f)
	}
	d.MaxDeviation, d.Deviation, d.TangentBreak = d.AsWritten.Shape, d.AsWritten.ShapeRange, d.AsWritten.TangentBreak
	r.gears = append(r.gears, d)
	r.Gears.add(g.name, d)
	return nil
}

// count takes pieces and radii from the file instead of the fit.
func (d *drawnGear) count(path export.Path) {
	p := path.Pieces()
	d.Segments, d.Arcs, d.Lines = p.Segments, p.Arcs, p.Lines
	d.ShortestArc, d.Radius = p.ShortestArc, span{p.MinRadius, p.MaxRadius}
}

// checkMesh measures both gears of a file that holds a mesh, alone and rolled together.
func (j *job) checkMesh(c *cli.Context, path string, o contourOptions) error {
	meshes, err := j.meshesOf(c.String("gear"))
	if err != nil {
		return err
	}
	if len(meshes) > 1 {
		return wrong("--check %s: a file holds one mesh, and the job has %d; choose one by --gear NAME", path, len(meshes))
	}
	m := meshes[0]
	back, err := readOutline(path, o.format)
	if err != nil {
		return err
	}
	r := &checked{contours: contours{job: j, Meshes: []rolledMesh{}, Warnings: j.about([]*gear{m.first, m.second})}, file: path, Faults: []string{}}
	for i, g := range []*gear{m.first, m.second} {
		contour, err := gearOf(back, i, m.plan.Nominal())
		if err != nil {
			r.Faults = append(r.Faults, called(g)+": "+err.Error())
			continue
		}
		if err := r.add(g, contour, o); err != nil {
			return err
		}
	}
	if len(r.gears) == 2 {
		rolled, err := j.roll(m, &r.gears[0], &r.gears[1])
		if err != nil {
			r.Faults = append(r.Faults, err.Error())
		} else {
			rolled.File = path
			r.Meshes = append(r.Meshes, rolled)
		}
	}
	return r.show(c)
}

// show prints the verdict, then what was measured; status 3 where the file is not as it should be.
func (r *checked) show(c *cli.Context) error {
	r.Sound = len(r.Faults) == 0
	text := func() []byte {
		p := newPage(c.App.Writer)
		if r.Sound {
			p.line("%s is as it should be", r.file)
		} else {
			p.line("%s is NOT as it should be", r.file)
			for _, f := range r.Faults {
				p.wrapped("- "+f, "  ")
			}
		}
		if len(r.gears) == 0 {
			return []byte(p.b.String())
		}
		return r.contours.text(p, r.job.digits(c))
	}
	if err := emitBeside(c, r, text); err != nil {
		return err
	}
	if !r.Sound {
		return errNo
	}
	return nil
}
