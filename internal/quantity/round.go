package quantity

import (
	"math"
	"math/big"
	"strconv"

	"github.com/shopspring/decimal"
)

// Ties says where an amount exactly half-way between two steps goes.
type Ties string

// Rules for ties. The empty value is TiesUp.
const (
	TiesUp   Ties = "up"
	TiesEven Ties = "even"
)

// Round gives the multiple of step (above zero) nearest to r. It decides on the exact value.
func (r Ratio) Round(step decimal.Decimal, ties Ties) decimal.Decimal {
	if k, ok := r.round64(step, ties); ok {
		return k
	}
	if k, ok := r.roundBounds(step); ok {
		return k
	}
	n, d := r.fraction()
	sn, sd := FromDecimal(step).fraction()
	// r/step = (n·sd) / (d·sn)
	num, den := product(n, sd), product(d, sn)
	k := nearest(num, den, ties)
	return normal(decimal.NewFromBigInt(k, 0).Mul(step))
}

// round64 is Round in machine words; false where they do not suffice.
func (r Ratio) round64(step decimal.Decimal, ties Ties) (decimal.Decimal, bool) {
	if r.n != nil || r.s < 0 || r.d != nil && !r.d.IsInt64() || step.NumDigits() > 18 {
		return decimal.Decimal{}, false
	}
	c := step.CoefficientInt64()
	num, den, ok := r.s, c, true
	if r.d != nil {
		den, ok = mul64(den, r.d.Int64())
	}
	ok2 := true
	if k := r.e - step.Exponent(); k >= 0 {
		num, ok2 = shift64(num, k)
	} else {
		den, ok2 = shift64(den, -k)
	}
	if !ok || !ok2 {
		return decimal.Decimal{}, false
	}
	k, m := num/den, num%den
	if rest := den - m; m > rest || m == rest && (ties != TiesEven || k%2 == 1) {
		k++
	}
	v, ok := mul64(k, c)
	return short(v, step.Exponent()), ok
}

// short is v·10^e without trailing zeros.
func short(v int64, e int32) decimal.Decimal {
	if v == 0 {
		return decimal.Zero
	}
	for v%10 == 0 {
		v, e = v/10, e+1
	}
	return decimal.New(v, e)
}

func nearest(num, den *big.Int, ties Ties) *big.Int {
	k, m := new(big.Int).DivMod(num, den, new(big.Int))
	switch twice := m.Lsh(m, 1); twice.Cmp(den) {
	case 1:
		k.Add(k, one)
	case 0:
		if ties != TiesEven || k.Bit(0) == 1 {
			k.Add(k, one)
		}
	}
	return k
}

// RoundFigures gives r with the stated number of significant figures; zero stays zero.
func (r Ratio) RoundFigures(figures int, ties Ties) decimal.Decimal {
	if r.IsZero() {
		return decimal.Zero
	}
	e := r.magnitude() - int32(figures) + 1
	return r.Round(decimal.New(1, e), ties)
}

// magnitude is the power of ten of the leading digit.
func (r Ratio) magnitude() int32 {
	if b, ok := r.bounds(); ok {
		if e, ok := b.magnitude(); ok {
			return e
		}
	}
	n, d := r.fraction()
	n = new(big.Int).Abs(n)
	// log10(2) is a little above 30102/100000, so the first guess is at most one off either way.
	bits := int64(n.BitLen() - d.BitLen())
	e := int32(bits * 30103 / 100000)
	for cmpPow(n, d, e) < 0 {
		e--
	}
	for cmpPow(n, d, e+1) >= 0 {
		e++
	}
	return e
}

// cmpPow compares n/d with 10^e.
func cmpPow(n, d *big.Int, e int32) int {
	if e >= 0 {
		return n.Cmp(shifted(d, e))
	}
	return shifted(n, -e).Cmp(d)
}

// ShownDigits is how many significant digits Exact shows of a number that does not end before.
const ShownDigits = 20

// An Exact is a ratio as a decimal: complete, or its first 20 significant digits with the ratio beside it.
type Exact struct {
	Text      string
	Truncated bool
	Num, Den  string // in lowest terms, set when truncated
}

// Exact writes the ratio out.
func (r Ratio) Exact() Exact {
	text, complete := r.text()
	x := Exact{Text: text, Truncated: !complete}
	if !complete {
		x.Num, x.Den = r.terms()
	}
	return x
}

// terms are numerator and denominator in lowest terms.
func (r Ratio) terms() (num, den string) {
	if n, d, ok := r.fraction64(); ok {
		a, b := n, d
		for b != 0 {
			a, b = b, a%b
		}
		return strconv.FormatUint(n/a, 10), strconv.FormatUint(d/a, 10)
	}
	n, d := r.fraction()
	g := new(big.Int).GCD(nil, nil, new(big.Int).Abs(n), d)
	if g.Cmp(one) != 0 {
		n, d = new(big.Int).Quo(n, g), new(big.Int).Quo(d, g)
	}
	return n.String(), d.String()
}

// Text is Shown as text, without big integers where words suffice.
func (r Ratio) Text() string {
	s, _ := r.text()
	return s
}

func (r Ratio) text() (s string, complete bool) {
	if n, d, ok := r.fraction64(); ok {
		return text64(n, d)
	}
	d, complete := r.Shown()
	return d.String(), complete
}

// fraction64 is a ratio that is not negative as two words, with room for a digit more; false where it does not fit.
func (r Ratio) fraction64() (num, den uint64, ok bool) {
	if r.n != nil || r.d != nil && !r.d.IsInt64() || r.s < 0 {
		return 0, 0, false
	}
	n, d, ok := r.s, int64(1), true
	if r.d != nil {
		d = r.d.Int64()
	}
	if r.e >= 0 {
		n, ok = shift64(n, r.e)
	} else {
		d, ok = shift64(d, -r.e)
	}
	return uint64(n), uint64(d), ok && d <= math.MaxInt64/10
}

// text64 divides digit by digit.
func text64(num, d uint64) (text string, complete bool) {
	out := strconv.AppendUint(make([]byte, 0, 44), num/d, 10)
	rest := num % d
	if rest == 0 {
		return string(out), true
	}
	figures := len(out)
	if num < d {
		figures = 0 // zeros in front are no figures
	}
	out = append(out, '.')
	for figures < ShownDigits && rest != 0 {
		rest *= 10
		digit := rest / d
		rest %= d
		out = append(out, byte('0'+digit))
		if figures > 0 || digit > 0 {
			figures++
		}
	}
	for out[len(out)-1] == '0' {
		out = out[:len(out)-1]
	}
	if out[len(out)-1] == '.' {
		out = out[:len(out)-1]
	}
	return string(out), rest == 0
}

// Shown is the ratio as a decimal, complete or cut after 20 significant digits.
func (r Ratio) Shown() (d decimal.Decimal, complete bool) {
	if r.n == nil && r.d == nil {
		return short(r.s, r.e), true
	}
	num, den := r.fraction()
	e := r.magnitude() - ShownDigits + 1
	if e < 0 {
		num = shifted(num, -e)
	} else {
		den = shifted(den, e)
	}
	q, m := new(big.Int).QuoRem(num, den, new(big.Int))
	return normal(decimal.NewFromBigInt(q, e)), m.Sign() == 0
}

// Brief is the ratio to the stated number of decimals, for people; never for a decision.
func (r Ratio) Brief(decimals int32) string {
	return r.Round(decimal.New(1, -decimals), TiesUp).String()
}

// Floor is r cut down to a number of decimals, Ceil r brought up: for ends of intervals, which may only move outward.
func (r Ratio) Floor(decimals int32) decimal.Decimal {
	n, d := r.Mul(Scaled(1, decimals)).fraction()
	q, _ := new(big.Int).DivMod(n, d, new(big.Int))
	return normal(decimal.NewFromBigInt(q, -decimals))
}

// Ceil is the least number of so many decimals that is not below r.
func (r Ratio) Ceil(decimals int32) decimal.Decimal {
	return r.Neg().Floor(decimals).Neg()
}
