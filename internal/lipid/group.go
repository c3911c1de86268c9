package lipid

import (
	"math/bits"
	"strconv"
)

// span is an inclusive range of small counts.
type span struct{ lo, hi uint8 }

func (s span) has(n int) bool     { return n >= int(s.lo) && n <= int(s.hi) }
func (s span) one() bool          { return s.lo == s.hi }
func (s span) within(t span) bool { return s.lo >= t.lo && s.hi <= t.hi }
func (s span) meet(t span) span   { return span{max(s.lo, t.lo), min(s.hi, t.hi)} }
func (s span) void() bool         { return s.lo > s.hi }

// group is what a notation that does not name one acid still says. Values are comparable; every group made by Parse has
// at least one member.
type group struct {
	carbons, bonds span
	positions      uint64 // exactly these positions from the carboxyl end; 0 leaves them open
	ends           uint64 // positions the bond nearest the methyl end may have, counted from that end; 0 leaves it open
	cis, trans     uint16 // bond number i from the carboxyl end, from 0, has this geometry; only with a known number of bonds
	allCis         bool
	isolated       bool // at least one trans bond that is not conjugated
	anyTrans       bool // at least one trans bond
	interrupted    bool // every two neighbouring bonds three carbons apart
	conjugated     bool // every bond conjugated with another
	isomers        bool // not an all-cis methylene-interrupted acid
	branched       bool // a total: branched and substituted acids belong too
}

var (
	everyCarbons = span{minCarbons, maxCarbons}
	bondWords    = []struct {
		bonds span
		word  string
	}{
		{span{0, 0}, "saturated"}, {span{1, 1}, "monounsaturated"}, {span{2, maxBonds}, "polyunsaturated"},
		{span{1, maxBonds}, "unsaturated"}, {span{0, maxBonds}, "fatty acids"},
	}
)

// String is LIPID MAPS shorthand at species or double-bond-position level where that can say it, else plain words that
// Parse reads back.
func (g group) String() string {
	b := make([]byte, 0, 48)
	rest := g
	rest.carbons, rest.bonds, rest.positions, rest.branched = span{}, span{}, 0, false
	if g.positions != 0 {
		rest.cis, rest.trans = 0, 0
	}
	if rest == (group{ends: rest.ends}) && bits.OnesCount64(rest.ends) == 1 && g.bonds == (span{1, maxBonds}) {
		return "omega-" + strconv.Itoa(bits.TrailingZeros64(g.ends))
	}
	if rest == (group{}) && g.carbons.one() {
		b = append(b, "FA "...)
	}
	return string(rest.appendWords(g.appendCounts(b), int(g.bonds.hi)))
}

func (g group) appendCounts(b []byte) []byte {
	if !g.carbons.one() {
		for _, w := range bondWords {
			if w.bonds == g.bonds {
				return append(b, w.word...)
			}
		}
	}
	b = append(strconv.AppendInt(b, int64(g.carbons.lo), 10), ':')
	b = strconv.AppendInt(b, int64(g.bonds.lo), 10)
	cis, trans := g.spread()
	return appendBonds(b, g.positions, cis, trans)
}

// spread moves the pattern by bond number onto the known positions.
func (g group) spread() (cis, trans uint64) {
	for m, i := g.positions, 0; m != 0; m, i = m&(m-1), i+1 {
		p := bits.TrailingZeros64(m)
		cis |= uint64(g.cis>>i&1) << p
		trans |= uint64(g.trans>>i&1) << p
	}
	return cis, trans
}

func (g group) appendWords(b []byte, bonds int) []byte {
	switch {
	case g.cis|g.trans != 0:
		b = appendPattern(b, g.cis, g.trans, bonds)
	case g.allCis:
		b = append(b, " cis"...)
	case g.isolated || g.anyTrans:
		b = append(b, " trans"...)
	}
	for _, w := range []struct {
		on   bool
		word string
	}{{g.conjugated, " conjugated"}, {g.interrupted, " methylene-interrupted"}, {g.isomers, " isomers"}} {
		if w.on {
			b = append(b, w.word...)
		}
	}
	sep := " n-"
	for m := g.ends; m != 0; m &= m - 1 {
		b = strconv.AppendInt(append(b, sep...), int64(bits.TrailingZeros64(m)), 10)
		sep = "/n-"
	}
	return b
}

func appendPattern(b []byte, cis, trans uint16, bonds int) []byte {
	sep := byte(' ')
	for i := range bonds {
		b = append(b, sep)
		if cis>>i&1 == 1 {
			b = append(b, "cis"...)
		} else if trans>>i&1 == 1 {
			b = append(b, "trans"...)
		}
		sep = ','
	}
	return b
}

// members lists the acids of a group that has only a few; ok is false when they are too many to list.
func (g group) members() (acids []FattyAcid, ok bool) {
	if !g.carbons.one() || !g.bonds.one() {
		return nil, false
	}
	switch {
	case g.positions != 0:
		acids = g.geometries(nil, g.positions)
	case g.interrupted && g.ends != 0:
		for m := g.ends; m != 0; m &= m - 1 {
			at, fits := series(int(g.carbons.lo), int(g.bonds.lo), bits.TrailingZeros64(m))
			if fits {
				acids = g.geometries(acids, at)
			}
		}
	}
	return acids, acids != nil
}

// geometries adds each arrangement of cis and trans at the given positions that the group admits; none when more than four
// bonds are open.
func (g group) geometries(acids []FattyAcid, at uint64) []FattyAcid {
	n := bits.OnesCount64(at)
	if n-bits.OnesCount16(g.cis|g.trans) > 4 && !g.allCis {
		return acids
	}
	for pattern := range uint16(1) << n {
		if g.allCis && pattern != 0 || g.cis&pattern != 0 || g.trans&^pattern != 0 {
			continue
		}
		a := FattyAcid{chain: g.carbons.lo}
		_, a.trans = group{positions: at, trans: pattern}.spread()
		a.cis = at &^ a.trans
		if g.admits(a) {
			acids = append(acids, a)
		}
	}
	return acids
}

// series gives the positions of a methylene-interrupted acid from its n-x: C - x, and back in steps of three.
// ok is false when they do not fit the chain.
func series(carbons, bonds, x int) (at uint64, ok bool) {
	if x < 1 || carbons-x-3*(bonds-1) < 2 {
		return 0, false
	}
	for i := range bonds {
		at |= 1 << (carbons - x - 3*i)
	}
	return at, true
}
