package check

import (
	"gramlaw/internal/claim"
	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// limits checks what must hold for the product to be sold. A limit that holds leaves no finding.
func (m *market) limits() []Finding {
	var out []Finding
	v := m.as(m.product)
	for _, l := range m.law.Limits.All {
		where := quantity.Yes
		if l.Body.Where != nil {
			where = v.truth(l.Body.Where)
		}
		if where == quantity.No {
			continue
		}
		r := claim.Evaluate(l.Body.Condition, v)
		if r.Truth == quantity.Yes {
			continue
		}
		c := m.condition(r)
		f := Finding{Kind: "limit", Severity: l.Body.Severity, Code: l.Body.Code, Says: l.Body.Says.In("en"), Condition: &c, Rule: l.ID, Source: l.Head.Source.Ref}
		if r.Truth == quantity.Open || where == quantity.Open {
			f.Severity = "open"
			f.Says = "not determined: " + f.Says
		}
		out = append(out, f)
	}
	return append(out, m.profileAgainstStated()...)
}

// profileAgainstStated finds a stated total that differs by more than 5 % from what the profile gives.
func (m *market) profileAgainstStated() []Finding {
	var out []Finding
	for _, d := range m.law.Definitions.All {
		var byAcids, byStated *rulebook.Way
		for i := range d.Body.Ways {
			w := &d.Body.Ways[i]
			switch {
			case w.Acids != nil && !w.Acids.Every:
				byAcids = w
			case len(w.Sum) == 1 && byStated == nil:
				byStated = w
			}
		}
		if byAcids == nil || byStated == nil {
			continue
		}
		for _, l := range m.product.batch.Leaves {
			c, _ := food.ByID(byStated.Parts()[0].ID)
			if !l.HasProfile() || !l.Knows(c.ID) {
				continue
			}
			profile := acids(byAcids.Class(), false, d.Body.ExpressedAs == "triglyceride", l)
			stated, _ := components(byStated, l)
			if apart(profile, stated) {
				out = append(out, Finding{Kind: "definition", Severity: "warning", Code: "profile-against-stated", Pointer: l.Pointer, Rule: d.ID,
					Says: l.Path + ": the stated " + c.Tag + " and the fatty-acid profile differ by more than 5 %; the profile was taken"})
			}
		}
	}
	return out
}

// apart tells whether two ranges stay more than 5 % of the stated value from each other.
func apart(a, b quantity.Linear) bool {
	gap := quantity.Max(a.Low().Sub(b.High()), b.Low().Sub(a.High()))
	return gap.Sign() > 0 && gap.Mul(quantity.FromInt(20)).Cmp(b.High()) > 0
}

// contents is the composition per 100 g, for the components the declarations speak of.
func (c *checker) contents(tags map[string]bool) Contents {
	out := Contents{Per: "100 g", Mass: exactText(c.batch.Mass) + " g", Components: map[string]Component{}}
	for _, tag := range []string{"WATER", "FAT", "FASAT", "FATRN", "CHOLE"} {
		tags[tag] = true
	}
	per := quantity.FromInt(100).Quo(c.batch.Mass)
	for tag := range tags {
		f, ok := food.Lookup(tag)
		if !ok {
			continue
		}
		scale := per
		if e, ok := f.Unit.GramExponent(); ok {
			scale = per.Mul(quantity.Scaled(1, -int32(e)))
		}
		total := c.batch.Total(f.ID).Mul(scale)
		one := Component{Low: exactText(quantity.Max(total.Low(), quantity.Ratio{})), High: exactText(total.High()), Unit: string(f.Unit),
			Coverage: c.batch.Coverage(f.ID).Brief(4)}
		if v, ok := total.Central(); ok {
			one.Value = text(v)
		}
		out.Components[tag] = one
	}
	return out
}
