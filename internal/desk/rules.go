package desk

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"strings"
	"time"

	"gocloud.dev/blob"

	"gramlaw/internal/store"
	"gramlaw/rules"
)

const rulesUsage = `Keeps rule sets in a store, from which the service takes the one in use: rules
change, are tried and go back without new code.

Usage: desk rules put  -store URL [FOLDER]    store the program's own set, or a folder's
       desk rules list -store URL             what is stored, and the last 50 changes
       desk rules use  -store URL DIGEST      take a stored set into use
       desk rules use  -store URL -canary DIGEST -percent N [DIGEST]
                                              try one on a share of the requests
       desk rules back -store URL             take the last change back

A set is stored under its digest, of which the beginning will do. It must pass
lint to be stored and to come into use; whoever reads it checks it again.
Nothing is overwritten or deleted. Exit status: 0 done; 2 not done.
`

// mostChanges bounds what list tells of the past: each is a request.
const mostChanges = 50

type rulesOptions struct {
	store, canary string
	percent       int
}

func rulesFlags(o *rulesOptions) *flags {
	f := newFlags("rules")
	f.StringVar(&o.store, "store", "", "`URL` of the store, such as s3://BUCKET?region=eu-central-1 or file:///srv/rules")
	f.StringVar(&o.canary, "canary", "", "`DIGEST` of a set to be tried beside the one in use")
	f.IntVar(&o.percent, "percent", 0, "share of the requests, 1 to 99, that the canary answers: `N` in a hundred")
	return f
}

// runRules does one action on a store.
func runRules(c *call) (int, error) {
	var o rulesOptions
	args, err := rulesFlags(&o).parse(c.args)
	if err != nil {
		return 0, err
	}
	if len(args) == 0 {
		return 0, errors.New("one of put, list, use and back is wanted; desk rules -h tells more")
	}
	action, args := args[0], args[1:]
	actions := map[string]func(*rulesOptions, []string) error{"put": c.putRules, "list": c.listRules, "use": c.useRules, "back": c.backRules}
	do, ok := actions[action]
	switch {
	case !ok:
		return 0, fmt.Errorf("%q is none of put, list, use and back; desk rules -h tells more", action)
	case o.store == "":
		return 0, errors.New("-store: the URL of a store is wanted")
	case action != "use" && (o.canary != "" || o.percent != 0):
		return 0, errors.New("-canary and -percent go with use")
	case len(args) > 1 || len(args) > 0 && (action == "list" || action == "back"):
		return 0, fmt.Errorf("%q is not wanted", args[len(args)-1])
	}
	return AllWell, do(&o, args)
}

func (c *call) putRules(o *rulesOptions, args []string) error {
	var set fs.FS = rules.FS
	if len(args) > 0 {
		set = os.DirFS(args[0])
	}
	return withStore(o.store, func(ctx context.Context, b *blob.Bucket) error {
		book, err := store.Put(ctx, b, set)
		if err == nil {
			fmt.Fprintf(c.stdout, "stored: rule set %s %s\n", book.Version, book.Digest)
		}
		return err
	})
}

// useRules takes a set into use. A canary alone stands beside the set that is in use.
func (c *call) useRules(o *rulesOptions, args []string) error {
	if len(args) == 0 && o.canary == "" {
		return errors.New("the digest of a stored set is wanted")
	}
	if (o.canary == "") != (o.percent == 0) {
		return errors.New("-canary and -percent go together")
	}
	return withStore(o.store, func(ctx context.Context, b *blob.Bucket) error {
		digest, canary, err := o.choice(ctx, b, args)
		if err != nil {
			return err
		}
		p, err := store.Use(ctx, b, digest, canary, c.env.Now())
		if err == nil {
			c.inUse(p)
		}
		return err
	})
}

func (o *rulesOptions) choice(ctx context.Context, b *blob.Bucket, args []string) (digest string, canary *store.Canary, err error) {
	if len(args) > 0 {
		digest, err = store.Find(ctx, b, args[0])
	} else {
		var now *store.Pointer
		if now, err = store.Current(ctx, b); err == nil {
			digest = now.Digest
		}
	}
	if err != nil || o.canary == "" {
		return digest, nil, err
	}
	trial, err := store.Find(ctx, b, o.canary)
	return digest, &store.Canary{Digest: trial, Percent: o.percent}, err
}

func (c *call) backRules(o *rulesOptions, _ []string) error {
	return withStore(o.store, func(ctx context.Context, b *blob.Bucket) error {
		p, err := store.Back(ctx, b, c.env.Now())
		if err == nil {
			c.inUse(p)
		}
		return err
	})
}

func (c *call) listRules(o *rulesOptions, _ []string) error {
	return withStore(o.store, func(ctx context.Context, b *blob.Bucket) error {
		sets, err := store.List(ctx, b)
		if err != nil {
			return err
		}
		history, err := store.History(ctx, b, mostChanges)
		if err != nil {
			return err
		}
		for _, s := range sets {
			fmt.Fprintf(c.stdout, "stored %s  %s  %d bytes\n", s.At.Format(time.RFC3339), s.Digest, s.Bytes)
		}
		for _, p := range history {
			fmt.Fprintf(c.stdout, "change %d  %s  %s\n", p.Number, p.At.Format(time.RFC3339), entryLine(p))
		}
		if len(history) > 0 {
			c.inUse(history[len(history)-1])
		}
		return nil
	})
}

func (c *call) inUse(p *store.Pointer) { fmt.Fprintf(c.stdout, "in use: %s\n", entryLine(p)) }

func entryLine(p *store.Pointer) string {
	var s strings.Builder
	s.WriteString(p.Digest)
	if p.Canary != nil {
		fmt.Fprintf(&s, ", %d %% of requests try %s", p.Canary.Percent, p.Canary.Digest)
	}
	if p.Restores > 0 {
		fmt.Fprintf(&s, " (back to change %d)", p.Restores)
	}
	return s.String()
}
