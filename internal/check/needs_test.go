package check_test

import (
	"slices"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
)

// Canada's zero depends on a claim's condition per reference amount; without one the line says what it lacks.
func TestAnOpenZeroNamesWhatItLacks(t *testing.T) {
	r, faults := recipe.Decode([]byte(`{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g","composition":{"components":{"NA":"6 mg"}}}],"serving":{"default":{"amount":"50 g"}}}`))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	rep, faults := check.Check(r, book(t), check.Request{On: "2026-12-01", In: []string{"ca"}})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	line, _, err := printedLine(rep.Jurisdictions[0], "sodium", "")
	if err != nil {
		t.Fatal(err)
	}
	if line.Status != "undetermined" || !slices.Contains(line.Needs, "the reference amount") {
		t.Errorf("sodium is %s and needs %v", line.Status, line.Needs)
	}
}
