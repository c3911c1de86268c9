package web

import (
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/coverage"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// marketRules is what one market's rules say on one labelling date.
type marketRules struct {
	Rules        check.RuleSet      `json:"rules"`
	Jurisdiction string             `json:"jurisdiction"`
	Name         string             `json:"name"`
	Languages    []string           `json:"languages"`
	On           string             `json:"on"`
	Transition   string             `json:"transition"`
	Edition      string             `json:"edition,omitzero"`
	Editions     []rulebook.Edition `json:"editions"`
	InForce      []ruleInForce      `json:"in_force"`
	Gaps         []string           `json:"gaps"`
	NotJudged    []string           `json:"not_judged"`
	Caution      string             `json:"caution"`
}

// A ruleInForce is a rule with the version of it that holds.
type ruleInForce struct {
	Kind           string `json:"kind"` // the name of its file in the rule set
	ID             string `json:"id"`
	*rulebook.Head `json:",embed"`
	Text           any `json:"text"` // as the rule set has it
}

// marketChanges is what differs between two labelling dates.
type marketChanges struct {
	Rules        check.RuleSet     `json:"rules"`
	Jurisdiction string            `json:"jurisdiction"`
	From         string            `json:"from"`
	To           string            `json:"to"`
	Transition   string            `json:"transition"`
	EditionWas   string            `json:"edition_was,omitzero"`
	EditionIs    string            `json:"edition_is,omitzero"`
	Changes      []rulebook.Change `json:"changes"`
	Caution      string            `json:"caution"`
}

// getRules tells what the rule set covers.
func getRules(x *exchange) *Problem {
	if _, p := x.parameters(); p != nil {
		return p
	}
	report, err := coverage.Of(x.rules.Book, nil, check.Caution)
	if err != nil {
		return problem(internal, "")
	}
	return x.replyJSON(report, true)
}

// getMarket shows the rules in force.
func getMarket(x *exchange) *Problem {
	m, p := x.market()
	if p != nil {
		return p
	}
	parameters, p := x.parameters("on", "transition")
	if p != nil {
		return p
	}
	on, badOn := date(parameters, "on", x.today())
	t, badTransition := transition(parameters)
	if p := faultyParameters(badOn, badTransition); p != nil {
		return p
	}
	done, p := x.gate.work(x.r.Context()) // half a megabyte is written: as much work as a check
	if p != nil {
		return p
	}
	defer done()
	law := x.law(on, t)
	page := marketRules{
		Rules: x.ruleSet(), Jurisdiction: m.Jurisdiction, Name: m.Name, Languages: m.Languages, On: on, Transition: string(t), Edition: law.Edition,
		Editions: m.Editions, Gaps: m.Gaps, NotJudged: m.NotJudged, Caution: caution(m),
	}
	law.Each(func(kind, id string, h *rulebook.Head, body any) {
		page.InForce = append(page.InForce, ruleInForce{kind, id, h, body})
	})
	return x.replyJSON(page, true)
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
	if p := faultyParameters(badFrom, badTo, badTransition); p != nil {
		return p
	}
	done, p := x.gate.work(x.r.Context())
	if p != nil {
		return p
	}
	defer done()
	was, is := x.law(from, t), x.law(to, t)
	return x.replyJSON(marketChanges{
		Rules: x.ruleSet(), Jurisdiction: m.Jurisdiction, From: from, To: to, Transition: string(t), EditionWas: was.Edition, EditionIs: is.Edition,
		Changes: rulebook.Changes(was, is), Caution: caution(m),
	}, true)
}

// market finds the market of the path.
func (x *exchange) market() (*rulebook.Market, *Problem) {
	r, ok := x.rules.Book.Rules(x.r.PathValue("jurisdiction"))
	if !ok {
		return nil, problem(notFound, "The rule set has no such market; it has "+strings.Join(x.rules.Book.Jurisdictions(), ", ")+".")
	}
	return &r.Market, nil
}

// law is the market's law where no fact of a recipe is known: a staggered day counts as reached when its last one is.
func (x *exchange) law(on string, t rulebook.Transition) *rulebook.Law {
	open := func(*rulebook.Condition) quantity.Truth { return quantity.Open }
	law, _ := x.rules.Book.At(x.r.PathValue("jurisdiction"), on, t, open) // market has found it
	return law
}

// transition reads the parameter of that name.
func transition(parameters map[string]string) (rulebook.Transition, *Fault) {
	switch t := rulebook.Transition(parameters["transition"]); t {
	case "", rulebook.WhenRequired:
		return rulebook.WhenRequired, nil
	case rulebook.Newest:
		return t, nil
	}
	return "", &Fault{Parameter: "transition", Code: "unknown-transition", Says: "required or newest is wanted"}
}

func (x *exchange) ruleSet() check.RuleSet {
	return check.RuleSet{Version: x.rules.Book.Version, Digest: x.rules.Book.Digest}
}

func caution(m *rulebook.Market) string {
	return strings.TrimSpace(m.Caution + " " + check.Caution)
}
