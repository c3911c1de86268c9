package lipid

func geometryWord(w string) (Geometry, bool) {
	switch w {
	case "c", "cis", "z":
		return Cis, true
	case "t", "trans", "e", "tr":
		return Trans, true
	}
	return UnknownGeometry, false
}

func (d *draft) scanWord(sc *scanner) *NotationError {
	w := sc.tok
	if w.text == "c" && d.carbonSign(*sc) {
		sc.advance()
		sc.take('-')
		return nil
	}
	if g, ok := geometryWord(w.text); ok {
		return d.scanGeometry(sc, g)
	}
	sc.advance()
	switch w.text {
	case "n", "w", "omega":
		return d.scanEnd(sc)
	case "all":
		sc.take('-')
		return d.scanAll(sc)
	case "i", "iso", "a", "ai", "anteiso":
		d.scanBranch(w.text)
		return nil
	case "methylene":
		sc.take('-')
		if sc.takeWord("interrupted") {
			d.interrupted = true
			return nil
		}
	}
	return d.plainWord(w.text)
}

// carbonSign tells the C of "C18:1" from a cis: it stands directly before a chain, and no geometry list is under way.
func (d *draft) carbonSign(sc scanner) bool {
	sc.advance()
	glued := sc.tok.kind == number && !sc.tok.spaced
	if sc.tok.kind == '-' {
		sc.advance()
	}
	return sc.tok.kind == number && sc.peek().kind == ':' && (glued || d.nBare == 0)
}

func (d *draft) scanGeometry(sc *scanner, g Geometry) *NotationError {
	ahead := *sc
	ahead.advance()
	if ahead.tok.kind == '-' {
		ahead.advance()
	}
	if ahead.tok.kind == number && ahead.peek().kind != ':' {
		n := ahead.tok.n
		ahead.advance()
		*sc = ahead
		return d.addBond(n, g)
	}
	sc.advance()
	return d.addBare(g)
}

func (d *draft) addBare(g Geometry) *NotationError {
	if d.nBare == maxBonds {
		return tooManyBonds()
	}
	d.bare[d.nBare] = g
	d.nBare++
	return nil
}

// scanEnd reads the x of n-x.
func (d *draft) scanEnd(sc *scanner) *NotationError {
	sc.take('-')
	if sc.tok.kind != number {
		return fault(Unknown, "the position after n- is missing; write it as \"n-3\"")
	}
	x := sc.tok.n
	sc.advance()
	if x < 1 || x > maxCarbons-2 {
		return fault(Impossible, "n-%d lies outside every chain; write it as \"n-3\"", x)
	}
	d.ends |= 1 << x
	return nil
}

func (d *draft) scanAll(sc *scanner) *NotationError {
	g, ok := geometryWord(sc.tok.text)
	if !ok {
		return fault(Unknown, "\"all\" is followed by cis or trans, as in \"all-cis-9,12-18:2\"")
	}
	if d.all != UnknownGeometry && d.all != g {
		return fault(Contradictory, "all cis and all trans at once")
	}
	d.all = g
	sc.advance()
	return nil
}

func (d *draft) scanBranch(w string) {
	switch w {
	case "iso":
		d.branch = 2
	case "i": // iso of a saturated acid; isomers of an unsaturated one, as USDA writes "18:2 i"
		d.branch, d.isomers = 2, true
	default:
		d.branch = 3
	}
}

// plainWord reads words that say something by themselves; any other is part of a name.
func (d *draft) plainWord(w string) *NotationError {
	switch w {
	case "fatty":
		d.setTotal(span{0, maxBonds})
	case "fa", "acid", "acids", "total", "sum", "undifferentiated", "delta", "d", "and", "or":
	case "isomer", "isomers", "other":
		d.isomers = true
	case "conjugated", "conj":
		d.conjugated = true
	case "cla", "clas":
		d.conjugated = true
		return d.setChain(18, 2)
	case "saturated", "sfa":
		d.setTotal(span{0, 0})
	case "monounsaturated", "mufa":
		d.setTotal(span{1, 1})
	case "polyunsaturated", "pufa":
		d.setTotal(span{2, maxBonds})
	case "unsaturated":
		d.setTotal(span{1, maxBonds})
	default:
		return d.unusualWord(w)
	}
	return nil
}

func (d *draft) setTotal(bonds span) {
	if d.isTotal {
		bonds = bonds.meet(d.total)
	}
	d.total, d.isTotal = bonds, true
}

// unusualWord reads runs of c and t ("18:2 ct"), parts of systematic names, and keeps the rest as a name.
func (d *draft) unusualWord(w string) *NotationError {
	if len(w) > 1 && len(w) <= maxBonds && onlyGeometries(w) {
		for i := range len(w) {
			g, _ := geometryWord(w[i : i+1])
			if err := d.addBare(g); err != nil {
				return err
			}
		}
		return nil
	}
	if d.systematic(w) {
		return nil
	}
	d.nName += copy(d.name[d.nName:], w)
	return nil
}

func onlyGeometries(w string) bool {
	for i := range len(w) {
		if w[i] != 'c' && w[i] != 't' {
			return false
		}
	}
	return true
}
