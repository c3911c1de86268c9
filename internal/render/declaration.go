package render

import (
	"strings"

	"gramlaw/internal/check"
)

const mandatory, voluntary, leftOut, determined = "mandatory", "optional", "may be left out", "determined"

// declaration writes what the label may state: a table for every basis, then what the table cannot show.
func (p *page) declaration(m *check.Market, o Options) {
	d := &m.Declaration
	title := "Declaration"
	if d.Title != "" {
		title += ": " + in(o.Language, d.Title, nil)
	}
	p.heading(title, '-')
	if len(d.Lines) == 0 {
		p.line(0, "The rules of this market have no line that can be computed for this product.")
	}
	marks := map[string]bool{}
	for _, b := range d.Bases {
		p.basis(d, b, o, marks)
	}
	p.legend(marks)
	p.blank()
	p.notRequired(d.NotRequired)
	p.serving(d.Serving, o)
	p.servings(d.Servings, o)
	p.open(d.Lines, o)
	p.additions(d, o)
	p.notKnown(d)
	p.omissions(d.Lines, o)
	p.formats(d)
	p.alternatives(d, o)
	p.grounds(d.Lines, o)
	if len(d.Statements) > 0 {
		p.line(0, "Statements with the declaration:")
		p.statementList(d.Statements, o)
	}
	p.contributions(d, o)
}

// basisName reads "per 100 g" or "per serving: 2 biscuits (30 g)".
func basisName(b check.Basis) string {
	s := "per " + b.ID
	if b.Amount != "" && b.Amount != b.ID {
		s += " " + b.Amount
		if b.ID == "serving" && strings.Contains(b.Amount, "(") {
			s = "per serving: " + b.Amount
		}
	}
	switch {
	case b.Grams == "" || strings.Contains(b.Amount, b.Grams):
	case strings.Contains(s, "("):
		s += ", " + spaced(b.Grams)
	default:
		s += " (" + spaced(b.Grams) + ")"
	}
	return s
}

// openEnd shortens a range, and leaves its upper end out where next to nothing is known: a label's milligrams that may be
// many grams help nobody.
func openEnd(text string, v *check.Value) string {
	from, _, ranged := strings.Cut(text, " to ")
	if ranged && !strings.HasSuffix(amount(v.High, v.Unit), bond+v.Unit) {
		return from + " or more"
	}
	return span(text)
}

// in picks a text by language.
func in(language, text string, texts map[string]string) string {
	if s, ok := texts[language]; ok {
		return s
	}
	return text
}

func term(l *check.Line, o Options) string { return in(o.Language, l.Term, l.Terms) }

func (p *page) basis(d *check.Table, b check.Basis, o Options, marks map[string]bool) {
	t := table{gap: 2}
	t.row(cell{}, cell{text: "Line"}, cell{text: "Printed", right: true}, cell{text: "Of reference", right: true}, cell{text: "Exact value"})
	t.row(cell{}, cell{text: rule}, cell{text: rule}, cell{text: rule}, cell{text: rule})
	for i := range d.Lines {
		l := &d.Lines[i]
		if l.Presence == voluntary {
			continue
		}
		mark := markOf(l)
		marks[mark] = true
		printed, percent, exact := cellsOf(l, b.ID, o)
		t.row(cell{text: mark}, cell{text: term(l, o), indent: 2 * l.Level}, cell{text: printed, right: true}, cell{text: percent, right: true}, cell{text: exact})
	}
	t.dropEmpty(3)
	if len(t.rows) > 2 {
		p.blank()
		p.line(3, basisName(b))
		p.blank()
		p.table(0, t)
	}
}

func markOf(l *check.Line) string {
	switch {
	case l.Status != determined:
		return "?"
	case l.Presence == leftOut:
		return "-"
	}
	return ""
}

func cellsOf(l *check.Line, basis string, o Options) (printed, percent, exact string) {
	for i := range l.Values {
		v := &l.Values[i]
		if v.Basis != basis {
			continue
		}
		if r := v.PercentReference; r != nil && r.Text != "" {
			percent = bound(openEnd(r.Text, v)) + " " + bound("of "+asPrinted(r.Reference, v))
		}
		return bound(openEnd(in(o.Language, v.Text, v.Texts), v)), percent, asPrinted(exactly(v), v)
	}
	return "", "", "not known"
}

// asPrinted writes the unit of an amount as the label prints it, where the label does not write it as the report does.
func asPrinted(s string, v *check.Value) string {
	word := v.Text[strings.LastIndexByte(v.Text, ' ')+1:]
	if v.Unit == "" || word == v.Unit || word == v.Text || strings.ContainsAny(word, "0123456789") {
		return s
	}
	for _, space := range []string{" ", bond} {
		s = strings.ReplaceAll(s, space+v.Unit, space+word)
	}
	return s
}

func (p *page) legend(marks map[string]bool) {
	var parts []string
	for _, m := range []struct{ mark, means string }{
		{"-", "may be left out"}, {"?", "the data leave it open which of the two is printed"},
	} {
		if marks[m.mark] {
			parts = append(parts, m.mark+" "+m.means)
		}
	}
	if len(parts) > 0 {
		p.blank()
		p.line(0, strings.Join(parts, "; ")+".")
	}
}
