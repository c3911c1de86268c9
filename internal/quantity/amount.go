package quantity

import (
	"fmt"
	"strings"

	"github.com/shopspring/decimal"
)

// An Amount is a stated number with its unit.
type Amount struct {
	Value decimal.Decimal
	Unit  Unit
}

// ParseAmount reads a number and a unit with at most one space between them: "420 g", "0.5 mg", "30%".
func ParseAmount(s string) (Amount, error) {
	i := numberEnd(s)
	if i == 0 && s != "" {
		return Amount{}, &NumberError{s, "does not begin with a digit; write for instance 1.5 g"}
	}
	d, err := ParseNumber(s[:i])
	if err != nil {
		return Amount{}, err
	}
	name := strings.TrimPrefix(s[i:], " ")
	if name == "" {
		return Amount{}, &NumberError{s, "has no unit; write for instance " + s[:i] + " g"}
	}
	u, ok := ParseUnit(name)
	if !ok {
		return Amount{}, &NumberError{s, fmt.Sprintf("has the unknown unit %q; known are g, mg, µg, kg, mL, L, tsp, tbsp, cup, kcal, kJ and %%", clip(name))}
	}
	return Amount{d, u}, nil
}

// numberEnd is where the number stops and the unit begins. An e belongs to the number only before an exponent.
func numberEnd(s string) int {
	i := 0
	for i < len(s) {
		c := s[i]
		exponent := (c == 'e' || c == 'E') && i+1 < len(s) && (s[i+1] >= '0' && s[i+1] <= '9' || s[i+1] == '-' || s[i+1] == '+')
		sign := (c == '-' || c == '+') && (i == 0 || s[i-1] == 'e' || s[i-1] == 'E')
		if c >= '0' && c <= '9' || c == '.' || exponent || sign {
			i++
			continue
		}
		break
	}
	return i
}

// Base is the amount's value in the base unit of its dimension; exact.
func (a Amount) Base() decimal.Decimal { return a.Value.Mul(a.Unit.Scale()) }

// In gives the amount in another unit of the same dimension; exact because all scales but household measures are
// powers of ten. It reports false across dimensions and where the result would not end.
func (a Amount) In(u Unit) (decimal.Decimal, bool) {
	if a.Unit.Dimension() != u.Dimension() {
		return decimal.Decimal{}, false
	}
	if a.Unit == u {
		return a.Value, true
	}
	s := u.Scale()
	if s.CoefficientInt64() != 1 {
		return decimal.Decimal{}, false
	}
	return normal(a.Base().Shift(-s.Exponent())), true
}

func (a Amount) String() string {
	if a.Unit == NoUnit {
		return a.Value.String()
	}
	return a.Value.String() + " " + a.Unit.String()
}

// IsZero reports an unset amount.
func (a Amount) IsZero() bool { return a.Unit == NoUnit && a.Value.IsZero() }

// UnmarshalText lets an amount stand in JSON as a string.
func (a *Amount) UnmarshalText(b []byte) error {
	v, err := ParseAmount(string(b))
	if err == nil {
		*a = v
	}
	return err
}

// MarshalText writes what UnmarshalText reads.
func (a Amount) MarshalText() ([]byte, error) { return []byte(a.String()), nil }

// Ratio is the amount in the base unit of its dimension; exact.
func (a Amount) Ratio() Ratio {
	r := FromDecimal(a.Value)
	if units[a.Unit].household {
		return r.Times(a.Unit.Scale())
	}
	if !r.IsZero() {
		r.e += units[a.Unit].scale.Exponent()
	}
	return r
}

// In is a value in base units as a number of u; u must be a power of ten of its base unit.
func (r Ratio) In(u Unit) Ratio {
	if !r.IsZero() {
		r.e -= units[u].scale.Exponent()
	}
	return r
}
