package render

import (
	"encoding/json"
	"io"
	"strconv"
	"strings"

	"gramlaw/internal/check"
)

// Wording writes what words on a pack are in law, as a text of at most Width columns. The error is the writer's.
func Wording(w io.Writer, r *check.WordingReport) error {
	p := &page{}
	p.heading("“"+r.Text+"” ("+r.Language+")", '=')
	p.line(0, "Labelling date "+r.Date+"; rule set "+r.Rules.Version+" ("+digest(r.Rules.Digest)+").")
	if r.Recipe != nil {
		p.line(0, "Judged for: "+r.Recipe.Name+" ["+r.Recipe.ID+"].")
	}
	for i := range r.Markets {
		p.wording(&r.Markets[i])
	}
	p.heading("Caution", '=')
	p.line(0, r.Caution)
	_, err := io.WriteString(w, p.String())
	return err
}

// WordingJSON writes the same as JSON; the same words, date and rules give the same bytes. The error is the writer's.
func WordingJSON(w io.Writer, r *check.WordingReport, compact bool) error {
	e := json.NewEncoder(w)
	e.SetEscapeHTML(false)
	if !compact {
		e.SetIndent("", "  ")
	}
	return e.Encode(r)
}

func (p *page) wording(m *check.WordingMarket) {
	title := m.Name
	if m.Edition != "" {
		title += ", edition " + m.Edition
	}
	p.heading(title, '=')
	switch {
	case m.NotJudged != "":
		p.line(0, sentence(m.NotJudged))
	case len(m.Readings) == 0:
		p.line(0, "No nutrition or health claim was read in these words.")
	}
	for i := range m.Readings {
		if i > 0 {
			p.blank()
		}
		p.reading(&m.Readings[i])
	}
	p.line(0, m.Caution)
}

func (p *page) reading(r *check.Reading) {
	p.line(0, "“"+r.Text+"”: "+matchedAs(r))
	p.line(2, "Characters "+strconv.Itoa(r.Span[0])+" to "+strconv.Itoa(r.Span[1])+said(r))
	for _, why := range r.Why {
		p.line(2, sentence(why))
	}
	if r.Condition != nil {
		p.decided(2, r.Condition)
	} else if r.InWords != "" {
		p.line(2, "Condition: "+sentence(r.InWords))
	}
	p.statementList(r.Statements, Options{})
	p.statementList(r.Disclosure, Options{})
	if len(r.Lines) > 0 {
		p.line(2, "Makes mandatory in the declaration: "+strings.Join(r.Lines, ", ")+".")
	}
	if len(r.Needs) > 0 {
		p.line(2, "Still to be known: "+strings.Join(r.Needs, ", ")+".")
	}
	p.alternativesOf("Nearest listed claims", r.Nearest)
	p.alternativesOf("Instead", r.Instead)
	if r.Source != "" {
		p.line(2, "Source ("+grade(r.Force, r.Evidence)+"): "+sentence(r.Source))
	}
}

// matchedAs is the claim, how it was matched, and the verdict where there is one.
func matchedAs(r *check.Reading) string {
	s := r.Matched
	if r.Claim != nil {
		s = r.Name + " [" + last(*r.Claim) + "], " + r.Matched
	}
	if r.Verdict == "" {
		return s
	}
	if v, ok := verdicts[r.Verdict]; ok {
		return s + ": " + v
	}
	return s + ": " + strings.ToUpper(r.Verdict)
}

// said lists what the words say, part by part.
func said(r *check.Reading) string {
	s := ""
	for _, part := range [][2]string{
		{"relation", r.Relation}, {"component", r.Component}, {"about", r.Thing}, {"function", r.Function}, {"amount", strings.TrimSpace(r.Amount + " " + r.Unit)},
		{"per cent", r.Percent}, {"per", r.Basis}, {"compared with", r.Compared},
	} {
		if part[1] != "" {
			s += "; " + part[0] + " " + part[1]
		}
	}
	return s + "."
}

// shortWording is how long a wording may be, in bytes, to be told beside its claim; JSON has all.
const shortWording = 80

func (p *page) alternativesOf(title string, list []check.Listed) {
	if len(list) == 0 {
		return
	}
	var parts []string
	for _, l := range list {
		s := l.Name + " [" + last(l.Claim) + "]"
		if len(l.Wordings) > 0 && l.Wordings[0] != l.Name && len(l.Wordings[0]) < shortWording {
			s += " “" + l.Wordings[0] + "”"
		}
		parts = append(parts, s)
	}
	p.line(2, title+": "+strings.Join(parts, "; ")+".")
}
