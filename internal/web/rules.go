package web

import (
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/coverage"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// marketLaw is what one market's rules say on one labelling date.
type marketLaw struct {
	Rules        check.RuleSet `json:"rules"`
	Jurisdiction string        `json:"jurisdiction"`
	Name         string        `json:"name"`
	Languages    []string      `json:"languages"`
	On           string        `json:"on"`
	Transition   string        `json:"transition"`
	Edition      string        `json:"edition,omitzero"`
	Editions     []edition     `json:"editions"`
	InForce      []activeRule  `json:"in_force"`
	Gaps         []string      `json:"gaps"`
	NotJudged    []string      `json:"not_judged"`
	Caution      string        `json:"caution"`
}

// An edition is a reform whose rules go together on one label.
type edition struct {
	Edition      string   `json:"edition"`
	From         string   `json:"from"`
	RequiredFrom []string `json:"required_from,omitzero"` // several where the law staggers the day
	Until        string   `json:"until,omitzero"`
	Source       string   `json:"source"`
}

// An activeRule is a rule with the version of it that holds.
type activeRule struct {
	Kind string `json:"kind"` // the name of its file in the rule set
	ID   string `json:"id"`
	version
}

// A version is what a dated version of a rule says of itself.
type version struct {
	From         string          `json:"from"`
	RequiredFrom []string        `json:"required_from,omitzero"` // several where the law staggers the day
	Until        string          `json:"until,omitzero"`
	Edition      string          `json:"edition,omitzero"`
	AppliesTo    string          `json:"applies_to,omitzero"`
	Source       rulebook.Source `json:"source"`
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

// market finds the market of the path.
func (x *exchange) market() (*rulebook.Rules, *Problem) {
	m, ok := x.rules.Book.Rules(x.r.PathValue("jurisdiction"))
	if !ok {
		return nil, problem(notFound, "The rule set has no such market; it has "+strings.Join(x.rules.Book.Jurisdictions(), ", ")+".")
	}
	return m, nil
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

// law is the market's law where no fact of a recipe is known: a staggered day counts as reached when its last one is.
func (x *exchange) law(on string, t rulebook.Transition) *rulebook.Law {
	open := func(*rulebook.Condition) quantity.Truth { return quantity.Open }
	law, _ := x.rules.Book.At(x.r.PathValue("jurisdiction"), on, t, open) // market has found it
	return law
}

func (x *exchange) ruleSet() check.RuleSet {
	return check.RuleSet{Version: x.rules.Book.Version, Digest: x.rules.Book.Digest}
}

func given(faults ...*Fault) *Problem {
	var out []Fault
	for _, f := range faults {
		if f != nil {
			out = append(out, *f)
		}
	}
	if len(out) == 0 {
		return nil
	}
	return faultyParameters(out...)
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
	if p := given(badOn, badTransition); p != nil {
		return p
	}
	law := x.law(on, t)
	page := marketLaw{
		Rules: x.ruleSet(), Jurisdiction: m.Market.Jurisdiction, Name: m.Market.Name, Languages: some(m.Market.Languages), On: on, Transition: string(t),
		Edition: law.Edition, Editions: editions(&m.Market), InForce: []activeRule{}, Gaps: some(m.Market.Gaps), NotJudged: some(m.Market.NotJudged), Caution: caution(&m.Market),
	}
	law.Each(func(kind, id string, h *rulebook.Head) {
		page.InForce = append(page.InForce, activeRule{kind, id, *versionOf(h)})
	})
	return x.replyJSON(page, true)
}

func editions(m *rulebook.Market) []edition {
	out := []edition{}
	for _, e := range m.Editions {
		out = append(out, edition{e.Edition, e.From, days(e.RequiredFrom), e.Until, e.Source.Ref})
	}
	return out
}

func days(list []rulebook.Required) []string {
	var out []string
	for _, r := range list {
		out = append(out, r.Date)
	}
	return out
}

func some(list []string) []string { return append([]string{}, list...) }

func caution(m *rulebook.Market) string {
	return strings.TrimSpace(m.Caution + " " + check.Caution)
}

func versionOf(h *rulebook.Head) *version {
	if h == nil {
		return nil
	}
	return &version{h.From, days(h.RequiredFrom), h.Until, h.Edition, h.AppliesTo, h.Source}
}
