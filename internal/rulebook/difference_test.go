package rulebook_test

import (
	"slices"
	"strings"
	"testing"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

func loaded(t *testing.T, files map[string]string) *rulebook.Book {
	t.Helper()
	b, err := rulebook.Load(smallSet(files))
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// threeVersions is a rule of the small set: one version for each edition, and one that comes with conditions of its own.
var threeVersions = map[string]string{"xx/reference_values.json": `{"jurisdiction":"xx","rules":[
	{"id":"xx/reference/fat","versions":[
		{"from":"2000-01-01","until":"2021-01-01","edition":"a","quantity":"fat","amounts":{"general population":"65 g"},` + source + `},
		{"from":"2016-01-01","required_from":[{"date":"2021-01-01"}],"edition":"b","quantity":"fat","amounts":{"general population":"78 g"},` + source + `}]},
	{"id":"xx/reference/late","versions":[{"from":"2018-05-01","until":"2022-01-01","quantity":"fat","amounts":{"general population":"1 g"},` + source + `}]}]}`}

// short writes changes as "rule effect", with the members that differ.
func short(changes []rulebook.Change) string {
	var out []string
	for _, c := range changes {
		s := c.ID + " " + c.Effect
		for _, m := range c.Members {
			s += " " + m.Member
		}
		out = append(out, s)
	}
	return strings.Join(out, "; ")
}

// changes compares a market's laws of two days.
func changes(b *rulebook.Book, j, from, to string, transition rulebook.Transition) []rulebook.Change {
	was, _ := b.At(j, from, transition, sales(quantity.Open))
	is, _ := b.At(j, to, transition, sales(quantity.Open))
	return rulebook.Changes(was, is)
}

func TestChangesBetweenDays(t *testing.T) {
	b := loaded(t, threeVersions)
	for _, c := range []struct {
		name, from, to string
		transition     rulebook.Transition
		want           string
	}{
		{"the same day", "2020-06-01", "2020-06-01", rulebook.WhenRequired, ""},
		{"nothing on the way", "2018-05-01", "2020-06-01", rulebook.WhenRequired, ""},
		{"a rule begins", "2018-04-30", "2018-05-01", rulebook.WhenRequired, "xx/reference/late begins"},
		{"a rule ends", "2021-12-31", "2022-01-01", rulebook.WhenRequired, "xx/reference/late ends"},
		{"begun and ended on the way", "2018-04-30", "2022-01-01", rulebook.Newest, ""},
		{"the new edition may be used", "2015-12-31", "2016-01-01", rulebook.Newest, "xx/reference/fat replaced amounts"},
		{"nobody must yet", "2015-12-31", "2016-01-01", rulebook.WhenRequired, ""},
		{"everybody must", "2020-12-31", "2021-01-01", rulebook.WhenRequired, "xx/reference/fat replaced amounts"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := short(changes(b, "xx", c.from, c.to, c.transition)); got != c.want {
				t.Errorf("%q; want %q", got, c.want)
			}
		})
	}
}

func TestAChangeTellsBothSides(t *testing.T) {
	got := changes(loaded(t, threeVersions), "xx", "2015-12-31", "2021-01-01", rulebook.WhenRequired)
	if want := "xx/reference/fat replaced amounts; xx/reference/late begins"; short(got) != want {
		t.Fatalf("%q; want %q", short(got), want)
	}
	c := got[0]
	if c.Was.Edition != "a" || c.Is.Edition != "b" || c.Jurisdiction != "xx" || c.Kind != "reference_values" || c.Says != "replaced: amounts" {
		t.Errorf("%+v", c)
	}
	if got := string(c.Members[0].Was) + " " + string(c.Members[0].Is); got != `{"general population":"65 g"} {"general population":"78 g"}` {
		t.Error(got)
	}
}

func TestDifferenceOfSets(t *testing.T) {
	file := func(from, to string) map[string]string {
		return map[string]string{"xx/reference_values.json": strings.Replace(threeVersions["xx/reference_values.json"], from, to, 1)}
	}
	old := loaded(t, threeVersions)
	for _, c := range []struct {
		name string
		now  map[string]string
		want string
	}{
		{"the same set", threeVersions, ""},
		{"only white space", file(`[`, ` [`), ""},
		{"a rule less", nil, "xx/reference/fat removed; xx/reference/fat removed; xx/reference/late removed"},
		{"an amount", file("78 g", "79 g"), "xx/reference/fat edited amounts"},
		{"the source", file(`"ref":"x"`, `"ref":"y"`), "xx/reference/fat edited source"},
		{"an end", file("2022-01-01", "2023-01-01"), "xx/reference/late edited until"},
		{"another beginning", file("2018-05-01", "2018-06-01"), "xx/reference/late removed; xx/reference/late added"},
		{"a renamed rule", file("/late", "/new"), "xx/reference/late removed; xx/reference/new added"},
		{"the market's own page", map[string]string{
			"xx/jurisdiction.json":     strings.Replace(string(smallSet(nil)["xx/jurisdiction.json"].Data), `"caution":"c"`, `"caution":"d"`, 1),
			"xx/reference_values.json": threeVersions["xx/reference_values.json"],
		}, "xx/jurisdiction edited caution"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := short(rulebook.Difference(old, loaded(t, c.now))); got != c.want {
				t.Errorf("%q; want %q", got, c.want)
			}
		})
	}
}

func TestDifferenceSaysWhatChanged(t *testing.T) {
	old := loaded(t, map[string]string{"xx/reference_amounts.json": oneRule("xx/reference-amount/r", `"names":{"en":["R"]},"amount":"55 g"`)})
	now := loaded(t, map[string]string{"xx/reference_amounts.json": oneRule("xx/reference-amount/r", `"names":{"en":["R"]},"amount":"110 g"`)})
	got := rulebook.Difference(old, now)
	if len(got) != 1 || got[0].Says != "edited: amount 55 g becomes 110 g" {
		t.Errorf("%+v", got)
	}
}

// The reform of the United States' label stands between these days in the embedded set.
func TestChangesOfTheEmbeddedSet(t *testing.T) {
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	if got := rulebook.Difference(b, b); len(got) != 0 {
		t.Errorf("a set differs from itself: %s", short(got))
	}
	got := changes(b, "us", "2016-07-25", "2021-01-01", rulebook.WhenRequired)
	i := slices.IndexFunc(got, func(c rulebook.Change) bool { return c.ID == "us/reference/fat" })
	if i < 0 || got[i].Effect != rulebook.Replaced {
		t.Errorf("the reference value of fat is not replaced: %s", short(got))
	}
}

func BenchmarkDifference(b *testing.B) {
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		rulebook.Difference(book, book)
	}
}
