package render

import (
	"slices"
	"strings"

	"gramlaw/internal/check"
)

const mandatory, leftOut, determined = "mandatory", "may be left out", "determined"

// declaration writes what the label may state: a table for every basis, then what the table cannot show.
func (p *page) declaration(m *check.Market, o Options) {
	d := &m.Declaration
	p.heading("Declaration: "+in(o.Language, d.Title, nil), '-')
	if len(d.Lines) == 0 {
		p.line(0, "The rules of this market have no line that can be computed for this product.")
	}
	marks := map[string]bool{}
	for _, b := range d.Bases {
		p.basis(d, b, o, marks)
	}
	p.legend(marks)
	p.open(d.Lines, o)
	p.omissions(d.Lines, o)
	p.alternatives(d, o)
	p.grounds(d.Lines, o)
	p.statementList("Statements with the declaration", d.Statements, o)
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
	if b.Grams != "" && !strings.Contains(b.Amount, b.Grams) {
		s += ", " + spaced(b.Grams)
	}
	return s
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
	head := []cell{{}, {text: basisName(b)}, {text: "Printed", right: true}, {text: "Of reference", right: true}, {text: "Exact value"}}
	ruled := []cell{{}, {text: rule}, {text: rule}, {text: rule}, {text: rule}}
	t.row(head...)
	t.row(ruled...)
	for i := range d.Lines {
		l := &d.Lines[i]
		if l.Presence == "optional" && l.Status != determined {
			continue
		}
		mark := markOf(l)
		marks[mark] = true
		printed, percent, exact := cellsOf(l, b.ID, o)
		t.row(cell{text: mark}, cell{text: term(l, o), indent: 2 * l.Level}, cell{text: printed, right: true}, cell{text: percent, right: true}, cell{text: exact})
	}
	if len(t.rows) > 2 {
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
	case l.Presence == "optional":
		return "+"
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
			percent = r.Text + " of " + r.Reference
		}
		return in(o.Language, v.Text, v.Texts), percent, exactly(v)
	}
	return "", "", "not known"
}

func (p *page) legend(marks map[string]bool) {
	var parts []string
	for _, m := range []struct{ mark, means string }{
		{"+", "optional"}, {"-", "may be left out"}, {"?", "mandatory and not determined: every value is possible that lies between the two"},
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

// A bundle is lines of the declaration that share something.
type bundle struct{ key, names []string }

// bundles groups names by what they share, in the order of appearance.
type bundles []bundle

func (b *bundles) add(name string, key ...string) {
	for i := range *b {
		if slices.Equal((*b)[i].key, key) {
			(*b)[i].names = append((*b)[i].names, name)
			return
		}
	}
	*b = append(*b, bundle{key, []string{name}})
}

// open tells what would settle the lines that are not determined.
func (p *page) open(lines []check.Line, o Options) {
	var needs bundles
	var optional []string
	for i := range lines {
		l := &lines[i]
		switch {
		case l.Status == determined:
		case l.Presence == "optional":
			optional = append(optional, term(l, o))
		default:
			needs.add(term(l, o), l.Needs...)
		}
	}
	if len(needs) > 0 {
		p.heading("Not determined", '-')
	}
	for _, b := range needs {
		if len(b.key) == 0 {
			p.item(2, strings.Join(b.names, ", ")+": a basis, a rule or a reference value is not known.")
			continue
		}
		p.item(2, strings.Join(b.names, ", ")+": would be settled by data on "+strings.Join(b.key, ", ")+".")
	}
	if len(optional) > 0 {
		p.blank()
		p.line(0, "Optional lines that are not determined: "+strings.Join(optional, ", ")+".")
	}
}

func (p *page) omissions(lines []check.Line, o Options) {
	var out bundles
	var notes []string
	for i := range lines {
		l := &lines[i]
		if l.Presence == leftOut {
			out.add(term(l, o), l.LeftOut)
		}
		if l.Note != "" {
			notes = append(notes, term(l, o)+": "+l.Note)
		}
	}
	if len(out) > 0 {
		p.heading("What may be left out", '-')
	}
	for _, b := range out {
		s := strings.Join(b.names, ", ")
		if b.key[0] != "" {
			s += ", where the label states “" + strings.TrimSuffix(b.key[0], ".") + "”"
		}
		p.item(2, s+".")
	}
	if len(notes) > 0 {
		p.heading("Notes on lines", '-')
		p.items(notes)
	}
}

// alternatives lists what else the law lets the label print.
func (p *page) alternatives(d *check.Table, o Options) {
	var out []string
	for i := range d.Lines {
		l := &d.Lines[i]
		for j := range l.Values {
			v := &l.Values[j]
			also := slices.Clone(v.Alternatives)
			if v.PercentReference != nil {
				also = append(also, v.PercentReference.Alternatives...)
			}
			if len(also) == 0 {
				continue
			}
			s := term(l, o)
			if len(d.Bases) > 1 {
				s += " per " + v.Basis
			}
			out = append(out, s+": "+strings.Join(also, ", "))
		}
	}
	if len(out) > 0 {
		p.heading("The law also allows", '-')
		p.items(out)
	}
}

// grounds tells how well the rounding rules are sourced: the most common grade first, the lines of the others by name.
func (p *page) grounds(lines []check.Line, o Options) {
	var grades bundles
	for i := range lines {
		l := &lines[i]
		if len(l.Values) > 0 && l.Values[0].Rule != "" && (l.Presence != "optional" || l.Status == determined) {
			grades.add(term(l, o), grade(l.Values[0].Force, l.Values[0].Evidence))
		}
	}
	if len(grades) == 0 {
		return
	}
	slices.SortStableFunc(grades, func(a, b bundle) int { return len(b.names) - len(a.names) })
	s := "Grounds of these rounding rules: " + grades[0].key[0]
	for _, g := range grades[1:] {
		s += "; " + strings.Join(g.names, ", ") + ": " + g.key[0]
	}
	p.blank()
	p.line(0, s+".")
}

// grade is how binding a rule is and how well it is sourced.
func grade(force, evidence string) string {
	words := map[string]string{"official text": "official text seen", "secondary": "from a secondary source", "memory": "from memory, the text was not seen"}
	if w, ok := words[evidence]; ok {
		evidence = w
	}
	return strings.Trim(force+", "+evidence, ", ")
}

// contributions lists what each ingredient brings, where the report has it.
func (p *page) contributions(d *check.Table, o Options) {
	started := false
	for i := range d.Lines {
		l := &d.Lines[i]
		for j := range l.Values {
			v := &l.Values[j]
			if len(v.Contributions) == 0 || l.Presence == "optional" && l.Status != determined {
				continue
			}
			if !started {
				p.heading("Where the values come from", '-')
				started = true
			}
			p.derivation(term(l, o)+" per "+v.Basis+": "+exactly(v), v)
		}
	}
}

func (p *page) derivation(title string, v *check.Value) {
	p.blank()
	p.hang(2, 4, "", title+" ("+strings.Trim(v.Rule+"; "+v.Source, "; ")+")")
	t := table{gap: 2}
	var nothing []string
	for _, c := range v.Contributions {
		if c.Low == "0" && c.High == "0" {
			nothing = append(nothing, c.Ingredient)
			continue
		}
		t.row(cell{text: c.Ingredient}, cell{text: exactly(&check.Value{Exact: c.Value, Low: c.Low, High: c.High, Unit: v.Unit})})
	}
	p.table(4, t)
	if len(nothing) > 0 {
		p.line(4, "nothing from "+strings.Join(nothing, ", "))
	}
}
