package render

import (
	"fmt"
	"slices"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/check"
)

// decided writes a condition and its parts, each behind yes, NO or open.
func (p *page) decided(indent int, c *check.Condition) {
	if empty(c) {
		return
	}
	if c.Says == "" && len(c.Any)+len(c.Of) == 0 && c.Not == nil {
		p.every(indent, c.All)
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
		p.hang(indent, rest, label, "does not hold: "+joined(inner.Says)+figuresOf(inner, false))
	case parts(c) != nil:
		p.group(indent, rest, label, c)
	default:
		p.hang(indent, rest, label, joined(c.Says)+figuresOf(c, true))
	}
}

// empty tells whether a condition asked for nothing: one whose "when" did not come about.
func empty(c *check.Condition) bool {
	return c.Says == "" && c.Threshold == "" && len(c.Needs) == 0 && !slices.ContainsFunc(parts(c), func(x check.Condition) bool { return !empty(&x) }) && (c.Not == nil || empty(c.Not))
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
	c = settled(c)
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
	if len(c.Any)+len(c.Of) == 0 {
		p.every(rest, c.All)
		return
	}
	for i := range parts(c) {
		p.alternative(rest, &parts(c)[i])
	}
}

// settled leaves open alternatives out where another one holds: they no longer matter.
func settled(c *check.Condition) *check.Condition {
	if len(c.Any) == 0 || c.Holds == nil || !*c.Holds {
		return c
	}
	out := *c
	out.Any = slices.DeleteFunc(slices.Clone(c.Any), func(x check.Condition) bool { return x.Holds == nil })
	return &out
}

// alternative writes one of several conditions; one that is itself made of parts that must all hold keeps them together.
func (p *page) alternative(indent int, c *check.Condition) {
	c = single(c)
	if c.Says != "" || len(c.All) == 0 || len(merged(c.All)) == 1 {
		p.decided(indent, c)
		return
	}
	label := answer(c.Holds)
	p.hang(indent, indent+len(label), label, "all of these:")
	p.every(indent+len(label), c.All)
}

// every writes conditions that must all hold.
func (p *page) every(indent int, list []check.Condition) {
	for _, one := range merged(list) {
		p.decided(indent, &one)
	}
}

// merged joins conditions that differ in their basis only, and leaves out those that ask for nothing.
func merged(list []check.Condition) []check.Condition {
	var out []check.Condition
	for i := 0; i < len(list); i++ {
		one := list[i]
		for i+1 < len(list) && sameBut(&list[i], &list[i+1]) {
			i++
			_, per, _ := cutLast(list[i].Says, " per ")
			one.Says += " and per " + per
		}
		if !empty(&one) {
			out = append(out, one)
		}
	}
	return out
}

// sameBut tells whether two comparisons read the same up to "per".
func sameBut(a, b *check.Condition) bool {
	first, _, ok := cutLast(a.Says, " per ")
	second, _, ok2 := cutLast(b.Says, " per ")
	return ok && ok2 && first == second && parts(a) == nil && parts(b) == nil && a.Not == nil && b.Not == nil &&
		answer(a.Holds) == answer(b.Holds) && figuresOf(a, true) == figuresOf(b, true)
}

func cutLast(s, at string) (before, after string, found bool) {
	if i := strings.LastIndex(s, at); i >= 0 {
		return s[:i], s[i+len(at):], true
	}
	return s, "", false
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

// figuresOf writes the numbers of a comparison behind its words, and what would settle it.
func figuresOf(c *check.Condition, headroom bool) string {
	var parts []string
	if c.Threshold != "" {
		parts = append(parts, comparison(c))
		if away := distance(c); headroom && away != "" {
			parts = append(parts, away)
		}
	}
	if needs := slices.DeleteFunc(slices.Clone(c.Needs), func(n string) bool { return n == c.Says }); len(needs) > 0 {
		parts = append(parts, "settled by data on "+needed(needs))
	}
	if len(parts) == 0 {
		return ""
	}
	return ": " + strings.Join(parts, "; ")
}

var relations = map[string]string{"<=": "≤", ">=": "≥", "<": "<", ">": ">"}

// comparison reads "≈0.8784 g"; the relation follows only where the words have no threshold: "≈0.8784 g ≤ 2 g".
func comparison(c *check.Condition) string {
	relation, ok := relations[c.Relation]
	if !ok {
		relation = c.Relation
	}
	if c.Holds != nil && !*c.Holds {
		relation = "is not " + relation
	}
	value, threshold := measured(c), withUnit(short(c.Threshold), c.Unit)
	switch {
	case c.NoValue != "":
		return c.NoValue
	case value == "" && c.Holds == nil:
		return "the value is not determined"
	case value == "":
		return "no single value can be told"
	case strings.Contains(c.Says, strings.ReplaceAll(threshold, bond, " ")):
		return value
	case c.Holds == nil:
		return value + ", asked for is " + relation + " " + threshold
	}
	return value + " " + relation + " " + threshold
}

// distance is how far a value is from its threshold.
func distance(c *check.Condition) string {
	switch {
	case c.NoValue != "":
	case c.Exact != nil && c.Headroom != "":
		return room(c)
	case c.Exact == nil && c.Holds != nil:
		return roomOfRange(c)
	}
	return ""
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
	return word + " by " + withUnit(short(near.String()), c.Unit) + " or more"
}
