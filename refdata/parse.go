package refdata

import (
	"encoding/csv"
	"fmt"
	"slices"
	"strings"
)

// parseTable reads a table from its text: lines "# key: value", the required
// keys first and in order, then a line of column names and the rows.
//
// A key that is not required becomes a note. Errors name the file and line.
func parseTable(name, text string) (Table, error) {
	t := Table{Name: name}
	required := []struct {
		key   string
		value *string
	}{
		{"title", &t.Title}, {"standard", &t.Standard}, {"edition", &t.Edition}, {"table", &t.Table},
		{"units", &t.Units}, {"how", &t.How}, {"confidence", &t.Confidence},
	}
	line := 0
	for strings.HasPrefix(text, "#") {
		var head string
		head, text, _ = strings.Cut(text, "\n")
		line++
		key, value, ok := strings.Cut(strings.TrimPrefix(head, "# "), ": ")
		value = strings.TrimSpace(value)
		switch {
		case !ok || value == "":
			return Table{}, fmt.Errorf("%s.csv:%d: want \"# key: value\"", name, line)
		case line > len(required):
			t.Notes = append(t.Notes, key+": "+value)
		case key != required[line-1].key:
			return Table{}, fmt.Errorf("%s.csv:%d: key %q where %q must stand", name, line, key, required[line-1].key)
		default:
			*required[line-1].value = value
		}
	}
	if line < len(required) {
		return Table{}, fmt.Errorf("%s.csv:%d: the header lacks %q", name, line+1, required[line].key)
	}
	r := csv.NewReader(strings.NewReader(text))
	rows, err := r.ReadAll()
	if err != nil {
		return Table{}, fmt.Errorf("%s.csv, after %d header lines: %w", name, line, err)
	}
	if len(rows) < 2 {
		return Table{}, fmt.Errorf("%s.csv: want a line of column names and at least one row", name)
	}
	t.Columns, t.Rows = rows[0], rows[1:]
	return t, t.checkMarks()
}

// checkMarks returns an error where how or confidence is not one of the known marks.
func (t *Table) checkMarks() error {
	marks := []struct {
		column, head string
		known        func(string) bool
	}{
		{"how", t.How, isHow},
		{"confidence", t.Confidence, isConfidence},
	}
	for _, m := range marks {
		column := slices.Index(t.Columns, m.column)
		switch {
		case startsWith(m.head, byRow):
			if column < 0 {
				return fmt.Errorf("%s.csv: %s is %q, but there is no such column", t.Name, m.column, byRow)
			}
		case !m.known(m.head):
			return fmt.Errorf("%s.csv: unknown mark in %s: %q", t.Name, m.column, m.head)
		}
		for i, row := range t.Rows {
			if column >= 0 && !m.known(row[column]) {
				return fmt.Errorf("%s.csv, row %d: unknown mark in %s: %q", t.Name, i+1, m.column, row[column])
			}
		}
	}
	return nil
}
