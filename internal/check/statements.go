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

// accompany lists what must stand beside a permitted claim.
func (m *market) accompany(out *Claim, b *rulebook.Claim, v *view) {
	v = v.judging(b)
	out.Statements = append(out.Statements, v.statements(b.Statements, out.Rule, out)...)
	out.Statements = append(out.Statements, v.disclosures(out)...)
	for _, s := range out.Statements {
		switch {
		case out.Verdict != Permitted:
		case s.Presence == "open":
			out.Printable, out.Why = false, "it is not determined whether a statement must stand beside it"
			out.Needs = union(out.Needs, s.Needs)
		case s.Presence == "mandatory" && s.open:
			out.Printable, out.Why = false, "a statement that must stand beside it holds an amount that is not determined"
		}
	}
	out.NeedsLines = append(out.NeedsLines, b.NeedsLines...)
	out.NeedsLines = append(out.NeedsLines, v.raisedBy(b.About)...)
	for _, s := range out.Statements {
		if s.Presence == "mandatory" && out.Verdict == Permitted {
			out.Verdict = WithStatement
		}
	}
}

// verdictBeside is the verdict that accompany leaves to a permitted claim, found without writing a statement.
func (v *view) verdictBeside(b *rulebook.Claim) string {
	v = v.judging(b)
	verdict := Permitted
	for _, d := range v.law.Disclosures.All {
		switch t := v.level(d.Body); {
		case t == quantity.No:
		case d.Body.Effect == "bars" && t == quantity.Yes:
			return Refused
		case d.Body.Effect == "bars":
			return Undetermined
		case t == quantity.Yes:
			verdict = WithStatement
		}
	}
	for i := range b.Statements {
		s := &b.Statements[i]
		if s.Presence != "optional" && (s.If == nil || v.truth(s.If) == quantity.Yes) {
			verdict = WithStatement
		}
	}
	return verdict
}

// level tells whether a disclosure level is exceeded where it counts.
func (v *view) level(d *rulebook.Disclosure) quantity.Truth {
	t := v.truth(d.When)
	if t != quantity.No {
		t = quantity.All(t, v.truth(d.Condition))
	}
	return t
}

// raisedBy lists the lines that stand because something is claimed about one of the subjects.
func (v *view) raisedBy(about []string) []string {
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
func (v *view) statements(list []rulebook.Statement, rule string, c *Claim) []Statement {
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
			st.Needs = v.needsFor(s.If)
			if s.Presence != "optional" {
				st.Presence = "open"
			}
		}
		out = append(out, st)
	}
	return out
}

func (v *view) statement(words rulebook.Words, place, rule string, c *Claim) Statement {
	text, complete := v.fill(words.In(v.language()), v.language(), c)
	st := Statement{Text: text, Place: place, Presence: "mandatory", Rule: rule, open: !complete}
	if len(words) > 1 {
		st.Texts = map[string]string{}
		for _, lang := range sortedKeys(words) {
			st.Texts[lang], _ = v.fill(words[lang], lang, c)
		}
	}
	return st
}

// disclosures are the levels that make any claim carry a statement, one statement naming all of them, or bar it.
func (v *view) disclosures(out *Claim) []Statement {
	type group struct {
		d     *rulebook.Disclosure
		id    string
		truth quantity.Truth
		names []rulebook.Words
		needs []string // what would settle it
	}
	var groups []*group
	for _, d := range v.law.Disclosures.All {
		t := v.level(d.Body)
		if t == quantity.No {
			continue
		}
		if d.Body.Effect == "bars" {
			v.bar(out, d, t)
			continue
		}
		i := slices.IndexFunc(groups, func(g *group) bool { return g.truth == t && g.d.Statement.In("en") == d.Body.Statement.In("en") })
		if i < 0 {
			groups, i = append(groups, &group{d: d.Body, id: d.ID, truth: t}), len(groups)
		}
		groups[i].names = append(groups[i].names, d.Body.Named)
		if t == quantity.Open {
			groups[i].needs = union(groups[i].needs, v.needsFor(d.Body.When), v.needsFor(d.Body.Condition))
		}
	}
	var list []Statement
	for _, g := range groups {
		words := rulebook.Words{}
		for lang, s := range g.d.Statement {
			words[lang] = strings.ReplaceAll(s, "{names}", v.listed(g.names, lang))
		}
		st := v.statement(words, g.d.Place, g.id, out)
		st.Presence = cmp.Or(g.d.Presence, st.Presence)
		if g.truth == quantity.Open && g.d.Presence != "optional" {
			st.Presence, st.Needs = "open", g.needs
		}
		list = append(list, st)
	}
	return list
}

// bar refuses a claim by a level, or leaves it open where the level is.
func (v *view) bar(out *Claim, d rulebook.Active[rulebook.Disclosure], t quantity.Truth) {
	by := d.Body.Named.In("en") + " (" + d.Head.Source.Ref + ")"
	switch {
	case t == quantity.Yes:
		out.Verdict, out.Printable, out.Why = Refused, false, "barred by the level of "+by
	case out.Verdict != Refused:
		out.Verdict, out.Printable, out.Why = Undetermined, false, "not determined whether the claim is barred by the level of "+by
		out.Needs = union(out.Needs, v.needsFor(d.Body.When), v.needsFor(d.Body.Condition))
	}
}

// needsFor is what would have to be known to decide a condition.
func (v *view) needsFor(c *rulebook.Condition) []string {
	return needsOf(v.condition(claim.Evaluate(c, v)))
}

// union appends what is not in the list yet.
func union(list []string, more ...[]string) []string {
	for _, n := range slices.Concat(more...) {
		if !slices.Contains(list, n) {
			list = append(list, n)
		}
	}
	return list
}

// joined lists names in words, the word and before the last; only English has a comma there too.
func joined(names []string, lang, and string) string {
	if len(names) < 2 || and == "" {
		return strings.Join(names, ", ")
	}
	comma := ""
	if len(names) > 2 && lang == "en" {
		comma = ","
	}
	last := len(names) - 1
	return strings.Join(names[:last], ", ") + comma + " " + and + " " + names[last]
}

// listed lists names in a language of the market.
func (m *market) listed(names []rulebook.Words, lang string) string {
	out := make([]string, len(names))
	for i, n := range names {
		out[i] = n.In(lang)
	}
	return joined(out, lang, m.law.Market.And.In(lang))
}

// fill replaces placeholders, and tells whether it could replace all: {fat} by the declared amount, {fat of reference food} by the reference food's, {difference} and
// {fat difference} by the change against it in per cent, {reference food} by its name; numbers as the language writes them.
func (v *view) fill(s, lang string, c *Claim) (text string, complete bool) {
	var out strings.Builder
	complete = true
	for {
		i := strings.IndexByte(s, '{')
		j := strings.IndexByte(s, '}')
		if i < 0 || j < i {
			out.WriteString(s)
			return out.String(), complete
		}
		part, ok := v.placeholder(s[i+1:j], lang, c)
		if !ok {
			part, complete = "("+s[i+1:j]+")", false
		}
		out.WriteString(s[:i])
		out.WriteString(part)
		s = s[j+1:]
	}
}

func (v *view) placeholder(name, lang string, c *Claim) (text string, ok bool) {
	switch {
	case name == "reference food" && v.ref != nil:
		text, ok = v.ref.batch.Leaves[0].Name, true
	case name == "difference" && c != nil && c.Condition != nil:
		text = differenceIn(c.Condition)
		ok = text != ""
	case strings.HasSuffix(name, " of reference food") && v.ref != nil:
		text, ok = v.printed(v.ref, strings.TrimSuffix(name, " of reference food"), lang)
	case name == "reference amount":
		var r recipe.ReferenceAmount
		r, ok = v.referenceAmount()
		text = v.inLanguage(r.Amount.String(), lang)
	case strings.HasPrefix(name, "amount of "):
		text, ok = v.amountOfQuantity(strings.TrimPrefix(name, "amount of "), lang)
	case strings.HasSuffix(name, " difference") && v.ref != nil:
		text, ok = v.difference(strings.TrimSuffix(name, " difference"))
	default:
		text, ok = v.printed(v.subject, name, lang)
	}
	return text, ok
}

// printed is what a food's quantity prints as on the first column, where that is determined.
func (v *view) printed(p *product, q, lang string) (string, bool) {
	l, ok := v.lines[q]
	if !ok {
		return "", false
	}
	o := v.on(p, q)
	if !o.determined() {
		return "", false
	}
	if _, known := l.rule.Body.Number[lang]; !known {
		lang = v.language()
	}
	return l.text(o[0].Printed, v.unit(q), lang), true
}

// inLanguage writes a number's decimal sign as the label of a language does.
func (v *view) inLanguage(s, lang string) string {
	d, ok := v.law.Declaration()
	if !ok || d.Body.Number[lang].Decimal == "" {
		return s
	}
	return strings.Replace(s, ".", d.Body.Number[lang].Decimal, 1)
}

// amountOfQuantity is a quantity without a line of its own, to three figures on the first column.
func (v *view) amountOfQuantity(q, lang string) (string, bool) {
	l, ok := v.subject.Quantity(q)
	if !ok || !l.Determined() || len(v.columns) == 0 || !v.columns[0].known {
		return "", false
	}
	u := v.unit(q)
	amount := v.columns[0].on(l).Known.In(u)
	return v.inLanguage(amount.RoundFigures(3, quantity.TiesUp).String()+" "+u.String(), lang), true
}

// difference is the change of a quantity against the reference food per mass, in per cent cut to a whole number. Of a range it is
// the smallest change, so that what is stated is true at least.
func (v *view) difference(q string) (string, bool) {
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
