package export

import (
	"bytes"
	"fmt"
	"math"
	"strings"

	"flankwright/involute"
)

// The page of a rolling pair, mm: two panels side by side, words below them.
const (
	rollingMargin = 6.0
	rollingWhole  = 150.0 // width of the panel that shows the whole pair
	rollingWindow = 120.0 // width of the window on the contact, and the height of both panels
	rollingWidth  = 3*rollingMargin + rollingWhole + rollingWindow
)

// The looks of a rolling pair: line widths and, in the window, the radius of a
// contact's dot inside its line, in mm on the page, and colors. The dot's line keeps it
// visible in the picture of the whole pair.
const (
	rollingLine   = 0.25
	rollingThin   = 0.13
	rollingHeavy  = 0.5
	rollingRim    = 0.8
	rollingDot    = 0.9
	rollingDark   = "#222222"
	rollingGray   = "#808080"
	rollingAccent = "#c00000"
	rollingTint1  = "#e6e6e6"
	rollingTint2  = "#f3f3f3"
)

// rollingSeconds is how long one pitch takes.
const rollingSeconds = 5

// RollingSVG returns an SVG picture of a mesh that moves in any browser, without
// scripts: the pair rolls through one pitch, over and over, the first gear driving
// counter-clockwise, with all backlash on the flanks that do not touch. Shown are the
// tip, working pitch and base circles, the line of action between the base circles,
// on it the path of contact from A to E, and a dot where flanks touch; the
// whole pair at the left and a window on the contact at the right.
//
// The motion is SMIL (SVG 1.1, chapter 19): each gear turns about its own center by
// its pitch while the contacts move on by one base pitch, all at even speed, so
// that the end of the loop is its beginning. A viewer that knows no SMIL shows
// the pose of NewMeshContour. What would give the loop away by jumping back one pitch,
// keyways and pins, is left out. Helical gears are shown in transverse section.
//
// The groups with ids "first" and "second" hold the gears, in mm of the part about
// their own centers with y down, "contacts" the dots in the same units about the
// first gear's center. The bytes depend on nothing but the spec.
func RollingSVG(s MeshSpec) ([]byte, error) {
	pose, err := s.pose()
	if err != nil {
		return nil, err
	}
	fonts, err := loadTypeface()
	if err != nil {
		return nil, fmt.Errorf("svg: %w", err)
	}
	p := &rollingPage{pose: pose, fonts: fonts}
	turn1, turn2 := pose.turns(pose.start)
	if p.first, err = rollingGear(s.First, turn1); err != nil {
		return nil, err
	}
	if p.second, err = rollingGear(s.Second, turn2); err != nil {
		return nil, err
	}
	lines := p.wrapped(s.words(pose))
	height := 3*rollingMargin + rollingWindow + float64(len(lines))*captionLead
	p.printf("<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n")
	p.printf("<svg xmlns=\"%s\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" version=\"1.1\" width=\"%smm\" height=\"%smm\" viewBox=\"0 0 %s %s\">\n",
		svgNamespace, svgNumber(rollingWidth), svgNumber(height), svgNumber(rollingWidth), svgNumber(height))
	p.printf("<title>%s</title>\n<desc>%s</desc>\n", xmlText(s.title()), xmlText(s.words(pose)))
	p.printf("<rect width=\"%s\" height=\"%s\" fill=\"#ffffff\"/>\n", svgNumber(rollingWidth), svgNumber(height))
	view := p.window()
	p.drawWhole(view)
	p.drawWindow(view)
	p.caption(s.title(), lines)
	p.printf("</svg>\n")
	return p.file.Bytes(), nil
}

// rollingGear returns a gear's contour and plain bore as SVG path data, turned
// and about its own center.
func rollingGear(s ContourSpec, turn float64) (string, error) {
	o, _, err := NewContour(ContourSpec{Tooth: s.Tooth, Fit: s.Fit, Bore: s.Bore})
	if err != nil {
		return "", err
	}
	if err := o.check(); err != nil {
		return "", err
	}
	cut, err := o.placed(turn, involute.Vec{}).Cut()
	if err != nil {
		return "", err
	}
	page := svgPage{}
	data := page.path(cut.line())
	if s.Bore > 0 {
		data += " " + page.path(circlePath(involute.Vec{}, s.Bore).line())
	}
	return data, nil
}

// A rollingPage is the picture as it grows.
type rollingPage struct {
	pose          meshPose
	fonts         typeface
	first, second string // path data
	file          bytes.Buffer
}

func (p *rollingPage) printf(format string, args ...any) { fmt.Fprintf(&p.file, format, args...) }

// A rollingView lays a part of the plane of the gears on the page: a point of the
// part comes to offset + scale·(x, −y).
type rollingView struct {
	scale  float64
	offset involute.Vec // of the page, y down
}

// show returns the view that shows the box lo…hi of the part as large as it goes in
// a panel of the page, in its middle.
func show(lo, hi involute.Vec, x, y, width, height float64) rollingView {
	size, middle := hi.Sub(lo), lo.Add(hi).Scale(0.5)
	k := min(width/size.X, height/size.Y)
	return rollingView{k, involute.Vec{X: x + width/2 - k*middle.X, Y: y + height/2 + k*middle.Y}}
}

// place returns where a point of the part is on the page.
func (v rollingView) place(q involute.Vec) involute.Vec {
	return v.offset.Add(involute.Vec{X: q.X, Y: -q.Y}.Scale(v.scale))
}

// length writes a length on the page in units of the part.
func (v rollingView) length(mm float64) string { return svgDecimals(mm/v.scale, 9) }

// transform writes the view as an SVG transform.
func (v rollingView) transform() string {
	return fmt.Sprintf("translate(%s %s) scale(%s)", svgNumber(v.offset.X), svgNumber(v.offset.Y), svgDecimals(v.scale, 9))
}

// window returns the view of the window: about the middle of the path of
// contact, three pitches wide, or as much more as a long path of contact asks for.
func (p *rollingPage) window() rollingView {
	half := max(3*p.pose.pitch, 1.5*(p.pose.to-p.pose.from)) / 2
	middle, corner := p.pose.at((p.pose.from+p.pose.to)/2), involute.Vec{X: half, Y: half}
	return show(middle.Sub(corner), middle.Add(corner), 2*rollingMargin+rollingWhole, rollingMargin, rollingWindow, rollingWindow)
}

// drawWhole draws the whole pair, with all that moves, and frames what the window shows.
func (p *rollingPage) drawWhole(window rollingView) {
	tip1, tip2 := p.pose.first.TipDiameter()/2, p.pose.second.TipDiameter()/2
	high := max(tip1, tip2)
	v := show(involute.Vec{X: min(-tip1, p.pose.center-tip2), Y: -high}, involute.Vec{X: max(tip1, p.pose.center+tip2), Y: high},
		rollingMargin, rollingMargin, rollingWhole, rollingWindow)
	p.printf("<g transform=\"%s\" fill=\"none\">\n", v.transform())
	p.layers(v, map[string]func(){"gears": p.gears, "guides": p.guides, "pitch": p.pitch, "action": p.action, "path": p.path, "contacts": p.contacts})
	p.printf("</g>\n")
	side := rollingWindow / window.scale * v.scale
	middle := v.place(p.pose.at((p.pose.from + p.pose.to) / 2))
	p.printf("<rect x=\"%s\" y=\"%s\" width=\"%s\" height=\"%s\" fill=\"none\" stroke=\"%s\" stroke-width=\"%s\"/>\n",
		svgNumber(middle.X-side/2), svgNumber(middle.Y-side/2), svgNumber(side), svgNumber(side), rollingDark, svgNumber(rollingThin))
}

// drawWindow draws the same again, larger and clipped, with the letters of the path of contact.
func (p *rollingPage) drawWindow(v rollingView) {
	frame := fmt.Sprintf("x=\"%s\" y=\"%s\" width=\"%s\" height=\"%s\"",
		svgNumber(2*rollingMargin+rollingWhole), svgNumber(rollingMargin), svgNumber(rollingWindow), svgNumber(rollingWindow))
	p.printf("<clipPath id=\"window\"><rect %s/></clipPath>\n", frame)
	p.printf("<g clip-path=\"url(#window)\"><g transform=\"%s\" fill=\"none\">\n", v.transform())
	uses := map[string]func(){}
	for _, l := range rollingLayers() {
		uses[l.id] = func() { p.printf("<use xlink:href=\"#%s\"/>\n", l.id) }
	}
	p.layers(v, uses)
	p.printf("</g></g>\n")
	p.printf("<rect %s fill=\"none\" stroke=\"%s\" stroke-width=\"%s\"/>\n", frame, rollingDark, svgNumber(rollingLine))
	p.letters(v)
}

// A rollingLayer is a kind of line of the picture. Widths and dashes are inherited, so that
// both panels can show the same elements with lines of one width on the page.
type rollingLayer struct {
	id     string
	stroke string
	width  float64   // mm on the page
	dash   []float64 // mm on the page, nil for none
}

// rollingLayers returns the kinds of lines, the lowest first.
func rollingLayers() []rollingLayer {
	return []rollingLayer{
		{"gears", rollingDark, rollingLine, nil},
		{"guides", rollingGray, rollingThin, nil},
		{"pitch", rollingGray, rollingThin, []float64{4, 0.8, 0.8, 0.8}},
		{"action", rollingDark, rollingThin, nil},
		{"path", rollingAccent, rollingHeavy, nil},
		{"contacts", rollingAccent, rollingRim, nil},
	}
}

// style writes the layer's lines as SVG attributes, in units of the part.
func (l rollingLayer) style(v rollingView) string {
	out := fmt.Sprintf("stroke=\"%s\" stroke-width=\"%s\"", l.stroke, v.length(l.width))
	if len(l.dash) > 0 {
		words := make([]string, len(l.dash))
		for i, mm := range l.dash {
			words[i] = v.length(mm)
		}
		out += fmt.Sprintf(" stroke-dasharray=\"%s\"", strings.Join(words, " "))
	}
	return out
}

// layers draws the layers by what is given for each.
func (p *rollingPage) layers(v rollingView, draw map[string]func()) {
	for _, l := range rollingLayers() {
		p.printf("<g %s>\n", l.style(v))
		draw[l.id]()
		p.printf("</g>\n")
	}
}

// gears draws the two gears, each in a group that turns by one pitch in each period.
func (p *rollingPage) gears() {
	p.printf("<g id=\"gears\" stroke-linejoin=\"round\" fill-rule=\"evenodd\">\n")
	// SVG counts angles clockwise.
	p.gear("first", involute.Vec{}, p.first, rollingTint1, -360/float64(p.pose.first.Teeth()))
	p.gear("second", involute.Vec{X: p.pose.center}, p.second, rollingTint2, 360/float64(p.pose.second.Teeth()))
	p.printf("</g>\n")
}

func (p *rollingPage) gear(id string, at involute.Vec, data, tint string, turn float64) {
	p.printf("<g transform=\"translate(%s 0)\"><g id=\"%s\">\n", svgNumber(at.X), id)
	p.printf("<animateTransform attributeName=\"transform\" type=\"rotate\" from=\"0\" to=\"%s\" dur=\"%ds\" repeatCount=\"indefinite\"/>\n",
		svgDecimals(turn, 12), rollingSeconds)
	p.printf("<path fill=\"%s\" d=\"%s\"/>\n</g></g>\n", tint, data)
}

// guides draws the tip and base circles of both gears and their centers.
func (p *rollingPage) guides() {
	p.printf("<g id=\"guides\">\n")
	p.circles(p.pose.first.TipDiameter(), p.pose.second.TipDiameter())
	p.circles(p.pose.first.BaseDiameter(), p.pose.second.BaseDiameter())
	arm := min(p.pose.first.BaseDiameter(), p.pose.second.BaseDiameter()) / 20
	for _, x := range []float64{0, p.pose.center} {
		p.printf("<path d=\"M%s 0 H%s M%s %s V%s\"/>\n", svgNumber(x-arm), svgNumber(x+arm), svgNumber(x), svgNumber(-arm), svgNumber(arm))
	}
	p.printf("</g>\n")
}

// pitch draws the working pitch circles.
func (p *rollingPage) pitch() {
	p.printf("<g id=\"pitch\">\n")
	p.circles(p.pose.contact.Pitch1, p.pose.contact.Pitch2)
	p.printf("</g>\n")
}

// circles draws a circle round each gear's center.
func (p *rollingPage) circles(first, second float64) {
	p.printf("<circle r=\"%s\"/>\n<circle cx=\"%s\" r=\"%s\"/>\n", svgNumber(first/2), svgNumber(p.pose.center), svgNumber(second/2))
}

// action draws the line of action from base circle to base circle.
func (p *rollingPage) action() { p.stretch("action", 0, p.pose.line()) }

// path draws the path of contact from A to E.
func (p *rollingPage) path() { p.stretch("path", p.pose.from, p.pose.to) }

// stretch draws a piece of the line of action.
func (p *rollingPage) stretch(id string, from, to float64) {
	a, b := p.pose.at(from), p.pose.at(to)
	p.printf("<line id=\"%s\" x1=\"%s\" y1=\"%s\" x2=\"%s\" y2=\"%s\"/>\n",
		id, svgNumber(a.X), svgNumber(-a.Y), svgNumber(b.X), svgNumber(-b.Y))
}

// contacts draws the dots where flanks touch.
func (p *rollingPage) contacts() {
	p.printf("<g id=\"contacts\" fill=\"%s\">\n", rollingAccent)
	for _, c := range p.pose.rollingContacts() {
		p.dot(c)
	}
	p.printf("</g>\n")
}

// A rollingContact is a dot that moves from ρ by one base pitch during the
// period, and is to be seen from the share on of it to the share off.
type rollingContact struct{ rho, on, off float64 }

// rollingContacts returns a dot for every pair of flanks that touches at any
// time of the period. Pair k touches at ρ = start + (k + τ) p_bt at time τ of
// it, 0 ≤ τ ≤ 1, while that lies between A and E. Each goes on where
// the next one began, so that the loop has no seam.
func (p meshPose) rollingContacts() []rollingContact {
	var out []rollingContact
	last := int(math.Ceil((p.to - p.start) / p.pitch))
	for k := int(math.Floor((p.from-p.start)/p.pitch)) - 1; k <= last; k++ {
		rho := p.start + float64(k)*p.pitch
		on, off := max(0, (p.from-rho)/p.pitch), min(1, (p.to-rho)/p.pitch)
		if off > on {
			out = append(out, rollingContact{rho, on, off})
		}
	}
	return out
}

// dot draws one contact.
func (p *rollingPage) dot(c rollingContact) {
	a, b := p.pose.at(c.rho), p.pose.at(c.rho+p.pose.pitch)
	seen := 0
	if c.on == 0 {
		seen = 1
	}
	p.printf("<circle cx=\"%s\" cy=\"%s\" r=\"%s\" opacity=\"%d\">\n",
		svgNumber(a.X), svgNumber(-a.Y), svgNumber(rollingDot/p.window().scale), seen)
	for _, m := range []struct {
		name     string
		from, to float64
	}{{"cx", a.X, b.X}, {"cy", -a.Y, -b.Y}} {
		p.printf("<animate attributeName=\"%s\" from=\"%s\" to=\"%s\" dur=\"%ds\" repeatCount=\"indefinite\"/>\n",
			m.name, svgNumber(m.from), svgNumber(m.to), rollingSeconds)
	}
	values, times := fmt.Sprint(seen), "0"
	if c.on > 0 {
		values, times = values+";1", times+";"+svgDecimals(c.on, 9)
	}
	if c.off < 1 {
		values, times = values+";0", times+";"+svgDecimals(c.off, 9)
	}
	if times != "0" {
		p.printf("<animate attributeName=\"opacity\" calcMode=\"discrete\" values=\"%s\" keyTimes=\"%s\" dur=\"%ds\" repeatCount=\"indefinite\"/>\n",
			values, times, rollingSeconds)
	}
	p.printf("</circle>\n")
}
