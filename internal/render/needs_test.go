package render

import (
	"fmt"
	"strings"
	"testing"

	"gramlaw/internal/check"
)

func TestNeeded(t *testing.T) {
	var many []string
	for i := range 40 {
		many = append(many, fmt.Sprintf("i%d (FAT)", i), fmt.Sprintf("i%d (FASAT)", i))
	}
	for _, c := range []struct {
		name string
		list []string
		want string
	}{
		{"one", []string{"oats (FAT)"}, "oats (FAT)"},
		{"components of one ingredient", []string{"oats (FAT)", "salt (ID)", "oats (FASAT)"}, "oats (FAT, FASAT), salt (ID)"},
		{"a name with brackets", []string{"oats (rolled) (FAT)"}, "oats (rolled) (FAT)"},
		{"no component", []string{"the fact “state”"}, "the fact “state”"},
		{"the same twice", []string{"oats (FAT)", "oats (FAT)"}, "oats (FAT)"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := needed(c.list); got != c.want {
				t.Errorf("reads %q, want %q", got, c.want)
			}
		})
	}
	if got := needed(many); !strings.HasSuffix(got, "i14 (FAT, FASAT) and 25 more") {
		t.Errorf("a long list ends in %q", got)
	}
}

func TestSharedAnswers(t *testing.T) {
	claims := []check.Claim{
		{Asked: "a", Verdict: check.Refused, Why: "unlisted"},
		{Asked: "b", Verdict: check.Unread, Why: "unlisted"},
		{Asked: "c", Verdict: check.Refused, Why: "unlisted"},
		{Asked: "d", Verdict: check.Refused, Why: "unlisted", Source: "elsewhere"},
		{Asked: "e", Verdict: check.Refused, Why: "unlisted", Claim: "aa/claim/e"},
		{Asked: "f", Verdict: check.Refused, Why: "unlisted"},
	}
	others, told := shared(claims)
	if got := fmt.Sprint(others, told); got != "map[0:[c f]] map[2:true 5:true]" {
		t.Errorf("shared answers are %s", got)
	}
}
