package gateway

import (
	"bytes"
	"context"
	"encoding/base64"
	"encoding/json"
	"net"
	"net/http"
	"net/url"
	"strings"
)

// An event is what the adapter reads of payload format 2.0, which HTTP APIs and function URLs share. What
// authorisers add is kept unread: its shape differs from one to the next and must not decide whether an event can be read.
// Reference: API Gateway developer guide, "Create AWS Lambda proxy integrations for HTTP APIs"; Lambda developer guide,
// "Invoking Lambda function URLs".
type event struct {
	RawPath        string            `json:"rawPath"`
	RawQueryString string            `json:"rawQueryString"`
	Cookies        []string          `json:"cookies"`
	Headers        map[string]string `json:"headers"` // a header sent twice is one value, joined with commas
	Body           string            `json:"body"`
	Base64         bool              `json:"isBase64Encoded"`
	RequestContext struct {
		Stage      string          `json:"stage"`
		RequestID  string          `json:"requestId"`
		DomainName string          `json:"domainName"`
		Authorizer json.RawMessage `json:"authorizer"`
		HTTP       struct {
			Method   string `json:"method"`
			SourceIP string `json:"sourceIp"`
		} `json:"http"`
	} `json:"requestContext"`
}

// request is the request the client sent, as a server would see it. With a refusal it has neither body nor query.
func (e *event) request(ctx context.Context, open map[string]bool) (*http.Request, *Refusal) {
	refuse := func(why Refusal) (*http.Request, *Refusal) {
		return e.fill(newRequest(ctx, e.RequestContext.HTTP.Method, &url.URL{Path: "/"}, nil)), &why
	}
	if !e.authorised() && !open[e.path()] {
		return refuse(Unauthorised)
	}
	body := []byte(e.Body)
	if e.Base64 {
		var err error
		if body, err = base64.StdEncoding.DecodeString(e.Body); err != nil {
			return refuse(BadEncoding)
		}
	}
	target, err := url.ParseRequestURI(e.path())
	if err != nil || target.Host != "" || target.Path == "" {
		return refuse(BadPath)
	}
	target.RawQuery = e.RawQueryString
	return e.fill(newRequest(ctx, e.RequestContext.HTTP.Method, target, body)), nil
}

// authorised tells whether an authoriser of the gateway has let the caller in.
func (e *event) authorised() bool {
	var said map[string]json.RawMessage
	return json.Unmarshal(e.RequestContext.Authorizer, &said) == nil && len(said) > 0
}

// path leaves out the name of the stage, which leads the path of every stage but $default.
func (e *event) path() string {
	p := e.RawPath
	if stage := e.RequestContext.Stage; stage != "" && stage != "$default" {
		if rest, ok := strings.CutPrefix(p, "/"+stage); ok && (rest == "" || rest[0] == '/') {
			p = rest
		}
	}
	if p == "" {
		return "/"
	}
	return p
}

// fill adds what stands beside method, target and body.
func (e *event) fill(r *http.Request) *http.Request {
	for name, value := range e.Headers {
		r.Header.Set(name, value)
	}
	if len(e.Cookies) > 0 {
		r.Header.Set("Cookie", strings.Join(e.Cookies, "; "))
	}
	r.Header.Set(RequestIDHeader, e.RequestContext.RequestID)
	if r.Host = r.Header.Get("Host"); r.Host == "" {
		r.Host = e.RequestContext.DomainName
	}
	r.Header.Del("Host")
	r.RemoteAddr = net.JoinHostPort(e.RequestContext.HTTP.SourceIP, "0")
	return r
}

// directRequest stands for a direct invocation.
func directRequest(ctx context.Context, path string, payload []byte) *http.Request {
	r := newRequest(ctx, http.MethodPost, &url.URL{Path: path}, payload)
	r.Header.Set("Content-Type", "application/json")
	r.Header.Set("Accept", "application/json")
	r.Header.Set(RequestIDHeader, invocation(ctx))
	return r
}

func newRequest(ctx context.Context, method string, target *url.URL, body []byte) *http.Request {
	r := &http.Request{
		Method: method, URL: target, RequestURI: target.RequestURI(), Proto: "HTTP/1.1", ProtoMajor: 1, ProtoMinor: 1,
		Header: http.Header{}, Body: http.NoBody, ContentLength: int64(len(body)),
	}
	if len(body) > 0 {
		r.Body = readCloser{bytes.NewReader(body)}
	}
	return r.WithContext(ctx)
}

type readCloser struct{ *bytes.Reader }

func (readCloser) Close() error { return nil }
