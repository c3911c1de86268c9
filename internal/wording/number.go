package wording

import (
	"strconv"

	"gramlaw/internal/quantity"
)

// canonical writes a number as amounts of the report are written; as it is where it is too long.
func canonical(text string) string {
	d, err := quantity.ParseNumber(text)
	if err != nil {
		return text
	}
	return d.String()
}

// isZero tells whether a number is nothing.
func isZero(text string) bool {
	d, err := quantity.ParseNumber(text)
	return err == nil && d.IsZero()
}

// perCentOf is a fraction in per cent, cut to one decimal.
func perCentOf(over, under string) (string, bool) {
	a, err := strconv.Atoi(over)
	b, err2 := strconv.Atoi(under)
	if err != nil || err2 != nil || b <= 0 || a < 0 || a > 1000 {
		return "", false
	}
	tenths := a * 1000 / b
	if tenths%10 == 0 {
		return strconv.Itoa(tenths / 10), true
	}
	return strconv.Itoa(tenths/10) + "." + strconv.Itoa(tenths%10), true
}
