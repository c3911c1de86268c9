package web

import (
	"bytes"
	"compress/gzip"
	"encoding/json"
	"io"
	"net/http"
	"net/http/httptest"
	"os"
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
	return Options{Rules: Always(Rules{Book: book, Loaded: now().Add(-time.Hour)}), Now: now, Version: "test"}
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

// late is a body that does not arrive.
const late = "late"

// request makes a request; headers are "Name: value".
func request(method, target, body string, headers ...string) *http.Request {
	var in io.Reader = strings.NewReader(body)
	if body == late {
		in = tooLate{}
	}
	r := httptest.NewRequest(method, target, in)
	for _, line := range headers {
		name, value, _ := strings.Cut(line, ": ")
		r.Header.Add(name, value)
	}
	return r
}

type tooLate struct{}

func (tooLate) Read([]byte) (int, error) { return 0, os.ErrDeadlineExceeded }

// ask sends a request and holds the answer against the description.
func ask(t testing.TB, h http.Handler, method, target, body string, headers ...string) *httptest.ResponseRecorder {
	t.Helper()
	r := request(method, target, body, headers...)
	w := httptest.NewRecorder()
	h.ServeHTTP(w, r)
	conform(t, h, r, w)
	return w
}

// plain is a body without its coding.
func plain(t testing.TB, w *httptest.ResponseRecorder) string {
	t.Helper()
	if w.Header().Get("Content-Encoding") != "gzip" {
		return w.Body.String()
	}
	z, err := gzip.NewReader(bytes.NewReader(w.Body.Bytes()))
	if err != nil {
		t.Fatal(err)
	}
	b, err := io.ReadAll(z)
	if err != nil {
		t.Fatal(err)
	}
	return string(b)
}

// told is the problem of an answer.
func told(t testing.TB, w *httptest.ResponseRecorder) Problem {
	t.Helper()
	var p Problem
	if err := json.Unmarshal(w.Body.Bytes(), &p); err != nil || p.Status != w.Code {
		t.Fatalf("%d is no problem: %v, %.300s", w.Code, err, w.Body)
	}
	return p
}
