package food

import (
	"iter"
	"math/bits"
	"slices"
)

// ID is a dense component number for indexing arrays: 1 to Count, with 1 to
// SRCount the components of SR28 in the order of publication. 0 is none.
// It may change between builds; the tagname is what lasts.
type ID uint16

// IDs of components that the roll-up speaks of itself; a test holds them to the register.
const (
	Water             ID = 1
	Fat               ID = 6
	FolicAcid         ID = 36
	FoodFolate        ID = 37
	FolateEquivalents ID = 38
	TransFat          ID = 121
)

// Unit is the unit of a component's amounts, spelt as in the tables.
type Unit string

// The units of the register.
const (
	Gram              Unit = "g"
	Milligram         Unit = "mg"
	Microgram         Unit = "ug"
	Kilocalorie       Unit = "kcal"
	Kilojoule         Unit = "kJ"
	InternationalUnit Unit = "IU"
)

// GramExponent gives the power of ten that turns the unit into grams, and
// false for units without a mass. Amounts without a mass have no upper bound
// from the register.
func (u Unit) GramExponent() (int8, bool) {
	switch u {
	case Gram:
		return 0, true
	case Milligram:
		return -3, true
	case Microgram:
		return -6, true
	}
	return 0, false
}

// Component is one entry of the register. Amounts of it are per 100 g edible
// portion unless said otherwise.
type Component struct {
	ID   ID
	Tag  string
	Unit Unit
	Name string
	// USDA is the USDA nutrient number, 0 where there is none.
	USDA int
	// Decimals is what SR28 publishes, -1 for components it does not have.
	Decimals int
	// Own marks a tagname that is ours because the open lists have none.
	Own bool
	// Evidence grades the tagname: official text, secondary, memory, own.
	Evidence string
	// Note says what a reader of the amount must know, often empty.
	Note string
}

type entry struct {
	Component
	within   []ID // as the register states it
	disjoint []ID // as the register states it
	parts    Set  // all that is part of it, by descent too
	apart    Set  // all components disjoint from this one, by descent too
}

type tagged struct {
	tag string
	id  ID
}

type numbered struct {
	usda uint16
	id   ID
}

// Lookup finds a component by tagname, exactly spelt. A few tagnames are second
// spellings of the same amount (F20D5N3 for F20D5).
func Lookup(tag string) (Component, bool) {
	i, ok := slices.BinarySearchFunc(byTag[:], tag, func(t tagged, tag string) int {
		switch {
		case t.tag < tag:
			return -1
		case t.tag > tag:
			return 1
		}
		return 0
	})
	if !ok {
		return Component{}, false
	}
	return register[byTag[i].id-1].Component, true
}

// ByUSDANumber finds a component by its USDA nutrient number.
func ByUSDANumber(n int) (Component, bool) {
	i, ok := slices.BinarySearchFunc(byUSDA[:], n, func(e numbered, n int) int { return int(e.usda) - n })
	if !ok {
		return Component{}, false
	}
	return register[byUSDA[i].id-1].Component, true
}

// ByID gives the component of an ID, or false where there is none.
func ByID(id ID) (Component, bool) {
	if !id.valid() {
		return Component{}, false
	}
	return register[id-1].Component, true
}

// Tag is the component's tagname; empty for none.
func (id ID) Tag() string {
	if !id.valid() {
		return ""
	}
	return register[id-1].Tag
}

// Unit is the unit of the component's amounts; empty for none.
func (id ID) Unit() Unit {
	if !id.valid() {
		return ""
	}
	return register[id-1].Unit
}

// Components lists the register in the order of IDs.
func Components() []Component {
	all := make([]Component, 0, Count)
	for i := range register {
		all = append(all, register[i].Component)
	}
	return all
}

// ParentsFirst lists every ID so that what contains comes before its parts.
func ParentsFirst() iter.Seq[ID] { return slices.Values(parentsFirst[:]) }

// Within lists the components this one is part of. Each bounds it from above;
// without any, the whole food does (100 g per 100 g). Transitive wholes are
// found by asking again, or with IsWithin.
func (id ID) Within() iter.Seq[ID] {
	if !id.valid() {
		return slices.Values[[]ID](nil)
	}
	return slices.Values(register[id-1].within)
}

// WithinList is Within as a slice that must not be changed.
func (id ID) WithinList() []ID {
	if !id.valid() {
		return nil
	}
	return register[id-1].within
}

// DisjointFrom lists the components the register names as sharing nothing with
// this one. IsDisjoint knows the consequences for their parts as well.
func (id ID) DisjointFrom() iter.Seq[ID] {
	if !id.valid() {
		return slices.Values[[]ID](nil)
	}
	return slices.Values(register[id-1].disjoint)
}

// IsWithin tells whether the component is part of whole, directly or through
// others. No component is within itself.
func (id ID) IsWithin(whole ID) bool { return whole.valid() && register[whole-1].parts.Has(id) }

// IsDisjoint tells whether the two components certainly share nothing.
func (id ID) IsDisjoint(other ID) bool { return id.valid() && register[id-1].apart.Has(other) }

func (id ID) valid() bool { return id >= 1 && int(id) <= Count }

// Beside picks, from the components with a known amount, those whose amounts
// may be subtracted together from whole (0 for the whole food) when an unknown
// part is bounded: unknown part <= whole - their sum. They lie within whole,
// share nothing with part and nothing with each other; the widest are taken.
// Published tables are not free of contradictions: a negative remainder counts
// as zero and deserves a warning.
func Beside(part, whole ID, known Set) Set {
	var picked Set
	if !part.valid() {
		return picked
	}
	candidates := register[part-1].apart.and(&known)
	if whole != 0 {
		candidates = candidates.and(&register[whole-1].parts)
	}
	for id, ok := candidates.Next(0); ok; id, ok = candidates.Next(id) {
		picked.Add(id)
		candidates = candidates.and(&register[id-1].apart)
	}
	return picked
}

// Set is a set of components, a bit for each, wholes before parts. The zero Set is empty.
type Set [(Count + 63) / 64]uint64

// Add puts a component into the set; IDs outside the register are ignored.
func (s *Set) Add(id ID) {
	if id.valid() {
		place := placeOf[id-1]
		s[place/64] |= 1 << (place % 64)
	}
}

// Has tells whether the set holds the component.
func (s *Set) Has(id ID) bool {
	if !id.valid() {
		return false
	}
	place := placeOf[id-1]
	return s[place/64]&(1<<(place%64)) != 0
}

// Next is the first component of the set after another, wholes before parts; start with 0.
func (s *Set) Next(after ID) (ID, bool) {
	i := 0
	if after.valid() {
		i = int(placeOf[after-1]) + 1
	}
	for w := i / 64; w < len(s); w++ {
		word := s[w]
		if w == i/64 {
			word &= ^uint64(0) << (i % 64)
		}
		if word != 0 {
			return parentsFirst[w*64+bits.TrailingZeros64(word)], true
		}
	}
	return 0, false
}

// All lists the set, wholes before parts.
func (s Set) All() iter.Seq[ID] {
	return func(yield func(ID) bool) {
		for id, ok := s.Next(0); ok; id, ok = s.Next(id) {
			if !yield(id) {
				return
			}
		}
	}
}

func (s Set) and(t *Set) Set {
	for i := range s {
		s[i] &= t[i]
	}
	return s
}
