// Package rollup turns a recipe into the composition of the finished food: every ingredient's exact share of the batch,
// what it contributes of each component after retention, and the mass that is left after cooking.
//
// Roll takes a recipe part and gives a Batch. A Batch is asked leaf by leaf (Leaf.Component, Leaf.Acids): what a law counts
// as fat or trans fat is decided above this package. Masses are grams and exact; all of a batch share one denominator. What
// nobody stated stays a variable between two ends.
package rollup

import (
	"math/big"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// MaxBits caps the common denominator of a batch: profiles in per cent are what makes it grow, and yields inside one another.
// MaxBitsBeside caps what single leaves are divided by beside it: what their specifications are per, and fat lost.
const (
	MaxBits       = 1 << 15
	MaxBitsBeside = 1 << 12
)

// Options are what a batch needs to know from rules.
type Options struct {
	// Label undoes the rounding of another product's label; ranges are per 100 g, in base units.
	Label func(*recipe.Label) (map[food.ID]Range, *Fault)
	// Presume says what practice takes for a component that nobody stated.
	Presume func(*Leaf, food.ID) (Presumed, bool)
	// FirstVariable keeps the variables of several batches apart.
	FirstVariable int
}

// Presumed is what practice takes: zero, or at most Share of another component, or just as much.
type Presumed struct {
	Rule  string
	Of    food.ID
	Share quantity.Ratio // of Of; ignored without Of
	Upto  bool           // anything from zero to the share
}

// A Range is what a value may be, without a typical one.
type Range struct{ Low, High quantity.Ratio }

// A Fault is something about a recipe that makes a roll-up impossible.
type Fault struct {
	Pointer, Code, Says string
}

func (f *Fault) Error() string { return f.Pointer + ": " + f.Says }

// A Finding is something about a recipe that somebody should look at.
type Finding struct {
	Pointer, Ingredient, Code, Says string
}

// A Batch is a recipe rolled up.
type Batch struct {
	Leaves   []*Leaf
	Input    quantity.Ratio // g of everything that went in
	Mass     quantity.Ratio // g of finished food
	Findings []Finding

	options Options
	den     *big.Int // of masses
	fine    *big.Int // of fatty acids: a multiple of den; nil without profiles in per cent
	owners  []owner
	slab    []quantity.Variable // for the next ones
	totals  [food.Count + 1]*total
	ingoing quantity.Ratio // g of ingredients, fat taken up included
}

// A total is what all leaves hold of a component, and the mass of those of which somebody knows.
type total struct {
	amount  quantity.Linear
	covered quantity.Ratio
}

// An owner says whose uncertainty a variable is.
type owner struct {
	leaf *Leaf
	what string // tagname, notation or a plain word

	text string
}

// A Leaf is one ingredient that is not itself a recipe, with its share of the batch.
type Leaf struct {
	Index      int
	Path       string // "syrup/sugar"
	Pointer    string
	Name       string
	Ingredient *recipe.Ingredient // nil for water that came or went
	Food       food.Food
	IsFood     bool
	Mass       quantity.Ratio // g in the batch; negative for water that went

	batch      *Batch
	pure       food.ID // set where the leaf is one component alone
	entries    []stated
	place      [food.Count + 1]uint16 // of a component in entries, counted from one
	known      food.Set
	asked      [food.Count + 1]uint16 // of a component in answers, counted from one
	answers    []Amount
	acids      *acids
	per        quantity.Ratio // 100 g over what the specification is per; zero without one
	retentions []*recipe.Retention
	lipidsKept *quantity.Ratio // set where fat was lost
	weights    []weight
}

// stated is a component's value in base units (g; kcal, kJ or IU as they are) per 100 g; ends is nil where it is exact.
type stated struct {
	value quantity.Ratio
	ends  *ends
}

// ends of a value that is stated as a range; the value is then its typical one, if it has one.
type ends struct {
	low, high quantity.Ratio
	typical   bool
}

func (s stated) low() quantity.Ratio {
	if s.ends != nil {
		return s.ends.low
	}
	return s.value
}

func (s stated) high() quantity.Ratio {
	if s.ends != nil {
		return s.ends.high
	}
	return s.value
}

// How tells where an amount comes from.
type How uint8

// Where amounts come from, best first.
const (
	Stated   How = iota
	ByNature     // the recipe says it is absent by nature
	ByPractice
	Bounded // nobody said; the register bounds it
)

// An Amount is a leaf's contribution to the batch, in base units.
type Amount struct {
	quantity.Linear
	How How
}

// Variable makes a variable of the leaf's; what names it.
func (l *Leaf) Variable(what string, low, high, central quantity.Ratio, typical bool) *quantity.Variable {
	b := l.batch
	b.owners = append(b.owners, owner{leaf: l, what: what})
	if len(b.slab) == 0 {
		b.slab = make([]quantity.Variable, 64)
	}
	v := &b.slab[0]
	b.slab = b.slab[1:]
	*v = quantity.Variable{Index: b.options.FirstVariable + len(b.owners), Low: low, High: high, Central: central, Typical: typical}
	return v
}

// Owner says whose variable it is, "syrup/sugar (FIBTG)"; false for another batch's variable.
func (b *Batch) Owner(v *quantity.Variable) (string, bool) {
	i := v.Index - b.options.FirstVariable - 1
	if i < 0 || i >= len(b.owners) {
		return "", false
	}
	o := &b.owners[i]
	if o.text == "" {
		o.text = o.leaf.Path + " (" + o.what + ")"
	}
	return o.text, true
}

// Total is the batch's content of a component, in base units.
func (b *Batch) Total(id food.ID) quantity.Linear { return b.total(id).amount }

// Coverage is the share of the ingoing mass whose content of a component somebody stated or practice presumes.
func (b *Batch) Coverage(id food.ID) quantity.Ratio {
	if b.ingoing.IsZero() {
		return quantity.Ratio{}
	}
	return b.total(id).covered.Quo(b.ingoing)
}

func (b *Batch) total(id food.ID) *total {
	if t := b.totals[id]; t != nil {
		return t
	}
	t := &total{}
	t.amount = quantity.Sum(len(b.Leaves), func(i int) quantity.Linear {
		l := b.Leaves[i]
		a := l.Component(id)
		if l.Ingredient != nil && (a.How != Bounded || a.Determined()) {
			t.covered = t.covered.Add(l.Mass)
		}
		return a.Linear
	})
	b.totals[id] = t
	return t
}
