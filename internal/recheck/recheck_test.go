package recheck_test

import (
	"encoding/json"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"testing"
	"testing/fstest"

	"gramlaw/internal/check"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recheck"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func book(t testing.TB) *rulebook.Book {
	t.Helper()
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func demo(t testing.TB) []*recipe.Recipe {
	t.Helper()
	files, err := filepath.Glob("../../testdata/recipes/*.json")
	if err != nil || len(files) < 5 {
		t.Fatal("demo recipes are missing", err)
	}
	var out []*recipe.Recipe
	for _, f := range files {
		doc, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		r, faults := recipe.Decode(doc)
		if len(faults) > 0 {
			t.Fatal(f, faults)
		}
		out = append(out, r)
	}
	return out
}

// A comparison is that of two full checks: the same things differ, and what differs in no rule differs in nothing.
func TestComparesLikeTwoChecks(t *testing.T) {
	b := book(t)
	dates := []string{"2007-06-01", "2015-01-01", "2017-01-01", "2019-12-31", "2020-01-01", "2021-06-01", "2021-12-14", "2024-06-01", "2025-12-31", "2026-01-01", "2028-01-01"}
	rnd := rand.New(rand.NewPCG(7, 8))
	changed := 0
	for _, r := range demo(t) {
		for range 8 {
			from, to := dates[rnd.IntN(len(dates))], dates[rnd.IntN(len(dates))]
			q := check.Request{Transition: []rulebook.Transition{rulebook.WhenRequired, rulebook.Newest}[rnd.IntN(2)]}
			plan, faults := recheck.New(check.Side{Book: b, On: from}, check.Side{Book: b, On: to}, q)
			if len(faults) > 0 {
				t.Fatal(faults)
			}
			got, faults := plan.Recipe(r)
			if len(faults) > 0 {
				t.Fatal(faults)
			}
			for _, j := range b.Jurisdictions() {
				want := differences(full(t, r, b, from, j, q), full(t, r, b, to, j, q))
				have := have(got, j)
				if !slices.Equal(have, want) {
					t.Errorf("%s in %s, %s to %s (%s): differs in\n%q\nwant\n%q", r.ID, j, from, to, q.Transition, have, want)
				}
				changed += len(want)
			}
		}
	}
	if changed == 0 {
		t.Error("nothing ever changed")
	}
}

func full(t *testing.T, r *recipe.Recipe, b *rulebook.Book, on, j string, q check.Request) check.Market {
	t.Helper()
	q.On, q.In = on, []string{j}
	rep, faults := check.Check(r, b, q)
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return rep.Jurisdictions[0]
}

// differences lists the printed values and verdicts that differ, in a way of its own.
func differences(was, is check.Market) []string {
	a, b := said(was), said(is)
	var out []string
	for k, v := range a {
		if b[k] != v {
			out = append(out, fmt.Sprintf("%s: %q to %q", k, v, b[k]))
		}
	}
	for k, v := range b {
		if _, ok := a[k]; !ok {
			out = append(out, fmt.Sprintf("%s: %q to %q", k, "", v))
		}
	}
	slices.Sort(out)
	return out
}

func said(m check.Market) map[string]string {
	out := map[string]string{}
	for _, l := range m.Declaration.Lines {
		for _, v := range l.Values {
			percent := ""
			if v.PercentReference != nil && v.PercentReference.Text != "" {
				percent = " (" + v.PercentReference.Text + ")"
			}
			out[l.Quantity+" per "+v.Basis] = l.Term + " " + v.Text + percent + ", " + l.Presence
		}
	}
	for _, c := range m.AlsoPermitted {
		out[c.Claim] = c.Verdict
	}
	return out
}

// have lists the same of an outcome.
func have(o *recheck.Outcome, j string) []string {
	out := []string{}
	for _, m := range o.Markets {
		if m.Jurisdiction != j {
			continue
		}
		for _, c := range m.Changes {
			value := c.Kind == recheck.Line && !slices.Contains([]string{"title of the declaration", "servings per package", "serving size", "shorter format", "declaration"}, c.What) && c.What[:min(7, len(c.What))] != "column "
			if value || c.Kind == recheck.OfferGained || c.Kind == recheck.OfferLost {
				out = append(out, fmt.Sprintf("%s: %q to %q", c.What, c.Was, c.Is))
			}
		}
	}
	slices.Sort(out)
	if len(out) == 0 {
		return nil
	}
	return out
}

// Every change names changed rules.
func TestChangesNameTheirRules(t *testing.T) {
	b := book(t)
	plan, faults := recheck.New(check.Side{Book: b, On: "2019-06-01"}, check.Side{Book: b, On: "2026-12-01"}, check.Request{})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	was, _ := b.At("us", "2019-06-01", rulebook.WhenRequired, open)
	is, _ := b.At("us", "2026-12-01", rulebook.WhenRequired, open)
	known := map[string]bool{}
	for _, c := range rulebook.Changes(was, is) {
		known[c.ID] = true
	}
	seen := 0
	for _, r := range demo(t) {
		o, faults := plan.Recipe(r)
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		for _, m := range o.Markets {
			for _, c := range m.Changes {
				if len(c.Rules) == 0 {
					t.Errorf("%s, %s %s: no rule is named", r.ID, c.Kind, c.What)
				}
				for _, id := range c.Rules {
					if seen++; m.Jurisdiction == "us" && !known[id] {
						t.Errorf("%s, %s %s: %s did not change", r.ID, c.Kind, c.What, id)
					}
				}
			}
		}
	}
	if seen == 0 {
		t.Error("no rule was ever named")
	}
}

func open(*rulebook.Condition) quantity.Truth { return quantity.Open }

// A threshold that one set moves is found, with its rule, between two sets on one day; nothing else is.
func TestOneThresholdBetweenTwoSets(t *testing.T) {
	old := book(t)
	files := fstest.MapFS{}
	copyFile(t, files, "set.json")
	names, err := filepath.Glob("../../rules/*/*.json")
	if err != nil || len(names) == 0 {
		t.Fatal(names, err)
	}
	for _, n := range names {
		copyFile(t, files, filepath.Base(filepath.Dir(n))+"/"+filepath.Base(n))
	}
	doc := files["eu/claims.json"].Data
	var claims map[string]any
	if err := json.Unmarshal(doc, &claims); err != nil {
		t.Fatal(err)
	}
	if !moveThreshold(claims, "eu/claim/saturated-fat-low") {
		t.Fatal("the claim to move was not found")
	}
	files["eu/claims.json"].Data, _ = json.Marshal(claims)
	now, err := rulebook.Load(files)
	if err != nil {
		t.Fatal(err)
	}
	plan, faults := recheck.New(check.Side{Book: old, On: "2026-12-01"}, check.Side{Book: now, On: "2026-12-01"}, check.Request{})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	found := 0
	for _, r := range demo(t) {
		o, faults := plan.Recipe(r)
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		for _, m := range o.Markets {
			for _, c := range m.Changes {
				found++
				if m.Jurisdiction != "eu" || !slices.Equal(c.Rules, []string{"eu/claim/saturated-fat-low"}) {
					t.Errorf("%s in %s: %+v", r.ID, m.Jurisdiction, c)
				}
			}
		}
	}
	if found == 0 {
		t.Error("the moved threshold changed nothing")
	}
}

func copyFile(t *testing.T, to fstest.MapFS, name string) {
	t.Helper()
	doc, err := os.ReadFile("../../rules/" + name)
	if err != nil {
		t.Fatal(err)
	}
	to[name] = &fstest.MapFile{Data: doc}
}

// moveThreshold makes every "at most" of a claim a thousand times as wide.
func moveThreshold(doc map[string]any, id string) bool {
	found := false
	for _, r := range doc["rules"].([]any) {
		rule := r.(map[string]any)
		if rule["id"] != id {
			continue
		}
		var walk func(any)
		walk = func(v any) {
			switch v := v.(type) {
			case map[string]any:
				if _, ok := v["at most"].(string); ok {
					v["at most"], found = "99 g", true
					if as, _ := v["as"].(string); as != "" {
						v["at most"] = "99 %"
					}
				}
				for _, one := range v {
					walk(one)
				}
			case []any:
				for _, one := range v {
					walk(one)
				}
			}
		}
		walk(rule["versions"])
	}
	return found
}
