package recheck

import (
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"

	"gocloud.dev/blob"
	"gocloud.dev/gcerrors"

	"gramlaw/internal/check"
)

// Names of what a run leaves behind.
const (
	ChangesName = "changes.jsonl"
	FailedName  = "failed.jsonl"
	SummaryName = "summary.json"
	TextName    = "summary.txt"
)

// join writes what the parts hold as one, in the order of the recipes, and takes the parts away.
func (w *work) join(ctx context.Context, parts []string) (*Summary, error) {
	var s *Summary
	err := w.write(ctx, ChangesName, func(to io.Writer) error {
		s = w.summary()
		return w.each(ctx, parts, func(p *part) error {
			s.Counts.add(p.Counts)
			return writeLines(to, p.Found, s.found)
		})
	})
	if err == nil {
		err = w.write(ctx, FailedName, func(to io.Writer) error {
			return w.each(ctx, parts, func(p *part) error { return writeLines(to, p.Failed, func(*Failure) {}) })
		})
	}
	if err != nil {
		return nil, fmt.Errorf("what was found cannot be written: %w", err)
	}
	s.finish()
	if !s.Counts.Whole() {
		return nil, fmt.Errorf("%d recipes were seen, and %d accounted for", s.Counts.Seen, s.Counts.Unchanged+s.Counts.Changed+s.Counts.Failed)
	}
	if err := w.write(ctx, TextName, s.Text); err != nil {
		return nil, err
	}
	if err := w.write(ctx, SummaryName, func(to io.Writer) error {
		e := json.NewEncoder(to)
		e.SetIndent("", "  ")
		return e.Encode(s)
	}); err != nil {
		return nil, err
	}
	return s, w.clear(ctx)
}

// each reads the parts one by one.
func (w *work) each(ctx context.Context, parts []string, do func(*part) error) error {
	for _, name := range parts {
		var p part
		there, err := w.readPart(ctx, name, &p)
		if err == nil && !there {
			err = fmt.Errorf("%s has gone", name)
		}
		if err != nil {
			return err
		}
		if err := do(&p); err != nil {
			return err
		}
	}
	return nil
}

func writeLines[T any](to io.Writer, lines []T, also func(*T)) error {
	e := json.NewEncoder(to)
	e.SetEscapeHTML(false)
	for i := range lines {
		also(&lines[i])
		if err := e.Encode(&lines[i]); err != nil {
			return err
		}
	}
	return nil
}

// clear takes away the parts, and what a killed run may have left half-written beside them; another start that finds none does them again.
func (w *work) clear(ctx context.Context) error {
	for it := w.Out.List(&blob.ListOptions{Prefix: partsPrefix + w.id + "/"}); ; {
		o, err := it.Next(ctx)
		if errors.Is(err, io.EOF) {
			return nil
		}
		if err == nil {
			err = w.try(ctx, func() error { return w.Out.Delete(ctx, o.Key) })
		}
		if err != nil && gcerrors.Code(err) != gcerrors.NotFound {
			return err
		}
	}
}

func ruleSet(s check.Side) check.RuleSet {
	return check.RuleSet{Version: s.Book.Version, Digest: s.Book.Digest}
}
