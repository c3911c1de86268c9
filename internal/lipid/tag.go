package lipid

import "strings"

// scanTag reads an INFOODS tagname: F, carbons, D, double bonds, then geometry (C all cis, T trans, TT, CLA), N with the
// position from the methyl end, I or AI for a branch, and a last F for "per 100 g of total fatty acids", which changes the
// basis of the amount but not the acid. Reference: INFOODS tagnames (UNU 80734e); USDA SR28 NUTR_DEF.
func scanTag(sc *scanner) (d draft, err *NotationError) {
	sc.advance()
	carbons := sc.tok.n
	sc.advance()
	if !sc.takeWord("d") || sc.tok.kind != number {
		return d, fault(Unknown, "a tagname reads F, carbons, D, double bonds, as in \"F18D1CN9\"")
	}
	d.carbons, d.bonds, d.chain = carbons, sc.tok.n, true
	sc.advance()
	for sc.tok.kind != end {
		if sc.tok.kind != word {
			return d, fault(Unknown, "%q does not belong into a tagname; write it as \"F18D1CN9\"", sc.tok.text)
		}
		w := sc.tok.text
		sc.advance()
		if err := d.tagWord(sc, w); err != nil {
			return d, err
		}
	}
	return d, nil
}

func (d *draft) tagWord(sc *scanner, w string) *NotationError {
	if w, atEnd := strings.CutSuffix(w, "n"); atEnd {
		if err := d.tagLetters(w); err != nil {
			return err
		}
		return d.scanEnd(sc)
	}
	return d.tagLetters(strings.TrimSuffix(w, "f"))
}

func (d *draft) tagLetters(w string) *NotationError {
	switch {
	case w == "":
	case w == "cla":
		d.conjugated = true
	case w == "i":
		d.branch = 2
	case w == "ai":
		d.branch = 3
	case len(w) <= maxBonds && onlyGeometries(w):
		for i := range len(w) {
			g, _ := geometryWord(w[i : i+1])
			if err := d.addBare(g); err != nil {
				return err
			}
		}
	default:
		return fault(Unknown, "%q means nothing in a tagname; write it as \"F18D1CN9\"", strings.ToUpper(w))
	}
	return nil
}
