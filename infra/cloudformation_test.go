package infra

import (
	"fmt"
	"os"
	"regexp"
	"slices"
	"strings"
	"testing"

	"go.yaml.in/yaml/v3"
)

// A template is a CloudFormation document with its short tags written out: !Ref x is {"Ref": x}, !GetAtt a.b is
// {"Fn::GetAtt": [a, b]}, any other !F x is {"Fn::F": x}.
type template struct {
	Parameters map[string]any
	Conditions map[string]any
	Resources  map[string]resource
	Outputs    map[string]any
	whole      any
}

// A resource is what stands under one name.
type resource struct {
	Type       string
	Properties map[string]any
	DependsOn  []string
}

func load(t *testing.T, name string) *template {
	t.Helper()
	b, err := os.ReadFile(name)
	if err != nil {
		t.Fatal(err)
	}
	var n yaml.Node
	if err := yaml.Unmarshal(b, &n); err != nil {
		t.Fatal(err)
	}
	whole := plain(t, n.Content[0]).(map[string]any)
	out := &template{Parameters: object(whole["Parameters"]), Conditions: object(whole["Conditions"]), Outputs: object(whole["Outputs"]), whole: whole,
		Resources: map[string]resource{}}
	for name, r := range object(whole["Resources"]) {
		m := object(r)
		out.Resources[name] = resource{Type: text(m["Type"]), Properties: object(m["Properties"]), DependsOn: texts(m["DependsOn"])}
	}
	return out
}

// plain turns a node into maps, lists and scalars.
func plain(t *testing.T, n *yaml.Node) any {
	t.Helper()
	if strings.HasPrefix(n.Tag, "!") && !strings.HasPrefix(n.Tag, "!!") {
		return short(t, n)
	}
	switch n.Kind {
	case yaml.MappingNode:
		m := map[string]any{}
		for i := 0; i < len(n.Content); i += 2 {
			if _, twice := m[n.Content[i].Value]; twice {
				t.Fatalf("line %d: %s stands twice", n.Content[i].Line, n.Content[i].Value)
			}
			m[n.Content[i].Value] = plain(t, n.Content[i+1])
		}
		return m
	case yaml.SequenceNode:
		list := []any{}
		for _, c := range n.Content {
			list = append(list, plain(t, c))
		}
		return list
	case yaml.ScalarNode:
		var v any
		if err := n.Decode(&v); err != nil {
			t.Fatal(err)
		}
		return v
	}
	t.Fatalf("line %d: neither mapping, list nor scalar", n.Line)
	return nil
}

func short(t *testing.T, n *yaml.Node) any {
	t.Helper()
	bare := *n
	bare.Tag = ""
	value := plain(t, &bare)
	switch n.Tag {
	case "!Ref", "!Condition":
		return map[string]any{n.Tag[1:]: value}
	case "!GetAtt":
		if s, ok := value.(string); ok {
			name, attribute, _ := strings.Cut(s, ".")
			value = []any{name, attribute}
		}
	}
	return map[string]any{"Fn::" + n.Tag[1:]: value}
}

// A reference is one use of a name: a Ref or condition, or with an attribute a GetAtt.
type reference struct{ kind, name, attribute string }

var substituted = regexp.MustCompile(`\$\{([^!}][^}]*)\}`)

// references lists every use of a name below v.
func references(v any) []reference {
	var out []reference
	switch v := v.(type) {
	case []any:
		for _, one := range v {
			out = append(out, references(one)...)
		}
	case map[string]any:
		for key, one := range v {
			out = append(out, used(key, one)...)
		}
	}
	return out
}

func used(key string, v any) []reference {
	switch key {
	case "Ref":
		return []reference{{"Ref", text(v), ""}}
	case "Condition":
		if s, ok := v.(string); ok {
			return []reference{{"Condition", s, ""}}
		}
	case "Fn::GetAtt":
		if pair, ok := v.([]any); ok && len(pair) == 2 {
			return []reference{{"GetAtt", text(pair[0]), text(pair[1])}}
		}
	case "Fn::If":
		list := v.([]any)
		return append(references(list[1:]), reference{"Condition", text(list[0]), ""})
	case "Fn::Sub":
		var out []reference
		for _, m := range substituted.FindAllStringSubmatch(text(v), -1) {
			if name, attribute, dotted := strings.Cut(m[1], "."); dotted {
				out = append(out, reference{"GetAtt", name, attribute})
			} else {
				out = append(out, reference{"Ref", m[1], ""})
			}
		}
		return out
	}
	return references(v)
}

func (t *template) ofType(kind string) []string {
	var names []string
	for name, r := range t.Resources {
		if r.Type == kind {
			names = append(names, name)
		}
	}
	slices.Sort(names)
	return names
}

func object(v any) map[string]any {
	m, _ := v.(map[string]any)
	return m
}

func list(v any) []any {
	l, _ := v.([]any)
	return l
}

func text(v any) string {
	if v == nil {
		return ""
	}
	return fmt.Sprint(v)
}

// texts is a text or a list of them.
func texts(v any) []string {
	if s, ok := v.(string); ok {
		return []string{s}
	}
	var out []string
	for _, one := range list(v) {
		out = append(out, text(one))
	}
	return out
}
