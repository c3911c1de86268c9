package claim

import (
	"strings"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A Comparison is a decided comparison with its numbers, in Unit.
type Comparison struct {
	Says      string
	Relation  rulebook.Relation
	Threshold quantity.Ratio
	Unit      quantity.Unit
	Low, High quantity.Ratio
	Exact     quantity.Ratio
	Known     bool // Exact is set: the value is determined, or all uncertain parts have a typical value
	Null      bool // no value: the denominator is zero
	Endless   bool // no upper end: the denominator may be zero
	Headroom  quantity.Ratio
	Variables []*quantity.Variable // what it still depends on
}

// side is a numerator over a denominator; the value is num·scale/den. The scale, above zero, is kept apart so that forms of many
// uncertain parts need not be multiplied out.
type side struct {
	num     quantity.Linear
	scale   quantity.Ratio
	den     quantity.Linear
	missing string
}

// compare decides a comparison on every basis it names.
func (x evaluator) compare(c *rulebook.Condition) Result {
	switch bases := c.Bases(); len(bases) {
	case 0:
		return x.compareOn(c, "", rulebook.Per{})
	case 1:
		return x.compareOn(c, c.Per[0], bases[0])
	}
	r := Result{Op: rulebook.OpAll, Truth: quantity.Yes}
	for i, per := range c.Bases() {
		part := x.compareOn(c, c.Per[i], per)
		r.Parts = append(r.Parts, part)
		r.Truth = quantity.All(r.Truth, part.Truth)
	}
	return r
}

func (x evaluator) compareOn(c *rulebook.Condition, name string, per rulebook.Per) Result {
	cmp := &Comparison{Says: compareSays(c, name, x), Relation: c.Relation, Unit: c.Threshold.Unit, Threshold: quantity.FromDecimal(c.Threshold.Value)}
	subject, missing := x.subject(c)
	if missing != "" {
		return Result{Says: cmp.Says, Missing: missing}
	}
	s := measure(c, per, subject, c.Subject == "", x.Context)
	switch {
	case s.missing != "":
		return Result{Says: cmp.Says, Missing: s.missing}
	case c.Relation.Relative():
		return x.relative(c, per, s, cmp)
	}
	return Result{Truth: decideSides(c.Relation, s, c.Limit(), cmp), Says: cmp.Says, Compare: cmp}
}

// subject is the food a comparison measures.
func (x evaluator) subject(c *rulebook.Condition) (food Subject, missing string) {
	if c.Subject != "reference food" {
		return x.Product(), ""
	}
	ref, ok := x.Reference()
	if !ok {
		return nil, "the reference food"
	}
	return ref, ""
}

// measure builds the two sides for one food, the product or another: the value is num/den in base units of the threshold.
func measure(c *rulebook.Condition, per rulebook.Per, s Subject, product bool, x Context) side {
	num, missing := weighted(c, s, x)
	if missing == "" && len(c.Times) > 0 {
		num, missing = times(num, c.Times, product, x)
	}
	if missing != "" {
		return side{missing: missing}
	}
	out := side{num: num, scale: quantity.FromInt(1), den: quantity.Exactly(s.Mass())}
	switch c.As {
	case "share of energy", "share of energy in kJ":
		return share(num, s, energyOf(c))
	case "share of fatty acids":
		return share(num, s, "fatty-acids")
	case "share of fat":
		return share(num, s, "fat")
	case "share of reference value":
		v, ok := x.ReferenceValue(first(c))
		if !ok {
			return side{missing: "a reference value of " + x.Name(first(c))}
		}
		out.scale = quantity.FromInt(100)
		out.den = quantity.Exactly(s.Mass().Mul(v))
	}
	return out.per(per, s)
}

// energyOf is the energy a share is of: that in kcal, unless the condition asks for kJ.
func energyOf(c *rulebook.Condition) string {
	if c.As == "share of energy in kJ" {
		return "energy-kj"
	}
	return "energy"
}

func share(num quantity.Linear, s Subject, of string) side {
	den, ok := s.Quantity(of)
	if !ok {
		return side{missing: "the quantity " + of}
	}
	return side{num: num, scale: quantity.FromInt(100), den: den}
}

// per brings a side to its basis.
func (s side) per(p rulebook.Per, food Subject) side {
	if p == (rulebook.Per{}) {
		return s
	}
	amount := p.Base()
	of := p.Quantity
	switch p.Amount.Unit.Dimension() {
	case quantity.EnergyKcal:
		of = "energy"
	case quantity.EnergyKJ:
		of = "energy-kj"
	}
	if of != "" {
		den, ok := food.Quantity(of)
		if !ok {
			return side{missing: "the quantity " + of}
		}
		return side{num: s.num, scale: s.scale.Mul(amount), den: den}
	}
	g, ok := food.Basis(p)
	if !ok {
		return side{missing: "the " + basisName(p)}
	}
	s.scale = s.scale.Mul(g)
	return s
}

func first(c *rulebook.Condition) string { return c.Terms()[0].Name }

// weighted is the linear form of the condition over a food's quantities; for a share of energy each quantity counts with
// its energy factor.
func weighted(c *rulebook.Condition, s Subject, x Context) (quantity.Linear, string) {
	var sum quantity.Linear
	for _, t := range c.Terms() {
		name := t.Name
		q, ok := s.Quantity(name)
		if c.Origin != "" {
			q, ok = s.From(name, c.Origin)
		}
		if !ok {
			return sum, "the quantity " + name
		}
		k := t.Factor
		if strings.HasPrefix(c.As, "share of energy") {
			f, ok := x.EnergyFactor(name, energyOf(c))
			if !ok {
				return sum, "an energy factor of " + x.Name(name)
			}
			k = k.Mul(f)
		}
		sum = sum.Add(q.Mul(k))
	}
	return sum, ""
}

// times weighs the product's form by a measured fact. Of another food nobody states facts.
func times(num quantity.Linear, list rulebook.Times, product bool, x Context) (quantity.Linear, string) {
	if !product {
		return num, "the fact “" + list[0].Fact + "”"
	}
	f, missing := Weigh(list, x)
	return num.Mul(f), missing
}

// Weigh is the factor that measured facts give: that of the first that is stated, of those whose condition holds. What is missing is the
// fact that would settle it.
func Weigh(list rulebook.Times, x Context) (f quantity.Ratio, missing string) {
	for i := range list {
		w := &list[i]
		applies := Decide(w.If, x)
		if applies == quantity.No {
			continue
		}
		value, ok := x.Measured(w.Fact)
		if ok && applies == quantity.Yes {
			return w.Of(value), ""
		}
		if missing == "" {
			missing = "the fact “" + w.Fact + "”"
		}
		if applies == quantity.Open {
			break // which of the facts counts is not known
		}
	}
	if missing == "" {
		missing = "a fact that weighs it"
	}
	return f, missing
}

// decideSides decides num relation T·den, and fills the comparison's numbers.
func decideSides(rel rulebook.Relation, s side, t quantity.Ratio, cmp *Comparison) quantity.Truth {
	zero := s.den.High().Sign() <= 0
	if cmp != nil {
		cmp.Variables, cmp.Null = quantity.Merge(s.num.Variables(), s.den.Variables()), zero
		cmp.numbers(s)
	}
	if zero {
		if rel == rulebook.AtMost || rel == rulebook.Below {
			return sign(rulebook.AtMost, s.num)
		}
		return quantity.No
	}
	truth := s.against(rel, t)
	if s.den.Low().Sign() > 0 {
		return truth
	}
	switch rel { // with nothing to be a share of, it may be the other way round
	case rulebook.AtLeast, rulebook.Above:
		if truth == quantity.Yes {
			return quantity.Open
		}
	case rulebook.Below:
		if truth == quantity.No && s.against(rulebook.AtMost, t) != quantity.No {
			return quantity.Open
		}
	}
	return truth
}

// against decides num·scale relation t·den. With an exact denominator the ends of the numerator suffice; else what is uncertain in
// both must cancel first.
func (s side) against(rel rulebook.Relation, t quantity.Ratio) quantity.Truth {
	if s.den.Determined() {
		limit := s.den.Known.Mul(t)
		return between(rel, s.num.Low().Mul(s.scale).Cmp(limit), s.num.High().Mul(s.scale).Cmp(limit))
	}
	return sign(rel, s.num.Mul(s.scale).Sub(s.den.Mul(t)))
}

// sign decides f relation 0.
func sign(rel rulebook.Relation, f quantity.Linear) quantity.Truth {
	return between(rel, f.Low().Sign(), f.High().Sign())
}

// between decides from the signs of both ends.
func between(rel rulebook.Relation, low, high int) quantity.Truth {
	var always, never bool
	switch rel {
	case rulebook.AtMost:
		always, never = high <= 0, low > 0
	case rulebook.Below:
		always, never = high < 0, low >= 0
	case rulebook.AtLeast:
		always, never = low >= 0, high < 0
	default:
		always, never = low > 0, high <= 0
	}
	switch {
	case always:
		return quantity.Yes
	case never:
		return quantity.No
	}
	return quantity.Open
}

// numbers computes what people read: value, ends and headroom in the unit of the threshold.
func (c *Comparison) numbers(s side) {
	if c.Null {
		return
	}
	unit := quantity.Scaled(1, -c.Unit.Scale().Exponent())
	scale := s.scale.Mul(unit)
	quo := func(a, b quantity.Ratio) quantity.Ratio { return a.Mul(scale).Quo(b) }
	if high := s.den.High(); high.Sign() > 0 {
		c.Low = quantity.Max(quo(s.num.Low(), high), quantity.Ratio{})
	}
	if low := s.den.Low(); low.Sign() > 0 {
		c.High = quo(s.num.High(), low)
	} else {
		c.Endless = true
	}
	num, ok1 := s.num.Central()
	den, ok2 := s.den.Central()
	if c.Known = ok1 && ok2 && den.Sign() > 0; c.Known {
		c.Exact = quo(num, den)
		c.Headroom = headroom(c.Relation, c.Exact, c.Threshold)
	}
}

// headroom is how far a value is inside its threshold; negative is outside.
func headroom(rel rulebook.Relation, value, threshold quantity.Ratio) quantity.Ratio {
	switch rel {
	case rulebook.AtMost, rulebook.Below, rulebook.NotMore:
		return threshold.Sub(value)
	}
	return value.Sub(threshold)
}
