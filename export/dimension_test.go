package export

import (
	"testing"

	"flankwright/involute"
)

// Arrows point at what is measured, from inside where the words fit and from outside where not.
func TestDimensionArrows(t *testing.T) {
	fonts, err := loadTypeface()
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name     string
		from, to involute.Vec
		inside   bool
	}{
		{"long level", involute.Vec{X: 10, Y: 50}, involute.Vec{X: 60, Y: 50}, true},
		{"short level", involute.Vec{X: 10, Y: 50}, involute.Vec{X: 20, Y: 50}, false},
		{"long upright", involute.Vec{X: 10, Y: 50}, involute.Vec{X: 10, Y: 90}, true},
		{"short upright", involute.Vec{X: 10, Y: 50}, involute.Vec{X: 10, Y: 55}, false},
	} {
		b := &board{typeface: fonts}
		b.dimension(c.from, c.to, "M 12.345 mm", dimensionLetters())
		var tips, backs []involute.Vec
		var words textLine
		for _, e := range b.elements {
			switch e := e.(type) {
			case shape:
				if v := e.Outline.Vertices; len(v) == 3 && e.Style.Fill == black {
					tips = append(tips, v[0].P)
					backs = append(backs, v[1].P.Add(v[2].P).Scale(0.5))
				}
			case textLine:
				words = e
			}
		}
		if len(tips) != 2 || tips[0] != c.from || tips[1] != c.to {
			t.Errorf("%s: arrow tips %v, want %v and %v", c.name, tips, c.from, c.to)
			continue
		}
		along := c.to.Sub(c.from)
		if inside := backs[0].Sub(c.from).Dot(along) > 0; inside != c.inside {
			t.Errorf("%s: arrow inside %v, want %v", c.name, inside, c.inside)
		}
		if words.Words != "M 12.345 mm" || words.At.X != (c.from.X+c.to.X)/2 {
			t.Errorf("%s: words %q at %v", c.name, words.Words, words.At)
		}
	}
}
