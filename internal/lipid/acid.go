package lipid

import (
	"math/bits"
	"strconv"
)

// FattyAcid is one acid with its whole structure. Values are comparable with ==. The zero value is no acid.
//
// Positions are bits: bit p of cis is a cis double bond between carbons p and p+1 of the numbered chain, carboxyl carbon 1.
type FattyAcid struct {
	chain      uint8 // carbons of the numbered chain; a three-membered ring counts its third carbon here, as LIPID MAPS does
	ring       uint8 // first chain position of a three-membered carbon ring, 0 without one
	ringDouble bool  // the ring holds a double bond (sterculic acid); it has no cis or trans of its own
	cis, trans uint64
	methyl     uint64 // methyl branches
	hydroxy    uint64
	epoxy      uint64 // oxygen bridging carbons p and p+1
}

// Carbons counts every carbon, branches included: 15 for 13-methyltetradecanoic acid.
func (a FattyAcid) Carbons() int { return int(a.chain) + bits.OnesCount64(a.methyl) }

// DoubleBonds counts carbon-carbon double bonds, one inside a ring included.
func (a FattyAcid) DoubleBonds() int {
	n := bits.OnesCount64(a.cis | a.trans)
	if a.ringDouble {
		n++
	}
	return n
}

// Bonds lists the double bonds of the chain in order from the carboxyl end.
func (a FattyAcid) Bonds() []Bond {
	all := a.cis | a.trans
	out := make([]Bond, 0, bits.OnesCount64(all))
	for m := all; m != 0; m &= m - 1 {
		p := bits.TrailingZeros64(m)
		g := Cis
		if a.trans>>p&1 == 1 {
			g = Trans
		}
		out = append(out, Bond{p, g})
	}
	return out
}

// MethylEnd is the x of n-x: the position, from the methyl end, of the double bond nearest to it; 0 without a double bond.
func (a FattyAcid) MethylEnd() int {
	all := a.cis | a.trans
	if all == 0 {
		return 0
	}
	return int(a.chain) - (bits.Len64(all) - 1)
}

// String is the LIPID MAPS shorthand at full structure level, without stereocentres.
// Reference: LIPID MAPS shorthand update 2020, J Lipid Res 61:1539, Table 2B.
func (a FattyAcid) String() string {
	b := make([]byte, 0, 48)
	b = append(b, "FA "...)
	b = strconv.AppendInt(b, int64(a.chain), 10)
	b = append(b, ':')
	all := a.cis | a.trans
	b = strconv.AppendInt(b, int64(bits.OnesCount64(all)), 10)
	b = appendBonds(b, all, a.cis, a.trans)
	b = appendSubstituents(b, a.hydroxy, "OH")
	b = appendSubstituents(b, a.epoxy, "Ep")
	b = appendSubstituents(b, a.methyl, "Me")
	return string(a.appendRing(b))
}

func appendBonds(b []byte, all, cis, trans uint64) []byte {
	sep := byte('(')
	for m := all; m != 0; m &= m - 1 {
		p := bits.TrailingZeros64(m)
		b = strconv.AppendInt(append(b, sep), int64(p), 10)
		switch {
		case cis>>p&1 == 1:
			b = append(b, 'Z')
		case trans>>p&1 == 1:
			b = append(b, 'E')
		}
		sep = ','
	}
	if all != 0 {
		b = append(b, ')')
	}
	return b
}

func appendSubstituents(b []byte, at uint64, name string) []byte {
	sep := byte(';')
	for m := at; m != 0; m &= m - 1 {
		b = strconv.AppendInt(append(b, sep), int64(bits.TrailingZeros64(m)), 10)
		b = append(b, name...)
		sep = ','
	}
	return b
}

func (a FattyAcid) appendRing(b []byte) []byte {
	if a.ring == 0 {
		return b
	}
	first := int64(a.ring)
	b = strconv.AppendInt(append(b, ";["...), first, 10)
	b = strconv.AppendInt(append(b, '-'), first+2, 10)
	if !a.ringDouble {
		return append(b, "cy3:0]"...)
	}
	b = strconv.AppendInt(append(b, "cy3:1("...), first, 10)
	return append(b, ")]"...)
}

// Formula counts carbon, hydrogen and oxygen.
func (a FattyAcid) Formula() (c, h, o int) {
	c = a.Carbons()
	bridges := bits.OnesCount64(a.epoxy)
	rings := bridges
	if a.ring != 0 {
		rings++
	}
	return c, 2 * (c - a.DoubleBonds() - rings), 2 + bits.OnesCount64(a.hydroxy) + bridges
}
