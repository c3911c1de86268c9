package check

import (
	"slices"

	"gramlaw/internal/recipe"
	"gramlaw/internal/rulebook"
)

// A Side is one of two checks that are held against each other: a rule set on a labelling date.
type Side struct {
	Book *rulebook.Book
	On   string
}

// A Pair is one market on both sides, with the laws that were chosen for the recipe.
type Pair struct {
	Jurisdiction  string
	Was, Is       Market
	LawWas, LawIs *rulebook.Law
}

// Both checks a recipe on two sides, in the markets whose laws differ, and in no other. The composition is computed once where both sides
// compute it alike. In a request only In, Transition and Without count. Faults are those of Check, on the first side that has any.
func Both(r *recipe.Recipe, was, is Side, q Request, differ func(was, is *rulebook.Law) bool) ([]Pair, recipe.Faults) {
	a, faults := start(r, was, q)
	if len(faults) > 0 {
		return nil, faults
	}
	b, faults := start(r, is, q)
	if len(faults) > 0 {
		return nil, faults
	}
	var out []Pair
	for _, j := range a.request.In {
		one, two := a.open(j, a.request.Transition), b.open(j, b.request.Transition)
		if differ(one.law, two.law) {
			out = append(out, Pair{Jurisdiction: j, LawWas: one.law, LawIs: two.law})
		}
	}
	if len(out) == 0 {
		return nil, nil
	}
	if faults := a.roll(); len(faults) > 0 {
		return nil, faults
	}
	if a.rollsLike(b) {
		b.batch, b.refs, b.habits, b.shared = a.batch, a.refs, a.habits, a.shared
	} else if faults := b.roll(); len(faults) > 0 {
		return nil, faults
	}
	for i := range out {
		p := &out[i]
		p.Was, p.Is = a.open(p.Jurisdiction, a.request.Transition).judge(), b.open(p.Jurisdiction, b.request.Transition).judge()
	}
	return out, nil
}

// start is a check that has rolled nothing yet.
func start(r *recipe.Recipe, s Side, q Request) (*checker, recipe.Faults) {
	q.On, q.Detail = s.On, ""
	c := newChecker(r, s.Book, q)
	if faults := c.accept(); len(faults) > 0 {
		return nil, faults
	}
	c.habits = newHabits(s.Book, c.request.Without)
	return c, nil
}

// rollsLike tells whether the composition is the same on both sides: labels of ingredients are read by rules, and so is what practice presumes.
func (c *checker) rollsLike(d *checker) bool {
	return c.book == d.book && (c.request.On == d.request.On || !slices.ContainsFunc(c.recipe.Ingredients, readsLabel) && !referencesReadLabels(c.recipe))
}

// readsLabel tells whether an ingredient is known by a label of no stated date.
func readsLabel(in recipe.Ingredient) bool {
	return labelled(&in.Source)
}

func labelled(s *recipe.Source) bool {
	if s.Label != nil && s.Label.On == "" {
		return true
	}
	return s.Recipe != nil && (slices.ContainsFunc(s.Recipe.Ingredients, readsLabel) || oilReadsLabel(s.Recipe.Yield))
}

func oilReadsLabel(y *recipe.Yield) bool {
	return y != nil && y.Fat != nil && y.Fat.Oil != nil && labelled(y.Fat.Oil)
}

func referencesReadLabels(r *recipe.Recipe) bool {
	for _, ref := range r.References {
		if labelled(&ref.Source) {
			return true
		}
	}
	return oilReadsLabel(r.Yield)
}
