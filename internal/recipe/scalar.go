package recipe

import (
	"slices"
	"unicode/utf8"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// scalar reads a string by the parser of its format.
func scalar[T any](d *decoder, at int32, parse func(string) (T, error)) (v T, ok bool) {
	if !d.is(at, '"') {
		return v, false
	}
	got, err := parse(d.nodes[at].text)
	if err != nil {
		d.shape(at)
		return v, false
	}
	return got, true
}

// text is a string that says something.
func (d *decoder) text(at int32) string {
	if d.is(at, '"') && d.nodes[at].text == "" {
		d.shape(at)
	}
	return d.nodes[at].text
}

func (d *decoder) id(at int32) string {
	s := d.text(at)
	if len(s) > MaxIDText && utf8.RuneCountInString(s) > MaxIDText {
		d.shape(at)
	}
	return s
}

func (d *decoder) oneOf(at int32, known []string) string {
	if d.is(at, '"') && !slices.Contains(known, d.nodes[at].text) {
		d.shape(at)
	}
	return d.nodes[at].text
}

// flag is true or false.
func (d *decoder) flag(at int32) bool {
	n := &d.nodes[at]
	if n.kind != 't' && n.kind != 'f' && !n.faulty {
		d.shape(at)
	}
	return n.kind == 't'
}

// positive complains about a zero where the law or the arithmetic divides by the number.
func (d *decoder) positive(at int32, v decimal.Decimal) {
	if v.IsZero() {
		d.fault(at, NotAboveZero, "the number must be above zero")
	}
}

// amount reads an amount of one of the dimensions.
func (d *decoder) amount(at int32, dims ...quantity.Dimension) (quantity.Amount, bool) {
	a, ok := scalar(d, at, quantity.ParseAmount)
	if ok && len(dims) > 0 && !slices.Contains(dims, a.Unit.Dimension()) {
		d.fault(at, WrongUnit, a.Unit.String()+" is a unit of "+dimension(a.Unit.Dimension())+"; a unit of "+dimensions(dims)+" is wanted here")
		return a, false
	}
	return a, ok
}

// massOrVolume reads an amount of food that must not be zero.
func (d *decoder) massOrVolume(at int32) quantity.Amount {
	return d.aboveZero(at, quantity.Mass, quantity.Volume)
}

func (d *decoder) aboveZero(at int32, dims ...quantity.Dimension) quantity.Amount {
	a, ok := d.amount(at, dims...)
	if ok {
		d.positive(at, a.Value)
	}
	return a
}

func dimension(d quantity.Dimension) string {
	return [...]string{"nothing", "mass (g, mg, µg, kg)", "volume (mL, L, tsp, tbsp, cup)", "energy in kcal", "energy in kJ", "shares (%)", "areas (cm2)"}[d]
}

func dimensions(dims []quantity.Dimension) string {
	out := make([]string, len(dims))
	for i, dim := range dims {
		out[i] = dimension(dim)
	}
	return list(out, "or")
}

func (d *decoder) density(at int32) decimal.Decimal {
	v, ok := scalar(d, at, parseDensity)
	if ok {
		d.positive(at, v)
	}
	return v
}
