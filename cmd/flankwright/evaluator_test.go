package main

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"
)

// An evaluator works out an expression by itself, from nothing but its text
// and the numbers given: it shares no code with the program.
//
//	sum = term {("+"|"-") term}; term = factor {("*"|"/") factor};
//	factor = ["-"] power; power = atom ["^" factor];
//	atom = number | "pi" | function "(" sum ")" | symbol | "(" sum ")"
type evaluator struct {
	text string
	vals map[string]float64 // by symbol; angles in radians
	used map[string]bool
	err  error
}

func evaluate(text string, vals map[string]float64) (float64, map[string]bool, error) {
	e := &evaluator{text: text, vals: vals, used: map[string]bool{}}
	v := e.sum()
	if e.skip(); e.text != "" {
		e.fail("cannot read %q", e.text)
	}
	return v, e.used, e.err
}

func (e *evaluator) fail(format string, args ...any) {
	if e.err == nil {
		e.err = fmt.Errorf(format, args...)
	}
	e.text = ""
}

func (e *evaluator) skip() { e.text = strings.TrimLeft(e.text, " ") }

func (e *evaluator) take(s string) bool {
	e.skip()
	rest, ok := strings.CutPrefix(e.text, s)
	if ok {
		e.text = rest
	}
	return ok
}

func (e *evaluator) sum() float64 {
	v := e.term()
	for {
		switch {
		case e.take("+"):
			v += e.term()
		case e.take("-"):
			v -= e.term()
		default:
			return v
		}
	}
}

func (e *evaluator) term() float64 {
	v := e.factor()
	for {
		switch {
		case e.take("*"):
			v *= e.factor()
		case e.take("/"):
			v /= e.factor()
		default:
			return v
		}
	}
}

func (e *evaluator) factor() float64 {
	if e.take("-") {
		return -e.factor()
	}
	v := e.atom()
	if e.take("^") {
		return math.Pow(v, e.factor())
	}
	return v
}

func (e *evaluator) atom() float64 {
	if e.take("(") {
		v := e.sum()
		if !e.take(")") {
			e.fail("a ) is missing before %q", e.text)
		}
		return v
	}
	e.skip()
	if r, _ := utf8.DecodeRuneInString(e.text); unicode.IsDigit(r) {
		n := strings.IndexFunc(e.text, func(r rune) bool { return r != '.' && !unicode.IsDigit(r) })
		word := e.word(n)
		v, err := strconv.ParseFloat(word, 64)
		if err != nil {
			e.fail("%q is no number", word)
		}
		return v
	}
	word := e.word(strings.IndexFunc(e.text, func(r rune) bool { return r != '_' && !unicode.IsDigit(r) && !unicode.IsLetter(r) }))
	if e.take("(") {
		v := e.sum()
		if !e.take(")") {
			e.fail("a ) is missing before %q", e.text)
		}
		f, ok := evaluatorFunctions()[word]
		if !ok {
			e.fail("%q is no function", word)
			return 0
		}
		return f(v)
	}
	if word == "pi" {
		return math.Pi
	}
	v, ok := e.vals[word]
	if !ok {
		e.fail("no number is given for %q", word)
	}
	e.used[word] = true
	return v
}

// word takes the next n bytes, all for −1.
func (e *evaluator) word(n int) string {
	if n < 0 {
		n = len(e.text)
	}
	if n == 0 {
		e.fail("a number or a name is missing before %q", e.text)
		return ""
	}
	w := e.text[:n]
	e.text = e.text[n:]
	return w
}

func evaluatorFunctions() map[string]func(float64) float64 {
	return map[string]func(float64) float64{
		"sin": math.Sin, "cos": math.Cos, "tan": math.Tan, "asin": math.Asin, "acos": math.Acos, "atan": math.Atan,
		"sqrt": math.Sqrt, "abs": math.Abs, "inv": func(a float64) float64 { return math.Tan(a) - a },
	}
}
