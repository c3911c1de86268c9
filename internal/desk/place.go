package desk

import (
	"context"
	"fmt"
	"os"
	"time"

	"gocloud.dev/blob"

	"gramlaw/internal/rulebook"
	"gramlaw/internal/store/bucket"
)

// storeTime bounds what one call does with a store.
const storeTime = time.Minute

// rulesFlag is the flag of every verb that needs rules.
func rulesFlag(f *flags, to *string) {
	f.StringVar(to, "rules", "", "`PLACE` of another rule set than the program's own: a folder like rules/, or the\nURL of a store, such as s3://BUCKET?region=eu-central-1 or file:///srv/rules;\nbehind # may stand a digest, else what is in use there is taken")
}

// rules loads the rule set once a call, from the place that -rules names.
func (c *call) rules() (*rulebook.Book, error) {
	if c.book != nil {
		return c.book, nil
	}
	book, err := c.load()
	if err != nil {
		return nil, &callError{fmt.Errorf("the rule set cannot be used:\n%w", err)}
	}
	c.book = book
	return book, nil
}

func (c *call) load() (*rulebook.Book, error) { return c.loadFrom(c.place) }

// rulesAt loads the rule set of a place.
func (c *call) rulesAt(place string) (*rulebook.Book, error) {
	b, err := c.loadFrom(place)
	if err != nil {
		return nil, fmt.Errorf("the rule set %s cannot be used:\n%w", place, err)
	}
	return b, nil
}

func (c *call) loadFrom(place string) (*rulebook.Book, error) {
	switch {
	case place == "":
		return c.env.Rules()
	case bucket.IsURL(place):
		ctx, cancel := context.WithTimeout(context.Background(), storeTime)
		defer cancel()
		return bucket.Load(ctx, place)
	}
	return rulebook.Load(os.DirFS(place))
}

// withStore opens the store of a URL for one piece of work.
func withStore(url string, work func(context.Context, *blob.Bucket) error) error {
	ctx, cancel := context.WithTimeout(context.Background(), storeTime)
	defer cancel()
	b, digest, err := bucket.Open(ctx, url)
	switch {
	case err != nil:
		return fmt.Errorf("-store: %w", err)
	case digest != "":
		err = fmt.Errorf("-store: %s: no digest is wanted behind the URL", digest)
	default:
		err = work(ctx, b)
	}
	if closed := b.Close(); err == nil {
		err = closed
	}
	return err
}
