package rulebook

import (
	"slices"
	"strconv"
	"strings"

	"github.com/go-json-experiment/json/jsontext"
)

// Difference lists what differs between two sets: every version of a rule that is in one only, or that reads otherwise,
// and every market's own page, market by market and kind by kind; practice stands last.
func Difference(old, now *Book) []Edit {
	out := []Edit{}
	for _, j := range union(old.Jurisdictions(), now.Jurisdictions()) {
		out = append(out, differenceOfMarkets(j, old.market(j), now.market(j))...)
	}
	return append(out, differenceOfTables(practice, old.tables(), now.tables())...)
}

// market is a market's rules, empty where the set has no such market.
func (b *Book) market(jurisdiction string) *Rules {
	if m, ok := b.markets[jurisdiction]; ok {
		return m
	}
	return &Rules{}
}

func differenceOfMarkets(j string, old, now *Rules) []Edit {
	var out []Edit
	if m := members(&old.Market, &now.Market); len(m) > 0 {
		c := Edit{Jurisdiction: j, Kind: "jurisdiction", Rule: j + "/jurisdiction", Effect: Edited, Members: m, Days: []Day{}}
		switch {
		case old.Market.Jurisdiction == "":
			c.Effect, c.Members = Added, []Member{}
		case now.Market.Jurisdiction == "":
			c.Effect, c.Members = Removed, []Member{}
		}
		c.Says = c.says()
		out = append(out, c)
	}
	return append(out, differenceOfTables(j, old.tables(), now.tables())...)
}

func differenceOfTables(j string, old, now []table) []Edit {
	var out []Edit
	for i := range old {
		for _, c := range old[i].difference(now[i]) {
			c.Jurisdiction, c.Kind = j, old[i].kind()
			out = append(out, c)
		}
	}
	return out
}

func (t *rows[T]) difference(other table) []Edit {
	now, ok := other.(*rows[T])
	if !ok {
		return nil
	}
	before, after := byID(*t.rules), byID(*now.rules)
	var out []Edit
	for _, id := range union(ids(*t.rules), ids(*now.rules)) {
		out = append(out, differenceOfVersions(id, before[id], after[id])...)
	}
	return out
}

// differenceOfVersions compares the versions of a rule that begin on the same day for the same edition.
func differenceOfVersions[T any](id string, old, now *Rule[T]) []Edit {
	before, after := old.byStart(), now.byStart()
	var out []Edit
	for _, key := range union(sorted(before), sorted(after)) {
		a, b := before[key], after[key]
		c := change(id, a, b, [3]string{Added, Removed, Edited})
		if c.Effect == Edited {
			c.Members = append(c.Members, members(&a.Head, &b.Head)...)
			c.Says = c.says()
		}
		if c.Effect != Edited || len(c.Members) > 0 {
			out = append(out, c)
		}
	}
	return out
}

// byStart finds a rule's versions by the day on which they begin and their edition.
func (r *Rule[T]) byStart() map[string]*Version[T] {
	out := map[string]*Version[T]{}
	if r == nil {
		return out
	}
	for i := range r.Versions {
		v := &r.Versions[i]
		key := v.From + " " + v.Edition
		for n := 2; out[key] != nil; n++ {
			key = v.From + " " + v.Edition + " " + strconv.Itoa(n)
		}
		out[key] = v
	}
	return out
}

func byID[T any](rules []Rule[T]) map[string]*Rule[T] {
	out := make(map[string]*Rule[T], len(rules))
	for i := range rules {
		out[rules[i].ID] = &rules[i]
	}
	return out
}

func ids[T any](rules []Rule[T]) []string {
	out := make([]string, len(rules))
	for i := range rules {
		out[i] = rules[i].ID
	}
	return out
}

// union sorts the names of two lists.
func union(a, b []string) []string {
	out := slices.Concat(a, b)
	slices.Sort(out)
	return slices.Compact(out)
}

// says is the effect in short. Plain values of one or two members stand with it.
func (c *Edit) says() string {
	since := func(h *Head) string { return "version from " + h.From }
	switch {
	case c.Before == nil && c.After == nil:
		return "the market's own page is " + c.Effect + c.memberNames()
	case c.Before == nil:
		return c.Effect + ": " + since(c.After) + ", " + c.After.Source.Ref
	case c.After == nil:
		return c.Effect + ": " + since(c.Before) + ", " + c.Before.Source.Ref
	case len(c.Members) == 0:
		return c.Effect + ": the same under " + c.After.Source.Ref
	}
	return c.Effect + c.memberNames()
}

func (c *Edit) memberNames() string {
	var parts []string
	for _, m := range c.Members {
		s := m.Member
		if before, after := m.Before.Kind(), m.After.Kind(); before == '"' && after == '"' && len(m.Before)+len(m.After) < 80 {
			s += " " + plainText(m.Before) + " becomes " + plainText(m.After)
		}
		parts = append(parts, s)
	}
	if parts == nil {
		return ""
	}
	return ": " + strings.Join(parts, ", ")
}

func plainText(v jsontext.Value) string {
	b, err := jsontext.AppendUnquote(nil, v)
	if err != nil {
		return string(v)
	}
	return string(b)
}
