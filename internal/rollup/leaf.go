package rollup

import (
	"fmt"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// leaf opens one ingredient's source.
func (b *Batch) leaf(in *recipe.Ingredient, mass quantity.Ratio, path string) (*Leaf, *Fault) {
	l := &Leaf{Path: path, Pointer: in.Pointer, Name: in.Name, Ingredient: in, Mass: mass, batch: b}
	switch {
	case in.Food != "":
		f, err := food.Find(in.Food)
		if strings.HasPrefix(in.Food, "own:") {
			return nil, &Fault{in.Pointer + "/food", "own-food", in.Food + " is an ingredient of the maker's own, which only a re-check over a store of recipes can look up"}
		}
		if err != nil {
			return nil, &Fault{in.Pointer + "/food", "unknown-food", err.Error()}
		}
		l.Food, l.IsFood = f, true
		if l.Name == "" {
			l.Name = f.Name()
		}
		l.entries = make([]stated, 0, f.Values()+len(in.With))
		f.Each(func(id food.ID, v food.Value) bool {
			l.set(id, stated{value: quantity.Scaled(v.Mantissa, int32(v.Exponent)+exponent(id))})
			return true
		})
	case in.Label != nil:
		values, fault := b.options.Label(in.Label)
		if fault != nil {
			fault.Pointer = in.Pointer + fault.Pointer
			return nil, fault
		}
		for id, r := range values {
			l.set(id, stated{ends: &ends{low: r.Low, high: r.High}})
		}
	case in.Composition != nil:
		per, fault := l.statedPer(in)
		if fault != nil {
			return nil, fault
		}
		l.per = quantity.FromInt(100).Quo(per).Reduced()
		l.setPer(in.Composition.Components, l.per)
		fault = l.weigh()
		if fault != nil {
			return nil, fault
		}
	}
	l.setPer(in.With, quantity.FromInt(1))
	return l, l.tooMuch()
}

// tooMuch refuses more than 100 g of one component in 100 g; half a gram is left to rounding.
func (l *Leaf) tooMuch() *Fault {
	for id, ok := l.known.Next(0); ok; id, ok = l.known.Next(id) {
		_, mass := id.Unit().GramExponent()
		if low := l.entries[l.place[id]-1].low(); mass && low.Cmp(quantity.Scaled(1005, -1)) > 0 {
			return &Fault{l.Pointer, "over-100", fmt.Sprintf("%s is %s g in 100 g of %s", id.Tag(), low.Brief(2), l.Path)}
		}
	}
	return nil
}

// exponent is the power of ten from a component's unit to the base unit.
func exponent(id food.ID) int32 {
	e, _ := id.Unit().GramExponent()
	return int32(e)
}

func (l *Leaf) set(id food.ID, s stated) {
	if l.known.Has(id) {
		l.entries[l.place[id]-1] = s
		return
	}
	l.entries = append(l.entries, s)
	l.place[id] = uint16(len(l.entries))
	l.known.Add(id)
}

// statedPer is the mass in grams that a specification's values are per.
func (l *Leaf) statedPer(in *recipe.Ingredient) (quantity.Ratio, *Fault) {
	if in.Composition.Per.IsZero() {
		return quantity.FromInt(100), nil
	}
	g, fault := grams(&recipe.Ingredient{Pointer: in.Pointer + "/composition", Amount: in.Composition.Per, Density: in.Density})
	if fault != nil {
		fault.Pointer = in.Pointer + "/composition/per"
	}
	return g, fault
}

// setPer sets values that make so many times themselves in 100 g.
func (l *Leaf) setPer(values map[string]recipe.Value, factor quantity.Ratio) {
	for tag, v := range values {
		c, ok := food.Lookup(tag)
		if !ok {
			continue // decoding refuses unknown components
		}
		l.set(c.ID, scaled(v, factor))
	}
}

func scaled(v recipe.Value, factor quantity.Ratio) stated {
	base := func(d decimal.Decimal) quantity.Ratio { return factor.Times(d.Mul(v.Unit.Scale())) }
	if v.Low.Equal(v.High) {
		return stated{value: base(v.Low)}
	}
	return stated{value: base(v.Central), ends: &ends{base(v.Low), base(v.High), v.Typical}}
}

// Knows tells whether somebody stated the component for this leaf.
func (l *Leaf) Knows(id food.ID) bool { return l.pure != 0 || l.known.Has(id) }

// Component is the leaf's content of a component in the batch, in base units, after retention.
func (l *Leaf) Component(id food.ID) Amount {
	if l.pure != 0 {
		if id == l.pure {
			return Amount{Linear: quantity.Exactly(l.Mass)}
		}
		return Amount{}
	}
	if at := l.asked[id]; at != 0 {
		return l.answers[at-1]
	}
	if l.answers == nil {
		l.answers = make([]Amount, 0, 112) // about what three markets ask
	}
	a := l.component(id)
	l.answers = append(l.answers, a)
	l.asked[id] = uint16(len(l.answers))
	return a
}

// forget drops what was computed, because the leaf's share has changed.
func (l *Leaf) forget() {
	l.asked, l.answers, l.acids = [food.Count + 1]uint16{}, nil, nil
}

func (l *Leaf) component(id food.ID) Amount {
	if a, ok := l.folateEquivalents(id); ok {
		return a
	}
	if a, ok := l.byStructure(id); ok {
		return a
	}
	if l.known.Has(id) {
		s := l.entries[l.place[id]-1]
		return Amount{Linear: l.kept(id, l.scale(id, s)), How: Stated}
	}
	if l.byNature(id) {
		return Amount{How: ByNature}
	}
	if l.batch.options.Presume != nil {
		if p, ok := l.batch.options.Presume(l, id); ok {
			return l.presumed(id, p)
		}
	}
	high := l.bound(id)
	if high.Sign() <= 0 {
		return Amount{How: Bounded}
	}
	return Amount{Linear: quantity.Of(l.Variable(id.Tag(), quantity.Ratio{}, high, quantity.Ratio{}, false)), How: Bounded}
}

// scale brings a value per 100 g to the leaf's share of the batch.
func (l *Leaf) scale(id food.ID, s stated) quantity.Linear {
	if s.ends == nil {
		return quantity.Exactly(l.share(s.value))
	}
	return quantity.Of(l.Variable(id.Tag(), l.share(s.ends.low), l.share(s.ends.high), l.share(s.value), s.ends.typical))
}

func (l *Leaf) share(per100 quantity.Ratio) quantity.Ratio {
	return l.Mass.Mul(per100).Mul(quantity.Scaled(1, -2))
}

func (l *Leaf) presumed(id food.ID, p Presumed) Amount {
	a := Amount{How: ByPractice}
	if p.Of == 0 {
		return a
	}
	of := l.Component(p.Of).Linear.Mul(p.Share)
	a.Linear = of
	if p.Upto {
		high := of.High()
		a.Linear = quantity.Linear{}
		if high.Sign() > 0 {
			a.Linear = quantity.Of(l.Variable(id.Tag(), quantity.Ratio{}, high, quantity.Ratio{}, false))
		}
	}
	return a
}

func (l *Leaf) byNature(id food.ID) bool {
	for _, n := range l.Ingredient.ZeroByNature {
		if c, ok := food.Lookup(n.Component); ok && (c.ID == id || id.IsWithin(c.ID)) {
			return true
		}
	}
	return false
}

// bound is the most there can be of a component nobody stated: what each whole it is part of leaves after the known parts
// beside it.
func (l *Leaf) bound(id food.ID) quantity.Ratio {
	best, any := quantity.Ratio{}, false
	for _, whole := range id.WithinList() {
		r := l.remainder(id, whole, l.Component(whole).High())
		if !any || r.Cmp(best) < 0 {
			best, any = r, true
		}
	}
	if !any {
		best = l.remainder(id, 0, l.Mass.Mul(quantity.FromInt(mostPerGram(id))))
	}
	return best
}

// mostPerGram is the most that 1 g can hold, in the component's base unit: fat yields the most energy of all food, and
// 1 IU of vitamin D, the smallest, is 0.025 µg.
func mostPerGram(id food.ID) int64 {
	switch id.Unit() {
	case food.Kilocalorie:
		return 10
	case food.Kilojoule:
		return 40
	case food.InternationalUnit:
		return 40_000_000
	}
	return 1
}

func (l *Leaf) remainder(id, whole food.ID, most quantity.Ratio) quantity.Ratio {
	set := food.Beside(id, whole, l.known)
	for beside, ok := set.Next(0); ok; beside, ok = set.Next(beside) {
		most = most.Sub(l.Component(beside).Low())
	}
	return quantity.Max(most, quantity.Ratio{})
}
