// Package recheck finds out what a change of rules, or of the labelling date, does to a recipe's label: which values print otherwise, which
// claims are gained and lost, which limits are crossed, and which changed rules are the cause.
//
// New makes a Plan for two sides; Plan.Recipe compares one recipe. A plan is pure and may be used by many at once: what differs between two
// laws is worked out once, and a recipe is judged only in markets whose law differs. The result is that of two full checks.
package recheck

import (
	"slices"
	"sync"

	"gramlaw/internal/check"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// A Plan compares two sides.
type Plan struct {
	was, is  check.Side
	request  check.Request
	practice []rulebook.Change // what practice presumes otherwise

	mu   sync.RWMutex
	laws map[[2]*rulebook.Law]*between
}

// between is what differs between two laws of a market.
type between struct {
	changes []rulebook.Change
	changed map[string]bool
	rests   [2]map[string][]string // before, after
	touched map[string]bool        // changed, or resting on what is; nil where a change can reach everything
}

// New plans a comparison in the markets of In, none of which may be missing in one of the sets; without In, in all that both sets have.
func New(was, is check.Side, q check.Request) (*Plan, recipe.Faults) {
	p := &Plan{was: was, is: is, request: q, laws: map[[2]*rulebook.Law]*between{}}
	for _, s := range []check.Side{was, is} {
		one := q
		one.On = s.On
		if faults := one.Faults(s.Book); len(faults) > 0 {
			return nil, faults
		}
	}
	if was.Book != is.Book {
		for _, c := range rulebook.Difference(was.Book, is.Book) {
			if c.Jurisdiction == "practice" {
				p.practice = append(p.practice, c)
			}
		}
	}
	return p, nil
}

// Markets are those in which a recipe's own list, or all, is compared: in the plan's request and in both sets.
func (p *Plan) markets(own []string) []string {
	list := p.request.In
	if len(list) == 0 {
		list = own
	}
	known := p.is.Book.Jurisdictions()
	if len(list) == 0 {
		list = p.was.Book.Jurisdictions()
	}
	return slices.DeleteFunc(slices.Clone(list), func(j string) bool {
		return !slices.Contains(known, j) || !slices.Contains(p.was.Book.Jurisdictions(), j) || len(own) > 0 && !slices.Contains(own, j)
	})
}

// An Outcome is what a change does to one recipe: nothing, where it has no market.
type Outcome struct {
	Recipe  check.Identity `json:"recipe"`
	Markets []Market       `json:"markets"`
}

// A Market is what changes in one market.
type Market struct {
	Jurisdiction string   `json:"jurisdiction"`
	Changes      []Change `json:"changes"`
}

// Changed tells whether anything is different.
func (o *Outcome) Changed() bool { return len(o.Markets) > 0 }

// Recipe compares one recipe. Faults are those of a check.
func (p *Plan) Recipe(r *recipe.Recipe) (*Outcome, recipe.Faults) {
	out := &Outcome{Recipe: check.Identity{ID: r.ID, Name: r.Name, Digest: r.Digest}, Markets: []Market{}}
	q := p.request
	if q.In = p.markets(r.Jurisdictions); len(q.In) == 0 {
		return out, nil
	}
	pairs, faults := check.Both(r, p.was, p.is, q, func(was, is *rulebook.Law) (bool, check.Touch) {
		b := p.between(was, is)
		return len(p.practice) > 0 || len(b.changes) > 0, p.touch(b)
	})
	if len(faults) > 0 {
		return nil, faults
	}
	for i := range pairs {
		pair := &pairs[i]
		if changes := p.compare(pair, p.between(pair.LawWas, pair.LawIs)); len(changes) > 0 {
			out.Markets = append(out.Markets, Market{pair.Jurisdiction, changes})
		}
	}
	return out, nil
}

// touch tells which rules can give another result.
func (p *Plan) touch(b *between) check.Touch {
	if len(p.practice) > 0 || b.touched == nil {
		return nil
	}
	return func(id string) bool { return b.touched[id] }
}

// reached are the changed rules and all that rest on them, directly or not. Of two sets it is nil: their markets' own pages may differ; and where
// what holds for the whole label has changed.
func (b *between) reached(oneSet bool) map[string]bool {
	if !oneSet || slices.ContainsFunc(b.changes, func(c rulebook.Change) bool { return slices.Contains(wholeLabel, c.Kind) }) {
		return nil
	}
	above := map[string][]string{}
	for _, rests := range b.rests {
		for id, list := range rests {
			for _, on := range list {
				above[on] = append(above[on], id)
			}
		}
	}
	touched := map[string]bool{}
	for todo := sortedKeys(b.changed); len(todo) > 0; {
		id := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if !touched[id] {
			touched[id] = true
			todo = append(todo, above[id]...)
		}
	}
	return touched
}

// between is what differs between two laws, worked out once.
func (p *Plan) between(was, is *rulebook.Law) *between {
	key := [2]*rulebook.Law{was, is}
	p.mu.RLock()
	b := p.laws[key]
	p.mu.RUnlock()
	if b != nil {
		return b
	}
	b = &between{changes: rulebook.Changes(was, is), changed: map[string]bool{}}
	for _, c := range b.changes {
		b.changed[c.ID] = true
	}
	if len(b.changes) > 0 {
		b.rests = [2]map[string][]string{was.Rests(), is.Rests()}
		b.touched = b.reached(p.was.Book == p.is.Book)
	}
	p.mu.Lock()
	p.laws[key] = b
	p.mu.Unlock()
	return b
}
