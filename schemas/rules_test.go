package schemas_test

import (
	"bytes"
	"encoding/json"
	"io/fs"
	"path"
	"reflect"
	"slices"
	"sort"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/santhosh-tekuri/jsonschema/v5"

	"gramlaw/internal/lipid"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
	"gramlaw/schemas"
)

const rulesFile = "rules.schema.json"

func text(t *testing.T, file string) []byte {
	t.Helper()
	b, err := fs.ReadFile(schemas.Files, file)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

func document(t *testing.T, b []byte) any {
	t.Helper()
	d := json.NewDecoder(bytes.NewReader(b))
	d.UseNumber()
	var v any
	if err := d.Decode(&v); err != nil {
		t.Fatal(err)
	}
	return v
}

// ofKinds gives the schema of one kind of file, such as "claims"; "" is that of any.
func ofKinds(t *testing.T) func(kind string) *jsonschema.Schema {
	t.Helper()
	c := jsonschema.NewCompiler()
	c.AssertFormat = true
	if err := c.AddResource(schemas.RulesID, bytes.NewReader(text(t, rulesFile))); err != nil {
		t.Fatal(err)
	}
	return func(kind string) *jsonschema.Schema {
		at := schemas.RulesID
		if kind != "" {
			at += "#/$defs/" + kind + "_file"
		}
		s, err := c.Compile(at)
		if err != nil {
			t.Fatal(err)
		}
		return s
	}
}

func TestRulesSchemaIsOfItsDraft(t *testing.T) {
	meta, err := jsonschema.Compile("https://json-schema.org/draft/2020-12/schema")
	if err != nil {
		t.Fatal(err)
	}
	doc := document(t, text(t, rulesFile))
	if err := meta.Validate(doc); err != nil {
		t.Errorf("%#v", err)
	}
	if id := doc.(map[string]any)["$id"]; id != schemas.RulesID {
		t.Errorf("$id is %v", id)
	}
}

func TestEveryRuleFileFitsItsSchema(t *testing.T) {
	ofKind := ofKinds(t)
	seen := 0
	err := fs.WalkDir(rules.FS, ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() {
			return err
		}
		b, err := fs.ReadFile(rules.FS, name)
		if err != nil {
			return err
		}
		if err := ofKind(kindOf(name)).Validate(document(t, b)); err != nil {
			t.Errorf("%s: %#v", name, err)
		}
		seen++
		return nil
	})
	if err != nil || seen == 0 {
		t.Fatalf("%d files were read: %v", seen, err)
	}
}

// kindOf is the kind of a file by its place.
func kindOf(name string) string {
	kind := strings.TrimSuffix(path.Base(name), ".json")
	if path.Dir(name) == "words" && kind != "concepts" {
		return "words"
	}
	return kind
}

const (
	source  = `"source":{"ref":"x","evidence":"memory","force":"law"}`
	market  = `{"jurisdiction":"xx","name":"X","languages":["en"],"and":{"en":"and"},"editions":[],"assumed":[],"unlisted_claims":null,"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`
	fatOnly = `{"jurisdiction":"xx","rules":[{"id":"xx/quantity/fat","versions":[{"from":"2000-01-01","name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"1"}}],` + source + `}]}]}`
)

// lintRefuses tells whether the typed decoder and lint refuse a file in a small set that is otherwise well.
func lintRefuses(name, doc string) bool {
	files := fstest.MapFS{"set.json": {Data: []byte(`{"version":"1"}`)}, "xx/jurisdiction.json": {Data: []byte(market)}, "xx/definitions.json": {Data: []byte(fatOnly)}}
	files[name] = &fstest.MapFile{Data: []byte(doc)}
	_, problems := rulebook.Lint(files)
	return len(problems) > 0
}

func oneRule(id, body string) string {
	return `{"jurisdiction":"xx","rules":[{"id":"` + id + `","versions":[{"from":"2000-01-01",` + source + `,` + body + `}]}]}`
}

func claimOn(condition string) string {
	return oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"condition":`+condition)
}

// Schema and typed decoder accept the same: each of these passes both, or neither.
func TestSchemaAndDecoderAgree(t *testing.T) {
	const fat = `{"of":{"fat":"1"},"per":"100 g","at most":"3 g"}`
	rounding := func(bands string) string {
		return oneRule("xx/rounding/fat", `"quantities":["fat"],"ties":"up","bands":`+bands)
	}
	ofKind := ofKinds(t)
	for _, c := range []struct {
		name, file, doc string
		well            bool
	}{
		{"a claim", "claims", claimOn(fat), true},
		{"a comparison on two bases", "claims", claimOn(`{"of":{"fat":"1"},"per":["100 g","100 kcal"],"at most":"3 g","says":{"en":"poor in fat"}}`), true},
		{"a condition of every form", "claims", claimOn(`{"all":[{"any":[` + fat + `]},{"not":` + fat + `},{"at least":1,"of":[` + fat + `]},{"when":` + fat + `,"then":` + fat + `,"else":` + fat +
			`},{"fact":"state","is":"liquid"},{"claimed about":["fat"]},{"claimed on the label about":["fat"]},{"size of":"serving","at most":"30 g"},{"no ingredient":{"process":["hydrogenated"],"iodine value above":"4"}},{"reference amount":{"at most":["30 g","2 tbsp"]}}]}`), true},
		{"a family", "claims", `{"jurisdiction":"xx","rules":[{"id":"xx/claim/{each}-low","for each":[{"each":"fat","level":"3 g"}],"versions":[{"from":"2000-01-01",` + source + `,"name":{"en":"low {each}"},"about":["{each}"],"condition":{"of":{"{each}":"1"},"per":"100 g","at most":"{level}"}}]}]}`, true},
		{"a rounding", "rounding", rounding(`[{"below":"0.5 g","declare":"0 g"},{"nearest":"1 g","or":[{"nearest":"0.5 g"}]}]`), true},
		{"a market", "jurisdiction", market, true},

		{"an unknown member of a file", "claims", strings.Replace(claimOn(fat), `"rules"`, `"remark":"x","rules"`, 1), false},
		{"an unknown member of a rule", "claims", strings.Replace(claimOn(fat), `"versions"`, `"remark":"x","versions"`, 1), false},
		{"an unknown member of a version", "claims", strings.Replace(claimOn(fat), `"about"`, `"remark":"x","about"`, 1), false},
		{"an unknown member of a source", "claims", strings.Replace(claimOn(fat), `"ref"`, `"page":"x","ref"`, 1), false},
		{"an unknown member of a condition", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":"3 g","roughly":"yes"}`), false},
		{"an unknown member of a statement", "claims", oneRule("xx/claim/c", `"name":{"en":"c"},"about":[],"condition":`+fat+`,"statements":[{"text":{"en":"t"},"colour":"red"}]`), false},
		{"an unknown member of a market", "jurisdiction", strings.Replace(market, `"gaps"`, `"holes":[],"gaps"`, 1), false},
		{"an unknown member of a way", "definitions", strings.Replace(fatOnly, `{"sum"`, `{"product":{"FAT":"1"},"sum"`, 1), false},
		{"an unknown member of a predicate", "definitions", strings.Replace(fatOnly, `{"sum":{"FAT":"1"}}`, `{"acids":{"triple bonds":"1"}}`, 1), false},
		{"an unknown member of a band", "rounding", rounding(`[{"nearest":"1 g","roughly":true}]`), false},
		{"two ways in one", "definitions", strings.Replace(fatOnly, `{"sum"`, `{"acids":{"every":true},"sum"`, 1), false},
		{"a predicate that says nothing", "definitions", strings.Replace(fatOnly, `{"sum":{"FAT":"1"}}`, `{"acids":{}}`, 1), false},
		{"two relations", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":"3 g","at least":"1 g"}`), false},
		{"no relation", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g"}`), false},
		{"when without then", "claims", claimOn(`{"when":` + fat + `}`), false},
		{"a condition of no form", "claims", claimOn(`{}`), false},
		{"an amount without a unit", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":"3"}`), false},
		{"an amount in a unit nobody knows", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":"3 oz"}`), false},
		{"an amount that is a number", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":3}`), false},
		{"a negative amount", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","at most":"-3 g"}`), false},
		{"a comparison against something else", "claims", claimOn(`{"of":{"fat":"1"},"per":"100 g","not more than":"before"}`), false},
		{"a size of something else", "claims", claimOn(`{"size of":"plate","at most":"3 g"}`), false},
		{"nothing to decide a claim by", "claims", oneRule("xx/claim/c", `"name":{"en":"c"},"about":[]`), false},
		{"no source", "claims", strings.Replace(claimOn(fat), source, `"source":{}`, 1), false},
		{"an unknown grade", "claims", strings.Replace(claimOn(fat), "memory", "hearsay", 1), false},
		{"an unknown force", "claims", strings.Replace(claimOn(fat), `"law"`, `"custom"`, 1), false},
		{"no such day", "claims", strings.Replace(claimOn(fat), "2000-01-01", "2000-02-30", 1), false},
		{"no version", "claims", `{"jurisdiction":"xx","rules":[{"id":"xx/claim/c","versions":[]}]}`, false},
		{"an identifier of another kind", "claims", strings.Replace(claimOn(fat), "xx/claim/c", "xx/limit/c", 1), false},
		{"a band that does two things", "rounding", rounding(`[{"nearest":"1 g","declare":"0 g"}]`), false},
		{"a band that does nothing", "rounding", rounding(`[{}]`), false},
		{"a severity nobody knows", "limits", oneRule("xx/limit/l", `"name":{"en":"l"},"condition":`+fat+`,"severity":"fatal","code":"c","says":{"en":"s"}`), false},
		{"a line of a presence nobody knows", "declaration", oneRule("xx/declaration/standard", `"title":{"en":"t"},"number":{"en":{"decimal":".","unit":"{n} {u}","less than":"< {n} {u}"}},"lines":[{"quantity":"fat","component":"FAT","terms":{"en":["Fat"]},"unit":"g","percent":"none","presence":"welcome"}]`), false},
	} {
		t.Run(c.name, func(t *testing.T) {
			err := ofKind(c.file).Validate(document(t, []byte(c.doc)))
			if refused := lintRefuses("xx/"+c.file+".json", c.doc); refused == c.well || (err != nil) == c.well {
				t.Errorf("lint refuses: %v; schema: %v", refused, err)
			}
			if any := ofKind("").Validate(document(t, []byte(c.doc))); (any == nil) != (err == nil) {
				t.Errorf("as a file of any kind: %v; of its kind: %v", any, err)
			}
		})
	}
}

// Every member the typed decoder reads stands in the schema, and no other.
func TestSchemaHasTheDecodersMembers(t *testing.T) {
	defs := document(t, text(t, rulesFile)).(map[string]any)["$defs"].(map[string]any)
	for name, of := range map[string]any{
		"source": rulebook.Source{}, "required": rulebook.Required{}, "head": rulebook.Head{}, "edition": rulebook.Edition{}, "assumed": rulebook.Assumed{}, "unlisted": rulebook.Unlisted{},
		"basis": rulebook.BasisRule{}, "jurisdiction_file": rulebook.Market{}, "predicate": lipid.Predicate{}, "way": rulebook.Way{}, "definition": rulebook.Definition{}, "method": rulebook.Method{},
		"energy": rulebook.Energy{}, "reference": rulebook.Reference{}, "band": rulebook.Band{}, "percent": rulebook.Percent{}, "rounding": rulebook.Rounding{}, "number": rulebook.Number{},
		"line": rulebook.Line{}, "statement": rulebook.Statement{}, "insignificant": rulebook.Insignificant{}, "simplified": rulebook.Simplified{}, "count_band": rulebook.CountBand{},
		"servings": rulebook.Servings{}, "declaration": rulebook.Declaration{}, "reference_amount": rulebook.ReferenceAmount{}, "stated": rulebook.Stated{}, "claim": rulebook.Claim{},
		"disclosure": rulebook.Disclosure{}, "limit": rulebook.Limit{}, "named": rulebook.Named{}, "ingredient_test": rulebook.IngredientTest{}, "naming": rulebook.Naming{},
		"selection": rulebook.Selection{}, "presumption": rulebook.Presumption{}, "origin": rulebook.Origin{},
		"wording": rulebook.Wording{}, "component_words": rulebook.ComponentWords{}, "phrase_words": rulebook.PhraseWords{}, "relation_words": rulebook.RelationWords{},
		"pattern_words": rulebook.PatternWords{}, "list_words": rulebook.ListWords{}, "health_words": rulebook.HealthWords{}, "words_file": rulebook.Language{}, "concepts_file": rulebook.Concepts{},
	} {
		def, ok := defs[name].(map[string]any)
		if !ok {
			t.Errorf("%s is missing", name)
			continue
		}
		var have []string
		for member := range def["properties"].(map[string]any) {
			have = append(have, member)
		}
		sort.Strings(have)
		if want := members(reflect.TypeOf(of)); !slices.Equal(have, want) {
			t.Errorf("%s has %q, the decoder reads %q", name, have, want)
		}
	}
}

func members(of reflect.Type) []string {
	var out []string
	for i := range of.NumField() {
		if name, _, _ := strings.Cut(of.Field(i).Tag.Get("json"), ","); name != "" {
			out = append(out, name)
		}
	}
	sort.Strings(out)
	return out
}
