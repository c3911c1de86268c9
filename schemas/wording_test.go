package schemas_test

import (
	"bytes"
	"reflect"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v5"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
	"gramlaw/schemas"
)

const wordingFile = "wording.schema.json"

// The types of an answer about words and their schema have the same members.
func TestWordingSchemaHasEveryMember(t *testing.T) {
	root := document(t, text(t, wordingFile)).(map[string]any)
	c := &comparison{t: t, defs: root["$defs"].(map[string]any), seen: map[reflect.Type]bool{}}
	c.object(reflect.TypeFor[check.WordingReport](), root, "wording")
}

// Answers fit, with a product and without, and a report does not.
func TestWordingFitsItsSchema(t *testing.T) {
	c := jsonschema.NewCompiler()
	for id, file := range map[string]string{schemas.WordingID: wordingFile, schemas.ReportID: reportFile} {
		if err := c.AddResource(id, bytes.NewReader(text(t, file))); err != nil {
			t.Fatal(err)
		}
	}
	s, err := c.Compile(schemas.WordingID)
	if err != nil {
		t.Fatal(err)
	}
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	oats, _ := recipe.Decode([]byte(`{"id":"o","ingredients":[{"id":"o","amount":"100 g","food":"sr:08120"}]}`))
	for _, words := range []string{"50 % less fat than our classic, 0 g trans fat per serving", "keeps your heart healthy", "free from palm oil", "light and airy", "smart fats", "Sans sel"} {
		for _, r := range []*recipe.Recipe{nil, oats} {
			report, faults := check.Wording(r, book, check.WordingRequest{Text: words, On: "2026-12-01"})
			if len(faults) > 0 {
				t.Fatal(faults)
			}
			var b bytes.Buffer
			if err := render.WordingJSON(&b, report, true); err != nil {
				t.Fatal(err)
			}
			if err := s.Validate(document(t, b.Bytes())); err != nil {
				t.Errorf("%s: %#v", words, err)
			}
		}
	}
	if s.Validate(document(t, []byte(`{"recipe": {}}`))) == nil {
		t.Error("an almost empty object fits")
	}
}
