package web

import (
	"context"
	"fmt"
	"net/http"
	"net/http/httptest"
	"sync"
	"testing"
	"time"
)

func TestClients(t *testing.T) {
	for address, want := range map[string]string{
		"192.0.2.7:1234": "192.0.2.7", "192.0.2.7": "192.0.2.7", "[2001:db8:1:2:3:4:5:6]:99": "2001:db8:1:2::", "2001:db8:1:2:ffff::": "2001:db8:1:2::", "[::ffff:192.0.2.7]:5": "::ffff:192.0.2.7",
		"": "", "@": "@", "nonsense:1:2": "nonsense:1:2",
	} {
		r := request("GET", "/", "", "X-Forwarded-For: 203.0.113.9", "Forwarded: for=203.0.113.9")
		r.RemoteAddr = address
		if got := client(r); got != want {
			t.Errorf("%q is %q, want %q", address, got, want)
		}
	}
}

// Requests over a limit are refused at once, others go on, and what leaves makes room; nothing is kept of clients that are gone.
func TestGateBoundsRequests(t *testing.T) {
	g := newGate(Limits{InFlight: 3, PerClient: 2, Workers: 1, Wait: time.Minute})
	var leave []func()
	in := func(client string, status int) {
		t.Helper()
		l, p := g.enter(client)
		switch {
		case p == nil && status == 0:
			leave = append(leave, l)
		case p == nil || p.Status != status || p.header.Get("Retry-After") == "":
			t.Errorf("%s: %+v, want %d", client, p, status)
		}
	}
	in("a", 0)
	in("a", 0)
	in("a", http.StatusTooManyRequests)
	in("b", 0)
	in("b", http.StatusServiceUnavailable)
	in("c", http.StatusServiceUnavailable)
	leave[0]()
	in("c", 0)
	for _, l := range leave[1:] {
		l()
	}
	if g.all != 0 || len(g.clients) != 0 {
		t.Errorf("%d requests and %v are left", g.all, g.clients)
	}
}

// A check waits for its turn, and no longer than it may.
func TestGateBoundsWaiting(t *testing.T) {
	g := newGate(Limits{Workers: 1, Wait: time.Millisecond})
	done, p := g.work(context.Background())
	if p != nil {
		t.Fatal(p)
	}
	if _, p := g.work(context.Background()); p == nil || p.Status != http.StatusServiceUnavailable || p.header.Get("Retry-After") == "" {
		t.Errorf("%+v", p)
	}
	g.wait = time.Hour
	gone, cancel := context.WithCancel(context.Background())
	cancel()
	if _, p := g.work(gone); p == nil {
		t.Error("a request that is gone works")
	}
	go done()
	next, p := g.work(context.Background())
	if p != nil {
		t.Fatal(p)
	}
	next()
	if len(g.workers) != 0 {
		t.Error("a worker is not free again")
	}
}

// Under more load than it takes the service answers every request, with a report or a problem, and is idle afterwards.
func TestServiceUnderLoad(t *testing.T) {
	o := options()
	o.Limits = Limits{InFlight: 6, PerClient: 4, Workers: 2, Wait: 20 * time.Millisecond}
	h := handler(t, o)
	var wait sync.WaitGroup
	codes := make([]int, 60)
	for i := range codes {
		wait.Go(func() {
			r := request("POST", "/v1/check", oats, "Content-Type: application/json")
			r.RemoteAddr = fmt.Sprintf("192.0.2.%d:1", i%5)
			w := httptest.NewRecorder()
			h.ServeHTTP(w, r)
			codes[i] = w.Code
		})
	}
	wait.Wait()
	count := map[int]int{}
	for _, c := range codes {
		count[c]++
	}
	if count[200] == 0 || count[200]+count[429]+count[503] != len(codes) {
		t.Errorf("%v", count)
	}
	if s := h.(*service); s.gate.all != 0 || len(s.gate.clients) != 0 || len(s.gate.workers) != 0 {
		t.Errorf("left: %d, %v, %d", s.gate.all, s.gate.clients, len(s.gate.workers))
	}
	if w := ask(t, h, "POST", "/v1/check", oats, "Content-Type: application/json"); w.Code != 200 {
		t.Errorf("afterwards: %d", w.Code)
	}
}

// Health answers whatever the load.
func TestHealthIsLetIn(t *testing.T) {
	h := handler(t, options())
	h.(*service).gate.all = 1 << 20
	if w := ask(t, h, "GET", "/health", ""); w.Code != 200 {
		t.Errorf("%d", w.Code)
	}
}
