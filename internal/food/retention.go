package food

import (
	_ "embed"
	"sort"

	"gramlaw/internal/food/layout"
)

//go:embed retention.bin
var retentionTable string

// Retention is one row of the USDA Table of Nutrient Retention Factors, Release
// 6: how much of vitamins, minerals and alcohol a preparation keeps.
type Retention struct {
	row string
}

// FolateDFEFactor is the weight of folic acid in dietary folate equivalents,
// 1.7. The table has no column for FOLDFE: with a retention code, an
// ingredient's FOLDFE is FOLFD × its per cent + 1.7 × FOLAC × its per cent;
// without a code, FOLDFE as published.
func FolateDFEFactor() Number { return Number{Mantissa: 17, Exponent: -1} }

// RetentionCode finds a row by its four-digit code, such as "0352".
func RetentionCode(code string) (Retention, bool) {
	want, ok := parseCode(code)
	if !ok {
		return Retention{}, false
	}
	at := sort.Search(retentionCount(), func(i int) bool { return retentionAt(i).code() >= want })
	if at == retentionCount() || retentionAt(at).code() != want {
		return Retention{}, false
	}
	return retentionAt(at), true
}

// Retentions lists the table in the order of codes.
func Retentions(yield func(Retention) bool) {
	for i := range retentionCount() {
		if !yield(retentionAt(i)) {
			return
		}
	}
}

// Code is the four-digit code.
func (r Retention) Code() string {
	if r.row == "" {
		return ""
	}
	n := r.code()
	return string([]byte{byte('0' + n/1000), byte('0' + n/100%10), byte('0' + n/10%10), byte('0' + n%10)})
}

// Description is the published name of food and preparation.
func (r Retention) Description() string {
	if r.row == "" {
		return ""
	}
	at := layout.Uint32(r.row, 2)
	return retentionTable[at : at+int(r.row[6])]
}

// Percent is how much of a component is kept. False means that the table has
// no column for it: the publisher then keeps all of it, but see
// FolateDFEFactor for FOLDFE. Retinol (319) and vitamin A in retinol activity
// equivalents (320) share the column the table numbers 392.
func (r Retention) Percent(id ID) (int, bool) {
	c, ok := ByID(id)
	if !ok || r.row == "" {
		return 0, false
	}
	column := retentionColumn(c.USDA)
	if column < 0 {
		return 0, false
	}
	return int(r.row[retentionHead+column]), true
}

// retentionVitaminA is the table's own number for preformed vitamin A.
const retentionVitaminA = 392

const retentionHead = 7 // bytes of a row before the per cents

func retentionColumn(usda int) int {
	if usda == 0 {
		return -1
	}
	if usda == 319 || usda == 320 {
		usda = retentionVitaminA
	}
	for i := range retentionColumns() {
		if layout.Uint16(retentionTable, len(layout.RetentionMagic)+4+2*i) == usda {
			return i
		}
	}
	return -1
}

func retentionCount() int { return layout.Uint16(retentionTable, len(layout.RetentionMagic)) }

func retentionColumns() int { return layout.Uint16(retentionTable, len(layout.RetentionMagic)+2) }

func retentionAt(i int) Retention {
	width := retentionHead + retentionColumns()
	at := len(layout.RetentionMagic) + 4 + 2*retentionColumns() + i*width
	return Retention{row: retentionTable[at : at+width]}
}

func (r Retention) code() int { return layout.Uint16(r.row, 0) }

func parseCode(code string) (n int, ok bool) {
	if len(code) != 4 {
		return 0, false
	}
	for _, c := range []byte(code) {
		if c < '0' || c > '9' {
			return 0, false
		}
		n = 10*n + int(c-'0')
	}
	return n, true
}
