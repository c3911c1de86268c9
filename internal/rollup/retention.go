package rollup

import (
	"slices"

	"gramlaw/internal/food"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// keep adds what one more step of cooking keeps.
func (l *Leaf) keep(r *recipe.Retention) {
	if r != nil {
		l.retentions = append(l.retentions, r)
	}
}

// kept applies what cooking keeps of a component, and what fat was lost.
func (l *Leaf) kept(id food.ID, a quantity.Linear) quantity.Linear {
	for _, r := range l.retentions {
		if f, ok := factor(r, id); ok {
			a = a.Mul(f)
		}
	}
	if l.lipidsKept != nil && isLipid(id) {
		a = a.Mul(*l.lipidsKept)
	}
	return a
}

// factor is a retention as a number from 0 to 1.
func factor(r *recipe.Retention, id food.ID) (quantity.Ratio, bool) {
	if r.Code == "" {
		f, ok := r.Factors[id.Tag()]
		return quantity.FromDecimal(f), ok
	}
	table, ok := food.RetentionCode(r.Code)
	if !ok {
		return quantity.Ratio{}, false
	}
	percent, ok := table.Percent(id)
	return quantity.Scaled(int64(percent), -2), ok
}

// isLipid tells whether a component leaves with the fat.
func isLipid(id food.ID) bool {
	return id == food.Fat || id.IsWithin(food.Fat)
}

// folateEquivalents is dietary folate equivalents under a retention code of the USDA table, which has no column for them:
// 1 µg DFE = 1 µg food folate = 0.6 µg folic acid (1 / 1.7 in the table's rounding).
// What the recipe states of them itself stands.
// Reference: USDA Table of Nutrient Retention Factors, Release 6, and the survey database built on it.
func (l *Leaf) folateEquivalents(id food.ID) (Amount, bool) {
	if id != food.FolateEquivalents || !l.coded() {
		return Amount{}, false
	}
	if _, stated := l.Ingredient.With["FOLDFE"]; stated {
		return Amount{}, false
	}
	if !l.Knows(food.FoodFolate) || !l.Knows(food.FolicAcid) {
		return Amount{}, false
	}
	f := food.FolateDFEFactor()
	added := l.Component(food.FolicAcid).Mul(quantity.Scaled(f.Mantissa, int32(f.Exponent)))
	return Amount{Linear: l.Component(food.FoodFolate).Add(added), How: Stated}, true
}

// coded tells whether a USDA retention code applies to the leaf.
func (l *Leaf) coded() bool {
	return slices.ContainsFunc(l.retentions, func(r *recipe.Retention) bool { return r.Code != "" })
}
