package check_test

import (
	"encoding/json"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// What a report offers besides is what it gives when asked for, and of what it does not offer nothing is permitted.
func TestOffersAreWhatClaimsGet(t *testing.T) {
	b := book(t)
	files, err := filepath.Glob("../../testdata/recipes/*.json")
	if err != nil || len(files) == 0 {
		t.Fatal("no demo recipes", err)
	}
	offered := 0
	for _, file := range files {
		plain := withClaims(t, file, nil)
		for _, j := range []string{"us", "ca", "eu"} {
			verdicts := map[string]string{}
			for _, c := range checked(t, b, plain, j).AlsoPermitted {
				offered++
				verdicts[c.Claim] = c.Verdict
				got := checked(t, b, withClaims(t, file, []string{rulebook.Name(c.Claim)}), j).Claims[0]
				if got.Claim != c.Claim || got.Verdict != c.Verdict {
					t.Errorf("%s in %s: %s is offered as %s and judged %s", file, j, c.Claim, c.Verdict, got.Verdict)
				}
			}
			for _, c := range checked(t, b, withClaims(t, file, b.ClaimNames()), j).Claims {
				_, is := verdicts[c.Claim]
				if may := c.Verdict == check.Permitted || c.Verdict == check.WithStatement; may && !is && !keptBack(b, j, c.Claim) {
					t.Errorf("%s in %s: %s is %s and not offered", file, j, c.Claim, c.Verdict)
				}
			}
		}
	}
	if offered == 0 {
		t.Error("nothing is offered for any demo recipe")
	}
}

// keptBack tells whether a claim is not offered unasked: it may rest on a reference food, or its rule says so.
func keptBack(b *rulebook.Book, j, id string) bool {
	m, _ := b.Rules(j)
	for _, c := range slices.Concat(m.Claims, m.HealthClaims) {
		if c.ID == id {
			return slices.ContainsFunc(c.Versions, func(v rulebook.Version[rulebook.Claim]) bool { return v.Body.Against || v.Body.NotOffered })
		}
	}
	return false
}

// withClaims is a demo recipe with other claims.
func withClaims(t *testing.T, file string, names []string) []byte {
	t.Helper()
	doc, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	var m map[string]any
	if err := json.Unmarshal(doc, &m); err != nil {
		t.Fatal(err)
	}
	delete(m, "claims")
	if names != nil {
		var claims []any
		for _, n := range names {
			claims = append(claims, map[string]any{"claim": n})
		}
		m["claims"] = claims
	}
	doc, err = json.Marshal(m)
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

func checked(t *testing.T, b *rulebook.Book, doc []byte, j string) check.Market {
	t.Helper()
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	report, faults := check.Check(r, b, check.Request{On: "2026-12-01", In: []string{j}})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return report.Jurisdictions[0]
}
