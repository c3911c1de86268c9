package store_test

import (
	"context"
	"errors"
	"fmt"
	"strings"
	"sync"
	"sync/atomic"
	"testing"
	"time"

	"gocloud.dev/blob"

	"gramlaw/internal/store"
)

// A clock is moved by hand.
type clock struct{ seconds atomic.Int64 }

func (c *clock) now() time.Time { return at.Add(time.Duration(c.seconds.Load()) * time.Second) }

func reloader(t *testing.T, b *blob.Bucket, c *clock) *store.Reloader {
	t.Helper()
	r, err := store.NewReloader(ctx, b, store.Options{Every: 30 * time.Second, Now: c.now})
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func TestReloaderFollowsWhatIsInUse(t *testing.T) {
	everywhere(t, func(t *testing.T, b *blob.Bucket) {
		d := put(t, b, "1", "2")
		use(t, b, d[0], nil)
		var c clock
		r := reloader(t, b, &c)
		use(t, b, d[1], nil)
		use(t, b, d[0], nil)
		use(t, b, d[1], nil)
		for _, step := range []struct {
			second int64
			want   string
			loaded int64
		}{{0, "1", 0}, {29, "1", 0}, {30, "2", 30}, {31, "2", 30}, {90, "2", 30}} {
			c.seconds.Store(step.second)
			got := r.Set(ctx, "request")
			if got.Book.Version != step.want || !got.Loaded.Equal(at.Add(time.Duration(step.loaded)*time.Second)) {
				t.Errorf("second %d: version %s loaded %s", step.second, got.Book.Version, got.Loaded)
			}
		}
		if s := r.State(); s.Entry.Number != 4 || s.Failed != nil || !s.Read.Equal(c.now()) {
			t.Errorf("%+v", s)
		}
	})
}

func TestReloaderGivesTheCanaryItsRequests(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2")
	p := use(t, b, d[0], &store.Canary{Digest: d[1], Percent: 30})
	var c clock
	r := reloader(t, b, &c)
	seen := map[bool]int{}
	for i := range 200 {
		id := fmt.Sprint(i)
		got := r.Set(ctx, id)
		seen[got.Canary]++
		if got.Book.Digest != p.Choose(id) || got.Canary != (got.Book.Digest == d[1]) {
			t.Errorf("request %s has %s", id, got.Book.Digest)
		}
	}
	if seen[true] == 0 || seen[false] == 0 {
		t.Errorf("%v", seen)
	}
	use(t, b, d[1], nil) // the canary is taken over
	c.seconds.Store(60)
	if got := r.Set(ctx, "1"); got.Book.Version != "2" || got.Canary || !got.Loaded.Equal(at) {
		t.Errorf("%+v; the set in memory was to be kept", got)
	}
}

// spoil replaces a stored set by what cannot be read, as no writer of this package would.
func spoil(t *testing.T, b *blob.Bucket, digest string) {
	t.Helper()
	lay(t, b, digest, []byte("PK"))
}

func TestReloaderKeepsWhatWorks(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2", "3")
	use(t, b, d[0], nil)
	var c clock
	r := reloader(t, b, &c)
	use(t, b, d[1], nil)
	spoil(t, b, d[1])
	c.seconds.Store(40)
	if got := r.Set(ctx, "1"); got.Book.Version != "1" {
		t.Errorf("version %s answers", got.Book.Version)
	}
	if s := r.State(); !errors.Is(s.Failed, store.ErrBadSet) || s.Entry.Number != 1 || !s.Read.Equal(at) || !s.Tried.Equal(c.now()) {
		t.Errorf("%+v", s)
	}
	use(t, b, d[2], nil)
	c.seconds.Store(80)
	if got := r.Set(ctx, "1"); got.Book.Version != "3" || r.State().Failed != nil {
		t.Errorf("version %s answers, %v", got.Book.Version, r.State().Failed)
	}
}

func TestABrokenCanaryLeavesTheSetInUse(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2")
	use(t, b, d[0], &store.Canary{Digest: d[1], Percent: 99})
	spoil(t, b, d[1])
	var c clock
	r := reloader(t, b, &c)
	for i := range 50 {
		if got := r.Set(ctx, fmt.Sprint(i)); got.Book.Version != "1" {
			t.Fatalf("version %s answers", got.Book.Version)
		}
	}
	if !errors.Is(r.State().Failed, store.ErrBadSet) {
		t.Errorf("%v", r.State().Failed)
	}
}

func TestReloaderDoesNotStartWithoutASet(t *testing.T) {
	b := open(t, "mem://")
	if _, err := store.NewReloader(ctx, b, store.Options{}); !errors.Is(err, store.ErrNoCurrent) {
		t.Errorf("an empty store: %v", err)
	}
	d := put(t, b, "1")
	use(t, b, d[0], nil)
	spoil(t, b, d[0])
	if _, err := store.NewReloader(ctx, b, store.Options{}); !errors.Is(err, store.ErrBadSet) {
		t.Errorf("a broken set: %v", err)
	}
}

// A store that hangs holds up one request for no longer than the timeout, and no other.
func TestAStoreThatHangs(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	use(t, b, put(t, b, "1")[0], nil)
	var c clock
	var told atomic.Int64
	r, err := store.NewReloader(ctx, b, store.Options{Every: 30 * time.Second, Timeout: 200 * time.Millisecond, Now: c.now, Failed: func(error) { told.Add(1) }})
	if err != nil {
		t.Fatal(err)
	}
	s.inject(times(1000, never))
	c.seconds.Store(60)
	var wait sync.WaitGroup
	for i := range 20 {
		wait.Go(func() {
			if got := r.Set(ctx, fmt.Sprint(i)); got.Book.Version != "1" {
				t.Errorf("version %s", got.Book.Version)
			}
		})
	}
	wait.Wait()
	if !errors.Is(r.State().Failed, context.DeadlineExceeded) || told.Load() != 1 {
		t.Errorf("%v, told %d times", r.State().Failed, told.Load())
	}
}

// A caller that goes away does not end the reading for the others.
func TestACallerThatGoesAway(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	d := put(t, b, "1", "2")
	use(t, b, d[0], nil)
	var c clock
	r := reloader(t, b, &c)
	use(t, b, d[1], nil)
	gone, cancel := context.WithCancel(ctx)
	cancel()
	c.seconds.Store(60)
	if got := r.Set(gone, "1"); got.Book.Version != "2" {
		t.Errorf("version %s, %v", got.Book.Version, r.State().Failed)
	}
}

// Looking costs one request that finds nothing new, and none in between.
func TestLookingIsCheap(t *testing.T) {
	s := newServer(t)
	b := open(t, s.url)
	use(t, b, put(t, b, "1")[0], nil)
	var c clock
	r := reloader(t, b, &c)
	for _, step := range []struct{ second, calls int64 }{{10, 0}, {40, 1}, {50, 0}, {80, 1}} {
		before := s.calls.Load()
		c.seconds.Store(step.second)
		r.Set(ctx, "1")
		if n := s.calls.Load() - before; n != step.calls {
			t.Errorf("second %d: %d requests, want %d", step.second, n, step.calls)
		}
	}
}

func TestSetsChangeUnderLoad(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2")
	use(t, b, d[0], nil)
	var c clock
	r := reloader(t, b, &c)
	var wait sync.WaitGroup
	for range 4 {
		wait.Go(func() {
			for i := range 300 {
				c.seconds.Add(7)
				if v := r.Set(ctx, fmt.Sprint(i)).Book.Version; !strings.Contains("12", v) {
					t.Errorf("version %q", v)
				}
				_ = r.State()
			}
		})
	}
	wait.Go(func() {
		for i := range 20 {
			if _, err := store.Use(ctx, b, d[i%2], nil, at); err != nil {
				t.Error(err)
			}
		}
	})
	wait.Wait()
}
