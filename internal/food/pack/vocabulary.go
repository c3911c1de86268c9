package main

import (
	"encoding/binary"
	"fmt"
	"maps"
	"slices"

	"gramlaw/internal/food/layout"
	"gramlaw/internal/food/words"
)

// vocabulary lists for every distinct word of the names the foods that have it.
func (p *packer) vocabulary() error {
	foods := map[string][]int{}
	for i, row := range p.t.wide.rows {
		found := words.Split(p.t.wide.cell(row, "description"))
		slices.Sort(found)
		for _, word := range slices.Compact(found) {
			foods[word] = append(foods[word], i)
		}
	}
	for _, word := range slices.Sorted(maps.Keys(foods)) {
		if len(word) > 255 {
			return fmt.Errorf("word %q is too long", word)
		}
		posting := differences(foods[word])
		p.add(layout.Vocabulary, byte(len(word)))
		p.add(layout.Vocabulary, []byte(word)...)
		p.add(layout.Vocabulary, binary.AppendUvarint(nil, uint64(len(posting)))...)
		p.add(layout.Postings, posting...)
	}
	return nil
}

func differences(positions []int) []byte {
	var b []byte
	last := 0
	for _, position := range positions {
		b = binary.AppendUvarint(b, uint64(position-last))
		last = position
	}
	return b
}
