package rulebook_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

const source = `"source":{"ref":"x","evidence":"memory","force":"law"}`

// smallSet is a set that passes lint; files replaces or adds some.
func smallSet(files map[string]string) fstest.MapFS {
	set := map[string]string{
		"set.json":             `{"version":"1"}`,
		"xx/jurisdiction.json": `{"jurisdiction":"xx","name":"X","languages":["en"],"and":{"en":"and"},"editions":[{"edition":"a","from":"2000-01-01","until":"2021-01-01",` + source + `},{"edition":"b","from":"2016-01-01","required_from":[{"date":"2020-01-01","when":{"fact":"annual food sales","is":"10 million or more"}},{"date":"2021-01-01"}],` + source + `}],"assumed":[],"unlisted_claims":null,"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`,
		"xx/definitions.json":  `{"jurisdiction":"xx","rules":[{"id":"xx/quantity/fat","versions":[{"from":"2000-01-01","name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"1"}}],` + source + `}]}]}`,
	}
	for name, s := range files {
		set[name] = s
	}
	out := fstest.MapFS{}
	for name, s := range set {
		out[name] = &fstest.MapFile{Data: []byte(s)}
	}
	return out
}

func oneRule(id, body string) string {
	return `{"jurisdiction":"xx","rules":[{"id":"` + id + `","versions":[{"from":"2000-01-01",` + source + `,` + body + `}]}]}`
}

func TestSmallSetPasses(t *testing.T) {
	if _, err := rulebook.Load(smallSet(nil)); err != nil {
		t.Fatal(err)
	}
}

func TestLintRefuses(t *testing.T) {
	claim := func(condition string) map[string]string {
		return map[string]string{"xx/claims.json": oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"condition":`+condition)}
	}
	bands := func(b string) map[string]string {
		return map[string]string{"xx/rounding.json": oneRule("xx/rounding/fat", `"quantities":["fat"],"ties":"up","bands":`+b)}
	}
	for _, c := range []struct {
		name  string
		files map[string]string
		says  string
	}{
		{"no JSON", map[string]string{"xx/claims.json": `{`}, "claims.json"},
		{"an unknown kind", map[string]string{"xx/magic.json": `{}`}, "no known kind"},
		{"a file too deep", map[string]string{"xx/y/claims.json": `{}`}, "not at <jurisdiction>"},
		{"another market's file", map[string]string{"xx/claims.json": `{"jurisdiction":"yy","rules":[]}`}, `is "yy" in the folder "xx"`},
		{"an unknown member", claim(`{"of":{"fat":"1"},"per":"100 g","at most":"3 g","roughly":"yes"}`), "roughly"},
		{"no version", map[string]string{"set.json": `{"version":""}`}, "is missing"},
		{"a bad identifier", map[string]string{"xx/claims.json": oneRule("xx/claim/Fat Low", `"name":{"en":"c"},"about":[],"prohibited":true`)}, "lower-case"},
		{"a rule twice", map[string]string{"xx/claims.json": `{"jurisdiction":"xx","rules":[{"id":"xx/claim/c","versions":[{"from":"2000-01-01",` + source + `,"name":{"en":"c"},"about":[],"prohibited":true}]},{"id":"xx/claim/c","versions":[{"from":"2000-01-01",` + source + `,"name":{"en":"c"},"about":[],"prohibited":true}]}]}`}, "stands twice"},
		{"no date", map[string]string{"xx/claims.json": strings.Replace(oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"prohibited":true`), "2000-01-01", "2000-13-01", 1)}, "is no date"},
		{"no source", map[string]string{"xx/claims.json": strings.Replace(oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"prohibited":true`), `"ref":"x"`, `"ref":""`, 1)}, "say where the rule stands"},
		{"an unknown grade", map[string]string{"xx/claims.json": strings.Replace(oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"prohibited":true`), `memory`, `hearsay`, 1)}, "hearsay"},
		{"an unknown edition", map[string]string{"xx/claims.json": oneRule("xx/claim/c", `"edition":"z","name":{"en":"c"},"about":[],"prohibited":true`)}, "no edition"},
		{"an unknown component", map[string]string{"xx/definitions.json": oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FATT":"1"}}]`)}, "no component"},
		{"a predicate that says nothing", map[string]string{"xx/definitions.json": oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"acids":{}}]`)}, "predicate"},
		{"a factor that is none", map[string]string{"xx/definitions.json": oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"5/"}}]`)}, "is no number or fraction"},
		{"a factor over nothing", map[string]string{"xx/definitions.json": oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"5/0"}}]`)}, "nothing to divide by"},
		{"a source of nobody's amount", map[string]string{"xx/reference_values.json": oneRule("xx/reference/fat", `"quantity":"fat","amounts":{"general population":"70 g"},"sources":{"infants":{"ref":"x","evidence":"memory","force":"law"}}`)}, "has no amount"},
		{"two ways in one", map[string]string{"xx/definitions.json": oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"acids":{"every":true},"sum":{"FAT":"1"}}]`)}, "exactly one of"},
		{"an unknown quantity", claim(`{"of":{"salt":"1"},"per":"100 g","at most":"3 g"}`), `"salt" is no quantity`},
		{"a threshold of the wrong dimension", claim(`{"of":{"fat":"1"},"per":"100 g","at most":"3 kcal"}`), "wrong dimension"},
		{"a share that is no percentage", claim(`{"of":{"fat":"1"},"as":"share of fat","at most":"3 g"}`), "wrong dimension"},
		{"no basis", claim(`{"of":{"fat":"1"},"at most":"3 g"}`), "no basis"},
		{"an unknown basis", claim(`{"of":{"fat":"1"},"per":"plate","at most":"3 g"}`), "is no basis"},
		{"a relative condition without a reference food", claim(`{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`), "needs reference food"},
		{"a named condition that compares, without a reference food", map[string]string{"xx/conditions.json": oneRule("xx/condition/less", `"condition":{"of":{"fat":"1"},"per":"100 g","reduced by":"25 %"}`),
			"xx/claims.json": oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"condition":{"holds":"xx/condition/less"}`)}, "needs reference food"},
		{"a reference food for nothing", map[string]string{"xx/claims.json": oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"needs reference food":true,"condition":{"of":{"fat":"1"},"per":"100 g","below":"1 g"}`)}, "needs reference food"},
		{"two relations", claim(`{"of":{"fat":"1"},"per":"100 g","at most":"3 g","at least":"1 g"}`), "both"},
		{"no condition", map[string]string{"xx/claims.json": oneRule("xx/claim/c", `"name":{"en":"c"},"about":[]`)}, "exactly one of condition"},
		{"an unknown category", claim(`{"category is":["sugar"]}`), "no category of this market"},
		{"edition beside editions", map[string]string{"xx/claims.json": oneRule("xx/claim/c", `"edition":"a","editions":["a","b"],"name":{"en":"c"},"about":[],"prohibited":true`)}, "beside edition"},
		{"a weight without a fact", claim(`{"of":{"fat":"1"},"per":"100 g","times":[{"fact":""}],"at most":"3 g"}`), "names a fact"},
		{"a weight capped in grams", claim(`{"of":{"fat":"1"},"per":"100 g","times":[{"fact":"x","at most":"1 g"}],"at most":"3 g"}`), "in per cent"},
		{"a fact that is not stated", claim(`{"fact":"x","stated":false}`), `under "not"`},
		{"two questions of one fact", claim(`{"fact":"x","is":"yes","has":"iron"}`), `both "is" and "has"`},
		{"undecided without a reason", claim(`{"undecided":{}}`), "has no words"},
		{"an unknown claim", claim(`{"meets":"xx/claim/d"}`), "is no claim"},
		{"a circle", claim(`{"meets":"xx/claim/c"}`), "in a circle"},
		{"an edge on the last band", bands(`[{"below":"1 g","nearest":"1 g"}]`), "larger amounts have none"},
		{"no edge before the last band", bands(`[{"nearest":"1 g"},{"nearest":"2 g"}]`), "no edge"},
		{"falling edges", bands(`[{"below":"5 g","nearest":"1 g"},{"below":"1 g","nearest":"1 g"},{"nearest":"2 g"}]`), "below the one before"},
		{"a band of another dimension", bands(`[{"nearest":"1 kcal"}]`), "wrong dimension"},
		{"a step of zero", bands(`[{"nearest":"0 g"}]`), "above zero"},
		{"a band that does two things", bands(`[{"nearest":"1 g","declare":"0 g"}]`), "exactly one of"},
		{"a limit without a code", map[string]string{"xx/limits.json": oneRule("xx/limit/l", `"name":{"en":"l"},"condition":{"fact":"state","is":"solid"},"severity":"refused","code":"","says":{"en":"s"}`)}, "code"},
		{"a presumption of something unknown", map[string]string{"practice/presumptions.json": `{"jurisdiction":"practice","rules":[{"id":"practice/presumption/p","versions":[{"from":"2000-01-01",` + source + `,"components":["FAT"],"foods":{},"take":"half","reason":"r"}]}]}`}, "none of zero"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := rulebook.Load(smallSet(c.files))
			if err == nil || !strings.Contains(err.Error(), c.says) {
				t.Errorf("lint says %v; want something with %q", err, c.says)
			}
		})
	}
}

func sales(answer quantity.Truth) func(*rulebook.Condition) quantity.Truth {
	return func(*rulebook.Condition) quantity.Truth { return answer }
}

func TestEditionByDateAndTransition(t *testing.T) {
	b, err := rulebook.Load(smallSet(nil))
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name, on   string
		transition rulebook.Transition
		large      quantity.Truth
		want       string
	}{
		{"before all", "1999-12-31", rulebook.WhenRequired, quantity.Open, ""},
		{"first day of the old", "2000-01-01", rulebook.WhenRequired, quantity.Open, "a"},
		{"transition, required", "2016-01-01", rulebook.WhenRequired, quantity.Open, "a"},
		{"transition, newest", "2016-01-01", rulebook.Newest, quantity.Open, "b"},
		{"day before the new, newest", "2015-12-31", rulebook.Newest, quantity.Open, "a"},
		{"large maker on its date", "2020-01-01", rulebook.WhenRequired, quantity.Yes, "b"},
		{"large maker the day before", "2019-12-31", rulebook.WhenRequired, quantity.Yes, "a"},
		{"small maker on the large one's date", "2020-01-01", rulebook.WhenRequired, quantity.No, "a"},
		{"unknown size waits for the last date", "2020-12-31", rulebook.WhenRequired, quantity.Open, "a"},
		{"everybody on the last date", "2021-01-01", rulebook.WhenRequired, quantity.Open, "b"},
	} {
		t.Run(c.name, func(t *testing.T) {
			law, ok := b.At("xx", c.on, c.transition, sales(c.large))
			if !ok || law.Edition != c.want {
				t.Errorf("edition %q, want %q", law.Edition, c.want)
			}
		})
	}
	if _, ok := b.At("zz", "2020-01-01", rulebook.WhenRequired, sales(quantity.Open)); ok {
		t.Error("an unknown market has a law")
	}
}

func TestVersionsOfSeveralEditions(t *testing.T) {
	b, err := rulebook.Load(smallSet(map[string]string{"xx/claims.json": `{"jurisdiction":"xx","rules":[{"id":"xx/claim/c","versions":[
		{"from":"2000-01-01","editions":["a","b"],` + source + `,"name":{"en":"both"},"about":[],"prohibited":true},
		{"from":"2000-01-01","edition":"c",` + source + `,"name":{"en":"c"},"about":[],"prohibited":true}]}]}`,
		"xx/jurisdiction.json": `{"jurisdiction":"xx","name":"X","languages":["en"],"and":{"en":"and"},"editions":[{"edition":"a","from":"2000-01-01","until":"2010-01-01",` + source + `},{"edition":"b","from":"2010-01-01","until":"2020-01-01",` + source + `},{"edition":"c","from":"2020-01-01",` + source + `}],"assumed":[],"unlisted_claims":null,"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`}))
	if err != nil {
		t.Fatal(err)
	}
	for on, want := range map[string]string{"2009-12-31": "both", "2010-01-01": "both", "2020-01-01": "c"} {
		law, _ := b.At("xx", on, rulebook.WhenRequired, sales(quantity.Open))
		if c, ok := law.Claims.Get("c"); !ok || c.Body.Name["en"] != want {
			t.Errorf("on %s the version %+v holds, want %q", on, c.Body, want)
		}
	}
}

func TestFamiliesAreWrittenOut(t *testing.T) {
	b, err := rulebook.Load(smallSet(map[string]string{"xx/claims.json": `{"jurisdiction":"xx","rules":[{"id":"xx/claim/{each}-named","for each":[{"each":"fat","name":"Fat"},{"each":"oil","name":"Oil"}],
		"versions":[{"from":"2000-01-01",` + source + `,"name":{"en":"{name}"},"about":["{each}"],"prohibited":true}]}]}`}))
	if err != nil {
		t.Fatal(err)
	}
	m, _ := b.Rules("xx")
	if len(m.Claims) != 2 || m.Claims[1].ID != "xx/claim/oil-named" || m.Claims[1].Versions[0].Body.Name["en"] != "Oil" {
		t.Errorf("the family is %+v", m.Claims)
	}
}

func TestDigestFollowsEveryByte(t *testing.T) {
	digest := func(files map[string]string) string {
		b, err := rulebook.Load(smallSet(files))
		if err != nil {
			t.Fatal(err)
		}
		return b.Digest
	}
	first := digest(nil)
	if again := digest(nil); again != first {
		t.Error("one set has two digests")
	}
	if first == digest(map[string]string{"set.json": `{"version":"1" }`}) {
		t.Error("two sets have one digest")
	}
}

// Loading never panics, whatever a file holds.
func FuzzLint(f *testing.F) {
	f.Add("claims", oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"condition":{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}`))
	f.Add("rounding", oneRule("xx/rounding/fat", `"quantities":["fat"],"ties":"up","bands":[{"below":"1 g","declare":"0 g"},{"nearest":"1 g"}]`))
	f.Add("definitions", oneRule("xx/quantity/fat", `"name":{"en":"fat"},"unit":"g","ways":[{"acids":{"every":true}}]`))
	f.Add("declaration", oneRule("xx/declaration/standard", `"title":{"en":"t"},"number":{},"lines":[{"quantity":"fat"}]`))
	f.Add("limits", `{"jurisdiction":"xx","rules":[{"for each":[{"a":"{a}"}]}]}`)
	f.Add("claims", oneRule("xx/claim/c", `"name":null,"condition":{"when":{"all":[]},"then":{"not":{"any":[null]}}}`))
	f.Fuzz(func(t *testing.T, kind, doc string) {
		if strings.ContainsAny(kind, "/\\.\x00") || kind == "" {
			return
		}
		book, problems := rulebook.Lint(smallSet(map[string]string{"xx/" + kind + ".json": doc}))
		if len(problems) > 0 {
			return
		}
		if _, ok := book.At("xx", "2020-01-01", rulebook.Newest, sales(quantity.Open)); !ok {
			t.Fatal("a set that passes lint has no law")
		}
	})
}

// What a book remembers is what it would choose anew: by date, transition and the answers to what dates depend on, and the same is asked.
func TestRememberedLawsAreTheChosen(t *testing.T) {
	load := func() *rulebook.Book {
		b, err := rulebook.Load(smallSet(map[string]string{"xx/claims.json": `{"jurisdiction":"xx","rules":[{"id":"xx/claim/fat-low","versions":[
			{"from":"2000-01-01","until":"2030-01-01","source":{"ref":"a","evidence":"memory","force":"law"},"name":{"en":"Low fat"},"about":["fat"],"condition":{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}},
			{"from":"2010-01-01","required_from":[{"date":"2012-01-01","when":{"fact":"state","is":"solid"}},{"date":"2014-01-01"}],"source":{"ref":"a","evidence":"memory","force":"law"},"name":{"en":"Low fat"},"about":["fat"],"condition":{"of":{"fat":"1"},"per":"100 g","at most":"2 g"}}]}]}`}))
		if err != nil {
			t.Fatal(err)
		}
		return b
	}
	answers := map[string]quantity.Truth{"yes": quantity.Yes, "no": quantity.No, "open": quantity.Open}
	one := load()
	for _, date := range []string{"2011-01-01", "2012-06-01", "2014-06-01", "2012-06-01", "2011-01-01"} {
		for _, transition := range []rulebook.Transition{rulebook.WhenRequired, rulebook.Newest} {
			for name, answer := range answers {
				var asked [2]string
				facts := func(i int) func(*rulebook.Condition) quantity.Truth {
					return func(c *rulebook.Condition) quantity.Truth { asked[i] = c.Name; return answer }
				}
				got, _ := one.At("xx", date, transition, facts(0))
				want, _ := load().At("xx", date, transition, facts(1))
				g, _ := got.Claims.Get("fat-low")
				w, _ := want.Claims.Get("fat-low")
				if g.Head.From != w.Head.From || asked[0] != asked[1] {
					t.Errorf("%s %s %s: version of %s asking %q, want %s asking %q", date, transition, name, g.Head.From, asked[0], w.Head.From, asked[1])
				}
			}
		}
	}
}
