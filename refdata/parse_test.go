package refdata

import (
	"strings"
	"testing"
)

const goodTable = `# title: T
# standard: S
# edition: none
# table: X
# units: mm
# how: recalled; then compared
# confidence: high; medium for b
# note: n: 1
a,b
1,2
`

func TestParseTable(t *testing.T) {
	table, err := parseTable("good", goodTable)
	if err != nil {
		t.Fatal(err)
	}
	if table.Title != "T" || table.How != "recalled; then compared" || table.Confidence != "high; medium for b" ||
		len(table.Notes) != 1 || table.Notes[0] != "note: n: 1" || len(table.Rows) != 1 || table.Rows[0][1] != "2" {
		t.Errorf("read as %+v", table)
	}
	for _, c := range []struct{ name, old, new, want string }{
		{"key missing", "# units: mm\n", "", `good.csv:5: key "how" where "units" must stand`},
		{"key misspelled", "# edition", "# edtion", `good.csv:3: key "edtion"`},
		{"value blank", "# table: X", "# table: ", "good.csv:4: want"},
		{"no key", "# note: n: 1", "# something", "good.csv:8: want"},
		{"header short", goodTable[strings.Index(goodTable, "# confidence"):], "a,b\n1,2\n", `good.csv:7: the header lacks "confidence"`},
		{"unknown how", "how: recalled", "how: guessed", "unknown mark in how"},
		{"how only looks known", "how: recalled", "how: recalledish", "unknown mark in how"},
		{"unknown confidence", "confidence: high", "confidence: highest", "unknown mark in confidence"},
		{"unknown confidence in a clause", "; medium for b", "; surely for b", "unknown mark in confidence"},
		{"by row without column", "confidence: high", "confidence: by row", "no such column"},
		{"by row, unknown", "confidence: high; medium for b", "confidence: by row", "no such column"},
		{"no rows", "1,2\n", "", "at least one row"},
		{"short row", "1,2\n", "1\n", "wrong number of fields"},
	} {
		text := strings.Replace(goodTable, c.old, c.new, 1)
		if _, err := parseTable("good", text); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: error %v, want %q", c.name, err, c.want)
		}
	}
	byRowTable := strings.NewReplacer("high; medium for b", "by row", "a,b", "a,confidence", "1,2", "1,sure").Replace(goodTable)
	if _, err := parseTable("good", byRowTable); err == nil || !strings.Contains(err.Error(), "row 1: unknown mark") {
		t.Errorf("by row with an unknown mark: error %v", err)
	}
}

func FuzzParseTable(f *testing.F) {
	f.Add(goodTable)
	f.Add("# title: T\n\"")
	f.Add("#")
	f.Fuzz(func(t *testing.T, text string) {
		table, err := parseTable("fuzz", text)
		if err != nil {
			return
		}
		for _, row := range table.Rows {
			if len(row) != len(table.Columns) {
				t.Fatalf("row %q under columns %q", row, table.Columns)
			}
		}
		for i := range table.Rows {
			s := record{&table, i}.source()
			if s.How == "" || s.Confidence == "" || s.Standard == "" {
				t.Fatalf("blank source %+v", s)
			}
		}
	})
}
