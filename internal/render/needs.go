package render

import (
	"fmt"
	"slices"
	"strings"

	"gramlaw/internal/check"
)

// namesMost is how many ingredients are named; JSON has them all.
const namesMost = 15

// needed writes what would have to be known, the components of one ingredient together: "yolk (FASAT, FATRN), salt (ID)".
func needed(list []string) string {
	var by bundles
	for _, s := range list {
		name, what := ingredientOf(s)
		by.add(what, name)
	}
	var out []string
	for _, b := range by.list[:min(len(by.list), namesMost)] {
		s := b.key[0]
		if what := slices.Compact(b.names); what[0] != "" {
			s += " (" + strings.Join(what, ", ") + ")"
		}
		out = append(out, s)
	}
	if more := len(by.list) - namesMost; more > 0 {
		return fmt.Sprintf("%s and %d more", strings.Join(out, ", "), more)
	}
	return strings.Join(out, ", ")
}

// ingredientOf takes "yolk (FASAT)" apart.
func ingredientOf(need string) (name, what string) {
	if i := strings.LastIndex(need, " ("); i > 0 && strings.HasSuffix(need, ")") {
		return need[:i], need[i+2 : len(need)-1]
	}
	return need, ""
}

// untold is what a claim needs and neither its condition nor the declaration has told.
func untold(m *check.Market, c *check.Claim) []string {
	told := map[string]bool{}
	for _, l := range m.Declaration.Lines {
		if l.Presence != "optional" {
			tell(told, l.Needs)
		}
	}
	if c.Condition != nil {
		walk(c.Condition, func(c *check.Condition) { tell(told, c.Needs) })
	}
	var out []string
	for _, n := range c.Needs {
		if !told[n] {
			told[n] = true
			out = append(out, n)
		}
	}
	return out
}

func tell(told map[string]bool, list []string) {
	for _, n := range list {
		told[n] = true
	}
}

// walk visits a condition and all its parts.
func walk(c *check.Condition, visit func(*check.Condition)) {
	visit(c)
	for i := range parts(c) {
		walk(&parts(c)[i], visit)
	}
	if c.Not != nil {
		walk(c.Not, visit)
	}
}
