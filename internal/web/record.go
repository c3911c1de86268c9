package web

import (
	"cmp"
	"context"
	"log/slog"
	"net/http"
	"time"

	"gramlaw/internal/check"
	"gramlaw/internal/meter"
)

// A record is what the log and the metrics learn of one exchange: routes, numbers, identifiers of rules and codes of faults. It never takes
// a text of the request, so that nothing of a recipe can get into a log.
type record struct {
	route, method string
	began         time.Time
	status        int
	problem       string // its type
	bytesIn       int64
	bytesOut      int64
	panics        int
	shed          int // requests and lines refused because of load
	recipes       int
	asked, open   int // verdicts and mandatory lines, and those of them that are not determined
	verdicts      map[string]int
	refusals      map[string]int // by rule
	faults        map[string]int // by code
}

func newRecord(route, method string, now time.Time) *record {
	switch method {
	case http.MethodGet, http.MethodHead, http.MethodPost:
	default:
		method = "other"
	}
	return &record{route: route, method: method, began: now, verdicts: map[string]int{}, refusals: map[string]int{}, faults: map[string]int{}}
}

// refused notes the problem that is the whole answer.
func (c *record) refused(p *Problem) {
	c.problem = p.Type
	c.faulty(p)
}

func (c *record) faulty(p *Problem) {
	if p.Status == busy.Status || p.Status == tooMany.Status {
		c.shed++
	}
	if len(p.Faults) == 0 {
		c.faults[p.Type]++
	}
	for _, f := range p.Faults {
		c.faults[f.Code]++
	}
}

// judged notes a report.
func (c *record) judged(r *check.Report) {
	c.recipes++
	for i := range r.Jurisdictions {
		c.market(&r.Jurisdictions[i])
	}
}

func (c *record) market(m *check.Market) {
	for _, l := range m.Declaration.Lines {
		if l.Presence == "mandatory" {
			c.count(l.Status != "determined")
		}
	}
	for _, cl := range m.Claims {
		c.verdicts[cl.Verdict]++
		c.count(cl.Verdict == check.Undetermined || cl.Verdict == check.Unread)
		if cl.Verdict == check.Refused {
			c.refusals[cmp.Or(cl.Rule, m.Jurisdiction+"/unlisted")]++
		}
	}
	for _, f := range m.Findings {
		if f.Severity == "refused" {
			c.refusals[cmp.Or(f.Rule, m.Jurisdiction+"/finding")]++
		}
	}
}

func (c *record) count(open bool) {
	c.asked++
	if open {
		c.open++
	}
}

// undetermined is the share of verdicts and mandatory lines that are not determined, in per cent.
func (c *record) undetermined() float64 {
	if c.asked == 0 {
		return 0
	}
	return 100 * float64(c.open) / float64(c.asked)
}

// finish writes the record when the answer is out.
func (x *exchange) finish() {
	c, now, set := x.record, x.Now(), x.loaded()
	took := float64(now.Sub(c.began)) / float64(time.Millisecond)
	x.Log.LogAttrs(context.Background(), level(c.status), "request",
		slog.String("request_id", x.id), slog.String("method", c.method), slog.String("route", c.route), slog.Int("status", c.status),
		slog.String("problem", c.problem), slog.Float64("milliseconds", took), slog.Int64("bytes_in", c.bytesIn), slog.Int64("bytes_out", c.bytesOut),
		slog.Int("recipes", c.recipes), slog.Any("verdicts", c.verdicts), slog.Any("refusals", c.refusals), slog.Any("faults", c.faults),
		slog.String("version", x.Version), slog.String("rules_version", set.Version), slog.String("rules_digest", set.Digest))
	if x.Metrics != nil {
		meter.Write(x.Metrics, now, c.line(x, set, took)) // a log that cannot be written is no reason to fail
	}
}

// loaded names the rule set; it is empty where a panic came before one was found.
func (x *exchange) loaded() check.RuleSet {
	if x.rules.Book == nil {
		return check.RuleSet{}
	}
	return x.ruleSet()
}

func level(status int) slog.Level {
	switch status {
	case http.StatusInternalServerError:
		return slog.LevelError
	case http.StatusServiceUnavailable, http.StatusTooManyRequests:
		return slog.LevelWarn
	}
	return slog.LevelInfo
}

// line is the record as metrics, over all and by route. What has many values stands beside them as properties, which make no metrics.
func (c *record) line(x *exchange, set check.RuleSet, took float64) meter.Line {
	count := func(name string, n int) meter.Metric {
		return meter.Metric{Name: name, Unit: "Count", Value: float64(n)}
	}
	return meter.Line{
		Namespace:  "Gramlaw",
		Dimensions: []meter.Dimension{{Name: "Route", Value: c.route}},
		Metrics: []meter.Metric{
			{Name: "Duration", Unit: "Milliseconds", Value: took},
			count("Requests", 1), count("ServerErrors", serverError(c.status)), count("Panics", c.panics), count("Shed", c.shed),
			count("Recipes", c.recipes), count("Refusals", sum(c.refusals)), count("Faults", sum(c.faults)),
			{Name: "Undetermined", Unit: "Percent", Value: c.undetermined(), Absent: c.asked == 0},
		},
		Properties: map[string]any{
			"RequestId": x.id, "Method": c.method, "Status": c.status, "RefusalsByRule": c.refusals, "FaultsByCode": c.faults, "Verdicts": c.verdicts,
			"Version": x.Version, "RulesVersion": set.Version, "RulesDigest": set.Digest,
		},
	}
}

func serverError(status int) int {
	if status >= http.StatusInternalServerError {
		return 1
	}
	return 0
}

func sum(m map[string]int) int {
	n := 0
	for _, one := range m {
		n += one
	}
	return n
}
