package web

import (
	"bytes"
	"context"
	"encoding/json"
	"log/slog"
	"maps"
	"net/http"
	"os"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"
)

// secret is a recipe in which every word of a text, and every amount, is found nowhere else.
const secret = `{"id": "zzqvq-recipeid", "name": "Zzqvqname Zzqvqother", "ingredients": [
	{"id": "zzqvq-one", "name": "zzqvqflour", "amount": "417.3 g", "food": "sr:20081"},
	{"id": "zzqvq-two", "name": "zzqvqfat", "amount": "91.7 g", "process": "refined", "composition": {"per": "100 g", "source": "zzqvqsupplier zzqvqspec", "components": {"FAT": "98.7 g"},
		"fatty_acids": {"basis": "percent of FAME", "profile": {"16:0": "44.17", "18:1 9c": "55.83"}}}},
	{"id": "zzqvq-three", "amount": "13.9 g", "recipe": {"ingredients": [{"id": "zzqvq-inner", "amount": "7.7 g", "food": "sr:19335", "zero_by_nature": [{"component": "FATRN", "reason": "zzqvqreason"}]}]}}],
	"yield": {"mass": "488.8 g", "explanation": "zzqvqoven"}, "package": {"net": "187.3 g"}, "serving": {"default": {"amount": "31.7 g", "measure": "zzqvqpieces"}},
	"claims": [{"text": "zzqvqclaim free of zzqvqworry"}, {"claim": "fat-low"}, {"claim": "fat-reduced", "stated": "37 %", "against": "zzqvqclassic"}],
	"reference_foods": {"zzqvqclassic": {"kind": "own regular product", "recipe": {"ingredients": [{"id": "zzqvq-ref", "amount": "53.1 g", "food": "sr:01001"}]}}}}`

// words are the texts of a document, in the pieces a log could show: names of members that are data, words, numbers.
func words(doc string) []string {
	found := regexp.MustCompile(`[a-z]*zzqvq[a-z]*|[0-9]+[.][0-9]+|sr:[0-9]{5}|[0-9]{2}:[0-9] [0-9]c|percent of FAME|own regular|refined`).FindAllString(strings.ToLower(doc), -1)
	slices.Sort(found)
	return slices.Compact(found)
}

// breaks are ways to spoil a document.
func breaks() map[string]func(string) string {
	replace := func(old, now string) func(string) string {
		return func(doc string) string { return strings.Replace(doc, old, now, 1) }
	}
	return map[string]func(string) string{
		"as it is":              func(doc string) string { return doc },
		"in an envelope":        func(doc string) string { return `{"recipe": ` + doc + `, "in": ["us"], "detail": "contributions"}` },
		"an unknown market":     func(doc string) string { return `{"recipe": ` + doc + `, "in": ["zzqvqmarket"]}` },
		"an unknown member":     replace(`"id"`, `"zzqvqmember": 1, "id"`),
		"a wrong amount":        replace("417.3 g", "417.3 zzqvqunit"),
		"an unknown food":       replace("sr:20081", "sr:99999"),
		"an unknown component":  replace(`"FAT"`, `"ZZQTAG"`),
		"an unknown acid":       replace("16:0", "zzqvq:0"),
		"an id twice":           replace("zzqvq-two", "zzqvq-one"),
		"an unknown reference":  replace(`"against": "zzqvqclassic"`, `"against": "zzqvqnone"`),
		"too much fat":          replace("98.7 g", "99.9 mg"),
		"a category":            replace(`"package"`, `"category": {"us": "zzqvqcategory"}, "package"`),
		"broken":                func(doc string) string { return doc[:len(doc)/2] },
		"followed by something": func(doc string) string { return doc + " zzqvqmore" },
		"with bad text":         replace("zzqvqoven", "zzqvq\xff"),
	}
}

// No word of a recipe, no amount and no id gets into a log or a measurement, whatever is wrong with the recipe or the service.
func TestLogsHoldNothingOfARecipe(t *testing.T) {
	var log, metrics bytes.Buffer
	o := options()
	o.Log, o.Metrics = slog.New(slog.NewJSONHandler(&log, &slog.HandlerOptions{Level: slog.LevelDebug, ReplaceAttr: timeless})), &metrics
	h := handler(t, o)
	seen := map[string]bool{}
	for name, spoil := range breaks() {
		doc := spoil(secret)
		for _, w := range []string{"zzqvq", "417.3"} {
			if !strings.Contains(doc, w) {
				t.Errorf("%s: the document has no %s to be found", name, w)
			}
		}
		line := strings.Join(strings.Fields(doc), " ")
		for _, w := range []int{
			ask(t, h, "POST", "/v1/check", doc, "Content-Type: application/json").Code,
			ask(t, h, "POST", "/v1/check/batch", line+"\n"+line, "Content-Type: application/jsonl").Code,
			ask(t, h, "POST", "/v1/check", doc, "Content-Type: text/zzqvqtype").Code,
			ask(t, h, "POST", "/v1/check", doc, "Accept: zzqvq/zzqvq").Code,
			ask(t, h, "POST", "/v1/check?zzqvqquery=417.3", doc, "Content-Type: application/json", "X-Request-Id: zzqvq\"id").Code,
			ask(t, h, "GET", "/v1/foods?q=zzqvqflour", "").Code,
			ask(t, h, "GET", "/v1/rules/zzqvqmarket", "").Code,
			ask(t, h, "GET", "/zzqvqpath/417.3", "").Code,
			ask(t, h, "ZZQ", "/v1/check", doc).Code,
		} {
			seen[http.StatusText(w)] = true
		}
	}
	panicking(t, o, secret)
	for _, status := range []int{200, 400, 404, 405, 406, 415, 422} {
		if !seen[http.StatusText(status)] {
			t.Errorf("no request was answered with %d", status)
		}
	}
	hunt(t, "the log", log.String())
	hunt(t, "the metrics", metrics.String())
	if log.Len() == 0 || metrics.Len() == 0 {
		t.Error("nothing was logged")
	}
}

// timeless leaves the time out: its digits may be those of an amount.
func timeless(_ []string, a slog.Attr) slog.Attr {
	if a.Key == slog.TimeKey {
		return slog.Attr{}
	}
	return a
}

// panicking asks a service whose clock breaks with the recipe in its words, and one whose rules do in the middle of a check.
func panicking(t *testing.T, o Options, doc string) {
	t.Helper()
	asked := 0
	o.Now = func() time.Time {
		if asked++; asked == 2 {
			panic("in the middle of " + doc)
		}
		return now()
	}
	w := ask(t, handler(t, o), "POST", "/v1/check", doc, "Content-Type: application/json")
	if w.Code != http.StatusInternalServerError {
		t.Errorf("%d after a panic", w.Code)
	}
	hunt(t, "the answer", w.Body.String())
}

func hunt(t *testing.T, where, text string) {
	t.Helper()
	for _, word := range words(secret) {
		if strings.Contains(strings.ToLower(text), word) {
			at := strings.Index(strings.ToLower(text), word)
			t.Errorf("%s holds %q: …%s…", where, word, text[max(0, at-60):min(len(text), at+60)])
		}
	}
}

func TestWordsOfTheSecret(t *testing.T) {
	for _, w := range []string{"zzqvqflour", "417.3", "sr:20081", "18:1 9c", "zzqvqclaim", "zzqvqreason", "44.17"} {
		if !slices.Contains(words(secret), w) {
			t.Errorf("%s is not looked for", w)
		}
	}
}

// lines are the lines of JSON of a log.
func lines(t *testing.T, b *bytes.Buffer) []map[string]any {
	t.Helper()
	var out []map[string]any
	d := json.NewDecoder(b)
	for d.More() {
		var line map[string]any
		if err := d.Decode(&line); err != nil {
			t.Fatal(err)
		}
		out = append(out, line)
	}
	return out
}

// What the log and the measurements say of requests.
func TestRecords(t *testing.T) {
	var log, metrics bytes.Buffer
	o := options()
	o.Log, o.Metrics = slog.New(slog.NewJSONHandler(&log, nil)), &metrics
	clock := now()
	o.Now = func() time.Time { clock = clock.Add(5 * time.Millisecond); return clock }
	h := handler(t, o)
	ask(t, h, "POST", "/v1/check", `{"recipe": {"id": "o", "ingredients": [{"id": "a", "amount": "100 g", "food": "sr:01001"}], "serving": {"default": {"amount": "30 g"}}, "reference_amount": {"default": "30 g"}, "claims": [{"claim": "fat-low"}, {"text": "smart fats"}]}, "in": ["us"], "on": "2026-12-01"}`,
		"Content-Type: application/json", "X-Request-Id: one")
	ask(t, h, "POST", "/v1/check", `{"id": 1, "x": 1, "y": 2}`, "Content-Type: application/json")
	ask(t, h, "GET", "/elsewhere", "")
	logged, measured := lines(t, &log), lines(t, &metrics)
	if len(logged) != 3 || len(measured) != 3 {
		t.Fatalf("%d and %d lines for 3 requests", len(logged), len(measured))
	}
	for _, c := range []struct {
		line map[string]any
		name string
		want any
	}{
		{logged[0], "msg", "request"}, {logged[0], "request_id", "one"}, {logged[0], "route", "/v1/check"}, {logged[0], "status", 200.0}, {logged[0], "milliseconds", 5.0},
		{logged[0], "recipes", 1.0}, {logged[0], "verdicts", map[string]any{"refused": 1.0, "unread": 1.0}}, {logged[0], "refusals", map[string]any{"us/claim/fat-low": 1.0}},
		{logged[0], "version", "test"}, {logged[0], "rules_digest", book.Digest}, {logged[0], "rules_version", book.Version},
		{logged[1], "status", 422.0}, {logged[1], "problem", "/problems/faulty-document"}, {logged[1], "faults", map[string]any{"unknown-member": 2.0, "wrong-type": 1.0, "missing-member": 1.0}},
		{logged[2], "route", "none"}, {logged[2], "faults", map[string]any{"/problems/not-found": 1.0}},
		{measured[0], "Route", "/v1/check"}, {measured[0], "Duration", 5.0}, {measured[0], "Refusals", 1.0}, {measured[0], "RefusalsByRule", map[string]any{"us/claim/fat-low": 1.0}},
		{measured[0], "Recipes", 1.0}, {measured[0], "ServerErrors", 0.0}, {measured[0], "RulesDigest", book.Digest}, {measured[0], "Version", "test"},
		{measured[1], "Faults", 4.0}, {measured[1], "FaultsByCode", map[string]any{"unknown-member": 2.0, "wrong-type": 1.0, "missing-member": 1.0}}, {measured[1], "Undetermined", nil},
		{measured[2], "Route", "none"}, {measured[2], "Status", 404.0},
	} {
		if got := c.line[c.name]; !same(got, c.want) {
			t.Errorf("%s is %v, want %v", c.name, got, c.want)
		}
	}
	// one of two claims is unread; of the lines of pure butter some are not determined
	if share, _ := measured[0]["Undetermined"].(float64); share <= 0 || share >= 100 {
		t.Errorf("Undetermined is %v", measured[0]["Undetermined"])
	}
}

func same(a, b any) bool {
	m, ok := a.(map[string]any)
	n, too := b.(map[string]any)
	if ok && too {
		return maps.Equal(m, n)
	}
	return !ok && !too && a == b
}

// Every line of measurements is in the embedded metric format: what a directive names stands at the root, and dimensions are few.
func TestMeasurementsAreInTheirFormat(t *testing.T) {
	var metrics bytes.Buffer
	o := options()
	o.Metrics = &metrics
	h := handler(t, o)
	for _, target := range targets {
		ask(t, h, "GET", target, "")
	}
	for _, line := range lines(t, &metrics) {
		aws := line["_aws"].(map[string]any)
		if aws["Timestamp"] != float64(now().UnixMilli()) {
			t.Errorf("Timestamp %v", aws["Timestamp"])
		}
		directive := aws["CloudWatchMetrics"].([]any)[0].(map[string]any)
		if directive["Namespace"] != "Gramlaw" {
			t.Errorf("Namespace %v", directive["Namespace"])
		}
		if b, _ := json.Marshal(directive["Dimensions"]); string(b) != `[[],["Route"]]` {
			t.Errorf("Dimensions %s", b)
		}
		for _, m := range directive["Metrics"].([]any) {
			name := m.(map[string]any)["Name"].(string)
			if _, ok := line[name].(float64); !ok {
				t.Errorf("%s is no number: %v", name, line[name])
			}
		}
		if _, ok := targets[line["Route"].(string)]; !ok {
			t.Errorf("Route %v", line["Route"])
		}
	}
}

// The promise names every metric and property that is written.
func TestMeasurementsAreDocumented(t *testing.T) {
	page, err := os.ReadFile("../../schemas/API.md")
	if err != nil {
		t.Fatal(err)
	}
	var metrics bytes.Buffer
	o := options()
	o.Metrics = &metrics
	ask(t, handler(t, o), "POST", "/v1/check", oats, "Content-Type: application/json")
	for name := range lines(t, &metrics)[0] {
		if name != "_aws" && !regexp.MustCompile(`(?m)^\|[^|]*\b`+name+`\b|`+"`"+name+"`").Match(page) {
			t.Errorf("%s is not described", name)
		}
	}
}

// A panic is told by the place where it came up, under the request's id.
func TestPanicsAreTold(t *testing.T) {
	var log bytes.Buffer
	o := options()
	o.Log = slog.New(slog.NewJSONHandler(&log, nil))
	asked := 0
	o.Now = func() time.Time {
		if asked++; asked == 2 {
			return time.Time{}.Add(time.Duration([]int{}[asked]))
		}
		return now()
	}
	w := ask(t, handler(t, o), "POST", "/v1/check", oats, "Content-Type: application/json", "X-Request-Id: broken-1")
	if p := told(t, w); w.Code != 500 || p.RequestID != "broken-1" || p.Type != "/problems/internal" {
		t.Errorf("%d %+v", w.Code, p)
	}
	first := lines(t, &log)[0]
	if first["msg"] != "panic" || first["request_id"] != "broken-1" || !strings.Contains(first["cause"].(string), "index out of range") {
		t.Errorf("%v", first)
	}
	if at, _ := json.Marshal(first["at"]); !strings.Contains(string(at), "TestPanicsAreTold") || !strings.Contains(string(at), "web.(*exchange).today") {
		t.Errorf("at %s", at)
	}
}

// Rules that cannot be had are the service's fault, and told.
func TestRulesThatBreak(t *testing.T) {
	for name, rules := range map[string]func(context.Context, string) Rules{
		"a panic": func(context.Context, string) Rules { panic("no bucket") }, "none": func(context.Context, string) Rules { return Rules{} },
	} {
		var log, metrics bytes.Buffer
		o := options()
		o.Rules, o.Log, o.Metrics = rules, slog.New(slog.NewJSONHandler(&log, nil)), &metrics
		w := ask(t, handler(t, o), "POST", "/v1/check", oats, "Content-Type: application/json")
		if w.Code != http.StatusInternalServerError || told(t, w).RequestID == "" || len(lines(t, &log)) != 2 || lines(t, &metrics)[0]["Panics"] != 1.0 {
			t.Errorf("%s: %d", name, w.Code)
		}
	}
}
