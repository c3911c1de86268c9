package words

import (
	"slices"
	"testing"
)

func TestSplit(t *testing.T) {
	cases := []struct {
		name, text string
		want       []string
	}{
		{"punctuation", "Oil, olive, salad or cooking", []string{"oil", "olive", "salad", "or", "cooking"}},
		{"per cent and decimals", "Milk, 1.5% fat", []string{"milk", "1", "5", "fat"}},
		{"apostrophes", "Baker's baker’s", []string{"bakers", "bakers"}},
		{"accents", "Jalapeño ŒUF Crème Fraîche weiß", []string{"jalapeno", "oeuf", "creme", "fraiche", "weiss"}},
		{"signs in the accented range", "2×3÷4", []string{"2", "3", "4"}},
		{"broken text", "ol\xffive", []string{"ol", "ive"}},
		{"nothing", " ,;!", nil},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			if got := Split(c.text); !slices.Equal(got, c.want) {
				t.Errorf("Split(%q) = %q, want %q", c.text, got, c.want)
			}
		})
	}
}
