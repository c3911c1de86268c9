package lipid

import "math/bits"

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
