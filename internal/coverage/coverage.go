// Package coverage counts what a rule set holds: rules and dated versions by market and kind, how well each is sourced and how
// binding it is, and what each market is known to lack.
//
// Of is the one call; it is a function of the rule set alone.
package coverage

import (
	"fmt"
	"slices"
	"strings"

	"gramlaw/internal/rulebook"
)

// A Report is the coverage of a rule set.
type Report struct {
	Version string   `json:"version"`
	Digest  string   `json:"digest"`
	Markets []Market `json:"markets"`
	Caution string   `json:"caution"`
}

// A Market is the coverage of one jurisdiction, or of practice.
type Market struct {
	Jurisdiction string   `json:"jurisdiction"`
	Name         string   `json:"name"`
	Languages    []string `json:"languages"`
	Editions     []string `json:"editions"`
	Kinds        []Kind   `json:"kinds"`
	Total        Kind     `json:"total"`
	Gaps         []string `json:"gaps"`
}

// A Kind counts the rules of one file. Evidence and Force count versions and have every grade.
type Kind struct {
	Kind     string         `json:"kind"`
	Rules    int            `json:"rules"`
	Versions int            `json:"versions"`
	First    string         `json:"first"` // the earliest day a version may be used
	Evidence map[string]int `json:"evidence"`
	Force    map[string]int `json:"force"`
}

// Of counts the markets named, or all where none is named; what practice presumes stands last. An unknown market is an
// error that lists the known ones.
func Of(b *rulebook.Book, in []string, caution string) (*Report, error) {
	known := b.Jurisdictions()
	if len(in) == 0 {
		in = known
	}
	r := &Report{Version: b.Version, Digest: b.Digest, Markets: []Market{}, Caution: caution}
	for _, j := range in {
		rules, ok := b.Rules(j)
		if !ok {
			return nil, fmt.Errorf("%q is no market of this rule set; known are %s", j, strings.Join(known, ", "))
		}
		r.Markets = append(r.Markets, market(rules))
	}
	practice := &counter{Market: Market{Jurisdiction: "practice", Name: "Practice", Languages: []string{}, Editions: []string{}, Gaps: []string{}}}
	Practice(b, practice.count)
	r.Markets = append(r.Markets, practice.finish())
	return r, nil
}

func market(rules *rulebook.Rules) Market {
	m := &rules.Market
	c := &counter{Market: Market{Jurisdiction: m.Jurisdiction, Name: m.Name, Languages: some(m.Languages), Editions: []string{}, Gaps: some(m.Gaps)}}
	for _, e := range m.Editions {
		c.Editions = append(c.Editions, e.Edition)
	}
	Walk(rules, c.count)
	return c.finish()
}

// some is a list that is never null in JSON.
func some(list []string) []string { return append([]string{}, list...) }

// A counter adds versions up, in the order of the walk.
type counter struct {
	Market
	rule string // the last one counted
}

func (c *counter) count(kind, id string, h *rulebook.Head) {
	if n := len(c.Kinds); n == 0 || c.Kinds[n-1].Kind != kind {
		c.Kinds = append(c.Kinds, newKind(kind))
	}
	k := &c.Kinds[len(c.Kinds)-1]
	if c.rule != id {
		c.rule = id
		k.Rules++
	}
	k.Versions++
	k.Evidence[h.Source.Evidence]++
	k.Force[h.Source.Force]++
	if k.First == "" || h.From < k.First {
		k.First = h.From
	}
}

func newKind(name string) Kind {
	k := Kind{Kind: name, Evidence: map[string]int{}, Force: map[string]int{}}
	for _, e := range rulebook.Evidences {
		k.Evidence[e] = 0
	}
	for _, f := range rulebook.Forces {
		k.Force[f] = 0
	}
	return k
}

func (c *counter) finish() Market {
	total := newKind("all")
	for _, k := range c.Kinds {
		total.Rules += k.Rules
		total.Versions += k.Versions
		for e, n := range k.Evidence {
			total.Evidence[e] += n
		}
		for f, n := range k.Force {
			total.Force[f] += n
		}
		if total.First == "" || k.First < total.First {
			total.First = k.First
		}
	}
	c.Total = total
	c.Kinds = slices.Clip(append([]Kind{}, c.Kinds...))
	return c.Market
}
