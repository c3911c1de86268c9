package web

import (
	"context"
	"encoding/json"
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"
	"time"
)

type answeredLine struct {
	Line    int
	Status  int
	Report  json.RawMessage
	Problem *Problem
}

func batch(t *testing.T, w *httptest.ResponseRecorder) []answeredLine {
	t.Helper()
	var out []answeredLine
	for one := range strings.Lines(plain(t, w)) {
		var a answeredLine
		if err := json.Unmarshal([]byte(one), &a); err != nil {
			t.Fatalf("%v: %.200s", err, one)
		}
		if (a.Report == nil) == (a.Problem == nil) || a.Problem != nil && a.Problem.Status != a.Status {
			t.Errorf("line %d has status %d, a report: %t, problem %v", a.Line, a.Status, a.Report != nil, a.Problem)
		}
		out = append(out, a)
	}
	return out
}

// A wrong line is a problem on its line, and the others go on; a line's report is the one that a check alone gives.
func TestBatch(t *testing.T) {
	h := handler(t, options())
	body := oats + "\r\n\n" + `{"recipe": ` + oats + `, "in": ["us"]}` + "\n{\n   \n" + `{"id": 1}` + "\n" + `{"recipe": ` + oats + `, "rules": "sha256:` + strings.Repeat("0", 64) + `"}` +
		"\n" + `{"id": "o", "name": "` + strings.Repeat("x", 1<<20+64<<10) + `"}` + "\n" + oats
	w := ask(t, h, "POST", "/v1/check/batch", body, "Content-Type: application/x-ndjson", "X-Request-Id: b-1")
	want := []struct{ line, status int }{{1, 200}, {3, 200}, {4, 400}, {6, 422}, {7, 409}, {8, 413}, {9, 200}}
	got := batch(t, w)
	if len(got) != len(want) || w.Code != 200 {
		t.Fatalf("%d with %d lines", w.Code, len(got))
	}
	for i, a := range got {
		if a.Line != want[i].line || a.Status != want[i].status {
			t.Errorf("line %d with %d, want %v", a.Line, a.Status, want[i])
		}
		if a.Problem != nil && a.Problem.RequestID != "b-1" {
			t.Errorf("line %d: request id %q", a.Line, a.Problem.RequestID)
		}
	}
	alone := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json").Body.String()
	if string(got[0].Report) != strings.TrimSpace(alone) || string(got[6].Report) != strings.TrimSpace(alone) {
		t.Error("a line's report is not that of a check alone")
	}
}

func TestBatchTypesAndLimits(t *testing.T) {
	o := options()
	o.Limits.BatchBody = 4000
	h := handler(t, o)
	for _, c := range []struct {
		name, body string
		headers    []string
		status     int
		kind       string
	}{
		{"ndjson", oats, []string{"Content-Type: application/x-ndjson"}, 200, typeNDJSON},
		{"jsonl", oats, []string{"Content-Type: application/jsonl"}, 200, typeJSONL},
		{"jsonl for ndjson", oats, []string{"Content-Type: application/x-ndjson", "Accept: application/jsonl"}, 200, typeJSONL},
		{"as the request where both are welcome", oats, []string{"Content-Type: application/jsonl", "Accept: application/*"}, 200, typeJSONL},
		{"json", oats, []string{"Content-Type: application/json"}, 415, typeProblem},
		{"only json accepted", oats, []string{"Content-Type: application/jsonl", "Accept: application/json"}, 406, typeProblem},
		{"gzip", oats, []string{"Content-Type: application/jsonl", "Content-Encoding: gzip"}, 415, typeProblem},
		{"100 recipes", strings.Repeat("{}\n", 100), []string{"Content-Type: application/jsonl"}, 200, typeJSONL},
		{"100 recipes and empty lines", strings.Repeat("{}\n\n \n", 100), []string{"Content-Type: application/jsonl"}, 200, typeJSONL},
		{"101 recipes", strings.Repeat("{}\n", 101), []string{"Content-Type: application/jsonl"}, 413, typeProblem},
		{"too many bytes", strings.Repeat(" ", 4001), []string{"Content-Type: application/jsonl"}, 413, typeProblem},
	} {
		t.Run(c.name, func(t *testing.T) {
			w := ask(t, h, "POST", "/v1/check/batch", c.body, c.headers...)
			if w.Code != c.status || w.Header().Get("Content-Type") != c.kind {
				t.Errorf("%d %s: %.200s", w.Code, w.Header().Get("Content-Type"), w.Body)
			}
		})
	}
	r := request("POST", "/v1/check/batch", "\n\n", "Content-Type: application/jsonl")
	w := httptest.NewRecorder()
	h.ServeHTTP(w, r)
	if w.Code != 200 || w.Body.Len() != 0 {
		t.Errorf("no recipe: %d with %d bytes", w.Code, w.Body.Len())
	}
}

// A line that breaks the service is a problem of its own.
func TestPanicStaysOnItsLine(t *testing.T) {
	o := options()
	asked := 0
	o.Now = func() time.Time {
		if asked++; asked == 3 { // the record's, the first line's, the second line's
			panic("broken")
		}
		return now()
	}
	got := batch(t, ask(t, handler(t, o), "POST", "/v1/check/batch", strings.Repeat(oats+"\n", 3), "Content-Type: application/jsonl"))
	if len(got) != 3 || got[0].Status != 200 || got[1].Status != 500 || got[2].Status != 200 {
		t.Errorf("%+v", got)
	}
}

// Each line is sent when it is judged.
func TestBatchIsStreamed(t *testing.T) {
	for _, coding := range []string{"identity", "gzip"} {
		h := handler(t, options())
		w := &flushes{ResponseRecorder: httptest.NewRecorder()}
		h.ServeHTTP(w, request("POST", "/v1/check/batch", strings.Repeat(oats+"\n", 3), "Content-Type: application/jsonl", "Accept-Encoding: "+coding))
		if len(w.sent) != 3 || w.sent[0] == 0 || w.sent[1] <= w.sent[0] || w.sent[2] <= w.sent[1] {
			t.Errorf("%s: %v bytes were sent after each line", coding, w.sent)
		}
		if len(batch(t, w.ResponseRecorder)) != 3 {
			t.Error("not all lines came")
		}
	}
}

type flushes struct {
	*httptest.ResponseRecorder
	sent []int
}

func (f *flushes) Flush() { f.sent = append(f.sent, f.Body.Len()) }

// When nobody listens any more a batch ends; when its time is over the lines that are left say so.
func TestBatchEndsWithItsContext(t *testing.T) {
	for _, c := range []struct {
		name  string
		end   func(context.Context) (context.Context, context.CancelFunc)
		lines int
	}{
		{"nobody listens", context.WithCancel, 1},
		{"the time is over", func(ctx context.Context) (context.Context, context.CancelFunc) {
			return context.WithDeadline(ctx, time.Unix(0, 0))
		}, 3},
	} {
		t.Run(c.name, func(t *testing.T) {
			ctx, cancel := c.end(context.Background())
			defer cancel()
			r := request("POST", "/v1/check/batch", strings.Repeat(oats+"\n", 3), "Content-Type: application/jsonl").WithContext(ctx)
			w := &cancelling{httptest.NewRecorder(), cancel}
			handler(t, options()).ServeHTTP(w, r)
			got := batch(t, w.ResponseRecorder)
			if len(got) != c.lines {
				t.Fatalf("%d lines", len(got))
			}
			if last := got[len(got)-1]; c.lines == 3 && (last.Status != http.StatusServiceUnavailable || last.Problem.Type != "/problems/busy") {
				t.Errorf("the last line has %d", last.Status)
			}
		})
	}
}

type cancelling struct {
	*httptest.ResponseRecorder
	cancel func()
}

func (c *cancelling) Flush() { c.cancel() }

// An answer that a door cannot carry is a problem: of the whole, or of the lines that are too much.
func TestAnswersAreBounded(t *testing.T) {
	o := options()
	o.Limits.Answer = 30_000
	h := handler(t, o)
	if w := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json"); w.Code != 413 || told(t, w).Type != "/problems/answer-too-large" {
		t.Errorf("%d", w.Code)
	}
	if w := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json", "Accept-Encoding: gzip"); w.Code != 200 {
		t.Errorf("compressed: %d", w.Code)
	}
	o.Limits.Answer, o.Limits.Report = 0, 10_000
	h = handler(t, o)
	if w := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json", "Accept-Encoding: gzip"); w.Code != 413 || told(t, w).Type != "/problems/answer-too-large" {
		t.Errorf("a long report: %d", w.Code)
	}
	if got := batch(t, ask(t, h, "POST", "/v1/check/batch", oats, "Content-Type: application/jsonl")); got[0].Status != 413 {
		t.Errorf("a long report of a line: %d", got[0].Status)
	}
	o.Limits.Answer, o.Limits.Report = 300_000, 0
	h = handler(t, o)
	w := ask(t, h, "POST", "/v1/check/batch", strings.Repeat(oats+"\n", 100), "Content-Type: application/jsonl")
	got := batch(t, w)
	if len(got) != 100 || got[0].Status != 200 || got[99].Status != 413 || w.Body.Len() > 300_000 {
		t.Errorf("%d lines, first %d, last %d, %d bytes", len(got), got[0].Status, got[len(got)-1].Status, w.Body.Len())
	}
}
