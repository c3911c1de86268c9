package check

import (
	"strings"

	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// withStated adds to a claim's condition that the number in the claim be true.
func (m *market) withStated(b *rulebook.Claim, a recipe.Claim) *rulebook.Condition {
	if a.Stated == nil || b.Stated == nil {
		return b.Condition
	}
	return &rulebook.Condition{Op: rulebook.OpAll, Parts: []*rulebook.Condition{b.Condition, m.statedCondition(b.Stated, *a.Stated)}}
}

// statedCondition is what must hold for a stated number to be true.
func (m *market) statedCondition(s *rulebook.Stated, number quantity.Amount) *rulebook.Condition {
	c := &rulebook.Condition{Op: rulebook.OpCompare, Of: s.Of, Threshold: number}
	per := s.Per
	percent := number.Unit == quantity.PerCent
	switch s.As {
	case "reduction":
		c.Relation = either(percent, rulebook.ReducedBy, rulebook.LessBy)
	case "increase":
		c.Relation = either(percent, rulebook.IncreasedBy, rulebook.MoreBy)
	case "at most":
		c.Relation = rulebook.AtMost
	case "declared amount":
		return m.declaredAs(c, number)
	case "free share":
		if !percent {
			return mismatch(number)
		}
		per, c.Relation = "100 g", rulebook.AtMost
		c.Threshold = quantity.Amount{Value: hundred.Sub(number.Value), Unit: quantity.Gram}
	default:
		c.Relation = rulebook.AtLeast
	}
	relative := c.Relation == rulebook.ReducedBy || c.Relation == rulebook.IncreasedBy
	view := m.as(m.product)
	for q := range s.Of {
		if !relative && view.unit(q).Dimension() != c.Threshold.Unit.Dimension() {
			return mismatch(number)
		}
	}
	if per == "" {
		per = m.law.Market.DefaultBases[0].Per
	}
	c.Per = []string{per}
	return c.Prepare()
}

func either(first bool, a, b rulebook.Relation) rulebook.Relation {
	if first {
		return a
	}
	return b
}

// declaredAs asks that the number be what the line of the one quantity prints.
func (m *market) declaredAs(c *rulebook.Condition, number quantity.Amount) *rulebook.Condition {
	q := c.Prepare().Terms()[0].Name
	value, ok := number.In(m.as(m.product).unit(q))
	if !ok {
		return mismatch(number)
	}
	return &rulebook.Condition{Op: rulebook.OpDeclared, Name: q, Is: value.String()}
}

// mismatch stays open: a number in another unit says nothing about the quantity.
func mismatch(number quantity.Amount) *rulebook.Condition {
	return &rulebook.Condition{Op: rulebook.OpUndecided, Why: rulebook.Words{"en": "the stated number " + number.String() + " has a unit in which it cannot be checked"}}
}

const placeOfNumber = "{number}"

// fits tells whether words, folded, equal a wording, which may hold a place for a number.
func fits(wording, words string) bool {
	return folded(wording) == words || numberIn(wording, words) != nil
}

// numberIn is the number that words, folded, have where a wording has its place for one; nil where they do not fit.
func numberIn(wording, words string) *quantity.Amount {
	before, after, ok := strings.Cut(folded(wording), placeOfNumber)
	if !ok || len(words) < len(before)+len(after) || !strings.HasPrefix(words, before) || !strings.HasSuffix(words, after) {
		return nil
	}
	text := strings.TrimSpace(words[len(before) : len(words)-len(after)])
	text = strings.NewReplacer(" percent", "%", " per cent", "%", ",", ".", "\u00a0", " ").Replace(text)
	a, err := quantity.ParseAmount(text)
	if err != nil {
		return nil
	}
	return &a
}
