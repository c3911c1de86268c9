package desk

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"net"
	"net/http"
	"os"
	"os/signal"
	"syscall"
	"time"

	"gramlaw/internal/web"
)

const serveUsage = `Answers over HTTP on this machine until it is interrupted: POST /v1/check takes a
recipe, /openapi.json describes the rest. What is under way when the interrupt
comes is finished first.

Usage: desk serve [flags]

Whoever reaches the address can use it: there are no accounts and no encryption.
Logs go to standard error and hold nothing of a recipe.
`

const (
	patience = 30 * time.Second // for what is under way
	asJSON   = "json"
)

type serveOptions struct {
	listen, log, rules string
	metrics            bool
}

func serveFlags(o *serveOptions) *flags {
	f := newFlags("serve")
	f.StringVar(&o.listen, "listen", "127.0.0.1:8080", "`ADDRESS` and port (without it 127.0.0.1:8080); port 0 takes a free one")
	f.StringVar(&o.log, "log", "text", "`text` or json (without it text)")
	rulesFlag(f, &o.rules)
	f.BoolVar(&o.metrics, "metrics", false, "write measurements to standard output, one line of JSON a request")
	return f
}

// runServe listens and serves.
func runServe(c *call) (int, error) {
	var o serveOptions
	args, err := serveFlags(&o).parse(c.args)
	switch {
	case err != nil:
		return 0, err
	case len(args) > 0:
		return 0, fmt.Errorf("%q is not wanted; desk serve takes flags only", args[0])
	case o.log != "text" && o.log != asJSON:
		return 0, fmt.Errorf("-log: %q is neither text nor json", o.log)
	}
	c.place = o.rules
	log := slog.New(slog.NewTextHandler(c.stderr, nil))
	if o.log == asJSON {
		log = slog.New(slog.NewJSONHandler(c.stderr, nil))
	}
	rules, err := c.source(log)
	if err != nil {
		return 0, err
	}
	l, err := net.Listen("tcp", o.listen)
	if err != nil {
		return 0, errors.Join(fmt.Errorf("-listen: %w", err), rules.close())
	}
	return AllWell, errors.Join(c.serve(l, rules, log, &o), rules.close())
}

func (c *call) serve(l net.Listener, rules *ruleSource, log *slog.Logger, o *serveOptions) error {
	options := web.Options{Rules: rules.set, Now: c.env.Now, Version: web.Build(), Log: log}
	if o.metrics {
		options.Metrics = c.stdout
	}
	h, err := web.New(options)
	if err != nil {
		return errors.Join(err, l.Close())
	}
	first := rules.set(context.Background(), "").Book
	log.Info("listening", "url", "http://"+l.Addr().String(), "version", options.Version, "rules_version", first.Version, "rules_digest", first.Digest)
	if a, ok := l.Addr().(*net.TCPAddr); ok && !a.IP.IsLoopback() {
		log.Warn("other machines may reach this address; there are no accounts and no encryption")
	}
	return untilInterrupted(web.Server(h), web.Bound(l), log)
}

// untilInterrupted serves until the first interrupt, then finishes what is under way; a second interrupt ends at once.
func untilInterrupted(s *http.Server, l net.Listener, log *slog.Logger) error {
	interrupted, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	ended := make(chan error, 1)
	go func() { ended <- s.Serve(l) }()
	select {
	case err := <-ended:
		return err
	case <-interrupted.Done():
	}
	stop()
	log.Info("stopping: what is under way is finished first")
	ctx, cancel := context.WithTimeout(context.Background(), patience)
	defer cancel()
	if err := s.Shutdown(ctx); err != nil {
		return errors.Join(fmt.Errorf("after %s something was still under way", patience), s.Close())
	}
	log.Info("stopped")
	return nil
}
