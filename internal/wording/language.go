package wording

import (
	"errors"
	"fmt"
	"maps"
	"slices"
	"strings"

	"gramlaw/internal/rulebook"
)

// A rule is what a pattern of a language leads to.
type rule struct {
	relation, form, component, percent string
	denies, decoy, health              bool
}

// A comparison is what begins one: how many of its tokens belong to the food's name, and the relations that it must stand right behind.
type comparison struct {
	ahead  int
	behind []string
}

// A phrasebook finds phrases and tells what they mean.
type phrasebook struct {
	*trie
	means []string
}

// A language is a language's words, compiled. It is never changed after compile.
type language struct {
	code        string
	decimal     rune
	vocabulary  vocabulary
	names       *phrasebook // of components, and of things
	isThing     map[string]bool
	before      *phrasebook // short forms of components before others
	after       *phrasebook
	units       *phrasebook
	numbers     *phrasebook
	bases       *phrasebook
	functions   *phrasebook
	joins       *phrasebook // conjunctions
	joinOver    map[uint32]bool
	denials     *phrasebook
	denyOver    map[uint32]bool
	compares    *phrasebook
	comparisons []comparison
	cues        *phrasebook
	sets        []*phrasebook // by slot, from firstSet on
	setSlots    map[string]slot
	patterns    *trie
	rules       []rule
}

// compiling gathers a language and what is wrong with it.
type compiling struct {
	*language
	data *rulebook.Language
	errs []error
}

// compile readies a language. The error lists every pattern that cannot be read.
func compile(data *rulebook.Language) (*language, error) {
	v := vocabulary{}
	l := &language{code: data.Language, decimal: rune(data.Decimal[0]), vocabulary: v, isThing: map[string]bool{}, joinOver: map[uint32]bool{}, denyOver: map[uint32]bool{}, patterns: newTrie(v)}
	for _, p := range []**phrasebook{&l.names, &l.before, &l.after, &l.units, &l.numbers, &l.bases, &l.functions, &l.joins, &l.denials, &l.compares, &l.cues} {
		*p = &phrasebook{trie: newTrie(v)}
	}
	c := &compiling{language: l, data: data}
	c.readSets()
	c.phrases()
	c.lists()
	c.relationPatterns()
	if len(c.errs) > 0 {
		return nil, fmt.Errorf("words/%s.json: %w", data.Language, errors.Join(c.errs...))
	}
	return l, nil
}

// readSets makes every set a slot.
func (c *compiling) readSets() {
	c.setSlots = map[string]slot{}
	for i, name := range slices.Sorted(maps.Keys(c.data.Sets)) {
		book := &phrasebook{trie: newTrie(c.vocabulary)}
		for _, w := range c.data.Sets[name] {
			c.put(book, name, w)
		}
		c.sets, c.setSlots[name] = append(c.sets, book), firstSet+slot(i)
	}
}

func (c *compiling) phrases() {
	for _, b := range c.data.Components {
		c.book(c.names, b.Phrases)
		c.book(c.before, b.Before)
		c.book(c.after, b.After)
	}
	for _, b := range c.data.Things {
		c.book(c.names, b.Phrases)
		for name := range b.Phrases {
			c.isThing[name] = true
		}
	}
	for book, blocks := range map[*phrasebook][]rulebook.PhraseWords{c.units: c.data.Units, c.numbers: c.data.Numbers, c.bases: c.data.Bases} {
		for _, b := range blocks {
			c.book(book, b.Phrases)
		}
	}
	for _, b := range c.data.Health {
		c.book(c.functions, b.Functions)
	}
}

func (c *compiling) lists() {
	c.list(c.joins, c.joinOver, c.data.Conjunctions)
	c.list(c.denials, c.denyOver, c.data.Negation)
	c.list(c.cues, nil, c.data.Cues)
	for _, b := range c.data.Comparison {
		for _, p := range b.Patterns {
			c.comparison(p, b.Behind)
		}
	}
}

// comparison adds what begins a comparison. What stands behind "+" must follow, and belongs to the name of the food.
func (c *compiling) comparison(pattern string, behind []string) {
	begins, follows, _ := strings.Cut(pattern, "+")
	ahead := [][]item{nil}
	if follows != "" {
		ahead = c.ways(follows)
	}
	for _, a := range c.ways(begins) {
		for _, b := range ahead {
			c.compares.add(slices.Concat(a, b), int32(len(c.comparisons)))
			c.comparisons = append(c.comparisons, comparison{len(b), behind})
		}
	}
}

func (c *compiling) list(book *phrasebook, over map[uint32]bool, blocks []rulebook.ListWords) {
	for _, b := range blocks {
		for _, p := range b.Phrases {
			c.put(book, "", p)
		}
		for _, w := range b.Over {
			for _, t := range tokens(w, c.decimal) {
				over[c.vocabulary.number(t.key)] = true
			}
		}
	}
}

func (c *compiling) book(book *phrasebook, phrases rulebook.Phrases) {
	for _, name := range slices.Sorted(maps.Keys(phrases)) {
		for _, p := range phrases[name] {
			c.put(book, name, p)
		}
	}
}

// put adds a phrase, which may have choices but no slots.
func (c *compiling) put(book *phrasebook, means, phrase string) {
	for _, way := range c.ways(phrase) {
		if slices.ContainsFunc(way, func(i item) bool { return i.slot != noSlot }) {
			c.errs = append(c.errs, fmt.Errorf("phrase %q: slots stand in patterns only", phrase))
		}
		book.add(way, int32(len(book.means)))
	}
	book.means = append(book.means, means)
}

func (c *compiling) ways(text string) [][]item {
	out, err := ways(text, c.setSlots, c.decimal)
	if err != nil {
		c.errs = append(c.errs, err)
	}
	for _, way := range out {
		if len(way) == 0 {
			c.errs = append(c.errs, fmt.Errorf("%q can be empty", text))
		}
	}
	return out
}

func (c *compiling) relationPatterns() {
	for _, r := range c.data.Relations {
		c.addPatterns(rule{relation: r.Relation, form: r.Form, component: r.Component, percent: r.Percent, denies: r.Denies}, r.Patterns)
	}
	for _, h := range c.data.Health {
		c.addPatterns(rule{relation: "health", form: h.Form, health: true}, h.Patterns)
	}
	for _, d := range c.data.Decoys {
		c.addPatterns(rule{decoy: true}, d.Patterns)
	}
}

func (c *compiling) addPatterns(r rule, patterns []string) {
	end := int32(len(c.rules))
	c.rules = append(c.rules, r)
	for _, p := range patterns {
		for _, way := range c.ways(p) {
			if i := slices.IndexFunc(way, func(i item) bool { return i.slot == stemSlot }); i >= 0 {
				c.stems(r, way, i)
				continue
			}
			c.patterns.add(way, end)
		}
	}
}

// stems writes a pattern out for every component that has a stem.
func (c *compiling) stems(r rule, way []item, at int) {
	for _, b := range c.data.Components {
		for _, name := range slices.Sorted(maps.Keys(b.Stems)) {
			r.component = name
			c.rules = append(c.rules, r)
			for _, stem := range b.Stems[name] {
				var glued []item
				for _, t := range tokens(way[at].stem[0]+stem+way[at].stem[1], c.decimal) {
					glued = append(glued, item{word: t.key})
				}
				c.patterns.add(slices.Concat(way[:at], glued, way[at+1:]), int32(len(c.rules)-1))
			}
		}
	}
}
