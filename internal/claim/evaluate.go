// Package claim decides legal conditions: comparisons of linear forms over a composition, and their combinations. Every
// answer is three-valued, and every comparison says how far the product is inside or outside its threshold.
package claim

import (
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
	// Meets answers whether the food meets a claim's condition.
	Meets(id string) quantity.Truth
}

// A Context answers what conditions ask beside numbers.
type Context interface {
	Product() Subject
	Reference() (Subject, bool)
	Name(quantity string) string // in words
	EnergyFactor(quantity string) (f quantity.Ratio, ok bool)
	ReferenceValue(quantity string) (v quantity.Ratio, ok bool)
	Declared(quantity, is string) quantity.Truth // "" asks whether the line stands
	Fact(name, is string) quantity.Truth
	ReferenceAmount(atMost []quantity.Amount) quantity.Truth
	ClaimedAbout(subjects []string) quantity.Truth
	NoIngredient(c *rulebook.Condition) quantity.Truth
	ReferenceKind(kinds []string) quantity.Truth // open without a reference food
}

// A Result is the decision on a condition, with the parts that led to it.
type Result struct {
	Truth   quantity.Truth
	Op      rulebook.Op
	Says    string
	Parts   []Result
	Compare *Comparison
	Missing string // what would have to be known, where that is not a number
}

// Evaluate decides a condition. A nil condition holds.
func Evaluate(c *rulebook.Condition, x Context) Result {
	if c == nil {
		return Result{Truth: quantity.Yes, Op: rulebook.OpAll}
	}
	r := decide(c, x)
	r.Op = c.Op
	if c.Says != nil {
		r.Says = c.Says.In("en")
	}
	return r
}

func decide(c *rulebook.Condition, x Context) Result {
	switch c.Op {
	case rulebook.OpCompare:
		return compare(c, x)
	case rulebook.OpAll:
		return combine(c, x, quantity.All)
	case rulebook.OpAny:
		return combine(c, x, quantity.Any)
	case rulebook.OpCount:
		return combine(c, x, func(t ...quantity.Truth) quantity.Truth { return quantity.AtLeast(c.N, t...) })
	case rulebook.OpNot:
		return combine(c, x, func(t ...quantity.Truth) quantity.Truth { return t[0].Not() })
	case rulebook.OpWhen:
		return when(c, x)
	}
	return atom(c, x)
}

func combine(c *rulebook.Condition, x Context, of func(...quantity.Truth) quantity.Truth) Result {
	r := Result{Parts: make([]Result, len(c.Parts))}
	truths := make([]quantity.Truth, len(c.Parts))
	for i, p := range c.Parts {
		r.Parts[i] = Evaluate(p, x)
		truths[i] = r.Parts[i].Truth
	}
	r.Truth = of(truths...)
	return r
}

// when takes the branch the guard points to. With the guard open, the branches must agree.
func when(c *rulebook.Condition, x Context) Result {
	guard := Evaluate(c.Parts[0], x)
	switch guard.Truth {
	case quantity.Yes:
		return taken(guard, Evaluate(c.Parts[1], x))
	case quantity.No:
		return taken(guard, Evaluate(c.Parts[2], x))
	}
	then, other := Evaluate(c.Parts[1], x), Evaluate(c.Parts[2], x)
	r := Result{Parts: []Result{guard, then, other}}
	if then.Truth == other.Truth {
		r.Truth = then.Truth
	}
	return r
}

func taken(guard, branch Result) Result {
	if len(branch.Parts) == 0 && branch.Compare == nil && branch.Says == "" {
		return Result{Truth: branch.Truth} // an empty branch
	}
	return Result{Truth: branch.Truth, Parts: []Result{branch}}
}

func atom(c *rulebook.Condition, x Context) Result {
	switch c.Op {
	case rulebook.OpDeclared:
		return Result{Truth: x.Declared(c.Name, c.Is), Says: declaredSays(c, x)}
	case rulebook.OpMeets:
		return meets(c, x)
	case rulebook.OpFact:
		t := x.Fact(c.Name, c.Is)
		r := Result{Truth: t, Says: c.Name + ": " + c.Is}
		if t == quantity.Open {
			r.Missing = "the fact " + quote(c.Name)
		}
		return r
	case rulebook.OpAmount:
		r := Result{Truth: x.ReferenceAmount(c.Amounts), Says: amountSays(c)}
		if r.Truth == quantity.Open {
			r.Missing = "the reference amount"
		}
		return r
	case rulebook.OpKind:
		r := Result{Truth: x.ReferenceKind(c.Kinds), Says: "the reference food is " + list(c.Kinds)}
		if r.Truth == quantity.Open {
			r.Missing = "the reference food"
		}
		return r
	case rulebook.OpAbout:
		return Result{Truth: x.ClaimedAbout(c.About), Says: "claimed about " + list(c.About)}
	default:
		return Result{Truth: x.NoIngredient(c), Says: ingredientSays(c)}
	}
}

func meets(c *rulebook.Condition, x Context) Result {
	r := Result{Says: "meets " + quote(rulebook.Name(c.Name))}
	s := x.Product()
	if c.Subject == "reference food" {
		r.Says = "the reference food meets " + quote(rulebook.Name(c.Name))
		ref, ok := x.Reference()
		if !ok {
			r.Missing = "the reference food"
			return r
		}
		s = ref
	}
	r.Truth = s.Meets(c.Name)
	return r
}
