package check

import (
	"fmt"
	"slices"

	"github.com/shopspring/decimal"

	"gramlaw/internal/declare"
	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
	"gramlaw/internal/rollup"
	"gramlaw/internal/rulebook"
)

// label undoes the rounding of another product's declaration: every value becomes the interval of exact values that print
// so under that market's rules, per 100 g.
func (c *checker) label(l *recipe.Label) (map[string]recipe.Value, *rollup.Fault) {
	law, fault := c.labelLaw(l)
	if fault != nil {
		return nil, fault
	}
	if l.Serving.Unit.Dimension() != quantity.Mass || !l.Serving.Value.IsPositive() {
		return nil, &rollup.Fault{Pointer: "/label/serving", Code: "label-serving", Says: "the serving of a label must be a mass above zero"}
	}
	out := map[string]recipe.Value{}
	for _, tag := range sortedKeys(l.Declared) {
		v, fault := invert(law, tag, l.Declared[tag], l.Serving)
		if fault != nil {
			return nil, fault
		}
		out[tag] = v
	}
	return out, nil
}

func (c *checker) labelLaw(l *recipe.Label) (*rulebook.Law, *rollup.Fault) {
	on := l.On
	if on == "" {
		on = c.request.On
	}
	key := l.Jurisdiction + on
	if law, ok := c.laws[key]; ok {
		return law, nil
	}
	open := func(*rulebook.Condition) quantity.Truth { return quantity.Open }
	law, ok := c.book.At(l.Jurisdiction, on, rulebook.WhenRequired, open)
	if !ok {
		return nil, &rollup.Fault{Pointer: "/label/jurisdiction", Code: "unknown-market", Says: fmt.Sprintf("%q is no market of this rule set, so its rounding is not known", l.Jurisdiction)}
	}
	c.laws[key] = law
	return law, nil
}

// invert finds the line of a component and the exact values behind its print.
func invert(law *rulebook.Law, tag string, v recipe.Value, serving quantity.Amount) (recipe.Value, *rollup.Fault) {
	pointer := "/label/declared/" + tag
	line, ok := lineOf(law, tag)
	if !ok {
		return v, &rollup.Fault{Pointer: pointer, Code: "label-line", Says: fmt.Sprintf("the declaration of %s has no line for %s", law.Market.Name, tag)}
	}
	rounding, ok := law.RoundingOf(line.Quantity)
	if !ok {
		return v, &rollup.Fault{Pointer: pointer, Code: "label-line", Says: fmt.Sprintf("the rounding of %s for %s is not known", law.Market.Name, tag)}
	}
	p := declare.Printed{Value: v.High, LessThan: !v.Low.Equal(v.High)}
	low, high, ok := declare.Invert(rounding.Body, p, v.Unit)
	if !ok {
		return v, &rollup.Fault{Pointer: pointer, Code: "label-value", Says: fmt.Sprintf("no amount prints as %s %s under the rounding of %s", v.High, v.Unit, law.Market.Name)}
	}
	return per100(tag, low, high, serving), nil
}

func lineOf(law *rulebook.Law, tag string) (*rulebook.Line, bool) {
	d, ok := law.Declaration()
	if !ok {
		return nil, false
	}
	i := slices.IndexFunc(d.Body.Lines, func(l rulebook.Line) bool { return l.Component == tag })
	if i < 0 {
		return nil, false
	}
	return &d.Body.Lines[i], true
}

// per100 brings an interval per serving to 100 g. Ends are cut to decimals outward, so that nothing is lost.
func per100(tag string, low, high decimal.Decimal, serving quantity.Amount) recipe.Value {
	g := serving.Ratio()
	per := func(d decimal.Decimal) quantity.Ratio {
		return quantity.FromDecimal(d).Mul(quantity.FromInt(100)).Quo(g)
	}
	return recipe.Value{Low: per(low).Floor(labelDigits), High: per(high).Ceil(labelDigits), Unit: baseUnit(tag)}
}

const labelDigits = 15

// baseUnit is the base unit of a component's values.
func baseUnit(tag string) quantity.Unit {
	c, _ := food.Lookup(tag)
	u, _ := quantity.ParseUnit(string(c.Unit))
	return u.Base()
}
