package recheck

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"fmt"
	"io"
	"strings"
	"sync"

	"gocloud.dev/blob"

	"gramlaw/internal/check"
)

// A Step is one comparison of a run: the day before a change and the day of it, or two sets.
type Step struct {
	From, To string
	Plan     *Plan
}

// A Run compares every recipe of a bucket and writes to another what it finds. Recipes are the objects whose names end in .json, but for
// those under own/, which are the maker's own ingredients. What is found is written in parts, one for a batch of recipes, and joined at the
// end; a run that was stopped goes on where it was when it is started again, and ends in the same bytes.
type Run struct {
	Recipes, Out *blob.Bucket
	Steps        []Step
	Batch        int                               // recipes in a part; 0 is 200
	Workers      int                               // 0 is 1
	Progress     func(Counts)                      // called now and then, from any goroutine, one call at a time
	Wait         func(attempt int) <-chan struct{} // before an attempt that follows a failed one
}

// Counts tell how far a run is. Seen is Unchanged, Changed and Failed together.
type Counts struct {
	Seen      int `json:"seen"`
	Unchanged int `json:"unchanged"`
	Changed   int `json:"changed"`
	Failed    int `json:"failed"`
}

func (c *Counts) add(d Counts) {
	c.Seen, c.Unchanged, c.Changed, c.Failed = c.Seen+d.Seen, c.Unchanged+d.Unchanged, c.Changed+d.Changed, c.Failed+d.Failed
}

// Whole tells whether every recipe seen is accounted for.
func (c Counts) Whole() bool { return c.Seen == c.Unchanged+c.Changed+c.Failed }

// A Found is what one step changes for one recipe: a line of changes.jsonl.
type Found struct {
	Key  string `json:"key"` // name of the recipe's object
	From string `json:"from"`
	To   string `json:"to"`
	Outcome
}

// A Failure is a recipe that could not be compared: a line of failed.jsonl.
type Failure struct {
	Key    string  `json:"key"`
	Code   string  `json:"code"` // "document", "check", "too-large", "storage" or "own-ingredient"
	Says   string  `json:"says"`
	Faults []Fault `json:"faults,omitempty"`
}

// A Fault is a fault of the recipe document.
type Fault struct {
	Pointer string `json:"pointer"`
	Code    string `json:"code"`
	Says    string `json:"says"`
}

// part is what a batch came to.
type part struct {
	Counts Counts    `json:"counts"`
	Found  []Found   `json:"found"`
	Failed []Failure `json:"failed"`
}

// Do runs and gives the summary, which stands in summary.json too.
func (r *Run) Do(ctx context.Context) (*Summary, error) {
	ctx, stop := context.WithCancel(ctx)
	defer stop()
	batches := make(chan batch)
	w := &work{Run: r, id: r.id()}
	w.own = &own{w: w, read: map[string]*ownIngredient{}}
	var group sync.WaitGroup
	for range max(r.Workers, 1) {
		group.Go(func() {
			for b := range batches {
				if err := w.batch(ctx, b); err != nil {
					w.fail(err)
					stop()
				}
			}
		})
	}
	parts, err := w.list(ctx, batches)
	close(batches)
	group.Wait()
	if w.failed != nil {
		return nil, w.failed
	}
	if err != nil {
		return nil, err
	}
	return w.join(ctx, parts)
}

// id names the run: what is compared with what. Parts of other runs are never taken for its own.
func (r *Run) id() string {
	h := sha256.New()
	for _, s := range r.Steps {
		fmt.Fprintln(h, s.From, s.To, s.Plan.was.Book.Digest, s.Plan.is.Book.Digest, s.Plan.request.In, s.Plan.request.Transition, s.Plan.request.Without, check.Caution)
	}
	return hex.EncodeToString(h.Sum(nil))[:16]
}

// A batch is a list of objects, in the order of their names. Its name tells what is in it, so that a part is only taken for the same recipes.
type batch struct {
	name    string
	objects []*blob.ListObject
}

const partsPrefix, ownPrefix = "parts/", "own/"

// list goes through the bucket in pages and hands out batches. It gives the names of all parts, in order.
func (w *work) list(ctx context.Context, out chan<- batch) ([]string, error) {
	var parts []string
	var objects []*blob.ListObject
	hand := func() error {
		if len(objects) == 0 {
			return nil
		}
		b := batch{name: w.partName(len(parts), objects), objects: objects}
		parts, objects = append(parts, b.name), nil
		select {
		case out <- b:
			return nil
		case <-ctx.Done():
			return ctx.Err()
		}
	}
	for token := blob.FirstPageToken; ; {
		page, next, err := w.page(ctx, token)
		if err != nil {
			return nil, fmt.Errorf("the recipes cannot be listed: %w", err)
		}
		for _, o := range page {
			if o.IsDir || !strings.HasSuffix(o.Key, ".json") || strings.HasPrefix(o.Key, ownPrefix) || strings.HasPrefix(o.Key, partsPrefix) || o.Key == SummaryName {
				continue
			}
			if objects = append(objects, o); len(objects) == w.batchSize() {
				if err := hand(); err != nil {
					return nil, err
				}
			}
		}
		if len(next) == 0 {
			err := hand()
			return parts, err
		}
		token = next
	}
}

func (r *Run) batchSize() int {
	if r.Batch > 0 {
		return r.Batch
	}
	return 200
}

func (w *work) partName(n int, objects []*blob.ListObject) string {
	h := sha256.New()
	for _, o := range objects {
		fmt.Fprintln(h, o.Key, o.Size, hex.EncodeToString(o.MD5), o.ModTime.UnixNano())
	}
	return fmt.Sprintf("%s%s/%08d-%s.json", partsPrefix, w.id, n, hex.EncodeToString(h.Sum(nil))[:16])
}

// work is a run that goes on.
type work struct {
	*Run
	id  string
	own *own

	mu     sync.Mutex
	counts Counts
	failed error
}

func (w *work) fail(err error) {
	w.mu.Lock()
	defer w.mu.Unlock()
	if w.failed == nil {
		w.failed = err
	}
}

// batch does one batch, unless its part is there already.
func (w *work) batch(ctx context.Context, b batch) error {
	var p part
	done, err := w.readPart(ctx, b.name, &p)
	if err != nil {
		return err
	}
	if !done {
		if p, err = w.compare(ctx, b); err != nil {
			return err
		}
		if err := w.write(ctx, b.name, func(to io.Writer) error { return json.NewEncoder(to).Encode(&p) }); err != nil {
			return fmt.Errorf("%s cannot be written: %w", b.name, err)
		}
	}
	w.mu.Lock()
	defer w.mu.Unlock()
	w.counts.add(p.Counts)
	if w.Progress != nil {
		w.Progress(w.counts)
	}
	return nil
}

// readPart reads a part that an earlier start wrote; a broken one is as good as none.
func (w *work) readPart(ctx context.Context, name string, p *part) (bool, error) {
	there, err := w.Out.Exists(ctx, name)
	if err != nil || !there {
		return false, err
	}
	doc, err := w.Out.ReadAll(ctx, name)
	if err != nil {
		return false, err
	}
	if json.Unmarshal(doc, p) != nil || !p.Counts.Whole() {
		*p = part{}
		return false, nil
	}
	return true, nil
}

// compare compares the recipes of a batch one by one. One that cannot be compared fails alone.
func (w *work) compare(ctx context.Context, b batch) (part, error) {
	var p part
	for _, o := range b.objects {
		if ctx.Err() != nil {
			return p, ctx.Err()
		}
		p.Counts.Seen++
		found, failure := w.recipe(ctx, o)
		switch {
		case ctx.Err() != nil:
			return p, ctx.Err()
		case failure != nil:
			p.Counts.Failed++
			p.Failed = append(p.Failed, *failure)
		case len(found) == 0:
			p.Counts.Unchanged++
		default:
			p.Counts.Changed++
			p.Found = append(p.Found, found...)
		}
	}
	return p, nil
}
