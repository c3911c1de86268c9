package check

import (
	"cmp"
	"slices"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/claim"
	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

// A view is the market seen with one food as the product of a condition, and one as its reference food. It is a
// claim.Context.
type view struct {
	*market
	subject *product
	ref     *product
	against string          // name of ref
	judged  *rulebook.Claim // whose subjects count; nil where those of all that stand do
}

func (m *market) as(p *product) *view { return &view{market: m, subject: p} }

// judging is the view in which the subjects of one claim count.
func (v *view) judging(b *rulebook.Claim) *view {
	own := *v
	own.judged = b
	return &own
}

// truth decides a condition. What depends on the product alone is decided once.
func (v *view) truth(c *rulebook.Condition) quantity.Truth {
	if !c.OfProduct() || v.subject != v.product {
		return claim.Decide(c, v)
	}
	t, ok := v.truths[c]
	if !ok {
		t = claim.Decide(c, v)
		v.truths[c] = t
	}
	return t
}

// Product is the food the condition speaks of.
func (v *view) Product() claim.Subject { return v.subject }

// Reference is the food it is compared with.
func (v *view) Reference() (claim.Subject, bool) { return v.ref, v.ref != nil }

// Name is a quantity in words.
func (v *view) Name(q string) string {
	if d, ok := v.law.Definitions.Get(q); ok {
		return d.Body.Name.In("en")
	}
	if e, ok := v.law.Energy.Get(q); ok {
		return e.Body.Name.In("en")
	}
	return strings.ReplaceAll(q, "-", " ")
}

// EnergyFactor is kcal or kJ per g of a quantity: its own, or that of the quantity it counts as.
func (v *view) EnergyFactor(q, energy string) (quantity.Ratio, bool) {
	e, ok := v.law.Energy.Get(energy)
	if !ok {
		return quantity.Ratio{}, false
	}
	factors := e.Body.Methods[0].Factors
	if f, ok := factors[q]; ok {
		return quantity.FromDecimal(f), true
	}
	d, ok := v.law.Definitions.Get(q)
	if !ok {
		return quantity.Ratio{}, false
	}
	f, ok := factors[d.Body.EnergyAs]
	return quantity.FromDecimal(f), ok
}

const everybody = "general population"

// population is for whom the food is made, as a reference value names it: a wider population where it has no amount for a narrower one.
func (m *market) population(r *rulebook.Reference) string {
	if m.eaters == "" {
		m.eaters = cmp.Or(m.c.recipe.Facts["intended for"].Text, everybody)
	}
	if _, ok := r.Amounts[m.eaters]; !ok {
		return cmp.Or(recipe.WiderFact("intended for", m.eaters), m.eaters)
	}
	return m.eaters
}

// ReferenceValue is the reference value of a quantity in base units.
func (v *view) ReferenceValue(q string) (quantity.Ratio, bool) {
	r, ok := v.law.ReferenceOf(q)
	if !ok {
		return quantity.Ratio{}, false
	}
	return r.Body.Amount(v.population(r.Body))
}

// stated compares a fact the recipe states.
func (m *market) stated(name, is string) quantity.Truth {
	f, ok := m.c.recipe.Facts[name]
	if !ok {
		return quantity.Open
	}
	if f.Text != "" {
		return quantity.TruthOf(f.Text == is || recipe.WiderFact(name, f.Text) == is)
	}
	if f.Flag == quantity.Open {
		return quantity.Open
	}
	return quantity.TruthOf((f.Flag == quantity.Yes) == (is == "yes"))
}

// Fact compares a fact: as stated, else as the market's rules assume, which is noted.
func (v *view) Fact(name, is string) quantity.Truth {
	if name == "state" {
		if s, ok := v.c.recipe.State.For(v.j); ok {
			return quantity.TruthOf(s == is)
		}
	} else if t := v.stated(name, is); t != quantity.Open {
		return t
	}
	if a, ok := v.assume(name); ok {
		return quantity.TruthOf(a == is)
	}
	return quantity.Open
}

// Has asks what a list holds: as stated, else as the market's rules assume of the whole list, which is noted.
func (v *view) Has(name, item string) quantity.Truth {
	if f, ok := v.c.recipe.Facts[name]; ok {
		return quantity.TruthOf(slices.Contains(f.List, item))
	}
	if a, ok := v.assume(name); ok {
		return quantity.TruthOf(a == item)
	}
	return quantity.Open
}

// Stated tells whether the recipe states a fact.
func (v *view) Stated(name string) bool {
	_, ok := v.c.recipe.Facts[name]
	return ok
}

// Measured is a fact that is an amount: as stated, else as the market's rules assume, which is noted. What a recipe
// states was measured of the product, not of another food.
func (v *view) Measured(name string) (quantity.Ratio, bool) {
	product := v.subject == nil || v.subject == v.product
	if f, ok := v.c.recipe.Facts[name]; ok && f.Number != nil && product {
		return f.Number.Ratio(), true
	}
	a, ok := v.assume(name)
	if !ok {
		return quantity.Ratio{}, false
	}
	amount, err := quantity.ParseAmount(a)
	return amount.Ratio(), err == nil
}

// assume is what the market's rules take for a fact nobody stated.
func (v *view) assume(name string) (is string, ok bool) {
	for _, a := range v.law.Market.Assumed {
		if a.Fact == name {
			v.assumed[name] = Assumed{a.Fact, a.Is, a.Why}
			return a.Is, true
		}
	}
	return "", false
}

// ReferenceAmount tells whether the reference amount is at most one of the amounts in its own kind of unit.
func (v *view) ReferenceAmount(atMost []quantity.Amount) quantity.Truth {
	r, ok := v.referenceAmount()
	if !ok {
		return quantity.Open
	}
	for _, a := range atMost {
		if a.Unit.Dimension() == r.Amount.Unit.Dimension() && !r.Amount.Base().GreaterThan(a.Base()) {
			return quantity.Yes
		}
	}
	return quantity.No
}

// ClaimedAbout tells whether a claim that stands is about one of the subjects; where one claim is judged, whether it is.
func (v *view) ClaimedAbout(subjects []string, onLabel bool) quantity.Truth {
	if v.judged != nil && !onLabel {
		own := v.judged.About
		return quantity.TruthOf(slices.ContainsFunc(subjects, func(s string) bool { return slices.Contains(own, s) || s == "any" && len(own) > 0 }))
	}
	return quantity.TruthOf(slices.ContainsFunc(subjects, func(s string) bool { return v.about[s] || s == "any" && len(v.about) > 0 }))
}

// Meets answers whether the food meets a claim of the law, one that compares beside the reference food asked with the claim judged.
func (v *view) Meets(id string) quantity.Truth {
	if v.ref != nil {
		if c, ok := v.claim(id); ok && c.Body.Against && c.Body.Condition != nil {
			return v.truth(c.Body.Condition)
		}
	}
	return v.subject.Meets(id)
}

// claim finds a claim by its identifier.
func (m *market) claim(id string) (rulebook.Active[rulebook.Claim], bool) {
	c, ok := m.law.Claims.Get(rulebook.Name(id))
	if !ok || c.ID != id {
		c, ok = m.law.HealthClaims.Get(rulebook.Name(id))
	}
	return c, ok
}

// Named is the active version of a condition that has a rule of its own.
func (v *view) Named(id string) (*rulebook.Condition, bool) {
	c, ok := v.law.Conditions.Get(rulebook.Name(id))
	if !ok {
		return nil, false
	}
	return c.Body.Condition, true
}

// Size is the mass in g of the package, of the serving, or of one of the package's units, or the package's surface in cm².
func (v *view) Size(name string) (quantity.Ratio, bool) {
	if name == "surface" {
		p := v.c.recipe.Package
		if p == nil || !p.Surface.IsPositive() {
			return quantity.Ratio{}, false
		}
		return quantity.FromDecimal(p.Surface), true
	}
	if name == "serving" {
		if _, stated := v.c.recipe.Serving.For(v.j); !stated {
			return quantity.Ratio{}, false
		}
		return v.subject.Basis(rulebook.Per{Name: "serving"})
	}
	return v.subject.Basis(rulebook.Per{Name: name})
}

// ReferenceKind tells whether the reference food is of one of the kinds.
func (v *view) ReferenceKind(kinds []string) quantity.Truth {
	if v.ref == nil {
		return quantity.Open
	}
	return quantity.TruthOf(slices.Contains(kinds, v.c.recipe.References[v.against].Kind))
}

// Category tells whether the recipe's category in this market is one of the names.
func (v *view) Category(names []string) quantity.Truth {
	category, stated := v.c.recipe.Category.For(v.j)
	r, ok := v.category(category)
	if !stated || !ok {
		return quantity.Open
	}
	return quantity.TruthOf(slices.Contains(names, r.Name()))
}

// NoIngredient holds when no ingredient has one of the processes and, where asked, an iodine value above the limit. What is missing is the
// process or the iodine value of the ingredients that leave it open.
func (v *view) NoIngredient(c *rulebook.Condition) (t quantity.Truth, missing string) {
	found := quantity.No
	var open []string
	for _, l := range v.subject.batch.Leaves {
		if l.Ingredient == nil {
			continue
		}
		one := v.processed(c, l)
		if one == quantity.Open {
			open = append(open, l.Path)
		}
		found = quantity.Any(found, one)
	}
	if found == quantity.Open {
		what := "the process of "
		if c.IodineAbove != nil {
			what = "the process or the iodine value of "
		}
		missing = what + joined(open, "en", "and")
	}
	return found.Not(), missing
}

// processed is open for an ingredient whose process nobody knows and that may hold industrial trans fatty acids.
func (v *view) processed(c *rulebook.Condition, l *rollup.Leaf) quantity.Truth {
	if v.process(l) == "" && v.mayBeHydrogenated(l) {
		if c.IodineAbove != nil && iodineAbove(l, *c.IodineAbove) == quantity.No {
			return quantity.No
		}
		return quantity.Open
	}
	return v.matches(&rulebook.IngredientTest{Process: c.Process, IodineAbove: c.IodineAbove}, l)
}

// process is what was done to an ingredient's fat: stated, or what practice knows; empty where neither is.
func (m *market) process(l *rollup.Leaf) string {
	if l.Ingredient.Process != "" {
		return l.Ingredient.Process
	}
	return m.c.habits.process(l)
}

func (m *market) mayBeHydrogenated(l *rollup.Leaf) bool {
	return m.product.originShare(l.Component(food.TransFat).Linear, l, "industrial").High().Sign() > 0
}

// matches tells whether an ingredient has one of the processes and an iodine value on the side asked for.
func (m *market) matches(t *rulebook.IngredientTest, l *rollup.Leaf) quantity.Truth {
	if !slices.Contains(t.Process, m.process(l)) {
		return quantity.No
	}
	out := quantity.Yes
	if t.IodineAbove != nil {
		out = quantity.All(out, iodineAbove(l, *t.IodineAbove))
	}
	if t.IodineUpTo != nil {
		out = quantity.All(out, iodineAbove(l, *t.IodineUpTo).Not())
	}
	return out
}

func iodineAbove(l *rollup.Leaf, limit decimal.Decimal) quantity.Truth {
	low, high, ok := iodineValue(l)
	switch {
	case !ok:
		return quantity.Open
	case low.CmpDecimal(limit) > 0:
		return quantity.Yes
	case high.CmpDecimal(limit) <= 0:
		return quantity.No
	}
	return quantity.Open
}

// Declared compares what a line prints on the first basis with "0", or asks whether the line stands.
func (v *view) Declared(q, is string) quantity.Truth {
	if is == "" {
		l, ok := v.lines[q]
		return quantity.TruthOf(ok && v.stands(l))
	}
	p := v.possible(q)
	want, err := decimal.NewFromString(is)
	if err != nil || len(p) == 0 {
		return quantity.Open
	}
	all, none := true, true
	for _, o := range p {
		same := !o.LessThan && o.Value.Equal(want)
		all, none = all && same, none && !same
	}
	switch {
	case all:
		return quantity.Yes
	case none:
		return quantity.No
	}
	return quantity.Open
}
