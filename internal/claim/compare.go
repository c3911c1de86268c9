package claim

import (
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
	Headroom  quantity.Ratio
	Variables []*quantity.Variable // what it still depends on
}

// side is a numerator over a denominator; the value is num·scale/den.
type side struct {
	num, den quantity.Linear
	missing  string
}

// compare decides a comparison on every basis it names.
func (x evaluator) compare(c *rulebook.Condition) Result {
	if len(c.Per) == 0 {
		return x.compareOn(c, "", rulebook.Per{})
	}
	bases := c.Bases()
	if len(bases) == 1 {
		return x.compareOn(c, c.Per[0], bases[0])
	}
	parts := make([]Result, len(bases))
	truths := make([]quantity.Truth, len(bases))
	for i, per := range bases {
		parts[i] = x.compareOn(c, c.Per[i], per)
		truths[i] = parts[i].Truth
		if !x.explain && truths[i] == quantity.No {
			return parts[i]
		}
	}
	return Result{Truth: quantity.All(truths...), Op: rulebook.OpAll, Parts: parts}
}

func (x evaluator) compareOn(c *rulebook.Condition, name string, per rulebook.Per) Result {
	says := ""
	if x.explain {
		says = compareSays(c, name, x)
	}
	subject := x.Product()
	if c.Subject == "reference food" {
		ref, ok := x.Reference()
		if !ok {
			return Result{Says: says, Missing: "the reference food"}
		}
		subject = ref
	}
	s := measure(c, per, subject, x)
	if s.missing != "" {
		return Result{Says: says, Missing: s.missing}
	}
	if c.Relation.Relative() {
		return x.relative(c, per, says, s)
	}
	cmp := x.comparison(c, says)
	t := decideSides(c.Relation, s, c.Limit(), cmp)
	return Result{Truth: t, Says: says, Compare: cmp}
}

// comparison is where the numbers go; nil where nobody reads them.
func (x evaluator) comparison(c *rulebook.Condition, says string) *Comparison {
	if !x.explain {
		return nil
	}
	return &Comparison{Says: says, Relation: c.Relation, Unit: c.Threshold.Unit, Threshold: quantity.FromDecimal(c.Threshold.Value)}
}

// measure builds the two sides for one food: the value is num/den in base units of the threshold.
func measure(c *rulebook.Condition, per rulebook.Per, s Subject, x Context) side {
	num, missing := weighted(c, s, x)
	if missing != "" {
		return side{missing: missing}
	}
	out := side{num: num, den: quantity.Exactly(s.Mass())}
	switch c.As {
	case "share of energy":
		return share(num, s, "energy")
	case "share of fatty acids":
		return share(num, s, "fatty-acids")
	case "share of fat":
		return share(num, s, "fat")
	case "share of reference value":
		v, ok := x.ReferenceValue(first(c))
		if !ok {
			return side{missing: "a reference value of " + x.Name(first(c))}
		}
		out.num = num.Mul(quantity.FromInt(100))
		out.den = quantity.Exactly(s.Mass().Mul(v))
	}
	return out.per(per, s)
}

func share(num quantity.Linear, s Subject, of string) side {
	den, ok := s.Quantity(of)
	if !ok {
		return side{missing: "the quantity " + of}
	}
	return side{num: num.Mul(quantity.FromInt(100)), den: den}
}

// per brings a side to its basis.
func (s side) per(p rulebook.Per, food Subject) side {
	if p == (rulebook.Per{}) {
		return s
	}
	amount := p.Amount.Ratio()
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
		return side{num: s.num.Mul(amount), den: den}
	}
	g, ok := food.Basis(p)
	if !ok {
		return side{missing: "the " + basisName(p)}
	}
	s.num = s.num.Mul(g)
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
		if c.As == "share of energy" {
			f, ok := x.EnergyFactor(name)
			if !ok {
				return sum, "an energy factor of " + x.Name(name)
			}
			k = k.Mul(f)
		}
		sum = sum.Add(q.Mul(k))
	}
	return sum, ""
}

// decideSides decides num relation T·den, and fills the comparison's numbers.
func decideSides(rel rulebook.Relation, s side, t quantity.Ratio, cmp *Comparison) quantity.Truth {
	f := s.num.Sub(s.den.Mul(t))
	zero := s.den.High().Sign() == 0
	if cmp != nil {
		cmp.Variables, cmp.Null = f.Variables(), zero
		cmp.numbers(s)
	}
	if zero {
		if rel == rulebook.AtMost || rel == rulebook.Below {
			return sign(rulebook.AtMost, s.num)
		}
		return quantity.No
	}
	truth := sign(rel, f)
	if s.den.Low().Sign() == 0 && (rel == rulebook.AtLeast || rel == rulebook.Above) && truth == quantity.Yes {
		return quantity.Open
	}
	return truth
}

// sign decides f relation 0.
func sign(rel rulebook.Relation, f quantity.Linear) quantity.Truth {
	low, high := f.Low().Sign(), f.High().Sign()
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
	quo := func(a, b quantity.Ratio) quantity.Ratio { return a.Mul(unit).Quo(b) }
	if high := s.den.High(); high.Sign() > 0 {
		c.Low = quantity.Max(quo(s.num.Low(), high), quantity.Ratio{})
	}
	if low := s.den.Low(); low.Sign() > 0 {
		c.High = quo(s.num.High(), low)
	} else {
		c.High = quantity.Ratio{}
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
