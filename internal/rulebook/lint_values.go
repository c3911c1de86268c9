package rulebook

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
)

var energyUnits = map[string]quantity.Dimension{"kcal": quantity.EnergyKcal, "kJ": quantity.EnergyKJ}

// quantities checks definitions and energy, compiles predicates, and learns every quantity's dimension.
func (c *checker) quantities() {
	bodies(c.m.Definitions, func(id, field string, d *Definition) {
		u, ok := quantity.ParseUnit(d.Unit)
		if !ok || u.Dimension() != quantity.Mass {
			c.bad("definitions", id, field+"/unit", "%q is no unit of mass", d.Unit)
		}
		c.dims[Name(id)] = quantity.Mass
		c.words("definitions", id, field+"/name", d.Name)
	})
	bodies(c.m.Energy, func(id, field string, e *Energy) {
		dim, ok := energyUnits[e.Unit]
		if !ok {
			c.bad("energy", id, field+"/unit", "%q is neither kcal nor kJ", e.Unit)
		}
		c.dims[Name(id)] = dim
		c.words("energy", id, field+"/name", e.Name)
	})
	bodies(c.m.Definitions, func(id, field string, d *Definition) { c.definition(id, field, d) })
	bodies(c.m.Energy, func(id, field string, e *Energy) {
		if len(e.Methods) == 0 {
			c.bad("energy", id, field+"/methods", "is empty")
		}
		for i := range e.Methods {
			m := &e.Methods[i]
			m.terms = terms(m.Factors)
			if m.Source != nil {
				c.source(c.j+"/energy.json", id, field+"/methods/source", *m.Source)
			}
			for _, q := range sorted(m.Factors) {
				c.quantity("energy", id, field+"/methods/"+m.Method, q, quantity.Mass)
			}
		}
	})
}

func (c *checker) definition(id, field string, d *Definition) {
	bad := func(f, format string, args ...any) { c.bad("definitions", id, field+f, format, args...) }
	if len(d.Ways) == 0 {
		bad("/ways", "is empty")
	}
	if d.ExpressedAs != "" && d.ExpressedAs != "fatty acid" && d.ExpressedAs != "triglyceride" {
		bad("/expressed as", "%q is neither fatty acid nor triglyceride", d.ExpressedAs)
	}
	if d.EnergyAs != "" {
		c.quantity("definitions", id, field+"/energy as", d.EnergyAs, quantity.Mass)
	}
	for i := range d.Ways {
		c.way(id, field+"/ways/"+strconv.Itoa(i), &d.Ways[i])
	}
	d.key = d.makeKey()
}

func (c *checker) way(id, field string, w *Way) {
	set := 0
	if w.Acids != nil {
		set++
		class, err := w.Acids.Compile()
		if err != nil {
			c.bad("definitions", id, field+"/acids", "%v", err)
		}
		w.class = class
	}
	if w.Sum != nil {
		set++
		for _, tag := range sorted(w.Sum) {
			component, ok := food.Lookup(tag)
			if !ok {
				c.bad("definitions", id, field+"/sum", "%q is no component of the register", tag)
			}
			w.parts = append(w.parts, Part{component.ID, w.Sum[tag].Ratio()})
		}
	}
	if w.Of != nil {
		set++
		for _, q := range sorted(w.Of) {
			w.terms = append(w.terms, Term{q, w.Of[q].Ratio()})
			c.quantity("definitions", id, field+"/of", q, quantity.Mass)
			c.depend("quantity/"+Name(id), "quantity/"+q)
		}
	}
	if set != 1 {
		c.bad("definitions", id, field, "must have exactly one of acids, sum and of")
	}
}

// quantity checks that a name is a quantity of this market with the wanted dimension (NoDimension: any).
func (c *checker) quantity(kind, id, field, name string, want quantity.Dimension) {
	got, ok := c.dims[name]
	if !ok {
		c.bad(kind, id, field, "%q is no quantity of this market", name)
		return
	}
	if want != quantity.NoDimension && got != want {
		c.bad(kind, id, field, "%q has the wrong dimension here", name)
	}
}

func (c *checker) words(kind, id, field string, w Words) {
	if len(w) == 0 {
		c.bad(kind, id, field, "has no words")
	}
	for lang, s := range w {
		if strings.TrimSpace(s) == "" {
			c.bad(kind, id, field+"/"+lang, "is empty")
		}
	}
}

func sorted[T any](m map[string]T) []string {
	out := make([]string, 0, len(m))
	for k := range m {
		out = append(out, k)
	}
	slices.Sort(out)
	return out
}

func (c *checker) references() {
	bodies(c.m.References, func(id, field string, r *Reference) {
		c.quantity("reference_values", id, field+"/quantity", r.Quantity, quantity.NoDimension)
		if len(r.Amounts) == 0 {
			c.bad("reference_values", id, field+"/amounts", "is empty")
		}
		for who, s := range r.Sources {
			c.source(c.j+"/reference_values.json", id, field+"/sources/"+who, s)
			if _, ok := r.Amounts[who]; !ok {
				c.bad("reference_values", id, field+"/sources", "%q has no amount", who)
			}
		}
		r.texts, r.ratios = make(map[string]string, len(r.Amounts)), make(map[string]quantity.Ratio, len(r.Amounts))
		for who, a := range r.Amounts {
			r.texts[who], r.ratios[who] = a.String(), a.Ratio()
			if a.Unit.Dimension() != c.dims[r.Quantity] {
				c.bad("reference_values", id, field+"/amounts/"+who, "%s does not fit the quantity %s", a, r.Quantity)
			}
		}
	})
	bodies(c.m.ReferenceAmounts, func(id, field string, r *ReferenceAmount) {
		for _, a := range []*quantity.Amount{&r.Amount, r.Daily} {
			if a == nil {
				continue
			}
			if d := a.Unit.Dimension(); d != quantity.Mass && d != quantity.Volume || !a.Value.IsPositive() {
				c.bad("reference_amounts", id, field+"/amount", "%s is no mass or volume above zero", a)
			}
		}
	})
}

func (c *checker) roundings() {
	bodies(c.m.Roundings, func(id, field string, r *Rounding) {
		if r.Ties != quantity.TiesUp && r.Ties != quantity.TiesEven {
			c.bad("rounding", id, field+"/ties", `%q is neither "up" nor "even"`, r.Ties)
		}
		if r.TiesSource != nil {
			c.source(c.j+"/rounding.json", id, field+"/ties source", *r.TiesSource)
		}
		dim := quantity.NoDimension
		for _, q := range r.Quantities {
			c.quantity("rounding", id, field+"/quantities", q, dim)
			dim = c.dims[q]
		}
		if len(r.Quantities) == 0 || len(r.Bands) == 0 && r.Percent == nil {
			c.bad("rounding", id, field, "rounds nothing")
		}
		c.bands(id, field+"/bands", r.Quantities, r.Bands, dim)
		if p := r.Percent; p != nil {
			c.percent(id, field+"/percent", r, p)
		}
	})
}

func (c *checker) percent(id, field string, r *Rounding, p *Percent) {
	if p.From != "exact" && p.From != "declared" || p.Or != "" && p.Or != "exact" && p.Or != "declared" {
		c.bad("rounding", id, field, `from and or must be "exact" or "declared"`)
	}
	if len(p.Bands) == 0 {
		c.bad("rounding", id, field+"/bands", "is empty")
	}
	c.bands(id, field+"/bands", r.Quantities, p.Bands, quantity.Percent)
	if p.Source != nil {
		c.source(c.j+"/rounding.json", id, field+"/source", *p.Source)
	}
	c.condition("rounding", id, field+"/zero if", "percent/"+Name(id), p.ZeroIf)
	c.times("rounding", id, field, p.Times)
	for i := range p.Times {
		c.condition("rounding", id, field+"/times", "percent/"+Name(id), p.Times[i].If)
	}
}

// bands checks that edges rise, that only the last band has none, and that each does one thing.
func (c *checker) bands(id, field string, quantities []string, bands []Band, dim quantity.Dimension) {
	last := decimal.NewFromInt(-1)
	for i := range bands {
		b := &bands[i]
		at := field + "/" + strconv.Itoa(i)
		edge := b.limit()
		switch {
		case edge == nil && i < len(bands)-1:
			c.bad("rounding", id, at, "has no edge but is not the last band")
		case edge != nil && i == len(bands)-1:
			c.bad("rounding", id, at, "is the last band but has an edge: larger amounts have none")
		case edge != nil && edge.Unit.Dimension() != dim:
			c.bad("rounding", id, at, "has an edge of the wrong dimension")
		case edge != nil && edge.Base().LessThan(last):
			c.bad("rounding", id, at, "has an edge below the one before it")
		case edge != nil:
			last = edge.Base()
		}
		c.band(id, at, b, dim)
		for _, q := range quantities {
			c.condition("rounding", id, at+"/if", "declared/"+q, b.If)
		}
	}
}

func (c *checker) band(id, at string, b *Band, dim quantity.Dimension) {
	does := 0
	for _, a := range []*quantity.Amount{b.Nearest, b.Declare, b.LessThan} {
		if a == nil {
			continue
		}
		does++
		if a.Unit.Dimension() != dim {
			c.bad("rounding", id, at, "%s has the wrong dimension", a)
		}
	}
	if b.Nearest != nil && !b.Nearest.Value.IsPositive() {
		c.bad("rounding", id, at+"/nearest", "must be above zero")
	}
	if b.Figures != 0 {
		does++
	}
	if does != 1 || b.Below != nil && b.AtMost != nil {
		c.bad("rounding", id, at, "must do exactly one of nearest, figures, declare and less than, under at most one edge")
	}
	for i := range b.Or {
		c.band(id, fmt.Sprintf("%s/or/%d", at, i), &b.Or[i], dim)
	}
}
