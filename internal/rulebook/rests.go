package rulebook

import "slices"

// Rests lists, for every rule that holds, the rules it rests on directly: definitions, reference values, roundings, other claims and named
// conditions. A rule that rests on nothing is not listed.
func (l *Law) Rests() map[string][]string {
	r := rests{law: l, on: map[string][]string{}}
	for _, d := range l.Definitions.All {
		for i := range d.Body.Ways {
			r.terms(d.ID, d.Body.Ways[i].Terms())
		}
	}
	for _, e := range l.Energy.All {
		for i := range e.Body.Methods {
			r.terms(e.ID, e.Body.Methods[i].Terms())
		}
	}
	for _, a := range l.Roundings.All {
		r.rounding(a.ID, a.Body)
	}
	for _, a := range l.Declarations.All {
		r.declaration(a.ID, a.Body)
	}
	for _, list := range [][]Active[Claim]{l.Claims.All, l.HealthClaims.All} {
		for _, a := range list {
			r.claim(a.ID, a.Body)
		}
	}
	for _, a := range l.Disclosures.All {
		r.conditions(a.ID, a.Body.When, a.Body.Condition)
	}
	for _, list := range [][]Active[Limit]{l.Limits.All, l.Serving.All} {
		for _, a := range list {
			r.conditions(a.ID, a.Body.Where, a.Body.Condition)
		}
	}
	for _, a := range l.Naming.All {
		r.conditions(a.ID, a.Body.Where, a.Body.Condition)
	}
	for _, a := range l.Conditions.All {
		r.conditions(a.ID, a.Body.Condition)
	}
	return r.on
}

type rests struct {
	law *Law
	on  map[string][]string
}

func (r *rests) add(id, on string) {
	if on != "" && on != id && !slices.Contains(r.on[id], on) {
		r.on[id] = append(r.on[id], on)
	}
}

// quantity is the rule that gives a quantity; empty where none does.
func (r *rests) quantity(name string) string {
	if d, ok := r.law.Definitions.Get(name); ok {
		return d.ID
	}
	e, _ := r.law.Energy.Get(name)
	return e.ID
}

func (r *rests) terms(id string, terms []Term) {
	for _, t := range terms {
		r.add(id, r.quantity(t.Name))
	}
}

func (r *rests) reference(id, quantity string) {
	ref, _ := r.law.ReferenceOf(quantity)
	r.add(id, ref.ID)
}

func (r *rests) rounding(id string, b *Rounding) {
	for _, q := range b.Quantities {
		r.add(id, r.quantity(q))
	}
	for i := range b.Bands {
		r.conditions(id, b.Bands[i].If)
	}
	if b.Percent != nil {
		r.conditions(id, b.Percent.ZeroIf)
		for _, q := range b.Quantities {
			r.reference(id, q)
		}
	}
}

func (r *rests) declaration(id string, b *Declaration) {
	r.conditions(id, b.RequiredUnless)
	for i := range b.Lines {
		l := &b.Lines[i]
		for j := range l.TermsIf {
			r.conditions(id, l.TermsIf[j].If)
		}
		r.conditions(id, l.MandatoryIf, l.ForbiddenIf, l.LeaveOutIf, l.NoPercentIf, l.PercentIf, l.NoAmountIf)
	}
	for i := range b.Statements {
		r.conditions(id, b.Statements[i].If)
	}
}

func (r *rests) claim(id string, b *Claim) {
	r.conditions(id, b.Condition, b.BarredIf)
	for i := range b.Statements {
		r.conditions(id, b.Statements[i].If)
	}
	for _, d := range r.law.Disclosures.All {
		r.add(id, d.ID)
	}
}

func (r *rests) conditions(id string, list ...*Condition) {
	for _, c := range list {
		c.Walk(func(p *Condition) { r.condition(id, p) })
	}
}

// shareOf is the quantity that is the whole of a share.
var shareOf = map[string]string{"share of energy": "energy", "share of energy in kJ": "energy-kj", "share of fatty acids": "fatty-acids", "share of fat": "fat"}

func (r *rests) condition(id string, c *Condition) {
	switch c.Op {
	case OpCompare:
		r.terms(id, c.Terms())
		r.add(id, r.quantity(shareOf[c.As]))
		if c.As == "share of reference value" {
			for _, t := range c.Terms() {
				r.reference(id, t.Name)
			}
		}
		for _, per := range c.Bases() {
			r.add(id, r.quantity(per.Quantity))
		}
	case OpMeets:
		for _, list := range []*List[Claim]{&r.law.Claims, &r.law.HealthClaims} {
			if a, ok := list.Get(Name(c.Name)); ok && a.ID == c.Name {
				r.add(id, a.ID)
			}
		}
	case OpHolds:
		a, _ := r.law.Conditions.Get(Name(c.Name))
		r.add(id, a.ID)
	case OpDeclared:
		a, _ := r.law.RoundingOf(c.Name)
		r.add(id, a.ID)
	}
}
