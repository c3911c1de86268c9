package rulebook

import (
	"fmt"
	"strings"

	"github.com/shopspring/decimal"

	"gramlaw/internal/quantity"
)

// A Fraction is an exact factor of a definition: a number such as "2.5" or "-1", or one over another, such as "5/3".
type Fraction struct {
	Over, Under decimal.Decimal // Under is 1 where there is only a number
}

// UnmarshalText reads a fraction. What stands under the line is above zero.
func (f *Fraction) UnmarshalText(b []byte) error {
	over, under, divided := strings.Cut(string(b), "/")
	if !divided {
		under = "1"
	}
	var err1, err2 error
	f.Over, err1 = decimal.NewFromString(over)
	if f.Under, err2 = decimal.NewFromString(under); err1 != nil || err2 != nil {
		return fmt.Errorf("%q is no number or fraction such as 5/3", b)
	}
	if !f.Under.IsPositive() {
		return fmt.Errorf("%q has nothing to divide by", b)
	}
	return nil
}

// MarshalText writes what UnmarshalText reads.
func (f Fraction) MarshalText() ([]byte, error) {
	s := f.Over.String()
	if f.Under.String() != "1" {
		s += "/" + f.Under.String()
	}
	return []byte(s), nil
}

// Ratio is the fraction's value; exact.
func (f Fraction) Ratio() quantity.Ratio {
	return quantity.FromDecimal(f.Over).Quo(quantity.FromDecimal(f.Under))
}
