package render

import (
	"strings"
	"testing"

	"gramlaw/internal/check"
)

func TestShort(t *testing.T) {
	for _, c := range []struct{ name, exact, want string }{
		{"zero", "0", "0"},
		{"as it is", "0.3396", "0.3396"},
		{"five digits stay", "53.565", "53.565"},
		{"rounded down", "53.56258", "≈53.56"},
		{"rounded up", "53.56558", "≈53.57"},
		{"small", "0.013872176961261859142", "≈0.01387"},
		{"just below an edge", "0.49996789", "≈0.4999"},
		{"just above an edge", "0.50000321", "≈0.5"},
		{"just below an edge of three digits", "12.499999", "≈12.49"},
		{"just below ten", "9.9999999", "≈9.999"},
		{"negative towards zero", "-0.29999999", "≈-0.2999"},
		{"large keeps a decimal", "1234.5678", "≈1234.6"},
		{"large and whole", "1234567", "1234567"},
		{"twenty digits may go on", "0.33333333333333333333", "≈0.3333"},
		{"no number", "unknown", "unknown"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := short(c.exact); got != c.want {
				t.Errorf("%s reads %s, want %s", c.exact, got, c.want)
			}
		})
	}
}

// What is read must stand on the same side of the threshold as the exact value.
func TestBeside(t *testing.T) {
	for _, c := range []struct{ name, value, threshold, want string }{
		{"far", "0.87838815", "2", "≈0.8784"},
		{"just above", "2.0000432", "2", "≈2.00004"},
		{"just below", "1.9999988", "2", "≈1.999"},
		{"on it", "2", "2", "2"},
		{"threshold of many digits from below", "1.23456789", "1.2346", "≈1.23457"},
		{"threshold is no number", "1.23456789", "", "≈1.235"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := beside(c.value, c.threshold); got != c.want {
				t.Errorf("%s beside %s reads %s, want %s", c.value, c.threshold, got, c.want)
			}
		})
	}
}

func plainSpaces(s string) string { return strings.ReplaceAll(s, bond, " ") }

func TestBetween(t *testing.T) {
	for _, c := range []struct{ name, low, high, unit, want string }{
		{"range", "0.2", "0.5", "g", "0.2 to 0.5 g"},
		{"both long", "0.2123456", "0.5123456", "g", "≈0.2123 to 0.5123 g"},
		{"only the high end long", "0", "0.1131234", "g", "0 to ≈0.1131 g"},
		{"alike when read", "1.730071086866", "1.730077086866", "g", "≈1.73 g"},
		{"large for its unit", "0", "10000000", "ug", "0 to 10 g"},
		{"ends in two units", "12", "59500000", "ug", "12 ug to 59.5 g"},
		{"mg", "0", "59500", "mg", "0 to 59.5 g"},
		{"no unit", "1", "2", "", "1 to 2"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := plainSpaces(between(c.low, c.high, c.unit)); got != c.want {
				t.Errorf("reads %q, want %q", got, c.want)
			}
		})
	}
}

func TestExactly(t *testing.T) {
	mid := "0.35"
	for _, c := range []struct {
		name string
		v    check.Value
		want string
	}{
		{"determined", check.Value{Exact: &mid, Low: "0.35", High: "0.35", Unit: "g"}, "0.35 g"},
		{"typical", check.Value{Exact: &mid, Low: "0.2", High: "0.5", Unit: "g"}, "0.35 g (0.2 to 0.5 g)"},
		{"range", check.Value{Low: "0.2", High: "0.5", Unit: "g"}, "0.2 to 0.5 g"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := plainSpaces(exactly(&c.v)); got != c.want {
				t.Errorf("reads %q, want %q", got, c.want)
			}
		})
	}
}

func TestSpan(t *testing.T) {
	for in, want := range map[string]string{
		"0 g to 0.5 g":           "0 to 0.5 g",
		"1 %":                    "1 %",
		"less than 5 mg to 5 mg": "less than 5 mg to 5 mg",
		"1606 kJ to 2051 kJ":     "1606 to 2051 kJ",
		"6 % to 12 %":            "6 to 12 %",
		"900 kcal to 1 kJ":       "900 kcal to 1 kJ",
	} {
		if got := span(in); got != want {
			t.Errorf("%q reads %q, want %q", in, got, want)
		}
	}
}
