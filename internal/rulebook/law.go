package rulebook

import "gramlaw/internal/quantity"

// A Transition says which of two versions in force at the same time is taken.
type Transition string

// Transitions: the version that must be used by now, or the newest that may be.
const (
	WhenRequired Transition = "required"
	Newest       Transition = "newest"
)

// An Active is a rule's version that holds.
type Active[T any] struct {
	ID   string
	Head *Head
	Body *T
}

// Name is the last segment of the rule's identifier.
func (a Active[T]) Name() string { return Name(a.ID) }

// A List is the active rules of one kind, in the order of the file.
type List[T any] struct {
	All    []Active[T]
	byName map[string]int
}

// Get finds a rule by the last segment of its identifier.
func (l *List[T]) Get(name string) (Active[T], bool) {
	i, ok := l.byName[name]
	if !ok {
		return Active[T]{}, false
	}
	return l.All[i], true
}

// A Law is what one market's rules say on one labelling date.
type Law struct {
	Market           *Market
	Date             string
	Transition       Transition
	Edition          string
	Definitions      List[Definition]
	Energy           List[Energy]
	References       List[Reference]
	Roundings        List[Rounding]
	Declarations     List[Declaration]
	ReferenceAmounts List[ReferenceAmount]
	Claims           List[Claim]
	Disclosures      List[Disclosure]
	Limits           List[Limit]
	Serving          List[Limit]
	HealthClaims     List[Claim]
	Naming           List[Naming]
	Conditions       List[Named]
	Wordings         List[Wording]

	Offers []Offer      // claims that need no asking
	Needs  []*Condition // what they need

	Memo Memo // what others work out from the law once

	roundingOf  map[string]int // quantity -> index in Roundings
	referenceOf map[string]int
	spoken      map[string]bool // components of definitions
}

// SpeaksOf tells whether a definition of the law sums a component.
func (l *Law) SpeaksOf(tag string) bool { return l.spoken[tag] }

// RoundingOf finds the rounding rule of a quantity.
func (l *Law) RoundingOf(name string) (Active[Rounding], bool) {
	i, ok := l.roundingOf[name]
	if !ok {
		return Active[Rounding]{}, false
	}
	return l.Roundings.All[i], true
}

// Declaration is the market's table; false before it has one.
func (l *Law) Declaration() (Active[Declaration], bool) {
	if len(l.Declarations.All) == 0 {
		return Active[Declaration]{}, false
	}
	return l.Declarations.All[0], true
}

// ReferenceOf finds the reference value of a quantity.
func (l *Law) ReferenceOf(name string) (Active[Reference], bool) {
	i, ok := l.referenceOf[name]
	if !ok {
		return Active[Reference]{}, false
	}
	return l.References.All[i], true
}

// At gives a market's law on a labelling date. facts answers the conditions on which a law makes its dates depend. The book remembers what
// it chose; laws are never changed.
func (b *Book) At(jurisdiction, date string, t Transition, facts func(*Condition) quantity.Truth) (*Law, bool) {
	m, ok := b.markets[jurisdiction]
	if !ok {
		return nil, false
	}
	key := asked{jurisdiction, date, t}
	if law, ok := b.chosen.find(key, facts); ok {
		return law, true
	}
	way := route{}
	way.law = m.at(newSelection(m, date, t, way.through(facts)))
	b.chosen.keep(key, way)
	return way.law, true
}

func (m *Rules) at(s *selection) *Law {
	law := &Law{Market: &m.Market, Date: s.date, Transition: s.transition, Edition: s.edition}
	law.Definitions = active(s, m.Definitions)
	law.Energy = active(s, m.Energy)
	law.References = active(s, m.References)
	law.Roundings = active(s, m.Roundings)
	law.Declarations = active(s, m.Declarations)
	law.ReferenceAmounts = active(s, m.ReferenceAmounts)
	law.Claims = active(s, m.Claims)
	law.Disclosures = active(s, m.Disclosures)
	law.Limits = active(s, m.Limits)
	law.Serving = active(s, m.Serving)
	law.HealthClaims = active(s, m.HealthClaims)
	law.Naming = active(s, m.Naming)
	law.Conditions = active(s, m.Conditions)
	law.Wordings = active(s, m.Wordings)
	law.index()
	return law
}

// EditionAt is the edition that At would take.
func (b *Book) EditionAt(jurisdiction, date string, t Transition, facts func(*Condition) quantity.Truth) (string, bool) {
	m, ok := b.markets[jurisdiction]
	if !ok {
		return "", false
	}
	return newSelection(m, date, t, facts).edition, true
}

func (l *Law) index() {
	l.roundingOf = map[string]int{}
	for i, r := range l.Roundings.All {
		for _, q := range r.Body.Quantities {
			l.roundingOf[q] = i
		}
	}
	alsoNamed(&l.Claims)
	alsoNamed(&l.HealthClaims)
	l.referenceOf = map[string]int{}
	for i, r := range l.References.All {
		l.referenceOf[r.Body.Quantity] = i
	}
	l.offers()
	l.spoken = map[string]bool{}
	for _, d := range l.Definitions.All {
		for i := range d.Body.Ways {
			for tag := range d.Body.Ways[i].Sum {
				l.spoken[tag] = true
			}
		}
	}
}

// alsoNamed lets a claim be found by the names that other markets have for it.
func alsoNamed(l *List[Claim]) {
	for i, c := range l.All {
		for _, name := range c.Body.AlsoNamed {
			if _, taken := l.byName[name]; !taken {
				l.byName[name] = i
			}
		}
	}
}

type selection struct {
	date       string
	transition Transition
	edition    string
	facts      func(*Condition) quantity.Truth
}

func newSelection(m *Rules, date string, t Transition, facts func(*Condition) quantity.Truth) *selection {
	s := &selection{date: date, transition: t, facts: facts}
	s.edition = s.pickEdition(m.Market.Editions)
	return s
}

func active[T any](s *selection, rules []Rule[T]) List[T] {
	l := List[T]{byName: make(map[string]int, len(rules)), All: make([]Active[T], 0, len(rules))}
	for i := range rules {
		r := &rules[i]
		best := s.pick(len(r.Versions), func(i int) *Head { return &r.Versions[i].Head })
		if best < 0 {
			continue
		}
		l.byName[Name(r.ID)] = len(l.All)
		l.All = append(l.All, Active[T]{ID: r.ID, Head: &r.Versions[best].Head, Body: &r.Versions[best].Body})
	}
	return l
}

func (s *selection) pickEdition(editions []Edition) string {
	i := s.pick(len(editions), func(i int) *Head {
		e := &editions[i]
		return &Head{From: e.From, Until: e.Until, RequiredFrom: e.RequiredFrom}
	})
	if i < 0 {
		return ""
	}
	return editions[i].Edition
}

// pick chooses among the versions that hold: the newest, or the newest that must already be used, or else the oldest.
func (s *selection) pick(n int, head func(int) *Head) int {
	best, oldest := -1, -1
	for i := range n {
		h := head(i)
		if h.From > s.date || h.Until != "" && h.Until <= s.date || !h.holdsOn(s.edition) {
			continue
		}
		if oldest < 0 || h.From < head(oldest).From {
			oldest = i
		}
		if s.transition != Newest && !s.required(h.RequiredFrom) {
			continue
		}
		if best < 0 || h.From > head(best).From {
			best = i
		}
	}
	if best < 0 {
		return oldest
	}
	return best
}

// required tells whether a version must be used by now. A staggered date whose condition is open counts as not reached
// until the last of them is.
func (s *selection) required(dates []Required) bool {
	if len(dates) == 0 {
		return true
	}
	last, open := "", false
	for _, r := range dates {
		t := quantity.Yes
		if r.When != nil {
			t = s.facts(r.When)
		}
		if t == quantity.No {
			continue
		}
		if t == quantity.Yes && !open {
			return r.Date <= s.date
		}
		open, last = true, max(last, r.Date)
	}
	return last != "" && last <= s.date
}
