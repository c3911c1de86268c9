package rulebook

import (
	"slices"
	"strconv"
	"strings"

	"github.com/go-json-experiment/json/jsontext"
)

// Difference lists what differs between two sets: every version of a rule that is in one only, or that reads otherwise,
// and every market's own page, market by market and kind by kind; practice stands last.
func Difference(old, now *Book) []Change {
	out := []Change{}
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

func differenceOfMarkets(j string, old, now *Rules) []Change {
	var out []Change
	page := Change{Kind: "jurisdiction", ID: j + "/jurisdiction", Effect: Edited, Members: members(&old.Market, &now.Market)}
	switch {
	case old.Market.Jurisdiction == "":
		page.Effect, page.Members = Added, nil
	case now.Market.Jurisdiction == "":
		page.Effect, page.Members = Removed, nil
	}
	if page.Effect != Edited || page.Members != nil {
		out = append(out, page.finish(j, nil, nil))
	}
	return append(out, differenceOfTables(j, old.tables(), now.tables())...)
}

func differenceOfTables(j string, old, now []table) []Change {
	var out []Change
	for i := range old {
		out = append(out, old[i].difference(j, now[i])...)
	}
	return out
}

func (t *rows[T]) difference(j string, other table) []Change {
	now, ok := other.(*rows[T])
	if !ok {
		return nil
	}
	before, after := byID(*t.rules), byID(*now.rules)
	var out []Change
	for _, id := range union(sorted(before), sorted(after)) {
		out = append(out, differenceOfVersions(Change{Jurisdiction: j, Kind: t.file, ID: id}, before[id], after[id])...)
	}
	return out
}

// differenceOfVersions compares the versions of a rule that begin on the same day for the same edition.
func differenceOfVersions[T any](c Change, old, now *Rule[T]) []Change {
	before, after := old.byStart(), now.byStart()
	var out []Change
	for _, key := range union(sorted(before), sorted(after)) {
		one, was, is := c, before[key], after[key]
		switch {
		case was == nil:
			one.Effect, one.Is = Added, &is.Head
			out = append(out, one.finish(c.Jurisdiction, nil, nil))
		case is == nil:
			one.Effect, one.Was = Removed, &was.Head
			out = append(out, one.finish(c.Jurisdiction, nil, nil))
		default:
			one.Effect, one.Was, one.Is, one.Members = Edited, &was.Head, &is.Head, members(&was.Head, &is.Head)
			if one = one.finish(c.Jurisdiction, &was.Body, &is.Body); len(one.Members) > 0 {
				out = append(out, one)
			}
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
		start := v.From + " " + v.Edition + strings.Join(v.Editions, " ")
		key := start
		for n := 2; out[key] != nil; n++ {
			key = start + " " + strconv.Itoa(n)
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

// union sorts the names of two lists.
func union(a, b []string) []string {
	out := slices.Concat(a, b)
	slices.Sort(out)
	return slices.Compact(out)
}

// says is the effect in short. Plain values of one or two members stand with it.
func (c *Change) says() string {
	since := func(h *Head) string { return "version from " + h.From }
	switch {
	case c.Was == nil && c.Is == nil:
		return "the market's own page is " + c.Effect + c.memberNames()
	case c.Was == nil:
		return c.Effect + ": " + since(c.Is) + ", " + c.Is.Source.Ref
	case c.Is == nil:
		return c.Effect + ": " + since(c.Was) + ", " + c.Was.Source.Ref
	case len(c.Members) == 0:
		return c.Effect + ": the same under " + c.Is.Source.Ref
	}
	return c.Effect + c.memberNames()
}

func (c *Change) memberNames() string {
	var parts []string
	for _, m := range c.Members {
		s := m.Member
		if before, after := m.Was.Kind(), m.Is.Kind(); before == '"' && after == '"' && len(m.Was)+len(m.Is) < 80 {
			s += " " + plainText(m.Was) + " becomes " + plainText(m.Is)
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
