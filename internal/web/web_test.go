package web

import (
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"
	"time"

	"gramlaw/internal/rulebook"
	"gramlaw/rules"
)

var book = func() *rulebook.Book {
	b, err := rulebook.Load(rules.FS)
	if err != nil {
		panic(err)
	}
	return b
}()

func now() time.Time { return time.Date(2026, 12, 1, 9, 0, 0, 0, time.UTC) }

func options() Options {
	return Options{Rules: func() Rules { return Rules{book, now().Add(-time.Hour)} }, Now: now, Version: "test"}
}

func handler(t testing.TB, o Options) http.Handler {
	t.Helper()
	h, err := New(o)
	if err != nil {
		t.Fatal(err)
	}
	return h
}

const oats = `{"id": "o", "name": "Oats", "ingredients": [{"id": "oats", "name": "oats", "amount": "100 g", "food": "sr:08120"}]}`

// ask sends a request; headers are "Name: value".
func ask(h http.Handler, method, target, body string, headers ...string) *httptest.ResponseRecorder {
	r := httptest.NewRequest(method, target, strings.NewReader(body))
	for _, line := range headers {
		name, value, _ := strings.Cut(line, ": ")
		r.Header.Add(name, value)
	}
	w := httptest.NewRecorder()
	h.ServeHTTP(w, r)
	return w
}

func TestTour(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct {
		method, target, body, kind string
		status                     int
	}{
		{"POST", "/v1/check", oats, typeJSON, 200},
		{"POST", "/v1/check", `{"recipe": ` + oats + `, "on": "2026-12-01", "in": ["us"], "detail": "contributions"}`, typeJSON, 200},
		{"POST", "/v1/check", `{"recipe": ` + oats + `, "on": 3, "x": 1}`, typeJSON, 422},
		{"POST", "/v1/check", `{"recipe": ` + oats + `, "in": ["zz"]}`, typeJSON, 422},
		{"POST", "/v1/check", `{"recipe": `, typeJSON, 400},
		{"POST", "/v1/check", `{"recipe": {"id": [`, typeJSON, 400},
		{"POST", "/v1/check", `[`, typeJSON, 400},
		{"POST", "/v1/check/batch", oats + "\n{\n\n" + oats, typeNDJSON, 200},
		{"GET", "/v1/rules", "", "", 200},
		{"GET", "/v1/rules/us", "", "", 200},
		{"GET", "/v1/rules/us/changes?from=2015-01-01&to=2026-01-01", "", "", 200},
		{"GET", "/v1/foods?q=oats", "", "", 200},
		{"GET", "/v1/foods/sr:08120", "", "", 200},
		{"GET", "/schemas", "", "", 200},
		{"GET", "/schemas/recipe.schema.json", "", "", 200},
		{"GET", "/problems", "", "", 200},
		{"GET", "/problems/busy", "", "", 200},
		{"GET", "/openapi.json", "", "", 200},
		{"GET", "/health", "", "", 200},
		{"GET", "/", "", "", 404},
		{"GET", "/v1/check", "", "", 405},
	} {
		w := ask(h, c.method, c.target, c.body, "Content-Type: "+c.kind)
		if w.Code != c.status {
			t.Errorf("%s %s: %d, want %d: %s", c.method, c.target, w.Code, c.status, w.Body)
		}
		b := w.Body.String()
		t.Log(c.method, c.target, w.Code, len(b), b[:min(len(b), 700)])
	}
}
