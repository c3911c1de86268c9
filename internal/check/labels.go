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
func (c *checker) label(l *recipe.Label) (map[food.ID]rollup.Range, *rollup.Fault) {
	law, fault := c.labelLaw(l)
	if fault != nil {
		return nil, fault
	}
	if l.Serving.Unit.Dimension() != quantity.Mass || !l.Serving.Value.IsPositive() {
		return nil, &rollup.Fault{Pointer: "/label/serving", Code: "label-serving", Says: "the serving of a label must be a mass above zero"}
	}
	out := map[food.ID]rollup.Range{}
	for _, tag := range sortedKeys(l.Declared) {
		r, fault := invert(law, tag, l.Declared[tag], l.Serving)
		if fault != nil {
			return nil, fault
		}
		c, _ := food.Lookup(tag)
		out[c.ID] = r
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

// invert finds the line of a component and the exact values behind its print, per 100 g. Where rounding is no law, a value that no band
// prints was rounded in its own last place.
func invert(law *rulebook.Law, tag string, v recipe.Value, serving quantity.Amount) (rollup.Range, *rollup.Fault) {
	pointer := "/label/declared/" + tag
	line, ok := lineOf(law, tag)
	if !ok {
		return rollup.Range{}, &rollup.Fault{Pointer: pointer, Code: "label-line", Says: fmt.Sprintf("the declaration of %s has no line for %s", law.Market.Name, tag)}
	}
	rounding, ok := law.RoundingOf(line.Quantity)
	if !ok {
		return rollup.Range{}, &rollup.Fault{Pointer: pointer, Code: "label-line", Says: fmt.Sprintf("the rounding of %s for %s is not known", law.Market.Name, tag)}
	}
	prints := []declare.Printed{{Value: v.High, LessThan: !v.Low.Equal(v.High)}}
	if prints[0].LessThan && v.Low.IsPositive() { // a range of printed values, as of several lots
		prints = []declare.Printed{{Value: v.Low}, {Value: v.High}}
	}
	var low, high decimal.Decimal
	for i, p := range prints {
		l, h, ok := declare.Invert(rounding.Body, p, v.Unit)
		switch {
		case ok:
		case rounding.Head.Source.Force == "law":
			return rollup.Range{}, &rollup.Fault{Pointer: pointer, Code: "label-value", Says: fmt.Sprintf("no amount prints as %s %s under the rounding of %s; check the value, its unit and the labelling date (\"on\")", p.Value, v.Unit, law.Market.Name)}
		default:
			l, h = lastPlace(p, v.Unit)
		}
		if i == 0 {
			low = l
		}
		high = h
	}
	per := quantity.FromInt(100).Quo(serving.Ratio())
	return rollup.Range{Low: quantity.FromDecimal(low).Mul(per), High: quantity.FromDecimal(high).Mul(per)}, nil
}

// lastPlace is half a unit of the last printed place around a value, in base units.
func lastPlace(p declare.Printed, u quantity.Unit) (low, high decimal.Decimal) {
	value, half := p.Value.Mul(u.Scale()), decimal.New(5, p.Value.Exponent()-1).Mul(u.Scale())
	if p.LessThan {
		return decimal.Zero, value
	}
	return decimal.Max(value.Sub(half), decimal.Zero), value.Add(half)
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
