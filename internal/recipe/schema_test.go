package recipe

import (
	"encoding/json"
	"slices"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v5"

	"gramlaw/schemas"
)

func schemaObject(t *testing.T) map[string]any {
	t.Helper()
	var s map[string]any
	if err := json.Unmarshal([]byte(schemas.Recipe), &s); err != nil {
		t.Fatal(err)
	}
	return s
}

// everySubschema visits the objects of a schema, examples left out, with their place.
func everySubschema(at string, v any, visit func(at string, s map[string]any)) {
	switch v := v.(type) {
	case map[string]any:
		visit(at, v)
		for name, sub := range v {
			if name != "examples" {
				everySubschema(at+"/"+name, sub, visit)
			}
		}
	case []any:
		for _, sub := range v {
			everySubschema(at, sub, visit)
		}
	}
}

func isNames(at string) bool {
	return strings.HasSuffix(at, "/properties") || strings.HasSuffix(at, "/$defs")
}

func TestSchemaIsOfItsDraft(t *testing.T) {
	meta, err := jsonschema.Compile("https://json-schema.org/draft/2020-12/schema")
	if err != nil {
		t.Fatal(err)
	}
	if err := meta.Validate(any(schemaObject(t))); err != nil {
		t.Errorf("%#v", err)
	}
	same(t, "$id", schemaObject(t)["$id"], any(schemas.RecipeID))
}

func TestSchemaKeepsItsForm(t *testing.T) {
	barred := []string{"oneOf", "minimum", "maximum", "exclusiveMinimum", "exclusiveMaximum", "multipleOf", "unevaluatedProperties"}
	known := formats()
	everySubschema("#", schemaObject(t), func(at string, s map[string]any) {
		if isNames(at) {
			return
		}
		for _, word := range barred {
			if _, there := s[word]; there {
				t.Errorf("%s has %s", at, word)
			}
		}
		if _, open := s["additionalProperties"]; s["properties"] != nil && (!open || s["additionalProperties"] != false) {
			t.Errorf("%s lets unknown members in", at)
		}
		if f, ok := s["format"].(string); ok && known[f] == nil {
			t.Errorf("%s has the format %q, which no parser asserts", at, f)
		}
		if (s["format"] == nil) != (s["pattern"] == nil) {
			t.Errorf("%s needs a format with a pattern beside it", at)
		}
	})
}

func TestSchemaDocumentsEveryMember(t *testing.T) {
	everySubschema("#", schemaObject(t), func(at string, s map[string]any) {
		if !strings.HasSuffix(at, "/properties") {
			return
		}
		for name, sub := range s {
			member := sub.(map[string]any)
			if member["description"] == nil || member["examples"] == nil {
				t.Errorf("%s/%s needs a description and an example", at, name)
			}
		}
	})
}

// The examples of a schema teach by heart, so that they must be right: each is checked by the subschema it stands in.
func TestSchemaExamplesHold(t *testing.T) {
	count := 0
	everySubschema("#", schemaObject(t), func(at string, s map[string]any) {
		examples, ok := s["examples"].([]any)
		if !ok || isNames(at) {
			return
		}
		sub := compiledAt(t, s)
		for _, e := range examples {
			count++
			if err := sub.Validate(e); err != nil {
				t.Errorf("%s: example %v: %v", at, e, err)
			}
		}
	})
	if count < 80 {
		t.Errorf("only %d examples were found", count)
	}
}

// compiledAt compiles a subschema with the schema's definitions.
func compiledAt(t *testing.T, s map[string]any) *jsonschema.Schema {
	t.Helper()
	alone := map[string]any{"$defs": schemaObject(t)["$defs"]}
	for k, v := range s {
		if k != "$id" && k != "$defs" {
			alone[k] = v
		}
	}
	text, err := json.Marshal(alone)
	if err != nil {
		t.Fatal(err)
	}
	sub, err := jsonschema.CompileString("urn:example:sub", string(text))
	if err != nil {
		t.Fatal(err)
	}
	return sub
}

func TestSchemaListsWhatTheCodeLists(t *testing.T) {
	lists := map[string][]string{"process": Processes, "basis": Bases, "kind": ReferenceKinds}
	found := 0
	everySubschema("#", schemaObject(t), func(at string, s map[string]any) {
		want, ok := lists[at[strings.LastIndexByte(at, '/')+1:]]
		if !ok {
			return
		}
		found++
		var got []string
		for _, v := range s["enum"].([]any) {
			got = append(got, v.(string))
		}
		if !slices.Equal(got, want) {
			t.Errorf("%s lists %q, the code %q", at, got, want)
		}
	})
	same(t, "lists", found, len(lists))
	if n := strings.Count(schemas.Recipe, `"^(`+strings.Join(TransOrigins, "|")+`)$"`); n != 2 {
		t.Errorf("the schema lists the origins %q %d times, not twice", TransOrigins, n)
	}
	if !strings.Contains(schemas.Recipe, `"enum": ["`+strings.Join(States, `", "`)+`"]`) {
		t.Errorf("the schema does not list the states %q", States)
	}
}

func TestSchemaIsEmbedded(t *testing.T) {
	file, err := schemas.Files.ReadFile("recipe.schema.json")
	if err != nil {
		t.Fatal(err)
	}
	same(t, "text", string(file), schemas.Recipe)
}
