package check_test

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A version counts as covered when a case falls on it: a claim asked for on a date it holds, a quantity rounded, a code looked for.
type coverage map[*rulebook.Head]bool

func (c coverage) claim(law *rulebook.Law, name, text string) {
	for _, list := range [][]rulebook.Active[rulebook.Claim]{law.Claims.All, law.HealthClaims.All} {
		for _, a := range list {
			words := slices.Concat(mapValues(a.Body.Wordings)...)
			if a.Name() == name || slices.Contains(a.Body.AlsoNamed, name) || text != "" && slices.Contains(words, text) {
				c[a.Head] = true
			}
		}
	}
}

func mapValues[T any](m map[string]T) []T {
	var out []T
	for _, v := range m {
		out = append(out, v)
	}
	return out
}

func lawOn(b *rulebook.Book, j, on, transition string, answers map[string]json.RawMessage) *rulebook.Law {
	law, _ := b.At(j, on, rulebook.Transition(transition), func(c *rulebook.Condition) quantity.Truth {
		if s, ok := answers[c.Name]; ok {
			return quantity.TruthOf(string(s) == fmt.Sprintf("%q", c.Is))
		}
		return quantity.Open
	})
	return law
}

func caseFile(t *testing.T, j, kind string, to any) {
	t.Helper()
	doc, err := os.ReadFile(filepath.Join("../../testdata/rules", j, kind+".json"))
	if err != nil {
		t.Fatal(err)
	}
	decodeCases(t, doc, to)
}

func casesOf(t *testing.T, b *rulebook.Book, j string) coverage {
	t.Helper()
	c := coverage{}
	for _, kind := range []string{"claims", "health_claims"} {
		var claims casesIn[claimCase]
		caseFile(t, j, kind, &claims)
		for _, one := range claims.Cases {
			c.claim(lawOn(b, j, one.On, one.Transition, one.Given.Facts), one.Claim, one.Text)
		}
	}
	var rounding roundingCases
	caseFile(t, j, "rounding", &rounding)
	for _, table := range rounding.Tables {
		for _, row := range table.Rows {
			law, _ := b.At(j, table.On, rulebook.Transition(table.Transition), row.holds)
			if r, ok := law.RoundingOf(table.Quantity); ok {
				c[r.Head] = true
			}
		}
	}
	var findings casesIn[findingCase]
	caseFile(t, j, "findings", &findings)
	for _, one := range findings.Cases {
		law := lawOn(b, j, one.On, one.Transition, one.Given.Facts)
		for _, a := range slices.Concat(law.Limits.All, law.Serving.All) {
			if _, ok := one.Findings[a.Body.Code]; ok {
				c[a.Head] = true
			}
		}
	}
	return c
}

// Every version of a rule that decides something carries cases: claims, health claims, roundings, limits and serving rules. Of a family, one
// member's cases stand for all.
func TestEveryVersionHasCases(t *testing.T) {
	b := book(t)
	for _, j := range b.Jurisdictions() {
		t.Run(j, func(t *testing.T) {
			covered := casesOf(t, b, j)
			m, _ := b.Rules(j)
			uncovered(t, "claims", covered, m.Claims, func(c *rulebook.Claim) bool { return true })
			uncovered(t, "health_claims", covered, m.HealthClaims, func(c *rulebook.Claim) bool { return c.Condition != nil })
			uncovered(t, "rounding", covered, m.Roundings, func(*rulebook.Rounding) bool { return true })
			uncovered(t, "limits", covered, m.Limits, func(*rulebook.Limit) bool { return true })
			uncovered(t, "serving", covered, m.Serving, func(*rulebook.Limit) bool { return true })
		})
	}
}

func uncovered[T any](t *testing.T, kind string, covered coverage, rules []rulebook.Rule[T], decides func(*T) bool) {
	t.Helper()
	family := map[string]bool{}
	for pass := range 2 {
		for i := range rules {
			r := &rules[i]
			for v := range r.Versions {
				key := fmt.Sprint(r.ForEach, v)
				if r.ForEach == nil {
					key = fmt.Sprint(r.ID, v)
				}
				switch {
				case covered[&r.Versions[v].Head]:
					family[key] = true
				case pass == 1 && !family[key] && decides(&r.Versions[v].Body):
					t.Errorf("%s: %s has no case for its version from %s", kind, r.ID, r.Versions[v].From)
					family[key] = true
				}
			}
		}
	}
}
