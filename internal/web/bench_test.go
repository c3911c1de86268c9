package web

import (
	"fmt"
	"net/http/httptest"
	"os"
	"strings"
	"testing"
)

// Whole requests through the handler, without a network.
func BenchmarkHandler(b *testing.B) {
	h := handler(b, options())
	demo, err := os.ReadFile("../../testdata/recipes/oat-biscuit.json")
	if err != nil {
		b.Fatal(err)
	}
	one := strings.Join(strings.Fields(string(demo)), " ")
	asJSON, coded := "Content-Type: application/json", "Accept-Encoding: gzip"
	for _, c := range []struct {
		name, method, target, body string
		headers                    []string
	}{
		{"check in three markets", "POST", "/v1/check", one, []string{asJSON}},
		{"check in three markets, gzip", "POST", "/v1/check", one, []string{asJSON, coded}},
		{"check in one market", "POST", "/v1/check", `{"recipe": ` + one + `, "in": ["us"]}`, []string{asJSON}},
		{"batch of ten", "POST", "/v1/check/batch", strings.Repeat(one+"\n", 10), []string{"Content-Type: application/x-ndjson"}},
		{"faulty recipe", "POST", "/v1/check", strings.ReplaceAll(one, ` g"`, ` gg"`), []string{asJSON}},
		{"wrong type", "POST", "/v1/check", one, []string{"Content-Type: text/plain"}},
		{"rules of a market", "GET", "/v1/rules/us", "", nil},
		{"rules of a market, gzip", "GET", "/v1/rules/us", "", []string{coded}},
		{"changes of a market", "GET", "/v1/rules/us/changes?from=2015-01-01&to=2026-01-01", "", nil},
		{"search of foods", "GET", "/v1/foods?q=olive+oil", "", nil},
		{"health", "GET", "/health", "", nil},
	} {
		b.Run(c.name, func(b *testing.B) {
			b.ReportAllocs()
			sent := 0
			for b.Loop() {
				w := httptest.NewRecorder()
				h.ServeHTTP(w, request(c.method, c.target, c.body, c.headers...))
				sent = w.Body.Len()
			}
			b.ReportMetric(float64(sent), "sent/op")
		})
	}
}

// An envelope around a recipe, beside the recipe alone.
func BenchmarkEnvelope(b *testing.B) {
	var in []string
	for i := range 1000 {
		in = append(in, fmt.Sprintf(`{"id": "i%d", "name": "ingredient %d", "amount": "%d g", "food": "sr:08120"}`, i, i, 1+i))
	}
	one := `{"id": "many", "ingredients": [` + strings.Join(in, ",") + `]}`
	for name, doc := range map[string]string{"recipe alone": one, "envelope": `{"on": "2026-12-01", "recipe": ` + one + `}`} {
		b.Run(name, func(b *testing.B) {
			b.SetBytes(int64(len(doc)))
			for b.Loop() {
				if _, faults := readOrder([]byte(doc)); len(faults) > 0 {
					b.Fatal(faults)
				}
			}
		})
	}
}
