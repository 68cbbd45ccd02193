package main

import (
	"math"
	"testing"
)

// Turns of the crank of a 40:1 dividing head: 6, 15 and 42 divisions as printed in
// a US Army training text on milling and a school practice sheet (read), the
// rest by their arithmetic.
func TestHeadTurns(t *testing.T) {
	for z, want := range map[int]string{
		6: "6 + 2/3", 7: "5 + 5/7", 13: "3 + 1/13", 15: "2 + 2/3", 17: "2 + 6/17", 20: "2", 24: "1 + 2/3", 28: "1 + 3/7",
		36: "1 + 1/9", 40: "1", 42: "20/21", 48: "5/6", 57: "40/57", 65: "8/13", 80: "1/2", 100: "2/5",
	} {
		if got := headTurns(z); got != want {
			t.Errorf("%d divisions: %s turns, want %s", z, got, want)
		}
	}
}

// Degrees, minutes and seconds, with seconds that round up to a whole minute.
func TestAngleDMS(t *testing.T) {
	for deg, want := range map[float64]string{
		8: "8°00'00.0\"", 360.0 / 17: "21°10'35.3\"", 360.0 / 7: "51°25'42.9\"", 12.5: "12°30'00.0\"", 1 - 1e-9: "1°00'00.0\"",
	} {
		if got := angleDMS(deg * math.Pi / 180); got != want {
			t.Errorf("%v° = %s, want %s", deg, got, want)
		}
	}
}
