package food

import (
	"slices"

	"gramlaw/internal/food/layout"
	"gramlaw/internal/food/words"
)

// Bounds of a search. What is longer is cut, so that a query stays cheap.
const (
	MaxQuery   = 200 // bytes of text
	maxWords   = 10
	typoLength = 4 // letters from which one typing error is tolerated
)

// Penalties of a word that is not met exactly; the best way counts.
const (
	exact = iota
	begins
	mistyped
	ways
)

// Search finds foods whose names have all the words of the text, in any order.
// A word may be the beginning of a word in the name, and from four letters on
// it may have one typing error (a letter missing, added, changed, or two
// exchanged). Exact words come before beginnings and those before typing
// errors, shorter names before longer ones. Of a text over MaxQuery bytes the
// first MaxQuery count, of its words the first ten.
func Search(text string, limit int) []Food {
	wanted := query(text)
	if limit <= 0 || len(wanted) == 0 {
		return nil
	}
	found := make([]hit, foodCount())
	for i, word := range wanted {
		meet(found, uint8(i), word)
	}
	best := rank(found, uint8(len(wanted)))
	foods := make([]Food, 0, min(limit, len(best)))
	for _, position := range best[:min(limit, len(best))] {
		foods = append(foods, foodAt(position))
	}
	return foods
}

func query(text string) []string {
	var wanted []string
	for _, word := range words.Split(text[:min(len(text), MaxQuery)]) {
		if len(wanted) < maxWords && !slices.Contains(wanted, word) {
			wanted = append(wanted, word)
		}
	}
	return wanted
}

// hit counts for one food how many words were met and at what penalty.
type hit struct{ met, penalty uint8 }

// meet marks the foods that have the word, the best way first. Foods that lack
// an earlier word stay behind.
func meet(found []hit, earlier uint8, word string) {
	var postings [ways][]string
	eachWord(func(have, posting string) {
		if way := compare(have, word); way < ways {
			postings[way] = append(postings[way], posting)
		}
	})
	for way, lists := range postings {
		for _, posting := range lists {
			mark(found, earlier, uint8(way), posting)
		}
	}
}

func mark(found []hit, earlier, penalty uint8, posting string) {
	position := 0
	for i := 0; i < len(posting); {
		var step uint64
		step, i = layout.Uvarint(posting, i)
		position += int(step)
		if h := &found[position]; h.met == earlier {
			h.met++
			h.penalty += penalty
		}
	}
}

// eachWord walks through the distinct words of all names.
func eachWord(visit func(word, posting string)) {
	postings := section(layout.Postings)
	r := reader{s: section(layout.Vocabulary)}
	for r.i < len(r.s) {
		word := r.bytes(int(r.byte()))
		size := r.number()
		visit(word, postings[:size])
		postings = postings[size:]
	}
}

func compare(have, word string) int {
	switch {
	case have == word:
		return exact
	case len(have) > len(word) && have[:len(word)] == word:
		return begins
	case len(word) >= typoLength && oneError(have, word):
		return mistyped
	}
	return ways
}

// oneError tells whether one letter inserted, deleted or changed, or two
// neighbours exchanged, turn a into b.
func oneError(a, b string) bool {
	if len(a) > len(b) {
		a, b = b, a
	}
	if len(b)-len(a) > 1 {
		return false
	}
	i := 0
	for i < len(a) && a[i] == b[i] {
		i++
	}
	if len(a) < len(b) {
		return a[i:] == b[i+1:]
	}
	if i == len(a) || a[i+1:] == b[i+1:] {
		return true
	}
	return i+1 < len(a) && a[i] == b[i+1] && a[i+1] == b[i] && a[i+2:] == b[i+2:]
}

// rank gives the positions of the foods that met every word, best first.
func rank(found []hit, all uint8) []int {
	var keys []uint64
	index, records := section(layout.Index), section(layout.Records)
	for position, h := range found {
		if h.met == all {
			offset := layout.Uint32(index, position*layout.IndexWidth+4)
			length, _ := layout.Uvarint(records, offset)
			keys = append(keys, uint64(h.penalty)<<48|length<<32|uint64(position))
		}
	}
	slices.Sort(keys)
	positions := make([]int, 0, len(keys))
	for _, key := range keys {
		positions = append(positions, int(key&(1<<32-1)))
	}
	return positions
}
