package web

import (
	"io"
	"log"
	"net"
	"net/http"
	"sync"
	"time"
)

// Times and sizes of a server of its own. A client that is slower than these is cut off.
const (
	headerTimeout = 5 * time.Second
	readTimeout   = 20 * time.Second
	writeTimeout  = 60 * time.Second // from the end of the header; of a batch, for each line
	idleTimeout   = 60 * time.Second
	maxHeader     = 16 << 10
	headerSlop    = 4 << 10 // net/http reads so much more than it is told
	maxConns      = 512
)

// Server is a server for the handler that bounds what a slow or hostile connection can hold.
func Server(h http.Handler) *http.Server {
	s := &http.Server{
		Handler: h, ReadHeaderTimeout: headerTimeout, ReadTimeout: readTimeout, WriteTimeout: writeTimeout, IdleTimeout: idleTimeout,
		MaxHeaderBytes: maxHeader - headerSlop, ErrorLog: log.New(io.Discard, "", 0), // its messages quote requests
		Protocols: new(http.Protocols),
	}
	s.Protocols.SetHTTP1(true)
	return s
}

// Bound lets a listener have a bounded number of connections; more wait in the system's own bounded queue.
func Bound(l net.Listener) net.Listener { return &bounded{l, make(chan struct{}, maxConns)} }

type bounded struct {
	net.Listener
	open chan struct{}
}

// Accept waits for room, too.
func (b *bounded) Accept() (net.Conn, error) {
	b.open <- struct{}{}
	c, err := b.Listener.Accept()
	if err != nil {
		<-b.open
		return nil, err
	}
	return &counted{Conn: c, leave: sync.OnceFunc(func() { <-b.open })}, nil
}

type counted struct {
	net.Conn
	leave func()
}

// Close makes room.
func (c *counted) Close() error {
	defer c.leave()
	return c.Conn.Close()
}
