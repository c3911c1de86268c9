package wording

// found is a phrase at a place: the index of its meaning, and where it ends; no phrase ends at 0.
type found struct {
	means int32
	end   int32
}

// A reader reads one text in one language.
type reader struct {
	*language
	tokens []token
	ids    []uint32

	names, before, after, units, numbers, bases, functions, joins []found
	lists, functionLists                                          [][]listEnd
}

// A listEnd is a list of names that ends at a token.
type listEnd struct {
	end   int
	names []string
}

// mostNames bounds a list of names.
const mostNames = 12

func (l *language) reader(text string) *reader {
	r := &reader{language: l, tokens: tokens(text, l.decimal)}
	r.ids = l.vocabulary.ids(r.tokens)
	for book, to := range map[*phrasebook]*[]found{
		l.names: &r.names, l.before: &r.before, l.after: &r.after, l.units: &r.units, l.numbers: &r.numbers, l.bases: &r.bases, l.functions: &r.functions, l.joins: &r.joins,
	} {
		*to = r.find(book)
	}
	r.lists, r.functionLists = make([][]listEnd, len(r.tokens)), make([][]listEnd, len(r.tokens))
	return r
}

// find looks for a book's phrases at every token.
func (r *reader) find(book *phrasebook) []found {
	out := make([]found, len(r.tokens))
	for i := range out {
		means, end := book.longest(r.ids, i)
		out[i] = found{means, int32(end)}
	}
	return out
}

// list gives the lists of components and things that begin at a token, shortest first.
func (r *reader) list(at int) []listEnd {
	if r.lists[at] == nil {
		r.lists[at] = r.gather(at, r.names, r.language.names, true)
	}
	return r.lists[at]
}

func (r *reader) functionList(at int) []listEnd {
	if r.functionLists[at] == nil {
		r.functionLists[at] = r.gather(at, r.functions, r.language.functions, false)
	}
	return r.functionLists[at]
}

// gather walks along names and the conjunctions between them.
func (r *reader) gather(at int, phrases []found, book *phrasebook, short bool) []listEnd {
	out := []listEnd{}
	var names []string
	for len(names) < mostNames && at < len(r.tokens) {
		name, end, whole := r.member(at, phrases, book, short, len(names) > 0)
		if end == 0 {
			return out
		}
		names = append(names[:len(names):len(names)], name)
		if whole {
			out = append(out, listEnd{end, names})
		}
		if at = r.joined(end); at == 0 {
			return out
		}
	}
	return out
}

// member is a name of a list that begins at a token, and where it ends; 0 where none does. A short form in front of others does not end a
// list. Of a name and a longer short form the latter counts where the list goes on.
func (r *reader) member(at int, phrases []found, book *phrasebook, short, behind bool) (name string, end int, whole bool) {
	f, b := phrases[at], r.before[at]
	switch {
	case short && b.end > f.end && r.joined(int(b.end)) > 0:
		return r.language.before.means[b.means], int(b.end), false
	case f.end > 0:
		return book.means[f.means], int(f.end), true
	case short && behind && r.after[at].end > 0:
		return r.language.after.means[r.after[at].means], int(r.after[at].end), true
	}
	return "", 0, false
}

// joined is where a list goes on behind a conjunction, or two of them, and the words that may follow; 0 where there is none.
func (r *reader) joined(at int) int {
	from := at
	for second := range 2 {
		if at < len(r.tokens) && r.joins[at].end > 0 && (second == 0 || r.after[at].end == 0) {
			at = int(r.joins[at].end)
		}
	}
	if at == from {
		return 0
	}
	for range 2 {
		if at < len(r.tokens) && r.joinOver[r.ids[at]] && r.names[at].end == 0 {
			at++
		}
	}
	if at == len(r.tokens) {
		return 0
	}
	return at
}

// number reads digits or a number's word.
func (r *reader) number(at int) (text string, end int) {
	switch {
	case at >= len(r.tokens):
		return "", 0
	case r.tokens[at].kind == number:
		return r.tokens[at].key, at + 1
	case r.numbers[at].end > 0:
		return r.language.numbers.means[r.numbers[at].means], int(r.numbers[at].end)
	}
	return "", 0
}

// amount reads a number and its unit.
func (r *reader) amount(at int) (text, unit string, end int) {
	text, at = r.number(at)
	if at == 0 || at >= len(r.tokens) || r.units[at].end == 0 {
		return "", "", 0
	}
	return text, r.language.units.means[r.units[at].means], int(r.units[at].end)
}

const perCent = "%"

// percent reads a per cent, or a fraction as one.
func (r *reader) percent(at int) (text string, end int) {
	if text, unit, end := r.amount(at); unit == perCent {
		return text, end
	}
	if at+2 < len(r.tokens) && r.tokens[at].kind == number && r.tokens[at+1].key == "/" && r.tokens[at+2].kind == number {
		if p, ok := perCentOf(r.tokens[at].key, r.tokens[at+2].key); ok {
			return p, at + 3
		}
	}
	return "", 0
}
