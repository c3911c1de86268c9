package recipe

import (
	"maps"
	"strings"
)

// ownPrefix begins the reference of a maker's own ingredient, which a store of recipes keeps.
const ownPrefix = "own:"

// OwnFoods visits every ingredient that is one of the maker's own, with its name in the store, in recipes inside the recipe too. Without a
// store such an ingredient cannot be checked.
func OwnFoods(r *Recipe, visit func(in *Ingredient, name string)) { ownFoods(r.Ingredients, visit) }

func ownFoods(list []Ingredient, visit func(*Ingredient, string)) {
	for i := range list {
		in := &list[i]
		if name, ok := strings.CutPrefix(in.Food, ownPrefix); ok {
			visit(in, name)
		}
		if in.Recipe != nil {
			ownFoods(in.Recipe.Ingredients, visit)
		}
	}
}

// Take makes an ingredient what another is, but for its place, name, amount and what happens to it here. What the recipe itself says beside
// the reference goes before what the other says.
func (in *Ingredient) Take(from *Ingredient) {
	in.Source = from.Source
	if in.Name == "" {
		in.Name = from.Name
	}
	with := maps.Clone(from.With)
	if with == nil {
		with = in.With
	} else {
		maps.Copy(with, in.With)
	}
	in.With = with
	in.ZeroByNature = append(in.ZeroByNature[:len(in.ZeroByNature):len(in.ZeroByNature)], from.ZeroByNature...)
	if in.Process == "" {
		in.Process = from.Process
	}
	if in.IodineValue == nil {
		in.IodineValue = from.IodineValue
	}
	if len(in.TransOrigin) == 0 {
		in.TransOrigin = from.TransOrigin
	}
	if in.Density.IsZero() {
		in.Density = from.Density
	}
}
