package check_test

import (
	"strings"
	"testing"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
)

// What is open is neither yes nor no: each pair differs only in how much is known.
func TestOpenStaysOpen(t *testing.T) {
	b := book(t)
	food := func(components, more string) string {
		return `{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g","composition":{"components":{` + components + `}}` + more
	}
	drink := func(alcohol, claim string) string {
		return food(`"PROCNT":"10 g","FAT":"0 g","CHOCDF":"5 g","SUGAR":"1 g","WATER":"50 g"`+alcohol, `}],"state":{"default":"liquid"},"density":{"default":"1 g/mL"},"facts":{"sugars added":false},"claims":[{"claim":"`+claim+`"}]}`)
	}
	salty := func(fat string) string {
		return food(`"NA":"30 mg","FAT":`+fat+`,"FASAT":"0 g","CHOLE":"0 mg"`, `}],"serving":{"us":{"amount":"30 g"}},"reference_amount":{"us":"30 g"},"facts":{"specially processed":true},"claims":[{"claim":"sodium-low"}]}`)
	}
	for _, c := range []struct{ name, market, recipe, verdict, presence string }{
		{"barred by alcohol", "eu", drink(`,"ALC":"5 g"`, "sugars-no-added"), check.Refused, ""},
		{"perhaps barred by alcohol", "eu", drink(`,"ALC":"<5 g"`, "protein-source"), check.Undetermined, ""},
		{"not barred by alcohol", "eu", drink(`,"ALC":"0.5 g"`, "protein-source"), check.Permitted, ""},
		{"fat above its disclosure level", "us", salty(`"60 g"`), check.WithStatement, "mandatory"},
		{"fat perhaps above its disclosure level", "us", salty(`{"low":"20 g","high":"60 g"}`), check.Permitted, "open"},
		{"fat under its disclosure level", "us", salty(`"20 g"`), check.Permitted, ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := run(t, b, c.market, "2026-12-01", "required", []byte(c.recipe)).Claims[0]
			if got.Verdict != c.verdict {
				t.Errorf("verdict %s, want %s", got.Verdict, c.verdict)
			}
			presence := ""
			for _, s := range got.Statements {
				if s.Presence != "optional" {
					presence = s.Presence
				}
			}
			if c.verdict != check.Refused && presence != c.presence {
				t.Errorf("a statement is %q, want %q: %+v", presence, c.presence, got.Statements)
			}
			if want := (c.verdict == check.Permitted && c.presence != "open") || c.verdict == check.WithStatement; got.Printable != want {
				t.Errorf("printable %v, want %v", got.Printable, want)
			}
		})
	}
}

// A statement that may stand only under a condition says what it waits for, as long as nobody has stated it.
func TestOptionalStatementsWait(t *testing.T) {
	b := smallMarket(t, map[string]string{"declaration.json": declaration(`,"statements":[{"text":{"en":"naturally salty"},"presence":"optional","if":{"fact":"salt added","is":"no"}}]`)})
	for more, want := range map[string]string{"": "the fact “salt added”", `,"facts":{"salt added":false}`: "may stand", `,"facts":{"salt added":true}`: "absent"} {
		got := "absent"
		for _, s := range run(t, b, "xx", "2026-01-01", "", dish(`{"FAT":"1 g","PROCNT":"1 g","NACL":"1 g"}`, more)).Declaration.Statements {
			if got = strings.Join(s.Needs, "; "); s.Presence == "optional" && got == "" {
				got = "may stand"
			}
		}
		if got != want {
			t.Errorf("with %q: %s, want %s", more, got, want)
		}
	}
}

// A partially hydrogenated oil is refused only where its iodine value is above the limit at both ends, and an unknown process is not a
// clean one.
func TestOpenHydrogenation(t *testing.T) {
	b := book(t)
	fat := func(components, profile, more string) string {
		return `{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g"` + more + `,"composition":{"components":{` + components + `}` + profile + `}}]}`
	}
	profile := func(stearic string) string {
		return `,"fatty_acids":{"basis":"percent of FAME","complete":true,"profile":{"18:0":` + stearic + `,"18:1 9c":"4.6"}}`
	}
	hydrogenated := `,"process":"hydrogenated"`
	for _, c := range []struct{ name, recipe, severity string }{
		{"iodine value under 4", fat(`"FAT":"100 g"`, profile(`"95.4"`), hydrogenated), ""},
		{"iodine value perhaps under 4", fat(`"FAT":"100 g"`, profile(`{"low":"60","high":"95.4"}`), hydrogenated), "open"},
		{"iodine value over 4", fat(`"FAT":"100 g"`, profile(`"60"`), hydrogenated), "refused"},
		{"unknown process, trans", fat(`"FAT":"100 g","FATRN":"3 g"`, "", ""), "open"},
		{"unknown process, no trans", fat(`"FAT":"100 g","FATRN":"0 g"`, "", ""), ""},
		{"refined, trans", fat(`"FAT":"100 g","FATRN":"3 g"`, "", `,"process":"refined"`), ""},
	} {
		for _, market := range []string{"us", "ca"} {
			t.Run(c.name+" in "+market, func(t *testing.T) {
				severity := ""
				for _, f := range run(t, b, market, "2026-12-01", "required", []byte(c.recipe)).Findings {
					if strings.Contains(f.Rule, "/limit/") && f.Severity != "note" {
						severity = f.Severity
					}
				}
				if severity != c.severity {
					t.Errorf("the limit is %q, want %q", severity, c.severity)
				}
			})
		}
	}
}

// What practice takes of a process can be left out like any presumption.
func TestProcessIsNotPresumedWithout(t *testing.T) {
	doc := []byte(`{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g","composition":{"components":{"FAT":"100 g","FATRN":"1 g"}}}]}`)
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		t.Fatal(faults)
	}
	for _, c := range []struct {
		without []string
		open    bool
	}{{nil, false}, {[]string{"all"}, true}, {[]string{"practice/origin/little-trans-in-specifications"}, true}} {
		report, faults := check.Check(r, book(t), check.Request{On: "2026-12-01", In: []string{"us"}, Without: c.without})
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		open := false
		for _, f := range report.Jurisdictions[0].Findings {
			open = open || strings.Contains(f.Rule, "/limit/") && f.Severity == "open"
		}
		if open != c.open {
			t.Errorf("without %v the limit is open: %v, want %v", c.without, open, c.open)
		}
	}
}

// The mass that goes with a reference amount goes with the serving it stands in for.
func TestReferenceAmountStandsInForServing(t *testing.T) {
	m := run(t, book(t), "us", "2026-12-01", "required", []byte(`{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g","composition":{"components":{"FAT":"10 g"}}}],"reference_amount":{"us":{"amount":"2 tbsp","grams":"32 g"}}}`))
	for _, l := range m.Declaration.Lines {
		if l.Quantity == "fat" {
			if got := *l.Values[0].Exact; got != "3.2" {
				t.Errorf("fat is %s g a serving, want 3.2", got)
			}
			return
		}
	}
	t.Errorf("no line of fat: %+v", m.Findings)
}

// A range of printed values is anything from the least that prints as the one to the most that prints as the other.
func TestRangeOnLabel(t *testing.T) {
	m := run(t, book(t), "us", "2026-12-01", "required", []byte(`{"id":"r","name":"r","ingredients":[{"id":"a","name":"a","amount":"100 g","label":{"jurisdiction":"us","serving":"100 g","declared":{"FAT":{"low":"2 g","high":"3 g"}}}}],"serving":{"us":{"amount":"100 g"}}}`))
	for _, l := range m.Declaration.Lines {
		if l.Quantity == "fat" {
			if v := l.Values[0]; v.Low != "1.75" || !strings.HasPrefix(v.High, "3.24999") {
				t.Errorf("fat is %s to %s g, want 1.75 to just under 3.25", v.Low, v.High)
			}
		}
	}
}
