package web

import (
	"net/http"
	"net/http/httptest"
	"net/url"
	"regexp"
	"strings"
	"testing"

	"gramlaw/internal/recipe"
)

func TestRequestIDs(t *testing.T) {
	h := handler(t, options())
	made := regexp.MustCompile(`^[a-z2-7]{26}$`)
	for _, c := range []struct {
		name, sent string
		taken      bool
	}{
		{"plain", "Job-17_a.b", true},
		{"of a gateway", "JKJaX+Pv/cESHA=", true},
		{"none", "", false},
		{"64 long", strings.Repeat("a", 64), true},
		{"65 long", strings.Repeat("a", 65), false},
		{"a line feed", "a\nb", false},
		{"a space", "a b", false},
		{"a quotation mark", `a"b`, false},
		{"beyond ASCII", "ä", false},
	} {
		t.Run(c.name, func(t *testing.T) {
			r := request("GET", "/nothing", "")
			r.Header["X-Request-Id"] = []string{c.sent}
			w := httptest.NewRecorder()
			h.ServeHTTP(w, r)
			got := w.Header().Get("X-Request-Id")
			if c.taken && got != c.sent || !c.taken && !made.MatchString(got) {
				t.Errorf("id %q", got)
			}
			if p := told(t, w); p.RequestID != got {
				t.Errorf("the problem has %q, the header %q", p.RequestID, got)
			}
		})
	}
	if a, b := ask(t, h, "GET", "/health", ""), ask(t, h, "GET", "/health", ""); a.Header().Get("X-Request-Id") == b.Header().Get("X-Request-Id") {
		t.Error("two requests have the same id")
	}
}

// A path has one spelling; every other is nowhere, and nothing is redirected.
func TestPathsHaveOneSpelling(t *testing.T) {
	h := handler(t, options())
	for _, path := range []string{
		"/v1/rules/", "/v1//rules", "//v1/rules", "/v1/./rules", "/v1/../v1/rules", "/v1/rules/..", "/v1/%2e%2e/rules", "/v1/rules/%2E%2E", "/v1%2Frules", "/v1/rules%2fus",
		"/schemas/../openapi.json", "/schemas/%2e%2e/openapi.json", "/schemas/..%2fembed.go", "/schemas/embed.go", "/schemas/", "/v1/rules/us/", "/v1/rules/us%00", "/v1/rules/us%0a",
		`/v1\rules`, "/v1/rules/%5c", "/health/", "/HEALTH", "/v1/rules/US", "/v1/rules/practice", "/openapi.json%20", "/v1/foods/sr:08120/..", "/", "/v1", "/v2/check", "/favicon.ico",
		"/.git/config", "/v1/rules/%ff", "/v1/foods/sr%3A99999", "/v1/rules/us;x=1", "/schemas/recipe.schema.json%3f",
	} {
		t.Run(path, func(t *testing.T) {
			u, err := url.ParseRequestURI(strings.ReplaceAll(path, `\`, "%5C"))
			if err != nil {
				t.Fatal(err)
			}
			r := request("GET", "/", "")
			r.URL, r.RequestURI = u, path
			w := httptest.NewRecorder()
			h.ServeHTTP(w, r)
			if w.Code != http.StatusNotFound {
				t.Errorf("%d", w.Code)
			}
			told(t, w)
		})
	}
	for _, path := range []string{"/v1/foods/sr:08120", "/v1/foods/sr%3A08120", "/v1/r%75les"} {
		if w := ask(t, h, "GET", path, ""); w.Code != http.StatusOK {
			t.Errorf("%s: %d", path, w.Code)
		}
	}
}

func TestMethods(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct{ method, path, allow string }{
		{"GET", "/v1/check", "POST"}, {"HEAD", "/v1/check", "POST"}, {"OPTIONS", "/v1/check", "POST"}, {"PUT", "/v1/check/batch", "POST"}, {"POST", "/health", "GET, HEAD"},
		{"DELETE", "/v1/rules/us", "GET, HEAD"}, {"TRACE", "/v1/foods", "GET, HEAD"}, {"CONNECT", "/health", "GET, HEAD"}, {"BREW", "/schemas", "GET, HEAD"}, {"post", "/v1/check", "POST"},
	} {
		w := ask(t, h, c.method, c.path, "")
		if w.Code != http.StatusMethodNotAllowed || w.Header().Get("Allow") != c.allow {
			t.Errorf("%s %s: %d, Allow %q", c.method, c.path, w.Code, w.Header().Get("Allow"))
		}
	}
}

func TestHeadIsGetWithoutBody(t *testing.T) {
	h := handler(t, options())
	for _, target := range targets {
		get := ask(t, h, "GET", target, "")
		head := ask(t, h, "HEAD", target, "")
		if head.Body.Len() != 0 || head.Code != get.Code || head.Header().Get("Content-Length") != get.Header().Get("Content-Length") || head.Header().Get("ETag") != get.Header().Get("ETag") {
			t.Errorf("%s: GET %d with %v, HEAD %d with %v", target, get.Code, get.Header(), head.Code, head.Header())
		}
	}
}

// Every answer forbids guessing its type, and none is for other sites' pages.
func TestHeadersOfEveryAnswer(t *testing.T) {
	h := handler(t, options())
	for _, target := range []string{"/health", "/v1/rules", "/v1/check", "/nothing", "/v1/rules/zz", "/v1/foods"} {
		w := ask(t, h, "GET", target, "", "Origin: https://example.com", "Access-Control-Request-Method: POST")
		for name, want := range map[string]string{
			"X-Content-Type-Options": "nosniff", "Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'", "Referrer-Policy": "no-referrer",
			"Access-Control-Allow-Origin": "", "Access-Control-Allow-Methods": "", "Location": "", "Set-Cookie": "",
		} {
			if got := w.Header().Get(name); got != want {
				t.Errorf("%s: %s is %q", target, name, got)
			}
		}
	}
	w := ask(t, h, "OPTIONS", "/v1/check", "", "Origin: https://example.com", "Access-Control-Request-Method: POST")
	if w.Code < 400 || w.Header().Get("Access-Control-Allow-Origin") != "" {
		t.Errorf("a page of another site may send recipes: %d %v", w.Code, w.Header())
	}
}

func TestMediaTypesOfBodies(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct {
		name    string
		headers []string
		status  int
	}{
		{"json", []string{"Content-Type: application/json"}, 200},
		{"with its charset", []string{"Content-Type: application/json; charset=UTF-8"}, 200},
		{"in capitals", []string{"Content-Type: Application/JSON"}, 200},
		{"identity", []string{"Content-Type: application/json", "Content-Encoding: identity"}, 200},
		{"none", nil, 415},
		{"a form", []string{"Content-Type: application/x-www-form-urlencoded"}, 415},
		{"what a page may send unasked", []string{"Content-Type: text/plain"}, 415},
		{"another charset", []string{"Content-Type: application/json; charset=utf-16"}, 415},
		{"lines", []string{"Content-Type: application/x-ndjson"}, 415},
		{"two at once", []string{"Content-Type: application/json, text/plain"}, 415},
		{"broken", []string{"Content-Type: application/json; ="}, 415},
		{"gzip", []string{"Content-Type: application/json", "Content-Encoding: gzip"}, 415},
		{"coded twice", []string{"Content-Type: application/json", "Content-Encoding: identity, gzip"}, 415},
	} {
		t.Run(c.name, func(t *testing.T) {
			w := ask(t, h, "POST", "/v1/check", oats, c.headers...)
			if w.Code != c.status {
				t.Errorf("%d: %.200s", w.Code, w.Body)
			}
			if w.Code == 415 && w.Header().Get("Accept") != typeJSON {
				t.Errorf("Accept is %q", w.Header().Get("Accept"))
			}
		})
	}
}

func TestAcceptableAnswers(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct {
		accept, target string
		status         int
		kind           string
	}{
		{"", "/health", 200, typeJSON},
		{"*/*", "/health", 200, typeJSON},
		{"application/*", "/health", 200, typeJSON},
		{"text/html, application/json;q=0.1", "/health", 200, typeJSON},
		{"text/html, */*;q=0.01", "/health", 200, typeJSON},
		{"text/html", "/health", 406, typeProblem},
		{"application/json;q=0", "/health", 406, typeProblem},
		{"*/*, application/json;q=0", "/health", 406, typeProblem},
		{"application/json;q=2", "/health", 406, typeProblem},
		{"application/json;q=NaN", "/health", 406, typeProblem},
		{";;;,,,", "/health", 406, typeProblem},
		{"application/problem+json", "/nothing", 404, typeProblem},
		{"", "/schemas/recipe.schema.json", 200, typeSchema},
		{"application/json", "/schemas/recipe.schema.json", 200, typeJSON},
		{"application/json;q=0.5, application/schema+json;q=0.4", "/schemas/recipe.schema.json", 200, typeJSON},
		{"application/schema+json", "/v1/rules", 406, typeProblem},
	} {
		t.Run(c.accept+" "+c.target, func(t *testing.T) {
			w := ask(t, h, "GET", c.target, "", "Accept: "+c.accept)
			if w.Code != c.status || w.Header().Get("Content-Type") != c.kind {
				t.Errorf("%d %s", w.Code, w.Header().Get("Content-Type"))
			}
		})
	}
}

func TestQueries(t *testing.T) {
	h := handler(t, options())
	for _, c := range []struct {
		target    string
		status    int
		parameter string
		code      string
	}{
		{"/v1/foods?q=oats", 200, "", ""},
		{"/v1/foods?q=oats&limit=1", 200, "", ""},
		{"/v1/foods?q=" + strings.Repeat("a", 200), 200, "", ""},
		{"/v1/foods?q=" + strings.Repeat("a", 201), 400, "q", recipe.TooMany},
		{"/v1/foods", 400, "q", "missing-parameter"},
		{"/v1/foods?q=+", 400, "q", "missing-parameter"},
		{"/v1/foods?q=oats&limit=0", 400, "limit", "out-of-range"},
		{"/v1/foods?q=oats&limit=101", 400, "limit", "out-of-range"},
		{"/v1/foods?q=oats&limit=1e1", 400, "limit", "out-of-range"},
		{"/v1/foods?q=oats&q=rye", 400, "q", "repeated-parameter"},
		{"/v1/foods?q=oats&Q=rye", 400, "Q", "unknown-parameter"},
		{"/v1/foods?q=oats;limit=1", 400, "", "bad-query"},
		{"/v1/foods?q=%zz", 400, "", "bad-query"},
		{"/v1/foods?q=%ff", 400, "", "bad-query"},
		{"/v1/rules/us?on=2026-02-30", 400, "on", "not-a-date"},
		{"/v1/rules/us?on=", 400, "on", "not-a-date"},
		{"/v1/rules/us?transition=soon", 400, "transition", "unknown-transition"},
		{"/v1/rules/us/changes?to=2026-01-01", 400, "from", "missing-parameter"},
		{"/v1/rules/us/changes?from=2026-01-02&to=2026-01-01", 400, "to", "range-reversed"},
		{"/v1/rules/us/changes?from=2026-01-01&to=2026-01-01", 200, "", ""},
		{"/health?verbose", 400, "verbose", "unknown-parameter"},
		{"/schemas/recipe.schema.json?x=1", 400, "x", "unknown-parameter"},
		{"/health?" + strings.Repeat("a&", 1000), 400, "a", "unknown-parameter"},
		{"/health?" + strings.Repeat("a", 2049), 414, "", ""},
		{"/health?" + strings.Repeat("a&", 50000), 414, "", ""},
	} {
		t.Run(c.target[:min(len(c.target), 60)], func(t *testing.T) {
			w := ask(t, h, "GET", c.target, "")
			if w.Code != c.status {
				t.Fatalf("%d: %.300s", w.Code, w.Body)
			}
			if c.code == "" {
				return
			}
			if p := told(t, w); len(p.Faults) == 0 || p.Faults[0].Parameter != c.parameter || p.Faults[0].Code != c.code {
				t.Errorf("%+v", p.Faults)
			}
		})
	}
	w := ask(t, h, "GET", "/v1/rules/us/changes?from=x&to=y&transition=z&nonsense=1", "")
	if p := told(t, w); len(p.Faults) != 1 { // an unknown parameter may be a misspelt one: it is told first
		t.Errorf("%+v", p.Faults)
	}
	w = ask(t, h, "GET", "/v1/rules/us/changes?from=x&to=y&transition=z", "")
	if p := told(t, w); len(p.Faults) != 3 {
		t.Errorf("not all faults at once: %+v", p.Faults)
	}
}

func TestBodiesAreBounded(t *testing.T) {
	h := handler(t, options())
	over := strings.Repeat(" ", 1<<20+64<<10+1)
	for _, c := range []struct {
		name, body string
		length     int64 // stated; -1 is none
		status     int
	}{
		{"stated too long", over, int64(len(over)), 413},
		{"too long, and not stated", over, -1, 413},
		{"a recipe of over 1 MiB", strings.Repeat(" ", 1<<20) + oats, -1, 413},
		{"empty", "", 0, 400},
	} {
		t.Run(c.name, func(t *testing.T) {
			r := request("POST", "/v1/check", c.body, "Content-Type: application/json")
			r.ContentLength = c.length
			w := httptest.NewRecorder()
			h.ServeHTTP(w, r)
			if conform(t, h, r, w); w.Code != c.status {
				t.Errorf("%d: %.300s", w.Code, w.Body)
			}
		})
	}
}

// What a text of the request says is cut where an answer repeats it.
func TestAnswersRepeatLittle(t *testing.T) {
	h := handler(t, options())
	long := strings.Repeat("x", 500)
	for _, w := range []*httptest.ResponseRecorder{
		ask(t, h, "GET", "/v1/rules/"+long, ""), ask(t, h, "GET", "/v1/foods/"+long, ""), ask(t, h, "GET", "/health?"+long+"=1", ""),
		ask(t, h, "POST", "/v1/check", `{"recipe": `+oats+`, "`+long+`": 1}`, "Content-Type: application/json"),
		ask(t, h, "GET", "/health", "", "Accept: "+long+"/"+long), ask(t, h, "POST", "/v1/check", oats, "Content-Type: "+long+"/"+long),
	} {
		// a pointer names its member whole; a message does not
		for _, says := range append(sentences(told(t, w)), w.Result().Status) {
			if strings.Contains(says, long[:100]) {
				t.Errorf("%d repeats it: %.300s", w.Code, says)
			}
		}
	}
}

func sentences(p Problem) []string {
	out := []string{p.Detail, p.Title}
	for _, f := range p.Faults {
		out = append(out, f.Says, f.Parameter)
	}
	return out
}

// The page of a problem's type exists and tells the same.
func TestProblemsAreDocumented(t *testing.T) {
	h := handler(t, options())
	for _, k := range kinds() {
		w := ask(t, h, "GET", "/problems/"+k.Name, "")
		if w.Code != http.StatusOK || !strings.Contains(w.Body.String(), `"type":"/problems/`+k.Name+`"`) || k.Says == "" || k.Status < 400 {
			t.Errorf("%s: %d %s", k.Name, w.Code, w.Body)
		}
	}
	list := ask(t, h, "GET", "/problems", "").Body.String()
	for _, c := range []string{recipe.BadAmount, "unknown-market", "too-fine", "unknown-parameter"} {
		if strings.Count(list, `{"code":"`+c+`"`) != 1 {
			t.Errorf("%s does not stand in the list once", c)
		}
	}
}

func TestDoorsCanRefuse(t *testing.T) {
	for name, status := range map[string]int{"unauthorized": 401, "answer-too-large": 413, "bad-request": 400, "internal": 500, "no such kind": 500} {
		w := httptest.NewRecorder()
		Refuse(w, request("POST", "/v1/check", oats, "X-Request-Id: door-1"), name, "The door says so.")
		p := told(t, w)
		if w.Code != status || p.RequestID != "door-1" || w.Header().Get("X-Request-Id") != "door-1" || w.Header().Get("X-Content-Type-Options") != "nosniff" || p.Detail != "The door says so." {
			t.Errorf("%s: %d %+v", name, w.Code, p)
		}
		if challenge := w.Header().Get("WWW-Authenticate"); (challenge != "") != (status == 401) {
			t.Errorf("%s: WWW-Authenticate %q", name, challenge)
		}
	}
}
