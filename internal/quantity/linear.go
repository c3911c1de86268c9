package quantity

import (
	"slices"

	"github.com/shopspring/decimal"
)

// A Variable is one thing that is known only between two ends: a missing component of one ingredient, a stated range, a
// fatty acid whose group is open. Index orders variables and identifies them within a recipe.
type Variable struct {
	Index     int
	Low, High Ratio
	Central   Ratio
	Typical   bool // Central is set

	self uncertain // the variable as a form
	one  [1]term
}

type term struct {
	v *Variable
	c Ratio
}

// A Linear is an exact value plus multiples of variables. Because variables stay apart until the end, what is uncertain
// in two places but is the same thing cancels instead of adding up.
type Linear struct {
	Known     Ratio
	uncertain *uncertain // nil where nothing is
}

type uncertain struct {
	terms []term    // by index, no zero coefficients
	ends  *[2]Ratio // least and greatest value, where somebody has worked them out
}

func (l Linear) terms() []term {
	if l.uncertain == nil {
		return nil
	}
	return l.uncertain.terms
}

func linear(known Ratio, terms []term) Linear {
	if len(terms) == 0 {
		return Linear{Known: known}
	}
	return Linear{known, &uncertain{terms: terms}}
}

// Exactly is a linear form without uncertainty.
func Exactly(r Ratio) Linear { return Linear{Known: r} }

// Of is the variable itself.
func Of(v *Variable) Linear {
	if v.Low.Cmp(v.High) == 0 {
		return Linear{Known: v.Low}
	}
	if v.self.terms == nil {
		v.one[0] = term{v, FromInt(1)}
		v.self.terms = v.one[:]
	}
	return Linear{uncertain: &v.self}
}

// Determined reports that nothing is uncertain.
func (l Linear) Determined() bool { return l.uncertain == nil }

// Add is l + m.
func (l Linear) Add(m Linear) Linear {
	known := l.Known.Add(m.Known)
	switch {
	case m.uncertain == nil && m.Known.IsZero():
		return l
	case l.uncertain == nil && l.Known.IsZero():
		return m
	case m.uncertain == nil:
		return linear(known, l.terms())
	case l.uncertain == nil:
		return linear(known, m.terms())
	}
	return linear(known, mergeTerms(l.terms(), m.terms()))
}

func mergeTerms(a, b []term) []term {
	out := make([]term, 0, len(a)+len(b))
	for len(a) > 0 && len(b) > 0 {
		switch {
		case a[0].v.Index < b[0].v.Index:
			out, a = append(out, a[0]), a[1:]
		case a[0].v.Index > b[0].v.Index:
			out, b = append(out, b[0]), b[1:]
		default:
			if c := a[0].c.Add(b[0].c); !c.IsZero() {
				out = append(out, term{a[0].v, c})
			}
			a, b = a[1:], b[1:]
		}
	}
	return append(append(out, a...), b...)
}

// Sum adds n forms at once; its cost is linear in their terms, but for one sort. What shares a denominator is added up first, so that
// few sums need a new one.
func Sum(n int, form func(i int) Linear) Linear {
	var known tally
	var terms []term
	sorted, last := true, 0
	for i := range n {
		l := form(i)
		known.add(l.Known)
		for _, t := range l.terms() {
			sorted = sorted && t.v.Index > last
			last = t.v.Index
			terms = append(terms, t)
		}
	}
	if !sorted {
		terms = united(terms)
	}
	s := linear(known.sum(), terms)
	if s.uncertain != nil {
		s.uncertain.ends = &[2]Ratio{s.end(true), s.end(false)}
	}
	return s
}

// A tally adds up ratios by denominator.
type tally struct {
	parts [4]Ratio
	n     int
	more  Ratio // of denominators beyond the first few
}

func (t *tally) add(r Ratio) {
	if r.IsZero() {
		return
	}
	for i := range t.n {
		if t.parts[i].d == r.d {
			t.parts[i] = t.parts[i].Add(r)
			if t.parts[i].d != r.d { // they cancelled out
				t.n--
				t.parts[i] = t.parts[t.n]
			}
			return
		}
	}
	if t.n == len(t.parts) {
		t.more = t.more.Add(r)
		return
	}
	t.parts[t.n] = r
	t.n++
}

func (t *tally) sum() Ratio {
	sum := t.more
	for i := range t.n {
		sum = sum.Add(t.parts[i])
	}
	return sum
}

// united orders terms and adds up those of one variable.
func united(terms []term) []term {
	slices.SortStableFunc(terms, func(a, b term) int { return a.v.Index - b.v.Index })
	out := terms[:0]
	for _, t := range terms {
		if n := len(out); n > 0 && out[n-1].v.Index == t.v.Index {
			out[n-1].c = out[n-1].c.Add(t.c)
			continue
		}
		out = append(out, t)
	}
	return slices.DeleteFunc(out, func(t term) bool { return t.c.IsZero() })
}

// Sub is l - m.
func (l Linear) Sub(m Linear) Linear { return l.Add(m.Mul(FromInt(-1))) }

// Mul is l multiplied by an exact number.
func (l Linear) Mul(r Ratio) Linear {
	if r.IsZero() {
		return Linear{}
	}
	if r.isOne() {
		return l
	}
	if l.uncertain == nil {
		return Linear{Known: l.Known.Mul(r)}
	}
	terms := make([]term, len(l.terms()))
	for i, t := range l.terms() {
		terms[i] = term{t.v, t.c.Mul(r)}
	}
	m := linear(l.Known.Mul(r), terms)
	if e := l.uncertain.ends; e != nil {
		low, high := e[0].Mul(r), e[1].Mul(r)
		if r.Sign() < 0 {
			low, high = high, low
		}
		m.uncertain.ends = &[2]Ratio{low, high}
	}
	return m
}

// Times is l multiplied by a decimal.
func (l Linear) Times(d decimal.Decimal) Linear { return l.Mul(FromDecimal(d)) }

// Low is the least value over all variables, High the greatest.
func (l Linear) Low() Ratio {
	switch {
	case l.uncertain == nil:
		return l.Known
	case l.uncertain.ends != nil:
		return l.uncertain.ends[0]
	}
	return l.end(true)
}

// High is the greatest value over all variables.
func (l Linear) High() Ratio {
	switch {
	case l.uncertain == nil:
		return l.Known
	case l.uncertain.ends != nil:
		return l.uncertain.ends[1]
	}
	return l.end(false)
}

func (l Linear) end(low bool) Ratio {
	var s tally
	s.add(l.Known)
	for _, t := range l.terms() {
		x := t.v.High
		if low == (t.c.Sign() > 0) {
			x = t.v.Low
		}
		if !t.c.isOne() {
			x = t.c.Mul(x)
		}
		s.add(x)
	}
	return s.sum()
}

// Central is the value where every uncertain part has a typical one.
func (l Linear) Central() (Ratio, bool) {
	var s tally
	s.add(l.Known)
	for _, t := range l.terms() {
		if !t.v.Typical {
			return Ratio{}, false
		}
		s.add(t.c.Mul(t.v.Central))
	}
	return s.sum(), true
}

// Variables lists what the form still depends on, in order.
func (l Linear) Variables() []*Variable {
	out := make([]*Variable, len(l.terms()))
	for i, t := range l.terms() {
		out[i] = t.v
	}
	return out
}

// Merge orders and unites lists of variables.
func Merge(lists ...[]*Variable) []*Variable {
	var all []*Variable
	for _, l := range lists {
		all = append(all, l...)
	}
	slices.SortFunc(all, func(a, b *Variable) int { return a.Index - b.Index })
	return slices.CompactFunc(all, func(a, b *Variable) bool { return a.Index == b.Index })
}
