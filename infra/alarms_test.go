package infra

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/web"
	"gramlaw/rules"
)

// observed is what the service wrote.
type observed struct{ metrics bytes.Buffer }

// observe lets the service answer well and with a panic.
func observe(t *testing.T) *observed {
	t.Helper()
	book, err := rulebook.Load(rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	recipe, err := os.ReadFile("../testdata/recipes/oat-biscuit.json")
	if err != nil {
		t.Fatal(err)
	}
	out := &observed{}
	h, err := web.New(web.Options{Rules: web.Always(web.Rules{Book: book}), Now: time.Now, Metrics: &out.metrics})
	if err != nil {
		t.Fatal(err)
	}
	for _, body := range []io.Reader{bytes.NewReader(recipe), broken{}} {
		r := httptest.NewRequest(http.MethodPost, "/v1/check", body)
		r.Header.Set("Content-Type", "application/json")
		h.ServeHTTP(httptest.NewRecorder(), r)
	}
	return out
}

// broken is a body that makes the service panic.
type broken struct{}

func (broken) Read([]byte) (int, error) { panic("broken") }

// Alarms look at metrics that somebody writes: the platform or the service.
func TestAlarmsHaveMetrics(t *testing.T) {
	tpl, seen := load(t, "template.yaml"), observe(t)
	platform := map[string][]string{ // Reference: Lambda developer guide, "Types of metrics for Lambda functions"; API Gateway developer guide, "Monitor CloudWatch metrics for HTTP APIs"
		"AWS/Lambda":     {"Errors", "Throttles", "Duration", "Invocations", "ConcurrentExecutions"},
		"AWS/ApiGateway": {"4xx", "5xx", "Count", "Latency", "IntegrationLatency", "DataProcessed"},
	}
	filtered := filtered(t, tpl)
	for _, name := range tpl.ofType("AWS::CloudWatch::Alarm") {
		p := tpl.Resources[name].Properties
		namespace, metric := p["Namespace"], text(p["MetricName"])
		if !slices.Contains(platform[text(namespace)], metric) && !seen.measured(t, p) && !filtered[text(namespace)+" "+metric] {
			t.Errorf("%s: nobody writes %v %s with %v", name, namespace, metric, p["Dimensions"])
		}
	}
}

var message = regexp.MustCompile(`^\{ \$\.msg = ("[^"]+") \}$`)

// filtered lists the metrics made of log lines, whose message must be one that the function writes.
func filtered(t *testing.T, tpl *template) map[string]bool {
	t.Helper()
	sources, err := filepath.Glob("../functions/check/*.go")
	if err != nil {
		t.Fatal(err)
	}
	var program []byte
	for _, name := range sources {
		b, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		program = append(program, b...)
	}
	out := map[string]bool{}
	for _, name := range tpl.ofType("AWS::Logs::MetricFilter") {
		p := tpl.Resources[name].Properties
		if m := message.FindStringSubmatch(text(p["FilterPattern"])); m == nil || !bytes.Contains(program, []byte("log.Error("+m[1])) {
			t.Errorf("%s: the function writes nothing that fits %v", name, p["FilterPattern"])
		}
		for _, one := range list(p["MetricTransformations"]) {
			out[text(object(one)["MetricNamespace"])+" "+text(object(one)["MetricName"])] = true
		}
	}
	return out
}

// measured tells whether the service writes the alarm's metric under exactly its dimensions.
func (o *observed) measured(t *testing.T, alarm map[string]any) bool {
	t.Helper()
	for line := range strings.Lines(o.metrics.String()) {
		var said map[string]any
		if err := json.Unmarshal([]byte(line), &said); err != nil {
			t.Fatal(err)
		}
		for _, d := range list(object(said["_aws"])["CloudWatchMetrics"]) {
			named := slices.ContainsFunc(list(object(d)["Metrics"]), func(m any) bool { return object(m)["Name"] == alarm["MetricName"] })
			if object(d)["Namespace"] == alarm["Namespace"] && named && under(object(d), said, list(alarm["Dimensions"])) {
				return true
			}
		}
	}
	return false
}

// under tells whether one of the directive's sets of dimensions is the wanted one, values included.
func under(directive, said map[string]any, want []any) bool {
	return slices.ContainsFunc(list(directive["Dimensions"]), func(set any) bool {
		names := list(set)
		fits := len(names) == len(want)
		for _, w := range want {
			fits = fits && slices.Contains(names, object(w)["Name"]) && said[text(object(w)["Name"])] == object(w)["Value"]
		}
		return fits
	})
}

// Every alarm tells somebody, stands in the runbook, and those of a deployment exist.
func TestAlarmsAreHeard(t *testing.T) {
	tpl := load(t, "template.yaml")
	runbook, err := os.ReadFile("RUNBOOK.md")
	if err != nil {
		t.Fatal(err)
	}
	alarms := tpl.ofType("AWS::CloudWatch::Alarm")
	for _, name := range alarms {
		p := tpl.Resources[name].Properties
		if !strings.Contains(string(runbook), "\n### "+name+"\n") {
			t.Errorf("RUNBOOK.md has no section %s", name)
		}
		if !strings.Contains(text(p["AlarmDescription"]), "See "+name+" in infra/RUNBOOK.md") || fmt.Sprint(p["AlarmActions"]) != "[map[Ref:AlarmTopic]]" {
			t.Errorf("%s: %v, %v", name, p["AlarmDescription"], p["AlarmActions"])
		}
	}
	for _, m := range regexp.MustCompile(`(?m)^### (\w+)$`).FindAllSubmatch(runbook, -1) {
		if !slices.Contains(alarms, string(m[1])) {
			t.Errorf("RUNBOOK.md tells of %s, which is no alarm", m[1])
		}
	}
	for _, f := range tpl.ofType("AWS::Serverless::Function") {
		p := tpl.Resources[f].Properties
		deployment := object(p["DeploymentPreference"])
		if text(p["AutoPublishAlias"]) == "" || len(list(deployment["Alarms"])) == 0 {
			t.Errorf("%s is not deployed gradually: %v", f, deployment)
		}
		for _, a := range list(deployment["Alarms"]) {
			if !slices.Contains(alarms, text(object(a)["Ref"])) {
				t.Errorf("%s: %v is no alarm", f, a)
			}
		}
	}
}
