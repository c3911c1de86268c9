package desk

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
	"gramlaw/internal/rulebook"
)

const checkUsage = `Checks a recipe and writes the label values that the law of each market
prescribes, with every claim judged.

Usage: desk check [flags] RECIPE.json ...

RECIPE.json is a recipe document (schemas/recipe.schema.json); - is standard
input. Exit status: 0 all well; 1 a claim or a limit is refused; 2 the call or
the document is wrong; 3 something is not determined and nothing is refused.
Of several recipes each is answered by itself, in JSON on a line of its own; a
wrong one is told on standard error, the others go on, and the status is 2.
`

// checkOptions are the flags of check.
type checkOptions struct {
	in, without                                     words
	on, transition, format, detail, language, rules string
	compact, gaps                                   bool
}

func checkFlags(o *checkOptions) *flags {
	f := newFlags("check")
	f.Var(&o.in, "in", "`MARKETS`, such as us,ca,eu; without it the recipe's, else all of the rule set")
	f.StringVar(&o.on, "on", "", "labelling `DATE`, yyyy-mm-dd; without it today")
	f.StringVar(&o.transition, "transition", string(rulebook.WhenRequired), "`required` or newest: which edition counts while two are in force\n(without it required)")
	f.StringVar(&o.format, "format", "text", "`text` or json (without it text)")
	f.StringVar(&o.detail, "detail", "", "`contributions` adds what each ingredient brings to each value")
	f.Var(&o.without, "without", "`RULES` of presumption to leave out, by identifier, or all")
	f.StringVar(&o.language, "language", "", "`LANGUAGE` of terms and statements in the text, such as fr, where the\nmarket's rules have it; without it the market's first")
	f.BoolVar(&o.gaps, "gaps", false, "list the known gaps of the rules in the text")
	rulesFlag(f, &o.rules)
	f.BoolVar(&o.compact, "compact", false, "write JSON on one line")
	return f
}

// runCheck reads, checks and writes recipes.
func runCheck(c *call) (int, error) {
	var o checkOptions
	args, err := checkFlags(&o).parse(c.args)
	if err != nil {
		return 0, err
	}
	if len(args) == 0 {
		return 0, fmt.Errorf("a recipe is wanted, and none is given; desk check -h tells more")
	}
	if err := known(o.format); err != nil {
		return 0, err
	}
	c.place = o.rules
	if len(args) == 1 {
		return c.checkOne(args[0], &o)
	}
	return c.checkMany(args, &o)
}

func (c *call) checkOne(name string, o *checkOptions) (int, error) {
	doc, err := c.read(name)
	if err != nil {
		return 0, err
	}
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		return 0, told(shown(name), faults)
	}
	report, err := c.check(r, o, shown(name))
	if err != nil {
		return 0, err
	}
	return report.Outcome(), c.write(report, o)
}

// checkMany answers every recipe by itself; the worst status is the call's. What is wrong with the call ends it.
func (c *call) checkMany(names []string, o *checkOptions) (int, error) {
	o.compact = true
	seen := map[int]bool{}
	for _, name := range names {
		status, err := c.checkOne(name, o)
		var ofCall *callError
		if errors.As(err, &ofCall) {
			return 0, err
		}
		if err != nil {
			fmt.Fprintf(c.stderr, "desk check: %v\n", err)
			status = BadCall
		}
		seen[status] = true
	}
	for _, worst := range []int{BadCall, Refused, Undecided} {
		if seen[worst] {
			return worst, nil
		}
	}
	return AllWell, nil
}

// known refuses a format that nobody writes.
func known(format string) error {
	if format != "text" && format != "json" {
		return fmt.Errorf("-format: %q is neither text nor json", format)
	}
	return nil
}

func (c *call) check(r *recipe.Recipe, o *checkOptions, name string) (*check.Report, error) {
	book, err := c.rules()
	if err != nil {
		return nil, err
	}
	if o.on == "" {
		o.on = c.env.Now().Format("2006-01-02")
	}
	report, faults := check.Check(r, book, check.Request{On: o.on, In: o.in, Transition: rulebook.Transition(o.transition), Detail: o.detail, Without: o.without})
	if len(faults) > 0 {
		return nil, told(name, faults)
	}
	return report, nil
}

// write renders into memory first, so that a failure leaves nothing half written.
func (c *call) write(r *check.Report, o *checkOptions) error {
	var b bytes.Buffer
	var err error
	if o.format == "json" {
		err = render.JSON(&b, r, o.compact)
	} else {
		err = render.Text(&b, r, render.Options{Language: o.language, Gaps: o.gaps, GapsHint: "-gaps lists them"})
	}
	if err == nil {
		_, err = b.WriteTo(c.stdout)
	}
	return err
}

// read takes a file, or standard input, up to just over what the decoder accepts: it says that the document is too large.
func (c *call) read(name string) ([]byte, error) {
	in := c.stdin
	if name != "-" {
		f, err := os.Open(name)
		if err != nil {
			return nil, err
		}
		defer f.Close()
		in = f
	}
	return io.ReadAll(io.LimitReader(in, recipe.MaxBytes+1))
}

func shown(name string) string {
	if name == "-" {
		return "standard input"
	}
	return name
}

// told lists every fault on its own line. Members of the request become flags.
func told(name string, faults recipe.Faults) error {
	ofCall := false
	if at := faults[0].Pointer; at != "" && at[0] != '/' {
		name, ofCall = "the call", true
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s: %d ", name, len(faults))
	b.WriteString(map[bool]string{true: "fault", false: "faults"}[len(faults) == 1])
	for _, f := range faults {
		at := f.Pointer
		switch {
		case at == "":
			at = "the whole document"
		case at[0] != '/':
			at = "-" + at
		}
		fmt.Fprintf(&b, "\n%s: %s (%s)", oneLine(at), oneLine(f.Says), f.Code)
	}
	if ofCall {
		return &callError{errors.New(b.String())}
	}
	return errors.New(b.String())
}

// A callError is wrong for every recipe of the call.
type callError struct{ error }

func (e *callError) Unwrap() error { return e.error }

func oneLine(s string) string { return strings.ReplaceAll(s, "\n", " ") }
