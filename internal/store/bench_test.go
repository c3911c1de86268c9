package store_test

import (
	"testing"

	"gocloud.dev/blob/memblob"

	"gramlaw/internal/store"
	"gramlaw/rules"
)

// Reading, verifying and linting the embedded set from a bucket in memory: what a store costs besides its network.
func BenchmarkStoredSetLoad(b *testing.B) {
	bucket := memblob.OpenBucket(nil)
	book, err := store.Put(ctx, bucket, rules.FS)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := store.Load(ctx, bucket, book.Digest); err != nil {
			b.Fatal(err)
		}
	}
}
