package check

import (
	"slices"
	"strings"

	"gramlaw/internal/claim"
	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// judged checks what must hold for the product to be sold, or of its serving and package. What holds leaves no finding.
func (m *market) judged(kind string, rules []rulebook.Active[rulebook.Limit]) []Finding {
	var out []Finding
	v := m.as(m.product)
	for _, l := range rules {
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
		f := Finding{Kind: kind, Severity: l.Body.Severity, Code: l.Body.Code, Says: l.Body.Says.In("en"), Condition: &c, Rule: l.ID, Source: l.Head.Source.Ref}
		switch {
		case where == quantity.Open && kind == "serving" && v.lacksSizesOnly(l.Body.Where):
			continue // packaging has said so
		case where == quantity.Open && kind == "serving":
			f.Severity, f.Says = "note", "where it applies: "+f.Says
		case r.Truth == quantity.Open && kind == "serving":
			continue // nothing is known of the package: packaging has said so
		case r.Truth == quantity.Open || where == quantity.Open:
			f.Severity, f.Says = "open", "not determined: "+f.Says
		}
		out = append(out, f)
	}
	return out
}

// lacksSizesOnly tells whether a condition is open for nothing but a size of package, unit, serving or surface.
func (v *view) lacksSizesOnly(c *rulebook.Condition) bool {
	needs := v.needsFor(c)
	return len(needs) > 0 && !slices.ContainsFunc(needs, func(n string) bool { return !strings.HasPrefix(n, "the mass of") })
}

// packaging finds a package whose net quantity nobody stated.
func (m *market) packaging() []Finding {
	p := m.c.recipe.Package
	switch {
	case p == nil && len(m.law.Serving.All) > 0:
		return []Finding{{Kind: "serving", Severity: "note", Code: "package-not-described", Says: "no package is described, so what depends on it (servings per package, single servings, formats) is not judged"}}
	case p == nil || p.Net != nil:
		return nil
	}
	return []Finding{{Kind: "serving", Severity: "warning", Code: "package-without-net-quantity", Pointer: "/package", Says: "the package has no net quantity, so servings per package and single servings cannot be judged"}}
}

// naming lists how ingredients must be named and which reserved names the product may bear.
func (m *market) naming() []Naming {
	out := []Naming{}
	v := m.as(m.product)
	for _, n := range m.law.Naming.All {
		if n.Body.Where != nil && v.truth(n.Body.Where) != quantity.Yes {
			continue
		}
		one := Naming{Name: n.Body.Name.In("en"), Says: n.Body.Says.In("en"), Rule: n.ID, Source: n.Head.Source.Ref}
		if n.Body.Ingredients == nil {
			t := v.truth(n.Body.Condition)
			if one.Holds = truthPointer(t); t != quantity.No {
				out = append(out, one)
			}
			continue
		}
		for _, l := range m.product.batch.Leaves {
			if l.Ingredient == nil {
				continue
			}
			t := m.matches(n.Body.Ingredients, l)
			if one.Holds, one.Ingredient = truthPointer(t), l.Path; t != quantity.No {
				out = append(out, one)
			}
		}
	}
	return out
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
			profile := acids(byAcids, d.Body, l)
			stated, _ := components(byStated, l)
			if apart(profile, stated) {
				out = append(out, Finding{Kind: "definition", Severity: "warning", Code: "profile-against-stated", Pointer: l.Pointer, Rule: d.ID,
					Says: l.Path + ": the stated " + c.Tag + " and the fatty-acid profile differ by more than 5 %; anything from the one to the other was taken"})
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
		e, mass := f.Unit.GramExponent()
		if !ok || !mass {
			continue // energy is each law's own
		}
		scale := per.Mul(quantity.Scaled(1, -int32(e)))
		total := c.batch.Total(f.ID).Mul(scale)
		most := quantity.FromInt(100).Mul(quantity.Scaled(1, -int32(e))) // no food holds more than itself
		one := Component{Low: exactText(quantity.Max(total.Low(), quantity.Ratio{})), High: exactText(quantity.Min(total.High(), most)), Unit: string(f.Unit),
			Coverage: c.batch.Coverage(f.ID).Brief(4)}
		if v, ok := total.Central(); ok {
			one.Value = text(v)
		}
		out.Components[tag] = one
	}
	return out
}
