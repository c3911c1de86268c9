package claim

import (
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// relative compares the product's value with the reference food's, both per the same basis. cmp takes the numbers; nil where
// nobody reads them.
func (x evaluator) relative(c *rulebook.Condition, per rulebook.Per, s side, cmp *Comparison) Result {
	var out Result
	if cmp != nil {
		out.Says = cmp.Says
	}
	ref, ok := x.Reference()
	if !ok {
		out.Missing = "the reference food"
		return out
	}
	r := measure(c, per, ref, false, x.Context)
	if r.missing != "" {
		out.Missing = r.missing + " of the reference food"
		return out
	}
	if !s.den.Determined() || !r.den.Determined() || s.den.Known.Sign() == 0 || r.den.Known.Sign() == 0 {
		out.Missing = "an exact basis"
		return out
	}
	product, other := s.num.Mul(s.scale.Quo(s.den.Known)), r.num.Mul(r.scale.Quo(r.den.Known))
	out.Truth, out.Compare = decideRelative(c, product, other, cmp), cmp
	return out
}

func decideRelative(c *rulebook.Condition, product, other quantity.Linear, cmp *Comparison) quantity.Truth {
	t := c.Limit()
	change := product.Sub(other)
	percent := t.Mul(quantity.Scaled(1, -2))
	switch c.Relation {
	case rulebook.ReducedBy, rulebook.IncreasedBy:
		cmp.change(c.Relation, product, other)
		if other.High().Sign() <= 0 {
			return quantity.No
		}
		f := change.Add(other.Mul(percent)) // product - other·(1-t)
		rel := rulebook.AtMost
		if c.Relation == rulebook.IncreasedBy {
			f, rel = change.Sub(other.Mul(percent)), rulebook.AtLeast
		}
		cmp.dependsOn(f)
		truth := sign(rel, f)
		if truth == quantity.Yes && other.Low().Sign() <= 0 {
			return quantity.Open
		}
		return truth
	case rulebook.NotMore:
		cmp.absolute(first(c), product, other)
		cmp.dependsOn(change)
		return sign(rulebook.AtMost, change)
	}
	f := change
	if c.Relation == rulebook.LessBy {
		f = other.Sub(product)
	}
	cmp.value(f)
	f = f.Sub(quantity.Exactly(t))
	cmp.dependsOn(f)
	return sign(rulebook.AtLeast, f)
}

func (c *Comparison) dependsOn(f quantity.Linear) {
	if c != nil {
		c.Variables = f.Variables()
	}
}

// change fills the comparison with the reduction or increase in per cent: from the least to the greatest that is possible.
func (c *Comparison) change(rel rulebook.Relation, product, other quantity.Linear) {
	if c == nil {
		return
	}
	if c.Null = other.High().Sign() <= 0; c.Null {
		return
	}
	c.Low, c.High = change(rel, product.High(), other.Low()), change(rel, product.Low(), other.High())
	if rel == rulebook.IncreasedBy {
		c.Low, c.High = change(rel, product.Low(), other.High()), change(rel, product.High(), other.Low())
	}
	p, ok1 := product.Central()
	o, ok2 := other.Central()
	if c.Known = ok1 && ok2 && o.Sign() > 0; c.Known {
		c.Exact = change(rel, p, o)
		c.Headroom = c.Exact.Sub(c.Threshold)
	}
}

// change is the reduction or increase from the reference food's value to the product's, in per cent; zero from nothing.
func change(rel rulebook.Relation, product, other quantity.Ratio) quantity.Ratio {
	if other.Sign() <= 0 {
		return quantity.Ratio{}
	}
	diff := other.Sub(product)
	if rel == rulebook.IncreasedBy {
		diff = diff.Neg()
	}
	return diff.Mul(quantity.FromInt(100)).Quo(other)
}

// absolute fills the comparison with both foods' amounts; the other food's is the threshold.
func (c *Comparison) absolute(name string, product, other quantity.Linear) {
	if c == nil {
		return
	}
	c.Unit = quantity.Gram
	switch name {
	case "energy":
		c.Unit = quantity.Kilocalorie
	case "energy-kj":
		c.Unit = quantity.Kilojoule
	}
	c.Low, c.High = product.Low(), product.High()
	p, ok1 := product.Central()
	o, ok2 := other.Central()
	c.Threshold = o
	if c.Known = ok1 && ok2; c.Known {
		c.Exact, c.Headroom = p, o.Sub(p)
	}
}

func (c *Comparison) value(f quantity.Linear) {
	if c == nil {
		return
	}
	unit := quantity.Scaled(1, -c.Unit.Scale().Exponent())
	c.Low, c.High = f.Low().Mul(unit), f.High().Mul(unit)
	if v, ok := f.Central(); ok {
		c.Known, c.Exact = true, v.Mul(unit)
		c.Headroom = c.Exact.Sub(c.Threshold)
	}
}
