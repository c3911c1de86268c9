package store

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"time"

	"gocloud.dev/blob"
	"gocloud.dev/gcerrors"
)

const pointerPrefix = "current/"

// mostTries bounds how often Use steps behind other writers.
const mostTries = 10

func pointerKey(number int) string { return fmt.Sprintf("%s%08d.json", pointerPrefix, number) }

// Current is the entry that holds; ErrNoCurrent if there is none.
func Current(ctx context.Context, b *blob.Bucket) (*Pointer, error) {
	numbers, err := entries(ctx, b)
	switch {
	case err != nil:
		return nil, err
	case len(numbers) == 0:
		return nil, ErrNoCurrent
	}
	return entry(ctx, b, numbers[len(numbers)-1])
}

// History is the newest entries, at most so many, the oldest of them first.
func History(ctx context.Context, b *blob.Bucket, most int) ([]*Pointer, error) {
	numbers, err := entries(ctx, b)
	if err != nil {
		return nil, err
	}
	numbers = numbers[max(0, len(numbers)-most):]
	out := make([]*Pointer, len(numbers))
	for i, n := range numbers {
		if out[i], err = entry(ctx, b, n); err != nil {
			return nil, err
		}
	}
	return out, nil
}

// entries lists the numbers of the history, rising. What is no entry is passed over.
func entries(ctx context.Context, b *blob.Bucket) ([]int, error) {
	objects, err := objects(ctx, b, pointerPrefix)
	if err != nil {
		return nil, err
	}
	var numbers []int
	for _, object := range objects {
		name := strings.TrimSuffix(strings.TrimPrefix(object.Key, pointerPrefix), ".json")
		if n, err := strconv.Atoi(name); err == nil && object.Key == pointerKey(n) {
			numbers = append(numbers, n)
		}
	}
	slices.Sort(numbers)
	return numbers, nil
}

func entry(ctx context.Context, b *blob.Bucket, number int) (*Pointer, error) {
	key := pointerKey(number)
	doc, err := read(ctx, b, key, maxPointer)
	if err != nil {
		return nil, err
	}
	p, err := decodePointer(doc)
	if err == nil && p.Number != number {
		err = fmt.Errorf("is the entry %d", p.Number)
	}
	if err != nil {
		return nil, fmt.Errorf("%s: %w", key, err)
	}
	return p, nil
}

// follow is the entry that holds now, known that one did: it looks for its successors only.
func follow(ctx context.Context, b *blob.Bucket, known *Pointer) (*Pointer, error) {
	for {
		next, err := entry(ctx, b, known.Number+1)
		if gcerrors.Code(err) == gcerrors.NotFound {
			return known, nil
		}
		if err != nil {
			return nil, err
		}
		known = next
	}
}

// Use takes a set into use, with a canary beside it or none. Both must load: a set that fails is refused and what is in use stays.
// Of two writers at once both are in the history, and the later one holds.
func Use(ctx context.Context, b *blob.Bucket, digest string, canary *Canary, now time.Time) (*Pointer, error) {
	p := &Pointer{Number: 1, Digest: digest, Canary: canary, At: now.UTC()}
	if err := p.usable(ctx, b); err != nil {
		return nil, err
	}
	for range mostTries {
		numbers, err := entries(ctx, b)
		if err != nil {
			return nil, err
		}
		if len(numbers) > 0 {
			p.Number = numbers[len(numbers)-1] + 1
		}
		written, err := p.write(ctx, b)
		if err != nil {
			return nil, err
		}
		if written {
			return p, nil
		}
	}
	return nil, ErrMoved
}

// Back takes back the last change: what was in use before it is in use again. Going back again goes further back. ErrMoved if somebody
// else changed what is in use at the same moment.
func Back(ctx context.Context, b *blob.Bucket, now time.Time) (*Pointer, error) {
	last, err := Current(ctx, b)
	if err != nil {
		return nil, err
	}
	stands := last.Number
	if last.Restores > 0 {
		stands = last.Restores
	}
	if stands == 1 {
		return nil, errors.New("there is nothing before what is in use")
	}
	before, err := entry(ctx, b, stands-1)
	if err != nil {
		return nil, err
	}
	p := &Pointer{Number: last.Number + 1, Digest: before.Digest, Canary: before.Canary, At: now.UTC(), Restores: before.Number}
	if before.Restores > 0 {
		p.Restores = before.Restores
	}
	if err := p.usable(ctx, b); err != nil {
		return nil, err
	}
	written, err := p.write(ctx, b)
	if err == nil && !written {
		err = ErrMoved
	}
	if err != nil {
		return nil, err
	}
	return p, nil
}

// usable loads what the entry names.
func (p *Pointer) usable(ctx context.Context, b *blob.Bucket) error {
	if err := p.check(); err != nil {
		return err
	}
	if _, err := Load(ctx, b, p.Digest); err != nil {
		return err
	}
	if p.Canary == nil {
		return nil
	}
	_, err := Load(ctx, b, p.Canary.Digest)
	return err
}

// write tells whether this entry stands in the history; false if another has its number. A repeated request may find its own.
func (p *Pointer) write(ctx context.Context, b *blob.Bucket) (bool, error) {
	doc, err := p.encode()
	if err != nil {
		return false, err
	}
	written, err := create(ctx, b, pointerKey(p.Number), "application/json", doc)
	if written || err != nil {
		return written, err
	}
	there, err := read(ctx, b, pointerKey(p.Number), maxPointer)
	return bytes.Equal(there, doc), err
}
