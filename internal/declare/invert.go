package declare

import (
	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// openEnd is how far, in base units, an upper end that the law itself excludes is drawn in: no stated number is that fine.
var openEnd = decimal.New(1, -15)

// Invert gives the interval of exact values, in base units, that may print as p: the union over all bands whatever their
// conditions. An upper end that prints otherwise is drawn in by openEnd. It reports false when no exact value prints so.
func Invert(r *rulebook.Rounding, p Printed, unit quantity.Unit) (low, high decimal.Decimal, ok bool) {
	from := decimal.Zero
	for i := range r.Bands {
		b := &r.Bands[i]
		edge, open := edge(b)
		for _, one := range append([]rulebook.Band{*b}, b.Or...) {
			lo, hi, fits := invertBand(&one, p, unit, from, edge, open)
			if !fits {
				continue
			}
			if !ok || lo.LessThan(low) {
				low = lo
			}
			if !ok || hi.GreaterThan(high) {
				high = hi
			}
			ok = true
		}
		if !open && b.If == nil {
			from = edge
		}
	}
	return low, high, ok
}

// edge is a band's upper end in base units; open means it has none.
func edge(b *rulebook.Band) (d decimal.Decimal, open bool) {
	switch {
	case b.Below != nil:
		return b.Below.Base(), false
	case b.AtMost != nil:
		return b.AtMost.Base(), false
	}
	return decimal.Zero, true
}

// invertBand intersects a band's own range with what rounds to p in it.
func invertBand(b *rulebook.Band, p Printed, unit quantity.Unit, from, to decimal.Decimal, open bool) (low, high decimal.Decimal, ok bool) {
	value := p.Value.Mul(unit.Scale())
	switch {
	case b.Declare != nil && b.Below != nil:
		return from, to.Sub(openEnd), !open && !p.LessThan && b.Declare.Base().Equal(value)
	case b.LessThan != nil && b.Below != nil:
		return from, to.Sub(openEnd), !open && p.LessThan && b.LessThan.Base().Equal(value)
	case b.Declare != nil:
		return from, to, !open && !p.LessThan && b.Declare.Base().Equal(value)
	case b.LessThan != nil:
		return from, to, !open && p.LessThan && b.LessThan.Base().Equal(value)
	case p.LessThan:
		return from, to, false
	}
	step := figureStep(p.Value, b.Figures).Mul(unit.Scale())
	if b.Nearest != nil {
		step = b.Nearest.Base()
	}
	half := step.Mul(decimal.New(5, -1))
	low, high = decimal.Max(value.Sub(half), from), value.Add(half).Sub(openEnd)
	if !open {
		high = decimal.Min(high, to)
	}
	return low, high, !low.GreaterThan(high) && value.Mod(step).IsZero()
}
