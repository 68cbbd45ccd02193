package export

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"

	"flankwright/involute"
)

// An svgNode is an element of an SVG, read by the XML decoder alone.
type svgNode struct {
	name string
	attr map[string]string
	text string
	kids []*svgNode
}

// svgTree reads an SVG.
func svgTree(t testing.TB, data []byte) *svgNode {
	t.Helper()
	root := &svgNode{}
	open := []*svgNode{root}
	for d := xml.NewDecoder(bytes.NewReader(data)); ; {
		token, err := d.Token()
		if errors.Is(err, io.EOF) {
			return root.kids[0]
		}
		if err != nil {
			t.Fatal(err)
		}
		top := open[len(open)-1]
		switch token := token.(type) {
		case xml.StartElement:
			n := &svgNode{name: token.Name.Local, attr: map[string]string{}}
			for _, a := range token.Attr {
				n.attr[a.Name.Local] = a.Value
			}
			top.kids = append(top.kids, n)
			open = append(open, n)
		case xml.EndElement:
			open = open[:len(open)-1]
		case xml.CharData:
			top.text += string(token)
		}
	}
}

// walk visits an element and all in it.
func (n *svgNode) walk(f func(*svgNode)) {
	f(n)
	for _, k := range n.kids {
		k.walk(f)
	}
}

// id returns the element with an id, nil where there is none.
func (n *svgNode) id(id string) *svgNode {
	var found *svgNode
	n.walk(func(k *svgNode) {
		if k.attr["id"] == id {
			found = k
		}
	})
	return found
}

// number reads an attribute.
func (n *svgNode) number(t testing.TB, name string) float64 {
	t.Helper()
	x, err := strconv.ParseFloat(n.attr[name], 64)
	if err != nil {
		t.Fatalf("<%s>: %s: %v", n.name, name, err)
	}
	return x
}

// animated returns an attribute's value at the share tau of the period, as SMIL
// (SVG 1.1, chapter 19) has it: from … to linearly, discrete values from their key
// times on, and the attribute itself where nothing animates it.
func (n *svgNode) animated(t testing.TB, name string, tau float64) float64 {
	t.Helper()
	for _, k := range n.kids {
		if !strings.HasPrefix(k.name, "animate") || k.attr["attributeName"] != name {
			continue
		}
		if k.attr["dur"] != "5s" || k.attr["repeatCount"] != "indefinite" {
			t.Fatalf("<%s> lasts %q, %q times", k.name, k.attr["dur"], k.attr["repeatCount"])
		}
		if k.attr["calcMode"] != "discrete" {
			from, to := k.number(t, "from"), k.number(t, "to")
			return from + tau*(to-from)
		}
		values, times := strings.Split(k.attr["values"], ";"), strings.Split(k.attr["keyTimes"], ";")
		if len(values) != len(times) || times[0] != "0" {
			t.Fatalf("values %q at %q", values, times)
		}
		out, before := 0.0, -1.0
		for i, s := range times {
			at, err1 := strconv.ParseFloat(s, 64)
			x, err2 := strconv.ParseFloat(values[i], 64)
			if errors.Join(err1, err2) != nil || at <= before || at > 1 {
				t.Fatalf("values %q at %q", values, times)
			}
			if at <= tau {
				out = x
			}
			before = at
		}
		return out
	}
	if n.attr[name] == "" {
		return 0
	}
	return n.number(t, name)
}

// A film is a rolling picture as a browser would play it.
type film struct {
	root          *svgNode
	first, second Path
}

func newFilm(t testing.TB, data []byte) film {
	t.Helper()
	f := film{root: svgTree(t, data)}
	for id, path := range map[string]*Path{"first": &f.first, "second": &f.second} {
		for _, k := range f.root.id(id).kids {
			if k.name == "path" {
				p := svgPath{scan: &numberScanner{text: k.attr["d"]}, scale: 1, room: maxOutlineVertices}
				var err error
				if *path, err = p.contour(); err != nil {
					t.Fatal(err)
				}
			}
		}
	}
	return f
}

// turns returns the gears' turns at a time, counter-clockwise, radians.
func (f film) turns(t testing.TB, tau float64) (first, second float64) {
	return -f.root.id("first").animated(t, "transform", tau) * involute.Degree,
		-f.root.id("second").animated(t, "transform", tau) * involute.Degree
}

// dots returns the contacts seen at a time, y up.
func (f film) dots(t testing.TB, tau float64) []involute.Vec {
	var out []involute.Vec
	for _, c := range f.root.id("contacts").kids {
		if c.animated(t, "opacity", tau) == 1 {
			out = append(out, involute.Vec{X: c.animated(t, "cx", tau), Y: -c.animated(t, "cy", tau)})
		}
	}
	return out
}

// turned returns a path turned about the origin and moved.
func turned(p Path, turn float64, at involute.Vec) Path {
	o := Outline{Contours: []Contour{{LayerCut, p}}}.placed(turn, at)
	return o.Contours[0].Path
}

// writtenSlack is what the rounding to six decimals adds to a place on a contour, mm.
const writtenSlack = 5e-6

// At every moment of the film both gears touch at the dots and nowhere overlap.
func TestRollingContactsLieOnBothFlanks(t *testing.T) {
	for _, c := range drawnMeshes() {
		s, m := c.make(t, 0.001)
		data, err := RollingSVG(s)
		if err != nil {
			t.Fatal(c.name, err)
		}
		_, reports, err := NewMeshContour(s)
		if err != nil {
			t.Fatal(c.name, err)
		}
		pose, err := s.pose()
		if err != nil {
			t.Fatal(c.name, err)
		}
		start1, start2 := pose.turns(pose.start)
		f := newFilm(t, data)
		center, reach := involute.Vec{X: s.Center}, 1.6*s.First.Tooth.TransversePitch()
		middle := pose.at((pose.from + pose.to) / 2)
		for _, tau := range []float64{0, 0.29, 0.5, 0.83} {
			turn1, turn2 := f.turns(t, tau)
			first := standAt(turned(f.first, turn1, involute.Vec{}), start1+turn1, involute.Vec{}, middle, reach)
			second := standAt(turned(f.second, turn2, center), start2+turn2, center, middle, reach)
			for _, q := range f.dots(t, tau) {
				d1, d2 := math.Abs(first.distance(q)), math.Abs(second.distance(q))
				if d1 > reports[0].MaxDeviation+writtenSlack || d2 > reports[1].MaxDeviation+writtenSlack {
					t.Errorf("%s at %.2f: the dot at %v is %.6f and %.6f from the flanks", c.name, tau, q, d1, d2)
				}
			}
			slack := reports[0].MaxDeviation + reports[1].MaxDeviation + writtenSlack
			leading, trailing := leastDistances(first, second, s.First.Tooth)
			if leading < -slack || trailing < min(0, pose.play)-slack {
				t.Errorf("%s at %.2f: the gears overlap, by %.6f and %.6f", c.name, tau, leading, trailing)
			}
			if len(f.dots(t, tau)) > 0 && leading > slack {
				t.Errorf("%s at %.2f: a gap of %.6f, yet a dot", c.name, tau, leading)
			}
		}
		checkSeenShare(t, c, s, m, f)
	}
}

// checkSeenShare holds the time for which dots are seen, in pitches, against the contact
// ratio: on the flanks without their relief.
func checkSeenShare(t *testing.T, c drawnMesh, s MeshSpec, m involute.Mesh, f film) {
	t.Helper()
	got, err := m.Contact(s.Center, s.First.Tooth, s.Second.Tooth)
	if err != nil {
		t.Fatal(c.name, err)
	}
	const n = 2000
	seen, most := 0, 0
	for i := range n {
		dots := len(f.dots(t, (float64(i)+0.5)/n))
		seen, most = seen+dots, max(most, dots)
	}
	want := got.UnrelievedRatio
	if share := float64(seen) / n; math.Abs(share-want) > 2.0/n || float64(most) != math.Ceil(want) {
		t.Errorf("%s: %.4f dots are seen on average, %d at most; contact ratio %.4f", c.name, share, most, want)
	}
	if words := fmt.Sprintf("contact ratio %.2f ", want); !strings.Contains(f.root.kids[1].text, words) {
		t.Errorf("%s: %q does not say %q", c.name, f.root.kids[1].text, words)
	}
}

// The loop's end is its beginning: each gear a tooth farther, each dot where the next one began.
func TestRollingLoopHasNoSeam(t *testing.T) {
	for _, c := range drawnMeshes() {
		s, _ := c.make(t, 0.002)
		data, err := RollingSVG(s)
		if err != nil {
			t.Fatal(c.name, err)
		}
		f := newFilm(t, data)
		turn1, turn2 := f.turns(t, 1)
		if !near(1e-9, turn1*float64(c.s1.Teeth), 2*math.Pi, turn2*float64(c.s2.Teeth), -2*math.Pi) {
			t.Errorf("%s: %g and %g rad in a period", c.name, turn1, turn2)
		}
		before, after := f.dots(t, 1-1e-7), f.dots(t, 0)
		if len(before) != len(after) {
			t.Errorf("%s: %d dots at the end, %d at the start", c.name, len(before), len(after))
			continue
		}
		for i := range after {
			if d := before[i].Sub(after[i]).Norm(); d > 1e-5 {
				t.Errorf("%s: dot %d leaps by %g mm", c.name, i, d)
			}
		}
		if one := f.root.id("first").attr["transform"] + f.root.id("second").attr["transform"]; one != "" {
			t.Errorf("%s: the still picture is turned by %s", c.name, one)
		}
		for _, k := range f.root.id("contacts").kids {
			if k.number(t, "cx") != k.animated(t, "cx", 0) || k.number(t, "cy") != k.animated(t, "cy", 0) || k.number(t, "opacity") != k.animated(t, "opacity", 0) {
				t.Errorf("%s: a dot stands elsewhere in the still picture", c.name)
			}
		}
	}
}

// The file is one picture that asks for nothing: no scripts, styles or other
// files, every reference to something in it, every id once, the same bytes each time.
func TestRollingSVGStandsAlone(t *testing.T) {
	known := map[string]bool{"svg": true, "title": true, "desc": true, "rect": true, "g": true, "path": true, "line": true, "circle": true,
		"animate": true, "animateTransform": true, "use": true, "clipPath": true, "text": true}
	s, _ := drawnMeshes()[1].make(t, 0.002)
	s.Title = ` "A" <b> & c, ` + strings.Repeat("very long, ", 30)
	data, err := RollingSVG(s)
	if err != nil {
		t.Fatal(err)
	}
	root, ids, asked := svgTree(t, data), map[string]int{}, []string{}
	root.walk(func(n *svgNode) {
		if !known[n.name] {
			t.Errorf("a <%s>", n.name)
		}
		for name, v := range n.attr {
			switch {
			case name == "id":
				ids[v]++
			case name == "href":
				asked = append(asked, v)
			case name == "clip-path":
				asked = append(asked, strings.TrimSuffix(strings.TrimPrefix(v, "url("), ")"))
			case strings.HasPrefix(name, "on"), name == "style", strings.Contains(v, "url("), strings.Contains(v, ":") && !strings.HasPrefix(name, "xmlns") && n.name != "svg":
				t.Errorf("<%s %s=%q>", n.name, name, v)
			}
		}
	})
	for _, a := range asked {
		if !strings.HasPrefix(a, "#") || ids[a[1:]] != 1 {
			t.Errorf("%q is asked for", a)
		}
	}
	for id, n := range ids {
		if n != 1 {
			t.Errorf("id %s %d times", id, n)
		}
	}
	if len(asked) < 6 || root.kids[0].text != strings.TrimSpace(s.Title) {
		t.Errorf("%d references, title %q", len(asked), root.kids[0].text)
	}
	again, err := RollingSVG(s)
	if err != nil || !bytes.Equal(data, again) {
		t.Errorf("a second file differs, %v", err)
	}
}

// The line of action touches both base circles, and the path of contact lies on
// it between the two tip circles.
func TestRollingLineOfAction(t *testing.T) {
	s, _ := drawnMeshes()[1].make(t, 0.002)
	data, err := RollingSVG(s)
	if err != nil {
		t.Fatal(err)
	}
	root, center := svgTree(t, data), involute.Vec{X: s.Center}
	ends := func(id string) (a, b involute.Vec) {
		n := root.id(id)
		return involute.Vec{X: n.number(t, "x1"), Y: -n.number(t, "y1")}, involute.Vec{X: n.number(t, "x2"), Y: -n.number(t, "y2")}
	}
	a, b := ends("action")
	along := b.Sub(a)
	if !near(2e-6, a.Norm(), s.First.Tooth.BaseDiameter()/2, b.Sub(center).Norm(), s.Second.Tooth.BaseDiameter()/2,
		a.Dot(along)/along.Norm(), 0, b.Sub(center).Dot(along)/along.Norm(), 0) {
		t.Errorf("the line of action from %v to %v is no tangent of both base circles", a, b)
	}
	from, to := ends("path")
	if !near(2e-6, from.Sub(center).Norm(), s.Second.Tooth.TipDiameter()/2, to.Norm(), s.First.Tooth.TipDiameter()/2,
		from.Sub(a).Cross(along)/along.Norm(), 0, to.Sub(a).Cross(along)/along.Norm(), 0) {
		t.Errorf("the path of contact runs from %v to %v", from, to)
	}
}
