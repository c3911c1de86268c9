package food

import (
	"math/bits"

	"gramlaw/internal/food/layout"
)

// Value is one published amount, in the component's unit per 100 g edible
// portion, with what is known about it.
type Value struct {
	Number
	Samples                   int // analyses behind it; 0 where it was not analysed
	StdErr, Min, Max          Number
	HasStdErr, HasMin, HasMax bool
	Source                    Source
	Derivation                Derivation
	Reference                 int // NDB number of the food it was taken from, 0 none
}

// Source is a USDA source code, such as 1 analytical, 4 calculated, 7 assumed
// zero.
type Source uint8

// Derivation is a number for a USDA derivation code; 0 is none.
type Derivation uint8

// Value gives the published amount of a component, or false where there is none.
// A missing amount is unknown, never zero.
func (f Food) Value(id ID) (Value, bool) {
	if !f.Has(id) {
		return Value{}, false
	}
	kinds := section(layout.Kinds)
	r := reader{s: f.values}
	for range f.before(id) {
		skipValue(&r, kinds)
	}
	return readValue(&r, kinds, id), true
}

// Each calls yield for every published value in the order of IDs until it
// returns false. It fits a range statement.
func (f Food) Each(yield func(ID, Value) bool) {
	kinds := section(layout.Kinds)
	r := reader{s: f.values}
	for i := range len(f.presence) {
		for left := f.presence[i]; left != 0; left &= left - 1 {
			id := ID(8*i + bits.TrailingZeros8(left) + 1)
			if !yield(id, readValue(&r, kinds, id)) {
				return
			}
		}
	}
}

// before counts the values stored in front of a component's.
func (f Food) before(id ID) int {
	i, n := int(id)-1, 0
	for at := range i / 8 {
		n += bits.OnesCount8(f.presence[at])
	}
	return n + bits.OnesCount8(f.presence[i/8]&(1<<(i%8)-1))
}

func skipValue(r *reader, kinds string) {
	flags := kinds[r.number()*layout.KindWidth+2]
	for range 1 + bits.OnesCount8(flags) {
		r.number()
	}
}

func readValue(r *reader, kinds string, id ID) Value {
	kind := kinds[r.number()*layout.KindWidth:]
	exponent := int8(-register[id-1].Decimals)
	flags := kind[2]
	v := Value{Source: Source(kind[0]), Derivation: Derivation(kind[1])}
	v.Number = Number{int64(r.number()), exponent}
	if flags&layout.HasSamples != 0 {
		v.Samples = r.number()
	}
	v.StdErr, v.HasStdErr = optional(r, flags&layout.HasStdErr, -layout.StdErrDecimals)
	v.Min, v.HasMin = optional(r, flags&layout.HasMin, exponent)
	v.Max, v.HasMax = optional(r, flags&layout.HasMax, exponent)
	if flags&layout.HasReference != 0 {
		v.Reference = r.number()
	}
	return v
}

func optional(r *reader, flag byte, exponent int8) (Number, bool) {
	if flag == 0 {
		return Number{}, false
	}
	return Number{int64(r.number()), exponent}, true
}

// Meaning says in words what the source code stands for.
func (s Source) Meaning() string {
	all := section(layout.Sources)
	for at := 0; at < len(all); at += layout.SourceWidth {
		if all[at] == byte(s) {
			return text(layout.Uint16(all, at+1))
		}
	}
	return ""
}

// Code is the published derivation code, such as "NC", or empty.
func (d Derivation) Code() string { return d.text(0) }

// Meaning says in words how the value came about, or is empty.
func (d Derivation) Meaning() string { return d.text(2) }

func (d Derivation) text(at int) string {
	all := section(layout.Derivations)
	if d == 0 || int(d) > len(all)/layout.DerivationWidth {
		return ""
	}
	return text(layout.Uint16(all, (int(d)-1)*layout.DerivationWidth+at))
}
