package main

import (
	"bytes"
	"cmp"
	"fmt"
	"go/format"
	"maps"
	"slices"
	"strings"
)

const head = "// Code generated from register.csv by internal/food/register. DO NOT EDIT.\n\npackage food\n\n"

// source writes the Go table. IDs are indexes plus one.
func (r *resolved) source() ([]byte, error) {
	var b bytes.Buffer
	b.WriteString(head)
	fmt.Fprintf(&b, "// Count is the number of components in the register.\nconst Count = %d\n\n", len(r.rows))
	fmt.Fprintf(&b, "// SRCount is how many of them are published in SR28: IDs 1 to SRCount.\nconst SRCount = %d\n\n", r.published())
	fmt.Fprintf(&b, "var register = [Count]entry{\n")
	for i := range r.rows {
		r.entry(&b, i)
	}
	fmt.Fprintf(&b, "}\n")
	return format.Source(b.Bytes())
}

// orders writes the orders in which components are looked for.
func (r *resolved) orders() ([]byte, error) {
	var b bytes.Buffer
	b.WriteString(head)
	fmt.Fprintf(&b, "var parentsFirst = [Count]ID{%s}\n\n", ids(r.order))
	fmt.Fprintf(&b, "var placeOf = [Count]uint16{%s}\n\n", numbers(r.places()))
	r.indexes(&b)
	return format.Source(b.Bytes())
}

func (r *resolved) published() int {
	n := 0
	for _, one := range r.rows {
		if one.decimals >= 0 {
			n++
		}
	}
	return n
}

func (r *resolved) entry(b *bytes.Buffer, i int) {
	one := r.rows[i]
	fmt.Fprintf(b, "{Component: Component{ID: %d, Tag: %q, Unit: %q, Name: %q, USDA: %d, Decimals: %d, Own: %t, Evidence: %q, Note: %q},\n",
		i+1, one.tag, one.unit, one.name, one.usda, one.decimals, one.own, one.evidence, one.note)
	fmt.Fprintf(b, "within: []ID{%s}, disjoint: []ID{%s}, parts: Set{%s}, apart: Set{%s}},\n",
		ids(r.within[i]), ids(r.disjoint[i]), r.words(r.parts(i)), r.words(r.apart[i]))
}

func (r *resolved) indexes(b *bytes.Buffer) {
	fmt.Fprintf(b, "var byTag = [...]tagged{\n")
	for _, tag := range slices.Sorted(maps.Keys(r.index)) {
		fmt.Fprintf(b, "{%q, %d},\n", tag, r.index[tag]+1)
	}
	fmt.Fprintf(b, "}\n\nvar byUSDA = [...]numbered{\n")
	order := slices.Clone(r.order)
	slices.SortFunc(order, func(i, j int) int { return cmp.Compare(r.rows[i].usda, r.rows[j].usda) })
	for _, i := range order {
		if r.rows[i].usda != 0 {
			fmt.Fprintf(b, "{%d, %d},\n", r.rows[i].usda, i+1)
		}
	}
	fmt.Fprintf(b, "}\n")
}

func ids(indexes []int) string {
	parts := make([]string, 0, len(indexes))
	for _, i := range indexes {
		parts = append(parts, fmt.Sprint(i+1))
	}
	return strings.Join(parts, ", ")
}

// places is where each component stands among all, wholes before parts.
func (r *resolved) places() []int {
	places := make([]int, len(r.order))
	for place, i := range r.order {
		places[i] = place
	}
	return places
}

// parts tells which components are part of one, directly or through others.
func (r *resolved) parts(whole int) []bool {
	parts := make([]bool, len(r.rows))
	for i := range r.rows {
		parts[i] = r.wholes[i][whole]
	}
	return parts
}

func numbers(list []int) string {
	parts := make([]string, len(list))
	for i, n := range list {
		parts[i] = fmt.Sprint(n)
	}
	return strings.Join(parts, ", ")
}

// words packs booleans as the food package's Set does: a bit for each place.
func (r *resolved) words(has []bool) string {
	set := make([]uint64, (len(has)+63)/64)
	for place, i := range r.order {
		if has[i] {
			set[place/64] |= 1 << (place % 64)
		}
	}
	parts := make([]string, 0, len(set))
	for _, w := range set {
		parts = append(parts, fmt.Sprintf("%#x", w))
	}
	return strings.Join(parts, ", ")
}
