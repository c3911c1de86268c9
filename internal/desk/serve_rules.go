package desk

import (
	"context"
	"errors"
	"fmt"
	"log/slog"

	"gocloud.dev/blob"

	"gramlaw/internal/store"
	"gramlaw/internal/store/bucket"
	"gramlaw/internal/web"
)

// A ruleSource gives each request its rules until it is closed.
type ruleSource struct {
	set    func(ctx context.Context, requestID string) web.Rules
	bucket *blob.Bucket
}

func (s *ruleSource) close() error {
	if s.bucket == nil {
		return nil
	}
	return s.bucket.Close()
}

// source is one set for good, or what is in use in a store.
func (c *call) source(log *slog.Logger) (*ruleSource, error) {
	if bucket.IsURL(c.place) {
		if s, err := c.followed(log); s != nil || err != nil {
			return s, err
		}
	}
	book, err := c.rules()
	if err != nil {
		return nil, err
	}
	return &ruleSource{set: web.Always(web.Rules{Book: book, Loaded: c.env.Now()})}, nil
}

// followed is a store whose set in use is followed; nil where the URL names one set.
func (c *call) followed(log *slog.Logger) (*ruleSource, error) {
	b, digest, err := bucket.Open(context.Background(), c.place)
	if err != nil {
		return nil, err
	}
	if digest != "" {
		return nil, b.Close()
	}
	r, err := store.NewReloader(context.Background(), b, store.Options{Now: c.env.Now, Failed: func(err error) {
		log.Error("the rule set in use cannot be followed; the one in memory stays", "cause", err.Error())
	}})
	if err != nil {
		return nil, errors.Join(fmt.Errorf("the rule set cannot be used:\n%w", err), b.Close())
	}
	return &ruleSource{bucket: b, set: func(ctx context.Context, id string) web.Rules {
		s, state := r.Set(ctx, id), r.State()
		return web.Rules{Book: s.Book, Loaded: s.Loaded, Canary: s.Canary, Read: state.Read, Stale: state.Failed != nil}
	}}, nil
}
