package web

import (
	"gramlaw/internal/check"
	"gramlaw/internal/rulebook"
)

// marketChanges is what differs between two labelling dates.
type marketChanges struct {
	Rules        check.RuleSet `json:"rules"`
	Jurisdiction string        `json:"jurisdiction"`
	From         string        `json:"from"`
	To           string        `json:"to"`
	Transition   string        `json:"transition"`
	EditionWas   string        `json:"edition_was,omitzero"`
	EditionIs    string        `json:"edition_is,omitzero"`
	Changes      []change      `json:"changes"`
	Caution      string        `json:"caution"`
}

// A change is a rule that another version of, or none, holds later.
type change struct {
	Kind   string   `json:"kind"`
	ID     string   `json:"id"`
	Change string   `json:"change"` // "begins", "ends" or "replaced"
	Was    *version `json:"was,omitzero"`
	Is     *version `json:"is,omitzero"`
}

// getChanges compares two labelling dates.
func getChanges(x *exchange) *Problem {
	m, p := x.market()
	if p != nil {
		return p
	}
	parameters, p := x.parameters("from", "to", "transition")
	if p != nil {
		return p
	}
	from, badFrom := date(parameters, "from", "")
	to, badTo := date(parameters, "to", "")
	t, badTransition := transition(parameters)
	if badFrom == nil && badTo == nil && from > to {
		badTo = &Fault{Parameter: "to", Code: "range-reversed", Says: "the day lies before from"}
	}
	if p := given(badFrom, badTo, badTransition); p != nil {
		return p
	}
	was, is := x.law(from, t), x.law(to, t)
	return x.replyJSON(marketChanges{
		Rules: x.ruleSet(), Jurisdiction: m.Market.Jurisdiction, From: from, To: to, Transition: string(t), EditionWas: was.Edition, EditionIs: is.Edition,
		Changes: changes(was, is), Caution: caution(&m.Market),
	}, true)
}

// changes lists rules in the order of the files; those that end stand last.
func changes(was, is *rulebook.Law) []change {
	before := map[string]*rulebook.Head{}
	was.Each(func(_, id string, h *rulebook.Head) { before[id] = h })
	out := []change{}
	is.Each(func(kind, id string, h *rulebook.Head) {
		switch before[id] {
		case h:
		case nil:
			out = append(out, change{kind, id, "begins", nil, versionOf(h)})
		default:
			out = append(out, change{kind, id, "replaced", versionOf(before[id]), versionOf(h)})
		}
		delete(before, id)
	})
	was.Each(func(kind, id string, h *rulebook.Head) {
		if before[id] != nil {
			out = append(out, change{kind, id, "ends", versionOf(h), nil})
		}
	})
	return out
}
