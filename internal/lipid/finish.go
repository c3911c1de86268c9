package lipid

import "strings"

// notFurtherDefined is what USDA tables add to "18:2 t".
const notFurtherDefined = "notfurtherdefined"

// finish turns the collected words into a species: by the name, by the structure, or by what both leave.
func (d *draft) finish() (Species, *NotationError) {
	if err := d.takeStem(); err != nil {
		return Species{}, err
	}
	if d.nName == 0 || string(d.name[:d.nName]) == notFurtherDefined {
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
	if !known.IsGroup() || known.set.positions != 0 || known.set.conjugated {
		said.set.located()
	}
	return narrow(known, said)
}

// located takes back that an unplaced trans bond is isolated: the name beside it says where the bonds are.
func (g *group) located() {
	if g.isolated {
		g.isolated, g.anyTrans = false, g.trans == 0
	}
}

// named looks up the words left over; "oleate" is the anion of oleic acid.
func (d *draft) named() (Species, *NotationError) {
	name := string(d.name[:d.nName])
	known, found := names[name]
	if stem, anion := strings.CutSuffix(name, "ate"); anion && !found {
		known, found = names[stem+"ic"]
	}
	if found {
		return known.species()
	}
	return Species{}, fault(Unknown, "%q is no word of a notation and no name known here; write carbons and double bonds, as in \"18:1 cis-9\"",
		name)
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
