package rulebook

import (
	"slices"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// Op is the kind of a condition.
type Op string

// Kinds of conditions.
const (
	OpCompare    Op = "compare"
	OpDeclared   Op = "declared"
	OpMeets      Op = "meets"
	OpFact       Op = "fact"
	OpAmount     Op = "reference amount"
	OpAbout      Op = "claimed about"
	OpIngredient Op = "no ingredient"
	OpKind       Op = "reference food is"
	OpSize       Op = "size of"
	OpHolds      Op = "holds"
	OpAll        Op = "all"
	OpAny        Op = "any"
	OpNot        Op = "not"
	OpCount      Op = "count"
	OpWhen       Op = "when"
	OpUndecided  Op = "undecided"
	OpCategory   Op = "category is"
)

// A Condition is a legal condition as data: a comparison of a linear form, or a combination of conditions. It is
// three-valued when evaluated.
type Condition struct {
	Op    Op
	Says  Words // the law's condition in words, where generated words would not do
	Parts []*Condition
	N     int // OpCount: how many parts must hold

	// OpCompare
	Of        map[string]decimal.Decimal
	Per       []string // every one of these bases
	As        string   // "", "share of energy", "share of fatty acids", "share of reference value", "share of fat"
	Relation  Relation
	Threshold quantity.Amount
	Origin    string // "industrial" or "ruminant": only trans of that origin
	Times     Times  // what the product's form is multiplied by
	Subject   string // "" is the product, "reference food" the other

	terms     []Term
	bases     []Per
	limit     quantity.Ratio
	ofProduct bool

	// OpDeclared, OpMeets, OpFact
	Name   string // line, rule id or fact
	Is     string
	Has    string // OpFact: what a list must hold
	Stated bool   // OpFact, OpSize: whether the recipe states it at all; OpCategory: no where none is stated

	// OpUndecided: why data cannot decide it
	Why Words

	// OpAmount: at most one of these, each in its own unit. OpAbout: subjects. OpKind: kinds of reference food.
	Amounts []quantity.Amount
	About   []string
	Label   bool     // OpAbout: of all claims on the label, not of the one judged
	Kinds   []string // of OpCategory: names of reference amounts

	// OpIngredient
	Process     []string
	IodineAbove *decimal.Decimal
}

// A Relation compares a value with a threshold.
type Relation string

// Relations. The last three compare the product with the reference food.
const (
	AtMost      Relation = "at most"
	Below       Relation = "below"
	AtLeast     Relation = "at least"
	Above       Relation = "above"
	ReducedBy   Relation = "reduced by"
	IncreasedBy Relation = "increased by"
	MoreBy      Relation = "more by"
	LessBy      Relation = "less by"
	NotMore     Relation = "not more than" // the reference food has
)

var relations = []Relation{AtMost, Below, AtLeast, Above, ReducedBy, IncreasedBy, MoreBy, LessBy}

// Relative tells whether the relation needs a reference food.
func (r Relation) Relative() bool {
	return r == ReducedBy || r == IncreasedBy || r == MoreBy || r == LessBy || r == NotMore
}

// Prepare readies a comparison that was not read from a rule. A basis that cannot be read is left to lint.
func (c *Condition) Prepare() *Condition {
	c.terms, c.bases, c.limit = terms(c.Of), nil, c.Threshold.Ratio()
	for _, s := range c.Per {
		p, _ := ParsePer(s)
		c.bases = append(c.bases, p)
	}
	return c
}

// Terms is the comparison's linear form, Bases what it is per.
func (c *Condition) Terms() []Term { return c.terms }

// Limit is the threshold in base units.
func (c *Condition) Limit() quantity.Ratio { return c.limit }

// Bases are the parsed entries of Per, in order.
func (c *Condition) Bases() []Per { return c.bases }

// Walk visits the condition and all its parts.
func (c *Condition) Walk(visit func(*Condition)) {
	if c == nil {
		return
	}
	visit(c)
	for _, p := range c.Parts {
		p.Walk(visit)
	}
	for i := range c.Times {
		c.Times[i].If.Walk(visit)
	}
}

// OfProduct tells whether the condition, read from a rule, depends on the product and the facts alone: not on a reference food, on other
// rules or on what is claimed.
func (c *Condition) OfProduct() bool { return c != nil && c.ofProduct }

func (c *Condition) asksProductOnly() bool {
	switch c.Op {
	case OpCompare:
		return c.Subject == "" && !c.Relation.Relative() && !slices.ContainsFunc(c.Times, func(w Weight) bool { return w.If != nil && !w.If.asksProductOnly() })
	case OpFact, OpAmount, OpSize, OpIngredient, OpUndecided, OpCategory:
		return true
	case OpAll, OpAny, OpNot, OpCount, OpWhen:
		return !slices.ContainsFunc(c.Parts, func(p *Condition) bool { return !p.asksProductOnly() })
	}
	return false
}

// comparesFoods tells whether the condition itself, without its parts, needs a reference food.
func (c *Condition) comparesFoods() bool {
	return c.Subject == "reference food" || c.Op == OpKind || c.Op == OpCompare && c.Relation.Relative()
}
