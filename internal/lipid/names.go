package lipid

// meaning is what a name stands for: a notation, or for a name used of acids with different formula the sentence that
// asks which one is meant.
type meaning struct {
	notation string
	which    string
}

func (m meaning) species() (Species, *NotationError) {
	if m.which != "" {
		return Species{}, fault(Ambiguous, "%s", m.which)
	}
	var room [MaxNotation]byte
	folded, _ := fold(room[:0], m.notation)
	return parseFolded(string(folded))
}

// names maps letters and digits of a name, in lower case and without the word acid, to its meaning.
var names = func() map[string]meaning {
	m := make(map[string]meaning, 3*len(known)+len(shared))
	add := func(name, notation string) {
		if folded, ok := fold(nil, name); ok {
			m[string(nameKey(nil, folded))] = meaning{notation: notation}
		}
	}
	for _, r := range known {
		add(r.Trivial, r.Notation)
		add(r.Systematic, r.Notation)
		for _, n := range r.Names {
			add(n, r.Notation)
		}
	}
	for name, notation := range shared {
		add(name, notation)
	}
	m["aa"] = meaning{which: "AA is read as arachidonic or as adrenic acid; write ARA or \"22:4 n-6\""}
	return m
}()

// shared are names of groups, totals and tagnames of totals, and names that stay open although Known gives one acid.
// Tagnames: INFOODS; the reading of the totals as any chain length: from memory.
var shared = map[string]string{
	"linolenic": "18:3 n-3/n-6", "vaccenic": "18:1(11)", "eleostearic": "18:3(9,11,13)",
	"DPA": "22:5 n-3/n-6", "docosapentaenoic": "22:5 n-3/n-6",
	"conjugated linoleic": "18:2 conjugated", "conjugated linolenic": "18:3 conjugated", "CLnA": "18:3 conjugated",
	"eicosadienoic": "20:2", "docosadienoic": "22:2",
	"dihomo-linolenic": "20:3 n-3/n-6", "a-linolenic": "18:3 n-3", "g-linolenic": "18:3 n-6",
	"saturates": "saturated", "monounsaturates": "monounsaturated", "polyunsaturates": "polyunsaturated",
	"trans fat": "unsaturated trans", "TFA": "unsaturated trans",
	"FACID": "fatty acids", "FASAT": "saturated", "FAMS": "monounsaturated", "FAMSCIS": "monounsaturated cis",
	"FAPU": "polyunsaturated", "FAPUN3": "polyunsaturated n-3", "FAPUN6": "polyunsaturated n-6",
	"FACN3": "omega-3", "FACN6": "omega-6", "FACN9": "omega-9",
	"FATRN": "unsaturated trans", "FATRNM": "monounsaturated trans", "FATRNP": "polyunsaturated trans",
}
