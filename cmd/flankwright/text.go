package main

import (
	"fmt"
	"io"
	"os"
	"strings"
	"unicode/utf8"
)

// A page is text for the screen, made of blocks with figures that line up.
type page struct {
	b     strings.Builder
	color bool
}

// newPage makes a page; color only on a terminal and not where NO_COLOR is set.
func newPage(out io.Writer) *page {
	return &page{color: isTerminal(out) && os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb"}
}

func isTerminal(out io.Writer) bool {
	f, ok := out.(*os.File)
	if !ok {
		return false
	}
	info, err := f.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0
}

const (
	bold   = "\x1b[1m"
	yellow = "\x1b[33m"
	plain  = "\x1b[0m"
)

func (p *page) paint(style, text string) string {
	if !p.color {
		return text
	}
	return style + text + plain
}

func (p *page) line(format string, args ...any) { fmt.Fprintf(&p.b, format+"\n", args...) }

// blank ends a block, once.
func (p *page) blank() {
	if s := p.b.String(); s != "" && !strings.HasSuffix(s, "\n\n") {
		p.b.WriteByte('\n')
	}
}

func (p *page) head(text string) { p.line("%s", p.paint(bold, text)) }

// A grid is a table: a label, a unit, and a column a gear. Figures line up on
// the decimal point, texts to the left of it.
type grid struct {
	heads []string
	rows  [][]string // label, unit, cells
}

func (g *grid) row(label, unit string, cells ...string) {
	g.rows = append(g.rows, append([]string{label, unit}, cells...))
}

// section puts a heading line between rows.
func (g *grid) section(label string) { g.rows = append(g.rows, []string{label}) }

// grid prints a grid.
func (p *page) grid(g grid) {
	label, unit := 0, 0
	for _, r := range g.rows {
		if len(r) > 1 {
			label, unit = max(label, width(r[0])), max(unit, width(r[1]))
		}
	}
	cols := make([]column, len(g.heads))
	for i := range cols {
		cols[i] = g.column(i)
	}
	if strings.Join(g.heads, "") != "" {
		line := pad("", label) + "  " + pad("", unit)
		for i, h := range g.heads {
			line += "  " + padLeft(h, cols[i].total)
		}
		p.line("%s", p.paint(bold, strings.TrimRight(line, " ")))
	}
	for _, r := range g.rows {
		if len(r) == 1 {
			p.line("%s", p.paint(bold, r[0]))
			continue
		}
		line := pad(r[0], label) + "  " + pad(r[1], unit)
		for i, c := range r[2:] {
			line += "  " + cols[i].cell(c)
		}
		p.line("%s", strings.TrimRight(line, " "))
	}
}

// A column's widths: left of the decimal point, right of it with the point, and in all.
type column struct{ left, right, total int }

func (g *grid) column(i int) column {
	var c column
	texts := 0
	for _, r := range g.rows {
		if len(r) <= i+2 {
			continue
		}
		if l, rest, ok := split(r[i+2]); ok {
			c.left, c.right = max(c.left, width(l)), max(c.right, width(rest))
		} else {
			texts = max(texts, width(r[i+2]))
		}
	}
	c.total = max(c.left+c.right, texts, width(g.heads[i]))
	c.left = c.total - c.right
	return c
}

func (c column) cell(text string) string {
	if l, rest, ok := split(text); ok {
		return padLeft(l, c.left) + pad(rest, c.right)
	}
	return padLeft(text, c.total)
}

// split parts a figure at its decimal point; it is false for what is no figure.
func split(text string) (left, right string, ok bool) {
	if text == "" || strings.Trim(text, "+-−0123456789.") != "" || strings.Count(text, ".") > 1 {
		return "", "", false
	}
	i := strings.IndexByte(text, '.')
	if i < 0 {
		return text, "", true
	}
	return text[:i], text[i:], true
}

func width(s string) int { return utf8.RuneCountInString(s) }

func pad(s string, n int) string { return s + strings.Repeat(" ", max(0, n-width(s))) }

func padLeft(s string, n int) string { return strings.Repeat(" ", max(0, n-width(s))) + s }

// warnings prints warnings, last on every page.
func (p *page) warnings(ws []warning) {
	if len(ws) == 0 {
		return
	}
	p.blank()
	p.head("Warnings")
	for _, w := range ws {
		name := w.Code
		if w.Gear != "" {
			name += ", " + w.Gear
		}
		p.wrapped(p.paint(yellow, name)+": "+w.Text, "  ")
	}
}

// wrapped prints a text in lines of up to 100 characters, the later ones indented.
func (p *page) wrapped(text, indent string) {
	line := ""
	for _, word := range strings.Fields(text) {
		if line != "" && width(line)+1+width(word) > 100 {
			p.line("%s", line)
			line = indent + word
			continue
		}
		if line != "" {
			line += " "
		}
		line += word
	}
	p.line("%s", line)
}
