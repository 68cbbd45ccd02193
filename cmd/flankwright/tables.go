package main

import (
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/refdata"
)

func tablesCommand() *cli.Command {
	flags := append(fileFlags("file to write instead of standard output"),
		&cli.BoolFlag{Name: "json", Usage: "JSON instead of text", Category: catOutput, DisableDefaultText: true})
	return &cli.Command{
		Name: "tables", Usage: "the reference data the program carries, with sources and confidence",
		UsageText: "flankwright tables          lists them\nflankwright tables NAME     shows one", Flags: flags,
		Action: func(c *cli.Context) error {
			if c.NArg() > 1 {
				return wrong("one table at a time: %q is one too many", c.Args().Get(1))
			}
			if name := c.Args().First(); name != "" {
				t, err := refdata.TableByName(name)
				if err != nil {
					return wrong("%v", err)
				}
				return emit(c, tableJSON(t, true), func() []byte { return tableText(newPage(c.App.Writer), t) })
			}
			all := []tableDims{}
			for _, t := range refdata.Tables() {
				all = append(all, tableJSON(t, false))
			}
			return emit(c, map[string]any{"tables": all}, func() []byte { return listText(newPage(c.App.Writer)) })
		},
	}
}

type tableDims struct {
	Name       string     `json:"name"`
	Title      string     `json:"title"`
	Standard   string     `json:"standard"`
	Edition    string     `json:"edition"`
	Table      string     `json:"table"`
	Units      string     `json:"units"`
	How        string     `json:"how"`
	Confidence string     `json:"confidence"`
	Columns    []string   `json:"columns,omitempty"`
	Rows       [][]string `json:"rows,omitempty"`
	Notes      []string   `json:"notes,omitempty"`
}

func tableJSON(t refdata.Table, whole bool) tableDims {
	d := tableDims{Name: t.Name, Title: t.Title, Standard: t.Standard, Edition: t.Edition, Table: t.Table, Units: t.Units, How: t.How, Confidence: t.Confidence}
	if whole {
		d.Columns, d.Rows, d.Notes = t.Columns, t.Rows, t.Notes
	}
	return d
}

func listText(p *page) []byte {
	rows := [][]string{{"name", "what", "rows", "confidence"}}
	for _, t := range refdata.Tables() {
		rows = append(rows, []string{t.Name, t.Title, fmt.Sprint(len(t.Rows)), firstClause(t.Confidence)})
	}
	p.columns(rows)
	p.blank()
	p.line("flankwright tables NAME shows one with its source.")
	return []byte(p.b.String())
}

func firstClause(s string) string {
	s, _, _ = strings.Cut(s, ";")
	s, _, _ = strings.Cut(s, " (")
	return s
}

func tableText(p *page, t refdata.Table) []byte {
	p.head(t.Title)
	for _, f := range [][2]string{{"standard", t.Standard}, {"edition", t.Edition}, {"table", t.Table}, {"units", t.Units}, {"how", t.How}, {"confidence", t.Confidence}} {
		p.wrapped(pad(f[0], 11)+f[1], strings.Repeat(" ", 11))
	}
	p.blank()
	p.columns(append([][]string{t.Columns}, t.Rows...))
	if len(t.Notes) > 0 {
		p.blank()
		for _, n := range t.Notes {
			p.wrapped(n, "  ")
		}
	}
	return []byte(p.b.String())
}

// columns prints rows of text in columns, the first row as headings.
func (p *page) columns(rows [][]string) {
	if len(rows) == 0 {
		return
	}
	widths := make([]int, len(rows[0]))
	for _, r := range rows {
		for i, c := range r {
			widths[i] = max(widths[i], width(c))
		}
	}
	for n, r := range rows {
		line := ""
		for i, c := range r {
			line += pad(c, widths[i]) + "  "
		}
		line = strings.TrimRight(line, " ")
		if n == 0 {
			line = p.paint(bold, line)
		}
		p.line("%s", line)
	}
}
