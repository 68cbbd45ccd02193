package refdata

import (
	"embed"
	"fmt"
	"path"
	"slices"
	"strings"
	"sync"
)

// A Table is one table of reference data as it stands in its file.
type Table struct {
	Name  string // the file's name without its ending
	Title string
	Source
	Units   string
	Columns []string
	Rows    [][]string // each as long as Columns; a blank cell means no value
	Notes   []string   // "columns: …", "rule: …", "checked: …", …, in the file's order
}

//go:embed tables/*.csv
var files embed.FS

// loaded parses the embedded tables, once. A fault in them is a fault of the
// build: the package's tests parse every table, so the panic reaches no user.
var loaded = sync.OnceValue(func() []Table {
	entries, err := files.ReadDir("tables")
	if err != nil {
		panic("refdata: " + err.Error())
	}
	tables := make([]Table, 0, len(entries))
	for _, e := range entries {
		text, err := files.ReadFile(path.Join("tables", e.Name()))
		if err != nil {
			panic("refdata: " + err.Error())
		}
		t, err := parseTable(strings.TrimSuffix(e.Name(), ".csv"), string(text))
		if err != nil {
			panic("refdata: " + err.Error())
		}
		tables = append(tables, t)
	}
	return tables
})

// Tables returns all tables, ordered by name. The caller may change what it gets.
func Tables() []Table {
	tables := slices.Clone(loaded())
	for i := range tables {
		tables[i] = tables[i].clone()
	}
	return tables
}

// TableByName returns the table of that name. The error of an unknown name
// says which is nearest and that the command tables lists all.
func TableByName(name string) (Table, error) {
	names := make([]string, 0, len(loaded()))
	for _, t := range loaded() {
		if plain(t.Name) == plain(name) {
			return t.clone(), nil
		}
		names = append(names, t.Name)
	}
	return Table{}, unknown("table", name, names, "tables")
}

// clone returns a copy that shares no memory with t.
func (t Table) clone() Table {
	t.Columns = slices.Clone(t.Columns)
	t.Notes = slices.Clone(t.Notes)
	t.Rows = slices.Clone(t.Rows)
	for i := range t.Rows {
		t.Rows[i] = slices.Clone(t.Rows[i])
	}
	return t
}

// records returns the rows of the embedded table of that name for reading by column.
func records(name string) []record {
	tables := loaded()
	i := slices.IndexFunc(tables, func(t Table) bool { return t.Name == name })
	if i < 0 {
		panic(fmt.Sprintf("refdata: no table %q", name))
	}
	rs := make([]record, len(tables[i].Rows))
	for j := range rs {
		rs[j] = record{&tables[i], j}
	}
	return rs
}
