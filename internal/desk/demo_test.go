package desk_test

import (
	"flag"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"gramlaw/internal/desk"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

var update = flag.Bool("update", false, "write the golden reports anew")

// rulesDigest is left out of golden reports: it changes with every byte of the rules.
var rulesDigest = regexp.MustCompile(`(?m)^(Rule set \S+) \(sha256:[0-9a-f]+…\)\.$`)

// The demo recipes against the embedded rules, in all markets. After a change of rules: read the difference, then
// go test ./internal/desk -run TestDemoReports -update
func TestDemoReports(t *testing.T) {
	recipes, err := filepath.Glob("../../testdata/recipes/*.json")
	if err != nil || len(recipes) == 0 {
		t.Fatalf("no demo recipes: %v", err)
	}
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	loaded := desk.Env{Now: today, Rules: func() (*rulebook.Book, error) { return book, nil }}
	for _, file := range recipes {
		name := strings.TrimSuffix(filepath.Base(file), ".json")
		t.Run(name, func(t *testing.T) {
			code, out, errs := run(t, loaded, "check", "-on", "2026-12-01", file)
			if code == desk.BadCall {
				t.Fatal(errs)
			}
			out = rulesDigest.ReplaceAllString(out, "$1.")
			golden := "../../testdata/reports/" + name + ".txt"
			if *update {
				if err := os.WriteFile(golden, []byte(out), 0o644); err != nil {
					t.Fatal(err)
				}
			}
			want, err := os.ReadFile(golden)
			if err != nil {
				t.Fatal(err)
			}
			if out != string(want) {
				t.Errorf("the report differs from %s; read it, and run with -update if it is right:\n%s", golden, firstDifference(string(want), out))
			}
		})
	}
}

func firstDifference(want, got string) string {
	a, b := strings.Split(want, "\n"), strings.Split(got, "\n")
	for i := range min(len(a), len(b)) {
		if a[i] != b[i] {
			return "was: " + a[i] + "\nnow: " + b[i]
		}
	}
	return "one ends earlier"
}
