package main

import (
	"errors"
	"fmt"
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
	Notes  []string `json:"notes"` // of the file's own bookkeeping; the geometry is judged by itself
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
	back, notes, err := readOutline(path, o.format)
	if err != nil {
		return err
	}
	r := newChecked(j, path, back, notes)
	if _, err := back.Mate(); err == nil {
		r.Faults = append(r.Faults, "it holds a pair of gears; add --mesh")
		return r.show(c)
	}
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

// newChecked starts a check with what the file holds that does not belong there.
func newChecked(j *job, path string, back export.Outline, notes []string) *checked {
	r := &checked{contours: contours{job: j, Meshes: []rolledMesh{}}, file: path, Faults: []string{}, Notes: notes}
	for _, s := range back.Strays() {
		r.Faults = append(r.Faults, "there is something else in it: "+s)
	}
	return r
}

// readOutline reads an outline file. A DXF that another program has written over
// may be less tidy than ours: what can be read is measured, and the rest noted.
func readOutline(path string, format export.Format) (back export.Outline, notes []string, err error) {
	data, err := os.ReadFile(path)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		return back, nil, cannot("--check %s: there is no such file", path)
	case err != nil:
		return back, nil, cannot("--check %s: %v", path, err)
	}
	notes = []string{}
	if format != export.FormatSVG {
		notes = append(notes, export.CheckDXF(data)...)
	}
	if back, err = format.Decode(data); err != nil {
		return back, notes, cannot("%s cannot be read: %v", path, err)
	}
	return back, notes, nil
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
	d.hollow(p.MinHollow)
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
	back, notes, err := readOutline(path, o.format)
	if err != nil {
		return err
	}
	r := newChecked(j, path, back, notes)
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
	var gears []*gear
	for _, d := range r.gears {
		gears = append(gears, d.gear)
	}
	r.Warnings = r.job.about(gears)
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
		if n := len(r.Notes); n > 0 {
			p.wrapped(fmt.Sprintf("(not written by this program as it is: %s, the first %s)", plural(n, "remark"), r.Notes[0]), "  ")
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
