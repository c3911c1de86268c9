package render

import (
	"slices"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/rulebook"
)

// open tells what would settle the mandatory lines that are not determined.
func (p *page) open(lines []check.Line, o Options) {
	var needs bundles
	for i := range lines {
		if l := &lines[i]; l.Status != determined && l.Presence != voluntary {
			needs.add(term(l, o), l.Needs...)
		}
	}
	if len(needs.list) > 0 {
		p.line(0, "Not determined, and the data that would settle it:")
	}
	for _, b := range needs.list {
		why := "a basis, a rule or a reference value is not known"
		if len(b.key) > 0 {
			why = needed(b.key)
		}
		p.item(2, strings.Join(unique(b.names), ", ")+": "+why+".")
	}
}

// omissions lists what may be left out; lines whose statements differ in their own name only stand together.
func (p *page) omissions(lines []check.Line, o Options) {
	var out bundles
	var notes []string
	for i := range lines {
		l := &lines[i]
		if l.Presence == leftOut {
			out.add(term(l, o), nameless(l.LeftOut, l.Term))
		}
		if l.Note != "" {
			notes = append(notes, term(l, o)+": "+l.Note)
		}
	}
	var parts []string
	for _, b := range out.list {
		s := strings.Join(b.names, ", ")
		if b.key[0] != "" {
			s += ", where the label states “" + strings.TrimSuffix(b.key[0], ".") + "”"
		}
		parts = append(parts, s)
	}
	if len(parts) > 0 {
		p.run("May be left out", strings.Join(parts, "; ")+".")
	}
	if len(notes) > 0 {
		p.run("Notes", strings.Join(notes, "; ")+".")
	}
}

// nameless puts "…" for a line's own name in a statement.
func nameless(statement, name string) string {
	i := strings.Index(strings.ToLower(statement), strings.ToLower(name))
	if i < 0 || name == "" || len(strings.ToLower(statement)) != len(statement) {
		return statement
	}
	return statement[:i] + "…" + statement[i+len(name):]
}

// alternatives lists what else the law lets the label print in its mandatory lines, lines with the same choice together.
func (p *page) alternatives(d *check.Table, o Options) {
	var by, joined bundles
	for i := range d.Lines {
		l := &d.Lines[i]
		for j := range l.Values {
			if also := choices(&l.Values[j]); len(also) > 0 && l.Presence != voluntary {
				by.add("per "+l.Values[j].Basis, term(l, o), strings.Join(also, ", "))
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
	var parts []string
	for _, b := range joined.list {
		parts = append(parts, strings.Join(b.names, ", ")+b.key[0]+" "+b.key[1])
	}
	if len(parts) > 0 {
		p.run("The law also allows", strings.Join(parts, "; ")+".")
	}
}

// choices are the other amounts and per cents that may be printed.
func choices(v *check.Value) []string {
	also := others(v.Alternatives, v.Text)
	if r := v.PercentReference; r != nil {
		also = append(also, others(r.Alternatives, r.Text)...)
	}
	return also
}

// others leaves out what is printed anyway.
func others(list []string, printed string) []string {
	return slices.DeleteFunc(slices.Clone(list), func(s string) bool { return s == printed })
}

// grounds tells how well the values of the table are sourced: the most common grade first, the lines of the others by name;
// of the optional lines only the weakest.
func (p *page) grounds(lines []check.Line, o Options) {
	var grades bundles
	var added *check.Value
	for i := range lines {
		l := &lines[i]
		switch {
		case len(l.Values) == 0 || l.Values[0].Rule == "":
		case l.Presence != voluntary:
			grades.add(term(l, o), grade(l.Values[0].Force, l.Values[0].Evidence))
		case l.Status == determined && (added == nil || weaker(l.Values[0].Evidence, added.Evidence)):
			added = &l.Values[0]
		}
	}
	slices.SortStableFunc(grades.list, func(a, b bundle) int { return len(b.names) - len(a.names) })
	var parts []string
	for i, g := range grades.list {
		s := g.key[0]
		if i > 0 {
			s = strings.Join(unique(g.names), ", ") + ": " + s
		}
		parts = append(parts, s)
	}
	if added != nil {
		parts = append(parts, "what may be added, at the weakest: "+grade(added.Force, added.Evidence))
	}
	if len(parts) > 0 {
		p.run("Grounds of these values", strings.Join(parts, "; ")+".")
	}
}

// weaker tells whether one grade of evidence is below another.
func weaker(a, b string) bool {
	return slices.Index(rulebook.Evidences, a) > slices.Index(rulebook.Evidences, b)
}

// grade is how binding a rule is and how well it is sourced.
func grade(force, evidence string) string {
	words := map[string]string{"official text": "official text seen", "secondary": "from a secondary source", "memory": "from memory, text not seen"}
	if w, ok := words[evidence]; ok {
		evidence = w
	}
	return strings.Trim(force+", "+evidence, ", ")
}
