package check

import (
	"slices"

	"gramlaw/internal/claim"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// condition writes a decided condition for the report.
func (m *market) condition(r claim.Result) Condition {
	out := Condition{Says: r.Says, Holds: truthPointer(r.Truth)}
	if r.Missing != "" {
		out.Needs = []string{r.Missing}
	}
	if r.Compare != nil {
		m.comparison(&out, r.Compare, r.Truth)
	}
	parts := make([]Condition, len(r.Parts))
	for i := range r.Parts {
		parts[i] = m.condition(r.Parts[i])
	}
	switch {
	case len(parts) == 0:
	case r.Op == rulebook.OpAny:
		out.Any = parts
	case r.Op == rulebook.OpNot:
		out.Not = &parts[0]
	case r.Op == rulebook.OpCount:
		out.Of, out.AtLeast = parts, r.N
	default:
		out.All = parts
	}
	return out
}

func (m *market) comparison(out *Condition, c *claim.Comparison, t quantity.Truth) {
	out.Relation, out.Unit, out.Threshold = symbol(c.Relation), c.Unit.String(), exactText(c.Threshold)
	if c.Null {
		out.NoValue = "there is nothing to be a share of"
		return
	}
	if c.Relation.Relative() {
		out.least = exactText(c.Low)
	}
	if c.Known {
		out.Exact, out.Headroom = text(c.Exact), exactText(c.Headroom)
	}
	if t == quantity.Open || !c.Known {
		out.Low = exactText(c.Low)
		if !c.Endless {
			out.High = exactText(c.High)
		}
	}
	if t == quantity.Open {
		out.Needs = append(out.Needs, m.needs(c.Variables)...)
	}
}

func symbol(r rulebook.Relation) string {
	switch r {
	case rulebook.AtMost, rulebook.NotMore:
		return "<="
	case rulebook.Below:
		return "<"
	case rulebook.Above:
		return ">"
	}
	return ">="
}

// needsOf collects what would have to be known, from every open part.
func needsOf(c Condition) []string {
	var out []string
	var walk func(Condition)
	walk = func(c Condition) {
		if c.Holds != nil {
			return
		}
		for _, n := range c.Needs {
			if !slices.Contains(out, n) {
				out = append(out, n)
			}
		}
		for _, list := range [][]Condition{c.All, c.Any, c.Of} {
			for _, p := range list {
				walk(p)
			}
		}
		if c.Not != nil {
			walk(*c.Not)
		}
	}
	walk(c)
	return out
}

// differenceIn finds the per cent by which the product differs from its reference food, cut to a whole number.
func differenceIn(c *Condition) string {
	if c.Unit == "%" && c.Relation == ">=" && c.least != "" && c.least != "0" {
		whole := c.least
		for i := range whole {
			if whole[i] == '.' {
				whole = whole[:i]
				break
			}
		}
		return whole + " %"
	}
	for _, list := range [][]Condition{c.All, c.Any, c.Of} {
		for i := range list {
			if d := differenceIn(&list[i]); d != "" {
				return d
			}
		}
	}
	return ""
}
