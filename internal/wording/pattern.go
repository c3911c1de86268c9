package wording

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// A slot is a place of a pattern that takes more than one certain word.
type slot uint8

const (
	noSlot slot = iota
	components
	things
	either
	numberSlot
	percentSlot
	amountSlot
	energySlot
	functions
	stemSlot
	anyWord
	basisSlot
	firstSet // and those behind it: sets of the language
)

// slots are the slots by the letter in braces.
func slots() map[string]slot {
	return map[string]slot{
		"c": components, "t": things, "k": either, "n": numberSlot, "%": percentSlot, "a": amountSlot, "e": energySlot, "h": functions, "s": stemSlot, "w": anyWord, "b": basisSlot,
	}
}

// mostWays bounds the ways in which one pattern can be written out.
const mostWays = 1 << 12

// An item is a step of a written-out pattern: a word, or a slot.
type item struct {
	word string
	slot slot
	stem [2]string // of a stem slot: what is glued before and behind
}

// A parser writes out patterns: every choice and everything that may be missing.
type parser struct {
	sets    map[string]slot
	decimal rune
	text    string
	at      int
}

// ways writes out a pattern.
func ways(text string, sets map[string]slot, decimal rune) ([][]item, error) {
	p := &parser{sets: sets, text: text, decimal: decimal}
	out, err := p.sequence("")
	if err == nil && p.at < len(p.text) {
		err = fmt.Errorf("%q closes nothing", p.text[p.at:p.at+1])
	}
	if err != nil {
		return nil, fmt.Errorf("pattern %q: %w", text, err)
	}
	return out, nil
}

// sequence reads up to one of the ends, which it leaves.
func (p *parser) sequence(ends string) ([][]item, error) {
	out := [][]item{nil}
	for p.at < len(p.text) && !strings.ContainsRune(ends+")]>", rune(p.text[p.at])) {
		step, err := p.step()
		if err != nil {
			return nil, err
		}
		if len(out)*len(step) > mostWays {
			return nil, fmt.Errorf("can be written in more than %d ways", mostWays)
		}
		out = product(out, step)
	}
	return out, nil
}

func product(a, b [][]item) [][]item {
	if len(b) == 1 && len(b[0]) == 0 {
		return a
	}
	out := make([][]item, 0, len(a)*len(b))
	for _, x := range a {
		for _, y := range b {
			out = append(out, append(x[:len(x):len(x)], y...))
		}
	}
	return out
}

// step reads a group, a set, a slot or plain words.
func (p *parser) step() ([][]item, error) {
	switch p.text[p.at] {
	case '(':
		return p.group(')')
	case '[':
		out, err := p.group(']')
		return append(out, nil), err
	case '<':
		return p.set()
	}
	return p.words()
}

func (p *parser) group(end byte) ([][]item, error) {
	var out [][]item
	for {
		p.at++
		one, err := p.sequence("|")
		if err != nil {
			return nil, err
		}
		out = append(out, one...)
		switch {
		case p.at == len(p.text):
			return nil, fmt.Errorf("%q is missing", string(end))
		case p.text[p.at] == end:
			p.at++
			return out, nil
		case p.text[p.at] != '|':
			return nil, fmt.Errorf("%q closes nothing", p.text[p.at:p.at+1])
		}
	}
}

// set is one of the words of a set, or nothing.
func (p *parser) set() ([][]item, error) {
	name, _, ok := strings.Cut(p.text[p.at+1:], ">")
	set, known := p.sets[name]
	if !ok || !known {
		return nil, fmt.Errorf("<%s> is no set", name)
	}
	p.at += len(name) + 2
	return [][]item{nil, {{slot: set}}}, nil
}

// words reads plain words and slots up to the next sign.
func (p *parser) words() ([][]item, error) {
	end := p.at
	for end < len(p.text) && !strings.ContainsRune("()[]<>|", rune(p.text[end])) {
		end++
	}
	if end == p.at {
		return nil, fmt.Errorf("%q stands in no group", p.text[end:end+1])
	}
	text := p.text[p.at:end]
	p.at = end
	var out []item
	for _, field := range strings.Fields(text) {
		items, err := p.field(field)
		if err != nil {
			return nil, err
		}
		out = append(out, items...)
	}
	return [][]item{out}, nil
}

// field is one word, with a slot in it or without.
func (p *parser) field(text string) ([]item, error) {
	before, rest, ok := strings.Cut(text, "{")
	if !ok {
		return p.plain(text), nil
	}
	name, after, closed := strings.Cut(rest, "}")
	kind, known := slots()[name]
	if !known {
		kind, known = p.sets[name]
	}
	switch {
	case !closed || !known:
		return nil, fmt.Errorf("{%s} is no slot and no set", name)
	case kind == stemSlot:
		return []item{{slot: kind, stem: [2]string{before, after}}}, nil
	}
	out := append(p.plain(before), item{slot: kind})
	return append(out, p.plain(after)...), nil
}

// plain is words without signs, cut as a text is.
func (p *parser) plain(text string) []item {
	var out []item
	for _, t := range tokens(text, p.decimal) {
		if c, _ := utf8.DecodeRuneInString(t.key); t.kind == mark && t.glued && apostrophe(c) && len(out) > 0 {
			out[len(out)-1].word += "'" // in a text a letter follows
			continue
		}
		out = append(out, item{word: t.key})
	}
	return out
}
