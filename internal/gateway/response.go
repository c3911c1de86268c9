package gateway

import (
	"bytes"
	"encoding/base64"
	"encoding/json"
	"errors"
	"net/http"
	"strings"
	"unicode/utf8"
)

// errTooLarge tells a handler that it writes more than Lambda carries.
var errTooLarge = errors.New("the response is larger than a function may answer")

// A recorder keeps a response in memory, up to just over what Lambda carries.
type recorder struct {
	method    string
	status    int // 0 until the header is written
	header    http.Header
	sent      http.Header // the header as it was when it was written
	body      bytes.Buffer
	overflown bool
}

func newRecorder(method string) *recorder { return &recorder{method: method, header: http.Header{}} }

// Header is the header to be written.
func (w *recorder) Header() http.Header { return w.header }

// WriteHeader settles status and header; interim responses cannot be passed on.
func (w *recorder) WriteHeader(status int) {
	if w.status != 0 || status < 200 {
		return
	}
	w.status, w.sent = status, w.header.Clone()
}

// Write adds to the body, which no response to HEAD has.
func (w *recorder) Write(b []byte) (int, error) {
	if w.status == 0 {
		if w.header.Get("Content-Type") == "" && w.header.Get("Content-Encoding") == "" {
			w.header.Set("Content-Type", http.DetectContentType(b))
		}
		w.WriteHeader(http.StatusOK)
	}
	switch {
	case w.method == http.MethodHead:
		return len(b), nil
	case w.status == http.StatusNoContent || w.status == http.StatusNotModified:
		return 0, http.ErrBodyNotAllowed
	case w.body.Len()+len(b) > MaxResponse:
		w.overflown = true
		return 0, errTooLarge
	}
	return w.body.Write(b)
}

// A reply is a response in payload format 2.0.
type reply struct {
	Status  int               `json:"statusCode"`
	Headers map[string]string `json:"headers"`
	Cookies []string          `json:"cookies,omitempty"`
	Body    string            `json:"body"`
	Base64  bool              `json:"isBase64Encoded"`
}

// document is the response as Lambda takes it. A body that is compressed or no text goes as base64.
func (w *recorder) document() []byte {
	w.WriteHeader(http.StatusOK)
	out := reply{Status: w.status, Headers: map[string]string{}, Cookies: w.sent.Values("Set-Cookie")}
	for name, values := range w.sent {
		if name != "Set-Cookie" {
			out.Headers[name] = strings.Join(values, ", ")
		}
	}
	if b := w.body.Bytes(); w.sent.Get("Content-Encoding") != "" || !utf8.Valid(b) {
		out.Body, out.Base64 = base64.StdEncoding.EncodeToString(b), true
	} else {
		out.Body = string(b)
	}
	var doc bytes.Buffer
	e := json.NewEncoder(&doc)
	e.SetEscapeHTML(false)
	if e.Encode(out) != nil {
		return nil // cannot be: numbers and strings always encode
	}
	return bytes.TrimSuffix(doc.Bytes(), []byte("\n"))
}
