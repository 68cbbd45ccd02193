package refdata

import "fmt"

// A validity is a value beside the range that a standard covers.
type validity struct {
	name        string
	value       float64
	least, most float64
	unit        string // with the blank before it: " mm"
}

// outside says in words which values lie outside of what the standard covers, for example
// "module 0.4 mm (ISO 1328-1:2013 covers 0.5 to 70 mm)".
func outside(standard string, values ...validity) []string {
	var all []string
	for _, v := range values {
		if v.value < v.least-sizeSlack || v.value > v.most+sizeSlack {
			all = append(all, fmt.Sprintf("%s %.8g%s (%s covers %g to %g%s)",
				v.name, v.value, v.unit, standard, v.least, v.most, v.unit))
		}
	}
	return all
}
