// Package declare turns exact values into what a label prints: the bands of a law's rounding, its per cents of reference
// values, how numbers look, and the way back from a printed value to the interval it may stand for.
//
// Round decides on the exact value and never on a rounded one.
package declare

import (
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A Printed is a value as a label states it.
type Printed struct {
	Value    decimal.Decimal // in the unit of the line
	LessThan bool            // printed as "less than Value"
	Step     decimal.Decimal // the step it was rounded to; zero for a value the band fixes
}

// Zero tells whether the label states zero.
func (p Printed) Zero() bool { return p.Value.IsZero() && !p.LessThan }

// Equal compares what is printed.
func (p Printed) Equal(q Printed) bool { return p.LessThan == q.LessThan && p.Value.Equal(q.Value) }

// An Outcome is what one exact value may print as: the law's choice, and what else the law allows.
type Outcome struct {
	Printed      Printed
	Alternatives []Printed
}

// Holds answers the conditions on which bands depend.
type Holds func(*rulebook.Condition) quantity.Truth

// Round gives every outcome that is possible for an exact value in base units: one, or two where a band's condition is
// open. unit is the unit of the printed number.
func Round(bands []rulebook.Band, ties quantity.Ties, exact quantity.Ratio, unit quantity.Unit, holds Holds) []Outcome {
	if exact.Sign() < 0 {
		exact = quantity.Ratio{}
	}
	var out []Outcome
	for i := range bands {
		b := &bands[i]
		if !b.Takes(exact) {
			continue
		}
		t := quantity.Yes
		if b.If != nil {
			t = holds(b.If)
		}
		if t == quantity.No {
			continue
		}
		out = append(out, outcome(bands, i, ties, exact, unit))
		if t == quantity.Yes {
			break
		}
	}
	return out
}

func outcome(bands []rulebook.Band, i int, ties quantity.Ties, exact quantity.Ratio, unit quantity.Unit) Outcome {
	o := Outcome{Printed: print1(bands, i, ties, exact, unit)}
	for j := range bands[i].Or {
		o.Alternatives = append(o.Alternatives, apply(&bands[i].Or[j], ties, exact, unit))
	}
	return o
}

// print1 applies a band. An amount that reaches a later band by being rounded takes that band's step for its looks.
func print1(bands []rulebook.Band, i int, ties quantity.Ties, exact quantity.Ratio, unit quantity.Unit) Printed {
	p := apply(&bands[i], ties, exact, unit)
	if p.Step.IsZero() {
		return p
	}
	rounded := quantity.Amount{Value: p.Value, Unit: unit}.Ratio()
	for j := i + 1; j < len(bands) && !bands[j-1].Takes(rounded); j++ {
		if bands[j].Takes(rounded) && bands[j].Nearest != nil {
			p.Step, _ = bands[j].Nearest.In(unit)
			break
		}
	}
	return p
}

func apply(b *rulebook.Band, ties quantity.Ties, exact quantity.Ratio, unit quantity.Unit) Printed {
	inUnit := exact.In(unit) // a power of ten for all units a label prints
	switch {
	case b.Declare != nil:
		v, _ := b.Declare.In(unit)
		return Printed{Value: v}
	case b.LessThan != nil:
		v, _ := b.LessThan.In(unit)
		return Printed{Value: v, LessThan: true}
	case b.Figures > 0:
		v := inUnit.RoundFigures(b.Figures, ties)
		return Printed{Value: v, Step: figureStep(v, b.Figures)}
	}
	step, _ := b.Nearest.In(unit)
	return Printed{Value: inUnit.Round(step, ties), Step: step}
}

// figureStep is the last place of a value with so many significant figures.
func figureStep(v decimal.Decimal, figures int) decimal.Decimal {
	if v.IsZero() {
		return decimal.New(1, 0)
	}
	lead := int32(v.NumDigits()) + v.Exponent() // power of ten above the leading digit
	return decimal.New(1, lead-int32(figures))
}

// Text writes a printed value in a language's number format, with the unit as it is printed.
func Text(p Printed, unit string, f rulebook.Number) string {
	pattern := f.Unit
	if p.LessThan {
		pattern = f.LessThan
	}
	n := digits(p, f.TrailingZeros)
	if f.Decimal != "" && f.Decimal != "." {
		n = strings.Replace(n, ".", f.Decimal, 1)
	}
	text := strings.Replace(pattern, "{n}", n, 1)
	return strings.TrimSpace(strings.Replace(text, "{u}", unit, 1))
}

func digits(p Printed, trailing bool) string {
	if trailing && p.Step.IsPositive() && p.Step.Exponent() < 0 {
		return p.Value.StringFixed(-p.Step.Exponent())
	}
	return p.Value.String()
}
