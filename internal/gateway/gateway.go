// Package gateway lets an http.Handler answer Lambda's events: those of an HTTP API with payload format 2.0, those of a function
// URL, and direct invocations, whose payload is the body of one POST.
//
// It knows nothing of food labels. It answers every event: a handler that panics, a body that is no base64 and a response too
// large for Lambda become problem documents, and none of them says anything of the request's content.
package gateway

import (
	"context"
	"encoding/json"
	"log/slog"
	"net/http"
	"runtime/debug"

	"github.com/aws/aws-lambda-go/lambdacontext"
)

// MaxResponse is what a function may answer, in bytes of the whole response document; Lambda refuses a larger one.
// Reference: Lambda quotas, "Invocation payload (request and response)", 6 MB each for synchronous invocations.
const MaxResponse = 6 << 20

// RequestIDHeader carries the request's identifier to the handler; what a client sent under this name is replaced.
const RequestIDHeader = "X-Request-Id"

// A Refusal is what the adapter itself refuses: the name of a kind of problem, and what is to be said.
type Refusal struct{ Problem, Detail string }

// The refusals.
var (
	BadEncoding  = Refusal{"bad-request", "The event's body is said to be base64 and is not."}
	BadPath      = Refusal{"bad-request", "The event's path cannot be read."}
	Unauthorised = Refusal{"unauthorized", "The event names no caller that an authoriser has let in."}
	TooLarge     = Refusal{"answer-too-large", "The answer would exceed the 6 MB that a function may send."}
	Broken       = Refusal{"internal", ""}
)

// An Adapter answers events with a handler. It is a Handler of aws-lambda-go and safe for concurrent use.
type Adapter struct {
	Handler http.Handler
	// Direct is the path of the POST that a direct invocation stands for.
	Direct string
	// Open are the paths that need no authoriser. An event for any other that brings no word of one is refused, so that a route
	// or URL deployed without authorisation by mistake stays closed. A direct invocation was authorised by IAM.
	Open map[string]bool
	// Refuse writes a problem document: of that kind, saying that.
	Refuse func(w http.ResponseWriter, r *http.Request, problem, detail string)
	Log    *slog.Logger
}

// Invoke answers one event. The error is always nil: what goes wrong is told in the response, so that Lambda neither logs a
// panic's text nor throws the process away.
func (a *Adapter) Invoke(ctx context.Context, payload []byte) ([]byte, error) {
	var e event
	if json.Unmarshal(payload, &e) != nil || e.RequestContext.HTTP.Method == "" {
		return a.direct(ctx, payload), nil
	}
	r, bad := e.request(ctx, a.Open)
	if r.Header.Get(RequestIDHeader) == "" {
		r.Header.Set(RequestIDHeader, invocation(ctx))
	}
	var response *recorder
	if bad != nil {
		response = a.refused(r, *bad)
	} else {
		response = a.serve(r)
	}
	if doc := response.document(); len(doc) <= MaxResponse {
		return doc, nil
	}
	return a.refused(r, TooLarge).document(), nil
}

// direct answers with the handler's body as it is: the report, or the problem document.
func (a *Adapter) direct(ctx context.Context, payload []byte) []byte {
	r := directRequest(ctx, a.Direct, payload)
	response := a.serve(r)
	if response.body.Len() > MaxResponse {
		response = a.refused(r, TooLarge)
	}
	return response.body.Bytes()
}

// serve runs the handler. A panic is logged with its stack, never with its value, which may hold a part of a recipe.
func (a *Adapter) serve(r *http.Request) (response *recorder) {
	response = newRecorder(r.Method)
	defer func() {
		if p := recover(); p != nil {
			a.Log.Error("panic", "request_id", r.Header.Get(RequestIDHeader), "stack", string(debug.Stack()))
			response = a.refused(r, Broken)
		}
	}()
	a.Handler.ServeHTTP(response, r)
	if response.overflown {
		return a.refused(r, TooLarge)
	}
	return response
}

func (a *Adapter) refused(r *http.Request, why Refusal) *recorder {
	a.Log.Warn("refused", "request_id", r.Header.Get(RequestIDHeader), "problem", why.Problem, "detail", why.Detail)
	response := newRecorder(r.Method)
	a.Refuse(response, r, why.Problem, why.Detail)
	return response
}

// invocation is the identifier Lambda gave this invocation, or nothing outside Lambda.
func invocation(ctx context.Context) string {
	if lc, ok := lambdacontext.FromContext(ctx); ok {
		return lc.AwsRequestID
	}
	return ""
}
