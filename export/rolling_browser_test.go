package export

import (
	"encoding/json"
	"fmt"
	"math"
	"testing"

	"flankwright/involute"
)

// rollingScript stops the picture at several times and notes how the gears are
// turned (by the matrices the browser draws with), and where the dots are that it shows.
const rollingScript = `
svg.pauseAnimations()
const turn = id => {
	const g = svg.getElementById(id)
	const own = g.parentNode.getScreenCTM().inverse().multiply(g.getScreenCTM())
	return Math.atan2(own.b, own.a)
}
return %s.map(time => {
	svg.setCurrentTime(time)
	const seen = [...svg.querySelectorAll("#contacts circle")].filter(c => getComputedStyle(c).opacity === "1")
	return {First: turn("first"), Second: turn("second"), Dots: seen.map(c => [c.cx.animVal.value, c.cy.animVal.value])}
})`

// A browser plays the picture as it is meant: turns and dots are those that the
// attributes say by the rules of SMIL, at times before and after a loop's end.
func TestBrowserRolls(t *testing.T) {
	s, _ := drawnMeshes()[1].make(t, 0.005)
	data, err := RollingSVG(s)
	if err != nil {
		t.Fatal(err)
	}
	times := []float64{0, 0.6, 1.7, 2.5, 3.9, 4.99, 5.01, 8.3}
	list, err := json.Marshal(times)
	if err != nil {
		t.Fatal(err)
	}
	var got []struct {
		First, Second float64
		Dots          [][2]float64
	}
	browse(t, &got, fmt.Sprintf(rollingScript, list), data)
	if len(got) != len(times) {
		t.Fatalf("%d times shown, want %d", len(got), len(times))
	}
	const slack = 1e-4 // browsers reckon in single precision
	f := newFilm(t, data)
	for i, at := range times {
		tau := math.Mod(at/rollingSeconds, 1)
		turn1, turn2 := f.turns(t, tau)
		if !near(slack, got[i].First, -turn1, got[i].Second, -turn2) {
			t.Errorf("at %g s: turned by %.6f and %.6f, want %.6f and %.6f", at, got[i].First, got[i].Second, -turn1, -turn2)
		}
		dots := f.dots(t, tau)
		if len(dots) != len(got[i].Dots) {
			t.Errorf("at %g s: %d dots, want %d", at, len(got[i].Dots), len(dots))
			continue
		}
		for j, q := range dots {
			if d := q.Sub(involute.Vec{X: got[i].Dots[j][0], Y: -got[i].Dots[j][1]}).Norm(); d > slack {
				t.Errorf("at %g s: dot %d is %g mm off", at, j, d)
			}
		}
	}
}
