package quantity

import (
	"math/big"
	"math/rand/v2"
	"testing"

	"github.com/shopspring/decimal"
)

// rational is a ratio as the standard library has it.
func rational(r Ratio) *big.Rat {
	n, d := r.fraction()
	return new(big.Rat).SetFrac(n, d)
}

func bigOf(rnd *rand.Rand, bits int) *big.Int {
	n := new(big.Int)
	for n.BitLen() < bits {
		n.Lsh(n, 64).Or(n, new(big.Int).SetUint64(rnd.Uint64()))
	}
	return n.Rsh(n, uint(n.BitLen()-bits))
}

// Comparisons of wide ratios are those of big rationals: far apart, one unit apart in the last place, and equal in other terms.
func TestWideComparisons(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 2))
	settled := 0
	for range 20_000 {
		d := bigOf(rnd, 1+rnd.IntN(700))
		n := bigOf(rnd, 1+rnd.IntN(700))
		r := Over(n, int32(rnd.IntN(30)-15), d)
		others := []Ratio{
			Over(new(big.Int).Add(n, one), r.e, d),
			Over(new(big.Int).Mul(n, big.NewInt(30)), r.e-1, new(big.Int).Mul(d, big.NewInt(3))),
			Over(bigOf(rnd, n.BitLen()), r.e, d),
			Scaled(1+rnd.Int64N(1e9), int32(rnd.IntN(12)-6)),
		}
		for _, s := range others {
			want := rational(r).Cmp(rational(s))
			if got := r.Cmp(s); got != want {
				t.Fatalf("%v against %v is %d, want %d", r, s, got, want)
			}
			if got := r.Neg().Cmp(s.Neg()); got != -want {
				t.Fatalf("the negatives of %v and %v are %d, want %d", r, s, got, -want)
			}
			if c, ok := cmpBounds(r, s); ok {
				settled++
				if c != want {
					t.Fatalf("leading bits of %v against %v say %d, want %d", r, s, c, want)
				}
			}
		}
	}
	if settled < 20_000 {
		t.Errorf("leading bits settle only %d of 80,000 comparisons", settled)
	}
}

// Rounding of wide ratios is that of big rationals: anywhere, just beside a tie, and on it.
func TestWideRounding(t *testing.T) {
	rnd := rand.New(rand.NewPCG(3, 4))
	settled := 0
	for range 20_000 {
		step := decimal.New(1+rnd.Int64N(20), int32(rnd.IntN(5)-3))
		d := bigOf(rnd, 65+rnd.IntN(500))
		half := FromDecimal(step).Mul(Scaled(5, -1)).Mul(FromInt(2*rnd.Int64N(1000) + 1))
		tie := Over(new(big.Int).Mul(half.num(), d), half.e, d)
		for _, r := range []Ratio{
			tie,
			tie.Add(Over(one, -12, d)),
			tie.Sub(Over(one, -12, d)),
			Over(bigOf(rnd, d.BitLen()+rnd.IntN(20)-10), int32(rnd.IntN(6)-3), d),
		} {
			for _, ties := range []Ties{TiesUp, TiesEven} {
				want := roundedRational(rational(r), step, ties)
				if got := r.Round(step, ties); !got.Equal(want) {
					t.Fatalf("%v to %s (%s) is %s, want %s", r, step, ties, got, want)
				}
			}
			if v, ok := r.roundBounds(step); ok {
				settled++
				if want := roundedRational(rational(r), step, TiesEven); !v.Equal(want) {
					t.Fatalf("leading bits round %v to %s as %s, want %s", r, step, v, want)
				}
			}
		}
	}
	if settled < 20_000 {
		t.Errorf("leading bits settle only %d of 80,000 roundings", settled)
	}
}

func roundedRational(x *big.Rat, step decimal.Decimal, ties Ties) decimal.Decimal {
	q := new(big.Rat).Quo(x, step.Rat())
	whole, rest := new(big.Int).DivMod(q.Num(), q.Denom(), new(big.Int))
	switch c := rest.Lsh(rest, 1).Cmp(q.Denom()); {
	case c > 0, c == 0 && (ties != TiesEven || whole.Bit(0) == 1):
		whole.Add(whole, one)
	}
	return decimal.NewFromBigInt(whole, 0).Mul(step)
}

// The leading digit of wide ratios is that of the digits themselves.
func TestWideMagnitudes(t *testing.T) {
	rnd := rand.New(rand.NewPCG(5, 6))
	for range 20_000 {
		d := bigOf(rnd, 65+rnd.IntN(500))
		near := Over(new(big.Int).Mul(d, Pow10(int32(rnd.IntN(12)))), int32(rnd.IntN(20)-10), d) // a power of ten
		for _, r := range []Ratio{near, near.Sub(Over(one, -40, d)), near.Add(Over(one, -40, d)), Over(bigOf(rnd, 1+rnd.IntN(600)), int32(rnd.IntN(20)-10), d)} {
			e := r.magnitude()
			x := rational(r)
			power := func(e int32) *big.Rat { return rational(Scaled(1, e)) }
			if x.Cmp(power(e)) < 0 || x.Cmp(power(e+1)) >= 0 {
				t.Fatalf("%v has its leading digit at 10^%d", r, e)
			}
		}
	}
}
