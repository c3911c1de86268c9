package rulebook

import (
	"slices"

	"github.com/go-json-experiment/json"
)

// An Offer is a claim that can be offered to a product without being asked for: its condition needs no reference food, and neither the law nor the
// rule keeps it from being offered. The claim holds when all its needs do; they are places in Law.Needs.
type Offer struct {
	Active[Claim]
	Health bool
	Needs  []int
}

// offers lists what may be offered. Of conditions that several claims share each is listed once, so that it need be decided once.
func (l *Law) offers() {
	places := map[string]int{}
	for _, health := range []bool{false, true} {
		list := l.Claims.All
		if health {
			list = l.HealthClaims.All
		}
		for _, c := range list {
			if c.Body.Condition == nil || c.Body.Against || c.Body.Prohibited || c.Body.NotOffered {
				continue
			}
			o := Offer{Active: c, Health: health}
			for _, part := range c.Body.Condition.conjuncts(nil) {
				o.Needs = append(o.Needs, l.need(part, places))
			}
			slices.SortStableFunc(o.Needs, func(a, b int) int { return l.Needs[a].effort() - l.Needs[b].effort() })
			l.Offers = append(l.Offers, o)
		}
	}
}

func (l *Law) need(c *Condition, places map[string]int) int {
	key, err := json.Marshal(c, json.Deterministic(true))
	at, ok := places[string(key)]
	if err != nil || !ok {
		at = len(l.Needs)
		l.Needs = append(l.Needs, c)
		places[string(key)] = at
	}
	return at
}

// conjuncts are the parts that must all hold.
func (c *Condition) conjuncts(list []*Condition) []*Condition {
	if c.Op != OpAll {
		return append(list, c)
	}
	for _, p := range c.Parts {
		list = p.conjuncts(list)
	}
	return list
}

// effort puts what needs no numbers first.
func (c *Condition) effort() int {
	switch c.Op {
	case OpFact, OpAbout, OpUndecided:
		return 0
	case OpMeets, OpAmount, OpSize:
		return 1
	}
	return 2
}
