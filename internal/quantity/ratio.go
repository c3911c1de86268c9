package quantity

import (
	"math/big"

	"github.com/shopspring/decimal"
)

var (
	one = big.NewInt(1)
	ten = big.NewInt(10)
)

// A Ratio is the exact rational number n·10^e / d with d above zero. Values of one recipe share d, so that their sums
// are sums of integers. The zero Ratio is the number zero.
type Ratio struct {
	n *big.Int // nil is zero
	d *big.Int // nil is one
	e int32
}

// FromDecimal is the exact value of a decimal.
func FromDecimal(d decimal.Decimal) Ratio {
	if d.IsZero() {
		return Ratio{}
	}
	return Ratio{n: d.Coefficient(), e: d.Exponent()}
}

// FromInt is the whole number i.
func FromInt(i int64) Ratio { return Scaled(i, 0) }

// Scaled is mantissa·10^exponent.
func Scaled(mantissa int64, exponent int32) Ratio {
	if mantissa == 0 {
		return Ratio{}
	}
	return Ratio{n: big.NewInt(mantissa), e: exponent}
}

// Over is n·10^e / d. It keeps d: hand the same pointer to every value that shares a denominator, and never change it.
func Over(n *big.Int, e int32, d *big.Int) Ratio {
	if n.Sign() == 0 {
		return Ratio{}
	}
	return Ratio{n: n, d: d, e: e}
}

func (r Ratio) num() *big.Int {
	if r.n == nil {
		return new(big.Int)
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
	if r.n == nil {
		return 0
	}
	return r.n.Sign()
}

// IsZero reports the number zero.
func (r Ratio) IsZero() bool { return r.Sign() == 0 }

func sameDen(a, b *big.Int) bool { return a == b || a.Cmp(b) == 0 }

// align gives both numerators over one power of ten.
func align(a, b Ratio) (x, y *big.Int, e int32) {
	switch {
	case a.e == b.e:
		return a.num(), b.num(), a.e
	case a.e > b.e:
		return new(big.Int).Mul(a.num(), Pow10(a.e-b.e)), b.num(), b.e
	default:
		return a.num(), new(big.Int).Mul(b.num(), Pow10(b.e-a.e)), a.e
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
	x, y, e := align(r, s)
	a, b := r.den(), s.den()
	if sameDen(a, b) {
		return Over(new(big.Int).Add(x, y), e, a)
	}
	if a.CmpAbs(b) < 0 {
		x, y, a, b = y, x, b, a
	}
	if k, m := new(big.Int).QuoRem(a, b, new(big.Int)); m.Sign() == 0 { // b divides a: a stays the denominator
		k.Mul(k, y)
		return Over(k.Add(k, x), e, a)
	}
	n := new(big.Int).Mul(x, b)
	n.Add(n, new(big.Int).Mul(y, a))
	return Over(n, e, new(big.Int).Mul(a, b))
}

// Sub is r - s, exactly.
func (r Ratio) Sub(s Ratio) Ratio { return r.Add(s.Neg()) }

// Neg is -r.
func (r Ratio) Neg() Ratio {
	if r.IsZero() {
		return Ratio{}
	}
	return Ratio{n: new(big.Int).Neg(r.n), d: r.d, e: r.e}
}

// Mul is r·s, exactly.
func (r Ratio) Mul(s Ratio) Ratio {
	if r.IsZero() || s.IsZero() {
		return Ratio{}
	}
	n := new(big.Int).Mul(r.n, s.n)
	d := r.den()
	switch {
	case d == one:
		d = s.den()
	case s.den() != one:
		d = new(big.Int).Mul(d, s.den())
	}
	return Ratio{n: n, d: d, e: r.e + s.e}
}

// Times is r multiplied by a decimal; the denominator stays shared.
func (r Ratio) Times(d decimal.Decimal) Ratio { return r.Mul(FromDecimal(d)) }

// Quo is r / s, exactly; s must not be zero.
func (r Ratio) Quo(s Ratio) Ratio {
	if r.IsZero() {
		return Ratio{}
	}
	n, d := r.n, r.den()
	if sameDen(d, s.den()) {
		d = s.n
	} else {
		n, d = new(big.Int).Mul(n, s.den()), new(big.Int).Mul(d, s.n)
	}
	if d.Sign() < 0 {
		n, d = new(big.Int).Neg(n), new(big.Int).Neg(d)
	}
	return Ratio{n: n, d: d, e: r.e - s.e}
}

// Cmp compares two ratios by cross-multiplication.
func (r Ratio) Cmp(s Ratio) int {
	if r.Sign() != s.Sign() {
		return sign(r.Sign() - s.Sign())
	}
	if r.IsZero() {
		return 0
	}
	x, y, _ := align(r, s)
	if sameDen(r.den(), s.den()) {
		return x.Cmp(y)
	}
	return new(big.Int).Mul(x, s.den()).Cmp(new(big.Int).Mul(y, r.den()))
}

func sign(i int) int {
	switch {
	case i < 0:
		return -1
	case i > 0:
		return 1
	}
	return 0
}

// CmpDecimal compares with a decimal.
func (r Ratio) CmpDecimal(d decimal.Decimal) int { return r.Cmp(FromDecimal(d)) }

// Min is the smaller of two, Max the larger.
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

// fraction is the ratio as two integers, the denominator positive.
func (r Ratio) fraction() (n, d *big.Int) {
	n, d = r.num(), r.den()
	switch {
	case r.e > 0:
		n = new(big.Int).Mul(n, Pow10(r.e))
	case r.e < 0:
		d = new(big.Int).Mul(d, Pow10(-r.e))
	}
	return n, d
}

// Bits is the size of the larger part, for callers that cap it.
func (r Ratio) Bits() int { return max(r.num().BitLen(), r.den().BitLen()) }

var powers = func() (p [64]*big.Int) {
	v := big.NewInt(1)
	for i := range p {
		p[i] = new(big.Int).Set(v)
		v.Mul(v, ten)
	}
	return p
}()

// Pow10 is 10^e for e of zero or more. The result is shared: never change it.
func Pow10(e int32) *big.Int {
	if int(e) < len(powers) {
		return powers[e]
	}
	return new(big.Int).Exp(ten, big.NewInt(int64(e)), nil)
}

func trimZeros(c *big.Int, e int32) (*big.Int, int32) {
	q, m := new(big.Int), new(big.Int)
	for c.Sign() != 0 {
		q.QuoRem(c, ten, m)
		if m.Sign() != 0 {
			break
		}
		c, e = new(big.Int).Set(q), e+1
	}
	return c, e
}

// Reduced is the same number in lowest terms, powers of ten apart.
func (r Ratio) Reduced() Ratio {
	if r.IsZero() || r.d == nil || r.d == one {
		return r
	}
	n, d, e := new(big.Int).Set(r.n), new(big.Int).Set(r.d), r.e
	g := new(big.Int).GCD(nil, nil, new(big.Int).Abs(n), d)
	n.Quo(n, g)
	d.Quo(d, g)
	d, down := trimZeros(d, 0)
	if e -= down; d.Cmp(one) == 0 {
		d = one
	}
	return Ratio{n: n, d: d, e: e}
}

// Denominator is what the ratio is over, its power of ten apart. Never change it.
func (r Ratio) Denominator() *big.Int { return r.den() }

// Over writes the ratio over a multiple of its denominator.
func (r Ratio) Over(den *big.Int) Ratio {
	if r.IsZero() || r.den() == den {
		return r
	}
	k := new(big.Int).Quo(den, r.den())
	return Ratio{n: k.Mul(k, r.n), d: den, e: r.e}
}

// MulFraction is r·num/den. Where den divides r's numerator, as it does by construction in a batch, the denominator stays
// the shared one.
func (r Ratio) MulFraction(num, den *big.Int) Ratio {
	if r.IsZero() || num.Sign() == 0 {
		return Ratio{}
	}
	q, m := new(big.Int).QuoRem(r.n, den, new(big.Int))
	if m.Sign() == 0 {
		return Ratio{n: q.Mul(q, num), d: r.d, e: r.e}
	}
	return Ratio{n: m.Mul(r.n, num), d: new(big.Int).Mul(r.den(), den), e: r.e}
}
