package recheck

import (
	"cmp"
	"slices"

	"gramlaw/internal/check"
)

// Kinds of changes.
const (
	LimitCrossed = "limit crossed" // a limit or a duty that held does not any more, or is open
	ClaimLost    = "claim lost"    // a claim that the recipe asks for may stand no more
	ClaimOpen    = "claim open"    // whether it may stand is not determined any more
	Statement    = "statement"     // what must stand beside a claim or with the declaration
	Line         = "line"          // a line prints otherwise, must stand, or may go
	Name         = "name"          // what the law says of a name
	ClaimGained  = "claim gained"  // a claim that the recipe asks for may stand now
	LimitKept    = "limit kept"    // a limit or a duty holds now
	ClaimVerdict = "claim verdict" // another verdict among those that keep a claim off the label
	OfferLost    = "offer lost"    // a claim that nobody asked for is not open to the product any more
	OfferGained  = "offer gained"  // one is open to it now
	Note         = "note"          // what the report notes, or takes for granted
)

// Urgency orders the kinds, what to act on first in front.
var Urgency = []string{LimitCrossed, ClaimLost, ClaimOpen, Statement, Line, Name, ClaimGained, LimitKept, ClaimVerdict, OfferLost, OfferGained, Note}

// A Change is one thing that is different on the label, or in what may stand there.
type Change struct {
	Kind  string   `json:"kind"`
	What  string   `json:"what"`  // "sodium per serving", a claim's rule, a finding's code
	Was   string   `json:"was"`   // empty where nothing was
	Is    string   `json:"is"`    // empty where nothing is
	Rules []string `json:"rules"` // changed rules that are the cause
}

// An item is one thing a report says; its kind is that of a change of it, or one of these three.
type item struct {
	kind, what, text string
	rules            []string // that it rests on directly
	may, open        bool     // of a claim: it may stand on the label; whether it may is not determined
}

const claimItem, offerItem, findingItem = "claim", "offer", "finding"

// compare lists what differs between the two reports of a market.
func (p *Plan) compare(pair *check.Pair, b *between) []Change {
	was, is := items(&pair.Was), items(&pair.Is)
	var out []Change
	for _, key := range keys(was, is) {
		old, now := was.by[key], is.by[key]
		if old.text == now.text {
			continue
		}
		out = append(out, Change{Kind: kindOf(old, now), What: cmp.Or(old.what, now.what), Was: old.text, Is: now.text, Rules: p.causes(b, old.rules, now.rules)})
	}
	slices.SortStableFunc(out, func(a, b Change) int { return slices.Index(Urgency, a.Kind) - slices.Index(Urgency, b.Kind) })
	return out
}

// kindOf says what a difference means.
func kindOf(old, now item) string {
	switch kind := cmp.Or(old.kind, now.kind); kind {
	case claimItem:
		return claimKind(old, now)
	case offerItem:
		if now.text == "" {
			return OfferLost
		}
		return OfferGained
	case findingItem:
		if now.text == "" {
			return LimitKept
		}
		return LimitCrossed
	default:
		return kind
	}
}

func claimKind(old, now item) string {
	switch {
	case old.may && now.may:
		return Statement // it stands on both sides: what goes with it differs
	case old.may && now.open:
		return ClaimOpen
	case old.may:
		return ClaimLost
	case now.may:
		return ClaimGained
	}
	return ClaimVerdict
}

// causes are the changed rules among all that a thing rests on, on either side. Where none is, every change of what holds for the whole
// label is: its table, its servings, its reference amounts, and what practice presumes; and where none of these changed, all changes.
func (p *Plan) causes(b *between, was, is []string) []string {
	found := map[string]bool{}
	for i, start := range [][]string{was, is} {
		b.reach(b.rests[i], start, found)
	}
	if len(found) == 0 {
		for _, c := range b.changes {
			if slices.Contains(wholeLabel, c.Kind) {
				found[c.ID] = true
			}
		}
		for _, c := range p.practice {
			found[c.ID] = true
		}
	}
	if len(found) == 0 {
		found = b.changed
	}
	return sortedKeys(found)
}

var wholeLabel = []string{"declaration", "serving", "reference_amounts", "jurisdiction"}

// reach adds the changed rules that can be reached from start.
func (b *between) reach(rests map[string][]string, start []string, found map[string]bool) {
	seen := map[string]bool{}
	for todo := slices.Clone(start); len(todo) > 0; {
		id := todo[len(todo)-1]
		todo = todo[:len(todo)-1]
		if id == "" || seen[id] {
			continue
		}
		seen[id] = true
		if b.changed[id] {
			found[id] = true
		}
		todo = append(todo, rests[id]...)
	}
}
