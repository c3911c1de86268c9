package store_test

import (
	"context"
	"errors"
	"net/http"
	"strings"
	"sync/atomic"
	"testing"
	"time"

	"gramlaw/internal/store"
)

// times lets a fault happen so often and then no more.
func times(n int64, fault http.HandlerFunc) func(http.ResponseWriter, *http.Request) bool {
	var left atomic.Int64
	left.Store(n)
	return func(w http.ResponseWriter, r *http.Request) bool {
		if left.Add(-1) < 0 {
			return false
		}
		fault(w, r)
		return true
	}
}

func status(code int) http.HandlerFunc {
	return func(w http.ResponseWriter, _ *http.Request) { w.WriteHeader(code) }
}

func hangUp(http.ResponseWriter, *http.Request) { panic(http.ErrAbortHandler) }

// half answers with half of what it promises.
func half(w http.ResponseWriter, _ *http.Request) {
	w.Header().Set("Content-Length", "1000")
	w.WriteHeader(http.StatusOK)
	_, _ = w.Write(make([]byte, 500))
}

// never answers until the caller has gone.
func never(_ http.ResponseWriter, r *http.Request) { <-r.Context().Done() }

func TestS3FaultsThatPass(t *testing.T) {
	for name, fault := range map[string]http.HandlerFunc{"internal error": status(500), "slow down": status(503), "a broken connection": hangUp} {
		t.Run(name, func(t *testing.T) {
			s := newServer(t)
			b := open(t, s.url)
			s.inject(times(1, fault))
			d := put(t, b, "1")
			s.inject(times(1, fault))
			if _, err := store.Load(ctx, b, d[0]); err != nil {
				t.Error(err)
			}
		})
	}
}

func TestS3FaultsThatStay(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	d := put(t, b, "1")
	use(t, b, d[0], nil)
	for name, fault := range map[string]http.HandlerFunc{"internal error": status(500), "forbidden": status(403), "half an answer": half, "no answer": never} {
		t.Run(name, func(t *testing.T) {
			s.inject(times(1000, fault))
			ctx, cancel := context.WithTimeout(ctx, 100*time.Millisecond)
			defer cancel()
			for what, err := range map[string]error{
				"load":    second(store.Load(ctx, b, d[0])),
				"current": second(store.Current(ctx, b)),
				"use":     second(store.Use(ctx, b, d[0], nil, at)),
				"put":     second(store.Put(ctx, b, set("2"))),
			} {
				if err == nil || errors.Is(err, store.ErrNoSet) || errors.Is(err, store.ErrNoCurrent) || errors.Is(err, store.ErrBadSet) {
					t.Errorf("%s: %v; want the fault itself", what, err)
				}
			}
		})
	}
	s.inject(times(0, nil))
	if p, err := store.Current(ctx, b); err != nil || p.Number != 1 {
		t.Errorf("after the faults: %+v, %v", p, err)
	}
}

func second[T any](_ T, err error) error { return err }

// A write whose answer is lost is tried again, finds itself, and counts once.
func TestALostAnswerCountsOnce(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	d := put(t, b, "1", "2")
	use(t, b, d[0], nil)
	use(t, b, d[1], nil)
	var lost atomic.Bool
	s.inject(func(w http.ResponseWriter, r *http.Request) bool {
		if r.Method != http.MethodPut || !strings.Contains(r.URL.Path, "current/") || !lost.CompareAndSwap(false, true) {
			return false
		}
		s.fake.ServeHTTP(discard{w}, r)
		panic(http.ErrAbortHandler)
	})
	p, err := store.Back(ctx, b, at)
	if err != nil || p.Number != 3 || p.Digest != d[0] {
		t.Errorf("%+v, %v", p, err)
	}
	if history, err := store.History(ctx, b, 100); err != nil || len(history) != 3 || !lost.Load() {
		t.Errorf("%d entries, %v", len(history), err)
	}
}

// discard takes an answer that nobody hears.
type discard struct{ http.ResponseWriter }

func (d discard) Write(b []byte) (int, error) { return len(b), nil }
func (discard) WriteHeader(int)               {}
func (discard) Header() http.Header           { return http.Header{} }

// S3 says 409 when two conditional writes meet; the loser tries again.
func TestWritesThatMeetAreTriedAgain(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	s.inject(times(2, func(w http.ResponseWriter, r *http.Request) {
		w.WriteHeader(http.StatusConflict)
		_, _ = w.Write([]byte(`<Error><Code>ConditionalRequestConflict</Code><Message>try again</Message></Error>`))
	}))
	use(t, b, put(t, b, "1")[0], nil)
}
