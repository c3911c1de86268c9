package web

import (
	"context"
	"errors"
	"fmt"
	"io"
	"net"
	"net/http"
	"net/http/httptest"
	"os"
	"strings"
	"testing"
	"time"
)

// listen starts a server whose times are shortened; it gives its address.
func listen(t *testing.T, h http.Handler, change func(*http.Server)) string {
	t.Helper()
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	s := Server(h)
	if change != nil {
		change(s)
	}
	ended := make(chan error, 1)
	go func() { ended <- s.Serve(Bound(l)) }()
	t.Cleanup(func() {
		if err := s.Close(); err != nil {
			t.Error(err)
		}
		if err := <-ended; !errors.Is(err, http.ErrServerClosed) {
			t.Error(err)
		}
	})
	return l.Addr().String()
}

func dial(t *testing.T, address string) net.Conn {
	t.Helper()
	c, err := net.Dial("tcp", address)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { c.Close() })
	c.SetDeadline(time.Now().Add(time.Minute))
	return c
}

// talk sends raw text and reads until the server hangs up or answers.
func talk(t *testing.T, c net.Conn, text string) string {
	t.Helper()
	io.WriteString(c, text) // the server may hang up while it is written
	b, err := io.ReadAll(io.LimitReader(c, 1<<16))
	if errors.Is(err, os.ErrDeadlineExceeded) {
		t.Errorf("the connection is held after %.100s", b)
	}
	return string(b)
}

func TestServerHasLimits(t *testing.T) {
	s := Server(http.NotFoundHandler())
	if s.ReadHeaderTimeout <= 0 || s.ReadTimeout <= 0 || s.WriteTimeout <= s.ReadTimeout || s.IdleTimeout <= 0 || s.MaxHeaderBytes <= 0 || s.MaxHeaderBytes > 64<<10 {
		t.Errorf("%+v", s)
	}
	if s.Protocols.HTTP2() || s.Protocols.UnencryptedHTTP2() || !s.Protocols.HTTP1() {
		t.Errorf("protocols %s", s.Protocols)
	}
}

// A client that sends its header, or its body, byte by byte is cut off.
func TestSlowClientsAreCutOff(t *testing.T) {
	address := listen(t, handler(t, options()), func(s *http.Server) {
		s.ReadHeaderTimeout, s.ReadTimeout = 2*time.Second, 4*time.Second
	})
	for _, c := range []struct{ name, text, want string }{
		{"half a header", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: appl", ""},
		{"nothing", "", ""},
		{"half a body", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: application/json\r\nContent-Length: 500\r\n\r\n{\"id\":", "408 Request Timeout"},
		{"half a chunk", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: application/json\r\nTransfer-Encoding: chunked\r\n\r\nff\r\n{\"id\":", "408 Request Timeout"},
	} {
		t.Run(c.name, func(t *testing.T) {
			t.Parallel()
			got := talk(t, dial(t, address), c.text)
			if !strings.Contains(got, c.want) || c.want == "" && strings.Contains(got, " 200 ") {
				t.Errorf("%q", got)
			}
		})
	}
}

func TestHostileRequests(t *testing.T) {
	address := listen(t, handler(t, options()), nil)
	long := strings.Repeat("a", 32<<10)
	for _, c := range []struct{ name, text, want string }{
		{"a header just within the limit", "GET /health HTTP/1.1\r\nHost: x\r\nConnection: close\r\nX: " + long[:15<<10] + "\r\n\r\n", "200 "},
		{"a header just over the limit", "GET /health HTTP/1.1\r\nHost: x\r\nX: " + long[:17<<10] + "\r\n\r\n", "431 "},
		{"a long header", "GET /health HTTP/1.1\r\nHost: x\r\nX: " + long + "\r\n\r\n", "431 "},
		{"many headers", "GET /health HTTP/1.1\r\nHost: x\r\n" + strings.Repeat("X: y\r\n", 8<<10) + "\r\n", "431 "},
		{"a long path", "GET /" + long + " HTTP/1.1\r\nHost: x\r\n\r\n", "431 "},
		{"no host", "GET /health HTTP/1.1\r\n\r\n", "400 "},
		{"two hosts", "GET /health HTTP/1.1\r\nHost: x\r\nHost: y\r\n\r\n", "400 "},
		{"two lengths", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Length: 1\r\nContent-Length: 2\r\n\r\n{}", "400 "},
		{"a negative length", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Length: -1\r\n\r\n", "400 "},
		{"an unknown transfer coding", "POST /v1/check HTTP/1.1\r\nHost: x\r\nTransfer-Encoding: gzip\r\n\r\n", "501 "},
		{"a space in a header's name", "GET /health HTTP/1.1\r\nHost: x\r\nX : y\r\n\r\n", "400 "},
		{"a folded header", "GET /health HTTP/1.1\r\nHost: x\r\n folded\r\n\r\n", "400 "},
		{"no HTTP", "\x16\x03\x01\x02\x00\r\n\r\n", "400 "},
		{"HTTP/2 without encryption", "PRI * HTTP/2.0\r\n\r\nSM\r\n\r\n", "404 "},
		{"everything", "OPTIONS * HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n", "200 "}, // net/http answers that itself
		{"an absolute path of another host", "GET http://example.com/health HTTP/1.1\r\nHost: x\r\nConnection: close\r\n\r\n", "200 "},
		{"a body that is too long", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: application/json\r\nContent-Length: 2000000\r\n\r\n", "413 "},
		{"a body that is too long and expected", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: application/json\r\nContent-Length: 2000000\r\nExpect: 100-continue\r\n\r\n", "413 "},
		{"a wrong type and a body that is expected", "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: text/plain\r\nContent-Length: 20\r\nExpect: 100-continue\r\nConnection: close\r\n\r\n", "415 "},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := talk(t, dial(t, address), c.text)
			if first, _, _ := strings.Cut(got, "\r\n"); !strings.Contains(first, c.want) {
				t.Errorf("%q, want %s", first, c.want)
			}
		})
	}
}

// A batch may take longer than one answer: each line puts the end of the time off.
func TestLinesPutTheDeadlineOff(t *testing.T) {
	w := &deadlines{ResponseRecorder: httptest.NewRecorder()}
	handler(t, options()).ServeHTTP(w, request("POST", "/v1/check/batch", strings.Repeat(oats+"\n", 3), "Content-Type: application/jsonl"))
	if len(w.set) != 3 {
		t.Fatalf("%d deadlines were set", len(w.set))
	}
	for i, d := range w.set {
		if d.Before(time.Now().Add(-writeTimeout)) || i > 0 && !d.After(w.set[i-1]) {
			t.Errorf("line %d: %s after %s", i, d, w.set)
		}
	}
}

type deadlines struct {
	*httptest.ResponseRecorder
	set []time.Time
}

func (d *deadlines) SetWriteDeadline(at time.Time) error {
	d.set = append(d.set, at)
	return nil
}

// What is under way when the server stops is answered.
func TestStoppingFinishesWhatIsUnderWay(t *testing.T) {
	o := options()
	started, go_ := make(chan bool, 1), make(chan bool)
	asked := 0
	o.Now = func() time.Time {
		if asked++; asked == 2 {
			started <- true
			<-go_
		}
		return now()
	}
	var server *http.Server
	address := listen(t, handler(t, o), func(s *http.Server) { server = s })
	answer := make(chan string, 1)
	c := dial(t, address)
	go func() {
		answer <- talk(t, c, "POST /v1/check HTTP/1.1\r\nHost: x\r\nContent-Type: application/json\r\nContent-Length: "+fmt.Sprint(len(oats))+"\r\n\r\n"+oats)
	}()
	<-started
	stopped := make(chan error, 1)
	go func() { stopped <- server.Shutdown(context.Background()) }()
	select {
	case err := <-stopped:
		t.Fatalf("stopped with a request under way: %v", err)
	case <-time.After(50 * time.Millisecond):
	}
	close(go_)
	if got := <-answer; !strings.HasPrefix(got, "HTTP/1.1 200 OK") {
		t.Errorf("%.200s", got)
	}
	if err := <-stopped; err != nil {
		t.Error(err)
	}
}

// No more connections are held than may be; one that ends makes room for the next.
func TestConnectionsAreBounded(t *testing.T) {
	inner, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	b := &bounded{inner, make(chan struct{}, 1)}
	defer b.Close()
	dial(t, inner.Addr().String())
	dial(t, inner.Addr().String())
	first, err := b.Accept()
	if err != nil {
		t.Fatal(err)
	}
	second := make(chan net.Conn, 1)
	go func() {
		c, err := b.Accept()
		if err == nil {
			second <- c
		}
	}()
	select {
	case <-second:
		t.Fatal("two connections at once")
	case <-time.After(50 * time.Millisecond):
	}
	first.Close()
	first.Close() // makes room once
	c := <-second
	if len(b.open) != 1 {
		t.Errorf("%d are counted", len(b.open))
	}
	c.Close()
	if len(b.open) != 0 {
		t.Errorf("%d are counted when none is left", len(b.open))
	}
}
