package food

import (
	"strings"
	"testing"
	"unicode/utf8"

	"gramlaw/internal/food/words"
)

func TestSearch(t *testing.T) {
	cases := []struct{ name, text, first string }{
		{"a letter missing", "buter salted", "Butter, salted"},
		{"two words", "olive oil", "Oil, olive, salad or cooking"},
		{"other order", "oil olive", "Oil, olive, salad or cooking"},
		{"an error in each word", "cheddr chese", "Cheese, cheddar"},
		{"two letters exchanged", "whaet flour", "Wheat flour, whole-grain"},
		{"a letter changed", "mayonnause", "Mayonnaise, made with tofu"},
		{"a letter added", "saltt table", "Salt, table"},
		{"the beginning of a word", "chedd", "Cheese, cheddar"},
		{"capitals and punctuation", "  OATS!! ", "Oats"},
		{"accents", "jalapeño raw", "Peppers, jalapeno, raw"},
		{"a doubled word", "salt salt table", "Salt, table"},
		{"exact before beginning: oats, not oatmeal", "oats", "Oats"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			found := Search(c.text, 5)
			if len(found) == 0 || found[0].Name() != c.first {
				t.Errorf("Search(%q) = %v, want %s first", c.text, foodNames(found), c.first)
			}
		})
	}
}

func foodNames(foods []Food) []string {
	var all []string
	for _, f := range foods {
		all = append(all, f.Name())
	}
	return all
}

func TestSearchFindsNothing(t *testing.T) {
	for _, text := range []string{"", "   ", "!?", "zzzzzz", "butter qqqqqq", "btr"} {
		if found := Search(text, 5); len(found) != 0 {
			t.Errorf("Search(%q) = %v", text, foodNames(found))
		}
	}
	if Search("butter", 0) != nil || Search("butter", -1) != nil {
		t.Error("no limit, no food")
	}
}

func TestSearchLimitAndOrder(t *testing.T) {
	all := Search("butter", 1<<20)
	if len(all) < 100 || len(Search("butter", 7)) != 7 {
		t.Fatalf("%d foods with butter", len(all))
	}
	worst, length := 0, 0
	for _, f := range all {
		way := ways
		for _, word := range words.Split(f.Name()) {
			way = min(way, compare(word, "butter"))
		}
		if way < worst || way == ways || (way == worst && len(f.Name()) < length) {
			t.Errorf("%s stands too late", f.Name())
		}
		worst, length = way, len(f.Name())
	}
}

// Every food is found by its own name.
func TestSearchFindsEveryFood(t *testing.T) {
	step := 97
	for i := 0; i < foodCount(); i += step {
		f := foodAt(i)
		if len(words.Split(f.Name())) > maxWords || len(f.Name()) > MaxQuery {
			continue
		}
		if found := Search(f.Name(), 1); len(found) != 1 || !strings.EqualFold(found[0].Name(), f.Name()) {
			t.Errorf("%q finds %v", f.Name(), foodNames(found))
		}
	}
}

func TestOneError(t *testing.T) {
	cases := []struct {
		a, b string
		want bool
	}{
		{"butter", "buter", true}, {"buter", "butter", true}, {"butter", "buttre", true}, {"butter", "buttar", true},
		{"butter", "utter", true}, {"butter", "butters", true}, {"butter", "ubtter", true}, {"butter", "butter", true},
		{"butter", "btter s", false}, {"butter", "buer", false}, {"butter", "bautrer", false}, {"abcd", "badc", false}, {"", "ab", false},
	}
	for _, c := range cases {
		if got := oneError(c.a, c.b); got != c.want {
			t.Errorf("oneError(%q, %q) = %t", c.a, c.b, got)
		}
	}
}

func FuzzSearch(f *testing.F) {
	for _, seed := range []string{"buter salted", "olive oil", "ölive\xff oil", "1% milk", strings.Repeat("é", 150)} {
		f.Add(seed)
	}
	f.Fuzz(func(t *testing.T, text string) {
		found := Search(text, 3)
		if len(found) > 3 {
			t.Errorf("%d foods", len(found))
		}
		for _, food := range found {
			if food.Name() == "" || !utf8.ValidString(food.Name()) {
				t.Errorf("%s has no proper name", food.Ref())
			}
		}
	})
}

func BenchmarkSearch(b *testing.B) {
	for _, text := range []string{"olive oil", "cheddr chese", "a", "oil industrial soy partially hydrogenated all purpose frying fat"} {
		b.Run(text[:min(len(text), 12)], func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				Search(text, 20)
			}
		})
	}
}
