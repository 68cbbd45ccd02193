package main

import (
	"strconv"

	"flankwright/involute"
)

// A quantity is a named number with its unit: mm, deg, or none.
type quantity struct {
	Symbol string  `json:"symbol"`
	Value  float64 `json:"value"`
	Unit   string  `json:"unit,omitempty"`
}

// An explanation shows how one result came about. Its equation is written so
// that it can be worked out with the numbers beside it: * / + - ^ ( ), pi, and
// inv, sin, cos, tan, asin, acos, atan, sqrt, abs of angles or numbers.
type explanation struct {
	What     string     `json:"what"`
	Equation string     `json:"equation"` // left = right; a solved one does not begin with the result
	Inputs   []quantity `json:"inputs"`
	Result   quantity   `json:"result"`
	Residual *float64   `json:"residual,omitempty"` // of a solved equation, left − right
	Source   string     `json:"source"`
}

// Sources that explanations name.
const (
	srcGear      = "ISO 21771:2007, clause 4 (individual gears)"
	srcPair      = "ISO 21771:2007, clause 5 (gear pairs)"
	srcThickness = "ISO/TR 10064-2:1996, tooth thickness"
	srcRack      = "ISO 53:1998, basic rack and its counterpart"
	srcGeometry  = "geometry of the involute"
)

// An explainer collects explanations about one subject.
type explainer struct {
	about string
	list  []explanation
}

// result adds a result that an equation gives at once.
func (e *explainer) result(what, equation string, r quantity, source string, in ...quantity) {
	e.list = append(e.list, explanation{What: what + ", " + e.about, Equation: equation, Inputs: in, Result: r, Source: source})
}

// solved adds a result found from an equation, with what is left of it.
func (e *explainer) solved(what, equation string, r quantity, residual float64, source string, in ...quantity) {
	e.list = append(e.list, explanation{What: what + ", " + e.about, Equation: equation, Inputs: in, Result: r, Residual: &residual, Source: source})
}

func mm(symbol string, v float64) quantity  { return quantity{symbol, v, "mm"} }
func num(symbol string, v float64) quantity { return quantity{symbol, v, ""} }
func deg(symbol string, rad float64) quantity {
	return quantity{symbol, rad / involute.Degree, "deg"}
}

// figure writes a number with all the digits that matter.
func figure(v float64) string {
	return strconv.FormatFloat(v, 'g', 15, 64)
}

func (q quantity) String() string {
	s := q.Symbol + " = " + figure(q.Value)
	if q.Unit != "" {
		s += " " + q.Unit
	}
	return s
}

// explanations prints how results came about.
func (p *page) explanations(list []explanation) {
	if len(list) == 0 {
		return
	}
	p.blank()
	p.head("How the numbers come about (mm and degrees)")
	for _, e := range list {
		p.blank()
		p.line("%s", e.What)
		p.line("  %s", e.Equation)
		for _, q := range e.Inputs {
			p.line("    %s", q)
		}
		if e.Residual != nil {
			p.line("  solved: %s", e.Result)
			p.line("  left − right: %.3g", *e.Residual)
		} else {
			p.line("  gives %s", e.Result)
		}
		p.line("  source: %s", e.Source)
	}
}
