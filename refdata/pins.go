package refdata

import "math"

// mmPerInch is the international inch, exact by definition (ISO 80000-3).
const mmPerInch = 25.4

// A Pin is a measuring pin or ball for gears as it is sold.
type Pin struct {
	Diameter float64 // mm
	Source   Source
}

// GearPins returns the metric measuring pins and balls of DIN 3977, ascending.
func GearPins() []Pin {
	rs := records("gear_pins")
	pins := make([]Pin, len(rs))
	for i, r := range rs {
		pins[i] = Pin{r.number("diameter_mm"), r.source()}
	}
	return pins
}

// A PinSet is a box of gauge pins in even steps.
type PinSet struct {
	Name              string
	First, Last, Step float64 // in Unit
	Unit              string  // "mm" or "in"
	Source            Source
	Note              string
}

// PinSets returns the usual boxed sets of gauge pins, inch sets first.
func PinSets() []PinSet {
	rs := records("pin_sets")
	sets := make([]PinSet, len(rs))
	for i, r := range rs {
		sets[i] = PinSet{
			Name:   r.text("name"),
			First:  r.number("first"),
			Last:   r.number("last"),
			Step:   r.number("step"),
			Unit:   r.text("unit"),
			Source: r.source(),
			Note:   r.text("note"),
		}
	}
	return sets
}

// Sizes returns the diameters of the set's pins in mm, ascending.
func (s PinSet) Sizes() []float64 {
	// Counting in ten-thousandths keeps every size the float64 nearest to its
	// decimals, which adding up steps would not.
	const unit = 1e4
	first, last, step := math.Round(s.First*unit), math.Round(s.Last*unit), math.Round(s.Step*unit)
	var sizes []float64
	for n := first; step > 0 && n <= last; n += step {
		size := n / unit
		if s.Unit == "in" {
			size *= mmPerInch
		}
		sizes = append(sizes, size)
	}
	return sizes
}

// A PinFactor is a series of pins that goes by pitch: the pin's diameter is
// Factor/P in inches, Factor times the normal module in mm.
type PinFactor struct {
	Name   string
	Factor float64
	Role   string // "external"; "external, long addendum"; "internal"; "alternate"
	Source Source
	Note   string
}

// PinSeries returns the pin series by diametral pitch.
func PinSeries() []PinFactor {
	rs := records("pin_series")
	series := make([]PinFactor, len(rs))
	for i, r := range rs {
		series[i] = PinFactor{r.text("name"), r.number("factor"), r.text("role"), r.source(), r.text("note")}
	}
	return series
}
