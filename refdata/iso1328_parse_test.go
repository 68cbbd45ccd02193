package refdata

import (
	"strings"
	"testing"
)

func TestParseAccuracy(t *testing.T) {
	for text, want := range map[string]Accuracy{
		"ISO 1328-1:2013 class 8":                   {2013, 8},
		"iso1328-1:2013class8":                      {2013, 8},
		"  ISO  1328 - 1 : 2013 ,  Class: 8 ":       {2013, 8},
		"ISO 1328 -1 2013 class 8":                  {2013, 8},
		"ISO 1328\u20111:2013 grade\u00a08":         {2013, 8}, // as copied from a PDF: other hyphen and space
		"ISO_1328-1-2013 8":                         {2013, 8},
		"ISO 1328:2013 class 1":                     {2013, 1},
		"ISO 1328-1:2013 grade 11":                  {2013, 11},
		"ISO 1328-1:2013 class-8":                   {2013, 8},
		"DIN ISO 1328-1:2018 class 7":               {2013, 7},
		"DIN EN ISO 1328-1:2013 class 7":            {2013, 7},
		"ANSI/AGMA ISO 1328-1-B14 class 6":          {2013, 6},
		"ansi/agma iso 1328-1-b14, grade 6":         {2013, 6},
		"ISO 1328-1:1995 grade 0":                   {1995, 0},
		"ISO 1328-1:1995 class 12":                  {1995, 12},
		"DIN ISO 1328-1:1995 quality 7":             {1995, 7},
		Accuracy{Edition: 1995, Class: 8}.String():  {1995, 8},
		Accuracy{Edition: 2013, Class: 10}.String(): {2013, 10},
	} {
		if got, err := ParseAccuracy(text); err != nil || got != want {
			t.Errorf("%q: %v, %v; want %v", text, got, err, want)
		}
	}
	if got := (Accuracy{2013, 8}).String(); got != "ISO 1328-1:2013 class 8" {
		t.Error(got)
	}
	if got := (Accuracy{1995, 8}).String(); got != "ISO 1328-1:1995 grade 8" {
		t.Error(got)
	}
}

// TestParseAccuracyRefused: each refusal is one line that says why and how to write it.
func TestParseAccuracyRefused(t *testing.T) {
	const howTo = `"ISO 1328-1:2013 class 8"`
	for text, want := range map[string][]string{
		"":                           {"blank", howTo},
		" - ":                        {"blank", howTo},
		"8":                          {"bare number", "run the other way", howTo},
		"class 8":                    {"bare number", "run the other way", howTo},
		"Grade 8":                    {"bare number", howTo},
		"ISO 1328-1 class 8":         {"2013", "1995", "differ", howTo},
		"ISO 1328-1 8":               {"differ", howTo},
		"ISO 1328-1":                 {"differ", howTo},
		"ISO 1328":                   {"differ", howTo},
		"ISO 1328-1:1975 class 8":    {"differ", howTo},
		"ISO 1328-1:2018 class 8":    {"differ", howTo}, // DIN's year
		"ISO 1328-2:1997 class 8":    {"double flank", howTo},
		"ISO 1328-2:2020 R44":        {"double flank", howTo},
		"ISO 1328-1:2013":            {"class is missing", howTo},
		"ISO 1328-1:2013 class":      {"class is missing", howTo},
		"ISO 1328-1:2013 class 6-8":  {"one whole number", howTo},
		"ISO 1328-1:2013 class 7.5":  {"one whole number", howTo},
		"ISO 1328-1:2013 class .5":   {"one whole number", howTo},
		"ISO 1328-1:2013 class fine": {"one whole number", howTo},
		"ISO 1328-1:2013 class 8²":   {"one whole number", howTo},
		"ISO 1328-1:2013 A8":         {"one whole number", howTo},
		"ISO 1328-1:20138":           {"differ"},
		"ISO 1328-1:2013 class 0":    {"class 0", "1 (finest) to 11"},
		"ISO 1328-1:2013 class 12":   {"class 12", "1 (finest) to 11"},
		"ISO 1328-1:2013 class -8":   {"class -8", "1 (finest) to 11"},
		"ISO 1328-1:1995 grade 13":   {"grade 13", "0 (finest) to 12"},
		"ISO 1328-1:2013 class 9" + "9999999999999999999": {"one whole number"},
		"Q10":                           {"AGMA 2000", "higher is finer", howTo},
		"q 10":                          {"AGMA 2000", howTo},
		"AGMA Q10":                      {"AGMA 2000", howTo},
		"AGMA 10":                       {"AGMA 2000", howTo},
		"AGMA 2000-A88 Q8":              {"AGMA 2000", howTo},
		"ANSI/AGMA 2000-A88":            {"AGMA 2000", howTo},
		"AGMA 390.03 class 8":           {"AGMA 2000 and 390", howTo},
		"A8":                            {"AGMA 2015", howTo},
		"AGMA A8":                       {"AGMA 2015", howTo},
		"grade A8":                      {"AGMA 2015", howTo},
		"AGMA 2015-1-A01 A8":            {"AGMA 2015", howTo},
		"ANSI/AGMA 2015-1-A01 grade A8": {"AGMA 2015", howTo},
		"DIN 3961":                      {"DIN 3961", howTo},
		"DIN 3962 quality 7":            {"DIN 3961 and 3962", howTo},
		"7 DIN 3962":                    {"DIN 3961", howTo},
		"DIN 7":                         {"DIN 3961", howTo},
		"class":                         {"not understood", howTo},
		"fine":                          {"not understood", howTo},
		"ISO":                           {"not understood", howTo},
		"ISO 8":                         {"not understood", howTo},
		"class 8 ISO 1328-1:2013":       {"not understood", howTo},
		"ISO 1328-1:2013 class 8\xff":   {"one whole number", howTo},
	} {
		got, err := ParseAccuracy(text)
		if err == nil || got != (Accuracy{}) {
			t.Errorf("%q: %v, %v", text, got, err)
			continue
		}
		for _, part := range want {
			if !strings.Contains(err.Error(), part) {
				t.Errorf("%q: %q lacks %q", text, err, part)
			}
		}
		if strings.Contains(err.Error(), "\n") {
			t.Errorf("%q: %q is more than a line", text, err)
		}
	}
}

func FuzzParseAccuracy(f *testing.F) {
	for _, text := range []string{
		"ISO 1328-1:2013 class 8", "iso1328-1:1995grade12", "DIN ISO 1328-1:2018 7", "ANSI/AGMA ISO 1328-1-B14 class 6",
		"8", "class", "Q10", "AGMA 2015-1-A01 A8", "DIN 3962 7", "ISO 1328-2:2020 R44", "ISO 1328", "-.:",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		a, err := ParseAccuracy(text)
		if err != nil {
			if a != (Accuracy{}) || strings.Contains(err.Error(), "\n") {
				t.Fatalf("%q: %v, %q", text, a, err)
			}
			return
		}
		if again, err := ParseAccuracy(a.String()); err != nil || again != a {
			t.Fatalf("%q: %v, read again %v, %v", text, a, again, err)
		}
		if !strings.Contains(text, "1328") {
			t.Fatalf("%q: %v without its standard", text, a)
		}
		got, err := a.Tolerances(ToothSize{ReferenceDiameter: 60, Module: 3})
		if err != nil || !(got.SinglePitch > 0 && got.CumulativePitch < 1) {
			t.Fatalf("%q: %+v, %v", text, got, err)
		}
	})
}
