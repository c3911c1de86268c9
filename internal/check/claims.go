package check

import (
	"cmp"
	"slices"
	"strings"

	"gramlaw/internal/claim"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// claims judges what was asked for, in two passes: verdicts first, then the statements that depend on which claims stand.
func (m *market) claims() []Claim {
	asked := m.spoken(m.asked())
	out := make([]Claim, len(asked))
	views := make([]*view, len(asked))
	bodies := make([]*rulebook.Claim, len(asked))
	for i, a := range asked {
		views[i] = m.as(m.product)
		out[i], bodies[i] = m.verdict(a.Claim, views[i])
		a.told(&out[i])
		if bodies[i] != nil && out[i].Verdict != Refused {
			m.stand(bodies[i])
		}
	}
	for i := range out {
		if bodies[i] != nil && out[i].Verdict == Permitted {
			m.accompany(&out[i], bodies[i], views[i])
		}
	}
	return out
}

func (m *market) asked() []recipe.Claim {
	var out []recipe.Claim
	for _, a := range m.c.recipe.Claims {
		if len(a.In) == 0 || slices.Contains(a.In, m.j) {
			out = append(out, a)
		}
	}
	return out
}

// stand notes what a claim that is not refused is about, and the lines it makes mandatory.
func (m *market) stand(b *rulebook.Claim) {
	for _, s := range b.About {
		m.about[s] = true
	}
	for _, q := range b.NeedsLines {
		if l, ok := m.lines[q]; ok {
			l.needed = true
		}
	}
}

// verdict finds the claim that is meant and decides its condition.
func (m *market) verdict(a recipe.Claim, v *view) (Claim, *rulebook.Claim) {
	out := Claim{Asked: a.Claim, Statements: []Statement{}, NeedsLines: []string{}}
	if a.Text != "" {
		out.Asked = a.Text
	}
	if !m.covered() {
		out.Verdict, out.Why = Undetermined, "the rule set does not cover this market on "+m.law.Date
		return out, nil
	}
	rule, ok := m.find(&a)
	if !ok {
		m.unlisted(&out, a)
		return out, nil
	}
	b := rule.Body
	out.Claim, out.Rule, out.Name = rule.ID, rule.ID, b.Name.In("en")
	out.Source, out.Force, out.Evidence = sourceOf(rule.Head)
	out.Evidence, out.Weakest = v.weakest(rule)
	if b.Prohibited {
		out.Verdict, out.Why = Refused, cmp.Or(b.ProhibitedSays.In("en"), "the law names this claim in order to forbid it")
		return out, nil
	}
	if a.Against != "" {
		v.ref, _ = m.reference(a.Against)
		v.against = a.Against
	}
	if b.BarredIf != nil && v.truth(b.BarredIf) == quantity.Yes {
		r := m.condition(claim.Evaluate(b.BarredIf, v))
		out.Verdict, out.Why, out.Condition = Refused, "barred here: "+r.Says, &r
		return out, nil
	}
	if b.Undecided != nil {
		out.Verdict, out.Why = Undetermined, b.Undecided.In("en")
		return out, b
	}
	r := claim.Evaluate(m.withStated(b, a), v)
	c := m.condition(r)
	out.Condition = &c
	truth := r.Truth
	if b.BarredIf != nil { // it does not bar: it is open, or does not hold
		truth = quantity.All(truth, v.truth(b.BarredIf).Not())
	}
	switch truth {
	case quantity.Yes:
		out.Verdict, out.Printable = Permitted, true
	case quantity.No:
		out.Verdict = Refused
	default:
		out.Verdict = Undetermined
		out.Needs = needsOf(c)
		if r.Truth == quantity.Yes {
			barred := m.condition(claim.Evaluate(b.BarredIf, v))
			out.Why, out.Needs = "not determined whether the claim is barred here: "+barred.Says, needsOf(barred)
		}
	}
	return out, b
}

// find reads a claim by its shared name, or by words that equal a listed wording; a number in the words becomes the stated one.
func (m *market) find(a *recipe.Claim) (rulebook.Active[rulebook.Claim], bool) {
	if a.Claim != "" {
		if c, ok := m.law.Claims.Get(a.Claim); ok {
			return c, true
		}
		return m.law.HealthClaims.Get(a.Claim)
	}
	want := folded(a.Text)
	for _, c := range slices.Concat(m.law.Claims.All, m.law.HealthClaims.All) {
		for lang, words := range c.Body.Wordings {
			if a.Language != "" && lang != a.Language {
				continue
			}
			if i := slices.IndexFunc(words, func(w string) bool { return fits(w, want) }); i >= 0 {
				a.Stated = cmp.Or(a.Stated, numberIn(words[i], want))
				return c, true
			}
		}
	}
	return rulebook.Active[rulebook.Claim]{}, false
}

// folded ignores case and spacing, nothing else.
func folded(s string) string { return strings.ToLower(strings.Join(strings.Fields(s), " ")) }

func (m *market) unlisted(out *Claim, a recipe.Claim) {
	u := m.law.Market.Unlisted
	switch {
	case a.Text != "":
		out.Verdict, out.Why = Unread, "the words equal no listed wording of this market; give the claim by its name, or ask a specialist what they mean in law"
	case u != nil && m.c.book.ListsClaim(a.Claim):
		out.Verdict, out.Why = u.Verdict, u.Says.In("en")
		out.Source, out.Force, out.Evidence = u.Source.Ref, u.Source.Force, u.Source.Evidence
	default:
		out.Verdict, out.Why = NotListed, "no market of this rule set lists a claim of this name"
		if near := suggest(a.Claim, m.c.book.ClaimNames()); near != "" {
			out.Why += "; did you mean “" + near + "”?"
		}
	}
}

// alsoPermitted lists claims nobody asked for that the product meets on its own.
func (m *market) alsoPermitted(asked []Claim) []Candidate {
	out := []Candidate{}
	v := m.as(m.product)
	known := make([]decided, len(m.law.Needs))
	for i := range m.law.Offers {
		o := &m.law.Offers[i]
		if m.untouched(o.ID) || !v.meetsAll(o.Needs, known) || o.Body.BarredIf != nil && v.truth(o.Body.BarredIf) != quantity.No {
			continue
		}
		if slices.ContainsFunc(asked, func(a Claim) bool { return a.Claim == o.ID }) {
			continue
		}
		if verdict := v.verdictBeside(o.Body); verdict == Permitted || verdict == WithStatement {
			out = append(out, Candidate{Claim: o.ID, Name: o.Body.Name.In("en"), Verdict: verdict, Health: o.Health})
		}
	}
	return out
}

// decided is what is known of a need.
type decided uint8

const (
	unasked decided = iota
	holds
	fails // does not hold, or is open
)

// meetsAll tells whether all needs hold, of which each is decided once.
func (v *view) meetsAll(needs []int, known []decided) bool {
	for _, n := range needs {
		if known[n] == unasked {
			known[n] = fails
			if claim.Surely(v.law.Needs[n], v) {
				known[n] = holds
			}
		}
		if known[n] == fails {
			return false
		}
	}
	return true
}

// printability takes back what a claim cannot print: a line it makes mandatory lacks data.
func (m *market) printability(claims []Claim) {
	v := m.as(m.product)
	for i := range claims {
		for _, q := range claims[i].NeedsLines {
			l, ok := m.lines[q]
			if !ok {
				continue
			}
			if line, ok := v.reportLine(l); !ok || line.Status != "determined" {
				claims[i].Printable = false
				claims[i].Why = "the line “" + v.term(l) + "” must stand in the declaration, and its value is not determined"
				for _, n := range line.Needs {
					if !slices.Contains(claims[i].Needs, n) {
						claims[i].Needs = append(claims[i].Needs, n)
					}
				}
			}
		}
	}
}
