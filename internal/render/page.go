package render

import "strings"

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
	lines := wrap(s, Width-max(start, rest))
	p.put(strings.Repeat(" ", indent) + label + strings.Repeat(" ", max(rest-start, 0)) + lines[0])
	for _, l := range lines[1:] {
		p.put(strings.Repeat(" ", rest) + l)
	}
}

func (p *page) put(line string) {
	p.WriteString(strings.TrimRight(line, " "))
	p.WriteByte('\n')
}

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
