package store

import (
	"context"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"
	"time"

	"gocloud.dev/blob"
	"gocloud.dev/gcerrors"
)

// A Stored is a set that lies in the store.
type Stored struct {
	Digest string    `json:"digest"`
	Bytes  int64     `json:"bytes"` // of the archive
	At     time.Time `json:"at"`    // when it was stored, as the bucket says
}

// List is every set of the store, the oldest first. It reads none of them.
func List(ctx context.Context, b *blob.Bucket) ([]Stored, error) {
	objects, err := objects(ctx, b, setsPrefix)
	if err != nil {
		return nil, err
	}
	out := []Stored{}
	for _, object := range objects {
		digest := "sha256:" + strings.TrimSuffix(strings.TrimPrefix(object.Key, setsPrefix), setName)
		if key, err := setKey(digest); err == nil && key == object.Key {
			out = append(out, Stored{digest, object.Size, object.ModTime.UTC()})
		}
	}
	slices.SortStableFunc(out, func(a, b Stored) int { return a.At.Compare(b.At) })
	return out, nil
}

// looks is how often a list is begun again.
const looks = 20

// objects lists what lies under a prefix. In a folder a file that another writer has just given its name can vanish while the list is made;
// then it is begun again.
func objects(ctx context.Context, b *blob.Bucket, prefix string) (list []*blob.ListObject, err error) {
	for range looks {
		list, err = listOnce(ctx, b, prefix)
		if err == nil || gcerrors.Code(err) != gcerrors.NotFound {
			break
		}
	}
	return list, err
}

func listOnce(ctx context.Context, b *blob.Bucket, prefix string) ([]*blob.ListObject, error) {
	var out []*blob.ListObject
	for it := b.List(&blob.ListOptions{Prefix: prefix}); ; {
		object, err := it.Next(ctx)
		if errors.Is(err, io.EOF) {
			return out, nil
		}
		if err != nil {
			return nil, err
		}
		out = append(out, object)
	}
}

// Find is the digest of the one stored set whose digest begins like this, with or without "sha256:".
func Find(ctx context.Context, b *blob.Bucket, start string) (string, error) {
	list, err := List(ctx, b)
	if err != nil {
		return "", err
	}
	found := ""
	for _, s := range list {
		if start == "" || !strings.HasPrefix(strings.TrimPrefix(s.Digest, "sha256:"), strings.TrimPrefix(start, "sha256:")) {
			continue
		}
		if found != "" {
			return "", fmt.Errorf("more than one digest begins with %q", start)
		}
		found = s.Digest
	}
	if found == "" {
		return "", fmt.Errorf("%w: %q", ErrNoSet, start)
	}
	return found, nil
}
