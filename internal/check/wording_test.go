package check_test

import (
	"slices"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// read reads words in one market on a date with all rules of today.
func read(t *testing.T, r *recipe.Recipe, j, text, language string) []check.Reading {
	t.Helper()
	report, faults := check.Wording(r, book(t), check.WordingRequest{Text: text, Language: language, On: "2026-12-01", In: []string{j}})
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return report.Markets[0].Readings
}

func decode(t *testing.T, doc string) *recipe.Recipe {
	t.Helper()
	r, faults := recipe.Decode([]byte(doc))
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	return r
}

const oatsRecipe = `{"id":"o","name":"Oats","ingredients":[{"id":"o","name":"oats","amount":"100 g","food":"sr:08120"}],"state":{"default":"solid"},
	"serving":{"default":{"amount":"40 g"}},"reference_amount":{"default":"40 g"}}`

// A product given, words are judged, and what it may carry instead is told.
func TestWordingJudges(t *testing.T) {
	r := decode(t, oatsRecipe)
	got := read(t, r, "eu", "Low in fat and rich in fibre", "en")
	if len(got) != 2 {
		t.Fatalf("%+v", got)
	}
	fat, fibre := got[0], got[1]
	if fat.Verdict != check.Refused || fat.Condition == nil || *fat.Claim != "eu/claim/fat-low" {
		t.Errorf("low in fat: %+v", fat)
	}
	if fibre.Verdict != check.Permitted || fibre.Matched != rulebook.MatchListed || !slices.Equal(fibre.Span, []int{15, 28}) {
		t.Errorf("rich in fibre: %+v", fibre)
	}
	high := read(t, r, "us", "high in fiber", "en")[0] // 4 g of 28 g a serving is a good source, not high
	if high.Verdict != check.Refused || len(high.Instead) == 0 || high.Instead[0].Claim != "us/claim/fibre-source" {
		t.Errorf("high in fiber: %s, instead %+v", high.Verdict, high.Instead)
	}
}

// Without a product the condition stands in words, and what the words lack is told.
func TestWordingWithoutProduct(t *testing.T) {
	one := read(t, nil, "eu", "now with less fat", "en")[0]
	if one.Verdict != "" || one.Condition != nil || one.InWords == "" || !slices.Contains(one.Why, "the words do not name the food compared with") {
		t.Errorf("%+v", one)
	}
	one = read(t, nil, "us", "30 % less fat than our classic", "en")[0]
	if one.Percent != "30" || one.Compared != "our classic" || slices.Contains(one.Why, "the words do not name the food compared with") {
		t.Errorf("%+v", one)
	}
	one = read(t, nil, "eu", "97 % fat free", "en")[0]
	if one.Verdict != check.Refused || one.Matched != rulebook.MatchForbidden {
		t.Errorf("%+v", one)
	}
	one = read(t, nil, "ca", "Pauvre en sel", "fr")[0] // the table prescribes other words
	if one.Matched != rulebook.MatchMeaning || len(one.Instead) != 1 || one.Instead[0].Wordings[0] != "faible teneur en sodium" {
		t.Errorf("%+v", one)
	}
	one = read(t, nil, "eu", "low cholesterol levels of joy, smart fats", "en")[0]
	if one.Claim == nil && len(one.Nearest) == 0 {
		t.Errorf("%+v", one)
	}
}

// A relative claim finds the reference food that the words name.
func TestWordingFindsTheReferenceFood(t *testing.T) {
	const classic = `,"reference_foods":{"classic":{"kind":"own regular product","name":"our classic","composition":{"per":"100 g","source":"s","components":{"FAT":"20 g"}}},
		"deluxe":{"kind":"own regular product","name":"our deluxe","composition":{"per":"100 g","source":"s","components":{"FAT":"7 g"}}}}}`
	r := decode(t, oatsRecipe[:len(oatsRecipe)-1]+classic)
	for words, want := range map[string]string{"50 % less fat than our classic": check.Permitted, "50 % less fat than our deluxe": check.Refused, "80 % less fat than our classic": check.Refused} {
		if got := read(t, r, "eu", words, "en")[0].Verdict; got != want && !(want == check.Permitted && got == check.WithStatement) {
			t.Errorf("%s: %s, want %s", words, got, want)
		}
	}
}

// A language without words is said to be unsupported and judged nowhere; one that a market has no words in, there.
func TestUnsupportedLanguages(t *testing.T) {
	for _, c := range []struct {
		language string
		judged   map[string]bool
	}{{"ja", nil}, {"fr-CA", map[string]bool{"ca": true, "eu": true}}, {"de", map[string]bool{"eu": true}}, {"", map[string]bool{"us": true, "ca": true, "eu": true}}} {
		report, faults := check.Wording(nil, book(t), check.WordingRequest{Text: "100 % light", Language: c.language, On: "2026-12-01"})
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		for _, m := range report.Markets {
			if judged := m.NotJudged == ""; judged != c.judged[m.Jurisdiction] {
				t.Errorf("%q in %s: %q", c.language, m.Jurisdiction, m.NotJudged)
			}
		}
	}
}

// Claims that a recipe gives by their words are read: several in one text are several claims, and what is none is said so.
func TestClaimsGivenByWords(t *testing.T) {
	doc := oatsRecipe[:len(oatsRecipe)-1] + `,"claims":[{"text":"low in salt, high in fibre and fat free","language":"en"},{"text":"free from palm oil","language":"en"},{"text":"smart fats","language":"en"},{"text":"made with real oats","language":"en"}]}`
	m := run(t, book(t), "eu", "2026-12-01", "required", []byte(doc))
	type short struct{ claim, verdict, words string }
	var got []short
	for _, c := range m.Claims {
		got = append(got, short{c.Claim, c.Verdict, c.Words})
	}
	want := []short{{"eu/claim/salt-low", check.Permitted, "low in salt"}, {"eu/claim/fibre-high", check.Permitted, "high in fibre"}, {"eu/claim/fat-free", check.Refused, "fat free"},
		{"", check.NotListed, "free from palm oil"}, {"", check.Unread, "smart fats"}, {"", check.NotListed, ""}}
	if !slices.Equal(got, want) {
		t.Errorf("%+v\nwant %+v", got, want)
	}
}

func TestWordingFaults(t *testing.T) {
	_, faults := check.Wording(nil, book(t), check.WordingRequest{Text: " ", Language: "zz", On: "tomorrow", In: []string{"xx"}})
	var got []string
	for _, f := range faults {
		got = append(got, f.Pointer+" "+f.Code)
	}
	if want := []string{"on not-a-date", "in unknown-market", "text empty-text", "language unknown-language"}; !slices.Equal(got, want) {
		t.Errorf("%q, want %q", got, want)
	}
}
