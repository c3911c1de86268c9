package render

import (
	"fmt"
	"slices"
	"strings"

	"gramlaw/internal/check"
)

// additions lists the optional lines that may be printed, with what they print on the first basis.
func (p *page) additions(d *check.Table, o Options) {
	if len(d.Bases) == 0 {
		return
	}
	first := d.Bases[0]
	var parts []string
	for i := range d.Lines {
		l := &d.Lines[i]
		if l.Presence != voluntary || l.Status != determined {
			continue
		}
		printed, percent, _ := cellsOf(l, first.ID, o)
		share, _, _ := strings.Cut(percent, " ")
		s := strings.TrimSpace(term(l, o) + " " + printed)
		if share != "" {
			s += " (" + share + ")"
		}
		parts = append(parts, s)
	}
	if len(parts) > 0 {
		p.run("May be added, per "+first.ID, strings.Join(parts, "; ")+".")
	}
}

// mainIngredients is how many ingredients are named that lack data for optional lines.
const mainIngredients = 4

// notKnown names the optional lines without data, and the ingredients that most of them wait for.
func (p *page) notKnown(d *check.Table) {
	var terms []string
	var by bundles
	for _, l := range d.NotKnown {
		terms = append(terms, l.Term)
		var names []string
		for _, n := range l.Needs {
			name, _ := ingredientOf(n)
			names = append(names, name)
		}
		for _, n := range unique(names) {
			by.add(l.Term, n)
		}
	}
	if len(terms) == 0 {
		return
	}
	slices.SortStableFunc(by.list, func(a, b bundle) int { return len(b.names) - len(a.names) })
	var lacking []string
	for _, b := range by.list[:min(len(by.list), mainIngredients)] {
		lacking = append(lacking, b.key[0])
	}
	s := strings.Join(unique(terms), ", ")
	if len(lacking) > 0 {
		s += "; it is missing on " + strings.Join(lacking, ", ")
	}
	if more := len(by.list) - len(lacking); more > 0 {
		s += fmt.Sprintf(" and %d more", more)
	}
	p.run("Optional lines without enough data", s+".")
}

func (p *page) notRequired(n *check.NotRequired) {
	switch {
	case n == nil:
	case n.Open:
		p.run("Whether a declaration is required is not determined", sentence(n.Says)+" It would have to be known: "+strings.Join(n.Needs, ", ")+".")
	default:
		p.run("No declaration is required", sentence(n.Says))
	}
}

func (p *page) serving(s *check.ServingSize, o Options) {
	if s == nil {
		return
	}
	p.run("Serving size", "“"+in(o.Language, s.Text, s.Texts)+"”.")
	p.languages(in(o.Language, s.Text, s.Texts), s.Texts)
}

func (p *page) servings(s *check.Servings, o Options) {
	if s == nil {
		return
	}
	text := "“" + in(o.Language, s.Text, s.Texts) + "”"
	p.run("Servings", text+" (exactly "+short(s.Exact)+").")
	p.languages(in(o.Language, s.Text, s.Texts), s.Texts)
}

// formats lists the shorter formats, and what may be repeated.
func (p *page) formats(d *check.Table) {
	if d.Simplified != nil {
		p.simplified(d.Simplified)
	}
	for i := range d.OtherFormats {
		p.simplified(&d.OtherFormats[i])
	}
}

func (p *page) simplified(s *check.Simplified) {
	title, text := "A shorter format is allowed", s.Name+", without "+strings.Join(s.LeaveOut, ", ")
	if len(s.Repeats) > 0 {
		title, text = "May be repeated elsewhere", strings.Join(slices.Compact(slices.Clone(s.Repeats)), ", ")+" ("+s.Name+")"
	}
	if s.Says != "" {
		states := map[string]string{"": "then states", "optional": "may then state", "open": "then states, where it must (not determined),"}[s.SaysPresence]
		text += "; the label " + states + " “" + strings.TrimSuffix(listless(s.Says, s.Named), ".") + "”"
	}
	p.run(title, strings.TrimSuffix(text, ".")+".")
	p.languages(s.Says, s.Texts)
}

// listless puts "…" for the list of names in a statement.
func listless(statement string, names []string) string {
	if len(names) == 0 {
		return statement
	}
	from, last := strings.Index(statement, names[0]), names[len(names)-1]
	to := strings.LastIndex(statement, last)
	if from < 0 || to < from {
		return statement
	}
	return statement[:from] + "…" + statement[to+len(last):]
}

// naming lists names that ingredients must bear and reserved names the product may bear; ingredients with the same duty
// stand together.
func (p *page) naming(list []check.Naming) {
	var by bundles
	for i := range list {
		n := &list[i]
		who := n.Ingredient
		if who == "" {
			who = "the product"
		}
		open := ""
		if n.Holds == nil {
			open = " (whether it applies is not determined)"
		}
		by.add(who, n.Name, open, n.Says, n.Source)
	}
	if len(by.list) > 0 {
		p.heading("Names", '-')
	}
	for _, b := range by.list {
		s := strings.Join(b.names, ", ")
		if b.key[0] != "" {
			s += ", “" + b.key[0] + "”"
		}
		p.item(0, s+b.key[1]+": "+sentence(b.key[2])+" Source: "+sentence(b.key[3]))
	}
}
