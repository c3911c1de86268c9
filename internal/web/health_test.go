package web

import (
	"strings"
	"testing"
	"time"
)

func TestServiceNeedsRulesAndAClock(t *testing.T) {
	for name, spoil := range map[string]func(*Options){"rules": func(o *Options) { o.Rules = nil }, "clock": func(o *Options) { o.Now = nil }} {
		o := options()
		spoil(&o)
		if _, err := New(o); err == nil {
			t.Errorf("works without %s", name)
		}
	}
}

// Without a date the clock's day in UTC counts, wherever the clock is.
func TestTheClockIsTheDoors(t *testing.T) {
	o := options()
	o.Now = func() time.Time { return time.Date(2027, 3, 16, 1, 0, 0, 0, time.FixedZone("east", 2*60*60)) }
	h := handler(t, o)
	for _, w := range []string{
		ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json").Body.String(), ask(t, h, "POST", "/v1/check/batch", oats, "Content-Type: application/jsonl").Body.String(),
		ask(t, h, "GET", "/v1/rules/us", "").Body.String(),
	} {
		if !strings.Contains(w, `"date":"2027-03-15"`) && !strings.Contains(w, `"on":"2027-03-15"`) {
			t.Errorf("%.300s", w)
		}
	}
}

func TestHealth(t *testing.T) {
	w := ask(t, handler(t, options()), "GET", "/health", "").Body.String()
	want := `{"status":"ok","version":"test","rules":{"version":"` + book.Version + `","digest":"` + book.Digest + `","loaded":"2026-12-01T08:00:00Z","age_seconds":3600}}`
	if strings.TrimSpace(w) != want {
		t.Errorf("%s", w)
	}
}
