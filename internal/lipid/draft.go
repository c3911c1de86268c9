package lipid

// draft collects what a notation says, in whatever order it says it.
type draft struct {
	carbons, bonds int // bonds is meaningful when chain is true or a systematic name counted them
	chain          bool
	stem, suffix   int // carbons and double bonds of a systematic name, each plus one; 0 when absent
	at             [maxBonds]Bond
	nAt            int
	bare           [maxBonds]Geometry // geometries without a position
	nBare          int
	all            Geometry // "all-cis"
	ends           uint64
	conjugated     bool
	interrupted    bool
	isomers        bool
	branch         int // carbons from the methyl end to the branch: 2 iso, 3 anteiso
	total          span
	isTotal        bool
	hydroxy, epoxy uint64
	methyl         uint64
	ring           int
	ringDouble     bool
	name           [MaxNotation]byte // words that are left over: a name beside a notation
	nName          int
}

// scan reads the tokens of a notation into the draft.
func (d *draft) scan(sc *scanner) *NotationError {
	depth := 0
	for sc.tok.kind != end {
		var err *NotationError
		switch sc.tok.kind {
		case number:
			err = d.scanNumber(sc)
		case word:
			err = d.scanWord(sc)
		case ';':
			sc.advance()
			err = d.scanSubstituents(sc)
		case '(', '[':
			depth++
			sc.advance()
		case ')', ']':
			depth--
			sc.advance()
		case ':':
			err = fault(Unknown, "a colon stands between carbons and double bonds only, as in \"18:1\"")
		default:
			sc.advance()
		}
		if err != nil {
			return err
		}
		if depth < 0 {
			break
		}
	}
	if depth != 0 {
		return fault(Unknown, "brackets do not pair; write positions as \"18:2(9Z,12Z)\"")
	}
	return nil
}

// scanNumber reads a chain ("18:2") or a position with or without its geometry ("9c", "9-cis", "9").
func (d *draft) scanNumber(sc *scanner) *NotationError {
	n := sc.tok.n
	sc.advance()
	if sc.take(':') {
		if sc.tok.kind != number {
			return fault(Unknown, "the number of double bonds is missing after %d:", n)
		}
		bonds := sc.tok.n
		sc.advance()
		return d.setChain(n, bonds)
	}
	if g, ok := geometryWord(sc.tok.text); ok && (!sc.tok.spaced || !positioned(*sc)) {
		sc.advance()
		return d.addBond(n, g)
	}
	if sc.tok.kind == '-' && !sc.tok.spaced {
		ahead := *sc
		ahead.advance()
		if g, ok := geometryWord(ahead.tok.text); ok && !positioned(ahead) {
			ahead.advance()
			*sc = ahead
			return d.addBond(n, g)
		}
	}
	return d.addBond(n, UnknownGeometry)
}

// positioned reports that the geometry word at sc belongs to a position after it: "cis-9", "c9", but not "cis-18:1".
func positioned(sc scanner) bool {
	sc.advance()
	if sc.tok.kind == '-' {
		sc.advance()
	}
	return sc.tok.kind == number && sc.peek().kind != ':' && !sc.tok.spaced
}

func (d *draft) setChain(carbons, bonds int) *NotationError {
	if d.chain && (d.carbons != carbons || d.bonds != bonds) {
		return fault(Contradictory, "two chains, %d:%d and %d:%d; write one acid at a time", d.carbons, d.bonds, carbons, bonds)
	}
	d.carbons, d.bonds, d.chain = carbons, bonds, true
	return nil
}

func (d *draft) addBond(position int, g Geometry) *NotationError {
	for i := range d.nAt {
		if d.at[i].Position != position {
			continue
		}
		if d.stem != 0 && g == UnknownGeometry { // "(9Z)-octadec-9-enoic acid" writes each position twice
			return nil
		}
		return fault(Impossible, "two double bonds at carbon %d; write each position once, as \"20:4(5Z,8Z,11Z,14Z)\"", position)
	}
	if d.nAt == maxBonds {
		return tooManyBonds()
	}
	d.at[d.nAt] = Bond{position, g}
	d.nAt++
	return nil
}

func tooManyBonds() *NotationError {
	return fault(Impossible, "more than %d double bonds; no food acid has so many", maxBonds)
}
