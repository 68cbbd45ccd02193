package export

import (
	"fmt"
	"math"
	"strings"

	"flankwright/involute"
)

// sampleGear is a gear with straight-sided teeth, a space centered at +y: enough to lay out a sheet.
func sampleGear(z int, m float64, bore float64) GearShape {
	d := m * float64(z)
	g := GearShape{Teeth: z, Reference: d, Root: d - 2.5*m, Tip: d + 2*m}
	pitch := 2 * math.Pi / float64(z)
	for i := range z {
		space := math.Pi/2 + float64(i)*pitch // middle of the space before tooth i
		at := func(share float64) float64 { return space + share*pitch }
		arc := func(width float64) float64 { return math.Tan(width * pitch / 4) }
		g.Outline.Vertices = append(g.Outline.Vertices,
			Vertex{P: involute.Polar(g.Root/2, at(-0.12)), Bulge: arc(0.24)},
			Vertex{P: involute.Polar(g.Root/2, at(0.12))},
			Vertex{P: involute.Polar(g.Tip/2, at(0.36)), Bulge: arc(0.28)},
			Vertex{P: involute.Polar(g.Tip/2, at(0.64))})
	}
	if bore > 0 {
		g.Bore = []Path{circlePath(involute.Vec{}, bore)}
	}
	return g
}

// samplePins puts two pins into opposite spaces.
func samplePins(g GearShape, m, pin float64) *PinView {
	r := g.Reference/2 + 0.1*m
	across := math.Pi/2 + math.Pi
	if g.Teeth%2 == 1 {
		across += math.Pi / float64(g.Teeth)
	}
	return &PinView{Centers: []involute.Vec{involute.Polar(r, math.Pi/2), involute.Polar(r, across)}, Diameter: pin}
}

// sampleSpan spans k teeth from pitch point to pitch point.
func sampleSpan(g GearShape, m float64, k int) *SpanView {
	middle := math.Pi / 2
	if k%2 == 1 {
		middle += math.Pi / float64(g.Teeth)
	}
	half := (float64(k)/2 - 0.25) * 2 * math.Pi / float64(g.Teeth)
	return &SpanView{From: involute.Polar(g.Reference/2, middle+half), To: involute.Polar(g.Reference/2, middle-half), Teeth: k, Reach: 1.1 * m}
}

func sampleMethod() []string {
	return []string{
		"Clean pins, teeth and anvils; deburr the tips. Gear and instrument at 20 °C.",
		"Set a pin in a space and the other in the space opposite; for odd teeth in the nearest to opposite.",
		"Rock the gear under light pressure and take the largest reading over the pins.",
		"Measure at four places round the gear, write all four, and compare their mean with the limits.",
	}
}

func sampleCautions() []string {
	return []string{
		"Targets hold for the pin size stated; a pin that differs by 0.005 mm (0.0002 in) shifts the reading by about three times as much. Stop the spindle before measuring.",
		"Guard gears that run. Where people could be hurt, local codes, the machine's guarding rules and a licensed engineer decide.",
	}
}

// inchSheet is an 18-tooth inch gear.
func inchSheet() Sheet {
	m := 25.4 / 16
	g := sampleGear(18, m, 12.7)
	pins, span := samplePins(g, m, 2.7432), sampleSpan(g, m, 3)
	pins.Title, pins.Dimension, pins.Label = "Over two pins", "M 1.3206 in", "2 pins (wires) Ø 0.1080 in"
	span.Title, span.Dimension = "Span over 3 teeth", "W 0.4817 in"
	return Sheet{
		Title: "Indexing fixture, table drive", Gear: "driver", Part: "Drive gear", DrawingNumber: "IF-104", Material: "Steel 4140, 28 HRC",
		Data: []Field{
			{Label: "Teeth", Value: "18"}, {Label: "Diametral pitch", Value: "16 /in", Other: "module 1.5875"}, {Label: "Pressure angle", Value: "20°"},
			{Label: "Helix angle, hand", Value: "spur"}, {Label: "Profile shift", Value: "x = +0.2500", Other: "0.0156 in"},
			{Label: "Outside (tip) diameter", Value: "1.2813 in", Other: "32.544 mm"}, {Label: "Pitch (reference) diameter", Value: "1.1250 in", Other: "28.575 mm"},
			{Label: "Root diameter (reference)", Value: "1.0000 in", Other: "25.400 mm"}, {Label: "Whole depth", Value: "0.1406 in", Other: "3.572 mm"},
			{Label: "Face width", Value: "0.5000 in", Other: "12.700 mm"},
		},
		InchFirst: true,
		Targets: []Target{
			{Measure: "Over two pins (wires)", With: "2 pins Ø 0.1080 in (2.743 mm), in opposite spaces", Low: Figure{"33.512", "1.3194"}, Aim: Figure{"33.543", "1.3206"}, High: Figure{"33.574", "1.3218"}},
			{Measure: "Span", With: "over 3 teeth", Low: Figure{"12.209", "0.4807"}, Aim: Figure{"12.235", "0.4817"}, High: Figure{"12.260", "0.4826"}},
			{Measure: "Chordal thickness", With: "at chordal height 0.0813 in (2.065 mm)", Low: Figure{"2.710", "0.1067"}, Aim: Figure{"2.737", "0.1078"}, High: Figure{"2.764", "0.1088"}},
		},
		Limits: []Field{
			{Label: "Tooth thickness", Value: "0.1067 … 0.1088 in", Other: "2.711 … 2.764 mm"},
			{Label: "Backlash allowed", Value: "0.0020 … 0.0050 in", Other: "0.051 … 0.127 mm"},
			{Label: "Reference temperature", Value: "20 °C (68 °F), ISO 1"},
		},
		Shape: g, Pins: pins, Span: span,
		Readings: []Reading{{"Over two pins Ø 0.1080 in", "1.3194 … 1.3218 in"}, {"Span over 3 teeth", "0.4807 … 0.4826 in"}},
		Method:   sampleMethod(), Cautions: sampleCautions(), Foot: "flankwright · driver · page 1 of 2",
	}
}

// helicalSheet is a large helical gear measured over balls.
func helicalSheet() Sheet {
	m := 4 / math.Cos(15*math.Pi/180)
	g := sampleGear(60, m, 60)
	pins, span := samplePins(g, m, 7), sampleSpan(g, m, 7)
	pins.Title, pins.Dimension, pins.Label = "Over two balls", "M 257.98 mm", "2 balls Ø 7.000 mm in one transverse plane"
	pins.Note = "Transverse section."
	span.Title, span.Dimension, span.Note = "Span over 7 teeth", "W 80.21 mm", "Transverse section; the span is taken across the helix, in the normal plane."
	s := inchSheet()
	s.Gear, s.Part, s.DrawingNumber, s.Date = "bull gear", "", "", ""
	s.InchFirst, s.Shape, s.Pins, s.Span = false, g, pins, span
	s.Data = []Field{
		{Label: "Teeth", Value: "60"}, {Label: "Normal module", Value: "4 mm", Other: "6.35 /in"}, {Label: "Pressure angle", Value: "20° normal"},
		{Label: "Helix angle, hand", Value: "15° right"}, {Label: "Profile shift", Value: "x = 0", Other: "0.000 mm"},
		{Label: "Outside (tip) diameter", Value: "256.466 mm", Other: "10.0971 in"}, {Label: "Pitch (reference) diameter", Value: "248.466 mm", Other: "9.7821 in"},
		{Label: "Root diameter (reference)", Value: "238.466 mm", Other: "9.3884 in"}, {Label: "Whole depth", Value: "9.000 mm", Other: "0.3543 in"},
		{Label: "Face width", Value: "40.000 mm", Other: "1.5748 in"}, {Label: "Rack", Value: "ISO 53 A"},
	}
	s.Targets = []Target{
		{Measure: "Over two balls", With: "2 balls Ø 7.000 mm (0.2756 in) in one plane square to the axis", Low: Figure{"257.912", "10.1540"}, Aim: Figure{"257.981", "10.1567"}, High: Figure{"258.050", "10.1594"}},
		{Measure: "Over two rollers", With: "exactly opposed, free anvils", Unusable: "the face is 40 mm wide; the offset rollers need at least 52.3 mm to lie on both flanks"},
		{Measure: "Span", With: "over 7 teeth, across the helix", Low: Figure{"80.182", "3.1568"}, Aim: Figure{"80.208", "3.1578"}, High: Figure{"80.234", "3.1588"}},
		{Measure: "Chordal thickness", With: "normal, at chordal height 4.037 mm (0.1589 in)", Low: Figure{"6.211", "0.2446"}, Aim: Figure{"6.235", "0.2455"}, High: Figure{"6.259", "0.2464"}},
	}
	s.Readings = []Reading{{"Over two balls Ø 7.000 mm", "257.912 … 258.050 mm"}, {"Span over 7 teeth", "80.182 … 80.234 mm"}}
	s.Warnings = []string{"narrow-face: the face is too narrow for rollers over the odd helical space; measure over balls."}
	return s
}

// tinySheet is a fine-pitch pinion.
func tinySheet() Sheet {
	g := sampleGear(13, 0.5, 2)
	pins, span := samplePins(g, 0.5, 0.9), sampleSpan(g, 0.5, 2)
	pins.Title, pins.Dimension, pins.Label = "Over two pins", "M 7.812 mm", "2 pins Ø 0.900 mm"
	span.Title, span.Dimension = "Span over 2 teeth", "W 2.301 mm"
	s := helicalSheet()
	s.Gear, s.Shape, s.Pins, s.Span, s.Warnings = "pinion", g, pins, span, nil
	return s
}

// crowdedSheet has too much of everything.
func crowdedSheet() Sheet {
	s := helicalSheet()
	s.Title = "Replacement for the table drive of the large rotary indexing fixture in the second bay, second set, with longer addendum and a wide face for the shared idler"
	s.Gear = "intermediate idler, second stage"
	s.Material = "Case-hardening steel 16MnCr5, carburized 0.8 mm deep and ground"
	s.Part = strings.Repeat("unbreakable", 6)
	for i := range 6 {
		s.Targets = append(s.Targets, Target{Measure: fmt.Sprintf("Over two pins, choice %d", i+1), With: "2 pins Ø 5.500 mm (0.2165 in)",
			Unusable: "the pin touches the flank at 76.31 mm, above the usable part which ends at 75.94 mm, and an anvil cannot reach it because it sits below the tip circle"})
	}
	for i := range 9 {
		s.Warnings = append(s.Warnings, fmt.Sprintf("undercut-%d: the involute starts at 47.924 mm, above the base circle; pins must touch farther out, and contact with the mate begins later than the tip circles say. Take a larger pin or shift the profile.", i))
	}
	s.Cautions = append(s.Cautions, s.Cautions...)
	return s
}
