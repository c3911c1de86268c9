package schemas

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"io/fs"
	"strings"
)

//go:embed openapi.json
var openapi []byte

// OpenAPI is the description of the HTTP service: openapi.json with the schemas it refers to written into its components, so that a reader
// needs no other document. A schema x.schema.json becomes the component x, and its definition y the component x.y.
func OpenAPI() ([]byte, error) {
	var doc map[string]any
	if err := json.Unmarshal(openapi, &doc); err != nil {
		return nil, fmt.Errorf("openapi.json: %w", err)
	}
	components, _ := doc["components"].(map[string]any)
	into, ok := components["schemas"].(map[string]any)
	if !ok {
		return nil, fmt.Errorf("openapi.json: components have no schemas")
	}
	for _, name := range []string{"recipe", "report", "wording"} {
		if err := bundle(into, name); err != nil {
			return nil, err
		}
	}
	return json.Marshal(pointHere(doc, ""))
}

// bundle writes one schema and its definitions into the components.
func bundle(into map[string]any, name string) error {
	b, err := fs.ReadFile(Files, name+schemaSuffix)
	if err != nil {
		return err
	}
	var schema map[string]any
	if err := json.Unmarshal(b, &schema); err != nil {
		return fmt.Errorf("%s: %w", name+schemaSuffix, err)
	}
	defs, _ := schema["$defs"].(map[string]any)
	for _, own := range []string{"$defs", "$schema", "$id"} {
		delete(schema, own)
	}
	into[name] = pointHere(schema, name)
	for def, s := range defs {
		into[name+"."+def] = pointHere(s, name)
	}
	return nil
}

const (
	schemaSuffix = ".schema.json"
	schemaURN    = "urn:gramlaw:schema:"
	ownDef       = "#/$defs/"
	component    = "#/components/schemas/"
)

// pointHere turns references to schema files, and a schema's own to its definitions, into references to components.
func pointHere(v any, within string) any {
	switch v := v.(type) {
	case map[string]any:
		for name, m := range v {
			if ref, ok := m.(string); ok && name == "$ref" {
				v[name] = here(ref, within)
			} else {
				v[name] = pointHere(m, within)
			}
		}
	case []any:
		for i := range v {
			v[i] = pointHere(v[i], within)
		}
	}
	return v
}

func here(ref, within string) string {
	if def, own := strings.CutPrefix(ref, ownDef); own {
		return component + within + "." + def
	}
	file, def, has := strings.Cut(ref, ownDef)
	name, ok := strings.CutSuffix(file, schemaSuffix)
	if !ok {
		name, ok = strings.CutPrefix(file, schemaURN)
	}
	switch {
	case ok && has:
		return component + name + "." + def
	case ok:
		return component + name
	}
	return ref
}
