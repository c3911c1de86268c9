package rulebook_test

import (
	"testing"

	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

// The embedded set passes its own lint; every problem is told.
func TestEmbeddedRulesPassLint(t *testing.T) {
	book, problems := rulebook.Lint(rules.FS)
	for _, p := range problems {
		t.Error(p)
	}
	if len(problems) == 0 && len(book.Jurisdictions()) == 0 {
		t.Error("the set holds no market")
	}
}

// Reading, linting and preparing the embedded set.
func BenchmarkLoad(b *testing.B) {
	for b.Loop() {
		if _, err := rulebook.Load(rules.FS); err != nil {
			b.Fatal(err)
		}
	}
}
