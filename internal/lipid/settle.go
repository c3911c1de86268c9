package lipid

import "math/bits"

// settle writes the group in one way only, makes it an acid when just one is left, and refuses it when none is.
func (g group) settle() (Species, *NotationError) {
	full := uint16(1)<<g.bonds.hi - 1
	if g.positions == 0 && bits.OnesCount64(g.ends) == 1 && g.carbons.one() && (g.bonds.hi == 1 || g.interrupted && g.bonds.one()) {
		at, fits := series(int(g.carbons.lo), int(g.bonds.lo), bits.TrailingZeros64(g.ends))
		if !fits {
			return Species{}, fault(Impossible, "%d methylene-interrupted double bonds do not fit %d carbons at this n- position", g.bonds.lo, g.carbons.lo)
		}
		g.positions = at
	}
	if g.positions == 0 {
		g.allCis = g.allCis || full != 0 && g.bonds.one() && g.cis == full
		if g.allCis {
			g.cis = 0
		}
		return g.orNothing()
	}
	return g.settleAt(full)
}

// settleAt settles a group whose positions are known.
func (g group) settleAt(full uint16) (Species, *NotationError) {
	if g.allCis {
		g.cis = full
	}
	if g.positions>>(g.carbons.lo-1)&1 == 1 { // a bond at the chain's end has one form only, written as cis
		g.cis |= 1 << (g.bonds.lo - 1)
	}
	if open := full &^ (g.cis | g.trans); g.anyTrans && g.trans == 0 && bits.OnesCount16(open) == 1 {
		g.trans = open
	}
	if g.trans != 0 {
		g.anyTrans = false
	}
	if g.clash() {
		return Species{}, nothingFits()
	}
	if g.cis|g.trans == full {
		a := FattyAcid{chain: g.carbons.lo}
		a.cis, a.trans = g.spread()
		if !g.admits(a) {
			return Species{}, nothingFits()
		}
		return Species{acid: a}, nil
	}
	s, err := g.orNothing()
	s.set.allCis, s.set.ends, s.set.interrupted, s.set.conjugated = false, 0, false, false
	return s, err
}

func (g group) orNothing() (Species, *NotationError) {
	if g.clash() || g.empty() {
		return Species{}, nothingFits()
	}
	return Species{set: g}, nil
}

func nothingFits() *NotationError {
	return fault(Contradictory, "no acid is all of this; positions, n-, geometry and words exclude each other")
}
