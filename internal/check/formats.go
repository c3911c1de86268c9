package check

import (
	"slices"
	"strings"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// formats are the shorter formats the law allows this product, in the order of the declaration.
func (v *view) formats(list []rulebook.Simplified) []Simplified {
	var out []Simplified
	for i := range list {
		if f, ok := v.format(&list[i]); ok {
			out = append(out, f)
		}
	}
	return out
}

// format is one shorter format; false where it is not surely allowed, or would leave nothing out.
func (v *view) format(f *rulebook.Simplified) (Simplified, bool) {
	if v.truth(f.Where) != quantity.Yes {
		return Simplified{}, false
	}
	out := Simplified{Name: f.Name.In(v.language()), LeaveOut: []string{}}
	if f.Repeats {
		out.Repeats = v.termsOf(f.Shows)
		v.state(&out, f, nil)
		return out, true
	}
	named, ok := v.insignificant(f)
	left := v.leftOut(f, named)
	if !ok || len(left) == 0 {
		return Simplified{}, false
	}
	out.LeaveOut = v.termsOf(left)
	v.state(&out, f, named)
	return out, true
}

// insignificant lists what is counted and may go; false where too little is insignificant.
func (v *view) insignificant(f *rulebook.Simplified) (named []string, enough bool) {
	truths := make([]quantity.Truth, len(f.Of))
	for i, one := range f.Of {
		truths[i] = v.truth(one.If)
		if truths[i] == quantity.Yes && !v.stays(f, one.Quantity) {
			named = append(named, one.Quantity)
		}
	}
	return named, quantity.AtLeast(f.Needed, truths...) == quantity.Yes
}

// leftOut lists the quantities whose lines go: those that are named, and those that go without a word.
func (v *view) leftOut(f *rulebook.Simplified, named []string) []string {
	out := slices.Clone(named)
	for _, one := range f.Leaves {
		if v.truth(one.If) == quantity.Yes && !v.stays(f, one.Quantity) {
			out = append(out, one.Quantity)
		}
	}
	for _, l := range v.order {
		q := l.line.Quantity
		if len(f.Shows) > 0 && !slices.Contains(f.Shows, q) && v.stands(l) && !v.stays(f, q) {
			out = append(out, q)
		}
	}
	return out
}

// stays tells whether a line stands in a shorter format too: the format keeps it, or a claim or a condition raises it.
func (v *view) stays(f *rulebook.Simplified, q string) bool {
	l := v.lines[q]
	return l.needed || slices.Contains(f.Keeps, q) || f.KeepsClaimed && v.about[q] || l.line.MandatoryIf != nil && v.truth(l.line.MandatoryIf) == quantity.Yes
}

// state writes what the label must then say, or may say.
func (v *view) state(out *Simplified, f *rulebook.Simplified, named []string) {
	if len(f.Says) == 0 || len(named) == 0 && len(f.Of) > 0 {
		return
	}
	texts := map[string]string{}
	for _, lang := range v.law.Market.Languages {
		if says, ok := f.Says[lang]; ok {
			texts[lang] = strings.ReplaceAll(says, "{names}", joined(v.namesIn(named, lang), lang, v.law.Market.And.In(lang)))
		}
	}
	out.Says, out.Named = texts[v.language()], v.namesIn(named, v.language())
	if len(texts) > 1 {
		out.Texts = texts
	}
	switch v.truth(f.SaysIf) {
	case quantity.No:
		out.SaysPresence = "optional"
	case quantity.Open:
		out.SaysPresence = "open"
	}
}

// termsOf are the first terms of quantities' lines.
func (v *view) termsOf(quantities []string) []string {
	out := make([]string, len(quantities))
	for i, q := range quantities {
		out[i] = v.term(v.lines[q])
	}
	return out
}

// namesIn are the law's names of quantities in a language.
func (v *view) namesIn(quantities []string, lang string) []string {
	out := make([]string, len(quantities))
	for i, q := range quantities {
		if d, ok := v.law.Definitions.Get(q); ok {
			out[i] = d.Body.Name.In(lang)
		} else if e, ok := v.law.Energy.Get(q); ok {
			out[i] = e.Body.Name.In(lang)
		}
	}
	return out
}
