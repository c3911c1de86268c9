package wording

import (
	"slices"
	"strings"
)

// A Frame is one thing that a text says: a relation of a component, a thing or a function of the body. It knows no law.
type Frame struct {
	Relation   string // of words/concepts.json; "health" for what is said of a function of the body; "cued" where no pattern reads them
	Form       string // the way it was said, where languages tell ways apart
	Component  string
	Thing      string   // what is no nutrient, instead of a component
	Function   string   // of the body
	Subjects   []string // components named in the same sentence, nearest first, for a function of the body
	Amount     string   // a decimal number; empty where none is stated
	Unit       string
	Percent    string
	Basis      string // what the amount is per
	Compares   bool   // a comparison is begun
	Compared   string // the food it names, as it stands in the text
	Negated    bool   // the text denies it
	Span       [2]int // code points of the text
	from, upTo int    // tokens
	listed     int32  // a law's wording, or -1
	words      [2]int // code points of the pattern alone
	compared   [2]int // code points of the food compared with
}

// Zero tells whether the amount stated is nothing.
func (f *Frame) Zero() bool { return f.Amount != "" && isZero(f.Amount) }

// frames turns the matches taken into frames.
func (r *reader) frames(taken []*match) []Frame {
	var out []Frame
	for i, m := range taken {
		if m.listed {
			out = append(out, r.frame(m, rule{}))
			out[len(out)-1].listed = m.leads
			continue
		}
		if rule := r.rules[m.leads]; !rule.decoy {
			out = append(out, r.spread(taken[i], rule)...)
		}
	}
	return out
}

// spread gives each component or function of a list a frame of its own.
func (r *reader) spread(m *match, rule rule) []Frame {
	f := r.frame(m, rule)
	var out []Frame
	switch {
	case len(m.functions) > 0:
		for _, name := range m.functions {
			f.Function = name
			if len(m.names) > 0 {
				f.Subjects = m.names
			}
			out = append(out, f)
		}
	case len(m.names) > 0:
		for _, name := range m.names {
			out = append(out, f.about(name, r.isThing[name]))
		}
		if own := rule.component; own != "" && !slices.Contains(m.names, own) { // the end of a compound that others share
			out = append(out, f.about(own, false))
		}
	default:
		out = append(out, f)
	}
	return out
}

func (f Frame) about(name string, thing bool) Frame {
	if thing {
		f.Thing, f.Component = name, ""
	} else {
		f.Component, f.Thing = name, ""
	}
	return f
}

func (r *reader) frame(m *match, rule rule) Frame {
	f := Frame{
		Relation: rule.relation, Form: rule.form, Component: rule.component, Negated: rule.denies, Unit: m.unit, Basis: m.base, Percent: m.percent,
		from: m.start, upTo: m.end, listed: -1,
	}
	if m.amount != "" {
		f.Amount = canonical(m.amount)
	}
	if f.Unit == perCent {
		f.Percent, f.Amount, f.Unit = f.Amount, "", ""
	}
	if f.Percent == "" {
		f.Percent = rule.percent
	}
	if f.Percent != "" {
		f.Percent = canonical(f.Percent)
	}
	if f.Unit == "kcal" || f.Unit == "kJ" {
		f.Component = "energy"
	}
	f.Span = r.span(m.start, m.end)
	f.words = f.Span
	return f
}

func (r *reader) span(from, to int) [2]int { return [2]int{r.tokens[from].start, r.tokens[to-1].end} }

// Words are the words of a span.
func Words(text string, span [2]int) string {
	runes := []rune(text)
	return strings.TrimSpace(string(runes[max(span[0], 0):min(span[1], len(runes))]))
}

// follow reads what belongs to frames without standing in their patterns: denial, basis, subjects, the food compared with. It leaves frames out
// that are part of the name of that food.
func (r *reader) follow(frames []Frame) []Frame {
	for i := range frames {
		f := &frames[i]
		r.deny(f)
		r.base(f)
		if f.Function != "" && len(f.Subjects) == 0 {
			f.Subjects = r.subjects(f)
		}
	}
	return r.compare(frames)
}

// mostOver bounds the words between a denial and what it denies.
const mostOver = 3

// deny looks for a denial in front of a frame.
func (r *reader) deny(f *Frame) {
	at := f.from
	for over := 0; ; over++ {
		for back := 1; back <= 3 && at-back >= 0; back++ {
			if _, end := r.denials.longest(r.ids, at-back); end == at {
				f.Negated = true
				f.Span[0] = r.tokens[at-back].start
				return
			}
		}
		if over == mostOver || at == 0 || !r.denyOver[r.ids[at-1]] {
			return
		}
		at--
	}
}

// base takes a basis right behind a frame, or elsewhere in the clause of an amount.
func (r *reader) base(f *Frame) {
	if f.Basis != "" {
		return
	}
	if f.upTo < len(r.tokens) && r.bases[f.upTo].end > 0 {
		b := r.bases[f.upTo]
		f.Basis, f.upTo = r.language.bases.means[b.means], int(b.end)
		f.Span[1] = r.tokens[f.upTo-1].end
		return
	}
	if f.Amount == "" {
		return
	}
	from, to := r.sentence(f.from)
	for i := from; i < to; i++ {
		if b := r.bases[i]; b.end > 0 {
			f.Basis = r.language.bases.means[b.means]
			return
		}
	}
}

// ends tells whether a token ends a sentence.
func (r *reader) ends(at int) bool {
	return r.tokens[at].kind == mark && strings.Contains(".!?;|•·", r.tokens[at].key)
}

// mostSentence bounds how far a sentence is looked through to either side.
const mostSentence = 60

// sentence is the sentence around a token.
func (r *reader) sentence(at int) (from, to int) {
	for from = at; from > 0 && at-from < mostSentence && !r.ends(from-1); from-- {
	}
	for to = at; to < len(r.tokens) && to-at < mostSentence && !r.ends(to); to++ {
	}
	return from, to
}

// subjects are the components of a sentence, those before the function first, nearest first.
func (r *reader) subjects(f *Frame) []string {
	from, to := r.sentence(f.from)
	var out []string
	put := func(i int) {
		if n := r.names[i]; n.end > 0 {
			if name := r.language.names.means[n.means]; !r.isThing[name] && !slices.Contains(out, name) {
				out = append(out, name)
			}
		}
	}
	for i := f.from - 1; i >= from; i-- {
		put(i)
	}
	for i := f.from; i < to; i++ {
		put(i)
	}
	return out
}
