package store

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
)

var one, two = "sha256:" + strings.Repeat("1", 64), "sha256:" + strings.Repeat("2", 64)

func TestTheCanaryHasItsShareOfRequests(t *testing.T) {
	const requests = 20000
	for _, percent := range []int{1, 5, 50, 99} {
		p := &Pointer{Digest: one, Canary: &Canary{Digest: two, Percent: percent}}
		hits := 0
		for i := range requests {
			if p.Choose(fmt.Sprint("request-", i)) == two {
				hits++
			}
		}
		if share := hits * 100; share < requests*percent*85/100-requests/5 || share > requests*percent*115/100+requests/5 {
			t.Errorf("%d per cent: %d of %d requests", percent, hits, requests)
		}
	}
}

func TestTheCanaryIsChosenByTheRequest(t *testing.T) {
	small := &Pointer{Digest: one, Canary: &Canary{Digest: two, Percent: 10}}
	large := &Pointer{Digest: one, Canary: &Canary{Digest: two, Percent: 30}}
	for i := range 1000 {
		id := fmt.Sprint(i)
		if first, again := small.Choose(id), small.Choose(id); first != again {
			t.Fatalf("request %s has two answers", id)
		}
		if small.Choose(id) == two && large.Choose(id) != two {
			t.Errorf("request %s loses the canary when its share grows", id)
		}
	}
	if small.Choose("") != one || (&Pointer{Digest: one}).Choose("1") != one {
		t.Error("the canary answers where it must not")
	}
}

func TestPointersAreRefused(t *testing.T) {
	for _, c := range []struct{ name, doc string }{
		{"nothing", ``},
		{"null", `null`},
		{"no number", `{"digest":"` + one + `","at":"2026-12-01T09:00:00Z"}`},
		{"a negative number", `{"number":-1,"digest":"` + one + `","at":"2026-12-01T09:00:00Z"}`},
		{"no digest", `{"number":1,"at":"2026-12-01T09:00:00Z"}`},
		{"a path for a digest", `{"number":1,"digest":"../x","at":"2026-12-01T09:00:00Z"}`},
		{"an unknown member", `{"number":1,"digest":"` + one + `","at":"2026-12-01T09:00:00Z","url":"http://x"}`},
		{"a member twice", `{"number":1,"number":2,"digest":"` + one + `","at":"2026-12-01T09:00:00Z"}`},
		{"a second document", `{"number":1,"digest":"` + one + `","at":"2026-12-01T09:00:00Z"}{}`},
		{"back to itself", `{"number":1,"restores":1,"digest":"` + one + `","at":"2026-12-01T09:00:00Z"}`},
		{"a canary without a share", `{"number":1,"digest":"` + one + `","canary":{"digest":"` + two + `"},"at":"2026-12-01T09:00:00Z"}`},
	} {
		t.Run(c.name, func(t *testing.T) {
			if p, err := decodePointer([]byte(c.doc)); err == nil {
				t.Errorf("it reads as %+v", p)
			}
		})
	}
}

// A document that reads as a pointer is written as one that reads alike, and chooses only sets that it names.
func FuzzPointer(f *testing.F) {
	f.Add([]byte(`{"number":1,"digest":"`+one+`","at":"2026-12-01T09:00:00Z"}`), "1")
	f.Add([]byte(`{"number":3,"digest":"`+one+`","canary":{"digest":"`+two+`","percent":5},"at":"2026-12-01T09:00:00.5+01:00","restores":1}`), "")
	f.Add([]byte(`{"number":1e0}`), "x")
	f.Fuzz(func(t *testing.T, doc []byte, request string) {
		p, err := decodePointer(doc)
		if err != nil {
			return
		}
		if got := p.Choose(request); got != p.Digest && (p.Canary == nil || got != p.Canary.Digest) {
			t.Fatalf("%s is chosen of %s", got, doc)
		}
		written, err := p.encode()
		if err != nil {
			t.Fatal(err)
		}
		again, err := decodePointer(written)
		if err != nil {
			t.Fatalf("%s: %v", written, err)
		}
		if twice, err := again.encode(); err != nil || !bytes.Equal(written, twice) {
			t.Fatalf("%s is written as %s, %v", written, twice, err)
		}
	})
}
