package store_test

import (
	"context"
	"net/http"
	"net/http/httptest"
	"strings"
	"sync/atomic"
	"testing"
	"testing/fstest"
	"time"

	"github.com/johannesboyne/gofakes3"
	"github.com/johannesboyne/gofakes3/backend/s3mem"
	"gocloud.dev/blob"

	"gramlaw/internal/store/bucket"
)

const source = `"source":{"ref":"x","evidence":"memory","force":"law"}`

// set is a small rule set that passes lint; version makes its digest.
func set(version string) fstest.MapFS {
	return fstest.MapFS{
		"README.md":            {Data: []byte("no part of the set")},
		"set.json":             {Data: []byte(`{"version":"` + version + `"}`)},
		"xx/jurisdiction.json": {Data: []byte(`{"jurisdiction":"xx","name":"X","languages":["en"],"editions":[],"assumed":[],"unlisted_claims":null,"bases":[{"per":"100 g","presence":"mandatory"}],"gaps":[],"caution":"c"}`)},
		"xx/definitions.json":  {Data: []byte(`{"jurisdiction":"xx","rules":[{"id":"xx/quantity/fat","versions":[{"from":"2000-01-01","name":{"en":"fat"},"unit":"g","ways":[{"sum":{"FAT":"1"}}],` + source + `}]}]}`)},
	}
}

var at = time.Date(2026, 12, 1, 9, 0, 0, 0, time.UTC)

// A server speaks S3, with faults before it.
type server struct {
	url   string
	fault atomic.Pointer[func(w http.ResponseWriter, r *http.Request) bool] // tells whether it has answered
	calls atomic.Int64
	fake  http.Handler
}

func (s *server) inject(fault func(w http.ResponseWriter, r *http.Request) bool) {
	s.fault.Store(&fault)
}

func newServer(t *testing.T) *server {
	t.Helper()
	backend := s3mem.New()
	if err := backend.CreateBucket("rules"); err != nil {
		t.Fatal(err)
	}
	s := &server{fake: gofakes3.New(backend).Server()}
	web := httptest.NewServer(http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		s.calls.Add(1)
		if f := s.fault.Load(); f != nil && (*f)(w, r) {
			return
		}
		s.fake.ServeHTTP(w, r)
	}))
	t.Cleanup(web.Close)
	for name, value := range map[string]string{"AWS_ACCESS_KEY_ID": "key", "AWS_SECRET_ACCESS_KEY": "secret", "AWS_EC2_METADATA_DISABLED": "true", "AWS_CONFIG_FILE": "none", "AWS_SHARED_CREDENTIALS_FILE": "none"} {
		t.Setenv(name, value)
	}
	s.url = "s3://rules?region=us-east-1&use_path_style=true&endpoint=" + web.URL
	return s
}

func open(t *testing.T, url string) *blob.Bucket {
	t.Helper()
	b, _, err := bucket.Open(context.Background(), url)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = b.Close() })
	return b
}

// everywhere runs a test in memory, in a folder, in S3, and in a folder of a bucket.
func everywhere(t *testing.T, test func(t *testing.T, b *blob.Bucket)) {
	for name, url := range map[string]func(t *testing.T) string{
		"memory": func(*testing.T) string { return "mem://" },
		"folder": func(t *testing.T) string { return "file://" + t.TempDir() },
		"S3":     func(t *testing.T) string { return newServer(t).url },
		"prefix": func(t *testing.T) string { return newServer(t).url + "&prefix=food/rules/" },
	} {
		t.Run(name, func(t *testing.T) { test(t, open(t, url(t))) })
	}
}

// wants fails unless the error says something.
func wants(t *testing.T, err error, says string) {
	t.Helper()
	if err == nil || !strings.Contains(err.Error(), says) {
		t.Errorf("%v; want something with %q", err, says)
	}
}
