package check

import (
	"strings"

	"gramlaw/internal/claim"
	"gramlaw/internal/declare"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// value is a line on one column; settled tells whether it prints one thing only.
func (v *view) value(l *lineState, c column, x quantity.Linear) (Value, bool) {
	u, unit := v.unit(l.line.Quantity), l.line.Unit
	r, ok := v.law.RoundingOf(l.line.Quantity)
	inUnit := func(r quantity.Ratio) quantity.Ratio { return r.In(u) }
	out := Value{Basis: c.ID, Unit: u.String(), Alternatives: []string{}}
	if mid, known := x.Central(); known {
		out.setExact(inUnit(mid))
	}
	if x.Determined() && x.Known.Sign() >= 0 {
		out.Low, out.High = *out.Exact, *out.Exact
	} else {
		out.Low, out.High = exactText(quantity.Max(inUnit(x.Low()), quantity.Ratio{})), exactText(inUnit(x.High()))
	}
	if !ok {
		return out, false
	}
	out.Rule = r.ID
	out.Source, out.Force, out.Evidence = sourceOf(r.Head)
	out.Evidence = v.gradeOfValue(r.Head, l.line.Quantity)
	settled := true
	var printed outcomes
	if len(r.Body.Bands) > 0 {
		printed = v.outcomes(r.Body, x, quantity.FromInt(1), u)
		settled = printed.determined()
		v.print(&out, l, printed, unit != "" && !v.surely(l.line.NoAmountIf), u)
	}
	if r.Body.Percent != nil && l.line.Percent != "none" && !v.surely(l.line.NoPercentIf) {
		p, one := v.percent(l, r, x, printed)
		out.PercentReference = p
		settled = settled && (one || !v.percentMust(l.line))
	}
	if l.line.Quantity == "energy" || v.isEnergy(l.line.Quantity) {
		v.energyAlternatives(&out, l, c, r.Body, u)
	}
	if v.c.request.Detail == "contributions" {
		out.Contributions = v.contributions(l.line.Quantity, c, u)
	}
	return out, settled
}

// percentMust tells whether the per cent must stand beside a line's amount.
func (v *view) percentMust(l *rulebook.Line) bool {
	return l.Percent != "optional" || v.surely(l.PercentIf)
}

// surely tells whether a line has a condition that holds.
func (v *view) surely(c *rulebook.Condition) bool { return c != nil && v.truth(c) == quantity.Yes }

func (o *Value) setExact(r quantity.Ratio) {
	x := r.Exact()
	o.Exact, o.Truncated = &x.Text, x.Truncated
	if x.Truncated {
		o.Ratio = []string{x.Num, x.Den}
	}
}

// print fills in what stands on the label: one text, or the range of texts that are possible.
func (v *view) print(out *Value, l *lineState, printed outcomes, amount bool, u quantity.Unit) {
	if len(printed) == 0 || !amount {
		return
	}
	format := func(lang string, p declare.Printed) string { return l.text(p, u, lang) }
	lang := v.language()
	first, last := printed[0].Printed, printed[len(printed)-1].Printed
	if !printed.determined() {
		out.Text = format(lang, first) + " to " + format(lang, last)
		return
	}
	out.Text = format(lang, first)
	if !first.LessThan {
		s := first.Value.String()
		out.Declared = &s
	}
	for _, a := range printed[0].Alternatives {
		out.Alternatives = append(out.Alternatives, format(lang, a))
	}
	if f := l.rule.Body.Number[lang]; first.LessThan && f.OrLessThan != "" {
		f.LessThan = f.OrLessThan
		out.Alternatives = append(out.Alternatives, declare.Text(first, l.shown(u, lang), f))
	}
	out.Texts = v.otherTexts(l, first, u, out.Text)
}

// otherTexts is what a line prints in the languages where that differs from the first.
func (v *view) otherTexts(l *lineState, p declare.Printed, u quantity.Unit, first string) map[string]string {
	var out map[string]string
	numbers := l.rule.Body.Number
	lang := v.language()
	last, text := numbers[lang], first
	for _, other := range v.law.Market.Languages[1:] {
		if f := numbers[other]; f != last || l.line.ShownUnit != nil {
			last, text = f, l.text(p, u, other)
		}
		if text == first {
			continue
		}
		if out == nil {
			out = map[string]string{}
		}
		out[other] = text
	}
	return out
}

func (v *view) isEnergy(q string) bool {
	_, ok := v.law.Energy.Get(q)
	return ok
}

// energyAlternatives prints what the other lawful methods give, where it differs.
func (v *view) energyAlternatives(out *Value, l *lineState, c column, r *rulebook.Rounding, u quantity.Unit) {
	e, _ := v.law.Energy.Get(l.line.Quantity)
	for i := range e.Body.Methods[1:] {
		method := &e.Body.Methods[i+1]
		q, ok := v.subject.energy("", method)
		if !ok {
			continue
		}
		o := v.outcomes(r, q, c.share, u)
		if !o.determined() {
			continue
		}
		if s := l.text(o[0].Printed, u, v.language()); s != out.Text {
			out.Alternatives = append(out.Alternatives, s+" ("+method.Method+")")
		}
	}
}

// percent is the per cent of the reference value, from the amount the law names first.
func (v *view) percent(l *lineState, r rulebook.Active[rulebook.Rounding], x quantity.Linear, printed outcomes) (*Percent, bool) {
	rv, ok := v.ReferenceValue(l.line.Quantity)
	if !ok {
		return nil, true
	}
	ref, _ := v.law.ReferenceOf(l.line.Quantity)
	p := r.Body.Percent
	per := quantity.FromInt(100).Quo(rv)
	if len(p.Times) > 0 {
		f, missing := claim.Weigh(p.Times, v)
		if missing != "" {
			return nil, false
		}
		per = per.Mul(f)
	}
	out := &Percent{Reference: ref.Body.Text(v.population(ref.Body)), Rule: ref.ID, Source: ref.Body.Source(ref.Head, v.population(ref.Body)).Ref}
	if mid, known := x.Central(); known {
		out.Exact = text(mid.Mul(per))
	}
	o, settled := v.percentOf(p.From, l, p, r.Body.Ties, x, printed, per)
	if len(o) == 0 {
		return out, false
	}
	if !settled {
		out.Text = percentText(o[0].Printed) + " to " + percentText(o[len(o)-1].Printed)
		return out, false
	}
	out.Text = percentText(o[0].Printed)
	s := o[0].Printed.Value.String()
	out.Declared = &s
	for _, a := range o[0].Alternatives {
		out.Alternatives = append(out.Alternatives, percentText(a))
	}
	if p.Or != "" {
		if other, one := v.percentOf(p.Or, l, p, r.Body.Ties, x, printed, per); one && !other[0].Printed.Equal(o[0].Printed) {
			out.Alternatives = append(out.Alternatives, percentText(other[0].Printed)+" (from the "+p.Or+" amount)")
		}
	}
	return out, true
}

func percentText(p declare.Printed) string {
	s := p.Value.String() + " %"
	if p.LessThan {
		s = "less than " + s
	}
	return s
}

// percentOf computes per cents from exact amounts or from declared ones.
func (v *view) percentOf(from string, l *lineState, p *rulebook.Percent, ties quantity.Ties, x quantity.Linear, printed outcomes, per quantity.Ratio) (outcomes, bool) {
	zero := quantity.No
	if p.ZeroIf != nil {
		zero = v.truth(p.ZeroIf)
	}
	if zero == quantity.Yes {
		return outcomes{{Printed: declare.Printed{}}}, true
	}
	var values []quantity.Ratio
	if from == "declared" && len(printed) > 0 {
		u := v.unit(l.line.Quantity)
		for i := range printed {
			d := printed[i].Printed
			if d.LessThan {
				values = append(values, x.Low(), x.High()) // "less than 5 mg" is no number to take a share of
				continue
			}
			values = append(values, quantity.Amount{Value: d.Value, Unit: u}.Ratio())
		}
	} else if values = append(values, x.Low()); !x.Determined() {
		values = append(values, x.High())
	}
	var out outcomes
	for _, value := range values {
		out = append(out, declare.Round(p.Bands, ties, value.Mul(per), quantity.PerCent, v.truth)...)
	}
	if zero == quantity.Open {
		out = append(outcomes{{Printed: declare.Printed{}}}, out...)
	}
	return out, out.determined()
}

// contributions is what each ingredient brings to a quantity on a column.
func (v *view) contributions(q string, c column, u quantity.Unit) []Contribution {
	var out []Contribution
	for i, l := range v.subject.batch.Leaves {
		amount, ok := v.subject.contribution(q, i)
		if !ok {
			return nil
		}
		x := c.on(amount).Mul(quantity.FromInt(1).In(u))
		one := Contribution{Ingredient: strings.TrimSpace(l.Path), Low: exactText(x.Low()), High: exactText(x.High())}
		if mid, known := x.Central(); known {
			one.Value = text(mid)
		}
		out = append(out, one)
	}
	return out
}

// contribution is one leaf's part of a quantity, energy included.
func (p *product) contribution(q string, leaf int) (quantity.Linear, bool) {
	e, ok := p.m.law.Energy.Get(q)
	if !ok {
		parts, ok := p.parts(q)
		if !ok {
			return quantity.Linear{}, false
		}
		return parts[leaf].amount, true
	}
	var sum quantity.Linear
	for _, t := range e.Body.Methods[0].Terms() {
		parts, ok := p.parts(t.Name)
		if !ok {
			return quantity.Linear{}, false
		}
		sum = sum.Add(parts[leaf].amount.Mul(t.Factor))
	}
	return sum, true
}
