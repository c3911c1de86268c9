package store_test

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"sync"
	"testing"
	"testing/fstest"

	"gocloud.dev/blob"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store"
	"gramlaw/rules"
)

var ctx = context.Background()

// put stores sets and gives their digests.
func put(t *testing.T, b *blob.Bucket, versions ...string) []string {
	t.Helper()
	var digests []string
	for _, v := range versions {
		book, err := store.Put(ctx, b, set(v))
		if err != nil {
			t.Fatal(err)
		}
		digests = append(digests, book.Digest)
	}
	return digests
}

func use(t *testing.T, b *blob.Bucket, digest string, canary *store.Canary) *store.Pointer {
	t.Helper()
	p, err := store.Use(ctx, b, digest, canary, at)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func TestASetComesBackAsItWasStored(t *testing.T) {
	everywhere(t, func(t *testing.T, b *blob.Bucket) {
		want, err := rulebook.Load(rules.FS)
		if err != nil {
			t.Fatal(err)
		}
		stored, err := store.Put(ctx, b, rules.FS)
		if err != nil {
			t.Fatal(err)
		}
		got, err := store.Load(ctx, b, want.Digest)
		if err != nil {
			t.Fatal(err)
		}
		if stored.Digest != want.Digest || got.Digest != want.Digest || got.Version != want.Version || len(rulebook.Difference(want, got)) > 0 {
			t.Errorf("%s %s came back as %s %s", want.Version, want.Digest, got.Version, got.Digest)
		}
	})
}

func TestStoringTwiceStoresOnce(t *testing.T) {
	everywhere(t, func(t *testing.T, b *blob.Bucket) {
		digests := put(t, b, "1", "1", "2")
		list, err := store.List(ctx, b)
		if err != nil {
			t.Fatal(err)
		}
		if len(list) != 2 || digests[0] != digests[1] {
			t.Errorf("%v of %v", list, digests)
		}
	})
}

func TestUseAndBack(t *testing.T) {
	everywhere(t, func(t *testing.T, b *blob.Bucket) {
		if _, err := store.Current(ctx, b); !errors.Is(err, store.ErrNoCurrent) {
			t.Errorf("an empty store has a set in use: %v", err)
		}
		d := put(t, b, "1", "2", "3")
		use(t, b, d[0], nil)
		use(t, b, d[1], &store.Canary{Digest: d[2], Percent: 10})
		use(t, b, d[2], nil)
		for _, want := range []struct {
			number, restores int
			digest           string
			canary           bool
		}{{4, 2, d[1], true}, {5, 1, d[0], false}} {
			if _, err := store.Back(ctx, b, at); err != nil {
				t.Fatal(err)
			}
			p, err := store.Current(ctx, b)
			if err != nil {
				t.Fatal(err)
			}
			if p.Number != want.number || p.Restores != want.restores || p.Digest != want.digest || (p.Canary != nil) != want.canary {
				t.Errorf("%+v; want %+v", p, want)
			}
		}
		_, err := store.Back(ctx, b, at)
		wants(t, err, "nothing before")
		use(t, b, d[1], nil)
		if p, err := store.Back(ctx, b, at); err != nil || p.Digest != d[0] || p.Restores != 1 {
			t.Errorf("%+v, %v", p, err)
		}
		history, err := store.History(ctx, b, 100)
		if err != nil || len(history) != 7 || history[2].Digest != d[2] {
			t.Errorf("%d entries, %v", len(history), err)
		}
		if newest, err := store.History(ctx, b, 2); err != nil || len(newest) != 2 || newest[0].Number != 6 {
			t.Errorf("of the newest two: %+v, %v", newest, err)
		}
	})
}

func TestUseRefuses(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2")
	use(t, b, d[0], nil)
	missing := "sha256:" + fmt.Sprintf("%064d", 0)
	for _, c := range []struct {
		name, digest string
		canary       *store.Canary
		says         string
	}{
		{"no digest", "latest", nil, "is no digest"},
		{"a path", "sha256:../../../etc", nil, "is no digest"},
		{"a set that is not there", missing, nil, "no such rule set"},
		{"a canary that is not there", d[0], &store.Canary{Digest: missing, Percent: 5}, "no such rule set"},
		{"a canary of everything", d[0], &store.Canary{Digest: d[1], Percent: 100}, "1 to 99"},
		{"a canary of nothing", d[0], &store.Canary{Digest: d[1], Percent: 0}, "1 to 99"},
		{"a canary of itself", d[0], &store.Canary{Digest: d[0], Percent: 5}, "is the set in use"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := store.Use(ctx, b, c.digest, c.canary, at)
			wants(t, err, c.says)
		})
	}
	if p, err := store.Current(ctx, b); err != nil || p.Number != 1 {
		t.Errorf("what was refused is in use: %+v, %v", p, err)
	}
}

func TestPutRefusesASetThatFailsLint(t *testing.T) {
	b := open(t, "mem://")
	bad := set("1")
	bad["xx/magic.json"] = &fstest.MapFile{Data: []byte(`{}`)}
	_, err := store.Put(ctx, b, bad)
	wants(t, err, "no known kind")
	if list, err := store.List(ctx, b); !errors.Is(err, nil) || len(list) > 0 {
		t.Errorf("it was stored: %v, %v", list, err)
	}
}

// Ten writers at once: no set is lost, every change is in the history, and numbers do not repeat.
func TestWritersAtOnce(t *testing.T) {
	everywhere(t, func(t *testing.T, b *blob.Bucket) {
		var wait sync.WaitGroup
		errs := make(chan error, 20)
		for i := range 10 {
			wait.Go(func() {
				book, err := store.Put(ctx, b, set(fmt.Sprint(i/2))) // every set from two writers
				errs <- err
				if err == nil {
					_, err = store.Use(ctx, b, book.Digest, nil, at.AddDate(0, 0, i))
					errs <- err
				}
			})
		}
		wait.Wait()
		close(errs)
		for err := range errs {
			if err != nil {
				t.Error(err)
			}
		}
		list, err := store.List(ctx, b)
		history, err2 := store.History(ctx, b, 100)
		if err != nil || err2 != nil || len(list) != 5 || len(history) != 10 {
			t.Fatalf("%d sets, %d entries, %v, %v", len(list), len(history), err, err2)
		}
		for _, p := range history {
			if !slices.ContainsFunc(list, func(s store.Stored) bool { return s.Digest == p.Digest }) {
				t.Errorf("entry %d names a set that is not stored", p.Number)
			}
		}
	})
}

// Going back while another set comes into use either comes first or is told.
func TestBackIsToldOfAnotherWriter(t *testing.T) {
	b := open(t, "mem://")
	d := put(t, b, "1", "2", "3")
	use(t, b, d[0], nil)
	use(t, b, d[1], nil)
	var wait sync.WaitGroup
	errs := make([]error, 8)
	for i := range errs {
		wait.Go(func() {
			if i%2 == 0 {
				_, errs[i] = store.Use(ctx, b, d[2], nil, at.AddDate(0, 0, i))
			} else if _, errs[i] = store.Back(ctx, b, at.AddDate(0, 0, i)); errors.Is(errs[i], store.ErrMoved) {
				errs[i] = nil
			}
		})
	}
	wait.Wait()
	history, err := store.History(ctx, b, 100)
	if err != nil {
		t.Fatal(err)
	}
	for i, p := range history {
		if p.Number != i+1 {
			t.Errorf("entry %d has the number %d", i+1, p.Number)
		}
	}
}
