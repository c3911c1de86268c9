package food

import (
	_ "embed"

	"gramlaw/internal/food/layout"
)

//go:embed sr28.bin
var sr28 string

// section gives one part of the packed table.
func section(n int) string {
	at := len(layout.Magic) + 4*n
	return sr28[layout.Uint32(sr28, at):layout.Uint32(sr28, at+4)]
}

func text(n int) string {
	index := section(layout.TextIndex)
	return section(layout.Texts)[layout.Uint32(index, 4*n):layout.Uint32(index, 4*n+4)]
}

// foodCount is the number of foods in the table.
func foodCount() int { return len(section(layout.Index)) / layout.IndexWidth }

// foodAt opens the food at a position of the index.
func foodAt(position int) Food {
	index := section(layout.Index)
	at := position * layout.IndexWidth
	return open(layout.Uint32(index, at), section(layout.Records)[layout.Uint32(index, at+4):])
}

// reader walks through a record.
type reader struct {
	s string
	i int
}

func (r *reader) number() int {
	v, i := layout.Uvarint(r.s, r.i)
	r.i = i
	return int(v)
}

func (r *reader) byte() byte {
	r.i++
	return r.s[r.i-1]
}

func (r *reader) bytes(n int) string {
	r.i += n
	return r.s[r.i-n : r.i]
}

func (r *reader) text() string { return r.bytes(r.number()) }
