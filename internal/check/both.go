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

// A Touch tells of a rule's identifier whether its result can differ between two laws; nil is all of them.
type Touch func(id string) bool

// Both checks a recipe on two sides, in the markets whose laws differ, and in no other; of these it leaves out the lines and the claims nobody
// asked for that no difference touches. The composition is computed once where both sides compute it alike. In a request only In, Transition
// and Without count. Faults are those of Check, on the first side that has any.
func Both(r *recipe.Recipe, was, is Side, q Request, differ func(was, is *rulebook.Law) (bool, Touch)) ([]Pair, recipe.Faults) {
	a, faults := start(r, was, q)
	if len(faults) > 0 {
		return nil, faults
	}
	b, faults := start(r, is, q)
	if len(faults) > 0 {
		return nil, faults
	}
	var out []Pair
	var touches []Touch
	for _, j := range a.request.In {
		one, two := a.open(j, a.request.Transition), b.open(j, b.request.Transition)
		if differs, touch := differ(one.law, two.law); differs {
			if one.asksTouched(touch) || two.asksTouched(touch) {
				touch = nil // what a claim brings can reach everything
			}
			out, touches = append(out, Pair{Jurisdiction: j, LawWas: one.law, LawIs: two.law}), append(touches, touch)
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
		p.Was, p.Is = a.judge(p.Jurisdiction, touches[i]), b.judge(p.Jurisdiction, touches[i])
	}
	return out, nil
}

func (c *checker) judge(j string, touch Touch) Market {
	m := c.open(j, c.request.Transition)
	m.touch = touch
	return m.judge()
}

// asksTouched tells whether the recipe asks for a claim that can differ.
func (m *market) asksTouched(touch Touch) bool {
	return touch != nil && slices.ContainsFunc(m.asked(), func(a recipe.Claim) bool {
		rule, ok := m.find(&a)
		return a.Text != "" || ok && touch(rule.ID)
	})
}

// untouched tells whether a line, or a claim nobody asked for, is the same on both sides of a comparison.
func (m *market) untouched(ids ...string) bool {
	return m.touch != nil && !slices.ContainsFunc(ids, m.touch)
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
