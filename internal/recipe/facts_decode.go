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
		if n.kind != '"' {
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
	return out
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
		} else if n.kind == '"' {
			d.fault(at, WrongFactValue, quote(rule.Name)+" is true or false")
		}
	case OneOf:
		if f.Text = n.text; n.kind != '"' || !slices.Contains(rule.Values, n.text) {
			d.fault(at, WrongFactValue, quote(rule.Name)+" is one of "+list(quoted(rule.Values), "and")+suggest(n.text, rule.Values))
		}
	case Measure:
		unit, _ := quantity.ParseUnit(rule.Unit)
		a, err := quantity.ParseAmount(n.text)
		if f.Number = &a; err != nil || a.Unit.Dimension() != unit.Dimension() {
			d.fault(at, WrongFactValue, quote(rule.Name)+" is a number with its unit, such as \"5 "+rule.Unit+"\"")
		}
	}
	return f
}
