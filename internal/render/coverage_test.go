package render

import (
	"bytes"
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/coverage"
	"gramlaw/internal/rulebook"
)

func sampleCoverage() *coverage.Report {
	kind := func(name string, n int) coverage.Kind {
		return coverage.Kind{Kind: name, Rules: n - 1, Versions: n, First: "2020-01-01", Evidence: map[string]int{"official text": n - 1, "memory": 1}, Force: map[string]int{"law": n}}
	}
	return &coverage.Report{Version: "1", Digest: "sha256:0123", Caution: "Confirm it.", Markets: []coverage.Market{
		{Jurisdiction: "aa", Name: "Alphaland", Languages: []string{"en"}, Editions: []string{"2020"}, Kinds: []coverage.Kind{kind("reference_amounts", 3)}, Total: kind("all", 3), Gaps: []string{"Small packages."}},
		{Jurisdiction: "practice", Name: "Practice", Total: coverage.Kind{Kind: "all"}},
	}}
}

func TestCoverageText(t *testing.T) {
	var b bytes.Buffer
	if err := Coverage(&b, sampleCoverage()); err != nil {
		t.Fatal(err)
	}
	golden(t, "coverage.txt", b.String())
	for line := range strings.Lines(b.String()) {
		if n := columns(strings.TrimSuffix(line, "\n")); n > Width {
			t.Errorf("%d columns: %q", n, line)
		}
	}
	if err := Coverage(broken{}, sampleCoverage()); err == nil {
		t.Error("the writer's error is lost")
	}
}

// Every grade the rule book knows has a column.
func TestEveryGradeHasAColumn(t *testing.T) {
	var evidences, forces []string
	for _, g := range grades {
		if g.evidence != "" {
			evidences = append(evidences, g.evidence)
		} else {
			forces = append(forces, g.force)
		}
	}
	if !slices.Equal(evidences, rulebook.Evidences) || !slices.Equal(forces, rulebook.Forces) {
		t.Errorf("columns are %v and %v", evidences, forces)
	}
}
