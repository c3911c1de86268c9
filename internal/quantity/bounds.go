package quantity

import (
	"math/big"
	"math/bits"

	"github.com/shopspring/decimal"
)

// Most comparisons and roundings are settled by the leading 64 bits of both sides. What those bits say is kept as two bounds with
// directed rounding; where the bounds do not settle it, the integers do. Nothing is decided on an approximation.

// A bound is m·2^e with the top bit of m set, or zero.
type bound struct {
	m uint64
	e int
}

// bounds enclose a positive number.
type bounds struct{ low, high bound }

func boundOf(m uint64) bound {
	if m == 0 {
		return bound{}
	}
	shift := bits.LeadingZeros64(m)
	return bound{m << shift, -shift}
}

// next is the least bound above one that was cut.
func (b bound) next() bound {
	if b.m++; b.m == 0 {
		return bound{1 << 63, b.e + 1}
	}
	return b
}

// boundsOf encloses the magnitude of an integer.
func boundsOf(n *big.Int) bounds {
	words := n.Bits()
	if bits.UintSize != 64 || len(words) == 0 {
		return bounds{}
	}
	top := len(words) - 1
	lead := bits.LeadingZeros64(uint64(words[top]))
	low := bound{uint64(words[top]) << lead, top*64 - lead}
	exact := true
	if top > 0 && lead > 0 {
		low.m |= uint64(words[top-1]) >> (64 - lead)
		exact = uint64(words[top-1])<<lead == 0
		top--
	}
	for i := range top {
		exact = exact && words[i] == 0
	}
	if exact {
		return bounds{low, low}
	}
	return bounds{low, low.next()}
}

func (b bound) mul(c bound, up bool) bound {
	hi, lo := bits.Mul64(b.m, c.m)
	p := bound{hi, b.e + c.e + 64}
	if hi>>63 == 0 {
		p = bound{hi<<1 | lo>>63, p.e - 1}
		lo <<= 1
	}
	if up && lo != 0 {
		return p.next()
	}
	return p
}

func (b bound) quo(c bound, up bool) bound {
	hi, lo, e := b.m, uint64(0), b.e-c.e-64
	if hi >= c.m {
		hi, lo, e = hi>>1, hi<<63, e+1
	}
	q, rest := bits.Div64(hi, lo, c.m)
	p := bound{q, e}
	if up && rest != 0 {
		return p.next()
	}
	return p
}

func (b bounds) mul(c bounds) bounds {
	return bounds{b.low.mul(c.low, false), b.high.mul(c.high, true)}
}
func (b bounds) quo(c bounds) bounds {
	return bounds{b.low.quo(c.high, false), b.high.quo(c.low, true)}
}

func (b bound) less(c bound) bool { return b.e < c.e || b.e == c.e && b.m < c.m }

// mostPower is how far the table of powers of ten reaches either way.
const mostPower = 63

var powerBounds = func() (p [2*mostPower + 1]bounds) {
	for k := range mostPower + 1 {
		up := boundsOf(powers[k])
		p[mostPower+k] = up
		p[mostPower-k] = bounds{boundOf(1), boundOf(1)}.quo(up)
	}
	return p
}()

// bounds encloses the magnitude of a ratio that is not zero; false where its power of ten is beyond the table.
func (r Ratio) bounds() (bounds, bool) {
	if r.e < -mostPower || r.e > mostPower || bits.UintSize != 64 {
		return bounds{}, false
	}
	m := boundOf(magnitude64(r.s))
	b := bounds{m, m}
	if r.n != nil {
		b = boundsOf(r.n)
	}
	if r.d != nil {
		b = b.quo(boundsOf(r.d))
	}
	if r.e != 0 {
		b = b.mul(powerBounds[mostPower+r.e])
	}
	return b, true
}

// cmpBounds compares two ratios of one sign, neither zero; false where the leading bits do not settle it.
func cmpBounds(r, s Ratio) (int, bool) {
	a, ok1 := r.bounds()
	b, ok2 := s.bounds()
	c := 0
	switch {
	case !ok1 || !ok2:
	case a.high.less(b.low):
		c = -1
	case b.high.less(a.low):
		c = 1
	}
	return c * r.Sign(), c != 0
}

// magnitude is the power of ten of the leading digit of what is between; false where the bounds have different ones.
func (b bounds) magnitude() (int32, bool) {
	k := (b.low.e + 63) * 30103 / 100_000 // log10(2), one off at most
	for _, k := range []int{k - 1, k, k + 1} {
		if k < -mostPower || k >= mostPower {
			continue
		}
		at, above := powerBounds[mostPower+k], powerBounds[mostPower+k+1]
		if !b.low.less(at.high) && b.high.less(above.low) {
			return int32(k), true
		}
	}
	return 0, false
}

// nearest is the whole number nearest to a bound below 2^62, halves up; half tells that the bound is just half-way.
func (b bound) nearest() (k uint64, half bool) {
	switch shift := -b.e; {
	case shift <= 1 || shift > 65:
		return 0, false
	case shift == 65:
		return 0, false // below one half
	case shift == 64:
		return 1, b.m == 1<<63
	default:
		whole, rest := b.m>>shift, b.m<<(64-shift)
		return whole + rest>>63, rest == 1<<63
	}
}

// roundBounds is Round by the leading bits; false where they do not settle it.
func (r Ratio) roundBounds(step decimal.Decimal) (decimal.Decimal, bool) {
	if r.Sign() <= 0 || step.NumDigits() > 18 || !step.IsPositive() {
		return decimal.Decimal{}, false
	}
	c := step.CoefficientInt64()
	r.e -= step.Exponent()
	b, ok := r.bounds()
	if !ok || b.high.e > -2 {
		return decimal.Decimal{}, false
	}
	unit := boundOf(uint64(c))
	b = b.quo(bounds{unit, unit})
	low, tie := b.low.nearest()
	high, _ := b.high.nearest()
	if b.high.e > -2 || low != high || tie {
		return decimal.Decimal{}, false
	}
	v, ok := mul64(int64(low), c)
	return short(v, step.Exponent()), ok
}
