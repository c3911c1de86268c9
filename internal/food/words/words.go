// Package words cuts a text into folded words, the same way for the names in
// the food table and for what a person types.
package words

// Split gives the words of a text: lower case, accents dropped, apostrophes
// ignored, everything else that is neither letter nor digit between words.
func Split(text string) []string {
	var found []string
	var word []byte
	for _, r := range text {
		letters := fold(r)
		if letters == "" && !apostrophe(r) && len(word) > 0 {
			found, word = append(found, string(word)), nil
		}
		word = append(word, letters...)
	}
	if len(word) > 0 {
		found = append(found, string(word))
	}
	return found
}

func apostrophe(r rune) bool { return r == '\'' || r == '’' }

// fold gives the plain lower-case letters or the digit of a rune, or "".
func fold(r rune) string {
	switch {
	case r >= 'a' && r <= 'z', r >= '0' && r <= '9':
		return string(r)
	case r >= 'A' && r <= 'Z':
		return string(r + 'a' - 'A')
	case r >= 'À' && r <= 'ÿ':
		return latin1[r-'À']
	case r == 'œ' || r == 'Œ':
		return "oe"
	}
	return ""
}

var latin1 = [...]string{
	"a", "a", "a", "a", "a", "a", "ae", "c", "e", "e", "e", "e", "i", "i", "i", "i",
	"d", "n", "o", "o", "o", "o", "o", "", "o", "u", "u", "u", "u", "y", "th", "ss",
	"a", "a", "a", "a", "a", "a", "ae", "c", "e", "e", "e", "e", "i", "i", "i", "i",
	"d", "n", "o", "o", "o", "o", "o", "", "o", "u", "u", "u", "u", "y", "th", "y",
}
