package gateway

import (
	"bytes"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"io"
	"log/slog"
	"net/http"
	"strings"
	"testing"

	"github.com/aws/aws-lambda-go/events"
	"github.com/aws/aws-lambda-go/lambdacontext"
)

// statuses tell the refusals apart.
var statuses = map[Refusal]int{BadEncoding: 501, BadPath: 502, Unauthorised: 503, TooLarge: 504, Broken: 505}

// adapt makes an adapter of a handler.
func adapt(h http.HandlerFunc, log io.Writer) *Adapter {
	return &Adapter{
		Handler: h, Direct: "/v1/check", Open: map[string]bool{"/health": true}, Log: slog.New(slog.NewJSONHandler(log, nil)),
		Refuse: func(w http.ResponseWriter, r *http.Request, problem, detail string) {
			w.Header().Set("Content-Type", "application/problem+json")
			w.WriteHeader(statuses[Refusal{problem, detail}])
			fmt.Fprintf(w, `{"problem":%q,"request_id":%q}`, problem, r.Header.Get(RequestIDHeader))
		},
	}
}

// sample is the request of the developer guide's example of payload format 2.0, with our path.
func sample() events.APIGatewayV2HTTPRequest {
	var e events.APIGatewayV2HTTPRequest
	e.Version, e.RouteKey, e.RawPath, e.RawQueryString = "2.0", "POST /v1/check", "/v1/check", "in=us&in=ca&on=2026-12-01"
	e.Cookies = []string{"cookie1", "cookie2"}
	e.Headers = map[string]string{"header1": "value1", "header2": "value1,value2", "host": "id.example.org", "content-type": "application/json"}
	e.QueryStringParameters = map[string]string{"in": "us,ca", "on": "2026-12-01"}
	e.RequestContext.Stage, e.RequestContext.RequestID, e.RequestContext.DomainName = "$default", "id-1", "id.example.org"
	e.RequestContext.HTTP = events.APIGatewayV2HTTPRequestContextHTTPDescription{Method: "POST", Path: "/v1/check", Protocol: "HTTP/1.1", SourceIP: "192.0.2.1"}
	e.RequestContext.Authorizer = &events.APIGatewayV2HTTPRequestContextAuthorizerDescription{
		JWT: &events.APIGatewayV2HTTPRequestContextAuthorizerJWTDescription{Claims: map[string]string{"sub": "x"}},
	}
	e.Body = `{"id":"x"}`
	return e
}

func invoke(t *testing.T, a *Adapter, event any) []byte {
	t.Helper()
	payload, err := json.Marshal(event)
	if err != nil {
		t.Fatal(err)
	}
	out, err := a.Invoke(t.Context(), payload)
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func answered(t *testing.T, out []byte) events.APIGatewayV2HTTPResponse {
	t.Helper()
	var reply events.APIGatewayV2HTTPResponse
	if err := json.Unmarshal(out, &reply); err != nil {
		t.Fatalf("%v in %.200s", err, out)
	}
	return reply
}

func TestRequests(t *testing.T) {
	for name, c := range map[string]struct {
		change func(*events.APIGatewayV2HTTPRequest)
		want   string
	}{
		"as the guide shows it": {func(e *events.APIGatewayV2HTTPRequest) {}, `POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 {"id":"x"} 10`},
		"base64": {func(e *events.APIGatewayV2HTTPRequest) {
			e.Body, e.IsBase64Encoded = base64.StdEncoding.EncodeToString([]byte("\x1f\x8b")), true
		}, "POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 \x1f\x8b 2"},
		"stage": {func(e *events.APIGatewayV2HTTPRequest) {
			e.RequestContext.Stage, e.RawPath = "prod", "/prod/v1/check"
		}, `POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 {"id":"x"} 10`},
		"stage of a custom domain, which leads no path": {func(e *events.APIGatewayV2HTTPRequest) {
			e.RequestContext.Stage = "prod"
		}, `POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 {"id":"x"} 10`},
		"stage as part of a word": {func(e *events.APIGatewayV2HTTPRequest) {
			e.RequestContext.Stage, e.RawPath = "v", "/v1/check"
		}, `POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 {"id":"x"} 10`},
		"escaped path, no query, no body": {func(e *events.APIGatewayV2HTTPRequest) {
			e.RawPath, e.RawQueryString, e.Body, e.Cookies, e.RequestContext.HTTP.Method = "/v1/rules/a%2Fb%20c", "", "", nil, "GET"
		}, "GET /v1/rules/a%2Fb%20c [] value1,value2  id-1  0"},
		"the client's own request identifier is replaced": {func(e *events.APIGatewayV2HTTPRequest) {
			e.Headers["x-request-id"] = "forged"
		}, `POST /v1/check?in=us&in=ca&on=2026-12-01 [us ca] value1,value2 cookie1; cookie2 id-1 {"id":"x"} 10`},
	} {
		t.Run(name, func(t *testing.T) {
			e := sample()
			c.change(&e)
			var got string
			invoke(t, adapt(func(w http.ResponseWriter, r *http.Request) {
				b, _ := io.ReadAll(r.Body)
				got = fmt.Sprintf("%s %s %v %s %s %s %s %d", r.Method, r.URL.RequestURI(), r.URL.Query()["in"], r.Header.Get("Header2"),
					r.Header.Get("Cookie"), r.Header.Get(RequestIDHeader), b, r.ContentLength)
				if r.Host != "id.example.org" || r.RemoteAddr != "192.0.2.1:0" || r.RequestURI != r.URL.RequestURI() {
					t.Errorf("host %q, remote %q, target %q", r.Host, r.RemoteAddr, r.RequestURI)
				}
			}, t.Output()), e)
			if got != c.want {
				t.Errorf("got  %q\nwant %q", got, c.want)
			}
		})
	}
}

// Authorisers add what they like; only that one has spoken counts.
func TestAuthorisers(t *testing.T) {
	for name, c := range map[string]struct {
		path, authorizer string
		want             int
	}{
		"JWT":                       {"/v1/check", `{"jwt":{"claims":{"sub":"x"},"scopes":null}}`, 200},
		"odd claims":                {"/v1/check", `{"jwt":{"claims":{"n":1,"l":["a"]},"scopes":"a b"}}`, 200},
		"IAM":                       {"/v1/check", `{"iam":{"accountId":"123456789012","cognitoIdentity":null}}`, 200},
		"Lambda":                    {"/v1/check", `{"lambda":{"a":{"b":[1]}}}`, 200},
		"none, closed path":         {"/v1/check", `null`, statuses[Unauthorised]},
		"empty, closed path":        {"/v1/check", ` { } `, statuses[Unauthorised]},
		"none, open path":           {"/health", `null`, 200},
		"none, open path of a part": {"/health/x", `null`, statuses[Unauthorised]},
		"none, open path escaped":   {"/%68ealth", `null`, statuses[Unauthorised]},
	} {
		t.Run(name, func(t *testing.T) {
			payload := `{"version":"2.0","rawPath":"` + c.path + `","requestContext":{"authorizer":` + c.authorizer + `,"http":{"method":"GET"}}}`
			out, _ := adapt(func(w http.ResponseWriter, r *http.Request) {}, t.Output()).Invoke(t.Context(), []byte(payload))
			if got := answered(t, out).StatusCode; got != c.want {
				t.Errorf("got %d, want %d", got, c.want)
			}
		})
	}
}

func TestResponses(t *testing.T) {
	for name, c := range map[string]struct {
		method  string
		handler http.HandlerFunc
		want    string
	}{
		"text": {"GET", func(w http.ResponseWriter, r *http.Request) {
			w.Header().Set("Content-Type", "text/plain; charset=utf-8")
			w.WriteHeader(http.StatusCreated)
			w.Header().Set("Content-Type", "too late")
			io.WriteString(w, "å <b>")
		}, `201 map[Content-Type:text/plain; charset=utf-8] [] false å <b>`},
		"several values and cookies": {"GET", func(w http.ResponseWriter, r *http.Request) {
			w.Header()["Vary"] = []string{"Accept", "Accept-Encoding"}
			w.Header()["Set-Cookie"] = []string{"a=1, b", "c=2"}
			w.WriteHeader(204)
		}, `204 map[Vary:Accept, Accept-Encoding] [a=1, b c=2] false `},
		"compressed": {"GET", func(w http.ResponseWriter, r *http.Request) {
			w.Header().Set("Content-Encoding", "gzip")
			io.WriteString(w, "plain all the same")
		}, `200 map[Content-Encoding:gzip] [] true ` + base64.StdEncoding.EncodeToString([]byte("plain all the same"))},
		"binary": {"GET", func(w http.ResponseWriter, r *http.Request) {
			w.Header().Set("Content-Type", "application/pdf")
			w.Write([]byte{0xff, 0xfe})
		}, `200 map[Content-Type:application/pdf] [] true //4=`},
		"HEAD": {"HEAD", func(w http.ResponseWriter, r *http.Request) {
			w.Header().Set("Content-Length", "4")
			io.WriteString(w, "body")
		}, `200 map[Content-Length:4 Content-Type:text/plain; charset=utf-8] [] false `},
		"nothing": {"GET", func(w http.ResponseWriter, r *http.Request) {}, `200 map[] [] false `},
		"interim": {"GET", func(w http.ResponseWriter, r *http.Request) {
			w.WriteHeader(103)
			w.WriteHeader(404)
			w.WriteHeader(200)
		}, `404 map[] [] false `},
	} {
		t.Run(name, func(t *testing.T) {
			e := sample()
			e.RequestContext.HTTP.Method = c.method
			r := answered(t, invoke(t, adapt(c.handler, t.Output()), e))
			if got := fmt.Sprint(r.StatusCode, " ", r.Headers, " ", r.Cookies, " ", r.IsBase64Encoded, " ", r.Body); got != c.want {
				t.Errorf("got  %s\nwant %s", got, c.want)
			}
		})
	}
}

func TestRefusals(t *testing.T) {
	chunk := bytes.Repeat([]byte("a"), 1<<20)
	writes := func(n int) http.HandlerFunc {
		return func(w http.ResponseWriter, r *http.Request) {
			for range n {
				w.Write(chunk)
			}
		}
	}
	for name, c := range map[string]struct {
		change  func(*events.APIGatewayV2HTTPRequest)
		handler http.HandlerFunc
		want    int
	}{
		"body is no base64": {func(e *events.APIGatewayV2HTTPRequest) { e.Body, e.IsBase64Encoded = "%", true }, nil, statuses[BadEncoding]},
		"path is no path":   {func(e *events.APIGatewayV2HTTPRequest) { e.RawPath = "/%zz" }, nil, statuses[BadPath]},
		"path is a URL":     {func(e *events.APIGatewayV2HTTPRequest) { e.RawPath = "http://example.org/v1/check" }, nil, statuses[BadPath]},
		"panic":             {nil, func(http.ResponseWriter, *http.Request) { panic("a secret") }, statuses[Broken]},
		"panic after a start": {nil, func(w http.ResponseWriter, r *http.Request) {
			io.WriteString(w, "half")
			panic(http.ErrAbortHandler)
		}, statuses[Broken]},
		"body over the limit":                    {nil, writes(7), statuses[TooLarge]},
		"body under the limit, document over it": {nil, writes(6), statuses[TooLarge]},
		"just under the limit":                   {nil, writes(5), 200},
		"base64 over the limit": {nil, func(w http.ResponseWriter, r *http.Request) {
			w.Header().Set("Content-Encoding", "gzip")
			writes(5)(w, r)
		}, statuses[TooLarge]},
	} {
		t.Run(name, func(t *testing.T) {
			e := sample()
			if c.change != nil {
				c.change(&e)
			}
			var log bytes.Buffer
			r := answered(t, invoke(t, adapt(c.handler, &log), e))
			if r.StatusCode != c.want || c.want != 200 && !strings.Contains(r.Body, `"request_id":"id-1"`) {
				t.Errorf("got %d %.200s, want %d", r.StatusCode, r.Body, c.want)
			}
			if strings.Contains(log.String()+r.Body, "secret") {
				t.Errorf("the panic's value is told: %s %s", log.String(), r.Body)
			}
			if c.want == statuses[Broken] && !strings.Contains(log.String(), "gateway_test.go") {
				t.Errorf("the log does not say where: %s", log.String())
			}
		})
	}
}

func TestDirect(t *testing.T) {
	ctx := lambdacontext.NewContext(t.Context(), &lambdacontext.LambdaContext{AwsRequestID: "invocation-1"})
	for name, c := range map[string]struct {
		payload string
		handler http.HandlerFunc
		want    string
	}{
		"the payload as it was sent": {`{"recipe": {"id":"x"},  "on":"2026-12-01"}`, func(w http.ResponseWriter, r *http.Request) {
			b, _ := io.ReadAll(r.Body)
			fmt.Fprintf(w, "%s %s %s %s %s", r.Method, r.URL.Path, r.Header.Get("Content-Type"), r.Header.Get(RequestIDHeader), b)
		}, `POST /v1/check application/json invocation-1 {"recipe": {"id":"x"},  "on":"2026-12-01"}`},
		"no JSON at all": {`nonsense`, func(w http.ResponseWriter, r *http.Request) {
			w.WriteHeader(400)
			io.WriteString(w, `{"status":400}`)
		}, `{"status":400}`},
		"panic": {`{}`, func(http.ResponseWriter, *http.Request) { panic("a secret") }, `{"problem":"internal","request_id":"invocation-1"}`},
		"too large": {`{}`, func(w http.ResponseWriter, r *http.Request) {
			w.Write(make([]byte, MaxResponse+1))
		}, `{"problem":"answer-too-large","request_id":"invocation-1"}`},
	} {
		t.Run(name, func(t *testing.T) {
			out, err := adapt(c.handler, t.Output()).Invoke(ctx, []byte(c.payload))
			if err != nil || string(out) != c.want {
				t.Errorf("got %s, %v\nwant %s", out, err, c.want)
			}
		})
	}
}
