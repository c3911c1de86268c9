package render

import "strings"

// bond is a space at which no line breaks.
const bond = "\u00a0"

// bound keeps a number and its unit on one line.
func bound(s string) string { return strings.ReplaceAll(s, " ", bond) }

// joined holds every number and the unit after it together.
func joined(s string) string {
	words := strings.Split(s, " ")
	out := words[0]
	for i, word := range words[1:] {
		before := words[i]
		if before != "" && before[len(before)-1] >= '0' && before[len(before)-1] <= '9' && units[strings.TrimRight(word, ",;:.)")] {
			out += bond + word
			continue
		}
		out += " " + word
	}
	return out
}

var units = map[string]bool{"%": true, "g": true, "mg": true, "µg": true, "mcg": true, "mL": true, "kcal": true, "kJ": true}

// A page collects lines. Everything that reaches it is cleaned and wrapped.
type page struct{ strings.Builder }

func (p *page) blank() {
	if p.Len() > 0 && !strings.HasSuffix(p.String(), "\n\n") {
		p.WriteByte('\n')
	}
}

// line writes a paragraph with an indentation.
func (p *page) line(indent int, s string) { p.hang(indent, indent, "", s) }

// item writes a paragraph behind a dash.
func (p *page) item(indent int, s string) { p.hang(indent, indent+2, "- ", s) }

func (p *page) items(list []string) {
	for _, s := range list {
		p.item(2, s)
	}
}

// hang writes a paragraph behind a label; the lines after the first stand at rest columns.
func (p *page) hang(indent, rest int, label, s string) {
	start := indent + columns(label)
	if label != "" && start < rest {
		label, start = label+strings.Repeat(" ", rest-start), rest
	}
	lines := wrap(s, Width-max(start, rest))
	p.put(strings.Repeat(" ", indent) + label + lines[0])
	for _, l := range lines[1:] {
		p.put(strings.Repeat(" ", rest) + l)
	}
}

// put writes a line; spaces that held words together become plain.
func (p *page) put(line string) {
	p.WriteString(strings.TrimRight(strings.ReplaceAll(line, bond, " "), " "))
	p.WriteByte('\n')
}

// run writes a paragraph that begins with its title; what wraps stands further in.
func (p *page) run(title, s string) { p.hang(0, 2, "", title+": "+s) }

// heading writes a title, underlined as long as its longest line.
func (p *page) heading(s string, under byte) {
	p.blank()
	n := 0
	for _, l := range wrap(s, Width) {
		p.put(l)
		n = max(n, columns(l))
	}
	p.put(strings.Repeat(string(under), n))
}
