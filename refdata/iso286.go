package refdata

import (
	"fmt"
	"strconv"
	"strings"
)

// ISO286Limits returns the limit deviations in mm of a tolerance class, such
// as "H7" for a hole or "js6" for a shaft, at a nominal size in mm:
// ISO 286-1:2010, tables 1 to 5, sizes above 0 up to 500 mm, grades IT1 to
// IT14, holes C to H, J, JS, K to U and shafts c to h, j, js, k to u. JS and js
// are the exact half of the grade. Capitals mean a hole.
//
// An error says what is not understood or not tabulated, and what is.
func ISO286Limits(nominalMM float64, class string) (lower, upper float64, source Source, err error) {
	letters, grade, err := parseClass(class)
	if err != nil {
		return 0, 0, Source{}, err
	}
	it, source, err := toleranceGrade(nominalMM, grade)
	if err != nil {
		return 0, 0, Source{}, fmt.Errorf("tolerance class %s: %w", class, err)
	}
	if strings.EqualFold(letters, "js") {
		return -it / 2 / 1000, it / 2 / 1000, source, nil
	}
	table, deviation := "iso286_hole", holeDeviation
	if letters == strings.ToLower(letters) {
		table, deviation = "iso286_shaft", shaftDeviation
	}
	r, _ := sizeRow(records(table), nominalMM, "over_mm", "upto_mm") // the same range as the grade's
	um, isLower, err := deviation(r, nominalMM, letters, grade)
	if err != nil {
		return 0, 0, Source{}, fmt.Errorf("tolerance class %s at %g mm: %w", class, nominalMM, err)
	}
	source = r.source()
	if isLower {
		return um / 1000, (um + it) / 1000, source, nil
	}
	return (um - it) / 1000, um / 1000, source, nil
}

// parseClass parts a tolerance class into its letters and grade.
func parseClass(class string) (letters string, grade int, err error) {
	class = strings.TrimSpace(class)
	digits := strings.IndexAny(class, "0123456789")
	if digits > 0 {
		letters = class[:digits]
		grade, err = strconv.Atoi(class[digits:])
	}
	if digits < 1 || err != nil {
		return "", 0, fmt.Errorf("tolerance class %q is not understood: want letters and a grade, such as H7 for a hole or js6 for a shaft (ISO 286-1)", class)
	}
	switch letters {
	case "JS", "js":
		return letters, grade, nil
	}
	if len(letters) > 1 || !strings.Contains("CDEFGHJKMNPRSTUcdefghjkmnprstu", letters) {
		return "", 0, fmt.Errorf("tolerance class %q: no table for %q; there are holes C to H, J, JS, K, M, N, P, R to U and shafts c to h, j, js, k, m, n, p, r to u", class, letters)
	}
	return letters, grade, nil
}

// toleranceGrade returns the standard tolerance in micrometers (ISO 286-1 table 1).
func toleranceGrade(nominalMM float64, grade int) (um float64, source Source, err error) {
	if grade < 1 || grade > 14 {
		return 0, Source{}, fmt.Errorf("no table for grade IT%d; there are IT1 to IT14", grade)
	}
	r, ok := sizeRow(records("iso286_it"), nominalMM, "over_mm", "upto_mm")
	if !ok {
		return 0, Source{}, fmt.Errorf("no table for a nominal size of %g mm; it must be above 0 and at most 500 mm", nominalMM)
	}
	if grade == 14 && nominalMM <= 1 {
		return 0, Source{}, fmt.Errorf("IT14 is not used up to 1 mm")
	}
	return r.number("IT" + strconv.Itoa(grade)), r.source(), nil
}

// shaftDeviation returns the fundamental deviation in micrometers of a shaft,
// and whether it is the lower one (ISO 286-1 tables 4 and 5).
func shaftDeviation(r record, _ float64, letter string, grade int) (um float64, isLower bool, err error) {
	column := letter
	switch letter {
	case "c", "d", "e", "f", "g", "h":
		return r.number(letter), false, nil
	case "j":
		switch grade {
		case 5, 6:
			column = "j5_j6"
		case 7:
			column = "j7"
		default:
			return 0, false, fmt.Errorf("j is tabulated for grades 5 to 7 only; use js%d", grade)
		}
	case "k":
		column = "k_other"
		if grade >= 4 && grade <= 7 {
			column = "k4_to_k7"
		}
	}
	if !r.has(column) { // t alone has blanks
		return 0, false, fmt.Errorf("t is not tabulated up to 24 mm; use u%d", grade)
	}
	return r.number(column), true, nil
}

// holeDeviation returns the fundamental deviation in micrometers of a hole,
// and whether it is the lower one (ISO 286-1 tables 2 and 3, with their delta rule).
func holeDeviation(r record, nominalMM float64, letter string, grade int) (um float64, isLower bool, err error) {
	deltaUpTo := 7 // the delta rule's coarsest grade
	column := letter
	switch letter {
	case "C", "D", "E", "F", "G", "H":
		return r.number(letter), true, nil
	case "J":
		if grade < 6 || grade > 8 {
			return 0, false, fmt.Errorf("deviation J is tabulated for grades 6 to 8 only; use JS%d", grade)
		}
		return r.number("J" + strconv.Itoa(grade)), false, nil
	case "K", "M", "N":
		deltaUpTo = 8
		column = letter + "_base"
	}
	over := r.number("over_mm")
	switch {
	case letter == "M" && grade == 6 && (over == 250 || over == 280):
		return -9, false, nil // the standard's exception from 250 to 315 mm: not −20 + 9
	case letter == "K" && grade > 8 && over > 0:
		return 0, false, fmt.Errorf("deviation K coarser than grade 8 is tabulated up to 3 mm only; use JS%d", grade)
	case letter == "N" && grade > 8:
		if nominalMM <= 1 {
			return 0, false, fmt.Errorf("deviation N coarser than grade 8 is not used up to 1 mm")
		}
		column = "N_over8"
	case !r.has(column): // T alone has blanks
		return 0, false, fmt.Errorf("deviation T is not tabulated up to 24 mm; use U%d", grade)
	}
	um = r.number(column)
	if grade <= deltaUpTo {
		if grade < 3 {
			return 0, false, fmt.Errorf("%s finer than grade 3 is not tabulated; use %s3 or coarser", letter, letter)
		}
		um += r.number("delta_IT" + strconv.Itoa(grade))
	}
	return um, false, nil
}
