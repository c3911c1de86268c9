package lipid

import "math/bits"

// scanSubstituents reads one LIPID MAPS group after a semicolon: "3Me,7Me", "12OH", "12Ep" or "[11-13cy3:0]".
func (d *draft) scanSubstituents(sc *scanner) *NotationError {
	if sc.tok.kind == '[' {
		return d.scanRing(sc)
	}
	for {
		if err := d.scanSubstituent(sc); err != nil {
			return err
		}
		if !sc.take(',') {
			return nil
		}
	}
}

func (d *draft) scanSubstituent(sc *scanner) *NotationError {
	if sc.tok.kind != number {
		return fault(Unknown, "a substituent needs its position, as in \"FA 18:1(9Z);12OH\"")
	}
	p := sc.tok.n
	sc.advance()
	name := sc.tok.text
	sc.advance()
	var to *uint64
	switch name {
	case "me":
		to = &d.methyl
	case "oh":
		to = &d.hydroxy
	case "ep":
		to = &d.epoxy
	case "ome":
		return fault(Impossible, "an ester of methanol is no acid; write the acid and give the amount as methyl ester")
	default:
		return fault(Unknown, "the substituent %q is not known; Me, OH and Ep are", name)
	}
	if p < 2 || p > maxCarbons {
		return fault(Impossible, "carbon %d carries no substituent; positions start at 2", p)
	}
	if *to>>p&1 == 1 {
		return fault(Impossible, "two alike substituents at carbon %d; write each once", p)
	}
	*to |= 1 << p
	return nil
}

// scanRing reads a three-membered ring: "[11-13cy3:0]", or "[9-11cy3:1(9)]" with a double bond in it.
func (d *draft) scanRing(sc *scanner) *NotationError {
	sc.advance()
	first := sc.tok.n
	ok := sc.take(number) && sc.take('-') && sc.tok.n == first+2 && sc.take(number) && sc.takeWord("cy") &&
		sc.tok.n == 3 && sc.take(number) && sc.take(':')
	if double := sc.tok.n; ok && sc.take(number) && double == 1 {
		d.ringDouble = true
		ok = sc.take('(') && sc.tok.n == first && sc.take(number) && sc.take(')')
	} else if double != 0 {
		ok = false
	}
	if !ok || !sc.take(']') || d.ring != 0 {
		return fault(Unknown, "a ring reads \"[11-13cy3:0]\" or \"[9-11cy3:1(9)]\", once")
	}
	d.ring = first
	return nil
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
