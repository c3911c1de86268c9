package wording

// cued is the relation of a frame in which a component and a cue stand together and no pattern reads them.
const cued = "cued"

// near is how many tokens may stand between a cue and the component it makes a statement about.
const near = 3

// cued finds what looks like a statement about a component and is read by no pattern.
func (r *reader) cued(taken []*match) []Frame {
	read := make([]bool, len(r.tokens))
	for _, m := range taken {
		for i := m.start; i < m.end; i++ {
			read[i] = true
		}
	}
	var out []Frame
	for i := 0; i < len(r.tokens); i++ {
		_, end := r.cues.longest(r.ids, i)
		if end == 0 || read[i] {
			continue
		}
		for _, at := range r.aside(i, end) {
			if f, ok := r.unread(at, i, end, read); ok {
				out = append(out, f)
				break
			}
		}
	}
	return out
}

// aside lists the tokens near a cue, behind it first, up to the next mark.
func (r *reader) aside(from, to int) []int {
	var out []int
	for i := to; i < len(r.tokens) && i-to < near && r.tokens[i].kind != mark; i++ {
		out = append(out, i)
	}
	for i := from - 1; i >= 0 && from-i <= near && r.tokens[i].kind != mark; i-- {
		out = append(out, i)
	}
	return out
}

// unread is a frame over a cue and a component, where nothing has read the component.
func (r *reader) unread(at, from, to int, read []bool) (Frame, bool) {
	n := r.names[at]
	if n.end == 0 || r.isThing[r.language.names.means[n.means]] {
		return Frame{}, false
	}
	for i := at; i < int(n.end); i++ {
		if read[i] {
			return Frame{}, false
		}
	}
	for i := at; i < int(n.end); i++ {
		read[i] = true
	}
	from, to = min(from, at), max(to, int(n.end))
	f := Frame{Relation: cued, Component: r.language.names.means[n.means], from: from, upTo: to, listed: -1, Span: r.span(from, to)}
	f.words = f.Span
	return f, true
}
