package quantity

import (
	"math/big"
	"math/bits"
)

// Integers wider than a word are made with room for their result, in one allocation: header and words together.

type room8 struct {
	i big.Int
	w [8]big.Word
}

type room16 struct {
	i big.Int
	w [16]big.Word
}

type room24 struct {
	i big.Int
	w [24]big.Word
}

// room is a zero with capacity for so many words.
func room(words int) *big.Int {
	switch {
	case words <= 8:
		r := new(room8)
		return r.i.SetBits(r.w[:0])
	case words <= 16:
		r := new(room16)
		return r.i.SetBits(r.w[:0])
	case words <= 24:
		r := new(room24)
		return r.i.SetBits(r.w[:0])
	}
	return new(big.Int)
}

func width(n *big.Int) int { return len(n.Bits()) }

// product is a·b.
func product(a, b *big.Int) *big.Int { return room(width(a)+width(b)).Mul(a, b) }

// times is a·m.
func times(a *big.Int, m int64) *big.Int {
	if bits.UintSize != 64 || width(a) >= 24 {
		return new(big.Int).Mul(a, big.NewInt(m))
	}
	z := room(width(a) + 1)
	words, out := a.Bits(), z.Bits()[:width(a)+1]
	var carry uint64
	for i, w := range words {
		hi, lo := bits.Mul64(uint64(w), magnitude64(m))
		lo, c := bits.Add64(lo, carry, 0)
		out[i], carry = big.Word(lo), hi+c
	}
	out[len(words)] = big.Word(carry)
	z.SetBits(out)
	if (a.Sign() < 0) != (m < 0) {
		z.Neg(z)
	}
	return z
}

// shifted is a·10^k for k of zero or more.
func shifted(a *big.Int, k int32) *big.Int {
	switch {
	case k == 0:
		return a
	case int(k) < len(words):
		return times(a, words[k])
	}
	return product(a, Pow10(k))
}

// wideSum is a+b.
func wideSum(a, b *big.Int) *big.Int { return room(max(width(a), width(b))+1).Add(a, b) }
