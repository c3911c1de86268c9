package main

import (
	"cmp"
	"encoding/binary"
	"fmt"
	"slices"
	"strconv"

	"gramlaw/internal/food/layout"
)

func packRetention(t *table) ([]byte, error) {
	columns := t.heading[2:]
	out := []byte(layout.RetentionMagic)
	out = binary.LittleEndian.AppendUint16(out, uint16(len(t.rows)))
	out = binary.LittleEndian.AppendUint16(out, uint16(len(columns)))
	for _, column := range columns {
		number, ok := component(column)
		if !ok {
			return nil, fmt.Errorf("%s: column %q", t.name, column)
		}
		n, err := strconv.ParseUint(number, 10, 16)
		if err != nil {
			return nil, err
		}
		out = binary.LittleEndian.AppendUint16(out, uint16(n))
	}
	texts := len(out) + len(t.rows)*(7+len(columns))
	var descriptions []byte
	last := ""
	rows := slices.SortedFunc(slices.Values(t.rows), func(a, b []string) int { return cmp.Compare(a[0], b[0]) })
	for _, row := range rows {
		if len(row[0]) != 4 || row[0] <= last || len(row[1]) > 255 {
			return nil, fmt.Errorf("%s: code %q after %q", t.name, row[0], last)
		}
		last = row[0]
		var err error
		if out, err = retentionRow(out, row, texts+len(descriptions)); err != nil {
			return nil, fmt.Errorf("%s: code %s: %w", t.name, row[0], err)
		}
		descriptions = append(descriptions, row[1]...)
	}
	return append(out, descriptions...), nil
}

func retentionRow(out []byte, row []string, description int) ([]byte, error) {
	code, err := strconv.ParseUint(row[0], 10, 16)
	if err != nil {
		return nil, err
	}
	out = binary.LittleEndian.AppendUint16(out, uint16(code))
	out = binary.LittleEndian.AppendUint32(out, uint32(description))
	out = append(out, byte(len(row[1])))
	for _, cell := range row[2:] {
		percent, err := strconv.ParseUint(cell, 10, 8)
		if err != nil || percent > 100 {
			return nil, fmt.Errorf("per cent %q", cell)
		}
		out = append(out, byte(percent))
	}
	return out, nil
}
