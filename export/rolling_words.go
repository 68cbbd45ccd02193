package export

import (
	"fmt"
	"math"
	"strings"

	"flankwright/involute"
)

// The caption of a rolling pair: size of its letters and distance of its lines, mm.
const (
	captionSize = 4.0
	captionLead = 5.8
)

// captionFonts is what the caption and the letters are set in; the last is whatever the viewer has.
const captionFonts = "Liberation Sans, Arial, Helvetica, sans-serif"

// title returns what the picture is called.
func (s MeshSpec) title() string {
	if t := strings.TrimSpace(s.Title); t != "" {
		return t
	}
	return "Two gears in mesh"
}

// words says what the picture shows.
func (s MeshSpec) words(p meshPose) string {
	var b strings.Builder
	fmt.Fprintf(&b, "%d and %d teeth at a center distance of %s: working pressure angle %.2f°, contact ratio %.2f (%s). ",
		p.first.Teeth(), p.second.Teeth(), s.length(p.center), p.contact.WorkingAngle/involute.Degree, p.ratio(), ratioWords(p.ratio()))
	b.WriteString("The left gear drives, counter-clockwise. Flanks touch at the dots, on the line of action between the two base circles, from A to E")
	if p.holdsPitchPoint() {
		b.WriteString(" through the pitch point C")
	}
	b.WriteString("; the circles are tip, working pitch (dashed) and base circle of each gear.")
	if p.first.Helical() {
		b.WriteString(" Helical gears in transverse section.")
	}
	if p.from > p.contact.RhoA1 || p.to < p.contact.RhoE1 {
		b.WriteString(" The relieved tips count as not touching, as without load.")
	}
	if p.play < 0 {
		fmt.Fprintf(&b, " The teeth overlap by %s on the other flanks: they are too thick for this center distance.", s.length(-p.play))
	}
	return b.String()
}

// holdsPitchPoint reports whether the path of contact leads through the pitch point.
func (p meshPose) holdsPitchPoint() bool { return p.from < p.pitchPoint() && p.pitchPoint() < p.to }

// ratioWords says what a contact ratio means. At a ratio of n + f, n + 1
// pairs touch for the share f of the time, and n for the rest. A share is not
// rounded up to all of the time.
func ratioWords(ratio float64) string {
	whole := int(math.Floor(ratio))
	share := min(99, math.Round(100*(ratio-float64(whole))))
	if whole == 0 {
		return fmt.Sprintf("for %.0f %% of the time no flanks touch", 100-share)
	}
	pairs := "1 pair of flanks touches"
	if whole > 1 {
		pairs = fmt.Sprintf("%d pairs of flanks touch", whole)
	}
	if share == 0 {
		return pairs + " all the time"
	}
	return fmt.Sprintf("%s all the time, one more for %.0f %% of it", pairs, share)
}

// wrapped breaks the words into lines of the caption. A viewer's own font may run
// wider than ours, so a sixth of the width is kept free.
func (p *rollingPage) wrapped(words string) []string {
	return p.fonts.wrapped(words, lettering{Size: captionSize}, captionWidth)
}

const captionWidth = (rollingWidth - 2*rollingMargin) * 5 / 6

// caption writes the title and the words below the panels.
func (p *rollingPage) caption(title string, lines []string) {
	y := 2*rollingMargin + rollingWindow + captionSize
	p.printf("<g font-family=\"%s\" font-size=\"%s\" fill=\"%s\">\n", captionFonts, svgNumber(captionSize), rollingDark)
	p.printf("<text x=\"%s\" y=\"%s\" font-weight=\"bold\">%s</text>\n", svgNumber(rollingMargin), svgNumber(y),
		xmlText(p.fonts.cut(title, lettering{Size: captionSize, Bold: true}, captionWidth)))
	for i, line := range lines {
		p.printf("<text x=\"%s\" y=\"%s\">%s</text>\n", svgNumber(rollingMargin), svgNumber(y+float64(i+1)*captionLead), xmlText(line))
	}
	p.printf("</g>\n")
}

// letters writes A and E beyond the ends of the path of contact and C beside the pitch point.
func (p *rollingPage) letters(v rollingView) {
	const off = 4.5 // mm on the page
	along := involute.Polar(1, math.Pi/2-p.pose.contact.WorkingAngle)
	beside := along.Left().Scale(-off / v.scale)
	p.printf("<g font-family=\"%s\" font-size=\"%s\" fill=\"%s\" text-anchor=\"middle\">\n", captionFonts, svgNumber(captionSize*1.1), rollingAccent)
	letter := func(name string, rho float64) {
		at := v.place(p.pose.at(rho).Add(beside))
		p.printf("<text x=\"%s\" y=\"%s\">%s</text>\n", svgNumber(at.X), svgNumber(at.Y+0.36*captionSize), name)
	}
	letter("A", p.pose.from)
	letter("E", p.pose.to)
	if p.pose.holdsPitchPoint() {
		letter("C", p.pose.pitchPoint())
	}
	p.printf("</g>\n")
}
