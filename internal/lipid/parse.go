package lipid

import "unicode/utf8"

// Parse reads a notation of a fatty acid or of a group of them: carbon:bonds with delta positions and cis/trans, Z/E, c/t or
// n-x ("18:1 cis-9", "C18:1 9c", "C18:1n9c", "20:5 n-3"), LIPID MAPS shorthand, INFOODS tagnames, trivial and systematic
// names, common abbreviations, totals ("omega-3", "saturated"). Letter case, spacing and Unicode forms do not matter.
//
// Conventions it keeps: n-x of a polyunsaturated acid means all cis and methylene-interrupted unless geometry or another
// word says otherwise. "trans" for a polyunsaturated acid without positions ("18:2 t", "18:2 t,t") means at least one
// isolated trans bond, since tables and methods report conjugated acids apart (USDA SR28: 670 is not part of 605). A group
// with a chain length ("18:1") has straight, unsubstituted members; a total ("saturated") has branched ones too.
//
// An error is always a *NotationError. The time is linear in the length, which MaxNotation bounds.
func Parse(notation string) (Species, error) {
	s, err := parse(notation)
	if err != nil {
		err.Notation = notation[:min(len(notation), MaxNotation)]
		return Species{}, err
	}
	return s, nil
}

func parse(notation string) (Species, *NotationError) {
	if len(notation) > MaxNotation {
		return Species{}, fault(TooLong, "longer than %d bytes; write it as \"18:1 cis-9\"", MaxNotation)
	}
	var room [MaxNotation]byte
	folded, ok := fold(room[:0], notation)
	if !ok || !utf8.ValidString(notation) {
		return Species{}, fault(Unknown, "holds a character that no notation has; write it as \"18:1 cis-9\"")
	}
	var keyRoom [MaxNotation]byte
	key := nameKey(keyRoom[:0], folded)
	if len(key) == 0 {
		return Species{}, fault(Empty, "nothing is written; name an acid, such as \"18:1 cis-9\"")
	}
	if known, found := names[string(key)]; found {
		return known.species()
	}
	return parseFolded(string(folded))
}

// parseFolded reads everything that is not the bare name of one acid.
func parseFolded(text string) (Species, *NotationError) {
	sc := newScanner(text)
	if sc.tok.text == "f" && sc.peek().kind == number && !sc.peek().spaced {
		d, err := scanTag(&sc)
		if err != nil {
			return Species{}, err
		}
		return d.finish()
	}
	var d draft
	if err := d.scan(&sc); err != nil {
		return Species{}, err
	}
	return d.finish()
}

// nameKey keeps letters and digits and drops the word acid: "Alpha-Linolenic acid" and "alphalinolenic" are one name.
func nameKey(key, folded []byte) []byte {
	for _, c := range folded {
		if digit(c) || letter(c) {
			key = append(key, c)
		}
	}
	for _, tail := range [...]string{"fattyacids", "fattyacid", "acids", "acid"} {
		if n := len(key) - len(tail); n > 0 && string(key[n:]) == tail {
			return key[:n]
		}
	}
	return key
}
