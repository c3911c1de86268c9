package recipe

import (
	"encoding/json"
	"math/rand/v2"
	"os"
	"slices"
	"strings"
	"testing"
)

func everyMember(t testing.TB) []byte {
	t.Helper()
	doc, err := os.ReadFile("testdata/every-member.json")
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

func TestEveryMemberOfTheSchemaDecodes(t *testing.T) {
	doc := everyMember(t)
	decoded(t, string(doc))
	used := map[string]bool{}
	s, _ := scan(doc)
	for _, n := range s.nodes {
		used[n.name] = true
	}
	everySubschema("#", schemaObject(t), func(at string, sub map[string]any) {
		for name := range sub {
			if strings.HasSuffix(at, "/properties") && !used[name] {
				t.Errorf("testdata/every-member.json has no %s", name)
			}
		}
	})
}

// Random slips in a document with every member: the decoder and the schema must complain about the same places.
func TestDecoderAndSchemaAgree(t *testing.T) {
	random := rand.New(rand.NewPCG(1, 2)) // fixed, so that a failure comes back
	refused := 0
	for range 3000 {
		var doc any
		if err := json.Unmarshal(everyMember(t), &doc); err != nil {
			t.Fatal(err)
		}
		for range 1 + random.IntN(4) {
			doc = slip(random, doc)
		}
		text, err := json.Marshal(doc)
		if err != nil {
			t.Fatal(err)
		}
		ours, published, comparable := misshapen(text)
		if !comparable || !slices.Equal(ours, published) {
			t.Fatalf("decoder finds %q misshapen, schema finds %q\n%s", ours, published, text)
		}
		if len(ours) > 0 {
			refused++
		}
		if r, faults := Decode(text); (r == nil) == (len(faults) == 0) {
			t.Fatalf("recipe %v, faults %v\n%s", r, faults, text)
		}
	}
	if refused < 1000 {
		t.Errorf("only %d of 3000 documents had the wrong shape; the slips are too tame", refused)
	}
}

// slip changes one place of the value.
func slip(random *rand.Rand, v any) any {
	if random.IntN(4) > 0 {
		switch v := v.(type) {
		case map[string]any:
			if len(v) > 0 {
				return slipMember(random, v)
			}
		case []any:
			if len(v) > 0 {
				i := random.IntN(len(v))
				v[i] = slip(random, v[i])
				return v
			}
		}
	}
	return odd(random)
}

func slipMember(random *rand.Rand, v map[string]any) any {
	names := make([]string, 0, len(v))
	for name := range v {
		names = append(names, name)
	}
	slices.Sort(names)
	name := names[random.IntN(len(names))]
	switch random.IntN(12) {
	case 0:
		delete(v, name)
	case 1:
		v[name+"s"] = v[name]
		delete(v, name)
	case 2:
		v[oddNames[random.IntN(len(oddNames))]] = odd(random)
	default:
		v[name] = slip(random, v[name])
	}
	return v
}

var oddNames = []string{
	"low", "high", "value", "id", "amount", "food", "recipe", "yield", "mass", "gain", "loss", "oil", "us", "USA", "default", "FAT", "x/y~z", "é%", "on",
	"complete", "settle", "per", "source", "in", "text", "kind", "grams", "density",
}

// odd is a value that fits some members and not others.
func odd(random *rand.Rand) any {
	values := []any{
		"", "1", "<1", "< 1", "<  1", "1 g", "<1 g", "1g", "1  g", "1 %", "1.5e-3 g", "1e", ".5 g", "-1 g", "+1 g", "1 G", "1 IU", "1 g/mL", "1 cm2", "us", "US",
		"default", "fr-CA", "2026-12-01", "2026-02-30", "2026-2-3", "fat-low", "sr:20038", "usda-r6:0352", "usda-r6:352", "ruminant", "Ruminant", "refined",
		"solid", "percent of FAME", "similar product", "1234567890123456", "0.0000000000001", "\u00e9", "1 µg", "1 μg", "1 g\n", " 1 g", "１ g",
		true, false, 1, -1.5e300, []any{}, []any{"us"}, []any{1}, map[string]any{}, map[string]any{"low": "1", "high": "2"},
		map[string]any{"low": "1 g", "value": "1 g", "high": "2 g"}, map[string]any{"amount": "1 g"}, map[string]any{"us": "1 g"}, map[string]any{"gain": "1 g"},
		[]any{map[string]any{"origin": "ruminant", "share": "100 %"}}, map[string]any{"food": "sr:20038"}, []any{map[string]any{"id": "a", "amount": "1 g"}},
	}
	return values[random.IntN(len(values))]
}
