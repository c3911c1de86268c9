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

// record is one food being written.
type record struct{ b []byte }

func (r *record) number(n uint64) { r.b = binary.AppendUvarint(r.b, n) }

func (r *record) text(s string) {
	r.number(uint64(len(s)))
	r.b = append(r.b, s...)
}

// optional writes a number plus one, or 0 for an empty cell.
func (r *record) optional(cell string, decimals int) error {
	if cell == "" {
		r.number(0)
		return nil
	}
	n, err := exactly(cell, decimals)
	r.number(n + 1)
	return err
}

func (p *packer) records() error {
	values, weights, notes := p.t.long.byFood(), p.t.weights.byFood(), p.t.footnotes.byFood()
	last := ""
	for _, row := range p.t.wide.rows {
		ndb := p.t.wide.cell(row, "ndb_no")
		number, err := strconv.ParseUint(ndb, 10, 32)
		if err != nil || len(ndb) != 5 || ndb <= last {
			return fmt.Errorf("food %q after %q: want five digits in order", ndb, last)
		}
		last = ndb
		index := binary.LittleEndian.AppendUint32(nil, uint32(number))
		index = binary.LittleEndian.AppendUint32(index, uint32(len(p.sections[layout.Records])))
		p.add(layout.Index, index...)
		var r record
		if err := p.food(&r, row, values[ndb], weights[ndb], notes[ndb]); err != nil {
			return fmt.Errorf("food %s: %w", ndb, err)
		}
		p.add(layout.Records, r.b...)
	}
	return nil
}

func (p *packer) food(r *record, row []string, values, weights, notes [][]string) error {
	if err := p.head(r, row); err != nil {
		return err
	}
	if err := p.values(r, values); err != nil {
		return err
	}
	r.number(uint64(len(weights)))
	for _, w := range weights {
		if err := p.weight(r, w); err != nil {
			return err
		}
	}
	r.number(uint64(len(notes)))
	for _, n := range notes {
		if err := p.footnote(r, n); err != nil {
			return err
		}
	}
	return nil
}

func (p *packer) head(r *record, row []string) error {
	cell := func(column string) string { return p.t.wide.cell(row, column) }
	r.text(cell("description"))
	r.text(cell("short_description"))
	group, ok := p.groups[cell("food_group")]
	if !ok {
		return fmt.Errorf("food group %q is not listed", cell("food_group"))
	}
	r.b = append(r.b, byte(group))
	if err := r.optional(cell("refuse_pct"), 0); err != nil {
		return err
	}
	for _, column := range []string{"n_factor", "pro_factor", "fat_factor", "cho_factor"} {
		if err := r.optional(cell(column), layout.FactorDecimals); err != nil {
			return fmt.Errorf("%s: %w", column, err)
		}
	}
	if name := cell("sci_name"); name == "" {
		r.number(0)
	} else {
		r.number(uint64(p.texts.id(name)) + 1)
	}
	return nil
}

// entry is a value row with its component.
type entry struct {
	c   food.Component
	row []string
}

func (p *packer) values(r *record, rows [][]string) error {
	var list []entry
	for _, row := range rows {
		c, err := byNumber(p.t.long.cell(row, "nutr_no"))
		if err != nil {
			return err
		}
		list = append(list, entry{c, row})
	}
	slices.SortFunc(list, func(a, b entry) int { return cmp.Compare(a.c.ID, b.c.ID) })
	var presence [layout.PresenceWidth]byte
	var v record
	for _, e := range list {
		i := int(e.c.ID) - 1
		presence[i/8] |= 1 << (i % 8)
		if err := p.value(&v, e); err != nil {
			return fmt.Errorf("nutrient %d: %w", e.c.USDA, err)
		}
	}
	r.b = append(r.b, presence[:]...)
	r.text(string(v.b))
	return nil
}

func (p *packer) value(v *record, e entry) error {
	k, err := p.kind(e.row)
	if err != nil {
		return err
	}
	v.number(uint64(p.kinds[k]))
	for _, part := range []struct {
		column   string
		decimals int
		flag     byte
	}{
		{"amount_per_100g", e.c.Decimals, 0}, {"n_data_points", 0, layout.HasSamples}, {"std_error", layout.StdErrDecimals, layout.HasStdErr},
		{"min", e.c.Decimals, layout.HasMin}, {"max", e.c.Decimals, layout.HasMax}, {"ref_ndb_no", 0, layout.HasReference},
	} {
		if part.flag != 0 && k[2]&part.flag == 0 {
			continue
		}
		n, err := exactly(p.t.long.cell(e.row, part.column), part.decimals)
		if err != nil {
			return fmt.Errorf("%s: %w", part.column, err)
		}
		v.number(n)
	}
	return nil
}

func (p *packer) weight(r *record, row []string) error {
	cell := func(column string) string { return p.t.weights.cell(row, column) }
	sequence, err := exactly(cell("seq"), 0)
	if err != nil {
		return err
	}
	amount, err := food.ParseNumber(cell("amount"))
	if err != nil {
		return err
	}
	grams, err := food.ParseNumber(cell("grams"))
	if err != nil {
		return err
	}
	r.number(sequence)
	r.b = append(r.b, byte(-amount.Exponent)<<4|byte(-grams.Exponent))
	r.number(uint64(amount.Mantissa))
	r.number(uint64(p.texts.id(cell("measure"))))
	r.number(uint64(grams.Mantissa))
	if err := r.optional(cell("n_data_points"), 0); err != nil {
		return err
	}
	return r.deviation(cell("std_dev"))
}

func (r *record) deviation(cell string) error {
	if cell == "" {
		r.number(0)
		return nil
	}
	n, err := food.ParseNumber(cell)
	r.number(uint64(n.Mantissa) + 1)
	r.b = append(r.b, byte(-n.Exponent))
	return err
}

func (p *packer) footnote(r *record, row []string) error {
	cell := func(column string) string { return p.t.footnotes.cell(row, column) }
	number, err := exactly(cell("footnote_no"), 0)
	if err != nil || len(cell("type")) != 1 {
		return fmt.Errorf("footnote %q of type %q", cell("footnote_no"), cell("type"))
	}
	r.number(number)
	r.b = append(r.b, cell("type")[0])
	about := uint64(0)
	if s := cell("nutr_no"); s != "" {
		if about, err = exactly(s, 0); err != nil {
			return err
		}
	}
	r.number(about)
	r.number(uint64(p.texts.id(cell("text"))))
	return nil
}
