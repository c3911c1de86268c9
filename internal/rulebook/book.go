package rulebook

import (
	"slices"
	"strings"
)

// A Rule is one rule of a kind with its versions, oldest first.
type Rule[T any] struct {
	ID       string              `json:"id"`
	ForEach  []map[string]string `json:"for each,omitzero"` // expanded by the loader
	Versions []Version[T]        `json:"versions"`
}

// A Version is one dated wording of a rule.
type Version[T any] struct {
	Head `json:",embed"`
	Body T `json:",embed"`
}

// Name is the last segment of a rule's identifier.
func Name(id string) string { return id[strings.LastIndexByte(id, '/')+1:] }

// A Book is a loaded, linted rule set. Its rules are never changed after Load, and it may be used by many at once.
type Book struct {
	Version string // of the set, for people
	Digest  string // "sha256:" over all files
	markets map[string]*Rules

	languages map[string]*Language // words, by language
	concepts  Concepts

	Presumptions []Rule[Presumption]
	Origins      []Rule[Origin]

	chosen chosen

	Memo Memo // what others work out from the book once
}

// Rules are all rules of one market.
type Rules struct {
	Market           Market
	Definitions      []Rule[Definition]
	Energy           []Rule[Energy]
	References       []Rule[Reference]
	Roundings        []Rule[Rounding]
	Declarations     []Rule[Declaration]
	ReferenceAmounts []Rule[ReferenceAmount]
	Claims           []Rule[Claim]
	Disclosures      []Rule[Disclosure]
	Limits           []Rule[Limit]
	Serving          []Rule[Limit] // what must hold of serving and package
	HealthClaims     []Rule[Claim]
	Naming           []Rule[Naming]
	Conditions       []Rule[Named]
	Wordings         []Rule[Wording]
}

// Jurisdictions lists the markets of the set, sorted.
func (b *Book) Jurisdictions() []string {
	out := make([]string, 0, len(b.markets))
	for j := range b.markets {
		out = append(out, j)
	}
	slices.Sort(out)
	return out
}

// Rules gives one market's rules, all versions.
func (b *Book) Rules(jurisdiction string) (*Rules, bool) {
	r, ok := b.markets[jurisdiction]
	return r, ok
}

// ListsClaim tells whether any market of the set lists a claim of this shared name.
func (b *Book) ListsClaim(name string) bool {
	for _, m := range b.markets {
		for _, c := range slices.Concat(m.Claims, m.HealthClaims) {
			if Name(c.ID) == name {
				return true
			}
			for _, v := range c.Versions {
				if slices.Contains(v.Body.AlsoNamed, name) {
					return true
				}
			}
		}
	}
	return false
}

// ClaimNames lists the shared names of all claims of all markets, sorted.
func (b *Book) ClaimNames() []string {
	var out []string
	for _, m := range b.markets {
		for _, c := range slices.Concat(m.Claims, m.HealthClaims) {
			out = append(out, Name(c.ID))
			for _, v := range c.Versions {
				out = append(out, v.Body.AlsoNamed...)
			}
		}
	}
	slices.Sort(out)
	return slices.Compact(out)
}

// First is the day on which the market's declaration begins; empty where it has none.
func (r *Rules) First() string {
	first := ""
	for _, d := range r.Declarations {
		for _, v := range d.Versions {
			if first == "" || v.From < first {
				first = v.From
			}
		}
	}
	return first
}
