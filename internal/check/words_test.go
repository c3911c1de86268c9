package check_test

import "testing"

// What a label states in a second language is in that language: its terms, its "and", its decimal mark.
func TestShortFormsInFrench(t *testing.T) {
	m := run(t, book(t), "ca", "2026-12-01", "required", []byte(`{"id":"w","name":"Water","ingredients":[{"id":"w","name":"water","amount":"1000 g","food":"sr:14411"}],
		"serving":{"ca":{"amount":"220 g"}},"reference_amount":{"ca":"250 g"},"package":{"net":"1000 g"}}`))
	if m.Declaration.Simplified == nil || m.Declaration.Servings == nil {
		t.Fatal("no simplified format, or no servings per package")
	}
	const left = "Source négligeable de lipides saturés, lipides trans, cholestérol, fibres, sucres, potassium et fer"
	if got := m.Declaration.Simplified.Texts["fr"]; got != left {
		t.Errorf("the label states %q, want %q", got, left)
	}
	if got, want := m.Declaration.Servings.Texts["fr"], "Portions par contenant environ 4,5"; got != want {
		t.Errorf("the label states %q, want %q", got, want)
	}
}
