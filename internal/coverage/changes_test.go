package coverage_test

import (
	"flag"
	"fmt"
	"os"
	"path"
	"regexp"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/coverage"
	"gramlaw/internal/rulebook"
)

var update = flag.Bool("update", false, "write the counts of rules/CHANGES.md anew")

const (
	changesFile = "../../rules/CHANGES.md"
	since       = "2010-01-01" // switches before this day need not be told
)

func changes(t *testing.T) string {
	t.Helper()
	b, err := os.ReadFile(changesFile)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

// newest is the part of the page on the newest version of the set.
func newest(t *testing.T, page string) (version, part string) {
	t.Helper()
	parts := regexp.MustCompile(`(?m)^## (\S+) \(\d{4}-\d\d-\d\d\)$`)
	at := parts.FindAllStringSubmatchIndex(page, -1)
	if len(at) == 0 {
		t.Fatal("no version stands in the page")
	}
	end := len(page)
	if len(at) > 1 {
		end = at[1][0]
	}
	return page[at[0][2]:at[0][3]], page[at[0][1]:end]
}

func TestChangesBeginWithTheVersionOfTheSet(t *testing.T) {
	if version, _ := newest(t, changes(t)); version != load(t).Version {
		t.Errorf("the page begins with %s, rules/set.json says %s", version, load(t).Version)
	}
}

// switches are the rules of a market by the days on which one of their versions begins, becomes a duty or ends. An edition
// stands as itself.
func switches(m *rulebook.Rules) map[string][]string {
	out := map[string][]string{}
	add := func(day, what string) {
		if day >= since && !slices.Contains(out[day], what) {
			out[day] = append(out[day], what)
		}
	}
	head := func(what string, from, until string, required []rulebook.Required) {
		add(from, what)
		add(until, what)
		for _, r := range required {
			add(r.Date, what)
		}
	}
	for _, e := range m.Market.Editions {
		head("edition "+e.Edition, e.From, e.Until, e.RequiredFrom)
	}
	coverage.Walk(m, func(_, id string, h *rulebook.Head) { head(id, h.From, h.Until, h.RequiredFrom) })
	return out
}

var names = regexp.MustCompile("`([a-z]+/[a-z-]+/[a-z0-9*-]+)`")

func namesIn(text string) []string {
	var out []string
	for _, m := range names.FindAllStringSubmatch(text, -1) {
		out = append(out, m[1])
	}
	return out
}

func named(list []string, id string) bool {
	return slices.ContainsFunc(list, func(pattern string) bool { ok, err := path.Match(pattern, id); return err == nil && ok })
}

// entries are the dated paragraphs of a market.
func entries(part, jurisdiction string) map[string]string {
	_, text, _ := strings.Cut(part, " ("+jurisdiction+")\n")
	text, _, _ = strings.Cut(text, "\n### ")
	out := map[string]string{}
	for _, one := range strings.Split(text, "\n#### ")[1:] {
		day, body, _ := strings.Cut(one, "\n")
		out[day] = body
	}
	return out
}

// Every day on which a label can change is told, with the rules that change it, and nothing else is.
func TestChangesTellEverySwitch(t *testing.T) {
	_, part := newest(t, changes(t))
	b := load(t)
	for _, j := range b.Jurisdictions() {
		m, _ := b.Rules(j)
		told, held := entries(part, j), switches(m)
		for day, body := range told {
			for _, name := range namesIn(body) {
				if !slices.ContainsFunc(held[day], func(id string) bool { return named([]string{name}, id) }) {
					t.Errorf("%s, %s: %s names no rule that switches on that day", j, day, name)
				}
			}
			if len(held[day]) == 0 {
				t.Errorf("%s, %s: nothing switches on that day", j, day)
			}
		}
		for day, rules := range held {
			body, ok := told[day]
			if !ok {
				t.Errorf("%s, %s is not told: %v", j, day, rules)
				continue
			}
			for _, id := range rules {
				if edition, is := strings.CutPrefix(id, "edition "); is && !strings.Contains(body, edition) || !is && !named(namesIn(body), id) {
					t.Errorf("%s, %s does not name %s", j, day, id)
				}
			}
		}
	}
}

// A rule that any part of the page names exists.
func TestChangesNameRulesThatExist(t *testing.T) {
	b := load(t)
	var known []string
	visit := func(_, id string, _ *rulebook.Head) { known = append(known, id) }
	for _, j := range b.Jurisdictions() {
		m, _ := b.Rules(j)
		coverage.Walk(m, visit)
	}
	coverage.Practice(b, visit)
	list := namesIn(changes(t))
	for _, name := range list {
		if !slices.ContainsFunc(known, func(id string) bool { return named([]string{name}, id) }) {
			t.Errorf("%s is no rule", name)
		}
	}
	if len(list) == 0 {
		t.Error("the page names no rule")
	}
}

// The counts of the page are those of the data.
func TestChangesCountTheRules(t *testing.T) {
	r, err := coverage.Of(load(t), nil, "")
	if err != nil {
		t.Fatal(err)
	}
	page := changes(t)
	const begin, end = "<!-- counts -->\n", "<!-- /counts -->"
	before, rest, ok1 := strings.Cut(page, begin)
	counts, after, ok2 := strings.Cut(rest, end)
	if !ok1 || !ok2 {
		t.Fatal("the marks of the counts are missing")
	}
	want := counted(r)
	if *update {
		if err := os.WriteFile(changesFile, []byte(before+begin+want+end+after), 0o644); err != nil {
			t.Fatal(err)
		}
		return
	}
	if counts != want {
		t.Errorf("the counts are\n%swant (go test ./internal/coverage -update writes them)\n%s", counts, want)
	}
}

// counted is a table of rules by kind and market, then of versions by grade.
func counted(r *coverage.Report) string {
	rows, order := map[string][]string{}, []string{}
	cell := func(row string, market, n int) {
		if rows[row] == nil {
			rows[row] = slices.Repeat([]string{""}, len(r.Markets))
			order = append(order, row)
		}
		rows[row][market] = fmt.Sprint(n)
	}
	head, line := "| |", "| --- |"
	for i, m := range r.Markets {
		head, line = head+" "+m.Name+" |", line+" ---: |"
		for _, k := range m.Kinds {
			cell(strings.ReplaceAll(k.Kind, "_", " "), i, k.Rules)
		}
	}
	for i, m := range r.Markets {
		cell("rules in all", i, m.Total.Rules)
		cell("dated versions", i, m.Total.Versions)
		for _, e := range rulebook.Evidences {
			cell("of them "+e, i, m.Total.Evidence[e])
		}
	}
	out := head + "\n" + line + "\n"
	for _, row := range order {
		out += "| " + row + " | " + strings.Join(rows[row], " | ") + " |\n"
	}
	return out
}
