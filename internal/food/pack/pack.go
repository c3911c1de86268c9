package main

import (
	"cmp"
	"encoding/binary"
	"fmt"
	"slices"
	"strconv"

	"gramlaw/internal/food"
	"gramlaw/internal/food/layout"
)

// packer gathers the sections.
type packer struct {
	t           *tables
	texts       pool
	groups      map[string]int
	derivations map[string]int
	kinds       map[[3]byte]int
	sections    [layout.Sections][]byte
}

// pool numbers texts.
type pool struct {
	number map[string]int
	list   []string
}

func (p *pool) id(text string) int {
	n, ok := p.number[text]
	if !ok {
		n = len(p.list)
		p.number[text], p.list = n, append(p.list, text)
	}
	return n
}

func pack(t *tables) ([]byte, error) {
	p := &packer{t: t, texts: pool{number: map[string]int{}}, groups: map[string]int{}, derivations: map[string]int{}}
	for _, step := range []func() error{p.codes, p.rankKinds, p.records, p.vocabulary, p.pool} {
		if err := step(); err != nil {
			return nil, err
		}
	}
	return p.file(), nil
}

func (p *packer) file() []byte {
	out := []byte(layout.Magic)
	offset := len(out) + 4*(layout.Sections+1)
	for _, s := range p.sections {
		out = binary.LittleEndian.AppendUint32(out, uint32(offset))
		offset += len(s)
	}
	out = binary.LittleEndian.AppendUint32(out, uint32(offset))
	for _, s := range p.sections {
		out = append(out, s...)
	}
	return out
}

// add appends bytes to a section.
func (p *packer) add(section int, b ...byte) {
	p.sections[section] = append(p.sections[section], b...)
}

func (p *packer) text16(text string) []byte {
	return binary.LittleEndian.AppendUint16(nil, uint16(p.texts.id(text)))
}

func (p *packer) codes() error {
	for i, row := range p.t.groups.rows {
		if len(row[0]) != 4 {
			return fmt.Errorf("food group %q: want four digits", row[0])
		}
		p.groups[row[0]] = i
		p.add(layout.Groups, append([]byte(row[0]), p.text16(row[1])...)...)
	}
	for _, row := range p.t.sources.rows {
		code, err := strconv.ParseUint(row[0], 10, 8)
		if err != nil {
			return err
		}
		p.add(layout.Sources, append([]byte{byte(code)}, p.text16(row[1])...)...)
	}
	for i, row := range p.t.derivations.rows {
		p.derivations[row[0]] = i + 1
		p.add(layout.Derivations, append(p.text16(row[0]), p.text16(row[1])...)...)
	}
	return nil
}

// kind is what the values of one source, derivation and set of numbers share.
func (p *packer) kind(row []string) ([3]byte, error) {
	cell := func(column string) string { return p.t.long.cell(row, column) }
	source, err := strconv.ParseUint(cell("src_cd"), 10, 8)
	if err != nil {
		return [3]byte{}, err
	}
	derivation, ok := p.derivations[cell("deriv_cd")]
	if !ok && cell("deriv_cd") != "" {
		return [3]byte{}, fmt.Errorf("derivation code %q is not listed", cell("deriv_cd"))
	}
	flags := byte(0)
	for flag, present := range map[byte]bool{
		layout.HasSamples: cell("n_data_points") != "0", layout.HasStdErr: cell("std_error") != "",
		layout.HasMin: cell("min") != "", layout.HasMax: cell("max") != "", layout.HasReference: cell("ref_ndb_no") != "",
	} {
		if present {
			flags |= flag
		}
	}
	return [3]byte{byte(source), byte(derivation), flags}, nil
}

// rankKinds numbers the kinds, frequent ones first, so that most take one byte.
func (p *packer) rankKinds() error {
	count := map[[3]byte]int{}
	for _, row := range p.t.long.rows {
		k, err := p.kind(row)
		if err != nil {
			return err
		}
		count[k]++
	}
	var order [][3]byte
	for k := range count {
		order = append(order, k)
	}
	slices.SortFunc(order, func(a, b [3]byte) int {
		return cmp.Or(cmp.Compare(count[b], count[a]), slices.Compare(a[:], b[:]))
	})
	p.kinds = map[[3]byte]int{}
	for i, k := range order {
		p.kinds[k] = i
		p.add(layout.Kinds, k[:]...)
	}
	return nil
}

func (p *packer) pool() error {
	if len(p.texts.list) > 1<<16 {
		return fmt.Errorf("%d texts: too many for two bytes", len(p.texts.list))
	}
	for _, text := range p.texts.list {
		p.sections[layout.TextIndex] = binary.LittleEndian.AppendUint32(p.sections[layout.TextIndex], uint32(len(p.sections[layout.Texts])))
		p.add(layout.Texts, []byte(text)...)
	}
	p.sections[layout.TextIndex] = binary.LittleEndian.AppendUint32(p.sections[layout.TextIndex], uint32(len(p.sections[layout.Texts])))
	return nil
}

// exactly reads a number that must have the given decimals.
func exactly(cell string, decimals int) (uint64, error) {
	n, err := food.ParseNumber(cell)
	if err != nil {
		return 0, fmt.Errorf("%q: %w", cell, err)
	}
	if int(n.Exponent) != -decimals {
		return 0, fmt.Errorf("%q: want %d decimals", cell, decimals)
	}
	return uint64(n.Mantissa), nil
}
