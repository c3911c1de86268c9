package recipe

import "testing"

func TestNearest(t *testing.T) {
	known := []string{"amount", "name", "food", "yield", "reference_amount"}
	cases := []struct{ name, given, want string }{
		{"left out", "amout", "amount"},
		{"put in", "yieeld", "yield"},
		{"exchanged", "naem", "name"},
		{"another letter", "foot", "food"},
		{"case", "AMOUNT", "amount"},
		{"two slips in a long word", "referenc_amout", "reference_amount"},
		{"two slips in a short word", "fod2", ""},
		{"far away", "weather", ""},
		{"empty", "", ""},
		{"longer than any name", "amountamountamountamountamountamountamount", ""},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) { same(t, c.given, nearest(c.given, known), c.want) })
	}
}
