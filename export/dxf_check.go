package export

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"math"
	"strings"

	"flankwright/involute"
)

// maxDXFProblems bounds what CheckDXF returns.
const maxDXFProblems = 50

// extentSlack is how far $EXTMIN and $EXTMAX may lie from the bounds of what is
// drawn, in file units. The writer rounds points and bulges to half of 1e-12;
// a bulge off by that moves the top of an arc over chord c by c/4·1e-12. So 1e-9
// is ample up to a size of 1 m; beyond, it is 1e-12 of the size.
const extentSlack = 1e-9

// CheckDXF returns what is wrong with the structure of a DXF file of ours, or
// nothing. It is stricter than readDXF and asks for what writeDXF promises:
// pairs well formed; each section there, ended, in order; handles unique and below
// $HANDSEED; owners, layers and line types defined; vertex and record counts
// true; numbers finite and plain; a bulge on every vertex; polylines closed,
// counter-clockwise, arcs up to 90°; unit and measurement agreeing; extents true.
func CheckDXF(data []byte) []string {
	c := &dxfChecker{handles: map[string]int{}, defined: map[string]bool{}}
	if !c.scan(data) {
		return c.problems
	}
	c.sections()
	c.header()
	c.records()
	c.references()
	c.drawing(data)
	return c.problems
}

// A dxfChecker gathers the problems of a file.
type dxfChecker struct {
	problems []string
	pairs    []dxfPair
	recs     [][]dxfPair
	r12      bool
	vars     map[string][]dxfPair
	handles  map[string]int  // handle → line
	defined  map[string]bool // "LAYER CUT", "LTYPE DASHED"
}

func (c *dxfChecker) report(line int, format string, args ...any) {
	if len(c.problems) < maxDXFProblems {
		c.problems = append(c.problems, fmt.Sprintf("line %d: "+format, append([]any{line}, args...)...))
	}
}

// scan reads all pairs and splits them at the zeros; false where the file can't be read on.
func (c *dxfChecker) scan(data []byte) bool {
	s := newDXFScanner(bytes.NewReader(data))
	for {
		p, err := s.next()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			c.problems = append(c.problems, err.Error())
			return false
		}
		c.pairs = append(c.pairs, p)
		c.value(p)
		if p.code == 999 && len(c.recs) == 0 {
			continue
		}
		if p.code == 0 || len(c.recs) == 0 {
			c.recs = append(c.recs, nil)
		}
		last := &c.recs[len(c.recs)-1]
		*last = append(*last, p)
	}
	if n := len(c.pairs); n == 0 || !c.pairs[n-1].is(0, "EOF") {
		c.report(s.line, "the file does not end with EOF")
	}
	return len(c.recs) > 0
}

// value checks that a value is what its group code says (DXF reference, group
// code ranges), and that numbers are written plainly.
func (c *dxfChecker) value(p dxfPair) {
	switch {
	case p.code >= 10 && p.code < 60 || p.code >= 140 && p.code < 150 || p.code >= 210 && p.code < 240:
		if _, err := p.number(); err != nil {
			c.report(p.line+1, "group %d: %.40q is not a finite number", p.code, p.value)
		} else if strings.ContainsAny(p.value, "eE") {
			c.report(p.line+1, "group %d: %s is written with an exponent", p.code, p.value)
		} else if strings.HasPrefix(p.value, "-") && strings.Trim(p.value, "-0.") == "" {
			c.report(p.line+1, "group %d: a negative zero", p.code)
		}
	case p.code >= 60 && p.code < 100 || p.code >= 170 && p.code < 180 || p.code >= 270 && p.code < 290:
		if _, err := p.whole(); err != nil {
			c.report(p.line+1, "group %d: %.40q is not a whole number", p.code, p.value)
		}
	}
}

// sections checks their order and ends, and that tables are opened and closed.
func (c *dxfChecker) sections() {
	c.variables()
	want := []string{"HEADER", "CLASSES", "TABLES", "BLOCKS", "ENTITIES", "OBJECTS"}
	if c.r12 {
		want = []string{"HEADER", "TABLES", "BLOCKS", "ENTITIES"}
	}
	var found []string
	open, table := "", false
	for _, r := range c.recs {
		switch first := r[0]; {
		case first.is(0, "SECTION"):
			if open != "" {
				c.report(first.line, "section %s has no ENDSEC", open)
			}
			open = firstText(r, 2)
			found = append(found, open)
		case first.is(0, "ENDSEC") || first.is(0, "EOF"):
			if first.is(0, "ENDSEC") == (open == "") {
				c.report(first.line, "%s does not belong here", first.value)
			}
			if table {
				c.report(first.line, "a table has no ENDTAB")
			}
			open, table = "", false
		case open == "":
			c.report(first.line, "%q between two sections", first.value)
		case first.is(0, "TABLE") || first.is(0, "ENDTAB"):
			if first.is(0, "TABLE") == table || open != "TABLES" {
				c.report(first.line, "%s does not belong here", first.value)
			}
			table = !table
		}
	}
	if strings.Join(found, " ") != strings.Join(want, " ") {
		c.report(1, "sections are %s; %s would be right", strings.Join(found, " "), strings.Join(want, " "))
	}
}

// variables collects the header's variables.
func (c *dxfChecker) variables() {
	c.vars = map[string][]dxfPair{}
	name := ""
	for _, p := range c.recs[0] {
		if p.code == 9 {
			name = p.value
			if _, ok := c.vars[name]; ok {
				c.report(p.line, "%s for the second time", name)
			}
			c.vars[name] = nil
		} else if name != "" {
			c.vars[name] = append(c.vars[name], p)
		}
	}
	c.r12 = firstText(c.vars["$ACADVER"], 1) == "AC1009"
}

// header checks version, unit and handle seed.
func (c *dxfChecker) header() {
	if v := firstText(c.vars["$ACADVER"], 1); v != "AC1009" && v != "AC1015" {
		c.report(1, "$ACADVER is %q; AC1015 or AC1009 would be right", v)
	}
	unit, system := firstText(c.vars["$INSUNITS"], 70), firstText(c.vars["$MEASUREMENT"], 70)
	if unit+" "+system != "4 1" && unit+" "+system != "1 0" {
		c.report(1, "$INSUNITS %q and $MEASUREMENT %q; 4 and 1 (mm) or 1 and 0 (inch) would be right", unit, system)
	}
}

// drawing reads the file as an outline and checks what is drawn.
func (c *dxfChecker) drawing(data []byte) {
	o, err := readDXF(bytes.NewReader(data))
	if err != nil {
		c.problems = append(c.problems, err.Error())
		return
	}
	for _, s := range o.Skipped {
		c.report(s.Line, "an outline has no place for %s", s.Kind)
	}
	for i, k := range o.Contours {
		if k.Path.area() < 0 {
			c.report(1, "contour %d runs clockwise", i+1)
		}
		for j, v := range k.Path.Vertices {
			if math.Abs(v.Bulge) > quarterBulge+bulgeStep {
				c.report(1, "contour %d: the arc leaving vertex %d is over 90°", i+1, j+1)
			}
		}
	}
	lo, hi := o.bounds()
	lo, hi = lo.Scale(1/o.Unit.MM()), hi.Scale(1/o.Unit.MM())
	slack := max(extentSlack, 1e-12*hi.Sub(lo).Norm())
	c.extent("$EXTMIN", lo, slack)
	c.extent("$EXTMAX", hi, slack)
}

// extent checks one corner of the drawing's extents.
func (c *dxfChecker) extent(name string, want involute.Vec, slack float64) {
	x, errX := parsePlain(firstText(c.vars[name], 10))
	y, errY := parsePlain(firstText(c.vars[name], 20))
	if errX != nil || errY != nil || !(math.Abs(x-want.X) <= slack && math.Abs(y-want.Y) <= slack) {
		c.report(1, "%s is (%g, %g); (%g, %g) would be right", name, x, y, want.X, want.Y)
	}
}
