package web

import (
	"context"
	"net"
	"net/http"
	"net/netip"
	"sync"
	"time"
)

// A gate bounds the requests at work or waiting, over all and of one client, and the checks at the same time. Whoever does not find room is
// told at once or after a bounded wait; there is no queue beyond that.
type gate struct {
	inFlight, perClient int
	wait                time.Duration
	workers             chan struct{}

	mu      sync.Mutex
	all     int
	clients map[string]int
}

func newGate(l Limits) *gate {
	return &gate{inFlight: l.InFlight, perClient: l.PerClient, wait: l.Wait, workers: make(chan struct{}, l.Workers), clients: map[string]int{}}
}

// enter lets a request in until leave is called.
func (g *gate) enter(client string) (leave func(), p *Problem) {
	g.mu.Lock()
	defer g.mu.Unlock()
	switch {
	case g.clients[client] >= g.perClient:
		return nil, problem(tooMany, "").with("Retry-After", "1")
	case g.all >= g.inFlight:
		return nil, problem(busy, "").with("Retry-After", "1")
	}
	g.all++
	g.clients[client]++
	return func() { g.leave(client) }, nil
}

func (g *gate) leave(client string) {
	g.mu.Lock()
	defer g.mu.Unlock()
	g.all--
	if g.clients[client]--; g.clients[client] == 0 {
		delete(g.clients, client)
	}
}

// work waits for a worker until done is called.
func (g *gate) work(ctx context.Context) (done func(), p *Problem) {
	done = func() { <-g.workers }
	select {
	case g.workers <- struct{}{}:
		return done, nil
	default:
	}
	patience := time.NewTimer(g.wait)
	defer patience.Stop()
	select {
	case g.workers <- struct{}{}:
		return done, nil
	case <-patience.C:
	case <-ctx.Done():
	}
	return nil, problem(busy, "").with("Retry-After", "2")
}

// client is the address a request comes from; of IPv6 the network, since one client has all of it. Forwarding headers are not believed.
func client(r *http.Request) string {
	host, _, err := net.SplitHostPort(r.RemoteAddr)
	if err != nil {
		host = r.RemoteAddr
	}
	ip, err := netip.ParseAddr(host)
	if err != nil || ip.Unmap().Is4() {
		return host
	}
	network, err := ip.Prefix(64)
	if err != nil {
		return host
	}
	return network.Addr().String()
}
