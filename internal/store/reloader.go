package store

import (
	"context"
	"sync"
	"sync/atomic"
	"time"

	"gocloud.dev/blob"

	"gramlaw/internal/rulebook"
)

// Options of a Reloader. Zero fields take the defaults.
type Options struct {
	Every   time.Duration    // how often at most the history is read; default 30 s
	Timeout time.Duration    // of one reading with all it loads; default 5 s
	Now     func() time.Time // clock; default time.Now
	Failed  func(error)      // told when a reading fails and the sets in memory stay; default nobody
}

// A Reloader holds the sets in use. It reads the history inside a request, one request at a time, because a function's processor stands
// still between requests; the others are answered with what is in memory.
type Reloader struct {
	bucket  *blob.Bucket
	options Options
	reading sync.Mutex
	holds   atomic.Pointer[holding]
	state   atomic.Pointer[State]
}

// A Set is a rule set in memory.
type Set struct {
	Book   *rulebook.Book
	Loaded time.Time
	Canary bool // on trial beside the set in use
}

// holding is an entry with the sets it names. A canary that cannot be used is missing.
type holding struct {
	entry *Pointer
	sets  map[string]Set
}

// A State is what /health tells.
type State struct {
	Entry  Pointer   // the entry whose sets are in memory
	Read   time.Time // when the history was last read without an error
	Tried  time.Time // when it was last read
	Failed error     // of the last reading; nil when all is well
}

// NewReloader loads the sets in use. It fails when they cannot be used, and later never: what is in memory stays then.
func NewReloader(ctx context.Context, b *blob.Bucket, o Options) (*Reloader, error) {
	if o.Every == 0 {
		o.Every = 30 * time.Second
	}
	if o.Timeout == 0 {
		o.Timeout = 5 * time.Second
	}
	if o.Now == nil {
		o.Now = time.Now
	}
	if o.Failed == nil {
		o.Failed = func(error) {}
	}
	ctx, cancel := context.WithTimeout(ctx, o.Timeout)
	defer cancel()
	p, err := Current(ctx, b)
	if err != nil {
		return nil, err
	}
	r := &Reloader{bucket: b, options: o}
	h, bad := r.load(ctx, p, nil)
	if h == nil {
		return nil, bad
	}
	r.holds.Store(h)
	r.told(h, bad, o.Now(), o.Now())
	return r, nil
}

// Set gives the set that answers a request, after a look at the history if one is due.
func (r *Reloader) Set(ctx context.Context, requestID string) Set {
	r.refresh(ctx)
	h := r.holds.Load()
	if s, ok := h.sets[h.entry.Choose(requestID)]; ok {
		return s
	}
	return h.sets[h.entry.Digest]
}

// State tells which sets are in memory and how old that knowledge is.
func (r *Reloader) State() State { return *r.state.Load() }

func (r *Reloader) due() bool { return r.options.Now().Sub(r.state.Load().Tried) >= r.options.Every }

// refresh reads the history when that is due and nobody else does.
func (r *Reloader) refresh(ctx context.Context) {
	if !r.due() || !r.reading.TryLock() {
		return
	}
	defer r.reading.Unlock()
	if !r.due() {
		return
	}
	ctx, cancel := context.WithTimeout(context.WithoutCancel(ctx), r.options.Timeout)
	defer cancel()
	now, old := r.options.Now(), r.holds.Load()
	h, err := r.next(ctx, old)
	if h != nil {
		r.holds.Store(h)
		r.told(h, err, now, now)
	} else {
		r.told(old, err, r.state.Load().Read, now)
	}
}

// told keeps the state, and passes a failure on.
func (r *Reloader) told(h *holding, failed error, read, tried time.Time) {
	r.state.Store(&State{Entry: *h.entry, Read: read, Tried: tried, Failed: failed})
	if failed != nil {
		r.options.Failed(failed)
	}
}

// next is what holds now; nil with an error when it cannot be used.
func (r *Reloader) next(ctx context.Context, old *holding) (*holding, error) {
	p, err := follow(ctx, r.bucket, old.entry)
	if err != nil {
		return nil, err
	}
	if p.Number == old.entry.Number && len(old.sets) == p.named() {
		return old, nil
	}
	return r.load(ctx, p, old.sets)
}

// named counts the sets of an entry.
func (p *Pointer) named() int {
	if p.Canary == nil {
		return 1
	}
	return 2
}

// load gets the sets of an entry, from memory where they are there. Without its main set there is no holding; a canary that fails is
// left out with an error.
func (r *Reloader) load(ctx context.Context, p *Pointer, have map[string]Set) (*holding, error) {
	main, err := r.set(ctx, p.Digest, have)
	if err != nil {
		return nil, err
	}
	h := &holding{p, map[string]Set{p.Digest: main}}
	if p.Canary == nil {
		return h, nil
	}
	trial, err := r.set(ctx, p.Canary.Digest, have)
	if err == nil {
		trial.Canary = true
		h.sets[p.Canary.Digest] = trial
	}
	return h, err
}

func (r *Reloader) set(ctx context.Context, digest string, have map[string]Set) (Set, error) {
	if s, ok := have[digest]; ok {
		s.Canary = false
		return s, nil
	}
	book, err := Load(ctx, r.bucket, digest)
	return Set{Book: book, Loaded: r.options.Now()}, err
}
