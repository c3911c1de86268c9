package render

import (
	"strings"

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
	for i := range m.Claims {
		if i > 0 {
			p.blank()
		}
		p.claim(m, &m.Claims[i], o)
	}
	if len(m.AlsoPermitted) == 0 {
		return
	}
	var names []string
	for _, c := range m.AlsoPermitted {
		s := c.Name + " [" + last(c.Claim) + "]"
		if c.Verdict != check.Permitted {
			s += " " + strings.ToLower(strings.TrimPrefix(verdicts[c.Verdict], "PERMITTED "))
		}
		names = append(names, s)
	}
	p.heading("Other claims this product could carry", '-')
	p.line(0, strings.Join(names, "; ")+".")
}

// last is the shared name of a claim, the end of its rule's identifier.
func last(id string) string { return id[strings.LastIndexByte(id, '/')+1:] }

func (p *page) claim(m *check.Market, c *check.Claim, o Options) {
	title := "“" + c.Asked + "”"
	if c.Name != "" && c.Name != c.Asked {
		title = c.Name + " [" + c.Asked + "]"
	}
	p.line(0, verdict(c)+": "+title)
	if c.Why != "" {
		p.line(2, sentence(c.Why))
	}
	if c.Condition != nil {
		p.decided(2, c.Condition)
	}
	p.statementList("", c.Statements, o)
	if len(c.NeedsLines) > 0 {
		p.line(2, "Makes mandatory in the declaration: "+strings.Join(terms(m, c.NeedsLines, o), ", ")+".")
	}
	if len(c.Needs) > 0 {
		p.line(2, "Still to be known: "+strings.Join(c.Needs, ", ")+".")
	}
	if c.Source != "" {
		p.line(2, "Source: "+c.Source+" ("+grade(c.Force, c.Evidence)+").")
	}
}

func sentence(s string) string {
	if s == "" || strings.HasSuffix(s, ".") {
		return s
	}
	return s + "."
}

// terms turns names of quantities into the words of the declaration.
func terms(m *check.Market, quantities []string, o Options) []string {
	out := make([]string, len(quantities))
	for i, q := range quantities {
		out[i] = strings.ReplaceAll(q, "-", " ")
		for j := range m.Declaration.Lines {
			if l := &m.Declaration.Lines[j]; l.Quantity == q {
				out[i] = term(l, o)
			}
		}
	}
	return out
}

// statementList writes statements with their place and, where the law prescribes more than one language, all of them.
func (p *page) statementList(title string, list []check.Statement, o Options) {
	if title != "" && len(list) > 0 {
		p.heading(title, '-')
	}
	for _, s := range list {
		how := []string{}
		for _, w := range []string{presence(s.Presence), s.Place} {
			if w != "" {
				how = append(how, w)
			}
		}
		p.hang(2, 4, "", "“"+in(o.Language, s.Text, s.Texts)+"” ("+strings.Join(how, ", ")+")")
		shown := in(o.Language, s.Text, s.Texts)
		for _, lang := range sorted(s.Texts) {
			if s.Texts[lang] != shown {
				p.hang(4, 8, lang+": ", "“"+s.Texts[lang]+"”")
			}
		}
	}
}

func presence(s string) string {
	if s == "open" {
		return "needed only if a condition holds that is not determined"
	}
	return s
}
