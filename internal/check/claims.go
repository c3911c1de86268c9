package check

import (
	"slices"
	"strings"

	"gramlaw/internal/claim"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// claims judges what was asked for, in two passes: verdicts first, then the statements that depend on which claims stand.
func (m *market) claims() []Claim {
	asked := m.asked()
	out := make([]Claim, len(asked))
	views := make([]view, len(asked))
	bodies := make([]*rulebook.Claim, len(asked))
	for i, a := range asked {
		views[i] = m.as(m.product)
		out[i], bodies[i] = m.verdict(a, &views[i])
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
	rule, ok := m.find(a)
	if !ok {
		m.unlisted(&out, a)
		return out, nil
	}
	b := rule.Body
	out.Claim, out.Rule, out.Name = rule.ID, rule.ID, b.Name.In("en")
	out.Source, out.Force, out.Evidence = sourceOf(rule.Head)
	out.Evidence, out.Weakest = v.weakest(rule)
	if b.Prohibited {
		out.Verdict, out.Why = Refused, "the law names this claim in order to forbid it"
		return out, nil
	}
	if a.Against != "" {
		v.ref, _ = m.reference(a.Against)
		v.against = a.Against
	}
	if b.BarredIf != nil && v.truth(b.BarredIf) == quantity.Yes {
		r := m.condition(claim.Evaluate(b.BarredIf, *v))
		out.Verdict, out.Why, out.Condition = Refused, "barred here: "+r.Says, &r
		return out, nil
	}
	if b.Undecided != nil {
		out.Verdict, out.Why = Undetermined, b.Undecided.In("en")
		return out, b
	}
	r := claim.Evaluate(m.withStated(b, a), *v)
	c := m.condition(r)
	out.Condition = &c
	switch r.Truth {
	case quantity.Yes:
		out.Verdict, out.Printable = Permitted, true
	case quantity.No:
		out.Verdict = Refused
	default:
		out.Verdict = Undetermined
		out.Needs = needsOf(c)
	}
	return out, b
}

// find reads a claim by its shared name, or by words that equal a listed wording.
func (m *market) find(a recipe.Claim) (rulebook.Active[rulebook.Claim], bool) {
	if a.Text == "" {
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
			if slices.ContainsFunc(words, func(w string) bool { return folded(w) == want }) {
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
	}
}

// withStated adds to a claim's condition that the number in the claim be true.
func (m *market) withStated(b *rulebook.Claim, a recipe.Claim) *rulebook.Condition {
	if a.Stated == nil || b.Stated == nil {
		return b.Condition
	}
	c := &rulebook.Condition{Op: rulebook.OpCompare, Of: b.Stated.Of, Threshold: *a.Stated}
	per := b.Stated.Per
	if per == "" {
		per = m.law.Market.DefaultBases[0].Per
	}
	c.Per = []string{per}
	switch b.Stated.As {
	case "reduction":
		c.Relation = rulebook.ReducedBy
		if a.Stated.Unit != quantity.PerCent {
			c.Relation = rulebook.LessBy
		}
	case "increase":
		c.Relation = rulebook.IncreasedBy
		if a.Stated.Unit != quantity.PerCent {
			c.Relation = rulebook.MoreBy
		}
	default:
		c.Relation = rulebook.AtLeast
	}
	return &rulebook.Condition{Op: rulebook.OpAll, Parts: []*rulebook.Condition{b.Condition, c.Prepare()}}
}

// accompany lists what must stand beside a permitted claim.
func (m *market) accompany(out *Claim, b *rulebook.Claim, v view) {
	v.own = map[string]bool{}
	for _, s := range b.About {
		v.own[s] = true
	}
	out.Statements = append(out.Statements, v.statements(b.Statements, out.Rule, out)...)
	out.Statements = append(out.Statements, v.disclosures(out)...)
	out.NeedsLines = append(out.NeedsLines, b.NeedsLines...)
	out.NeedsLines = append(out.NeedsLines, v.raisedBy(b.About)...)
	for _, s := range out.Statements {
		if s.Presence == "mandatory" {
			out.Verdict = WithStatement
		}
	}
}

// raisedBy lists the lines that stand because something is claimed about one of the subjects.
func (v view) raisedBy(about []string) []string {
	var out []string
	for _, l := range v.order {
		raised := false
		l.line.MandatoryIf.Walk(func(c *rulebook.Condition) {
			raised = raised || c.Op == rulebook.OpAbout && slices.ContainsFunc(c.About, func(s string) bool { return slices.Contains(about, s) })
		})
		if raised && v.truth(l.line.MandatoryIf) == quantity.Yes {
			out = append(out, l.line.Quantity)
		}
	}
	return out
}

// statements are those of a list whose conditions hold, or are open.
func (v view) statements(list []rulebook.Statement, rule string, c *Claim) []Statement {
	var out []Statement
	for _, s := range list {
		t := quantity.Yes
		if s.If != nil {
			t = v.truth(s.If)
		}
		if t == quantity.No {
			continue
		}
		st := v.statement(s.Text, s.Place, rule, c)
		if s.Presence != "" {
			st.Presence = s.Presence
		}
		if t == quantity.Open {
			st.Presence = "open"
		}
		out = append(out, st)
	}
	return out
}

func (v view) statement(words rulebook.Words, place, rule string, c *Claim) Statement {
	st := Statement{Text: v.fill(words.In(v.language()), c), Place: place, Presence: "mandatory", Rule: rule}
	if len(words) > 1 {
		st.Texts = map[string]string{}
		for _, lang := range sortedKeys(words) {
			st.Texts[lang] = v.fill(words[lang], c)
		}
	}
	return st
}

// disclosures are the levels that make any claim carry a statement, one statement naming all of them, or bar it.
func (v view) disclosures(out *Claim) []Statement {
	type group struct {
		d     *rulebook.Disclosure
		id    string
		names []string
	}
	var groups []*group
	for _, d := range v.law.Disclosures.All {
		if d.Body.When != nil && v.truth(d.Body.When) != quantity.Yes || v.truth(d.Body.Condition) != quantity.Yes {
			continue
		}
		if d.Body.Effect == "bars" {
			out.Verdict, out.Printable, out.Why = Refused, false, "barred by the level of "+d.Body.Named.In("en")+" ("+d.Head.Source.Ref+")"
			continue
		}
		i := slices.IndexFunc(groups, func(g *group) bool { return g.d.Statement.In("en") == d.Body.Statement.In("en") })
		if i < 0 {
			groups, i = append(groups, &group{d: d.Body, id: d.ID}), len(groups)
		}
		groups[i].names = append(groups[i].names, d.Body.Named.In("en"))
	}
	var st []Statement
	for _, g := range groups {
		words := rulebook.Words{}
		for lang, s := range g.d.Statement {
			words[lang] = strings.ReplaceAll(s, "{names}", joined(g.names))
		}
		st = append(st, v.statement(words, g.d.Place, g.id, out))
	}
	return st
}

func joined(names []string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	comma := ""
	if len(names) > 2 {
		comma = ","
	}
	return strings.Join(names[:len(names)-1], ", ") + comma + " and " + names[len(names)-1]
}

// fill replaces placeholders: {fat} by the declared amount, {fat of reference food} by the reference food's, {difference} and
// {fat difference} by the change against it in per cent, {reference food} by its name.
func (v view) fill(s string, c *Claim) string {
	var out strings.Builder
	for {
		i := strings.IndexByte(s, '{')
		j := strings.IndexByte(s, '}')
		if i < 0 || j < i {
			out.WriteString(s)
			return out.String()
		}
		out.WriteString(s[:i])
		out.WriteString(v.placeholder(s[i+1:j], c))
		s = s[j+1:]
	}
}

func (v view) placeholder(name string, c *Claim) string {
	text, ok := "", false
	switch {
	case name == "reference food" && v.ref != nil:
		text, ok = v.ref.batch.Leaves[0].Name, true
	case name == "difference" && c != nil && c.Condition != nil:
		text = differenceIn(c.Condition)
		ok = text != ""
	case strings.HasSuffix(name, " of reference food") && v.ref != nil:
		text, ok = v.printed(v.ref, strings.TrimSuffix(name, " of reference food"))
	case strings.HasPrefix(name, "amount of "):
		text, ok = v.amountOfQuantity(strings.TrimPrefix(name, "amount of "))
	case strings.HasSuffix(name, " difference") && v.ref != nil:
		text, ok = v.difference(strings.TrimSuffix(name, " difference"))
	default:
		text, ok = v.printed(v.subject, name)
	}
	if !ok {
		return "(" + name + ")"
	}
	return text
}

// printed is what a food's quantity prints as on the first column, where that is determined.
func (v view) printed(p *product, q string) (string, bool) {
	l, ok := v.lines[q]
	if !ok {
		return "", false
	}
	o := v.on(p, q)
	if !o.determined() {
		return "", false
	}
	return l.text(o[0].Printed, v.unit(q), v.language()), true
}

// amountOfQuantity is a quantity without a line of its own, to three figures on the first column.
func (v view) amountOfQuantity(q string) (string, bool) {
	l, ok := v.subject.Quantity(q)
	if !ok || !l.Determined() || len(v.columns) == 0 || !v.columns[0].known {
		return "", false
	}
	u := v.unit(q)
	amount := v.columns[0].on(l).Known.In(u)
	return amount.RoundFigures(3, quantity.TiesUp).String() + " " + u.String(), true
}

// difference is the change of a quantity against the reference food per mass, in per cent cut to a whole number. Of a range it is
// the smallest change, so that what is stated is true at least.
func (v view) difference(q string) (string, bool) {
	own, ok1 := v.subject.Quantity(q)
	other, ok2 := v.ref.Quantity(q)
	if !ok1 || !ok2 || other.Low().Sign() <= 0 {
		return "", false
	}
	per := func(r, mass quantity.Ratio) quantity.Ratio { return r.Quo(mass) }
	mine, theirs := v.subject.Mass(), v.ref.Mass()
	less := per(other.Low(), theirs).Sub(per(own.High(), mine)).Quo(per(other.Low(), theirs))
	more := per(own.Low(), mine).Sub(per(other.High(), theirs)).Quo(per(other.High(), theirs))
	d := quantity.Max(less, more)
	if d.Sign() <= 0 {
		return "", false
	}
	return d.Mul(quantity.FromInt(100)).Floor(0).String() + " %", true
}

// alsoPermitted lists claims nobody asked for that the product meets on its own.
func (m *market) alsoPermitted(asked []Claim) []Candidate {
	out := m.candidates(m.law.Claims.All, asked, false)
	return append(out, m.candidates(m.law.HealthClaims.All, asked, true)...)
}

func (m *market) candidates(list []rulebook.Active[rulebook.Claim], asked []Claim, health bool) []Candidate {
	out := []Candidate{}
	v := m.as(m.product)
	for _, c := range list {
		if c.Body.Condition == nil || c.Body.Against || slices.ContainsFunc(asked, func(a Claim) bool { return a.Claim == c.ID }) {
			continue
		}
		if m.product.Meets(c.ID) != quantity.Yes || c.Body.BarredIf != nil && v.truth(c.Body.BarredIf) != quantity.No {
			continue
		}
		one := Claim{Verdict: Permitted, Rule: c.ID}
		m.accompany(&one, c.Body, v)
		if one.Verdict != Refused {
			out = append(out, Candidate{Claim: c.ID, Name: c.Body.Name.In("en"), Verdict: one.Verdict, Health: health})
		}
	}
	return out
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
				claims[i].Why = "the line “" + l.line.Terms[m.language()][0] + "” must stand in the declaration, and its value is not determined"
				for _, n := range line.Needs {
					if !slices.Contains(claims[i].Needs, n) {
						claims[i].Needs = append(claims[i].Needs, n)
					}
				}
			}
		}
	}
}
