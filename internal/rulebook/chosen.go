package rulebook

import (
	"sync"

	"gramlaw/internal/quantity"
)

// mostChosen bounds how many dates a book remembers the laws of.
const mostChosen = 256

// chosen remembers laws by market, date and transition, and by the answers that led to them.
type chosen struct {
	mu     sync.RWMutex
	routes map[asked][]route
}

type asked struct {
	jurisdiction, date string
	transition         Transition
}

// A route is a law with the conditions its choice asked, in order, and their answers.
type route struct {
	conditions []*Condition
	answers    []quantity.Truth
	law        *Law
}

// through notes what is asked.
func (p *route) through(facts func(*Condition) quantity.Truth) func(*Condition) quantity.Truth {
	return func(c *Condition) quantity.Truth {
		t := facts(c)
		p.conditions, p.answers = append(p.conditions, c), append(p.answers, t)
		return t
	}
}

// find follows the routes of a key. Equal answers lead to equal questions, so that facts is asked what a choice would have asked.
func (c *chosen) find(key asked, facts func(*Condition) quantity.Truth) (*Law, bool) {
	c.mu.RLock()
	routes := c.routes[key]
	c.mu.RUnlock()
	var answers []quantity.Truth
	for i := range routes {
		if p := &routes[i]; p.follows(&answers, facts) {
			return p.law, true
		}
	}
	return nil, false
}

// follows tells whether the answers are the route's; what has been asked on an earlier route is not asked again.
func (p *route) follows(answers *[]quantity.Truth, facts func(*Condition) quantity.Truth) bool {
	for i, c := range p.conditions {
		if i == len(*answers) {
			*answers = append(*answers, facts(c))
		}
		if (*answers)[i] != p.answers[i] {
			return false
		}
	}
	return true
}

func (c *chosen) keep(key asked, p route) {
	c.mu.Lock()
	defer c.mu.Unlock()
	if c.routes == nil || len(c.routes) >= mostChosen {
		c.routes = map[asked][]route{}
	}
	c.routes[key] = append(c.routes[key][:len(c.routes[key]):len(c.routes[key])], p)
}
