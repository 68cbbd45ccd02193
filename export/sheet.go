package export

import (
	"fmt"
	"strings"

	"flankwright/involute"
)

// A Sheet is what an inspection sheet of one gear says: numbers already worded
// and rounded, and the gear's shape. LayoutSheet puts it on a page. Empty
// values of the head leave room to write.
type Sheet struct {
	Title         string // the job, largest on the page; may be blank
	Gear          string // which gear of the job, at the upper right
	Part          string // part name or number
	DrawingNumber string
	Material      string
	Author        string
	Date          string

	Data []Field // the gear's numbers for the head: teeth, module, diametral pitch, pressure angle, helix and hand, profile shift, diameters, whole depth

	InchFirst bool     // the inch is the large figure of the targets, else the mm
	Targets   []Target // what to measure, most useful first
	Limits    []Field  // what the targets serve: tooth thickness limits, backlash, reference temperature

	Shape GearShape // drawn in the views
	Pins  *PinView  // nil for no picture over pins
	Span  *SpanView // nil for no picture of the span

	Readings []Reading // measures to write down round the gear, usually two
	Method   []string  // how to measure, in short lines; numbered by the sheet
	Warnings []string  // of the program, for this gear
	Cautions []string  // of every sheet, in small print
	Foot     string    // at the lower right: page, file, program
}

// A Field is a labelled value.
type Field struct {
	Label string
	Value string // blank: room to write
	Other string // the same in the other unit, smaller; may be blank
}

// A Target is a row of the table of targets.
type Target struct {
	Measure        string // "Over two pins"
	With           string // pin size or number of teeth, and what else to know
	Low, Aim, High Figure // all blank texts leave the cell blank
	Unusable       string // the reason not to use it, shown in place of the figures
}

// A Figure is a length in both units, without the unit's name.
type Figure struct{ MM, Inch string }

// A Reading is a row of blanks for one measure round the gear.
type Reading struct {
	Measure string
	Limits  string // repeated beside the blanks
}

// A GearShape is an external gear in its transverse section: mm, the center at the origin.
type GearShape struct {
	Outline   Path    // the whole contour, counter-clockwise
	Bore      []Path  // bore with keyway, and holes; may be empty
	Hub       float64 // outside diameter of the hub, mm, 0 for none
	Teeth     int
	Reference float64 // reference diameter, mm
	Root      float64 // root diameter, mm
	Tip       float64 // tip diameter, mm
}

// A PinView is the picture of the measurement over pins or balls: the first pin
// lies against one anvil, the others (one or two) against the opposite one.
type PinView struct {
	Title     string         // above the picture: "Over two pins"
	Centers   []involute.Vec // in the gear's coordinates, each in a tooth space
	Diameter  float64        // of the pins, mm
	Dimension string         // on the dimension line
	Label     string         // of the pins
	Note      string         // under the picture, after the scale; may be blank
}

// A SpanView is the picture of the span measurement: two parallel faces that
// touch the flanks at From and To.
type SpanView struct {
	Title     string       // above the picture: "Span over 3 teeth"
	From, To  involute.Vec // points of contact in the gear's coordinates
	Teeth     int          // spanned
	Reach     float64      // how far a face reaches from its point of contact to either side, mm
	Dimension string       // on the dimension line
	Note      string       // under the picture, after the scale; may be blank
}

// A PageSize is a paper format, upright.
type PageSize int

// The two formats shops print on: ISO 216 A4, and ANSI/ASME Y14.1 size A, called Letter.
const (
	A4 PageSize = iota
	Letter
)

// Size returns width and height in mm: 210 × 297, or 8.5 × 11 in.
func (p PageSize) Size() (width, height float64) {
	if p == Letter {
		return 8.5 * 25.4, 11 * 25.4
	}
	return 210, 297
}

// String returns "a4" or "letter".
func (p PageSize) String() string {
	if p == Letter {
		return "letter"
	}
	return "a4"
}

// ParsePageSize reads "a4" or "letter", in any case.
func ParsePageSize(s string) (PageSize, error) {
	for _, p := range []PageSize{A4, Letter} {
		if strings.EqualFold(s, p.String()) {
			return p, nil
		}
	}
	return A4, fmt.Errorf("page size %q: must be a4 or letter", s)
}

// sheetMargin is white on all sides of the page, mm.
const sheetMargin = 14.0

// A density is how closely a sheet is set, from generous to crowded.
type density struct {
	targetRow   float64 // height of a row of targets, mm
	unusableRow float64 // height of a row of targets not to be used, mm
	readingRow  float64 // height of a row of readings, mm
	small       float64 // size of notes against their normal size
	lines       int     // most lines of warnings, and of cautions
	targets     int     // most rows of targets
	gap         float64 // between sections, mm
}

// densities returns the ways to set a sheet; the last always leaves room for the views.
func densities() []density {
	return []density{
		{targetRow: 13, unusableRow: 10, readingRow: 9, small: 1, lines: 40, targets: 12, gap: 5},
		{targetRow: 11, unusableRow: 8.5, readingRow: 8, small: 0.94, lines: 40, targets: 12, gap: 4},
		{targetRow: 9.5, unusableRow: 7.5, readingRow: 7.5, small: 0.88, lines: 40, targets: 12, gap: 3},
		{targetRow: 9, unusableRow: 7.2, readingRow: 7, small: 0.84, lines: 12, targets: 7, gap: 2.4},
		{targetRow: 8.5, unusableRow: 7.2, readingRow: 7, small: 0.84, lines: 5, targets: 5, gap: 2.2},
	}
}

// leastView is the least height left for the pictures before the rest is set closer, mm.
const leastView = 52.0

// LayoutSheet puts a sheet on a page. Nothing leaves its place: long words wrap,
// shrink or, at last, end in an ellipsis. A shape or view with impossible numbers is refused.
func LayoutSheet(s Sheet, size PageSize) (Drawing, error) {
	if err := s.check(); err != nil {
		return Drawing{}, err
	}
	fonts, err := loadTypeface()
	if err != nil {
		return Drawing{}, err
	}
	width, height := size.Size()
	page := box{X0: sheetMargin, Y0: sheetMargin, X1: width - sheetMargin, Y1: height - sheetMargin}
	d := Drawing{Title: s.Title, Width: width, Height: height}
	choices := densities()
	for i, dense := range choices {
		b := &board{typeface: fonts}
		room := s.frame(b, page, dense)
		if room.height() < leastView && i < len(choices)-1 {
			continue
		}
		s.views(b, room)
		d.elements = b.elements
		break
	}
	return d, nil
}

// frame sets everything but the views and returns the room left for them.
func (s Sheet) frame(b *board, page box, dense density) box {
	y := s.head(b, page)
	y = s.targetTable(b, page, y-dense.gap, dense)
	room := box{X0: page.X0, X1: page.X1, Y1: y - dense.gap}
	below := func(b *board, top float64) float64 {
		top = s.readingTable(b, page, top, dense)
		top = s.notes(b, page, top-dense.gap, dense)
		return s.foot(b, page, top, dense)
	}
	trial := &board{typeface: b.typeface}
	used := -below(trial, 0)
	top := page.Y0 + used
	below(b, top)
	room.Y0 = top + dense.gap
	return room
}

// check refuses shapes and views that cannot be drawn.
func (s Sheet) check() error {
	g := s.Shape
	if s.Pins == nil && s.Span == nil {
		return nil
	}
	if g.Teeth < 1 || !positive(g.Root) || !(g.Tip > g.Root) || !positive(g.Tip) || !positive(g.Reference) {
		return fmt.Errorf("sheet of %q: %d teeth, diameters root %g, reference %g, tip %g mm: must be above 0, the tip above the root",
			s.Gear, g.Teeth, g.Root, g.Reference, g.Tip)
	}
	for _, p := range append([]Path{g.Outline}, g.Bore...) {
		if err := (shape{Outline: p.line()}).check(); err != nil {
			return fmt.Errorf("sheet of %q: %w", s.Gear, err)
		}
	}
	if err := s.Pins.check(); err != nil {
		return fmt.Errorf("sheet of %q: %w", s.Gear, err)
	}
	if err := s.Span.check(); err != nil {
		return fmt.Errorf("sheet of %q: %w", s.Gear, err)
	}
	return nil
}
