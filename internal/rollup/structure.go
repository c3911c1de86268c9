package rollup

import (
	"sync"

	"gramlaw/internal/food"
	"gramlaw/internal/lipid"
	"gramlaw/internal/quantity"
	"gramlaw/internal/recipe"
)

// structural are the components that a fatty-acid profile gives by the meaning of their tagnames. What a law counts as the same is
// decided by its own definitions.
var structural = sync.OnceValue(func() map[food.ID]*lipid.Class {
	out := map[food.ID]*lipid.Class{}
	isolated := false
	for tag, p := range map[string]lipid.Predicate{
		"FASAT":   {DoubleBonds: "0"},
		"FAMSCIS": {DoubleBonds: "1", All: "cis"},
		"FAPUCIS": {DoubleBonds: "2+", All: "cis", Spacing: "3"},
		"FATRN":   {Any: "trans", Conjugated: &isolated},
	} {
		c, ok := food.Lookup(tag)
		class, err := p.Compile()
		if ok && err == nil {
			out[c.ID] = class
		}
	}
	return out
})

// byStructure takes a component nobody stated from a complete profile.
func (l *Leaf) byStructure(id food.ID) (Amount, bool) {
	if l.known.Has(id) || !l.HasProfile() {
		return Amount{}, false
	}
	class, ok := structural()[id]
	if !ok {
		return Amount{}, false
	}
	return Amount{Linear: l.Class(class, false), How: Stated}, true
}

// Class sums the profile's acids of a class, as fatty acids or as their triglycerides. Of a group that the class leaves open, anything
// from none to all may count; of what the profile leaves unidentified likewise, with none as the typical value.
func (l *Leaf) Class(class *lipid.Class, triglyceride bool) quantity.Linear {
	var sum quantity.Linear
	for _, a := range l.Acids() {
		amount := a.Acid
		if triglyceride {
			amount = a.Triglyceride
		}
		if !a.Identified {
			sum = sum.Add(quantity.Of(l.Variable("unidentified fatty acids", quantity.Ratio{}, amount.High(), quantity.Ratio{}, true)))
			continue
		}
		switch class.Holds(a.Species) {
		case lipid.Yes:
			sum = sum.Add(amount)
		case lipid.Open:
			sum = sum.Add(quantity.Of(l.Variable(a.Species.String(), quantity.Ratio{}, amount.High(), quantity.Ratio{}, false)))
		}
	}
	return sum
}

// AllAcids is all fatty acids of the profile, or all as triglycerides. Where the profile divides the fat itself, the triglycerides are the
// fat, however wide the ranges of its parts.
func (l *Leaf) AllAcids(triglyceride bool) quantity.Linear {
	p := l.profile()
	share := p.Basis == recipe.PercentFAME || p.Basis == recipe.PercentAcids
	if triglyceride && share && !p.ShareOfFat.IsPositive() {
		return l.base()
	}
	var sum quantity.Linear
	for _, a := range l.Acids() {
		if triglyceride {
			sum = sum.Add(a.Triglyceride)
		} else {
			sum = sum.Add(a.Acid)
		}
	}
	return sum
}
