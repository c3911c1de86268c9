package quantity

import "math/big"

// fraction is the ratio as two integers, the denominator positive.
func (r Ratio) fraction() (n, d *big.Int) {
	n, d = r.num(), r.den()
	switch {
	case r.e > 0:
		n = shifted(n, r.e)
	case r.e < 0:
		d = shifted(d, -r.e)
	}
	return n, d
}

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
	if r.IsZero() || r.d == nil {
		return r
	}
	n, d, e := r.num(), r.d, r.e
	g := new(big.Int).GCD(nil, nil, new(big.Int).Abs(n), d)
	n, d = new(big.Int).Quo(n, g), new(big.Int).Quo(d, g)
	d, down := trimZeros(d, 0)
	if e -= down; d.Cmp(one) == 0 {
		d = nil
	}
	return Over(n, e, d)
}

// Denominator is what the ratio is over, its power of ten apart. Never change it.
func (r Ratio) Denominator() *big.Int { return r.den() }

// Over writes the ratio over den, or where its own denominator does not divide den over the least multiple of both.
func (r Ratio) Over(den *big.Int) Ratio {
	if r.IsZero() || sameDen(r.den(), den) {
		if den.Cmp(one) != 0 && !r.IsZero() {
			r.d = den // one pointer for all
		}
		return r
	}
	k, rest := new(big.Int).QuoRem(den, r.den(), new(big.Int))
	if rest.Sign() != 0 {
		g := new(big.Int).GCD(nil, nil, den, r.den())
		k.Quo(den, g)
		den = new(big.Int).Mul(k, r.den())
	}
	return Over(k.Mul(k, r.num()), r.e, den)
}

// MulFraction is r·num/den. Where den divides r's numerator, as it does by construction in a batch, the denominator stays
// the shared one.
func (r Ratio) MulFraction(num, den *big.Int) Ratio {
	if r.IsZero() || num.Sign() == 0 {
		return Ratio{}
	}
	q, m := new(big.Int).QuoRem(r.num(), den, new(big.Int))
	if m.Sign() == 0 {
		return Over(q.Mul(q, num), r.e, r.d)
	}
	return Over(m.Mul(r.num(), num), r.e, new(big.Int).Mul(r.den(), den))
}
