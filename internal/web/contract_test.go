package web

import (
	"context"
	"encoding/json"
	"mime"
	"net/http"
	"net/http/httptest"
	"slices"
	"strconv"
	"strings"
	"sync"
	"testing"

	"github.com/getkin/kin-openapi/openapi3"

	"gramlaw/schemas"
)

// description is the OpenAPI document, once as published and once with every object closed: what a handler writes beyond the description is
// a fault here, though readers pass over it.
var description = sync.OnceValues(func() (published, closed *openapi3.T) {
	b, err := schemas.OpenAPI()
	if err != nil {
		panic(err)
	}
	var doc any
	if err := json.Unmarshal(b, &doc); err != nil {
		panic(err)
	}
	shut, err := json.Marshal(closeObjects(doc))
	if err != nil {
		panic(err)
	}
	return read(b), read(shut)
})

func read(b []byte) *openapi3.T {
	doc, err := openapi3.NewLoader().LoadFromData(b)
	if err != nil {
		panic(err)
	}
	return doc
}

func closeObjects(v any) any {
	switch v := v.(type) {
	case map[string]any:
		for name := range v {
			v[name] = closeObjects(v[name])
		}
		_, object := v["properties"].(map[string]any)
		if _, decided := v["additionalProperties"]; object && !decided && v["type"] == "object" {
			v["additionalProperties"] = false
		}
	case []any:
		for i := range v {
			v[i] = closeObjects(v[i])
		}
	}
	return v
}

func TestDescriptionIsOpenAPI(t *testing.T) {
	doc, _ := description()
	if err := doc.Validate(context.Background(), openapi3.EnableExamplesValidation()); err != nil {
		t.Error(err)
	}
	if !strings.HasPrefix(doc.OpenAPI, "3.1") {
		t.Errorf("version %s", doc.OpenAPI)
	}
}

// The routes and the description name the same paths and methods.
func TestEveryRouteIsDescribed(t *testing.T) {
	doc, _ := description()
	var described, served []string
	for path, item := range doc.Paths.Map() {
		for method := range item.Operations() {
			described = append(described, method+" "+path)
		}
	}
	for _, r := range routes() {
		for _, method := range []string{"GET", "POST", "PUT", "PATCH", "DELETE"} {
			if r.pick(method) != nil {
				served = append(served, method+" "+r.pattern)
			}
		}
	}
	slices.Sort(described)
	slices.Sort(served)
	if !slices.Equal(described, served) {
		t.Errorf("described:\n%s\nserved:\n%s", strings.Join(described, "\n"), strings.Join(served, "\n"))
	}
}

// conform holds an answer against the description. It gives the route and status it was, empty where there is no such route.
func conform(t testing.TB, h http.Handler, r *http.Request, w *httptest.ResponseRecorder) string {
	t.Helper()
	s := h.(*service)
	_, pattern := s.mux.Handler(r)
	if !plainPath(r.URL) || pattern == "/" {
		if w.Code != http.StatusNotFound {
			t.Errorf("%s: %d on no route", r.URL.Path, w.Code)
		}
		return ""
	}
	_, doc := description()
	item := doc.Paths.Value(pattern)
	operation := item.GetOperation(strings.Replace(r.Method, "HEAD", "GET", 1))
	if operation == nil { // a method that the path does not have
		if w.Code != http.StatusMethodNotAllowed {
			t.Errorf("%s %s: %d", r.Method, pattern, w.Code)
		}
		for _, operation = range item.Operations() {
		}
	}
	at := r.Method + " " + pattern + " " + strconv.Itoa(w.Code)
	response := operation.Responses.Value(strconv.Itoa(w.Code))
	if response == nil {
		t.Errorf("%s is not described", at)
		return at
	}
	for name := range response.Value.Headers {
		if w.Header().Get(name) == "" {
			t.Errorf("%s: no %s", at, name)
		}
	}
	fits(t, at, r, w, response.Value)
	return at
}

func fits(t testing.TB, at string, r *http.Request, w *httptest.ResponseRecorder, response *openapi3.Response) {
	t.Helper()
	body := plain(t, w)
	if len(response.Content) == 0 || r.Method == http.MethodHead {
		if body != "" {
			t.Errorf("%s: a body of %d bytes", at, len(body))
		}
		return
	}
	kind, _, err := mime.ParseMediaType(w.Header().Get("Content-Type"))
	media := response.Content[kind]
	if err != nil || media == nil {
		t.Errorf("%s: Content-Type %q is not described", at, kind)
		return
	}
	for _, one := range documents(kind, body) {
		var v any
		if err := json.Unmarshal([]byte(one), &v); err != nil {
			t.Errorf("%s: %v", at, err)
			return
		}
		if err := media.Schema.Value.VisitJSON(v, openapi3.EnableJSONSchema2020()); err != nil {
			t.Errorf("%s: %.2000s", at, err)
		}
	}
}

// documents are the JSON texts of a body; of many lines some.
func documents(kind, body string) []string {
	if kind != typeNDJSON && kind != typeJSONL {
		return []string{body}
	}
	all := strings.Split(strings.TrimSuffix(body, "\n"), "\n")
	if len(all) > 10 {
		all = append(all[:9:9], all[len(all)-1])
	}
	return all
}

// valid targets of each path, and bodies.
var targets = map[string]string{
	"/v1/check": "/v1/check", "/v1/check/batch": "/v1/check/batch", "/v1/wording": "/v1/wording", "/v1/rules": "/v1/rules", "/v1/rules/{jurisdiction}": "/v1/rules/us?on=2026-12-01",
	"/v1/rules/{jurisdiction}/changes": "/v1/rules/us/changes?from=2019-01-01&to=2026-12-01", "/v1/foods": "/v1/foods?q=oats", "/v1/foods/{reference}": "/v1/foods/sr:08120",
	"/schemas": "/schemas", "/schemas/{name}": "/schemas/recipe.schema.json", "/problems": "/problems", "/problems/{name}": "/problems/busy",
	"/openapi.json": "/openapi.json", "/health": "/health",
}

// A trial brings a route to one status.
type trial struct {
	options func(*Options)
	busy    func(*service) // before the request
	method  string
	target  func(string) string
	body    string
	headers []string
	writer  func(*httptest.ResponseRecorder) http.ResponseWriter
}

func trials(method, path string) map[string]trial {
	body, kind, pinned := "", "", `{"recipe": `+oats
	switch path {
	case "/v1/check":
		body, kind = oats, typeJSON
	case "/v1/check/batch":
		body, kind = oats+"\n{}\n", typeNDJSON
	case "/v1/wording":
		body, kind, pinned = `{"text": "low in fat, keeps your heart healthy", "recipe": `+oats+`}`, typeJSON, `{"text": "low fat"`
	}
	other := map[string]string{"GET": "POST", "POST": "GET"}[method]
	here := func(s string) string { return s }
	with := func(more string) func(string) string {
		return func(s string) string {
			if strings.Contains(s, "?") {
				return s + "&" + more
			}
			return s + "?" + more
		}
	}
	ok := []string{"Content-Type: " + kind}
	return map[string]trial{
		"200": {target: here, body: body, headers: ok},
		"304": {target: here, headers: []string{"If-None-Match: *"}},
		"400": {target: with("nonsense=1"), body: body, headers: ok},
		"404": {target: func(s string) string {
			return strings.NewReplacer("/us", "/zz", "sr:08120", "sr:99999", "recipe.schema", "x", "/busy", "/x").Replace(s)
		}},
		"405": {target: here, method: other, body: body, headers: ok},
		"406": {target: here, body: body, headers: append(ok, "Accept: image/png")},
		"408": {target: here, body: late, headers: ok},
		"409": {target: here, body: pinned + `, "rules": "sha256:` + strings.Repeat("0", 64) + `"}`, headers: ok},
		"413": {target: here, body: body + strings.Repeat(" ", 10), headers: ok, options: func(o *Options) { o.Limits.Answer = 1; o.Limits.BatchBody = 9 }},
		"414": {target: with(strings.Repeat("a", 3000)), body: body, headers: ok},
		"415": {target: here, body: body, headers: []string{"Content-Type: text/plain"}},
		"422": {target: here, body: `{}`, headers: ok},
		"429": {target: here, body: body, headers: ok, busy: func(s *service) { s.gate.clients["192.0.2.1"] = s.Limits.PerClient }},
		"500": {target: here, body: body, headers: ok, writer: func(w *httptest.ResponseRecorder) http.ResponseWriter { return &failing{ResponseRecorder: w} }},
		"503": {target: here, body: body, headers: ok, busy: func(s *service) { s.gate.all = s.Limits.InFlight }},
	}
}

// failing panics when the first status is written.
type failing struct {
	*httptest.ResponseRecorder
	failed bool
}

func (f *failing) WriteHeader(status int) {
	if !f.failed {
		f.failed = true
		panic("broken")
	}
	f.ResponseRecorder.WriteHeader(status)
}

// Every status that the description names is brought about, and its answer fits.
func TestEveryDescribedStatusHappens(t *testing.T) {
	doc, _ := description()
	for path, item := range doc.Paths.Map() {
		for method, operation := range item.Operations() {
			for status := range operation.Responses.Map() {
				t.Run(method+" "+path+" "+status, func(t *testing.T) { try(t, method, path, status) })
			}
		}
	}
}

func try(t *testing.T, method, path, status string) {
	c, ok := trials(method, path)[status]
	if !ok {
		t.Fatal("nothing brings this status about")
	}
	o := options()
	if c.options != nil {
		c.options(&o)
	}
	h := handler(t, o)
	if c.busy != nil {
		c.busy(h.(*service))
	}
	if c.method != "" {
		method = c.method
	}
	r := request(method, c.target(targets[path]), c.body, c.headers...)
	recorder := httptest.NewRecorder()
	w := http.ResponseWriter(recorder)
	if c.writer != nil {
		w = c.writer(recorder)
	}
	h.ServeHTTP(w, r)
	if got := strconv.Itoa(recorder.Code); got != status {
		t.Fatalf("%s: %.500s", got, recorder.Body)
	}
	conform(t, h, r, recorder)
}
