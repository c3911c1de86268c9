package claim

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"gramlaw/internal/rulebook"
)

// A Namer names quantities in words.
type Namer interface {
	Name(quantity string) string
}

func quote(s string) string { return "“" + s + "”" }

func list(words []string) string {
	switch len(words) {
	case 0:
		return "nothing"
	case 1:
		return words[0]
	}
	return strings.Join(words[:len(words)-1], ", ") + " or " + words[len(words)-1]
}

func basisName(p rulebook.Per) string {
	switch {
	case p.Name != "":
		return p.Name
	case p.Quantity != "":
		return p.Amount.String() + " " + strings.ReplaceAll(p.Quantity, "-", " ")
	}
	return "mass of " + p.Amount.String() + " (density)"
}

// compareSays writes a comparison in words: "saturated fat at most 1 g per reference amount".
func compareSays(c *rulebook.Condition, per string, x Namer) string {
	var names []string
	for _, q := range slices.Sorted(maps.Keys(c.Of)) {
		name := x.Name(q)
		switch k := c.Of[q]; {
		case k.IsNegative():
			name = "− " + name
		case !k.Equal(k.Abs().Truncate(0)) || k.String() != "1":
			name = k.String() + " × " + name
		}
		names = append(names, name)
	}
	s := strings.Join(names, " + ")
	if len(c.Times) > 0 {
		var facts []string
		for i := range c.Times {
			facts = append(facts, c.Times[i].Fact)
		}
		s += " × " + list(facts)
	}
	if c.Origin != "" {
		s += " of " + c.Origin + " origin"
	}
	if c.Subject == "reference food" {
		s += " of the reference food"
	}
	if c.As != "" {
		s += " as " + c.As
	}
	switch c.Relation {
	case rulebook.NotMore:
		s += " not more than in the reference food"
	default:
		s += fmt.Sprintf(" %s %s", c.Relation, c.Threshold)
	}
	if c.Relation.Relative() && c.Relation != rulebook.NotMore {
		s += " against the reference food"
	}
	if per != "" {
		s += " per " + per
	}
	return s
}

// atomSays writes a condition that is no comparison in words.
func atomSays(c *rulebook.Condition, x Namer) string {
	switch c.Op {
	case rulebook.OpDeclared:
		return declaredSays(c, x)
	case rulebook.OpMeets:
		if c.Subject == "reference food" {
			return "the reference food meets " + quote(rulebook.Name(c.Name))
		}
		return "meets " + quote(rulebook.Name(c.Name))
	case rulebook.OpFact:
		return factSays(c)
	case rulebook.OpAmount:
		return amountSays(c)
	case rulebook.OpSize:
		if c.Stated {
			return "the " + c.Name + " is stated"
		}
		s := "the " + c.Name + " is " + string(c.Relation) + " " + c.Threshold.String()
		if of, ok := strings.CutPrefix(c.As, "share of "); ok {
			s += " of the " + of
		}
		return s
	case rulebook.OpKind:
		return "the reference food is " + list(c.Kinds)
	case rulebook.OpCategory:
		return "the category is " + list(c.Kinds)
	case rulebook.OpUndecided:
		return c.Why.In("en")
	case rulebook.OpAbout:
		return "claimed about " + list(c.About)
	default:
		return ingredientSays(c)
	}
}

func factSays(c *rulebook.Condition) string {
	switch {
	case c.Is != "":
		return c.Name + ": " + c.Is
	case c.Has != "":
		return c.Name + ": " + c.Has + " among them"
	case c.Stated:
		return c.Name + " is stated"
	}
	return c.Name + " " + string(c.Relation) + " " + c.Threshold.String()
}

func declaredSays(c *rulebook.Condition, x Namer) string {
	if c.Is == "" {
		return x.Name(c.Name) + " stands in the declaration"
	}
	return x.Name(c.Name) + " is declared as " + c.Is
}

func amountSays(c *rulebook.Condition) string {
	words := make([]string, len(c.Amounts))
	for i, a := range c.Amounts {
		words[i] = a.String()
	}
	return "reference amount at most " + list(words)
}

func ingredientSays(c *rulebook.Condition) string {
	s := "no ingredient is " + list(c.Process)
	if c.IodineAbove != nil {
		s += " with an iodine value above " + c.IodineAbove.String()
	}
	return s
}
