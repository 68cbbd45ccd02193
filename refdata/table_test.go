package refdata

import (
	"os"
	"slices"
	"strings"
	"testing"
)

// cellRecord returns the first row of a table that matches.
func cellRecord(t *testing.T, name string, match func(record) bool) record {
	t.Helper()
	for _, r := range records(name) {
		if match(r) {
			return r
		}
	}
	t.Fatalf("%s: no such row", name)
	return record{}
}

func TestEveryFileIsATable(t *testing.T) {
	entries, err := os.ReadDir("tables")
	if err != nil {
		t.Fatal(err)
	}
	tables := Tables()
	if len(tables) != len(entries) {
		t.Fatalf("%d tables from %d files", len(tables), len(entries))
	}
	for i, table := range tables {
		if want := strings.TrimSuffix(entries[i].Name(), ".csv"); table.Name != want {
			t.Errorf("table %d is %q, want %q", i, table.Name, want)
		}
		for field, value := range map[string]string{
			"title": table.Title, "standard": table.Standard, "edition": table.Edition, "table": table.Table,
			"units": table.Units, "how": table.How, "confidence": table.Confidence,
		} {
			if value == "" {
				t.Errorf("%s: %s is blank", table.Name, field)
			}
		}
		for _, r := range records(table.Name) {
			s := r.source()
			if !isHow(s.How) || !isConfidence(s.Confidence) {
				t.Errorf("%s, row %d: source is not settled by the row: %v", table.Name, r.row+1, s)
			}
		}
		for i, a := range table.Rows {
			for _, b := range table.Rows[:i] {
				if slices.Equal(a, b) {
					t.Errorf("%s: row %q stands twice", table.Name, a)
				}
			}
		}
	}
}

func TestTablesAreCopies(t *testing.T) {
	a := Tables()
	a[0].Rows[0][0], a[0].Columns[0], a[0].Title = "x", "x", "x"
	if b := Tables(); b[0].Rows[0][0] == "x" || b[0].Columns[0] == "x" || b[0].Title == "x" {
		t.Error("a change reached the embedded table")
	}
}

func TestTableByName(t *testing.T) {
	for _, name := range []string{"gear_pins", "Gear pins", "GEAR-PINS"} {
		if table, err := TableByName(name); err != nil || table.Name != "gear_pins" {
			t.Errorf("%q: %q, %v", name, table.Name, err)
		}
	}
	for name, nearest := range map[string]string{"rack": `"racks"`, "iso286_holes": `"iso286_hole"`, "module": `"modules"`} {
		if _, err := TableByName(name); err == nil || !strings.Contains(err.Error(), nearest) || !strings.Contains(err.Error(), `"tables"`) {
			t.Errorf("%q: error %v, want %s and how to list all", name, err, nearest)
		}
	}
	if _, err := TableByName(" "); err == nil || !strings.Contains(err.Error(), "blank") {
		t.Errorf("blank: %v", err)
	}
}

// TestOrder checks columns that must rise from row to row, within equal values of the group columns.
func TestOrder(t *testing.T) {
	for _, c := range []struct {
		table, column string
		group         []string
	}{
		{"allowance_din3967", "over_mm", []string{"table", "series"}},
		{"ansi_b4_1", "over_in", []string{"class"}},
		{"backlash_coarse", "over_in", []string{"p_from"}},
		{"backlash_fine", "p_from", []string{"designation"}},
		{"diametral_pitches", "pitch_per_in", nil},
		{"end_mills", "diameter_mm", []string{"system"}},
		{"gear_pins", "diameter_mm", nil},
		{"iso286_hole", "over_mm", nil},
		{"iso286_it", "over_mm", nil},
		{"iso286_it", "IT7", nil},
		{"iso286_shaft", "over_mm", nil},
		{"keyways_inch", "over_in", nil},
		{"keyways_metric", "b", nil},
		{"modules", "module_mm", nil},
		{"pin_classes", "tolerance_uin", []string{"class"}},
		{"pin_din2269", "limit_um", nil},
		{"pin_sets", "first", []string{"name"}},
		{"pressure_angles", "angle_deg", nil},
	} {
		last := map[string]float64{}
		for _, r := range records(c.table) {
			var group strings.Builder
			for _, g := range c.group {
				group.WriteString(r.text(g) + "|")
			}
			v := r.number(c.column)
			if before, ok := last[group.String()]; ok && v <= before {
				t.Errorf("%s: %s %g comes after %g", c.table, c.column, v, before)
			}
			last[group.String()] = v
		}
	}
}

// TestRangesMeet checks that where one size range ends the next begins.
func TestRangesMeet(t *testing.T) {
	for _, c := range []struct{ table, from, to, group string }{
		{"allowance_din3967", "over_mm", "to_mm", "series"},
		{"ansi_b4_1", "over_in", "upto_in", "class"},
		{"backlash_coarse", "over_in", "upto_in", "p_from"},
		{"iso286_hole", "over_mm", "upto_mm", ""},
		{"iso286_it", "over_mm", "upto_mm", ""},
		{"iso286_shaft", "over_mm", "upto_mm", ""},
		{"keyways_inch", "over_in", "upto_in", ""},
		{"keyways_metric", "over_mm", "upto_mm", ""},
		{"pin_classes", "over_in", "upto_in", "class"},
	} {
		end := map[string]float64{}
		for _, r := range records(c.table) {
			group := ""
			if c.group != "" {
				group = r.text(c.group)
			}
			from, to := r.number(c.from), r.number(c.to)
			if before, ok := end[group]; from >= to || ok && from != before {
				t.Errorf("%s %s: range %g to %g after one to %g", c.table, group, from, to, before)
			}
			end[group] = to
		}
	}
}

// TestSpotValues checks single cells against values known by themselves, so
// that a shifted row or column shows.
func TestSpotValues(t *testing.T) {
	for _, c := range []struct {
		table, key, row, column string
		want                    string
		source                  string
	}{
		{"modules", "module_mm", "6.5", "status", "avoid", "ISO 54:1996, series II in parentheses (recalled)"},
		{"modules", "module_mm", "2.5", "series", "I", "ISO 54:1996 (recalled)"},
		{"modules", "module_mm", "3.5", "series", "II", "ISO 54:1996 (recalled)"},
		{"diametral_pitches", "pitch_per_in", "64", "status", "preferred", "textbook general-use list (recalled)"},
		{"pressure_angles", "angle_deg", "14.5", "status", "old", "ASA B6.1-1932 (recalled)"},
		{"racks", "name", "ISO 53 C", "rhofP", "0.25", "ISO 53:1998 annex A (recalled)"},
		{"racks", "name", "20 full depth fine", "hfP_add_in", "0.002", "ANSI/AGMA 1003: whole depth 2.2/P + 0.002 in (recalled)"},
		{"racks", "name", "14.5 full depth", "hfP", "1.157", "ASA B6.1-1932: whole depth 2.157/P (recalled)"},
		{"racks", "name", "20 stub", "haP", "0.8", "ASA B6.1-1932: whole depth 1.8/P (recalled)"},
		{"pin_classes", "class", "ZZ", "tolerance_uin", "200", "0.0002 in full to 0.825 in: ASME B89.1.5 (common knowledge of the trade)"},
		{"pin_classes", "class", "X", "tolerance_uin", "40", "0.00004 in to 0.825 in: ASME B89.1.5 (common knowledge of the trade)"},
		{"iso286_it", "over_mm", "18", "IT7", "21", "ISO 286-1 table 1: 18 to 30 mm (recalled)"},
		{"iso286_it", "over_mm", "50", "IT6", "19", "ISO 286-1 table 1: 50 to 80 mm (recalled)"},
		{"keyways_metric", "over_mm", "30", "b", "10", "DIN 6885-1: 10 × 8 over 30 to 38 mm (recalled)"},
		{"keyways_metric", "over_mm", "22", "t2", "3.3", "DIN 6885-1: 8 × 7, t2 3.3 (recalled)"},
		{"keyways_inch", "over_in", "0.875", "key_w", "1/4", "ASME B17.1: 1/4 in for 1 in (recalled)"},
		{"lewis", "z", "20", "Y", "0.322", "textbook Lewis table (recalled)"},
		{"lewis", "z", "rack", "Y", "0.485", "textbook Lewis table (recalled)"},
		{"end_mills", "size", "3/16", "diameter_mm", "4.7625", "3/16 × 25.4"},
	} {
		r := cellRecord(t, c.table, func(r record) bool { return r.text(c.key) == c.row })
		if got := r.text(c.column); got != c.want {
			t.Errorf("%s, %s %s: %s is %s, want %s (%s)", c.table, c.key, c.row, c.column, got, c.want, c.source)
		}
	}
}

func TestSourceString(t *testing.T) {
	r, err := RackByName("ISO 53 A")
	if err != nil {
		t.Fatal(err)
	}
	want := "ISO 53 (1998), basic rack tooth profiles (ISO 53: table 1 and annex A); recalled; confidence high"
	if got := r.Source.String(); got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
