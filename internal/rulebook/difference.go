package rulebook

import (
	"fmt"
	"slices"
	"strings"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"

	"gramlaw/internal/quantity"
)

// Effects of a change. Between two days of one set a rule begins, ends, or is replaced; between two sets a version is
// added, removed or edited.
const (
	Begins   = "begins"
	Ends     = "ends"
	Replaced = "replaced"
	Added    = "added"
	Removed  = "removed"
	Edited   = "edited"
)

// An Edit is what differs in one rule.
type Edit struct {
	Jurisdiction string   `json:"jurisdiction"`
	Kind         string   `json:"kind"` // name of the file: "claims"
	Rule         string   `json:"rule"` // identifier; of a market's own page "<jurisdiction>/jurisdiction"
	Effect       string   `json:"effect"`
	Says         string   `json:"says"`   // the effect in short, in English
	Before       *Head    `json:"before"` // null where nothing was
	After        *Head    `json:"after"`  // null where nothing is
	Members      []Member `json:"members"`
	Days         []Day    `json:"days"` // between two days of one set: the switches of the rule's versions on the way
}

// A Member is a member of a rule that differs, with its JSON on both sides; null where it is absent.
type Member struct {
	Member string         `json:"member"`
	Before jsontext.Value `json:"before"`
	After  jsontext.Value `json:"after"`
}

// A Day is a date on which something switches for a version.
type Day struct {
	Date string     `json:"date"`
	What string     `json:"what"` // one of Switches
	When *Condition `json:"when,omitzero"`
}

// Switches of a version: it may be used, it must be used, it no longer holds.
var Switches = []string{"may be used", "must be used", "no longer holds"}

// Changes lists the rules of a market that hold in another version on the day to than on the day from, kind by kind in
// the order of the files. Transition and facts choose among versions as in At. An edition whose own dates switch changes
// every rule that has a version for it.
func (b *Book) Changes(jurisdiction, from, to string, t Transition, facts func(*Condition) quantity.Truth) ([]Edit, error) {
	m, ok := b.markets[jurisdiction]
	switch {
	case !ok:
		return nil, fmt.Errorf("%q is no market of this rule set; known are %s", jurisdiction, strings.Join(b.Jurisdictions(), ", "))
	case !isDate(from):
		return nil, fmt.Errorf("%q is no date yyyy-mm-dd", from)
	case !isDate(to) || to < from:
		return nil, fmt.Errorf("%q is no date yyyy-mm-dd from %s on", to, from)
	}
	old, now := newSelection(m, from, t, facts), newSelection(m, to, t, facts)
	out := []Edit{}
	for _, table := range m.tables() {
		for _, c := range table.between(old, now) {
			c.Jurisdiction, c.Kind = jurisdiction, table.kind()
			out = append(out, c)
		}
	}
	return out, nil
}

func (t *rows[T]) between(old, now *selection) []Edit {
	var out []Edit
	for i := range *t.rules {
		r := &(*t.rules)[i]
		head := func(i int) *Head { return &r.Versions[i].Head }
		before, after := old.pick(len(r.Versions), head), now.pick(len(r.Versions), head)
		if before == after {
			continue
		}
		c := change(r.ID, r.at(before), r.at(after), [3]string{Begins, Ends, Replaced})
		c.Days = days(r.heads(), old.date, now.date)
		out = append(out, c)
	}
	return out
}

// at is the version of an index; nil for -1.
func (r *Rule[T]) at(i int) *Version[T] {
	if i < 0 {
		return nil
	}
	return &r.Versions[i]
}

// days are the switches after one day up to another.
func days(heads []*Head, from, to string) []Day {
	out := []Day{}
	add := func(date string, what int, when *Condition) {
		d := Day{date, Switches[what], when}
		if date > from && date <= to && !slices.Contains(out, d) {
			out = append(out, d)
		}
	}
	for _, h := range heads {
		add(h.From, 0, nil)
		for _, r := range h.RequiredFrom {
			add(r.Date, 1, r.When)
		}
		add(h.Until, 2, nil)
	}
	slices.SortStableFunc(out, func(a, b Day) int { return strings.Compare(a.Date, b.Date) })
	return out
}

// change compares two versions; one of them may be nil. effects are for a version that came, went and changed.
func change[T any](id string, before, after *Version[T], effects [3]string) Edit {
	c := Edit{Rule: id, Members: []Member{}, Days: []Day{}}
	switch {
	case before == nil:
		c.Effect, c.After = effects[0], &after.Head
	case after == nil:
		c.Effect, c.Before = effects[1], &before.Head
	default:
		c.Effect, c.Before, c.After = effects[2], &before.Head, &after.Head
		c.Members = members(&before.Body, &after.Body)
	}
	c.Says = c.says()
	return c
}

// members compares two values of a struct type, member by member of their JSON.
func members(before, after any) []Member {
	old, now := object(before), object(after)
	names := sorted(old)
	for name := range now {
		if _, ok := old[name]; !ok {
			names = append(names, name)
		}
	}
	slices.Sort(names)
	out := []Member{}
	for _, name := range names {
		if m := (Member{name, old[name], now[name]}); string(m.Before) != string(m.After) {
			out = append(out, m)
		}
	}
	return out
}

// object is the JSON of a value's members. What was read can be written: an error leaves the object empty.
func object(v any) map[string]jsontext.Value {
	b, err := json.Marshal(v, json.Deterministic(true))
	out := map[string]jsontext.Value{}
	if err == nil {
		err = json.Unmarshal(b, &out)
	}
	if err != nil {
		return nil
	}
	return out
}
