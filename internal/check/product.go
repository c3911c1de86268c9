package check

import (
	"slices"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

// A product is a batch under one law: it knows that law's quantities. It is a claim.Subject.
type product struct {
	m      *market
	batch  *rollup.Batch
	leaves map[string][]part // quantity -> contribution of each leaf
	totals map[string]quantity.Linear
	meets  map[string]quantity.Truth
	from   map[string]quantity.Linear
	bases  map[string]basis
}

// A part is one leaf's contribution to a quantity.
type part struct {
	amount   quantity.Linear
	complete bool // found by a way whose data are complete
}

func newProduct(m *market, b *rollup.Batch) *product {
	return &product{m: m, batch: b, leaves: make(map[string][]part, 64), totals: make(map[string]quantity.Linear, 96),
		meets: map[string]quantity.Truth{}, from: map[string]quantity.Linear{}, bases: map[string]basis{}}
}

// Mass is the batch's mass in g.
func (p *product) Mass() quantity.Ratio { return p.batch.Mass }

// Quantity is the batch's content of a quantity of the law.
func (p *product) Quantity(name string) (quantity.Linear, bool) {
	if t, ok := p.totals[name]; ok {
		return t, true
	}
	if e, ok := p.m.law.Energy.Get(name); ok {
		return p.energy(name, &e.Body.Methods[0])
	}
	sum, ok := p.sumOfComponents(name)
	if !ok {
		parts, ok := p.parts(name)
		if !ok {
			return quantity.Linear{}, false
		}
		sum = quantity.Sum(len(parts), func(i int) quantity.Linear { return parts[i].amount })
	}
	p.totals[name] = sum
	return sum, true
}

// sumOfComponents is a quantity that its definition sums from components in one way, for all leaves at once.
func (p *product) sumOfComponents(name string) (sum quantity.Linear, ok bool) {
	d, ok := p.m.law.Definitions.Get(name)
	if !ok || len(d.Body.Ways) != 1 || d.Body.Ways[0].Sum == nil {
		return sum, false
	}
	for _, part := range d.Body.Ways[0].Parts() {
		sum = sum.Add(p.batch.Total(part.ID).Mul(part.Factor))
	}
	return sum, true
}

// energy applies a method's factors to exact amounts. name is "" for an alternative method.
func (p *product) energy(name string, m *rulebook.Method) (quantity.Linear, bool) {
	var sum quantity.Linear
	for _, t := range m.Terms() {
		l, ok := p.Quantity(t.Name)
		if !ok {
			return quantity.Linear{}, false
		}
		sum = sum.Add(l.Mul(t.Factor))
	}
	if name != "" {
		p.totals[name] = sum
	}
	return sum, true
}

// parts is what each leaf contributes to a defined quantity.
func (p *product) parts(name string) ([]part, bool) {
	if parts, ok := p.leaves[name]; ok {
		return parts, true
	}
	d, ok := p.m.law.Definitions.Get(name)
	if !ok {
		return nil, false
	}
	key := shared{p.batch, d.Body.Key()}
	if parts, ok := p.m.c.shared[key]; ok && key.definition != "" {
		p.leaves[name] = parts
		return parts, true
	}
	parts := make([]part, len(p.batch.Leaves))
	for i, l := range p.batch.Leaves {
		part, ok := p.resolve(d.Body, l)
		if !ok {
			return nil, false
		}
		parts[i] = part
	}
	p.leaves[name] = parts
	p.m.c.shared[key] = parts
	return parts, true
}

// shared names what all markets with one definition have in common.
type shared struct {
	batch      *rollup.Batch
	definition string
}

// resolve takes the first way whose data are complete for a leaf, else the last with what is missing between its bounds.
func (p *product) resolve(d *rulebook.Definition, l *rollup.Leaf) (part, bool) {
	var out part
	for i := range d.Ways {
		w := &d.Ways[i]
		amount, complete, ok := p.way(d, w, l)
		if !ok {
			return part{}, false
		}
		out = part{amount, complete}
		if complete {
			break
		}
	}
	return out, true
}

func (p *product) way(d *rulebook.Definition, w *rulebook.Way, l *rollup.Leaf) (amount quantity.Linear, complete, ok bool) {
	switch {
	case w.Acids != nil:
		if !l.HasProfile() {
			return quantity.Linear{}, false, true
		}
		amount = acids(w, d, l)
		if !w.Acids.Every {
			amount = besideStated(d, l, amount)
		}
		return amount, true, true
	case w.Sum != nil:
		amount, complete = components(w, l)
		return amount, complete, true
	}
	complete = true
	for _, t := range w.Terms() {
		parts, ok := p.parts(t.Name)
		if !ok {
			return quantity.Linear{}, false, false
		}
		one := parts[l.Index]
		amount = amount.Add(one.amount.Mul(t.Factor))
		complete = complete && one.complete
	}
	return amount, complete, true
}

func components(w *rulebook.Way, l *rollup.Leaf) (sum quantity.Linear, complete bool) {
	complete = true
	for _, part := range w.Parts() {
		a := l.Component(part.ID)
		complete = complete && (a.How != rollup.Bounded || a.Determined())
		sum = sum.Add(a.Mul(part.Factor))
	}
	return sum, complete
}

// acids is what a predicate gives over a complete profile.
func acids(w *rulebook.Way, d *rulebook.Definition, l *rollup.Leaf) quantity.Linear {
	triglyceride := d.ExpressedAs == "triglyceride"
	if w.Acids.Every {
		return l.AllAcids(triglyceride)
	}
	return l.Class(w.Class(), triglyceride)
}

// besideStated holds what a profile gives against a total of the same that somebody stated or practice presumes. A profile that decides by
// itself stands when both agree within 5 %; one that leaves groups open is narrowed by the total; and where the two contradict each other,
// anything from the one to the other is possible.
func besideStated(d *rulebook.Definition, l *rollup.Leaf, profile quantity.Linear) quantity.Linear {
	total, ok := statedTotal(d, l)
	if !ok {
		return profile
	}
	low, high := quantity.Max(profile.Low(), total.Low()), quantity.Min(profile.High(), total.High())
	switch {
	case !apart(profile, total) && profile.Determined():
		return profile
	case low.Cmp(high) <= 0 && !apart(profile, total):
		if low.Cmp(high) == 0 {
			return quantity.Exactly(low)
		}
	default:
		low, high = quantity.Min(profile.Low(), total.Low()), quantity.Max(profile.High(), total.High())
	}
	mid, typical := total.Central()
	typical = typical && mid.Cmp(low) >= 0 && mid.Cmp(high) <= 0
	return quantity.Of(l.Variable(d.Name.In("en"), low, high, mid, typical))
}

// statedTotal is the first way of a definition that takes one component as the quantity, where the component is known.
func statedTotal(d *rulebook.Definition, l *rollup.Leaf) (quantity.Linear, bool) {
	for i := range d.Ways {
		w := &d.Ways[i]
		if len(w.Parts()) != 1 {
			continue
		}
		part := w.Parts()[0]
		a := l.Component(part.ID)
		if l.Knows(part.ID) || a.How == rollup.ByNature || a.How == rollup.ByPractice {
			return a.Mul(part.Factor), true
		}
	}
	return quantity.Linear{}, false
}

// From is the part of a quantity that comes from an origin: ruminant fat, or anything else.
func (p *product) From(name, origin string) (quantity.Linear, bool) {
	key := name + "\x00" + origin
	if t, ok := p.from[key]; ok {
		return t, true
	}
	parts, ok := p.parts(name)
	if !ok {
		return quantity.Linear{}, false
	}
	sum := quantity.Sum(len(parts), func(i int) quantity.Linear { return p.originShare(parts[i].amount, p.batch.Leaves[i], origin) })
	p.from[key] = sum
	return sum, true
}

func (p *product) originShare(amount quantity.Linear, l *rollup.Leaf, origin string) quantity.Linear {
	if amount.High().Sign() <= 0 {
		return quantity.Linear{}
	}
	ruminant, known := p.ruminant(l)
	share := ruminant
	if origin != "ruminant" {
		share = quantity.FromInt(1).Sub(ruminant)
	}
	if known {
		return amount.Mul(share)
	}
	return quantity.Of(l.Variable("origin of trans fatty acids", quantity.Ratio{}, amount.High(), quantity.Ratio{}, false))
}

var industrialProcesses = []string{"refined", "partially hydrogenated", "fully hydrogenated", "hydrogenated"}

// ruminant is the share of a leaf's trans fatty acids that comes from ruminants.
func (p *product) ruminant(l *rollup.Leaf) (quantity.Ratio, bool) {
	if l.Ingredient == nil {
		return quantity.Ratio{}, true
	}
	if shares := l.Ingredient.TransOrigin; len(shares) > 0 {
		var r quantity.Ratio
		for _, s := range shares {
			if s.Origin == "ruminant" {
				r = r.Add(quantity.FromDecimal(s.Share.Shift(-2)))
			}
		}
		return r, true
	}
	if f, ok := p.m.c.recipe.Facts["trans origin"]; ok {
		return quantity.FromInt(map[bool]int64{true: 1}[f.Text == "ruminant"]), true
	}
	switch p.m.c.habits.origin(l) {
	case "ruminant":
		return quantity.FromInt(1), true
	case "industrial":
		return quantity.Ratio{}, true
	}
	if slices.Contains(industrialProcesses, l.Ingredient.Process) {
		return quantity.Ratio{}, true
	}
	return quantity.Ratio{}, false
}

// Basis is the mass in g of a basis.
func (p *product) Basis(per rulebook.Per) (quantity.Ratio, bool) {
	if per.Name == "" {
		if g, ok := per.Grams(); ok {
			return g, true
		}
		return p.m.grams(per.Amount, nil)
	}
	b, ok := p.bases[per.Name]
	if !ok {
		b.grams, b.known = p.named(per)
		p.bases[per.Name] = b
	}
	return b.grams, b.known
}

// basis is the mass of a named basis, where it is known.
type basis struct {
	grams quantity.Ratio
	known bool
}

func (p *product) named(per rulebook.Per) (quantity.Ratio, bool) {
	switch per.Name {
	case "serving":
		s, grams, ok := p.m.serving()
		if !ok {
			return quantity.Ratio{}, false
		}
		return p.m.grams(s.Amount, grams)
	case "reference amount":
		r, ok := p.m.referenceAmount()
		if !ok {
			return quantity.Ratio{}, false
		}
		return p.m.grams(r.Amount, r.Grams)
	case "package":
		if p.m.c.recipe.Package == nil || p.m.c.recipe.Package.Net == nil {
			return quantity.Ratio{}, false
		}
		return p.m.grams(*p.m.c.recipe.Package.Net, nil)
	case "unit":
		net, ok := p.Basis(rulebook.Per{Name: "package"})
		if !ok || !p.m.c.recipe.Package.Units.IsPositive() {
			return quantity.Ratio{}, false
		}
		return net.Quo(quantity.FromDecimal(p.m.c.recipe.Package.Units)), true
	case "daily intake":
		return p.dailyIntake()
	}
	return quantity.Ratio{}, false
}

// dailyIntake is what the law takes for a day's intake: as the recipe states it, as the category tells, else the reference amount.
func (p *product) dailyIntake() (quantity.Ratio, bool) {
	if f, ok := p.m.c.recipe.Facts["reasonable daily intake"]; ok && f.Number != nil {
		return f.Number.Ratio(), true
	}
	if name, ok := p.m.c.recipe.Category.For(p.m.j); ok {
		if c, ok := p.m.category(name); ok && c.Body.Daily != nil {
			return p.m.grams(*c.Body.Daily, nil)
		}
	}
	return p.Basis(rulebook.Per{Name: "reference amount"})
}

// Meets answers whether the food meets the condition of a claim of the law.
func (p *product) Meets(id string) quantity.Truth {
	if t, ok := p.meets[id]; ok {
		return t
	}
	t := quantity.Open // a claim that is undecided or not in force on the date decides nothing
	c, ok := p.m.claim(id)
	switch {
	case ok && c.Body.Prohibited:
		t = quantity.No
	case ok && c.Body.Condition != nil:
		t = p.m.as(p).truth(c.Body.Condition)
	}
	p.meets[id] = t
	return t
}

// reference builds the subject of a reference food; false when there is none of that name.
func (m *market) reference(name string) (*product, bool) {
	if r, ok := m.refs[name]; ok {
		return r, true
	}
	b, ok := m.c.refs[name]
	if !ok {
		return nil, false
	}
	r := newProduct(m, b)
	m.refs[name] = r
	return r, true
}
