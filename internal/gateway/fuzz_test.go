package gateway

import (
	"encoding/json"
	"io"
	"net/http"
	"testing"
)

// Whatever comes, the answer is JSON, has a status where an HTTP event asks for one, and the handler sees a request a server could have
// made.
func FuzzInvoke(f *testing.F) {
	e := sample()
	seed, err := json.Marshal(e)
	if err != nil {
		f.Fatal(err)
	}
	f.Add(seed)
	f.Add([]byte(`{"recipe":{"id":"x"},"on":"2026-12-01"}`))
	f.Add([]byte(`{"rawPath":"/%zz","requestContext":{"stage":"prod","http":{"method":"GET"}}}`))
	f.Add([]byte(`{"rawPath":"/health","isBase64Encoded":true,"body":"%","requestContext":{"authorizer":{"iam":{}},"http":{"method":"HEAD"}}}`))
	f.Fuzz(func(t *testing.T, payload []byte) {
		a := adapt(func(w http.ResponseWriter, r *http.Request) {
			if r.URL.Host != "" || r.URL.Path == "" || r.RemoteAddr == "" && r.URL.Path != "/v1/check" {
				t.Errorf("request %+v", r)
			}
			b, err := io.ReadAll(r.Body)
			if err != nil || int64(len(b)) != r.ContentLength {
				t.Errorf("%d bytes of %d, %v", len(b), r.ContentLength, err)
			}
			json.NewEncoder(w).Encode(b)
		}, io.Discard)
		out, err := a.Invoke(t.Context(), payload)
		if err != nil || !json.Valid(out) || len(out) > MaxResponse {
			t.Fatalf("%v, %.200s", err, out)
		}
		var asked event
		if json.Unmarshal(payload, &asked) == nil && asked.RequestContext.HTTP.Method != "" {
			if r := answered(t, out); r.StatusCode < 200 || r.StatusCode > 599 {
				t.Errorf("status %d", r.StatusCode)
			}
		}
	})
}
