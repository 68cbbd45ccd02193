package refdata

import (
	"fmt"
	"regexp"
	"slices"
	"strings"
	"unicode"
)

// plain returns a name as it is compared: lower case letters, digits and
// decimal points only, with ½ as .5, so that "ISO 53-A" and "iso53a" are one.
func plain(name string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsLetter(r) || unicode.IsDigit(r) || r == '.' {
			return unicode.ToLower(r)
		}
		return -1
	}, strings.ReplaceAll(name, "½", ".5"))
}

// unknown returns the error for a name that is not known: what it is a name
// of, the nearest known one, and which table lists all.
func unknown(kind, name string, known []string, table string) error {
	list := fmt.Sprintf("the command \"tables %s\" lists all", table)
	if table == "tables" {
		list = "the command \"tables\" lists all"
	}
	if strings.TrimSpace(name) == "" {
		return fmt.Errorf("the name of the %s is blank; %s", kind, list)
	}
	return fmt.Errorf("no %s is called %q; the nearest is %q; %s", kind, name, nearest(name, known), list)
}

// nearest returns the known name with the fewest letters to insert, delete or
// change, the first of equals, or the first that begins with the name. Known
// must not be empty.
func nearest(name string, known []string) string {
	best, least := "", -1
	for _, k := range known {
		if p := plain(name); len(p) > 2 && strings.HasPrefix(plain(k), p) {
			return k
		}
	}
	for _, k := range known {
		if d := edits(plain(name), plain(k)); least < 0 || d < least {
			best, least = k, d
		}
	}
	return best
}

// edits returns the Levenshtein distance of a and b.
func edits(a, b string) int {
	from, to := []rune(a), []rune(b)
	row := make([]int, len(to)+1)
	for j := range row {
		row[j] = j
	}
	for i, r := range from {
		diagonal := row[0]
		row[0] = i + 1
		for j, s := range to {
			change := diagonal
			if r != s {
				change++
			}
			diagonal = row[j+1]
			row[j+1] = min(change, row[j]+1, diagonal+1)
		}
	}
	return row[len(to)]
}

// wordPattern matches a number, with the sign or point before it where no
// letter or digit stands before that, or a run of anything but digits, blanks
// and the punctuation of standard numbers.
var wordPattern = regexp.MustCompile(`\B[-.][0-9]+|[0-9]+|[^\s\p{Z}\p{Pd}:/.,;()=_0-9]+`)

// words parts text into lower case words and numbers, so that
// "ISO 1328-1:2013 class 8" and "iso1328-1 2013 CLASS8" are one.
func words(text string) []string {
	return wordPattern.FindAllString(strings.ToLower(text), -1)
}

// cut returns what follows the head in w, and whether w begins with it; if not, all of w.
func cut(w []string, head ...string) (rest []string, ok bool) {
	if len(w) < len(head) || !slices.Equal(w[:len(head)], head) {
		return w, false
	}
	return w[len(head):], true
}
