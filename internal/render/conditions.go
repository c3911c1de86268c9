package render

import (
	"fmt"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/check"
)

// decided writes a condition and its parts, each behind yes, NO or open.
func (p *page) decided(indent int, c *check.Condition) {
	if c.Says == "" && len(c.Any)+len(c.Of) == 0 && c.Not == nil {
		for i := range c.All {
			p.decided(indent, &c.All[i])
		}
		return
	}
	label := answer(c.Holds)
	rest := indent + len(label)
	switch {
	case c.Not != nil:
		inner := single(c.Not)
		if parts(inner) != nil {
			p.hang(indent, rest, label, "not this:")
			p.decided(rest, inner)
			return
		}
		p.hang(indent, rest, label, "does not hold: "+inner.Says)
		p.figures(rest, inner, false)
	case parts(c) != nil:
		p.group(indent, rest, label, c)
	default:
		p.hang(indent, rest, label, c.Says)
		p.figures(rest, c, true)
	}
}

// single looks through groups of one.
func single(c *check.Condition) *check.Condition {
	for c.Says == "" && len(c.All) == 1 {
		c = &c.All[0]
	}
	return c
}

func parts(c *check.Condition) []check.Condition {
	switch {
	case len(c.Any) > 0:
		return c.Any
	case len(c.Of) > 0:
		return c.Of
	case len(c.All) > 0:
		return c.All
	}
	return nil
}

func (p *page) group(indent, rest int, label string, c *check.Condition) {
	title := "all of these:"
	switch {
	case len(c.Any) == 1 || len(c.Any) == 0 && len(c.All) == 1:
		title = ""
	case len(c.Any) > 0:
		title = "one of these at least:"
	case len(c.Of) > 0 && c.AtLeast > 0:
		title = fmt.Sprintf("%d of these at least:", c.AtLeast)
	case len(c.Of) > 0:
		title = "so many of these as the law asks for:"
	}
	title = strings.TrimSpace(c.Says + " " + title)
	if title == "" {
		p.decided(indent, &parts(c)[0])
		return
	}
	p.hang(indent, rest, label, title)
	for i := range parts(c) {
		p.decided(rest, &parts(c)[i])
	}
}

func answer(holds *bool) string {
	switch {
	case holds == nil:
		return "open  "
	case *holds:
		return "yes   "
	}
	return "NO    "
}

// figures writes the numbers of a comparison, and what would settle it.
func (p *page) figures(indent int, c *check.Condition, headroom bool) {
	if c.Threshold != "" {
		s := comparison(c)
		if headroom && c.Exact != nil && c.Headroom != "" {
			s += "; " + room(c)
		} else if headroom && c.Exact == nil && c.Holds != nil {
			s += roomOfRange(c)
		}
		p.line(indent, s)
	}
	if len(c.Needs) > 0 {
		p.line(indent, "would be settled by: "+needed(c.Needs))
	}
}

var relations = map[string]string{"<=": "≤", ">=": "≥", "<": "<", ">": ">"}

// comparison reads "≈0.8784 g ≤ 2 g", with "not" where it fails.
func comparison(c *check.Condition) string {
	relation, ok := relations[c.Relation]
	if !ok {
		relation = c.Relation
	}
	if c.Holds != nil && !*c.Holds {
		relation = "is not " + relation
	}
	value := measured(c)
	switch {
	case value == "" && c.Holds == nil:
		return "the value is not determined"
	case value == "":
		return "no single value can be told"
	case c.Holds == nil:
		return value + "; asked for is " + relation + " " + withUnit(short(c.Threshold), c.Unit)
	}
	return value + " " + relation + " " + withUnit(short(c.Threshold), c.Unit)
}

// measured is the value of a comparison: a number, a range, or "" where there is none.
func measured(c *check.Condition) string {
	ends := ""
	switch {
	case c.Low == "" && c.High == "":
	case c.Low == "0" && c.High == "0": // nothing is known, or the denominator is zero
	case c.High == "0":
		ends = withUnit(beside(c.Low, c.Threshold), c.Unit) + " or more"
	case beside(c.Low, c.Threshold) == beside(c.High, c.Threshold):
		ends = withUnit(beside(c.Low, c.Threshold), c.Unit)
	default:
		ends = beside(c.Low, c.Threshold) + " to " + withUnit(strings.TrimPrefix(beside(c.High, c.Threshold), "≈"), c.Unit)
	}
	if c.Exact == nil {
		return ends
	}
	value := withUnit(beside(*c.Exact, c.Threshold), c.Unit)
	if ends == "" || ends == value {
		return value
	}
	return "typically " + value + ", possible " + ends
}

// room tells how far inside or outside its threshold a value is.
func room(c *check.Condition) string {
	by := withUnit(short(strings.TrimPrefix(c.Headroom, "-")), c.Unit)
	switch {
	case c.Headroom == "0":
		return "exactly at the threshold"
	case strings.HasPrefix(c.Headroom, "-"):
		return "outside by " + by
	}
	return "inside by " + by
}

// roomOfRange is the headroom of a decided range at the end that is nearer to the threshold.
func roomOfRange(c *check.Condition) string {
	low, err1 := decimal.NewFromString(c.Low)
	high, err2 := decimal.NewFromString(c.High)
	t, err3 := decimal.NewFromString(c.Threshold)
	if err1 != nil || err2 != nil || err3 != nil || measured(c) == "" || high.LessThan(low) {
		return ""
	}
	near := decimal.Min(low.Sub(t).Abs(), high.Sub(t).Abs())
	word := map[bool]string{true: "inside", false: "outside"}[*c.Holds]
	return "; " + word + " by " + withUnit(short(near.String()), c.Unit) + " or more"
}
