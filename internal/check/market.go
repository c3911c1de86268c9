package check

import (
	"cmp"
	"maps"
	"slices"
	"strings"
	"time"

	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

func sortedKeys[T any](m map[string]T) []string { return slices.Sorted(maps.Keys(m)) }

func isDate(s string) bool {
	_, err := time.Parse("2006-01-02", s)
	return err == nil
}

// A market is the check of one jurisdiction.
type market struct {
	c       *checker
	j       string
	law     *rulebook.Law
	product *product
	refs    map[string]*product
	assumed map[string]Assumed
	about   map[string]bool // subjects of the claims that stand
	truths  map[*rulebook.Condition]quantity.Truth
	eaters  string // population, once asked
	touch   Touch  // of a comparison; nil where all is judged
	lines   map[string]*lineState
	order   []*lineState
	columns []column
}

// report judges the market and adds the components it speaks of to tags.
func (m *market) report(tags map[string]bool) Market {
	out := m.judge()
	out.Other = m.other(out)
	for _, l := range m.order {
		tags[l.line.Component] = true
	}
	return out
}

func (c *checker) open(j string, t rulebook.Transition) *market {
	m := &market{c: c, j: j, refs: map[string]*product{}, assumed: map[string]Assumed{}, about: map[string]bool{}, lines: map[string]*lineState{},
		truths: map[*rulebook.Condition]quantity.Truth{}}
	rules, _ := c.book.Rules(j)
	m.law = &rulebook.Law{Market: &rules.Market} // facts may be asked while versions are chosen
	m.law, _ = c.book.At(j, c.request.On, t, m.as(nil).truth)
	m.product = newProduct(m, c.batch)
	return m
}

func (m *market) judge() Market {
	law := m.law
	out := Market{Jurisdiction: m.j, Name: law.Market.Name, Edition: law.Edition, Claims: []Claim{}, AlsoPermitted: []Candidate{},
		FrontOfPack: []string{}, Naming: []Naming{}, Findings: []Finding{}, Presumed: []Presumed{}, Assumed: []Assumed{}, Gaps: law.Market.Gaps, NotJudged: law.Market.NotJudged, Caution: law.Market.Caution}
	out.Findings = append(out.Findings, m.coverage()...)
	m.openColumns(&out)
	m.openLines()
	out.Findings = append(out.Findings, m.noLines()...)
	out.Claims = m.claims()
	out.AlsoPermitted = m.alsoPermitted(out.Claims)
	m.printability(out.Claims)
	out.Declaration = m.table()
	out.Findings = append(out.Findings, m.packaging()...)
	out.Findings = append(out.Findings, m.judged("serving", m.law.Serving.All)...)
	out.Findings = append(out.Findings, m.judged("limit", m.law.Limits.All)...)
	out.Findings = append(out.Findings, m.profileAgainstStated()...)
	out.Naming = m.naming()
	for _, f := range sortedKeys(m.assumed) {
		out.Assumed = append(out.Assumed, m.assumed[f])
	}
	return out
}

// presumed lists what practice was asked for, for components this market's definitions speak of. It is asked after all markets
// are judged, so that their order does not matter.
func (m *market) presumed() []Presumed {
	out := []Presumed{}
	for _, p := range m.c.habits.used {
		if m.law.SpeaksOf(p.Component) || p.Component == Process || p.Component == TransOrigin {
			out = append(out, p)
		}
	}
	slices.SortFunc(out, func(a, b Presumed) int {
		return cmp.Or(strings.Compare(a.Rule, b.Rule), strings.Compare(a.Component, b.Component), strings.Compare(a.Ingredient, b.Ingredient))
	})
	return out
}

// covered tells whether the set holds the market's declaration on the date.
func (m *market) covered() bool {
	_, ok := m.law.Declaration()
	return ok
}

// coverage finds a date the set does not cover, and a category it does not know.
func (m *market) coverage() []Finding {
	var out []Finding
	if !m.covered() {
		rules, _ := m.c.book.Rules(m.j)
		says := "the rule set holds no declaration of this market on " + m.law.Date
		if first := rules.First(); first != "" {
			says += "; it begins on " + first
		}
		out = append(out, Finding{Kind: "coverage", Severity: "open", Code: "date-not-covered", Says: says})
	}
	category, stated := m.c.recipe.Category.For(m.j)
	if !stated || len(m.law.ReferenceAmounts.All) == 0 {
		return out
	}
	if _, ok := m.category(category); !ok {
		says := "“" + category + "” is no category of this market"
		if near := suggest(category, m.categories()); near != "" {
			says += "; did you mean “" + near + "”?"
		}
		out = append(out, Finding{Kind: "coverage", Severity: "open", Code: "unknown-category", Pointer: "/category", Says: says})
	}
	return out
}

func (m *market) categories() []string {
	var out []string
	for _, r := range m.law.ReferenceAmounts.All {
		out = append(out, r.Name())
		for _, names := range r.Body.Names {
			out = append(out, names...)
		}
	}
	return out
}

// category finds a reference amount by the last segment of its rule or by one of the law's names, whatever the case.
func (m *market) category(name string) (rulebook.Active[rulebook.ReferenceAmount], bool) {
	if r, ok := m.law.ReferenceAmounts.Get(name); ok {
		return r, true
	}
	for _, r := range m.law.ReferenceAmounts.All {
		for _, names := range r.Body.Names {
			if slices.ContainsFunc(names, func(n string) bool { return strings.EqualFold(n, name) }) {
				return r, true
			}
		}
	}
	return rulebook.Active[rulebook.ReferenceAmount]{}, false
}

// grams is the mass of an amount: as it is, by its stated grams, or by the food's density.
func (m *market) grams(a quantity.Amount, stated *quantity.Amount) (quantity.Ratio, bool) {
	switch {
	case a.Unit.Dimension() == quantity.Mass:
		return a.Ratio(), true
	case stated != nil:
		return stated.Ratio(), true
	case a.Unit.Dimension() != quantity.Volume:
		return quantity.Ratio{}, false
	}
	d, ok := m.c.recipe.Density.For(m.j)
	if !ok {
		return quantity.Ratio{}, false
	}
	return quantity.FromDecimal(a.Base().Mul(d)), true
}

// referenceAmount is the recipe's own, or its category's.
func (m *market) referenceAmount() (recipe.ReferenceAmount, bool) {
	if r, ok := m.c.recipe.ReferenceAmount.For(m.j); ok {
		return r, true
	}
	category, ok := m.c.recipe.Category.For(m.j)
	if !ok {
		return recipe.ReferenceAmount{}, false
	}
	r, ok := m.category(category)
	if !ok {
		return recipe.ReferenceAmount{}, false
	}
	return recipe.ReferenceAmount{Amount: r.Body.Amount}, true
}

// serving is the recipe's serving; without one the reference amount stands in.
func (m *market) serving() (s recipe.Serving, grams *quantity.Amount, ok bool) {
	if s, ok := m.c.recipe.Serving.For(m.j); ok {
		return s, nil, true
	}
	r, ok := m.referenceAmount()
	return recipe.Serving{Amount: r.Amount}, r.Grams, ok
}

func (m *market) liquid() bool {
	s, _ := m.c.recipe.State.For(m.j)
	return s == "liquid"
}
