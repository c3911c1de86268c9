package recipe

import (
	"slices"

	"gramlaw/internal/quantity"
)

// perMarket reads an object by jurisdiction.
func perMarket[T any](d *decoder, at int32, read func(int32) T) PerMarket[T] {
	out := make(PerMarket[T], d.nodes[at].count)
	d.entries(at, func(name string, m int32) {
		if _, err := parseMarketKey(name); err != nil && !d.nodes[m].faulty {
			d.shape(m)
		}
		out[name] = read(m)
	})
	return out
}

func (d *decoder) pack(at int32) *Package {
	p := &Package{}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "net":
			a := d.massOrVolume(m)
			p.Net = &a
		case "units":
			if v, ok := scalar(d, m, quantity.ParseNumber); ok {
				p.Units = v
				d.positive(m, v)
			}
		case "surface":
			if v, ok := scalar(d, m, parseArea); ok {
				p.Surface = v
				d.positive(m, v)
			}
		default:
			return false
		}
		return true
	})
	return p
}

func (d *decoder) serving(at int32) Serving {
	s := Serving{}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "amount":
			s.Amount = d.massOrVolume(m)
		case "measure":
			s.Measure = d.text(m)
		default:
			return false
		}
		return true
	}, "amount")
	return s
}

func (d *decoder) referenceAmount(at int32) ReferenceAmount {
	r := ReferenceAmount{}
	if d.nodes[at].kind != '{' {
		r.Amount = d.massOrVolume(at)
		return r
	}
	d.object(at, func(name string, m int32) bool {
		switch name {
		case "amount":
			r.Amount = d.massOrVolume(m)
		case "grams":
			a := d.aboveZero(m, quantity.Mass)
			r.Grams = &a
		default:
			return false
		}
		return true
	}, "amount")
	return r
}

// States of a food as it is sold.
var States = []string{"solid", "liquid"}

func (d *decoder) state(at int32) string { return d.oneOf(at, States) }

// quantities is a list of names of quantities.
func (d *decoder) quantities(at int32) []string {
	out := make([]string, 0, d.nodes[at].count)
	d.elements(at, func(m int32) {
		name, ok := scalar(d, m, parseClaimName)
		if ok && slices.Contains(out, name) {
			d.fault(m, Repeated, quote(name)+" stands in the list twice")
		}
		out = append(out, name)
	})
	return out
}

func (d *decoder) markets(at int32) []string {
	out := make([]string, 0, d.nodes[at].count)
	seen := make(map[string]bool, d.nodes[at].count)
	d.elements(at, func(m int32) {
		name, ok := scalar(d, m, parseMarket)
		if ok && seen[name] {
			d.fault(m, Repeated, quote(name)+" stands in the list twice")
		}
		seen[name] = true
		out = append(out, name)
	})
	return out
}
