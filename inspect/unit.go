package inspect

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
