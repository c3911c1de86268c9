package recipe

import (
	"os"
	"slices"
	"testing"
)

// FuzzDecode holds the decoder to the published schema: they find the same places of a document misshapen, whatever the
// document is. Run it with -fuzzminimizetime=5x: by default the time goes into shrinking inputs, not into trying them.
func FuzzDecode(f *testing.F) {
	sketch, err := os.ReadFile("testdata/sketch.json")
	if err != nil {
		f.Fatal(err)
	}
	f.Add(sketch)
	f.Add(everyMember(f))
	for _, c := range faultCases {
		seed(f, c.doc)
	}
	for _, c := range acceptedCases {
		seed(f, c.doc)
	}
	f.Fuzz(func(t *testing.T, doc []byte) {
		r, faults := Decode(doc)
		if (r == nil) == (len(faults) == 0) {
			t.Fatalf("recipe %v, faults %v: exactly one of them is wanted", r, faults)
		}
		if again := second(Decode(doc)); !slices.Equal(faults, again) {
			t.Fatalf("two readings differ:\n%v\n%v", faults, again)
		}
		ours, published, comparable := misshapen(doc)
		if comparable && !slices.Equal(ours, published) {
			t.Fatalf("decoder finds %q misshapen, schema finds %q\n%s", ours, published, doc)
		}
	})
}

// seed leaves out the documents that test the size limits: changing them is slow and finds nothing.
func seed(f *testing.F, doc string) {
	if len(doc) < 20_000 {
		f.Add([]byte(doc))
	}
}

func second(_ *Recipe, f Faults) Faults { return f }

// misshapen lists the places that the decoder refuses for their shape and those that the schema does.
func misshapen(doc []byte) (shape, schema []string, comparable bool) {
	s, fatal := scan(doc)
	if fatal != nil {
		return nil, nil, false
	}
	d := decoder{tree: &s.tree}
	d.recipe(root)
	for _, at := range d.misshapen {
		if !d.underFault(at) {
			shape = append(shape, d.pointer(at))
		}
	}
	if d.ingredients > MaxIngredients || len(d.misshapen) > MaxFaults {
		return nil, nil, false // not read, or not explained, to the end
	}
	for _, f := range d.explain() {
		schema = append(schema, d.pointer(f.at))
	}
	return distinct(shape), distinct(schema), true
}

func distinct(s []string) []string {
	slices.Sort(s)
	return slices.Compact(s)
}
