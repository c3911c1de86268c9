// Package claim decides legal conditions: comparisons of linear forms over a composition, and their combinations. Every
// answer is three-valued, and every comparison says how far the product is inside or outside its threshold.
package claim

import (
	"strings"

	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A Subject is a food a condition speaks of.
type Subject interface {
	// Quantity is the food's content of a quantity of the law, in base units, in the whole batch.
	Quantity(name string) (quantity.Linear, bool)
	// From is the part of a quantity that comes from an origin.
	From(name, origin string) (quantity.Linear, bool)
	// Mass is the batch's mass in g.
	Mass() quantity.Ratio
	// Basis is the mass in g of "serving", "reference amount", "package" or of a volume; false when it is not known.
	Basis(p rulebook.Per) (quantity.Ratio, bool)
	// Meets answers whether the food, by itself, meets a claim's condition.
	Meets(id string) quantity.Truth
}

// A Context answers what conditions ask beside numbers.
type Context interface {
	Product() Subject
	Reference() (Subject, bool)
	Meets(id string) quantity.Truth                                   // whether the product meets a claim's condition, beside the reference food if there is one
	Name(quantity string) string                                      // in words
	EnergyFactor(quantity, energy string) (f quantity.Ratio, ok bool) // per g, in the unit of the energy
	ReferenceValue(quantity string) (v quantity.Ratio, ok bool)
	Declared(quantity, is string) quantity.Truth // "" asks whether the line stands
	Fact(name, is string) quantity.Truth
	Has(name, item string) quantity.Truth        // a fact that is a list
	Stated(name string) bool                     // whether the recipe states the fact
	Measured(name string) (quantity.Ratio, bool) // a fact that is an amount, in base units
	ReferenceAmount(atMost []quantity.Amount) quantity.Truth
	ClaimedAbout(subjects []string, onLabel bool) quantity.Truth
	Named(id string) (*rulebook.Condition, bool) // a condition that has a rule of its own
	NoIngredient(c *rulebook.Condition) (t quantity.Truth, missing string)
	ReferenceKind(kinds []string) quantity.Truth // open without a reference food
	Category(names []string) quantity.Truth      // open where no category is stated
	// Size is the mass in g of the package, the serving or one unit, or the surface in cm².
	Size(name string) (quantity.Ratio, bool)
}

// A Result is the decision on a condition, with the parts that led to it.
type Result struct {
	Truth   quantity.Truth
	Op      rulebook.Op
	Says    string
	Parts   []Result
	N       int // of a count: how many parts must hold
	Compare *Comparison
	Missing string // what would have to be known, where that is not a number
}

// Evaluate decides a condition and keeps every part, with its words and numbers. A nil condition holds.
func Evaluate(c *rulebook.Condition, x Context) Result { return evaluator{x}.evaluate(c) }

type evaluator struct{ Context }

func (x evaluator) evaluate(c *rulebook.Condition) Result {
	if c == nil {
		return Result{Truth: quantity.Yes, Op: rulebook.OpAll}
	}
	r := x.explain(c)
	r.Op, r.N = c.Op, c.N
	if c.Says != nil {
		r.Says = c.Says.In("en")
	}
	return r
}

func (x evaluator) explain(c *rulebook.Condition) Result {
	switch c.Op {
	case rulebook.OpCompare:
		return x.compare(c)
	case rulebook.OpAll, rulebook.OpAny, rulebook.OpCount, rulebook.OpNot:
		return x.combine(c)
	case rulebook.OpWhen:
		return x.when(c)
	case rulebook.OpHolds:
		if named, ok := x.Named(c.Name); ok {
			return taken(x.evaluate(named))
		}
		return Result{Truth: quantity.No}
	}
	return x.atom(c)
}

func (x evaluator) combine(c *rulebook.Condition) Result {
	r := Result{Parts: make([]Result, len(c.Parts))}
	truths := make([]quantity.Truth, len(c.Parts))
	for i, p := range c.Parts {
		r.Parts[i] = x.evaluate(p)
		truths[i] = r.Parts[i].Truth
	}
	r.Truth = united(c, truths)
	return r
}

func united(c *rulebook.Condition, truths []quantity.Truth) quantity.Truth {
	switch c.Op {
	case rulebook.OpAny:
		return quantity.Any(truths...)
	case rulebook.OpCount:
		return quantity.AtLeast(c.N, truths...)
	case rulebook.OpNot:
		return truths[0].Not()
	}
	return quantity.All(truths...)
}

// when takes the branch the guard points to. With the guard open, the branches must agree.
func (x evaluator) when(c *rulebook.Condition) Result {
	guard := x.evaluate(c.Parts[0])
	switch guard.Truth {
	case quantity.Yes:
		return taken(x.evaluate(c.Parts[1]))
	case quantity.No:
		return taken(x.evaluate(c.Parts[2]))
	}
	then, other := x.evaluate(c.Parts[1]), x.evaluate(c.Parts[2])
	r := Result{Parts: []Result{guard, then, other}}
	if then.Truth == other.Truth {
		r.Truth = then.Truth
	}
	return r
}

func taken(branch Result) Result {
	if len(branch.Parts) == 0 && branch.Compare == nil && branch.Says == "" {
		return Result{Truth: branch.Truth} // an empty branch
	}
	return Result{Truth: branch.Truth, Parts: []Result{branch}}
}

func (x evaluator) atom(c *rulebook.Condition) Result {
	r := x.ask(c)
	r.Says = atomSays(c, x)
	return r
}

// ask puts a condition without parts to the context; missing is what an open answer lacks.
func (x evaluator) ask(c *rulebook.Condition) Result {
	if c.Op == rulebook.OpIngredient {
		t, missing := x.NoIngredient(c)
		return Result{Truth: t, Missing: missing}
	}
	r := Result{Truth: x.askTruth(c)}
	if r.Truth == quantity.Open {
		r.Missing = x.lacks(c)
	}
	return r
}

func (x evaluator) askTruth(c *rulebook.Condition) quantity.Truth {
	switch c.Op {
	case rulebook.OpDeclared:
		return x.Declared(c.Name, c.Is)
	case rulebook.OpMeets:
		return x.meets(c)
	case rulebook.OpFact:
		return x.fact(c)
	case rulebook.OpAmount:
		return x.ReferenceAmount(c.Amounts)
	case rulebook.OpSize:
		return x.size(c)
	case rulebook.OpKind:
		return x.ReferenceKind(c.Kinds)
	case rulebook.OpAbout:
		return x.ClaimedAbout(c.About, c.Label)
	case rulebook.OpUndecided:
		return quantity.Open
	case rulebook.OpCategory:
		t := x.Category(c.Kinds)
		if c.Stated && t == quantity.Open {
			return quantity.No
		}
		return t
	default:
		t, _ := x.NoIngredient(c)
		return t
	}
}

// lacks names what an open answer lacks.
func (x evaluator) lacks(c *rulebook.Condition) string {
	switch c.Op {
	case rulebook.OpFact:
		return "the fact " + quote(c.Name)
	case rulebook.OpAmount:
		return "the reference amount"
	case rulebook.OpSize:
		return "the mass of the " + c.Name
	case rulebook.OpKind:
		return "the reference food"
	case rulebook.OpUndecided:
		return c.Why.In("en")
	case rulebook.OpCategory:
		return "the category"
	case rulebook.OpMeets:
		if _, ok := x.Reference(); c.Subject == "reference food" && !ok {
			return "the reference food"
		}
	}
	return ""
}

func (x evaluator) fact(c *rulebook.Condition) quantity.Truth {
	switch {
	case c.Is != "":
		return x.Fact(c.Name, c.Is)
	case c.Has != "":
		return x.Has(c.Name, c.Has)
	case c.Stated:
		return quantity.TruthOf(x.Stated(c.Name))
	}
	v, ok := x.Measured(c.Name)
	if !ok {
		return quantity.Open
	}
	return sign(c.Relation, quantity.Exactly(v.Sub(c.Limit())))
}

// size compares package, serving or unit with a mass, a volume or a share of the reference amount.
func (x evaluator) size(c *rulebook.Condition) quantity.Truth {
	size, ok := x.Size(c.Name)
	if c.Stated {
		return quantity.TruthOf(ok)
	}
	if !ok {
		return quantity.Open
	}
	if c.Name == "surface" {
		return sign(c.Relation, quantity.Exactly(size.Sub(c.Limit())))
	}
	per := rulebook.PerAmount(c.Threshold)
	share := quantity.FromInt(1)
	if of, ok := strings.CutPrefix(c.As, "share of "); ok {
		per, share = rulebook.Per{Name: of}, quantity.FromDecimal(c.Threshold.Value.Shift(-2))
	}
	limit, ok := x.Product().Basis(per)
	if !ok {
		return quantity.Open
	}
	return sign(c.Relation, quantity.Exactly(size.Sub(limit.Mul(share))))
}

func (x evaluator) meets(c *rulebook.Condition) quantity.Truth {
	if c.Subject != "reference food" {
		return x.Meets(c.Name)
	}
	ref, ok := x.Reference()
	if !ok {
		return quantity.Open
	}
	return ref.Meets(c.Name)
}
