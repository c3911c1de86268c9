package lipid

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
