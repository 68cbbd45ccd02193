package refdata

import "strings"

// A Source says where a value comes from and how sure it is.
type Source struct {
	Standard string // for example "ISO 53"; begins with "none" where no standard stands behind the value
	Edition  string // for example "1998"; "none" where there is none
	Table    string // table or clause
	// How begins with transcribed, recalled, computed, common practice or by row.
	How string
	// Confidence begins with high, medium-high, medium, medium-low, common practice or by row.
	Confidence string
}

// String returns the source in one line, for example
// "ISO 53 (1998), table 1; recalled; confidence high".
func (s Source) String() string {
	where := s.Standard
	if s.Edition != "none" {
		where += " (" + s.Edition + ")"
	}
	return where + ", " + s.Table + "; " + s.How + "; confidence " + s.Confidence
}

const byRow = "by row"

// isHow reports whether text begins with a known way of obtaining values.
func isHow(text string) bool {
	return startsWith(text, "transcribed", "recalled", "computed", "common practice")
}

// isConfidence reports whether every clause of text, as parted by semicolons, begins with a known mark.
func isConfidence(text string) bool {
	for clause := range strings.SplitSeq(text, ";") {
		if !startsWith(strings.TrimSpace(clause), "high", "medium-high", "medium", "medium-low", "common practice") {
			return false
		}
	}
	return true
}

// startsWith reports whether text begins with one of the words, as whole words.
func startsWith(text string, words ...string) bool {
	for _, word := range words {
		rest, ok := strings.CutPrefix(text, word)
		if ok && (rest == "" || strings.ContainsRune(" ,;:", rune(rest[0]))) {
			return true
		}
	}
	return false
}
