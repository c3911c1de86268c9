package claim

import (
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// Decide is the truth that Evaluate finds, without the parts that lead to it: most conditions are asked by other rules, and
// nobody reads why.
func Decide(c *rulebook.Condition, x Context) quantity.Truth { return evaluator{x}.decide(c) }

// Surely tells whether Decide would find that a condition holds, and finds out sooner when it does not: of parts that must all hold,
// what needs no numbers comes first, and the first that does not hold ends it.
func Surely(c *rulebook.Condition, x Context) bool { return evaluator{x}.surely(c) }

func (x evaluator) surely(c *rulebook.Condition) bool {
	if c == nil {
		return true
	}
	switch c.Op {
	case rulebook.OpAll:
		for _, numbers := range []bool{false, true} {
			for _, p := range c.Parts {
				if asksNumbers(p) == numbers && !x.surely(p) {
					return false
				}
			}
		}
		return true
	case rulebook.OpAny:
		for _, p := range c.Parts {
			if x.surely(p) {
				return true
			}
		}
		return false
	}
	return x.decide(c) == quantity.Yes
}

func asksNumbers(c *rulebook.Condition) bool {
	switch c.Op {
	case rulebook.OpFact, rulebook.OpAbout:
		return false
	}
	return true
}

func (x evaluator) decide(c *rulebook.Condition) quantity.Truth {
	if c == nil {
		return quantity.Yes
	}
	switch c.Op {
	case rulebook.OpCompare:
		return x.decideBases(c)
	case rulebook.OpAll:
		return x.decideUntil(c, quantity.Yes, quantity.No)
	case rulebook.OpAny:
		return x.decideUntil(c, quantity.No, quantity.Yes)
	case rulebook.OpNot:
		return x.decide(c.Parts[0]).Not()
	case rulebook.OpCount:
		truths := make([]quantity.Truth, len(c.Parts))
		for i, p := range c.Parts {
			truths[i] = x.decide(p)
		}
		return united(c, truths)
	case rulebook.OpWhen:
		return x.decideWhen(c)
	case rulebook.OpHolds:
		named, ok := x.Named(c.Name)
		if !ok {
			return quantity.No
		}
		return x.decide(named)
	}
	return x.askTruth(c)
}

// decideUntil starts from what nothing gives, and ends at the first part that settles the whole.
func (x evaluator) decideUntil(c *rulebook.Condition, out, settles quantity.Truth) quantity.Truth {
	for _, p := range c.Parts {
		switch x.decide(p) {
		case settles:
			return settles
		case quantity.Open:
			out = quantity.Open
		}
	}
	return out
}

func (x evaluator) decideWhen(c *rulebook.Condition) quantity.Truth {
	switch x.decide(c.Parts[0]) {
	case quantity.Yes:
		return x.decide(c.Parts[1])
	case quantity.No:
		return x.decide(c.Parts[2])
	}
	if then := x.decide(c.Parts[1]); then == x.decide(c.Parts[2]) {
		return then
	}
	return quantity.Open
}

func (x evaluator) decideBases(c *rulebook.Condition) quantity.Truth {
	if len(c.Per) == 0 {
		return x.decideOn(c, rulebook.Per{})
	}
	out := quantity.Yes
	for _, per := range c.Bases() {
		out = quantity.All(out, x.decideOn(c, per))
		if out == quantity.No {
			break
		}
	}
	return out
}

func (x evaluator) decideOn(c *rulebook.Condition, per rulebook.Per) quantity.Truth {
	subject, missing := x.subject(c)
	if missing != "" {
		return quantity.Open
	}
	s := measure(c, per, subject, c.Subject == "", x.Context)
	switch {
	case s.missing != "":
		return quantity.Open
	case c.Relation.Relative():
		return x.relative(c, per, s, nil).Truth
	}
	return decideSides(c.Relation, s, c.Limit(), nil)
}
