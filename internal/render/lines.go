package render

import (
	"slices"
	"strings"

	"gramlaw/internal/check"
)

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
	if len(needs.list) > 0 {
		p.heading("Not determined", '-')
	}
	for _, b := range needs.list {
		names := strings.Join(unique(b.names), ", ")
		if len(b.key) == 0 {
			p.item(2, names+": a basis, a rule or a reference value is not known.")
			continue
		}
		p.item(2, names+": would be settled by data on "+needed(b.key)+".")
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
	if len(out.list) > 0 {
		p.heading("What may be left out", '-')
	}
	for _, b := range out.list {
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

// alternatives lists what else the law lets the label print, lines with the same choice together.
func (p *page) alternatives(d *check.Table, o Options) {
	var by, joined bundles
	for i := range d.Lines {
		l := &d.Lines[i]
		for j := range l.Values {
			v := &l.Values[j]
			also := others(v.Alternatives, v.Text)
			if r := v.PercentReference; r != nil {
				also = append(also, others(r.Alternatives, r.Text)...)
			}
			if len(also) > 0 {
				by.add("per "+v.Basis, term(l, o), strings.Join(also, ", "))
			}
		}
	}
	for _, b := range by.list {
		bases := ""
		if len(b.names) < len(d.Bases) {
			bases = " " + strings.Join(b.names, " and ")
		}
		joined.add(b.key[0], bases, b.key[1])
	}
	if len(joined.list) > 0 {
		p.heading("The law also allows", '-')
	}
	for _, b := range joined.list {
		p.item(2, strings.Join(b.names, ", ")+b.key[0]+": "+b.key[1])
	}
}

// others leaves out what is printed anyway.
func others(list []string, printed string) []string {
	return slices.DeleteFunc(slices.Clone(list), func(s string) bool { return s == printed })
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
	if len(grades.list) == 0 {
		return
	}
	slices.SortStableFunc(grades.list, func(a, b bundle) int { return len(b.names) - len(a.names) })
	s := "Grounds of these rounding rules: " + grades.list[0].key[0]
	for _, g := range grades.list[1:] {
		s += "; " + strings.Join(unique(g.names), ", ") + ": " + g.key[0]
	}
	p.blank()
	p.line(0, s+".")
}

// grade is how binding a rule is and how well it is sourced.
func grade(force, evidence string) string {
	words := map[string]string{"official text": "official text seen", "secondary": "from a secondary source", "memory": "from memory, text not seen"}
	if w, ok := words[evidence]; ok {
		evidence = w
	}
	return strings.Trim(force+", "+evidence, ", ")
}
