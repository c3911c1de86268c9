package web

import (
	"crypto/rand"
	"errors"
	"fmt"
	"io"
	"mime"
	"net/http"
	"os"
	"runtime"
	"slices"
	"strings"
)

// An exchange is one request and its answer.
type exchange struct {
	*service
	w       http.ResponseWriter
	r       *http.Request
	id      string // of the request
	rules   Rules
	record  *record
	started bool // a status has been sent
}

// serve wraps a route: identity, limits, the endpoint, problems, panics, and a line in the log.
func (s *service) serve(t route) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		x := &exchange{service: s, w: w, r: r, id: requestID(r), record: newRecord(t.pattern, r.Method, s.Now())}
		secure(w.Header(), x.id)
		defer x.finish()
		defer x.recover()
		x.rules = s.Rules(r.Context(), x.id)
		if p := x.run(t); p != nil {
			x.refuse(p)
		}
	})
}

func (x *exchange) run(t route) *Problem {
	if t.get == nil && t.post == nil {
		return problem(notFound, "No route has this path. /openapi.json lists the routes.")
	}
	answer := t.pick(x.r.Method)
	if answer == nil {
		return problem(notAllowed, "This path takes "+t.allow()+".").with("Allow", t.allow())
	}
	if len(x.r.URL.RawQuery) > x.Limits.Query {
		return problem(queryLong, fmt.Sprintf("The query has %d bytes; at most %d are read.", len(x.r.URL.RawQuery), x.Limits.Query))
	}
	if !t.open {
		leave, p := x.gate.enter(client(x.r))
		if p != nil {
			return p
		}
		defer leave()
	}
	return answer(x)
}

// secure sets the headers that every answer has.
func secure(h http.Header, id string) {
	h.Set("X-Request-Id", id)
	h.Set("X-Content-Type-Options", "nosniff")
	h.Set("Content-Security-Policy", "default-src 'none'; frame-ancestors 'none'")
	h.Set("Referrer-Policy", "no-referrer")
	h.Set("Cache-Control", "no-store")
}

// requestID takes the client's id where it is short and plain, else makes one. The signs of base64 are plain: gateways make such ids.
func requestID(r *http.Request) string {
	const most = 64
	plain := func(c rune) bool {
		return c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c >= '0' && c <= '9' || strings.ContainsRune("-_.=+/", c)
	}
	id := r.Header.Get("X-Request-Id")
	if id != "" && len(id) <= most && !strings.ContainsFunc(id, func(c rune) bool { return !plain(c) }) {
		return id
	}
	return strings.ToLower(rand.Text())
}

// recover turns a panic into a problem. What a panic says may hold recipe content, so only its place is logged, and its text
// where it is the runtime's own.
func (x *exchange) recover() {
	cause := recover()
	if cause == nil {
		return
	}
	if err, ok := cause.(error); ok && errors.Is(err, http.ErrAbortHandler) {
		panic(cause)
	}
	x.panicked(cause)
	if !x.started {
		x.refuse(problem(internal, ""))
	}
}

func (x *exchange) panicked(cause any) {
	x.record.panics++
	says := fmt.Sprintf("%T", cause)
	if err, ok := cause.(runtime.Error); ok {
		says = err.Error()
	}
	x.Log.Error("panic", "request_id", x.id, "route", x.record.route, "cause", says, "at", frames())
}

// frames lists the functions of the stack below the panic.
func frames() []string {
	pcs := make([]uintptr, 32)
	stack := runtime.CallersFrames(pcs[:runtime.Callers(4, pcs)])
	var out []string
	for {
		f, more := stack.Next()
		out = append(out, fmt.Sprintf("%s:%d", f.Function, f.Line))
		if !more {
			return out
		}
	}
}

// mediaType asks for one of the media types a body may have, without a coding of its own.
func (x *exchange) mediaType(known ...string) (string, *Problem) {
	read := strings.Join(known, ", ")
	if c := x.r.Header.Get("Content-Encoding"); c != "" && !strings.EqualFold(c, "identity") {
		return "", problem(unsupported, "The body must be sent without a content coding.").with("Accept-Encoding", "identity").with("Accept", read)
	}
	given, parameters, err := mime.ParseMediaType(x.r.Header.Get("Content-Type"))
	charset, stated := parameters["charset"]
	if err != nil || !slices.Contains(known, given) || stated && !strings.EqualFold(charset, "utf-8") {
		return "", problem(unsupported, "Content-Type must be "+strings.Join(known, " or ")+", in UTF-8.").with("Accept", read)
	}
	return given, nil
}

// body reads a bounded body.
func (x *exchange) body(most int64) ([]byte, *Problem) {
	large := problem(tooLarge, fmt.Sprintf("The body has more than %d bytes.", most))
	if x.r.ContentLength > most {
		return nil, large.with("Connection", "close")
	}
	doc, err := io.ReadAll(http.MaxBytesReader(x.w, x.r.Body, most))
	x.record.bytesIn = int64(len(doc))
	var over *http.MaxBytesError
	switch {
	case errors.As(err, &over):
		return nil, large
	case errors.Is(err, os.ErrDeadlineExceeded):
		return nil, problem(timeout, "").with("Connection", "close")
	case err != nil:
		return nil, problem(badRequest, "The body broke off.").with("Connection", "close")
	}
	return doc, nil
}
