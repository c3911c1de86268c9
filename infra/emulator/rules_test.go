//go:build deployment

package emulator

import (
	"bytes"
	"net/http"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store"
	"gramlaw/internal/store/bucket"
)

// stored puts the rule set and a later one into a bucket, of which the later is in use.
func stored(t *testing.T) (url string, earlier, later *rulebook.Book) {
	t.Helper()
	url = "file://" + t.TempDir()
	b, _, err := bucket.Open(t.Context(), url)
	if err != nil {
		t.Fatal(err)
	}
	defer b.Close()
	if earlier, err = store.Put(t.Context(), b, os.DirFS("../../rules")); err != nil {
		t.Fatal(err)
	}
	changed := t.TempDir()
	if err := os.CopyFS(changed, os.DirFS("../../rules")); err != nil {
		t.Fatal(err)
	}
	set := filepath.Join(changed, "set.json")
	doc, err := os.ReadFile(set)
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(set, bytes.Replace(doc, []byte(earlier.Version), []byte("2099.1.1"), 1), 0o644); err != nil {
		t.Fatal(err)
	}
	if later, err = store.Put(t.Context(), b, os.DirFS(changed)); err != nil {
		t.Fatal(err)
	}
	if _, err := store.Use(t.Context(), b, later.Digest, nil, time.Now()); err != nil {
		t.Fatal(err)
	}
	return url, earlier, later
}

// The function takes the set in use, or the one that is pinned whatever is in use.
func TestRulesFromABucket(t *testing.T) {
	url, earlier, later := stored(t)
	for name, c := range map[string]struct{ url, want string }{
		"in use": {url, later.Digest},
		"pinned": {url + "#" + earlier.Digest, earlier.Digest},
	} {
		t.Run(name, func(t *testing.T) {
			out := start(t, "check", "GRAMLAW_RULES="+c.url).invoke(event(t, "direct-check"))
			if !bytes.Contains(out, []byte(`"digest":"`+c.want+`"`)) {
				t.Errorf("%.400s", out)
			}
		})
	}
}

// With rules that cannot be had the function does not start, and says why in its log.
func TestRulesThatAreNotThere(t *testing.T) {
	url, _, _ := stored(t)
	f := start(t, "check", "GRAMLAW_RULES="+url+"#sha256:"+strings.Repeat("0", 64))
	r, err := http.Post(f.url, "application/json", bytes.NewReader(event(t, "direct-check")))
	if err != nil {
		t.Fatal(err)
	}
	defer r.Body.Close()
	if log := f.log(); !strings.Contains(log, "the function cannot start") || !strings.Contains(log, store.ErrNoSet.Error()) {
		t.Errorf("status %d, log:\n%s", r.StatusCode, log)
	}
}
