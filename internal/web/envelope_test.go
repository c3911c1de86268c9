package web

import (
	"encoding/json"
	"fmt"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"gramlaw/internal/recipe"
)

// digest of the rule set that the tests load.
func loaded() string { return book.Digest }

// Envelopes and what is wrong with them: "code pointer", in order.
func envelopes() []struct {
	name, doc string
	status    int
	faults    []string
} {
	around := func(more string) string { return `{"recipe": ` + oats + `, ` + more + `}` }
	return []struct {
		name, doc string
		status    int
		faults    []string
	}{
		{"a recipe alone", oats, 200, nil},
		{"a recipe in an envelope", `{"recipe": ` + oats + `}`, 200, nil},
		{"every member", around(`"on": "2026-12-01", "in": ["us", "ca"], "detail": "contributions", "transition": "newest", "rules": "` + loaded() + `", "without": ["all"]`), 200, nil},
		{"the recipe last", `{"in": ["us"], "recipe": ` + oats + "}\n", 200, nil},
		{"another digest", around(`"rules": "sha256:` + strings.Repeat("0", 64) + `"`), 409, nil},
		{"a digest in capitals", around(`"rules": "sha256:` + strings.Repeat("A", 64) + `"`), 422, []string{"bad-format /rules"}},
		{"half a digest", around(`"rules": "sha256:00"`), 422, []string{"bad-format /rules"}},
		{"a digest of another kind", around(`"rules": "md5:` + strings.Repeat("0", 64) + `"`), 422, []string{"bad-format /rules"}},
		{"faults of both, all at once", `{"recipe": {"id": "o", "ingredients": [{"id": "a", "amount": "1"}]}, "on": "2026-13-01", "in": ["us", "zz"], "transition": "soon", "detail": "much", "without": ["x"], "why": 1}`,
			422, []string{"one-source /recipe/ingredients/0", "bad-amount /recipe/ingredients/0/amount", "unknown-member /why", "not-a-date /on", "unknown-transition /transition", "unknown-detail /detail", "unknown-market /in", "unknown-presumption /without"}},
		{"a market of the recipe", `{"recipe": {"id": "o", "jurisdictions": ["zz"], "ingredients": [{"id": "a", "amount": "1 g", "food": "sr:08120"}]}}`, 422, []string{"unknown-market /recipe/jurisdictions"}},
		{"a market of a recipe alone", `{"id": "o", "jurisdictions": ["zz"], "ingredients": [{"id": "a", "amount": "1 g", "food": "sr:08120"}]}`, 422, []string{"unknown-market /jurisdictions"}},
		{"null", around(`"on": null`), 422, []string{"null /on"}},
		{"nulls everywhere", `{"recipe": null, "in": [null], "rules": null}`, 422, []string{"null /recipe", "null /in/0", "null /rules"}},
		{"types", around(`"on": 1, "in": "us", "without": {}, "detail": [], "rules": true`), 422, []string{"wrong-type /on", "wrong-type /in", "wrong-type /without", "wrong-type /detail", "wrong-type /rules"}},
		{"empty texts", around(`"on": "", "detail": "", "in": [""], "rules": ""`), 422, []string{"empty /on", "empty /detail", "empty /in/0", "bad-format /rules", "unknown-market /in"}},
		{"empty lists", around(`"in": [], "without": []`), 422, []string{"empty /in", "empty /without"}},
		{"a market twice", around(`"in": ["us", "us"]`), 422, []string{"repeated /in/1"}},
		{"too many", around(`"in": [` + strings.Repeat(`"us",`, 1001) + `"us"]`), 422, nil},
		{"a long text", around(`"on": "` + strings.Repeat("2", 201) + `"`), 422, []string{"string-too-long /on"}},
		{"a member twice", around(`"on": "2026-12-01", "on": "2026-12-02"`), 422, []string{"duplicate-name /on"}},
		{"two recipes", `{"recipe": ` + oats + `, "recipe": ` + oats + `}`, 422, []string{"duplicate-name /recipe"}},
		{"a member twice in the recipe", `{"recipe": {"id": "o", "id": "p", "ingredients": [{"id": "a", "amount": "1 g", "food": "sr:08120"}]}}`, 422, []string{"duplicate-name /recipe/id"}},
		{"a name with a slash", around(`"a/b~c": 1`), 422, []string{"unknown-member /a~1b~0c"}},
		{"an envelope in an envelope", `{"recipe": {"recipe": ` + oats + `}}`, 422, []string{"missing-member /recipe", "missing-member /recipe", "unknown-member /recipe/recipe"}},
		{"bad text", around("\"on\": \"\xff\""), 400, []string{"bad-text /on"}},
		{"half a surrogate pair", around(`"detail": "\ud800"`), 400, []string{"bad-text /detail"}},
		{"bad text in the recipe", "{\"recipe\": {\"id\": \"\xff\"}}", 400, nil},
		{"nothing", ``, 400, []string{"bad-syntax "}},
		{"no object", `["recipe"]`, 422, []string{"wrong-type "}},
		{"a text", `"recipe"`, 422, []string{"wrong-type "}},
		{"broken at once", `{`, 400, []string{"bad-syntax "}},
		{"broken in the recipe", `{"on": 3, "recipe": {"id": 4, "ingredients": [}`, 400, []string{"wrong-type /on", "bad-syntax /recipe/ingredients/0"}},
		{"broken after the recipe", `{"recipe": ` + oats + `, "on": tru`, 400, []string{"bad-syntax /on"}},
		{"not ended", `{"recipe": ` + oats, 400, []string{"bad-syntax "}},
		{"something follows", `{"recipe": ` + oats + `} {}`, 400, []string{"trailing-data "}},
		{"too deep in the recipe", `{"recipe": ` + strings.Repeat("[", 5000) + strings.Repeat("]", 5000) + `}`, 422, nil},
		{"far too deep", `{"recipe": ` + strings.Repeat("[", 20000), 422, nil},
		{"far too deep elsewhere", `{"recipe": ` + oats + `, "x": ` + strings.Repeat("[", 20000), 400, nil},
		{"many unknown members", many(600), 422, nil},
	}
}

func many(n int) string {
	var b strings.Builder
	b.WriteString(`{"recipe": ` + oats)
	for i := range n {
		fmt.Fprintf(&b, `, "m%d": 1`, i)
	}
	return b.String() + "}"
}

func TestEnvelopes(t *testing.T) {
	h := handler(t, options())
	for _, c := range envelopes() {
		t.Run(c.name, func(t *testing.T) {
			w := ask(t, h, "POST", "/v1/check", c.doc, "Content-Type: application/json")
			if w.Code != c.status {
				t.Fatalf("%d: %.600s", w.Code, w.Body)
			}
			if w.Code == 200 {
				return
			}
			p := told(t, w)
			if w.Code == 409 && (p.Loaded != loaded() || len(p.Faults) > 0) {
				t.Errorf("loaded is %q, faults %v", p.Loaded, p.Faults)
			}
			var got []string
			for _, f := range p.Faults {
				got = append(got, f.Code+" "+*f.Pointer)
			}
			if c.faults != nil && !slices.Equal(got, c.faults) {
				t.Errorf("faults %q, want %q", got, c.faults)
			}
			if w.Code != 409 && (len(got) == 0 || len(got) > recipe.MaxFaults+1) {
				t.Errorf("%d faults", len(got))
			}
		})
	}
}

// The digest is that of the recipe as it was sent, whatever stands around it.
func TestDigestIsOfTheRecipe(t *testing.T) {
	h := handler(t, options())
	identity := func(doc string) string {
		var report struct {
			Recipe struct{ ID, Digest string }
		}
		w := ask(t, h, "POST", "/v1/check", doc, "Content-Type: application/json")
		if err := json.Unmarshal(w.Body.Bytes(), &report); err != nil || w.Code != 200 {
			t.Fatal(w.Code, err)
		}
		return report.Recipe.Digest
	}
	if a, b := identity(oats), identity(`{"on": "2026-12-01", "recipe": `+oats+` }`); a != b || !strings.HasPrefix(a, "sha256:") {
		t.Errorf("digests %s and %s", a, b)
	}
}

// FuzzOrder: a document gives an order or faults, the same each time, at places of the document; and it is called no JSON only when it is none.
func FuzzOrder(f *testing.F) {
	for _, c := range envelopes() {
		if len(c.doc) < 5000 {
			f.Add([]byte(c.doc))
		}
	}
	f.Fuzz(func(t *testing.T, doc []byte) {
		o, faults := readOrder(doc)
		if o.recipe == nil && len(faults) == 0 {
			t.Fatal("neither a recipe nor faults")
		}
		if _, again := readOrder(doc); !slices.Equal(faults, again) {
			t.Fatalf("two readings differ:\n%v\n%v", faults, again)
		}
		for _, fault := range faults {
			if fault.Pointer != "" && fault.Pointer[0] != '/' || fault.Code == "" || fault.Says == "" || !utf8.ValidString(fault.Says) {
				t.Fatalf("fault %+v", fault)
			}
		}
		if len(faults) == 0 {
			if !json.Valid(doc) {
				t.Fatal("accepted, and no JSON")
			}
			return
		}
		p := faultyDocument(faults)
		text := slices.ContainsFunc(faults, func(f recipe.Fault) bool { return f.Code == recipe.BadText })
		if p.Status == notJSON.Status && json.Valid(doc) && !text {
			t.Fatalf("said to be no JSON: %v", faults)
		}
		if json.Unmarshal(p.bytes(), &Problem{}) != nil {
			t.Fatalf("the problem is no JSON: %s", p.bytes())
		}
	})
}
