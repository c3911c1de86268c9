package quantity

import (
	"math"
	"math/big"
	"math/bits"

	"github.com/shopspring/decimal"
)

var (
	one = big.NewInt(1)
	ten = big.NewInt(10)
)

// A Ratio is the exact rational number n·10^e / d with d above zero. Values of one recipe share d, so that their sums
// are sums of integers. Numerators that fit a machine word are kept in one. The zero Ratio is the number zero.
type Ratio struct {
	s int64    // the numerator, while n is nil
	n *big.Int // the numerator where it does not fit s
	d *big.Int // nil is one
	e int32
}

// FromDecimal is the exact value of a decimal.
func FromDecimal(d decimal.Decimal) Ratio {
	if d.NumDigits() <= 18 {
		return Scaled(d.CoefficientInt64(), d.Exponent())
	}
	return Over(d.Coefficient(), d.Exponent(), nil)
}

// FromInt is the whole number i.
func FromInt(i int64) Ratio { return Ratio{s: i} }

// Scaled is mantissa·10^exponent.
func Scaled(mantissa int64, exponent int32) Ratio {
	if mantissa == 0 {
		return Ratio{}
	}
	return Ratio{s: mantissa, e: exponent}
}

// Over is n·10^e / d; d may be nil for one. It keeps both: hand the same pointer to every value that shares a denominator,
// and never change either.
func Over(n *big.Int, e int32, d *big.Int) Ratio {
	switch {
	case n.Sign() == 0:
		return Ratio{}
	case n.IsInt64() && n.Int64() != math.MinInt64:
		return Ratio{s: n.Int64(), d: d, e: e}
	}
	return Ratio{n: n, d: d, e: e}
}

func (r Ratio) num() *big.Int {
	if r.n == nil {
		return big.NewInt(r.s)
	}
	return r.n
}

func (r Ratio) den() *big.Int {
	if r.d == nil {
		return one
	}
	return r.d
}

// Sign is -1, 0 or +1.
func (r Ratio) Sign() int {
	if r.n != nil {
		return r.n.Sign()
	}
	return sign(r.s)
}

func sign(i int64) int {
	switch {
	case i < 0:
		return -1
	case i > 0:
		return 1
	}
	return 0
}

// IsZero reports the number zero.
func (r Ratio) IsZero() bool { return r.n == nil && r.s == 0 }

func (r Ratio) isOne() bool { return r.n == nil && r.s == 1 && r.e == 0 && r.d == nil }

func sameDen(a, b *big.Int) bool {
	return a == b || a != nil && b != nil && a.Cmp(b) == 0
}

// mul64 is a product that fits a word; false where it does not.
func mul64(a, b int64) (int64, bool) {
	if a == 0 || b == 0 {
		return 0, true
	}
	hi, lo := bits.Mul64(magnitude64(a), magnitude64(b))
	if hi != 0 || lo > math.MaxInt64 {
		return 0, false
	}
	if (a < 0) != (b < 0) {
		return -int64(lo), true
	}
	return int64(lo), true
}

func magnitude64(a int64) uint64 {
	if a < 0 {
		return uint64(-a)
	}
	return uint64(a)
}

var words = [...]int64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18}

// shift64 is a·10^k in a word; false where it does not fit.
func shift64(a int64, k int32) (int64, bool) {
	if a == 0 {
		return 0, true
	}
	if int(k) >= len(words) {
		return 0, false
	}
	return mul64(a, words[k])
}

// aligned64 gives both numerators over one power of ten, in words.
func aligned64(a, b Ratio) (x, y int64, e int32, ok bool) {
	if a.n != nil || b.n != nil {
		return 0, 0, 0, false
	}
	x, y, e, ok = a.s, b.s, min(a.e, b.e), true
	if a.e > e {
		x, ok = shift64(a.s, a.e-e)
	} else if b.e > e {
		y, ok = shift64(b.s, b.e-e)
	}
	return x, y, e, ok
}

// align gives both numerators over one power of ten.
func align(a, b Ratio) (x, y *big.Int, e int32) {
	switch {
	case a.e == b.e:
		return a.num(), b.num(), a.e
	case a.e > b.e:
		return shifted(a.num(), a.e-b.e), b.num(), b.e
	default:
		return a.num(), shifted(b.num(), b.e-a.e), a.e
	}
}

// Add is r + s, exactly.
func (r Ratio) Add(s Ratio) Ratio {
	switch {
	case r.IsZero():
		return s
	case s.IsZero():
		return r
	}
	same := sameDen(r.d, s.d)
	if same {
		if x, y, e, ok := aligned64(r, s); ok {
			if sum := x + y; (sum > x) == (y > 0) {
				if sum == 0 {
					return Ratio{}
				}
				return Ratio{s: sum, d: r.d, e: e}
			}
		}
	}
	x, y, e := align(r, s)
	if same {
		return Over(wideSum(x, y), e, r.d)
	}
	a, b := r.den(), s.den()
	if a.CmpAbs(b) < 0 {
		x, y, a, b = y, x, b, a
	}
	if k, m := new(big.Int).QuoRem(a, b, new(big.Int)); m.Sign() == 0 { // b divides a: a stays the denominator
		k.Mul(k, y)
		return Over(k.Add(k, x), e, a)
	}
	return Over(wideSum(product(x, b), product(y, a)), e, product(a, b))
}

// Sub is r - s, exactly.
func (r Ratio) Sub(s Ratio) Ratio { return r.Add(s.Neg()) }

// Neg is -r.
func (r Ratio) Neg() Ratio {
	if r.n == nil {
		return Ratio{s: -r.s, d: r.d, e: r.e}
	}
	return Ratio{n: new(big.Int).Neg(r.n), d: r.d, e: r.e}
}

// Mul is r·s, exactly.
func (r Ratio) Mul(s Ratio) Ratio {
	if r.IsZero() || s.IsZero() {
		return Ratio{}
	}
	d := r.d
	switch {
	case d == nil:
		d = s.d
	case s.d != nil:
		d = product(d, s.d)
	}
	if r.n == nil && s.n == nil {
		if p, ok := mul64(r.s, s.s); ok {
			return Ratio{s: p, d: d, e: r.e + s.e}
		}
	}
	switch {
	case s.n == nil:
		return Over(times(r.num(), s.s), r.e+s.e, d)
	case r.n == nil:
		return Over(times(s.n, r.s), r.e+s.e, d)
	}
	return Over(product(r.n, s.n), r.e+s.e, d)
}

// Times is r multiplied by a decimal; the denominator stays shared.
func (r Ratio) Times(d decimal.Decimal) Ratio { return r.Mul(FromDecimal(d)) }

// Quo is r / s, exactly; s must not be zero.
func (r Ratio) Quo(s Ratio) Ratio {
	if r.IsZero() {
		return Ratio{}
	}
	n, d := r, s.num()
	if !sameDen(r.d, s.d) {
		n = r.Mul(Over(s.den(), 0, nil))
		if r.d != nil {
			d = product(d, r.d)
		}
	}
	if d.Sign() < 0 {
		n, d = n.Neg(), new(big.Int).Neg(d)
	}
	if d.Cmp(one) == 0 {
		d = nil
	}
	return Ratio{s: n.s, n: n.n, d: d, e: r.e - s.e}
}

// Cmp compares two ratios by cross-multiplication.
func (r Ratio) Cmp(s Ratio) int {
	if a, b := r.Sign(), s.Sign(); a != b || a == 0 {
		return sign(int64(a - b))
	}
	same := sameDen(r.d, s.d)
	if x, y, _, ok := aligned64(r, s); ok {
		if same {
			return sign64(x, y)
		}
		if c, ok := cross64(x, y, r.d, s.d); ok {
			return c
		}
	}
	if c, ok := cmpBounds(r, s); ok {
		return c
	}
	x, y, _ := align(r, s)
	if same {
		return x.Cmp(y)
	}
	return product(x, s.den()).Cmp(product(y, r.den()))
}

func sign64(x, y int64) int {
	switch {
	case x < y:
		return -1
	case x > y:
		return 1
	}
	return 0
}

// cross64 compares x/a with y/b, both of one sign, in double words.
func cross64(x, y int64, a, b *big.Int) (int, bool) {
	p, q := int64(1), int64(1)
	if a != nil {
		if !a.IsInt64() {
			return 0, false
		}
		p = a.Int64()
	}
	if b != nil {
		if !b.IsInt64() {
			return 0, false
		}
		q = b.Int64()
	}
	h1, l1 := bits.Mul64(magnitude64(x), uint64(q))
	h2, l2 := bits.Mul64(magnitude64(y), uint64(p))
	c := 0
	switch {
	case h1 != h2:
		c = 1 - 2*bit(h1 < h2)
	case l1 != l2:
		c = 1 - 2*bit(l1 < l2)
	}
	if x < 0 {
		c = -c
	}
	return c, true
}

func bit(b bool) int {
	if b {
		return 1
	}
	return 0
}

// CmpDecimal compares with a decimal.
func (r Ratio) CmpDecimal(d decimal.Decimal) int { return r.Cmp(FromDecimal(d)) }

// Min is the smaller of two.
func Min(a, b Ratio) Ratio {
	if b.Cmp(a) < 0 {
		return b
	}
	return a
}

// Max is the larger of two.
func Max(a, b Ratio) Ratio {
	if b.Cmp(a) > 0 {
		return b
	}
	return a
}
