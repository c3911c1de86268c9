package recheck

import (
	"cmp"
	"fmt"
	"io"
	"slices"
	"strings"

	"gramlaw/internal/check"
	"gramlaw/internal/quantity"
	"gramlaw/internal/rulebook"
)

// A Summary tells a run in short: by step, market and rule.
type Summary struct {
	Counts  Counts        `json:"counts"`
	Steps   []StepSummary `json:"steps"` // only those that change something, but for a run of one step
	Caution string        `json:"caution"`

	steps []*stepTally
}

// A StepSummary is what one comparison comes to.
type StepSummary struct {
	From    string          `json:"from"`
	To      string          `json:"to"`
	Was     check.RuleSet   `json:"rules_was"`
	Is      check.RuleSet   `json:"rules_is"`
	Markets []MarketSummary `json:"markets"`
	First   []First         `json:"act_first"`
}

// A MarketSummary counts products, which are recipes that change, by kind of change and by rule.
type MarketSummary struct {
	Jurisdiction string         `json:"jurisdiction"`
	Products     int            `json:"products"`
	Kinds        map[string]int `json:"kinds"`
	Rules        []RuleSummary  `json:"rules"`
}

// A RuleSummary is a changed rule with what it touches.
type RuleSummary struct {
	Rule     string `json:"rule"`
	Effect   string `json:"effect,omitempty"`
	Says     string `json:"says,omitempty"`
	Source   string `json:"source,omitempty"`
	Products int    `json:"products"`
}

// A First is a product to act on, with its most urgent change.
type First struct {
	Key          string `json:"key"`
	ID           string `json:"id"`
	Name         string `json:"name"`
	Jurisdiction string `json:"jurisdiction"`
	Change
}

// mostFirst bounds the list of products to act on first.
const mostFirst = 50

type stepTally struct {
	step    Step
	markets map[string]*marketTally
	first   []First
}

type marketTally struct {
	products int
	kinds    map[string]int
	rules    map[string]int
}

func (w *work) summary() *Summary {
	s := &Summary{Caution: check.Caution, Steps: []StepSummary{}}
	for _, step := range w.Steps {
		s.steps = append(s.steps, &stepTally{step: step, markets: map[string]*marketTally{}})
	}
	return s
}

// found counts what a step changes for a recipe.
func (s *Summary) found(f *Found) {
	i := slices.IndexFunc(s.steps, func(t *stepTally) bool { return t.step.From == f.From && t.step.To == f.To })
	if i < 0 {
		return
	}
	t := s.steps[i]
	for _, m := range f.Markets {
		t.market(m.Jurisdiction).count(m.Changes)
		t.consider(First{f.Key, f.Recipe.ID, f.Recipe.Name, m.Jurisdiction, m.Changes[0]})
	}
}

func (t *stepTally) market(j string) *marketTally {
	m := t.markets[j]
	if m == nil {
		m = &marketTally{kinds: map[string]int{}, rules: map[string]int{}}
		t.markets[j] = m
	}
	return m
}

func (m *marketTally) count(changes []Change) {
	m.products++
	kinds, rules := map[string]bool{}, map[string]bool{}
	for _, c := range changes {
		kinds[c.Kind] = true
		for _, id := range c.Rules {
			rules[id] = true
		}
	}
	for k := range kinds {
		m.kinds[k]++
	}
	for id := range rules {
		m.rules[id]++
	}
}

// consider keeps a product among the first, most urgent kinds in front and in the order of the recipes.
func (t *stepTally) consider(f First) {
	urgency := func(f First) int { return slices.Index(Urgency, f.Kind) }
	if f.Kind == OfferGained || f.Kind == OfferLost || f.Kind == Note {
		return // nothing on the label needs a hand
	}
	at := len(t.first)
	for at > 0 && urgency(t.first[at-1]) > urgency(f) {
		at--
	}
	if at < mostFirst {
		t.first = slices.Insert(t.first, at, f)
		t.first = t.first[:min(len(t.first), mostFirst)]
	}
}

// finish writes the tallies out.
func (s *Summary) finish() {
	for _, t := range s.steps {
		if len(t.markets) == 0 && len(s.steps) > 1 {
			continue
		}
		one := StepSummary{From: t.step.From, To: t.step.To, Was: ruleSet(t.step.Plan.was), Is: ruleSet(t.step.Plan.is), Markets: []MarketSummary{}, First: t.first}
		if one.First == nil {
			one.First = []First{}
		}
		for _, j := range sortedNames(t.markets) {
			one.Markets = append(one.Markets, t.markets[j].summary(j, t.step.Plan.describe(j)))
		}
		s.Steps = append(s.Steps, one)
	}
}

func sortedNames[T any](m map[string]T) []string {
	out := make([]string, 0, len(m))
	for k := range m {
		out = append(out, k)
	}
	slices.Sort(out)
	return out
}

func (m *marketTally) summary(j string, known map[string]rulebook.Change) MarketSummary {
	out := MarketSummary{Jurisdiction: j, Products: m.products, Kinds: m.kinds, Rules: []RuleSummary{}}
	for _, id := range sortedNames(m.rules) {
		r := RuleSummary{Rule: id, Products: m.rules[id]}
		if c, ok := known[id]; ok {
			r.Effect, r.Says = c.Effect, c.Says
			if head := cmp.Or(c.Is, c.Was); head != nil {
				r.Source = head.Source.Ref
			}
		}
		out.Rules = append(out.Rules, r)
	}
	slices.SortStableFunc(out.Rules, func(a, b RuleSummary) int { return b.Products - a.Products })
	return out
}

// describe says what changed in a market's rules for a recipe that states no facts, and in what practice presumes.
func (p *Plan) describe(j string) map[string]rulebook.Change {
	out := map[string]rulebook.Change{}
	for _, c := range p.practice {
		out[c.ID] = c
	}
	transition := p.request.Transition
	if transition == "" {
		transition = rulebook.WhenRequired
	}
	open := func(*rulebook.Condition) quantity.Truth { return quantity.Open }
	was, ok1 := p.was.Book.At(j, p.was.On, transition, open)
	is, ok2 := p.is.Book.At(j, p.is.On, transition, open)
	if !ok1 || !ok2 {
		return out
	}
	for _, c := range p.between(was, is).changes {
		out[c.ID] = c
	}
	return out
}

// Text writes the summary for people.
func (s *Summary) Text(to io.Writer) error {
	var b strings.Builder
	c := s.Counts
	fmt.Fprintf(&b, "%d recipes: %d unchanged, %d changed, %d failed.\n", c.Seen, c.Unchanged, c.Changed, c.Failed)
	if len(s.Steps) == 0 {
		fmt.Fprintln(&b, "No day on the way changes anything.")
	}
	for _, step := range s.Steps {
		step.text(&b)
	}
	fmt.Fprintf(&b, "\n%s\n", s.Caution)
	_, err := io.WriteString(to, b.String())
	return err
}

func (s *StepSummary) text(b *strings.Builder) {
	title := s.From + " to " + s.To
	if s.Was.Digest != s.Is.Digest {
		title += ", rule set " + s.Was.Version + " (" + short(s.Was.Digest) + ") to " + s.Is.Version + " (" + short(s.Is.Digest) + ")"
	}
	fmt.Fprintf(b, "\n%s\n%s\n", title, strings.Repeat("=", len(title)))
	if len(s.Markets) == 0 {
		fmt.Fprintln(b, "Nothing changes.")
	}
	for _, m := range s.Markets {
		m.text(b)
	}
	if len(s.First) > 0 {
		fmt.Fprintf(b, "\nTo act on first:\n")
	}
	for _, f := range s.First {
		fmt.Fprintf(b, "  %s (%s), %s: %s, %s\n      was: %s\n      is:  %s\n", f.Key, f.ID, f.Jurisdiction, f.Kind, f.What, cmp.Or(f.Was, "nothing"), cmp.Or(f.Is, "nothing"))
	}
}

func (m *MarketSummary) text(b *strings.Builder) {
	var kinds []string
	for _, k := range Urgency {
		if n := m.Kinds[k]; n > 0 {
			kinds = append(kinds, fmt.Sprintf("%s %d", k, n))
		}
	}
	fmt.Fprintf(b, "\n%s: %d products (%s)\n", m.Jurisdiction, m.Products, strings.Join(kinds, ", "))
	for _, r := range m.Rules {
		fmt.Fprintf(b, "  %5d  %s%s\n", r.Products, r.Rule, after(": ", r.Says))
		if r.Source != "" && !strings.Contains(r.Says, r.Source) {
			fmt.Fprintf(b, "         %s\n", r.Source)
		}
	}
}

func after(sign, s string) string {
	if s == "" {
		return ""
	}
	return sign + s
}

func short(digest string) string { return digest[:min(len(digest), 19)] + "…" }
