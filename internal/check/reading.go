package check

import (
	"slices"
	"strings"

	"gramlaw/internal/claim"
	"gramlaw/internal/rulebook"
	"gramlaw/internal/wording"
)

// reading writes what is known of words without a product.
func (m *market) reading(r *wording.Reading, language string) Reading {
	out := Reading{
		Text: r.Text, Span: []int{r.Span[0], r.Span[1]}, Relation: r.Relation, Component: r.Component, Thing: r.Thing, Function: r.Function,
		Amount: r.Amount, Unit: r.Unit, Percent: r.Percent, Basis: r.Basis, Compared: r.Compared, Denied: r.Negated,
		Matched: r.Matched, Why: []string{}, Statements: []Statement{}, Disclosure: []Statement{}, Lines: []string{}, Nearest: []Listed{}, Instead: []Listed{}, Rule: r.Rule,
	}
	if r.Is() {
		out.Rule, out.ReadBy = r.Claim.ID, r.Rule
		out.Source, out.Force, out.Evidence = sourceOf(r.Claim.Head)
	} else if r.Source != nil {
		out.Source, out.Force, out.Evidence = r.Source.Ref, r.Source.Force, r.Source.Evidence
	}
	if r.Says != "" {
		out.Why = append(out.Why, r.Says)
	}
	for _, c := range r.Nearest {
		out.Nearest = append(out.Nearest, m.listing(c, language))
	}
	switch {
	case r.Is():
		m.ofClaim(&out, r, language)
	case r.Matched == rulebook.MatchNothing || r.Matched == rulebook.MatchForbidden || r.Matched == rulebook.MatchHealth:
		m.ofNothing(&out)
	}
	return out
}

// ofClaim tells what the claim asks and brings, whatever the product.
func (m *market) ofClaim(out *Reading, r *wording.Reading, language string) {
	b := r.Claim.Body
	id := r.Claim.ID
	out.Claim, out.Name = &id, b.Name.In("en")
	out.InWords = claim.InWords(b.Condition, speaker{m})
	out.Lines = append(out.Lines, b.NeedsLines...)
	switch {
	case b.Prohibited:
		out.Verdict = Refused
		out.Why = append(out.Why, prohibited(b))
	case r.Matched == rulebook.MatchForbidden:
		out.Verdict = Refused
	case b.Undecided != nil:
		out.Why = append(out.Why, b.Undecided.In("en"))
	}
	if b.Against && !r.Compares {
		out.Why = append(out.Why, "the words do not name the food compared with")
	}
	if b.BarredIf != nil {
		out.Why = append(out.Why, "barred if "+claim.InWords(b.BarredIf, speaker{m}))
	}
	if out.Verdict != Refused {
		out.Statements, out.Disclosure = m.possible(r.Claim, b.Statements), m.disclosable(b)
	}
	if out.Matched == rulebook.MatchForbidden || m.strays(out.Matched, r.Health) {
		out.Instead = m.ownWords(r.Claim, language)
	}
}

func prohibited(b *rulebook.Claim) string {
	if says := b.ProhibitedSays.In("en"); says != "" {
		return says
	}
	return "the law names this claim in order to forbid it"
}

// strays tells whether words with the meaning of a claim must give way to prescribed ones.
func (m *market) strays(matched string, health bool) bool {
	page := m.law.Page()
	how := page.Listed
	if health {
		how = page.Health
	}
	return matched == rulebook.MatchMeaning && how == rulebook.MatchPrescribed
}

// ofNothing tells what the law does with words it does not list.
func (m *market) ofNothing(out *Reading) {
	if u := m.law.Market.Unlisted; u != nil {
		out.Verdict = u.Verdict
		if out.Matched != rulebook.MatchHealth {
			out.Why = append(out.Why, u.Says.In("en"))
		}
		if out.Source == "" {
			out.Source, out.Force, out.Evidence = u.Source.Ref, u.Source.Force, u.Source.Evidence
		}
	}
}

// possible are the statements that the claim brings, always or in some cases.
func (m *market) possible(c rulebook.Active[rulebook.Claim], list []rulebook.Statement) []Statement {
	out := []Statement{}
	for _, s := range list {
		presence := "mandatory"
		switch {
		case s.Presence != "":
			presence = s.Presence
		case s.If != nil:
			presence = "open"
		}
		out = append(out, Statement{Text: s.Text.In(m.language()), Texts: several(s.Text), Place: s.Place, Presence: presence, Rule: c.ID})
	}
	return out
}

// several is words in all languages, where there is more than one.
func several(w rulebook.Words) map[string]string {
	if len(w) < 2 {
		return nil
	}
	return w
}

// disclosable are the statements that levels of the law can force beside a claim.
func (m *market) disclosable(b *rulebook.Claim) []Statement {
	out := []Statement{}
	for _, d := range m.law.Disclosures.All {
		text := d.Body.Statement.In(m.language())
		if d.Body.Effect != "statement" || elsewhere(d.Body.When, b.About) || slices.ContainsFunc(out, func(s Statement) bool { return s.Text == text }) {
			continue
		}
		out = append(out, Statement{Text: text, Texts: several(d.Body.Statement), Place: d.Body.Place, Presence: "open", Rule: d.ID})
	}
	return out
}

// elsewhere tells whether a condition asks for claims about other subjects.
func elsewhere(c *rulebook.Condition, about []string) bool {
	if c == nil {
		return false
	}
	other := func(p *rulebook.Condition) bool { return elsewhere(p, about) }
	switch c.Op {
	case rulebook.OpAbout:
		return !slices.ContainsFunc(c.About, func(s string) bool { return s == "any" || slices.Contains(about, s) })
	case rulebook.OpAll:
		return slices.ContainsFunc(c.Parts, other)
	case rulebook.OpAny:
		return !slices.ContainsFunc(c.Parts, func(p *rulebook.Condition) bool { return !other(p) })
	}
	return false
}

// mostWordings bounds the wordings told of one claim, mostInstead the alternatives told.
const mostWordings, mostInstead = 3, 6

func (m *market) listing(c rulebook.Active[rulebook.Claim], language string) Listed {
	words := c.Body.Wordings[language]
	return Listed{Claim: c.ID, Name: c.Body.Name.In(language), Wordings: append([]string{}, words[:min(len(words), mostWordings)]...)}
}

// ownWords are the words that the law has for a claim, where it lists any in the language.
func (m *market) ownWords(c rulebook.Active[rulebook.Claim], language string) []Listed {
	if l := m.listing(c, language); len(l.Wordings) > 0 {
		return []Listed{l}
	}
	return []Listed{}
}

// instead lists what the product may carry in place of words that it may not: claims about the same component, or on the same function of
// the body, with words in the language.
func (m *market) instead(r *wording.Reading, out *Reading, may []Candidate, language string) []Listed {
	list := out.Instead
	if carries := out.Verdict == Permitted || out.Verdict == WithStatement; carries || r.Negated || r.Matched == rulebook.MatchNone {
		return list
	}
	if out.Verdict != Undetermined {
		list = []Listed{}
	}
	for _, c := range may {
		rule, ok := m.rule(c)
		if !ok || len(rule.Body.Wordings[language]) == 0 || !related(r, rule, c) || len(list) == mostInstead {
			continue
		}
		l := m.listing(rule, language)
		l.Verdict = c.Verdict
		list = append(list, l)
	}
	return list
}

func (m *market) rule(c Candidate) (rulebook.Active[rulebook.Claim], bool) {
	if c.Health {
		return m.law.HealthClaims.Get(rulebook.Name(c.Claim))
	}
	return m.law.Claims.Get(rulebook.Name(c.Claim))
}

// related tells whether a claim is about what the words are about.
func related(r *wording.Reading, c rulebook.Active[rulebook.Claim], candidate Candidate) bool {
	if r.Function != "" {
		return candidate.Health && strings.Contains(c.Name(), r.Function)
	}
	return r.Component != "" && !candidate.Health && (strings.HasPrefix(c.Name(), r.Component+"-") || slices.Contains(c.Body.About, r.Component))
}

func contains(text, part string) bool { return part != "" && strings.Contains(text, folded(part)) }
