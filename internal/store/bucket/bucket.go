// Package bucket opens the buckets of internal/store by URL. It stands apart because it links the drivers, the AWS SDK above all:
// programs with the embedded rules do without.
//
//	s3://BUCKET?region=eu-central-1            Amazon S3, credentials as the AWS SDK finds them
//	s3://BUCKET?endpoint=...&use_path_style=true  anything that speaks S3
//	file:///srv/rules                          a folder; one process writes at a time
//	mem://                                     memory, for tests
//
// Every one takes prefix=some/folder/. Behind # a digest may stand: that set, whatever is in use.
package bucket

import (
	"context"
	"fmt"
	"net/url"
	"strings"

	"gocloud.dev/blob"
	_ "gocloud.dev/blob/fileblob" // file://
	_ "gocloud.dev/blob/memblob"  // mem://
	_ "gocloud.dev/blob/s3blob"   // s3://

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store"
)

// Open gives the bucket of a URL, and the digest behind its #; empty where none stands.
func Open(ctx context.Context, at string) (*blob.Bucket, string, error) {
	u, err := url.Parse(at)
	if err != nil {
		return nil, "", err
	}
	digest := u.Fragment
	u.Fragment = ""
	if u.Scheme == "file" {
		u.RawQuery = besideNothing(u.Query())
	}
	b, err := blob.OpenBucket(ctx, u.String())
	if err != nil {
		return nil, "", fmt.Errorf("%s: %w", u.Redacted(), err)
	}
	return b, digest, nil
}

// besideNothing keeps a folder free of files about files, and of half-written ones on another disk.
func besideNothing(q url.Values) string {
	q.Set("metadata", "skip")
	q.Set("no_tmp_dir", "true")
	return q.Encode()
}

// Load reads the set that a URL names, or the one in use.
func Load(ctx context.Context, at string) (*rulebook.Book, error) {
	b, digest, err := Open(ctx, at)
	if err != nil {
		return nil, err
	}
	defer b.Close()
	if digest == "" {
		p, err := store.Current(ctx, b)
		if err != nil {
			return nil, err
		}
		digest = p.Digest
	}
	return store.Load(ctx, b, digest)
}

// IsURL tells a URL from the path of a folder.
func IsURL(s string) bool { return strings.Contains(s, "://") }
