// Package web is the HTTP service: the core behind routes, problem documents and limits.
//
// New gives an http.Handler that any door can call: a server on a person's machine (Server) or an adapter of a function platform. A request
// becomes an exchange; an endpoint answers it or returns a Problem, which is then written as RFC 9457 asks. Time and the rule set come in
// through Options, so that the core below stays a pure function. Nothing of a recipe is ever logged: see record.
package web

import (
	"cmp"
	"context"
	"errors"
	"io"
	"log/slog"
	"net/http"
	"runtime"
	"time"

	"gramlaw/internal/rulebook"
	"gramlaw/schemas"
)

// Rules is a rule set and when it was loaded.
type Rules struct {
	Book   *rulebook.Book
	Loaded time.Time
	// Of sets that come from a store: on trial beside the set in use; when it was last known what is in use; and whether a later look
	// failed, so that this is no longer known for certain.
	Canary bool
	Read   time.Time
	Stale  bool
}

// Options are what the service takes from outside. Rules and Now are needed.
type Options struct {
	// Rules is asked once a request, by its id, so that a newer set can take over between two requests or be tried on a share of them. It
	// never gives one without a Book. Always gives the same one.
	Rules   func(ctx context.Context, requestID string) Rules
	Now     func() time.Time // the clock; the labelling date is its day in UTC where a request names none
	Version string           // of the program, for /health and the logs
	Log     *slog.Logger     // nil logs nothing
	Metrics io.Writer        // one line a request in the embedded metric format; nil writes none
	Limits  Limits
}

// Always gives one set to every request.
func Always(set Rules) func(context.Context, string) Rules {
	return func(context.Context, string) Rules { return set }
}

// Limits bound what one request, one client and all of them can take. A zero takes the default.
type Limits struct {
	Body       int64         // bytes of a check's body; 1 MiB of recipe and 64 KiB around it
	BatchBody  int64         // bytes of a batch's body; 8 MiB
	BatchLines int           // recipes of a batch; 100
	Query      int           // bytes of a query; 2048
	Report     int           // bytes of a report before it is compressed; 16 MiB
	Answer     int64         // bytes of an answer as sent; no bound
	InFlight   int           // requests at work or waiting, over all clients; 64
	PerClient  int           // the same of one address; 16
	Workers    int           // checks at the same time; one a processor
	Wait       time.Duration // that a check waits for its turn; 2 s
}

func (l Limits) orDefault() Limits {
	return Limits{
		Body: cmp.Or(l.Body, 1<<20+64<<10), BatchBody: cmp.Or(l.BatchBody, 8<<20), BatchLines: cmp.Or(l.BatchLines, 100),
		Query: cmp.Or(l.Query, 2048), Report: cmp.Or(l.Report, 16<<20), Answer: l.Answer, InFlight: cmp.Or(l.InFlight, 64), PerClient: cmp.Or(l.PerClient, 16),
		Workers: cmp.Or(l.Workers, runtime.GOMAXPROCS(0)), Wait: cmp.Or(l.Wait, 2*time.Second),
	}
}

// service is the handler.
type service struct {
	Options
	gate    *gate
	mux     *http.ServeMux
	nowhere http.Handler // every other path
	openapi []byte
}

// New gives the service. The error tells what is missing in the options.
func New(o Options) (http.Handler, error) {
	if o.Rules == nil || o.Now == nil {
		return nil, errors.New("the service needs rules and a clock")
	}
	openapi, err := schemas.OpenAPI()
	if err != nil {
		return nil, err
	}
	if o.Log == nil {
		o.Log = slog.New(slog.DiscardHandler)
	}
	o.Limits = o.Limits.orDefault()
	s := &service{Options: o, gate: newGate(o.Limits), mux: http.NewServeMux(), openapi: openapi}
	for _, r := range routes() {
		s.mux.Handle(r.pattern, s.serve(r))
	}
	s.nowhere = s.serve(route{pattern: unknownRoute})
	s.mux.Handle("/", s.nowhere)
	return s, nil
}

// ServeHTTP refuses paths that are not written plainly before they reach the routes, because the router would redirect them.
func (s *service) ServeHTTP(w http.ResponseWriter, r *http.Request) {
	if !plainPath(r.URL) {
		s.nowhere.ServeHTTP(w, r)
		return
	}
	s.mux.ServeHTTP(w, r)
}
