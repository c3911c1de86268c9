package check

import (
	"slices"

	"gramlaw/internal/rulebook"
)

// What is derived takes the grade of its weakest input.

func weaker(a, b string) bool {
	return slices.Index(rulebook.Evidences, a) > slices.Index(rulebook.Evidences, b)
}

// gradeOf is the weakest grade of a quantity's definition, and of what the definition rests on.
func (m *market) gradeOf(q string) (grade, rule string) {
	grade = rulebook.Evidences[0]
	lower := func(g, id string) {
		if weaker(g, grade) {
			grade, rule = g, id
		}
	}
	if e, ok := m.law.Energy.Get(q); ok {
		if s := e.Body.Methods[0].Source; s != nil {
			lower(s.Evidence, e.ID)
		} else {
			lower(e.Head.Source.Evidence, e.ID)
		}
		for _, t := range e.Body.Methods[0].Terms() {
			lower(m.gradeOf(t.Name))
		}
	}
	if d, ok := m.law.Definitions.Get(q); ok {
		lower(d.Head.Source.Evidence, d.ID)
	}
	return grade, rule
}

// gradeOfValue is the weaker of a rounding and the definition of what is rounded.
func (m *market) gradeOfValue(rounding *rulebook.Head, q string) string {
	grade := rounding.Source.Evidence
	if g, _ := m.gradeOf(q); weaker(g, grade) {
		return g
	}
	return grade
}

// weakest is the weakest grade among a claim's rule and all its condition rests on, and the rule that has it.
func (m *market) weakest(c rulebook.Active[rulebook.Claim]) (grade, rule string) {
	w := weakest{m: m, grade: c.Head.Source.Evidence, rule: c.ID}
	w.condition(c.Body.Condition)
	return w.grade, w.rule
}

// A weakest keeps the lowest grade it has met.
type weakest struct {
	m           *market
	grade, rule string
}

func (w *weakest) lower(grade, rule string) {
	if rule != "" && weaker(grade, w.grade) {
		w.grade, w.rule = grade, rule
	}
}

func (w *weakest) condition(c *rulebook.Condition) {
	c.Walk(func(p *rulebook.Condition) {
		switch p.Op {
		case rulebook.OpCompare:
			w.comparison(p)
		case rulebook.OpMeets:
			if other, ok := w.m.claim(p.Name); ok {
				w.lower(w.m.weakest(other))
			}
		case rulebook.OpHolds:
			if named, ok := w.m.law.Conditions.Get(rulebook.Name(p.Name)); ok {
				w.lower(named.Head.Source.Evidence, named.ID)
				w.condition(named.Body.Condition)
			}
		}
	})
}

func (w *weakest) comparison(p *rulebook.Condition) {
	for _, t := range p.Terms() {
		w.lower(w.m.gradeOf(t.Name))
		if p.As == "share of reference value" {
			if r, ok := w.m.law.ReferenceOf(t.Name); ok {
				w.lower(r.Body.Source(r.Head, w.m.population(r.Body)).Evidence, r.ID)
			}
		}
	}
	if p.As == "share of energy" {
		w.lower(w.m.gradeOf("energy"))
	}
}
