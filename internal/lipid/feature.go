package lipid

import "math/bits"

// A feature combination is six yes/no facts about the double bonds of one acid, so a set of combinations is one 64-bit
// word: bit i stands for the combination whose facts are the bits of i. That makes "which combinations can a member of
// this group have?" a small dynamic program over bond positions, and a structural predicate a mask.
type featureSet = uint64

const (
	hasTrans    = iota // some bond is trans
	hasCis             // some bond is cis
	hasIsolated        // some trans bond has no double bond two carbons away
	hasUneven          // some neighbouring bonds are not three carbons apart
	hasPair            // some two bonds are conjugated (two carbons apart)
	hasLoner           // some bond is not conjugated with another
)

const noBonds featureSet = 1 // only the combination of an acid without double bonds

// with[f] holds the combinations in which fact f is true.
var with = [6]featureSet{
	0xAAAAAAAAAAAAAAAA, 0xCCCCCCCCCCCCCCCC, 0xF0F0F0F0F0F0F0F0,
	0xFF00FF00FF00FF00, 0xFFFF0000FFFF0000, 0xFFFFFFFF00000000,
}

// mark makes fact f true in every combination of s.
func mark(s featureSet, f int) featureSet { return s&with[f] | s&^with[f]<<(1<<f) }

// features is the one combination of an acid.
func (a FattyAcid) features() featureSet {
	s, all := noBonds, a.cis|a.trans
	pairs := all & (all >> 2) &^ (all >> 1) // neighbours two carbons apart
	conjugated := pairs | pairs<<2
	upper := all & (all - 1) // all but the bond nearest the carboxyl end
	uneven := upper>>3&^all | all&(upper>>1|upper>>2)
	facts := [6]bool{a.trans != 0, a.cis != 0, a.trans&^conjugated != 0, uneven != 0, conjugated != 0, all&^conjugated != 0}
	for f, holds := range facts {
		if holds {
			s = mark(s, f)
		}
	}
	return s
}

// layer holds, per position from the methyl end, the combinations reachable with the latest bond there. The latest bond is
// still unsettled: trans or cis and not conjugated so far, or conjugated with the bond before.
type layer struct{ trans, cis, joined [maxCarbons]featureSet }

// settled closes the account of the latest bond: nothing two carbons further will follow.
func (l *layer) settled(n int) featureSet {
	t := mark(mark(l.trans[n], hasIsolated), hasLoner)
	return t | mark(l.cis[n], hasLoner) | l.joined[n]
}

func (l *layer) any(n int) featureSet { return l.trans[n] | l.cis[n] | l.joined[n] }

// reach finds, for each number of double bonds, every feature combination a member of the group with its greatest number
// of carbons can have, taking only members whose bond nearest the methyl end is at a position in ends. Shorter members have
// no others, because positions are counted from the methyl end and a longer chain only adds room.
func (g group) reach(ends uint64) (sets [maxBonds + 1]featureSet) {
	if g.bonds.lo == 0 {
		sets[0] = noBonds & g.admitted()
	}
	if g.bonds.hi == 0 {
		return sets
	}
	if g.ends != 0 {
		ends &= g.ends
	}
	cur := g.first(ends)
	for d := 1; ; d++ {
		if d >= int(g.bonds.lo) {
			sets[d] = g.total(&cur)
		}
		if d == int(g.bonds.hi) {
			return sets
		}
		cur = g.next(&cur, d)
	}
}

// room is the highest position from the methyl end a double bond can have: carbon 2 of the chain.
func (g group) room() int { return int(g.carbons.hi) - 2 }

func (g group) total(l *layer) (s featureSet) {
	for n := 1; n <= g.room(); n++ {
		s |= l.settled(n)
	}
	return s & g.admitted()
}

func (g group) first(ends uint64) (l layer) {
	for n := 1; n <= g.room(); n++ {
		if ends>>n&1 == 1 {
			g.place(&l, n, 0, noBonds, 0)
		}
	}
	return l
}

// next adds bond number k from the methyl end to every arrangement in l.
func (g group) next(l *layer, k int) (out layer) {
	var far featureSet // arrangements whose latest bond is four or more carbons away
	for n := 2; n <= g.room(); n++ {
		if n > 4 {
			far |= l.settled(n - 4)
		}
		var lone, joined featureSet
		if n > 3 {
			lone = l.settled(n - 3)
		}
		if !g.interrupted {
			lone |= mark(far|l.settled(n-1), hasUneven)
			if n > 2 {
				joined = mark(mark(l.any(n-2), hasUneven), hasPair)
			}
		}
		g.place(&out, n, k, lone, joined)
	}
	return out
}

// place puts bond number k (from the methyl end) at position n with each geometry the group leaves.
func (g group) place(l *layer, n, k int, lone, joined featureSet) {
	if g.positions != 0 && g.positions>>(int(g.carbons.hi)-n)&1 == 0 {
		return
	}
	index := int(g.bonds.hi) - 1 - k // patterns stand only where the number of bonds is known
	if g.trans>>index&1 == 0 {
		l.cis[n] |= mark(lone, hasCis)
		l.joined[n] |= mark(joined, hasCis)
	}
	if g.cis>>index&1 == 0 && !g.allCis && n > 1 { // a bond at the chain's end has no trans form
		l.trans[n] |= mark(lone, hasTrans)
		l.joined[n] |= mark(joined, hasTrans)
	}
}

// admitted is the mask of combinations the group's own words allow.
func (g group) admitted() featureSet {
	ok := ^featureSet(0)
	if g.isolated {
		ok &= with[hasIsolated]
	}
	if g.anyTrans {
		ok &= with[hasTrans]
	}
	if g.conjugated {
		ok &= with[hasPair] &^ with[hasLoner]
	}
	if g.isomers { // anything but the common all-cis methylene-interrupted acids
		ok &= with[hasTrans] | with[hasUneven]
	}
	return ok
}

// somewhere reports that some member has its bond nearest the methyl end at a position in ends. Few double bonds are tried
// first: nearly every group has its members there.
func (g group) somewhere(ends uint64) bool {
	for d := g.bonds.lo; d <= g.bonds.hi; d++ {
		h := g
		h.bonds = span{d, d}
		if h.reach(ends)[d] != 0 {
			return true
		}
	}
	return false
}

// empty reports that no acid fits the group.
func (g group) empty() bool { return !g.somewhere(^uint64(0)) }

// admits reports whether acid a is a member.
func (g group) admits(a FattyAcid) bool {
	all := a.cis | a.trans
	if !g.branched && (a.methyl|a.hydroxy|a.epoxy != 0 || a.ring != 0) {
		return false
	}
	if !g.carbons.has(a.Carbons()) || !g.bonds.has(a.DoubleBonds()) {
		return false
	}
	if g.positions != 0 && g.positions != all || g.ends != 0 && g.ends>>a.MethylEnd()&1 == 0 {
		return false
	}
	f := a.features()
	if f&g.admitted() == 0 || g.interrupted && f&with[hasUneven] != 0 || g.allCis && (a.trans != 0 || a.ringDouble) {
		return false
	}
	return g.fitsPattern(a)
}

func (g group) fitsPattern(a FattyAcid) bool {
	for m, i := a.cis|a.trans, 0; m != 0; m, i = m&(m-1), i+1 {
		p := bits.TrailingZeros64(m)
		if g.cis>>i&1 == 1 && a.cis>>p&1 == 0 || g.trans>>i&1 == 1 && a.trans>>p&1 == 0 {
			return false
		}
	}
	return true
}
