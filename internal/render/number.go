package render

import (
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/check"
)

const (
	figures  = 4  // shown of a number that is shortened
	fullMost = 5  // significant digits up to which a number is shown as it is
	shownMax = 20 // digits the core shows of a number that does not end before
)

// A number is a decimal shortened for reading.
type number struct {
	exact decimal.Decimal
	short decimal.Decimal
	whole bool // short is exact
}

// parse reads a decimal of the report; what is none stays as it is.
func parse(s string) (number, bool) {
	d, err := decimal.NewFromString(s)
	if err != nil {
		return number{}, false
	}
	return shorten(d, figures), true
}

// shorten rounds to significant digits, but never up to a number of fewer digits: 0.49996 reads 0.4999 and not 0.5, so
// that a value stays on its side of every edge a law writes with few digits.
func shorten(d decimal.Decimal, digits int) number {
	all := significant(d)
	if all <= fullMost {
		return number{d, d, true}
	}
	digits = max(digits, integerDigits(d)+1)
	if digits >= all {
		return number{d, d, all < shownMax}
	}
	short := d.Round(places(d, digits))
	if significant(short) < digits && short.Abs().Cmp(d.Abs()) > 0 {
		short = d.RoundDown(places(d, digits))
	}
	return number{d, short, false}
}

// significant counts the digits between the first and the last that are not zero.
func significant(d decimal.Decimal) int {
	return len(strings.Trim(d.Coefficient().String(), "-0"))
}

func integerDigits(d decimal.Decimal) int {
	whole := d.Abs().Truncate(0)
	if whole.IsZero() {
		return 0
	}
	return whole.NumDigits()
}

// places is where a number of significant digits ends, counted behind the point.
func places(d decimal.Decimal, digits int) int32 {
	lead := int32(d.NumDigits()) + d.Exponent()
	return int32(digits) - lead
}

func (n number) String() string {
	if n.whole {
		return n.short.String()
	}
	return "≈" + n.short.String()
}

// short is a decimal of the report for reading, "≈" in front where it was shortened.
func short(s string) string {
	if n, ok := parse(s); ok {
		return n.String()
	}
	return s
}

// beside shortens a value so that it stands on the same side of a threshold as it does exactly.
func beside(value, threshold string) string {
	n, ok := parse(value)
	t, err := decimal.NewFromString(threshold)
	if !ok || err != nil {
		return short(value)
	}
	for digits := figures; !n.whole && n.short.Cmp(t) != n.exact.Cmp(t); digits++ {
		n = shorten(n.exact, digits+1)
		if digits > shownMax {
			break
		}
	}
	return n.String()
}

// amount is a value with its unit; what is large for its unit goes to a larger one.
func amount(value, unit string) string {
	d, err := decimal.NewFromString(value)
	larger := map[string]string{"ug": "mg", "µg": "mg", "mg": "g"}
	for most := decimal.New(10000, 0); err == nil && larger[unit] != "" && d.Abs().Cmp(most) >= 0; unit = larger[unit] {
		d = d.Shift(-3)
		value = d.String()
	}
	return withUnit(short(value), unit)
}

func withUnit(value, unit string) string {
	if unit == "" {
		return value
	}
	return value + bond + unit
}

// span shortens "2 g to 3 g" to "2 to 3 g".
func span(s string) string {
	from, to, ok := strings.Cut(s, " to ")
	if !ok {
		return s
	}
	number, unit, ok := strings.Cut(from, " ")
	if !ok || !strings.HasSuffix(to, " "+unit) {
		return s
	}
	return number + " to " + to
}

// between is an interval: one number where both ends read alike.
func between(low, high, unit string) string {
	a, b := amount(low, unit), amount(high, unit)
	switch {
	case a == b:
		return a
	case unit != "" && strings.HasSuffix(a, bond+unit) && strings.HasSuffix(b, bond+unit):
		a = strings.TrimSuffix(a, bond+unit)
	case low == "0":
		a = "0"
	}
	if strings.HasPrefix(a, "≈") {
		b = strings.TrimPrefix(b, "≈")
	}
	return a + bond + "to" + bond + b
}

// exactly is what lies behind a printed value: the number, or the typical one and its range.
func exactly(v *check.Value) string {
	if v.Exact == nil {
		return between(v.Low, v.High, v.Unit)
	}
	mid := amount(*v.Exact, v.Unit)
	if v.Low == v.High || between(v.Low, v.High, v.Unit) == mid {
		return mid
	}
	return mid + " (" + between(v.Low, v.High, v.Unit) + ")"
}

// spaced keeps an amount of the report as it is but for its length: "965.123456789 g".
func spaced(s string) string {
	value, unit, ok := strings.Cut(s, " ")
	if !ok {
		return short(s)
	}
	return amount(value, unit)
}
