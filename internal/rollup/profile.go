package rollup

import (
	"math/big"

	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// A weight is one entry of a profile as a share: grams of the acid per gram of fat (or of food, by the basis) are
// acid/den, grams of its triglyceride tag/den.
type weight struct {
	species        lipid.Species
	acid, tag, den [3]*big.Int // low, central, high; only the central where exact
	exact          bool
}

// AcidAmount is one entry of a profile in the batch, in grams.
type AcidAmount struct {
	Species            lipid.Species
	Acid, Triglyceride quantity.Linear
	Identified         bool // false for what the profile leaves unnamed
}

func (w *weight) name() string {
	if w.species == (lipid.Species{}) {
		return "unidentified fatty acids"
	}
	return w.species.String()
}

type acids struct {
	list []AcidAmount
}

// HasProfile tells whether the leaf has a profile that names all its fatty acids, or says how much it leaves unnamed.
func (l *Leaf) HasProfile() bool {
	return l.Ingredient != nil && l.Ingredient.Composition != nil && l.Ingredient.Composition.Acids != nil && l.Ingredient.Composition.Acids.Complete
}

func (l *Leaf) profile() *recipe.Profile {
	if l.Ingredient == nil || l.Ingredient.Composition == nil {
		return nil
	}
	return l.Ingredient.Composition.Acids
}

// Acids lists the leaf's fatty acids in the batch. Empty without a profile.
func (l *Leaf) Acids() []AcidAmount {
	if l.profile() == nil {
		return nil
	}
	if l.acids == nil {
		l.acids = &acids{list: l.weighOut()}
	}
	return l.acids.list
}

// base is what the profile's shares are of: the fat in the batch, or the food.
func (l *Leaf) base() quantity.Linear {
	switch l.profile().Basis {
	case recipe.PerFood, recipe.TriglyceridePerFood:
		m := l.Mass
		if l.lipidsKept != nil {
			m = m.Mul(*l.lipidsKept)
		}
		return quantity.Exactly(m)
	}
	return l.Component(food.Fat).Linear
}

func (l *Leaf) weighOut() []AcidAmount {
	base := l.base()
	out := make([]AcidAmount, len(l.weights))
	for i := range l.weights {
		w := &l.weights[i]
		out[i] = AcidAmount{Species: w.species, Identified: i < len(l.profile().Acids)}
		if w.exact {
			out[i].Acid = l.fraction(base, w.acid[1], w.den[1])
			out[i].Triglyceride = l.fraction(base, w.tag[1], w.den[1])
			continue
		}
		out[i].Acid = l.ranged(w.name(), base, w.acid, w.den)
		out[i].Triglyceride = l.ranged(w.name(), base, w.tag, w.den)
	}
	return out
}

// fraction is a share of the base, over the batch's denominator for fatty acids.
func (l *Leaf) fraction(base quantity.Linear, num, den *big.Int) quantity.Linear {
	if !base.Determined() || l.batch.fine == nil {
		return base.Mul(quantity.Over(num, 0, den))
	}
	return quantity.Exactly(base.Known.Over(l.batch.fine).MulFraction(num, den))
}

func (l *Leaf) ranged(what string, base quantity.Linear, n, den [3]*big.Int) quantity.Linear {
	low := base.Low().MulFraction(n[0], den[0])
	high := base.High().MulFraction(n[2], den[2])
	mid, ok := base.Central()
	return quantity.Of(l.Variable(what, low, high, mid.MulFraction(n[1], den[1]), ok))
}

// profileDenominator is what the leaf's mass must be divisible by so that shares stay over the common denominator.
func (l *Leaf) profileDenominator() *big.Int {
	if len(l.weights) == 0 {
		return nil
	}
	if !l.weights[0].exact {
		return nil
	}
	return l.weights[0].den[1]
}

// integers brings decimals to one power of ten.
func integers(values []decimal.Decimal) ([]*big.Int, int32) {
	least := int32(0)
	for _, v := range values {
		least = min(least, v.Exponent())
	}
	out := make([]*big.Int, len(values))
	for i, v := range values {
		out[i] = new(big.Int).Mul(v.Coefficient(), quantity.Pow10(v.Exponent()-least))
	}
	return out, least
}
