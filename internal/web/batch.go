package web

import (
	"bytes"
	"compress/gzip"
	"context"
	"errors"
	"fmt"
	"io"
	"net/http"
	"time"

	"github.com/go-json-experiment/json/jsontext"
)

// An answered line of a batch: the report, or the problem with the line.
type answered struct {
	Line    int            `json:"line"` // counted from 1, empty lines too
	Status  int            `json:"status"`
	Report  jsontext.Value `json:"report,omitzero"`
	Problem *Problem       `json:"problem,omitzero"`
}

// A numbered line of the body.
type numbered struct {
	n   int
	doc []byte
}

// postBatch checks recipes line by line and answers each as soon as it is judged.
func postBatch(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	given, p := x.mediaType(typeNDJSON, typeJSONL)
	if p != nil {
		return p
	}
	offers := []string{typeNDJSON, typeJSONL}
	if given == typeJSONL {
		offers = []string{typeJSONL, typeNDJSON}
	}
	mediaType, p := x.choose(offers...)
	if p != nil {
		return p
	}
	lines, p := x.lines()
	if p != nil {
		return p
	}
	x.stream(mediaType, lines)
	return nil
}

func (x *exchange) lines() ([]numbered, *Problem) {
	body, p := x.body(x.Limits.BatchBody)
	if p != nil {
		return nil, p
	}
	var out []numbered
	n := 0
	for doc := range bytes.SplitSeq(body, []byte("\n")) {
		n++
		if doc = bytes.TrimSpace(doc); len(doc) > 0 {
			out = append(out, numbered{n, doc})
		}
		if len(out) > x.Limits.BatchLines {
			return nil, problem(tooLarge, fmt.Sprintf("The batch has more than %d recipes.", x.Limits.BatchLines))
		}
	}
	return out, nil
}

// stream writes answers as they come.
func (x *exchange) stream(mediaType string, lines []numbered) {
	h := x.w.Header()
	h.Set("Content-Type", mediaType)
	h.Add("Vary", "Accept, Accept-Encoding")
	out := &counter{w: x.w}
	defer func() { x.record.bytesOut = out.n }()
	var to io.Writer = out
	flush := func() {}
	if takesGzip(x.r) {
		h.Set("Content-Encoding", "gzip")
		z := gzips.Get().(*gzip.Writer)
		defer gzips.Put(z)
		z.Reset(out)
		defer z.Close()
		to, flush = z, func() { z.Flush() }
	}
	x.w.WriteHeader(http.StatusOK)
	x.started, x.record.status = true, http.StatusOK
	for _, l := range lines {
		if errors.Is(x.r.Context().Err(), context.Canceled) {
			return // nobody listens any more
		}
		to.Write(x.answer(l, out.n))
		flush()
		x.push()
	}
}

// push sends what is written, and gives the next line the time a whole answer has. Doors that cannot do either send all at the end.
func (x *exchange) push() {
	c := http.NewResponseController(x.w)
	c.Flush()
	c.SetWriteDeadline(time.Now().Add(writeTimeout))
}

// answer judges one line; sent is what has left already.
func (x *exchange) answer(l numbered, sent int64) []byte {
	report, p := x.judge(l.doc)
	a := answered{Line: l.n, Status: http.StatusOK, Report: report}
	line, _ := encode(a) // a report that was rendered can be written
	if most := x.Limits.Answer; p == nil && most > 0 && sent+int64(len(line)) > most-batchReserve {
		p = problem(answerLarge, "")
	}
	if p == nil {
		return line
	}
	p.RequestID = x.id
	x.record.faulty(p)
	line, _ = encode(answered{Line: l.n, Status: p.Status, Problem: p})
	return line
}

// batchReserve is left for problems on the lines that follow.
const batchReserve = 64 << 10

// judge keeps a panic to its line.
func (x *exchange) judge(doc []byte) (report []byte, p *Problem) {
	defer func() {
		if cause := recover(); cause != nil {
			x.panicked(cause)
			report, p = nil, problem(internal, "")
		}
	}()
	if x.r.Context().Err() != nil {
		return nil, problem(busy, "The time for this batch is over; send the line again.")
	}
	if most := x.Limits.Body; int64(len(doc)) > most {
		return nil, problem(tooLarge, fmt.Sprintf("The line has %d bytes; at most %d are read.", len(doc), most))
	}
	return x.check(x.r.Context(), doc)
}

// counter counts what is written.
type counter struct {
	w io.Writer
	n int64
}

func (c *counter) Write(b []byte) (int, error) {
	n, err := c.w.Write(b)
	c.n += int64(n)
	return n, err
}
