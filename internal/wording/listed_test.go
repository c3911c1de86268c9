package wording_test

import (
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/rulebook"
)

// number stands in the blank of a wording.
func number(s *rulebook.Stated) string {
	if s != nil && (s.As == "declared amount" || s.As == "amount" || s.As == "at most") {
		return "5 g"
	}
	return "5 %"
}

// Every wording that a market lists, in a language with words, is read as a claim that lists it. One with a blank is read with a number in it.
func TestEveryListedWordingIsRead(t *testing.T) {
	book, e := engine(t)
	for _, j := range book.Jurisdictions() {
		law := lawOf(book, j)
		for _, c := range slices.Concat(law.Claims.All, law.HealthClaims.All) {
			for language, words := range c.Body.Wordings {
				if !e.Covers(law, language) {
					continue
				}
				for _, w := range words {
					text := strings.ReplaceAll(w, "{number}", number(c.Body.Stated))
					readings, err := e.Judge(law, text, language)
					if err != nil {
						t.Fatal(err)
					}
					found, read := false, ""
					for _, r := range readings {
						read += " " + r.Claim.ID + " (" + r.Matched + ")"
						found = found || r.Is() && slices.Contains(r.Claim.Body.Wordings[language], w)
					}
					if !found && !strings.ContainsAny(w, "[]()<>_") {
						t.Errorf("%s %s: %q is read as %s", c.ID, language, text, read)
					}
				}
			}
		}
	}
}
