package main

import (
	"context"
	"log/slog"
	"time"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store"
	"gramlaw/internal/store/bucket"
	"gramlaw/internal/web"
	"gramlaw/rules"
)

// source gives the rules of each request: those that the program carries, those of a digest, or those in use in a bucket, looked at
// again from time to time. Rules that cannot be had keep the function from starting: a label by other rules than those in use is worse
// than none.
func source(ctx context.Context, url string, log *slog.Logger) (func(context.Context, string) web.Rules, error) {
	if url == "" {
		book, err := rulebook.Load(rules.FS)
		return web.Always(web.Rules{Book: book, Loaded: time.Now()}), err
	}
	b, digest, err := bucket.Open(ctx, url)
	if err != nil {
		return nil, err
	}
	if digest != "" {
		book, err := store.Load(ctx, b, digest)
		return web.Always(web.Rules{Book: book, Loaded: time.Now()}), err
	}
	r, err := store.NewReloader(ctx, b, store.Options{Failed: func(err error) { log.Error("rules not reloaded", "cause", err.Error()) }})
	if err != nil {
		return nil, err
	}
	return func(ctx context.Context, requestID string) web.Rules {
		set, state := r.Set(ctx, requestID), r.State()
		return web.Rules{Book: set.Book, Loaded: set.Loaded, Canary: set.Canary, Read: state.Read, Stale: state.Failed != nil}
	}, nil
}
