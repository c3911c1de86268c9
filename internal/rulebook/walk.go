package rulebook

import (
	"cmp"
	"slices"
)

// A Visit takes one version of a rule: the kind is the name of its file, the head what the version says of itself.
type Visit func(kind, id string, h *Head)

// Each visits every rule that holds, kind by kind, in the order of the files.
func (l *Law) Each(visit Visit) {
	visitEach("definitions", l.Definitions, visit)
	visitEach("energy", l.Energy, visit)
	visitEach("reference_values", l.References, visit)
	visitEach("rounding", l.Roundings, visit)
	visitEach("declaration", l.Declarations, visit)
	visitEach("reference_amounts", l.ReferenceAmounts, visit)
	visitEach("claims", l.Claims, visit)
	visitEach("health_claims", l.HealthClaims, visit)
	visitEach("disclosure", l.Disclosures, visit)
	visitEach("limits", l.Limits, visit)
	visitEach("serving", l.Serving, visit)
	visitEach("naming", l.Naming, visit)
	visitEach("conditions", l.Conditions, visit)
}

func visitEach[T any](kind string, l List[T], visit Visit) {
	for _, a := range l.All {
		visit(kind, a.ID, a.Head)
	}
}

// A Change is a rule of which another version holds in one law than in the other. Was or Is is nil where none holds.
type Change struct {
	Kind, ID string
	Was, Is  *Head
}

// Changes compares two laws of one rule set, in the order of the files; rules that end stand last.
func Changes(was, is *Law) []Change {
	before := map[string]*Head{}
	was.Each(func(_, id string, h *Head) { before[id] = h })
	var out []Change
	is.Each(func(kind, id string, h *Head) {
		if before[id] != h {
			out = append(out, Change{kind, id, before[id], h})
		}
		delete(before, id)
	})
	was.Each(func(kind, id string, h *Head) {
		if before[id] != nil {
			out = append(out, Change{kind, id, h, nil})
		}
	})
	return out
}

// An Event is a day on which a version of a rule may be used, must be used or no longer holds. Conditional is a day that depends on
// facts about the product or its maker.
type Event struct {
	Date, Event string
	Conditional bool
	Kind, ID    string
	Edition     string
}

// Events lists the days after one and up to another, oldest first.
func (r *Rules) Events(after, upTo string) []Event {
	var out []Event
	put := func(date, what string, conditional bool, kind, id string, h *Head) {
		if date > after && date <= upTo {
			out = append(out, Event{date, what, conditional, kind, id, h.Edition})
		}
	}
	visit := func(kind, id string, h *Head) {
		put(h.From, "may be used", false, kind, id, h)
		for _, q := range h.RequiredFrom {
			put(q.Date, "must be used", q.When != nil, kind, id, h)
		}
		put(h.Until, "no longer holds", false, kind, id, h)
	}
	for _, t := range r.tables() {
		t.heads(visit)
	}
	slices.SortStableFunc(out, func(a, b Event) int { return cmp.Compare(a.Date, b.Date) })
	return out
}
