package schemas_test

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v5"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
	"gramlaw/internal/rulebook"
	"gramlaw/rules"
	"gramlaw/schemas"
)

const reportFile = "report.schema.json"

func TestReportSchemaIsOfItsDraft(t *testing.T) {
	meta, err := jsonschema.Compile("https://json-schema.org/draft/2020-12/schema")
	if err != nil {
		t.Fatal(err)
	}
	doc := document(t, text(t, reportFile))
	if err := meta.Validate(doc); err != nil {
		t.Errorf("%#v", err)
	}
	if id := doc.(map[string]any)["$id"]; id != schemas.ReportID {
		t.Errorf("$id is %v", id)
	}
}

func reportSchema(t *testing.T) *jsonschema.Schema {
	t.Helper()
	c := jsonschema.NewCompiler()
	c.AssertFormat = true
	if err := c.AddResource(schemas.ReportID, bytes.NewReader(text(t, reportFile))); err != nil {
		t.Fatal(err)
	}
	s, err := c.Compile(schemas.ReportID)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// A type of the report and its schema have the same members, and the schema asks for those that are always there.
func TestReportSchemaHasEveryMember(t *testing.T) {
	root := document(t, text(t, reportFile)).(map[string]any)
	c := &comparison{t: t, defs: root["$defs"].(map[string]any), seen: map[reflect.Type]bool{}}
	c.object(reflect.TypeFor[check.Report](), root, "report")
	for name := range c.defs {
		if _, object := c.defs[name].(map[string]any)["properties"]; object && !c.used(name) {
			t.Errorf("$defs/%s: no type of the report has this form", name)
		}
	}
}

type comparison struct {
	t     *testing.T
	defs  map[string]any
	seen  map[reflect.Type]bool
	names []string
}

func (c *comparison) used(name string) bool { return slices.Contains(c.names, name) }

func (c *comparison) object(of reflect.Type, schema map[string]any, at string) {
	if c.seen[of] {
		return
	}
	c.seen[of] = true
	properties, _ := schema["properties"].(map[string]any)
	var always []any
	for i := range of.NumField() {
		f := of.Field(i)
		name, options, _ := strings.Cut(f.Tag.Get("json"), ",")
		if !f.IsExported() {
			continue
		}
		p, ok := properties[name].(map[string]any)
		if !ok {
			c.t.Errorf("%s/%s is a member of the report, and %s does not describe it", at, name, reportFile)
			continue
		}
		delete(properties, name)
		if options == "" {
			always = append(always, name)
		}
		c.value(f.Type, p, at+"/"+name)
	}
	for name := range properties {
		c.t.Errorf("%s/%s is described, and no report has it", at, name)
	}
	if required, _ := schema["required"].([]any); !reflect.DeepEqual(required, always) {
		c.t.Errorf("%s: required is %v, and always there are %v", at, required, always)
	}
}

func (c *comparison) value(of reflect.Type, schema map[string]any, at string) {
	switch of.Kind() {
	case reflect.Pointer:
		if list, ok := schema["anyOf"].([]any); ok {
			schema = list[0].(map[string]any)
		}
		c.value(of.Elem(), schema, at)
	case reflect.Slice:
		c.value(of.Elem(), schema["items"].(map[string]any), at+"/0")
	case reflect.Map:
		if more, ok := schema["additionalProperties"].(map[string]any); ok {
			c.value(of.Elem(), more, at+"/*")
		}
	case reflect.Struct:
		name, own := strings.CutPrefix(schema["$ref"].(string), "#/$defs/")
		if !own { // another schema describes it
			return
		}
		c.names = append(c.names, name)
		c.object(of, c.defs[name].(map[string]any), at)
	}
}

// Every demo recipe, on dates in and out of transitions, gives a report that fits.
func TestReportsFitTheirSchema(t *testing.T) {
	s := reportSchema(t)
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	files, err := filepath.Glob("../testdata/recipes/*.json")
	if err != nil || len(files) == 0 {
		t.Fatalf("no demo recipes: %v", err)
	}
	for _, file := range files {
		doc, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		r, faults := recipe.Decode(doc)
		if len(faults) > 0 {
			t.Fatal(faults)
		}
		for _, q := range []check.Request{
			{On: "2026-12-01", Detail: "contributions"}, {On: "2026-12-01", Without: []string{"all"}}, {On: "2018-01-01"},
			{On: "2023-06-01", Transition: rulebook.Newest}, {On: "1990-01-01"},
		} {
			report, faults := check.Check(r, book, q)
			if len(faults) > 0 {
				t.Fatal(faults)
			}
			var b bytes.Buffer
			if err := render.JSON(&b, report, true); err != nil {
				t.Fatal(err)
			}
			if err := s.Validate(document(t, b.Bytes())); err != nil {
				t.Errorf("%s on %s: %#v", filepath.Base(file), q.On, err)
			}
		}
	}
}

// The schema refuses what is no report, so that fitting it says something.
func TestReportSchemaRefuses(t *testing.T) {
	s := reportSchema(t)
	var v any
	if err := json.Unmarshal([]byte(`{"recipe": {}}`), &v); err != nil {
		t.Fatal(err)
	}
	if s.Validate(v) == nil {
		t.Error("an almost empty object fits")
	}
}
