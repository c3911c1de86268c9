package quantity

import (
	"errors"
	"math/big"
	"strings"
	"testing"

	"github.com/shopspring/decimal"
)

func TestParseAmount(t *testing.T) {
	for _, c := range []struct{ in, want string }{
		{"420 g", "420 g"}, {"0.5mg", "0.5 mg"}, {"1.50 kg", "1.5 kg"}, {"30 %", "30 %"}, {"2 ug", "2 µg"}, {"2 mcg", "2 µg"}, {"2 μg", "2 µg"},
		{"100 ml", "100 mL"}, {"1 l", "1 L"}, {"1e3 kJ", "1000 kJ"}, {"1.2e-3 g", "0.0012 g"}, {"2 tbsp", "2 tbsp"}, {"000.10 g", "0.1 g"},
		{"123456789012345 g", "123456789012345 g"}, {"1e-12 g", "0.000000000001 g"},
	} {
		a, err := ParseAmount(c.in)
		if err != nil || a.String() != c.want {
			t.Errorf("%q reads as %v, %v; want %s", c.in, a, err, c.want)
		}
	}
}

func TestParseAmountRefuses(t *testing.T) {
	for _, c := range []struct{ name, in, why string }{
		{"nothing", "", "is empty"},
		{"no unit", "420", "has no unit"},
		{"unknown unit", "3 stone", "unknown unit"},
		{"negative", "-1 g", "negative"},
		{"no leading digit", ".5 g", "begin with a digit"},
		{"no digit after the point", "5. g", "after the decimal point"},
		{"comma", "1,5 g", "unknown unit"},
		{"two spaces", "1  g", "unknown unit"},
		{"16 digits", "1234567890123456 g", "more than 15"},
		{"too small", "1e-13 g", "out of range"},
		{"too large", "1e10 g", "out of range"},
		{"exponent of three digits", "1e100 g", "exponent"},
		{"infinity", "inf g", "begin with a digit"},
		{"not a number", "NaN", "begin with a digit"},
		{"other digits", "١ g", "begin with a digit"},
		{"endless", strings.Repeat("1", 1000) + " g", "longer than"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := ParseAmount(c.in)
			var e *NumberError
			if !errors.As(err, &e) || !strings.Contains(err.Error(), c.why) {
				t.Errorf("%q: %v; want an error saying %q", c.in, err, c.why)
			}
		})
	}
}

func TestAmountIn(t *testing.T) {
	for _, c := range []struct {
		in   string
		unit Unit
		want string
		ok   bool
	}{
		{"1.5 g", Milligram, "1500", true}, {"5 µg", Milligram, "0.005", true}, {"2 tbsp", Millilitre, "30", true}, {"1 cup", Millilitre, "240", true},
		{"30 mL", Tablespoon, "", false}, {"1 g", Millilitre, "", false}, {"100 kcal", Kilojoule, "", false},
	} {
		a, err := ParseAmount(c.in)
		if err != nil {
			t.Fatal(err)
		}
		d, ok := a.In(c.unit)
		if ok != c.ok || ok && d.String() != c.want {
			t.Errorf("%s in %s is %s, %v; want %s, %v", c.in, c.unit, d, ok, c.want, c.ok)
		}
	}
}

// Parsing never panics, and what it accepts it writes so that it reads the same.
func FuzzParseAmount(f *testing.F) {
	for _, s := range []string{"420 g", "1e-12 µg", "5.", "", "1e9 %", "0.000 kcal", "9e+2mL", "1 cup"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		a, err := ParseAmount(s)
		if err != nil {
			return
		}
		if a.Value.IsNegative() {
			t.Fatalf("%q is negative", s)
		}
		b, err := ParseAmount(a.String())
		if err != nil && len(a.String()) <= maxText || err == nil && (!b.Value.Equal(a.Value) || b.Unit != a.Unit) {
			t.Fatalf("%q writes as %q, which reads as %v, %v", s, a, b, err)
		}
	})
}

// ratio builds n·10^e/d from bytes, with its counterpart of math/big.
func ratio(n int64, e int8, d uint16) (Ratio, *big.Rat) {
	e %= 8
	den := big.NewInt(int64(d) + 1)
	want := new(big.Rat).SetFrac(big.NewInt(n), den)
	if e >= 0 {
		want.Mul(want, new(big.Rat).SetInt(Pow10(int32(e))))
	} else {
		want.Quo(want, new(big.Rat).SetInt(Pow10(int32(-e))))
	}
	return Over(big.NewInt(n), int32(e), den), want
}

func equal(r Ratio, want *big.Rat) bool {
	n, d := r.fraction()
	return new(big.Rat).SetFrac(n, d).Cmp(want) == 0
}

// slowRound is the same rounding in big integers alone.
func slowRound(r Ratio, step decimal.Decimal, ties Ties) decimal.Decimal {
	n, d := r.fraction()
	sn, sd := FromDecimal(step).fraction()
	k := nearest(new(big.Int).Mul(n, sd), new(big.Int).Mul(d, sn), ties)
	return decimal.NewFromBigInt(k, 0).Mul(step)
}

func slowText(r Ratio) string {
	d, _ := r.Shown()
	return d.String()
}

// The arithmetic agrees with the rational numbers of the standard library, a general-purpose reference.
func FuzzRatioAgreesWithRat(f *testing.F) {
	f.Add(int64(3), int8(-2), uint16(6), int64(-5), int8(1), uint16(6))
	f.Add(int64(0), int8(0), uint16(0), int64(1), int8(-7), uint16(9))
	f.Add(int64(1), int8(5), uint16(1), int64(1), int8(-5), uint16(3))
	f.Fuzz(func(t *testing.T, n1 int64, e1 int8, d1 uint16, n2 int64, e2 int8, d2 uint16) {
		a, x := ratio(n1, e1, d1)
		b, y := ratio(n2, e2, d2)
		for name, ok := range map[string]bool{
			"add":      equal(a.Add(b), new(big.Rat).Add(x, y)),
			"sub":      equal(a.Sub(b), new(big.Rat).Sub(x, y)),
			"mul":      equal(a.Mul(b), new(big.Rat).Mul(x, y)),
			"quo":      b.IsZero() || equal(a.Quo(b), new(big.Rat).Quo(x, y)),
			"cmp":      a.Cmp(b) == x.Cmp(y),
			"round":    a.Round(decimal.New(5, -2), TiesUp).Equal(slowRound(a, decimal.New(5, -2), TiesUp)) && a.Round(decimal.New(25, -1), TiesEven).Equal(slowRound(a, decimal.New(25, -1), TiesEven)),
			"text":     a.Text() == slowText(a),
			"reduced":  equal(a.Reduced(), x),
			"over any": equal(a.Over(b.den()), x),
			"over":     equal(a.Over(new(big.Int).Mul(a.den(), b.den())), x),
			"fraction": b.IsZero() || equal(a.MulFraction(b.num(), big.NewInt(7)),
				new(big.Rat).Mul(x, new(big.Rat).SetFrac(b.num(), big.NewInt(7)))),
		} {
			if !ok {
				t.Errorf("%s of %v and %v is wrong", name, x, y)
			}
		}
	})
}
