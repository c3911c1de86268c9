package web

import (
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"
	"time"

	"gramlaw/internal/check"
)

func TestGzip(t *testing.T) {
	h := handler(t, options())
	whole := ask(t, h, "GET", "/v1/rules/us", "").Body.Len()
	for _, c := range []struct {
		accept string
		coded  bool
	}{
		{"gzip", true}, {"GZIP", true}, {"br, gzip;q=0.5", true}, {"*", true}, {"deflate, *;q=0.1", true}, {"", false}, {"identity", false}, {"gzip;q=0", false},
		{"*, gzip;q=0", false}, {"gzip;q=0, *", false}, {"gzip;q=x", false}, {"xgzip", false},
	} {
		w := ask(t, h, "GET", "/v1/rules/us", "", "Accept-Encoding: "+c.accept)
		if coded := w.Header().Get("Content-Encoding") == "gzip"; coded != c.coded {
			t.Errorf("Accept-Encoding %q: coded %t", c.accept, coded)
		}
		if len(plain(t, w)) != whole || c.coded && w.Body.Len() > whole/4 {
			t.Errorf("Accept-Encoding %q: %d bytes of %d", c.accept, w.Body.Len(), whole)
		}
		if !strings.Contains(w.Header().Get("Vary"), "Accept-Encoding") {
			t.Errorf("Vary %q", w.Header().Get("Vary"))
		}
	}
	if w := ask(t, h, "GET", "/health", "", "Accept-Encoding: gzip"); w.Header().Get("Content-Encoding") != "" {
		t.Error("a short answer is compressed")
	}
	if w := ask(t, h, "GET", "/v1/rules/zz", "", "Accept-Encoding: gzip"); w.Header().Get("Content-Encoding") != "" {
		t.Error("a problem is compressed")
	}
}

// A tag goes with the bytes: it stays while they do, differs where they do, and counts for every coding.
func TestTags(t *testing.T) {
	h := handler(t, options())
	seen := map[string]string{}
	for _, target := range []string{
		"/v1/rules", "/v1/rules/us", "/v1/rules/us?on=2015-01-01", "/v1/rules/ca", "/v1/rules/us/changes?from=2015-01-01&to=2026-01-01", "/v1/foods?q=oats", "/v1/foods/sr:08120",
		"/schemas", "/schemas/recipe.schema.json", "/problems", "/problems/busy", "/openapi.json",
	} {
		w := ask(t, h, "GET", target, "")
		tag := w.Header().Get("ETag")
		if other, ok := seen[tag]; ok || tag == "" || w.Header().Get("Cache-Control") != "no-cache" {
			t.Errorf("%s has the tag %q, %s too; Cache-Control %q", target, tag, other, w.Header().Get("Cache-Control"))
		}
		seen[tag] = target
		for _, c := range []struct {
			sent string
			same bool
		}{{tag, true}, {strings.TrimPrefix(tag, "W/"), true}, {`"x", ` + tag, true}, {"*", true}, {`"x"`, false}, {"", false}, {"W/", false}} {
			w := ask(t, h, "GET", target, "", "If-None-Match: "+c.sent, "Accept-Encoding: gzip")
			if (w.Code == http.StatusNotModified) != c.same || c.same && (w.Body.Len() > 0 || w.Header().Get("ETag") != tag) {
				t.Errorf("%s with If-None-Match %s: %d", target, c.sent, w.Code)
			}
		}
	}
	for _, w := range []*httptest.ResponseRecorder{
		ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json", "If-None-Match: *"), ask(t, h, "GET", "/health", "", "If-None-Match: *"), ask(t, h, "GET", "/v1/rules/zz", "", "If-None-Match: *"),
	} {
		if w.Code == http.StatusNotModified || w.Header().Get("ETag") != "" || w.Header().Get("Cache-Control") != "no-store" {
			t.Errorf("%d with %v", w.Code, w.Header())
		}
	}
}

// Everything that says something about law or foods carries the caution.
func TestAnswersCarryTheCaution(t *testing.T) {
	h := handler(t, options())
	for _, target := range []string{"/v1/rules", "/v1/rules/us", "/v1/rules/eu/changes?from=2015-01-01&to=2026-01-01", "/v1/foods?q=oats", "/v1/foods?q=zzzzz", "/v1/foods/sr:08120"} {
		if w := ask(t, h, "GET", target, ""); !strings.Contains(w.Body.String(), check.Caution) {
			t.Errorf("%s has no caution", target)
		}
	}
	if w := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json"); !strings.Contains(w.Body.String(), check.Caution) {
		t.Error("a report has no caution")
	}
}

// A set that comes from a store says what is known of it.
func TestHealthTellsOfTheStore(t *testing.T) {
	o := options()
	o.Rules = Always(Rules{Book: book, Loaded: now().Add(-time.Hour), Canary: true, Read: now().Add(-time.Minute), Stale: true})
	got := ask(t, handler(t, o), "GET", "/health", "").Body.String()
	if want := `"age_seconds":3600,"canary":true,"read":"2026-12-01T08:59:00Z","stale":true`; !strings.Contains(got, want) {
		t.Errorf("%s lacks %s", got, want)
	}
}
