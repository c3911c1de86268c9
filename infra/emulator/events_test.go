//go:build deployment

package emulator

import (
	"bytes"
	"cmp"
	"compress/gzip"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"strings"
	"testing"
)

// A reply is what both kinds of events are answered with: payload format 2.0, or the document itself.
type reply struct {
	Status  int               `json:"statusCode"`
	Headers map[string]string `json:"headers"`
	Body    string            `json:"body"`
	Base64  bool              `json:"isBase64Encoded"`
}

// A document is what we read of reports and problems.
type document struct {
	Type      string                     `json:"type"`
	Status    int                        `json:"status"`
	RequestID string                     `json:"request_id"`
	Faults    []struct{ Code string }    `json:"faults"`
	Markets   []struct{ Caution string } `json:"jurisdictions"`
}

func event(t testing.TB, name string) []byte {
	t.Helper()
	b, err := os.ReadFile("../events/" + name + ".json")
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// open reads a reply and its body, through base64 and gzip.
func open(t testing.TB, out []byte) (reply, []byte) {
	t.Helper()
	var r reply
	if err := json.Unmarshal(out, &r); err != nil {
		t.Fatalf("%v: %.300s", err, out)
	}
	body := []byte(r.Body)
	if r.Base64 {
		var err error
		if body, err = base64.StdEncoding.DecodeString(r.Body); err != nil {
			t.Fatal(err)
		}
	}
	if r.Headers["Content-Encoding"] == "gzip" {
		z, err := gzip.NewReader(bytes.NewReader(body))
		if err != nil {
			t.Fatal(err)
		}
		if body, err = io.ReadAll(z); err != nil {
			t.Fatal(err)
		}
	}
	return r, body
}

func parse(t testing.TB, body []byte) document {
	t.Helper()
	var d document
	if err := json.Unmarshal(body, &d); err != nil {
		t.Fatalf("%v: %.300s", err, body)
	}
	return d
}

// One environment answers all kinds of events, one after the other.
func TestEvents(t *testing.T) {
	f := start(t, "check")
	for _, c := range []struct {
		event  string
		status int
		body   string // a part of it
	}{
		{"http-check", 200, `"caution":"`},
		{"http-check-stage-base64", 200, `"caution":"`},
		{"url-check-gzip", 200, `"caution":"`},
		{"http-check-faulty", 422, `"pointer":"/ingredients/0"`},
		{"http-check-not-json", 400, `"type":"/problems/not-json"`},
		{"http-check-unauthorised", 401, `"type":"/problems/unauthorized"`},
		{"http-foods", 200, `live oil`},
		{"http-health", 200, `"rules"`},
		{"http-unknown-path", 404, `"type":"/problems/not-found"`},
	} {
		t.Run(c.event, func(t *testing.T) {
			f.t = t
			r, body := open(t, f.invoke(event(t, c.event)))
			if r.Status != c.status || !strings.Contains(string(body), c.body) {
				t.Errorf("%d %v %.400s", r.Status, r.Headers, body)
			}
			if c.status >= 400 {
				if d := parse(t, body); d.Status != c.status || d.RequestID != r.Headers["X-Request-Id"] || r.Headers["Content-Type"] != "application/problem+json" {
					t.Errorf("problem %+v, headers %v", d, r.Headers)
				}
			}
			var sent struct{ RequestContext struct{ RequestID string } }
			if err := json.Unmarshal(event(t, c.event), &sent); err != nil || r.Headers["X-Request-Id"] != sent.RequestContext.RequestID {
				t.Errorf("the request %v is answered as %v, %v", sent, r.Headers["X-Request-Id"], err)
			}
			if gzipped := strings.Contains(c.event, "gzip"); r.Base64 != gzipped {
				t.Errorf("base64 is %v, %v", r.Base64, r.Headers)
			}
		})
	}
	f.t = t
	_, sent := open(t, f.invoke(event(t, "http-check")))
	direct := f.invoke(event(t, "direct-check"))
	if d := parse(t, direct); len(d.Markets) != 3 || d.Markets[0].Caution == "" {
		t.Errorf("direct: %.400s", direct)
	}
	// The recipe's digest is of the document as sent, and the two are written differently; all else is equal.
	if plain(t, sent) != plain(t, direct) {
		t.Error("the same recipe gets two reports")
	}
	d := parse(t, f.invoke(event(t, "direct-check-faulty")))
	if d.Type != "/problems/faulty-document" || d.Status != 422 || len(d.Faults) == 0 {
		t.Errorf("direct, faulty: %+v", d)
	}
}

func plain(t testing.TB, report []byte) string {
	t.Helper()
	var m map[string]any
	if err := json.Unmarshal(report, &m); err != nil {
		t.Fatal(err)
	}
	delete(m["recipe"].(map[string]any), "digest")
	return fmt.Sprint(m)
}

// padded is the HTTP event with a body of n bytes: the recipe in its envelope with white space after it.
func padded(t testing.TB, n int) []byte {
	t.Helper()
	var e map[string]any
	if err := json.Unmarshal(event(t, "http-check"), &e); err != nil {
		t.Fatal(err)
	}
	body := e["body"].(string)
	e["body"] = body + strings.Repeat(" ", n-len(body))
	out, err := json.Marshal(e)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// What is too large is told so, whatever its size; the limits are those of the service, below those of Lambda.
func TestLargeEvents(t *testing.T) {
	f := start(t, "check")
	const most = 1<<20 + 64<<10
	for name, c := range map[string]struct{ size, status int }{
		"1 MiB":                 {1 << 20, 200},
		"the most that is read": {most, 200},
		"one byte more":         {most + 1, 413},
		"2 MiB":                 {2 << 20, 413},
		"just under 6 MB":       {6<<20 - 4096, 413},
	} {
		t.Run(name, func(t *testing.T) {
			f.t = t
			r, body := open(t, f.invoke(padded(t, c.size)))
			if r.Status != c.status {
				t.Errorf("%d %.300s", r.Status, body)
			}
			if c.status == 413 && parse(t, body).Type != "/problems/too-large" {
				t.Errorf("%.300s", body)
			}
		})
	}
	f.t = t
	f.program() // it still runs
}

// many asks for the contributions of n ingredients, each with a specification of its own, to every line of every market.
func many(n int) []byte {
	tags := []string{"ENERC", "FAT", "FASAT", "FATRN", "CHOLE", "NA", "CHOCDF", "FIBTG", "SUGAR", "SUGAD", "PROCNT", "VITD", "CA", "FE", "K"}
	units := map[string]string{"ENERC": "kcal", "CHOLE": "mg", "NA": "mg", "VITD": "ug", "CA": "mg", "FE": "mg", "K": "mg"}
	var components []string
	for _, tag := range tags[1:] {
		components = append(components, fmt.Sprintf("%q:\"0.%s %s\"", tag, "123456789"[:1+len(components)%9], cmp.Or(units[tag], "g")))
	}
	var b strings.Builder
	b.WriteString(`{"detail":"contributions","on":"2026-12-01","recipe":{"id":"many","name":"Many","ingredients":[`)
	for i := range n {
		fmt.Fprintf(&b, `%s{"id":"ingredient-%080d","name":"n","amount":"1 g","composition":{"per":"100 g","source":"invented","components":{%s}}}`,
			map[bool]string{true: ","}[i > 0], i, strings.Join(components, ","))
	}
	b.WriteString(`]}}`)
	return []byte(b.String())
}

// An answer that Lambda would not carry becomes a problem; the function never answers more.
func TestLargeAnswers(t *testing.T) {
	f := start(t, "check")
	for n, large := range map[int]bool{100: false, 2000: true} {
		out := f.invoke(many(n))
		if d := parse(t, out); (d.Type == "/problems/answer-too-large") != large || (len(d.Markets) > 0) == large {
			t.Errorf("%d ingredients: %d bytes, %.300s", n, len(out), out)
		}
	}
}

// A hundred in a row: one process, the same bytes, and no growth once it is warm.
func TestHundredInARow(t *testing.T) {
	f := start(t, "check")
	first := f.invoke(event(t, "direct-check"))
	pid, _ := f.program()
	var warm int
	for i := range 100 {
		if out := f.invoke(event(t, "direct-check")); !bytes.Equal(out, first) {
			t.Fatalf("the answer number %d differs from the first", i+2)
		}
		if i == 49 {
			_, warm = f.program()
		}
	}
	again, resident := f.program()
	t.Logf("resident after 50: %d KiB, after 100: %d KiB", warm, resident)
	if again != pid {
		t.Errorf("process %s became %s", pid, again)
	}
	if most := warm + 64<<10; resident > most {
		t.Errorf("resident memory grew from %d KiB to %d KiB", warm, resident)
	}
}

// A panic is answered, tells nothing of its value, and leaves the process running.
func TestPanic(t *testing.T) {
	f := start(t, "broken")
	health := event(t, "http-health")
	r, body := open(t, f.invoke(health))
	pid, _ := f.program()
	if r.Status != 200 || string(body) != "well" {
		t.Fatalf("%d %s", r.Status, body)
	}
	r, body = open(t, f.invoke(event(t, "http-check")))
	if r.Status != 500 || parse(t, body).Type != "/problems/internal" {
		t.Errorf("%d %s", r.Status, body)
	}
	if out := f.invoke(event(t, "direct-check")); parse(t, out).Type != "/problems/internal" {
		t.Errorf("direct: %s", out)
	}
	if r, _ := open(t, f.invoke(health)); r.Status != 200 {
		t.Errorf("afterwards %d", r.Status)
	}
	if again, _ := f.program(); again != pid {
		t.Errorf("process %s became %s", pid, again)
	}
	if log := f.log(); strings.Contains(log, "secret") || !strings.Contains(log, `"msg":"panic"`) {
		t.Errorf("log: %s", log)
	}
}

// Logs hold no part of a recipe, whether it was good or bad.
func TestLogsKeepTheRecipe(t *testing.T) {
	f := start(t, "check")
	for _, name := range []string{"http-check", "http-check-faulty", "http-check-not-json", "direct-check", "direct-check-faulty", "url-check-gzip"} {
		f.invoke(event(t, name))
	}
	log := f.log()
	for _, word := range []string{"oat", "Oat", "baking", "No amount", "tomorrow", "Bearer", "192.0.2.17"} {
		if strings.Contains(log, word) {
			t.Errorf("the log has %q:\n%s", word, log)
		}
	}
	if !strings.Contains(log, `"request_id":"`) || !strings.Contains(log, `"_aws"`) {
		t.Errorf("the log lacks requests or metrics:\n%s", log)
	}
}
