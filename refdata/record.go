package refdata

import (
	"fmt"
	"slices"
	"strconv"
)

// A record is one row of an embedded table, read by column name. A column that
// is not there or a cell that is no number is a fault of the build, held by
// the tests, and panics with the table, row and column.
type record struct {
	table *Table
	row   int
}

// text returns the cell as it stands; blank means no value.
func (r record) text(column string) string {
	i := slices.Index(r.table.Columns, column)
	if i < 0 {
		panic(fmt.Sprintf("refdata: %s has no column %q", r.table.Name, column))
	}
	return r.table.Rows[r.row][i]
}

// has reports whether the cell holds a value.
func (r record) has(column string) bool { return r.text(column) != "" }

// number returns the cell's value, correctly rounded from its decimals.
func (r record) number(column string) float64 { return r.scaled(column, 0) }

// scaled returns the cell's value times a power of ten, correctly rounded
// (which a multiplication would not be).
func (r record) scaled(column string, exponent int) float64 {
	v, err := strconv.ParseFloat(r.text(column)+"e"+strconv.Itoa(exponent), 64)
	if err != nil {
		panic(fmt.Sprintf("refdata: %s, row %d, column %q: %q is not a number", r.table.Name, r.row+1, column, r.text(column)))
	}
	return v
}

// source returns the table's source with what the row says otherwise.
func (r record) source() Source {
	s := r.table.Source
	override := func(field *string, column string) {
		if slices.Contains(r.table.Columns, column) && r.has(column) {
			*field = r.text(column)
		}
	}
	override(&s.Standard, "standard")
	override(&s.Edition, "edition")
	override(&s.How, "how")
	override(&s.Confidence, "confidence")
	return s
}

// sizeSlack widens the end of a size range, in the unit of the range (mm or
// inches). A size that went through ×25.4 and back is off by parts in 10^16
// of itself, at most 1e-13 here, and must stay in its range; no size on a
// drawing comes nearer to a limit than 1e-6.
const sizeSlack = 1e-9

// within reports whether size is above from up to and including to.
func within(size, from, to float64) bool {
	return size > from+sizeSlack && size <= to+sizeSlack
}

// sizeRow returns the row whose range from … to (columns) holds the size.
func sizeRow(rs []record, size float64, from, to string) (record, bool) {
	for _, r := range rs {
		if within(size, r.number(from), r.number(to)) {
			return r, true
		}
	}
	return record{}, false
}

// groups parts rows into those that follow each other with one value of a column.
func groups(rs []record, column string) [][]record {
	var all [][]record
	for _, r := range rs {
		if n := len(all); n > 0 && all[n-1][0].text(column) == r.text(column) {
			all[n-1] = append(all[n-1], r)
		} else {
			all = append(all, []record{r})
		}
	}
	return all
}
