package render

import (
	"slices"
	"strings"
	"testing"
)

// Widths after Unicode Standard Annex 11 (East Asian Width); format characters and marks after the general categories.
func TestColumns(t *testing.T) {
	for _, c := range []struct {
		name, text string
		want       int
	}{
		{"ascii", "oats", 4},
		{"accent composed", "é", 1},
		{"accent combining", "e\u0301", 1},
		{"han", "燕麦", 4},
		{"hangul", "귀리", 4},
		{"full width latin", "ＡＢ", 4},
		{"half width katakana", "ｵｰﾂ", 3},
		{"emoji", "🌾", 2},
		{"emoji asked for as a picture", "❤\ufe0f", 2},
		{"joined emoji counts in full", "👩\u200d🌾", 4},
		{"arabic", "شوفان", 5},
		{"relations", "≈≤≥", 3},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := columns(c.text); got != c.want {
				t.Errorf("%q takes %d columns, want %d", c.text, got, c.want)
			}
		})
	}
}

func TestClean(t *testing.T) {
	for _, c := range []struct{ name, text, want string }{
		{"escape sequence", "a\x1b[31mb", "a\ufffd[31mb"},
		{"control of the C1 block", "a\u009bb", "a\ufffdb"},
		{"turned direction", "a\u202eb", "a\ufffdb"},
		{"line break", "a\nb\tc", "a b c"},
		{"soft hyphen", "a\u00adb", "ab"},
		{"tag characters", "a\U000e0041b", "ab"},
		{"invalid utf-8", "a\xffb", "a\ufffdb"},
		{"joiner stays", "👩\u200d🌾", "👩\u200d🌾"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := clean(c.text); got != c.want {
				t.Errorf("%q becomes %q, want %q", c.text, got, c.want)
			}
		})
	}
}

func TestWrap(t *testing.T) {
	for _, c := range []struct {
		name, text string
		most       int
		want       []string
	}{
		{"nothing", "", 5, []string{""}},
		{"only spaces", "   ", 5, []string{""}},
		{"fits", "one two", 7, []string{"one two"}},
		{"breaks", "one two", 6, []string{"one", "two"}},
		{"long word", "abcdefgh ij", 5, []string{"abcde", "fgh", "ij"}},
		{"long word goes on", "abcdef ij", 5, []string{"abcde", "f ij"}},
		{"wide characters", "燕麦燕麦", 5, []string{"燕麦", "燕麦"}},
		{"mark stays with its character", "abe\u0301c", 3, []string{"abe\u0301", "c"}},
		{"held together", "12" + bond + "g of", 4, []string{"12" + bond + "g", "of"}},
		{"broken where it was held", "1234" + bond + "kcal", 6, []string{"1234" + bond, "kcal"}},
		{"a wide character in one column", "燕", 1, []string{"燕"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := wrap(c.text, c.most); !slices.Equal(got, c.want) {
				t.Errorf("wraps to %q, want %q", got, c.want)
			}
		})
	}
}

func TestTableShrinksWhereWordsAllow(t *testing.T) {
	tab := table{gap: 2}
	tab.row(cell{text: strings.Repeat("word ", 30)}, cell{text: "12345" + bond + "kilojoules"})
	p := &page{}
	p.table(0, tab)
	if !strings.Contains(p.String(), "12345 kilojoules") {
		t.Errorf("a number left its unit:\n%s", p.String())
	}
	for line := range strings.Lines(p.String()) {
		if n := columns(strings.TrimSuffix(line, "\n")); n > Width {
			t.Errorf("%d columns: %s", n, line)
		}
	}
}
