package recipe

import (
	"slices"

	"gramlaw/internal/quantity"
)

func (d *decoder) facts(at int32) map[string]Fact {
	out := make(map[string]Fact, d.nodes[at].count)
	d.entries(at, func(name string, m int32) {
		n := &d.nodes[m]
		if n.faulty {
			return
		}
		if n.kind == '[' {
			d.elements(m, func(e int32) { d.text(e) })
			if n.count == 0 {
				return
			}
		} else if n.kind != '"' {
			d.flag(m)
		} else if d.text(m) == "" {
			return
		}
		rule, ok := factRule(name)
		if !ok {
			d.unknown(m, UnknownFact, quote(name)+" is not in the register of facts", name, factNames)
			return
		}
		out[name] = d.fact(m, rule)
	})
	for name := range out {
		rule, _ := factRule(name)
		if _, said := out[rule.Implies]; rule.implied(out[name].List) && !said {
			out[rule.Implies] = Fact{Flag: quantity.Yes}
		}
	}
	return out
}

// implied tells whether a list names what implies another fact.
func (r *FactRule) implied(list []string) bool {
	return slices.ContainsFunc(list, func(s string) bool { return slices.Contains(r.ImpliedBy, s) })
}

func factRule(name string) (FactRule, bool) {
	i := slices.IndexFunc(Facts, func(f FactRule) bool { return f.Name == name })
	if i < 0 {
		return FactRule{}, false
	}
	return Facts[i], true
}

func factNames() []string {
	out := make([]string, len(Facts))
	for i, f := range Facts {
		out[i] = f.Name
	}
	return out
}

func (d *decoder) fact(at int32, rule FactRule) (f Fact) {
	n := &d.nodes[at]
	switch rule.Kind {
	case YesNo:
		if n.kind == 't' || n.kind == 'f' {
			f.Flag = quantity.TruthOf(n.kind == 't')
		} else if n.kind == '"' || n.kind == '[' {
			d.fault(at, WrongFactValue, quote(rule.Name)+" is true or false")
		}
	case OneOf:
		if f.Text = n.text; n.kind != '"' || !slices.Contains(rule.Values, n.text) {
			d.fault(at, WrongFactValue, quote(rule.Name)+" is one of "+list(quoted(rule.Values), "and")+suggest(n.text, rule.Values))
		}
	case Measure:
		return d.measure(at, rule)
	case Listed:
		f.List = d.listed(at, rule)
	}
	return f
}

// measure reads an amount. A plain number is kept in per cent.
func (d *decoder) measure(at int32, rule FactRule) Fact {
	text, such := d.nodes[at].text, "with its unit, such as \"5 "+rule.Unit+"\""
	unit, ok := quantity.ParseUnit(rule.Unit)
	if !ok {
		unit, such = quantity.PerCent, "such as \"0.8\""
		if v, err := quantity.ParseNumber(text); err == nil {
			return Fact{Number: &quantity.Amount{Value: v.Shift(2), Unit: unit}}
		}
	}
	a, err := quantity.ParseAmount(text)
	if err != nil || a.Unit.Dimension() != unit.Dimension() {
		d.fault(at, WrongFactValue, quote(rule.Name)+" is a number "+such)
	}
	return Fact{Number: &a}
}

// listed reads a list of the rule's values.
func (d *decoder) listed(at int32, rule FactRule) []string {
	if d.nodes[at].kind != '[' {
		d.fault(at, WrongFactValue, quote(rule.Name)+" is a list")
		return nil
	}
	var out []string
	for m := d.nodes[at].first; m != 0; m = d.nodes[m].next {
		text := d.nodes[m].text
		if d.nodes[m].kind == '"' && text != "" && !slices.Contains(rule.Values, text) {
			d.fault(m, WrongFactValue, quote(rule.Name)+" lists "+list(quoted(rule.Values), "and")+suggest(text, rule.Values))
		}
		out = append(out, text)
	}
	return out
}
