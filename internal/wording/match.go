package wording

import "slices"

// A match is one way to read some tokens.
type match struct {
	start, end int
	leads      int32 // to a rule of the language, or to a wording of a law
	listed     bool  // the latter
	bound
	score int
}

// bound is what the slots of a pattern took.
type bound struct {
	names                       []string // of components or things
	functions                   []string
	amount, unit, percent, base string
}

// mostSteps bounds the ways tried from one token.
const mostSteps = 4096

// A walker looks for patterns from one token on.
type walker struct {
	*reader
	trie   *trie
	ids    []uint32
	listed bool
	start  int
	steps  int
	found  []match
}

// matches finds every way in which patterns read a text, by the token they begin at.
func (r *reader) matches(t *trie, ids []uint32, listed bool, out [][]match) {
	w := &walker{reader: r, trie: t, ids: ids, listed: listed}
	for i := range r.tokens {
		w.start, w.steps, w.found = i, 0, out[i]
		w.walk(0, i, bound{})
		out[i] = w.found
	}
}

func (w *walker) walk(at int32, i int, b bound) {
	if w.steps++; w.steps > mostSteps {
		return
	}
	n := &w.trie.nodes[at]
	for _, end := range n.ends {
		w.found = append(w.found, match{start: w.start, end: i, leads: end, listed: w.listed, bound: b, score: w.score(w.start, i)})
	}
	if i == len(w.tokens) {
		return
	}
	if to, ok := n.words[w.ids[i]]; ok && w.ids[i] > 0 {
		w.walk(to, i+1, b)
	}
	for _, e := range n.slots {
		w.slot(e, i, b)
	}
}

// slot goes on behind everything a slot can take.
func (w *walker) slot(e edge, i int, b bound) {
	switch e.slot {
	case components, things, either:
		w.namesSlot(e, i, b)
	case functions:
		for _, l := range w.functionList(i) {
			b.functions = l.names
			w.walk(e.to, l.end, b)
		}
	case anyWord:
		if w.tokens[i].kind == word {
			w.walk(e.to, i+1, b)
		}
	case basisSlot:
		if f := w.bases[i]; f.end > 0 {
			b.base = w.language.bases.means[f.means]
			w.walk(e.to, int(f.end), b)
		}
	case numberSlot, percentSlot, amountSlot, energySlot:
		w.numberSlots(e, i, b)
	default:
		if _, end := w.sets[e.slot-firstSet].longest(w.reader.ids, i); end > 0 {
			w.walk(e.to, end, b)
		}
	}
}

// namesSlot takes lists: of components, of things, or of both.
func (w *walker) namesSlot(e edge, i int, b bound) {
	for _, l := range w.list(i) {
		if e.slot != either && slices.ContainsFunc(l.names, func(n string) bool { return w.isThing[n] != (e.slot == things) }) {
			continue
		}
		b.names = l.names
		w.walk(e.to, l.end, b)
	}
}

func (w *walker) numberSlots(e edge, i int, b bound) {
	end := 0
	switch e.slot {
	case numberSlot:
		b.amount, end = w.number(i)
	case percentSlot:
		b.percent, end = w.percent(i)
	default:
		b.amount, b.unit, end = w.amount(i)
		if energy := b.unit == "kcal" || b.unit == "kJ"; b.unit == perCent || energy != (e.slot == energySlot) {
			end = 0
		}
	}
	if end > 0 {
		w.walk(e.to, end, b)
	}
}

// score counts the tokens that say something.
func (r *reader) score(from, to int) int {
	n := 0
	for i := from; i < to; {
		switch {
		case r.joins[i].end > 0:
			i = int(r.joins[i].end)
			continue
		case r.tokens[i].kind != mark:
			n++
		}
		i++
	}
	return n
}

// A cover is the best way to read a text from a token on.
type cover struct {
	score, parts, tokens, next int
	take                       int // index of the match taken, or -1
}

// better tells whether one cover is to be taken before another: more is read, else in fewer parts, else with more marks.
func (c cover) better(than cover) bool {
	if c.score != than.score {
		return c.score > than.score
	}
	if c.parts != than.parts {
		return c.parts < than.parts
	}
	return c.tokens > than.tokens
}

// best chooses matches that do not overlap and read the most.
func best(byStart [][]match, preferred func(a, b *match) bool) []*match {
	n := len(byStart)
	covers := make([]cover, n+1)
	for i := n - 1; i >= 0; i-- {
		covers[i] = covers[i+1]
		covers[i].take, covers[i].next = -1, i+1
		for k := range byStart[i] {
			m := &byStart[i][k]
			c := cover{score: m.score + covers[m.end].score, parts: 1 + covers[m.end].parts, tokens: m.end - i + covers[m.end].tokens, next: m.end, take: k}
			tie := covers[i].take >= 0 && !c.better(covers[i]) && !covers[i].better(c)
			if m.score > 0 && (c.better(covers[i]) || tie && preferred(m, &byStart[i][covers[i].take])) {
				covers[i] = c
			}
		}
	}
	var out []*match
	for i := 0; i < n; i = covers[i].next {
		if covers[i].take >= 0 {
			out = append(out, &byStart[i][covers[i].take])
		}
	}
	return out
}
