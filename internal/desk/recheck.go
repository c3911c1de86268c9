package desk

import (
	"context"
	"errors"
	"fmt"
	"io"
	"math/rand/v2"
	"os"
	"os/signal"
	"runtime"
	"slices"
	"strings"
	"syscall"
	"time"

	"github.com/schollz/progressbar/v3"
	"gocloud.dev/blob"
	"golang.org/x/term"

	"gramlaw/internal/check"
	"gramlaw/internal/recheck"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/store/bucket"
)

const recheckUsage = `Checks every recipe of a store on two labelling dates, or under two rule sets, and
tells what differs: values, claims gained and lost, limits, statements, each with
the rules that cause it.

Usage: desk recheck -recipes URL -from DATE -to DATE [flags]
       desk recheck -recipes URL -from DATE -horizon DATE [flags]

Recipes are the objects whose names end in .json; those under own/ are the maker's
own ingredients, which recipes name as "food": "own:NAME". With -out, changes.jsonl,
failed.jsonl, summary.json and summary.txt are written there; a call that was stopped
goes on where it was. With -horizon, every day on which a rule begins or ends is
looked at, and a calendar is the result.

Exit status: 0 nothing changes; 1 something does; 2 the call is wrong; 3 a recipe
could not be checked.
`

// Exit statuses of recheck beside BadCall.
const (
	nothingChanges    = 0
	somethingDoes     = 1
	recipesHaveFailed = 3
)

type recheckOptions struct {
	recipes, out       string
	from, to, horizon  string
	rulesFrom, rulesTo string
	in, without        words
	transition         string
	workers            int
}

func recheckFlags(o *recheckOptions) *flags {
	f := newFlags("recheck")
	f.StringVar(&o.recipes, "recipes", "", "`URL` of the recipes, such as file:///srv/recipes or s3://BUCKET?prefix=recipes/")
	f.StringVar(&o.out, "out", "", "`URL` to write to; without it only the summary is shown")
	f.StringVar(&o.from, "from", "", "labelling `DATE` before; default today")
	f.StringVar(&o.to, "to", "", "labelling `DATE` after; default that of -from")
	f.StringVar(&o.horizon, "horizon", "", "last `DATE` of a calendar, instead of -to")
	f.StringVar(&o.rulesFrom, "rules-from", "", "`PLACE` of the rule set before: a folder or the URL of a store; default the\nprogram's own")
	f.StringVar(&o.rulesTo, "rules-to", "", "`PLACE` of the rule set after; default that of -rules-from")
	f.Var(&o.in, "in", "`MARKETS` with commas between them; default those of each recipe")
	f.StringVar(&o.transition, "transition", "required", "of two editions in force at once: the `ONE` that is required, or the newest")
	f.Var(&o.without, "without", "`RULES` of practice to leave out, or all")
	f.IntVar(&o.workers, "workers", runtime.GOMAXPROCS(0), "how many `N` recipes at once")
	return f
}

func runRecheck(c *call) (int, error) {
	var o recheckOptions
	args, err := recheckFlags(&o).parse(c.args)
	if err != nil {
		return 0, err
	}
	if err := o.check(args, c.env.Now); err != nil {
		return 0, err
	}
	steps, err := o.steps(c)
	if err != nil {
		return 0, err
	}
	summary, err := o.run(c, steps)
	if err != nil {
		return 0, err
	}
	if err := summary.Text(c.stdout); err != nil {
		return 0, err
	}
	switch {
	case summary.Counts.Failed > 0:
		return recipesHaveFailed, nil
	case summary.Counts.Changed > 0:
		return somethingDoes, nil
	}
	return nothingChanges, nil
}

// check completes the options and finds what is wrong with them.
func (o *recheckOptions) check(args []string, now func() time.Time) error {
	switch {
	case len(args) > 0:
		return fmt.Errorf("%q is not wanted", args[0])
	case o.recipes == "":
		return errors.New("-recipes: the URL of the recipes is wanted")
	case o.to != "" && o.horizon != "":
		return errors.New("-to and -horizon are two ways to ask; give one")
	case o.horizon != "" && o.rulesTo != "":
		return errors.New("-horizon walks the days of one rule set; -rules-to does not go with it")
	case o.workers < 1 || o.workers > 256:
		return errors.New("-workers: 1 to 256 are wanted")
	}
	if o.from == "" {
		o.from = now().UTC().Format(time.DateOnly)
	}
	if o.to == "" {
		o.to = o.from
	}
	if o.rulesTo == "" {
		o.rulesTo = o.rulesFrom
	}
	for flag, day := range map[string]string{"-from": o.from, "-to": o.to, "-horizon": o.horizon} {
		if _, err := time.Parse(time.DateOnly, day); err != nil && day != "" {
			return fmt.Errorf("%s: %q is no date; write yyyy-mm-dd", flag, day)
		}
	}
	return nil
}

// steps are the comparisons that are asked for.
func (o *recheckOptions) steps(c *call) ([]recheck.Step, error) {
	was, err := c.rulesAt(o.rulesFrom)
	if err != nil {
		return nil, err
	}
	is := was
	if o.rulesTo != o.rulesFrom {
		if is, err = c.rulesAt(o.rulesTo); err != nil {
			return nil, err
		}
	}
	q := check.Request{In: o.in, Without: o.without, Transition: rulebook.Transition(o.transition)}
	days := []string{o.to}
	if o.horizon != "" {
		days = o.days(was)
	}
	var out []recheck.Step
	from := o.from
	for _, to := range days {
		plan, faults := recheck.New(check.Side{Book: was, On: from}, check.Side{Book: is, On: to}, q)
		if len(faults) > 0 {
			return nil, errors.New(faultLines(faults))
		}
		out = append(out, recheck.Step{From: from, To: to, Plan: plan})
		from = to
	}
	return out, nil
}

// days are those of all markets asked for.
func (o *recheckOptions) days(b *rulebook.Book) []string {
	markets := []string(o.in)
	if len(markets) == 0 {
		markets = b.Jurisdictions()
	}
	var days []string
	for _, j := range markets {
		days = append(days, b.Days(j, o.from, o.horizon)...)
	}
	slices.Sort(days)
	return slices.Compact(days)
}

func faultLines(faults recipe.Faults) string {
	lines := make([]string, len(faults))
	for i, f := range faults {
		lines[i] = strings.TrimSpace(f.Pointer + ": " + f.Says)
	}
	return strings.Join(lines, "\n")
}

func (o *recheckOptions) run(c *call, steps []recheck.Step) (*recheck.Summary, error) {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	recipes, err := openBucket(ctx, "-recipes", o.recipes)
	if err != nil {
		return nil, err
	}
	defer recipes.Close()
	if o.out == "" {
		o.out = "mem://"
	}
	out, err := openBucket(ctx, "-out", o.out)
	if err != nil {
		return nil, err
	}
	defer out.Close()
	show, done := progress(c.stderr)
	r := &recheck.Run{Recipes: recipes, Out: out, Steps: steps, Workers: o.workers, Progress: show, Wait: backoff}
	s, err := r.Do(ctx)
	done()
	return s, err
}

func openBucket(ctx context.Context, flag, url string) (*blob.Bucket, error) {
	b, digest, err := bucket.Open(ctx, url)
	if err == nil && digest != "" {
		b.Close()
		err = fmt.Errorf("nothing is wanted behind #")
	}
	if err != nil {
		return nil, fmt.Errorf("%s: %w", flag, err)
	}
	return b, nil
}

// backoff is twice as long each time, give or take a half.
func backoff(attempt int) <-chan struct{} {
	wait := 100 * time.Millisecond << attempt
	out := make(chan struct{})
	time.AfterFunc(wait/2+rand.N(wait), func() { close(out) })
	return out
}

// progress is a bar on a terminal, and a line now and then elsewhere.
func progress(to io.Writer) (show func(recheck.Counts), done func()) {
	if f, ok := to.(*os.File); ok && term.IsTerminal(int(f.Fd())) {
		bar := progressbar.NewOptions(-1, progressbar.OptionSetWriter(to), progressbar.OptionSetDescription("recipes"), progressbar.OptionShowCount(),
			progressbar.OptionShowIts(), progressbar.OptionSetItsString("recipes"), progressbar.OptionThrottle(200*time.Millisecond))
		return func(c recheck.Counts) {
			bar.Describe(fmt.Sprintf("%d changed, %d failed, recipes", c.Changed, c.Failed))
			_ = bar.Set(c.Seen) // a bar that cannot be drawn stops nothing
		}, func() { _ = bar.Exit(); fmt.Fprintln(to) }
	}
	last := time.Now()
	return func(c recheck.Counts) {
		if time.Since(last) > 5*time.Second {
			last = time.Now()
			fmt.Fprintf(to, "%d recipes: %d changed, %d failed\n", c.Seen, c.Changed, c.Failed)
		}
	}, func() {}
}
