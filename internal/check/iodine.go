package check

import (
	"math/big"

	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rollup"
)

// iodineValue is an ingredient's iodine value in g per 100 g fat: stated, or calculated from a complete profile (AOCS
// Cd 1c-85). What the profile leaves unidentified takes up nothing at least, and as much as any food acid at most.
func iodineValue(l *rollup.Leaf) (low, high quantity.Ratio, ok bool) {
	if iv := l.Ingredient.IodineValue; iv != nil {
		r := quantity.FromDecimal(*iv)
		return r, r, true
	}
	if !l.HasProfile() {
		return low, high, false
	}
	var iodine, most, leastFat, mostFat quantity.Ratio
	for _, a := range l.Acids() {
		leastFat, mostFat = leastFat.Add(a.Triglyceride.Low()), mostFat.Add(a.Triglyceride.High())
		num, den, ok := a.Species.IodineFactor(lipid.Triglyceride)
		if !a.Identified {
			num, den, ok = 47, 10, true // six double bonds on 22 carbons: 4.6
			most = most.Add(a.Triglyceride.High().MulFraction(big.NewInt(num), big.NewInt(den)))
			continue
		}
		if !ok {
			return low, high, false
		}
		iodine = iodine.Add(a.Triglyceride.Low().MulFraction(big.NewInt(num), big.NewInt(den)))
		most = most.Add(a.Triglyceride.High().MulFraction(big.NewInt(num), big.NewInt(den)))
	}
	if leastFat.Sign() <= 0 {
		return low, high, false
	}
	per := quantity.FromInt(100)
	return iodine.Mul(per).Quo(mostFat), most.Mul(per).Quo(leastFat), true
}
