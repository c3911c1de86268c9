package lipid

import "math/bits"

// finish turns the collected words into a species: by the name, by the structure, or by what both leave.
func (d *draft) finish() (Species, *NotationError) {
	if err := d.takeStem(); err != nil {
		return Species{}, err
	}
	if d.nName == 0 {
		return d.structure()
	}
	known, err := d.named()
	if err != nil {
		return Species{}, err
	}
	counts := *d
	counts.name, counts.nName, counts.stem, counts.suffix = [MaxNotation]byte{}, 0, 0, 0
	counts.carbons, counts.bonds, counts.chain = 0, 0, false
	bare := counts == draft{}
	if bare && !d.chain || bare && d.carbons == known.Carbons() && d.bonds == known.DoubleBonds() {
		return known, nil
	}
	if !d.chain && known.Carbons() >= 0 {
		d.carbons, d.bonds, d.chain = known.Carbons(), known.DoubleBonds(), true
	}
	said, err := d.structure()
	if err != nil {
		return Species{}, err
	}
	return narrow(known, said)
}

// named looks up the words left over; "oleate" is the anion of oleic acid.
func (d *draft) named() (Species, *NotationError) {
	key := d.name[:d.nName]
	if k, found := names[string(key)]; found {
		return k.species()
	}
	if n := len(key) - 3; n > 0 && string(key[n:]) == "ate" {
		if k, found := names[string(append(key[:n], "ic"...))]; found {
			return k.species()
		}
	}
	return Species{}, fault(Unknown, "%q is no word of a notation and no name known here; write carbons and double bonds, as in \"18:1 cis-9\"",
		string(d.name[:d.nName]))
}

// narrow is what two descriptions of the same acid leave together.
func narrow(known, said Species) (Species, *NotationError) {
	switch {
	case known.Contains(said) == Yes:
		return said, nil
	case said.Contains(known) == Yes:
		return known, nil
	case known.IsGroup() && said.IsGroup():
		if g := known.set.meet(said.set); !g.carbons.void() && !g.bonds.void() && !g.clash() {
			return g.settle()
		}
	}
	return Species{}, fault(Contradictory, "the name means %s, the rest %s; write only one of them", known, said)
}

// structure builds the species from everything but a name.
func (d *draft) structure() (Species, *NotationError) {
	if !d.chain {
		return d.totals()
	}
	if err := d.checkCounts(); err != nil {
		return Species{}, err
	}
	if d.isTotal && !d.total.has(d.bonds) {
		return Species{}, fault(Contradictory, "%d double bonds do not go with the word beside them", d.bonds)
	}
	if d.isomers && d.bonds > 0 && d.branch == 2 { // the i of "18:2 i"
		d.branch = 0
	}
	if d.bonds == 0 {
		return d.saturated()
	}
	if d.branch != 0 {
		return Species{}, fault(Unknown, "iso and anteiso stand for saturated acids; write a branch as \"FA 17:1(9Z);16Me\"")
	}
	g := group{carbons: span{uint8(d.carbons), uint8(d.carbons)}, bonds: span{uint8(d.bonds), uint8(d.bonds)}}
	if err := d.fill(&g); err != nil {
		return Species{}, err
	}
	s, err := g.settle()
	if err != nil {
		return Species{}, err
	}
	return d.substitute(s)
}

func (d *draft) checkCounts() *NotationError {
	c, b := d.carbons, d.bonds
	switch {
	case c < minCarbons || c > maxCarbons:
		return fault(Impossible, "%d carbons; fatty acids of food have %d to %d", c, minCarbons, maxCarbons)
	case b > maxBonds:
		return tooManyBonds()
	case b > (c-1)/2:
		return fault(Impossible, "%d double bonds do not fit %d carbons; at most %d do", b, c, (c-1)/2)
	case d.nAt != 0 && d.nAt != b:
		return fault(Impossible, "%d positions for %d double bonds; write one for each, as \"18:2(9Z,12Z)\"", d.nAt, b)
	}
	return d.checkEnds()
}

func (d *draft) checkEnds() *NotationError {
	if d.ends == 0 {
		return nil
	}
	if x := bits.Len64(d.ends) - 1; d.bonds > 0 && x > d.carbons-2 {
		return fault(Impossible, "n-%d lies outside a chain of %d carbons; the position counts from the methyl end", x, d.carbons)
	}
	if d.nAt == 0 && d.bonds > 1 && d.ends == 1<<2 {
		return fault(Impossible, "no food acid of several double bonds is n-2; the position is that of the first double bond from the methyl end, as in \"18:3 n-3\"")
	}
	return nil
}

func (d *draft) saturated() (Species, *NotationError) {
	if d.nBare > 0 || d.all != UnknownGeometry || d.ends != 0 || d.conjugated || d.interrupted {
		return Species{}, fault(Contradictory, "an acid without double bonds has no cis, trans or n- position")
	}
	if d.isomers && d.branch == 0 {
		return Species{}, fault(Unknown, "write the isomers of a saturated acid as \"15:0 iso\" or \"15:0 anteiso\"")
	}
	a := FattyAcid{chain: uint8(d.carbons)}
	if d.branch != 0 {
		if d.carbons < d.branch+2 || d.methyl != 0 {
			return Species{}, fault(Impossible, "the chain has no room for this branch")
		}
		a.chain--
		a.methyl = 1 << (d.carbons - d.branch)
	}
	return d.substitute(Species{acid: a})
}

// fill carries the words about double bonds into the group.
func (d *draft) fill(g *group) *NotationError {
	g.ends, g.conjugated = d.ends, d.conjugated
	g.interrupted = d.interrupted && d.bonds > 1
	g.isomers = d.isomers && d.bonds > 1
	if d.conjugated && d.bonds == 1 {
		return fault(Contradictory, "one double bond cannot be conjugated; write the acid with two, as \"18:2 conjugated\"")
	}
	if err := d.positions(g); err != nil {
		return err
	}
	if err := d.geometries(g); err != nil {
		return err
	}
	d.convention(g)
	return nil
}

// positions enters the written positions, sorted, and the geometry beside each.
func (d *draft) positions(g *group) *NotationError {
	at := d.at[:d.nAt]
	for i := 1; i < len(at); i++ {
		for j := i; j > 0 && at[j].Position < at[j-1].Position; j-- {
			at[j], at[j-1] = at[j-1], at[j]
		}
	}
	for i, b := range at {
		if b.Position < 2 || b.Position >= d.carbons {
			return fault(Impossible, "no double bond can start at carbon %d of %d; positions run from 2 to %d", b.Position, d.carbons, d.carbons-1)
		}
		g.positions |= 1 << b.Position
		g.give(i, b.Geometry)
	}
	return nil
}

// give sets the geometry of bond number i.
func (g *group) give(i int, to Geometry) {
	switch to {
	case Cis:
		g.cis |= 1 << i
	case Trans:
		g.trans |= 1 << i
	}
}

// geometries enters geometries written without a position: one for each bond, or one word for all.
func (d *draft) geometries(g *group) *NotationError {
	full := uint16(1)<<d.bonds - 1
	cis, trans := g.cis, g.trans
	switch {
	case d.all == Trans:
		g.trans |= full
	case d.all == Cis:
		g.cis |= full
	case d.nBare == d.bonds:
		for i, to := range d.bare[:d.nBare] {
			g.give(i, to)
		}
	case d.nBare == 1 && d.bare[0] == Cis:
		g.cis |= full
	case d.nBare == 1 && g.trans == 0:
		g.anyTrans = true
	case d.nBare > 1:
		return fault(Impossible, "%d geometries for %d double bonds; write one for each, as \"18:2 c,t\"", d.nBare, d.bonds)
	}
	if g.cis&g.trans != 0 || g.anyTrans && cis == full {
		return fault(Contradictory, "a double bond is written cis and trans at once")
	}
	if d.positionsKnown() && cis|trans == full && (cis != g.cis || trans != g.trans) {
		return fault(Contradictory, "the geometries beside and without the positions differ")
	}
	return nil
}

func (d *draft) positionsKnown() bool { return d.nAt > 0 }

// convention applies what the trade leaves unsaid: n-x alone means all cis and methylene-interrupted, in the families that
// are (n-1, n-3, n-4, n-6, n-7, n-9 ...; n-5 and n-8 polyenes of food are conjugated), and trans means an isolated bond.
func (d *draft) convention(g *group) {
	const uneven = 1<<2 | 1<<5 | 1<<8 | 1<<11 | 1<<14 | 1<<17 | 1<<20 | 1<<23 | 1<<26 | 1<<29 | 1<<32 | 1<<35 | 1<<38
	if d.positionsKnown() || d.bonds < 2 {
		return
	}
	someTrans := g.trans != 0 || g.anyTrans
	if g.ends != 0 && g.ends&uneven == 0 && !someTrans && !g.conjugated && !g.isomers {
		g.cis, g.interrupted = 1<<d.bonds-1, true
	}
	if someTrans && !g.conjugated {
		g.anyTrans, g.isolated = false, true
	}
}

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

// substitute adds branches, hydroxy groups, epoxides and a ring to a known acid.
func (d *draft) substitute(s Species) (Species, *NotationError) {
	if d.methyl|d.hydroxy|d.epoxy == 0 && d.ring == 0 {
		return s, nil
	}
	a, one := s.Acid()
	if !one {
		return s, fault(Unknown, "a substituted acid needs position and geometry of every double bond, as in \"FA 18:1(9Z);12OH\"")
	}
	a.methyl |= d.methyl
	a.hydroxy, a.epoxy, a.ring, a.ringDouble = d.hydroxy, d.epoxy, uint8(min(d.ring, maxCarbons)), d.ringDouble
	if !a.possible() {
		return s, fault(Impossible, "the chain has no room for these substituents")
	}
	return Species{acid: a}, nil
}

// possible checks that every substituent finds its carbon and no two exclude each other.
func (a FattyAcid) possible() bool {
	chain, all := int(a.chain), a.cis|a.trans
	fits := bits.Len64(a.methyl) <= chain && bits.Len64(a.hydroxy) <= chain+1 && bits.Len64(a.epoxy) <= chain
	if a.ring != 0 {
		inside := uint64(3) << a.ring
		fits = fits && a.ring >= 2 && int(a.ring)+2 <= chain && (all|a.epoxy)&inside == 0
	}
	return fits && a.Carbons() <= maxCarbons && a.epoxy&(a.epoxy<<1|all) == 0
}

// totals builds a group of any chain length from words alone.
func (d *draft) totals() (Species, *NotationError) {
	if d.nAt > 0 || d.methyl|d.hydroxy|d.epoxy != 0 || d.ring != 0 || d.branch != 0 || d.isomers || d.nBare > 1 || d.saysNothing() {
		return Species{}, fault(Unknown, "carbons and double bonds are missing; write them as \"18:1\"")
	}
	g := group{carbons: everyCarbons, bonds: span{0, maxBonds}, branched: true}
	if d.isTotal {
		g.bonds = d.total
	}
	to := d.all
	if d.nBare == 1 {
		to = d.bare[0]
	}
	if d.ends != 0 || to != UnknownGeometry {
		g.bonds.lo = max(g.bonds.lo, 1)
	}
	if d.conjugated || d.interrupted {
		g.bonds.lo = max(g.bonds.lo, 2)
	}
	g.ends, g.conjugated, g.interrupted, g.allCis = d.ends, d.conjugated, d.interrupted, to == Cis
	g.isolated, g.anyTrans = to == Trans && !d.conjugated, to == Trans && d.conjugated
	if g.bonds.void() {
		return Species{}, nothingFits()
	}
	return g.settle()
}

func (d *draft) saysNothing() bool {
	return !d.isTotal && d.ends == 0 && d.nBare == 0 && d.all == UnknownGeometry && !d.conjugated && !d.interrupted
}
