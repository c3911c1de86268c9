package bucket_test

import (
	"context"
	"errors"
	"io/fs"
	"os"
	"slices"
	"strings"
	"testing"
	"time"

	"gramlaw/internal/store"
	"gramlaw/internal/store/bucket"
	"gramlaw/rules"
)

func TestLoadTakesWhatIsInUseOrPinned(t *testing.T) {
	ctx, dir := context.Background(), t.TempDir()
	url := "file://" + dir + "?prefix=food/"
	b, pinned, err := bucket.Open(ctx, url)
	if err != nil || pinned != "" {
		t.Fatal(pinned, err)
	}
	defer b.Close()
	if _, err := bucket.Load(ctx, url); !errors.Is(err, store.ErrNoCurrent) {
		t.Errorf("an empty store: %v", err)
	}
	book, err := store.Put(ctx, b, rules.FS)
	if err != nil {
		t.Fatal(err)
	}
	if got, err := bucket.Load(ctx, url+"#"+book.Digest); err != nil || got.Digest != book.Digest {
		t.Errorf("pinned: %v", err)
	}
	if _, err := store.Use(ctx, b, book.Digest, nil, time.Unix(0, 0)); err != nil {
		t.Fatal(err)
	}
	if got, err := bucket.Load(ctx, url); err != nil || got.Digest != book.Digest {
		t.Errorf("in use: %v", err)
	}
	if _, err := bucket.Load(ctx, url+"#sha256:1"); err == nil || !strings.Contains(err.Error(), "is no digest") {
		t.Errorf("a wrong digest: %v", err)
	}
	want := []string{"food/current/00000001.json", "food/rulesets/" + strings.TrimPrefix(book.Digest, "sha256:") + "/rules.zip"}
	if got := filesIn(t, dir); !slices.Equal(got, want) {
		t.Errorf("the folder holds %q, want %q", got, want)
	}
}

func filesIn(t *testing.T, dir string) []string {
	t.Helper()
	var out []string
	err := fs.WalkDir(os.DirFS(dir), ".", func(p string, d fs.DirEntry, err error) error {
		if err == nil && !d.IsDir() {
			out = append(out, p)
		}
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

func TestOpenRefuses(t *testing.T) {
	for _, c := range []struct{ name, url string }{
		{"nothing", ""},
		{"no URL", "file://%zz"},
		{"a service nobody links", "ftp://x"},
		{"a folder that is not there", "file:///nowhere/at/all"},
		{"an unknown parameter", "mem://?colour=red"},
	} {
		if b, _, err := bucket.Open(context.Background(), c.url); err == nil {
			t.Errorf("%s: opened", c.name)
			_ = b.Close()
		}
	}
}
