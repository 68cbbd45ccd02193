package export

import (
	"fmt"

	"flankwright/involute"
)

// viewHeading is the height of a picture's heading, noteHeight of the line below it, mm.
const (
	viewHeading = 7.5
	noteHeight  = 4.5
)

// views sets the pictures side by side, or the one there is across the page.
func (s Sheet) views(b *board, room box) {
	const gutter = 8.0
	const leastHeight = 28.0
	if room.height() < leastHeight {
		return
	}
	left, right := room, room
	if s.Pins != nil && s.Span != nil {
		half := columns(room.width()-gutter, 1.15, 1)
		left.X1 = room.X0 + half[0]
		right.X0 = left.X1 + gutter
	}
	if s.Pins != nil {
		s.pinPicture(b, left)
	}
	if s.Span != nil {
		s.spanPicture(b, right)
	}
}

// viewFrame returns the box left for a picture between its heading and its note, which viewWords sets.
func viewFrame(room box) box {
	return box{X0: room.X0, X1: room.X1, Y0: room.Y0 + noteHeight, Y1: room.Y1 - viewHeading}
}

// viewWords sets the words round a picture: its title and scale above, its note below.
func (b *board) viewWords(room box, title, scale, note string) {
	b.heading(room.X0, room.X1, room.Y1, title, scale)
	b.sayIn(room.X0, room.Y0+1, room.width(), note, labelLetters(), alignLeft)
}

func (v *PinView) check() error {
	if v == nil {
		return nil
	}
	if len(v.Centers) < 2 || len(v.Centers) > 3 {
		return fmt.Errorf("picture over %d pins: must be 2 or 3", len(v.Centers))
	}
	for _, c := range v.Centers {
		if !finite(c.X, c.Y) || c.Norm() == 0 {
			return fmt.Errorf("pin at (%g, %g): must be finite and off the center", c.X, c.Y)
		}
	}
	if !positive(v.Diameter) {
		return fmt.Errorf("pin diameter %g mm: must be above 0", v.Diameter)
	}
	if v.axis().Norm() == 0 {
		return fmt.Errorf("pins at one place: the first must lie opposite the others")
	}
	return nil
}

func (v *SpanView) check() error {
	if v == nil {
		return nil
	}
	if !finite(v.From.X, v.From.Y, v.To.X, v.To.Y) || v.From == v.To {
		return fmt.Errorf("span from (%g, %g) to (%g, %g): must be two finite points", v.From.X, v.From.Y, v.To.X, v.To.Y)
	}
	if v.Teeth < 1 || !positive(v.Reach) {
		return fmt.Errorf("span over %d teeth with faces of %g mm: both must be above 0", v.Teeth, v.Reach)
	}
	return nil
}

// axis returns the direction of the measurement, from the pins of the lower anvil to the first pin.
func (v *PinView) axis() involute.Vec {
	mean := involute.Vec{}
	for _, c := range v.Centers[1:] {
		mean = mean.Add(c.Scale(1 / float64(len(v.Centers)-1)))
	}
	return v.Centers[0].Sub(mean)
}
