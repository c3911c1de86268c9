package recipe

import (
	"cmp"
	"encoding/json"
	"errors"
	"net/url"
	"slices"
	"strings"
	"sync"

	"github.com/santhosh-tekuri/jsonschema/v5"

	"gramlaw/schemas"
)

// publishedSchema is built when the first document is refused; documents that are accepted never need it.
var publishedSchema = sync.OnceValue(func() *jsonschema.Schema {
	c := jsonschema.NewCompiler()
	c.Draft = jsonschema.Draft2020
	c.AssertFormat = true
	c.Formats = make(map[string]func(any) bool)
	for name, parse := range formats() {
		c.Formats[name] = func(v any) bool {
			s, ok := v.(string)
			return !ok || parse(s) == nil
		}
	}
	if err := c.AddResource(schemas.RecipeID, strings.NewReader(schemas.Recipe)); err != nil {
		panic(err)
	}
	return c.MustCompile(schemas.RecipeID)
})

// explain asks the schema what is wrong with the document's shape.
func (d *decoder) explain() []found {
	// Trees keep an index of what was asked, so that each explanation has its own of the schema.
	schema, fatal := scan([]byte(schemas.Recipe))
	if fatal != nil {
		panic("recipe.schema.json: " + fatal.Says)
	}
	e := explanation{document: d.tree, schema: &schema.tree, formats: formats()}
	for _, leaf := range d.violations(d.last()) {
		e.add(leaf)
	}
	return e.found
}

// last is the place of the last fault that will be listed. Nothing beyond it is explained, so that a document full of
// faults costs no more than one with a few.
func (d *decoder) last() int32 {
	places := slices.Clone(d.misshapen)
	for _, f := range d.found {
		places = append(places, f.at)
	}
	slices.Sort(places)
	if places = slices.Compact(places); len(places) > MaxFaults {
		return places[MaxFaults]
	}
	return int32(len(d.nodes))
}

// violations lists the innermost errors of the schema up to a place, those under a fault of the bounded pass left out.
func (t *tree) violations(last int32) (out []violation) {
	var refused *jsonschema.ValidationError
	if !errors.As(publishedSchema().Validate(t.plain(root, last)), &refused) {
		return nil
	}
	var walk func(*jsonschema.ValidationError)
	walk = func(e *jsonschema.ValidationError) {
		for _, cause := range e.Causes {
			walk(cause)
		}
		if len(e.Causes) > 0 {
			return
		}
		if at, ok := t.locate(root, e.InstanceLocation); ok && !t.underFault(at) {
			out = append(out, violation{at, e.AbsoluteKeywordLocation})
		}
	}
	walk(refused)
	// The library walks objects in the order of Go's maps.
	slices.SortFunc(out, func(a, b violation) int {
		return cmp.Or(cmp.Compare(a.at, b.at), cmp.Compare(a.keyword, b.keyword))
	})
	return out
}

// violation is one broken keyword of the schema.
type violation struct {
	at      int32
	keyword string // its absolute location
}

// plain is the document up to a place, in the form that the schema library reads. Numbers are never wanted in a recipe,
// so that their type is all that counts.
func (t *tree) plain(at, last int32) any {
	n := &t.nodes[at]
	switch n.kind {
	case '{':
		out := make(map[string]any, min(n.count, last))
		for m := n.first; m != 0 && m <= last; m = t.nodes[m].next {
			out[t.nodes[m].name] = t.plain(m, last)
		}
		return out
	case '[':
		out := make([]any, 0, min(n.count, last))
		for m := n.first; m != 0 && m <= last; m = t.nodes[m].next {
			out = append(out, t.plain(m, last))
		}
		return out
	case '"':
		return n.text
	case '0':
		return json.Number("0")
	case 'n':
		return nil
	}
	return n.kind == 't'
}

// locate follows a pointer in the library's form: a JSON Pointer whose tokens are escaped as in a URL.
func (t *tree) locate(from int32, pointer string) (at int32, ok bool) {
	for token := range strings.SplitSeq(strings.TrimPrefix(pointer, "/"), "/") {
		if pointer == "" {
			break
		}
		name, err := url.PathUnescape(token)
		if err != nil {
			return 0, false
		}
		if from = t.child(from, strings.NewReplacer("~1", "/", "~0", "~").Replace(name)); from == 0 {
			return 0, false
		}
	}
	return from, true
}

// child is a member by name or an element by number.
func (t *tree) child(of int32, token string) int32 {
	if t.nodes[of].kind == '[' {
		return t.element(of, token)
	}
	if t.nodes[of].kind != '{' {
		return 0
	}
	return t.member(of, token)
}

func (t *tree) underFault(at int32) bool {
	for ; at >= 0; at = t.nodes[at].parent {
		if t.nodes[at].faulty {
			return true
		}
	}
	return false
}
