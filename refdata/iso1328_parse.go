package refdata

import (
	"fmt"
	"slices"
	"strconv"
)

// writeISO1328 ends errors about how an accuracy is written.
const writeISO1328 = `write for example "ISO 1328-1:2013 class 8"`

// ParseAccuracy reads an accuracy such as "ISO 1328-1:2013 class 8" or
// "ISO 1328-1:1995 grade 7"; class and grade are one, and neither case nor
// spaces matter. DIN ISO 1328-1:2018 and ANSI/AGMA ISO 1328-1-B14 are the
// edition of 2013.
//
// Nothing is guessed: a number without its standard, a standard without its
// edition and the classes of other standards are refused, each with what to
// write instead.
func ParseAccuracy(text string) (Accuracy, error) {
	w := words(text)
	national, rest, ok := splitISO1328(w)
	if !ok {
		return Accuracy{}, otherAccuracy(text, w)
	}
	rest, part1 := cut(rest, "1")
	if !part1 {
		rest, part1 = cut(rest, "-1") // "ISO 1328 -1"
	}
	if !part1 && len(rest) > 0 && (rest[0] == "2" || rest[0] == "-2") {
		return Accuracy{}, fmt.Errorf("accuracy %q: ISO 1328-2 (double flank composite deviations) is not carried; write the class of ISO 1328-1, for example \"ISO 1328-1:2013 class 8\"", text)
	}
	edition, rest := cutEdition(rest, slices.Contains(national, "din"))
	class, err := classOf(rest)
	if edition == 0 {
		return Accuracy{}, fmt.Errorf("accuracy %q names neither the edition of 2013 nor that of 1995, and the two differ; %s or \"ISO 1328-1:1995 grade 8\"", text, writeISO1328)
	}
	if err != nil {
		return Accuracy{}, fmt.Errorf("accuracy %q: %w; %s", text, err, writeISO1328)
	}
	a := Accuracy{Edition: edition, Class: class}
	if err := a.check(); err != nil {
		return Accuracy{}, fmt.Errorf("accuracy %q: %w", text, err)
	}
	return a, nil
}

// splitISO1328 parts the words into those before and after "ISO 1328", if the
// ones before are names of standards bodies.
func splitISO1328(w []string) (national, rest []string, ok bool) {
	i := max(slices.Index(w, "iso"), 0)
	for _, word := range w[:i] {
		if !slices.Contains([]string{"din", "en", "bs", "ansi", "agma"}, word) {
			return nil, nil, false
		}
	}
	rest, ok = cut(w[i:], "iso", "1328")
	return w[:i], rest, ok
}

// cutEdition cuts the edition off the words after "ISO 1328-1"; 0: it is not there.
func cutEdition(w []string, din bool) (edition int, rest []string) {
	for _, e := range []struct {
		edition int
		words   []string
	}{{2013, []string{"2013"}}, {1995, []string{"1995"}}, {2013, []string{"b", "14"}}} {
		if rest, ok := cut(w, e.words...); ok {
			return e.edition, rest
		}
	}
	if rest, ok := cut(w, "2018"); ok && din {
		return 2013, rest
	}
	return 0, w
}

// classOf reads the words "class 8", "grade 8" or "8" alone.
func classOf(w []string) (int, error) {
	rest := cutClassWord(w)
	if len(rest) == 0 {
		return 0, fmt.Errorf("the class is missing")
	}
	class, err := strconv.Atoi(rest[0])
	if err != nil || len(rest) > 1 {
		return 0, fmt.Errorf("the class is not one whole number")
	}
	return class, nil
}

// cutClassWord returns the words without the word for class at their head.
func cutClassWord(w []string) []string {
	for _, word := range []string{"class", "grade", "quality"} {
		if rest, ok := cut(w, word); ok {
			return rest
		}
	}
	return w
}

// otherAccuracy returns the error for an accuracy that does not name ISO 1328.
func otherAccuracy(text string, w []string) error {
	has := func(words ...string) bool {
		return slices.ContainsFunc(words, func(word string) bool { return slices.Contains(w, word) })
	}
	switch _, err := classOf(w); {
	case len(w) == 0:
		return fmt.Errorf("the accuracy is blank; %s", writeISO1328)
	case err == nil:
		return fmt.Errorf("accuracy %q is a bare number, and older inch quality numbers run the other way (higher is finer); %s", text, writeISO1328)
	case has("2015"), !has("2000", "390", "q") && len(w) > 1 && w[len(w)-2] == "a": // A8
		return fmt.Errorf("accuracy %q: the A classes of AGMA 2015 are another scale, which is not carried; %s", text, writeISO1328)
	case has("agma", "q"):
		return fmt.Errorf("accuracy %q: quality numbers of AGMA 2000 and 390 are another scale (higher is finer), which is not carried; %s", text, writeISO1328)
	case has("din", "3961", "3962", "3963"):
		return fmt.Errorf("accuracy %q: DIN 3961 and 3962 have tables of their own, which are not carried; %s", text, writeISO1328)
	}
	return fmt.Errorf("accuracy %q is not understood; %s", text, writeISO1328)
}
