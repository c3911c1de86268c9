// Package quantity holds the arithmetic on which a label value rests: bounded decimals with a unit, exact ratios over a
// denominator that a whole recipe shares, and linear forms whose uncertain parts stay symbolic until somebody asks
// for an interval.
//
// Most callers need two calls: ParseAmount for what a document or a rule states, and Ratio.Round where a law rounds.
// Nothing here is a binary floating-point number and nothing divides before the law does.
package quantity

import (
	"fmt"

	"github.com/shopspring/decimal"
)

// Bounds of a stated number: at most 15 significant digits, and a decimal exponent from -12 to 9.
const (
	MaxDigits   = 15
	MinExponent = -12
	MaxExponent = 9
	maxText     = 40
)

// A NumberError says why a text is no number here.
type NumberError struct {
	Text string
	Why  string
}

func (e *NumberError) Error() string { return fmt.Sprintf("%q %s", clip(e.Text), e.Why) }

func clip(s string) string {
	if len(s) > maxText {
		return s[:maxText] + "…"
	}
	return s
}

// ParseNumber reads a non-negative decimal such as "420", "0.033" or "1.2e-3". Digits are ASCII, the decimal sign is a
// point, and nothing is rounded: a number outside the bounds is an error.
func ParseNumber(s string) (decimal.Decimal, error) {
	if why := grammar(s); why != "" {
		return decimal.Decimal{}, &NumberError{s, why}
	}
	d, err := decimal.NewFromString(s)
	if err != nil {
		return decimal.Decimal{}, &NumberError{s, "is not a decimal number"}
	}
	d = normal(d)
	switch {
	case d.NumDigits() > MaxDigits:
		return decimal.Decimal{}, &NumberError{s, fmt.Sprintf("has more than %d significant digits", MaxDigits)}
	case d.Exponent() < MinExponent || d.Exponent() > MaxExponent:
		return decimal.Decimal{}, &NumberError{s, fmt.Sprintf("is out of range: its last digit must lie between 1e%d and 1e%d", MinExponent, MaxExponent)}
	}
	return d, nil
}

// grammar checks digits ["." digits] [("e"|"E") ["+"|"-"] digit [digit]] without building anything.
func grammar(s string) string {
	switch {
	case s == "":
		return "is empty; a decimal number such as 1.5 is wanted"
	case len(s) > maxText:
		return fmt.Sprintf("is longer than %d characters", maxText)
	case s[0] == '-':
		return "is negative; an amount cannot be"
	}
	i := digits(s, 0)
	if i == 0 {
		return "does not begin with a digit; write 0.5, not .5"
	}
	if i < len(s) && s[i] == '.' {
		j := digits(s, i+1)
		if j == i+1 {
			return "has no digit after the decimal point"
		}
		i = j
	}
	if i < len(s) && (s[i] == 'e' || s[i] == 'E') {
		i++
		if i < len(s) && (s[i] == '+' || s[i] == '-') {
			i++
		}
		j := digits(s, i)
		if j == i || j > i+2 {
			return "has no exponent of one or two digits"
		}
		i = j
	}
	if i != len(s) {
		return "is not a decimal number; digits and a decimal point are wanted"
	}
	return ""
}

func digits(s string, i int) int {
	for i < len(s) && s[i] >= '0' && s[i] <= '9' {
		i++
	}
	return i
}

// normal drops trailing zeros, so that equal numbers look alike.
func normal(d decimal.Decimal) decimal.Decimal {
	if d.IsZero() {
		return decimal.Zero
	}
	c, e := d.Coefficient(), d.Exponent()
	c, e = trimZeros(c, e)
	return decimal.NewFromBigInt(c, e)
}
