package desk

import (
	"bytes"
	"fmt"

	"gramlaw/internal/check"
	"gramlaw/internal/coverage"
	"gramlaw/internal/render"
)

const coverageUsage = `Tells what the rule set covers: rules and dated versions of each market and kind,
how well they are sourced, how binding they are, and what is known to be missing.

Usage: desk coverage [flags]
`

type coverageOptions struct {
	in            words
	format, rules string
}

func coverageFlags(o *coverageOptions) *flags {
	f := newFlags("coverage")
	f.Var(&o.in, "in", "`MARKETS`, such as us,ca,eu; without it all of the rule set")
	f.StringVar(&o.format, "format", "text", "`text` or json (without it text)")
	rulesFlag(f, &o.rules)
	return f
}

// runCoverage counts the rules.
func runCoverage(c *call) (int, error) {
	var o coverageOptions
	args, err := coverageFlags(&o).parse(c.args)
	switch {
	case err != nil:
		return 0, err
	case len(args) > 0:
		return 0, fmt.Errorf("%q is not wanted; desk coverage takes flags only", args[0])
	}
	if err := known(o.format); err != nil {
		return 0, err
	}
	c.place = o.rules
	book, err := c.rules()
	if err != nil {
		return 0, err
	}
	report, err := coverage.Of(book, o.in, check.Caution)
	if err != nil {
		return 0, fmt.Errorf("-in: %w", err)
	}
	var b bytes.Buffer
	write := render.Coverage
	if o.format == "json" {
		write = render.CoverageJSON
	}
	if err := write(&b, report); err != nil {
		return 0, err
	}
	_, err = b.WriteTo(c.stdout)
	return AllWell, err
}
