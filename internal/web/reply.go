package web

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"encoding/hex"
	"net/http"
	"strconv"
	"strings"
	"sync"

	"github.com/go-json-experiment/json"
)

const compressFrom = 1024 // bytes; smaller answers are not worth it

// Compressing most of a report's bytes costs less than a check at this level.
var gzips = sync.Pool{New: func() any {
	z, _ := gzip.NewWriterLevel(nil, gzip.BestSpeed) // the level is valid
	return z
}}

// reply sends a whole answer, compressed where the client reads that.
func (x *exchange) reply(mediaType string, body []byte) *Problem {
	h := x.w.Header()
	h.Add("Vary", "Accept, Accept-Encoding")
	if len(body) >= compressFrom && takesGzip(x.r) {
		body = compress(body)
		h.Set("Content-Encoding", "gzip")
	}
	if most := x.Limits.Answer; most > 0 && int64(len(body)) > most {
		h.Del("Content-Encoding")
		return problem(answerLarge, "The answer has "+strconv.Itoa(len(body))+" bytes.")
	}
	x.sent(http.StatusOK, send(x.w, x.r, http.StatusOK, mediaType, body))
	return nil
}

func compress(body []byte) []byte {
	var b bytes.Buffer
	z := gzips.Get().(*gzip.Writer)
	defer gzips.Put(z)
	z.Reset(&b)
	z.Write(body) // into memory: neither fails
	z.Close()
	return b.Bytes()
}

// replyTagged sends an answer that changes only with rules or program, or says that the client has it already.
func (x *exchange) replyTagged(mediaType string, body []byte) *Problem {
	sum := sha256.Sum256(body)
	tag := `W/"` + hex.EncodeToString(sum[:16]) + `"`
	h := x.w.Header()
	h.Set("ETag", tag)
	h.Set("Cache-Control", "no-cache")
	if matches(x.r.Header.Values("If-None-Match"), tag) {
		h.Add("Vary", "Accept, Accept-Encoding")
		x.w.WriteHeader(http.StatusNotModified)
		x.sent(http.StatusNotModified, 0)
		return nil
	}
	return x.reply(mediaType, body)
}

// matches compares entity tags weakly (RFC 9110, 13.1.2).
func matches(headers []string, tag string) bool {
	opaque := strings.TrimPrefix(tag, "W/")
	for one := range strings.SplitSeq(strings.Join(headers, ","), ",") {
		one = strings.TrimSpace(one)
		if one == "*" || strings.TrimPrefix(one, "W/") == opaque {
			return true
		}
	}
	return false
}

// replyJSON sends a value of our own.
func (x *exchange) replyJSON(v any, tagged bool) *Problem {
	mediaType, p := x.choose(typeJSON)
	if p != nil {
		return p
	}
	body, err := encode(v)
	if err != nil {
		x.Log.Error("answer cannot be written", "request_id", x.id, "route", x.record.route)
		return problem(internal, "")
	}
	if tagged {
		return x.replyTagged(mediaType, body)
	}
	return x.reply(mediaType, body)
}

func encode(v any) ([]byte, error) {
	body, err := json.Marshal(v, json.Deterministic(true))
	return append(body, '\n'), err
}

// refuse sends a problem instead of an answer.
func (x *exchange) refuse(p *Problem) {
	p.RequestID = x.id
	x.record.refused(p)
	x.sent(p.Status, p.write(x.w, x.r))
}

func (x *exchange) sent(status, n int) {
	x.started, x.record.status, x.record.bytesOut = true, status, int64(n)
}

// send writes a whole answer and tells how many bytes of its body went out.
func send(w http.ResponseWriter, r *http.Request, status int, mediaType string, body []byte) int {
	h := w.Header()
	h.Set("Content-Type", mediaType)
	h.Set("Content-Length", strconv.Itoa(len(body)))
	w.WriteHeader(status)
	if r.Method == http.MethodHead {
		return 0
	}
	n, _ := w.Write(body) // a client that is gone needs no answer
	return n
}
