package desk

import (
	"bytes"
	"fmt"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/render"
)

const wordingUsage = `Tells what words on a pack are in law: which claims, of which market, with which
condition; with a recipe, whether the product may carry them and what it may
carry instead.

Usage: desk wording [flags] "TEXT" [RECIPE.json]

Words are those of one label; - is a recipe on standard input. Exit status: 0 all
well; 1 a claim is refused; 2 the call or the document is wrong; 3 something is
not determined, not listed or not judged, and nothing is refused.
`

// wordingOptions are the flags of wording.
type wordingOptions struct {
	in                          words
	on, language, format, rules string
	compact                     bool
}

func wordingFlags(o *wordingOptions) *flags {
	f := newFlags("wording")
	f.Var(&o.in, "in", "`MARKETS`, such as us,ca,eu; without it all of the rule set")
	f.StringVar(&o.on, "on", "", "labelling `DATE`, yyyy-mm-dd; without it today")
	f.StringVar(&o.language, "language", "en", "`LANGUAGE` of the words, such as fr (without it en)")
	f.StringVar(&o.format, "format", "text", "`text` or json (without it text)")
	rulesFlag(f, &o.rules)
	f.BoolVar(&o.compact, "compact", false, "write JSON on one line")
	return f
}

// runWording reads words, and judges them where a recipe is given.
func runWording(c *call) (int, error) {
	var o wordingOptions
	args, err := wordingFlags(&o).parse(c.args)
	switch {
	case err != nil:
		return 0, err
	case len(args) == 0:
		return 0, fmt.Errorf("words are wanted, and none are given; desk wording -h tells more")
	case len(args) > 2:
		return 0, fmt.Errorf("%q is not wanted; words stand in quotation marks, and one recipe may follow", args[2])
	}
	if err := known(o.format); err != nil {
		return 0, err
	}
	c.place = o.rules
	r, name, err := c.product(args[1:])
	if err != nil {
		return 0, err
	}
	report, err := c.wording(args[0], r, name, &o)
	if err != nil {
		return 0, err
	}
	return report.Outcome(), c.writeWording(report, &o)
}

// product reads the recipe, where one is given.
func (c *call) product(names []string) (*recipe.Recipe, string, error) {
	if len(names) == 0 {
		return nil, "the words", nil
	}
	doc, err := c.read(names[0])
	if err != nil {
		return nil, "", err
	}
	r, faults := recipe.Decode(doc)
	if len(faults) > 0 {
		return nil, "", told(shown(names[0]), faults)
	}
	return r, shown(names[0]), nil
}

func (c *call) wording(text string, r *recipe.Recipe, name string, o *wordingOptions) (*check.WordingReport, error) {
	book, err := c.rules()
	if err != nil {
		return nil, err
	}
	if o.on == "" {
		o.on = c.env.Now().Format("2006-01-02")
	}
	report, faults := check.Wording(r, book, check.WordingRequest{Text: text, Language: o.language, On: o.on, In: o.in})
	if len(faults) > 0 {
		return nil, told(name, faults)
	}
	return report, nil
}

// writeWording renders into memory first, so that a failure leaves nothing half written.
func (c *call) writeWording(r *check.WordingReport, o *wordingOptions) error {
	var b bytes.Buffer
	var err error
	if o.format == "json" {
		err = render.WordingJSON(&b, r, o.compact)
	} else {
		err = render.Wording(&b, r)
	}
	if err == nil {
		_, err = b.WriteTo(c.stdout)
	}
	return err
}
