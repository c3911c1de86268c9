package web

import (
	"encoding/json"
	"io/fs"
	"maps"
	"net/http"
	"reflect"
	"regexp"
	"slices"
	"testing"

	"gramlaw/rules"
)

type shownRules struct {
	Jurisdiction, On, Transition, Edition string
	InForce                               []struct {
		Kind, ID, From, Until, Edition string
		Text                           map[string]any
	} `json:"in_force"`
}

func show[T any](t *testing.T, h http.Handler, target string) T {
	t.Helper()
	var out T
	w := ask(t, h, "GET", target, "")
	if err := json.Unmarshal(w.Body.Bytes(), &out); err != nil || w.Code != 200 {
		t.Fatalf("%s: %d %v", target, w.Code, err)
	}
	return out
}

// The rules of a date are those that a check on that date follows.
func TestRulesOfADate(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct{ target, edition, on string }{
		{"/v1/rules/us", "2016", "2026-12-01"},
		{"/v1/rules/us?on=2015-01-01", "2006", "2015-01-01"},
		{"/v1/rules/us?on=2020-06-01", "2006", "2020-06-01"}, // required of large makers only: nobody says how large
		{"/v1/rules/us?on=2020-06-01&transition=newest", "2016", "2020-06-01"},
		{"/v1/rules/ca?on=2024-01-01", "2016", "2024-01-01"},
		{"/v1/rules/ca?on=2024-01-01&transition=newest", "2022", "2024-01-01"},
		{"/v1/rules/ca?on=2026-01-01", "2022", "2026-01-01"},
	} {
		got := show[shownRules](t, h, c.target)
		if got.Edition != c.edition || got.On != c.on || len(got.InForce) == 0 {
			t.Errorf("%s: edition %q on %s with %d rules", c.target, got.Edition, got.On, len(got.InForce))
		}
		for _, r := range got.InForce {
			if r.From > c.on || r.Until != "" && r.Until <= c.on {
				t.Errorf("%s: %s from %s until %q holds", c.target, r.ID, r.From, r.Until)
			}
		}
	}
}

// What a rule is said to say is what stands in its file, but for zeros at the end of a number and members that are empty.
func TestRulesSayWhatTheirFilesSay(t *testing.T) {
	h := handler(t, options())
	compared := 0
	for _, market := range book.Jurisdictions() {
		texts := written(t, market)
		for _, r := range show[shownRules](t, h, "/v1/rules/"+market).InForce {
			i := slices.IndexFunc(texts[r.ID], func(v map[string]any) bool {
				until, _ := v["until"].(string)
				return v["from"] == r.From && until == r.Until
			})
			if i < 0 {
				continue // of a family
			}
			want := maps.Clone(texts[r.ID][i])
			for _, own := range []string{"from", "required_from", "until", "edition", "editions", "applies_to", "source"} {
				delete(want, own)
			}
			if compared++; !reflect.DeepEqual(settled(r.Text), settled(want)) {
				t.Errorf("%s says\n%v\nand its file\n%v", r.ID, r.Text, want)
			}
		}
	}
	if compared < 100 {
		t.Errorf("only %d rules were compared", compared)
	}
}

var zeros = regexp.MustCompile(`^([0-9]+)(?:[.]0+|([.][0-9]*[1-9])0+)( |$)`)

// settled leaves out what says nothing.
func settled(v any) any {
	switch v := v.(type) {
	case map[string]any:
		out := map[string]any{}
		for name, m := range v {
			if m != "" {
				out[name] = settled(m)
			}
		}
		return out
	case []any:
		out := make([]any, len(v))
		for i := range v {
			out[i] = settled(v[i])
		}
		return out
	case string:
		return zeros.ReplaceAllString(v, "$1$2$3")
	}
	return v
}

// written reads the versions of a market's rules from their files.
func written(t *testing.T, market string) map[string][]map[string]any {
	t.Helper()
	files, err := fs.Glob(rules.FS, market+"/*.json")
	if err != nil {
		t.Fatal(err)
	}
	out := map[string][]map[string]any{}
	for _, file := range files {
		b, err := fs.ReadFile(rules.FS, file)
		if err != nil {
			t.Fatal(err)
		}
		var doc struct {
			Rules []struct {
				ID       string
				Versions []map[string]any
			}
		}
		if err := json.Unmarshal(b, &doc); err != nil {
			t.Fatal(err)
		}
		for _, r := range doc.Rules {
			out[r.ID] = r.Versions
		}
	}
	return out
}

type shownChanges struct {
	EditionWas string `json:"edition_was"`
	EditionIs  string `json:"edition_is"`
	Changes    []struct {
		ID, Effect string
		Was, Is    *struct{ From string }
	}
}

// Changes lead from the rules of one date to those of another.
func TestChangesLeadFromOneDateToAnother(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct{ market, from, to string }{{"us", "2015-01-01", "2026-12-01"}, {"ca", "2025-12-31", "2026-01-01"}, {"eu", "2010-01-01", "2026-12-01"}} {
		at := func(day string) map[string]string {
			out := map[string]string{}
			for _, r := range show[shownRules](t, h, "/v1/rules/"+c.market+"?on="+day).InForce {
				out[r.ID] = r.From
			}
			return out
		}
		held := at(c.from)
		changes := show[shownChanges](t, h, "/v1/rules/"+c.market+"/changes?from="+c.from+"&to="+c.to)
		for _, one := range changes.Changes {
			switch {
			case one.Effect == "begins" && one.Was == nil && held[one.ID] == "":
				held[one.ID] = one.Is.From
			case one.Effect == "replaced" && held[one.ID] == one.Was.From:
				held[one.ID] = one.Is.From
			case one.Effect == "ends" && one.Is == nil && held[one.ID] == one.Was.From:
				delete(held, one.ID)
			default:
				t.Errorf("%s: %+v where %q holds", c.market, one, held[one.ID])
			}
		}
		if len(changes.Changes) == 0 || !maps.Equal(held, at(c.to)) {
			t.Errorf("%s: %d changes do not lead there", c.market, len(changes.Changes))
		}
	}
	if got := show[shownChanges](t, h, "/v1/rules/us/changes?from=2026-11-30&to=2026-12-01"); len(got.Changes) != 0 || got.EditionWas != "2016" || got.EditionIs != "2016" {
		t.Errorf("from one day to the next %+v", got)
	}
}
