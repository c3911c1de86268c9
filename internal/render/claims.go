package render

import (
	"fmt"
	"slices"
	"strings"
	"unicode"
	"unicode/utf8"

	"gramlaw/internal/check"
)

// verdicts in a word or few.
var verdicts = map[string]string{
	check.Permitted:     "PERMITTED",
	check.WithStatement: "PERMITTED WITH STATEMENT",
	check.Refused:       "REFUSED",
	check.NotListed:     "NOT LISTED",
	check.Undetermined:  "NOT DETERMINED",
	check.Unread:        "NOT READ",
}

func verdict(c *check.Claim) string {
	w, ok := verdicts[c.Verdict]
	if !ok {
		w = strings.ToUpper(c.Verdict)
	}
	if !c.Printable && (c.Verdict == check.Permitted || c.Verdict == check.WithStatement) {
		w += ", NOT PRINTABLE YET"
	}
	return w
}

func (p *page) claims(m *check.Market, o Options) {
	if len(m.Claims) > 0 {
		p.heading("Claims", '-')
	}
	others, told := shared(m.Claims)
	for i := range m.Claims {
		if told[i] {
			continue
		}
		if i > 0 {
			p.blank()
		}
		p.claim(m, &m.Claims[i], others[i], o)
	}
	p.candidates("Other claims this product could carry", m.AlsoPermitted, false)
	p.candidates("Health claims it could carry", m.AlsoPermitted, true)
}

// Of more claims than fewCandidates only the shared names are told, and of more than mostCandidates not all; JSON has them.
const fewCandidates, mostCandidates = 6, 24

// candidates lists claims nobody asked for, those that need no statement first.
func (p *page) candidates(title string, list []check.Candidate, health bool) {
	list = slices.DeleteFunc(slices.Clone(list), func(c check.Candidate) bool { return c.Health != health })
	var by bundles
	for _, v := range []string{check.Permitted, check.WithStatement} {
		for _, c := range list[:min(len(list), mostCandidates)] {
			if c.Verdict == v {
				by.add(candidate(c, len(list)), v)
			}
		}
	}
	var parts []string
	for _, b := range by.list {
		s := strings.Join(b.names, ", ")
		if b.key[0] == check.WithStatement {
			s = "with a statement: " + s
		}
		parts = append(parts, s)
	}
	if len(parts) == 0 {
		return
	}
	s := strings.Join(parts, "; ")
	if more := len(list) - mostCandidates; more > 0 {
		s += fmt.Sprintf(" and %d more, which JSON lists", more)
	}
	p.blank()
	p.run(title, s+".")
}

func candidate(c check.Candidate, of int) string {
	if of > fewCandidates {
		return last(c.Claim)
	}
	return c.Name + " [" + last(c.Claim) + "]"
}

// last is the shared name of a claim, the end of its rule's identifier.
func last(id string) string { return id[strings.LastIndexByte(id, '/')+1:] }

func (p *page) claim(m *check.Market, c *check.Claim, others []string, o Options) {
	title := "“" + c.Asked + "”"
	if c.Name != "" && c.Name != c.Asked {
		title = c.Name + " [" + c.Asked + "]"
	}
	for _, asked := range others {
		title += ", “" + asked + "”"
	}
	p.line(0, verdict(c)+": "+title)
	if c.Why != "" {
		p.line(2, sentence(c.Why))
	}
	if c.Condition != nil {
		p.decided(2, reasons(c))
	}
	p.statementList(c.Statements, o)
	if len(c.NeedsLines) > 0 {
		p.line(2, "Makes mandatory in the declaration: "+strings.Join(terms(m, c.NeedsLines, o), ", ")+".")
	}
	if more := untold(m, c); len(more) > 0 && c.Verdict != check.Refused {
		p.line(2, "Still to be known: "+needed(more)+".")
	}
	if c.Source != "" {
		p.line(2, "Source ("+grade(c.Force, c.Evidence)+"): "+sentence(c.Source))
	}
}

// reasons is the decided condition; what data would settle of a claim that is refused anyway helps nobody.
func reasons(c *check.Claim) *check.Condition {
	if c.Verdict != check.Refused {
		return c.Condition
	}
	quiet := withoutNeeds(*c.Condition)
	return &quiet
}

func withoutNeeds(c check.Condition) check.Condition {
	c.Needs = nil
	for _, list := range []*[]check.Condition{&c.All, &c.Any, &c.Of} {
		*list = slices.Clone(*list)
		for i, part := range *list {
			(*list)[i] = withoutNeeds(part)
		}
	}
	return c
}

// shared finds claims that got the same answer for the same reason, where the answer is only that. The first stands for the
// others, whose indices are told.
func shared(claims []check.Claim) (others map[int][]string, told map[int]bool) {
	type answer struct{ verdict, why, source string }
	first := map[answer]int{}
	others, told = map[int][]string{}, map[int]bool{}
	for i := range claims {
		c := &claims[i]
		if c.Claim != "" || c.Condition != nil || c.Why == "" {
			continue
		}
		a := answer{c.Verdict, c.Why, c.Source}
		if f, ok := first[a]; ok {
			others[f], told[i] = append(others[f], c.Asked), true
			continue
		}
		first[a] = i
	}
	return others, told
}

// sentence begins with a capital and ends with a point.
func sentence(s string) string {
	first, n := utf8.DecodeRuneInString(s)
	s = string(unicode.ToUpper(first)) + s[n:]
	if strings.HasSuffix(s, ".") {
		return s
	}
	return s + "."
}

// terms turns names of quantities into the words of the declaration.
func terms(m *check.Market, quantities []string, o Options) []string {
	var out []string
	for _, q := range quantities {
		word := strings.ReplaceAll(q, "-", " ")
		for j := range m.Declaration.Lines {
			if l := &m.Declaration.Lines[j]; l.Quantity == q {
				word = term(l, o)
			}
		}
		if !slices.Contains(out, word) {
			out = append(out, word)
		}
	}
	return out
}

// statementList writes statements with their place and, where the law prescribes more than one language, all of them.
func (p *page) statementList(list []check.Statement, o Options) {
	for _, s := range list {
		shown := in(o.Language, s.Text, s.Texts)
		p.hang(2, 4, "", "“"+shown+"” ("+presence(&s)+place(s.Place)+")")
		p.languages(shown, s.Texts)
	}
}

func place(s string) string {
	if s == "" {
		return ""
	}
	return "; " + s
}

// languages shows a statement in the other languages of a market that has two, and names them where there are more.
func (p *page) languages(shown string, texts map[string]string) {
	var names []string
	for _, lang := range sorted(texts) {
		if texts[lang] == shown {
			continue
		}
		names = append(names, lang)
		if len(texts) == 2 {
			p.hang(4, 8, lang+": ", "“"+texts[lang]+"”")
		}
	}
	if len(texts) > 2 && len(names) > 0 {
		p.line(4, "The rules also have it in "+strings.Join(names, ", ")+".")
	}
}

// presence tells whether a statement must stand; of one that may, what is still to be known before it may.
func presence(s *check.Statement) string {
	switch {
	case s.Presence == "open":
		return "needed only if a condition holds that is not determined"
	case len(s.Needs) > 0:
		return s.Presence + ", once it is settled by data on " + needed(s.Needs)
	}
	return s.Presence
}
