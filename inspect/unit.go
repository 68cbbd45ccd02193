// Package inspect says what to measure on a gear, with which limits, and reads
// and writes lengths as drawings do.
package inspect

import (
	"math"
	"strconv"
	"strings"
)

// A Unit is a length unit as readers of drawings use it. Inside the program
// every length is in mm; a Unit only speaks at the edge.
type Unit int

// The two length units of the trade.
const (
	Millimeter Unit = iota
	Inch
)

// MM returns the unit's length in mm: 1, or 25.4 exactly (ISO 80000-3; the international inch of 1959).
func (u Unit) MM() float64 {
	if u == Inch {
		return 25.4
	}
	return 1
}

// String returns "mm" or "in".
func (u Unit) String() string {
	if u == Inch {
		return "in"
	}
	return "mm"
}

// Decimals returns how many decimals a length is printed with: 0.001 mm, 0.0001 in.
func (u Unit) Decimals() int {
	if u == Inch {
		return 4
	}
	return 3
}

// Other returns the other unit.
func (u Unit) Other() Unit { return 1 - u }

// Format returns a length in mm in the unit u, rounded to the nearest at the
// given number of decimals, without the unit's name and never as "-0".
func (u Unit) Format(mm float64, decimals int) string {
	return fixed(nudged(mm/u.MM(), decimals), decimals)
}

// nudged moves a number away from zero by far less than its last printed digit
// shows, so that one that is exactly between two printable ones, but for
// rounding, is printed alike on every machine: 1.28125 in to four places.
func nudged(x float64, decimals int) float64 {
	return x + math.Copysign(rounding*math.Pow10(-decimals), x)
}

// fixed prints x with decimals places, and a zero without a sign.
func fixed(x float64, decimals int) string {
	s := strconv.FormatFloat(x, 'f', decimals, 64)
	if strings.HasPrefix(s, "-") && strings.Trim(s, "-0.") == "" {
		return s[1:]
	}
	return s
}

// rounding is the share of the last printed digit by which a limit may lie
// beyond a printable number and still be printed as that number: it takes up
// the noise of float64 (1e-12 mm) and is far below what any gauge can tell.
const rounding = 1e-6

// moreDigits bounds how many digits beyond the usual ones a narrow range may take.
const moreDigits = 12

// A Printed is a pair of limits as text, rounded inward.
type Printed struct {
	Low, High string
	Decimals  int
	More      bool // more decimals than asked, because the range would have been empty
}

// FormatLimits prints limits rounded inward, the lower up and the upper down,
// so that no printed value lies outside them. Where that would leave nothing
// between them, more decimals are taken; where the two are one value, it is
// printed to the nearest.
func (u Unit) FormatLimits(l Limits, decimals int) Printed {
	lo, hi := l.Min/u.MM(), l.Max/u.MM()
	for more := range moreDigits {
		n := decimals + more
		scale := math.Pow(10, float64(n))
		a, b := math.Ceil(lo*scale-rounding), math.Floor(hi*scale+rounding)
		if a <= b {
			return Printed{fixed(a/scale, n), fixed(b/scale, n), n, more > 0}
		}
		if hi-lo <= rounding/math.Pow(10, float64(u.Decimals())) {
			break
		}
	}
	return Printed{Low: u.Format(l.Min, decimals), High: u.Format(l.Max, decimals), Decimals: decimals}
}

// Limits is a range of a quantity, mm unless said otherwise, Min ≤ Max.
type Limits struct{ Min, Max float64 }

// Middle returns the middle of the range.
func (l Limits) Middle() float64 { return l.Min + (l.Max-l.Min)/2 }

// Width returns Max − Min.
func (l Limits) Width() float64 { return l.Max - l.Min }

// ordered returns the limits of two values in either order.
func ordered(a, b float64) Limits { return Limits{min(a, b), max(a, b)} }
