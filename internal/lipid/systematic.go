package lipid

import "strings"

// stems of systematic names; both the older eicos- and the present icos- are in use.
var stems = map[string]int{
	"but": 4, "pent": 5, "hex": 6, "hept": 7, "oct": 8, "non": 9, "dec": 10, "undec": 11, "dodec": 12, "tridec": 13,
	"tetradec": 14, "pentadec": 15, "hexadec": 16, "heptadec": 17, "octadec": 18, "nonadec": 19, "icos": 20, "eicos": 20,
	"henicos": 21, "heneicos": 21, "docos": 22, "tricos": 23, "tetracos": 24, "pentacos": 25, "hexacos": 26,
	"heptacos": 27, "octacos": 28, "nonacos": 29, "triacont": 30, "dotriacont": 32, "tetratriacont": 34, "hexatriacont": 36,
}

var suffixes = []struct {
	text  string
	bonds int
}{
	{"hexaenoic", 6}, {"pentaenoic", 5}, {"tetraenoic", 4}, {"trienoic", 3}, {"dienoic", 2}, {"enoic", 1}, {"anoic", 0},
}

// systematic reads a word of a systematic name, whole ("octadecadienoic") or in parts ("octadeca", "dienoic").
func (d *draft) systematic(w string) bool {
	bonds := -1
	for _, s := range suffixes {
		if rest, found := strings.CutSuffix(w, s.text); found {
			w, bonds = rest, s.bonds
			break
		}
	}
	carbons, found := stems[w]
	if !found {
		carbons, found = stems[strings.TrimSuffix(w, "a")]
	}
	if !found && (w != "" || bonds < 0) || found && d.stem != 0 || bonds >= 0 && d.suffix != 0 {
		return false
	}
	if found {
		d.stem = carbons + 1
	}
	if bonds >= 0 {
		d.suffix = bonds + 1
	}
	return true
}

// takeStem makes a systematic name the chain, or checks it against the one written beside it.
func (d *draft) takeStem() *NotationError {
	switch {
	case d.stem == 0 && d.suffix == 0:
		return nil
	case d.stem == 0 || d.suffix == 0:
		return fault(Unknown, "half a systematic name; write it as \"octadeca-9,12-dienoic acid\"")
	}
	return d.setChain(d.stem-1, d.suffix-1)
}
