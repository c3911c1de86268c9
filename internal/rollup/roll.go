package rollup

import (
	"fmt"
	"math/big"

	"github.com/shopspring/decimal"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

var hundred = decimal.New(100, 0)

// Roll computes a part: a recipe, a recipe inside one, or a single ingredient of 100 g.
func Roll(p recipe.Part, o Options) (*Batch, *Fault) {
	b := &Batch{options: o}
	part, fault := b.part(p, "", "")
	if fault != nil {
		return nil, fault
	}
	b.Leaves, b.Input, b.Mass = part.leaves, part.input, part.mass
	if b.Mass.Sign() <= 0 {
		return nil, &Fault{"/yield", "no-mass", "the finished food has no mass left"}
	}
	if fault := b.commonDenominator(); fault != nil {
		return nil, fault
	}
	for i, l := range b.Leaves {
		if l.Index = i; l.Ingredient != nil {
			b.ingoing = b.ingoing.Add(l.Mass)
		}
	}
	b.plausible()
	return b, nil
}

// rolled is a part with masses over denominators of their own.
type rolled struct {
	leaves      []*Leaf
	input, mass quantity.Ratio
}

// part rolls a recipe. Path and pointer are those of the ingredient it stands for.
func (b *Batch) part(p recipe.Part, path, pointer string) (rolled, *Fault) {
	var out rolled
	for i := range p.Ingredients {
		in := &p.Ingredients[i]
		mass, fault := grams(in)
		if fault != nil {
			return out, fault
		}
		leaves, fault := b.ingredient(in, mass, path)
		if fault != nil {
			return out, fault
		}
		out.leaves = append(out.leaves, leaves...)
		out.input = out.input.Add(mass)
	}
	out.mass = out.input
	return out, b.yield(&out, p.Yield, path, pointer+"/yield")
}

// grams is an ingredient's mass; a volume needs a density.
func grams(in *recipe.Ingredient) (quantity.Ratio, *Fault) {
	switch in.Amount.Unit.Dimension() {
	case quantity.Mass:
		return in.Amount.Ratio(), nil
	case quantity.Volume:
		if in.Density.IsPositive() {
			return quantity.FromDecimal(in.Amount.Base().Mul(in.Density)), nil
		}
	}
	return quantity.Ratio{}, &Fault{in.Pointer + "/amount", "volume-without-density", fmt.Sprintf("%s is no mass and the ingredient has no density", in.Amount)}
}

func join(path, id string) string {
	if path == "" {
		return id
	}
	return path + "/" + id
}

func (b *Batch) ingredient(in *recipe.Ingredient, mass quantity.Ratio, path string) ([]*Leaf, *Fault) {
	path = join(path, in.ID)
	if in.Recipe == nil {
		l, fault := b.leaf(in, mass, path)
		if fault == nil {
			l.keep(in.Retention)
		}
		return []*Leaf{l}, fault
	}
	sub, fault := b.part(*in.Recipe, path, in.Pointer+"/recipe")
	if fault != nil {
		return nil, fault
	}
	if sub.mass.Sign() <= 0 {
		return nil, &Fault{in.Pointer + "/recipe/yield", "no-mass", "the part has no mass left"}
	}
	share := mass.Quo(sub.mass)
	for _, l := range sub.leaves {
		l.Mass = l.Mass.Mul(share)
		l.keep(in.Retention) // of all that the part has become, oil taken up included
		l.forget()
	}
	return sub.leaves, nil
}

// yield settles what water and fat did in cooking.
func (b *Batch) yield(r *rolled, y *recipe.Yield, path, pointer string) *Fault {
	if y == nil {
		return nil
	}
	if y.Mass != nil {
		final := y.Mass.Ratio()
		r.water(b, final.Sub(r.input), path)
		return nil
	}
	if y.Water != nil {
		r.water(b, signed(y.Water, r.input), path)
	}
	if y.Fat != nil {
		return r.fat(b, y.Fat, path, pointer)
	}
	return nil
}

func signed(c *recipe.Change, input quantity.Ratio) quantity.Ratio {
	m := changed(c, input)
	if !c.Gain {
		m = m.Neg()
	}
	return m
}

func changed(c *recipe.Change, input quantity.Ratio) quantity.Ratio {
	if c.Amount.Unit == quantity.PerCent {
		return input.Times(c.Amount.Value.Shift(-2))
	}
	return c.Amount.Ratio()
}

// water adds water that came, or a negative amount that went.
func (r *rolled) water(b *Batch, mass quantity.Ratio, path string) {
	if mass.IsZero() {
		return
	}
	name := "water taken up"
	if mass.Sign() < 0 {
		name = "water lost"
	}
	r.leaves = append(r.leaves, &Leaf{Path: join(path, "(water)"), Name: name, Mass: mass, batch: b, pure: food.Water})
	r.mass = r.mass.Add(mass)
}

// fat lets oil in, or takes the same share of every lipid out.
func (r *rolled) fat(b *Batch, c *recipe.Change, path, pointer string) *Fault {
	mass := changed(c, r.input)
	if mass.IsZero() {
		return nil
	}
	if c.Gain {
		in := &recipe.Ingredient{Pointer: pointer + "/fat/oil", ID: "(oil taken up)", Name: "oil taken up", Source: *c.Oil}
		l, fault := b.leaf(in, mass, join(path, in.ID))
		if fault != nil {
			return fault
		}
		r.leaves, r.mass, r.input = append(r.leaves, l), r.mass.Add(mass), r.input.Add(mass)
		return nil
	}
	var total quantity.Ratio
	for _, l := range r.leaves {
		a := l.Component(food.Fat)
		if !a.Determined() {
			return &Fault{l.Pointer, "fat-loss-needs-fat", "fat is lost in cooking, but how much fat " + l.Path + " brings in is not stated exactly"}
		}
		total = total.Add(a.Known)
	}
	if total.Cmp(mass) < 0 {
		return &Fault{pointer + "/fat", "fat-loss-too-large", "more fat is lost than there is"}
	}
	kept := total.Sub(mass).Quo(total).Reduced()
	for _, l := range r.leaves {
		l.keepLipids(kept)
	}
	r.mass = r.mass.Sub(mass)
	return nil
}

func (l *Leaf) keepLipids(kept quantity.Ratio) {
	l.forget()
	if l.lipidsKept != nil {
		kept = kept.Mul(*l.lipidsKept).Reduced()
	}
	l.lipidsKept = &kept
}

// commonDenominator writes all masses over one denominator, and prepares a multiple of it that profiles divide too. Only
// fatty acids need the second, so that all else stays small.
func (b *Batch) commonDenominator() *Fault {
	plain, fine, beside := big.NewInt(1), big.NewInt(1), big.NewInt(1)
	parts := make([]quantity.Ratio, len(b.Leaves))
	for i, l := range b.Leaves {
		parts[i] = l.Mass.Reduced()
		plain = lcm(plain, parts[i].Denominator())
		if p := l.profileDenominator(); p != nil {
			fine = lcm(fine, p)
		}
		beside = lcm(beside, l.per.Denominator())
		if l.lipidsKept != nil {
			beside = lcm(beside, l.lipidsKept.Denominator())
		}
		if plain.BitLen()+fine.BitLen() > MaxBits || beside.BitLen() > MaxBitsBeside {
			return &Fault{l.Pointer, "too-fine", "up to here the recipe has too many different divisors to be computed exactly: fatty-acid profiles in per cent, yields inside one another, or long figures that specifications are per; state some profiles in g per 100 g fat, or values per 100 g"}
		}
	}
	b.den = plain
	if fine.BitLen() > 1 {
		b.fine = new(big.Int).Mul(plain, fine)
	}
	for i, l := range b.Leaves {
		l.Mass = parts[i].Over(plain)
		l.forget()
	}
	b.Input, b.Mass = b.Input.Reduced(), b.Mass.Reduced()
	return nil
}

func lcm(a, b *big.Int) *big.Int {
	if a.Cmp(b) == 0 {
		return a
	}
	g := new(big.Int).GCD(nil, nil, a, b)
	return new(big.Int).Mul(a, new(big.Int).Quo(b, g))
}
