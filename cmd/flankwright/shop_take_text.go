package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"flankwright/inspect"
)

// takeText prints what to take for a gear, the one that tells most first.
func (t *targets) takeText(p *page, g gearTargets) {
	u := t.job.display
	for _, x := range g.Take {
		line := "Take: " + x.with
		switch {
		case x.Instrument == nil:
			line += ", read " + oneWayText(x.What)
		case x.Kind != "" && x.What != "over pins":
			line += ", " + oneWayText(x.What) + ", and the " + *x.Instrument
		case x.Kind != "":
			line += " and the " + *x.Instrument
		default:
			line += " with the " + *x.Instrument
		}
		if x.Uncertainty != nil {
			line += fmt.Sprintf(" (±%s %s%s)", short(math.Round(*x.Uncertainty/u.MM()*1e5)/1e5*u.MM(), u), u, x.shareText())
		}
		p.item(line + ": " + x.Why)
	}
	if len(g.Take) == 0 {
		p.item("Nothing in the shop measures this gear.")
	}
	for _, m := range g.Missing {
		if len(g.Take) == 0 || m.What == "over pins" {
			p.item("Missing: " + m.Text)
		}
	}
}

// item prints a text in indented lines of up to 100 characters.
func (p *page) item(text string) {
	line, indent := " ", "   "
	for _, word := range strings.Fields(text) {
		if width(line)+1+width(word) > 100 {
			p.line("%s", line)
			line = indent
		}
		line += " " + word
	}
	p.line("%s", line)
}

func oneWayText(way string) string {
	if way == "one pin to the axis" {
		return "to the axis, between centers, with an indicator or a height gauge"
	}
	return strings.TrimPrefix(way, "one pin ")
}

// shareText words which share of the tolerance an instrument takes, with the pins' class.
func (x take) shareText() string {
	with := ""
	if x.PinEffect != nil && x.PinEffect.Max > x.PinEffect.Min {
		with = "with the " + x.Kind + "' class "
	}
	switch {
	case x.Share == nil:
		return ""
	case *x.Share >= 1:
		return ", " + with + "more than the whole tolerance: for a rough check only"
	}
	return fmt.Sprintf(", %s%.0f%% of the tolerance", with, 100**x.Share)
}

// pickText words pins to take: two Ø3.5 pins (measured 3.5003, drawer B).
func (j *job) pickText(p inspect.Pick, z inspect.PinSize, n int) string {
	kind := kindOfPins(z.Ball)
	count := []string{"", "one", "two", "three"}[n]
	if n == 1 {
		kind = strings.TrimSuffix(kind, "s")
	}
	return fmt.Sprintf("%s %s %s (%s, %s)", count, "Ø"+z.Label, kind, j.knownText(p), strings.ReplaceAll(fromPins(p), "shop, ", ""))
}

// knownText words what is known of the pins' diameters.
func (j *job) knownText(p inspect.Pick) string {
	fine := func(mm float64) string { return strings.TrimPrefix(pinText(mm, j.display), "Ø") }
	var each []string
	for _, one := range p.Pins {
		what := "not measured, of no class"
		switch {
		case one.Measured:
			what = "measured " + fine(one.Diameter)
		case one.Known:
			what = one.Class
		}
		if !slices.Contains(each, what) {
			each = append(each, what)
		}
	}
	text := strings.ReplaceAll(strings.Join(each, " and "), " and measured ", " and ")
	if !p.Alike() {
		text += ": their mean " + fine(p.Diameter) + " counts"
	}
	return text
}

// whyPins says why these pins, what was passed over, and what their class can do.
func (j *job) whyPins(g *gear, c inspect.PinChoice) string {
	t, u := c.Takes[0], j.display
	why := fmt.Sprintf("nearest to the ideal Ø%s", u.Format(c.Ideal, u.Decimals()))
	if c.Passed != nil {
		why = fmt.Sprintf("nearest to the ideal Ø%s that will do; Ø%s is nearer, but %s", u.Format(c.Ideal, u.Decimals()), c.Passed.Size.Label, j.passedReason(c.Passed))
	}
	if inspect.PinsFor(t.Way) == 1 {
		why = "there are no two usable ones of a size; " + why
	}
	switch e := t.Effect; {
	case !t.Pick.Known:
		why += ". Measure them first"
		if seat, err := g.middle().Seat(t.Pick.Diameter); err == nil {
			_, by := g.g.PinSensitivity(t.Way, seat)
			why += fmt.Sprintf(": what they are off by shows %.1f times in the reading", by)
		}
	case e.Width() > 0:
		why += ". Their class can make it read " + effectText(e, t.Pick.Off, u)
	}
	return why
}

// effectText words how far pins of a class can move a reading.
func effectText(e, off inspect.Limits, u inspect.Unit) string {
	fine := func(mm float64) string { return u.Format(math.Abs(mm), u.Decimals()+1) + " " + u.String() }
	switch {
	case e.Min < 0 && e.Max > 0:
		return fmt.Sprintf("up to %s more or less (pins off by ±%s)", fine(e.Max), fine(off.Max))
	case e.Max > 0:
		return fmt.Sprintf("up to %s more (pins up to %s over size)", fine(e.Max), fine(off.Max))
	}
	return fmt.Sprintf("up to %s less (pins up to %s under size)", fine(e.Min), fine(off.Min))
}

// passedReason says why the size nearest to the ideal was passed over.
func (j *job) passedReason(p *inspect.Passed) string {
	switch p.Reason {
	case inspect.TooFew:
		return onlyText(p.Size.Count)
	case inspect.Unfit:
		return j.why(p.Faults)
	}
	return "no micrometer in the shop covers its reading"
}

// missingPins says what to get to measure over pins.
func (j *job) missingPins(g *gear, c inspect.PinChoice) string {
	if len(c.Takes) > 0 {
		t := c.Takes[0]
		return fmt.Sprintf("%s would do, but %s", j.pickText(t.Pick, t.Size, inspect.PinsFor(t.Way)), j.noGauge(t.Target.Value))
	}
	kind := "pins"
	if g.g.Helical() {
		kind = "balls"
	}
	text := fmt.Sprintf("there are no %s in the shop that can be used", kind)
	if c.Passed != nil {
		text += fmt.Sprintf(" (nearest is Ø%s: %s)", c.Passed.Size.Label, j.passedReason(c.Passed))
	}
	if standard := j.choosePins(g); len(standard) > 0 && standard[0].From != idealOnly {
		text += fmt.Sprintf("; get two %s %s (%s)", pinText(standard[0].Diameter, j.display), kind, standard[0].From)
	}
	return text
}

// noGauge says that no instrument covers a reading, and which would.
func (j *job) noGauge(l inspect.Limits) string {
	return fmt.Sprintf("nothing in the shop covers %s; get %s", j.between(l), j.micrometerFor(l, "micrometer"))
}

func (j *job) between(l inspect.Limits) string {
	u := j.display
	if l.Width() == 0 {
		return j.length(l.Min)
	}
	return fmt.Sprintf("%s to %s %s", u.Format(l.Min, u.Decimals()), u.Format(l.Max, u.Decimals()), u)
}

// micrometerFor names the usual micrometer that covers a reading.
func (j *job) micrometerFor(l inspect.Limits, kind string) string {
	step := 25.0 // mm, or 1 in
	if j.display == inspect.Inch {
		step = 25.4
	}
	low := math.Floor(l.Min/step) * step
	if l.Max > low+step {
		return "one that does"
	}
	return fmt.Sprintf("a %s-%s %s %s", short(low, j.display), short(low+step, j.display), j.display, kind)
}

// missingSpan says what a span lacks.
func (j *job) missingSpan(c inspect.SpanTake) string {
	reading := c.Target.Value
	get := "get " + j.micrometerFor(reading, "disc micrometer")
	switch {
	case math.IsInf(c.Room, 1):
		get = "get " + j.micrometerFor(reading, "micrometer") + "; plain anvils do"
	case c.Room > 0:
		get += fmt.Sprintf(" with faces up to %s thick", j.lengthDown(c.Room))
	default:
		return "a face that reaches its contact meets the root or the next tooth; no instrument measures it"
	}
	if c.Lack == inspect.NoRange {
		return fmt.Sprintf("nothing in the shop covers %s; %s", j.between(reading), get)
	}
	if f := c.Short.Face; f.Kind == inspect.Jaws && f.Thickness == 0 {
		return fmt.Sprintf("the %s gets in if its jaws are no more than %s thick; write it into the shop file, jaw = …", c.Short.Name, j.lengthDown(c.Room))
	}
	return fmt.Sprintf("the %s does not get in (%s); %s", c.Short.Name, j.faceText(c.Short.Face), get)
}

func (j *job) faceText(f inspect.Face) string {
	switch {
	case f.Kind == inspect.DiscAnvil:
		return fmt.Sprintf("discs %s thick", j.length(f.Thickness))
	case f.Kind == inspect.Jaws && f.Thickness > 0:
		return fmt.Sprintf("jaws %s thick", j.length(f.Thickness))
	case f.Kind == inspect.Jaws:
		return "jaws"
	}
	return "plain anvils"
}

// whySpan says why an instrument measures a span.
func (j *job) whySpan(c inspect.SpanTake, q inspect.Subject) string {
	why := j.faceText(c.Gauge.Face) + " pass the next teeth"
	if !math.IsInf(c.Room, 1) {
		why = fmt.Sprintf("%s go into spaces that take %s", j.faceText(c.Gauge.Face), j.lengthDown(c.Room))
	}
	if q.Gear.Helical() {
		why += ", set square to the helix"
	}
	return why
}

// measuredNote words that the shop's pins of a size asked for are measured.
func (j *job) measuredNote(p pinTarget) string {
	if p.ShopMeasured == nil {
		return ""
	}
	d := strings.TrimPrefix(pinText(*p.ShopMeasured, j.display), "Ø")
	return fmt.Sprintf("In the shop %s is %s (%s); --pin %s%s computes with that", pinText(p.Pin, j.display),
		j.knownText(p.shopPick), strings.ReplaceAll(fromPins(p.shopPick), "shop, ", ""), d, j.display)
}
