package rulebook_test

import (
	"strings"
	"testing"

	"github.com/go-json-experiment/json"

	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

// written is a value's JSON, the same for equal values.
func written(t *testing.T, v any) string {
	t.Helper()
	b, err := json.Marshal(v, json.Deterministic(true))
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

func TestConditionsAreWrittenAsTheyAreRead(t *testing.T) {
	for _, doc := range []string{
		`{"of":{"saturated-fat":"1","trans-fat":"1"},"per":"100 g","at most":"1.5 g"}`,
		`{"of":{"fat":"1"},"per":["reference amount","serving"],"below":"0.5 g","says":{"en":"little fat"}}`,
		`{"of":{"saturated-fat":"1"},"as":"share of energy","at most":"10 %"}`,
		`{"of":{"fat":"1"},"per":"reference amount","reduced by":"25 %"}`,
		`{"of":{"trans-fat":"1"},"per":"100 g","not more than":"reference food"}`,
		`{"of":{"trans-fat":"1"},"per":"100 g fat","from":{"trans origin":"industrial"},"at most":"2 g"}`,
		`{"of":{"fat":"1"},"per":"100 g","subject":"reference food","above":"3 g"}`,
		`{"of":{"protein":"1"},"per":"serving","times":[{"fact":"protein efficiency ratio"},{"fact":"x","if":{"fact":"state","is":"solid"},"factor":"2.5","at most":"100 %"}],"at least":"20 g"}`,
		`{"declared":"saturated-fat","is":"0"}`,
		`{"declared":"monounsaturated-fat"}`,
		`{"meets":"us/claim/fat-low","subject":"reference food"}`,
		`{"fact":"state","is":"liquid"}`,
		`{"fact":"alcohol by volume","above":"1.2 %"}`,
		`{"fact":"nutrients added as such","has":"vitamin-d"}`,
		`{"fact":"glycidyl esters","stated":true}`,
		`{"category is":["sugar"]}`,
		`{"category is":["sugar"],"stated":true}`,
		`{"undecided":{"en":"data cannot tell"}}`,
		`{"reference amount":{"at most":["30 g","2 tbsp"]}}`,
		`{"claimed about":["fatty acids","cholesterol"]}`,
		`{"claimed on the label about":["energy"]}`,
		`{"size of":"package","as":"share of reference amount","below":"200 %"}`,
		`{"size of":"surface","below":"258 cm2"}`,
		`{"size of":"surface","stated":true}`,
		`{"holds":"us/condition/disqualifying-level"}`,
		`{"reference food is":["own regular product"]}`,
		`{"no ingredient":{"process":["hydrogenated"],"iodine value above":"4"}}`,
		`{"all":[]}`,
		`{"any":[{"not":{"fact":"state","is":"liquid"}}]}`,
		`{"at least":1,"of":[{"fact":"state","is":"liquid"}]}`,
		`{"when":{"fact":"state","is":"liquid"},"then":{"all":[]}}`,
		`{"when":{"fact":"state","is":"liquid"},"then":{"all":[]},"else":{"any":[]}}`,
	} {
		var c rulebook.Condition
		if err := json.Unmarshal([]byte(doc), &c); err != nil {
			t.Errorf("%s: %v", doc, err)
			continue
		}
		if got := written(t, &c); got != doc {
			t.Errorf("%s is written as %s", doc, got)
		}
	}
}

func TestConditionsAreRefused(t *testing.T) {
	for _, c := range []struct{ name, doc, says string }{
		{"null", `{"not":null}`, "is an object"},
		{"null in a list", `{"all":[null]}`, "is an object"},
		{"no member", `{}`, "no known kind"},
		{"two kinds", `{"all":[],"any":[]}`, "unknown member"},
		{"a member of another kind", `{"declared":"fat","subject":"reference food"}`, "unknown member"},
		{"a relation where nothing is compared", `{"meets":"us/claim/fat-low","at most":"3 g"}`, "unknown member"},
		{"a value and a relation", `{"fact":"state","is":"liquid","above":"1 %"}`, "both"},
		{"a count before no list", `{"of":{"fat":"1"},"per":"100 g","at least":8}`, "number"},
		{"a list without a count", `{"of":[{"all":[]}]}`, "number"},
		{"a comparison with something else", `{"of":{"fat":"1"},"per":"100 g","not more than":"butter"}`, "reference food"},
		{"when without then", `{"when":{"all":[]}}`, "without"},
		{"an unknown member inside", `{"no ingredient":{"process":[],"colour":"red"}}`, "colour"},
	} {
		t.Run(c.name, func(t *testing.T) {
			var got rulebook.Condition
			err := json.Unmarshal([]byte(c.doc), &got)
			if err == nil || !strings.Contains(err.Error(), c.says) {
				t.Errorf("%v; want something with %q", err, c.says)
			}
		})
	}
}

// Every condition of the embedded set survives writing and reading.
func TestEveryRuleIsWrittenAsItIsRead(t *testing.T) {
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	for _, j := range b.Jurisdictions() {
		m, _ := b.Rules(j)
		first := written(t, m)
		var again rulebook.Rules
		if err := json.Unmarshal([]byte(first), &again); err != nil {
			t.Fatal(err)
		}
		if second := written(t, &again); second != first {
			t.Errorf("%s: what was written reads as something else", j)
		}
	}
}
