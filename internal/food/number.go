package food

import (
	"errors"
	"strconv"
	"strings"
)

// Number is the exact decimal Mantissa × 10^Exponent. The exponent keeps the
// published decimals: 0.000 is {0, -3}.
type Number struct {
	Mantissa int64
	Exponent int8
}

// maxDigits bounds what ParseNumber reads, so that a mantissa always fits.
const maxDigits = 15

// ErrNumber tells that a text is not a plain decimal of at most 15 digits.
var ErrNumber = errors.New("not a plain decimal number of at most 15 digits")

// ParseNumber reads digits with an optional point, such as "12", "0.50" or
// ".5". Signs and exponents do not occur in the tables and are refused.
func ParseNumber(s string) (Number, error) {
	whole, fraction, point := strings.Cut(s, ".")
	digits := whole + fraction
	if digits == "" || len(digits) > maxDigits || (point && fraction == "") {
		return Number{}, ErrNumber
	}
	mantissa := int64(0)
	for _, c := range []byte(digits) {
		if c < '0' || c > '9' {
			return Number{}, ErrNumber
		}
		mantissa = mantissa*10 + int64(c-'0')
	}
	return Number{Mantissa: mantissa, Exponent: int8(-len(fraction))}, nil
}

// String writes the number in plain notation with its published decimals.
func (n Number) String() string {
	if n.Exponent >= 0 {
		s := strconv.FormatInt(n.Mantissa, 10)
		if n.Mantissa == 0 {
			return s
		}
		return s + strings.Repeat("0", int(n.Exponent))
	}
	sign, magnitude := "", uint64(n.Mantissa)
	if n.Mantissa < 0 {
		sign, magnitude = "-", -magnitude
	}
	s, places := strconv.FormatUint(magnitude, 10), -int(n.Exponent)
	if len(s) <= places {
		s = strings.Repeat("0", places-len(s)+1) + s
	}
	return sign + s[:len(s)-places] + "." + s[len(s)-places:]
}
