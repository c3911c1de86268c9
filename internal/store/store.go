// Package store keeps rule sets in a blob bucket, so that rules come, go on trial and go back without new code.
//
// A bucket holds two kinds of objects, and none is ever written twice:
//
//	rulesets/<64 hex digits of the digest>/rules.zip  a rule set
//	current/00000001.json, current/00000002.json ...  which set is in use; the highest number holds, the others are history
//
// Put stores a set, Use and Back say which is in use, Load and a Reloader read it. Whoever writes second finds the object there
// and goes on to the next number, so that two writers at once lose nothing. A set that is not what its digest says, or that fails
// lint, is refused wherever it is met. internal/store/bucket opens buckets by URL.
package store

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"regexp"
	"strings"

	"gocloud.dev/blob"
	"gocloud.dev/gcerrors"

	"gramlaw/internal/rulebook"
)

// Errors of this package, for errors.Is.
var (
	ErrNoSet     = errors.New("the store holds no such rule set")
	ErrNoCurrent = errors.New("the store says of no rule set that it is in use")
	ErrBadSet    = errors.New("the rule set cannot be used")
	ErrMoved     = errors.New("somebody else has changed what is in use meanwhile; look again")
)

const setsPrefix, setName = "rulesets/", "/rules.zip"

var digestForm = regexp.MustCompile(`^sha256:[0-9a-f]{64}$`)

// setKey is where a set lies.
func setKey(digest string) (string, error) {
	if !digestForm.MatchString(digest) {
		return "", fmt.Errorf("%q is no digest of a rule set: sha256: and 64 hexadecimal digits", digest)
	}
	return setsPrefix + strings.TrimPrefix(digest, "sha256:") + setName, nil
}

// Put stores the rule set of a file system, once it has passed lint, and gives its book. Storing a set twice is no error.
func Put(ctx context.Context, b *blob.Bucket, fsys fs.FS) (*rulebook.Book, error) {
	files, err := rulebook.ReadFiles(fsys)
	if err != nil {
		return nil, err
	}
	book, err := files.Load()
	if err != nil {
		return nil, fmt.Errorf("%w:\n%w", ErrBadSet, err)
	}
	archive, err := pack(files)
	if err != nil {
		return nil, err
	}
	key, err := setKey(book.Digest)
	if err != nil {
		return nil, err
	}
	stored, err := create(ctx, b, key, "application/zip", archive)
	if err != nil || stored {
		return book, err
	}
	return Load(ctx, b, book.Digest) // what lies there may be broken
}

// Load reads the set of a digest. It is refused with ErrBadSet if it is not that set or fails lint; ErrNoSet if there is none.
func Load(ctx context.Context, b *blob.Bucket, digest string) (*rulebook.Book, error) {
	key, err := setKey(digest)
	if err != nil {
		return nil, err
	}
	archive, err := read(ctx, b, key, maxArchive)
	switch {
	case gcerrors.Code(err) == gcerrors.NotFound:
		return nil, fmt.Errorf("%w: %s", ErrNoSet, digest)
	case err != nil:
		return nil, err
	}
	book, err := open(archive, digest)
	if err != nil {
		return nil, fmt.Errorf("%w: %s: %w", ErrBadSet, key, err)
	}
	return book, nil
}

// open is the book of an archive that must have the digest.
func open(archive []byte, digest string) (*rulebook.Book, error) {
	files, err := unpack(archive)
	if err != nil {
		return nil, err
	}
	if got := files.Digest(); got != digest {
		return nil, fmt.Errorf("the files have the digest %s", got)
	}
	return files.Load()
}

// read takes an object of at most limit bytes.
func read(ctx context.Context, b *blob.Bucket, key string, limit int64) ([]byte, error) {
	r, err := b.NewReader(ctx, key, nil)
	if err != nil {
		return nil, err
	}
	defer r.Close()
	if r.Size() > limit {
		return nil, tooLarge(key, limit)
	}
	var doc bytes.Buffer
	n, err := io.Copy(&doc, io.LimitReader(r, limit+1))
	switch {
	case err != nil:
		return nil, err
	case n > limit:
		return nil, tooLarge(key, limit)
	case n != r.Size():
		return nil, fmt.Errorf("%s: %d of %d bytes came", key, n, r.Size())
	}
	return doc.Bytes(), nil
}

func tooLarge(name string, limit int64) error {
	return fmt.Errorf("%w: %s is larger than %d bytes", ErrBadSet, name, limit)
}

// create writes an object and tells whether it did: false if one of that name is there.
func create(ctx context.Context, b *blob.Bucket, key, contentType string, doc []byte) (bool, error) {
	for try := 1; ; try++ {
		err := b.WriteAll(ctx, key, doc, &blob.WriterOptions{ContentType: contentType, IfNotExist: true})
		switch {
		case err == nil:
			return true, nil
		case gcerrors.Code(err) == gcerrors.FailedPrecondition:
			return false, nil
		case !collided(err) || try == mostTries:
			return false, err
		}
	}
}

// collided tells of two writes at the same moment, of which S3 refuses one without saying whether the other came to be.
// Reference: Amazon S3 User Guide, conditional writes: 409 ConditionalRequestConflict is to be tried again (from memory).
func collided(err error) bool {
	var coded interface{ ErrorCode() string }
	return errors.As(err, &coded) && coded.ErrorCode() == "ConditionalRequestConflict"
}
