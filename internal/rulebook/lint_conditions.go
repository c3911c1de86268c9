package rulebook

import (
	"fmt"
	"slices"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// A Per is a parsed basis: an amount of the food, of energy, or of a quantity.
type Per struct {
	Name     string          // "serving", "reference amount", "package", "unit", "daily intake"; else ""
	Amount   quantity.Amount // otherwise: 100 g, 100 mL, 100 kcal, 1 MJ as 1000 kJ
	Quantity string          // "fat" in "100 g fat"; "" is the food

	base quantity.Ratio // Amount in base units
}

// Base is the amount in base units.
func (p *Per) Base() quantity.Ratio { return p.base }

// Grams is the mass of an amount of the food; false for a volume, for energy and for what has a name.
func (p *Per) Grams() (quantity.Ratio, bool) {
	return p.base, p.Quantity == "" && p.Name == "" && p.Amount.Unit.Dimension() == quantity.Mass
}

// ParsePer reads a basis: "serving", "reference amount", "package", "unit", "daily intake", "100 g", "50 g", "100 mL", "100 kcal", "1 MJ",
// "100 g fat", "100 g fatty acids".
func ParsePer(s string) (Per, error) {
	switch s {
	case "serving", "reference amount", "package", "unit", "daily intake":
		return Per{Name: s}, nil
	case "1 MJ":
		return PerAmount(quantity.Amount{Value: decimal.New(1000, 0), Unit: quantity.Kilojoule}), nil
	}
	words := strings.SplitN(s, " ", 3)
	if len(words) < 2 {
		return Per{}, fmt.Errorf("%q is no basis", s)
	}
	a, err := quantity.ParseAmount(words[0] + " " + words[1])
	if err != nil || !a.Value.IsPositive() || a.Unit.Dimension() == quantity.Percent {
		return Per{}, fmt.Errorf("%q is no basis", s)
	}
	p := PerAmount(a)
	if len(words) == 3 {
		p.Quantity = strings.ReplaceAll(words[2], " ", "-")
	}
	return p, nil
}

// PerAmount is an amount as a basis.
func PerAmount(a quantity.Amount) Per { return Per{Amount: a, base: a.Ratio()} }

// Shares are the denominators a comparison can name besides bases.
var Shares = []string{"share of energy", "share of energy in kJ", "share of fatty acids", "share of fat", "share of reference value"}

func (c *checker) depend(from, on string) {
	if !slices.Contains(c.deps[from], on) {
		c.deps[from] = append(c.deps[from], on)
	}
}

// condition checks one condition that the result of node depends on.
func (c *checker) condition(kind, id, field, node string, cond *Condition) {
	cond.Walk(func(p *Condition) {
		bad := func(format string, args ...any) { c.bad(kind, id, field, format, args...) }
		switch p.Op {
		case OpCompare:
			c.compare(kind, id, field, node, p)
		case OpDeclared:
			c.quantity(kind, id, field, p.Name, quantity.NoDimension)
			if p.Is == "" {
				c.depend(node, "line/"+p.Name)
			} else {
				c.depend(node, "declared/"+p.Name)
			}
		case OpMeets:
			c.meets(kind, id, field, node, p)
		case OpCount:
			if p.N < 1 || p.N > len(p.Parts) {
				bad("%d of %d conditions cannot hold", p.N, len(p.Parts))
			}
		case OpHolds:
			if _, ok := c.conditions[p.Name]; !ok {
				bad("%q is no condition of this market", p.Name)
			}
			c.depend(node, "condition/"+Name(p.Name))
		case OpSize:
			c.size(kind, id, field, p)
		case OpFact:
			if p.Is == "" && p.Has == "" && !p.Stated && p.Relation == "" {
				bad("the fact %q is compared with nothing", p.Name)
			}
			if p.Relation.Relative() {
				bad("a measured fact is compared with an amount only")
			}
		case OpUndecided:
			c.words(kind, id, field+"/undecided", p.Why)
		case OpCategory:
			c.categories(kind, id, field, p.Kinds)
		case OpKind:
			if len(p.Kinds) == 0 {
				bad("reference food is compared with no kind")
			}
		case OpAmount:
			if len(p.Amounts) == 0 {
				bad("reference amount is compared with nothing")
			}
		}
	})
}

func (c *checker) categories(kind, id, field string, names []string) {
	if len(names) == 0 {
		c.bad(kind, id, field, "the category is compared with none")
	}
	for _, name := range names {
		if !slices.ContainsFunc(c.m.ReferenceAmounts, func(r Rule[ReferenceAmount]) bool { return Name(r.ID) == name }) {
			c.bad(kind, id, field, "%q is no category of this market", name)
		}
	}
}

// relative tells whether a condition compares with a reference food, by itself or through conditions that it points at; and whether it
// does that at least through another claim, which may hold without one.
func (c *checker) relative(cond *Condition) (compares, reaches bool) {
	seen := map[string]bool{}
	var look func(*Condition)
	look = func(cond *Condition) {
		cond.Walk(func(p *Condition) {
			compares = compares || p.comparesFoods()
			if p.Op == OpMeets && p.Subject == "" {
				reaches = reaches || c.comparesClaim(p.Name)
			}
			if p.Op != OpHolds || seen[p.Name] {
				return
			}
			seen[p.Name] = true
			if named, ok := c.conditions[p.Name]; ok {
				for i := range named.Versions {
					look(named.Versions[i].Body.Condition)
				}
			}
		})
	}
	look(cond)
	return compares, compares || reaches
}

// comparesClaim tells whether a version of a claim compares with a reference food.
func (c *checker) comparesClaim(id string) bool {
	claim, ok := c.claimed[id]
	if !ok {
		return false
	}
	for i := range claim.Versions {
		if claim.Versions[i].Body.Against {
			return true
		}
	}
	return false
}

func (c *checker) meets(kind, id, field, node string, p *Condition) {
	if _, ok := c.claimed[p.Name]; !ok {
		c.bad(kind, id, field, "%q is no claim of this market", p.Name)
	}
	if p.Subject == "" {
		c.depend(node, "claim/"+Name(p.Name))
	}
}

// times checks what a form is weighed by.
func (c *checker) times(kind, id, field string, list Times) {
	for i := range list {
		w := &list[i]
		if w.Fact == "" || w.AtMost != nil && w.AtMost.Unit.Dimension() != quantity.Percent {
			c.bad(kind, id, field+"/times", "names a fact, and caps it in per cent")
		}
	}
}

func (c *checker) size(kind, id, field string, p *Condition) {
	if !slices.Contains([]string{"package", "serving", "unit", "surface"}, p.Name) {
		c.bad(kind, id, field, "%q is none of package, serving, unit, surface", p.Name)
	}
	dim := p.Threshold.Unit.Dimension()
	switch {
	case p.Stated:
	case p.Name == "surface" && p.As == "" && dim == quantity.Area:
	case p.Name == "surface":
		c.bad(kind, id, field, "a surface is compared with cm2, not with %s", p.Threshold)
	case slices.Contains([]string{"share of reference amount", "share of package", "share of unit"}, p.As) && dim == quantity.Percent:
	case p.As == "" && (dim == quantity.Mass || dim == quantity.Volume):
	default:
		c.bad(kind, id, field, "compares with %s as %q; a mass, a volume or a share of reference amount is wanted", p.Threshold, p.As)
	}
	if p.Relation.Relative() {
		c.bad(kind, id, field, "a size is compared with an amount only")
	}
}

func (c *checker) compare(kind, id, field, node string, p *Condition) {
	bad := func(format string, args ...any) { c.bad(kind, id, field, format, args...) }
	dim := quantity.NoDimension
	for _, q := range sorted(p.Of) {
		c.quantity(kind, id, field, q, dim)
		dim = c.dims[q]
		c.depend(node, "quantity/"+q)
	}
	for _, s := range p.Per {
		per, err := ParsePer(s)
		if err != nil {
			bad("%v", err)
		}
		if per.Quantity != "" {
			c.quantity(kind, id, field, per.Quantity, quantity.Mass)
		}
	}
	c.times(kind, id, field, p.Times)
	want := dim
	switch {
	case p.As != "" && !slices.Contains(Shares, p.As):
		bad("%q is none of %s", p.As, strings.Join(Shares, ", "))
	case p.As != "":
		want = quantity.Percent
	case p.Relation == ReducedBy || p.Relation == IncreasedBy:
		want = quantity.Percent
	}
	if p.Relation != NotMore && p.Threshold.Unit.Dimension() != want {
		bad("the threshold %s has the wrong dimension", p.Threshold)
	}
	if len(p.Per) == 0 && (p.As == "" || p.As == "share of reference value") && !p.Relation.Relative() {
		bad("comparison has no basis")
	}
	if p.As == "share of fatty acids" {
		c.quantity(kind, id, field, "fatty-acids", quantity.Mass)
	}
}
